//! The wet bulb globe temperature and what clothing adds to it.
//!
//! Temperatures in kelvin; additions for clothing are differences in kelvin.

use super::{Error, air, within};

/// Returns the wet bulb globe temperature where the sun does not reach, K.
///
/// `natural_wet_bulb` and `globe` temperatures in kelvin: 0.7 of the one and
/// 0.3 of the other. Indoors, and near furnaces.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the wet bulb lies outside 200 K to 373.15 K or the
/// globe outside 200 K to 3000 K.
///
/// # Source
///
/// ISO 7243:2017, clause 6; read in an open library and in Parsons, *Industrial
/// Health* 44:368–379 (2006). Checked in `tests/published/heat_strain_rows.rs`.
///
/// # Examples
///
/// ```
/// use farglow::physics::heat_strain::wbgt;
/// let found = wbgt::indoors(298.15, 305.15).unwrap() - 273.15;
/// assert!((found - 27.1).abs() < 1e-9);
/// ```
pub fn indoors(natural_wet_bulb: f64, globe: f64) -> Result<f64, Error> {
    let (wet, globe) = readings(natural_wet_bulb, globe)?;
    Ok(0.7 * wet + 0.3 * globe)
}

/// Returns the wet bulb globe temperature in the sun, K: 0.7, 0.2 and 0.1 of
/// natural wet bulb, globe and air.
///
/// Temperatures in kelvin.
///
/// # Errors
///
/// As [`indoors`], and if the air lies outside 200 K to 370 K.
///
/// # Source
///
/// As [`indoors`].
pub fn in_sun(natural_wet_bulb: f64, globe: f64, air_temperature: f64) -> Result<f64, Error> {
    let (wet, globe) = readings(natural_wet_bulb, globe)?;
    Ok(0.7 * wet + 0.2 * globe + 0.1 * air(air_temperature)?)
}

fn readings(wet: f64, globe: f64) -> Result<(f64, f64), Error> {
    Ok((
        within(
            "natural wet bulb temperature",
            wet,
            200.0,
            373.15,
            "from 200 K to 373.15 K",
        )?,
        super::surroundings("globe temperature", globe)?,
    ))
}

/// Returns the mean over the heights of head, abdomen and ankles where heat is
/// uneven, the abdomen counted twice, K.
///
/// # Errors
///
/// [`Error::OutOfRange`] if one lies outside 200 K to 3000 K.
///
/// # Source
///
/// ISO 7243, heterogeneous surroundings; from memory.
pub fn over_heights(head: f64, abdomen: f64, ankles: f64) -> Result<f64, Error> {
    let heat = |value| super::surroundings("wet bulb globe temperature", value);
    Ok((heat(head)? + 2.0 * heat(abdomen)? + heat(ankles)?) / 4.0)
}

/// A stretch of work under one heat and at one rate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch {
    /// How long it lasts, s.
    pub duration: f64,
    /// Wet bulb globe temperature, clothing counted, K.
    pub wbgt: f64,
    /// Metabolic rate, W.
    pub metabolic_rate: f64,
}

/// Returns the means over time of the wet bulb globe temperature in kelvin and
/// of the metabolic rate in watts.
///
/// The standards take them over an hour; how long the stretches are together is
/// the caller's business.
///
/// # Errors
///
/// [`Error::OutOfRange`] if there is no stretch, no time, or a number out of
/// range.
///
/// # Source
///
/// ISO 7243:2017 and NIOSH 2016-106, section 8: Σ(x·t)/Σt; read in open code
/// that cites it.
pub fn over_time(stretches: &[Stretch]) -> Result<(f64, f64), Error> {
    let (mut time, mut heat, mut work) = (0.0, 0.0, 0.0);
    for stretch in stretches {
        let duration = within(
            "duration of a stretch",
            stretch.duration,
            0.0,
            1e7,
            "from 0 s to 10⁷ s",
        )?;
        time += duration;
        heat += duration * super::surroundings("wet bulb globe temperature", stretch.wbgt)?;
        work += duration * super::threshold::watts(stretch.metabolic_rate)?;
    }
    let time = within(
        "time of all stretches",
        time,
        1e-6,
        1e12,
        "longer than nothing",
    )?;
    Ok((heat / time, work / time))
}

/// Clothing worn at work, by what it adds to the wet bulb globe temperature.
///
/// # Source
///
/// ISO 7243:2017, annex on clothing, and ACGIH: 0.5, 1, 3 and 11 K read in a
/// maker's guide; apron and hood from memory.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Clothing {
    /// Ordinary work clothes, or a coverall of woven cloth over underwear: 0 K.
    WorkClothes,
    /// Coverall of spunbond and meltblown layers: 0.5 K.
    SmsCoverall,
    /// Coverall of polyolefin: 1 K.
    PolyolefinCoverall,
    /// Two layers of woven clothing: 3 K.
    DoubleLayer,
    /// Apron with long sleeves, impermeable, over cloth coverall: 4 K.
    ApronOverCoverall,
    /// Coverall that no vapour passes: 11 K.
    VapourBarrier,
    /// Full suit with an aluminised surface: not in the table; taken as a
    /// vapour barrier, 11 K (common practice, no source). It does not make the
    /// wearer cooler.
    AluminisedSuit,
}

impl Clothing {
    /// All kinds.
    pub const ALL: [Clothing; 7] = [
        Clothing::WorkClothes,
        Clothing::SmsCoverall,
        Clothing::PolyolefinCoverall,
        Clothing::DoubleLayer,
        Clothing::ApronOverCoverall,
        Clothing::VapourBarrier,
        Clothing::AluminisedSuit,
    ];

    /// Returns what the clothing adds, K; a hood adds one more.
    #[must_use]
    pub const fn addition(self, hood: bool) -> f64 {
        let worn = match self {
            Clothing::WorkClothes => 0.0,
            Clothing::SmsCoverall => 0.5,
            Clothing::PolyolefinCoverall => 1.0,
            Clothing::DoubleLayer => 3.0,
            Clothing::ApronOverCoverall => 4.0,
            Clothing::VapourBarrier | Clothing::AluminisedSuit => 11.0,
        };
        if hood { worn + 1.0 } else { worn }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn even_surroundings_have_their_own_temperature() {
        for t in [283.15, 303.15] {
            for found in [indoors(t, t), in_sun(t, t, t), over_heights(t, t, t)] {
                let found = found.expect("fair");
                assert!((found - t).abs() < 1e-9, "{found} K against {t} K");
            }
        }
    }

    #[test]
    fn means_over_time_weigh_by_time() {
        let (heat, work) = over_time(&[
            Stretch {
                duration: 1800.0,
                wbgt: 300.0,
                metabolic_rate: 415.0,
            },
            Stretch {
                duration: 1800.0,
                wbgt: 296.0,
                metabolic_rate: 115.0,
            },
        ])
        .expect("fair");
        assert!(
            (heat - 298.0).abs() < 1e-9 && (work - 265.0).abs() < 1e-9,
            "{heat} {work}"
        );
        assert!(over_time(&[]).is_err());
    }

    #[test]
    fn clothing_never_cools_and_a_hood_adds_one() {
        for clothing in Clothing::ALL {
            let (plain, hooded) = (clothing.addition(false), clothing.addition(true));
            assert!(
                plain >= 0.0 && (hooded - plain - 1.0).abs() < 1e-12,
                "{plain} {hooded}"
            );
        }
    }

    #[test]
    fn nonsense_is_refused() {
        assert!(indoors(f64::NAN, 300.0).is_err() && indoors(400.0, 300.0).is_err());
        assert!(in_sun(300.0, 300.0, 500.0).is_err());
    }
}
