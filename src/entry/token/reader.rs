//! The reading itself: one pass from left to right that knows whether a value
//! or an operator must come next.

mod operator;
mod word;

use super::{LiteralUse, Sign, Span, Token, Tokens, fault};
use crate::entry::name::{is_first, is_later};
use crate::entry::{DEEPEST, Diagnostic, LONGEST};
use crate::units::{Literal, Unit};
use operator::binary;

/// The most faults that are told of one entry; more would hide the first.
pub(super) const MOST_FAULTS: usize = 8;

/// What is open: the whole text, a bracket, or the arguments of a function.
struct Level {
    is_call: bool,
    /// The place of the opening bracket.
    open: Span,
    /// The value being read is the exponent of a power.
    in_exponent: bool,
}

pub(super) struct Reader<'a> {
    text: &'a str,
    /// Bytes and characters read so far.
    at: usize,
    place: usize,
    tokens: Tokens,
    levels: Vec<Level>,
    faults: Vec<Diagnostic>,
    /// A value stands before this place, so an operator must come.
    after_value: bool,
    /// The last value was left in doubt by a fault.
    in_doubt: bool,
}

impl<'a> Reader<'a> {
    pub(super) fn new(text: &'a str) -> Self {
        Self {
            text,
            at: 0,
            place: 0,
            tokens: Tokens::default(),
            levels: vec![Level {
                is_call: false,
                open: Span::default(),
                in_exponent: false,
            }],
            faults: Vec::new(),
            after_value: false,
            in_doubt: false,
        }
    }

    pub(super) fn read(mut self) -> Result<Tokens, Vec<Diagnostic>> {
        if self.text.chars().nth(LONGEST).is_some() {
            return Err(vec![fault::too_long().at(LONGEST..LONGEST + 1)]);
        }
        self.skip_spaces();
        if self.rest().is_empty() {
            return Err(vec![fault::empty()]);
        }
        while !self.rest().is_empty() && self.faults.len() < MOST_FAULTS {
            if self.after_value {
                self.operator();
            } else {
                self.value();
            }
            self.skip_spaces();
        }
        self.finish();
        if self.faults.is_empty() {
            Ok(self.tokens)
        } else {
            Err(self.faults)
        }
    }

    fn finish(&mut self) {
        if self.faults.len() >= MOST_FAULTS {
            return;
        }
        if !self.after_value && !self.in_doubt {
            let place = self.place;
            self.faults
                .push(fault::expected_value("the end").at(place..place));
        }
        if let Some(level) = self.levels.iter().skip(1).next_back() {
            self.faults.push(fault::unclosed().at(level.open.into()));
        }
    }

    // ---- moving on ----

    fn rest(&self) -> &'a str {
        &self.text[self.at..]
    }

    fn peek(&self) -> Option<char> {
        self.rest().chars().next()
    }

    fn skip_spaces(&mut self) {
        while let Some(sign) = self.peek().filter(|sign| sign.is_whitespace()) {
            self.at += sign.len_utf8();
            self.place += 1;
        }
    }

    /// Moves on by a number of bytes and returns the place of what was passed.
    fn take(&mut self, bytes: usize) -> Span {
        let passed = &self.rest()[..bytes];
        let start = self.place;
        self.place += if passed.is_ascii() {
            bytes
        } else {
            passed.chars().count()
        };
        self.at += bytes;
        // At most `LONGEST` characters are read, which fits.
        Span {
            start: start as u16,
            end: self.place as u16,
        }
    }

    fn take_sign(&mut self) -> Span {
        self.take(self.peek().map_or(0, char::len_utf8))
    }

    fn push(&mut self, sign: Sign, span: Span) {
        self.tokens.list.push(Token { sign, span });
        self.in_doubt = false;
    }

    fn push_value(&mut self, sign: Sign, span: Span) {
        self.push(sign, span);
        self.after_value = true;
    }

    /// Notes a fault; what it covers counts as the value or operator it should
    /// have been, so that one slip is told once.
    fn refuse(&mut self, fault: Diagnostic, span: Span, as_value: bool) {
        // `x ? 1 : 2` is one condition, not two.
        let is_told =
            fault.code == "conditional" && self.faults.iter().any(|f| f.code == fault.code);
        if !is_told {
            self.faults.push(fault.at(span.into()));
        }
        self.after_value = as_value;
        self.in_doubt = true;
    }

    fn level(&mut self) -> &mut Level {
        self.levels
            .last_mut()
            .expect("the level of the whole text is never closed")
    }

    fn last(&self) -> Option<Sign> {
        self.tokens.list.last().map(|token| token.sign)
    }

    // ---- where a value must come ----

    fn value(&mut self) {
        let rest = self.rest();
        let Some(sign) = self.peek() else { return };
        match sign {
            '0'..='9' | '.' => self.literal(),
            '-' | '−' => self.prefix_minus(),
            _ if rest.starts_with("+-") || rest.starts_with("+−") || sign == '±' => {
                let length = if sign == '±' {
                    sign.len_utf8()
                } else {
                    1 + rest[1..].chars().next().map_or(0, char::len_utf8)
                };
                let span = self.take(length);
                self.refuse(fault::stray_spread(), span, false);
            }
            '+' => {
                let span = self.take_sign();
                self.refuse(fault::prefix_plus(), span, false);
            }
            '!' if !rest.starts_with("!=") => self.prefix(Sign::Not),
            '(' => {
                let span = self.take_sign();
                self.open(false, span);
            }
            ')' => self.close_without_value(),
            _ if sign.is_ascii() && is_first(sign as u8) => self.word(),
            ',' => {
                let span = self.take_sign();
                self.refuse(fault::expected_value("`,`"), span, false);
            }
            _ => self.no_value(sign),
        }
    }

    fn literal(&mut self) {
        match Literal::read(self.rest()) {
            Ok(literal) => self.push_literal(literal),
            Err(error) => {
                let before = self.take(error.at.start);
                let mut span = self.take(error.at.end - error.at.start);
                if span.start == span.end {
                    span.start = before.start;
                }
                let fault = Diagnostic::new(error.kind.code(), error.to_string())
                    .with_hint(error.kind.hint());
                self.refuse(fault, span, true);
                self.skip_literal_rest();
            }
        }
    }

    /// Passes what belongs to a broken literal, so that it is no second fault:
    /// its unit, or the rest of a compound whose first symbol is unknown.
    fn skip_literal_rest(&mut self) {
        let behind_symbol = format!("m{}", self.rest());
        if let Some((_, length @ 2..)) = Unit::longest(&behind_symbol)
            && self.rest().starts_with(['/', '·', '*', '×', '⋅'])
        {
            let _ = self.take(length - 1);
            return;
        }
        self.skip_spaces();
        if let Some((_, length)) = Unit::longest(self.rest()) {
            let _ = self.take(length);
        }
    }

    fn push_literal(&mut self, literal: Literal) {
        let span = self.take(literal.length);
        let index = self.tokens.literals.len() as u16;
        self.tokens.literals.push(LiteralUse {
            literal,
            span: span.into(),
        });
        self.push_value(Sign::Literal(index), span);
    }

    /// A minus before a literal belongs to it, so that `-40 °C` is a point on
    /// the scale; before a power it does not, since `-2^2` is `-(2^2)`.
    fn prefix_minus(&mut self) {
        let is_run = matches!(self.last(), Some(Sign::Minus | Sign::Not));
        let rest = self.rest();
        let behind = rest[self.sign_length()..].trim_start();
        if !is_run && behind.starts_with(|sign: char| sign.is_ascii_digit()) {
            match Literal::read(rest) {
                Ok(literal) => {
                    let is_base = rest[literal.length..].trim_start().starts_with('^');
                    if !is_base {
                        self.push_literal(literal);
                        return;
                    }
                }
                Err(_) => {
                    self.literal();
                    return;
                }
            }
        }
        self.prefix(Sign::Minus);
    }

    fn sign_length(&self) -> usize {
        self.peek().map_or(0, char::len_utf8)
    }

    fn prefix(&mut self, sign: Sign) {
        let is_run = matches!(self.last(), Some(Sign::Minus | Sign::Not)) && !self.in_doubt;
        let mut span = self.take_sign();
        if is_run {
            // The whole run is one fault.
            while let Some('-' | '−' | '!' | ' ') = self.peek() {
                span.end = self.take_sign().end;
            }
            self.refuse(fault::sign_run(), span, false);
            return;
        }
        self.push(sign, span);
    }

    fn open(&mut self, is_call: bool, span: Span) {
        if self.levels.len() > DEEPEST {
            self.faults.push(fault::too_deep().at(span.into()));
            // Nothing behind it can be told apart: stop here.
            self.at = self.text.len();
            self.after_value = true;
            self.levels.truncate(1);
            return;
        }
        self.levels.push(Level {
            is_call,
            open: span,
            in_exponent: false,
        });
        self.push(Sign::Open, span);
        self.after_value = false;
    }

    fn close_without_value(&mut self) {
        let in_doubt = self.in_doubt;
        let last = self.last();
        let span = self.take_sign();
        if self.levels.len() == 1 {
            self.refuse(fault::unmatched_close(), span, false);
            return;
        }
        let level = self.levels.pop();
        if !in_doubt {
            let (fault, place) = match (last, level) {
                (Some(Sign::Open), Some(level)) => (
                    fault::empty_brackets(),
                    Span {
                        start: level.open.start,
                        end: span.end,
                    },
                ),
                _ => (fault::expected_value("`)`"), span),
            };
            self.refuse(fault, place, true);
        }
        self.after_value = true;
        self.in_doubt = true;
    }

    /// Something that can begin no value.
    fn no_value(&mut self, sign: char) {
        let rest = self.rest();
        if let Some((length, fault)) = self.forbidden() {
            let span = self.take(length);
            self.refuse(fault, span, false);
            return;
        }
        if let Some((_, length)) = binary(rest) {
            let shown = format!("`{}`", &rest[..length]);
            let span = self.take(length);
            self.refuse(fault::expected_value(&shown), span, false);
            return;
        }
        if let Some((unit, length)) = Unit::longest(rest) {
            let span = self.take(length);
            self.refuse(fault::bare_unit(unit.symbol()), span, true);
            return;
        }
        let span = self.take_foreign();
        self.refuse(fault::sign_not_allowed(sign), span, true);
    }

    /// Passes a sign that is not allowed, a foreign word as a whole.
    fn take_foreign(&mut self) -> Span {
        let length: usize = self
            .rest()
            .chars()
            .take_while(|sign| sign.is_alphanumeric() || *sign == '_')
            .map(char::len_utf8)
            .sum();
        if length == 0 {
            self.take_sign()
        } else {
            self.take(length)
        }
    }
}

fn word_length(text: &str) -> usize {
    if text.bytes().next().is_some_and(is_first) {
        text.bytes().take_while(|&byte| is_later(byte)).count()
    } else {
        0
    }
}

fn superscript(sign: char) -> Option<char> {
    matches!(sign, '⁻' | '⁰' | '¹' | '²' | '³' | '⁴'..='⁹').then_some(sign)
}
