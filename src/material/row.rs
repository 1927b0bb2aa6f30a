//! One row of a library: a low, a typical and a high value.

use std::fmt;

use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Quantity, Sense, Unit};

/// How far the 2.5 % and 97.5 % points of the normal distribution lie from its
/// median, in standard deviations.
const NINETY_FIVE: f64 = 1.959_963_984_540_054;

/// How a row is known.
#[derive(Clone, Copy, Debug, PartialEq, Eq, serde::Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum HowKnown {
    /// Seen in a published text, or in one that quotes it.
    Read,
    /// Worked out from a published law.
    Computed,
    /// Recalled; nobody has compared it with a text.
    Memory,
    /// A rule of the trade without a source.
    #[serde(rename = "common practice")]
    CommonPractice,
}

impl HowKnown {
    /// Returns the words that stand on a screen and on a worksheet.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Read => "read",
            Self::Computed => "computed",
            Self::Memory => "recalled, not read",
            Self::CommonPractice => "common practice, no source",
        }
    }
}

impl fmt::Display for HowKnown {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.words())
    }
}

/// Into which directions an emissivity counts what leaves.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Directions {
    /// Straight out of the surface. Of a bare metal up to about 1.3 times as
    /// much leaves into the hemisphere.
    Normal,
    /// Into the whole hemisphere.
    Hemispherical,
    /// The source does not say.
    Unsaid,
}

/// What a row is a value of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Property {
    /// An emissivity over all wavelengths.
    TotalEmissivity(Directions),
    /// An emissivity at one wavelength, in metres.
    SpectralEmissivity(f64),
    /// A temperature.
    Temperature,
}

impl Property {
    /// Returns the words for it, such as `total normal emissivity`.
    #[must_use]
    pub fn words(self) -> String {
        match self {
            Self::TotalEmissivity(Directions::Normal) => "total normal emissivity".to_owned(),
            Self::TotalEmissivity(Directions::Hemispherical) => {
                "total hemispherical emissivity".to_owned()
            }
            Self::TotalEmissivity(Directions::Unsaid) => "total emissivity".to_owned(),
            Self::SpectralEmissivity(wavelength) => {
                let unit = Unit::parse("µm").expect("µm is a unit");
                format!("emissivity at {}", format::exactly(wavelength, &unit))
            }
            Self::Temperature => "temperature".to_owned(),
        }
    }
}

/// One row.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// Its id, which never changes: small letters, digits and low lines, so
    /// that it reads like the name of a cell and has no sign in it that an
    /// expression could take for a minus.
    pub id: String,
    /// What it is, such as `cast iron, molten, clean`.
    pub title: String,
    /// What it is a value of.
    pub property: Property,
    /// The low end of its range, in SI units.
    pub low: f64,
    /// What is taken for it.
    pub typical: f64,
    /// The high end of its range.
    pub high: f64,
    /// The temperatures in kelvin that an emissivity is for.
    pub valid: Option<[f64; 2]>,
    /// Where it is from.
    pub source: String,
    /// How it is known.
    pub how_known: HowKnown,
    /// What else is to be known of it.
    pub note: Option<String>,
}

impl Row {
    /// Returns the typical value with its dimension.
    #[must_use]
    pub fn quantity(&self) -> Quantity {
        match self.property {
            Property::Temperature => Quantity {
                sense: Sense::Point,
                ..Quantity::new(self.typical, Dimension::TEMPERATURE)
            },
            Property::TotalEmissivity(_) | Property::SpectralEmissivity(_) => {
                Quantity::number(self.typical)
            }
        }
    }

    /// Returns whether it is an emissivity of the near infrared, 780–3000 nm.
    #[must_use]
    pub fn is_near_infrared(&self) -> bool {
        matches!(self.property, Property::SpectralEmissivity(wavelength)
            if (780e-9..=3000e-9).contains(&wavelength))
    }

    /// Returns whether there is a range at all.
    #[must_use]
    pub fn has_spread(&self) -> bool {
        self.low < self.high
    }

    /// Returns the value at a standard normal score, in SI units.
    ///
    /// Two halves of normal distributions that meet at the typical value, which
    /// is the median: 2.5 % of the draws lie below the low end and 2.5 % above
    /// the high end, so that low to high is the central 95 %, however lopsided
    /// the range. An emissivity is held above half of its low end and at most at
    /// 1.
    #[must_use]
    pub fn at_score(&self, score: f64) -> f64 {
        let half = if score < 0.0 {
            self.typical - self.low
        } else {
            self.high - self.typical
        };
        let value = self.typical + half * (score / NINETY_FIVE);
        match self.property {
            Property::Temperature => value.max(0.5 * self.low),
            Property::TotalEmissivity(_) | Property::SpectralEmissivity(_) => {
                value.max(0.5 * self.low).min(1.0)
            }
        }
    }

    /// Returns the value with its range, such as `0.29 (0.20 to 0.35)`.
    #[must_use]
    pub fn value_words(&self) -> String {
        let unit = format::natural_unit(self.quantity().dimension, self.typical, None);
        let text = |si| format::exactly(si, &unit);
        if self.has_spread() {
            format!(
                "{} ({} to {})",
                text(self.typical),
                text(self.low),
                text(self.high)
            )
        } else {
            text(self.typical)
        }
    }

    /// Returns the temperatures that it is for, such as `1300 °C to 1400 °C`.
    #[must_use]
    pub fn valid_words(&self) -> Option<String> {
        let [from, to] = self.valid?;
        let text = |si| {
            let unit = format::natural_unit(Dimension::TEMPERATURE, si, None);
            format::quantity(si, &unit, 4, Rounding::Nearest)
        };
        Some(if from < to {
            format!("{} to {}", text(from), text(to))
        } else {
            text(from)
        })
    }

    /// Returns what it says, in one sentence: `cast iron, molten, clean: total
    /// normal emissivity 0.29 (0.2 to 0.35), for 1300 °C to 1400 °C`.
    #[must_use]
    pub fn said(&self) -> String {
        let valid = self
            .valid_words()
            .map_or_else(String::new, |valid| format!(", for {valid}"));
        format!(
            "{}: {} {}{valid}",
            self.title,
            self.property.words(),
            self.value_words()
        )
    }

    /// Returns where it is from and how it is known, with its note.
    #[must_use]
    pub fn cited(&self) -> String {
        let note = self
            .note
            .as_ref()
            .map_or_else(String::new, |note| format!(". {note}"));
        format!("{} [{}]{note}", self.source, self.how_known)
    }
}
