//! The scene that all sources and screens make together: where they are, what
//! each part of them sends, and what lets it through.
//!
//! Where things are and what they send live in nodes of their own, so that a
//! new temperature never makes anything be looked at again.

mod balance;
mod clash;
mod heat;

use std::sync::Arc;

use glam::DVec3;

use super::Diagnostic;
use super::cell::source::Shape;
use super::datum::{CellId, Datum};
use super::task::Inputs;
use crate::graph::{Node, Values};
use crate::physics::region::Region;
use crate::physics::scene::{Barrier, Part, Scene};
use crate::physics::view::{Sight, View};

pub(super) use balance::BalanceTask;
pub use balance::Balanced;
pub use clash::Clash;
pub use heat::{Air, Heat, Weights, may_be_polished};
pub(super) use heat::{HeatTask, Sender};

/// Where everything that emits is, in file order: sources and screens.
#[derive(Clone, Debug)]
pub struct Form {
    /// Their names.
    pub names: Vec<Arc<str>>,
    /// Their shapes, parallel to the names.
    pub shapes: Vec<Arc<Shape>>,
    /// For each part the place of its emitter among the names.
    owners: Vec<usize>,
    /// For each part a ball that holds it: its centre, and its radius in m.
    balls: Vec<(DVec3, f64)>,
    sight: Looking,
    /// Whether what is seen must be told apart by distance too.
    air: bool,
}

/// How the parts are looked at.
#[derive(Clone, Debug)]
enum Looking {
    /// One by one, for nothing can hide anything: the parts.
    Plainly(Vec<Region>),
    /// With everything that hides or dims.
    Through(Arc<Scene>),
}

impl PartialEq for Form {
    /// The shapes decide all the rest.
    fn eq(&self, other: &Form) -> bool {
        self.names == other.names && self.shapes == other.shapes && self.air == other.air
    }
}

/// What is known of a piece of the scene beside its view.
#[derive(Clone, Debug, PartialEq)]
pub struct Tag {
    /// The part that it belongs to.
    pub part: usize,
    /// The clear barriers that it is seen through, ascending.
    pub through: Box<[u16]>,
    /// The least length of the way from there, m.
    pub path: f64,
}

/// Why a point cannot be looked from: it touches the part of this number.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Touched(pub usize);

impl Form {
    /// Returns the form of named shapes. With `air` the ways through it are
    /// kept too.
    ///
    /// # Errors
    ///
    /// [`crate::physics::Error`] if the scene has more parts than can be told
    /// apart.
    pub fn new(
        names: Vec<Arc<str>>,
        shapes: Vec<Arc<Shape>>,
        air: bool,
    ) -> Result<Form, crate::physics::Error> {
        let mut owners = Vec::with_capacity(shapes.len());
        let mut balls = Vec::with_capacity(shapes.len());
        for (owner, shape) in shapes.iter().enumerate() {
            for part in &shape.parts {
                owners.push(owner);
                balls.push((part.region.centre(), part.region.bounding_radius()));
            }
        }
        Ok(Form {
            names,
            sight: looking(&shapes)?,
            shapes,
            owners,
            balls,
            air,
        })
    }

    /// Returns how many parts there are.
    #[must_use]
    pub fn parts(&self) -> usize {
        self.owners.len()
    }

    /// Returns the place among the names of the emitter of a part.
    #[must_use]
    pub fn owner(&self, part: usize) -> usize {
        self.owners[part]
    }

    /// Returns for each part a ball that holds it: centre and radius in m.
    #[must_use]
    pub fn balls(&self) -> &[(DVec3, f64)] {
        &self.balls
    }

    /// Returns whether every part is one view from anywhere, with nothing to
    /// be told of it.
    #[must_use]
    pub fn is_plain(&self) -> bool {
        !self.air && matches!(self.sight, Looking::Plainly(_))
    }

    /// Looks at every part from a point: a view of each in a plain form, else
    /// as many as there are pieces, with a tag for each.
    ///
    /// # Errors
    ///
    /// [`Touched`] where the point lies in or on a part.
    pub fn look(
        &self,
        point: DVec3,
        views: &mut Vec<View>,
        tags: &mut Vec<Tag>,
    ) -> Result<(), Touched> {
        match &self.sight {
            Looking::Plainly(regions) => {
                for (part, region) in regions.iter().enumerate() {
                    let view = region.view(point).into_view().ok_or(Touched(part))?;
                    views.push(view);
                    if self.air {
                        tags.push(self.tag(point, part, Box::new([])));
                    }
                }
            }
            Looking::Through(scene) => {
                let looked = scene.look(point);
                if let Some(part) = looked.touched() {
                    return Err(Touched(part));
                }
                for glimpse in looked.glimpses() {
                    tags.push(self.tag(point, glimpse.part, glimpse.through.clone()));
                    views.push(glimpse.view.clone());
                }
            }
        }
        Ok(())
    }

    fn tag(&self, point: DVec3, part: usize, through: Box<[u16]>) -> Tag {
        let (centre, radius) = self.balls[part];
        Tag {
            part,
            through,
            path: (point.distance(centre) - radius).max(0.0),
        }
    }

    /// Returns the sources that a point lies behind, and so does not see.
    #[must_use]
    pub fn behind(&self, point: DVec3) -> Vec<usize> {
        self.shapes
            .iter()
            .enumerate()
            .filter(|(_, shape)| {
                shape.is_source() && matches!(shape.region.view(point), Sight::Behind)
            })
            .map(|(index, _)| index)
            .collect()
    }
}

/// Returns how the parts of these shapes are looked at.
fn looking(shapes: &[Arc<Shape>]) -> Result<Looking, crate::physics::Error> {
    let parts = || shapes.iter().flat_map(|shape| shape.parts.iter());
    let barriers: Vec<Barrier> = shapes
        .iter()
        .filter_map(|shape| shape.barrier.clone())
        .collect();
    let bodies = parts().any(|part| {
        matches!(
            part.region,
            Region::Sphere { .. } | Region::Cylinder { .. } | Region::Plate { .. }
        )
    });
    let hides = !barriers.is_empty()
        || (bodies && parts().nth(1).is_some())
        || parts().any(|part| part.through.is_some() || part.less.is_some());
    if !hides {
        let regions = parts().map(|part| part.region.clone()).collect();
        return Ok(Looking::Plainly(regions));
    }
    let parts: Vec<Part> = parts().cloned().collect();
    Ok(Looking::Through(Arc::new(Scene::new(parts, barriers)?)))
}

/// Returns the two shapes that a scene's refusal is about.
fn culprits(shapes: &[Arc<Shape>], error: crate::physics::Error) -> (usize, usize) {
    use crate::physics::Error;
    let owner = |part: usize| {
        let mut past = 0;
        let own = shapes.iter().position(|shape| {
            past += shape.parts.len();
            part < past
        });
        own.unwrap_or(0)
    };
    let screen = |barrier: usize| {
        let mut screens = shapes.iter().enumerate();
        let own = screens
            .by_ref()
            .filter(|(_, shape)| shape.barrier.is_some());
        own.map(|(at, _)| at).nth(barrier).unwrap_or(0)
    };
    match error {
        Error::PartsOverlap { first, second } => (owner(first), owner(second)),
        Error::BarrierOverlaps { barrier, part } => (owner(part), screen(barrier)),
        Error::NotAnOutline { part } => (owner(part), owner(part)),
        _ => (0, shapes.len().saturating_sub(1)),
    }
}

/// The sources and screens that cannot stand as they do.
#[derive(Clone, Debug, PartialEq)]
pub struct Layout {
    /// Each as it was found, by file order of the later of the two.
    pub clashes: Vec<Clash>,
}

/// Finds what stands in the way of what: the shapes that are known so far.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct LayoutTask {
    pub(super) names: Vec<Arc<str>>,
    pub(super) ids: Vec<CellId>,
    pub(super) shapes: Vec<Node>,
}

impl LayoutTask {
    pub(super) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(&self.shapes);
    }

    /// Runs even where some of the shapes are in error.
    pub(super) fn run(&self, values: &Values<'_, Datum>) -> Datum {
        let known: Vec<(usize, &Arc<Shape>)> = self
            .shapes
            .iter()
            .enumerate()
            .filter_map(|(at, node)| match values.get(*node) {
                Some(Datum::Shape(shape)) => Some((at, shape)),
                _ => None,
            })
            .collect();
        let mut pairs = clash::all(&known);
        if pairs.is_empty() {
            // What the scene itself refuses, it refuses for two that overlap.
            let shapes: Vec<Arc<Shape>> =
                known.iter().map(|(_, shape)| Arc::clone(shape)).collect();
            if let Err(error) = looking(&shapes) {
                let (first, second) = culprits(&shapes, error);
                pairs.extend(
                    known
                        .get(first)
                        .zip(known.get(second))
                        .map(|((first, _), (second, _))| (*first.min(second), *first.max(second))),
                );
            }
        }
        Datum::Layout(Arc::new(Layout {
            clashes: pairs
                .into_iter()
                .map(|(first, second)| Clash {
                    first: Arc::clone(&self.names[first]),
                    second: self.ids[second],
                })
                .collect(),
        }))
    }
}

/// Says whether one source or screen may stand where it does.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct ApartTask {
    pub(super) layout: Node,
    pub(super) id: CellId,
    pub(super) screen: bool,
}

impl ApartTask {
    pub(super) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.push(self.layout);
    }

    pub(super) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let layout = inputs.layout(self.layout);
        match layout.clashes.iter().find(|clash| clash.second == self.id) {
            None => Ok(Datum::Apart),
            Some(clash) => Err(Diagnostic::of_cell(
                "overlaps",
                format!(
                    "expected a {} that stands clear of all others, found it through or inside {}",
                    if self.screen { "screen" } else { "source" },
                    clash.first
                ),
            )
            .with_hint("move one of them, or make one of them smaller")),
        }
    }
}

/// Gathers the shapes of all sources and screens.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct FormTask {
    pub(super) names: Vec<Arc<str>>,
    pub(super) shapes: Vec<Node>,
    pub(super) layout: Node,
    pub(super) air: bool,
}

impl FormTask {
    pub(super) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(&self.shapes);
        nodes.push(self.layout);
    }

    pub(super) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let clashes = &inputs.layout(self.layout).clashes;
        if !clashes.is_empty() {
            let mut cells: Vec<CellId> = clashes.iter().map(|clash| clash.second).collect();
            cells.dedup();
            return Ok(Datum::Waiting(Arc::new(cells)));
        }
        let shapes = self
            .shapes
            .iter()
            .map(|node| Arc::clone(inputs.shape(*node)))
            .collect();
        Form::new(self.names.clone(), shapes, self.air)
            .map(|form| Datum::Form(Arc::new(form)))
            .map_err(|error| Diagnostic::of_cell("no-such-scene", error.to_string()))
    }
}
