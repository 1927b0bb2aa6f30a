use super::*;
use crate::drawing::mark::Mark;
use crate::notebook::cell::zone::Extent;
use crate::notebook::engine::Engine;
use crate::notebook::results::{Results, Shown};
use crate::notebook::snapshot::Snapshot;
use crate::notebook::uncertainty::Settings;
use crate::store::{schema, template};

fn base() -> Rail {
    Rail {
        about: "from the face of door, straight out, at 1.60 m".into(),
        quantity: "near infrared irradiance, nominal (W/m²)".into(),
        levels: vec![50.0, 100.0, 200.0, 500.0],
        level_texts: ["50", "100", "200", "500"].map(String::from).to_vec(),
        stretches: (0..5)
            .map(|i| Stretch {
                from: f64::from(i) * 10.0,
                to: f64::from(i + 1) * 10.0,
                step: 4 - i as usize,
            })
            .collect(),
        pins: vec![pin("eye, 4 min", 11.4), pin("eye, 8 h", 19.1)],
        stands: vec![
            stand("charger", 2.5, Shape::Over),
            stand("crane_hand", 8.2, Shape::NotAssessed),
        ],
        elsewhere: Vec::new(),
        notes: Vec::new(),
        screens: Vec::new(),
        shadows: Vec::new(),
        measure: Measure::Metric,
        settled: true,
    }
}

fn pin(label: &str, distance: f64) -> Pin {
    Pin {
        cell: label.replace(' ', "_"),
        label: label.into(),
        distance,
        text: Measure::Metric.safe_distance(distance),
        nominal: Some((
            distance * 0.95,
            Measure::Metric.safe_distance(distance * 0.95),
        )),
    }
}

fn stand(cell: &str, distance: f64, shape: Shape) -> Stand {
    Stand {
        cell: cell.into(),
        distance,
        text: Measure::Metric.standing(distance),
        shape,
        finding: match shape {
            Shape::Over => "over: no planned stay",
            Shape::Within => "within: allowed 3 h 12 min",
            _ => "not assessed",
        }
        .into(),
    }
}

fn crowded() -> Rail {
    let mut rail = base();
    rail.pins = (0..7)
        .map(|i| {
            pin(
                &format!("eye, {i} min by a site rule"),
                9.0 + 0.1 * f64::from(i),
            )
        })
        .collect();
    rail.stands = (0..9)
        .map(|i| {
            let shape = [Shape::Over, Shape::Within, Shape::NotAssessed][i as usize % 3];
            stand(&format!("person_{i}"), 8.8 + 0.05 * f64::from(i), shape)
        })
        .collect();
    rail.elsewhere = (0..30).map(|i| format!("person_{i}")).collect();
    rail.notes = vec!["skin, 10 s: met everywhere".into(); 3];
    rail
}

fn screened() -> Rail {
    let mut rail = base();
    rail.screens = vec![Screen {
        cell: "plate".into(),
        label: "plate 208 °C".into(),
        distance: 1.4,
    }];
    rail.shadows = vec![Shadow {
        from: 1.4,
        to: 4.4,
        source: "door".into(),
    }];
    rail
}

fn empty() -> Rail {
    Rail {
        pins: Vec::new(),
        stands: Vec::new(),
        ..base()
    }
}

fn hostile() -> Rail {
    let mut rail = crowded();
    rail.pins[0].distance = f64::NAN;
    rail.pins[1].distance = f64::INFINITY;
    rail.pins[2].distance = 1e300;
    rail.stands[0].cell = "w".repeat(300);
    rail.notes.push("n".repeat(900));
    rail.screens = vec![Screen {
        cell: "plate".into(),
        label: "p".repeat(200),
        distance: f64::NAN,
    }];
    rail.shadows = vec![Shadow {
        from: f64::NAN,
        to: -1.0,
        source: "s".repeat(300),
    }];
    rail.stretches.clear();
    rail.levels.clear();
    rail.level_texts.clear();
    rail
}

fn sets() -> [Rail; 6] {
    [
        base(),
        crowded(),
        empty(),
        screened(),
        hostile(),
        base().provisional(),
    ]
}

#[test]
fn no_words_cover_others_and_none_leave_the_sheet() {
    for (i, rail) in sets().iter().enumerate() {
        for width in [240.0, 360.0, 493.0, 900.0] {
            let picture = picture(rail, width, height(rail, width));
            let sheet = Rectangle::new(0.0, 0.0, picture.width, picture.height).grown(0.5);
            let texts = picture.texts();
            for (at, a) in texts.iter().enumerate() {
                assert!(
                    sheet.holds(&a.extent()),
                    "set {i} at {width}: {:?} at {:?}",
                    a.text,
                    a.extent()
                );
                for b in &texts[at + 1..] {
                    assert!(
                        !a.extent().grown(-0.3).meets(&b.extent().grown(-0.3)),
                        "set {i} at {width}: {:?} covers {:?}",
                        a.text,
                        b.text
                    );
                }
            }
        }
    }
}

#[test]
fn no_pole_and_no_shape_runs_through_words() {
    for (i, rail) in sets().iter().enumerate() {
        for width in [240.0, 493.0, 900.0] {
            let picture = picture(rail, width, height(rail, width));
            let texts = picture.texts();
            for mark in &picture.marks {
                let taken = match mark {
                    Mark::Line { points, .. } if points[0].x == points[1].x => Rectangle {
                        from: points[0].min(points[1]),
                        to: points[0].max(points[1]),
                    }
                    .grown(0.2),
                    Mark::Shape { shape, at, size } => shape.extent(*at, *size),
                    _ => continue,
                };
                for text in &texts {
                    assert!(
                        !taken.meets(&text.extent().grown(-0.3)),
                        "set {i} at {width}: {mark:?} through {:?}",
                        text.text
                    );
                }
            }
        }
    }
}

#[test]
fn what_finds_no_room_is_counted_and_pins_stay_longest() {
    let rail = crowded();
    let whole = height(&rail, 493.0);
    let small = picture(&rail, 493.0, whole - 150.0);
    let texts: Vec<&str> = small.texts().iter().map(|t| t.text.as_str()).collect();
    let more = texts.iter().find(|text| text.starts_with("and "));
    assert!(more.is_some(), "{texts:?}");
    for pin in &rail.pins {
        let told = format!("{}: {}", pin.label, pin.text);
        assert!(texts.contains(&told.as_str()), "{told} not in {texts:?}");
    }
    assert!(small.height <= whole - 150.0, "{} {whole}", small.height);
}

#[test]
fn the_ruler_begins_at_the_face_and_is_even() {
    let rail = base();
    let picture = picture(&rail, 493.0, 140.0);
    let pins: Vec<f64> = picture
        .marks
        .iter()
        .filter_map(|mark| match mark {
            Mark::Shape {
                shape: Shape::Pin,
                at,
                ..
            } => Some(at.x),
            _ => None,
        })
        .collect();
    let zero = picture
        .texts()
        .into_iter()
        .find(|text| text.text == "0 m")
        .expect("the ruler begins at nothing")
        .at
        .x;
    let (near, far) = (pins[0] - zero, pins[1] - zero);
    let (got, expected) = (far / near, 19.1 / 11.4);
    assert!((got - expected).abs() < 1e-9, "{got}, wanted {expected}");
}

#[test]
fn nothing_holds_while_bounds_are_worked_out() {
    let rail = base().provisional();
    assert!(
        rail.stands
            .iter()
            .all(|stand| stand.shape == Shape::NotAssessed)
    );
    let picture = picture(&rail, 493.0, 140.0);
    let filled = picture.marks.iter().any(|mark| {
        matches!(
            mark,
            Mark::Shape {
                shape: Shape::Pin,
                ..
            }
        )
    });
    assert!(!filled, "a filled pin is drawn");
    assert!(rail.pins.iter().all(|pin| pin.text == "being worked out"));
}

fn worked_out(text: &str) -> (Engine, Results) {
    let notebook = schema::read(text.as_bytes())
        .expect("a template is a notebook")
        .notebook;
    let engine = Engine::open(notebook).expect("a template opens");
    let results = Snapshot::of(&engine)
        .results(Settings::default(), &mut |_| true)
        .expect("nothing stops the draws");
    (engine, results)
}

#[test]
fn pins_tell_the_clear_distances_of_their_zones() {
    let mut seen = 0;
    for template in template::ALL {
        let (engine, results) = worked_out(template.text);
        for line in Line::all(&engine) {
            let rail =
                Rail::of(&engine, &results, &line, Measure::Metric).expect("no source is in error");
            for pin in &rail.pins {
                let zone = results.cell(&pin.cell).expect("a pin has its zone");
                let Some(Shown::Extent { extent, high, .. }) = zone.shown("clear_distance") else {
                    panic!("{}: {zone:?}", pin.cell);
                };
                let Extent::At(safe) = high.unwrap_or(*extent) else {
                    panic!("{}: {high:?}", pin.cell);
                };
                assert_eq!(pin.distance, safe, "{}", pin.cell);
                assert_eq!(pin.text, crate::units::format::safe_distance(safe));
                seen += 1;
            }
        }
    }
    assert!(seen >= 3, "{seen} pins seen");
}

#[test]
fn curve_and_rail_tell_the_same_distances_as_the_zones() {
    use crate::drawing::curve::Curve;
    let (engine, results) = worked_out(template::DEMO.text);
    let cell = results.cell("falloff").expect("the demo has a curve");
    let curve = Curve::of(&engine, &results, cell, Measure::Metric);
    let line = Line::of(&engine, cell.id).expect("a curve has a line");
    let rail = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    assert_eq!(rail.pins.len(), 2);
    for pin in &rail.pins {
        let crossed = curve
            .limits
            .iter()
            .filter_map(|limit| limit.upper_crossing.as_ref())
            .any(|crossing| {
                crossing.distance == pin.distance + line.edge && crossing.text == pin.text
            });
        assert!(crossed, "{pin:?} not in {:?}", curve.limits);
    }
    // A flat door has its edge at its centre on this line.
    assert_eq!(line.edge, 0.0);
}

#[test]
fn the_probe_reads_what_the_rows_of_a_curve_say() {
    use crate::notebook::cell::position::Orientation;
    for template in template::ALL {
        let (engine, results) = worked_out(template.text);
        for cell in results.cells.iter().filter(|cell| cell.rows() > 10) {
            let Some(line) = Line::of(&engine, cell.id) else {
                continue;
            };
            let probe = Probe::new(&engine, &line, Orientation::Strongest).expect("no fault");
            for row in [0, cell.rows() / 2, cell.rows() - 1] {
                let value = |name| {
                    let shown = cell.in_row(row, name).and_then(Shown::quantity);
                    shown.expect("a curve has this column").si
                };
                let reading = probe.read(value("distance")).expect("nothing is touched");
                let expected = value("near_ir_irradiance");
                assert!(
                    (reading.near_infrared - expected).abs() <= 1e-12 * expected,
                    "{}: {} wanted {expected}",
                    cell.name,
                    reading.near_infrared
                );
            }
        }
    }
}

#[test]
fn a_zone_without_an_edge_is_told_in_a_note() {
    let text = template::DEMO.text.replace(
        "\"stay\": \"8 h\"",
        "\"stay\": \"8 h\", \"farthest\": \"3 m\"",
    );
    let (engine, results) = worked_out(&text);
    let line = Line::all(&engine).remove(0);
    let rail = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    assert_eq!(rail.pins.len(), 1, "{:?}", rail.pins);
    let told = rail
        .notes
        .iter()
        .any(|note| note.contains("farther than 3.0 m"));
    assert!(told, "{:?}", rail.notes);
}

#[test]
fn positions_off_the_line_are_named_and_not_drawn() {
    let (engine, results) = worked_out(template::DEMO.text);
    let line = Line::all(&engine).remove(0);
    let rail = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    let names: Vec<&str> = rail
        .stands
        .iter()
        .map(|stand| stand.cell.as_str())
        .collect();
    assert_eq!(names, ["charger"]);
    assert_eq!(rail.elsewhere, ["spotter"]);
    let told = picture(&rail, 493.0, 140.0)
        .texts()
        .iter()
        .any(|text| text.text.contains("not on this line: spotter"));
    assert!(told, "the picture does not name the spotter");
}

#[test]
fn the_shading_uses_the_whole_ramp_for_what_is_shown() {
    use crate::drawing::mark::Fill;
    let rail = base();
    let picture = picture(&rail, 493.0, 140.0);
    let mut strengths: Vec<f64> = picture
        .marks
        .iter()
        .filter_map(|mark| match mark {
            Mark::Area {
                fill: Some(Fill::Ramp(strength)),
                ..
            } => Some(*strength),
            _ => None,
        })
        .collect();
    strengths.sort_by(f64::total_cmp);
    strengths.dedup();
    // The ruler ends before 30 m: three of the five stretches are on it.
    let expected = [1.0 / 6.0, 0.5, 5.0 / 6.0];
    assert_eq!(strengths.len(), expected.len(), "{strengths:?}");
    for (got, wanted) in strengths.iter().zip(expected) {
        assert!((got - wanted).abs() < 1e-12, "{got}, wanted {wanted}");
    }
}

#[test]
fn a_held_shading_is_used_while_nothing_it_hangs_on_changes() {
    use crate::notebook::edit::Edit;
    let (mut engine, results) = worked_out(template::DEMO.text);
    let line = Line::all(&engine).remove(0);
    let mut held = None;
    let rail = |engine: &Engine, held: &mut Option<Shading>| {
        Rail::held(engine, &results, &line, Measure::Metric, held).expect("no fault")
    };
    let first = rail(&engine, &mut held);
    assert_eq!(rail(&engine, &mut held), first, "held as it was");
    let name = engine
        .notebook()
        .cells
        .iter()
        .position(|cell| cell.name == "t_hearth")
        .and_then(|place| engine.id(place))
        .expect("the demo has a hearth");
    let field = engine
        .cell(name)
        .and_then(|cell| cell.field("entry"))
        .cloned();
    let mut hotter = field.expect("a value has an entry");
    hotter.content = crate::notebook::cell::Content::Text("1400 °C".into());
    let edit = Edit::SetField {
        name: "t_hearth".into(),
        field: "entry",
        content: Some(hotter),
    };
    let _ = engine.apply(edit).expect("the entry can be changed");
    let after = rail(&engine, &mut held);
    assert_ne!(
        after.stretches, first.stretches,
        "a hotter hearth shades farther"
    );
    let fresh = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    assert_eq!(after, fresh, "held equals fresh");
}

#[test]
fn every_source_has_a_line_and_a_selected_cell_finds_its_own() {
    let text = template::DEMO.text.replace(
        "    {\n      \"kind\": \"formula\",",
        "    { \"kind\": \"source\", \"name\": \"pot\", \"form\": \"body\", \"outline\": \"sphere\", \
         \"diameter\": \"0.5 m\", \"temperature\": \"900 °C\", \"emissivity\": \"0.8\", \
         \"x\": \"30 m\", \"y\": \"0 m\", \"z\": \"1 m\" },\n    {\n      \"kind\": \"formula\",",
    );
    let (engine, _) = worked_out(&text);
    let lines = Line::all(&engine);
    let names: Vec<(String, String)> = lines
        .iter()
        .map(|line| (line.source.clone(), line.way()))
        .collect();
    let expected = [("door", "straight out"), ("pot", "heading 0 °")];
    assert_eq!(
        names,
        expected.map(|(source, way)| (source.to_owned(), way.to_owned()))
    );
    // A sphere reaches out by its radius.
    assert!((lines[1].edge - 0.25).abs() < 1e-12, "{}", lines[1].edge);
    for (cell, source) in [
        ("pot", Some("pot")),
        ("charger", Some("door")),
        ("charger_limits", Some("door")),
        ("eye_4_min", Some("door")),
        ("spotter", None),
        ("bay", None),
    ] {
        let id = engine.find(cell).expect("the cell is there");
        let found = Line::of(&engine, id).map(|line| line.source);
        assert_eq!(found.as_deref(), source, "{cell}");
    }
}

#[test]
fn a_screen_has_a_flag_and_the_ground_behind_it_is_hatched() {
    use crate::drawing::screen::HIDDEN;
    let rail = screened();
    let picture = picture(&rail, 493.0, height(&rail, 493.0));
    let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
    for words in ["plate 208 °C", "hatched, door hidden: less heat, not none"] {
        assert!(texts.contains(&words), "{words} not in {texts:?}");
    }
    let cells: Vec<String> = hits(&rail, 493.0, height(&rail, 493.0))
        .into_iter()
        .map(|hit| hit.1)
        .collect();
    assert!(cells.contains(&"plate".to_owned()), "{cells:?}");
    let poles = |of: &str| {
        let place = hits(&rail, 493.0, height(&rail, 493.0));
        let (area, _) = place.iter().find(|hit| hit.1 == of).expect("it has a flag");
        area.from.x + 3.5
    };
    let scale = (poles("crane_hand") - poles("charger")) / (8.2 - 2.5);
    let hatched = picture.marks.iter().find_map(|mark| match mark {
        Mark::Area {
            outline,
            hatch: Some(hatch),
            ..
        } if (hatch.spacing - HIDDEN.spacing).abs() < 1e-9 => Some(outline[1].x - outline[0].x),
        _ => None,
    });
    let (got, expected) = (hatched.expect("the ground is hatched"), 3.0 * scale);
    assert!(
        (got - expected).abs() < 1e-9,
        "{got} points, wanted {expected}"
    );
}

#[test]
fn thousands_of_flags_are_left_out_at_once_and_counted() {
    let mut rail = base();
    rail.stands = (0..3000)
        .map(|i| {
            stand(
                &format!("person_{i}"),
                2.0 + 0.001 * f64::from(i),
                Shape::Within,
            )
        })
        .collect();
    let picture = picture(&rail, 560.0, 140.0);
    let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
    assert!(
        texts
            .iter()
            .any(|text| text.starts_with("and ") && text.contains(" more: ")),
        "{texts:?}"
    );
    // Pins are the last to go.
    assert!(
        texts.iter().any(|text| text.starts_with("eye, 4 min")),
        "{texts:?}"
    );
}

/// The way over the plate's upper edge by similar triangles: the door's lower
/// edge, 0.85 m up, is lost to an eye at 1.60 m over an edge at 1.30 m and 2 m
/// off from 0.75 · 2 / 0.45 m on.
#[test]
fn the_ground_behind_a_plate_begins_where_the_lower_edge_is_lost() {
    use crate::drawing::curve::Curve;
    let cells = |plate: &str| {
        format!(
            r#"{{"farglow": 1, "cells": [
            {{"kind": "source", "name": "door", "form": "opening", "outline": "rectangle",
              "width": "0.9 m", "height": "0.7 m", "temperature": "1250 °C",
              "emissivity": "0.95", "z": "1.20 m"}},
            {{"kind": "curve", "name": "falloff", "from": "door", "nearest": "0.5 m",
              "farthest": "8 m", "points": 20}}{plate}]}}"#
        )
    };
    let (engine, results) = worked_out(&cells(
        r#", {"kind": "screen", "name": "plate", "make": "solid", "width": "3 m",
              "height": "1.3 m", "y": "2 m", "z": "0.65 m", "heading": "180 °"}"#,
    ));
    let falloff = results.cell("falloff").expect("it has a curve");
    let line = Line::of(&engine, falloff.id).expect("a curve has a line");
    let rail = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    let curve = Curve::of(&engine, &results, falloff, Measure::Metric);
    for (screens, shadows) in [
        (&rail.screens, &rail.shadows),
        (&curve.screens, &curve.shadows),
    ] {
        let [screen] = &screens[..] else {
            panic!("one screen, found {screens:?}")
        };
        assert!((screen.distance - 2.0).abs() < 1e-9, "{screen:?}");
        let [shadow] = &shadows[..] else {
            panic!("one shadow, found {shadows:?}")
        };
        let begins = 0.75 * 2.0 / 0.45;
        assert!(
            (shadow.from - begins).abs() < 0.02 && shadow.to == f64::INFINITY,
            "{shadow:?}, wanted from {begins} m on"
        );
    }
    // Without the plate nothing is said of one.
    let (engine, results) = worked_out(&cells(""));
    let rail = Rail::of(&engine, &results, &line, Measure::Metric).expect("no fault");
    assert!(rail.screens.is_empty() && rail.shadows.is_empty());
}
