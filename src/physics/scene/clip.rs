//! The half of an occluder that lies in front of a plane.

use std::f64::consts::TAU;

use glam::DVec3;

use super::solid::{Plane, Solid, hull};
use crate::physics::region::Region;
use crate::physics::region::cylinder::Cylinder;
use crate::physics::visibility::Outline;

/// How many corners stand for a curve that is neither straight nor an arc.
const CORNERS: u32 = 240;

/// Returns the outline of what lies left of the line in which the plane of a
/// flat occluder meets another plane, as seen from a point: the side in front
/// of that other plane, on which the point lies too.
pub(super) fn front_of_flat(occluder: &Solid, plane: Plane, point: DVec3) -> Option<Outline> {
    let own = occluder.plane()?;
    let way = own.normal.cross(plane.normal);
    let square = way.length_squared();
    if square == 0.0 {
        return None;
    }
    // The place of the line that is nearest to the occluder's middle.
    let down = way.cross(own.normal);
    let middle = occluder.centre - down * (plane.height(occluder.centre) / down.dot(plane.normal));
    let reach = way * (1.01 * occluder.radius / square.sqrt());
    let (from, to) = (middle - reach - point, middle + reach - point);
    // A place of the occluder's plane lies in front where this is positive: see
    // there h (ω·m) + d s > 0 with s = −n·ω.
    let height = own.height(point);
    let towards = plane.normal * height - own.normal * plane.height(point);
    let towards = towards * height.signum();
    if (to - from).cross(from).dot(towards) >= 0.0 {
        Outline::of_front(from, to)
    } else {
        Outline::of_front(to, from)
    }
}

/// Returns the outline of what lies in front of a plane of a body that the
/// plane cuts, as seen from a point in front of it and outside the body.
///
/// A cylinder cut square keeps its exact outline; of any other cut the edge is
/// a curve that becomes a polygon of equal area.
pub(super) fn front_of_body(occluder: &Solid, plane: Plane, point: DVec3) -> Option<Outline> {
    let step = TAU / f64::from(CORNERS);
    let even = (step / step.sin()).sqrt();
    let mut places: Vec<DVec3> = Vec::new();
    match &occluder.region {
        Region::Cylinder { base, axis, radius } => {
            let along = axis.normalize();
            if along.cross(plane.normal).length() < 1e-9 {
                return shortened(*base, *axis, *radius, plane)
                    .and_then(|solid| solid.outline(point))
                    .map(|(outline, _)| outline);
            }
            let (right, up) = along.any_orthonormal_pair();
            for corner in 0..CORNERS {
                let angle = f64::from(corner) * step;
                let off = (right * angle.cos() + up * angle.sin()) * (radius * even);
                let (low, high) = (*base + off, *base + off + *axis);
                let (start, end) = (plane.height(low), plane.height(high));
                places.extend((start >= 0.0).then_some(low));
                places.extend((end >= 0.0).then_some(high));
                if (start >= 0.0) != (end >= 0.0) {
                    places.push(low + *axis * (start / (start - end)));
                }
            }
            // Where the rims themselves pass the plane.
            let steep = plane.normal - along * plane.normal.dot(along);
            let slope = steep.length();
            let level = along.cross(steep) / slope;
            for centre in [*base, *base + *axis] {
                let down = -plane.height(centre) / slope;
                let half = (radius - down) * (radius + down);
                if half > 0.0 {
                    let middle = centre + steep * (down / slope);
                    places.push(middle + level * half.sqrt());
                    places.push(middle - level * half.sqrt());
                }
            }
        }
        Region::Sphere { centre, radius } => {
            let height = plane.height(*centre);
            let cut = ((radius - height) * (radius + height)).max(0.0).sqrt() * even;
            let (right, up) = plane.normal.any_orthonormal_pair();
            let foot = *centre - plane.normal * height;
            // The silhouette: the circle in which tangents touch the sphere.
            let way = point - *centre;
            let distance = way.length();
            let share = radius / distance;
            let wide = radius * ((1.0 - share) * (1.0 + share)).max(0.0).sqrt() * even;
            let (beside, above) = (way / distance).any_orthonormal_pair();
            for corner in 0..CORNERS {
                let (sine, cosine) = (f64::from(corner) * step).sin_cos();
                places.push(foot + (right * cosine + up * sine) * cut);
                let place =
                    *centre + way * (share * share) + (beside * cosine + above * sine) * wide;
                places.extend((plane.height(place) >= 0.0).then_some(place));
            }
        }
        _ => return None,
    }
    let axis = (occluder.nearest(point) - point).try_normalize()?;
    let flat: Vec<DVec3> = places
        .into_iter()
        .map(|place| {
            let way = place - point;
            way / way.dot(axis).max(f64::MIN_POSITIVE)
        })
        .filter(|place| place.is_finite())
        .collect();
    let corners = hull(&flat, -axis);
    (corners.len() >= 3).then(|| Outline::of_polygon(&corners, -axis, true))
}

/// The part of a cylinder in front of a plane that cuts it square.
fn shortened(base: DVec3, axis: DVec3, radius: f64, plane: Plane) -> Option<Solid> {
    let along = axis.normalize();
    let cylinder = Cylinder::new(base, axis, radius);
    let cut = -plane.height(base) / along.dot(plane.normal);
    let (from, to) = if along.dot(plane.normal) > 0.0 {
        (cut.clamp(0.0, cylinder.length), cylinder.length)
    } else {
        (0.0, cut.clamp(0.0, cylinder.length))
    };
    (to > from).then(|| {
        Solid::new(Region::Cylinder {
            base: base + along * from,
            axis: along * (to - from),
            radius,
        })
    })
}
