//! The natural wet bulb: a wet wick in the air as it moves by itself, warmed by
//! the radiation around it.
//!
//! Temperatures in kelvin, pressures in pascals, speeds in m/s.

use super::humidity::{self, saturation};
use super::{Error, air, air_speed, surroundings, within};
use crate::physics::constant::STEFAN_BOLTZMANN;

/// Diameter of the wick, m.
const DIAMETER: f64 = 0.007;

/// Emissivity of the wet wick.
const EMISSIVITY: f64 = 0.95;

/// The least speed of air that the correlation is used at, m/s.
pub const LEAST_SPEED: f64 = 0.13;

/// Molar masses of water and air, kg/kmol.
const WATER: f64 = 18.015;
const AIR: f64 = 28.97;

/// Specific heat of air, J/(kg·K).
const SPECIFIC_HEAT: f64 = 1003.5;

/// The gas constant of air, J/(kg·K).
const AIR_CONSTANT: f64 = 8314.34 / AIR;

/// Viscosity of air, Pa·s, by Chapman and Enskog.
fn viscosity(temperature: f64) -> f64 {
    let omega = (temperature / 97.0 - 2.9) / 0.4 * -0.034 + 1.048;
    2.6693e-6 * (AIR * temperature).sqrt() / (3.617 * 3.617 * omega)
}

/// Diffusivity of water vapour in air, m²/s, by Slattery and Bird.
fn diffusivity(temperature: f64, pressure: f64) -> f64 {
    let critical = (36.4_f64 * 218.0).cbrt();
    let roots = (132.0_f64 * 647.3).powf(5.0 / 12.0);
    let mix = (1.0 / AIR + 1.0 / WATER).sqrt();
    3.64e-4 * (temperature / (132.0_f64 * 647.3).sqrt()).powf(2.334) * critical * roots * mix
        / (pressure / humidity::STANDARD_PRESSURE)
        * 1e-4
}

/// Heat of evaporation of water, J/kg.
fn evaporation(temperature: f64) -> f64 {
    (313.15 - temperature) / 30.0 * -71_100.0 + 2.4073e6
}

/// Air that a wick hangs in.
struct Stream {
    air: f64,
    vapour: f64,
    pressure: f64,
    speed: f64,
}

impl Stream {
    /// Coefficient of convection to the wick, W/(m²·K), and the ratio of
    /// diffusion that evaporation takes.
    fn exchange(&self, wick: f64) -> (f64, f64) {
        let film = f64::midpoint(self.air, wick);
        let density = self.pressure / (AIR_CONSTANT * film);
        let viscosity = viscosity(film);
        let conductivity = (SPECIFIC_HEAT + 1.25 * AIR_CONSTANT) * viscosity;
        let prandtl = SPECIFIC_HEAT * viscosity / conductivity;
        let schmidt = viscosity / (density * diffusivity(film, self.pressure));
        let reynolds = self.speed * density * DIAMETER / viscosity;
        let nusselt = 0.281 * reynolds.powf(0.6) * prandtl.powf(0.44);
        (
            nusselt * conductivity / DIAMETER,
            (prandtl / schmidt).powf(0.56),
        )
    }

    /// Heat that the wick gains, W/m²: falls as the wick warms.
    fn gain(&self, wick: f64, radiant: f64) -> Result<f64, Error> {
        let (convection, ratio) = self.exchange(wick);
        let wet = saturation(wick)?;
        let drying = evaporation(f64::midpoint(self.air, wick)) / SPECIFIC_HEAT
            * (WATER / AIR)
            * ratio
            * (wet - self.vapour)
            / (self.pressure - wet).max(1.0);
        Ok(
            EMISSIVITY * STEFAN_BOLTZMANN * (radiant.powi(4) - wick.powi(4))
                + convection * (self.air - wick - drying),
        )
    }
}

/// Returns the natural wet bulb temperature, K.
///
/// `air_temperature` and `mean_radiant` temperature in kelvin, `vapour` is the
/// pressure of water vapour in Pa, `speed` that of the air in m/s; below
/// 0.13 m/s the correlation is used at 0.13 m/s. Sea level.
///
/// # Accuracy
///
/// 1e-6 K as the root of the balance. The balance itself is within about a
/// kelvin of measured wet bulbs and of other formulas away from strong
/// radiation (`tests/published/natural_wet_bulb.rs`); near a furnace measure.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a number is out of range, or the vapour pressure is
/// above that of saturated air.
///
/// # Source
///
/// Heat balance of a wick 7 mm thick, emissivity 0.95, after Liljegren,
/// Carhart, Lawday, Tschopp and Sharp, *Journal of Occupational and
/// Environmental Hygiene* 5:645–655 (2008): convection to a cylinder by
/// Bedingfield and Drew, evaporation by the analogy of Chilton and Colburn;
/// from memory, and read in open code. Radiation: uniform surroundings of the
/// mean radiant temperature.
///
/// # Examples
///
/// ```
/// use farglow::physics::heat_strain::{humidity, wet_bulb};
/// let vapour = humidity::vapour_pressure(303.15, 0.5).unwrap();
/// let found = wet_bulb::natural(303.15, 303.15, vapour, 0.3).unwrap();
/// assert!(found > 295.0 && found < 297.0);
/// ```
pub fn natural(
    air_temperature: f64,
    mean_radiant: f64,
    vapour: f64,
    speed: f64,
) -> Result<f64, Error> {
    let stream = stream(air_temperature, vapour, speed)?;
    let radiant = surroundings("mean radiant temperature", mean_radiant)?;
    root(|wick| stream.gain(wick, radiant))
}

/// Returns the natural wet bulb temperature by the older heat balance, K.
///
/// Arguments as [`natural`]. With strong radiation it lies some tenths of a
/// kelvin above [`natural`], without it below.
///
/// # Accuracy
///
/// As [`natural`].
///
/// # Errors
///
/// As [`natural`].
///
/// # Source
///
/// Malchaire, *Annals of Occupational Hygiene* 19:251–258 (1976), heat balance:
/// 4.18·v^0.444·(t_a − t_nw) + 10⁻⁸·(T_r⁴ − T_nw⁴) − 77.1·v^0.421·(p_sat(t_nw) −
/// p_a) = 0 in kPa; from memory, confirmed within half a kelvin by the others in
/// `tests/published/natural_wet_bulb.rs`.
pub fn after_malchaire(
    air_temperature: f64,
    mean_radiant: f64,
    vapour: f64,
    speed: f64,
) -> Result<f64, Error> {
    let stream = stream(air_temperature, vapour, speed)?;
    let radiant = surroundings("mean radiant temperature", mean_radiant)?;
    let (dry, wet) = (
        4.18 * stream.speed.powf(0.444),
        77.1 * stream.speed.powf(0.421),
    );
    root(|wick| {
        Ok(
            dry * (stream.air - wick) + 1e-8 * (radiant.powi(4) - wick.powi(4))
                - wet * (saturation(wick)? - stream.vapour) / 1000.0,
        )
    })
}

/// Returns the warmer of the natural wet bulbs by both heat balances, K: the
/// safe side, and what an index by calculation should take.
///
/// Arguments, accuracy and errors as [`natural`].
///
/// # Errors
///
/// As [`natural`].
///
/// # Source
///
/// The larger of [`natural`] and [`after_malchaire`].
pub fn warmest(
    air_temperature: f64,
    mean_radiant: f64,
    vapour: f64,
    speed: f64,
) -> Result<f64, Error> {
    let new = natural(air_temperature, mean_radiant, vapour, speed)?;
    let old = after_malchaire(air_temperature, mean_radiant, vapour, speed)?;
    Ok(new.max(old))
}

/// The temperature at which a wick gains nothing.
fn root(gain: impl Fn(f64) -> Result<f64, Error>) -> Result<f64, Error> {
    // A wet wick never boils: below 100 °C its drying outgrows all radiation.
    let (mut low, mut high) = (190.0_f64, 373.0_f64);
    for _ in 0..60 {
        let middle = f64::midpoint(low, high);
        if gain(middle)? > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    Ok(f64::midpoint(low, high))
}

/// The air that a wick hangs in, checked.
fn stream(air_temperature: f64, vapour: f64, speed: f64) -> Result<Stream, Error> {
    let air = air(air_temperature)?;
    let vapour = within(
        "water vapour pressure",
        vapour,
        0.0,
        saturation(air)? * (1.0 + 1e-9),
        "from 0 Pa to that of saturated air",
    )?;
    Ok(Stream {
        air,
        vapour,
        pressure: humidity::STANDARD_PRESSURE,
        speed: air_speed(speed)?.max(LEAST_SPEED),
    })
}

/// Returns the psychrometric wet bulb temperature, K: that of a wick in fast
/// air, without radiation.
///
/// `air_temperature` in kelvin, `vapour` pressure in Pa. Sea level.
///
/// # Accuracy
///
/// 1e-6 K as the root of the psychrometer's equation.
///
/// # Errors
///
/// As [`natural`].
///
/// # Source
///
/// Psychrometer equation p = p_sat(t_w) − A·P·(t − t_w) with A = 6.62e-4 1/K of
/// an aspirated psychrometer; from memory.
pub fn psychrometric(air_temperature: f64, vapour: f64) -> Result<f64, Error> {
    let stream = stream(air_temperature, vapour, 0.0)?;
    let constant = 6.62e-4 * humidity::STANDARD_PRESSURE;
    let (mut low, mut high) = (175.0, stream.air);
    for _ in 0..60 {
        let middle = f64::midpoint(low, high);
        if saturation(middle)? - constant * (stream.air - middle) < stream.vapour {
            low = middle;
        } else {
            high = middle;
        }
    }
    Ok(f64::midpoint(low, high))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn saturated_air_and_even_surroundings_leave_the_wick_at_air_temperature() {
        for t in [283.15, 303.15, 318.15] {
            let vapour = saturation(t).expect("in range");
            for speed in [0.0, 0.3, 3.0] {
                let found = natural(t, t, vapour, speed).expect("fair");
                assert!((found - t).abs() < 1e-6, "{found} K against {t} K");
            }
        }
    }

    #[test]
    fn wick_lies_above_the_psychrometer_and_below_the_air_without_sources() {
        for t in [288.15, 298.15, 308.15, 318.15] {
            for humidity in [0.1, 0.3, 0.6, 0.9] {
                let vapour = humidity::vapour_pressure(t, humidity).expect("fair");
                let (natural, forced) = (
                    natural(t, t, vapour, 0.3).expect("fair"),
                    psychrometric(t, vapour).expect("fair"),
                );
                assert!(
                    forced < natural && natural < t,
                    "{t} K, {humidity}: {forced} K, {natural} K"
                );
            }
        }
    }

    #[test]
    fn hotter_surroundings_and_damper_air_warm_the_wick() {
        let mut last = 0.0;
        for radiant in [280.0, 300.0, 330.0, 400.0, 600.0, 1500.0] {
            let found = natural(303.15, radiant, 1500.0, 0.3).expect("fair");
            assert!(found > last && found < 373.0, "{found} K after {last} K");
            last = found;
        }
        let mut last = 0.0;
        for vapour in [0.0, 500.0, 2000.0, 4000.0] {
            let found = natural(303.15, 303.15, vapour, 0.3).expect("fair");
            assert!(found > last, "{found} K after {last} K");
            last = found;
        }
    }

    #[test]
    fn nonsense_is_refused() {
        assert!(natural(303.15, 303.15, 9000.0, 0.3).is_err());
        assert!(natural(303.15, 303.15, -1.0, 0.3).is_err());
        assert!(natural(f64::NAN, 303.15, 100.0, 0.3).is_err());
        assert!(natural(303.15, f64::INFINITY, 100.0, 0.3).is_err());
        assert!(natural(303.15, 303.15, 100.0, f64::NAN).is_err());
    }
}
