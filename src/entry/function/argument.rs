//! What a function expects of an argument.

use super::radiation::Error;
use crate::entry::Diagnostic;
use crate::units;
use crate::units::{Dimension, Quantity, Sense};

/// One parameter of a function.
#[derive(Debug)]
pub(super) struct Parameter {
    pub(super) name: &'static str,
    pub(super) kind: Kind,
    /// What the physics calls it in its errors.
    pub(super) inner: &'static str,
}

impl Parameter {
    /// A parameter that the physics calls by the same name.
    pub(super) const fn new(name: &'static str, kind: Kind) -> Self {
        Self::called(name, kind, name)
    }

    /// A parameter that the physics calls otherwise.
    pub(super) const fn called(name: &'static str, kind: Kind, inner: &'static str) -> Self {
        Self { name, kind, inner }
    }
}

/// What an argument must be.
#[derive(Clone, Copy, Debug)]
pub(super) enum Kind {
    /// Anything; the function looks for itself.
    Any,
    /// A plain number.
    Number,
    /// A plain number above zero.
    Positive,
    /// A plain number from −1 to 1.
    Unit,
    /// A plain number above 0 and at most 1.
    Emissivity,
    /// An angle.
    Angle,
    /// An absolute temperature.
    Temperature,
    /// A length above zero.
    Length,
    /// A length of zero or more.
    Offset,
    /// A wavelength of zero or more.
    Wavelength,
    /// A speed of zero or more.
    Speed,
    /// An irradiance or exitance above zero.
    Exitance,
}

impl Kind {
    /// Returns the argument in SI units, or what is wrong with it.
    pub(super) fn check(self, x: Quantity) -> Result<f64, Diagnostic> {
        let needed = match self {
            Self::Any => return Ok(x.si),
            Self::Number | Self::Positive | Self::Unit | Self::Emissivity => Dimension::NONE,
            Self::Angle => Dimension::ANGLE,
            Self::Temperature => Dimension::TEMPERATURE,
            Self::Length | Self::Offset | Self::Wavelength => Dimension::LENGTH,
            Self::Speed => Dimension::SPEED,
            Self::Exitance => Dimension::IRRADIANCE,
        };
        if x.dimension != needed {
            let found = x.dimension;
            let mut fault: Diagnostic = units::Error::Dimension { needed, found }.into();
            if let Self::Angle = self {
                fault.hint = Some("give the angle its unit: `30 °` or `0.5 rad`".to_owned());
            }
            return Err(fault);
        }
        let si = x.si;
        let (holds, expected, hint) = match self {
            Self::Any | Self::Number | Self::Angle => return Ok(si),
            Self::Unit => return unit_interval(si),
            Self::Positive => (
                si > 0.0,
                "a number above zero",
                "a logarithm has a value only above zero: check the argument",
            ),
            Self::Emissivity => (
                si > 0.0 && si <= 1.0,
                "a number above 0 and at most 1",
                "write an emissivity as in `0.95`",
            ),
            Self::Temperature if x.sense == Sense::Difference => {
                let message = "expected a temperature, found a difference of two temperatures";
                let hint = "use one temperature, in °C or counted in K from absolute zero";
                return Err(Diagnostic::new("difference", message).with_hint(hint));
            }
            Self::Temperature => (
                si > 0.0,
                "a temperature above 0 K",
                "check the sign and the unit",
            ),
            Self::Length => (
                si > 0.0,
                "a length above zero",
                "check the sign and the unit",
            ),
            Self::Offset => (si >= 0.0, "a length of zero or more", "check the sign"),
            Self::Wavelength => (
                si >= 0.0,
                "a wavelength of zero or more",
                "write wavelengths as lengths, such as `780 nm`",
            ),
            Self::Speed => (si >= 0.0, "a speed of zero or more", "check the sign"),
            Self::Exitance => (
                si > 0.0,
                "an exitance above zero",
                "check the sign: what leaves a surface is counted above zero",
            ),
        };
        if holds {
            Ok(si)
        } else {
            Err(domain(expected, si, hint))
        }
    }
}

/// An argument of the right kind whose value has no answer.
pub(super) fn domain(expected: &str, found: f64, hint: &str) -> Diagnostic {
    let message = format!("expected {expected}, found {found}");
    Diagnostic::new("out-of-range", message).with_hint(hint)
}

fn unit_interval(value: f64) -> Result<f64, Diagnostic> {
    // A hair beyond one is the noise of the division that made it.
    const HAIR: f64 = 1e-12;
    if value.abs() <= 1.0 + HAIR {
        return Ok(value.clamp(-1.0, 1.0));
    }
    let hint = "no angle has such a sine or cosine: check the lengths";
    Err(domain("a number from -1 to 1", value, hint))
}

/// What the physics refuses: the parameter as it calls it, and the message.
pub(super) fn told(error: Error) -> (&'static str, String) {
    match error {
        Error::OutOfRange {
            parameter,
            range,
            value,
        } => (
            parameter,
            format!("expected {parameter} {range}, found {value}"),
        ),
        other => ("", other.to_string()),
    }
}
