//! Configuration factors from a small flat element to a sphere.
//!
//! Lengths in metres: the sphere's radius, the distance of its centre.

use glam::DVec3;

use super::contour::Circle;
use crate::physics::Error;
use crate::physics::error::length;

/// Returns the configuration factor from a small flat element to a sphere, the
/// element's normal at an angle to the direction of the sphere's centre.
///
/// `radius` R of the sphere, `distance` d of its centre, in metres; `tilt` in
/// radians, in `0..=π`. Where the element's plane cuts the sphere only the part
/// in front counts.
///
/// # Accuracy
///
/// Exact relation: (R/d)² cos(tilt) where all of the sphere is in front, with a
/// relative error below `1e-15`; else absolute error below `1e-14`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m, the
/// distance does not exceed the radius, or the tilt is not in `0..=π`.
///
/// # Source
///
/// Howell's catalogue, element to sphere; checked in
/// `tests/published/view_factor_catalogue.rs`, family `sphere_tilt`.
pub fn from_tilted_element(radius: f64, distance: f64, tilt: f64) -> Result<f64, Error> {
    let radius = length("radius", radius)?;
    let distance = length("distance", distance)?;
    if distance <= radius {
        return Err(Error::OutOfRange {
            parameter: "distance",
            range: "above the sphere's radius",
            value: distance,
        });
    }
    if !(0.0..=std::f64::consts::PI).contains(&tilt) {
        return Err(Error::OutOfRange {
            parameter: "tilt",
            range: "from 0 to π",
            value: tilt,
        });
    }
    let (sine, cosine) = tilt.sin_cos();
    let share = radius / distance;
    let normal = DVec3::new(sine, 0.0, cosine);
    // In sin and cos: tilt + asin(R/d) within a right angle.
    if cosine >= share {
        return Ok(share * share * cosine);
    }
    let (centre, towards, radius) = silhouette(DVec3::Z, radius, distance);
    let circle = Circle::new(centre, towards, radius);
    Ok(circle.above(normal).dot(normal).clamp(0.0, 1.0))
}

/// Returns the circle that bounds what is seen of a sphere, on the unit sphere
/// about the receiver: its centre, its normal towards the receiver, its radius.
///
/// `direction` of the centre, of length one; the receiver lies outside.
#[must_use]
pub(in crate::physics) fn silhouette(
    direction: DVec3,
    radius: f64,
    distance: f64,
) -> (DVec3, DVec3, f64) {
    let cosine = ((distance - radius) * (distance + radius)).sqrt() / distance;
    (direction * cosine, -direction, radius / distance)
}
