//! Screens between hot sources and people: what heats them, and what they send
//! on.
//!
//! Kelvin, metres, W/m². A screen takes the temperature at which it gives off
//! what it absorbs; nothing is led sideways in it, so that its hottest place is
//! as hot as it can be.

mod air;
mod convection;
mod plate;

pub use air::Air;
pub use convection::{Convection, Face, LEAST_SHARE};
pub use plate::{Plate, Walls};
