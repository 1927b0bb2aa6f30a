use glam::DVec3;

/// What keeps a physical quantity from being worked out.
///
/// Small and `Copy`: it names the parameter, the range it has to lie in and
/// the value that was found.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// A number lies outside the range in which the relation holds.
    #[error("{parameter} must be {range}, found {value}")]
    OutOfRange {
        /// The parameter as a person would call it.
        parameter: &'static str,
        /// The range, in words.
        range: &'static str,
        /// The value that was found.
        value: f64,
    },
    /// A vector that must point somewhere has no length, or is not finite.
    #[error("{parameter} must point in a direction, found a vector of length {length}")]
    NoDirection {
        /// The vector as a person would call it.
        parameter: &'static str,
        /// The length that was found.
        length: f64,
    },
    /// A polygon has fewer than three vertices, or more than it may have.
    #[error(
        "a polygon must have from 3 to {} vertices, found {found}",
        crate::physics::region::MOST_VERTICES
    )]
    VertexCount {
        /// How many vertices were given.
        found: usize,
    },
    /// The vertices of a polygon enclose no area.
    #[error(
        "a polygon must enclose an area, found {area} m²; give its vertices in order around it"
    )]
    NoArea {
        /// The area that was found, in m².
        area: f64,
    },
    /// A vertex lies off the plane of its polygon.
    #[error("a polygon must be flat, found vertex {vertex} off its plane by {distance} m")]
    NotFlat {
        /// Which vertex, counted from 1.
        vertex: usize,
        /// How far it lies off the plane, in metres.
        distance: f64,
    },
    /// Two edges of a polygon cross or touch each other.
    #[error(
        "the outline of a polygon must not cross itself, found edges {first} and {second} crossing; give its vertices in order around it"
    )]
    CrossesItself {
        /// The first edge, counted from 1: edge 1 runs from vertex 1 to 2.
        first: usize,
        /// The second edge.
        second: usize,
    },
    /// A table has too few rows, or too many.
    #[error(
        "a table must have from 2 to {} rows, found {found}",
        crate::physics::spectrum::MOST_ROWS
    )]
    TableLength {
        /// How many rows were given.
        found: usize,
    },
    /// The rows of a table are not in order.
    #[error(
        "row {row} of the table must stand at a longer wavelength than the row before it, found {wavelength} m after {before} m; sort the rows by wavelength"
    )]
    TableOrder {
        /// Which row, counted from 1.
        row: usize,
        /// Its wavelength, in metres.
        wavelength: f64,
        /// That of the row before it, in metres.
        before: f64,
    },
    /// A number in a table lies outside the range in which it means something.
    #[error("{parameter} in row {row} of the table must be {range}, found {value}")]
    TableValue {
        /// Which row, counted from 1.
        row: usize,
        /// The column as a person would call it.
        parameter: &'static str,
        /// The range, in words.
        range: &'static str,
        /// The value that was found.
        value: f64,
    },
    /// Two bodies that emit overlap: which hides the other cannot be said.
    #[error(
        "bodies that emit must lie apart, found parts {} and {} overlapping; move them apart",
        first + 1, second + 1
    )]
    PartsOverlap {
        /// The first, by its place in the scene.
        first: usize,
        /// The second.
        second: usize,
    },
    /// A barrier runs through a part, or lies upon another barrier's hot face.
    #[error(
        "a barrier must lie clear of what emits, found barrier {} overlapping part {}; move one of them",
        barrier + 1, part + 1
    )]
    BarrierOverlaps {
        /// The barrier, by its place in the scene.
        barrier: usize,
        /// The part, by its place in the scene.
        part: usize,
    },
    /// The outline that a part is seen through, or past, is not flat.
    #[error(
        "a part must be seen through a disc or a polygon, found a body for part {}",
        part + 1
    )]
    NotAnOutline {
        /// The part, by its place in the scene.
        part: usize,
    },
    /// A screen touches a hot source.
    #[error(
        "a screen must stand clear of hot sources, found screen {} touching part {}; move one of them",
        screen + 1, part + 1
    )]
    ScreenTouches {
        /// The screen, by its place among the screens.
        screen: usize,
        /// The part, by its place among those of the sources.
        part: usize,
    },
    /// The middle of a piece of a screen lies on another screen.
    #[error(
        "screens must not lie in one another, found screen {} in screen {}; move one of them",
        screen + 1, other + 1
    )]
    ScreensOverlap {
        /// The screen, by its place among the screens.
        screen: usize,
        /// The other one.
        other: usize,
    },
}

/// Returns `value` if it is finite and above zero, at most `most`.
pub(super) fn positive(
    parameter: &'static str,
    value: f64,
    most: f64,
    range: &'static str,
) -> Result<f64, Error> {
    if value > 0.0 && value <= most {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range,
            value,
        })
    }
}

/// The longest length that is accepted, in metres.
pub(super) const LONGEST: f64 = 1e9;

/// The shortest length that is accepted, in metres: squares of squares of it
/// still keep all their digits.
pub(super) const SHORTEST: f64 = 1e-9;

/// Returns `value` if it is a length.
pub(super) fn length(parameter: &'static str, value: f64) -> Result<f64, Error> {
    if (SHORTEST..=LONGEST).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range: "from 10⁻⁹ m to 10⁹ m",
            value,
        })
    }
}

/// Returns `value` if it is a length or zero.
pub(super) fn offset(parameter: &'static str, value: f64) -> Result<f64, Error> {
    if (0.0..=LONGEST).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range: "from 0 m to 10⁹ m",
            value,
        })
    }
}

/// Returns `place` if each of its coordinates is in range.
pub(super) fn place(parameter: &'static str, place: DVec3) -> Result<DVec3, Error> {
    for value in place.to_array() {
        if value.is_nan() || value.abs() > LONGEST {
            return Err(Error::OutOfRange {
                parameter,
                range: "from −10⁹ m to 10⁹ m in each coordinate",
                value,
            });
        }
    }
    Ok(place)
}

/// Returns `vector` with length one.
pub(super) fn direction(parameter: &'static str, vector: DVec3) -> Result<DVec3, Error> {
    let most = vector.abs().max_element();
    let failed = Error::NoDirection {
        parameter,
        length: vector.length(),
    };
    if !vector.is_finite() || most == 0.0 {
        return Err(failed);
    }
    (vector / most).try_normalize().ok_or(failed)
}
