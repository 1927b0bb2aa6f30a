//! Two whole scenes entered as notebooks, checked through the engine: the
//! ladle of TROS IOS part 2, annex 1 (the scene is read there, its numbers are
//! derived, see `ladle_case`), and a furnace door against a quadrature of this
//! file, which shares no code with the program.

use std::f64::consts::PI;

use farglow::notebook::cell::zone::Extent;
use farglow::notebook::engine::Engine;
use farglow::notebook::results::{CellResult, Results, Shown};
use farglow::notebook::snapshot::Snapshot;
use farglow::notebook::uncertainty::Settings;
use farglow::store::schema;
use glam::DVec3;

fn results(cells: &str, draws: u32) -> Results {
    let text = format!("{{\"farglow\": 1, \"cells\": [{cells}]}}");
    let stored = schema::read(text.as_bytes()).unwrap_or_else(|error| panic!("{error}"));
    let engine = Engine::open(stored.notebook).expect("sound names");
    let snapshot = Snapshot::of(&engine);
    let results = if draws == 0 {
        snapshot.nominal()
    } else {
        let settings = Settings { seed: 1, draws };
        snapshot
            .results(settings, &mut |_| true)
            .expect("nobody tells it to stop")
    };
    for cell in &results.cells {
        assert!(cell.errors.is_empty(), "{}: {:?}", cell.name, cell.errors);
    }
    results
}

fn cell<'a>(results: &'a Results, name: &str) -> &'a CellResult {
    results
        .cell(name)
        .unwrap_or_else(|| panic!("no cell {name}"))
}

fn si(shown: Option<&Shown>) -> f64 {
    shown
        .and_then(Shown::quantity)
        .map_or_else(|| panic!("no quantity: {shown:?}"), |quantity| quantity.si)
}

fn near(what: &str, found: f64, expected: f64, relative: f64) {
    assert!(
        (found / expected - 1.0).abs() <= relative,
        "{what}: found {found}, expected {expected} to {relative}"
    );
}

/// Source: `tros_ladle_numbers`, derived by an independent Planck integration, 0.5 %: near infrared 6660 W/m², row m's limit 834.9 W/m² at 60 s, passed 8-fold.
#[test]
fn the_ladle_as_a_notebook_gives_the_published_scene_its_numbers() {
    let results = results(
        r#"{"kind": "source", "name": "ladle", "form": "pool", "outline": "disc", "diameter": "0.85 m",
            "temperature": "1480 °C", "emissivity": "1", "z": "1 m"},
           {"kind": "position", "name": "eye", "from": "ladle", "distance": "2.6 m / sqrt(2)",
            "z": "1 m + 2.6 m / sqrt(2)", "faces": "ladle", "reach": "0 m", "stay": "60 s"},
           {"kind": "assessment", "name": "judged", "position": "eye", "guidance": "eu-2006-25-m"}"#,
        0,
    );
    let eye = cell(&results, "eye");
    near(
        "near infrared irradiance",
        si(eye.shown("near_ir_irradiance")),
        6660.0,
        0.005,
    );
    near(
        "blue light radiance",
        si(eye.shown("blue_light_radiance")),
        6.58,
        0.005,
    );
    near(
        "retinal radiance",
        si(eye.shown("retinal_radiance_2006")),
        4565.0,
        0.005,
    );
    // Reaching nowhere, the worst point is the stated one.
    near(
        "worst within reach",
        si(eye.shown("envelope_near_ir_irradiance")),
        si(eye.shown("near_ir_irradiance")),
        1e-12,
    );
    let judged = cell(&results, "judged");
    near(
        "limit of row m",
        si(judged.in_row(0, "limit")),
        834.9,
        0.0005,
    );
    let ratio = si(judged.in_row(0, "ratio"));
    near("exposure over limit", ratio, 6660.0 / 834.9, 0.005);
    assert!((7.5..8.5).contains(&ratio), "about 8-fold, found {ratio}");
    assert_eq!(
        judged.in_row(0, "finding").and_then(Shown::word),
        Some("over")
    );
}

/// Places and weights of the Gauss rule of `count` points on -1..1, by Newton's
/// method on the Legendre polynomial.
fn gauss(count: u32) -> Vec<(f64, f64)> {
    (1..=count)
        .map(|index| {
            let n = f64::from(count);
            let mut x = (PI * (f64::from(index) - 0.25) / (n + 0.5)).cos();
            let mut slope = 1.0;
            for _ in 0..50 {
                let (mut before, mut value) = (1.0, x);
                for degree in 2..=count {
                    let k = f64::from(degree);
                    let next = ((2.0 * k - 1.0) * x * value - (k - 1.0) * before) / k;
                    (before, value) = (value, next);
                }
                slope = n * (x * value - before) / (x * x - 1.0);
                x -= value / slope;
            }
            (x, 2.0 / ((1.0 - x * x) * slope * slope))
        })
        .collect()
}

const WIDTH: f64 = 0.90;
const HEIGHT: f64 = 0.70;
const CENTRE: f64 = 1.20;
const TEMPERATURE: f64 = 1523.15;
const EMISSIVITY: f64 = 0.95;
/// Source: CODATA 2018, exact by the definitions of the SI (2019).
const STEFAN_BOLTZMANN: f64 = 5.670_374_419e-8;

/// The greatest configuration factor at a point before the door, which faces
/// north: the length of ∫ r̂ cos θ′ / (π r²) dA, all of it above the horizon of
/// the receiver that faces along it.
fn factor(point: DVec3) -> f64 {
    let rule = gauss(48);
    let mut sum = DVec3::ZERO;
    for (u, share) in &rule {
        for (v, other) in &rule {
            let spot = DVec3::new(u * WIDTH / 2.0, 0.0, CENTRE + v * HEIGHT / 2.0);
            let way = spot - point;
            let squared = way.length_squared();
            let cosine = point.y / squared.sqrt();
            sum += way / squared.sqrt() * (cosine / (PI * squared) * share * other);
        }
    }
    (sum * (WIDTH * HEIGHT / 4.0)).length()
}

/// Planck's law over a band in m, Gauss in 64 strips, times the emissivity.
fn band(from: f64, to: f64) -> f64 {
    // Source: CODATA 2018, exact: 2πhc² and hc/k.
    const FIRST: f64 = 3.741_771_852_192_757e-16;
    const SECOND: f64 = 1.438_776_877_503_933e-2;
    let rule = gauss(24);
    let strip = (to - from) / 64.0;
    let mut sum = 0.0;
    for number in 0..64 {
        let middle = from + strip * (f64::from(number) + 0.5);
        for (x, share) in &rule {
            let wavelength = middle + x * strip / 2.0;
            let power = (SECOND / (wavelength * TEMPERATURE)).exp_m1();
            sum += share * FIRST / (wavelength.powi(5) * power);
        }
    }
    EMISSIVITY * sum * strip / 2.0
}

const DOOR: &str = r#"
    {"kind": "value", "name": "t_hearth", "entry": "1250 ± 25 °C"},
    {"kind": "source", "name": "door", "form": "opening", "outline": "rectangle", "width": "0.90 m",
     "height": "0.70 m", "temperature": "t_hearth", "emissivity": "0.95 ± 0.03", "z": "1.20 m"}"#;

/// Source: own Gauss quadrature here, 1e-9 relative; σ of CODATA 2018.
#[test]
fn the_charger_before_the_door_meets_what_a_quadrature_says() {
    let results = results(
        &format!(
            r#"{DOOR},
            {{"kind": "position", "name": "charger", "from": "door", "distance": "2.5 m", "z": "1.60 m"}},
            {{"kind": "position", "name": "aside", "from": "door", "distance": "3 m", "bearing": "35 °"}}"#
        ),
        0,
    );
    let total = EMISSIVITY * STEFAN_BOLTZMANN * TEMPERATURE.powi(4);
    near(
        "exitance",
        si(cell(&results, "door").shown("exitance")),
        total,
        1e-9,
    );
    let near_infrared = band(780e-9, 3000e-9);
    let skin = band(380e-9, 3000e-9);
    let angle = 35_f64.to_radians();
    for (name, eye) in [
        ("charger", DVec3::new(0.0, 2.5, 1.6)),
        (
            "aside",
            DVec3::new(3.0 * angle.sin(), 3.0 * angle.cos(), 1.6),
        ),
    ] {
        let position = cell(&results, name);
        let part = factor(eye);
        for (output, exitance) in [
            ("irradiance", total),
            ("near_ir_irradiance", near_infrared),
            ("skin_irradiance", skin),
        ] {
            near(
                &format!("{name}.{output}"),
                si(position.shown(output)),
                exitance * part,
                1e-9,
            );
        }
        let worst = around(eye, 0.3).map(factor).fold(0.0, f64::max);
        near(
            &format!("{name}, worst at the eye"),
            si(position.shown("envelope_near_ir_irradiance")),
            near_infrared * worst,
            1e-9,
        );
    }
}

/// The seven points that an eye may be at.
fn around(eye: DVec3, reach: f64) -> impl Iterator<Item = DVec3> {
    let ways = [
        DVec3::ZERO,
        DVec3::X,
        -DVec3::X,
        DVec3::Y,
        -DVec3::Y,
        DVec3::Z,
        -DVec3::Z,
    ];
    ways.into_iter().map(move |way| eye + way * reach)
}

/// Source: own bisection here with the quadrature above over the seven points, 1 mm; limits of row m and n by their formulas, 18000 t^-0.75 and 100 W/m².
#[test]
fn a_zone_ends_where_a_bisection_says() {
    let results = results(
        &format!(
            r#"{DOOR},
            {{"kind": "zone", "name": "shift", "from": "door", "guidance": "icnirp-2013-ir-eye", "stay": "8 h"}},
            {{"kind": "zone", "name": "short", "from": "door", "guidance": "icnirp-2013-ir-eye", "stay": "4 min"}},
            {{"kind": "zone", "name": "bare", "from": "door", "guidance": "eu-2006-25-m", "stay": "1 min", "reach": "0 m"}}"#
        ),
        0,
    );
    let near_infrared = band(780e-9, 3000e-9);
    for (name, limit, reach) in [
        ("shift", 100.0, 0.3),
        ("short", 18_000.0 * 240_f64.powf(-0.75), 0.3),
        ("bare", 18_000.0 * 60_f64.powf(-0.75), 0.0),
    ] {
        let over = |distance: f64| {
            around(DVec3::new(0.0, distance, 1.6), reach)
                .map(|point| near_infrared * factor(point))
                .fold(0.0, f64::max)
                > limit
        };
        let (mut inside, mut outside) = (0.5, 200.0);
        while outside - inside > 1e-6 {
            let middle = 0.5 * (inside + outside);
            if over(middle) {
                inside = middle;
            } else {
                outside = middle;
            }
        }
        let found = match cell(&results, name).shown("distance") {
            Some(Shown::Extent {
                extent: Extent::At(distance),
                ..
            }) => *distance,
            other => panic!("{name}: {other:?}"),
        };
        assert!(
            (found - outside).abs() <= 1e-3,
            "{name}: found {found} m, expected {outside} m"
        );
        assert!(!over(found), "{name}: over at its own edge {found} m");
    }
}

/// The share of a standard normal below `score`.
fn below(score: f64) -> f64 {
    let half: f64 = gauss(48)
        .iter()
        .map(|(x, share)| {
            let z = score * (x + 1.0) / 2.0;
            share * (-z * z / 2.0).exp()
        })
        .sum();
    0.5 + half * score / 2.0 / (2.0 * PI).sqrt()
}

/// Narrows down where a growing function reaches `wanted`.
fn solve(mut low: f64, mut high: f64, wanted: f64, value: impl Fn(f64) -> f64) -> f64 {
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if value(middle) < wanted {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}

/// Source: exact quantiles of the product by quadrature here; the first-order figure of JCGM 100:2008, 5.1.2, with a coverage factor of 1.96; sampling accuracy is three standard errors of an order statistic.
#[test]
fn the_bounds_of_the_exitance_are_those_of_the_product() {
    const DRAWS: u32 = 10_000;
    let results = results(DOOR, DRAWS);
    let bounds = |name: &str, output: &str| match cell(&results, name).shown(output) {
        Some(Shown::Quantity {
            low: Some(low),
            high: Some(high),
            ..
        }) => (*low, *high),
        other => panic!("{name}.{output}: {other:?}"),
    };
    // ± is twice the standard deviation.
    let (spread_t, spread_e) = (12.5, 0.015);
    // One input alone: every stratum of the draws holds one, so that the rank
    // lies within one stratum of the quantile.
    let (low, high) = bounds("t_hearth", "value");
    let stratum = 1.0 / f64::from(DRAWS);
    for (found, share) in [(low, 0.025), (high, 0.975)] {
        let at = |share| TEMPERATURE + spread_t * solve(-6.0, 6.0, share, below);
        let (least, most) = (at(share - stratum), at(share + stratum));
        assert!(
            least <= found && found <= most,
            "temperature: found {found} K, expected {least} K to {most} K"
        );
    }
    // The product: the share of draws below an exitance, over all temperatures.
    let rule = gauss(48);
    let share_below = |exitance: f64| -> f64 {
        rule.iter()
            .map(|(x, share)| {
                let z = 8.0 * x;
                let temperature = TEMPERATURE + spread_t * z;
                let emissivity = exitance / (STEFAN_BOLTZMANN * temperature.powi(4));
                // No emissivity exceeds 1: what is drawn above counts as 1.
                let part = if emissivity >= 1.0 {
                    1.0
                } else {
                    below((emissivity - EMISSIVITY) / spread_e)
                };
                8.0 * share * (-z * z / 2.0).exp() / (2.0 * PI).sqrt() * part
            })
            .sum()
    };
    let nominal = EMISSIVITY * STEFAN_BOLTZMANN * TEMPERATURE.powi(4);
    let relative =
        ((4.0 * spread_t / TEMPERATURE).powi(2) + (spread_e / EMISSIVITY).powi(2)).sqrt();
    // The standard error of the share, over the density of the normal there.
    let error = (0.025 * 0.975 / f64::from(DRAWS)).sqrt() / 0.058_445 * relative;
    let (low, high) = bounds("door", "exitance");
    for (found, share, sign) in [(low, 0.025, -1.0), (high, 0.975, 1.0)] {
        let exact = solve(0.5 * nominal, 2.0 * nominal, share, share_below);
        near("bound of the exitance", found, exact, 3.0 * error);
        // First order leaves out the curvature of T⁴, a few thousandths here.
        near(
            "bound to first order",
            found,
            nominal * (1.0 + sign * 1.959_964 * relative),
            3.0 * error + 2.0 * relative * relative,
        );
    }
}
