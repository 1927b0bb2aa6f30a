//! The marks that a picture is made of: lines, areas, shapes and text, placed
//! in points, `y` downwards.

mod shape;
mod text;

use glam::DVec2;

use crate::drawing::hatch::Hatch;
use crate::drawing::role::Role;

pub use shape::Shape;
pub use text::{Anchor, Backing, Text};

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
