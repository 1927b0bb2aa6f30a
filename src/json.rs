//! JSON with the place of every value, and without duplicate keys.
//!
//! Texts, numbers and structure are read by serde_json; what is added here is
//! where each of them stands, so that a fault can be shown in its file. Writing
//! keeps the order of keys and always gives the same bytes.

mod error;
mod node;
mod place;
mod read;
mod write;

#[cfg(test)]
mod tests;

pub use error::{Error, Kind};
pub use node::{Member, Node, Value};
pub use place::Place;
pub use read::{LARGEST, MOST_LEVELS, MOST_VALUES, parse};
pub use write::{canonical, write};
