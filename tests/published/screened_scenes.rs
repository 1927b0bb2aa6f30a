//! Whole scenes with screens, vessels, bodies and tables entered as notebooks,
//! checked against a quadrature of this file, which shares no code with the
//! program, and against what must hold between their figures.

use std::f64::consts::{PI, TAU};

use farglow::notebook::Notebook;
use farglow::notebook::cell::{Content, Field};
use farglow::notebook::engine::Engine;
use farglow::notebook::results::{CellResult, Results, Shown, State};
use farglow::notebook::snapshot::Snapshot;
use farglow::store::{schema, template};
use glam::DVec3;

/// CODATA 2018, exact to the digits given.
const SIGMA: f64 = 5.670_374_419e-8;

fn read(cells: &str) -> Notebook {
    let text = format!("{{\"farglow\": 1, \"cells\": [{cells}]}}");
    let stored = schema::read(text.as_bytes()).unwrap_or_else(|error| panic!("{error}"));
    stored.notebook
}

fn nominal(notebook: Notebook) -> Results {
    let engine = Engine::open(notebook).expect("sound names");
    Snapshot::of(&engine).nominal()
}

fn results(cells: &str) -> Results {
    let results = nominal(read(cells));
    for cell in &results.cells {
        assert_eq!(cell.state, State::Ok, "{}: {:?}", cell.name, cell.errors);
    }
    results
}

fn cell<'a>(results: &'a Results, name: &str) -> &'a CellResult {
    results
        .cell(name)
        .unwrap_or_else(|| panic!("no cell {name}"))
}

fn si(results: &Results, name: &str, output: &str) -> f64 {
    let (output, part) = match output.split_once('.') {
        Some((output, part)) => (output, Some(part)),
        None => (output, None),
    };
    cell(results, name)
        .figures
        .iter()
        .find(|figure| figure.name == output && figure.part.as_deref() == part)
        .and_then(|figure| figure.shown.quantity())
        .unwrap_or_else(|| panic!("no {output} of {name}"))
        .si
}

fn word(results: &Results, name: &str, output: &str) -> String {
    match cell(results, name).shown(output) {
        Some(Shown::Word(word)) => word.clone(),
        other => panic!("no word: {other:?}"),
    }
}

fn cautions<'a>(results: &'a Results, name: &str) -> Vec<&'a str> {
    let cell = cell(results, name);
    cell.cautions
        .iter()
        .map(|caution| caution.code.as_str())
        .collect()
}

fn near(what: &str, found: f64, expected: f64, relative: f64) {
    assert!(
        (found / expected - 1.0).abs() <= relative,
        "{what}: found {found}, expected {expected} to {relative}"
    );
}

/// The irradiance at a point on a plane of a normal from small pieces of
/// surface, each at a place, with a normal and an area; what `sees` denies does
/// not count.
fn summed(
    point: DVec3,
    normal: DVec3,
    pieces: impl Iterator<Item = (DVec3, DVec3, f64)>,
    sees: impl Fn(DVec3) -> bool,
) -> f64 {
    pieces
        .map(|(place, outward, area)| {
            let way = place - point;
            let square = way.length_squared();
            let (in_cos, out_cos) = (way.dot(normal), -way.dot(outward));
            if in_cos <= 0.0 || out_cos <= 0.0 || !sees(place) {
                return 0.0;
            }
            in_cos * out_cos * area / (PI * square * square)
        })
        .sum()
}

fn middles(count: u32, from: f64, to: f64) -> impl Iterator<Item = f64> + Clone {
    (0..count).map(move |at| from + (to - from) * (f64::from(at) + 0.5) / f64::from(count))
}

/// Source: quadrature of this file over 2 million pieces, each looked at past the rim and past the plate.
#[test]
fn the_ladle_behind_the_half_screen_gives_what_counting_pieces_gives() {
    let text = template::find("ladle-screen").expect("it is shipped").text;
    let mut notebook = schema::read(text.as_bytes()).expect("sound").notebook;
    let at = notebook.find("watcher").expect("it is there");
    notebook.cells[at]
        .fields
        .push(Field::new("faces", Content::Text("ladle".into())));
    let results = nominal(notebook);
    // The scene of the template, in its own numbers.
    let (radius, level, rim) = (0.55, 1.15, 1.35);
    let (plate_y, half_width, top) = (1.2, 0.8, 1.6);
    let eye = DVec3::new(0.0, 4.0, 2.8);
    let facing = (DVec3::new(0.0, 0.0, level) - eye).normalize();
    let sees = |place: DVec3| {
        let at = |share: f64| eye + (place - eye) * share;
        let through = at((rim - eye.z) / (place.z - eye.z));
        let across = at((plate_y - eye.y) / (place.y - eye.y));
        let hidden = across.x.abs() <= half_width && (0.0..=top).contains(&across.z);
        through.truncate().length() <= radius && !hidden
    };
    let (rings, steps, rows) = (1000, 2000, 200);
    let turned = |angle: f64| DVec3::new(angle.cos(), angle.sin(), 0.0);
    let piece = TAU / f64::from(steps);
    let metal = middles(rings, 0.0, radius).flat_map(|r| {
        middles(steps, 0.0, TAU).map(move |angle| {
            let area = r * piece * radius / f64::from(rings);
            (turned(angle) * r + DVec3::Z * level, DVec3::Z, area)
        })
    });
    let wall = middles(rows, level, rim).flat_map(|z| {
        middles(steps, 0.0, TAU).map(move |angle| {
            let out = turned(angle);
            let area = radius * piece * (rim - level) / f64::from(rows);
            (out * radius + DVec3::Z * z, -out, area)
        })
    });
    let (metal, wall) = (
        summed(eye, facing, metal, sees),
        summed(eye, facing, wall, sees),
    );
    assert!(metal > 1e-3 && wall > 1e-3, "both are seen: {metal} {wall}");
    let black = SIGMA * 1693.15_f64.powi(4);
    near(
        "configuration factor",
        si(&results, "watcher", "view_factor.ladle"),
        metal + wall,
        1e-4,
    );
    near(
        "irradiance from the ladle",
        si(&results, "watcher", "irradiance_from.ladle"),
        black * (0.29 * metal + 0.9 * wall),
        1e-4,
    );
    let all: f64 = ["ladle", "plate"]
        .iter()
        .map(|name| si(&results, "watcher", &format!("irradiance_from.{name}")))
        .sum();
    near(
        "all parts",
        all,
        si(&results, "watcher", "irradiance"),
        1e-12,
    );
}

/// Source: quadrature of this file over the melt, the inner wall and the strip of the plate above the rim.
#[test]
fn a_plate_whose_upper_edge_alone_is_in_the_heat_takes_it_up() {
    let text = template::find("ladle-screen").expect("it is shipped").text;
    let results = nominal(schema::read(text.as_bytes()).expect("sound").notebook);
    let (radius, level, rim, top) = (0.55, 1.15, 1.35, 1.6);
    let black = SIGMA * 1693.15_f64.powi(4);
    let turned = |angle: f64| DVec3::new(angle.cos(), angle.sin(), 0.0);
    let mut mean = 0.0;
    for z in middles(20, rim, top) {
        for x in middles(12, -0.8, 0.8) {
            let place = DVec3::new(x, 1.2, z);
            let sees = |hot: DVec3| {
                let through = place + (hot - place) * ((rim - z) / (hot.z - z));
                through.truncate().length() <= radius
            };
            let metal = middles(60, 0.0, radius).flat_map(|r| {
                middles(90, 0.0, TAU).map(move |angle| {
                    let area = r * (TAU / 90.0) * radius / 60.0;
                    (turned(angle) * r + DVec3::Z * level, DVec3::Z, area)
                })
            });
            let wall = middles(16, level, rim).flat_map(|height| {
                middles(90, 0.0, TAU).map(move |angle| {
                    let out = turned(angle);
                    let area = radius * (TAU / 90.0) * (rim - level) / 16.0;
                    (out * radius + DVec3::Z * height, -out, area)
                })
            });
            mean += black
                * (0.29 * summed(place, DVec3::NEG_Y, metal, sees)
                    + 0.9 * summed(place, DVec3::NEG_Y, wall, sees))
                / 240.0;
        }
    }
    let expected = 0.9 * mean * (top - rim) / 1.6;
    // Seven rows of pieces, the uppermost looked at from its middle: it takes up
    // a little more than it should, which errs to the safe side.
    let share = si(&results, "plate", "absorbed") / expected;
    assert!((1.0..1.15).contains(&share), "{share} of {expected}");
}

/// Source: quadrature of this file over the door and over the plate.
#[test]
fn a_plate_absorbs_what_falls_on_it_and_gives_it_off_again() {
    let results = results(
        r#"{"kind": "surroundings", "name": "bay", "air_temperature": "300 K"},
           {"kind": "source", "name": "door", "form": "opening", "outline": "rectangle",
            "width": "0.9 m", "height": "0.7 m", "temperature": "1500 K", "emissivity": "0.8", "z": "1.2 m"},
           {"kind": "screen", "name": "plate", "make": "solid", "width": "1.2 m", "height": "1 m",
            "front_emissivity": "0.7", "back_emissivity": "0.3", "front_absorptance": "0.75",
            "back_absorptance": "0.6", "y": "1.5 m", "z": "1 m", "heading": "180 °"}"#,
    );
    let door = || {
        middles(30, -0.45, 0.45).flat_map(|x| {
            middles(30, 0.85, 1.55).map(move |z| (DVec3::new(x, 0.0, z), DVec3::Y, 0.63 / 900.0))
        })
    };
    let mut falls = 0.0;
    for x in middles(30, -0.6, 0.6) {
        for z in middles(30, 0.5, 1.5) {
            let place = DVec3::new(x, 1.5, z);
            falls += summed(place, DVec3::NEG_Y, door(), |_| true) / 900.0;
        }
    }
    let expected = 0.75 * 0.8 * SIGMA * 1500.0_f64.powi(4) * falls;
    let absorbed = si(&results, "plate", "absorbed");
    // It is cut into at most 7 by 7 pieces, each looked at from its middle.
    near("absorbed", absorbed, expected, 5e-3);
    near(
        "in all",
        si(&results, "plate", "absorbed_power"),
        absorbed * 1.2,
        1e-12,
    );
    // From the room: both faces see it but for the door.
    let room = (0.7 * (1.0 - falls) + 0.3) * SIGMA * 300.0_f64.powi(4);
    let given = si(&results, "plate", "front_exitance")
        + si(&results, "plate", "back_exitance")
        + si(&results, "plate", "convected");
    near("balance", given, absorbed + room, 1e-3);
    let (mean, hottest) = (
        si(&results, "plate", "temperature"),
        si(&results, "plate", "hottest_temperature"),
    );
    assert!(300.0 < mean && mean < hottest, "{mean} {hottest}");
}

/// A door, a position, and perhaps something between them.
fn door(between: &str) -> Results {
    results(&format!(
        r#"{{"kind": "source", "name": "door", "form": "opening", "outline": "disc", "diameter": "1 m",
            "temperature": "1500 K", "emissivity": "0.9", "z": "1.6 m"}},
           {{"kind": "position", "name": "eye", "from": "door", "distance": "3 m", "faces": "door",
             "reach": "0 m", "stay": "5 s"}},
           {{"kind": "assessment", "name": "judged", "position": "eye", "guidance": "icnirp-2013-ir-eye"}}{between}"#
    ))
}

fn screen(fields: &str) -> Results {
    door(&format!(
        r#", {{"kind": "screen", "name": "net", "width": "4 m", "height": "3 m", "y": "1.5 m",
               "z": "1.5 m", "heading": "180 °", {fields}}}"#
    ))
}

/// Source: what the words of the fields mean.
#[test]
fn screens_let_through_what_they_say_and_radiate_by_themselves() {
    let open = door("");
    let from = |results: &Results| si(results, "eye", "irradiance_from.door");
    let bare = from(&open);
    near("bare", si(&open, "eye", "irradiance"), bare, 1e-12);
    let mesh = screen(r#""make": "mesh", "open_fraction": "0.4""#);
    near("mesh", from(&mesh), 0.4 * bare, 1e-9);
    let own = si(&mesh, "eye", "irradiance_from.net");
    assert!(own > 100.0 && own < bare, "{own} {bare}");
    let filter = screen(
        r#""make": "filter", "transmittance": "0.3", "near_ir_transmittance": "0.1",
           "visible_transmittance": "0.5""#,
    );
    near("filter", from(&filter), 0.3 * bare, 1e-9);
    let near_infrared = |results: &Results| si(results, "eye", "near_ir_irradiance");
    // The warm glass adds a little of its own.
    let passed = near_infrared(&filter) / near_infrared(&open);
    assert!((0.1..0.12).contains(&passed), "{passed}");
    // A part of the band may pass better than its mean: never more than all.
    near(
        "IR-A through the filter",
        si(&filter, "eye", "ir_a_radiance"),
        si(&open, "eye", "ir_a_radiance").min(0.1 * si(&open, "door", "near_ir_exitance") / PI),
        1e-9,
    );
    near(
        "blue light through the filter",
        si(&filter, "eye", "blue_light_radiance"),
        0.5 * si(&open, "eye", "blue_light_radiance"),
        1e-9,
    );
    let plate = screen(r#""make": "solid""#);
    assert_eq!(from(&plate), 0.0);
    assert_eq!(si(&plate, "eye", "view_factor.door"), 0.0);
    assert!(si(&plate, "eye", "irradiance") > 100.0);
    assert!(si(&plate, "eye", "blue_light_radiance") < 1e-9);
}

/// Source: a plane mirror, by the model's own rule.
#[test]
fn nothing_reads_within_where_a_polished_plate_mirrors_the_source() {
    let beside = |emissivity: &str, absorptance: &str| {
        door(&format!(
            r#", {{"kind": "screen", "name": "sheet", "make": "solid", "width": "2 m", "height": "3 m",
                  "front_emissivity": "{emissivity}", "back_emissivity": "{emissivity}",
                  "front_absorptance": "{absorptance}", "back_absorptance": "{absorptance}",
                  "x": "2 m", "y": "1.5 m", "z": "1.5 m", "heading": "270 °"}},
                {{"kind": "position", "name": "far", "from": "door", "distance": "60 m", "stay": "10 s"}},
                {{"kind": "assessment", "name": "far_judged", "position": "far", "guidance": "icnirp-2013-ir-eye"}}"#
        ))
    };
    let dull = beside("0.9", "0.9");
    assert!(!cautions(&dull, "eye").contains(&"mirrored"));
    let bright = beside("0.1", "0.6");
    assert!(
        cautions(&bright, "eye").contains(&"mirrored"),
        "{:?}",
        cautions(&bright, "eye")
    );
    assert!(cautions(&bright, "sheet").contains(&"polished"));
    let row = |results: &Results| match cell(results, "judged").in_row(0, "finding") {
        Some(Shown::Word(word)) => word.clone(),
        other => panic!("no finding: {other:?}"),
    };
    assert_eq!(row(&dull), "within");
    assert_eq!(row(&bright), "not assessed");
    assert_eq!(word(&bright, "judged", "finding"), "not assessed");
}

/// Source: closed forms of the shapes; the quadrature of this file for the cylinder.
#[test]
fn bodies_and_polygons_are_seen_by_their_outlines() {
    let body = |fields: &str| {
        results(&format!(
            r#"{{"kind": "source", "name": "hot", {fields}, "temperature": "1000 K", "emissivity": "1", "z": "1 m"}},
               {{"kind": "position", "name": "eye", "x": "0 m", "y": "4 m", "z": "1 m", "faces": "180 °",
                 "reach": "0 m"}}"#
        ))
    };
    let factor = |results: &Results| si(results, "eye", "view_factor.hot");
    let plate = body(
        r#""form": "body", "outline": "plate", "width": "1 m", "height": "2 m", "heading": "180 °""#,
    );
    let same = body(
        r#""form": "opening", "outline": "polygon", "vertices": [["-0.5 m", "-1 m"], ["0.5 m", "-1 m"],
           ["0.5 m", "1 m"], ["-0.5 m", "1 m"]]"#,
    );
    near("plate from behind", factor(&plate), factor(&same), 1e-12);
    // A hollow square of two nested outlines, cut open: what its pieces give.
    let notch = body(
        r#""form": "opening", "outline": "polygon", "vertices": [["-0.5 m", "-1 m"], ["0.5 m", "-1 m"],
           ["0.5 m", "1 m"], ["0 m", "0 m"], ["-0.5 m", "1 m"]]"#,
    );
    let tooth = body(
        r#""form": "opening", "outline": "polygon", "vertices": [["0.5 m", "1 m"], ["0 m", "0 m"],
           ["-0.5 m", "1 m"]]"#,
    );
    near(
        "notched",
        factor(&notch) + factor(&tooth),
        factor(&same),
        1e-12,
    );
    let cylinder = body(
        r#""form": "body", "outline": "cylinder", "diameter": "0.8 m", "height": "2 m", "stance": "lying",
           "heading": "90 °""#,
    );
    let (eye, facing) = (DVec3::new(0.0, 4.0, 1.0), DVec3::NEG_Y);
    let (along, around) = (400, 800);
    let side = middles(along, -1.0, 1.0).flat_map(|x| {
        middles(around, 0.0, TAU).map(move |angle| {
            let out = DVec3::new(0.0, angle.cos(), angle.sin());
            let area = 0.4 * TAU * 2.0 / f64::from(along * around);
            (out * 0.4 + DVec3::new(x, 0.0, 1.0), out, area)
        })
    });
    near(
        "cylinder",
        factor(&cylinder),
        summed(eye, facing, side, |_| true),
        2e-5,
    );
    near(
        "its area",
        si(&cylinder, "hot", "area"),
        TAU * 0.4 * 2.4,
        1e-12,
    );
}

/// Source: `thick_opening.json`, computed there by independent quadrature: round hole, depth half its diameter, re-radiating walls, 0.67198.
#[test]
fn a_hole_through_a_wall_gives_its_chart_factor_and_more_on_its_axis() {
    let hole = |thickness: &str, wall: &str| {
        results(&format!(
            r#"{{"kind": "source", "name": "hole", "form": "opening", "outline": "disc", "diameter": "1 m",
                "wall_thickness": "{thickness}", "wall": "{wall}", "temperature": "1500 K", "emissivity": "1", "z": "1.6 m"}},
               {{"kind": "position", "name": "eye", "from": "hole", "distance": "10 m", "reach": "0 m"}}"#
        ))
    };
    let thin = hole("0 m", "reradiating");
    near(
        "thin",
        si(&thin, "hole", "effective_emissivity"),
        1.0,
        1e-12,
    );
    let thick = hole("0.5 m", "reradiating");
    near(
        "chart factor",
        si(&thick, "hole", "effective_emissivity"),
        0.671_98,
        2e-5,
    );
    let share =
        |results: &Results| si(results, "eye", "irradiance") / si(&thin, "eye", "irradiance");
    let (reradiating, cold) = (share(&thick), share(&hole("0.5 m", "cold")));
    assert!(
        0.9 < cold && cold < reradiating && reradiating < 1.0,
        "on the axis: cold {cold}, re-radiating {reradiating}"
    );
    assert!(cautions(&thick, "hole").contains(&"wall-in-balance"));
}

/// Source: a table of one value is a grey surface; Planck's law gives the rest.
#[test]
fn a_table_of_emissivities_stands_for_both_numbers() {
    let with = |surface: &str| {
        results(&format!(
            r#"{{"kind": "source", "name": "melt", "form": "pool", "outline": "disc", "diameter": "1 m",
                "temperature": "1700 K", "z": "1 m", {surface}}}"#
        ))
    };
    let grey = with(r#""emissivity": "0.3", "near_ir_emissivity": "0.3""#);
    let flat = with(r#""spectrum": [["0.5 µm", "0.3"], ["20 µm", "0.3"]]"#);
    for output in ["exitance", "near_ir_exitance"] {
        near(
            output,
            si(&flat, "melt", output),
            si(&grey, "melt", output),
            1e-12,
        );
    }
    let metal = with(r#""spectrum": "1 µm, 0.4; 3 µm, 0.25; 10 µm, 0.12""#);
    let share = |results: &Results| {
        si(results, "melt", "near_ir_exitance") / si(results, "melt", "exitance")
    };
    assert!(
        share(&metal) > share(&grey),
        "{} {}",
        share(&metal),
        share(&grey)
    );
    assert!(!cautions(&metal, "melt").contains(&"near-infrared-assumed"));
}

/// Source: E, F and the definitions of DESIGN; ISO 7726 for a small sphere.
#[test]
fn net_heat_and_radiant_temperature_follow_from_the_irradiance() {
    let results = results(
        r#"{"kind": "surroundings", "name": "bay", "air_temperature": "295 K", "radiant_temperature": "310 K"},
           {"kind": "source", "name": "ball", "form": "body", "outline": "sphere", "diameter": "0.5 m",
            "temperature": "1200 K", "emissivity": "0.8", "z": "1.6 m"},
           {"kind": "position", "name": "eye", "from": "ball", "distance": "3 m", "reach": "0 m",
            "surface_temperature": "306 K", "surface_emissivity": "0.95"}"#,
    );
    let black = |kelvin: f64| SIGMA * kelvin.powi(4);
    let factor = (0.25_f64 / 3.0).powi(2);
    let hot = 0.8 * black(1200.0) * factor;
    near("irradiance", si(&results, "eye", "irradiance"), hot, 1e-9);
    let room = black(310.0) * (1.0 - factor);
    near(
        "net heat",
        si(&results, "eye", "net_radiant_heat"),
        0.95 * (hot + room - black(306.0)),
        1e-9,
    );
    // The share of all directions that the ball fills.
    let share = 0.5 * (1.0 - (1.0 - factor).sqrt());
    let mean = 0.8 * black(1200.0) * share + black(310.0) * (1.0 - share);
    near(
        "mean radiant temperature",
        si(&results, "eye", "mean_radiant_temperature"),
        (mean / SIGMA).powf(0.25),
        1e-6,
    );
    near(
        "angular subtense",
        si(&results, "eye", "angular_subtense.ball"),
        2.0 * (0.25_f64 / 3.0).asin(),
        1e-9,
    );
}

/// Source: the power law, from memory: τ = 2.02 (p x)^−0.09; Buck (1996) for the vapour.
#[test]
fn shop_air_takes_from_the_total_alone_and_only_where_its_formula_holds() {
    let at = |distance: &str, absorption: &str| {
        results(&format!(
            r#"{{"kind": "surroundings", "name": "bay", "air_temperature": "20 °C", "humidity": "50 %",
                "absorption": "{absorption}"}},
               {{"kind": "source", "name": "door", "form": "opening", "outline": "disc", "diameter": "0.2 m",
                "temperature": "1500 K", "emissivity": "1", "z": "1.6 m"}},
               {{"kind": "position", "name": "eye", "from": "door", "distance": "{distance}", "reach": "0 m"}}"#
        ))
    };
    let shares = |distance: &str, formula: &str| {
        let (off, on) = (at(distance, "off"), at(distance, formula));
        ["irradiance", "near_ir_irradiance", "skin_irradiance"]
            .map(|output| si(&on, "eye", output) / si(&off, "eye", output))
    };
    // 1169 Pa over 19.9 m: the way is taken to the nearest place of the door.
    let [total, near_infrared, skin] = shares("20 m", "power_law");
    near(
        "power law",
        total,
        2.02 * (1169.0 * 19.9_f64).powf(-0.09),
        2e-4,
    );
    assert_eq!((near_infrared, skin), (1.0, 1.0));
    assert_eq!(shares("3 m", "power_law"), [1.0; 3]);
    assert!(cautions(&at("3 m", "power_law"), "eye").contains(&"air-range"));
    assert!(cautions(&at("20 m", "power_law"), "bay").contains(&"air-absorbs"));
    let [total, ..] = shares("20 m", "wayne");
    assert!((0.7..0.95).contains(&total), "{total}");
}
