use super::*;

fn seen(region: &Region, point: DVec3) -> Subtense {
    of(region, point).expect("a point that does not touch the source")
}

fn assert_near(found: f64, expected: f64, tolerance: f64, what: &str) {
    assert!(
        (found - expected).abs() <= tolerance,
        "{what}: {found} against {expected}"
    );
}

#[test]
fn a_disc_on_its_axis_has_one_angle() {
    for (radius, distance) in [(0.5_f64, 2.0), (1e-6, 1e6), (3.0, 1e-3), (1.0, 1.0)] {
        let disc = Region::disc(DVec3::ZERO, DVec3::Y, radius).expect("a disc");
        let found = seen(&disc, DVec3::Y * distance);
        let expected = 2.0 * radius.atan2(distance);
        assert_near(found.greatest, expected, 1e-15 * expected, "greatest");
        assert_near(found.smallest, expected, 1e-14 * expected, "smallest");
    }
}

#[test]
fn a_square_on_its_axis_has_its_side_and_its_diagonal() {
    for (half, distance) in [(0.5_f64, 2.0), (0.5, 1e4), (2.0, 0.1)] {
        let square = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 2.0 * half, 2.0 * half)
            .expect("a square");
        let found = seen(&square, DVec3::Y * distance);
        let side = 2.0 * half.atan2(distance);
        let diagonal = 2.0 * (half * 2.0_f64.sqrt()).atan2(distance);
        assert_near(found.smallest, side, 1e-13 * side, "smallest");
        assert_near(found.greatest, diagonal, 1e-13 * diagonal, "greatest");
        assert_near(found.mean(), 0.5 * (side + diagonal), 1e-13, "mean");
    }
}

/// Source: the rule of the tubular lamp, length and width over the distance; common practice, no source.
#[test]
fn a_far_slot_has_its_length_and_its_width_over_the_distance() {
    let slot = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.2, 0.02).expect("a slot");
    let found = seen(&slot, DVec3::Y * 100.0);
    let diagonal = 1.2_f64.hypot(0.02) / 100.0;
    assert_near(found.greatest, diagonal, 2e-7, "greatest");
    assert_near(found.smallest, 0.0002, 1e-8, "smallest");
}

#[test]
fn a_disc_off_its_axis_is_seen_as_the_polygon_along_its_edge() {
    let disc = Region::disc(DVec3::ZERO, DVec3::Y, 0.5).expect("a disc");
    let corners: Vec<[f64; 2]> = (0..360_u16)
        .map(|degree| {
            let (sine, cosine) = f64::from(degree).to_radians().sin_cos();
            [0.5 * cosine, 0.5 * sine]
        })
        .collect();
    let polygon = Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, &corners).expect("a polygon");
    for point in [
        DVec3::new(2.0, 1.0, 0.0),
        DVec3::new(-0.3, 0.2, 0.1),
        DVec3::new(0.0, 4.0, 3.0),
        DVec3::new(30.0, 1.0, -7.0),
        DVec3::new(0.4, 0.05, 0.0),
    ] {
        let (disc, polygon) = (seen(&disc, point), seen(&polygon, point));
        let what = format!("{point}: {disc:?} against {polygon:?}");
        assert_near(disc.greatest, polygon.greatest, 2e-4 * disc.greatest, &what);
        assert_near(disc.smallest, polygon.smallest, 2e-4 * disc.smallest, &what);
    }
}

#[test]
fn what_lies_edge_on_or_behind_has_no_width() {
    let disc = Region::disc(DVec3::ZERO, DVec3::Y, 0.5).expect("a disc");
    let edge_on = seen(&disc, DVec3::X);
    assert_near(edge_on.smallest, 0.0, 0.0, "smallest");
    assert_near(edge_on.greatest, 2.0 * 0.5_f64.asin(), 1e-15, "greatest");
    assert_eq!(seen(&disc, DVec3::NEG_Y), Subtense::NONE);
    let door = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.0, 2.0).expect("a door");
    assert_eq!(seen(&door, DVec3::NEG_Y), Subtense::NONE);
    assert_eq!(seen(&door, DVec3::X), Subtense::NONE);
    assert_eq!(of(&door, DVec3::ZERO), None);
    assert_eq!(of(&door, DVec3::NAN), None);
    let ball = Region::sphere(DVec3::ZERO, 0.5).expect("a ball");
    assert_eq!(of(&ball, DVec3::X * 0.2), None);
}

#[test]
fn a_sphere_has_the_angle_of_its_tangents() {
    let ball = Region::sphere(DVec3::ZERO, 0.5).expect("a ball");
    let found = seen(&ball, DVec3::new(0.0, 0.6, 0.8));
    let expected = 2.0 * 0.5_f64.asin();
    assert_near(found.greatest, expected, 1e-15, "greatest");
    assert_near(found.smallest, expected, 1e-15, "smallest");
}

#[test]
fn a_cylinder_has_the_angles_of_its_end_or_of_its_side() {
    // Along its axis the near end hides the rest.
    let found = cylinder(DVec3::Z, DVec3::Z * 3.0, 0.4, DVec3::ZERO);
    let expected = 2.0 * 0.4_f64.atan();
    assert_near(found.greatest, expected, 6e-4 * expected, "end, greatest");
    assert_near(found.smallest, expected, 6e-4 * expected, "end, smallest");
    let least = expected * (1.0 - 1e-14);
    assert!(
        found.smallest >= least && found.greatest >= least,
        "{found:?}"
    );
    // From aside, at half its height: tangent planes along it, and its length
    // along the nearest line and beyond.
    let found = cylinder(DVec3::new(5.0, 0.0, -2.0), DVec3::Z * 4.0, 0.1, DVec3::ZERO);
    let width = 2.0 * (0.1_f64 / 5.0).asin();
    let length = 2.0 * (2.0_f64 / 4.9).atan();
    assert_near(found.smallest, width, 6e-4 * width, "side, smallest");
    assert_near(found.greatest, length, 1e-3 * length, "side, greatest");
    assert!(
        found.smallest >= width && found.greatest >= length,
        "{found:?}"
    );
    // Just off its side it fills half of what there is.
    let near = cylinder(DVec3::ZERO, DVec3::Z, 0.5, DVec3::new(0.5 + 1e-9, 0.0, 0.5));
    assert_near(near.smallest, std::f64::consts::PI, 1e-3, "touching");
}

/// The golden angle, rad.
const GOLDEN: f64 = 2.399_963_229_728_653;

/// The smallest angle between two planes about the rays, by trying hinges all
/// round and then ever nearer the best of them.
fn searched(rays: &[DVec3]) -> f64 {
    let spread = |hinge: DVec3| {
        let (right, up) = hinge.any_orthonormal_pair();
        let mut angles: Vec<f64> = rays
            .iter()
            .map(|ray| ray.dot(up).atan2(ray.dot(right)))
            .collect();
        angles.sort_by(f64::total_cmp);
        // All of it but the widest gap.
        let gap = angles
            .windows(2)
            .map(|pair| pair[1] - pair[0])
            .chain([angles[0] + TAU - angles[angles.len() - 1]])
            .fold(0.0, f64::max);
        TAU - gap
    };
    let mut tried: Vec<(f64, DVec3)> = (0..20_000_u32)
        .map(|index| {
            // Evenly over the sphere, by the golden angle.
            let z = 1.0 - (f64::from(index) + 0.5) / 10_000.0;
            let turn = GOLDEN * f64::from(index);
            let flat = (1.0 - z * z).sqrt();
            let hinge = DVec3::new(flat * turn.cos(), flat * turn.sin(), z);
            (spread(hinge), hinge)
        })
        .collect();
    tried.sort_by(|a, b| a.0.total_cmp(&b.0));
    // From several starts, since there are several valleys.
    let starts = tried.iter().step_by(10).take(40);
    starts
        .map(|start| {
            let (mut best, mut step, mut turned) = (*start, 0.02, 0.0);
            while step > 1e-8 {
                let (right, up) = best.1.any_orthonormal_pair();
                let mut moved = false;
                // Many ways, since a valley is narrow and has sharp walls.
                for turn in 0..60_u8 {
                    let (sine, cosine) = (TAU * f64::from(turn) / 60.0 + turned).sin_cos();
                    let hinge = (best.1 + (right * cosine + up * sine) * step).normalize();
                    let found = spread(hinge);
                    if found < best.0 {
                        best = (found, hinge);
                        moved = true;
                    }
                }
                turned += GOLDEN;
                if !moved {
                    step *= 0.7;
                }
            }
            best.0
        })
        .fold(f64::INFINITY, f64::min)
}

/// Source: own search here over hinges all round the point, with the polygons of a fixed table.
#[test]
fn the_narrowest_planes_are_those_that_a_search_finds() {
    let outlines: [&[[f64; 2]]; 4] = [
        &[[-0.5, -0.2], [0.5, -0.2], [0.5, 0.2], [-0.5, 0.2]],
        &[[0.0, 0.0], [1.0, 0.1], [0.3, 0.9]],
        &[
            [-1.0, -0.4],
            [0.1, -0.7],
            [0.9, -0.1],
            [0.6, 0.8],
            [-0.5, 0.5],
        ],
        // A dent does not count.
        &[
            [-1.0, -1.0],
            [1.0, -1.0],
            [1.0, 1.0],
            [0.0, -0.8],
            [-1.0, 1.0],
        ],
    ];
    for outline in outlines {
        let region = Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, outline).expect("a polygon");
        let Region::Polygon { vertices, .. } = &region else {
            panic!("an outline is a polygon");
        };
        for point in [
            DVec3::new(0.0, 5.0, 0.0),
            DVec3::new(0.2, 0.6, 0.1),
            DVec3::new(3.0, 1.0, -2.0),
            DVec3::new(0.1, 0.15, 0.0),
        ] {
            let rays: Vec<DVec3> = vertices
                .iter()
                .map(|vertex| (*vertex - point).normalize())
                .collect();
            let (found, expected) = (seen(&region, point).smallest, searched(&rays));
            assert!(
                (found - expected).abs() < 1e-6,
                "{outline:?} from {point}: {found} against {expected}"
            );
        }
    }
}
