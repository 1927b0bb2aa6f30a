//! What holds for every configuration factor, in any scene.

use std::f64::consts::{PI, TAU};

use farglow::physics::region::Region;
use farglow::physics::view::{Sight, View};
use glam::{DQuat, DVec3};
use proptest::prelude::*;
use proptest::test_runner::RngSeed;

/// So many cases, the same ones every time.
pub fn config(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        failure_persistence: None,
        rng_seed: RngSeed::Fixed(1760),
        ..ProptestConfig::default()
    }
}

/// Points of a cube of 6 m.
pub fn place() -> impl Strategy<Value = DVec3> {
    [-3.0..3.0, -3.0..3.0, -3.0..3.0_f64].prop_map(DVec3::from_array)
}

/// Directions, evenly over the sphere.
pub fn heading() -> impl Strategy<Value = DVec3> {
    (-1.0..=1.0_f64, 0.0..TAU).prop_map(|(z, angle)| {
        let across = (1.0 - z * z).sqrt();
        DVec3::new(across * angle.cos(), across * angle.sin(), z)
    })
}

/// Discs, rectangles, polygons with and without dents, spheres, cylinders,
/// plates.
pub fn region() -> impl Strategy<Value = Region> {
    let size = 0.05..2.0_f64;
    prop_oneof![
        (place(), heading(), size.clone())
            .prop_map(
                |(centre, normal, radius)| Region::disc(centre, normal, radius).expect("a disc")
            ),
        (place(), heading(), heading(), size.clone(), size.clone()).prop_filter_map(
            "up along the normal",
            |(centre, normal, up, width, height)| {
                Region::rectangle(centre, normal, up, width, height).ok()
            }
        ),
        (
            place(),
            heading(),
            heading(),
            proptest::collection::vec(0.1..2.0_f64, 3..12)
        )
            .prop_filter_map("up along the normal", |(centre, normal, up, radii)| {
                let points: Vec<[f64; 2]> = star(&radii);
                Region::outline(centre, normal, up, &points).ok()
            }),
        (place(), size.clone())
            .prop_map(|(centre, radius)| Region::sphere(centre, radius).expect("a sphere")),
        (place(), heading(), size.clone(), size.clone()).prop_map(|(base, way, length, radius)| {
            Region::cylinder(base, way * (2.0 * length), 0.7 * radius).expect("a cylinder")
        }),
        (place(), heading(), heading(), size.clone(), size).prop_filter_map(
            "up along the normal",
            |(centre, normal, up, width, height)| {
                Region::plate(centre, normal, up, width, height).ok()
            }
        ),
    ]
}

/// A star-shaped outline: one radius at each of equal angles.
fn star(radii: &[f64]) -> Vec<[f64; 2]> {
    let count = radii.len() as f64;
    (0_u32..)
        .zip(radii)
        .map(|(index, radius)| {
            let angle = TAU * f64::from(index) / count;
            [radius * angle.cos(), radius * angle.sin()]
        })
        .collect()
}

/// The view of a region, if the point is off it and in front of it.
fn seen(region: &Region, point: DVec3) -> Option<View> {
    match region.view(point) {
        Sight::Seen(view) => Some(view),
        Sight::Behind | Sight::Touching => None,
    }
}

/// The region after a turn about the origin and a shift.
pub fn turned(region: &Region, turn: DQuat, shift: DVec3) -> Region {
    let moved = |place: DVec3| turn * place + shift;
    match region {
        Region::Disc {
            centre,
            normal,
            radius,
        } => Region::disc(moved(*centre), turn * *normal, *radius).expect("a disc"),
        Region::Polygon { vertices, .. } => {
            Region::polygon(vertices.iter().map(|vertex| moved(*vertex)).collect())
                .expect("a polygon")
        }
        Region::Sphere { centre, radius } => {
            Region::sphere(moved(*centre), *radius).expect("a sphere")
        }
        Region::Cylinder { base, axis, radius } => {
            Region::cylinder(moved(*base), turn * *axis, *radius).expect("a cylinder")
        }
        Region::Plate { vertices, normal } => Region::Plate {
            vertices: vertices.iter().map(|vertex| moved(*vertex)).collect(),
            normal: turn * *normal,
        },
    }
}

/// Gauss-Legendre points and weights on 0 to 1, 20 of them.
fn gauss() -> Vec<(f64, f64)> {
    let count = 20_u32;
    let order = f64::from(count);
    (1..=count)
        .map(|index| {
            let mut x = (PI * (f64::from(index) - 0.25) / (order + 0.5)).cos();
            let mut slope = 1.0;
            for _ in 0..50 {
                let (mut before, mut now) = (1.0, x);
                for degree in 2..=count {
                    let degree = f64::from(degree);
                    let next = ((2.0 * degree - 1.0) * x * now - (degree - 1.0) * before) / degree;
                    (before, now) = (now, next);
                }
                slope = order * (x * now - before) / (x * x - 1.0);
                x -= now / slope;
            }
            (0.5 * (1.0 + x), 1.0 / ((1.0 - x * x) * slope * slope))
        })
        .collect()
}

/// The factor by quadrature over the region's area, with nothing in common with
/// the contour: triangles by Gauss in two directions, discs in polar
/// coordinates, spheres over their cone of directions. Parts below the horizon
/// count as zero, which costs digits where there are any.
fn quadrature(region: &Region, point: DVec3, normal: DVec3, panels: u32) -> f64 {
    let rule = gauss();
    let mut sum = 0.0;
    let parts = f64::from(panels);
    let mut patch = |place: DVec3, own: DVec3, area: f64| {
        let way = place - point;
        let square = way.length_squared();
        let cosines = way.dot(normal).max(0.0) * (-way.dot(own)).max(0.0) / square;
        sum += cosines * area / (PI * square);
    };
    match region {
        Region::Disc {
            centre,
            normal: own,
            radius,
        } => {
            let (right, up) = own.any_orthonormal_pair();
            for ring in 0..panels {
                for (r, weight) in &rule {
                    let r = radius * (f64::from(ring) + r) / parts;
                    for sector in 0..panels {
                        for (a, share) in &rule {
                            let angle = TAU * (f64::from(sector) + a) / parts;
                            let place = *centre + (right * angle.cos() + up * angle.sin()) * r;
                            patch(
                                place,
                                *own,
                                weight * radius / parts * r * share * TAU / parts,
                            );
                        }
                    }
                }
            }
        }
        Region::Polygon {
            vertices,
            normal: own,
        }
        | Region::Plate {
            vertices,
            normal: own,
        } => {
            // Of a plate the face towards the point.
            let facing = (point - vertices[0]).dot(*own).signum();
            let own = *own * facing;
            // Triangles off the first vertex; those of a dent count negatively.
            for pair in vertices.windows(2).skip(1) {
                let (first, second) = (pair[0] - vertices[0], pair[1] - vertices[0]);
                let double = first.cross(second).dot(own) * facing;
                for row in 0..panels {
                    for column in 0..panels {
                        for (u, wu) in &rule {
                            for (v, wv) in &rule {
                                let u = (f64::from(row) + u) / parts;
                                let v = (f64::from(column) + v) / parts;
                                let place = vertices[0] + (first * (1.0 - v) + second * v) * u;
                                patch(place, own, double * u * wu * wv / (parts * parts));
                            }
                        }
                    }
                }
            }
        }
        Region::Cylinder { base, axis, radius } => {
            // Of the side what is turned to the point, then the end that is.
            let along = axis.normalize();
            let off = point - *base;
            let rise = off.dot(along);
            let across = off - along * rise;
            let offset = across.length();
            let towards = across / offset;
            let beside = along.cross(towards);
            let half = if offset > *radius {
                (radius / offset).acos()
            } else {
                0.0
            };
            let ends = [
                (rise > axis.length(), *axis, along),
                (rise < 0.0, DVec3::ZERO, -along),
            ];
            for band in 0..panels {
                for (a, weight) in &rule {
                    let share = (f64::from(band) + a) / parts;
                    for slice in 0..panels {
                        for (b, other) in &rule {
                            let part = (f64::from(slice) + b) / parts;
                            let angle = half * (2.0 * part - 1.0);
                            let own = towards * angle.cos() + beside * angle.sin();
                            let area = weight * other / (parts * parts);
                            patch(
                                *base + *axis * share + own * *radius,
                                own,
                                area * 2.0 * half * radius * axis.length(),
                            );
                            let turn = TAU * part;
                            let out =
                                (towards * turn.cos() + beside * turn.sin()) * (radius * share);
                            for (_, end, own) in ends.iter().filter(|(seen, _, _)| *seen) {
                                let area = area * TAU * radius * radius * share;
                                patch(*base + *end + out, *own, area);
                            }
                        }
                    }
                }
            }
        }
        Region::Sphere { centre, radius } => {
            let way = *centre - point;
            let axis = way.normalize();
            let (right, up) = axis.any_orthonormal_pair();
            let least = (1.0 - (radius / way.length()).powi(2)).sqrt();
            for ring in 0..panels {
                for (c, weight) in &rule {
                    let cosine = least + (1.0 - least) * (f64::from(ring) + c) / parts;
                    let sine = (1.0 - cosine * cosine).sqrt();
                    for sector in 0..panels {
                        for (a, share) in &rule {
                            let angle = TAU * (f64::from(sector) + a) / parts;
                            let ray =
                                axis * cosine + (right * angle.cos() + up * angle.sin()) * sine;
                            sum += ray.dot(normal).max(0.0) / PI * weight * (1.0 - least) / parts
                                * share
                                * TAU
                                / parts;
                        }
                    }
                }
            }
        }
    }
    sum
}

/// How near the point comes to the region, over the region's size: quadrature
/// is of use only well off it.
fn clearance(region: &Region, point: DVec3) -> f64 {
    let size = region.bounding_radius();
    let height = region.normal().map_or_else(
        || region.centre().distance(point) - size,
        |normal| (point - region.centre()).dot(normal),
    );
    height / size
}

proptest! {
    #![proptest_config(config(2000))]

    #[test]
    fn factor_lies_between_zero_and_one(region in region(), point in place(), normal in heading()) {
        if let Some(view) = seen(&region, point) {
            let factor = view.factor(normal);
            prop_assert!((0.0..=1.0).contains(&factor), "{factor}");
            let raw = view.clipped_flux(normal).dot(normal);
            prop_assert!((-1e-12..=1.0 + 1e-12).contains(&raw), "before rounding off: {raw}");
            prop_assert!(view.flux().length() <= 1.0 + 1e-12, "{}", view.flux().length());
        }
    }

    #[test]
    fn front_less_back_is_the_flux(region in region(), point in place(), normal in heading()) {
        if let Some(view) = seen(&region, point) {
            let (front, back, net) = (view.factor(normal), view.factor(-normal), view.flux().dot(normal));
            prop_assert!((front - back - net).abs() < 1e-12, "{front} - {back} against {net}");
            let parts = view.clipped_flux(normal) + view.clipped_flux(-normal);
            prop_assert!((parts - view.flux()).length() < 1e-12, "{parts} against {}", view.flux());
        }
    }

    #[test]
    fn turning_and_moving_the_scene_changes_nothing(region in region(), point in place(), normal in heading(), axis in heading(), angle in 0.0..TAU, shift in place()) {
        let turn = DQuat::from_axis_angle(axis, angle);
        let moved = turned(&region, turn, shift);
        if let (Some(here), Some(there)) = (seen(&region, point), seen(&moved, turn * point + shift)) {
            // Close above a flat source the factor itself is that sensitive.
            let slack = 1e-12 / clearance(&region, point).abs().min(1.0);
            let (here, there) = (here.factor(normal), there.factor(turn * normal));
            prop_assert!((here - there).abs() < slack, "{here} against {there}, slack {slack}");
        }
    }

    #[test]
    fn parts_of_a_split_polygon_add_up(radii in proptest::collection::vec(0.5..1.5_f64, 5..11), centre in place(), own in heading(), up in heading(), point in place(), normal in heading(), cut in 2..8_usize) {
        let points = star(&radii);
        prop_assume!(points.len() > cut + 1);
        // Split from the centre, which a star-shaped outline sees whole.
        let (first, second) = (&points[..=cut], &points[cut..]);
        let one: Vec<[f64; 2]> = std::iter::once([0.0, 0.0]).chain(first.iter().copied()).collect();
        let other: Vec<[f64; 2]> = std::iter::once([0.0, 0.0]).chain(second.iter().copied()).chain([points[0]]).collect();
        let made = |points: &[[f64; 2]]| Region::outline(centre, own, up, points).ok();
        let (Some(whole), Some(one), Some(other)) = (made(&points), made(&one), made(&other)) else { return Ok(()) };
        if let (Some(whole), Some(one), Some(other)) = (seen(&whole, point), seen(&one, point), seen(&other, point)) {
            let (whole, sum) = (whole.factor(normal), one.factor(normal) + other.factor(normal));
            prop_assert!((whole - sum).abs() < 1e-12, "{whole} against {sum}");
        }
    }

    #[test]
    fn farther_on_the_axis_is_never_hotter(region in region(), near in 0.01..20.0_f64, step in 1.0001..3.0_f64) {
        let axis = region.normal().unwrap_or(DVec3::X);
        let centre = region.centre();
        let off = if region.normal().is_some() { 0.0 } else { region.bounding_radius() };
        let at = |distance: f64| seen(&region, centre + axis * (off + distance)).map(|view| view.factor(-axis));
        if let (Some(here), Some(there)) = (at(near), at(near * step)) {
            prop_assert!(there <= here + 1e-13, "{there} at {} above {here} at {near}", near * step);
        }
    }

    #[test]
    fn no_scene_gives_a_nan(region in region(), scale in -9..12_i32, stretch in -6..6_i32, point in place(), normal in heading(), squash in -12..1_i32) {
        // Near and far, large and small, close to the plane and grazing.
        let size = 10_f64.powi(stretch);
        let region = match &region {
            Region::Disc { centre, normal, radius } => Region::disc(*centre * size, *normal, radius * size),
            Region::Polygon { vertices, .. } => Region::polygon(vertices.iter().map(|vertex| *vertex * size).collect()),
            Region::Sphere { centre, radius } => Region::sphere(*centre * size, radius * size),
            Region::Cylinder { base, axis, radius } => Region::cylinder(*base * size, *axis * size, radius * size),
            Region::Plate { vertices, normal } => Region::polygon(vertices.iter().map(|vertex| *vertex * size).collect()).map(|_| Region::Plate { vertices: vertices.iter().map(|vertex| *vertex * size).collect(), normal: *normal }),
        };
        let Ok(region) = region else { return Ok(()) };
        let centre = region.centre();
        let mut offset = point * 10_f64.powi(scale);
        if let Some(own) = region.normal() {
            offset -= own * offset.dot(own) * (1.0 - 10_f64.powi(squash));
        }
        for point in [centre + offset, centre + offset * 1e30, centre + offset * 1e290] {
            if let Sight::Seen(view) = region.view(point) {
                for normal in [normal, -normal, view.flux(), normal * 1e-200, DVec3::ZERO, DVec3::X] {
                    let (factor, flux) = (view.factor(normal), view.clipped_flux(normal));
                    prop_assert!((0.0..=1.0).contains(&factor) && flux.is_finite(), "{factor} {flux}");
                }
            }
            let _ = (region.touches(point), region.crosses(point, centre), region.crosses(point, -point));
            let edge = region.edge_along(normal);
            prop_assert!(edge.is_finite() && edge >= 0.0 && edge <= region.bounding_radius() * (1.0 + 1e-6), "{edge}");
        }
    }
}

proptest! {
    #![proptest_config(config(250))]

    #[test]
    fn contour_agrees_with_quadrature_of_the_area(region in region(), point in place(), normal in heading()) {
        prop_assume!(clearance(&region, point) > 0.5);
        let Some(view) = seen(&region, point) else { return Ok(()) };
        let (found, cut) = (view.factor(normal), view.reaches_below(normal) && view.reaches_below(-normal));
        // Where the horizon cuts, the integrand has a kink and Gauss loses digits.
        let (panels, tolerance) = if cut { (30, 2e-6) } else { (6, 1e-10) };
        let expected = quadrature(&region, point, normal, panels);
        prop_assert!((found - expected).abs() < tolerance, "{found} against {expected}, cut {cut}");
    }
}

/// A disc, a sphere and a square ten thousand times their size away: (R/d)² to 1e-9.
#[test]
fn far_away_no_digits_are_lost() {
    let tilt = DVec3::new(0.3, -0.4, 0.8).normalize();
    for distance in [1e2, 1e4, 1e6, 1e8] {
        let disc = Region::disc(DVec3::ZERO, tilt, 1.0).expect("a disc");
        let found = seen(&disc, tilt * distance)
            .expect("in front")
            .factor(-tilt);
        let expected = 1.0 / (1.0 + distance * distance);
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "disc at {distance}: {found:e} against {expected:e}"
        );
        let sphere = Region::sphere(DVec3::ZERO, 1.0).expect("a sphere");
        let found = seen(&sphere, tilt * distance)
            .expect("outside")
            .factor(-tilt);
        let expected = 1.0 / (distance * distance);
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "sphere at {distance}: {found:e} against {expected:e}"
        );
    }
    let square = Region::rectangle(DVec3::ZERO, tilt, DVec3::X, 1.0, 1.0).expect("a square");
    for distance in [1e2, 1e4] {
        let found = seen(&square, tilt * distance)
            .expect("in front")
            .factor(-tilt);
        // F = 1/(πd²) (1 − 1/(3 d²) + …) for a unit square on its axis.
        let expected = (1.0 - 1.0 / (3.0 * distance * distance)) / (PI * distance * distance);
        assert!(
            (found / expected - 1.0).abs() < 1e-8,
            "square at {distance}: {found:e} against {expected:e}"
        );
    }
}
