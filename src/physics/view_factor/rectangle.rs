//! Configuration factors from a small flat element to a rectangle.
//!
//! Lengths in metres. Other places follow by adding and taking away rectangles
//! that have a corner at the element's foot, or from [`super::contour`].

use std::f64::consts::TAU;

use crate::physics::Error;
use crate::physics::error::length;

/// Returns the configuration factor from a small flat element to a rectangle,
/// the element parallel to it and opposite one of its corners.
///
/// `width` a and `height` b of the rectangle and `distance` c from its plane,
/// in metres.
///
/// # Accuracy
///
/// Exact relation; relative error below `1e-15`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
///
/// # Source
///
/// (1/2π) [a/√(a²+c²) atan(b/√(a²+c²)) + b/√(b²+c²) atan(a/√(b²+c²))], Howell's
/// catalogue (B-3 family, from memory). Checked in
/// `tests/published/view_factor_catalogue.rs`, family `rect_parallel_corner`.
pub fn from_parallel_element_at_corner(
    width: f64,
    height: f64,
    distance: f64,
) -> Result<f64, Error> {
    let width = length("width", width)?;
    let height = length("height", height)?;
    let distance = length("distance", distance)?;
    let part = |along: f64, across: f64| {
        let slant = along.hypot(distance);
        along / slant * (across / slant).atan()
    };
    Ok((part(width, height) + part(height, width)) / TAU)
}

/// Returns the configuration factor from a small flat element to a rectangle
/// that stands on the element's own plane, the element opposite one end of its
/// foot.
///
/// `height` a of the rectangle above the element's plane, `width` b along that
/// plane and `distance` c of the element from the rectangle, in metres.
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
/// (1/2π) [atan(b/c) − c/A atan(b/A)], A² = a² + c², Howell's catalogue.
/// Checked in `tests/published/view_factor_catalogue.rs`, family
/// `rect_perpendicular_corner`.
pub fn from_perpendicular_element_at_corner(
    height: f64,
    width: f64,
    distance: f64,
) -> Result<f64, Error> {
    let height = length("height", height)?;
    let width = length("width", width)?;
    let distance = length("distance", distance)?;
    let slant = height.hypot(distance);
    let excess = height / (slant + distance) * height;
    let angle = (width * excess / (distance * slant + width * width)).atan();
    Ok((angle + excess / slant * (width / slant).atan()) / TAU)
}
