//! Heat strain of the whole body: humidity, wet bulb, indices, prediction.
//!
//! Temperatures in kelvin, pressures in pascals, speeds in m/s, metabolic rates
//! in W or, per area of body, W/m². A number outside the range of a method is
//! told as [`Outside`], with its reason, and never answered with a guess.

mod climate;
pub mod humidity;
pub mod predicted;
pub mod radiant_load;
pub mod threshold;
pub mod wbgt;
pub mod wet_bulb;

pub use climate::Climate;

use super::error::Error;
use super::skin::within;

/// Why a method does not assess a case that is physically possible.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
#[error("{parameter} is {value} {unit}, outside the range of the method, {range}")]
pub struct Outside {
    /// What lies outside, as a person would call it.
    pub parameter: &'static str,
    /// The range of the method, in words.
    pub range: &'static str,
    /// The value that was found, in `unit`.
    pub value: f64,
    /// The unit of `value`.
    pub unit: &'static str,
}

/// Returns a temperature of air or surroundings if it is one, K.
fn surroundings(parameter: &'static str, value: f64) -> Result<f64, Error> {
    within(parameter, value, 200.0, 3000.0, "from 200 K to 3000 K")
}

/// Returns a temperature of air if it is one, K.
fn air(value: f64) -> Result<f64, Error> {
    within(
        "air temperature",
        value,
        200.0,
        370.0,
        "from 200 K to 370 K",
    )
}

/// Returns a speed of air if it is one, m/s.
fn air_speed(value: f64) -> Result<f64, Error> {
    within("air speed", value, 0.0, 100.0, "from 0 m/s to 100 m/s")
}
