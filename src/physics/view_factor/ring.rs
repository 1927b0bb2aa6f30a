//! Configuration factors from a small flat element to a flat ring.
//!
//! Lengths in metres: the ring's radii, the element's distance from its plane.

use crate::physics::Error;
use crate::physics::error::{length, offset};

/// Returns the configuration factor from a small flat element to a ring, the
/// element parallel to it and on its axis.
///
/// `inner` radius r, which may be zero, `outer` radius R above it, and
/// `distance` h from the ring's plane, in metres.
///
/// # Accuracy
///
/// Exact relation, written as a product: relative error below `1e-15` however
/// narrow the ring, and `1e-16` R/(R − r) from the rounding of the radii.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is out of range, or the outer radius not
/// above the inner.
///
/// # Source
///
/// The difference of two coaxial discs, h² (R² − r²)/((R² + h²)(r² + h²)).
/// Checked in `tests/published/view_factor_catalogue.rs`, family `ring`.
pub fn from_coaxial_element(inner: f64, outer: f64, distance: f64) -> Result<f64, Error> {
    let inner = offset("inner radius", inner)?;
    let outer = length("outer radius", outer)?;
    let distance = length("distance", distance)?;
    if outer <= inner {
        return Err(Error::OutOfRange {
            parameter: "outer radius",
            range: "above the inner radius",
            value: outer,
        });
    }
    let share = distance / distance.hypot(inner);
    let far = distance.hypot(outer);
    Ok(share * share * ((outer - inner) / far) * ((outer + inner) / far))
}
