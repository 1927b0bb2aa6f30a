//! Openings through thick walls.
pub mod section;
pub mod tunnel;
