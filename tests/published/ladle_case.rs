//! A published ladle scene: TROS IOS part 2, annex 1, molten iron at 1480 °C in
//! a ladle mouth of 0.85 m, 2.6 m away, seen at 45°. The verdict is read there;
//! the numbers are derived: an independent Planck integration, SI constants of
//! 2019, emissivity 1, no pane, the eye aimed at the mouth's centre.

use std::f64::consts::PI;

use farglow::physics::region::Region;
use farglow::physics::surface::Emission;
use farglow::physics::{exposure, planck};
use glam::DVec3;

const TEMPERATURE: f64 = 1753.15;
const RADIUS: f64 = 0.425;
const DISTANCE: f64 = 2.6;

/// The eye off a mouth that looks straight up, at 45° to its normal.
fn eye() -> DVec3 {
    DVec3::new(1.0, 0.0, 1.0).normalize() * DISTANCE
}

fn near(name: &str, found: f64, expected: f64, relative: f64) {
    assert!(
        (found / expected - 1.0).abs() <= relative,
        "{name}: found {found}, expected {expected}"
    );
}

/// Source: `tros_ladle_numbers`, derived, 0.5 %.
#[test]
fn ladle_gives_the_published_scene_its_numbers() {
    let mouth = Region::disc(DVec3::ZERO, DVec3::Z, RADIUS).expect("a possible mouth");
    let view = mouth.view(eye()).into_view().expect("above the ladle");
    let surface = Emission::grey(TEMPERATURE, 1.0, 1.0).expect("a possible surface");
    let towards = -eye();
    near(
        "projected solid angle",
        PI * view.factor(towards),
        0.05934,
        0.005,
    );
    near(
        "near infrared radiance",
        surface.near_infrared / PI,
        112_200.0,
        0.005,
    );
    near(
        "near infrared irradiance",
        exposure::facing(&[view], &[surface.near_infrared], towards),
        6660.0,
        0.005,
    );
    near("blue light radiance", surface.blue_light / PI, 6.58, 0.005);
    near("retinal radiance", surface.retinal_2006 / PI, 4565.0, 0.005);
    // R(λ) over 780–1400 nm alone, in the file of checks, is a weighted radiance:
    // what is left of the retinal radiance without its visible part.
    near(
        "retinal radiance, infrared part",
        retinal_infrared(),
        3535.0,
        0.005,
    );
}

/// R(λ) of the directive times Planck's law over 780–1400 nm, from the formula
/// parts of its table, by the midpoint rule.
fn retinal_infrared() -> f64 {
    let weight = |nanometres: f64| match nanometres {
        w if w <= 1050.0 => 10_f64.powf(0.002 * (700.0 - w)),
        w if w <= 1150.0 => 0.2,
        w if w <= 1200.0 => 0.2 * 10_f64.powf(0.02 * (1150.0 - w)),
        _ => 0.02,
    };
    let steps = 62_000_u32;
    (0..steps)
        .map(|step| {
            let nanometres = 780.0 + 620.0 * (f64::from(step) + 0.5) / f64::from(steps);
            planck::spectral_exitance(nanometres * 1e-9, TEMPERATURE) * weight(nanometres) / PI
        })
        .sum::<f64>()
        * 620e-9
        / f64::from(steps)
}

/// Source: own quadrature here: cos θ cos θ′ / (π r²) over the mouth, Simpson in the radius, equal steps in the angle.
#[test]
fn ladle_factor_is_that_of_a_quadrature() {
    let mouth = Region::disc(DVec3::ZERO, DVec3::Z, RADIUS).expect("a possible mouth");
    let found = mouth
        .view(eye())
        .into_view()
        .expect("above the ladle")
        .factor(-eye());
    let (rings, steps) = (400_u32, 400_u32);
    let mut sum = 0.0;
    for ring in 0..=rings {
        let share = if ring == 0 || ring == rings {
            1.0
        } else if ring % 2 == 1 {
            4.0
        } else {
            2.0
        };
        let radius = RADIUS * f64::from(ring) / f64::from(rings);
        for step in 0..steps {
            let angle = 2.0 * PI * f64::from(step) / f64::from(steps);
            let place = DVec3::new(radius * angle.cos(), radius * angle.sin(), 0.0);
            let way = place - eye();
            let cosines = way.normalize().dot(-eye().normalize()) * -way.normalize().z;
            sum += share * cosines / (PI * way.length_squared()) * radius;
        }
    }
    let expected = sum * RADIUS / f64::from(rings) / 3.0 * 2.0 * PI / f64::from(steps);
    near("factor", found, expected, 1e-10);
}

/// Source: `bb_700C` to `bb_1600C`, derived by an independent Planck integration, 0.1 %.
#[test]
fn near_infrared_radiance_of_hot_bodies() {
    for (celsius, radiance, fraction) in [
        (700.0, 4127.0, 0.255),
        (1000.0, 21_190.0, 0.4468),
        (1200.0, 46_790.0, 0.5504),
        (1400.0, 89_350.0, 0.6317),
        (1480.0, 112_200.0, 0.6583),
        (1600.0, 153_800.0, 0.6923),
    ] {
        let surface = Emission::grey(celsius + 273.15, 1.0, 1.0).expect("a possible surface");
        near("radiance", surface.near_infrared / PI, radiance, 0.001);
        near(
            "fraction",
            surface.near_infrared / surface.total,
            fraction,
            0.001,
        );
    }
}
