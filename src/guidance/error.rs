//! What can be wrong with a guidance file, and with a question put to the library.

use std::fmt;

use crate::json::Place;
use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Unit};

/// Why a judgement was refused.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Error {
    /// No limit of that id is loaded.
    #[error("no guidance is named `{id}`{}", remedy(suggestion.as_deref()))]
    UnknownId {
        /// What was asked for.
        id: String,
        /// The nearest id that exists, if one is near.
        suggestion: Option<String>,
    },
    /// The exposure is no irradiance.
    #[error("expected an exposure of zero or more, found {}", irradiance(*value))]
    Exposure {
        /// What was handed over.
        value: f64,
    },
}

fn remedy(suggestion: Option<&str>) -> String {
    suggestion.map_or_else(
        || ": see the list of guidance for the ids there are".to_owned(),
        |near| format!(", did you mean `{near}`?"),
    )
}

/// One fault of a guidance file, with its place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// The file, as its name was handed over.
    pub file: String,
    /// The line and the character in it, both from 1.
    pub place: Place,
    /// The limit and field in which it is, such as `eu-2006-25-m, pieces 1, limit`.
    pub field: String,
    /// What was expected, what was found, and the remedy.
    pub message: String,
}

impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}, {}", self.file, self.place)?;
        if !self.field.is_empty() {
            write!(f, ", {}", self.field)?;
        }
        write!(f, ": {}", self.message)
    }
}

impl std::error::Error for Fault {}

/// Returns an exposure time for messages.
pub(super) fn seconds(time: f64) -> String {
    number(time, Dimension::TIME)
}

/// Returns an irradiance for messages.
pub(super) fn irradiance(value: f64) -> String {
    number(value, Dimension::IRRADIANCE)
}

/// Returns a number as it was written, as far as six figures do.
fn number(si: f64, dimension: Dimension) -> String {
    let unit = Unit::coherent(dimension);
    let short = |figures| format::quantity(si, &unit, figures, Rounding::Nearest);
    let plain = |text: &str| -> String { text.chars().filter(|&c| c != format::GROUP).collect() };
    // The fewest figures that say the same, so that 1000 s is not 1000.00 s.
    let full = format::significant(si, 6, Rounding::Nearest);
    let value = plain(&full).parse::<f64>().unwrap_or(si);
    let figures = (1..6).find(|&figures| {
        plain(&format::significant(si, figures, Rounding::Nearest)).parse() == Ok(value)
    });
    short(figures.unwrap_or(6))
}
