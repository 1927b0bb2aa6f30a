//! A fault of a cell, with its place and its remedy.

use std::fmt;
use std::ops::Range;

use super::cell::field::Item;

/// One fault of one cell. The cell is known by where the diagnostic is found.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// A stable word for machines, such as `unknown-name`.
    pub code: &'static str,
    /// The field it is in; `None` for the cell as a whole.
    pub field: Option<&'static str>,
    /// Which entry of a field of pairs it is in; `None` in any other.
    pub item: Option<Item>,
    /// Where in the field's text, in characters from 0.
    pub span: Option<Range<usize>>,
    /// What was expected and what was found.
    pub message: String,
    /// The remedy.
    pub hint: Option<Box<str>>,
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
            item: None,
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
    pub fn with_hint(mut self, hint: impl Into<Box<str>>) -> Self {
        self.hint = Some(hint.into());
        self
    }

    /// Returns the fault with its place in the field's text.
    #[must_use]
    pub fn at(mut self, span: Range<usize>) -> Self {
        self.span = Some(span);
        self
    }

    /// Returns the fault in one entry of its field of pairs.
    #[must_use]
    pub fn in_item(mut self, item: Option<Item>) -> Self {
        self.item = item.or(self.item);
        self
    }

    /// Returns the fault of an entry, now in its field.
    #[must_use]
    pub fn from_entry(field: &'static str, fault: crate::entry::Diagnostic) -> Self {
        Diagnostic {
            code: fault.code,
            field: Some(field),
            item: None,
            span: fault.span,
            message: fault.message,
            hint: fault.hint.map(Into::into),
            missing: None,
        }
    }

    /// Returns the place in words, such as `field width, character 5`.
    #[must_use]
    pub fn place(&self) -> String {
        let Some(field) = self.field else {
            return String::new();
        };
        let mut place = format!("field {field}");
        if let Some((pair, side)) = self.item {
            place.push_str(&format!("[{pair}][{side}]"));
        }
        if let Some(span) = &self.span {
            place.push_str(&format!(", character {}", span.start + 1));
        }
        place
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
