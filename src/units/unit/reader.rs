//! The grammar of compound units, by recursive descent with bounded depth.

use super::Unit;
use crate::units::dimension::superscript;
use crate::units::symbol::{self, Symbol};
use crate::units::{Dimension, Error};

/// A unit under construction.
pub(super) struct Parts {
    symbol: String,
    /// More than one symbol, so that it needs brackets as a divisor.
    several: bool,
    /// A quotient, so that nothing may follow it without brackets.
    quotient: bool,
    multiply: f64,
    divide: f64,
    offset: Option<f64>,
    dimension: Dimension,
}

impl Parts {
    fn of(symbol: &Symbol) -> Self {
        Self {
            symbol: symbol.symbol.to_owned(),
            several: false,
            quotient: false,
            multiply: symbol.multiply,
            divide: symbol.divide,
            offset: symbol.offset,
            dimension: symbol.dimension,
        }
    }

    fn one() -> Self {
        Self {
            symbol: "1".to_owned(),
            several: false,
            quotient: false,
            multiply: 1.0,
            divide: 1.0,
            offset: None,
            dimension: Dimension::NONE,
        }
    }

    fn power(mut self, exponent: i8) -> Option<Self> {
        if exponent == 1 {
            return Some(self);
        }
        if self.offset.is_some() || exponent == 0 {
            return None;
        }
        let size = i32::from(exponent.unsigned_abs());
        let (multiply, divide) = (self.multiply.powi(size), self.divide.powi(size));
        (self.multiply, self.divide) = if exponent > 0 {
            (multiply, divide)
        } else {
            (divide, multiply)
        };
        self.dimension = self.dimension.power(exponent)?;
        if self.several {
            self.symbol = format!("({})", self.symbol);
        }
        self.symbol.push_str(&superscript(i64::from(exponent)));
        self.several = false;
        self.quotient = false;
        self.is_usable().then_some(self)
    }

    fn join(&self, other: &Self, divided: bool) -> Option<Self> {
        if self.offset.is_some() || other.offset.is_some() {
            return None;
        }
        let (sign, above, below, dimension) = if divided {
            let dimension = self.dimension.over(other.dimension)?;
            ('/', other.divide, other.multiply, dimension)
        } else {
            let dimension = self.dimension.times(other.dimension)?;
            ('·', other.multiply, other.divide, dimension)
        };
        let bracketed = |parts: &Self, needed: bool| {
            if needed {
                format!("({})", parts.symbol)
            } else {
                parts.symbol.clone()
            }
        };
        let left = bracketed(self, self.quotient);
        let symbol = format!("{left}{sign}{}", bracketed(other, other.several));
        let joined = Self {
            symbol,
            several: true,
            quotient: divided,
            multiply: self.multiply * above,
            divide: self.divide * below,
            offset: None,
            dimension,
        };
        joined.is_usable().then_some(joined)
    }

    /// Whether the factor can be used: absurd powers would leave the range.
    fn is_usable(&self) -> bool {
        self.multiply.is_normal()
            && self.divide.is_normal()
            && (self.multiply / self.divide).is_normal()
    }

    pub(super) fn into_unit(mut self) -> Unit {
        if self.multiply % self.divide == 0.0 {
            (self.multiply, self.divide) = (self.multiply / self.divide, 1.0);
        } else if self.divide % self.multiply == 0.0 {
            (self.multiply, self.divide) = (1.0, self.divide / self.multiply);
        }
        Unit {
            symbol: self.symbol,
            multiply: self.multiply,
            divide: self.divide,
            offset: self.offset,
            dimension: self.dimension,
        }
    }
}

/// Brackets within brackets in a unit; nobody writes more.
const DEEPEST: usize = 8;

/// Reads a text from its start as far as it is a unit.
pub(super) struct Reader<'a> {
    pub(super) text: &'a str,
    pub(super) at: usize,
}

impl Reader<'_> {
    fn rest(&self) -> &str {
        &self.text[self.at..]
    }

    fn peek(&self) -> Option<char> {
        self.rest().chars().next()
    }

    fn eat(&mut self, wanted: char) -> bool {
        let found = self.peek() == Some(wanted);
        if found {
            self.at += wanted.len_utf8();
        }
        found
    }

    /// Reads as many terms as are a unit, and stays before the first sign that
    /// belongs to none. `reciprocal` allows a leading `1/`.
    pub(super) fn product(&mut self, depth: usize, reciprocal: bool) -> Option<Parts> {
        let mut parts = if reciprocal && self.rest().starts_with("1/") {
            self.at += 1;
            Parts::one()
        } else {
            self.term(depth)?
        };
        loop {
            let before = self.at;
            let divided = match self.peek() {
                Some('/') => true,
                Some('·' | '*' | '×' | '⋅') => false,
                _ => break,
            };
            self.at += self.peek().map_or(0, char::len_utf8);
            let Some(next) = self.term(depth) else {
                self.at = before;
                break;
            };
            let Some(joined) = parts.join(&next, divided) else {
                self.at = before;
                break;
            };
            parts = joined;
            // Nothing may follow a quotient: `a/b·c` has two readings.
            if divided {
                break;
            }
        }
        Some(parts)
    }

    fn term(&mut self, depth: usize) -> Option<Parts> {
        let start = self.at;
        let term = self.try_term(depth);
        if term.is_none() {
            self.at = start;
        }
        term
    }

    fn try_term(&mut self, depth: usize) -> Option<Parts> {
        let parts = if self.eat('(') {
            if depth == DEEPEST {
                return None;
            }
            let inside = self.product(depth + 1, false)?;
            if !self.eat(')') {
                return None;
            }
            inside
        } else {
            let length = symbol_length(self.rest());
            let (symbol, power) = symbol::find(&self.rest()[..length])?;
            self.at += length;
            Parts::of(symbol).power(power)?
        };
        let before = self.at;
        let is_percent = self.text[..before].ends_with('%');
        let parts = match self.exponent() {
            Some(exponent) if !parts.several || self.text[..before].ends_with(')') => {
                parts.power(exponent)?
            }
            Some(_) => return None,
            None => parts,
        };
        // `m(`, `m²x`: not the end of a unit; `%` needs no gap behind it.
        match self.peek() {
            Some('(') => None,
            Some(next) if !is_percent && (is_symbol_sign(next) || next.is_ascii_digit()) => None,
            _ => Some(parts),
        }
    }

    /// Reads `²`, `⁻¹`, `^2`, `^-1` or `^(-1)`; stays in place if there is none.
    fn exponent(&mut self) -> Option<i8> {
        let start = self.at;
        let exponent = self.try_exponent();
        if exponent.is_none() {
            self.at = start;
        }
        exponent
    }

    fn try_exponent(&mut self) -> Option<i8> {
        let mut digits = String::new();
        if self.eat('^') {
            let bracket = self.eat('(');
            if self.eat('-') || self.eat('−') {
                digits.push('-');
            }
            while let Some(digit) = self.peek().filter(char::is_ascii_digit) {
                digits.push(digit);
                self.at += 1;
            }
            if bracket && !self.eat(')') {
                return None;
            }
            // `m^2.5` is a power of a quantity, not a unit.
            if self.peek() == Some('.') {
                return None;
            }
        } else {
            while let Some(digit) = self.peek().and_then(from_superscript) {
                digits.push(digit);
                self.at += self.peek().map_or(0, char::len_utf8);
            }
        }
        digits.parse().ok()
    }
}

pub(in crate::units) fn from_superscript(sign: char) -> Option<char> {
    Some(match sign {
        '⁻' => '-',
        '⁰' => '0',
        '¹' => '1',
        '²' => '2',
        '³' => '3',
        '⁴' => '4',
        '⁵' => '5',
        '⁶' => '6',
        '⁷' => '7',
        '⁸' => '8',
        '⁹' => '9',
        _ => return None,
    })
}

pub(in crate::units) fn is_symbol_sign(sign: char) -> bool {
    sign.is_alphabetic() || matches!(sign, '_' | '°' | '%' | 'µ')
}

/// The length in bytes of the word at the start of a text that could be a
/// symbol: one `%`, or letters, `°` and digits.
pub(in crate::units) fn symbol_length(text: &str) -> usize {
    if text.starts_with('%') {
        return 1;
    }
    let mut length = 0;
    for sign in text.chars() {
        let fits = (is_symbol_sign(sign) && sign != '%') || (length > 0 && sign.is_ascii_digit());
        if !fits || (sign == '°' && length > 0) {
            break;
        }
        length += sign.len_utf8();
    }
    length
}

/// Says what is wrong with a text that is no unit.
pub(super) fn why_not(text: &str) -> Error {
    let mut symbols = Vec::new();
    let mut at = 0;
    while let Some(sign) = text[at..].chars().next() {
        let length = symbol_length(&text[at..]);
        if length > 0 {
            symbols.push(&text[at..at + length]);
            at += length;
        } else {
            at += sign.len_utf8();
        }
    }
    for word in &symbols {
        if symbol::find(word).is_none() {
            return Error::UnknownUnit {
                symbol: (*word).to_owned(),
                suggestion: symbol::suggest(word),
            };
        }
    }
    let scale = symbols
        .iter()
        .filter_map(|word| symbol::find(word))
        .find(|(symbol, _)| symbol.offset.is_some());
    match scale {
        Some((symbol, _)) => Error::ScaleInCompound {
            symbol: symbol.symbol,
        },
        None => Error::NotAUnit {
            text: text.to_owned(),
        },
    }
}
