//! Configuration factors to strips that are long beyond both ends.
//!
//! What does not change along the strips: angles in radians, lengths in metres.

use std::f64::consts::FRAC_PI_2;

use crate::physics::Error;
use crate::physics::error::length;

/// Returns the configuration factor from a small flat element to an infinitely
/// long strip.
///
/// `first` and `second` are the angles in radians between the element's normal
/// and the strip's edges, in the plane across the strip, in `−π/2..=π/2`; what
/// lies below the horizon is left out by giving the horizon's angle.
///
/// # Accuracy
///
/// Exact relation; relative error below `1e-15`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if an angle is not from −π/2 to π/2.
///
/// # Source
///
/// ½ |sin β − sin α|, Nusselt's unit sphere. Checked in
/// `tests/published/view_factor_catalogue.rs`, family `strip`.
pub fn from_element(first: f64, second: f64) -> Result<f64, Error> {
    let angle = |parameter, value: f64| {
        if value.abs() <= FRAC_PI_2 {
            Ok(value)
        } else {
            Err(Error::OutOfRange {
                parameter,
                range: "from −π/2 to π/2",
                value,
            })
        }
    };
    let (first, second) = (angle("first angle", first)?, angle("second angle", second)?);
    let (middle, half) = (0.5 * (first + second), 0.5 * (second - first));
    Ok((middle.cos() * half.sin()).abs().min(1.0))
}

/// Returns the configuration factor between two equal infinitely long strips,
/// parallel and directly opposite each other.
///
/// `width` w and `distance` h between their planes, in metres.
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
/// √(1 + (h/w)²) − h/w, Hottel's crossed strings. Checked in
/// `tests/published/thick_openings.rs`, family `thick_slot_black`.
pub fn to_parallel_strip(width: f64, distance: f64) -> Result<f64, Error> {
    let width = length("width", width)?;
    let distance = length("distance", distance)?;
    Ok(between(width, distance))
}

/// As [`to_parallel_strip`], of lengths that are known to be in range; the
/// distance may be zero.
pub(in crate::physics) fn between(width: f64, distance: f64) -> f64 {
    width / (width.hypot(distance) + distance)
}
