//! A unit of measurement: read from text, compound or simple, and converted.

mod reader;

pub(super) use reader::{from_superscript, is_symbol_sign, symbol_length};

use super::symbol;
use super::{Dimension, Error};
use reader::{Reader, why_not};

/// A unit with its dimension and exact factor.
///
/// Compound units join known symbols by `·` (or `*`, `×`), at most one `/`, and
/// whole powers (`²`, `^2`, `m2`), with brackets and without spaces:
/// `W/(m²·sr)`. `a/b/c` and `a/b·c` are not units, since people read them in
/// two ways.
///
/// # Accuracy
///
/// Factors are exact decimal fractions (π/180 for the degree) rounded once or
/// twice; a conversion there and back is within 4e-16 relative, for scales
/// relative to the temperature in kelvin or the offset.
///
/// # Source
///
/// See the table of symbols in this module. Checked against NIST SP 811 (2008)
/// Appendix B in this module's tests.
///
/// # Examples
///
/// ```
/// use farglow::units::{Dimension, Unit};
///
/// let unit = Unit::parse("kcal/(m2*h)")?;
/// assert_eq!(unit.symbol(), "kcal/(m²·h)");
/// assert_eq!(unit.dimension(), Dimension::IRRADIANCE);
/// assert!((unit.factor() - 1.163).abs() < 1e-15);
/// # Ok::<(), farglow::units::Error>(())
/// ```
#[derive(Clone, Debug, PartialEq)]
pub struct Unit {
    symbol: String,
    multiply: f64,
    divide: f64,
    offset: Option<f64>,
    dimension: Dimension,
}

impl Unit {
    /// Reads a whole text as a unit; the empty text and `1` are the unit of a
    /// plain number.
    ///
    /// # Errors
    ///
    /// [`Error::UnknownUnit`] with the nearest known symbol,
    /// [`Error::ScaleInCompound`] for °C or °F in a compound,
    /// [`Error::ExponentRange`], [`Error::NotAUnit`] for anything else.
    pub fn parse(text: &str) -> Result<Self, Error> {
        let text = text.trim();
        if text.is_empty() || text == "1" {
            return Ok(Self::one());
        }
        let mut reader = Reader { text, at: 0 };
        if let Some(parts) = reader.product(0, true)
            && reader.at == text.len()
        {
            return Ok(parts.into_unit());
        }
        Err(why_not(text))
    }

    /// Returns the longest run from the start of `text`, without spaces, that
    /// is a unit, and its length in bytes; `None` if none is.
    ///
    /// A symbol directly before an opening bracket is not one: `min(` is a
    /// function.
    pub fn longest(text: &str) -> Option<(Self, usize)> {
        let mut reader = Reader { text, at: 0 };
        if text.starts_with('(') {
            return None;
        }
        let parts = reader.product(0, false)?;
        Some((parts.into_unit(), reader.at))
    }

    /// Returns the known symbol that was probably meant by an unknown one.
    pub fn suggest(symbol: &str) -> Option<&'static str> {
        symbol::suggest(symbol)
    }

    /// Returns the frozen list of bare symbols, which are reserved as names,
    /// sorted.
    pub fn symbols() -> &'static [&'static str] {
        symbol::RESERVED
    }

    /// Returns the symbol of every known unit, as it is printed, in the order of
    /// their kinds.
    pub fn known() -> impl Iterator<Item = &'static str> {
        symbol::SYMBOLS.iter().map(|known| known.symbol)
    }

    /// Returns the unit of a plain number; its symbol is empty.
    pub const fn one() -> Self {
        Self {
            symbol: String::new(),
            multiply: 1.0,
            divide: 1.0,
            offset: None,
            dimension: Dimension::NONE,
        }
    }

    /// Returns the coherent SI unit of a dimension.
    pub fn coherent(dimension: Dimension) -> Self {
        Self {
            symbol: dimension.si_unit(),
            dimension,
            ..Self::one()
        }
    }

    /// Returns the symbol as it is printed: `W/(m²·sr)`.
    pub fn symbol(&self) -> &str {
        &self.symbol
    }

    /// Returns the kind of quantity that this unit measures.
    pub const fn dimension(&self) -> Dimension {
        self.dimension
    }

    /// Returns how many coherent SI units one of this unit is; for a scale, how
    /// many kelvin one of its steps is.
    pub const fn factor(&self) -> f64 {
        self.multiply / self.divide
    }

    /// Returns whether this is a temperature scale with a zero of its own, °C or
    /// °F.
    pub const fn is_scale(&self) -> bool {
        self.offset.is_some()
    }

    /// Returns `value` of this unit in coherent SI units (a point on the scale,
    /// for °C and °F).
    pub fn to_si(&self, value: f64) -> f64 {
        self.step_to_si(value + self.offset.unwrap_or(0.0))
    }

    /// Returns a width or difference of `value` of this unit in coherent SI
    /// units: 9 °F are 5 K.
    pub fn step_to_si(&self, value: f64) -> f64 {
        value * self.multiply / self.divide
    }

    /// Returns how many of this unit `si` coherent SI units are.
    pub fn from_si(&self, si: f64) -> f64 {
        si * self.divide / self.multiply - self.offset.unwrap_or(0.0)
    }
}

#[cfg(test)]
mod tests;
