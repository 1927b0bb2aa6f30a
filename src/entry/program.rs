//! A compiled entry: a flat list of steps over a stack of values, so that
//! working it out touches no text and, for common depths, no heap.

use super::function::{CONSTANTS, FUNCTIONS, Refusal};
use super::token::{Binary, Span};
use super::{Diagnostic, Outcome};
use crate::units::{Dimension, Error, Quantity, Sense};
use std::cmp::Ordering;

/// What one step does to the stack.
#[derive(Clone, Copy, Debug)]
pub(super) enum Work {
    Literal {
        index: u16,
        dimension: Dimension,
        sense: Sense,
    },
    Name(u16),
    Constant(u16),
    Negate,
    Not,
    Binary(Binary),
    /// Subtracts a step in kelvin, which leaves a temperature a temperature.
    Lower,
    Call {
        index: u16,
        count: u16,
        /// Where the places of its arguments begin.
        first: u16,
    },
}

/// One step with the place of its sign.
#[derive(Clone, Copy, Debug)]
pub(super) struct Step {
    pub(super) work: Work,
    pub(super) span: Span,
}

impl Step {
    pub(super) fn is_kelvin_literal(&self) -> bool {
        matches!(
            self.work,
            Work::Literal {
                dimension: Dimension::TEMPERATURE,
                sense: Sense::Plain,
                ..
            }
        )
    }
}

/// The steps of an entry, in the order in which they run.
#[derive(Clone, Debug)]
pub(super) struct Program {
    steps: Vec<Step>,
    /// Where the arguments of all calls stand.
    arguments: Vec<Span>,
    /// The most values on the stack at once.
    depth: usize,
}

/// Stacks up to this depth need no heap.
const SHALLOW: usize = 12;

type Fault = Box<Diagnostic>;

impl Program {
    /// Returns the program of these steps; each call knows where the places of
    /// its arguments begin.
    pub(super) fn new(steps: Vec<Step>, arguments: Vec<Span>) -> Self {
        let (mut now, mut depth) = (0_usize, 0_usize);
        for step in &steps {
            match step.work {
                Work::Literal { .. } | Work::Name(_) | Work::Constant(_) => now += 1,
                Work::Negate | Work::Not => {}
                Work::Binary(_) | Work::Lower => now -= 1,
                Work::Call { count, .. } => now = now + 1 - usize::from(count),
            }
            depth = depth.max(now);
        }
        Self {
            steps,
            arguments,
            depth,
        }
    }

    pub(super) fn is_one_literal(&self) -> bool {
        matches!(
            self.steps.as_slice(),
            [Step {
                work: Work::Literal { .. },
                ..
            }]
        )
    }

    /// Works the steps out.
    pub(super) fn run(&self, names: &[Quantity], literals: &[f64]) -> Result<Outcome, Fault> {
        let blank = Outcome::Truth(false);
        if self.depth <= SHALLOW {
            self.run_on(&mut [blank; SHALLOW], names, literals)
        } else {
            self.run_on(&mut vec![blank; self.depth], names, literals)
        }
    }

    fn run_on(
        &self,
        stack: &mut [Outcome],
        names: &[Quantity],
        literals: &[f64],
    ) -> Result<Outcome, Fault> {
        let mut top = 0;
        for step in &self.steps {
            let placed = |mut fault: Fault| {
                // An argument's own place comes first.
                let _ = fault.span.get_or_insert_with(|| step.span.into());
                fault
            };
            let value = match step.work {
                Work::Literal {
                    index,
                    dimension,
                    sense,
                } => finite(Quantity {
                    si: literals[usize::from(index)],
                    dimension,
                    sense,
                }),
                // Behind its name a temperature counts in kelvin.
                Work::Name(index) => finite(names[usize::from(index)].absolute()),
                Work::Constant(index) => {
                    Ok(Outcome::Quantity(CONSTANTS[usize::from(index)].quantity()))
                }
                Work::Negate => {
                    top -= 1;
                    amount(stack[top]).and_then(|x| answer(x.negated()))
                }
                Work::Not => {
                    top -= 1;
                    truth(stack[top]).map(|holds| Outcome::Truth(!holds))
                }
                Work::Binary(operator) => {
                    top -= 2;
                    binary(operator, stack[top], stack[top + 1])
                }
                Work::Lower => {
                    top -= 2;
                    pair(stack[top], stack[top + 1]).and_then(|(x, y)| answer(x.lowered(y)))
                }
                Work::Call {
                    index,
                    count,
                    first,
                } => {
                    let (count, first) = (usize::from(count), usize::from(first));
                    top -= count;
                    let places = &self.arguments[first..first + count];
                    call(index, &stack[top..top + count], places)
                }
            };
            stack[top] = value.map_err(placed)?;
            top += 1;
        }
        Ok(stack[0])
    }
}

fn answer(result: Result<Quantity, Error>) -> Result<Outcome, Fault> {
    match result {
        Ok(quantity) => Ok(Outcome::Quantity(quantity)),
        Err(error) => Err(Box::new(error.into())),
    }
}

fn finite(quantity: Quantity) -> Result<Outcome, Fault> {
    if quantity.si.is_finite() {
        Ok(Outcome::Quantity(quantity))
    } else {
        Err(Box::new(Error::NotFinite.into()))
    }
}

fn amount(value: Outcome) -> Result<Quantity, Fault> {
    match value {
        Outcome::Quantity(quantity) => Ok(quantity),
        Outcome::Truth(_) => {
            let message = "expected a quantity, found the result of a comparison";
            let hint = "join comparisons by `&&` or `||`; they cannot be reckoned with";
            let fault = Diagnostic::new("truth-in-arithmetic", message).with_hint(hint);
            Err(Box::new(fault))
        }
    }
}

fn truth(value: Outcome) -> Result<bool, Fault> {
    match value {
        Outcome::Truth(holds) => Ok(holds),
        Outcome::Quantity(quantity) => {
            let found = quantity.dimension.describe();
            let message = format!("expected a comparison, found {found}");
            let hint = "write a comparison such as `door.width > 1 m`";
            Err(Box::new(
                Diagnostic::new("quantity-in-logic", message).with_hint(hint),
            ))
        }
    }
}

fn pair(left: Outcome, right: Outcome) -> Result<(Quantity, Quantity), Fault> {
    Ok((amount(left)?, amount(right)?))
}

fn binary(operator: Binary, left: Outcome, right: Outcome) -> Result<Outcome, Fault> {
    if matches!(operator, Binary::And | Binary::Or) {
        let (left, right) = (truth(left)?, truth(right)?);
        return Ok(Outcome::Truth(if operator == Binary::And {
            left && right
        } else {
            left || right
        }));
    }
    let (left, right) = pair(left, right)?;
    let holds: fn(Ordering) -> bool = match operator {
        Binary::Add => return answer(left.plus(right)),
        Binary::Subtract => return answer(left.minus(right)),
        Binary::Multiply => return answer(left.times(right)),
        Binary::Divide => return answer(left.over(right)),
        Binary::Power => return answer(left.power(right)),
        Binary::Equal => Ordering::is_eq,
        Binary::Unequal => Ordering::is_ne,
        Binary::Greater => Ordering::is_gt,
        Binary::Less => Ordering::is_lt,
        Binary::GreaterOrEqual => Ordering::is_ge,
        Binary::LessOrEqual | Binary::And | Binary::Or => Ordering::is_le,
    };
    match left.compare(right) {
        Ok(order) => Ok(Outcome::Truth(holds(order))),
        Err(error) => Err(Box::new(error.into())),
    }
}

fn call(index: u16, values: &[Outcome], places: &[Span]) -> Result<Outcome, Fault> {
    let function = FUNCTIONS[usize::from(index)];
    let argument = |at: usize| {
        // A point on a scale is welcome as an argument, and counts in kelvin.
        amount(values[at])
            .map(Quantity::absolute)
            .map_err(|fault| Refusal {
                argument: Some(at),
                fault,
            })
    };
    let result = match values {
        [_] => argument(0).and_then(|one| function.apply(&[one])),
        many => (0..many.len())
            .map(argument)
            .collect::<Result<Vec<Quantity>, Refusal>>()
            .and_then(|arguments| function.apply(&arguments)),
    };
    let Refusal {
        argument,
        mut fault,
    } = match result {
        Ok(quantity) => return Ok(Outcome::Quantity(quantity)),
        Err(refusal) => refusal,
    };
    fault.message = format!("in `{}`: {}", function.name, fault.message);
    fault.span = argument
        .and_then(|at| places.get(at))
        .map(|place| (*place).into());
    if fault.hint.is_none() {
        fault.hint = Some(format!("write `{}`", function.usage()));
    }
    Err(fault)
}
