//! The burn integral: how tissue is injured while it is hot.
//!
//! dΩ/dt = P·exp(−ΔE/(R·T)) while the tissue is at 44 °C or hotter, during
//! heating and cooling alike; a burn is taken where Ω reaches its criterion.

mod integral;

use super::tissue::{History, Pulse, Tissue};
use super::{Error, Onset, irradiance, time};

/// Temperature from which injury is counted, K: 44 °C.
pub const ONSET_TEMPERATURE: f64 = 317.15;

/// Rate constants of injury between two temperatures.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Branch {
    /// Temperature from which it holds, K.
    pub from: f64,
    /// Frequency factor P, 1/s.
    pub frequency: f64,
    /// Activation energy over the gas constant ΔE/R, K.
    pub activation: f64,
}

/// How fast tissue is injured, by temperature; nothing below its first branch.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Kinetics {
    /// Below 50 °C or so.
    pub low: Branch,
    /// Above it; the same as `low` where one branch serves all.
    pub high: Branch,
}

/// Constants of Weaver and Stoll for the base of the epidermis.
///
/// # Source
///
/// ASTM F1930 and ISO 13506-2 after Weaver and Stoll; constants read in open
/// code and in a published clothing model, their layer from memory. Checked in
/// `tests/published/burns.rs`.
pub const EPIDERMIS: Kinetics = Kinetics {
    low: Branch {
        from: ONSET_TEMPERATURE,
        frequency: 2.185e124,
        activation: 93_534.9,
    },
    high: Branch {
        from: 323.15,
        frequency: 1.823e51,
        activation: 39_109.8,
    },
};

/// Constants of Takata for the base of the dermis. Source as [`EPIDERMIS`].
pub const DERMIS: Kinetics = Kinetics {
    low: Branch {
        from: ONSET_TEMPERATURE,
        frequency: 4.32e64,
        activation: 50_000.0,
    },
    high: Branch {
        from: 323.15,
        frequency: 9.39e104,
        activation: 80_000.0,
    },
};

/// Constants of Henriques for the epidermis, one branch from 44 °C.
///
/// # Source
///
/// Henriques 1947; constants read in open code and in a published model.
pub const HENRIQUES: Kinetics = Kinetics {
    low: Branch {
        from: ONSET_TEMPERATURE,
        frequency: 3.1e98,
        activation: 75_000.0,
    },
    high: Branch {
        from: ONSET_TEMPERATURE,
        frequency: 3.1e98,
        activation: 75_000.0,
    },
};

impl Kinetics {
    /// Returns the rate of injury at a temperature in kelvin, 1/s; zero below
    /// the first branch.
    #[must_use]
    pub fn rate(&self, temperature: f64) -> f64 {
        let branch = if temperature >= self.high.from {
            &self.high
        } else if temperature >= self.low.from {
            &self.low
        } else {
            return 0.0;
        };
        (branch.frequency.ln() - branch.activation / temperature).exp()
    }
}

/// A degree of burn: where it is judged and by what.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Injury {
    /// Ω of 0.53 at the base of the epidermis.
    FirstDegree,
    /// Ω of 1 at the base of the epidermis.
    SecondDegree,
    /// Ω of 1 at the base of the dermis.
    ThirdDegree,
}

impl Injury {
    /// All degrees.
    pub const ALL: [Injury; 3] = [
        Injury::FirstDegree,
        Injury::SecondDegree,
        Injury::ThirdDegree,
    ];

    /// Returns the depth at which it is judged, m.
    ///
    /// # Source
    ///
    /// ASTM F1930: 75 µm and 1200 µm; from memory.
    #[must_use]
    pub const fn depth(self) -> f64 {
        match self {
            Injury::FirstDegree | Injury::SecondDegree => 75e-6,
            Injury::ThirdDegree => 1200e-6,
        }
    }

    /// Returns the value of the integral at which it begins.
    ///
    /// # Source
    ///
    /// 0.53 and 1.0 read in a published clothing model and a course page.
    #[must_use]
    pub const fn criterion(self) -> f64 {
        match self {
            Injury::FirstDegree => 0.53,
            Injury::SecondDegree | Injury::ThirdDegree => 1.0,
        }
    }

    /// Returns the rate constants that judge it.
    #[must_use]
    pub const fn kinetics(self) -> &'static Kinetics {
        match self {
            Injury::FirstDegree | Injury::SecondDegree => &EPIDERMIS,
            Injury::ThirdDegree => &DERMIS,
        }
    }
}

/// Returns the burn integral Ω at a depth over heating and cooling.
///
/// `depth` in metres. The result is dimensionless and finite.
///
/// # Accuracy
///
/// Quadrature to a relative error below 1e-8; a pulse so short and so far
/// apart from the next that it lifts the tissue past 44 °C and back between
/// two looks could be missed, which needs less than a hundredth of its
/// criterion.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the depth lies outside the tissue.
///
/// # Source
///
/// Henriques 1947 with the constants of `kinetics`. Checked against a
/// published table in `tests/published/burns.rs`.
pub fn integral(history: &History<'_>, depth: f64, kinetics: &Kinetics) -> Result<f64, Error> {
    integral::over(history, depth, kinetics)
}

/// Returns whether the tissue is burnt to a degree, as Ω over its criterion:
/// 1 and more is a burn.
///
/// # Accuracy
///
/// As [`integral`].
///
/// # Errors
///
/// [`Error::OutOfRange`] if the tissue is thinner than the depth at which the
/// degree is judged.
///
/// # Source
///
/// As [`integral`], [`Injury::depth`] and [`Injury::criterion`].
pub fn ratio(history: &History<'_>, injury: Injury) -> Result<f64, Error> {
    Ok(integral(history, injury.depth(), injury.kinetics())? / injury.criterion())
}

/// The shortest exposure that [`longest_exposure`] tries, s.
pub const SHORTEST: f64 = 1e-3;

/// The longest exposure that [`longest_exposure`] tries, s: 8 h.
pub const LONGEST: f64 = 28_800.0;

/// Returns the exposure to a steady flux after which a burn begins, cooling
/// included: the flux ends then, and the integral reaches its criterion later.
///
/// `absorbed` in W/m²; taking the irradiance for it is the safe side.
/// [`Onset::Later`] means not within 8 h by this model, which has no blood
/// flow, no sweat and no loss at the surface; it is no permission to stay.
///
/// # Accuracy
///
/// Relative error below 1e-6 of the model's own time.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the flux is negative, above 10⁹ W/m² or not
/// finite, or the tissue is too thin.
///
/// # Source
///
/// As [`integral`].
///
/// # Examples
///
/// ```
/// use farglow::physics::skin::{Injury, Onset, Tissue, burn};
/// let second = burn::longest_exposure(Tissue::standard(), 15_740.0, Injury::SecondDegree);
/// let Ok(Onset::After(time)) = second else { panic!("a burn") };
/// assert!((time / 5.55 - 1.0).abs() < 0.05);
/// ```
pub fn longest_exposure(tissue: &Tissue, absorbed: f64, injury: Injury) -> Result<Onset, Error> {
    let absorbed = irradiance("absorbed flux", absorbed)?;
    let excess = |duration: f64| -> Result<f64, Error> {
        let history = tissue.heated(&[Pulse::steady(duration, absorbed)])?;
        // Far below the criterion the logarithm is held to a finite floor.
        Ok(ratio(&history, injury)?.max(1e-60).ln())
    };
    // A first guess on the blister curve, then steps outwards to a bracket.
    let guess = (5e4 / absorbed.max(1.0)).powf(1.4).clamp(SHORTEST, LONGEST);
    let (mut low, mut high) = (guess, guess);
    let (mut at_low, mut at_high);
    let first = excess(guess)?;
    if first >= 0.0 {
        (at_low, at_high) = (first, first);
        while at_low >= 0.0 {
            if low <= SHORTEST {
                return Ok(Onset::Sooner(SHORTEST));
            }
            (high, at_high) = (low, at_low);
            low = (low / 2.0).max(SHORTEST);
            at_low = excess(low)?;
        }
    } else {
        (at_low, at_high) = (first, first);
        while at_high < 0.0 {
            if high >= LONGEST {
                return Ok(Onset::Later(LONGEST));
            }
            (low, at_low) = (high, at_high);
            high = (high * 2.0).min(LONGEST);
            at_high = excess(high)?;
        }
    }
    // Regula falsi with halving of the stale end (Illinois), on logarithms.
    let (mut a, mut b) = (low.ln(), high.ln());
    let mut side = 0_i8;
    for _ in 0..80 {
        if b - a < 1e-9 {
            break;
        }
        let mut middle = b - at_high * (b - a) / (at_high - at_low);
        if middle.is_nan() || middle <= a || middle >= b {
            middle = f64::midpoint(a, b);
        }
        let value = excess(middle.exp())?;
        if value.abs() < 1e-9 {
            return Ok(Onset::After(middle.exp()));
        }
        if value > 0.0 {
            (b, at_high) = (middle, value);
            if side == 1 {
                at_low /= 2.0;
            }
            side = 1;
        } else {
            (a, at_low) = (middle, value);
            if side == -1 {
                at_high /= 2.0;
            }
            side = -1;
        }
    }
    Ok(Onset::After(a.exp()))
}

/// Returns Ω over its criterion after a steady pulse and cooling.
///
/// `absorbed` in W/m², `duration` in seconds. Accuracy, errors and source as
/// [`ratio`].
///
/// # Errors
///
/// [`Error::OutOfRange`] if either is negative, above 10⁹ or not finite, or
/// the tissue is too thin.
pub fn after_pulse(
    tissue: &Tissue,
    absorbed: f64,
    duration: f64,
    injury: Injury,
) -> Result<f64, Error> {
    let duration = time("duration of the exposure", duration)?;
    ratio(
        &tissue.heated(&[Pulse::steady(duration, absorbed)])?,
        injury,
    )
}

#[cfg(test)]
mod tests;
