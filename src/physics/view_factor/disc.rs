//! Configuration factors from a small flat element to a disc.
//!
//! Lengths in metres: the disc's radius, the element's distance from the disc's
//! plane, its offset from the disc's axis.

use glam::DVec3;

use super::contour::Circle;
use crate::physics::Error;
use crate::physics::error::{length, offset as checked_offset};

/// Returns the configuration factor from a small flat element to a disc, the
/// element parallel to the disc and on its axis.
///
/// `radius` R is the disc's radius and `distance` h that of the element from
/// the disc's plane, both in metres.
///
/// # Accuracy
///
/// Exact relation R²/(R² + h²); relative error below `1e-15`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
///
/// # Source
///
/// Howell, *A Catalog of Radiation Heat Transfer Configuration Factors*,
/// differential element to coaxial disc (B-12 from memory). Checked in
/// `tests/published/view_factor_catalogue.rs`, family `disc_axis`.
///
/// # Examples
///
/// ```
/// use farglow::physics::view_factor::disc;
///
/// assert_eq!(disc::from_coaxial_element(1.0, 1.0)?, 0.5);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn from_coaxial_element(radius: f64, distance: f64) -> Result<f64, Error> {
    let radius = length("radius", radius)?;
    let distance = length("distance", distance)?;
    let ratio = distance / radius;
    Ok(1.0 / (1.0 + ratio * ratio))
}

/// Returns the configuration factor from a small flat element to a disc, the
/// element parallel to the disc at any offset from its axis.
///
/// `radius` R, `distance` h from the disc's plane and `offset` l from its
/// axis, in metres; the offset may be zero.
///
/// # Accuracy
///
/// Exact relation; relative error below `1e-14` for distances of at least a
/// millionth of the radius.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m (the offset: from
/// zero) to 10⁹ m.
///
/// # Source
///
/// ½ [1 − (h² + l² − R²)/√((h² + l² + R²)² − 4l²R²)], catalogue form, rewritten
/// with positive terms. Checked in `tests/published/view_factor_catalogue.rs`,
/// family `disc_parallel`.
pub fn from_parallel_element(radius: f64, distance: f64, offset: f64) -> Result<f64, Error> {
    let radius = length("radius", radius)?;
    let distance = length("distance", distance)?;
    let offset = checked_offset("offset", offset)?;
    Ok(components(radius, distance, offset).0)
}

/// Returns the configuration factor from a small flat element to a disc, the
/// element's normal parallel to the disc and towards its axis.
///
/// `radius` R, `distance` h from the disc's plane and `offset` l from its
/// axis, in metres; the offset may be zero. Where the element's plane cuts the
/// disc (l < R) only the part in front of it counts.
///
/// # Accuracy
///
/// Exact relation; relative error below `1e-14` where l ≥ R, absolute error
/// below `1e-14` where the disc is cut.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m (the offset: from
/// zero) to 10⁹ m.
///
/// # Source
///
/// For l ≥ R h/(2l) [Z/√(Z² − 4l²R²) − 1] with Z = h² + l² + R², catalogue form,
/// rewritten with positive terms; else [`Circle::above`]. Checked in
/// `tests/published/view_factor_catalogue.rs`, families `disc_perpendicular`
/// and `disc_perpendicular_cut`.
pub fn from_perpendicular_element(radius: f64, distance: f64, offset: f64) -> Result<f64, Error> {
    let radius = length("radius", radius)?;
    let distance = length("distance", distance)?;
    let offset = checked_offset("offset", offset)?;
    if offset >= radius {
        return Ok(components(radius, distance, offset).1 * offset);
    }
    let circle = Circle::new(DVec3::new(offset, 0.0, distance), DVec3::NEG_Z, radius);
    Ok(circle.above(DVec3::X).x.clamp(0.0, 1.0))
}

/// Returns the configuration factor from a disc to another one, both on one
/// axis and facing each other.
///
/// `radius` r₁ of the disc that sends, `other` r₂ of the one that receives and
/// `distance` h between their planes, in metres.
///
/// # Accuracy
///
/// Exact relation, written with positive terms; relative error below `1e-15`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
///
/// # Source
///
/// ½ [S − √(S² − 4(r₂/r₁)²)] with S = 1 + (h² + r₂²)/r₁², Howell's catalogue
/// (C-41, number from memory). Checked in
/// `tests/published/view_factor_catalogue.rs`, family `disc_disc`.
///
/// # Examples
///
/// ```
/// use farglow::physics::view_factor::disc;
///
/// let factor = disc::to_coaxial_disc(1.0, 1.0, 1.0)?;
/// assert!((factor - 0.381_966_011_250_105).abs() < 1e-15);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn to_coaxial_disc(radius: f64, other: f64, distance: f64) -> Result<f64, Error> {
    let radius = length("radius", radius)?;
    let other = length("other radius", other)?;
    let distance = length("distance", distance)?;
    Ok(between(radius, other, distance))
}

/// As [`to_coaxial_disc`], of lengths that are known to be in range; the
/// distance may be zero.
pub(in crate::physics) fn between(radius: f64, other: f64, distance: f64) -> f64 {
    let (near, far) = (
        distance.hypot(other - radius),
        distance.hypot(other + radius),
    );
    let sum = radius * radius + other * other + distance * distance;
    (2.0 * other * other / (sum + near * far)).min(1.0)
}

/// Returns the flux vector of a disc, the receiver at the origin and in front.
///
/// `centre` from the receiver; `normal` of length one, towards it.
#[must_use]
#[inline]
pub(in crate::physics) fn flux(centre: DVec3, normal: DVec3, radius: f64) -> DVec3 {
    let height = -centre.dot(normal);
    let lateral = centre + normal * height;
    let (axial, slope) = components(radius, height, lateral.length());
    lateral * slope - normal * axial
}

/// The flux vector's component along the disc's axis, and that towards the axis
/// divided by the offset.
#[inline]
pub(in crate::physics) fn components(radius: f64, height: f64, offset: f64) -> (f64, f64) {
    let (near, far) = (offset - radius, offset + radius);
    let (square, tall) = (radius * radius, height * height);
    // The product of the nearest and the farthest distance to the rim.
    let rims = ((tall + near * near) * (tall + far * far)).sqrt();
    let excess = tall + near * far;
    let axial = if excess > 0.0 {
        2.0 * square * tall / (rims * (rims + excess))
    } else {
        0.5 * (rims - excess) / rims
    };
    let sum = tall + offset * offset + square;
    (axial, 2.0 * height * square / (rims * (sum + rims)))
}
