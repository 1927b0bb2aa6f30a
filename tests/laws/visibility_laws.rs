//! What is seen past what hides it: against rays, and by what must hold.

use std::f64::consts::{PI, TAU};

use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Looked, Part, Scene, Stance};
use farglow::physics::view::View;
use glam::{DQuat, DVec2, DVec3};
use proptest::prelude::*;

use crate::view_factor_laws::{config, place, region, turned};

/// Where a ray from the origin of `way` first meets a region, as a share of the
/// way: written for this check alone, by the textbook relations.
fn first_hit(region: &Region, from: DVec3, way: DVec3, both_sides: bool) -> Option<f64> {
    let on_plane = |on: DVec3, normal: DVec3, both: bool| {
        let down = way.dot(normal);
        if down == 0.0 || (!both && down > 0.0) {
            return None;
        }
        let share = (on - from).dot(normal) / down;
        (share > 0.0).then_some(share)
    };
    match region {
        Region::Disc {
            centre,
            normal,
            radius,
        } => on_plane(*centre, *normal, both_sides)
            .filter(|share| (from + way * *share).distance(*centre) < *radius),
        Region::Polygon { vertices, normal } | Region::Plate { vertices, normal } => {
            let both = both_sides || matches!(region, Region::Plate { .. });
            on_plane(vertices[0], *normal, both).filter(|share| {
                // The angle that the outline turns about the place: zero outside.
                let place = from + way * *share;
                let mut turned = 0.0;
                for (index, vertex) in vertices.iter().enumerate() {
                    let (a, b) = (
                        *vertex - place,
                        vertices[(index + 1) % vertices.len()] - place,
                    );
                    turned += normal.dot(a.cross(b)).atan2(a.dot(b));
                }
                turned.abs() > PI
            })
        }
        Region::Sphere { centre, radius } => {
            let off = from - *centre;
            let (a, b, c) = (
                way.length_squared(),
                way.dot(off),
                off.length_squared() - radius * radius,
            );
            let root = b * b - a * c;
            let share = (-b - root.max(0.0).sqrt()) / a;
            (root > 0.0 && share > 0.0).then_some(share)
        }
        Region::Cylinder { base, axis, radius } => {
            let length = axis.length();
            let along = *axis / length;
            let off = from - *base;
            let (rise, start) = (way.dot(along), off.dot(along));
            let (flat, side) = (way - along * rise, off - along * start);
            let (a, b, c) = (
                flat.length_squared(),
                flat.dot(side),
                side.length_squared() - radius * radius,
            );
            let mut best: Option<f64> = None;
            let root = b * b - a * c;
            if a > 0.0 && root > 0.0 {
                let share = (-b - root.sqrt()) / a;
                let height = start + share * rise;
                if share > 0.0 && (0.0..=length).contains(&height) {
                    best = Some(share);
                }
            }
            for end in [0.0, length] {
                let share = (end - start) / rise;
                let place = side + flat * share;
                if share.is_finite()
                    && share > 0.0
                    && place.length() < *radius
                    && best.is_none_or(|found| share < found)
                {
                    best = Some(share);
                }
            }
            best
        }
    }
}

/// Whether a part is seen along a ray, and through which clear barriers.
fn is_seen(
    parts: &[Part],
    barriers: &[Barrier],
    part: usize,
    from: DVec3,
    way: DVec3,
) -> Option<Vec<u16>> {
    let target = &parts[part];
    let far = first_hit(&target.region, from, way, false)? * (1.0 - 1e-9);
    if let Some(through) = &target.through {
        let _ = first_hit(through, from, way, false)?;
    }
    if let Some(less) = &target.less
        && first_hit(less, from, way, false).is_some()
    {
        return None;
    }
    for (other, body) in parts.iter().enumerate() {
        let hides = !matches!(body.region, Region::Disc { .. } | Region::Polygon { .. });
        if hides
            && other != part
            && first_hit(&body.region, from, way, true).is_some_and(|near| near < far)
        {
            return None;
        }
    }
    let mut passed = Vec::new();
    for (index, barrier) in barriers.iter().enumerate() {
        if first_hit(&barrier.region, from, way, true).is_some_and(|near| near < far) {
            if !barrier.clear {
                return None;
            }
            passed.push(u16::try_from(index).expect("few barriers"));
        }
    }
    Some(passed)
}

/// Ways near which what is seen may change: edges, rims, silhouettes, and the
/// lines in which flat regions meet. Only the scan's lines are parted by them;
/// where what is seen does change, rays decide.
fn edges(parts: &[Part], barriers: &[Barrier], from: DVec3) -> Vec<Vec<DVec3>> {
    let ring = |centre: DVec3, normal: DVec3, radius: f64| -> Vec<DVec3> {
        let (right, up) = normal.normalize().any_orthonormal_pair();
        (0..=300_u32)
            .map(|step| {
                let angle = TAU * f64::from(step) / 300.0;
                centre + (right * angle.cos() + up * angle.sin()) * radius
            })
            .collect()
    };
    let regions: Vec<&Region> = parts
        .iter()
        .flat_map(|part| {
            [
                Some(&part.region),
                part.through.as_ref(),
                part.less.as_ref(),
            ]
        })
        .flatten()
        .chain(barriers.iter().map(|barrier| &barrier.region))
        .collect();
    let mut ways = Vec::new();
    for (index, region) in regions.iter().enumerate() {
        match region {
            Region::Disc {
                centre,
                normal,
                radius,
            } => ways.push(ring(*centre, *normal, *radius)),
            Region::Polygon { vertices, .. } | Region::Plate { vertices, .. } => {
                ways.push(vertices.iter().chain(&vertices[..1]).copied().collect());
            }
            Region::Sphere { centre, radius } => {
                let way = from - *centre;
                let share = radius / way.length();
                let wide = radius * (1.0 - share * share).max(0.0).sqrt();
                ways.push(ring(*centre + way * (share * share), way, wide));
            }
            Region::Cylinder { base, axis, radius } => {
                ways.extend([*base, *base + *axis].map(|end| ring(end, *axis, *radius)));
                let along = axis.normalize();
                let across = (from - *base).reject_from(along);
                let share = radius / across.length();
                if share < 1.0 {
                    let beside = along.cross(across) * (share * (1.0 - share * share).sqrt());
                    for side in [beside, -beside] {
                        let foot = *base + across * (share * share) + side;
                        ways.push(vec![foot, foot + *axis]);
                    }
                }
            }
        }
        for other in &regions[..index] {
            if let (Some(one), Some(two)) = (region.normal(), other.normal()) {
                let way = one.cross(two);
                let (a, b) = (one.dot(region.centre()), two.dot(other.centre()));
                let square = way.length_squared();
                let on = (two.cross(way) * a + way.cross(one) * b) / square;
                let middle = on + way * way.dot(region.centre() - on) / square;
                let reach = way.normalize_or_zero() * 4.0;
                ways.push(
                    (-20..=20)
                        .map(|step| middle + reach * f64::from(step) / 20.0)
                        .collect(),
                );
            }
        }
    }
    ways
}

/// The flux vectors of what is seen of a part by itself, by scanning: lines
/// across the cone round it, on each the places where what is seen changes, as
/// closed in on by rays, and Gauss in between.
fn scanned(
    parts: &[Part],
    barriers: &[Barrier],
    part: usize,
    from: DVec3,
    lines: u32,
) -> Vec<(Vec<u16>, DVec3)> {
    let region = &parts[part].region;
    let axis = (region.centre() - from).normalize();
    let (right, up) = axis.any_orthonormal_pair();
    let reach = {
        let sine = region.bounding_radius() / region.centre().distance(from);
        1.001 * sine / (1.0 - sine * sine).sqrt()
    };
    let seen = |x: f64, y: f64| is_seen(parts, barriers, part, from, axis + right * x + up * y);
    let mut curves: Vec<[DVec2; 2]> = Vec::new();
    for way in edges(parts, barriers, from) {
        for pair in way.windows(2) {
            // Only what lies in front of the point.
            let (a, b) = (pair[0] - from, pair[1] - from);
            let (near, far) = (a.dot(axis) - 1e-4, b.dot(axis) - 1e-4);
            let middle = a + (b - a) * (near / (near - far));
            let (a, b) = match (near > 0.0, far > 0.0) {
                (true, true) => (a, b),
                (true, false) => (a, middle),
                (false, true) => (middle, b),
                (false, false) => continue,
            };
            curves.push([a, b].map(|way| DVec2::new(way.dot(right), way.dot(up)) / way.dot(axis)));
        }
    }
    let mut sums: Vec<(Vec<u16>, DVec3)> = Vec::new();
    let step = 2.0 * reach / f64::from(lines);
    for line in 0..lines {
        let x = -reach + (f64::from(line) + 0.5) * step;
        let mut stops: Vec<f64> = curves
            .iter()
            .filter(|[a, b]| (a.x > x) != (b.x > x))
            .map(|[a, b]| a.y + (b.y - a.y) * (x - a.x) / (b.x - a.x))
            .filter(|y| y.abs() < reach)
            .collect();
        stops.extend((0..=40_u32).map(|stop| reach * (f64::from(stop) / 20.0 - 1.0)));
        stops.sort_by(f64::total_cmp);
        // Where what is seen changes, and what is seen from there on.
        let mut changes: Vec<(f64, Option<Vec<u16>>)> = vec![(-reach, None)];
        let mut low = -reach;
        for pair in stops.windows(2) {
            let next = 0.5 * (pair[0] + pair[1]);
            let then = seen(x, next);
            if changes[changes.len() - 1].1 != then {
                let mut high = next;
                for _ in 0..45 {
                    let middle = 0.5 * (low + high);
                    if seen(x, middle) == then {
                        high = middle;
                    } else {
                        low = middle;
                    }
                }
                changes.push((high, then));
            }
            low = next;
        }
        changes.push((reach, None));
        for pair in changes.windows(2) {
            let ((start, through), (end, _)) = (&pair[0], &pair[1]);
            let Some(through) = through else { continue };
            let (middle, half) = (0.5 * (start + end), 0.5 * (end - start));
            let mut sum = DVec3::ZERO;
            for (place, weight) in GAUSS {
                for place in [place, -place] {
                    let way = axis + right * x + up * (middle + half * place);
                    let square = way.length_squared();
                    sum += way * (weight * half * step / (square * square * PI));
                }
            }
            match sums.iter_mut().find(|(other, _)| other == through) {
                Some((_, total)) => *total += sum,
                None => sums.push((through.clone(), sum)),
            }
        }
    }
    sums.sort_by(|one, other| one.0.cmp(&other.0));
    sums
}

const GAUSS: [(f64, f64); 4] = [
    (0.183_434_642_495_649_8, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887_27),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_48),
    (0.960_289_856_497_536_3, 0.101_228_536_290_376_26),
];

/// Parts that are all seen from anywhere.
fn bare(regions: &[Region]) -> Vec<Part> {
    regions.iter().cloned().map(Part::bare).collect()
}

fn solid(regions: &[Region]) -> Vec<Barrier> {
    regions.iter().cloned().map(Barrier::solid).collect()
}

/// The flux of all that is seen of a part.
fn flux(looked: &Looked, part: usize) -> DVec3 {
    looked
        .of(part)
        .iter()
        .map(|glimpse| glimpse.view.flux())
        .sum()
}

/// The view of a region by itself.
fn alone(region: &Region, point: DVec3) -> Option<View> {
    region.view(point).into_view()
}

/// A point some way off a part, barriers between the two.
fn between(part: &Region, point: DVec3, barriers: Vec<Region>, shares: &[f64]) -> Vec<Region> {
    barriers
        .into_iter()
        .zip(shares)
        .map(|(barrier, share)| {
            let there = point.lerp(part.centre(), *share);
            turned(&barrier, DQuat::IDENTITY, (there - barrier.centre()) * 0.85)
        })
        .collect()
}

prop_compose! {
    fn scene()(
        part in region(),
        others in proptest::collection::vec(region(), 0..3),
        point in place(),
        barriers in proptest::collection::vec(region(), 1..5),
        shares in proptest::collection::vec(0.2..0.9_f64, 5),
        clear in proptest::collection::vec(any::<bool>(), 5),
    ) -> (Vec<Part>, Vec<Barrier>, DVec3) {
        let mut parts = bare(std::slice::from_ref(&part));
        parts.extend(bare(&others));
        let barriers = between(&part, point, barriers, &shares)
            .into_iter()
            .zip(clear)
            .map(|(region, clear)| Barrier { region, clear })
            .collect();
        (parts, barriers, point)
    }
}

proptest! {
    #![proptest_config(config(3000))]

    #[test]
    fn what_is_hidden_and_what_is_seen_make_all((parts, barriers, point) in scene()) {
        // Clear barriers part what is seen; the pieces make up the whole.
        let clear: Vec<Barrier> = barriers.iter().map(|barrier| Barrier::clear(barrier.region.clone())).collect();
        let Ok(scene) = Scene::new(parts[..1].to_vec(), clear) else { return Ok(()) };
        let looked = scene.look(point);
        if let Some(view) = alone(&parts[0].region, point) {
            let (sum, all) = (flux(&looked, 0), view.flux());
            prop_assert!((sum - all).length() <= 1e-11 * all.length() + 1e-14, "{sum} against {all}");
        }
        // Behind solid ones remains what passes none of the clear ones.
        let solid = solid(&barriers.iter().map(|barrier| barrier.region.clone()).collect::<Vec<_>>());
        let hidden = Scene::new(parts[..1].to_vec(), solid).expect("as before").look(point);
        let free: DVec3 = looked.of(0).iter().filter(|glimpse| glimpse.through.is_empty()).map(|glimpse| glimpse.view.flux()).sum();
        let left = flux(&hidden, 0);
        prop_assert!((free - left).length() <= 1e-11, "{free} against {left}");
    }
}

proptest! {
    #![proptest_config(config(60))]

    #[test]
    fn what_is_seen_agrees_with_rays((parts, barriers, point) in scene()) {
        let Ok(scene) = Scene::new(parts.clone(), barriers.clone()) else { return Ok(()) };
        let looked = scene.look(point);
        prop_assume!(looked.touched_barrier().is_none() && looked.touched().is_none());
        let Some(view) = alone(&parts[0].region, point) else { return Ok(()) };
        let region = &parts[0].region;
        prop_assume!(region.centre().distance(point) > 1.3 * region.bounding_radius());
        prop_assume!(view.flux().length() > 1e-4);
        let whole = view.flux().length();
        // As many lines as it takes to tell.
        let mut worst = (f64::INFINITY, String::new());
        for lines in [600, 2400, 9600, 38_400] {
            worst = (0.0, String::new());
            let expected = scanned(&parts, &barriers, 0, point, lines);
            let unseen = looked.of(0).iter().map(|glimpse| (glimpse.through.to_vec(), DVec3::ZERO));
            for (through, sum) in expected.iter().cloned().chain(unseen.filter(|(through, _)| expected.iter().all(|(other, _)| other != through))) {
                let found: DVec3 = looked.of(0).iter().filter(|glimpse| *glimpse.through == *through).map(|glimpse| glimpse.view.flux()).sum();
                let error = (found - sum).length() / whole;
                if error > worst.0 {
                    worst = (error, format!("{found} against {sum} by {lines} lines of rays, through {through:?}"));
                }
            }
            if worst.0 <= 1e-5 {
                break;
            }
        }
        prop_assert!(worst.0 <= 1e-5, "{}: {} of {whole}", worst.1, worst.0);
        prop_assert!(looked.stance(0) == Stance::InFront || looked.of(0).is_empty());
    }
}

/// Regions on a lattice, as people draw them: edges in line, in one plane, end
/// to end.
fn lattice_region() -> impl Strategy<Value = Region> {
    let whole = |low: i32, high: i32| (low..=high).prop_map(f64::from);
    let spot = [whole(-2, 2), whole(-2, 2), whole(-2, 2)].prop_map(DVec3::from_array);
    let axis = prop_oneof![
        Just(DVec3::X),
        Just(DVec3::Y),
        Just(DVec3::Z),
        Just(DVec3::NEG_X),
        Just(DVec3::NEG_Y),
        Just(DVec3::NEG_Z)
    ];
    (spot, axis, whole(1, 3), whole(1, 3), 0..6_u8).prop_map(|(spot, axis, wide, high, kind)| {
        let up = if axis.z == 0.0 { DVec3::Z } else { DVec3::X };
        match kind {
            0 => Region::disc(spot, axis, 0.5 * wide),
            1 => Region::sphere(spot, 0.5 * wide),
            2 => Region::cylinder(spot, axis * high, 0.5 * wide),
            3 => Region::plate(spot, axis, up, wide, high),
            4 => Region::outline(
                spot,
                axis,
                up,
                &[
                    [0.0, 0.0],
                    [wide, 0.0],
                    [wide, high],
                    [0.5 * wide, 0.5],
                    [0.0, high],
                ],
            ),
            _ => Region::rectangle(spot, axis, up, wide, high),
        }
        .expect("a possible region")
    })
}

proptest! {
    #![proptest_config(config(6000))]

    #[test]
    fn edges_in_line_leave_no_gap(part in lattice_region(), barriers in proptest::collection::vec(lattice_region(), 1..5), spot in [-6..=6_i32, -6..=6_i32, -6..=6_i32], jitter in place()) {
        let point = DVec3::from_array(spot.map(|at| 0.5 * f64::from(at)));
        let clear: Vec<Barrier> = barriers.iter().cloned().map(Barrier::clear).collect();
        let Ok(scene) = Scene::new(bare(std::slice::from_ref(&part)), clear) else { return Ok(()) };
        let looked = scene.look(point);
        let Some(view) = alone(&part, point) else { return Ok(()) };
        let (sum, all) = (flux(&looked, 0), view.flux());
        prop_assert!((sum - all).length() <= 1e-11, "{sum} against {all}");
        let hidden = Scene::new(bare(std::slice::from_ref(&part)), solid(&barriers)).expect("as before");
        let here = hidden.look(point);
        let free: DVec3 = looked.of(0).iter().filter(|glimpse| glimpse.through.is_empty()).map(|glimpse| glimpse.view.flux()).sum();
        prop_assert!((free - flux(&here, 0)).length() <= 1e-11, "{free} against {}", flux(&here, 0));
        // A hair off everything is nearly the same.
        let there = hidden.look(point + jitter * 1e-9);
        if here.touched_barrier().is_some() || there.touched_barrier().is_some() || there.touched().is_some() {
            return Ok(());
        }
        let (here, there) = (flux(&here, 0), flux(&there, 0));
        prop_assert!((here - there).length() <= 1e-6, "{here} against {there} a hair off");
    }
}
