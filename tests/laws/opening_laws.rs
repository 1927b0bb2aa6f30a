//! Openings through walls and pools below a rim, seen as a scene: against rays
//! counted through the mouth, and what must hold from anywhere.

use std::f64::consts::TAU;

use farglow::physics::opening::section::Section;
use farglow::physics::opening::tunnel::Tunnel;
use farglow::physics::opening::{Opening, Walls};
use farglow::physics::pool::{Pool, stream};
use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Part, Scene};
use farglow::physics::view_factor::{disc, rectangle};
use glam::DVec3;
use proptest::prelude::*;

use crate::view_factor_laws::{config, heading};

/// The factors of the parts of a scene, one each.
fn factors(parts: &[Part], point: DVec3, normal: DVec3) -> Vec<f64> {
    let scene = Scene::new(parts.to_vec(), Vec::new()).expect("a possible scene");
    let looked = scene.look(point);
    (0..parts.len())
        .map(|part| {
            let glimpses = looked.of(part).iter();
            glimpses.map(|glimpse| glimpse.view.factor(normal)).sum()
        })
        .collect()
}

/// Irradiance over the furnace's σT⁴, by the parts of an opening.
fn lit(opening: &Opening, point: DVec3, normal: DVec3) -> f64 {
    factors(opening.parts(), point, normal)
        .iter()
        .zip(opening.exitances())
        .map(|(factor, exitance)| factor * exitance)
        .sum()
}

/// Places spread evenly over a disc of radius one in the plane y = 0, on a
/// spiral that lines up with nothing, with their areas.
fn over_a_disc(count: u32) -> impl Iterator<Item = (DVec3, f64)> {
    const GOLDEN: f64 = 2.399_963_229_728_653;
    let area = std::f64::consts::PI / f64::from(count);
    (0..count).map(move |index| {
        let radius = ((f64::from(index) + 0.5) / f64::from(count)).sqrt();
        let (sine, cosine) = (GOLDEN * f64::from(index)).sin_cos();
        (DVec3::new(radius * cosine, 0.0, radius * sine), area)
    })
}

/// What a receiver gets along the rays through places of the mouth, if `sent`
/// is the exitance that a ray meets behind its place.
fn by_rays(
    mouth: impl Iterator<Item = (DVec3, f64)>,
    point: DVec3,
    normal: DVec3,
    sent: impl Fn(DVec3, DVec3) -> f64,
) -> f64 {
    mouth
        .map(|(place, area)| {
            let way = place - point;
            let square = way.length_squared();
            let cosines = way.dot(normal).max(0.0) * (-way.y).max(0.0) / square;
            area * cosines / (std::f64::consts::PI * square) * sent(place, way.normalize())
        })
        .sum()
}

/// How deep a ray meets the wall of a round tunnel of radius one.
fn round_depth(place: DVec3, way: DVec3) -> f64 {
    let square = way.x * way.x + way.z * way.z;
    let half = place.x * way.x + place.z * way.z;
    let rest = place.x * place.x + place.z * place.z - 1.0;
    let along = ((half * half - square * rest).max(0.0).sqrt() - half) / square.max(1e-300);
    -way.y * along
}

/// How deep a ray meets the walls of a rectangular tunnel about the y axis.
fn square_depth(place: DVec3, way: DVec3, width: f64, height: f64) -> f64 {
    let to = |place: f64, way: f64, half: f64| {
        if way == 0.0 {
            f64::INFINITY
        } else {
            (half * way.signum() - place) / way
        }
    };
    let along = to(place.x, way.x, 0.5 * width).min(to(place.z, way.z, 0.5 * height));
    -way.y * along
}

/// In front of the opening's face: anywhere up to 70° off its axis.
fn before() -> impl Strategy<Value = DVec3> {
    (0.3..8.0_f64, 0.0..2.7_f64, 0.0..TAU).prop_map(|(distance, off, angle)| {
        let (sine, cosine) = angle.sin_cos();
        distance * DVec3::new(off * cosine, 1.0, off * sine)
    })
}

fn round(depth: f64) -> (Opening, Tunnel) {
    let outer = Region::disc(DVec3::ZERO, DVec3::Y, 1.0).expect("a disc");
    let section = Section::disc(1.0).expect("a disc");
    (
        Opening::new(outer, depth, Walls::Reradiating).expect("a possible wall"),
        Tunnel::new(section, depth).expect("a possible wall"),
    )
}

proptest! {
    #![proptest_config(config(24))]

    #[test]
    fn a_round_opening_sends_what_its_rays_meet(
        point in before(),
        depth in 0.05..8.0_f64,
    ) {
        let (opening, tunnel) = round(depth);
        let normal = -point.normalize();
        let found = lit(&opening, point, normal);
        let expected = by_rays(over_a_disc(120_000), point, normal, |place, way| {
            let met = round_depth(place, way);
            if met > depth { 1.0 } else { tunnel.exitance(met) }
        });
        let plain = by_rays(over_a_disc(120_000), point, normal, |_, _| 1.0);
        prop_assert!(
            (found - expected).abs() < 3e-4 * plain,
            "{} against {}, of {} through a thin wall", found, expected, plain
        );
    }

    #[test]
    fn a_rectangular_opening_sends_what_its_rays_meet(
        point in before(),
        depth in 0.05..4.0_f64,
        width in 0.5..3.0_f64,
    ) {
        let outer = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, width, 1.0).expect("a door");
        let opening = Opening::new(outer, depth, Walls::Reradiating).expect("a possible wall");
        let section = Section::rectangle(width, 1.0).expect("a rectangle");
        let tunnel = Tunnel::new(section, depth).expect("a possible wall");
        let normal = -point.normalize();
        let mouth = || {
            let count = 250_u32;
            let step = move |index: u32| (f64::from(index) + 0.5) / f64::from(count) - 0.5;
            (0..count * count).map(move |index| {
                let place = DVec3::new(step(index % count) * width, 0.0, step(index / count));
                (place, width / f64::from(count * count))
            })
        };
        let found = lit(&opening, point, normal);
        let expected = by_rays(mouth(), point, normal, |place, way| {
            let met = square_depth(place, way, width, 1.0);
            if met > depth { 1.0 } else { tunnel.exitance(met) }
        });
        let plain = by_rays(mouth(), point, normal, |_, _| 1.0);
        prop_assert!(
            (found - expected).abs() < 1.5e-3 * plain,
            "{} against {}, of {} through a thin wall", found, expected, plain
        );
    }

    #[test]
    fn a_speck_before_the_mouth_changes_nothing(
        point in before(),
        depth in 0.05..6.0_f64,
        normal in heading(),
        shape in 0..3_u8,
    ) {
        // With the speck each part goes the general way, without it the short one.
        let outer = match shape {
            0 => Region::disc(DVec3::ZERO, DVec3::Y, 1.0),
            1 => Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.7, 1.0),
            _ => Region::outline(
                DVec3::ZERO,
                DVec3::Y,
                DVec3::Z,
                &[[-1.0, -0.6], [1.1, -0.5], [0.7, 0.8], [-0.4, 0.9]],
            ),
        };
        let opening = Opening::new(outer.expect("an outline"), depth, Walls::Reradiating)
            .expect("a possible wall");
        let alone = factors(opening.parts(), point, normal);
        let speck = Region::disc(point * 0.5, DVec3::Y, 1e-7).expect("a speck");
        let scene = Scene::new(opening.parts().to_vec(), vec![Barrier::solid(speck)])
            .expect("a possible scene");
        let looked = scene.look(point);
        for (part, expected) in alone.iter().enumerate() {
            let glimpses = looked.of(part).iter();
            let found: f64 = glimpses.map(|glimpse| glimpse.view.factor(normal)).sum();
            prop_assert!(
                (found - expected).abs() < 1e-11,
                "part {}: {} with a speck, {} without", part, found, expected
            );
        }
    }

    #[test]
    fn a_thicker_wall_never_sends_more(point in before(), depth in 0.05..4.0_f64) {
        let normal = -point.normalize();
        let (thin, _) = round(depth);
        let (thick, _) = round(1.3 * depth);
        let outline = Region::disc(DVec3::ZERO, DVec3::Y, 1.0).expect("a disc");
        let plain = factors(&[Part::bare(outline.clone())], point, normal)[0];
        let cold = Opening::new(outline, depth, Walls::Cold).expect("a possible wall");
        let (one, other) = (lit(&thin, point, normal), lit(&thick, point, normal));
        prop_assert!(one <= plain * (1.0 + 1e-12), "{} through a wall, {} without", one, plain);
        prop_assert!(other <= one + 2e-4 * plain, "{} through a thicker wall than {}", other, one);
        let cold = lit(&cold, point, normal);
        prop_assert!(cold <= one, "{} with cold walls, {} with hot ones", cold, one);
    }

    #[test]
    fn metal_and_wall_fill_the_rim(
        point in before(),
        freeboard in 0.01..2.0_f64,
        tilt in 0.0..0.5_f64,
    ) {
        let axis = DVec3::new(tilt.sin(), 0.0, tilt.cos());
        let rim = Region::disc(DVec3::ZERO, axis, 0.8).expect("a rim");
        let level = -0.8 * tilt.sin() - freeboard;
        let pool = Pool::tilted(rim.clone(), level).expect("a vessel");
        // From above the rim: north of it, then turned up.
        let point = DVec3::new(point.x, point.z, point.y + 1.5);
        let normal = -point.normalize();
        let found: f64 = factors(pool.parts(), point, normal).iter().sum();
        let whole = factors(&[Part::bare(rim)], point, normal)[0];
        prop_assert!(
            (found - whole).abs() < 1e-9,
            "{} of metal and wall, {} of the rim", found, whole
        );
    }

    #[test]
    fn metal_in_a_tilted_vessel_is_what_rays_through_the_rim_meet(
        point in before(),
        freeboard in 0.05..1.0_f64,
        tilt in 0.0..0.5_f64,
    ) {
        // Turned so that the mouth of the rays lies in y = 0: up is y here.
        let axis = DVec3::new(tilt.sin(), 0.0, tilt.cos());
        let rim = Region::disc(DVec3::ZERO, axis, 1.0).expect("a rim");
        let level = -tilt.sin() - freeboard;
        let pool = Pool::tilted(rim, level).expect("a vessel");
        let right = DVec3::new(tilt.cos(), 0.0, -tilt.sin());
        let real = |place: DVec3| right * place.x + axis * place.y - DVec3::Y * place.z;
        let normal = -point.normalize();
        let found = factors(pool.parts(), real(point), real(normal))[0];
        let expected = by_rays(over_a_disc(120_000), point, normal, |place, way| {
            let deep = round_depth(place, way) / -way.y;
            let (place, way) = (real(place), real(way));
            let along = (level - place.z) / way.z;
            if along > 0.0 && along < deep { 1.0 } else { 0.0 }
        });
        prop_assert!(
            (found - expected).abs() < 1e-3 * expected + 3e-4,
            "{} against {} by rays", found, expected
        );
    }
}

#[test]
fn factors_between_faces_are_reciprocal_and_fill_a_box() {
    for (a, b, c) in [
        (1.0, 2.0, 0.5),
        (0.1, 3.0, 7.0),
        (5.0, 4.0, 3.0),
        (1e-3, 1.0, 1e3),
    ] {
        let there = disc::to_coaxial_disc(a, b, c).expect("two discs");
        let back = disc::to_coaxial_disc(b, a, c).expect("two discs");
        assert!(
            (a * a * there / (b * b * back) - 1.0).abs() < 1e-14,
            "discs {a}, {b}, {c}: {there} and {back}"
        );
        let there = rectangle::to_perpendicular_rectangle(a, b, c).expect("two rectangles");
        let back = rectangle::to_perpendicular_rectangle(a, c, b).expect("two rectangles");
        assert!(
            (b * there / (c * back) - 1.0).abs() < 1e-9,
            "rectangles {a}, {b}, {c}: {there} and {back}"
        );
        // From the floor of a box, a × b and c high, to all that closes it.
        let sum = rectangle::to_parallel_rectangle(a, b, c).expect("floor and ceiling")
            + 2.0 * rectangle::to_perpendicular_rectangle(a, b, c).expect("walls along a")
            + 2.0 * rectangle::to_perpendicular_rectangle(b, a, c).expect("walls along b");
        assert!((sum - 1.0).abs() < 1e-12, "box {a}, {b}, {c}: {sum}");
    }
}

#[test]
fn parallel_rectangles_meet_without_a_step_where_their_forms_change() {
    // The shorter side at half the distance.
    for long in [0.5, 1.0, 30.0] {
        let at = |distance| rectangle::to_parallel_rectangle(long, 0.5, distance).expect("two");
        let (near, far) = (at(1.0 - 1e-12), at(1.0 + 1e-12));
        assert!(
            (near / far - 1.0).abs() < 1e-11,
            "{long}: {near} against {far}"
        );
    }
}

#[test]
fn far_faces_keep_their_digits() {
    // A F = A² / (π d²) far away.
    for distance in [1e4, 1e6] {
        let found = rectangle::to_parallel_rectangle(2.0, 0.5, distance).expect("two");
        let expected = 1.0 / (std::f64::consts::PI * distance * distance);
        assert!(
            (found / expected - 1.0).abs() < 3.0 / (distance * distance) + 1e-14,
            "{distance}: {found:e} against {expected:e}"
        );
    }
}

#[test]
fn a_bending_stream_stands_in_one_scene() {
    let points: Vec<DVec3> = (0..6_u8)
        .map(|index| {
            let time = 0.08 * f64::from(index);
            DVec3::new(0.6 * time, 0.0, 2.0 - 4.9 * time * time)
        })
        .collect();
    let pieces = stream::along(&points, 0.05).expect("a stream");
    let parts: Vec<Part> = pieces.into_iter().map(Part::bare).collect();
    let eye = DVec3::new(0.2, 4.0, 1.6);
    let found: f64 = factors(&parts, eye, DVec3::NEG_Y).iter().sum();
    // A thin upright stream of this height: d h / (π D²) times the mean of
    // cosines to the fourth, near one here.
    let long = DVec3::new(0.24, 0.0, 0.784).length();
    let about = 0.05 * long / (std::f64::consts::PI * 16.0);
    assert!(
        (found / about - 1.0).abs() < 0.1,
        "{found} against about {about}"
    );
}
