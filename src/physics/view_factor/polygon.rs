//! Configuration factors from a small flat element to a polygon, by the contour
//! integral.

use glam::DVec3;

use crate::physics::Error;
use crate::physics::region::Region;
use crate::physics::view::Sight;

/// Returns the configuration factor from a small flat element at the origin to
/// a flat polygon in any pose.
///
/// `vertices` in metres, anticlockwise as seen from the side that emits;
/// `normal` of the element, of any length. What lies below the element's
/// horizon does not count; from behind the polygon the factor is zero.
///
/// # Accuracy
///
/// Exact relation; absolute error below `1e-14` at distances of the polygon's
/// own size, and a relative error of `1e-16` times distance over size beyond.
///
/// # Errors
///
/// As [`Region::polygon`]; [`Error::NoDirection`] for the normal;
/// [`Error::OutOfRange`] if the element lies on the polygon.
///
/// # Source
///
/// Lambert's contour integral; checked in
/// `tests/published/view_factor_catalogue.rs`, families `polygon` and
/// `rect_pose`.
pub fn from_element(vertices: Vec<DVec3>, normal: DVec3) -> Result<f64, Error> {
    let normal = crate::physics::error::direction("normal", normal)?;
    match Region::polygon(vertices)?.view(DVec3::ZERO) {
        Sight::Behind => Ok(0.0),
        Sight::Seen(view) => Ok(view.factor(normal)),
        Sight::Touching => Err(Error::OutOfRange {
            parameter: "distance of the element from the polygon",
            range: "above zero",
            value: 0.0,
        }),
    }
}
