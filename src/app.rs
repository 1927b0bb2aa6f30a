//! The window: the notebook on the desk.

pub mod canvas;
pub mod cautions;
pub mod curve;
mod dashes;
pub mod rail;
pub mod readiness;
pub mod shared;
pub mod theme;
