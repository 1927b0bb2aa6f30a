//! Plain mathematics over quantities.

use super::argument::{Kind, Parameter, domain};
use super::{Answer, Function, MANY, Refusal, Work, finite};
use crate::entry::Diagnostic;
use crate::units::{Dimension, Quantity, Sense};
use std::cmp::Ordering;

const X: &[Parameter] = &[Parameter::new("x", Kind::Any)];
const ANGLE: &[Parameter] = &[Parameter::new("angle", Kind::Angle)];
const MANY_X: &[Parameter] = &[
    Parameter::new("x", Kind::Any),
    Parameter::new("y", Kind::Any),
];

const fn one(
    name: &'static str,
    parameters: &'static [Parameter],
    about: &'static str,
    work: fn(&[Quantity]) -> Answer,
) -> Function {
    Function {
        name,
        about,
        parameters,
        least: 1,
        most: 1,
        work: Work::Quantities(work),
    }
}

pub(super) static FUNCTIONS: &[Function] = &[
    one("abs", X, "the amount without its sign", |x| {
        Ok(Quantity {
            si: x[0].si.abs(),
            ..x[0]
        })
    }),
    one("acos", X, "the angle of this cosine", |x| {
        angle(first(x, Kind::Unit)?.acos())
    }),
    one("asin", X, "the angle of this sine", |x| {
        angle(first(x, Kind::Unit)?.asin())
    }),
    one("atan", X, "the angle of this tangent", |x| {
        angle(first(x, Kind::Number)?.atan())
    }),
    one("ceil", X, "up to a whole number", |x| whole(x, f64::ceil)),
    one("cos", ANGLE, "the cosine", |x| {
        number(first(x, Kind::Angle)?.cos())
    }),
    one("exp", X, "e to this power", |x| {
        number(first(x, Kind::Number)?.exp())
    }),
    one("floor", X, "down to a whole number", |x| {
        whole(x, f64::floor)
    }),
    one("ln", X, "the natural logarithm", |x| {
        number(first(x, Kind::Positive)?.ln())
    }),
    one("log10", X, "the decimal logarithm", |x| {
        number(first(x, Kind::Positive)?.log10())
    }),
    Function {
        name: "max",
        about: "the greatest of all",
        parameters: MANY_X,
        least: 2,
        most: MANY,
        work: Work::Quantities(|x| extreme(x, Ordering::Greater)),
    },
    Function {
        name: "min",
        about: "the least of all",
        parameters: MANY_X,
        least: 2,
        most: MANY,
        work: Work::Quantities(|x| extreme(x, Ordering::Less)),
    },
    one("round", X, "to the nearest whole number", |x| {
        whole(x, f64::round)
    }),
    one("sin", ANGLE, "the sine", |x| {
        number(first(x, Kind::Angle)?.sin())
    }),
    one("sqrt", X, "the square root", |x| {
        x[0].power(Quantity::number(0.5))
            .map_err(|error| Refusal::at(0, error.into()))
    }),
    one("tan", ANGLE, "the tangent", tangent),
];

/// The first argument as what it must be.
fn first(x: &[Quantity], kind: Kind) -> Result<f64, Refusal> {
    kind.check(x[0]).map_err(|fault| Refusal::at(0, fault))
}

fn number(value: f64) -> Answer {
    finite(value, Dimension::NONE)
}

fn angle(radians: f64) -> Answer {
    finite(radians, Dimension::ANGLE)
}

/// Rounding has a meaning only for plain numbers: the step of a quantity would
/// be hidden in its unit.
fn whole(x: &[Quantity], round: fn(f64) -> f64) -> Answer {
    let value = first(x, Kind::Number).map_err(|mut refusal| {
        refusal.fault.hint = Some(
            "divide by the step and multiply by it again: `ceil(x / (0.1 m)) * 0.1 m`".to_owned(),
        );
        refusal
    })?;
    number(round(value))
}

fn tangent(x: &[Quantity]) -> Answer {
    let value = first(x, Kind::Angle)?;
    // The `f64` nearest to a right angle misses it by 6e-17.
    if value.cos().abs() < 1e-15 {
        let hint = "the tangent of a right angle is infinite: check the angle";
        let fault = domain("an angle other than a right one", value, hint);
        return Err(Refusal::at(0, fault));
    }
    number(value.tan())
}

fn extreme(x: &[Quantity], wanted: Ordering) -> Answer {
    let mut best = x[0];
    let mut is_difference = best.sense == Sense::Difference;
    for (index, &next) in x.iter().enumerate().skip(1) {
        let order = next
            .compare(best)
            .map_err(|error| Refusal::at(index, Diagnostic::from(error)))?;
        if order == wanted {
            best = next;
        }
        is_difference |= next.sense == Sense::Difference;
    }
    let sense = if is_difference {
        Sense::Difference
    } else {
        Sense::Plain
    };
    Ok(Quantity { sense, ..best })
}
