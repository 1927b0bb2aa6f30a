//! A fault of a cell, with its place and its remedy.

use std::fmt;
use std::ops::Range;

/// One fault of one cell. The cell is known by where the diagnostic is found.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// A stable word for machines, such as `unknown-name`.
    pub code: &'static str,
    /// The field it is in; `None` for the cell as a whole.
    pub field: Option<&'static str>,
    /// Where in the field's text, in characters from 0.
    pub span: Option<Range<usize>>,
    /// What was expected and what was found.
    pub message: String,
    /// The remedy.
    pub hint: Option<String>,
    /// The name that no cell has. The remedy then is the nearest name that a
    /// cell has when the fault is told, which other cells' edits may change.
    pub missing: Option<Box<str>>,
}

impl Diagnostic {
    /// Returns a fault of the cell as a whole.
    #[must_use]
    pub fn of_cell(code: &'static str, message: impl Into<String>) -> Self {
        Diagnostic {
            code,
            field: None,
            span: None,
            message: message.into(),
            hint: None,
            missing: None,
        }
    }

    /// Returns a fault of one field.
    #[must_use]
    pub fn of_field(field: &'static str, code: &'static str, message: impl Into<String>) -> Self {
        Diagnostic {
            field: Some(field),
            ..Diagnostic::of_cell(code, message)
        }
    }

    /// Returns the fault with its remedy.
    #[must_use]
    pub fn with_hint(mut self, hint: impl Into<String>) -> Self {
        self.hint = Some(hint.into());
        self
    }

    /// Returns the fault with its place in the field's text.
    #[must_use]
    pub fn at(mut self, span: Range<usize>) -> Self {
        self.span = Some(span);
        self
    }

    /// Returns the fault of an entry, now in its field.
    #[must_use]
    pub fn from_entry(field: &'static str, fault: crate::entry::Diagnostic) -> Self {
        Diagnostic {
            code: fault.code,
            field: Some(field),
            span: fault.span,
            message: fault.message,
            hint: fault.hint,
            missing: None,
        }
    }

    /// Returns the place in words, such as `field width, character 5`.
    #[must_use]
    pub fn place(&self) -> String {
        match (self.field, &self.span) {
            (Some(field), Some(span)) => format!("field {field}, character {}", span.start + 1),
            (Some(field), None) => format!("field {field}"),
            (None, _) => String::new(),
        }
    }
}

impl fmt::Display for Diagnostic {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let place = self.place();
        if !place.is_empty() {
            write!(f, "{place}: ")?;
        }
        f.write_str(&self.message)?;
        if let Some(hint) = &self.hint {
            write!(f, "; {hint}")?;
        }
        Ok(())
    }
}
