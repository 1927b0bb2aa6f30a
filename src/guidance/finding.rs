//! How one exposure stands to one limit.

use super::Allowed;
use super::error::seconds;

/// One exposure judged by one family of limits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Judgement {
    /// The irradiance that was judged, W/m².
    pub exposure: f64,
    /// The limit as an irradiance at [`Self::judged_at`], W/m².
    pub limit: Option<f64>,
    /// Exposure over limit at [`Self::judged_at`].
    ///
    /// At most 1 exactly when the stay is at most the allowed time. For doses
    /// it is the same number in dose terms.
    pub ratio: Option<f64>,
    /// The same comparison as doses, for metrics that are doses.
    pub dose: Option<Dose>,
    /// The exposure time at which limit and ratio were taken, in seconds.
    ///
    /// This is the stay; or, when the stay goes on past the guidance's last
    /// second and the limit was passed before that, that last second.
    pub judged_at: Option<f64>,
    /// The longest single stay, with no other exposure that shift.
    pub allowed: Allowed,
    /// What is found for the stay.
    pub finding: Finding,
}

/// A radiant exposure beside its limit, both in J/m².
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dose {
    /// Irradiance times the time judged at.
    pub exposure: f64,
    /// The limit for that time.
    pub limit: f64,
}

/// What was found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Finding {
    /// The exposure stays within the limit for the whole stay.
    Within,
    /// The exposure passes the limit during the stay.
    Over,
    /// The guidance gives no answer.
    NotAssessed(Reason),
    /// Evidence: the effect has not set in by the end of the stay.
    BelowOnset,
    /// Evidence: the effect sets in during the stay.
    OnsetReached,
}

/// Why guidance gives no answer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Reason {
    /// No stay is stated.
    NoStay,
    /// The stay is not a time greater than zero.
    StayNotPositive,
    /// The stay is shorter than the guidance covers.
    Before {
        /// The exposure time in seconds from which it speaks.
        from: f64,
    },
    /// The stay is longer than the guidance covers.
    Beyond {
        /// The exposure time in seconds up to which it speaks.
        until: f64,
    },
    /// More falls on the person than was judged: a polished screen mirrors a
    /// source.
    Mirrored,
}

impl Finding {
    /// Returns the word by which it is known everywhere.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Within => "within",
            Self::Over => "over",
            Self::NotAssessed(_) => "not assessed",
            Self::BelowOnset => "below onset",
            Self::OnsetReached => "onset reached",
        }
    }

    /// Returns the word, with the reason where there is no answer.
    #[must_use]
    pub fn text(self) -> String {
        match self {
            Self::NotAssessed(reason) => format!("{}: {}", self.word(), reason.text()),
            Self::Within | Self::Over | Self::BelowOnset | Self::OnsetReached => {
                self.word().to_owned()
            }
        }
    }

    /// Returns whether it counts as over in an overall finding.
    #[must_use]
    pub const fn counts_as_over(self) -> bool {
        matches!(self, Self::Over | Self::OnsetReached)
    }
}

impl Reason {
    /// Returns the reason in words.
    #[must_use]
    pub fn text(self) -> String {
        match self {
            Self::NoStay => "no stay is stated".to_owned(),
            Self::StayNotPositive => "the stay is not a time greater than zero".to_owned(),
            Self::Before { from } => {
                format!(
                    "this guidance speaks only of stays longer than {}",
                    seconds(from)
                )
            }
            Self::Beyond { until } => {
                format!(
                    "this guidance says nothing about stays past {}",
                    seconds(until)
                )
            }
            Self::Mirrored => {
                "a polished screen mirrors a source here: the truth is higher".to_owned()
            }
        }
    }
}
