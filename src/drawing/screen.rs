//! Screens on a line, and the ground behind them from which a source is
//! hidden: less heat there, not none.

use crate::drawing::hatch::Hatch;
use crate::drawing::role::Role;

/// A screen that stands across a line.
#[derive(Clone, Debug, PartialEq)]
pub struct Screen {
    /// The screen's cell.
    pub cell: String,
    /// What it is called: `plate · 208 °C`.
    pub label: String,
    /// Where it crosses the line, in metres, counted as the picture counts.
    pub distance: f64,
}

/// A stretch of a line from which some of a source is hidden.
#[derive(Clone, Debug, PartialEq)]
pub struct Shadow {
    /// Where it begins, in metres, counted as the picture counts.
    pub from: f64,
    /// Where it ends; infinite where it does not end on the line.
    pub to: f64,
    /// The source that is hidden.
    pub source: String,
}

impl Shadow {
    /// Returns what is said of it, once for all shadows of one picture.
    #[must_use]
    pub fn words(shadows: &[Shadow]) -> String {
        let mut sources: Vec<&str> = Vec::new();
        for shadow in shadows {
            if !sources.contains(&shadow.source.as_str()) {
                sources.push(&shadow.source);
            }
        }
        format!("{} hidden: less heat, not none", sources.join(", "))
    }

    /// Returns the part of it between two distances, if there is any.
    #[must_use]
    pub fn between(&self, low: f64, high: f64) -> Option<(f64, f64)> {
        let (from, to) = (self.from.max(low), self.to.min(high));
        (from < to).then_some((from, to))
    }
}

/// How the ground behind a screen is hatched.
pub const HIDDEN: Hatch = Hatch {
    spacing: 4.5,
    // Falling to the right, where the shading of a ruler rises.
    angle: 120.0,
    width: 0.5,
    role: Role::Muted,
};

/// How a screen itself is hatched: close, so that a thin bar shows it.
pub const PLATE: Hatch = Hatch {
    spacing: 2.2,
    angle: 45.0,
    width: 0.5,
    role: Role::Card,
};

/// How thick the bar of a screen is drawn, in points.
pub const THICK: f64 = 3.5;

#[cfg(test)]
mod tests {
    use super::*;

    fn shadow(from: f64, to: f64, source: &str) -> Shadow {
        Shadow {
            from,
            to,
            source: source.to_owned(),
        }
    }

    #[test]
    fn a_shadow_is_cut_to_what_is_drawn() {
        let whole = shadow(1.4, f64::INFINITY, "door");
        assert_eq!(whole.between(0.5, 20.0), Some((1.4, 20.0)));
        assert_eq!(whole.between(0.5, 1.0), None);
        assert_eq!(shadow(f64::NAN, 3.0, "door").between(f64::NAN, 3.0), None);
    }

    #[test]
    fn each_hidden_source_is_named_once() {
        let shadows = [
            shadow(1.0, 2.0, "door"),
            shadow(3.0, 4.0, "ladle"),
            shadow(5.0, 6.0, "door"),
        ];
        assert_eq!(
            Shadow::words(&shadows),
            "door, ladle hidden: less heat, not none"
        );
    }
}
