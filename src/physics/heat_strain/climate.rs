use super::{Error, wbgt, wet_bulb};
use crate::physics::radiant::Globe;

/// Diameter in m and emissivity of the globe of the index.
///
/// # Source
///
/// ISO 7243: 150 mm, black; the emissivity of 0.95 as in ISO 7726, both read in
/// the open library pythermalcomfort 4.8.1.
const STANDARD_GLOBE: (f64, f64) = (0.15, 0.95);

/// The air and the radiation around a person.
///
/// Radiation counts by the mean radiant temperature: hot sources enter by that
/// of a sphere for globe and wick
/// ([`mean_temperature_of_sphere`](crate::physics::radiant::mean_temperature_of_sphere))
/// and by that of a person for the strain.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Climate {
    /// Air temperature, K.
    pub air_temperature: f64,
    /// Mean radiant temperature, K.
    pub mean_radiant: f64,
    /// Pressure of water vapour, Pa.
    pub vapour_pressure: f64,
    /// Speed of the air, m/s.
    pub air_speed: f64,
}

impl Climate {
    /// Returns the temperature of a standard globe, K.
    ///
    /// # Accuracy
    ///
    /// As [`Globe::reading`].
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the climate is none that can be.
    ///
    /// # Source
    ///
    /// As [`Globe`].
    pub fn globe(&self) -> Result<f64, Error> {
        let (diameter, emissivity) = STANDARD_GLOBE;
        let air = super::air(self.air_temperature)?;
        let radiant = super::surroundings("mean radiant temperature", self.mean_radiant)?;
        Globe::new(diameter, emissivity, air, self.air_speed)?.reading(radiant)
    }

    /// Returns the natural wet bulb temperature, K, by the warmer of two heat
    /// balances.
    ///
    /// # Accuracy
    ///
    /// As [`wet_bulb::natural`].
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the climate is none that can be, or the vapour
    /// is more than saturated air holds.
    ///
    /// # Source
    ///
    /// As [`wet_bulb::warmest`].
    pub fn natural_wet_bulb(&self) -> Result<f64, Error> {
        wet_bulb::warmest(
            self.air_temperature,
            self.mean_radiant,
            self.vapour_pressure,
            self.air_speed,
        )
    }

    /// Returns the wet bulb globe temperature by calculation, K, where the sun
    /// does not reach.
    ///
    /// # Accuracy
    ///
    /// Within about a kelvin of a measured one away from strong radiation; near
    /// a furnace it screens, and a measurement decides.
    ///
    /// # Errors
    ///
    /// As [`Climate::globe`] and [`Climate::natural_wet_bulb`].
    ///
    /// # Source
    ///
    /// As [`wbgt::indoors`], with the two temperatures worked out.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::heat_strain::Climate;
    /// let still = Climate {
    ///     air_temperature: 303.15,
    ///     mean_radiant: 303.15,
    ///     vapour_pressure: 2000.0,
    ///     air_speed: 0.3,
    /// };
    /// let hot = Climate { mean_radiant: 343.15, ..still };
    /// assert!(hot.wbgt().unwrap() > still.wbgt().unwrap() + 8.0);
    /// ```
    pub fn wbgt(&self) -> Result<f64, Error> {
        wbgt::indoors(self.natural_wet_bulb()?, self.globe()?)
    }

    /// Returns the wet bulb globe temperature by calculation in the sun, K; the
    /// sun has to be in the mean radiant temperature.
    ///
    /// # Accuracy
    ///
    /// As [`Climate::wbgt`].
    ///
    /// # Errors
    ///
    /// As [`Climate::wbgt`].
    ///
    /// # Source
    ///
    /// As [`wbgt::in_sun`].
    pub fn wbgt_in_sun(&self) -> Result<f64, Error> {
        wbgt::in_sun(
            self.natural_wet_bulb()?,
            self.globe()?,
            self.air_temperature,
        )
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn damp_even_air_has_its_own_temperature_throughout() {
        let climate = Climate {
            air_temperature: 303.15,
            mean_radiant: 303.15,
            vapour_pressure: super::super::humidity::saturation(303.15).expect("in range"),
            air_speed: 0.5,
        };
        for found in [
            climate.globe(),
            climate.natural_wet_bulb(),
            climate.wbgt(),
            climate.wbgt_in_sun(),
        ] {
            let found = found.expect("fair");
            assert!((found - 303.15).abs() < 1e-6, "{found} K");
        }
    }

    #[test]
    fn a_climate_that_cannot_be_is_refused() {
        let fair = Climate {
            air_temperature: 303.15,
            mean_radiant: 303.15,
            vapour_pressure: 2000.0,
            air_speed: 0.5,
        };
        for odd in [
            Climate {
                air_temperature: f64::NAN,
                ..fair
            },
            Climate {
                mean_radiant: -1.0,
                ..fair
            },
            Climate {
                vapour_pressure: 5000.0,
                ..fair
            },
            Climate {
                air_speed: f64::INFINITY,
                ..fair
            },
        ] {
            assert!(odd.wbgt().is_err(), "{odd:?}");
        }
    }
}
