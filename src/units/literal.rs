//! `number [± number] [unit]`, as a person types a quantity.

use super::unit::{from_superscript, is_symbol_sign, symbol_length};
use super::{Quantity, Sense, Unit};
use std::fmt;
use std::ops::Range;

/// A typed quantity: its number, spread and unit as written.
///
/// The spread is an expanded uncertainty (coverage factor 2, about 95 %), in
/// the unit of the number; the unit stands behind both.
///
/// # Examples
///
/// ```
/// use farglow::units::Literal;
///
/// let hearth = Literal::read("1250 ± 25 °C").expect("this is a literal");
/// assert_eq!(hearth.quantity().si, 1523.15);
/// assert_eq!(hearth.spread_si(), Some(25.0));
/// ```
#[derive(Clone, Debug, PartialEq)]
pub struct Literal {
    /// The number before the unit.
    pub number: f64,
    /// The number after `±`, zero or more.
    pub spread: Option<f64>,
    /// The unit, if there is one.
    pub unit: Option<Unit>,
    /// How many bytes of the text were read.
    pub length: usize,
}

/// Why a text does not begin with a literal, and where.
#[derive(Clone, Debug, PartialEq)]
pub struct LiteralError {
    /// The part of the text, in bytes from its start.
    pub at: Range<usize>,
    /// What is wrong with it.
    pub kind: LiteralFault,
}

/// What can be wrong with a literal.
#[derive(Clone, Debug, PartialEq)]
pub enum LiteralFault {
    /// There is no number.
    NoNumber {
        /// What stands there instead, shortened.
        found: String,
    },
    /// A point without digits on both sides.
    PointWithoutDigits {
        /// The number as it should be written.
        remedy: String,
    },
    /// A number beyond what can be reckoned with.
    TooLarge,
    /// A number other than zero that would be kept as zero.
    TooSmall,
    /// A spread below zero.
    NegativeSpread,
    /// A `±` without a number behind it.
    MissingSpread,
    /// A word behind the number that is no unit.
    UnknownUnit {
        /// The word as written.
        symbol: String,
        /// The known symbol nearest to it.
        suggestion: Option<&'static str>,
    },
    /// A temperature below 0 K.
    BelowAbsoluteZero {
        /// The lowest number on the scale.
        lowest: &'static str,
    },
}

impl LiteralFault {
    /// Returns the stable name of this fault, in kebab case.
    pub const fn code(&self) -> &'static str {
        match self {
            Self::NoNumber { .. } => "no-number",
            Self::PointWithoutDigits { .. } => "point-without-digits",
            Self::TooLarge => "too-large",
            Self::TooSmall => "too-small",
            Self::NegativeSpread => "negative-spread",
            Self::MissingSpread => "missing-spread",
            Self::UnknownUnit { .. } => "unknown-unit",
            Self::BelowAbsoluteZero { .. } => "below-absolute-zero",
        }
    }

    /// Returns what to do about it.
    pub fn hint(&self) -> String {
        match self {
            Self::NoNumber { .. } => "begin with a number, such as `2.5 m`".to_owned(),
            Self::PointWithoutDigits { remedy } => format!("write `{remedy}`"),
            Self::TooLarge | Self::TooSmall => "check the exponent, or use another unit".to_owned(),
            Self::NegativeSpread => "leave out the minus: `±` already means both ways".to_owned(),
            Self::MissingSpread => "write a number behind `±`, such as `1250 ± 25 °C`".to_owned(),
            Self::UnknownUnit {
                suggestion: Some(suggestion),
                ..
            } => format!("write `{suggestion}`"),
            Self::UnknownUnit { symbol, .. } => {
                format!("write a unit such as m, s, °C, kW/m²; for a product write `* {symbol}`")
            }
            Self::BelowAbsoluteZero { .. } => "check the sign and the unit".to_owned(),
        }
    }
}

impl fmt::Display for LiteralFault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoNumber { found } if found.is_empty() => {
                f.write_str("expected a number, found nothing")
            }
            Self::NoNumber { found } => write!(f, "expected a number, found `{found}`"),
            Self::PointWithoutDigits { .. } => {
                f.write_str("expected digits on both sides of the decimal point")
            }
            Self::TooLarge => f.write_str("expected a number below 1.8e308, found a larger one"),
            Self::TooSmall => {
                f.write_str("expected zero or a number above 2.3e-308, found a smaller one")
            }
            Self::NegativeSpread => {
                f.write_str("expected a spread of zero or more, found a negative one")
            }
            Self::MissingSpread => f.write_str("expected a number behind `±`, found none"),
            Self::UnknownUnit { symbol, suggestion } => {
                write!(f, "unknown unit `{symbol}`")?;
                match suggestion {
                    Some(suggestion) => write!(f, ", did you mean `{suggestion}`?"),
                    None => Ok(()),
                }
            }
            Self::BelowAbsoluteZero { lowest } => {
                write!(
                    f,
                    "expected a temperature of {lowest} or more, found a lower one"
                )
            }
        }
    }
}

impl fmt::Display for LiteralError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        self.kind.fmt(f)
    }
}

impl std::error::Error for LiteralError {}

impl Literal {
    /// Reads a literal from the start of `text`; what follows it is left alone.
    ///
    /// A leading minus belongs to the literal. `+-` is `±`; digits may be
    /// grouped by thin spaces, and `1.2×10⁻⁵` is `1.2e-5`, so that printed
    /// values can be read back.
    ///
    /// # Errors
    ///
    /// [`LiteralError`] with the place and one of [`LiteralFault`].
    pub fn read(text: &str) -> Result<Self, LiteralError> {
        let mut at = 0;
        let negative = text.starts_with(['-', '−']);
        if negative {
            at = sign_length(text);
            at += spaces(&text[at..]);
        }
        let start = at;
        let (size, length) = number(&text[at..]).map_err(|error| error.shifted(start))?;
        at += length;
        let (spread, length) = spread(&text[at..]).map_err(|error| error.shifted(at))?;
        at += length;
        let (unit, length) = unit(&text[at..]).map_err(|error| error.shifted(at))?;
        at += length;
        let literal = Self {
            number: if negative { -size } else { size },
            spread,
            unit,
            length: at,
        };
        literal.checked()
    }

    /// Returns the nominal value; in °C and °F it is a point on the scale.
    pub fn quantity(&self) -> Quantity {
        match &self.unit {
            None => Quantity::number(self.number),
            Some(unit) => Quantity {
                si: unit.to_si(self.number),
                dimension: unit.dimension(),
                sense: if unit.is_scale() {
                    Sense::Point
                } else {
                    Sense::Plain
                },
            },
        }
    }

    /// Returns the spread in coherent SI units: 25 K for ± 25 °C, 5 K for
    /// ± 9 °F.
    pub fn spread_si(&self) -> Option<f64> {
        let spread = self.spread?;
        Some(match &self.unit {
            None => spread,
            Some(unit) => unit.step_to_si(spread),
        })
    }

    /// Values that a unit takes out of range, or below absolute zero.
    fn checked(self) -> Result<Self, LiteralError> {
        let fault = |kind| {
            Err(LiteralError {
                at: 0..self.length,
                kind,
            })
        };
        let quantity = self.quantity();
        if !quantity.si.is_finite() || self.spread_si().is_some_and(|si| !si.is_finite()) {
            return fault(LiteralFault::TooLarge);
        }
        // A hair below zero is the rounding of the scale's own zero.
        if quantity.sense == Sense::Point && quantity.si < -1e-10 {
            let fahrenheit = self.unit.as_ref().is_some_and(|unit| unit.symbol() == "°F");
            return fault(LiteralFault::BelowAbsoluteZero {
                lowest: if fahrenheit {
                    "-459.67 °F"
                } else {
                    "-273.15 °C"
                },
            });
        }
        if quantity.sense != Sense::Point && self.number != 0.0 && !quantity.si.is_normal() {
            return fault(LiteralFault::TooSmall);
        }
        Ok(self)
    }
}

impl LiteralError {
    fn new(at: Range<usize>, kind: LiteralFault) -> Self {
        Self { at, kind }
    }

    fn shifted(self, by: usize) -> Self {
        Self::new(self.at.start + by..self.at.end + by, self.kind)
    }
}

fn sign_length(text: &str) -> usize {
    text.chars().next().map_or(0, char::len_utf8)
}

fn spaces(text: &str) -> usize {
    text.len() - text.trim_start().len()
}

/// Thin space, narrow no-break space: what groups digits in print.
fn is_group_space(sign: char) -> bool {
    matches!(sign, '\u{2009}' | '\u{202f}')
}

fn digits(text: &str) -> usize {
    text.bytes().take_while(u8::is_ascii_digit).count()
}

/// Reads an unsigned number.
fn number(text: &str) -> Result<(f64, usize), LiteralError> {
    let mut at = digits(text);
    if at == 0 {
        return Err(no_number(text));
    }
    // Groups of three behind thin spaces.
    let mut groups = false;
    while let Some(space) = text[at..]
        .chars()
        .next()
        .filter(|&sign| is_group_space(sign))
    {
        let next = at + space.len_utf8();
        if digits(&text[next..]) != 3 {
            break;
        }
        at = next + 3;
        groups = true;
    }
    if let Some(behind) = text[at..].strip_prefix('.') {
        let places = digits(behind);
        if places == 0 {
            let remedy = format!("{}.0", &text[..at]);
            let kind = LiteralFault::PointWithoutDigits { remedy };
            return Err(LiteralError::new(0..at + 1, kind));
        }
        at += 1 + places;
    }
    let mantissa = at;
    let mut exponent = String::new();
    let rest = &text[at..];
    if rest.starts_with(['e', 'E']) {
        let behind = &rest[1..];
        let signed = behind.starts_with(['+', '-', '−']);
        let sign = if signed { sign_length(behind) } else { 0 };
        let places = digits(&behind[sign..]);
        if places > 0 {
            if behind.starts_with(['-', '−']) {
                exponent.push('-');
            }
            exponent.push_str(&behind[sign..sign + places]);
            at += 1 + sign + places;
        }
    } else if let Some(behind) = rest.strip_prefix("×10") {
        let mut length = 0;
        for (sign, read) in behind
            .chars()
            .map_while(|c| from_superscript(c).map(|r| (c, r)))
        {
            exponent.push(read);
            length += sign.len_utf8();
        }
        if exponent.parse::<i64>().is_ok() {
            at += "×10".len() + length;
        } else {
            exponent.clear();
        }
    }
    let mut plain = String::new();
    let written = &text[..mantissa];
    if groups || !exponent.is_empty() {
        plain.extend(written.chars().filter(|&sign| !is_group_space(sign)));
        if !exponent.is_empty() {
            plain.push('e');
            plain.push_str(&exponent);
        }
    }
    let source = if plain.is_empty() { written } else { &plain };
    let value: f64 = source
        .parse()
        .expect("digits, one point and an exponent are a number");
    if value.is_infinite() {
        return Err(LiteralError::new(0..at, LiteralFault::TooLarge));
    }
    let is_zero = !written.bytes().any(|byte| (b'1'..=b'9').contains(&byte));
    if !is_zero && !value.is_normal() {
        return Err(LiteralError::new(0..at, LiteralFault::TooSmall));
    }
    Ok((value, at))
}

fn no_number(text: &str) -> LiteralError {
    if let Some(behind) = text.strip_prefix('.') {
        let places = digits(behind);
        if places > 0 {
            let remedy = format!("0.{}", &behind[..places]);
            let kind = LiteralFault::PointWithoutDigits { remedy };
            return LiteralError::new(0..1 + places, kind);
        }
    }
    let word = symbol_length(text).max(sign_length(text));
    let found: String = text[..word].chars().take(20).collect();
    LiteralError::new(0..word, LiteralFault::NoNumber { found })
}

/// Reads `± number`, if it is there.
fn spread(text: &str) -> Result<(Option<f64>, usize), LiteralError> {
    let start = spaces(text);
    let rest = &text[start..];
    let sign = ["±", "+-", "+−"]
        .iter()
        .find(|sign| rest.starts_with(**sign));
    let Some(sign) = sign else {
        return Ok((None, 0));
    };
    let mut at = start + sign.len();
    at += spaces(&text[at..]);
    let rest = &text[at..];
    let negative = rest.starts_with(['-', '−']);
    if negative {
        at += sign_length(rest);
        at += spaces(&text[at..]);
    }
    match number(&text[at..]) {
        Ok((_, length)) if negative => Err(LiteralError::new(
            start..at + length,
            LiteralFault::NegativeSpread,
        )),
        Ok((value, length)) => Ok((Some(value), at + length)),
        Err(LiteralError {
            kind: LiteralFault::NoNumber { .. },
            ..
        }) => Err(LiteralError::new(
            start..start + sign.len(),
            LiteralFault::MissingSpread,
        )),
        Err(error) => Err(error.shifted(at)),
    }
}

/// Reads the unit, if there is one.
fn unit(text: &str) -> Result<(Option<Unit>, usize), LiteralError> {
    let start = spaces(text);
    let rest = &text[start..];
    if let Some((unit, length)) = Unit::longest(rest) {
        return Ok((Some(unit), start + length));
    }
    if !rest.starts_with(is_symbol_sign) {
        return Ok((None, 0));
    }
    let length = symbol_length(rest);
    // `2 sqrt(…)` lacks an operator, not a unit.
    if rest[length..].trim_start().starts_with('(') {
        return Ok((None, 0));
    }
    let symbol = rest[..length].to_owned();
    let suggestion = Unit::suggest(&symbol);
    Err(LiteralError::new(
        start..start + length,
        LiteralFault::UnknownUnit { symbol, suggestion },
    ))
}

#[cfg(test)]
mod tests;
