use std::f64::consts::PI;

use glam::DQuat;

use super::*;

fn rim(tilt: f64) -> Region {
    let axis = DVec3::new(tilt.sin(), 0.0, tilt.cos());
    Region::disc(DVec3::new(0.2, -0.1, 1.0), axis, 0.5).expect("a rim")
}

#[test]
fn metal_is_seen_through_the_rim_and_the_wall_beside_it() {
    let metal = Region::disc(DVec3::ZERO, DVec3::Z, 0.5).expect("metal");
    let pool = Pool::new(metal.clone(), 0.4).expect("a ladle");
    let rim = Region::disc(DVec3::Z * 0.4, DVec3::Z, 0.5).expect("a rim");
    let expected = [
        Part {
            region: metal.clone(),
            through: Some(rim.clone()),
            less: None,
        },
        Part {
            region: rim,
            through: None,
            less: Some(metal.clone()),
        },
    ];
    assert_eq!(pool.parts(), expected);
    assert_eq!(pool.metal(), &metal);
    let full = Pool::new(metal.clone(), 0.0).expect("filled to the rim");
    assert_eq!(full.parts(), [Part::bare(metal)]);
}

#[test]
fn an_upright_vessel_is_one_that_is_not_tilted() {
    let metal = Region::disc(DVec3::new(0.2, -0.1, 0.6), DVec3::Z, 0.5).expect("metal");
    let upright = Pool::new(metal, 0.4).expect("a ladle");
    let tilted = Pool::tilted(rim(0.0), 0.6).expect("a ladle");
    assert_eq!(upright.parts(), tilted.parts());
}

#[test]
fn a_tilted_round_vessel_holds_an_ellipse_of_the_same_area() {
    for degrees in [1.0, 20.0, 45.0, 70.0] {
        let tilt = f64::to_radians(degrees);
        // Below the lowest place of the rim.
        let pool = Pool::tilted(rim(tilt), 0.4).expect("a tilted ladle");
        let (found, expected) = (pool.metal().area(), PI * 0.25 / tilt.cos());
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "{degrees}°: {found} against {expected}"
        );
        assert_eq!(pool.metal().normal().map(|normal| normal.z), Some(1.0));
        // The centre lies on the vessel's axis.
        let down = DVec3::new(0.2, -0.1, 1.0) - DVec3::new(0.6 * tilt.tan(), 0.0, 0.6);
        let centre = pool.metal().centre();
        assert!(centre.distance(down) < 1e-12, "{centre} against {down}");
    }
}

/// What a ray meets that enters a round vessel at a place of its rim: the metal
/// or the wall, by the vessel's equation alone. None near the border of both.
fn meets_metal(place: DVec3, way: DVec3, axis: DVec3, centre: DVec3, level: f64) -> Option<bool> {
    let to_metal = (level - place.z) / way.z;
    let hit = place + way * to_metal - centre;
    let off_axis = (hit - axis * hit.dot(axis)).length();
    if (off_axis / 0.5 - 1.0).abs() < 1e-3 {
        return None;
    }
    Some(to_metal > 0.0 && off_axis < 0.5)
}

#[test]
fn rays_through_the_rim_meet_the_metal_where_its_outline_is() {
    let (tilt, level) = (0.6, 0.55);
    let rim = rim(tilt);
    let axis = rim.normal().expect("flat");
    let centre = rim.centre();
    let pool = Pool::tilted(rim, level).expect("a tilted ladle");
    let (right, up) = axis.any_orthonormal_pair();
    let eye = DVec3::new(2.5, 1.0, 2.2);
    let (mut metal, mut wall) = (0, 0);
    for ring in 0..60_u8 {
        for step in 0..61_u8 {
            let radius = 0.5 * ((f64::from(ring) + 0.5) / 60.0).sqrt();
            let (sine, cosine) = (2.0 * PI * f64::from(step) / 61.0).sin_cos();
            let place = centre + right * (radius * cosine) + up * (radius * sine);
            let way = place - eye;
            let Some(expected) = meets_metal(place, way, axis, centre, level) else {
                continue;
            };
            let found = pool.metal().crosses(place, place + way * 5.0);
            assert_eq!(found, expected, "through {place}");
            if found { metal += 1 } else { wall += 1 }
        }
    }
    assert!(
        metal > 300 && wall > 300,
        "{metal} meet the metal, {wall} the wall"
    );
}

#[test]
fn a_tilted_trough_is_cut_exactly() {
    // 1 m wide along x, 0.6 m along y, tilted by 30° about y.
    let turn = DQuat::from_rotation_y(PI / 6.0);
    let rim = Region::rectangle(DVec3::Z, turn * DVec3::Z, DVec3::Y, 1.0, 0.6).expect("a rim");
    let pool = Pool::tilted(rim, 0.5).expect("a tilted trough");
    let (found, expected) = (pool.metal().area(), 0.6 / (PI / 6.0).cos());
    assert!(
        (found - expected).abs() < 1e-12,
        "{found} against {expected}"
    );
}

#[test]
fn impossible_pools_are_refused_by_name() {
    let text = |made: Result<Pool, Error>| {
        made.map_or_else(|error| error.to_string(), |_| "no error".to_owned())
    };
    let metal = Region::disc(DVec3::ZERO, DVec3::Z, 0.5).expect("metal");
    let upright = Region::disc(DVec3::ZERO, DVec3::Y, 0.5).expect("a door");
    let dented = [[0.0, 0.0], [2.0, 0.0], [2.0, 2.0], [1.0, 0.5]];
    let dented = Region::outline(DVec3::ZERO, DVec3::Z, DVec3::Y, &dented).expect("a polygon");
    for (made, expected) in [
        (
            Pool::new(metal.clone(), -0.1),
            "freeboard must be from 0 m to 10⁹ m, found -0.1",
        ),
        (
            Pool::new(metal, f64::NAN),
            "freeboard must be from 0 m to 10⁹ m, found NaN",
        ),
        (
            Pool::new(upright, 0.1),
            "the surface of a pool must be level, facing up, found another shape",
        ),
        (
            Pool::new(dented.clone(), 0.1),
            "the outline must have no dent, found one at vertex 4; what a wall hides of itself is not worked out",
        ),
        (Pool::new(dented, 0.0), "no error"),
        (
            Pool::tilted(rim(0.0), 1.2),
            "the height of the rim's lowest place above the metal must be zero or more, or the metal runs out, found -0.19999999999999996",
        ),
        (
            Pool::tilted(Region::sphere(DVec3::Z, 0.5).expect("a sphere"), 0.0),
            "the rim of a vessel must be a flat disc or polygon, found another shape",
        ),
    ] {
        assert_eq!(text(made), expected);
    }
    let over = Pool::tilted(rim(1.6), -2.0);
    assert!(
        text(over).starts_with("the tilt of a vessel's axis off the vertical"),
        "a vessel that lies beyond its side"
    );
    let spilling = Pool::tilted(rim(0.6), 0.8);
    assert!(
        text(spilling).contains("the metal runs out"),
        "over the low side of the rim"
    );
}

#[test]
fn a_bending_stream_touches_itself_and_no_more() {
    let points = [
        DVec3::new(0.0, 0.0, 2.0),
        DVec3::new(0.3, 0.0, 1.8),
        DVec3::new(0.5, 0.0, 1.4),
        DVec3::new(0.6, 0.0, 0.8),
    ];
    let pieces = stream::along(&points, 0.06).expect("a stream");
    assert_eq!(pieces.len(), 3);
    for (pair, joint) in pieces.windows(2).zip(&points[1..]) {
        let [
            Region::Cylinder { base, axis, radius },
            Region::Cylinder {
                base: next,
                axis: goes,
                ..
            },
        ] = pair
        else {
            panic!("cylinders");
        };
        let end = *base + *axis;
        assert!(end.distance(*joint) > 1e-4, "cut short at {joint}");
        // On the inner side of the bend the rims of both end faces meet.
        let inner = |way: DVec3| {
            let other = if way == *axis { *goes } else { -*axis };
            (other - way * (other.dot(way) / way.length_squared())).normalize() * *radius
        };
        let (one, two) = (end + inner(*axis), *next + inner(*goes));
        assert!(one.distance(two) < 1e-12, "{one} against {two}");
    }
}

#[test]
fn impossible_streams_are_refused_by_name() {
    let (lip, foot) = (DVec3::Z, DVec3::ZERO);
    for (made, expected) in [
        (
            stream::along(&[lip], 0.1),
            "number of points of a stream's course must be from 2 to 100, found 1",
        ),
        (
            stream::along(&[lip, foot], 0.0),
            "diameter of the stream must be from 10⁻⁹ m to 10⁹ m, found 0",
        ),
        (
            stream::along(&[lip, lip], 0.1),
            "length of a piece of the stream between its bends must be above 10⁻⁹ m; take fewer points or a thinner stream, found 0",
        ),
        (
            stream::along(&[lip, DVec3::NAN], 0.1),
            "a point of the stream's course must be from −10⁹ m to 10⁹ m in each coordinate, found NaN",
        ),
    ] {
        let found = made.map_or_else(|error| error.to_string(), |_| "no error".to_owned());
        assert_eq!(found, expected);
    }
    // A way that doubles back leaves nothing.
    assert!(stream::along(&[lip, foot, lip], 0.1).is_err());
}
