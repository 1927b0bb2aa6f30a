//! Sections, curves and rails as plain pictures; knows no screen and no PDF.
//!
//! A [`picture::Picture`] is a list of marks in points, `y` downwards. Marks
//! carry roles instead of colours, so that one picture serves paper and every
//! theme of the window.

pub mod curve;
pub mod font;
pub mod hatch;
pub mod label;
pub mod mark;
pub mod measure;
pub mod picture;
pub mod rail;
pub mod ramp;
pub mod role;
pub mod screen;
