//! Our own reading of a text before any parser sees it.

use super::Diagnostic;
use crate::units::Literal;
use std::ops::Range;

/// A literal in an entry.
#[derive(Clone, Debug, PartialEq)]
pub struct LiteralUse {
    /// What it says.
    pub literal: Literal,
    /// Where it stands, in characters from 0.
    pub span: Range<usize>,
}

/// A name in an entry: `cell`, `cell.field`, `cell.output` or
/// `cell.output.source`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct NameUse {
    /// The name of the cell.
    pub cell: String,
    /// What follows behind the dots: nothing, a field or output, and at most
    /// one part more.
    pub member: Vec<String>,
    /// Where it stands, in characters from 0.
    pub span: Range<usize>,
}

#[derive(Debug, Default)]
pub(super) struct Tokens {
    pub(super) literals: Vec<LiteralUse>,
    pub(super) names: Vec<NameUse>,
}

pub(super) fn read(text: &str) -> Result<Tokens, Vec<Diagnostic>> {
    match Literal::read(text) {
        Ok(literal) if literal.length == text.len() => Ok(Tokens {
            literals: vec![LiteralUse {
                literal,
                span: 0..text.chars().count(),
            }],
            names: Vec::new(),
        }),
        _ => Err(vec![Diagnostic::new(
            "not-yet",
            "expected a quantity, found an expression",
        )]),
    }
}
