use std::f64::consts::PI;

use glam::DVec2;

use super::*;
use crate::numeric::gauss::SIXTEEN;

fn round(depth: f64, walls: Walls) -> Opening {
    let outer = Region::disc(DVec3::ZERO, DVec3::Y, 1.0).expect("a disc");
    Opening::new(outer, depth, walls).expect("a possible wall")
}

/// What of a circle of radius one another covers, their centres `apart`.
fn shared(apart: f64) -> f64 {
    let apart = apart.min(2.0);
    (2.0 * (0.5 * apart).acos() - 0.5 * apart * (4.0 - apart * apart).sqrt()) / PI
}

/// What is seen of the parts together, if `seen` is the factor to the edge at a
/// depth as far as the outer edge does not hide it.
fn looked_at(opening: &Opening, seen: impl Fn(f64) -> f64) -> f64 {
    let mut sum = 0.0;
    let mut before = 0.0;
    for (part, exitance) in opening.parts().iter().zip(opening.exitances()) {
        sum += (exitance - before) * seen(-part.region.centre().y);
        before = *exitance;
    }
    sum
}

#[test]
fn zones_are_seen_like_the_smooth_exitance() {
    // Error in a far beam times the cosine, and in the beam itself.
    for (depth, dimmed, plain) in [
        (0.1, 3e-5, 6e-4),
        (0.5, 8e-5, 9e-4),
        (1.0, 1e-4, 6e-4),
        (2.0, 1e-4, 4e-4),
        (4.0, 1e-4, 2e-4),
        (8.0, 1.5e-4, 3e-4),
        (40.0, 2e-4, 4e-4),
    ] {
        let opening = round(depth, Walls::Reradiating);
        let tunnel = Tunnel::new(Section::disc(1.0).expect("a disc"), depth).expect("a tunnel");
        let fine = Rule::new(300);
        for degrees in 0..89_u8 {
            let angle = f64::from(degrees).to_radians();
            let seen = |x: f64| shared(x * angle.tan());
            let end = depth.min(2.0 / angle.tan());
            let smooth = fine.integral(0.0, end, |x| tunnel.slope(x) * seen(x))
                + tunnel.exitance(0.0)
                + (1.0 - tunnel.exitance(depth)) * seen(depth);
            let found = looked_at(&opening, seen);
            let error = (found - smooth).abs();
            assert!(
                error < plain && error * angle.cos() < dimmed,
                "L/R {depth}, {degrees}°: {found} against {smooth}"
            );
        }
        for distance in [0.3, 1.0, 3.0, 10.0] {
            let seen = |x: f64| 1.0 / (1.0 + (distance + x).powi(2));
            let smooth = fine.integral(0.0, depth, |x| tunnel.slope(x) * seen(x))
                + tunnel.exitance(0.0) * seen(0.0)
                + (1.0 - tunnel.exitance(depth)) * seen(depth);
            let found = looked_at(&opening, seen);
            assert!(
                (found - smooth).abs() < 1e-4 * seen(0.0),
                "L/R {depth} from {distance}: {found} against {smooth}"
            );
        }
    }
}

#[test]
fn parts_lie_one_within_the_other() {
    let outer =
        Region::rectangle(DVec3::new(1.0, 2.0, 3.0), DVec3::X, DVec3::Z, 0.9, 0.7).expect("a door");
    let door = Opening::new(outer.clone(), 0.4, Walls::Reradiating).expect("a wall");
    let (parts, exitances) = (door.parts(), door.exitances());
    assert_eq!(parts.len(), exitances.len());
    assert!(exitances.is_sorted() && exitances[0] > 0.0, "{exitances:?}");
    assert_eq!(exitances[exitances.len() - 1], 1.0);
    assert_eq!((&parts[0].region, &parts[0].through), (&outer, &None));
    for pair in parts.windows(2) {
        assert_eq!(pair[0].less.as_ref(), Some(&pair[1].region));
        assert_eq!(pair[1].through.as_ref(), Some(&outer));
    }
    let furnace = &parts[parts.len() - 1];
    assert_eq!(furnace.less, None);
    let depth = (furnace.region.centre() - outer.centre()).dot(DVec3::NEG_X);
    assert!((depth - 0.4).abs() < 1e-15, "{depth} against 0.4");
}

#[test]
fn cold_walls_leave_the_furnace_alone() {
    let opening = round(1.0, Walls::Cold);
    assert_eq!(opening.parts().len(), 1);
    assert_eq!(opening.exitances(), [1.0]);
    let found = opening.effective_emissivity(0.8).expect("an emissivity");
    let expected = 0.8 * 0.381_966_011_250_105_1;
    assert!(
        (found - expected).abs() < 1e-15,
        "{found} against {expected}"
    );
    assert_eq!(opening.reflection_gain(0.5), Ok(1.0));
}

#[test]
fn without_thickness_an_opening_is_its_outline() {
    let dented = [[0.0, 0.0], [2.0, 0.0], [2.0, 2.0], [1.0, 0.5]];
    let outline = Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, &dented).expect("a polygon");
    for walls in [Walls::Cold, Walls::Reradiating] {
        let opening = Opening::new(outline.clone(), 0.0, walls).expect("no wall");
        assert_eq!(opening.parts(), [Part::bare(outline.clone())]);
        assert_eq!(opening.effective_emissivity(0.9), Ok(0.9));
    }
}

#[test]
fn the_thin_limit_is_the_plain_opening() {
    let mut last = 1.0;
    for depth in [1e-9, 1e-6, 1e-4, 1e-2] {
        let found = round(depth, Walls::Reradiating)
            .effective_emissivity(1.0)
            .expect("black");
        // The wall sends back half of what it gets: 1 − L/(2R) at first.
        assert!(
            found <= last && (found - 1.0 + 0.5 * depth).abs() < depth * depth + 1e-15,
            "{depth}: {found}"
        );
        last = found;
    }
}

#[test]
fn impossible_openings_are_refused_by_name() {
    let text = |made: Result<Opening, Error>| {
        made.map_or_else(|error| error.to_string(), |_| "no error".to_owned())
    };
    let square = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 2.0, 1.0).expect("a door");
    let dented = [[0.0, 0.0], [2.0, 0.0], [2.0, 2.0], [1.0, 0.5]];
    let dented = Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, &dented).expect("a polygon");
    let many: Vec<DVec3> = (0..65_u8)
        .map(|index| {
            let (sine, cosine) = (2.0 * PI * f64::from(index) / 65.0).sin_cos();
            DVec3::new(cosine, sine, 0.0)
        })
        .collect();
    let many = Region::polygon(many).expect("a polygon");
    let sphere = Region::sphere(DVec3::ZERO, 1.0).expect("a sphere");
    for (outer, depth, expected) in [
        (
            square.clone(),
            20.5,
            "wall thickness over the least width of the opening must be at most 20, found 20.5",
        ),
        (
            square.clone(),
            -0.1,
            "wall thickness must be from 0 m to 10⁹ m, found -0.1",
        ),
        (
            square,
            f64::NAN,
            "wall thickness must be from 0 m to 10⁹ m, found NaN",
        ),
        (
            dented,
            0.5,
            "the outline must have no dent, found one at vertex 4; what a wall hides of itself is not worked out",
        ),
        (
            many,
            0.5,
            "number of vertices of an opening through a thick wall must be at most 64, found 65",
        ),
        (
            sphere,
            0.5,
            "an opening must be a flat disc or polygon, found another shape",
        ),
    ] {
        assert_eq!(
            text(Opening::new(outer, depth, Walls::Reradiating)),
            expected
        );
    }
}

#[test]
fn walls_are_never_below_the_furnaces_own_bands() {
    let opening = round(1.0, Walls::Reradiating);
    for kelvin in [900.0, 1500.0, 1999.0, 3500.0] {
        let furnace = Emission::grey(kelvin, 0.9, 0.9).expect("a furnace");
        let parts = opening.emissions(&furnace).expect("a furnace");
        assert_eq!(parts.last(), Some(&furnace));
        for (part, share) in parts.iter().zip(opening.exitances()) {
            let wall = temperature(part.total);
            let own = Emission::grey(wall, 1.0, 1.0).expect("a wall");
            assert!((part.total / furnace.total - share).abs() < 1e-15);
            for (found, sent_on, emitted) in [
                (part.near_infrared, furnace.near_infrared, own.near_infrared),
                (part.skin, furnace.skin, own.skin),
                (part.blue_light, furnace.blue_light, own.blue_light),
                (part.infrared_a, furnace.infrared_a, own.infrared_a),
            ] {
                assert!(
                    found >= share * sent_on && (*share == 1.0 || found >= emitted),
                    "{kelvin} K, share {share}: {found}, {sent_on}, {emitted}"
                );
                if kelvin < 2000.0 {
                    assert_eq!(found, share * sent_on, "{kelvin} K, share {share}");
                }
            }
        }
    }
}

#[test]
fn reflections_add_up_to_the_gain() {
    let opening = round(2.0, Walls::Reradiating);
    let tunnel = Tunnel::new(Section::disc(1.0).expect("a disc"), 2.0).expect("a tunnel");
    // What the walls send back into the furnace, by their exitance.
    let returned = Rule::new(60).integral(0.0, 2.0, |x| {
        2.0 * tunnel.section().from_wall(2.0 - x) * tunnel.exitance(x)
    });
    let (mut sum, mut left) = (0.0, 1.0);
    for _ in 0..200 {
        sum += left;
        left *= 0.3 * returned;
    }
    let found = opening.reflection_gain(0.7).expect("an emissivity");
    assert!((found - sum).abs() < 1e-9, "{found} against {sum}");
}

#[test]
fn a_wall_gets_from_a_plane_what_the_planes_lose() {
    let hexagon = (0..6_u8)
        .map(|index| DVec2::from_angle(PI / 3.0 * f64::from(index)))
        .collect();
    for (section, tolerance) in [
        (Section::disc(0.7).expect("a disc"), 1e-12),
        (Section::rectangle(0.9, 0.7).expect("a rectangle"), 1e-12),
        (Section::rectangle(5.0, 0.1).expect("a rectangle"), 1e-12),
        (Section::slot(0.3).expect("a slot"), 1e-12),
        (Section::polygon(hexagon).expect("a hexagon"), 1e-6),
    ] {
        assert_eq!((section.through(0.0), section.from_wall(0.0)), (1.0, 0.5));
        for (from, to) in [(0.01, 0.02), (0.1, 0.2), (0.7, 1.0), (2.0, 3.0)] {
            let walls = SIXTEEN.integral(from, to, |x| section.from_wall(x));
            let lost = section.through(from) - section.through(to);
            let expected = section.outline_over_area() * walls;
            assert!(
                (lost - expected).abs() < tolerance,
                "{section:?} from {from} to {to}: {lost} against {expected}"
            );
        }
    }
}

#[test]
fn a_polygon_of_many_sides_is_a_disc() {
    let corners: Vec<DVec2> = (0..64_u8)
        .map(|index| DVec2::from_angle(PI / 32.0 * f64::from(index)))
        .collect();
    let polygon = Section::polygon(corners).expect("a polygon");
    // A disc of the same area over outline.
    let disc = Section::disc(2.0 / polygon.outline_over_area()).expect("a disc");
    for distance in [0.05, 0.5, 2.0] {
        let pairs = [
            (polygon.through(distance), disc.through(distance)),
            (polygon.from_wall(distance), disc.from_wall(distance)),
        ];
        for (found, expected) in pairs {
            assert!(
                (found - expected).abs() < 1e-3 * expected,
                "{distance}: {found} against {expected}"
            );
        }
    }
    assert!((polygon.least_width() - 2.0 * (PI / 64.0).cos()).abs() < 0.01);
}
