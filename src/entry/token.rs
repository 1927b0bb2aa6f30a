//! Our own reading of a text before any parser sees it: every literal becomes
//! one operand, every name is checked, every sign has its place, and what the
//! grammar does not allow is refused here with its remedy.

mod fault;
mod reader;

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

/// Where something stands, in characters from 0.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Span {
    pub(super) start: u16,
    pub(super) end: u16,
}

impl From<Span> for Range<usize> {
    fn from(span: Span) -> Self {
        usize::from(span.start)..usize::from(span.end)
    }
}

/// What a token is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Sign {
    /// The literal of that index.
    Literal(u16),
    /// The name of that index.
    Name(u16),
    /// The constant of that index.
    Constant(u16),
    /// The function of that index, before its bracket.
    Function(u16),
    Open,
    Close,
    Comma,
    Minus,
    Not,
    Binary(Binary),
}

/// An operator between two values.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Binary {
    Add,
    Subtract,
    Multiply,
    Divide,
    Power,
    Equal,
    Unequal,
    Greater,
    Less,
    GreaterOrEqual,
    LessOrEqual,
    And,
    Or,
}

impl Binary {
    /// The spelling that the parser of expressions knows.
    pub(super) const fn spelling(self) -> &'static str {
        match self {
            Self::Add => "+",
            Self::Subtract => "-",
            Self::Multiply => "*",
            Self::Divide => "/",
            Self::Power => "^",
            Self::Equal => "==",
            Self::Unequal => "!=",
            Self::Greater => ">",
            Self::Less => "<",
            Self::GreaterOrEqual => ">=",
            Self::LessOrEqual => "<=",
            Self::And => "&&",
            Self::Or => "||",
        }
    }
}

#[derive(Clone, Copy, Debug)]
pub(super) struct Token {
    pub(super) sign: Sign,
    pub(super) span: Span,
}

/// A text as its tokens, with what they stand for.
#[derive(Debug, Default)]
pub(super) struct Tokens {
    pub(super) list: Vec<Token>,
    pub(super) literals: Vec<LiteralUse>,
    pub(super) names: Vec<NameUse>,
}

/// Reads a text into tokens that are sure to alternate between values and
/// operators, in brackets that match.
///
/// # Errors
///
/// Every fault, in the order of their places, at most [`reader::MOST_FAULTS`].
pub(super) fn read(text: &str) -> Result<Tokens, Vec<Diagnostic>> {
    reader::Reader::new(text).read()
}
