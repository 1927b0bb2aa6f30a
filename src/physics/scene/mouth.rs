//! What is seen through a straight mouth, with nothing else in the way: the
//! common case of tunnels and vessels, without the general overlay.

use std::f64::consts::PI;

use glam::DVec3;

use super::solid::Solid;
use crate::physics::region::Region;
use crate::physics::view::loops::Piece;
use crate::physics::view_factor::contour::Circle;

/// How far off one another's axis two outlines may lie, relative to their size.
const STRAIGHT: f64 = 1e-12;

/// Returns the outline of what is seen of a flat region through a mouth, less
/// what is seen there of another one.
///
/// None unless all of them are the same outline, without dents, moved straight
/// back: the mouth in front, then the region, then what it is less.
pub(super) fn seen(
    region: &Solid,
    through: Option<&Solid>,
    less: Option<&Solid>,
    point: DVec3,
) -> Option<Vec<Piece>> {
    let mouth = through.unwrap_or(region);
    let mut before = 0.0;
    for solid in [Some(region), less].into_iter().flatten() {
        let depth = straight_behind(&mouth.region, solid)?;
        if depth < before {
            return None;
        }
        before = depth;
    }
    let mut pieces = Vec::with_capacity(8);
    within(&mouth.region, &region.region, point, &mut pieces)?;
    if let Some(less) = less {
        let from = pieces.len();
        within(&mouth.region, &less.region, point, &mut pieces)?;
        for piece in &mut pieces[from..] {
            *piece = piece.reversed();
        }
    }
    Some(pieces)
}

/// How far straight behind a mouth the same outline lies; none if it is
/// another one, or has a dent.
fn straight_behind(mouth: &Region, solid: &Solid) -> Option<f64> {
    let depth = |way: DVec3, normal: DVec3, size: f64| {
        let depth = -way.dot(normal);
        let off = (way + normal * depth).length();
        (off <= STRAIGHT * (size + depth.abs()) && depth >= 0.0).then_some(depth)
    };
    match (mouth, &solid.region) {
        (
            Region::Disc {
                centre: one,
                normal,
                radius,
            },
            Region::Disc {
                centre: other,
                normal: turned,
                radius: own,
            },
        ) => ((own - radius).abs() <= STRAIGHT * radius && normal == turned)
            .then(|| depth(*other - *one, *normal, *radius))
            .flatten(),
        (
            Region::Polygon {
                vertices: ones,
                normal,
            },
            Region::Polygon {
                vertices: others,
                normal: turned,
            },
        ) => {
            if ones.len() != others.len() || normal != turned || !solid.convex {
                return None;
            }
            let first = others[0] - ones[0];
            let size = solid.radius;
            let rigid = ones.iter().zip(others).all(|(one, other)| {
                (*other - *one - first).length() <= STRAIGHT * (size + first.length())
            });
            rigid.then(|| depth(first, *normal, size)).flatten()
        }
        _ => None,
    }
}

/// Adds the outline of what is seen of a region within a mouth in front of it,
/// both in front of the point; none if rounding leaves that open.
fn within(mouth: &Region, region: &Region, point: DVec3, pieces: &mut Vec<Piece>) -> Option<()> {
    match (mouth, region) {
        (
            Region::Disc {
                centre: front,
                normal,
                radius,
            },
            Region::Disc { centre: back, .. },
        ) => discs(*front - point, *back - point, *normal, *radius, pieces),
        (
            Region::Polygon {
                vertices: front, ..
            },
            Region::Polygon { vertices: back, .. },
        ) => {
            polygons(front, back, point, pieces);
            Some(())
        }
        _ => None,
    }
}

/// Two equal discs on one axis: the deeper one is seen as a smaller circle in
/// the plane of the mouth.
fn discs(
    front: DVec3,
    back: DVec3,
    normal: DVec3,
    radius: f64,
    pieces: &mut Vec<Piece>,
) -> Option<()> {
    let scale = front.dot(normal) / back.dot(normal);
    let shift = back * scale - front;
    let shift = shift - normal * shift.dot(normal);
    let (apart, small) = (shift.length(), radius * scale);
    let circle = Circle::new(back, normal, radius);
    if apart + small <= radius {
        pieces.push(Piece::whole(circle));
        return Some(());
    }
    if apart >= radius + small {
        return Some(());
    }
    // Along the shift and across it, from the middle of the mouth.
    let along = shift / apart;
    let across = normal.cross(along);
    let foot = 0.5 * (apart + (radius - small) * (radius + small) / apart);
    let square = (radius - foot) * (radius + foot);
    if square.is_nan() || square <= 0.0 {
        return None;
    }
    let half = square.sqrt();
    let (left, right) = (
        front + along * foot + across * half,
        front + along * foot - across * half,
    );
    let open = half.atan2(foot);
    let shut = half.atan2(foot - apart);
    let mouth = Circle::new(front, normal, radius);
    // Where the shift points in each circle's own angles.
    let towards = |circle: &Circle| along.dot(circle.along()).atan2(along.dot(circle.away()));
    let (own, other) = (towards(&mouth), towards(&circle));
    pieces.push(Piece::Round {
        circle: mouth,
        start: own - open,
        stop: own + open,
        from: right,
        to: left,
    });
    pieces.push(Piece::Round {
        circle,
        start: other + shut,
        stop: other + 2.0 * PI - shut,
        from: left,
        to: right,
    });
    Some(())
}

/// A polygon cut along the planes through the point and a mouth's edges.
fn polygons(front: &[DVec3], back: &[DVec3], point: DVec3, pieces: &mut Vec<Piece>) {
    let mut left: Vec<DVec3> = back.iter().map(|vertex| *vertex - point).collect();
    let mut next = Vec::with_capacity(left.len() + front.len());
    let Some(mut from) = front.last().map(|vertex| *vertex - point) else {
        return;
    };
    for vertex in front {
        let to = *vertex - point;
        // Positive outside: the mouth runs anticlockwise as seen.
        let outwards = from.cross(to - from);
        let Some(mut before) = left.last().copied() else {
            return;
        };
        let mut off = before.dot(outwards);
        for place in left.drain(..) {
            let height = place.dot(outwards);
            if (off > 0.0) != (height > 0.0) {
                next.push(before + (place - before) * (off / (off - height)));
            }
            if height <= 0.0 {
                next.push(place);
            }
            (before, off) = (place, height);
        }
        std::mem::swap(&mut left, &mut next);
        from = to;
    }
    let Some(mut from) = left.last().copied() else {
        return;
    };
    for to in left {
        pieces.push(Piece::Straight { from, to });
        from = to;
    }
}
