//! A limit or a time as a file writes it: the entry language, with the exposure time as `t`.

use crate::entry::{Diagnostic, Entry, Outcome};
use crate::units::{Dimension, Quantity};

/// The one name that a limit may use.
const TIME: &str = "t";

/// A limit in the exposure time `t`, of one dimension throughout.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Written {
    entry: Entry,
}

impl Written {
    /// Reads a limit of the dimension `wanted`.
    ///
    /// # Errors
    ///
    /// Every fault, each with its character from 1 where it has one.
    pub(super) fn limit(text: &str, wanted: Dimension) -> Result<Self, Vec<String>> {
        let entry = parse(text)?;
        let others: Vec<String> = entry
            .names()
            .iter()
            .filter(|name| name.cell != TIME || !name.member.is_empty())
            .map(|name| {
                format!(
                    "character {}: a limit may use the exposure time `{TIME}` and no other name, found `{}`",
                    name.span.start + 1,
                    name.cell
                )
            })
            .collect();
        if !others.is_empty() {
            return Err(others);
        }
        let written = Self { entry };
        // Any time does: dimensions do not depend on it. A limit need not have a value at
        // every time, so that a fault of the value is left to the looks over its stretch.
        let mut first = None;
        for t in [1.0, 0.5, 2e-7, 1e7] {
            match written.evaluate(t) {
                Ok(outcome) => return checked(outcome, wanted).map(|_| written),
                Err(fault) => first = first.or(Some(fault)),
            }
        }
        Err(first.iter().map(ToString::to_string).collect())
    }

    /// Returns the limit at `t` seconds in SI units, if it has a value there.
    pub(super) fn at(&self, t: f64) -> Option<f64> {
        match self.evaluate(t) {
            Ok(Outcome::Quantity(limit)) if limit.si.is_finite() => Some(limit.si),
            _ => None,
        }
    }

    fn evaluate(&self, t: f64) -> Result<Outcome, Diagnostic> {
        let time = Quantity::new(t, Dimension::TIME);
        let entry = &self.entry;
        // Nearly every limit names the time once, and this runs in long loops.
        match entry.names().len() {
            0 => entry.evaluate(&[], entry.nominal_literals()),
            1 => entry.evaluate(&[time], entry.nominal_literals()),
            n => entry.evaluate(&vec![time; n], entry.nominal_literals()),
        }
    }
}

/// Reads an exposure time that depends on nothing, in seconds.
///
/// # Errors
///
/// Every fault, each with its character from 1 where it has one.
pub(super) fn time(text: &str) -> Result<f64, Vec<String>> {
    let entry = parse(text)?;
    if let Some(name) = entry.names().first() {
        return Err(vec![format!(
            "character {}: expected a time that is a number with its unit, found the name `{}`",
            name.span.start + 1,
            name.cell
        )]);
    }
    let outcome = entry
        .evaluate(&[], entry.nominal_literals())
        .map_err(|fault| vec![fault.to_string()])?;
    checked(outcome, Dimension::TIME)
}

fn parse(text: &str) -> Result<Entry, Vec<String>> {
    let entry = Entry::parse(text)
        .map_err(|faults| faults.iter().map(ToString::to_string).collect::<Vec<_>>())?;
    let spread = entry
        .literals()
        .iter()
        .find(|used| used.literal.spread.is_some());
    match spread {
        Some(used) => Err(vec![format!(
            "character {}: guidance has no ± of its own: write the bare number",
            used.span.start + 1
        )]),
        None => Ok(entry),
    }
}

fn checked(outcome: Outcome, wanted: Dimension) -> Result<f64, Vec<String>> {
    let found = match outcome {
        Outcome::Quantity(quantity) if quantity.dimension == wanted => return Ok(quantity.si),
        Outcome::Quantity(quantity) => quantity.dimension.describe(),
        Outcome::Truth(_) => "a comparison".to_owned(),
    };
    Err(vec![format!(
        "expected {}, found {found}",
        wanted.describe()
    )])
}
