//! Pouring streams, as cylinders.

use glam::DVec3;

use crate::physics::Error;
use crate::physics::error::{SHORTEST, length, place};
use crate::physics::region::Region;

/// The greatest number of points of a stream's course.
pub const MOST_POINTS: usize = 100;

/// Returns a stream as cylinders, one from each point of its course to the
/// next.
///
/// `points` in metres from the lip on, at least two; `diameter` in metres. Where
/// the course bends both cylinders end as much earlier as they need so as not
/// to run into each other; a straight stream is one cylinder.
///
/// # Accuracy
///
/// The wedge that is missing outside a bend by an angle β is d·tan(β/2) wide;
/// with bends of at most 10° less than `0.09` of the diameter.
///
/// # Errors
///
/// [`Error::OutOfRange`] unless there are 2 to [`MOST_POINTS`] points, if a
/// length is out of range, or if two points lie so close together that the
/// bends leave nothing between them.
///
/// # Examples
///
/// ```
/// use farglow::physics::pool::stream;
/// use glam::DVec3;
///
/// let lip = DVec3::new(0.0, 0.0, 2.0);
/// let pieces = stream::along(&[lip, lip - DVec3::Z], 0.05)?;
/// assert_eq!(pieces.len(), 1);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn along(points: &[DVec3], diameter: f64) -> Result<Vec<Region>, Error> {
    let diameter = length("diameter of the stream", diameter)?;
    if !(2..=MOST_POINTS).contains(&points.len()) {
        return Err(Error::OutOfRange {
            parameter: "number of points of a stream's course",
            range: "from 2 to 100",
            value: points.len() as f64,
        });
    }
    for point in points {
        let _ = place("a point of the stream's course", *point)?;
    }
    let ways: Vec<DVec3> = points.windows(2).map(|pair| pair[1] - pair[0]).collect();
    let cut = |joint: usize| {
        // Half of the bend between the ways before and behind a point.
        let (Some(came), Some(goes)) = (
            joint.checked_sub(1).map(|before| ways[before]),
            ways.get(joint),
        ) else {
            return 0.0;
        };
        let bend = came.cross(*goes).length().atan2(came.dot(*goes));
        0.5 * diameter * (0.5 * bend).tan()
    };
    ways.iter()
        .enumerate()
        .map(|(index, way)| {
            let whole = way.length();
            let (from, to) = (cut(index), cut(index + 1));
            let left = whole - from - to;
            if left < SHORTEST || left.is_nan() {
                return Err(Error::OutOfRange {
                    parameter: "length of a piece of the stream between its bends",
                    range: "above 10⁻⁹ m; take fewer points or a thinner stream",
                    value: left,
                });
            }
            let along = *way / whole;
            Region::cylinder(points[index] + along * from, along * left, 0.5 * diameter)
        })
        .collect()
}
