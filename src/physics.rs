//! Thermal radiation between a hot surface and a person.
//!
//! SI `f64` in, SI `f64` out: metres, kelvin, W/m². Directions are
//! [`glam::DVec3`] with x east, y north, z up. Surfaces are diffuse emitters.
//! What is finite at the door gives finite numbers; faults are an [`Error`].

pub mod atmosphere;
pub mod cavity;
pub mod constant;
pub mod contact;
pub mod emergency;
mod error;
pub mod exposure;
mod hazard;
pub mod heat_strain;
pub mod opening;
pub mod planck;
pub mod pool;
pub mod radiant;
pub mod region;
pub mod repeated;
pub mod scene;
pub mod screen;
pub mod skin;
pub mod spectrum;
pub mod subtense;
pub mod surface;
pub mod view;
pub mod view_factor;
mod visibility;

pub use error::Error;
