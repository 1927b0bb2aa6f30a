//! One line of text, placed by one of its ends or its middle.

use glam::DVec2;

use crate::drawing::font::{self, Weight};
use crate::drawing::mark::Rectangle;
use crate::drawing::role::Role;

/// Which point of a line of text is placed.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Anchor {
    /// Its left end.
    #[default]
    Start,
    /// Its middle.
    Middle,
    /// Its right end.
    End,
}

/// What stands between a text and the drawing under it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Backing {
    /// Nothing.
    #[default]
    None,
    /// A filled box.
    Box(Role),
    /// An edge around each letter.
    Halo(Role),
}

/// One line of text.
#[derive(Clone, Debug, PartialEq)]
pub struct Text {
    /// The anchored point on the baseline.
    pub at: DVec2,
    /// Which point of the line `at` is.
    pub anchor: Anchor,
    /// Height of the em, in points.
    pub size: f64,
    /// Weight.
    pub weight: Weight,
    /// What it is for.
    pub role: Role,
    /// What stands behind it.
    pub backing: Backing,
    /// Turned about `at`, in degrees anticlockwise.
    pub turn: f64,
    /// Drawn as outlines only, that hide nothing.
    pub hollow: bool,
    /// The text itself; line breaks in it are shown as spaces.
    pub text: String,
}

impl Text {
    /// Returns a text in ink, regular weight, starting at `at`.
    pub fn new(at: DVec2, size: f64, text: impl Into<String>) -> Self {
        Self {
            at,
            anchor: Anchor::Start,
            size,
            weight: Weight::Regular,
            role: Role::Ink,
            backing: Backing::None,
            turn: 0.0,
            hollow: false,
            text: text.into(),
        }
    }

    /// Returns the same text with another anchor.
    pub const fn anchored(mut self, anchor: Anchor) -> Self {
        self.anchor = anchor;
        self
    }

    /// Returns the same text in another role.
    pub const fn role(mut self, role: Role) -> Self {
        self.role = role;
        self
    }

    /// Returns the same text in semibold.
    pub const fn bold(mut self) -> Self {
        self.weight = Weight::SemiBold;
        self
    }

    /// Returns the same text with something behind it.
    pub const fn backed(mut self, backing: Backing) -> Self {
        self.backing = backing;
        self
    }

    /// Returns how wide the text is, in points.
    pub fn width(&self) -> f64 {
        font::width(&self.text, self.size, self.weight)
    }

    /// Returns the left end of the baseline before any turn.
    pub fn start(&self) -> DVec2 {
        let back = match self.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => self.width() / 2.0,
            Anchor::End => self.width(),
        };
        self.at - DVec2::new(back, 0.0)
    }

    /// Returns the box of the text before any turn, in points.
    pub fn extent(&self) -> Rectangle {
        let start = self.start();
        Rectangle {
            from: start - DVec2::new(0.0, font::ASCENT * self.size),
            to: start + DVec2::new(self.width(), font::DESCENT * self.size),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_boxes_follow_the_anchor() {
        let text = Text::new(DVec2::new(100.0, 50.0), 10.0, "12.5 m");
        let width = text.width();
        for (anchor, left) in [
            (Anchor::Start, 100.0),
            (Anchor::Middle, 100.0 - width / 2.0),
            (Anchor::End, 100.0 - width),
        ] {
            let extent = text.clone().anchored(anchor).extent();
            assert!(
                (extent.from.x - left).abs() < 1e-9,
                "{anchor:?}: {}, wanted {left}",
                extent.from.x
            );
            assert!((extent.width() - width).abs() < 1e-9);
        }
    }
}
