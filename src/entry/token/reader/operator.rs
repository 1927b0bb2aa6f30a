//! Where an operator must come, and what may come nowhere.

use super::super::{Binary, Sign, fault};
use super::{Reader, superscript, word_length};
use crate::entry::Diagnostic;

impl Reader<'_> {
    pub(super) fn operator(&mut self) {
        let rest = self.rest();
        let Some(sign) = self.peek() else { return };
        if sign == '±' || rest.starts_with("+-") || rest.starts_with("+−") {
            let length = if sign == '±' {
                sign.len_utf8()
            } else {
                1 + rest[1..].chars().next().map_or(0, char::len_utf8)
            };
            let span = self.take(length);
            self.refuse(fault::stray_spread(), span, false);
            return;
        }
        if let Some((length, fault)) = self.forbidden() {
            let span = self.take(length);
            self.refuse(fault, span, false);
            return;
        }
        if let Some((operator, length)) = binary(rest) {
            self.binary(operator, length);
            return;
        }
        match sign {
            ')' => self.close(),
            '.' => {
                let digits = rest[1..].bytes().take_while(u8::is_ascii_digit);
                let span = self.take(1 + digits.count());
                self.refuse(fault::second_point(), span, true);
            }
            ',' => self.comma(),
            '%' => {
                let span = self.take_sign();
                self.refuse(fault::percent(), span, true);
            }
            _ if superscript(sign).is_some() => {
                let span = self.take_sign();
                self.refuse(fault::superscript(), span, true);
            }
            _ if sign == '('
                || sign == '!'
                || sign.is_alphanumeric()
                || sign == '_'
                || sign == '°' =>
            {
                self.adjacent(sign);
            }
            _ => {
                let span = self.take_foreign();
                self.refuse(fault::sign_not_allowed(sign), span, true);
            }
        }
    }

    fn binary(&mut self, operator: Binary, length: usize) {
        let before = self.last();
        let in_doubt = self.in_doubt;
        let span = self.take(length);
        let was_exponent = self.level().in_exponent;
        self.level().in_exponent = operator == Binary::Power;
        if operator == Binary::Power && !in_doubt {
            if was_exponent {
                self.refuse(fault::power_chain(), span, false);
                return;
            }
            if let Some(Sign::Literal(index)) = before
                && let Some(unit) = &self.tokens.literals[usize::from(index)].literal.unit
            {
                let fault = fault::power_after_unit(unit.symbol());
                self.refuse(fault, span, false);
                return;
            }
        }
        self.push(Sign::Binary(operator), span);
        self.after_value = false;
    }

    fn close(&mut self) {
        let span = self.take_sign();
        if self.levels.len() == 1 {
            self.refuse(fault::unmatched_close(), span, true);
            return;
        }
        let _ = self.levels.pop();
        self.push_value(Sign::Close, span);
    }

    fn comma(&mut self) {
        let digit = |sign: Option<char>| sign.is_some_and(|sign| sign.is_ascii_digit());
        let before = digit(self.text[..self.at].chars().next_back());
        let head = self.text[..self.at]
            .trim_end_matches(|sign: char| sign.is_ascii_digit())
            .len();
        let whole = self.text[head..self.at].to_owned();
        let span = self.take_sign();
        let is_decimal = before && digit(self.peek());
        let is_call = self.level().is_call;
        self.level().in_exponent = false;
        if is_decimal {
            let places: String = self.text[self.at..]
                .chars()
                .take_while(char::is_ascii_digit)
                .collect();
            self.refuse(fault::decimal_comma(is_call, &whole, &places), span, false);
        } else if is_call {
            self.push(Sign::Comma, span);
            self.after_value = false;
        } else {
            self.refuse(fault::stray_comma(), span, false);
        }
    }

    /// Two values side by side; the second is read on as if an operator stood
    /// between them.
    fn adjacent(&mut self, sign: char) {
        let number_before = match self.last() {
            Some(Sign::Literal(index)) => {
                let literal = &self.tokens.literals[usize::from(index)].literal;
                literal.unit.is_none() && literal.spread.is_none()
            }
            _ => false,
        };
        let rest = self.rest();
        let digits = rest.bytes().take_while(u8::is_ascii_digit).count();
        let length = word_length(rest).max(digits).max(self.sign_length());
        let shown = format!("`{}`", rest[..length].chars().take(20).collect::<String>());
        let thousands = number_before && sign.is_ascii_digit();
        let start = self.place;
        // Words in a row are one slip.
        let is_told = self.faults.iter().any(|f| f.code == "missing-operator");
        if !self.in_doubt && !is_told {
            let span = start..start + rest[..length].chars().count();
            self.faults
                .push(fault::expected_operator(&shown, thousands).at(span));
        }
        self.after_value = false;
        self.in_doubt = true;
    }

    /// What no expression may hold, in whatever place.
    pub(super) fn forbidden(&self) -> Option<(usize, Diagnostic)> {
        let rest = self.rest();
        let sign = self.peek()?;
        if rest.starts_with("//") || rest.starts_with("/*") || sign == '#' {
            return Some((rest.len(), fault::comment()));
        }
        if rest.starts_with("**") {
            return Some((2, fault::doubled('*')));
        }
        match sign {
            '"' | '\'' | '`' | '“' | '„' | '”' => {
                let opening = sign.len_utf8();
                let end = rest[opening..]
                    .find([sign, '”'])
                    .map_or(rest.len(), |found| {
                        let close = opening + found;
                        close + rest[close..].chars().next().map_or(0, char::len_utf8)
                    });
                return Some((end, fault::string()));
            }
            ';' => return Some((1, fault::chain())),
            '?' | ':' => return Some((1, fault::conditional())),
            '=' if !rest.starts_with("==") => return Some((1, fault::assignment())),
            '&' | '|' if rest.chars().nth(1) != Some(sign) => {
                return Some((1, fault::doubled(sign)));
            }
            _ => {}
        }
        // `+=` and its kin; `<=` and `!=` are comparisons.
        if let Some((_, length)) = binary(rest)
            && rest[length..].starts_with('=')
            && !rest[length..].starts_with("==")
        {
            return Some((length + 1, fault::assignment()));
        }
        None
    }
}

/// The operator at the start of a text, and its length in bytes.
pub(super) fn binary(text: &str) -> Option<(Binary, usize)> {
    const SPELLINGS: &[(&str, Binary)] = &[
        ("==", Binary::Equal),
        ("!=", Binary::Unequal),
        (">=", Binary::GreaterOrEqual),
        ("<=", Binary::LessOrEqual),
        ("&&", Binary::And),
        ("||", Binary::Or),
        ("≠", Binary::Unequal),
        ("≥", Binary::GreaterOrEqual),
        ("≤", Binary::LessOrEqual),
        (">", Binary::Greater),
        ("<", Binary::Less),
        ("+", Binary::Add),
        ("-", Binary::Subtract),
        ("−", Binary::Subtract),
        ("*", Binary::Multiply),
        ("·", Binary::Multiply),
        ("⋅", Binary::Multiply),
        ("×", Binary::Multiply),
        ("/", Binary::Divide),
        ("^", Binary::Power),
    ];
    SPELLINGS
        .iter()
        .find(|(spelling, _)| text.starts_with(spelling))
        .map(|&(spelling, operator)| (operator, spelling.len()))
}
