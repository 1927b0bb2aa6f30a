//! What the moist air of a shop takes from radiation on its way.
//!
//! Pascal, kelvin, metres. The formulas are for the total of sources near
//! 1500 K, whose radiation is long-waved enough to be absorbed: apply them to
//! the irradiance over all wavelengths, never to a band below 3000 nm, which
//! air passes more freely, and know that a hotter source is dimmed less.

use super::Error;

/// What is left of the radiation after its way through air.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Transmitted {
    /// The transmittance, in (0, 1].
    pub transmittance: f64,
    /// Whether the formula was asked within its range. Below the range nothing
    /// is taken off; beyond it no more than at its end: both let through at
    /// least what the formula would.
    pub in_range: bool,
}

impl Transmitted {
    /// Nothing taken off, as the formula is not asked within its range.
    const ALL: Self = Self {
        transmittance: 1.0,
        in_range: false,
    };
}

/// Returns the pressure of saturated water vapour over water, Pa.
///
/// `temperature` in kelvin.
///
/// # Accuracy
///
/// Within 0.1 % of CoolProp 8.0 from 0 °C to 60 °C, 0.5 % up to 100 °C; checked
/// in this file. Below 0 °C it is that over water, above that over ice.
///
/// # Errors
///
/// [`Error::OutOfRange`] outside 193.15 K to 373.15 K.
///
/// # Source
///
/// Buck (1981), *J. Appl. Meteorol.* 20, 1527, with the coefficients of 1996:
/// 611.21 exp((18.678 − t/234.5) t/(257.14 + t)), from memory.
pub fn saturation_pressure(temperature: f64) -> Result<f64, Error> {
    if !(193.15..=373.15).contains(&temperature) {
        return Err(Error::OutOfRange {
            parameter: "temperature of the air",
            range: "from 193.15 K to 373.15 K",
            value: temperature,
        });
    }
    let t = temperature - super::constant::ZERO_CELSIUS;
    Ok(611.21 * ((18.678 - t / 234.5) * t / (257.14 + t)).exp())
}

/// Returns the pressure of the water vapour in air, Pa.
///
/// `humidity` is the relative humidity in `0..=1`, `temperature` in kelvin.
///
/// # Errors
///
/// [`Error::OutOfRange`] for the humidity, and as [`saturation_pressure`].
pub fn vapour_pressure(humidity: f64, temperature: f64) -> Result<f64, Error> {
    Ok(checked_humidity(humidity)? * saturation_pressure(temperature)?)
}

/// Returns the transmittance by the power law in vapour pressure times path.
///
/// `vapour_pressure` in Pa, `path` in metres. In a shop the range begins at
/// about 8 m; on shorter ways nothing is taken off.
///
/// # Accuracy
///
/// The formula's own is not known to us; against [`wayne`] within 5 % for 10 m to
/// 80 m of ordinary air.
///
/// # Errors
///
/// [`Error::OutOfRange`] unless the pressure is from 0 Pa to 10⁵ Pa and the path
/// from 0 m to 10⁹ m.
///
/// # Source
///
/// τ = 2.02 (p_w x)^−0.09 for 10⁴ < p_w x < 10⁵ Pa·m, from the literature on
/// fire hazards, from memory; checked in `tests/published/shop_air.rs`.
///
/// # Examples
///
/// ```
/// let found = farglow::physics::atmosphere::power_law(1169.66, 10.0)?;
/// assert!(found.in_range && (found.transmittance - 0.8694).abs() < 1e-4);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn power_law(vapour_pressure: f64, path: f64) -> Result<Transmitted, Error> {
    if !(0.0..=1e5).contains(&vapour_pressure) {
        return Err(Error::OutOfRange {
            parameter: "vapour pressure",
            range: "from 0 Pa to 10⁵ Pa",
            value: vapour_pressure,
        });
    }
    let amount = vapour_pressure * super::error::offset("path", path)?;
    if amount < 1e4 {
        return Ok(Transmitted::ALL);
    }
    Ok(Transmitted {
        transmittance: 2.02 * amount.min(1e5).powf(-0.09),
        in_range: amount <= 1e5,
    })
}

/// The shortest and the longest path for which Wayne's formula is taken, m.
const WAYNE_PATHS: [f64; 2] = [10.0, 200.0];

/// The least transmittance that is believed of any formula up to 200 m.
///
/// # Source
///
/// Fuss and Hamins (2002), *Fire Safety J.* 37, abstract (read): a narrow-band
/// model takes off up to 42 % for sources of 1000 °C to 1600 °C, 10 m to 200 m of
/// air of 19 °C to 35 °C and a humidity of 0.25 to 1. Wayne's formula takes off
/// 46.5 % at the far corner of that range, which is too much.
const LEAST: f64 = 0.58;

/// Where Wayne's polynomial in lg X is greatest: less vapour than this would
/// turn it back.
const WAYNE_TOP: f64 = -0.011_71 / (2.0 * 0.023_68);

/// Returns the transmittance by Wayne's formula, for water vapour and carbon
/// dioxide.
///
/// `humidity` is the relative humidity in `0..=1`, `temperature` that of the air
/// in kelvin, `path` in metres.
///
/// # Accuracy
///
/// The formula's own is not known to us. It is said to begin at 10 m (from
/// memory); the ranges of temperature (253 K to 323 K) and to 200 m are ours.
/// Where it would let through less than a narrow-band model ever does, 0.58, that
/// is taken instead, as out of its range.
///
/// # Errors
///
/// [`Error::OutOfRange`] for an impossible humidity, temperature or path.
///
/// # Source
///
/// Wayne (1991), *J. Loss Prev. Process Ind.* 4, 86: τ = 1.006 − 0.01171 lg X −
/// 0.02368 lg² X − 0.03188 lg Y + 0.001164 lg² Y, X = φ x p_s
/// 288.651/T with p_s in mmHg, Y = 273 x/T; from memory. Checked in
/// `tests/published/shop_air.rs`.
pub fn wayne(humidity: f64, temperature: f64, path: f64) -> Result<Transmitted, Error> {
    let humidity = checked_humidity(humidity)?;
    let saturated = saturation_pressure(temperature)?;
    let path = super::error::offset("path", path)?;
    let [shortest, longest] = WAYNE_PATHS;
    if path < shortest || !(253.0..=323.0).contains(&temperature) {
        return Ok(Transmitted::ALL);
    }
    let taken = path.min(longest);
    let vapour = humidity * taken * (saturated / MERCURY) * 288.651 / temperature;
    let x = vapour.log10().max(WAYNE_TOP);
    let y = (273.0 * taken / temperature).log10();
    let found = 1.006 - 0.011_71 * x - 0.023_68 * x * x - 0.031_88 * y + 0.001_164 * y * y;
    Ok(Transmitted {
        transmittance: found.clamp(LEAST, 1.0),
        in_range: path <= longest && found >= LEAST,
    })
}

/// One millimetre of mercury, Pa.
const MERCURY: f64 = 133.322_387_415;

/// Returns `value` if it is a relative humidity.
fn checked_humidity(value: f64) -> Result<f64, Error> {
    if (0.0..=1.0).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter: "relative humidity",
            range: "from 0 to 1",
            value,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Source: computed with CoolProp 8.0 (IAPWS-95), t in °C and p in Pa.
    #[test]
    fn saturated_vapour_has_the_pressure_of_a_library() {
        for (t, expected, tolerance) in [
            (0.01, 611.655, 1e-3),
            (5.0, 872.575, 1e-3),
            (10.0, 1228.199, 1e-3),
            (20.0, 2339.318, 1e-3),
            (30.0, 4246.971, 1e-3),
            (40.0, 7384.938, 1e-3),
            (50.0, 12_351.946, 1e-3),
            (60.0, 19_946.434, 1e-3),
            (80.0, 47_414.474, 5e-3),
            (100.0, 101_417.997, 5e-3),
        ] {
            let found = saturation_pressure(t + 273.15).expect("within range");
            assert!(
                (found / expected - 1.0).abs() < tolerance,
                "{t} °C: {found} Pa against {expected} Pa, off by {:.2e}",
                found / expected - 1.0
            );
        }
    }

    #[test]
    fn air_never_adds_and_more_of_it_never_passes_more() {
        for temperature in [250.0, 260.0, 293.15, 315.0, 323.0, 340.0] {
            for humidity in [0.0, 1e-4, 0.01, 0.3, 0.5, 1.0] {
                let pressure = vapour_pressure(humidity, temperature).expect("air");
                let mut before = [1.0, 1.0];
                for step in 0..600 {
                    let path = 0.01 * 1.03_f64.powi(step);
                    let found = [
                        power_law(pressure, path).expect("a path"),
                        wayne(humidity, temperature, path).expect("a path"),
                    ];
                    for (found, before) in found.iter().zip(&mut before) {
                        assert!(
                            found.transmittance <= *before && found.transmittance > 0.0,
                            "{temperature} K, {humidity}, {path} m: {found:?} after {before}"
                        );
                        *before = found.transmittance;
                    }
                }
            }
        }
    }

    #[test]
    fn ways_outside_the_range_are_told() {
        let near = power_law(1170.0, 5.0).expect("a path");
        assert_eq!(near, Transmitted::ALL);
        let far = power_law(1170.0, 200.0).expect("a path");
        assert!(
            !far.in_range && (far.transmittance - 2.02 * 1e5_f64.powf(-0.09)).abs() < 1e-15,
            "{far:?}"
        );
        let near = wayne(0.5, 293.15, 9.99).expect("a path");
        assert_eq!(near, Transmitted::ALL);
        assert!(wayne(0.5, 293.15, 10.0).expect("a path").in_range);
        let hot = wayne(0.5, 330.0, 20.0).expect("a path");
        assert_eq!(hot, Transmitted::ALL);
    }

    #[test]
    fn impossible_air_is_refused_by_name() {
        let text = |error: Error| error.to_string();
        for (found, expected) in [
            (
                text(power_law(-1.0, 1.0).expect_err("refused")),
                "vapour pressure must be from 0 Pa to 10⁵ Pa, found -1",
            ),
            (
                text(power_law(1.0, f64::NAN).expect_err("refused")),
                "path must be from 0 m to 10⁹ m, found NaN",
            ),
            (
                text(wayne(1.5, 300.0, 1.0).expect_err("refused")),
                "relative humidity must be from 0 to 1, found 1.5",
            ),
            (
                text(wayne(0.5, 400.0, 1.0).expect_err("refused")),
                "temperature of the air must be from 193.15 K to 373.15 K, found 400",
            ),
        ] {
            assert_eq!(found, expected);
        }
    }
}
