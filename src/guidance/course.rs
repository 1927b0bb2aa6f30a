//! A family of rows joined into one limit over exposure time, and how an
//! exposure is judged by it.
//!
//! The limit never rises with time, which the gate proves at load; so the
//! first time at which an exposure passes it ends the allowed stay.

#[cfg(test)]
mod tests;

use super::form::Form;
use super::{Dose, Error, Finding, Judgement, Reason};
use crate::units::format;

/// How long one stay may be, with no other exposure that shift.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Allowed {
    /// This many seconds: the limit is passed afterwards.
    Seconds(f64),
    /// The limit is never passed, as far as this guidance speaks.
    Unlimited,
    /// The limit is not passed up to this many seconds, and guidance says nothing beyond.
    CappedAt(f64),
}

/// The limit of a family of rows over exposure time, as an irradiance.
#[derive(Clone, Debug, PartialEq)]
pub struct Course {
    stretches: Vec<Stretch>,
    evidence: bool,
    dose: bool,
}

/// One piece with its bounds: `start` belongs to the stretch before exactly when `start_taken`.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Stretch {
    pub(super) start: f64,
    pub(super) start_taken: bool,
    pub(super) end: Option<f64>,
    pub(super) includes_end: bool,
    pub(super) form: Form,
}

impl Allowed {
    /// Returns the time in words, rounded down.
    ///
    /// "Unlimited" holds for this guidance alone: a position's own time is
    /// unlimited only where no other effect limits it.
    #[must_use]
    pub fn text(self) -> String {
        match self {
            Self::Seconds(time) => format::safe_time(time),
            Self::Unlimited => "unlimited".to_owned(),
            Self::CappedAt(time) => {
                format!("{}, and nothing is said beyond", format::safe_time(time))
            }
        }
    }
}

impl Course {
    /// Joins stretches that adjoin, in order of time.
    pub(super) fn new(stretches: Vec<Stretch>, evidence: bool, dose: bool) -> Self {
        Self {
            stretches,
            evidence,
            dose,
        }
    }

    /// Returns the exposure time in seconds after which the guidance says nothing.
    #[must_use]
    pub fn end(&self) -> Option<f64> {
        self.stretches.last().and_then(|stretch| stretch.end)
    }

    /// Returns the exposure time in seconds up to which the guidance says nothing: 0 for most.
    #[must_use]
    pub fn start(&self) -> f64 {
        self.stretches.first().map_or(0.0, |stretch| stretch.start)
    }

    /// Returns the exposure times in seconds at which one formula hands over to the next.
    pub fn joints(&self) -> impl Iterator<Item = f64> {
        self.stretches.iter().skip(1).map(|stretch| stretch.start)
    }

    /// Returns the limit at an exposure time of `t` seconds as an irradiance, W/m².
    ///
    /// None at 0 and below, and where the guidance does not speak. A finite
    /// limit is returned wherever one is.
    #[must_use]
    pub fn limit_at(&self, t: f64) -> Option<f64> {
        self.stretch_at(t).map(|stretch| finite(stretch.form.at(t)))
    }

    fn stretch_at(&self, t: f64) -> Option<&Stretch> {
        if !(t.is_finite() && t > 0.0) {
            return None;
        }
        self.stretches.iter().find(|stretch| stretch.holds_at(t))
    }

    /// Returns the longest stay in an irradiance of `exposure` W/m².
    ///
    /// It is the longest time such that the exposure is within the limit at
    /// every time up to it. Where the limit steps down at a time that belongs
    /// to the lower piece, it is the last `f64` before that time.
    ///
    /// # Accuracy
    ///
    /// `4e-15` relative for powers of time, `1e-12` for other formulas, where the limit still falls.
    ///
    /// # Errors
    ///
    /// [`Error::Exposure`] if the exposure is negative or not finite.
    pub fn allowed(&self, exposure: f64) -> Result<Allowed, Error> {
        if !(exposure.is_finite() && exposure >= 0.0) {
            return Err(Error::Exposure { value: exposure });
        }
        for (at, stretch) in self.stretches.iter().enumerate() {
            if exposure > stretch.form.at(stretch.start) {
                // Before the first row nothing is known, so nothing is granted.
                return Ok(if at == 0 && stretch.start > 0.0 {
                    Allowed::CappedAt(0.0)
                } else if at == 0 || stretch.start_taken {
                    Allowed::Seconds(stretch.start)
                } else {
                    Allowed::Seconds(stretch.start.next_down())
                });
            }
            if let Some(time) = stretch.form.passed_by(exposure, stretch.start, stretch.end) {
                return Ok(Allowed::Seconds(time));
            }
        }
        Ok(self.end().map_or(Allowed::Unlimited, Allowed::CappedAt))
    }

    /// Judges an irradiance in W/m² over a stay in seconds.
    ///
    /// # Errors
    ///
    /// [`Error::Exposure`] if the exposure is negative or not finite.
    pub fn judge(&self, exposure: f64, stay: Option<f64>) -> Result<Judgement, Error> {
        let allowed = self.allowed(exposure)?;
        let unanswered = |reason| Judgement {
            exposure,
            limit: None,
            ratio: None,
            dose: None,
            judged_at: None,
            allowed,
            finding: Finding::NotAssessed(reason),
        };
        let Some(stay) = stay else {
            return Ok(unanswered(Reason::NoStay));
        };
        if !(stay.is_finite() && stay > 0.0) {
            return Ok(unanswered(Reason::StayNotPositive));
        }
        let passed = match allowed {
            Allowed::Seconds(longest) => stay > longest,
            // Capped where the guidance ends, or at nothing because it only begins later.
            Allowed::CappedAt(cap) => stay > cap && self.end() != Some(cap),
            Allowed::Unlimited => false,
        };
        let (time, limit) = if let Some(stretch) = self.stretch_at(stay) {
            (stay, stretch.form.at(stay))
        } else if let Some(end) = self.end().filter(|&end| stay >= end) {
            if !passed {
                return Ok(unanswered(Reason::Beyond { until: end }));
            }
            // A stay that goes on past the last second has passed through it.
            let last = self.stretches.last().map_or(0.0, |s| s.form.at(end));
            (end, last)
        } else {
            return Ok(unanswered(Reason::Before { from: self.start() }));
        };
        Ok(Judgement {
            exposure,
            limit: Some(finite(limit)),
            ratio: Some(settled(exposure, limit, passed)),
            dose: self.dose.then_some(Dose {
                exposure: finite(exposure * time),
                limit: finite(limit * time),
            }),
            judged_at: Some(time),
            allowed,
            finding: match (passed, self.evidence) {
                (false, false) => Finding::Within,
                (true, false) => Finding::Over,
                (false, true) => Finding::BelowOnset,
                (true, true) => Finding::OnsetReached,
            },
        })
    }
}

/// Returns exposure over limit; one that rounding put on the wrong side of 1 is brought to the
/// side where the time says it is.
fn settled(exposure: f64, limit: f64, passed: bool) -> f64 {
    if passed {
        finite(exposure / limit).max(1.0_f64.next_up())
    } else if exposure == 0.0 {
        0.0
    } else {
        (exposure / limit).min(1.0)
    }
}

/// Returns the largest number in place of infinity, which no result may be.
fn finite(value: f64) -> f64 {
    value.min(f64::MAX)
}

impl Stretch {
    fn holds_at(&self, t: f64) -> bool {
        let begun = t > self.start || (t == self.start && !self.start_taken);
        begun
            && self
                .end
                .is_none_or(|end| t < end || (t == end && self.includes_end))
    }
}
