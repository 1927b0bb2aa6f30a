//! Heat on bare skin: pain, blisters, thermal dose, and a layered model of burns.
//!
//! Irradiances in W/m², times in seconds, temperatures in kelvin. All of it is
//! evidence, not a limit: it tells where harm begins, on small areas of bare
//! skin of healthy adults; it never tells that a stay is safe.

pub mod blister;
pub mod burn;
pub mod dose;
pub mod pain;
pub mod tissue;

pub use burn::Injury;
pub use tissue::Tissue;

use super::error::Error;

/// The largest irradiance or flux that is accepted, in W/m²: more than any
/// surface below 10 000 K sends out.
pub(in crate::physics) const MOST_FLUX: f64 = 1e9;

/// The longest time that is accepted, in seconds: about thirty years.
pub(in crate::physics) const LONGEST_TIME: f64 = 1e9;

/// When an effect begins under a steady exposure, by a source that covers only
/// some times.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Onset {
    /// After this time, in seconds.
    After(f64),
    /// Sooner than this time, in seconds, before which the source is silent.
    Sooner(f64),
    /// Not within this time, in seconds, after which the source is silent; it
    /// does not tell that the effect never comes.
    Later(f64),
}

/// Returns an irradiance if it is one, zero included.
pub(in crate::physics) fn irradiance(parameter: &'static str, value: f64) -> Result<f64, Error> {
    within(parameter, value, 0.0, MOST_FLUX, "from 0 W/m² to 10⁹ W/m²")
}

/// Returns a time if it is one, zero included.
pub(in crate::physics) fn time(parameter: &'static str, value: f64) -> Result<f64, Error> {
    within(parameter, value, 0.0, LONGEST_TIME, "from 0 s to 10⁹ s")
}

/// Returns a number if it lies in a closed range.
pub(in crate::physics) fn within(
    parameter: &'static str,
    value: f64,
    least: f64,
    most: f64,
    range: &'static str,
) -> Result<f64, Error> {
    if (least..=most).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range,
            value,
        })
    }
}
