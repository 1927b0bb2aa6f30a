//! A number with its dimension, and what may be done with it.

use super::{Dimension, Error, Unit};
use std::cmp::Ordering;

/// How a temperature is meant; every other quantity is [`Sense::Plain`].
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// A quantity that can be reckoned with; a temperature counts from 0 K.
    Plain,
    /// A point on a scale, as typed in °C or °F.
    Point,
    /// A difference of two temperatures, which has no reading in °C or °F.
    Difference,
}

/// A value in coherent SI units, with its dimension and sense.
///
/// # Examples
///
/// ```
/// use farglow::units::{Dimension, Quantity};
///
/// let width = Quantity::new(0.9, Dimension::LENGTH);
/// let height = Quantity::new(0.7, Dimension::LENGTH);
/// let area = width.times(height)?;
/// assert_eq!(area, Quantity::new(0.63, Dimension::AREA));
/// assert!(width.plus(area).is_err());
/// # Ok::<(), farglow::units::Error>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Quantity {
    /// The value in coherent SI units (kelvin for a point on a scale).
    pub si: f64,
    /// The kind of quantity.
    pub dimension: Dimension,
    /// How a temperature is meant.
    pub sense: Sense,
}

impl Quantity {
    /// Returns a plain quantity of `si` coherent SI units.
    pub const fn new(si: f64, dimension: Dimension) -> Self {
        Self {
            si,
            dimension,
            sense: Sense::Plain,
        }
    }

    /// Returns a plain number.
    pub const fn number(value: f64) -> Self {
        Self::new(value, Dimension::NONE)
    }

    /// Returns this quantity as one that can be reckoned with: a point on a
    /// scale becomes the same temperature in kelvin.
    ///
    /// This is how a temperature behaves that is referred to by its name.
    pub const fn absolute(self) -> Self {
        match self.sense {
            Sense::Point => Self::new(self.si, self.dimension),
            Sense::Plain | Sense::Difference => self,
        }
    }

    /// Returns the sum.
    ///
    /// A temperature plus a difference is a temperature.
    ///
    /// # Errors
    ///
    /// [`Error::Mismatch`] for different dimensions, [`Error::PointInArithmetic`]
    /// for a point on a scale, [`Error::NotFinite`].
    pub fn plus(self, other: Self) -> Result<Self, Error> {
        self.matched(other)?;
        let sense = match (self.reckoned()?.sense, other.reckoned()?.sense) {
            (Sense::Difference, Sense::Difference) => Sense::Difference,
            _ => Sense::Plain,
        };
        finite(self.si + other.si, self.dimension, sense)
    }

    /// Returns the difference.
    ///
    /// Two temperatures give a [`Sense::Difference`]; points on a scale may be
    /// subtracted from temperatures. A temperature less a difference is a
    /// temperature.
    ///
    /// # Errors
    ///
    /// [`Error::Mismatch`] for different dimensions, [`Error::PointInArithmetic`]
    /// for a point less a difference or a difference less a point,
    /// [`Error::NotFinite`].
    pub fn minus(self, other: Self) -> Result<Self, Error> {
        self.matched(other)?;
        let sense = match (self.sense, other.sense) {
            (Sense::Point, Sense::Difference) | (Sense::Difference, Sense::Point) => {
                return Err(Error::PointInArithmetic);
            }
            (Sense::Plain, Sense::Difference) => Sense::Plain,
            _ if self.dimension == Dimension::TEMPERATURE => Sense::Difference,
            _ => Sense::Plain,
        };
        finite(self.si - other.si, self.dimension, sense)
    }

    /// Returns this temperature lowered by a step that was typed in kelvin: it
    /// stays a temperature. Other quantities are subtracted as by
    /// [`minus`](Self::minus).
    ///
    /// # Errors
    ///
    /// As [`minus`](Self::minus); a point on a scale is refused.
    pub fn lowered(self, step: Self) -> Result<Self, Error> {
        self.matched(step)?;
        let sense = self.reckoned()?.sense;
        let _ = step.reckoned()?;
        finite(self.si - step.si, self.dimension, sense)
    }

    /// Returns the product.
    ///
    /// # Errors
    ///
    /// [`Error::PointInArithmetic`] for a point on a scale,
    /// [`Error::ExponentRange`], [`Error::NotFinite`].
    pub fn times(self, other: Self) -> Result<Self, Error> {
        let (left, right) = (self.reckoned()?, other.reckoned()?);
        let dimension = left
            .dimension
            .times(right.dimension)
            .ok_or(Error::ExponentRange)?;
        let sense = match (left.sense, right.sense) {
            (Sense::Difference, _) if right.dimension == Dimension::NONE => Sense::Difference,
            (_, Sense::Difference) if left.dimension == Dimension::NONE => Sense::Difference,
            _ => Sense::Plain,
        };
        finite(left.si * right.si, dimension, sense)
    }

    /// Returns the quotient.
    ///
    /// # Errors
    ///
    /// [`Error::DivisionByZero`], [`Error::PointInArithmetic`] for a point on a
    /// scale, [`Error::ExponentRange`], [`Error::NotFinite`].
    pub fn over(self, other: Self) -> Result<Self, Error> {
        let (left, right) = (self.reckoned()?, other.reckoned()?);
        if right.si == 0.0 {
            return Err(Error::DivisionByZero);
        }
        let dimension = left
            .dimension
            .over(right.dimension)
            .ok_or(Error::ExponentRange)?;
        let sense = if right.dimension == Dimension::NONE {
            left.sense
        } else {
            Sense::Plain
        };
        finite(left.si / right.si, dimension, sense)
    }

    /// Returns the power.
    ///
    /// The exponent is a plain number. On a quantity with a unit it must leave
    /// whole powers of the base units: `(16 m²)^0.5` is 4 m, `(16 m)^0.5` is
    /// refused.
    ///
    /// # Errors
    ///
    /// [`Error::Exponent`], [`Error::Fraction`], [`Error::NegativeRoot`],
    /// [`Error::DivisionByZero`] for zero to a negative power,
    /// [`Error::PointInArithmetic`], [`Error::ExponentRange`],
    /// [`Error::NotFinite`].
    pub fn power(self, exponent: Self) -> Result<Self, Error> {
        let base = self.reckoned()?;
        let exponent = exponent.reckoned()?;
        if exponent.dimension != Dimension::NONE {
            return Err(Error::Exponent {
                found: exponent.dimension,
            });
        }
        let dimension = power_of(base.dimension, exponent.si)?;
        if base.si == 0.0 && exponent.si < 0.0 {
            return Err(Error::DivisionByZero);
        }
        if base.si < 0.0 && exponent.si.fract() != 0.0 {
            return Err(Error::NegativeRoot { base: base.si });
        }
        let sense = if exponent.si == 1.0 {
            base.sense
        } else {
            Sense::Plain
        };
        // A product is exact to the last digit where `powf` need not be.
        let value = if exponent.si == 2.0 {
            base.si * base.si
        } else {
            base.si.powf(exponent.si)
        };
        finite(value, dimension, sense)
    }

    /// Returns the quantity with its sign turned.
    ///
    /// # Errors
    ///
    /// [`Error::PointInArithmetic`] for a point on a scale.
    pub fn negated(self) -> Result<Self, Error> {
        let own = self.reckoned()?;
        Ok(Self { si: -own.si, ..own })
    }

    /// Returns which of two quantities is the greater; points on a scale may be
    /// compared.
    ///
    /// # Errors
    ///
    /// [`Error::Mismatch`] for different dimensions, [`Error::NotFinite`] if a
    /// value is no number, [`Error::PointInArithmetic`] for a point against a
    /// difference.
    pub fn compare(self, other: Self) -> Result<Ordering, Error> {
        self.matched(other)?;
        if let (Sense::Point, Sense::Difference) | (Sense::Difference, Sense::Point) =
            (self.sense, other.sense)
        {
            return Err(Error::PointInArithmetic);
        }
        self.si.partial_cmp(&other.si).ok_or(Error::NotFinite)
    }

    /// Returns whether both are the same to the last bit.
    pub fn same_bits(&self, other: &Self) -> bool {
        self.si.to_bits() == other.si.to_bits()
            && self.dimension == other.dimension
            && self.sense == other.sense
    }

    /// Returns the number of `unit`s in this quantity.
    ///
    /// # Errors
    ///
    /// [`Error::Dimension`] if the unit is of another kind,
    /// [`Error::DifferenceOnScale`] for a difference in °C or °F,
    /// [`Error::NotFinite`] if the number is too large.
    pub fn to_unit(self, unit: &Unit) -> Result<f64, Error> {
        if unit.dimension() != self.dimension {
            return Err(Error::Dimension {
                needed: unit.dimension(),
                found: self.dimension,
            });
        }
        if unit.is_scale() && self.sense == Sense::Difference {
            return Err(Error::DifferenceOnScale {
                symbol: unit.symbol().to_owned(),
            });
        }
        let value = unit.from_si(self.si);
        if value.is_finite() {
            Ok(value)
        } else {
            Err(Error::NotFinite)
        }
    }

    fn matched(self, other: Self) -> Result<(), Error> {
        if self.dimension == other.dimension {
            Ok(())
        } else {
            Err(Error::Mismatch {
                left: self.dimension,
                right: other.dimension,
            })
        }
    }

    fn reckoned(self) -> Result<Self, Error> {
        match self.sense {
            Sense::Point => Err(Error::PointInArithmetic),
            Sense::Plain | Sense::Difference => Ok(self),
        }
    }
}

fn finite(si: f64, dimension: Dimension, sense: Sense) -> Result<Quantity, Error> {
    if si.is_finite() {
        Ok(Quantity {
            si,
            dimension,
            sense,
        })
    } else {
        Err(Error::NotFinite)
    }
}

/// The dimension of a power with a whole or broken exponent.
fn power_of(dimension: Dimension, exponent: f64) -> Result<Dimension, Error> {
    if dimension == Dimension::NONE {
        return Ok(dimension);
    }
    // Twelfths and below cover every root a formula of the field takes; the
    // tolerance only forgives the last bits of a written 1/3.
    for root in 1_i8..=12 {
        let whole = exponent * f64::from(root);
        if (whole - whole.round()).abs() > 1e-12 * whole.abs().max(1.0) {
            continue;
        }
        if whole.abs() > 127.0 {
            return Err(Error::ExponentRange);
        }
        // Within ±127, and whole.
        let whole = whole.round() as i8;
        return dimension
            .root(root)
            .map(|root| root.power(whole).ok_or(Error::ExponentRange))
            .unwrap_or(Err(Error::Fraction {
                exponent,
                of: dimension,
            }));
    }
    Err(Error::Fraction {
        exponent,
        of: dimension,
    })
}

#[cfg(test)]
mod tests;
