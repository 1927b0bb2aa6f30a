//! What can be wrong with a unit or with an operation on quantities.

use super::Dimension;
use thiserror::Error as ThisError;

/// A unit that cannot be read, or an operation that has no meaning.
#[derive(Clone, Debug, PartialEq, ThisError)]
pub enum Error {
    /// A symbol is not one of the known units.
    #[error("unknown unit `{symbol}`{}", did_you_mean(*.suggestion))]
    UnknownUnit {
        /// The symbol as written.
        symbol: String,
        /// The known symbol nearest to it.
        suggestion: Option<&'static str>,
    },
    /// The text is no unit expression.
    #[error("expected a unit such as `W/m²`, found `{text}`")]
    NotAUnit {
        /// The text as written.
        text: String,
    },
    /// A temperature scale inside a compound unit.
    #[error("expected K inside a compound unit, found `{symbol}`")]
    ScaleInCompound {
        /// The symbol of the scale.
        symbol: &'static str,
    },
    /// Exponents too large to be kept.
    #[error("expected a dimension with small exponents, found one that leaves the range of ±127")]
    ExponentRange,
    /// Two quantities of different kinds meet where one kind is needed.
    #[error("expected {} on both sides, found {} and {}", needed_kind(*.left), .left.describe(), .right.describe())]
    Mismatch {
        /// The dimension on the left.
        left: Dimension,
        /// The dimension on the right.
        right: Dimension,
    },
    /// A quantity of the wrong kind.
    #[error("expected {}, found {}", .needed.describe(), .found.describe())]
    Dimension {
        /// The dimension that is needed.
        needed: Dimension,
        /// The dimension that was found.
        found: Dimension,
    },
    /// A point on a temperature scale where only an amount has a meaning.
    #[error("expected a quantity that can be reckoned with, found a temperature in °C or °F")]
    PointInArithmetic,
    /// A difference of temperatures shown on a scale with its own zero.
    #[error("expected K for a difference of temperatures, found `{symbol}`")]
    DifferenceOnScale {
        /// The symbol of the scale.
        symbol: String,
    },
    /// A divisor of zero.
    #[error("expected a divisor other than zero, found 0")]
    DivisionByZero,
    /// A result that is infinite or no number.
    #[error("expected a finite result, found one that is too large or undefined")]
    NotFinite,
    /// A power whose exponent is no plain number.
    #[error("expected a plain number as exponent, found {}", .found.describe())]
    Exponent {
        /// The dimension of the exponent.
        found: Dimension,
    },
    /// A power or root that leaves no whole exponents of the base units.
    #[error("expected an exponent that keeps whole powers of the units, found {exponent} on {}", .of.describe())]
    Fraction {
        /// The exponent.
        exponent: f64,
        /// The dimension of the base.
        of: Dimension,
    },
    /// An even root or broken power of a negative number.
    #[error("expected a base of zero or more for a broken exponent, found {base}")]
    NegativeRoot {
        /// The base, in SI units.
        base: f64,
    },
}

impl Error {
    /// Returns the stable name of this error, in kebab case.
    pub fn code(&self) -> &'static str {
        match self {
            Self::UnknownUnit { .. } => "unknown-unit",
            Self::NotAUnit { .. } => "not-a-unit",
            Self::ScaleInCompound { .. } => "scale-in-compound",
            Self::ExponentRange => "exponent-range",
            Self::Mismatch { .. } | Self::Dimension { .. } => "dimension",
            Self::PointInArithmetic => "point-in-arithmetic",
            Self::DifferenceOnScale { .. } => "difference-on-scale",
            Self::DivisionByZero => "division-by-zero",
            Self::NotFinite => "not-finite",
            Self::Exponent { .. } => "exponent",
            Self::Fraction { .. } => "broken-power",
            Self::NegativeRoot { .. } => "negative-root",
        }
    }

    /// Returns what to do about it, where there is something to say.
    pub fn hint(&self) -> Option<String> {
        let text = match self {
            Self::UnknownUnit {
                suggestion: Some(suggestion),
                ..
            } => {
                return Some(format!("write `{suggestion}`"));
            }
            Self::UnknownUnit { .. } => {
                "known are SI units such as m, s, K, W, J, Pa and their multiples, and °C, °F, °, %, in, ft, cal, Btu"
            }
            Self::NotAUnit { .. } => "join symbols by `·`, `/` and `^` without spaces: `W/(m²·sr)`",
            Self::ScaleInCompound { .. } => {
                "write K: a step of 1 °C is 1 K, a step of 1 °F is 5/9 K"
            }
            Self::ExponentRange => "lower the exponent",
            Self::Mismatch { left, right }
                if *left == Dimension::NONE || *right == Dimension::NONE =>
            {
                "give the plain number its unit"
            }
            Self::Mismatch { .. } => "bring both sides to the same kind of quantity",
            Self::Dimension {
                needed: Dimension::NONE,
                ..
            } => "divide by a quantity of the same kind, such as `/ (1 m)`",
            Self::Dimension {
                found: Dimension::NONE,
                ..
            } => "give the number its unit",
            Self::Dimension { .. } => return None,
            Self::PointInArithmetic => {
                "write the temperature in K, or give it a cell of its own and use that cell's name: names count in K"
            }
            Self::DifferenceOnScale { .. } => "show it in K: 20 K is a step of 20 °C or 36 °F",
            Self::DivisionByZero => "check the value of the divisor",
            Self::NotFinite => "check the sizes of the values",
            Self::Exponent { .. } => "divide the exponent by its unit, such as `(t / 1 s)`",
            Self::Fraction { .. } => "divide the base by its unit first, such as `(x / 1 m)^0.5`",
            Self::NegativeRoot { .. } => "check the sign of the base, or take its `abs(…)`",
        };
        Some(text.to_owned())
    }
}

fn did_you_mean(suggestion: Option<&'static str>) -> String {
    suggestion.map_or_else(String::new, |symbol| format!(", did you mean `{symbol}`?"))
}

fn needed_kind(left: Dimension) -> String {
    left.name().map_or_else(
        || "the same kind of quantity".to_owned(),
        |_| left.describe(),
    )
}
