//! Shapes that carry a meaning, so that colour never does so alone.

use glam::DVec2;

use crate::drawing::mark::{Fill, Mark, Rectangle, Stroke};
use crate::drawing::role::Role;

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
    /// Returns the shape of a finding's word; the hollow diamond for a word that
    /// is no finding.
    #[must_use]
    pub fn of_word(word: &str) -> Self {
        match word {
            "over" | "onset reached" => Shape::Over,
            "within" | "below onset" => Shape::Within,
            _ => Shape::NotAssessed,
        }
    }

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
}
