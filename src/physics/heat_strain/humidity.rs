//! Pressure of water vapour in air.
//!
//! Temperatures in kelvin, pressures in pascals, humidity as a share of 0..=1.

use super::{Error, within};

/// The standard pressure of air at sea level, Pa.
pub const STANDARD_PRESSURE: f64 = 101_325.0;

/// Returns the pressure of water vapour in saturated air over water, and over
/// ice below 273.15 K, Pa.
///
/// `temperature` in kelvin, 173.15 K to 473.15 K.
///
/// # Accuracy
///
/// Within 0.1 % of steam tables from 0 °C to 100 °C.
///
/// # Errors
///
/// [`Error::OutOfRange`] outside 173.15 K to 473.15 K.
///
/// # Source
///
/// Hyland and Wexler (1983) as in the ASHRAE Handbook of Fundamentals, chapter
/// on psychrometrics; read in the open library pythermalcomfort 4.8.1 and
/// checked against its results and steam tables in
/// `tests/published/heat_strain_library.rs` and in this file.
///
/// # Examples
///
/// ```
/// let found = farglow::physics::heat_strain::humidity::saturation(298.15).unwrap();
/// assert!((found - 3169.0).abs() < 2.0);
/// ```
pub fn saturation(temperature: f64) -> Result<f64, Error> {
    let t = within(
        "temperature of the air",
        temperature,
        173.15,
        473.15,
        "from 173.15 K to 473.15 K",
    )?;
    let logarithm = if t < 273.15 {
        -5_674.535_9 / t
            + 6.392_524_7
            + t * (-9.677_843e-3 + t * (6.221_570_1e-7 + t * (2.074_782_5e-9 + t * -9.484_024e-13)))
            + 4.163_501_9 * t.ln()
    } else {
        -5_800.220_6 / t
            + 1.391_499_3
            + t * (-4.864_023_9e-2 + t * (4.176_476_8e-5 + t * -1.445_209_3e-8))
            + 6.545_967_3 * t.ln()
    };
    Ok(logarithm.exp())
}

/// Returns the pressure of saturated vapour by the short formula of the heat
/// strain standards, Pa: 610.5·exp(17.27·t/(t + 237.3)), t in °C.
///
/// `temperature` in kelvin; not checked, meant for −40 °C to 60 °C.
///
/// # Accuracy
///
/// The formula itself is exact here; it is within 0.2 % of [`saturation`] from
/// 0 °C to 50 °C.
///
/// # Source
///
/// ISO 7933:2004 and 2023, vapour pressure at the skin; read in two open
/// renderings of the standard's own program.
#[must_use]
pub fn saturation_by_iso_7933(temperature: f64) -> f64 {
    let t = temperature - 273.15;
    610.5 * (17.27 * t / (t + 237.3)).exp()
}

/// Returns the pressure of water vapour in air of a relative humidity, Pa.
///
/// `temperature` in kelvin, `humidity` as a share, 0..=1.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the temperature lies outside 173.15 K to 473.15 K
/// or the humidity outside 0 to 1.
///
/// # Source
///
/// Definition of relative humidity, with [`saturation`].
pub fn vapour_pressure(temperature: f64, humidity: f64) -> Result<f64, Error> {
    let humidity = within("relative humidity", humidity, 0.0, 1.0, "from 0 % to 100 %")?;
    Ok(saturation(temperature)? * humidity)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn saturation_follows_the_steam_tables() {
        // Steam tables (IAPWS), from memory: temperature in °C, pressure in kPa.
        for (t, expected) in [
            (0.01, 0.611_66),
            (10.0, 1.2282),
            (20.0, 2.3393),
            (25.0, 3.1699),
            (30.0, 4.2470),
            (40.0, 7.3849),
            (50.0, 12.352),
            (100.0, 101.42),
        ] {
            let found = saturation(t + 273.15).expect("in range") / 1000.0;
            assert!(
                (found / expected - 1.0).abs() < 1e-3,
                "{t} °C: {found} against {expected} kPa"
            );
        }
    }

    #[test]
    fn short_formula_stays_close() {
        for t in [0.0, 10.0, 20.0, 30.0, 40.0, 50.0] {
            let (long, short) = (
                saturation(t + 273.15).expect("in range"),
                saturation_by_iso_7933(t + 273.15),
            );
            assert!(
                (short / long - 1.0).abs() < 2e-3,
                "{t} °C: {short} against {long} Pa"
            );
        }
    }

    #[test]
    fn ice_meets_water_at_freezing_and_nonsense_is_refused() {
        let (below, above) = (
            saturation(273.15_f64.next_down()).expect("in range"),
            saturation(273.15).expect("in range"),
        );
        assert!(
            (below / above - 1.0).abs() < 1e-3,
            "{below} against {above} Pa"
        );
        assert!(saturation(f64::NAN).is_err() && saturation(500.0).is_err());
        assert!(vapour_pressure(300.0, 1.01).is_err());
        assert_eq!(vapour_pressure(300.0, 0.0), Ok(0.0));
    }
}
