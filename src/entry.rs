//! What a person types into a field: a quantity or an expression over linked
//! cells. An entry is parsed once, knows the place of everything in it, and is
//! then evaluated with checked dimensions, as a pure function of the values of
//! its names and literals.

mod diagnostic;
mod function;
mod name;
mod parse;
mod program;
mod row;
mod token;

#[cfg(test)]
mod tests;

pub use diagnostic::Diagnostic;
pub use name::{RESERVED, is_name, is_reserved};
pub use row::RowUse;
pub use token::{LiteralUse, NameUse};

use crate::units::{Literal, Quantity};
use program::Program;
use std::ops::Range;

/// The most characters an entry may have.
pub const LONGEST: usize = 1_000;

/// The deepest that brackets may be nested.
pub const DEEPEST: usize = 64;

/// Returns every function as it is written and what it returns, by name.
///
/// An argument that may be left out stands in square brackets.
pub fn functions() -> impl Iterator<Item = (String, &'static str)> {
    function::FUNCTIONS
        .iter()
        .map(|function| (function.usage(), function.about))
}

/// Returns every constant and what it is, by name.
pub fn constants() -> impl Iterator<Item = (&'static str, &'static str)> {
    function::CONSTANTS
        .iter()
        .map(|constant| (constant.name, constant.about))
}

/// One parsed field text.
///
/// Two entries are equal if their texts are.
///
/// # Examples
///
/// ```
/// use farglow::entry::{Entry, Outcome};
/// use farglow::units::{Dimension, Quantity};
///
/// let entry = Entry::parse("door.width + 0.4 m").expect("this is an entry");
/// assert_eq!(entry.names()[0].member, ["width"]);
/// let width = Quantity::new(0.9, Dimension::LENGTH);
/// let outcome = entry.evaluate(&[width], entry.nominal_literals());
/// assert_eq!(outcome, Ok(Outcome::Quantity(Quantity::new(1.3, Dimension::LENGTH))));
/// ```
#[derive(Clone, Debug)]
pub struct Entry {
    text: String,
    literals: Vec<LiteralUse>,
    nominal: Vec<f64>,
    names: Vec<NameUse>,
    program: Program,
}

/// What an entry comes to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Outcome {
    /// A value with its dimension.
    Quantity(Quantity),
    /// Whether a comparison holds.
    Truth(bool),
}

impl PartialEq for Entry {
    fn eq(&self, other: &Self) -> bool {
        self.text == other.text
    }
}

impl Eq for Entry {}

impl Entry {
    /// Parses what was typed.
    ///
    /// At most 1,000 characters and 64 levels of brackets. Never panics,
    /// whatever the text.
    ///
    /// # Errors
    ///
    /// Every fault that was found, in the order of their places.
    pub fn parse(text: &str) -> Result<Self, Vec<Diagnostic>> {
        let tokens = token::read(text)?;
        let program = parse::compile(&tokens).map_err(|fault| vec![fault])?;
        let nominal = tokens
            .literals
            .iter()
            .map(|used| used.literal.quantity().si);
        Ok(Self {
            text: text.to_owned(),
            nominal: nominal.collect(),
            literals: tokens.literals,
            names: tokens.names,
            program,
        })
    }

    /// Returns the text as it was typed.
    pub fn text(&self) -> &str {
        &self.text
    }

    /// Returns the literals, in the order of their appearance.
    pub fn literals(&self) -> &[LiteralUse] {
        &self.literals
    }

    /// Returns the names of cells, one for each appearance, in that order.
    pub fn names(&self) -> &[NameUse] {
        &self.names
    }

    /// Returns the literal, if the entry is one and nothing else.
    pub fn is_single_literal(&self) -> Option<&Literal> {
        match (self.literals.as_slice(), self.program.is_one_literal()) {
            ([used], true) => Some(&used.literal),
            _ => None,
        }
    }

    /// Returns the nominal values of the literals, in coherent SI units.
    pub fn nominal_literals(&self) -> &[f64] {
        &self.nominal
    }

    /// Works the entry out.
    ///
    /// `names` and `literals` are parallel to [`names`](Self::names) and
    /// [`literals`](Self::literals), the latter in coherent SI units. A
    /// temperature behind a name counts in kelvin, also where it was typed in
    /// °C. `&&` and `||` work both sides out.
    ///
    /// # Accuracy
    ///
    /// Each operation and function is that of `f64` in the standard library;
    /// those of radiation are as accurate as their own documentation says.
    ///
    /// # Errors
    ///
    /// A [`Diagnostic`] at the operator, function or name that has no result:
    /// dimensions that do not fit, °C or °F in arithmetic, division by zero, a
    /// root of a negative number, a result that is not finite, or a slice of
    /// the wrong length.
    pub fn evaluate(&self, names: &[Quantity], literals: &[f64]) -> Result<Outcome, Diagnostic> {
        if names.len() != self.names.len() || literals.len() != self.literals.len() {
            let (found, needed) = if names.len() == self.names.len() {
                (literals.len(), self.literals.len())
            } else {
                (names.len(), self.names.len())
            };
            return Err(Diagnostic::new(
                "values-missing",
                format!("expected {needed} values, found {found}"),
            ));
        }
        self.program.run(names, literals).map_err(|fault| *fault)
    }

    /// Returns the text with each use of the cell `from` replaced by `to`.
    ///
    /// The last part of a name of three, such as the source in
    /// `charger.irradiance_from.door`, is the name of a cell too.
    pub fn renamed(&self, from: &str, to: &str) -> String {
        let mut parts: Vec<(Range<usize>, &str)> = Vec::new();
        for used in &self.names {
            let start = used.span.start;
            if used.cell == from {
                parts.push((start..start + used.cell.len(), to));
            }
            if let [_, last] = used.member.as_slice()
                && last == from
            {
                parts.push((used.span.end - last.len()..used.span.end, to));
            }
        }
        self.replaced(&parts)
    }

    /// Returns the text with each name replaced by its printed value.
    ///
    /// `names` is parallel to [`names`](Self::names); a name without a value
    /// stays.
    pub fn substituted(&self, names: &[String]) -> String {
        let parts: Vec<(Range<usize>, &str)> = self
            .names
            .iter()
            .zip(names)
            .map(|(used, value)| (used.span.clone(), value.as_str()))
            .collect();
        self.replaced(&parts)
    }

    /// The text with parts, given in characters and in order, replaced.
    fn replaced(&self, parts: &[(Range<usize>, &str)]) -> String {
        let mut text = String::with_capacity(self.text.len());
        let mut parts = parts.iter().peekable();
        let mut replaced_to = 0;
        for (index, sign) in self.text.chars().enumerate() {
            if let Some((span, value)) = parts.next_if(|(span, _)| span.start == index) {
                text.push_str(value);
                replaced_to = span.end;
            }
            if index >= replaced_to {
                text.push(sign);
            }
        }
        text
    }
}
