//! Constants and functions of entries, and the bridge to the physics. Each
//! function checks its arguments before any formula sees them.

use super::Diagnostic;
use crate::physics::{constant, planck};
use crate::units::{Dimension, Error, Quantity, Sense};
use std::cmp::Ordering;

/// A named constant.
#[derive(Debug)]
pub(super) struct Constant {
    pub(super) name: &'static str,
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
        value: std::f64::consts::PI,
        kind: Kind::Number,
    },
    Constant {
        name: "stefan_boltzmann",
        value: constant::STEFAN_BOLTZMANN,
        kind: Kind::ExitancePerFourthPower,
    },
];

type Answer = Result<Quantity, Box<Diagnostic>>;

/// A function of one or more quantities.
#[derive(Debug)]
pub(super) struct Function {
    pub(super) name: &'static str,
    /// How it is written.
    pub(super) usage: &'static str,
    pub(super) least: usize,
    pub(super) most: usize,
    /// Gets between `least` and `most` arguments, none of them a point.
    pub(super) apply: fn(&[Quantity]) -> Answer,
}

const fn one(
    name: &'static str,
    usage: &'static str,
    apply: fn(&[Quantity]) -> Answer,
) -> Function {
    Function {
        name,
        usage,
        least: 1,
        most: 1,
        apply,
    }
}

/// The functions, sorted by name.
pub(super) static FUNCTIONS: &[Function] = &[
    one("abs", "abs(x)", |x| {
        Ok(Quantity {
            si: x[0].si.abs(),
            ..x[0]
        })
    }),
    one("acos", "acos(x)", |x| angle(unit_interval(x[0])?.acos())),
    one("asin", "asin(x)", |x| angle(unit_interval(x[0])?.asin())),
    one("atan", "atan(x)", |x| angle(plain(x[0])?.atan())),
    Function {
        name: "band_fraction",
        usage: "band_fraction(temperature, from, to)",
        least: 3,
        most: 3,
        apply: band_fraction,
    },
    one(
        "blackbody_exitance",
        "blackbody_exitance(temperature)",
        |x| finite(planck::exitance(temperature(x[0])?), Dimension::IRRADIANCE),
    ),
    one("ceil", "ceil(x)", |x| whole(x[0], f64::ceil)),
    one("cos", "cos(angle)", |x| number(radians(x[0])?.cos())),
    one("exp", "exp(x)", |x| number(plain(x[0])?.exp())),
    one("floor", "floor(x)", |x| whole(x[0], f64::floor)),
    one("ln", "ln(x)", |x| number(positive(x[0])?.ln())),
    one("log10", "log10(x)", |x| number(positive(x[0])?.log10())),
    Function {
        name: "max",
        usage: "max(x, y, …)",
        least: 2,
        most: MANY,
        apply: |x| extreme(x, Ordering::Greater),
    },
    Function {
        name: "min",
        usage: "min(x, y, …)",
        least: 2,
        most: MANY,
        apply: |x| extreme(x, Ordering::Less),
    },
    one("peak_wavelength", "peak_wavelength(temperature)", |x| {
        finite(
            planck::peak_wavelength(temperature(x[0])?),
            Dimension::LENGTH,
        )
    }),
    one("round", "round(x)", |x| whole(x[0], f64::round)),
    one("sin", "sin(angle)", |x| number(radians(x[0])?.sin())),
    one("sqrt", "sqrt(x)", |x| {
        Ok(x[0]
            .power(Quantity::number(0.5))
            .map_err(Diagnostic::from)?)
    }),
    one("tan", "tan(angle)", tangent),
];

/// More arguments than an entry has room for.
pub(super) const MANY: usize = usize::MAX;

fn finite(si: f64, dimension: Dimension) -> Answer {
    if si.is_finite() {
        Ok(Quantity::new(si, dimension))
    } else {
        Err(Box::new(Error::NotFinite.into()))
    }
}

fn number(value: f64) -> Answer {
    finite(value, Dimension::NONE)
}

fn angle(radians: f64) -> Answer {
    finite(radians, Dimension::ANGLE)
}

fn of_kind(x: Quantity, needed: Dimension) -> Result<f64, Box<Diagnostic>> {
    if x.dimension == needed {
        return Ok(x.si);
    }
    let found = x.dimension;
    Err(Box::new(Error::Dimension { needed, found }.into()))
}

fn plain(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    of_kind(x, Dimension::NONE)
}

fn radians(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    of_kind(x, Dimension::ANGLE).map_err(|mut fault| {
        fault.hint = Some("give the angle its unit: `30 °` or `0.5 rad`".to_owned());
        fault
    })
}

/// An argument of the right kind whose value has no answer.
fn domain(expected: &str, found: f64, hint: &str) -> Box<Diagnostic> {
    let message = format!("expected {expected}, found {found}");
    Box::new(Diagnostic::new("out-of-range", message).with_hint(hint))
}

fn positive(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    let value = plain(x)?;
    if value > 0.0 {
        return Ok(value);
    }
    let hint = "a logarithm has a value only above zero: check the argument";
    Err(domain("a number above zero", value, hint))
}

fn unit_interval(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    // A hair beyond one is the noise of the division that made it.
    const HAIR: f64 = 1e-12;
    let value = plain(x)?;
    if value.abs() <= 1.0 + HAIR {
        return Ok(value.clamp(-1.0, 1.0));
    }
    let hint = "no angle has such a sine or cosine: check the lengths";
    Err(domain("a number from -1 to 1", value, hint))
}

fn temperature(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    let kelvin = of_kind(x, Dimension::TEMPERATURE)?;
    if x.sense == Sense::Difference {
        let message = "expected a temperature, found a difference of two temperatures";
        let hint = "use one temperature, in °C or counted in K from absolute zero";
        return Err(Box::new(
            Diagnostic::new("difference", message).with_hint(hint),
        ));
    }
    if kelvin > 0.0 {
        return Ok(kelvin);
    }
    let hint = "check the sign and the unit";
    Err(domain("a temperature above 0 K", kelvin, hint))
}

fn wavelength(x: Quantity) -> Result<f64, Box<Diagnostic>> {
    let metres = of_kind(x, Dimension::LENGTH)?;
    if metres >= 0.0 {
        return Ok(metres);
    }
    let hint = "write both wavelengths as lengths, the shorter one first";
    Err(domain("a wavelength of zero or more", metres, hint))
}

/// The part of a black body's exitance between two wavelengths.
fn band_fraction(x: &[Quantity]) -> Answer {
    let kelvin = temperature(x[0])?;
    let (from, to) = (wavelength(x[1])?, wavelength(x[2])?);
    if from > to {
        let message = "expected the shorter wavelength first, found the longer one";
        let hint = "write band_fraction(temperature, from, to)";
        return Err(Box::new(
            Diagnostic::new("out-of-range", message).with_hint(hint),
        ));
    }
    number(planck::band_fraction(from, to, kelvin))
}

/// Rounding has a meaning only for plain numbers: the step of a quantity would
/// be hidden in its unit.
fn whole(x: Quantity, round: fn(f64) -> f64) -> Answer {
    let value = plain(x).map_err(|mut fault| {
        fault.hint = Some(
            "divide by the step and multiply by it again: `ceil(x / (0.1 m)) * 0.1 m`".to_owned(),
        );
        fault
    })?;
    number(round(value))
}

fn tangent(x: &[Quantity]) -> Answer {
    let value = radians(x[0])?;
    // The `f64` nearest to a right angle misses it by 6e-17.
    if value.cos().abs() < 1e-15 {
        let hint = "the tangent of a right angle is infinite: check the angle";
        return Err(domain("an angle other than a right one", value, hint));
    }
    number(value.tan())
}

fn extreme(x: &[Quantity], wanted: Ordering) -> Answer {
    let mut best = x[0];
    let mut is_difference = best.sense == Sense::Difference;
    for &next in &x[1..] {
        if next.compare(best).map_err(Diagnostic::from)? == wanted {
            best = next;
        }
        is_difference &= next.sense == Sense::Difference;
    }
    let sense = if is_difference {
        Sense::Difference
    } else {
        Sense::Plain
    };
    Ok(Quantity { sense, ..best })
}
