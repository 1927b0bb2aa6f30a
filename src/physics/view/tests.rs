use std::f64::consts::TAU;

use glam::DVec3;

use super::*;
use crate::physics::region::Region;

fn seen(region: &Region) -> View {
    region
        .view(DVec3::ZERO)
        .into_view()
        .expect("off the region")
}

/// The cone of half angle α has 2π(1 − cos α); a disc on its axis is one.
#[test]
fn solid_angle_of_round_regions_is_that_of_their_cone() {
    for (radius, distance) in [(1.0, 1.0), (0.2, 3.0), (5.0, 0.1), (1e-6, 1.0)] {
        let ball_distance = f64::hypot(radius, distance);
        let exact = TAU * radius * radius / (ball_distance * (ball_distance + distance));
        let disc = Region::disc(DVec3::Z * distance, DVec3::NEG_Z, radius).expect("a disc");
        let found = seen(&disc).solid_angle();
        assert!(
            (found / exact - 1.0).abs() < 1e-13,
            "disc: {found} against {exact}"
        );
        let ball = Region::sphere(DVec3::X * ball_distance, radius).expect("a sphere");
        let found = seen(&ball).solid_angle();
        assert!(
            (found / exact - 1.0).abs() < 1e-12,
            "sphere: {found} against {exact}"
        );
        // Through the quadrature of arcs: the same circle off its middle.
        let piece = Piece::whole(Circle::new(DVec3::Z * distance, DVec3::NEG_Z, radius));
        let found = Loops::new([piece].into(), DVec3::new(0.1, 0.2, 1.0)).solid_angle();
        assert!(
            (found - exact).abs() < 1e-9,
            "arcs: {found} against {exact}"
        );
    }
}

/// 4 atan(ab / (d √(a² + b² + d²))) of a rectangle 2a by 2b on its axis.
#[test]
fn solid_angle_of_a_rectangle_on_its_axis() {
    for (a, b, distance) in [
        (0.45_f64, 0.35_f64, 2.5_f64),
        (3.0, 1.0, 0.2),
        (1e-3, 2e-3, 5.0),
    ] {
        let region = Region::rectangle(
            DVec3::Y * distance,
            DVec3::NEG_Y,
            DVec3::Z,
            2.0 * a,
            2.0 * b,
        )
        .expect("a rectangle");
        let exact =
            4.0 * (a * b / (distance * (a * a + b * b + distance * distance).sqrt())).atan();
        let found = seen(&region).solid_angle();
        assert!((found - exact).abs() < 1e-13, "{found} against {exact}");
    }
}

/// A disc seen off its axis, as a polygon of 1000 sides of the same area.
#[test]
fn solid_angle_of_a_disc_off_its_axis_is_that_of_a_fine_polygon() {
    let (centre, radius) = (DVec3::new(0.7, -0.2, 1.1), 0.6);
    let disc = Region::disc(centre, DVec3::NEG_Z, radius).expect("a disc");
    let step = TAU / 1000.0;
    let even = radius * (step / step.sin()).sqrt();
    let corners: Vec<[f64; 2]> = (0..1000_u32)
        .map(|corner| {
            let angle = step * f64::from(corner);
            [even * angle.cos(), even * angle.sin()]
        })
        .collect();
    let polygon = Region::outline(centre, DVec3::NEG_Z, DVec3::Y, &corners).expect("a polygon");
    let (round, cornered) = (seen(&disc).solid_angle(), seen(&polygon).solid_angle());
    assert!(
        (round - cornered).abs() < 1e-9,
        "{round} against {cornered}"
    );
}

/// Seen from its own height far from its ends a long cylinder is a strip
/// between two planes: the factor of an element facing it is r/d.
#[test]
fn long_cylinder_gives_radius_over_distance() {
    for (radius, distance) in [(0.2, 1.0), (0.5, 0.6), (0.01, 3.0)] {
        let axis = DVec3::Z * 2e6;
        let cylinder =
            Region::cylinder(DVec3::X * distance - axis * 0.5, axis, radius).expect("a cylinder");
        let view = seen(&cylinder);
        let (found, exact) = (view.factor(DVec3::X), radius / distance);
        assert!((found - exact).abs() < 1e-12, "{found} against {exact}");
        let (found, exact) = (view.solid_angle(), 4.0 * (radius / distance).asin());
        assert!((found - exact).abs() < 1e-5, "{found} against {exact} sr");
    }
}

/// Above one end, within its edge, a cylinder is that end's disc; across the
/// edge the view changes without a step.
#[test]
fn cylinder_seen_end_on_is_a_disc() {
    let cylinder = Region::cylinder(DVec3::new(0.1, 0.0, 1.0), DVec3::Z, 0.5).expect("a cylinder");
    let disc = Region::disc(DVec3::new(0.1, 0.0, 1.0), DVec3::NEG_Z, 0.5).expect("a disc");
    assert_eq!(seen(&cylinder).flux(), seen(&disc).flux());
    let at = |x: f64| {
        let view = cylinder
            .view(DVec3::new(x, 0.0, 0.2))
            .into_view()
            .expect("below it");
        view.flux()
    };
    let (inside, outside) = (at(0.6 - 1e-9), at(0.6 + 1e-9));
    assert!(
        (inside - outside).length() < 1e-8,
        "{inside} against {outside}"
    );
}

/// What the horizon takes off and what it leaves add up, from any side.
#[test]
fn a_cylinder_cut_by_the_horizon_keeps_its_flux() {
    let cylinder = Region::cylinder(DVec3::new(-0.6, -0.4, 1.0), DVec3::new(0.9, 1.1, 0.5), 0.5)
        .expect("a cylinder");
    let view = seen(&cylinder);
    for step in 0..500_u32 {
        let angle = f64::from(step) * 0.37;
        let normal = DVec3::new(angle.cos(), angle.sin(), (0.1 * angle).sin()).normalize();
        let sum = view.clipped_flux(normal) + view.clipped_flux(-normal);
        assert!(
            (sum - view.flux()).length() < 1e-14,
            "{sum} against {}",
            view.flux()
        );
        let (front, back) = (view.factor(normal), view.factor(-normal));
        assert!(
            (front - back - view.flux().dot(normal)).abs() < 1e-14,
            "{front} - {back}"
        );
    }
}

#[test]
fn a_plate_is_seen_from_both_sides() {
    let plate = Region::plate(DVec3::Y, DVec3::Y, DVec3::Z, 0.9, 0.7).expect("a plate");
    let front = plate
        .view(DVec3::new(0.2, 2.5, 0.1))
        .into_view()
        .expect("off it");
    let back = plate
        .view(DVec3::new(0.2, -0.5, 0.1))
        .into_view()
        .expect("off it");
    let (front, back) = (front.factor(DVec3::NEG_Y), back.factor(DVec3::Y));
    assert!(
        (front - back).abs() < 1e-15 && front > 0.0,
        "{front} against {back}"
    );
    assert!((plate.area() - 1.26).abs() < 1e-14, "{}", plate.area());
}
