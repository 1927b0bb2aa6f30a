//! Radiation that people may meet in an emergency of a plant with flares.
//!
//! Irradiances in W/m². These levels are for acting in an emergency and for
//! escape; they never set a planned zone or stay.

use super::error::Error;
use super::skin::irradiance;

/// What a level of radiation leaves room for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Level {
    /// Up to 1.58 kW/m²: continuous presence in appropriate clothing.
    Continuous,
    /// Up to 4.73 kW/m²: emergency actions of 2 min to 3 min, in appropriate
    /// clothing, without a shield.
    Minutes,
    /// Up to 6.31 kW/m²: emergency actions of up to 30 s, likewise.
    HalfAMinute,
    /// Up to 9.46 kW/m²: urgent action of a few seconds, escape only; shields
    /// or special clothing are to be thought of above 6.31 kW/m².
    EscapeOnly,
}

impl Level {
    /// All levels, the mildest first.
    pub const ALL: [Level; 4] = [
        Level::Continuous,
        Level::Minutes,
        Level::HalfAMinute,
        Level::EscapeOnly,
    ];

    /// Returns the greatest irradiance of the level, W/m².
    ///
    /// # Source
    ///
    /// API 521 (2014), design radiation levels for personnel: 1.58 and 4.73
    /// read in a public answer on flares; 6.31 and 9.46 and their wording from
    /// memory.
    #[must_use]
    pub const fn most(self) -> f64 {
        match self {
            Level::Continuous => 1580.0,
            Level::Minutes => 4730.0,
            Level::HalfAMinute => 6310.0,
            Level::EscapeOnly => 9460.0,
        }
    }

    /// Returns how long an emergency action may last, s, by the lower end of
    /// what is said; none where it is not limited, or not to be begun at all.
    #[must_use]
    pub const fn action(self) -> Option<f64> {
        match self {
            Level::Minutes => Some(120.0),
            Level::HalfAMinute => Some(30.0),
            Level::Continuous | Level::EscapeOnly => None,
        }
    }
}

/// Returns the mildest level that holds an irradiance; none above them all.
///
/// `total` is the irradiance of all wavelengths, W/m².
///
/// # Errors
///
/// [`Error::OutOfRange`] if it is negative, above 10⁹ W/m² or not finite.
///
/// # Source
///
/// As [`Level::most`].
pub fn level(total: f64) -> Result<Option<Level>, Error> {
    let total = irradiance("irradiance", total)?;
    Ok(Level::ALL.into_iter().find(|level| total <= level.most()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn levels_rise_and_hold_what_is_below_them() {
        for pair in Level::ALL.windows(2) {
            assert!(pair[0].most() < pair[1].most(), "{pair:?}");
        }
        for expected in Level::ALL {
            assert_eq!(level(expected.most()), Ok(Some(expected)));
            assert_ne!(level(expected.most().next_up()), Ok(Some(expected)));
        }
        assert_eq!(level(9461.0), Ok(None));
        assert_eq!(level(0.0), Ok(Some(Level::Continuous)));
        assert!(level(f64::NAN).is_err());
    }
}
