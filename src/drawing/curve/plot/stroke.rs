//! How each kind of line in the plot is drawn: told apart without colour.

use crate::drawing::mark::{Dash, Stroke};
use crate::drawing::role::Role;

/// The nominal curve.
pub(in crate::drawing::curve) const fn nominal() -> Stroke {
    Stroke::solid(Role::Ink, 1.5)
}

/// The curve of the unfavourable bound.
pub(in crate::drawing::curve) const fn bound() -> Stroke {
    Stroke {
        role: Role::Ink,
        width: 1.0,
        dash: Dash::Short,
    }
}

/// The inverse square, for comparison.
pub(in crate::drawing::curve) const fn comparison() -> Stroke {
    Stroke {
        role: Role::Muted,
        width: 0.9,
        dash: Dash::Dots,
    }
}

/// A limit.
pub(in crate::drawing::curve) const fn limit() -> Stroke {
    Stroke {
        role: Role::Action,
        width: 0.9,
        dash: Dash::DashDot,
    }
}
