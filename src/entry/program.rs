//! A compiled entry: a flat list of steps over a stack of values.

use super::token::LiteralUse;
use super::{Diagnostic, Outcome};
use crate::units::Quantity;

/// The steps of an entry, in the order in which they run.
#[derive(Clone, Debug)]
pub(super) struct Program {
    one_literal: bool,
}

impl Program {
    pub(super) const fn literal() -> Self {
        Self { one_literal: true }
    }

    pub(super) const fn is_one_literal(&self) -> bool {
        self.one_literal
    }

    pub(super) fn run(
        &self,
        _names: &[Quantity],
        uses: &[LiteralUse],
        literals: &[f64],
    ) -> Result<Outcome, Box<Diagnostic>> {
        let quantity = uses[0].literal.quantity();
        Ok(Outcome::Quantity(Quantity {
            si: literals[0],
            ..quantity
        }))
    }
}
