//! What is seen of a region past what hides it, by its outline.
//!
//! Outlines are closed loops of edges on the sphere of directions: ways of
//! great circles (straight edges) and arcs of cones over circles. All are split
//! where they cross; a piece belongs to the outline of what is seen if that
//! lies on one side of it and not on the other. No areas are built, nothing is
//! sampled, and what is kept are pieces of the very edges that were given.

mod crossing;
mod edge;
mod outline;
mod overlay;
mod quartic;

pub(super) use outline::Outline;
pub(super) use overlay::{Overlay, Shadow};
