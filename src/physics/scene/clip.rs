//! The half of an occluder that lies in front of a plane.

use std::f64::consts::TAU;

use glam::DVec3;

use super::solid::{Plane, Solid, hull};
use crate::physics::region::Region;
use crate::physics::region::cylinder::Cylinder;
use crate::physics::view_factor::contour::Circle;
use crate::physics::visibility::Outline;

/// How many corners stand for a curve that is neither straight nor an arc.
const CORNERS: f64 = 360.0;

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

/// Returns the outline of what lies in front of a plane of a cylinder that the
/// plane cuts, as seen from a point in front of it and outside the body.
///
/// Cut square it keeps its exact outline; of any other cut the edge is an
/// ellipse, and the whole becomes a polygon of equal area.
pub(super) fn front_of_cylinder(occluder: &Solid, plane: Plane, point: DVec3) -> Option<Outline> {
    let Region::Cylinder { base, axis, radius } = &occluder.region else {
        return None;
    };
    let along = axis.normalize();
    if along.cross(plane.normal).length() < 1e-9 {
        return shortened(*base, *axis, *radius, plane)
            .and_then(|solid| solid.outline(point))
            .map(|(outline, _)| outline);
    }
    let mut places: Vec<DVec3> = Vec::new();
    let mut generator = |off: DVec3| {
        let (low, high) = (*base + off, *base + off + *axis);
        let (start, end) = (plane.height(low), plane.height(high));
        places.extend((start >= 0.0).then_some(low));
        places.extend((end >= 0.0).then_some(high));
        if (start >= 0.0) != (end >= 0.0) {
            places.push(low + *axis * (start / (start - end)));
        }
    };
    // From one tangent point to the other, in front and behind: the generators
    // of the silhouette stay exact, between them areas do.
    let across = (point - *base).reject_from_normalized(along);
    let towards = across.normalize_or(along.any_orthonormal_vector());
    let beside = along.cross(towards);
    let half = (radius / across.length().max(*radius)).acos();
    for (start, turn) in [(-half, 2.0 * half), (half, TAU - 2.0 * half)] {
        let count = (turn / TAU * CORNERS).ceil().max(1.0);
        let step = turn / count;
        let even = (step / step.sin().max(f64::MIN_POSITIVE)).sqrt();
        let mut corner = 0.0;
        while corner < count {
            let (sine, cosine) = (start + corner * step).sin_cos();
            let radius = if corner == 0.0 {
                *radius
            } else {
                radius * even
            };
            generator((towards * cosine + beside * sine) * radius);
            corner += 1.0;
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

/// Returns what a sphere that a plane cuts hides in front of it, as seen from a
/// point in front of it and outside the sphere.
///
/// The silhouette is the circle in which tangents touch the sphere. What of it
/// lies behind the plane gives way to the circle in which the plane cuts the
/// sphere, which touches the silhouette's cone where the three meet. So the
/// shadow is what lies in the silhouette on the front side of the plane through
/// the point and those two places, and what lies in the cut circle.
pub(super) fn front_of_sphere(
    centre: DVec3,
    radius: f64,
    plane: Plane,
    point: DVec3,
) -> Vec<(Outline, Option<Outline>)> {
    let mut found = Vec::new();
    let height = plane.height(centre);
    let cut = ((radius - height) * (radius + height)).max(0.0).sqrt();
    if cut > 0.0 {
        let foot = centre - plane.normal * height;
        let circle = Circle::new(foot - point, plane.normal, cut);
        found.extend(Outline::of_circle(circle).map(|outline| (outline, None)));
    }
    let way = point - centre;
    let distance = way.length();
    let (way, share) = (way / distance, radius / distance);
    let middle = centre + way * (radius * share);
    let wide = radius * ((1.0 - share) * (1.0 + share)).max(0.0).sqrt();
    let circle = Circle::new(middle - point, way, wide);
    let steep = plane.normal - way * plane.normal.dot(way);
    let slope = steep.length();
    let above = plane.height(middle);
    if above <= -wide * slope {
        return found;
    }
    let Some(outline) = Outline::of_circle(circle) else {
        return found;
    };
    if above >= wide * slope {
        return vec![(outline, None)];
    }
    let down = -above / slope;
    let half = ((wide - down) * (wide + down)).max(0.0).sqrt();
    let level = way.cross(steep) / slope;
    let foot = middle + steep * (down / slope) - point;
    let (from, to) = (foot - level * half, foot + level * half);
    let front = if (to - from).cross(from).dot(steep) >= 0.0 {
        Outline::of_front(from, to)
    } else {
        Outline::of_front(to, from)
    };
    if let Some(front) = front {
        found.push((outline, Some(front)));
    }
    found
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
