//! Irradiance along a straight line on the floor plan.

use std::sync::Arc;

use glam::DVec3;

use super::Kind;
use super::field::{Expect, Form, Need, Spec};
use super::position::sights::Hit;
use super::position::{Band, Facing, Views};
use super::source::{self, Shape, direction};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::{Linker, Slot as Own};
use crate::notebook::scene::Weights;
use crate::notebook::task::{Inputs, Task};
use crate::units::{Dimension, Quantity};

/// The fields of a curve.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "from",
        form: Form::Cell(&[Kind::Source]),
        need: Need::Required,
        about: "the source from whose centre the line runs; all sources count",
    },
    Spec {
        name: "heading",
        form: Form::Entry(Expect::HEADING),
        need: Need::Optional,
        about: "direction of the line, clockwise from north; an opening's own if left out, else 0 °",
    },
    Spec {
        name: "z",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Default("1.6 m"),
        about: "height of the receiver",
    },
    Spec {
        name: "nearest",
        form: Form::Entry(Expect::SIZE),
        need: Need::Default("0.5 m"),
        about: "first distance",
    },
    Spec {
        name: "farthest",
        form: Form::Entry(Expect::SIZE),
        need: Need::Default("20 m"),
        about: "last distance",
    },
    Spec {
        name: "points",
        form: Form::Count(2, 2000),
        need: Need::Default("60"),
        about: "how many distances, in geometric steps, both ends included",
    },
    Spec {
        name: "faces",
        form: Form::Facing,
        need: Need::Default("strongest"),
        about: "`strongest`, the name of a source, or a heading",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of a curve.
pub const OUTPUTS: &[&str] = &["rows"];

/// Returns the horizontal direction of a line from a source: the heading that
/// was given, else an opening's own, else north.
#[must_use]
pub fn along(shape: &Shape, heading: Option<f64>) -> DVec3 {
    match (heading, shape.kind) {
        (Some(heading), _) => direction(heading),
        (None, source::Kind::Opening) => shape.ahead,
        (None, source::Kind::Pool | source::Kind::Body | source::Kind::Screen) => direction(0.0),
    }
}

/// What is seen from the points of a curve's line.
#[derive(Clone, Debug)]
pub struct Line {
    /// Horizontal distances from the centre of the outline, m.
    pub distances: Vec<f64>,
    /// How far the outline reaches along the line, m.
    pub edge: f64,
    /// What is seen from each.
    pub views: Views,
}

/// Works out what a curve's points see.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct LineTask {
    pub(in crate::notebook) form: Node,
    pub(in crate::notebook) shape: Node,
    pub(in crate::notebook) heading: Option<Node>,
    pub(in crate::notebook) z: Node,
    pub(in crate::notebook) nearest: Node,
    pub(in crate::notebook) farthest: Node,
    pub(in crate::notebook) points: u32,
}

impl LineTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.form, self.shape, self.z, self.nearest, self.farthest]);
        nodes.extend(self.heading);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let form = inputs.form(self.form);
        let shape = inputs.shape(self.shape);
        let (nearest, farthest) = (inputs.si(self.nearest), inputs.si(self.farthest));
        if nearest >= farthest {
            return Err(Diagnostic::of_field(
                "farthest",
                "empty-range",
                format!("expected a distance beyond nearest ({nearest} m), found {farthest} m"),
            )
            .with_hint("give a greater `farthest` or a smaller `nearest`"));
        }
        let ahead = along(shape, inputs.maybe(self.heading));
        let edge = shape.edge_along(ahead);
        if nearest < edge {
            return Err(Diagnostic::of_field(
                "nearest",
                "inside-outline",
                format!(
                    "expected a distance outside the source's outline, whose edge is at {edge} m, \
                     found {nearest} m"
                ),
            )
            .with_hint("give a greater `nearest`"));
        }
        let distances = steps(nearest, farthest, self.points);
        let z = inputs.si(self.z);
        let mut points = Vec::with_capacity(distances.len());
        for distance in &distances {
            points.push((shape.centre + ahead * *distance).with_z(z));
        }
        // Each point stands for itself: nothing is reached for from another.
        let views = Views::standing(form, points).map_err(|hit| {
            let (Hit::Inside(index) | Hit::Reached(index)) = hit;
            Diagnostic::of_field(
                "nearest",
                "inside-source",
                format!("the line meets source {}", form.names[index]),
            )
            .with_hint("change the height, the heading or the range of the line")
        })?;
        Ok(Datum::Line(Arc::new(Line {
            distances,
            edge,
            views,
        })))
    }
}

/// Returns `points` distances in geometric steps, both ends included exactly.
#[must_use]
pub fn steps(nearest: f64, farthest: f64, points: u32) -> Vec<f64> {
    let last = points.max(2) - 1;
    let ratio = (farthest / nearest).ln();
    (0..=last)
        .map(|index| {
            if index == 0 {
                nearest
            } else if index == last {
                farthest
            } else {
                nearest * (ratio * f64::from(index) / f64::from(last)).exp()
            }
        })
        .collect()
}

/// One point of a curve. Distances in m, irradiances in W/m².
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Row {
    /// Horizontal distance from the centre of the outline.
    pub distance: f64,
    /// The same from its edge.
    pub clear_distance: f64,
    /// Irradiance over all wavelengths.
    pub irradiance: f64,
    /// Irradiance in 780–3000 nm.
    pub near_infrared: f64,
}

impl Row {
    pub(in crate::notebook) fn visit(
        &self,
        index: usize,
        see: &mut dyn FnMut(Slot<'_>, Output<'_>),
    ) {
        for (name, si, dimension) in [
            ("distance", self.distance, Dimension::LENGTH),
            ("clear_distance", self.clear_distance, Dimension::LENGTH),
            ("irradiance", self.irradiance, Dimension::IRRADIANCE),
            (
                "near_ir_irradiance",
                self.near_infrared,
                Dimension::IRRADIANCE,
            ),
        ] {
            see(
                Slot::column(name, index),
                Output::Quantity(Quantity::new(si, dimension)),
            );
        }
    }
}

/// Works out a curve's rows.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct RowsTask {
    pub(in crate::notebook) line: Node,
    pub(in crate::notebook) heat: Node,
    pub(in crate::notebook) facing: Facing,
}

impl RowsTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.line, self.heat]);
        self.facing.inputs(nodes);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let line = inputs.line(self.line);
        let heat = inputs.heat(self.heat);
        let orientation = self.facing.orientation(inputs);
        let total = heat.weights(Band::Total);
        let near_infrared = heat.weights(Band::NearInfrared);
        let rows = line
            .distances
            .iter()
            .enumerate()
            .map(|(index, distance)| {
                let irradiance =
                    |weights: &Weights<'_>| line.views.irradiance(index, orientation, weights).0;
                Row {
                    distance: *distance,
                    clear_distance: distance - line.edge,
                    irradiance: irradiance(&total),
                    near_infrared: irradiance(&near_infrared),
                }
            })
            .collect();
        Ok(Datum::Rows(Arc::new(rows)))
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let source = linker.target("from");
    let shape = source.map(|source| linker.foreign(source, Own::Group("shape")));
    let points = linker.count("points");
    let facing = linker.facing();
    let heading = linker.entry("heading");
    let [form, heat, _] = linker.scene();
    let [z, nearest, farthest] = ["z", "nearest", "farthest"].map(|field| linker.always(field));
    let line = shape.zip(points).map(|(shape, points)| {
        Task::Line(LineTask {
            form,
            shape,
            heading,
            z,
            nearest,
            farthest,
            points,
        })
    });
    let line = linker.group("line", line);
    let rows = facing.map(|facing| Task::Rows(RowsTask { line, heat, facing }));
    let _ = linker.group("rows", rows);
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn steps_are_geometric_and_keep_both_ends() {
        let steps = steps(0.5, 20.0, 60);
        assert_eq!(steps.len(), 60);
        assert_eq!((steps[0], steps[59]), (0.5, 20.0));
        let ratio = 40.0_f64.powf(1.0 / 59.0);
        for pair in steps.windows(2) {
            let found = pair[1] / pair[0];
            assert!((found - ratio).abs() < 1e-12, "{found} {ratio}");
        }
    }
}
