//! Emissivities and process temperatures of the trade, each with its range, its
//! source and how it is known.
//!
//! A row is found by its id, which never changes. Fractions and kelvin; how a
//! row is known is carried along and never raised.

mod library;
mod row;

pub use library::Library;
pub use row::{Directions, HowKnown, Property, Row};
