//! What a limit measures: which radiation, and whether its rate or its sum.

use crate::units::Dimension;

/// What a limit judges: a band of wavelengths, as irradiance or as dose.
///
/// Bands are unweighted. Whatever the metric, the exposure that is handed to
/// [`Library::judge`](super::Library::judge) is an irradiance in W/m²; a dose
/// is that irradiance times the stay.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Metric {
    /// Irradiance in 780–3000 nm, W/m².
    NearInfraredIrradiance,
    /// Radiant exposure in 780–3000 nm, J/m².
    NearInfraredDose,
    /// Irradiance in 380–3000 nm, W/m².
    SkinIrradiance,
    /// Radiant exposure in 380–3000 nm, J/m².
    SkinDose,
    /// Irradiance over all wavelengths, W/m².
    TotalIrradiance,
    /// Radiant exposure over all wavelengths, J/m².
    TotalDose,
}

/// Which irradiance of a position a metric is judged on.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Exposure {
    /// 780–3000 nm.
    NearInfrared,
    /// 380–3000 nm.
    Skin,
    /// All wavelengths.
    Total,
}

/// Which points around a position are judged.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Envelope {
    /// The eye point and the six points at ± reach around it.
    Eye,
    /// The heights of a standing body at the point and at ± reach around it.
    Skin,
}

/// What a limit protects.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Organ {
    /// Cornea and lens of the eye.
    Eye,
    /// The retina.
    Retina,
    /// The skin.
    Skin,
    /// The body's heat balance.
    HeatStrain,
}

impl Metric {
    /// Every metric.
    pub const ALL: [Self; 6] = [
        Self::NearInfraredIrradiance,
        Self::NearInfraredDose,
        Self::SkinIrradiance,
        Self::SkinDose,
        Self::TotalIrradiance,
        Self::TotalDose,
    ];

    /// Returns the name that people read, such as "near infrared irradiance, 780–3000 nm".
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::NearInfraredIrradiance => "near infrared irradiance, 780–3000 nm",
            Self::NearInfraredDose => "near infrared radiant exposure, 780–3000 nm",
            Self::SkinIrradiance => "skin irradiance, 380–3000 nm",
            Self::SkinDose => "skin radiant exposure, 380–3000 nm",
            Self::TotalIrradiance => "total irradiance",
            Self::TotalDose => "total radiant exposure",
        }
    }

    /// Returns the usual symbol of the quantity, such as `E_IR`.
    #[must_use]
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::NearInfraredIrradiance => "E_IR",
            Self::NearInfraredDose => "H_IR",
            Self::SkinIrradiance => "E_skin",
            Self::SkinDose => "H_skin",
            Self::TotalIrradiance => "E",
            Self::TotalDose => "H",
        }
    }

    /// Returns the dimension that the written limit must have.
    #[must_use]
    pub const fn dimension(self) -> Dimension {
        if self.is_dose() {
            Dimension::RADIANT_EXPOSURE
        } else {
            Dimension::IRRADIANCE
        }
    }

    /// Returns whether the limit is on the sum over the stay (J/m²).
    #[must_use]
    pub const fn is_dose(self) -> bool {
        matches!(
            self,
            Self::NearInfraredDose | Self::SkinDose | Self::TotalDose
        )
    }

    /// Returns which irradiance of a position is judged.
    #[must_use]
    pub const fn exposure(self) -> Exposure {
        match self {
            Self::NearInfraredIrradiance | Self::NearInfraredDose => Exposure::NearInfrared,
            Self::SkinIrradiance | Self::SkinDose => Exposure::Skin,
            Self::TotalIrradiance | Self::TotalDose => Exposure::Total,
        }
    }

    /// Returns the envelope on which this metric is usually judged.
    ///
    /// A limit's own is [`Limit::envelope`](super::Limit::envelope), by the organ it protects.
    #[must_use]
    pub const fn envelope(self) -> Envelope {
        match self.exposure() {
            Exposure::NearInfrared => Envelope::Eye,
            Exposure::Skin | Exposure::Total => Envelope::Skin,
        }
    }

    /// Returns what a file writes for quantity, band and weighting.
    #[must_use]
    pub const fn written(self) -> [&'static str; 3] {
        let quantity = if self.is_dose() { "dose" } else { "irradiance" };
        let band = match self.exposure() {
            Exposure::NearInfrared => "780 nm to 3000 nm",
            Exposure::Skin => "380 nm to 3000 nm",
            Exposure::Total => "all wavelengths",
        };
        [quantity, band, "none"]
    }

    /// Returns the metric that a file's quantity, band and weighting name.
    #[must_use]
    pub fn from_written(quantity: &str, band: &str, weighting: &str) -> Option<Self> {
        let asked = [quantity, band, weighting];
        Self::ALL.into_iter().find(|m| m.written() == asked)
    }
}

impl Organ {
    /// Every organ, in the order in which findings name them.
    pub const ALL: [Self; 4] = [Self::Eye, Self::Retina, Self::Skin, Self::HeatStrain];

    /// Returns the name that files and people use.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Eye => "eye (cornea and lens)",
            Self::Retina => "retina",
            Self::Skin => "skin",
            Self::HeatStrain => "heat strain",
        }
    }

    /// Returns the organ that `name` names.
    #[must_use]
    pub fn from_name(name: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|o| o.name() == name)
    }

    /// Returns the points around a position that are judged for this organ.
    #[must_use]
    pub const fn envelope(self) -> Envelope {
        match self {
            Self::Eye | Self::Retina => Envelope::Eye,
            Self::Skin | Self::HeatStrain => Envelope::Skin,
        }
    }
}
