//! Dimensions, quantities, units, literals, and the one place where numbers
//! become text. Values are `f64` in coherent SI units; a plane angle is a base
//! dimension of its own, so that a heading is not a plain number and a
//! radiance is not an irradiance. Names nothing else of this crate.

pub mod format;

mod dimension;
mod error;
mod literal;
mod quantity;
mod symbol;
mod unit;

pub use dimension::Dimension;
pub use error::Error;
pub use literal::{Literal, LiteralError, LiteralFault};
pub use quantity::{Quantity, Sense};
pub use unit::Unit;
