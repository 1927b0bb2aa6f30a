//! Words: names of cells, functions, constants, and the units and words that
//! are none of them.

use super::super::{NameUse, Sign, fault};
use super::{Reader, superscript, word_length};
use crate::entry::function::{CONSTANTS, FUNCTIONS};
use crate::entry::name::{LONGEST_NAME, is_later, is_reserved};
use crate::units::Unit;

impl Reader<'_> {
    pub(super) fn word(&mut self) {
        let rest = self.rest();
        let cell = &rest[..word_length(rest)];
        let mut length = cell.len();
        let mut member = Vec::new();
        let mut broken = None;
        while rest[length..].starts_with('.') {
            let part = &rest[length + 1..];
            let part = &part[..word_length(part)];
            if part.is_empty() {
                broken = Some(fault::broken_member(&rest[..length]));
                // What follows belongs to the broken name.
                let rest = &rest[length..];
                length += rest
                    .bytes()
                    .take_while(|&byte| is_later(byte) || byte == b'.')
                    .count();
                break;
            }
            length += 1 + part.len();
            member.push(part);
        }
        let behind = &rest[length..];
        // A letter beyond a to z goes on as one word with what stands before.
        if behind.starts_with(|sign: char| sign.is_alphanumeric() && superscript(sign).is_none()) {
            let sign = behind.chars().next().unwrap_or(' ');
            let _ = self.take(length);
            let span = self.take_foreign();
            self.refuse(fault::sign_not_allowed(sign), span, true);
            return;
        }
        if broken.is_none() && member.is_empty() && behind.trim_start().starts_with('(') {
            self.call(cell);
            return;
        }
        if broken.is_none() && member.is_empty() && is_reserved(cell) {
            self.reserved(cell);
            return;
        }
        let span = self.take(length);
        let longest = member.iter().copied().chain([cell]).map(str::len).max();
        let fault = if let Some(fault) = broken {
            fault
        } else if is_reserved(cell) {
            fault::member_of_reserved(cell)
        } else if member.len() > 2 {
            fault::too_many_members()
        } else if longest > Some(LONGEST_NAME) {
            fault::name_too_long()
        } else {
            let index = self.tokens.names.len() as u16;
            self.tokens.names.push(NameUse {
                cell: cell.to_owned(),
                member: member.into_iter().map(str::to_owned).collect(),
                span: span.into(),
            });
            self.push_value(Sign::Name(index), span);
            return;
        };
        self.refuse(fault, span, true);
    }

    fn call(&mut self, name: &str) {
        let span = self.take(name.len());
        self.skip_spaces();
        let open = self.take_sign();
        let Some(index) = FUNCTIONS.iter().position(|known| known.name == name) else {
            let fault = if name.eq_ignore_ascii_case("if") {
                fault::conditional()
            } else {
                fault::unknown_function(name)
            };
            self.faults.push(fault.at(span.into()));
            self.open(true, open);
            return;
        };
        self.push(Sign::Function(index as u16), span);
        self.open(true, open);
    }

    /// A reserved word that is not called.
    fn reserved(&mut self, word: &str) {
        if let Some(index) = CONSTANTS.iter().position(|known| known.name == word) {
            let span = self.take(word.len());
            self.push_value(Sign::Constant(index as u16), span);
            return;
        }
        let fault = if FUNCTIONS.iter().any(|known| known.name == word) {
            fault::bare_function(word)
        } else if let Some((unit, length)) = Unit::longest(self.rest()) {
            let span = self.take(length);
            self.refuse(fault::bare_unit(unit.symbol()), span, true);
            return;
        } else if Unit::symbols().contains(&word) {
            fault::bare_unit(word)
        } else {
            fault::reserved_word(word)
        };
        let span = self.take(word.len());
        self.refuse(fault, span, true);
    }
}
