//! What a node of the graph holds: a quantity, a piece of the scene, a result,
//! or the reason why there is none.

use std::sync::Arc;

use super::Diagnostic;
use super::cell::{assessment, curve, position, screen, source, surroundings, zone};
use super::scene::{Balanced, Form, Heat, Layout};
use crate::graph::Same;
use crate::physics::screen::Make;
use crate::units::Quantity;

/// The number of a cell while its notebook is open; renaming does not change
/// it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct CellId(pub(super) u32);

impl CellId {
    /// The owner of the nodes that belong to no cell.
    pub(super) const SCENE: CellId = CellId(0);
}

/// The value of one node.
#[derive(Clone, Debug)]
pub enum Datum {
    /// The node's own faults.
    Fault(Arc<Vec<Diagnostic>>),
    /// Cells in error that this node depends on, by number: all of them, or the
    /// first few of very many.
    Waiting(Arc<Vec<CellId>>),
    /// A quantity.
    Quantity(Quantity),
    /// The answer to a comparison.
    Truth(bool),
    /// A source's place and outline.
    Shape(Arc<source::Shape>),
    /// What a source emits.
    Emission(Arc<source::Emitted>),
    /// What a source is asked for.
    Source(source::Outcome),
    /// What a screen is made of.
    Make(Make),
    /// What a screen is asked for.
    Screen(screen::Outcome),
    /// All screens in balance.
    Balanced(Arc<Balanced>),
    /// The balance cannot be found: the screen that stops it, and why.
    Unbalanced(CellId, Arc<str>),
    /// Which sources and screens go through one another.
    Layout(Arc<Layout>),
    /// A source or a screen goes through no other.
    Apart,
    /// Where all sources and screens are.
    Form(Arc<Form>),
    /// What all sources and screens emit, parallel to the parts of the form.
    Heat(Arc<Heat>),
    /// The room.
    Room(surroundings::Room),
    /// What a position sees.
    Sights(Arc<position::Sights>),
    /// What reaches a position.
    Exposure(Arc<position::Exposure>),
    /// What a curve's points see.
    Line(Arc<curve::Line>),
    /// A curve's rows.
    Rows(Arc<Vec<curve::Row>>),
    /// A position judged.
    Verdicts(Arc<Vec<assessment::Verdict>>),
    /// What a zone's line sees.
    Track(Arc<zone::Track>),
    /// Where a zone ends.
    Edge(zone::Edge),
}

impl Datum {
    /// Returns the node's own faults, if there are any.
    #[must_use]
    pub fn faults(&self) -> &[Diagnostic] {
        match self {
            Datum::Fault(faults) => faults,
            _ => &[],
        }
    }

    /// Returns whether the node has a value.
    #[must_use]
    pub fn is_ready(&self) -> bool {
        !matches!(self, Datum::Fault(_) | Datum::Waiting(_))
    }

    /// Returns the value as a quantity.
    #[must_use]
    pub fn as_quantity(&self) -> Option<Quantity> {
        match self {
            Datum::Quantity(quantity) => Some(*quantity),
            _ => None,
        }
    }

    /// Hands every named output to `see`, always in the same order.
    pub fn visit(&self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        match self {
            Datum::Quantity(quantity) => {
                see(Slot::named("value"), Output::Quantity(*quantity));
            }
            Datum::Truth(truth) => {
                see(
                    Slot::named("value"),
                    Output::Word(if *truth { "true" } else { "false" }),
                );
            }
            Datum::Source(outcome) => outcome.visit(see),
            Datum::Screen(outcome) => outcome.visit(see),
            Datum::Room(room) => room.visit(see),
            Datum::Exposure(exposure) => exposure.visit(see),
            Datum::Rows(rows) => {
                for (index, row) in rows.iter().enumerate() {
                    row.visit(index, see);
                }
            }
            Datum::Verdicts(verdicts) => assessment::visit(verdicts, see),
            Datum::Edge(edge) => edge.visit(see),
            Datum::Fault(_)
            | Datum::Waiting(_)
            | Datum::Shape(_)
            | Datum::Emission(_)
            | Datum::Make(_)
            | Datum::Balanced(_)
            | Datum::Unbalanced(..)
            | Datum::Layout(_)
            | Datum::Apart
            | Datum::Form(_)
            | Datum::Heat(_)
            | Datum::Sights(_)
            | Datum::Line(_)
            | Datum::Track(_) => {}
        }
    }

    /// Returns the output of this name as a quantity; `None` if there is none,
    /// or if it is no finite quantity.
    #[must_use]
    pub fn pick(&self, name: &str, part: Option<&str>) -> Option<Quantity> {
        let mut found = None;
        self.visit(&mut |slot, output| {
            if slot.row.is_none()
                && slot.name == name
                && slot.part == part
                && let Output::Quantity(quantity) = output
                && quantity.si.is_finite()
            {
                found = Some(quantity);
            }
        });
        found
    }
}

/// The place of an output in its cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Slot<'a> {
    /// The output's name, or a table's column.
    pub name: &'a str,
    /// The source that it is about, where it is about one.
    pub part: Option<&'a str>,
    /// The row of the cell's table, for a column.
    pub row: Option<usize>,
}

impl<'a> Slot<'a> {
    /// Returns the slot of a plain output.
    #[must_use]
    pub const fn named(name: &'a str) -> Self {
        Slot {
            name,
            part: None,
            row: None,
        }
    }

    /// Returns the slot of a column in a row.
    #[must_use]
    pub const fn column(name: &'a str, row: usize) -> Self {
        Slot {
            name,
            part: None,
            row: Some(row),
        }
    }
}

/// An output as it is worked out, without bounds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Output<'a> {
    /// A quantity.
    Quantity(Quantity),
    /// A duration in seconds, or without end, or one after which nothing is said.
    Time(Span),
    /// A distance along a line, or that there is none.
    Extent {
        /// Where it is.
        extent: zone::Extent,
        /// Where the line ends, m.
        end: f64,
    },
    /// A word.
    Word(&'a str),
    /// No value here: it keeps the place of one, so that all draws of a node
    /// have as many outputs.
    Nothing,
}

/// How long something may last.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Span {
    /// This many seconds.
    Seconds(f64),
    /// This many seconds, beyond which nothing is assessed.
    Capped(f64),
    /// Without end.
    Unlimited,
}

impl Span {
    /// Returns the seconds, infinite for no end.
    #[must_use]
    pub const fn seconds(self) -> f64 {
        match self {
            Span::Seconds(seconds) | Span::Capped(seconds) => seconds,
            Span::Unlimited => f64::INFINITY,
        }
    }
}

impl Same for Datum {
    fn same(&self, other: &Self) -> bool {
        match (self, other) {
            (Datum::Fault(a), Datum::Fault(b)) => a == b,
            (Datum::Waiting(a), Datum::Waiting(b)) => a == b,
            (Datum::Quantity(a), Datum::Quantity(b)) => a.same_bits(b),
            (Datum::Truth(a), Datum::Truth(b)) => a == b,
            (Datum::Shape(a), Datum::Shape(b)) => Arc::ptr_eq(a, b) || a == b,
            (Datum::Emission(a), Datum::Emission(b)) => Arc::ptr_eq(a, b) || a == b,
            (Datum::Make(a), Datum::Make(b)) => a == b,
            (Datum::Screen(a), Datum::Screen(b)) => a == b,
            (Datum::Balanced(a), Datum::Balanced(b)) => Arc::ptr_eq(a, b) || a == b,
            (Datum::Unbalanced(a, why), Datum::Unbalanced(b, other)) => a == b && why == other,
            (Datum::Layout(a), Datum::Layout(b)) => a == b,
            (Datum::Apart, Datum::Apart) => true,
            (Datum::Source(a), Datum::Source(b)) => a == b,
            (Datum::Form(a), Datum::Form(b)) => Arc::ptr_eq(a, b) || a == b,
            (Datum::Heat(a), Datum::Heat(b)) => Arc::ptr_eq(a, b) || a == b,
            (Datum::Room(a), Datum::Room(b)) => a == b,
            // Views are worked out from places and forms alone, so a fresh set
            // that ran because one of them changed is taken as another.
            (Datum::Sights(a), Datum::Sights(b)) => Arc::ptr_eq(a, b),
            (Datum::Line(a), Datum::Line(b)) => Arc::ptr_eq(a, b),
            (Datum::Track(a), Datum::Track(b)) => Arc::ptr_eq(a, b),
            (Datum::Exposure(a), Datum::Exposure(b)) => a == b,
            (Datum::Rows(a), Datum::Rows(b)) => a == b,
            (Datum::Verdicts(a), Datum::Verdicts(b)) => a == b,
            (Datum::Edge(a), Datum::Edge(b)) => a == b,
            _ => false,
        }
    }
}
