//! What a node does: a pure function from its inputs to its value.

use std::sync::Arc;

use super::Diagnostic;
use super::cell::field::{Expect, Item};
use super::cell::{assessment, curve, position, screen, source, surroundings, zone};
use super::datum::{CellId, Datum};
use super::listed::ListedTask;
use super::scene;
use super::uncertainty::Draw;
use crate::entry::{Entry, Outcome};
use crate::graph::{Node, Values};
use crate::units::{Quantity, Sense, Unit};

/// What one node does.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Task {
    /// It stands for faults found while linking.
    Fault(Arc<Vec<Diagnostic>>),
    /// It cannot run because its own cell has a fault elsewhere.
    Stuck(CellId),
    Entry(EntryTask),
    Listed(ListedTask),
    Shape(source::ShapeTask),
    Emission(source::EmissionTask),
    Source(source::OutcomeTask),
    Stand(screen::StandTask),
    Make(screen::MakeTask),
    Screen(screen::OutcomeTask),
    Balance(scene::BalanceTask),
    Layout(scene::LayoutTask),
    Apart(scene::ApartTask),
    Form(scene::FormTask),
    Heat(scene::HeatTask),
    Room(surroundings::RoomTask),
    Sights(position::SightsTask),
    Exposure(position::ExposureTask),
    Line(curve::LineTask),
    Rows(curve::RowsTask),
    Verdicts(assessment::VerdictsTask),
    Track(zone::TrackTask),
    Edge(zone::EdgeTask),
}

/// The values that a task reads. All of them are ready when it runs.
#[derive(Clone, Copy)]
pub(super) struct Inputs<'a> {
    values: &'a Values<'a, Datum>,
}

const LINKED: &str = "a task reads only nodes that it was linked to, of the kind it was linked to";

impl<'a> Inputs<'a> {
    fn datum(self, node: Node) -> &'a Datum {
        self.values.get(node).expect(LINKED)
    }

    /// Returns a quantity in SI units.
    pub(super) fn si(self, node: Node) -> f64 {
        self.datum(node).as_quantity().expect(LINKED).si
    }

    /// Returns a quantity in SI units where the field was given.
    pub(super) fn maybe(self, node: Option<Node>) -> Option<f64> {
        node.map(|node| self.si(node))
    }

    pub(super) fn shape(self, node: Node) -> &'a Arc<source::Shape> {
        match self.datum(node) {
            Datum::Shape(shape) => shape,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn emission(self, node: Node) -> &'a Arc<source::Emitted> {
        match self.datum(node) {
            Datum::Emission(emission) => emission,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn make(self, node: Node) -> &'a crate::physics::screen::Make {
        match self.datum(node) {
            Datum::Make(make) => make,
            _ => panic!("{LINKED}"),
        }
    }

    /// Returns the balance of all screens, or what stops it.
    pub(super) fn balance(self, node: Node) -> Result<&'a Arc<scene::Balanced>, (CellId, &'a str)> {
        match self.datum(node) {
            Datum::Balanced(balanced) => Ok(balanced),
            Datum::Unbalanced(id, why) => Err((*id, why)),
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn layout(self, node: Node) -> &'a scene::Layout {
        match self.datum(node) {
            Datum::Layout(layout) => layout,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn form(self, node: Node) -> &'a Arc<scene::Form> {
        match self.datum(node) {
            Datum::Form(form) => form,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn heat(self, node: Node) -> &'a Arc<scene::Heat> {
        match self.datum(node) {
            Datum::Heat(heat) => heat,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn room(self, node: Node) -> &'a surroundings::Room {
        match self.datum(node) {
            Datum::Room(room) => room,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn sights(self, node: Node) -> &'a position::Sights {
        match self.datum(node) {
            Datum::Sights(sights) => sights,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn exposure(self, node: Node) -> &'a position::Exposure {
        match self.datum(node) {
            Datum::Exposure(exposure) => exposure,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn line(self, node: Node) -> &'a curve::Line {
        match self.datum(node) {
            Datum::Line(line) => line,
            _ => panic!("{LINKED}"),
        }
    }

    pub(super) fn track(self, node: Node) -> &'a zone::Track {
        match self.datum(node) {
            Datum::Track(track) => track,
            _ => panic!("{LINKED}"),
        }
    }
}

impl Task {
    /// Returns the nodes that the task reads.
    pub(super) fn inputs(&self) -> Vec<Node> {
        let mut nodes = Vec::new();
        match self {
            Task::Fault(_) | Task::Stuck(_) | Task::Listed(_) => {}
            Task::Entry(task) => nodes.extend(task.picks.iter().map(|pick| pick.node)),
            Task::Shape(task) => task.inputs(&mut nodes),
            Task::Emission(task) => task.inputs(&mut nodes),
            Task::Source(task) => task.inputs(&mut nodes),
            Task::Stand(task) => task.inputs(&mut nodes),
            Task::Make(task) => task.inputs(&mut nodes),
            Task::Screen(task) => task.inputs(&mut nodes),
            Task::Balance(task) => task.inputs(&mut nodes),
            Task::Layout(task) => task.inputs(&mut nodes),
            Task::Apart(task) => task.inputs(&mut nodes),
            Task::Form(task) => task.inputs(&mut nodes),
            Task::Heat(task) => task.inputs(&mut nodes),
            Task::Room(task) => task.inputs(&mut nodes),
            Task::Sights(task) => task.inputs(&mut nodes),
            Task::Exposure(task) => task.inputs(&mut nodes),
            Task::Line(task) => task.inputs(&mut nodes),
            Task::Rows(task) => task.inputs(&mut nodes),
            Task::Verdicts(task) => task.inputs(&mut nodes),
            Task::Track(task) => task.inputs(&mut nodes),
            Task::Edge(task) => task.inputs(&mut nodes),
        }
        nodes
    }

    /// Returns the node's value from those of its inputs; in a draw, with the
    /// drawn literals in place of the typed ones.
    ///
    /// `owner` tells whose a node is, for the cells that are waited for.
    pub(super) fn run(
        &self,
        node: Node,
        values: &Values<'_, Datum>,
        owner: &dyn Fn(Node) -> CellId,
        draw: Option<&Draw<'_>>,
    ) -> Datum {
        match self {
            Task::Fault(faults) => return Datum::Fault(Arc::clone(faults)),
            Task::Stuck(cell) => return Datum::Waiting(Arc::new(vec![*cell])),
            Task::Layout(task) => return task.run(values),
            _ => {}
        }
        if let Some(waiting) = waiting(values, owner) {
            return waiting;
        }
        let inputs = Inputs { values };
        let result = match self {
            Task::Fault(_) | Task::Stuck(_) | Task::Layout(_) => unreachable!("answered above"),
            Task::Entry(task) => task
                .run(node, inputs, draw)
                .map_err(|fault| fault.in_item(task.item)),
            Task::Listed(task) => task.run(node, draw),
            Task::Shape(task) => task.run(inputs),
            Task::Emission(task) => task.run(inputs),
            Task::Source(task) => task.run(inputs),
            Task::Stand(task) => task.run(inputs),
            Task::Make(task) => task.run(inputs),
            Task::Screen(task) => task.run(inputs),
            Task::Balance(task) => task.run(inputs),
            Task::Apart(task) => task.run(inputs),
            Task::Form(task) => task.run(inputs),
            Task::Heat(task) => task.run(inputs),
            Task::Room(task) => task.run(inputs),
            Task::Sights(task) => task.run(inputs),
            Task::Exposure(task) => task.run(inputs),
            Task::Line(task) => task.run(inputs),
            Task::Rows(task) => task.run(inputs),
            Task::Verdicts(task) => task.run(inputs),
            Task::Track(task) => task.run(inputs),
            Task::Edge(task) => task.run(inputs),
        };
        result.unwrap_or_else(|fault| Datum::Fault(Arc::new(vec![fault])))
    }
}

/// How many cells in error a node names at most: a damaged file may hold very
/// many, and each of them would stand in the list of everything behind it.
const NAMED: usize = 32;

/// Returns the cells in error that stand behind a node's inputs, if there are
/// any: the first causes, not the cells between, and the first [`NAMED`] of
/// them by number.
fn waiting(values: &Values<'_, Datum>, owner: &dyn Fn(Node) -> CellId) -> Option<Datum> {
    let mut causes: Vec<CellId> = Vec::new();
    for &input in values.inputs() {
        match values.get(input) {
            Some(Datum::Fault(_)) => causes.push(owner(input)),
            Some(Datum::Waiting(cells)) => causes.extend(cells.iter()),
            Some(_) => {}
            None => causes.push(owner(input)),
        }
    }
    if causes.is_empty() {
        return None;
    }
    causes.sort_unstable();
    causes.dedup();
    causes.truncate(NAMED);
    Some(Datum::Waiting(Arc::new(causes)))
}

/// Works an entry out.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct EntryTask {
    pub(super) field: &'static str,
    /// Which entry of a field of pairs it is.
    pub(super) item: Option<Item>,
    pub(super) entry: Arc<Entry>,
    pub(super) expect: Expect,
    /// The unit that the result is to be shown in, where that was said.
    pub(super) unit: Option<Unit>,
    /// Where each name of the entry is found, in the order of the entry's names.
    pub(super) picks: Vec<Pick>,
}

/// Where the value behind a name is found.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Pick {
    pub(super) node: Node,
    /// The output of that node; `None` where the node is the quantity itself.
    pub(super) output: Option<(String, Option<String>)>,
}

impl EntryTask {
    fn run(
        &self,
        node: Node,
        inputs: Inputs<'_>,
        draw: Option<&Draw<'_>>,
    ) -> Result<Datum, Diagnostic> {
        // Most entries name a few cells at most: no allocation for those.
        let mut few = [Quantity::number(0.0); 4];
        let mut many = Vec::new();
        let names: &[Quantity] = if self.picks.len() <= few.len() {
            for (place, pick) in few.iter_mut().zip(&self.picks) {
                *place = self.pick(pick, inputs)?;
            }
            &few[..self.picks.len()]
        } else {
            for pick in &self.picks {
                many.push(self.pick(pick, inputs)?);
            }
            &many
        };
        let literals = draw
            .and_then(|draw| draw.literals(node))
            .unwrap_or_else(|| self.entry.nominal_literals());
        let outcome = self
            .entry
            .evaluate(names, literals)
            .map_err(|fault| Diagnostic::from_entry(self.field, fault))?;
        match outcome {
            Outcome::Quantity(mut quantity) => {
                if draw.is_some() {
                    quantity.si = self.expect.held(quantity.si);
                }
                fits(self.field, self.expect, self.unit.as_ref(), &quantity)?;
                Ok(Datum::Quantity(quantity))
            }
            Outcome::Truth(truth) if self.expect == Expect::ANYTHING => Ok(Datum::Truth(truth)),
            Outcome::Truth(_) => Err(Diagnostic::of_field(
                self.field,
                "not-a-quantity",
                "expected a quantity, found the answer to a comparison",
            )
            .with_hint("give a quantity; a comparison can stand in a formula of its own")),
        }
    }

    fn pick(&self, pick: &Pick, inputs: Inputs<'_>) -> Result<Quantity, Diagnostic> {
        let datum = inputs.datum(pick.node);
        match &pick.output {
            None => datum.as_quantity().ok_or_else(|| {
                Diagnostic::of_field(
                    self.field,
                    "not-a-quantity",
                    "expected a quantity, found the answer to a comparison",
                )
            }),
            Some((name, part)) => datum.pick(name, part.as_deref()).ok_or_else(|| {
                let whole = part
                    .as_ref()
                    .map_or_else(|| name.clone(), |part| format!("{name}.{part}"));
                Diagnostic::of_field(
                    self.field,
                    "no-such-value",
                    format!("output `{whole}` has no value here"),
                )
                .with_hint("look at that cell: it may be met everywhere, unlimited, or not there")
            }),
        }
    }
}

/// Says what is wrong with a quantity for its field.
pub(super) fn fits(
    field: &'static str,
    expect: Expect,
    unit: Option<&Unit>,
    quantity: &Quantity,
) -> Result<(), Diagnostic> {
    expect.check(quantity).map_err(|(code, message, hint)| {
        Diagnostic::of_field(field, code, message).with_hint(hint)
    })?;
    if let Some(unit) = unit
        && let Err(error) = quantity.to_unit(unit)
    {
        return Err(
            Diagnostic::of_field("unit", "not-in-that-unit", error.to_string())
                .with_hint("differences of temperature are shown in K"),
        );
    }
    if expect == Expect::TEMPERATURE && quantity.sense == Sense::Difference {
        return Err(Diagnostic::of_field(
            field,
            "difference-for-temperature",
            "expected a temperature, found a difference of two temperatures",
        )
        .with_hint("add it to a temperature: `t_hearth + (t_a - t_b)`"));
    }
    Ok(())
}
