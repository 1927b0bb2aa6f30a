//! What can be wrong with a guidance file, and with a question put to the library.

use std::fmt;

use crate::json::Place;

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
    #[error("expected an exposure of zero or more W/m², found {value}")]
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
