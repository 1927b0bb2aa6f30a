//! Configuration factors to a rectangle, from a small flat element and from
//! another rectangle.
//!
//! Lengths in metres. Other places follow by adding and taking away rectangles
//! that have a corner at the element's foot, or from [`super::contour`].

use std::f64::consts::{FRAC_2_PI, PI, TAU};

use crate::numeric::gauss;
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

/// Returns the configuration factor between two equal rectangles, parallel and
/// directly opposite each other.
///
/// `width` a, `height` b and `distance` c between their planes, in metres.
///
/// # Accuracy
///
/// Exact relation where the shorter side is at least half the distance, its
/// one integral by Gauss's rule where it is not: relative error below `1e-13`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
///
/// # Source
///
/// With X = a/c, Y = b/c: 2/(πXY) [ln √((1+X²)(1+Y²)/(1+X²+Y²)) +
/// X√(1+Y²) atan(X/√(1+Y²)) + Y√(1+X²) atan(Y/√(1+X²)) − X atan X − Y atan Y],
/// Howell's catalogue (C-11 from memory). Checked in
/// `tests/published/view_factor_catalogue.rs`, family `rect_rect_parallel`.
///
/// # Examples
///
/// ```
/// use farglow::physics::view_factor::rectangle;
///
/// let cube = rectangle::to_parallel_rectangle(1.0, 1.0, 1.0)?;
/// assert!((cube - 0.199_824_895_698_387).abs() < 1e-14);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn to_parallel_rectangle(width: f64, height: f64, distance: f64) -> Result<f64, Error> {
    let width = length("width", width)?;
    let height = length("height", height)?;
    let distance = length("distance", distance)?;
    Ok(between(width, height, distance))
}

/// As [`to_parallel_rectangle`], of lengths that are known to be in range.
pub(in crate::physics) fn between(width: f64, height: f64, distance: f64) -> f64 {
    let (long, short) = if width > height {
        (width, height)
    } else {
        (height, width)
    };
    // In the closed form terms of the size of the square of X cancel to their
    // product with the square of Y; of this integral all parts are positive.
    let factor = if short < 0.5 * distance {
        let integral = gauss::SIXTEEN.integral(0.0, short, |across| {
            let slant = distance.hypot(across);
            (short - across) * (long / slant).atan() / (slant * slant * slant)
        });
        FRAC_2_PI * distance * distance / short * integral
    } else {
        let (x, y) = (long / distance, short / distance);
        let (wide, tall) = (1.0_f64.hypot(x), 1.0_f64.hypot(y));
        // (1 + X²)(1 + Y²)/(1 + X² + Y²) is one more than this.
        let more = (x * y / wide.hypot(y)).powi(2);
        let sum = 0.5 * more.ln_1p()
            + x * (tall * (x / tall).atan() - x.atan())
            + y * (wide * (y / wide).atan() - y.atan());
        FRAC_2_PI / (x * y) * sum
    };
    factor.clamp(0.0, 1.0)
}

/// Returns the configuration factor from a rectangle to another one that stands
/// on its edge, at a right angle.
///
/// `edge` l, the length of the common edge, `width` of the rectangle that sends
/// and `height` of the one that receives, away from the edge, in metres.
///
/// # Accuracy
///
/// Exact relation; relative error below `1e-14`, times the ratio of width to
/// height where that is large.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
///
/// # Source
///
/// With W = width/l, H = height/l: 1/(πW) {W atan(1/W) + H atan(1/H) −
/// √(H²+W²) atan(1/√(H²+W²)) + ¼ ln[…]}, Howell's catalogue (C-14 from
/// memory), its logarithms of products taken apart here. Checked in
/// `tests/published/view_factor_catalogue.rs`, family `rect_rect_perpendicular`.
pub fn to_perpendicular_rectangle(edge: f64, width: f64, height: f64) -> Result<f64, Error> {
    let edge = length("common edge", edge)?;
    let (w, h) = (
        length("width", width)? / edge,
        length("height", height)? / edge,
    );
    let (square_w, square_h) = (w * w, h * h);
    let diagonal = w.hypot(h);
    let all = 1.0 + square_w + square_h;
    let turned = |x: f64| x * (1.0 / x).atan();
    // Logarithms of one plus something small, so that they keep their digits.
    let logs = (square_w * (square_h / all)).ln_1p()
        - square_w * (square_h / square_w / all).ln_1p()
        - square_h * (square_w / square_h / all).ln_1p();
    let sum = turned(w) + turned(h) - turned(diagonal) + 0.25 * logs;
    Ok((sum / (PI * w)).clamp(0.0, 1.0))
}
