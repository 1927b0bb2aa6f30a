use std::f64::consts::PI;

use super::*;
use crate::physics::Error;
use crate::physics::view::Sight;

fn door() -> Region {
    Region::rectangle(DVec3::new(0.0, 0.0, 1.2), DVec3::Y, DVec3::Z, 0.9, 0.7).expect("a door")
}

fn pool() -> Region {
    Region::disc(DVec3::new(1.0, 2.0, 0.3), DVec3::Z * 7.0, 0.5).expect("a pool")
}

fn ball() -> Region {
    Region::sphere(DVec3::new(0.0, 0.0, 2.0), 0.25).expect("a ball")
}

/// A square of 2 m with a notch that reaches from the top to its middle.
fn notched() -> Region {
    let points = [
        [-1.0, -1.0],
        [1.0, -1.0],
        [1.0, 1.0],
        [0.2, 1.0],
        [0.0, 0.0],
        [-0.2, 1.0],
        [-1.0, 1.0],
    ];
    Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, &points).expect("a notched square")
}

#[test]
fn areas_centres_and_radii_are_those_of_the_shapes() {
    for (region, area, centre, radius) in [
        (
            door(),
            0.63,
            DVec3::new(0.0, 0.0, 1.2),
            0.45_f64.hypot(0.35),
        ),
        (pool(), PI * 0.25, DVec3::new(1.0, 2.0, 0.3), 0.5),
        (ball(), PI * 0.25, DVec3::new(0.0, 0.0, 2.0), 0.25),
    ] {
        assert!(
            (region.area() - area).abs() < 1e-14,
            "{} against {area}",
            region.area()
        );
        assert!(
            region.centre().distance(centre) < 1e-14,
            "{} against {centre}",
            region.centre()
        );
        let found = region.bounding_radius();
        assert!((found - radius).abs() < 1e-14, "{found} against {radius}");
    }
    // The notch is a triangle of 0.4 m by 1 m: centroid 2/3 m up.
    let (area, height) = (4.0 - 0.2, -0.2 * (2.0 / 3.0) / 3.8);
    assert!(
        (notched().area() - area).abs() < 1e-14,
        "{} against {area}",
        notched().area()
    );
    assert!(
        (notched().centre() - DVec3::Z * height).length() < 1e-14,
        "{}",
        notched().centre()
    );
}

#[test]
fn both_orders_of_an_outline_face_the_same_way() {
    let points = [[0.0, 0.0], [1.0, 0.0], [0.0, 2.0]];
    let turned = [points[2], points[1], points[0]];
    let made = |points: &[[f64; 2]]| {
        Region::outline(DVec3::X, DVec3::NEG_Y, DVec3::Z, points).expect("a triangle")
    };
    for region in [made(&points), made(&turned)] {
        assert_eq!(region.normal(), Some(DVec3::NEG_Y));
        let view = region
            .view(DVec3::new(1.3, -1.0, 0.5))
            .into_view()
            .expect("in front");
        assert!(view.factor(DVec3::Y) > 0.1, "{}", view.factor(DVec3::Y));
        // Sideways is to the right as seen from in front: to the east here.
        assert!(
            (region.centre() - DVec3::new(1.0 + 1.0 / 3.0, 0.0, 2.0 / 3.0)).length() < 1e-14,
            "{}",
            region.centre()
        );
    }
}

#[test]
fn points_are_in_front_behind_on_or_edge_on() {
    let behind = |region: Region, point: DVec3| region.view(point) == Sight::Behind;
    let edge_on = |region: Region, point: DVec3| region.view(point) == Sight::Seen(View::EMPTY);
    let seen = |region: Region, point: DVec3| matches!(region.view(point), Sight::Seen(view) if view.flux() != DVec3::ZERO);
    assert!(seen(door(), DVec3::new(0.0, 1e-6, 1.2)));
    assert!(behind(door(), DVec3::new(0.0, -1e-6, 1.2)));
    assert!(edge_on(door(), DVec3::new(0.5, 0.0, 1.2)));
    assert!(edge_on(pool(), DVec3::new(1.0, 2.6, 0.3)));
    assert!(edge_on(notched(), DVec3::new(0.0, 0.0, 0.8)));
    assert!(seen(pool(), DVec3::new(9.0, 2.0, 0.31)));
    assert!(behind(pool(), DVec3::new(9.0, 2.0, 0.29)));
    for (region, point) in [
        (door(), DVec3::new(0.1, 0.0, 1.3)),
        (door(), DVec3::new(0.45, 0.0, 1.55)),
        (door(), DVec3::new(0.45, 1e-14, 1.0)),
        (pool(), DVec3::new(1.3, 2.4, 0.3)),
        (pool(), DVec3::new(1.0, 2.0, 0.3)),
        (ball(), DVec3::new(0.0, 0.0, 2.0)),
        (ball(), DVec3::new(0.0, 0.25, 2.0)),
        (notched(), DVec3::new(0.0, 0.0, -0.1)),
        (notched(), DVec3::new(0.0, 0.0, 0.0)),
        (ball(), DVec3::new(f64::NAN, 0.0, 0.0)),
    ] {
        assert!(region.touches(point), "{region:?} at {point}");
    }
}

#[test]
fn just_over_a_source_the_factor_is_one() {
    for (region, point) in [
        (door(), DVec3::new(0.1, 1e-9, 1.2)),
        (pool(), DVec3::new(1.1, 2.0, 0.3 + 1e-9)),
    ] {
        let normal = -region.normal().expect("flat");
        let factor = region
            .view(point)
            .into_view()
            .expect("just off it")
            .factor(normal);
        assert!((factor - 1.0).abs() < 1e-8, "{factor}");
    }
    let close = ball()
        .view(DVec3::new(0.0, 0.0, 1.75 - 1e-9))
        .into_view()
        .expect("just off it");
    assert!(
        (close.factor(DVec3::Z) - 1.0).abs() < 1e-7,
        "{}",
        close.factor(DVec3::Z)
    );
}

#[test]
fn ways_that_meet_a_region_cross_it() {
    let at = DVec3::new;
    for (region, from, to, expected) in [
        (door(), at(0.0, 1.0, 1.2), at(0.0, -1.0, 1.2), true),
        (door(), at(0.0, 1.0, 1.2), at(0.0, 0.1, 1.2), false),
        (door(), at(0.5, 1.0, 1.2), at(0.5, -1.0, 1.2), false),
        (door(), at(-2.0, 0.0, 1.2), at(2.0, 0.0, 1.2), true),
        (door(), at(-2.0, 0.0, 2.2), at(2.0, 0.0, 2.2), false),
        (door(), at(0.0, 0.3, 1.2), at(0.0, 0.0, 1.2), true),
        (pool(), at(1.2, 2.0, 1.0), at(1.2, 2.0, -1.0), true),
        (pool(), at(1.6, 2.0, 1.0), at(1.6, 2.0, -1.0), false),
        (pool(), at(0.0, 2.0, 0.3), at(3.0, 2.0, 0.3), true),
        (pool(), at(0.0, 3.0, 0.3), at(3.0, 3.0, 0.3), false),
        (ball(), at(-1.0, 0.2, 2.0), at(1.0, 0.2, 2.0), true),
        (ball(), at(-1.0, 0.3, 2.0), at(1.0, 0.3, 2.0), false),
        (ball(), at(-1.0, 0.0, 2.0), at(-0.5, 0.0, 2.0), false),
        (notched(), at(0.0, 1.0, 0.5), at(0.0, -1.0, 0.5), false),
        (notched(), at(0.0, 1.0, -0.5), at(0.0, -1.0, -0.5), true),
    ] {
        assert_eq!(
            region.crosses(from, to),
            expected,
            "{region:?} from {from} to {to}"
        );
        assert_eq!(
            region.crosses(to, from),
            expected,
            "{region:?} from {to} to {from}"
        );
    }
}

#[test]
fn outlines_reach_along_a_heading_as_on_the_plan() {
    let heading =
        |degrees: f64| DVec3::new(degrees.to_radians().sin(), degrees.to_radians().cos(), 0.0);
    let turned_door = |degrees: f64| {
        Region::rectangle(DVec3::Z, heading(degrees), DVec3::Z, 0.9, 0.7).expect("a door")
    };
    let slab = Region::rectangle(DVec3::ZERO, DVec3::Z, heading(30.0), 1.0, 2.0).expect("a pool");
    let tilted = Region::disc(DVec3::ZERO, DVec3::new(0.0, 0.6, 0.8), 0.5).expect("a disc");
    let upright = Region::disc(DVec3::Z, heading(37.0), 0.5).expect("a disc");
    for (region, direction, expected) in [
        (door(), heading(0.0), 0.0),
        (door(), heading(90.0), 0.45),
        (door(), heading(45.0), 0.0),
        (turned_door(37.0), heading(37.0), 0.0),
        (turned_door(37.0), heading(127.0), 0.45),
        (pool(), heading(217.0), 0.5),
        (ball(), heading(217.0), 0.25),
        (slab.clone(), heading(30.0), 1.0),
        (slab.clone(), heading(120.0), 0.5),
        (slab, heading(75.0), 0.5 * 2.0_f64.sqrt()),
        (tilted.clone(), heading(0.0), 0.4),
        (tilted, heading(90.0), 0.5),
        (upright.clone(), heading(37.0), 0.0),
        (upright, heading(127.0), 0.5),
        (pool(), DVec3::Z, 0.0),
    ] {
        let found = region.edge_along(direction);
        assert!(
            (found - expected).abs() < 1e-8,
            "{region:?} along {direction}: {found} against {expected}"
        );
    }
    let off_centre = pool().edge_from(DVec3::new(1.0, 1.8, 5.0), DVec3::Y);
    assert!((off_centre - 0.7).abs() < 1e-14, "{off_centre}");
    assert_eq!(pool().edge_from(DVec3::new(9.0, 1.8, 5.0), DVec3::Y), 0.0);
}

#[test]
fn impossible_regions_are_refused_by_name() {
    let at = DVec3::new;
    let text = |made: Result<Region, Error>| {
        made.map_or_else(|error| error.to_string(), |region| format!("{region:?}"))
    };
    for (made, expected) in [
        (
            Region::disc(DVec3::ZERO, DVec3::Z, 0.0),
            "radius must be from 10⁻⁹ m to 10⁹ m, found 0",
        ),
        (
            Region::disc(DVec3::ZERO, DVec3::Z, f64::NAN),
            "radius must be from 10⁻⁹ m to 10⁹ m, found NaN",
        ),
        (
            Region::disc(DVec3::ZERO, DVec3::ZERO, 1.0),
            "normal must point in a direction, found a vector of length 0",
        ),
        (
            Region::sphere(at(0.0, 2e9, 0.0), 1.0),
            "centre must be from −10⁹ m to 10⁹ m in each coordinate, found 2000000000",
        ),
        (
            Region::sphere(DVec3::ZERO, -1.0),
            "radius must be from 10⁻⁹ m to 10⁹ m, found -1",
        ),
        (
            Region::rectangle(DVec3::ZERO, DVec3::Z, DVec3::Z, 1.0, 1.0),
            "what of `up` lies in the region's plane must point in a direction, found a vector of length 0",
        ),
        (
            Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.0, -1.0),
            "height must be from 10⁻⁹ m to 10⁹ m, found -1",
        ),
        (
            Region::polygon(vec![DVec3::X, DVec3::Y]),
            "a polygon must have from 3 to 1000 vertices, found 2",
        ),
        (
            Region::polygon(vec![DVec3::ZERO, DVec3::X, DVec3::X * 2.0]),
            "a polygon must enclose an area, found 0 m²; give its vertices in order around it",
        ),
        (
            Region::polygon(vec![
                DVec3::ZERO,
                DVec3::X,
                at(1.0, 1.0, 0.0),
                at(0.0, 1.0, 0.1),
            ]),
            "a polygon must be flat, found vertex 2 off its plane by",
        ),
        (
            Region::polygon(vec![
                DVec3::ZERO,
                at(2.0, 0.0, 0.0),
                at(2.0, 1.0, 0.0),
                at(1.0, -1.0, 0.0),
            ]),
            "the outline of a polygon must not cross itself, found edges 1 and 3 crossing",
        ),
        (
            Region::polygon(vec![
                DVec3::ZERO,
                at(2.0, 0.0, 0.0),
                at(1.0, 0.0, 0.0),
                at(1.0, 1.0, 0.0),
            ]),
            "the outline of a polygon must not cross itself, found edges 1 and 2 crossing",
        ),
    ] {
        let found = text(made);
        assert!(
            found.starts_with(expected),
            "found: {found}\nexpected: {expected}"
        );
    }
    let doubled = Region::polygon(vec![DVec3::ZERO, DVec3::X, DVec3::X, DVec3::Y, DVec3::ZERO])
        .expect("a vertex given twice counts once");
    assert_eq!(doubled.area(), 0.5);
}
