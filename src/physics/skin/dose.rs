//! Thermal dose: irradiance to the power 4/3, times time.
//!
//! In (W/m²)^(4/3)·s; the unit of the literature, (kW/m²)^(4/3)·s, is exactly
//! 10⁴ of them. Doses of separate spells add up as if no heat left between
//! them, which is the safe side.

use super::{Error, irradiance, time};

/// One (kW/m²)^(4/3)·s, the thermal dose unit of the literature, in
/// (W/m²)^(4/3)·s: 1000^(4/3), exactly.
pub const UNIT: f64 = 1e4;

/// What a thermal dose of infrared radiation does to bare skin, or to people.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Threshold {
    /// Pain: 92, from 86 to 103.
    Pain,
    /// First degree burn: 105, from 80 to 130.
    FirstDegree,
    /// Second degree burn: 290, from 240 to 350.
    SecondDegree,
    /// Third degree burn: 1000, from 870 to 2600.
    ThirdDegree,
    /// Death of one to five in a hundred: about 1000; from memory.
    FewDeaths,
    /// A dangerous dose with significant likelihood of death: 1800; from memory.
    ManyDeaths,
    /// Death of half of those exposed: 2000.
    HalfDie,
}

impl Threshold {
    /// All thresholds.
    pub const ALL: [Threshold; 7] = [
        Threshold::Pain,
        Threshold::FirstDegree,
        Threshold::SecondDegree,
        Threshold::ThirdDegree,
        Threshold::FewDeaths,
        Threshold::ManyDeaths,
        Threshold::HalfDie,
    ];

    /// Least, usual and largest published value, (kW/m²)^(4/3)·s.
    const fn published(self) -> (f64, f64, f64) {
        match self {
            Threshold::Pain => (86.0, 92.0, 103.0),
            Threshold::FirstDegree => (80.0, 105.0, 130.0),
            Threshold::SecondDegree => (240.0, 290.0, 350.0),
            Threshold::ThirdDegree => (870.0, 1000.0, 2600.0),
            Threshold::FewDeaths => (1000.0, 1000.0, 1000.0),
            Threshold::ManyDeaths => (1800.0, 1800.0, 1800.0),
            Threshold::HalfDie => (2000.0, 2000.0, 2000.0),
        }
    }

    /// Returns the lower end of the published range, (W/m²)^(4/3)·s: the one
    /// that judges.
    ///
    /// # Source
    ///
    /// HSL/2004/04 and sources in it. Pain, burns and the dose that kills half
    /// were read in texts that cite it; the other two are from memory.
    #[must_use]
    pub const fn least(self) -> f64 {
        self.published().0 * UNIT
    }

    /// Returns the value most often given, (W/m²)^(4/3)·s. Source as [`Threshold::least`].
    #[must_use]
    pub const fn usual(self) -> f64 {
        self.published().1 * UNIT
    }

    /// Returns the upper end of the published range, (W/m²)^(4/3)·s. Source as
    /// [`Threshold::least`].
    #[must_use]
    pub const fn largest(self) -> f64 {
        self.published().2 * UNIT
    }
}

/// Returns the thermal dose of a steady exposure, (W/m²)^(4/3)·s.
///
/// `total` is the irradiance of all wavelengths in W/m², `duration` in seconds.
///
/// # Errors
///
/// [`Error::OutOfRange`] if either is negative, above 10⁹ or not finite.
///
/// # Source
///
/// HSL/2004/04 and sources in it: dose = q^(4/3)·t; read in a text that cites
/// it. Checked in `tests/published/burns.rs`.
pub fn steady(total: f64, duration: f64) -> Result<f64, Error> {
    let total = irradiance("irradiance on the skin", total)?;
    Ok(total.powf(4.0 / 3.0) * time("duration of the exposure", duration)?)
}

/// Returns the time in which a steady irradiance gives a dose, in seconds;
/// none at zero irradiance, and where it would take over 10⁹ s.
///
/// `total` in W/m², `dose` in (W/m²)^(4/3)·s.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the irradiance is negative, above 10⁹ W/m² or not
/// finite, or the dose is negative or not finite.
///
/// # Source
///
/// As [`steady`].
pub fn reached(total: f64, dose: f64) -> Result<Option<f64>, Error> {
    let total = irradiance("irradiance on the skin", total)?;
    let dose = super::within(
        "thermal dose",
        dose,
        0.0,
        1e30,
        "from 0 to 10³⁰ (W/m²)^(4/3)·s",
    )?;
    let found = dose / total.powf(4.0 / 3.0);
    Ok((found <= super::LONGEST_TIME).then_some(found))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn unit_of_the_literature_is_ten_thousand_of_ours() {
        assert!((1000.0_f64.powf(4.0 / 3.0) / UNIT - 1.0).abs() < 1e-15);
    }

    #[test]
    fn ranges_hold_their_usual_value() {
        for threshold in Threshold::ALL {
            let (low, usual, high) = (threshold.least(), threshold.usual(), threshold.largest());
            assert!(
                low <= usual && usual <= high,
                "{threshold:?}: {low} {usual} {high}"
            );
        }
    }

    #[test]
    fn time_and_dose_are_inverse_and_edges_are_refused() {
        for q in [500.0, 1700.0, 25_000.0] {
            let dose = Threshold::SecondDegree.least();
            let time = reached(q, dose).expect("fair").expect("soon");
            let back = steady(q, time).expect("fair");
            assert!((back / dose - 1.0).abs() < 1e-14, "{back} against {dose}");
        }
        assert_eq!(reached(0.0, 1.0), Ok(None));
        assert!(steady(-1.0, 1.0).is_err() && steady(1.0, f64::NAN).is_err());
        assert!(reached(1.0, f64::INFINITY).is_err());
        assert_eq!(reached(0.0, 0.0), Ok(None), "0/0 is no time");
    }
}
