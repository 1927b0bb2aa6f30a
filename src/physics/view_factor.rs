//! Configuration factors from a small flat element to a region, and between
//! regions that face each other: closed forms, and the contour integral from
//! which the other poses are built.
//!
//! Factors are dimensionless, in `0..=1`. Forms are written so that all their
//! terms are positive: nothing cancels, however far away the element lies.

pub mod contour;
pub mod disc;
pub(in crate::physics) mod four;
pub mod polygon;
pub mod rectangle;
pub mod ring;
pub mod sphere;
pub mod strip;
