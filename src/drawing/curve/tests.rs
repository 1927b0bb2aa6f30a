use glam::DVec2;

use super::*;
use crate::drawing::mark::Rectangle;
use crate::drawing::screen::HIDDEN;

fn number(value: f64) -> String {
    format!("{value}")
}

fn base() -> Curve {
    let rows: Vec<(f64, f64)> = (0..60)
        .map(|i| {
            let distance = 0.5 * 40_f64.powf(f64::from(i) / 59.0);
            (distance, 1.2e4 / (distance * distance + 0.3))
        })
        .collect();
    Curve {
        band: Band::NearInfrared,
        title: "door: near-infrared irradiance, straight out at 1.60 m".into(),
        x_label: "distance from the face of the door (m)".into(),
        y_label: "near-infrared irradiance (W/m²)".into(),
        x_unit: 1.0,
        y_unit: 1.0,
        upper: Some(rows.iter().map(|(d, v)| (*d, v * 1.1)).collect()),
        inverse_square: Some(InverseSquare {
            distance: rows[24].0,
            value: rows[24].1,
            from: "charger, 2.24 m".into(),
        }),
        rows,
        limits: vec![
            LimitLine {
                label: "eye, 4 min".into(),
                value: 295.0,
                crossing: Some(Crossing {
                    distance: 6.354,
                    text: "6.4 m".into(),
                }),
                upper_crossing: Some(Crossing {
                    distance: 6.67,
                    text: "6.7 m".into(),
                }),
            },
            LimitLine {
                label: "eye, all shift".into(),
                value: 100.0,
                crossing: Some(Crossing {
                    distance: 10.94,
                    text: "11.0 m".into(),
                }),
                upper_crossing: Some(Crossing {
                    distance: 11.48,
                    text: "11.5 m".into(),
                }),
            },
        ],
        positions: vec![
            Marker {
                cell: "charger".into(),
                label: "charger".into(),
                distance: 2.5,
                value: 1832.0,
                shape: Shape::Over,
            },
            Marker {
                cell: "crane_hand".into(),
                label: "crane hand".into(),
                distance: 8.2,
                value: 177.0,
                shape: Shape::NotAssessed,
            },
        ],
        screens: Vec::new(),
        shadows: Vec::new(),
        number,
    }
}

fn screened() -> Curve {
    let mut curve = base();
    curve.screens = vec![Screen {
        cell: "plate".into(),
        label: "plate · 208 °C".into(),
        distance: 1.4,
    }];
    curve.shadows = vec![Shadow {
        from: 1.4,
        to: 4.4,
        source: "door".into(),
    }];
    curve
}

fn crowded() -> Curve {
    let mut curve = base();
    curve.limits = (0..6)
        .map(|i| {
            let value = 290.0 + 3.0 * f64::from(i);
            let distance = (1.2e4 / value - 0.3).sqrt();
            LimitLine {
                label: format!("limit {i} of a site rule with a long name"),
                value,
                crossing: Some(Crossing {
                    distance,
                    text: format!("{distance:.1} m"),
                }),
                upper_crossing: Some(Crossing {
                    distance: distance * 1.02,
                    text: format!("{:.1} m", distance * 1.02),
                }),
            }
        })
        .collect();
    curve.positions = (0..12)
        .map(|i| Marker {
            cell: format!("position_{i}"),
            label: format!("position {i}"),
            distance: 6.0 + 0.05 * f64::from(i),
            value: 300.0,
            shape: [Shape::Over, Shape::Within, Shape::NotAssessed][i as usize % 3],
        })
        .collect();
    curve
}

fn with_zeros() -> Curve {
    let mut curve = base();
    for i in [0, 20, 21, 59] {
        curve.rows[i].1 = 0.0;
    }
    curve.rows[40].1 = f64::NAN;
    curve.rows[42].1 = f64::NAN;
    curve
}

fn single_decade() -> Curve {
    let mut curve = base();
    curve.rows = vec![(2.1, 3400.0), (3.0, 3100.0), (4.4, 2900.0)];
    curve.upper = None;
    curve.positions.truncate(1);
    curve.limits.truncate(1);
    curve
}

fn hostile() -> Curve {
    let mut curve = base();
    curve.rows = vec![
        (1e-300, 1e300),
        (1.0, 5.0),
        (1e300, 1e-300),
        (f64::INFINITY, -1.0),
    ];
    curve.y_unit = 0.0;
    curve.inverse_square = Some(InverseSquare {
        distance: 0.0,
        value: f64::NAN,
        from: "nowhere".into(),
    });
    curve.screens = [f64::NAN, -1.0, 1e301, 1.0]
        .map(|distance| Screen {
            cell: "plate".into(),
            label: "plate".repeat(40),
            distance,
        })
        .to_vec();
    curve.shadows = vec![Shadow {
        from: f64::NEG_INFINITY,
        to: f64::NAN,
        source: "s".repeat(300),
    }];
    curve.limits[0].value = -4.0;
    curve.limits[1].crossing = Some(Crossing {
        distance: f64::NAN,
        text: "?".into(),
    });
    curve.positions[0].distance = 0.0;
    curve.title = "t".repeat(400);
    curve
}

fn sets() -> [Curve; 6] {
    [
        base(),
        crowded(),
        with_zeros(),
        single_decade(),
        screened(),
        hostile(),
    ]
}

fn overlap(picture: &Picture) -> Option<(String, String)> {
    let texts = picture.texts();
    for (i, a) in texts.iter().enumerate() {
        for b in &texts[i + 1..] {
            // Ascents and descents of neighbouring lines may touch by a hair.
            if a.extent().grown(-0.3).meets(&b.extent().grown(-0.3)) {
                return Some((a.text.clone(), b.text.clone()));
            }
        }
    }
    None
}

#[test]
fn no_label_covers_another() {
    for (i, curve) in sets().iter().enumerate() {
        for (width, height) in [
            (493.0, 300.0),
            (360.0, 240.0),
            (240.0, 160.0),
            (900.0, 420.0),
        ] {
            let picture = picture(curve, width, height);
            assert_eq!(overlap(&picture), None, "set {i} at {width} × {height}");
        }
    }
}

#[test]
fn every_text_stays_on_the_sheet() {
    for (i, curve) in sets().iter().enumerate() {
        for (width, height) in [(493.0, 300.0), (240.0, 160.0)] {
            let picture = picture(curve, width, height);
            let sheet = Rectangle::new(0.0, 0.0, width, height).grown(0.5);
            for text in picture.texts() {
                assert!(
                    sheet.holds(&text.extent()),
                    "set {i}: {:?} at {:?}",
                    text.text,
                    text.extent()
                );
            }
        }
    }
}

#[test]
fn every_limit_and_position_is_named() {
    for curve in [base(), with_zeros(), single_decade()] {
        let picture = picture(&curve, 493.0, 300.0);
        let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
        let names = curve
            .limits
            .iter()
            .map(|l| &l.label)
            .chain(curve.positions.iter().map(|p| &p.label));
        for name in names {
            assert!(texts.contains(&name.as_str()), "{name} not in {texts:?}");
        }
    }
}

#[test]
fn a_gap_is_never_bridged() {
    let curve = Curve {
        upper: None,
        inverse_square: None,
        limits: Vec::new(),
        positions: Vec::new(),
        rows: vec![
            (1.0, 10.0),
            (2.0, 8.0),
            (3.0, 0.0),
            (4.0, 5.0),
            (5.0, 4.0),
            (6.0, -1.0),
            (7.0, 2.0),
        ],
        ..base()
    };
    let picture = picture(&curve, 400.0, 240.0);
    let clipped = picture.marks.iter().find_map(|mark| match mark {
        Mark::Clip { marks, .. } => Some(marks),
        _ => None,
    });
    let runs: Vec<usize> = clipped
        .expect("the curve is drawn in a clip")
        .iter()
        .filter_map(|mark| match mark {
            Mark::Line { points, .. } => Some(points.len()),
            _ => None,
        })
        .collect();
    assert_eq!(runs, vec![2, 2, 2], "points in each run of the curve");
}

#[test]
fn nothing_above_zero_is_said_in_words() {
    let curve = Curve {
        rows: vec![(1.0, 0.0), (2.0, f64::NAN)],
        upper: None,
        ..base()
    };
    let picture = picture(&curve, 400.0, 240.0);
    assert!(
        picture
            .texts()
            .iter()
            .any(|t| t.text.starts_with("nothing to draw"))
    );
}

#[test]
fn a_crossing_is_pinned_at_its_place() {
    let picture = picture(&base(), 493.0, 300.0);
    let pins: Vec<DVec2> = picture
        .marks
        .iter()
        .filter_map(|mark| match mark {
            Mark::Shape {
                shape: Shape::Pin,
                at,
                ..
            } => Some(*at),
            _ => None,
        })
        .collect();
    assert_eq!(pins.len(), 2);
    // 6.67 m and 11.48 m lie log(11.48/6.67) apart on an axis from 0.5 to 20 m.
    let frame = picture.marks.iter().find_map(|mark| match mark {
        Mark::Clip { window, .. } => Some(*window),
        _ => None,
    });
    let width = frame.expect("the plot has a frame").width();
    let expected = width * (11.48_f64 / 6.67).ln() / 40_f64.ln();
    let got = pins[1].x - pins[0].x;
    assert!((got - expected).abs() < 1e-9, "{got}, wanted {expected}");
}

#[test]
fn findings_and_lines_differ_without_colour() {
    let dashes = [
        plot::stroke::nominal(),
        plot::stroke::bound(),
        plot::stroke::comparison(),
        plot::stroke::limit(),
    ]
    .map(|s| s.dash);
    for (i, dash) in dashes.iter().enumerate() {
        assert!(!dashes[i + 1..].contains(dash), "{dash:?} is used twice");
    }
}

#[test]
fn a_limit_that_cannot_be_drawn_is_still_named() {
    for value in [-4.0, 0.0, f64::NAN, f64::INFINITY, 1e-9] {
        let mut curve = base();
        curve.limits[0].value = value;
        let picture = picture(&curve, 493.0, 300.0);
        let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
        assert!(texts.contains(&"eye, 4 min"), "{value}: {texts:?}");
        assert!(texts.contains(&"off this plot"), "{value}: {texts:?}");
    }
}

#[test]
fn a_screen_and_the_ground_behind_it_are_drawn_and_named() {
    let curve = screened();
    let picture = picture(&curve, 493.0, 300.0);
    let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
    for words in ["plate · 208 °C", "door hidden: less heat, not none"] {
        assert!(texts.contains(&words), "{words} not in {texts:?}");
    }
    let axes = Axes::of(&curve, 493.0, 300.0).expect("there is something to draw");
    let mut hatched = picture.marks.iter().filter_map(|mark| match mark {
        Mark::Area {
            outline,
            hatch: Some(hatch),
            ..
        } if *hatch == HIDDEN => Some((outline[0].x, outline[1].x)),
        _ => None,
    });
    // The sample of the legend comes first.
    let found = hatched.next_back().expect("the ground is hatched");
    let expected = [1.4, 4.4].map(|d| axes.place(d, 500.0).expect("it is on the plot").x);
    assert!(
        (found.0 - expected[0]).abs() < 1e-9 && (found.1 - expected[1]).abs() < 1e-9,
        "{found:?}, wanted {expected:?}"
    );
}

#[test]
fn the_comparison_says_where_it_begins_and_how_it_errs() {
    let picture = picture(&base(), 493.0, 300.0);
    let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
    let words = "inverse square from charger, 2.24 m: too high nearer in, too low farther out";
    assert!(texts.contains(&words), "{words} not in {texts:?}");
}

#[test]
fn feet_and_metres_stand_at_the_same_place() {
    let metric = base();
    let mut us = base();
    (us.x_unit, us.y_unit) = (0.3048, 3.154_591);
    for curve in [&metric, &us] {
        let axes = Axes::of(curve, 493.0, 300.0).expect("there is something to draw");
        let at = axes.place(2.5, 1832.0).expect("it is on the plot");
        let back = axes.distance(at.x).expect("it is on the plot");
        assert!((back - 2.5).abs() < 1e-9, "{back} m, wanted 2.5");
    }
    let picture = picture(&us, 493.0, 300.0);
    let texts: Vec<&str> = picture.texts().iter().map(|t| t.text.as_str()).collect();
    // 0.5 m to 20 m is 1.6 ft to 66 ft: the axis runs from 1 to 100.
    assert!(
        texts.contains(&"100") && !texts.contains(&"0.5"),
        "{texts:?}"
    );
}
