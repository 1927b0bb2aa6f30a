//! The entry that names a row of a library: `of cast_iron_molten_clean`.
//!
//! It is told from an expression by its first word, since no expression has a
//! name directly behind another; what the row says is found by those who know
//! the libraries.

use super::Diagnostic;
use super::name::{is_first, is_later};
use std::ops::Range;

/// The word that stands before the id of a row.
const WORD: &str = "of";

/// An entry that names a row.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct RowUse {
    /// The id as typed.
    pub id: String,
    /// Where the id stands, in characters from 0.
    pub span: Range<usize>,
}

impl RowUse {
    /// Returns the row that an entry names; `None` for an entry that is a
    /// quantity or an expression.
    ///
    /// # Errors
    ///
    /// A [`Diagnostic`] at what stands behind the id, or at an id with a sign in
    /// it that none has.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::entry::RowUse;
    ///
    /// let row = RowUse::read("of cast_iron_molten_clean").expect("it names a row");
    /// assert_eq!(row.map(|row| row.id), Ok("cast_iron_molten_clean".to_owned()));
    /// assert_eq!(RowUse::read("0.9 * e_metal"), None);
    /// ```
    #[must_use]
    pub fn read(text: &str) -> Option<Result<Self, Diagnostic>> {
        let start = text.trim_start();
        let behind = start.strip_prefix(WORD)?;
        let rest = behind.trim_start();
        let first = rest.bytes().next()?;
        let names_something = is_first(first) || first.is_ascii_digit();
        if behind.len() == rest.len() || !names_something {
            return None;
        }
        let place = |bytes: usize| text[..bytes].chars().count();
        let at = text.len() - rest.len();
        // A hyphen is read with the id, so that the nearest row can be named.
        let length = rest
            .bytes()
            .take_while(|byte| is_later(*byte) || *byte == b'-')
            .count();
        let id = &rest[..length];
        let more = rest[length..].trim_start();
        if more.is_empty() {
            return Some(Ok(Self {
                id: id.to_owned(),
                span: place(at)..place(at + length),
            }));
        }
        let from = text.len() - more.len();
        let message = format!(
            "expected the id of one row and nothing else, found `{}`",
            more.trim_end().chars().take(40).collect::<String>()
        );
        Some(Err(Diagnostic::new("not-one-row", message)
            .with_hint(
                "write the row alone; to reckon with it, put it into a value cell and use its name",
            )
            .at(place(from)..place(text.trim_end().len()))))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rows_are_told_from_expressions() {
        for (text, expected) in [
            ("of cast_iron", Some(("cast_iron", 3..12))),
            ("  of   steel_1um ", Some(("steel_1um", 7..16))),
            ("of cast-iron", Some(("cast-iron", 3..12))),
            ("of 1um", Some(("1um", 3..6))),
            // A cell may be called `of`.
            ("of", None),
            ("of + 1", None),
            ("of * door.width", None),
            ("of.width", None),
            ("of(2)", None),
            ("offset", None),
            ("offset + 1 m", None),
            ("0.9", None),
            ("", None),
            ("off cast_iron", None),
        ] {
            let found = RowUse::read(text).map(|row| row.expect(text));
            let expected = expected.map(|(id, span)| RowUse {
                id: id.to_owned(),
                span,
            });
            assert_eq!(found, expected, "{text}");
        }
    }

    #[test]
    fn nothing_stands_behind_a_row() {
        for (text, span) in [
            ("of cast_iron * 2", 13..16),
            ("of cast_iron, clean", 12..19),
            ("of tür", 4..6),
            ("of cast_iron ± 0.1 ", 13..18),
        ] {
            let fault = RowUse::read(text).expect(text).expect_err(text);
            assert_eq!(
                (fault.code, fault.span),
                ("not-one-row", Some(span)),
                "{text}"
            );
        }
    }
}
