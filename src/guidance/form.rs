//! A limit as a function of exposure time, and its inverse.
//!
//! Doses are divided by the time, so that every form is an irradiance. Pure
//! powers of time are recognised at load and inverted in closed form, since a
//! limit is judged thousands of times for one uncertainty.

use super::error::{irradiance, seconds};
use super::written::Written;

/// Stays shorter than this are given the limit at this time, which is lower and so safe.
const EARLIEST: f64 = 1e-9;
/// An exposure still within the limit at this time never passes it (30,000 years).
const HORIZON: f64 = 1e12;
/// How many times a formula is looked at over its stretch.
const LOOKS: u32 = 512;

/// The irradiance limit over exposure time within one piece, W/m².
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Form {
    /// `coefficient · t^exponent`, with t in s; the exponent is at most 0.
    Power { coefficient: f64, exponent: f64 },
    /// Any other formula that never rises.
    Formula { written: Written, dose: bool },
}

impl Form {
    /// Checks a written limit over its stretch, and recognises a pure power of time.
    ///
    /// # Errors
    ///
    /// What is wrong: not finite, not positive, or rising with time.
    pub(super) fn new(
        written: Written,
        dose: bool,
        start: f64,
        end: Option<f64>,
    ) -> Result<Self, String> {
        let first = if start > 0.0 {
            start
        } else {
            end.map_or(EARLIEST, |end| EARLIEST.min(end * EARLIEST))
        };
        let last = end.unwrap_or(start.max(1.0) * 1e9);
        let formula = Self::Formula { written, dose };
        let mut before: Option<(f64, f64)> = None;
        let step = (last / first).ln() / f64::from(LOOKS);
        let times = (0..=LOOKS).map(|k| match k {
            0 => first,
            LOOKS => last,
            _ => first * (step * f64::from(k)).exp(),
        });
        let mut looks = Vec::with_capacity(LOOKS as usize + 1);
        for t in times {
            let limit = formula.look(t).filter(|limit| limit.is_finite());
            let Some(limit) = limit else {
                return Err(format!(
                    "expected a limit at every time, found none at {t} s"
                ));
            };
            if limit <= 0.0 {
                return Err(format!(
                    "expected a limit greater than zero, found {} at {}",
                    irradiance(limit),
                    seconds(t)
                ));
            }
            // A hair of rounding is no rise.
            if let Some((earlier, higher)) = before.filter(|&(_, h)| limit > h * (1.0 + 1e-12)) {
                return Err(format!(
                    "expected a limit that as an irradiance never rises with time, found {} at {} and {} at {}",
                    irradiance(higher),
                    seconds(earlier),
                    irradiance(limit),
                    seconds(t)
                ));
            }
            before = Some((t, limit));
            looks.push((t, limit));
        }
        Ok(formula.as_power(&looks).unwrap_or(formula))
    }

    /// Returns the power of time that agrees with this formula to 1e-13 at every look.
    fn as_power(&self, looks: &[(f64, f64)]) -> Option<Self> {
        let (&(first, low), &(last, high)) = (looks.first()?, looks.last()?);
        let slope = (high / low).ln() / (last / first).ln();
        // Written exponents are short decimals; the fit is off by rounding alone.
        let short = (slope * 1e6).round() / 1e6;
        let exponent = if (slope - short).abs() < 1e-13 {
            short
        } else {
            slope
        };
        let exponent = exponent.min(0.0);
        // At 1 s a power is its own coefficient.
        let anchor = 1.0_f64.clamp(first, last);
        let coefficient = self.look(anchor)? / anchor.powf(exponent);
        let power = Self::Power {
            coefficient,
            exponent,
        };
        looks
            .iter()
            .all(|&(t, limit)| (power.at(t) - limit).abs() <= 1e-13 * limit)
            .then_some(power)
    }

    fn look(&self, t: f64) -> Option<f64> {
        match self {
            Self::Power {
                coefficient,
                exponent,
            } => Some(coefficient * t.powf(*exponent)),
            Self::Formula { written, dose } => {
                let limit = written.at(t)?;
                Some(if *dose { limit / t } else { limit })
            }
        }
    }

    /// Returns the limit at `t` seconds, W/m².
    ///
    /// Infinite for a falling power at 0. Zero, the safe answer, where a
    /// formula has no value although its stretch was looked over at load.
    pub(super) fn at(&self, t: f64) -> f64 {
        match self {
            Self::Power {
                coefficient,
                exponent,
            } => coefficient * t.powf(*exponent),
            Self::Formula { .. } => self
                .look(t.max(EARLIEST))
                .filter(|limit| limit.is_finite())
                .unwrap_or(0.0),
        }
    }

    /// Returns the time in seconds at which an exposure of `exposure` W/m² meets the limit and
    /// passes it afterwards, if it does so before `end`.
    ///
    /// The caller has seen to it that the exposure is within the limit at `start`.
    pub(super) fn passed_by(&self, exposure: f64, start: f64, end: Option<f64>) -> Option<f64> {
        if exposure == 0.0 || end.is_some_and(|end| exposure <= self.at(end)) {
            return None;
        }
        match self {
            Self::Power {
                coefficient,
                exponent,
            } => {
                if *exponent == 0.0 {
                    return None;
                }
                let time = (coefficient / exposure).powf(-1.0 / exponent).max(start);
                // A time past every number is never.
                Some(end.map_or(time, |end| time.min(end))).filter(|time| time.is_finite())
            }
            Self::Formula { .. } => {
                let low = start.max(EARLIEST);
                let high = end.unwrap_or(HORIZON.max(low * 2.0));
                (exposure > self.at(high)).then(|| self.bisect(exposure, low, high))
            }
        }
    }

    /// Halves the ratio of two times, within and over, until they agree to 1e-13; the one within.
    fn bisect(&self, exposure: f64, mut low: f64, mut high: f64) -> f64 {
        while high > low * (1.0 + 1e-13) {
            let middle = low.sqrt() * high.sqrt();
            if !(middle > low && middle < high) {
                break;
            }
            if exposure <= self.at(middle) {
                low = middle;
            } else {
                high = middle;
            }
        }
        low
    }
}

#[cfg(test)]
mod tests {
    use super::{Form, Written};
    use crate::guidance::Library;
    use crate::units::Dimension;

    #[test]
    fn shipped_formulas_are_recognised_as_powers_of_time_to_the_last_digit() {
        for (id, piece, coefficient, exponent) in [
            ("eu-2006-25-m", 0, 18_000.0, -0.75),
            ("eu-2006-25-n", 0, 100.0, 0.0),
            ("icnirp-2013-ir-eye", 0, 18_000.0, -0.75),
            ("icnirp-2013-ir-eye", 1, 100.0, 0.0),
            // Doses by the time: t^0.25 / t.
            ("eu-2006-25-o", 0, 20_000.0, -0.75),
            ("icnirp-2013-skin", 0, 20_000.0, -0.75),
            ("pain-time", 0, 35_000.0, -1.0 / 1.33),
        ] {
            let limit = Library::shipped().get(id).expect("it is shipped");
            let Form::Power {
                coefficient: c,
                exponent: e,
            } = limit.pieces[piece].form
            else {
                panic!("{id} piece {piece} is no power: {:?}", limit.pieces[piece]);
            };
            assert!(
                c == coefficient && (e - exponent).abs() <= 4e-16,
                "{id}: expected {coefficient}·t^{exponent}, found {c}·t^{e}"
            );
        }
    }

    #[test]
    fn what_is_nearly_a_power_is_not_taken_for_one() {
        for text in [
            "18000 W/m² * (t / 1 s)^(-0.75) + 0.000001 W/m²",
            "18000 W/m² * (t / 1 s + 0.000000001)^(-0.75)",
            "min(18000 W/m² * (t / 1 s)^(-0.75), 1000000 W/m²)",
        ] {
            let written = Written::limit(text, Dimension::IRRADIANCE).expect("it is an irradiance");
            let form = Form::new(written, false, 0.0, Some(1000.0)).expect("it never rises");
            assert!(
                matches!(form, Form::Formula { .. }),
                "{text} was taken for {form:?}"
            );
        }
    }
}
