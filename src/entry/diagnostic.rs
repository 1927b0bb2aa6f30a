//! A fault in what a person typed: where it is, what was expected, what helps.

use crate::units;
use std::fmt;
use std::ops::Range;

/// A fault in an entry.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// The stable name of the fault, in kebab case.
    pub code: &'static str,
    /// What was expected and what was found, in lower case.
    pub message: String,
    /// What to do about it.
    pub hint: Option<String>,
    /// The place in the entry, in characters from 0; `None` for the whole.
    pub span: Option<Range<usize>>,
}

impl Diagnostic {
    /// Returns a fault without hint and place.
    pub fn new(code: &'static str, message: impl Into<String>) -> Self {
        Self {
            code,
            message: message.into(),
            hint: None,
            span: None,
        }
    }

    /// Returns this fault with what to do about it.
    #[must_use]
    pub fn with_hint(mut self, hint: impl Into<String>) -> Self {
        self.hint = Some(hint.into());
        self
    }

    /// Returns this fault with its place, in characters from 0.
    #[must_use]
    pub fn at(mut self, span: Range<usize>) -> Self {
        self.span = Some(span);
        self
    }
}

impl From<units::Error> for Diagnostic {
    fn from(error: units::Error) -> Self {
        Self {
            code: error.code(),
            message: error.to_string(),
            hint: error.hint(),
            span: None,
        }
    }
}

impl fmt::Display for Diagnostic {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if let Some(span) = &self.span {
            write!(f, "character {}: ", span.start + 1)?;
        }
        f.write_str(&self.message)?;
        match &self.hint {
            Some(hint) => write!(f, " ({hint})"),
            None => Ok(()),
        }
    }
}

impl std::error::Error for Diagnostic {}
