//! A limit as a function of exposure time, and its inverse.

/// The irradiance limit over exposure time within one piece.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Form {
    /// `coefficient · t^exponent`, in W/m² with t in s; the exponent is at most 0.
    Power { coefficient: f64, exponent: f64 },
}

impl Form {
    /// Returns the limit at `t` seconds, W/m².
    pub(super) fn at(&self, t: f64) -> f64 {
        match self {
            Self::Power {
                coefficient,
                exponent,
            } => coefficient * t.powf(*exponent),
        }
    }

    /// Returns the time in seconds at which an exposure of `exposure` W/m² meets the limit and
    /// passes it afterwards, if it does so before `end`.
    ///
    /// The caller has seen to it that the exposure is within the limit at `start`.
    pub(super) fn passed_by(&self, exposure: f64, start: f64, end: Option<f64>) -> Option<f64> {
        if end.is_some_and(|end| exposure <= self.at(end)) {
            return None;
        }
        match self {
            Self::Power {
                coefficient,
                exponent,
            } => {
                if *exponent == 0.0 || exposure == 0.0 {
                    return None;
                }
                let time = (coefficient / exposure).powf(-1.0 / exponent);
                let time = time.max(start);
                Some(end.map_or(time, |end| time.min(end)))
            }
        }
    }
}
