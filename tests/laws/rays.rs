//! What is seen of a scene by rays alone: the check of the engine's outlines,
//! with nothing in common with them.

use std::f64::consts::{PI, TAU};

use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Looked, Part};
use glam::{DVec2, DVec3};
use proptest::prelude::*;

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

/// What lies below the receiver's horizon is marked by this in place of a barrier.
const BELOW: u16 = u16::MAX;

/// The flux vectors of what is seen of a part by itself, by scanning: lines
/// across the cone round it, on each the places where what is seen changes, as
/// closed in on by rays, and Gauss in between. What lies above the horizon of
/// `normal` and what lies below it are told apart.
fn scanned(
    parts: &[Part],
    barriers: &[Barrier],
    part: usize,
    from: DVec3,
    normal: DVec3,
    lines: u32,
) -> Vec<(Vec<u16>, DVec3)> {
    let region = &parts[part].region;
    let axis = (region.centre() - from).normalize();
    let (right, up) = axis.any_orthonormal_pair();
    let reach = {
        let sine = region.bounding_radius() / region.centre().distance(from);
        1.001 * sine / (1.0 - sine * sine).sqrt()
    };
    let seen = |x: f64, y: f64| {
        let way = axis + right * x + up * y;
        let mut through = is_seen(parts, barriers, part, from, way)?;
        if way.dot(normal) < 0.0 {
            through.push(BELOW);
        }
        Some(through)
    };
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
        stops.push(
            (-(normal.dot(axis) + x * normal.dot(right)) / normal.dot(up)).clamp(-reach, reach),
        );
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

/// Holds the glimpses of the first part against scans of rays, above and below
/// a horizon, to 1e-5 of the unobstructed factor.
pub fn agrees_with_rays(
    parts: &[Part],
    barriers: &[Barrier],
    point: DVec3,
    normal: DVec3,
    looked: &Looked,
    whole: f64,
) -> Result<(), TestCaseError> {
    // As many lines as it takes to tell.
    let mut worst = (f64::INFINITY, String::new());
    for lines in [600, 2400, 9600, 38_400] {
        worst = (0.0, String::new());
        let expected = scanned(parts, barriers, 0, point, normal, lines);
        let mut known: Vec<Vec<u16>> = expected
            .iter()
            .map(|(through, _)| through.clone())
            .collect();
        for glimpse in looked.of(0) {
            known.push(glimpse.through.to_vec());
            known.push(glimpse.through.iter().copied().chain([BELOW]).collect());
        }
        for through in known {
            let sum = expected
                .iter()
                .find(|(other, _)| *other == through)
                .map_or(DVec3::ZERO, |(_, sum)| *sum);
            let below = through.last() == Some(&BELOW);
            let named = &through[..through.len() - usize::from(below)];
            let found: DVec3 = looked
                .of(0)
                .iter()
                .filter(|glimpse| *glimpse.through == *named)
                .map(|glimpse| {
                    glimpse
                        .view
                        .clipped_flux(if below { -normal } else { normal })
                })
                .sum();
            let error = (found - sum).length() / whole;
            if error > worst.0 {
                worst = (
                    error,
                    format!("{found} against {sum} by {lines} lines of rays, through {through:?}"),
                );
            }
        }
        if worst.0 <= 1e-5 {
            break;
        }
    }
    prop_assert!(worst.0 <= 1e-5, "{}: {} of {whole}", worst.1, worst.0);
    Ok(())
}
