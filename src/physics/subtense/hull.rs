//! The angular dimensions of a set of rays, by its convex hull.

use glam::{DVec2, DVec3};

use super::Subtense;

/// Returns the greatest angle between two rays and the smallest one between
/// two planes through the origin that have all of them between them.
///
/// `rays` of any length, at least three, all with a component along `ahead`,
/// which has length one. The cost grows as the square of the hull's corners.
pub(super) fn subtense(rays: &[DVec3], ahead: DVec3) -> Subtense {
    let hull = hull(rays, ahead);
    let mut greatest = 0.0_f64;
    for (index, ray) in hull.iter().enumerate() {
        for other in &hull[index + 1..] {
            greatest = greatest.max(angle(*ray, *other));
        }
    }
    let smallest = narrowest(&hull);
    Subtense {
        // Above a right angle two corners may be nearer than two other points.
        greatest: greatest.max(smallest),
        smallest,
    }
}

/// The angle between two vectors, good for small ones too.
fn angle(one: DVec3, other: DVec3) -> f64 {
    // The cross product off the difference keeps the digits of near rays.
    one.cross(other - one).length().atan2(one.dot(other))
}

/// The narrowest pair of planes, one of which lies along a side of the hull.
fn narrowest(hull: &[DVec3]) -> f64 {
    let sides: Vec<DVec3> = hull
        .iter()
        .zip(hull.iter().cycle().skip(1))
        // Inwards, since the hull runs anticlockwise as seen from the origin.
        .filter_map(|(from, to)| from.cross(*to - *from).try_normalize())
        .collect();
    let mut smallest = std::f64::consts::PI;
    if sides.len() < 3 {
        // Edge on: no width at all.
        return 0.0;
    }
    for side in &sides {
        // The ray farthest from the side's plane, as an angle.
        let mut far = hull[0];
        let mut sine = f64::NEG_INFINITY;
        for ray in hull {
            let above = side.dot(*ray) / ray.length();
            if above > sine {
                (far, sine) = (*ray, above);
            }
        }
        // The plane through that ray which leans least away from the side's own.
        let ray = far.normalize_or_zero();
        let lid = (ray * sine - *side).normalize_or_zero();
        let slack = 1e-15;
        let holds_all = hull
            .iter()
            .all(|other| lid.dot(*other) >= -slack * other.length());
        if holds_all {
            smallest = smallest.min(sine.clamp(0.0, 1.0).asin());
        }
        // And the planes of the other sides.
        for other in &sides {
            let fold = side.cross(*other).length().atan2(-side.dot(*other));
            smallest = smallest.min(fold);
        }
    }
    smallest
}

/// The rays on the convex hull, anticlockwise as seen from the origin, by
/// Andrew's monotone chain on the plane that `ahead` is square to.
fn hull(rays: &[DVec3], ahead: DVec3) -> Vec<DVec3> {
    let right = ahead.any_orthonormal_vector();
    let up = ahead.cross(right);
    let mut flat: Vec<(DVec2, DVec3)> = rays
        .iter()
        .map(|ray| {
            let depth = ray.dot(ahead);
            (
                DVec2::new(ray.dot(right) / depth, ray.dot(up) / depth),
                *ray,
            )
        })
        .collect();
    flat.sort_by(|(a, _), (b, _)| a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y)));
    let mut hull: Vec<(DVec2, DVec3)> = Vec::with_capacity(flat.len() + 1);
    for pass in 0..2 {
        let start = hull.len();
        for point in &flat {
            while hull.len() >= start + 2 {
                let (a, b) = (hull[hull.len() - 2].0, hull[hull.len() - 1].0);
                if (b - a).perp_dot(point.0 - b) > 0.0 {
                    break;
                }
                let _ = hull.pop();
            }
            hull.push(*point);
        }
        let _ = hull.pop();
        if pass == 0 {
            flat.reverse();
        }
    }
    hull.into_iter().map(|(_, ray)| ray).collect()
}
