//! The marks that a picture is made of: lines, areas, shapes and text, placed
//! in points, `y` downwards.

use glam::DVec2;

use crate::drawing::font::{self, Weight};
use crate::drawing::hatch::Hatch;
use crate::drawing::role::Role;

/// A rectangle with its sides along the axes, in points.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rectangle {
    /// Top left corner.
    pub from: DVec2,
    /// Bottom right corner.
    pub to: DVec2,
}

impl Rectangle {
    /// Returns the rectangle with its top left corner at `x`, `y`.
    pub const fn new(x: f64, y: f64, width: f64, height: f64) -> Self {
        Self {
            from: DVec2::new(x, y),
            to: DVec2::new(x + width, y + height),
        }
    }

    /// Returns the width, in points.
    pub fn width(&self) -> f64 {
        self.to.x - self.from.x
    }

    /// Returns the height, in points.
    pub fn height(&self) -> f64 {
        self.to.y - self.from.y
    }

    /// Returns whether the two share more than an edge.
    pub fn meets(&self, other: &Self) -> bool {
        self.from.x < other.to.x
            && other.from.x < self.to.x
            && self.from.y < other.to.y
            && other.from.y < self.to.y
    }

    /// Returns whether `other` lies in this rectangle, edges included.
    pub fn holds(&self, other: &Self) -> bool {
        self.from.x <= other.from.x
            && self.from.y <= other.from.y
            && self.to.x >= other.to.x
            && self.to.y >= other.to.y
    }

    /// Returns the rectangle grown by `by` points on every side.
    pub fn grown(&self, by: f64) -> Self {
        Self {
            from: self.from - DVec2::splat(by),
            to: self.to + DVec2::splat(by),
        }
    }

    /// Returns the four corners, clockwise from the top left.
    pub fn corners(&self) -> Vec<DVec2> {
        vec![
            self.from,
            DVec2::new(self.to.x, self.from.y),
            self.to,
            DVec2::new(self.from.x, self.to.y),
        ]
    }
}

/// How a line is broken up; told apart without colour.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Dash {
    /// Unbroken.
    #[default]
    Solid,
    /// Long dashes.
    Long,
    /// Short dashes.
    Short,
    /// Dots.
    Dots,
    /// A dash and a dot in turn.
    DashDot,
}

impl Dash {
    /// Returns lengths of dash and gap in turn, in points; empty when unbroken.
    pub const fn pattern(self) -> &'static [f64] {
        match self {
            Dash::Solid => &[],
            Dash::Long => &[7.0, 3.0],
            Dash::Short => &[3.0, 2.0],
            Dash::Dots => &[0.8, 2.2],
            Dash::DashDot => &[7.0, 2.0, 1.0, 2.0],
        }
    }
}

/// How a line is drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stroke {
    /// What the line is for.
    pub role: Role,
    /// Its width, in points.
    pub width: f64,
    /// How it is broken up.
    pub dash: Dash,
}

impl Stroke {
    /// The width of a hair line, in points.
    pub const HAIR: f64 = 0.5;

    /// Returns an unbroken line of `width` points.
    pub const fn solid(role: Role, width: f64) -> Self {
        Self {
            role,
            width,
            dash: Dash::Solid,
        }
    }

    /// Returns a hair line.
    pub const fn hair(role: Role) -> Self {
        Self::solid(role, Self::HAIR)
    }
}

/// What an area is filled with.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Fill {
    /// The colour of a role.
    Role(Role),
    /// A strength on the irradiance ramp, `0..=1`.
    Ramp(f64),
}

/// A shape that carries a meaning beside its word.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Shape {
    /// Filled octagon: over a limit.
    Over,
    /// Filled disc: within a limit.
    Within,
    /// Hollow diamond: not assessed.
    NotAssessed,
    /// Filled triangle, tip down at its point: where a limit is reached.
    Pin,
    /// Hollow triangle, tip down at its point: the same for the nominal value.
    NominalPin,
    /// Triangle, tip up, with an exclamation mark: a caution.
    Caution,
}

impl Shape {
    /// Returns the role in which the shape is drawn.
    pub const fn role(self) -> Role {
        match self {
            Shape::Over => Role::Over,
            Shape::Within => Role::Within,
            Shape::NotAssessed => Role::Ink,
            Shape::Pin | Shape::NominalPin => Role::Action,
            Shape::Caution => Role::CautionInk,
        }
    }

    /// Returns whether the shape is filled.
    pub const fn filled(self) -> bool {
        matches!(
            self,
            Shape::Over | Shape::Within | Shape::Pin | Shape::Caution
        )
    }

    /// Returns the box that the shape fills, `size` points high, placed at `at`:
    /// its centre, or the tip of a pin.
    pub fn extent(self, at: DVec2, size: f64) -> Rectangle {
        let half = DVec2::splat(size / 2.0);
        let centre = match self {
            Shape::Pin | Shape::NominalPin => at - DVec2::new(0.0, size / 2.0),
            Shape::Over | Shape::Within | Shape::NotAssessed | Shape::Caution => at,
        };
        Rectangle {
            from: centre - half,
            to: centre + half,
        }
    }

    /// Returns the corners of the shape, in the box of [`Shape::extent`]; a disc
    /// comes as 32 of them.
    pub fn outline(self, at: DVec2, size: f64) -> Vec<DVec2> {
        let extent = self.extent(at, size);
        let centre = (extent.from + extent.to) / 2.0;
        let ring = |sides: u32, radius: f64, turn: f64| -> Vec<DVec2> {
            (0..sides)
                .map(|i| {
                    let angle = std::f64::consts::TAU * (f64::from(i) + turn) / f64::from(sides);
                    centre + DVec2::new(angle.sin(), -angle.cos()) * radius
                })
                .collect()
        };
        match self {
            // The flats of the octagon, not its corners, touch the box.
            Shape::Over => ring(8, size / 2.0 / (std::f64::consts::PI / 8.0).cos(), 0.5),
            Shape::Within => ring(32, size / 2.0, 0.0),
            Shape::NotAssessed => ring(4, size / 2.0, 0.0),
            Shape::Pin | Shape::NominalPin => vec![
                extent.from,
                DVec2::new(extent.to.x, extent.from.y),
                DVec2::new(centre.x, extent.to.y),
            ],
            Shape::Caution => vec![
                DVec2::new(centre.x, extent.from.y),
                extent.to,
                DVec2::new(extent.from.x, extent.to.y),
            ],
        }
    }
}

impl Shape {
    /// Returns the shape as plain areas, for whoever paints it; the exclamation
    /// mark of a caution stands in the ground of cautions.
    pub fn marks(self, at: DVec2, size: f64) -> Vec<Mark> {
        let role = self.role();
        if self.filled() {
            let area = |outline, role| Mark::Area {
                outline,
                fill: Some(Fill::Role(role)),
                hatch: None,
                edge: None,
            };
            let mut found = vec![area(self.outline(at, size), role)];
            if self == Shape::Caution {
                let bar = Rectangle::new(
                    at.x - size * 0.055,
                    at.y - size * 0.14,
                    size * 0.11,
                    size * 0.34,
                );
                let dot = Rectangle::new(
                    at.x - size * 0.055,
                    at.y + size * 0.26,
                    size * 0.11,
                    size * 0.11,
                );
                found.extend([bar, dot].map(|part| area(part.corners(), Role::CautionGround)));
            }
            return found;
        }
        // The edge lies inside the box, so hollow shapes are no larger than filled ones.
        let width = size * 0.14;
        let nudge = if self == Shape::NominalPin {
            DVec2::new(0.0, width)
        } else {
            DVec2::ZERO
        };
        vec![Mark::Area {
            outline: self.outline(at - nudge, size - 1.4 * width),
            fill: Some(Fill::Role(Role::Card)),
            hatch: None,
            edge: Some(Stroke::solid(role, width)),
        }]
    }
}

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

/// One mark of a picture.
#[derive(Clone, Debug, PartialEq)]
pub enum Mark {
    /// An open line through points.
    Line {
        /// Its points, in order.
        points: Vec<DVec2>,
        /// How it is drawn.
        stroke: Stroke,
    },
    /// A closed area, even-odd where it crosses itself.
    Area {
        /// Its corners, in order.
        outline: Vec<DVec2>,
        /// What it is filled with, if at all.
        fill: Option<Fill>,
        /// How it is hatched, if at all.
        hatch: Option<Hatch>,
        /// Its edge, if drawn.
        edge: Option<Stroke>,
    },
    /// A shape that carries a meaning, in its own role.
    Shape {
        /// Which shape.
        shape: Shape,
        /// Its centre, or the tip of a pin.
        at: DVec2,
        /// Its height, in points.
        size: f64,
    },
    /// A line of text.
    Text(Text),
    /// Marks of which only what lies in a rectangle is seen.
    Clip {
        /// The rectangle.
        window: Rectangle,
        /// The marks, in order.
        marks: Vec<Mark>,
    },
}

impl Mark {
    /// Returns a line between two points.
    pub fn line(from: DVec2, to: DVec2, stroke: Stroke) -> Self {
        Mark::Line {
            points: vec![from, to],
            stroke,
        }
    }

    /// Returns a filled rectangle.
    pub fn filled(area: Rectangle, role: Role) -> Self {
        Mark::Area {
            outline: area.corners(),
            fill: Some(Fill::Role(role)),
            hatch: None,
            edge: None,
        }
    }

    /// Returns the frame of a rectangle.
    pub fn frame(area: Rectangle, stroke: Stroke) -> Self {
        Mark::Area {
            outline: area.corners(),
            fill: None,
            hatch: None,
            edge: Some(stroke),
        }
    }

    /// Returns the mark scaled by `factor` about the origin and then moved by
    /// `by` points.
    pub fn placed(mut self, factor: f64, by: DVec2) -> Self {
        self.place(factor, by);
        self
    }

    fn place(&mut self, factor: f64, by: DVec2) {
        let map = |p: &mut DVec2| *p = *p * factor + by;
        match self {
            Mark::Line { points, stroke } => {
                points.iter_mut().for_each(map);
                stroke.width *= factor;
            }
            Mark::Area {
                outline,
                hatch,
                edge,
                ..
            } => {
                outline.iter_mut().for_each(map);
                if let Some(hatch) = hatch {
                    hatch.spacing *= factor;
                    hatch.width *= factor;
                }
                if let Some(edge) = edge {
                    edge.width *= factor;
                }
            }
            Mark::Shape { at, size, .. } => {
                map(at);
                *size *= factor;
            }
            Mark::Text(text) => {
                map(&mut text.at);
                text.size *= factor;
            }
            Mark::Clip { window, marks } => {
                map(&mut window.from);
                map(&mut window.to);
                for mark in marks {
                    mark.place(factor, by);
                }
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_shape_fills_its_box_and_no_more() {
        let at = DVec2::new(3.0, 4.0);
        for shape in [
            Shape::Over,
            Shape::Within,
            Shape::NotAssessed,
            Shape::Pin,
            Shape::NominalPin,
            Shape::Caution,
        ] {
            let extent = shape.extent(at, 8.0);
            let outline = shape.outline(at, 8.0);
            let low = outline.iter().copied().fold(DVec2::INFINITY, DVec2::min);
            let high = outline
                .iter()
                .copied()
                .fold(DVec2::NEG_INFINITY, DVec2::max);
            assert!(
                low.distance(extent.from) < 1e-9,
                "{shape:?}: {low}, wanted {}",
                extent.from
            );
            assert!(
                high.distance(extent.to) < 1e-9,
                "{shape:?}: {high}, wanted {}",
                extent.to
            );
        }
    }

    #[test]
    fn a_pin_stands_on_its_tip() {
        let outline = Shape::Pin.outline(DVec2::new(10.0, 20.0), 6.0);
        assert_eq!(outline[2], DVec2::new(10.0, 20.0));
    }

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

    #[test]
    fn placing_scales_first_and_then_moves() {
        let mark = Mark::line(
            DVec2::new(1.0, 2.0),
            DVec2::new(3.0, 4.0),
            Stroke::solid(Role::Ink, 1.0),
        );
        let placed = mark.placed(2.0, DVec2::new(10.0, 20.0));
        let expected = Mark::line(
            DVec2::new(12.0, 24.0),
            DVec2::new(16.0, 28.0),
            Stroke::solid(Role::Ink, 2.0),
        );
        assert_eq!(placed, expected);
    }
}
