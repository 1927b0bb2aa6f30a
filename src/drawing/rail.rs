//! The distance rail: a ruler that begins at the face of a source, shaded by
//! irradiance, with a flag for every limit crossing and every position.
//!
//! No flag covers another, and everything can be read without colour: pins and
//! findings by shape and word, shading by its steps and their legend.

mod cover;
mod data;
mod line;
mod plan;
mod shading;

use crate::drawing::mark::{Rectangle, Shape};
use crate::drawing::measure::Measure;
use crate::drawing::picture::Picture;
use crate::drawing::screen::{Screen, Shadow};

pub use line::{Line, Probe, Reading};
pub use shading::Shading;

/// Where a rule begins to be met.
#[derive(Clone, Debug, PartialEq)]
pub struct Pin {
    /// The zone's cell.
    pub cell: String,
    /// What it is called: `eye, 4 min`.
    pub label: String,
    /// Clear distance on the safe bound, in metres; what people act on.
    pub distance: f64,
    /// The same in words, rounded outwards: `11.4 m`.
    pub text: String,
    /// The nominal clear distance and its words, where inputs carry an
    /// uncertainty.
    pub nominal: Option<(f64, String)>,
}

/// A position that stands on the line.
#[derive(Clone, Debug, PartialEq)]
pub struct Stand {
    /// The position's cell.
    pub cell: String,
    /// Clear distance, in metres.
    pub distance: f64,
    /// The same in words, rounded inwards: `2.50 m`.
    pub text: String,
    /// The shape of its finding.
    pub shape: Shape,
    /// The finding's word, and what it allows: `over: no planned stay`.
    pub finding: String,
}

/// A stretch of the rail within one step of the irradiance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch {
    /// Clear distance where it begins, in metres.
    pub from: f64,
    /// Clear distance where it ends, in metres.
    pub to: f64,
    /// How many of the levels it is at or above.
    pub step: usize,
}

/// Everything that the rail shows, as plain data. Distances are clear
/// distances: from the edge of the source's outline on the line.
#[derive(Clone, Debug, PartialEq)]
pub struct Rail {
    /// Where the line runs: `from the face of door, straight out, at 1.60 m`.
    pub about: String,
    /// What the shading shows, with its unit.
    pub quantity: String,
    /// The irradiances between steps of the shading, growing, in W/m².
    pub levels: Vec<f64>,
    /// The same in words.
    pub level_texts: Vec<String>,
    /// The stretches, from the face outwards, as far as is known.
    pub stretches: Vec<Stretch>,
    /// Limit crossings, in file order.
    pub pins: Vec<Pin>,
    /// Positions on the line, in file order.
    pub stands: Vec<Stand>,
    /// Positions that stand on other lines.
    pub elsewhere: Vec<String>,
    /// What belongs here and has no place on the ruler.
    pub notes: Vec<String>,
    /// Screens that stand across the line.
    pub screens: Vec<Screen>,
    /// Stretches from which a source is hidden.
    pub shadows: Vec<Shadow>,
    /// The units of the ruler.
    pub measure: Measure,
    /// Whether pins and findings hold; not while bounds are being worked out.
    pub settled: bool,
}

impl Rail {
    /// Returns the rail as it is while bounds are being worked out: no pin and
    /// no finding holds yet, and each says so.
    #[must_use]
    pub fn provisional(mut self) -> Rail {
        self.settled = false;
        for pin in &mut self.pins {
            pin.nominal = Some((pin.distance, pin.text.clone()));
            pin.text = "being worked out".to_owned();
        }
        for stand in &mut self.stands {
            if stand.shape != Shape::NotAssessed {
                stand.finding = format!("being worked out, nominally {}", stand.finding);
                stand.shape = Shape::NotAssessed;
            }
        }
        self
    }
}

/// Returns how high the picture of a rail has to be at a width so that every
/// flag and every note has room, both in points.
#[must_use]
pub fn height(rail: &Rail, width: f64) -> f64 {
    plan::Plan::new(rail, width).height()
}

/// Returns the rail as a picture of `width` by `height` points.
///
/// Where the height is less than [`height`] asks for, flags are left out,
/// those within a limit first and pins last, and the picture says which.
/// Widths under 240 points are drawn at that width.
#[must_use]
pub fn picture(rail: &Rail, width: f64, height: f64) -> Picture {
    plan::Plan::fitted(rail, width, height).picture(height)
}

/// Returns the boxes of the flags in the picture of this size, each with the
/// name of the cell that it stands for.
#[must_use]
pub fn hits(rail: &Rail, width: f64, height: f64) -> Vec<(Rectangle, String)> {
    plan::Plan::fitted(rail, width, height).hits(height)
}

#[cfg(test)]
mod tests;
