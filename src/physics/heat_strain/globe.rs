//! The globe thermometer: its temperature, the mean radiant temperature around
//! it, and the irradiance that hot sources add.
//!
//! Near one strong source the mean radiant temperature of a globe is a mean over
//! all directions: it says nothing of the side that faces the source.

use std::f64::consts::PI;

use super::{Error, air, air_speed, surroundings, within};
use crate::physics::constant::STEFAN_BOLTZMANN;

/// A globe thermometer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Globe {
    diameter: f64,
    emissivity: f64,
}

impl Globe {
    /// The standard globe: 150 mm, emissivity 0.95.
    ///
    /// # Source
    ///
    /// ISO 7243 and ISO 7726; read in the open library pythermalcomfort 4.8.1.
    pub const STANDARD: Globe = Globe {
        diameter: 0.15,
        emissivity: 0.95,
    };

    /// Returns a globe of a diameter in metres and an emissivity.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the diameter lies outside 0.01 m to 1 m or the
    /// emissivity outside 0.1 to 1.
    pub fn new(diameter: f64, emissivity: f64) -> Result<Globe, Error> {
        Ok(Globe {
            diameter: within(
                "diameter of the globe",
                diameter,
                0.01,
                1.0,
                "from 0.01 m to 1 m",
            )?,
            emissivity: within(
                "emissivity of the globe",
                emissivity,
                0.1,
                1.0,
                "from 0.1 to 1",
            )?,
        })
    }

    /// The coefficient of convection, the larger of still and moved air,
    /// W/(m²·K).
    fn convection(self, globe: f64, air: f64, speed: f64) -> f64 {
        let still = 1.4 * ((globe - air).abs() / self.diameter).powf(0.25);
        let moved = 6.3 * speed.powf(0.6) / self.diameter.powf(0.4);
        still.max(moved)
    }

    /// The fourth power of the mean radiant temperature, K⁴.
    fn radiant(self, globe: f64, air: f64, speed: f64) -> f64 {
        globe.powi(4)
            + self.convection(globe, air, speed) * (globe - air)
                / (self.emissivity * STEFAN_BOLTZMANN)
    }

    /// Returns the mean radiant temperature around a globe, K.
    ///
    /// `globe` and `air` temperatures in kelvin, `speed` of the air in m/s.
    ///
    /// # Accuracy
    ///
    /// The relation is exact here; measured globes are within some kelvin of it.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if a number is out of range, or the globe is so
    /// much colder than the air that no surroundings could hold it there.
    ///
    /// # Source
    ///
    /// ISO 7726:1998, annex B: h = max(1.4·(|t_g − t_a|/D)^0.25, 6.3·v^0.6/D^0.4);
    /// read in the open library pythermalcomfort 4.8.1. Checked in
    /// `tests/published/heat_strain_rows.rs`.
    pub fn mean_radiant_temperature(self, globe: f64, air: f64, speed: f64) -> Result<f64, Error> {
        let globe = surroundings("globe temperature", globe)?;
        let air = super::air(air)?;
        let radiant = self.radiant(globe, air, air_speed(speed)?);
        if radiant <= 0.0 {
            return Err(Error::OutOfRange {
                parameter: "globe temperature",
                range: "no colder than surroundings at 0 K would make it in this air",
                value: globe,
            });
        }
        Ok(radiant.sqrt().sqrt())
    }

    /// Returns the temperature that a globe takes on, K.
    ///
    /// `mean_radiant` and `air` temperatures in kelvin, `speed` of the air in
    /// m/s. It is the inverse of [`Globe::mean_radiant_temperature`].
    ///
    /// # Accuracy
    ///
    /// 1e-9 K as the root of that relation.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if a number is out of range.
    ///
    /// # Source
    ///
    /// As [`Globe::mean_radiant_temperature`].
    pub fn temperature(self, mean_radiant: f64, air: f64, speed: f64) -> Result<f64, Error> {
        let mean_radiant = surroundings("mean radiant temperature", mean_radiant)?;
        let (air, speed) = (super::air(air)?, air_speed(speed)?);
        let wanted = mean_radiant.powi(4);
        // The balance rises with the globe's temperature, and the root lies
        // between the air and the surroundings.
        let (mut low, mut high) = (air.min(mean_radiant), air.max(mean_radiant));
        for _ in 0..80 {
            let middle = f64::midpoint(low, high);
            if middle <= low || middle >= high {
                break;
            }
            if self.radiant(middle, air, speed) < wanted {
                low = middle;
            } else {
                high = middle;
            }
        }
        Ok(f64::midpoint(low, high))
    }
}

/// Returns the mean radiant temperature at a point among hot sources, K: the
/// mean over all directions, as a globe feels it.
///
/// `background` is the radiant temperature of the rest of the surroundings, K.
/// `fluence` is the radiation that arrives from the sources from all sides,
/// ∫L dω, in W/m²: for one source that is small in the view it is the irradiance
/// of a surface that faces it, and for a large one more. `covered` is the solid
/// angle that the sources take of the view, sr; zero is the safe side.
///
/// # Accuracy
///
/// Exact for diffuse radiation from outside.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a number is out of range.
///
/// # Source
///
/// Definition of the mean radiant temperature, ISO 7726: a globe of unit
/// emissivity takes up fluence/4 per area of its surface.
///
/// # Examples
///
/// ```
/// let found = farglow::physics::heat_strain::globe::among_sources(298.15, 1000.0, 0.0).unwrap();
/// assert!(found > 330.0 && found < 335.0);
/// ```
pub fn among_sources(background: f64, fluence: f64, covered: f64) -> Result<f64, Error> {
    let background = surroundings("radiant temperature of the surroundings", background)?;
    let fluence = within(
        "radiation from hot sources",
        fluence,
        0.0,
        1e7,
        "from 0 W/m² to 10⁷ W/m²",
    )?;
    let covered = within(
        "solid angle of the hot sources",
        covered,
        0.0,
        4.0 * PI,
        "from 0 sr to 4π sr",
    )?;
    let fourth =
        background.powi(4) * (1.0 - covered / (4.0 * PI)) + fluence / (4.0 * STEFAN_BOLTZMANN);
    Ok(fourth.sqrt().sqrt())
}

/// Returns the temperature of a globe among hot sources, K.
///
/// `air_temperature` in kelvin, `speed` of the air in m/s, the rest as in
/// [`among_sources`]. The mean radiant temperature is held at 3000 K at most.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a number is out of range.
///
/// # Source
///
/// As [`among_sources`] and [`Globe::temperature`].
pub fn standard_among_sources(
    background: f64,
    fluence: f64,
    covered: f64,
    air_temperature: f64,
    speed: f64,
) -> Result<f64, Error> {
    let air_temperature = air(air_temperature)?;
    let radiant = among_sources(background, fluence, covered)?;
    Globe::STANDARD.temperature(radiant, air_temperature, speed)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn globe_and_surroundings_are_inverse() {
        for air in [270.0, 298.15, 320.0] {
            for speed in [0.0, 0.1, 0.5, 3.0] {
                for radiant in [250.0, 298.15, 330.0, 500.0, 900.0] {
                    let globe = Globe::STANDARD
                        .temperature(radiant, air, speed)
                        .expect("fair");
                    assert!(
                        globe >= air.min(radiant) - 1e-9 && globe <= air.max(radiant) + 1e-9,
                        "{globe} K between {air} K and {radiant} K"
                    );
                    let back = Globe::STANDARD
                        .mean_radiant_temperature(globe, air, speed)
                        .expect("fair");
                    assert!(
                        (back - radiant).abs() < 1e-7,
                        "{back} K against {radiant} K"
                    );
                }
            }
        }
    }

    #[test]
    fn short_form_of_the_standard_globe_is_the_general_one() {
        // ISO 7726, 150 mm: 2.5e8·v^0.6·(t_g − t_a), and 0.4e8 for still air; from memory.
        let globe = Globe::STANDARD;
        let (g, a, v) = (330.0, 300.0, 1.0);
        let found = globe.radiant(g, a, v) - g.powi(4);
        let short = 2.5e8 * v.powf(0.6) * (g - a);
        assert!(
            (found / short - 1.0).abs() < 0.02,
            "{found} against {short}"
        );
        let found = globe.radiant(g, a, 0.0) - g.powi(4);
        let short = 0.4e8 * (g - a).powf(1.25);
        assert!(
            (found / short - 1.0).abs() < 0.07,
            "{found} against {short}"
        );
    }

    #[test]
    fn black_surroundings_all_around_are_their_own_temperature() {
        // Sources that fill the view: fluence 4σT⁴ over 4π.
        let fluence = 4.0 * STEFAN_BOLTZMANN * 400.0_f64.powi(4);
        let found = among_sources(300.0, fluence, 4.0 * PI).expect("fair");
        assert!((found - 400.0).abs() < 1e-9, "{found} K");
        let found = among_sources(300.0, 0.0, 0.0).expect("fair");
        assert!((found - 300.0).abs() < 1e-9, "{found} K");
    }

    #[test]
    fn more_heat_never_cools_the_globe() {
        let mut last = 0.0;
        for step in 0..200_u32 {
            let fluence = f64::from(step) * 100.0;
            let found = standard_among_sources(300.0, fluence, 0.0, 303.0, 0.3).expect("fair");
            assert!(found >= last, "{found} K after {last} K at {fluence} W/m²");
            last = found;
        }
    }

    #[test]
    fn impossible_readings_are_refused() {
        let globe = Globe::STANDARD;
        assert!(globe.mean_radiant_temperature(250.0, 350.0, 20.0).is_err());
        assert!(
            globe
                .mean_radiant_temperature(f64::NAN, 300.0, 0.1)
                .is_err()
        );
        assert!(globe.temperature(300.0, 300.0, -0.1).is_err());
        assert!(Globe::new(0.0, 0.95).is_err() && Globe::new(0.1, 1.1).is_err());
        assert!(among_sources(300.0, -1.0, 0.0).is_err());
        assert!(among_sources(300.0, 1.0, 13.0).is_err());
    }
}
