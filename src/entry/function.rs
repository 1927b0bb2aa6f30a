//! Constants and functions of entries. Each function checks its arguments
//! before any formula sees them, and says which of them is at fault.

mod argument;
mod mathematics;
mod radiation;

use super::Diagnostic;
use crate::units::{Dimension, Error, Quantity};
use argument::Parameter;
use std::sync::LazyLock;

/// A named constant.
#[derive(Debug)]
pub(super) struct Constant {
    pub(super) name: &'static str,
    /// What it is.
    pub(super) about: &'static str,
    value: f64,
    /// The coherent unit, as dimensions above and below the stroke.
    kind: Kind,
}

#[derive(Debug)]
enum Kind {
    Number,
    ExitancePerFourthPower,
}

impl Constant {
    pub(super) fn quantity(&self) -> Quantity {
        let dimension = match self.kind {
            Kind::Number => Dimension::NONE,
            Kind::ExitancePerFourthPower => Dimension::TEMPERATURE
                .power(4)
                .and_then(|fourth| Dimension::IRRADIANCE.over(fourth))
                .expect("exponents of at most four fit"),
        };
        Quantity::new(self.value, dimension)
    }
}

/// The constants, sorted by name.
pub(super) static CONSTANTS: &[Constant] = &[
    Constant {
        name: "pi",
        about: "π",
        value: std::f64::consts::PI,
        kind: Kind::Number,
    },
    Constant {
        name: "stefan_boltzmann",
        about: "σ, W/(m²·K⁴)",
        value: radiation::STEFAN_BOLTZMANN,
        kind: Kind::ExitancePerFourthPower,
    },
];

/// What is wrong, and with which argument, counted from 0; `None` where the
/// result is at fault.
#[derive(Debug)]
pub(super) struct Refusal {
    pub(super) argument: Option<usize>,
    pub(super) fault: Box<Diagnostic>,
}

impl Refusal {
    fn at(argument: usize, fault: Diagnostic) -> Self {
        Self {
            argument: Some(argument),
            fault: Box::new(fault),
        }
    }

    fn of_result(fault: Diagnostic) -> Self {
        Self {
            argument: None,
            fault: Box::new(fault),
        }
    }
}

type Answer = Result<Quantity, Refusal>;

/// A function of one or more quantities.
#[derive(Debug)]
pub(super) struct Function {
    pub(super) name: &'static str,
    /// What it returns, in a few words.
    pub(super) about: &'static str,
    /// Its arguments, those that may be left out last.
    parameters: &'static [Parameter],
    pub(super) least: usize,
    pub(super) most: usize,
    work: Work,
}

#[derive(Debug)]
enum Work {
    /// Any quantities; the function looks at them itself.
    Quantities(fn(&[Quantity]) -> Answer),
    /// Numbers in SI units, checked one by one; arguments left out are not
    /// there. The result has this dimension.
    Numbers(Dimension, fn(&[f64]) -> Result<f64, radiation::Error>),
}

impl Function {
    /// Returns how it is written, such as `exitance(temperature, emissivity)`.
    pub(super) fn usage(&self) -> String {
        let mut names: Vec<String> = self
            .parameters
            .iter()
            .enumerate()
            .map(|(at, known)| {
                if at < self.least {
                    known.name.to_owned()
                } else {
                    format!("[{}]", known.name)
                }
            })
            .collect();
        if self.most == MANY {
            names.push("…".to_owned());
        }
        format!("{}({})", self.name, names.join(", "))
    }

    /// Works it out from between `least` and `most` arguments, none of them a
    /// point.
    pub(super) fn apply(&self, arguments: &[Quantity]) -> Answer {
        match self.work {
            Work::Quantities(work) => work(arguments),
            Work::Numbers(dimension, work) => {
                let mut numbers = [0.0; MOST_PARAMETERS];
                for (index, (argument, parameter)) in
                    arguments.iter().zip(self.parameters).enumerate()
                {
                    numbers[index] = parameter
                        .kind
                        .check(*argument)
                        .map_err(|fault| Refusal::at(index, fault))?;
                }
                let result = work(&numbers[..arguments.len()]);
                finite(result.map_err(|error| self.refusal(error))?, dimension)
            }
        }
    }

    /// What the physics says of a number, at the argument it came from.
    fn refusal(&self, error: radiation::Error) -> Refusal {
        let (parameter, message) = argument::told(error);
        let argument = self
            .parameters
            .iter()
            .position(|known| known.inner == parameter);
        Refusal {
            argument,
            fault: Box::new(Diagnostic::new("out-of-range", message)),
        }
    }
}

/// The most parameters that a function of numbers has.
const MOST_PARAMETERS: usize = 4;

/// The functions, sorted by name.
pub(super) static FUNCTIONS: LazyLock<Vec<&'static Function>> = LazyLock::new(|| {
    let mut all: Vec<&Function> = mathematics::FUNCTIONS
        .iter()
        .chain(radiation::FUNCTIONS)
        .collect();
    all.sort_by_key(|function| function.name);
    all
});

/// More arguments than an entry has room for.
pub(super) const MANY: usize = usize::MAX;

fn finite(si: f64, dimension: Dimension) -> Answer {
    if si.is_finite() {
        Ok(Quantity::new(si, dimension))
    } else {
        Err(Refusal::of_result(Error::NotFinite.into()))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tables_are_sorted_and_say_what_they_hold() {
        let names: Vec<&str> = FUNCTIONS.iter().map(|function| function.name).collect();
        assert!(names.is_sorted(), "{names:?}");
        let mut unique = names.clone();
        unique.dedup();
        assert_eq!(unique, names, "a function stands there twice");
        for function in FUNCTIONS.iter() {
            let count = function.parameters.len();
            assert!(!function.about.is_empty(), "{}", function.name);
            assert!(function.least <= function.most, "{}", function.name);
            if function.most == MANY {
                continue;
            }
            assert_eq!(function.most, count, "{}", function.usage());
            if matches!(function.work, Work::Numbers(..)) {
                assert!(count <= MOST_PARAMETERS, "{}", function.usage());
            }
        }
    }
}
