//! How much heat guidance takes for a whole body at work, by metabolic rate.
//!
//! Wet bulb globe temperatures in kelvin, metabolic rates in watts for a person.

use super::{Error, Outside, within};

/// Metabolic rate in classes.
///
/// # Source
///
/// ISO 8996:2021, table A.1; from memory.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum MetabolicClass {
    /// 115 W, up to 125 W.
    Resting,
    /// 180 W, up to 235 W.
    Low,
    /// 300 W, up to 360 W.
    Moderate,
    /// 415 W, up to 465 W.
    High,
    /// 520 W and more.
    VeryHigh,
}

impl MetabolicClass {
    /// All classes, from rest upwards.
    pub const ALL: [MetabolicClass; 5] = [
        MetabolicClass::Resting,
        MetabolicClass::Low,
        MetabolicClass::Moderate,
        MetabolicClass::High,
        MetabolicClass::VeryHigh,
    ];

    /// Returns the class that holds a metabolic rate in watts; a boundary
    /// belongs to the lower class.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the rate lies outside 40 W to 2000 W.
    pub fn of(metabolic_rate: f64) -> Result<MetabolicClass, Error> {
        let rate = watts(metabolic_rate)?;
        Ok(if rate <= 125.0 {
            MetabolicClass::Resting
        } else if rate <= 235.0 {
            MetabolicClass::Low
        } else if rate <= 360.0 {
            MetabolicClass::Moderate
        } else if rate <= 465.0 {
            MetabolicClass::High
        } else {
            MetabolicClass::VeryHigh
        })
    }

    /// Returns the rate that stands for the class, W.
    #[must_use]
    pub const fn metabolic_rate(self) -> f64 {
        match self {
            MetabolicClass::Resting => 115.0,
            MetabolicClass::Low => 180.0,
            MetabolicClass::Moderate => 300.0,
            MetabolicClass::High => 415.0,
            MetabolicClass::VeryHigh => 520.0,
        }
    }

    /// Returns the reference value of the wet bulb globe temperature for 8 h in
    /// ordinary work clothes, K.
    ///
    /// # Source
    ///
    /// ISO 7243:2017, table A.1: classes 0 to 2 read in DGUV Information
    /// 213-002, table 3, after EN 27243:1993; classes 3 and 4 from memory.
    #[must_use]
    pub const fn reference_value(self, acclimatised: bool) -> f64 {
        let celsius = match (self, acclimatised) {
            (MetabolicClass::Resting, true) => 33.0,
            (MetabolicClass::Resting, false) => 32.0,
            (MetabolicClass::Low, true) => 30.0,
            (MetabolicClass::Low, false) => 29.0,
            (MetabolicClass::Moderate, true) => 28.0,
            (MetabolicClass::Moderate, false) | (MetabolicClass::High, true) => 26.0,
            (MetabolicClass::High, false) => 23.0,
            (MetabolicClass::VeryHigh, true) => 25.0,
            (MetabolicClass::VeryHigh, false) => 20.0,
        };
        celsius + 273.15
    }
}

/// The least and the largest metabolic rate for which the lines of NIOSH are
/// used, W: about the range of its figures.
const LINES: (f64, f64) = (100.0, 600.0);

/// Returns the recommended alert limit of NIOSH for workers who are not
/// acclimatised, as wet bulb globe temperature over an hour, K.
///
/// `metabolic_rate` is the mean over the hour, W, 100 W to 600 W.
///
/// # Errors
///
/// [`Outside`] for rates beyond the range of the figure (its ends from memory),
/// NaN among them.
///
/// # Source
///
/// NIOSH Publication 2016-106, section 8.1: 59.9 − 14.1·log₁₀ M °C; read in
/// open code that cites it, the document itself not opened. Checked in
/// `tests/published/heat_strain_rows.rs`.
///
/// # Examples
///
/// ```
/// let found = farglow::physics::heat_strain::threshold::alert_limit(300.0).unwrap();
/// assert!((found - 273.15 - 24.97).abs() < 0.005);
/// ```
pub fn alert_limit(metabolic_rate: f64) -> Result<f64, Outside> {
    Ok(59.9 - 14.1 * line(metabolic_rate)?.log10() + 273.15)
}

/// Returns the recommended exposure limit of NIOSH for acclimatised workers, as
/// wet bulb globe temperature over an hour, K.
///
/// # Errors
///
/// As [`alert_limit`].
///
/// # Source
///
/// As [`alert_limit`]: 56.7 − 11.5·log₁₀ M °C.
pub fn exposure_limit(metabolic_rate: f64) -> Result<f64, Outside> {
    Ok(56.7 - 11.5 * line(metabolic_rate)?.log10() + 273.15)
}

fn line(metabolic_rate: f64) -> Result<f64, Outside> {
    if (LINES.0..=LINES.1).contains(&metabolic_rate) {
        Ok(metabolic_rate)
    } else {
        Err(Outside {
            parameter: "metabolic rate",
            range: "100 W to 600 W",
            value: metabolic_rate,
            unit: "W",
        })
    }
}

/// Returns a metabolic rate of a person if it is one, W.
pub(super) fn watts(value: f64) -> Result<f64, Error> {
    within("metabolic rate", value, 40.0, 2000.0, "from 40 W to 2000 W")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn harder_work_and_less_habit_are_allowed_less_heat() {
        for pair in MetabolicClass::ALL.windows(2) {
            for habit in [true, false] {
                assert!(
                    pair[0].reference_value(habit) > pair[1].reference_value(habit),
                    "{pair:?}"
                );
            }
        }
        for class in MetabolicClass::ALL {
            assert!(
                class.reference_value(true) > class.reference_value(false),
                "{class:?}"
            );
            assert_eq!(MetabolicClass::of(class.metabolic_rate()), Ok(class));
        }
        let mut last = f64::INFINITY;
        for rate in 100..=600_u32 {
            let (alert, limit) = (
                alert_limit(f64::from(rate)).expect("in range"),
                exposure_limit(f64::from(rate)).expect("in range"),
            );
            assert!(
                alert < limit && limit < last,
                "{rate} W: {alert} K, {limit} K"
            );
            last = limit;
        }
    }

    #[test]
    fn outside_the_lines_the_reason_is_told() {
        let told = alert_limit(50.0).expect_err("too low");
        assert_eq!(
            told.to_string(),
            "metabolic rate is 50 W, outside the range of the method, 100 W to 600 W"
        );
        assert!(exposure_limit(f64::NAN).is_err() && MetabolicClass::of(f64::NAN).is_err());
    }
}
