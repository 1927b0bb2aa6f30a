//! Openings through thick walls: collocation and quadrature of another program
//! (round, slot), Galerkin zones with extrapolation (square), one worked
//! example of a chart.
//!
//! What is seen from a place is checked here from the exitance of the walls by
//! closed forms of its own: a disc on the axis, and the area that two circles
//! share; in `tests/laws/opening_laws.rs` it comes out of the scene.

use std::f64::consts::PI;

use farglow::physics::opening::section::Section;
use farglow::physics::opening::tunnel::Tunnel;
use farglow::physics::opening::{Opening, Walls};
use farglow::physics::region::Region;
use farglow::physics::scene::Scene;
use farglow::physics::view_factor::{disc, rectangle, strip};

use glam::DVec3;

use crate::rows::{self, Row};

fn round(depth: f64) -> Tunnel {
    Tunnel::new(Section::disc(1.0).expect("a radius"), depth).expect("a possible wall")
}

/// What leaves a square opening of one metre, its walls re-radiating.
fn square(depth: f64) -> f64 {
    let outer = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.0, 1.0).expect("a square");
    Opening::new(outer, depth, Walls::Reradiating)
        .and_then(|opening| opening.effective_emissivity(1.0))
        .expect("a possible wall")
}

fn slot(depth: f64) -> Tunnel {
    Tunnel::new(Section::slot(1.0).expect("a slot"), depth).expect("a possible wall")
}

pub fn round_black(row: &Row) -> Option<f64> {
    disc::to_coaxial_disc(1.0, 1.0, row.number("L_over_R")).ok()
}

pub fn round_reradiating(row: &Row) -> Option<f64> {
    Some(round(row.number("L_over_R")).transmitted())
}

pub fn square_black(row: &Row) -> Option<f64> {
    rectangle::to_parallel_rectangle(1.0, 1.0, row.number("depth_over_side")).ok()
}

pub fn square_reradiating(row: &Row) -> Option<f64> {
    Some(square(row.number("depth_over_side")))
}

pub fn slot_black(row: &Row) -> Option<f64> {
    strip::to_parallel_strip(1.0, row.number("depth_over_width")).ok()
}

pub fn slot_reradiating(row: &Row) -> Option<f64> {
    Some(slot(row.number("depth_over_width")).transmitted())
}

/// What is seen of a round tunnel, if `seen` is the factor to the edge at a
/// depth as far as the outer edge does not hide it: each edge counts by how
/// much the exitance rises there.
///
/// Simpson's rule of 4000 steps, from the outer edge to the deepest one that is
/// seen at all.
fn looked_at(tunnel: &Tunnel, deepest_seen: f64, seen: impl Fn(f64) -> f64) -> f64 {
    let depth = tunnel.depth();
    let end = deepest_seen.min(depth);
    let steps = 4000_u32;
    let step = end / f64::from(steps);
    let mut sum = 0.0;
    for index in 0..=steps {
        let x = step * f64::from(index);
        let weight = match index {
            0 => 1.0,
            _ if index == steps => 1.0,
            _ if index % 2 == 1 => 4.0,
            _ => 2.0,
        };
        sum += weight * tunnel.slope(x) * seen(x);
    }
    tunnel.exitance(0.0) * seen(0.0)
        + sum * step / 3.0
        + (1.0 - tunnel.exitance(depth)) * seen(depth)
}

/// On the axis the deeper edge lies within the outer one.
pub fn on_axis(row: &Row) -> Option<f64> {
    let (tunnel, distance) = (round(row.number("L_over_R")), row.number("d_over_R"));
    Some(looked_at(&tunnel, f64::INFINITY, |depth| {
        1.0 / (1.0 + (distance + depth).powi(2))
    }))
}

/// The share of a circle of radius one that another covers, their centres
/// `apart`.
fn shared(apart: f64) -> f64 {
    if apart >= 2.0 {
        return 0.0;
    }
    (2.0 * (0.5 * apart).acos() - 0.5 * apart * (4.0 - apart * apart).sqrt()) / PI
}

/// Far away the deeper edge is a circle shifted by depth times tangent.
fn beam_at(depth: f64, degrees: f64) -> f64 {
    let tangent = degrees.to_radians().tan();
    looked_at(&round(depth), 2.0 / tangent, |depth| {
        shared(depth * tangent)
    })
}

pub fn beam(row: &Row) -> Option<f64> {
    Some(beam_at(row.number("L_over_R"), row.number("theta_deg")))
}

pub fn chart(row: &Row) -> Option<f64> {
    Some(square(1.0 / row.number("D_over_X")))
}

/// Source: disc to disc by boundary integrals; family `thick_round_black`.
#[test]
fn round_opening_with_cold_walls() {
    assert_eq!(rows::check("thick_round_black", round_black), 7);
}

/// Source: Legendre collocation of another program, agreeing to 1e-10; the same number is the transmission of a rarefied gas through a tube (Clausing 1932); family `thick_round_reradiating`.
#[test]
fn round_opening_with_walls_that_reradiate() {
    assert_eq!(rows::check("thick_round_reradiating", round_reradiating), 7);
}

/// Source: adaptive quadrature; family `thick_square_black`.
#[test]
fn square_opening_with_cold_walls() {
    assert_eq!(rows::check("thick_square_black", square_black), 7);
}

/// Source: Galerkin zones, 4, 8 and 16 per half side, extrapolated; ray tracing at a depth of one side; family `thick_square_reradiating`.
#[test]
fn square_opening_with_walls_that_reradiate() {
    assert_eq!(
        rows::check("thick_square_reradiating", square_reradiating),
        7
    );
}

/// Source: crossed strings; family `thick_slot_black`.
#[test]
fn slot_with_cold_walls() {
    assert_eq!(rows::check("thick_slot_black", slot_black), 7);
}

/// Source: Nyström's method of another program, agreeing to 1e-12; family `thick_slot_reradiating`.
#[test]
fn slot_with_walls_that_reradiate() {
    assert_eq!(rows::check("thick_slot_reradiating", slot_reradiating), 7);
}

/// Source: the same collocation, seen from the axis; family `thick_on_axis`.
#[test]
fn round_opening_from_its_axis() {
    assert_eq!(rows::check("thick_on_axis", on_axis), 17);
}

/// Source: the same collocation, far away and off the axis; family `thick_beam`.
#[test]
fn round_opening_from_far_off_its_axis() {
    assert_eq!(rows::check("thick_beam", beam), 10);
}

/// Source: Bureau of Energy Efficiency (India), furnaces chapter, square opening 1 m in a wall of 0.46 m, read from the chart, from memory; family `thick_published`.
#[test]
fn chart_of_openings() {
    assert_eq!(rows::check("thick_published", chart), 1);
}

/// Source: free-molecular transmission of tubes of L/R 1, 2, 4 and 10 (Clausing, Cole), from memory to six digits, the last of them uncertain.
#[test]
fn tubes_transmit_a_rarefied_gas_as_heat() {
    for (depth, expected) in [
        (1.0, 0.671_984),
        (2.0, 0.514_231),
        (4.0, 0.356_572),
        (10.0, 0.190_941),
    ] {
        let found = round(depth).transmitted();
        assert!(
            (found - expected).abs() < 1.5e-6,
            "L/R {depth}: {found} against {expected}"
        );
    }
}

/// Source: 1/(1 + 3 lₑ/(8R)), lₑ = L (1 + 1/(3 + 3L/(7R))) (Santeler 1986, from memory), within 0.7 % at any depth.
#[test]
fn an_old_approximation_is_near() {
    for step in 0..60_u32 {
        let depth = 0.1 * 1.1_f64.powf(f64::from(step));
        let longer = depth * (1.0 + 1.0 / (3.0 + 3.0 * depth / 7.0));
        let expected = 1.0 / (1.0 + 0.375 * longer);
        let found = round(depth).transmitted();
        assert!(
            (found / expected - 1.0).abs() < 7e-3,
            "L/R {depth}: {found} against {expected}"
        );
    }
}

/// Source: as `thick_square_reradiating`, with the ratios for which no row stands in the file of checks, to what their extrapolation and this program are good for.
#[test]
fn squares_of_all_depths() {
    for (depth, expected) in [
        (0.05, 0.953_816_496_031_85),
        (0.1, 0.912_982_910_511_066_5),
        (0.5, 0.689_698_820_768_092_7),
        (1.5, 0.442_276_677_474_699_8),
        (2.0, 0.377_989_465_922_467_4),
        (3.0, 0.294_655_375_520_827_7),
        (5.0, 0.206_369_532_752_648_83),
        (0.25, 0.811_969_972_188_549_9),
        (0.46, 0.706_435_251_877_905_2),
        (1.0, 0.536_220_264_669_206_4),
    ] {
        let found = square(depth);
        assert!(
            (found - expected).abs() < 3e-5,
            "{depth}: {found} against {expected}"
        );
    }
}

/// Source: as `thick_beam`, the far beam of L/R 1 from the axis to 85°.
#[test]
fn a_beam_falls_off_the_axis_as_computed_elsewhere() {
    for (degrees, expected) in [
        (5.0, 0.972_158_825_335_540_5),
        (15.0, 0.914_920_225_303_675_6),
        (20.0, 0.884_674_906_778_080_3),
        (45.0, 0.693_054_690_794_213_8),
        (75.0, 0.404_673_191_322_896_6),
        (85.0, 0.351_521_161_413_096_6),
    ] {
        let found = beam_at(1.0, degrees);
        assert!(
            (found - expected).abs() < 1e-7,
            "{degrees}°: {found} against {expected}"
        );
    }
}

/// What a receiver that looks at the middle of a round opening gets, over σT⁴,
/// from the scene.
fn in_a_scene(depth: f64, point: DVec3) -> f64 {
    let outer = Region::disc(DVec3::ZERO, DVec3::Y, 1.0).expect("a disc");
    let opening = Opening::new(outer, depth, Walls::Reradiating).expect("a possible wall");
    let scene = Scene::new(opening.parts().to_vec(), Vec::new()).expect("a scene");
    let looked = scene.look(point);
    looked
        .glimpses()
        .iter()
        .map(|glimpse| opening.exitances()[glimpse.part] * glimpse.view.factor(-point))
        .sum()
}

/// Source: families `thick_on_axis` and `thick_beam`, as parts of a scene: to 1e-4 of the thin opening.
#[test]
fn a_scene_of_zones_gives_the_same_rows() {
    let mut ran = 0;
    for row in rows::all() {
        let Some(expected) = row.expected.as_f64() else {
            continue;
        };
        let (found, whole) = match row.family.as_str() {
            "thick_on_axis" => {
                let distance = row.number("d_over_R");
                let found = in_a_scene(row.number("L_over_R"), DVec3::Y * distance);
                (found, 1.0 / (1.0 + distance * distance))
            }
            "thick_beam" => {
                let angle = row.number("theta_deg").to_radians();
                let point = 1e4 * DVec3::new(angle.sin(), angle.cos(), 0.0);
                let found = in_a_scene(row.number("L_over_R"), point);
                (found * 1e8 / angle.cos(), 1.0)
            }
            _ => continue,
        };
        ran += 1;
        assert!(
            (found - expected).abs() < 1e-4 * whole,
            "{}: {found} against {expected}",
            row.id
        );
    }
    assert_eq!(ran, 27);
}
