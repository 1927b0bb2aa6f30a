//! Keeps a notebook worked out while it is edited.
//!
//! A node of the graph is one input field or one group of outputs, never a
//! whole cell. Hidden nodes gather where all sources are, what they emit, and
//! the room; positions, curves and zones depend on them, so that a new source
//! reaches every position. Values in nodes are nominal.

mod change;
mod link;
mod ring;

use std::borrow::Cow;
use std::collections::{BTreeMap, BTreeSet, HashMap};
use std::sync::Arc;

use super::cell::field::Item;
use super::cell::surroundings::{Formula, Room, RoomTask};
use super::cell::{Cell, Kind};
use super::datum::{CellId, Datum};
use super::edit::{self, Edit};
use super::scene::{BalanceTask, Balanced, Form, FormTask, Heat, HeatTask, LayoutTask, Sender};
use super::task::Task;
use super::{Diagnostic, Notebook, name};
use crate::entry::Entry;
use crate::graph::{Graph, Node, Run};

pub(in crate::notebook) use link::Linker;

/// What a node stands for in its cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Slot {
    /// One input field.
    Field(&'static str),
    /// One entry of a field of pairs: the pair and the side, from 0.
    Item(&'static str, Item),
    /// One group of outputs, or a step towards it.
    Group(&'static str),
    /// The faults of the cell that are found while linking.
    Check,
}

impl Slot {
    /// Returns the field that it belongs to.
    #[must_use]
    pub const fn field(self) -> Option<&'static str> {
        match self {
            Slot::Field(field) | Slot::Item(field, _) => Some(field),
            Slot::Group(_) | Slot::Check => None,
        }
    }

    /// Returns the name by which draws of its literals are keyed.
    pub(in crate::notebook) fn key(self) -> Cow<'static, str> {
        match self {
            Slot::Field(field) | Slot::Group(field) => Cow::Borrowed(field),
            Slot::Item(field, (pair, side)) => Cow::Owned(format!("{field}[{pair}][{side}]")),
            Slot::Check => Cow::Borrowed(""),
        }
    }
}

/// Why a notebook cannot be opened at all.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Error {
    /// A cell's name is not one.
    #[error("cell {place}: {error}")]
    Name {
        /// The cell's place, from 1.
        place: usize,
        /// What is wrong with it.
        error: name::Error,
    },
    /// There is more than one room.
    #[error(
        "cell {place} `{name}`: expected one cell of kind surroundings at most, found a second: \
         remove one"
    )]
    SecondSurroundings {
        /// The second one's place, from 1.
        place: usize,
        /// Its name.
        name: String,
    },
    /// There are too many cells.
    #[error("expected at most {MOST_CELLS} cells, found {0}: split the job into several notebooks")]
    TooManyCells(usize),
}

/// The greatest number of cells.
pub const MOST_CELLS: usize = 100_000;

/// A notebook with everything in it worked out.
#[derive(Clone, Debug)]
pub struct Engine {
    notebook: Notebook,
    /// The numbers of the cells, parallel to the notebook's cells.
    ids: Vec<CellId>,
    next: u32,
    /// From a cell's number to its place in the notebook.
    places: HashMap<CellId, usize>,
    /// From a cell's name to its number.
    index: HashMap<String, CellId>,
    /// The nodes of each cell.
    slots: BTreeMap<CellId, Vec<(Slot, Node)>>,
    /// The names that each cell mentions.
    mentions: BTreeMap<CellId, BTreeSet<String>>,
    /// From a name to the cells that mention it, whether it exists or not.
    mentioned: HashMap<String, BTreeSet<CellId>>,
    graph: Graph<Datum>,
    /// What each node does, by the node's number.
    tasks: Vec<Option<Task>>,
    /// Whose each node is, by the node's number.
    owners: Vec<(CellId, Slot)>,
    layout: Node,
    form: Node,
    balance: Node,
    heat: Node,
    room: Node,
    /// Whether a source was added, removed, moved or renamed.
    scene_changed: bool,
}

impl Engine {
    /// Opens a notebook and works everything out.
    ///
    /// # Errors
    ///
    /// Every fault of the cells' names, a second room, or too many cells.
    /// Faults of entries and links do not stop it: they are found at their
    /// cells.
    pub fn open(notebook: Notebook) -> Result<Engine, Vec<Error>> {
        check(&notebook)?;
        let mut graph = Graph::new();
        let [layout, form, balance, heat, room] = [(); 5].map(|()| graph.add());
        let hidden = |name| (CellId::SCENE, Slot::Group(name));
        let mut engine = Engine {
            notebook: Notebook::default(),
            ids: Vec::new(),
            next: 1,
            places: HashMap::new(),
            index: HashMap::new(),
            slots: BTreeMap::new(),
            mentions: BTreeMap::new(),
            mentioned: HashMap::new(),
            graph,
            tasks: vec![None; 5],
            owners: ["layout", "form", "balance", "heat", "room"]
                .map(hidden)
                .to_vec(),
            layout,
            form,
            balance,
            heat,
            room,
            scene_changed: true,
        };
        engine.notebook = notebook;
        for at in 0..engine.notebook.cells.len() {
            let id = engine.number();
            engine.ids.push(id);
            let _ = engine
                .index
                .insert(engine.notebook.cells[at].name.clone(), id);
        }
        engine.count_places();
        for id in engine.ids.clone() {
            let _ = engine.link(id);
        }
        let _ = engine.run();
        Ok(engine)
    }

    /// Returns the notebook as it stands.
    #[must_use]
    pub fn notebook(&self) -> &Notebook {
        &self.notebook
    }

    /// Makes a change and works out what it reaches.
    ///
    /// Returns the change that takes it back, and what ran.
    ///
    /// # Errors
    ///
    /// [`edit::Error`] where the change cannot be made; nothing is changed then.
    pub fn apply(&mut self, edit: Edit) -> Result<(Edit, Run), edit::Error> {
        let changed = self.change(edit);
        // Also where several changes were taken back because one of them could
        // not be made: cells that went and came back have new nodes.
        let run = self.run();
        changed.map(|inverse| (inverse, run))
    }

    /// Returns the number of the cell at this place.
    #[must_use]
    pub fn id(&self, place: usize) -> Option<CellId> {
        self.ids.get(place).copied()
    }

    /// Returns the cell of this number.
    #[must_use]
    pub fn cell(&self, id: CellId) -> Option<&Cell> {
        self.notebook.cells.get(*self.places.get(&id)?)
    }

    /// Returns the place of the cell of this number in the notebook, from 0.
    #[must_use]
    pub fn place(&self, id: CellId) -> Option<usize> {
        self.places.get(&id).copied()
    }

    /// Returns the number of the cell of this name.
    #[must_use]
    pub fn find(&self, name: &str) -> Option<CellId> {
        self.index.get(name).copied()
    }

    /// Returns the cells that mention a name, in an entry or as a link.
    pub(in crate::notebook) fn mentioning(&self, name: &str) -> impl Iterator<Item = &Cell> {
        let cells = self.mentioned.get(name).into_iter().flatten();
        cells.filter_map(|id| self.cell(*id))
    }

    /// Returns the nodes of a cell with what they stand for.
    #[must_use]
    pub fn nodes(&self, id: CellId) -> &[(Slot, Node)] {
        self.slots.get(&id).map_or(&[], Vec::as_slice)
    }

    /// Returns the node that holds a cell's outputs.
    #[must_use]
    pub fn result(&self, id: CellId) -> Option<Node> {
        let kind = self.cell(id)?.kind;
        if kind == Kind::Surroundings {
            return Some(self.room);
        }
        self.slot(id, outputs_of(kind)?)
    }

    /// Returns the node of one slot of a cell.
    #[must_use]
    pub fn slot(&self, id: CellId, slot: Slot) -> Option<Node> {
        self.nodes(id)
            .iter()
            .find(|(own, _)| *own == slot)
            .map(|(_, node)| *node)
    }

    /// Returns the value of a node.
    #[must_use]
    pub fn value(&self, node: Node) -> Option<&Datum> {
        self.graph.value(node)
    }

    /// Returns the value of one slot of a cell.
    #[must_use]
    pub fn value_of(&self, id: CellId, slot: Slot) -> Option<&Datum> {
        self.value(self.slot(id, slot)?)
    }

    /// Returns where all sources and screens are, unless one of them is in
    /// error.
    #[must_use]
    pub fn form(&self) -> Option<&Arc<Form>> {
        match self.value(self.form)? {
            Datum::Form(form) => Some(form),
            _ => None,
        }
    }

    /// Returns the room, unless it is in error.
    #[must_use]
    pub fn room(&self) -> Option<&Room> {
        match self.value(self.room)? {
            Datum::Room(room) => Some(room),
            _ => None,
        }
    }

    /// Returns all screens in balance, unless something they stand on is in
    /// error.
    #[must_use]
    pub fn balanced(&self) -> Option<&Arc<Balanced>> {
        match self.value(self.balance)? {
            Datum::Balanced(balanced) => Some(balanced),
            _ => None,
        }
    }

    /// Returns what all sources and screens send, unless one of them is in
    /// error.
    #[must_use]
    pub fn heat(&self) -> Option<&Arc<Heat>> {
        match self.value(self.heat)? {
            Datum::Heat(heat) => Some(heat),
            _ => None,
        }
    }

    /// Returns the cells that one cell feeds, in file order.
    #[must_use]
    pub fn feeds(&self, id: CellId) -> Vec<CellId> {
        self.neighbours(id, |engine, node| engine.graph.feeds(node).to_vec())
    }

    /// Returns the cells that one cell is fed by, in file order.
    #[must_use]
    pub fn fed_by(&self, id: CellId) -> Vec<CellId> {
        self.neighbours(id, |engine, node| engine.graph.fed_by(node).to_vec())
    }

    /// Returns the parsed entry of a field, and the cell and output behind each
    /// of its names.
    #[must_use]
    pub(in crate::notebook) fn task(&self, node: Node) -> Option<&Task> {
        self.tasks.get(node.index())?.as_ref()
    }

    /// Returns the parsed entry of a field.
    #[must_use]
    pub fn entry(&self, id: CellId, field: &'static str) -> Option<&Entry> {
        match self.task(self.slot(id, Slot::Field(field))?)? {
            Task::Entry(task) => Some(&task.entry),
            _ => None,
        }
    }

    /// Returns the values behind the names of a field's entry, in order, as
    /// they were read; `None` for one that has none.
    #[must_use]
    pub fn read_by(&self, id: CellId, field: &'static str) -> Vec<Option<crate::units::Quantity>> {
        let Some(Task::Entry(task)) = self
            .slot(id, Slot::Field(field))
            .and_then(|node| self.task(node))
        else {
            return Vec::new();
        };
        task.picks
            .iter()
            .map(|pick| {
                let datum = self.value(pick.node)?;
                match &pick.output {
                    None => datum.as_quantity(),
                    Some((name, part)) => datum.pick(name, part.as_deref()),
                }
            })
            .collect()
    }

    /// Returns the graph, for the uncertainty pass.
    pub(in crate::notebook) const fn graph(&self) -> &Graph<Datum> {
        &self.graph
    }

    /// Returns whose a node is.
    pub(in crate::notebook) fn owner(&self, node: Node) -> (CellId, Slot) {
        self.owners[node.index()]
    }

    /// Returns all nodes with an entry, in file order.
    pub(in crate::notebook) fn entries(
        &self,
    ) -> impl Iterator<Item = (CellId, Slot, Node, &Entry)> {
        self.ids.iter().flat_map(move |id| {
            self.nodes(*id)
                .iter()
                .filter_map(move |(slot, node)| match (slot, self.task(*node)) {
                    (Slot::Field(_) | Slot::Item(..), Some(Task::Entry(task))) => {
                        Some((*id, *slot, *node, &*task.entry))
                    }
                    _ => None,
                })
        })
    }

    fn neighbours(&self, id: CellId, step: impl Fn(&Engine, Node) -> Vec<Node>) -> Vec<CellId> {
        // A hidden node is no neighbour: its other side is.
        let mut found = BTreeSet::new();
        let mut seen = BTreeSet::new();
        let mut front: Vec<Node> = self.nodes(id).iter().map(|(_, node)| *node).collect();
        if self
            .cell(id)
            .is_some_and(|cell| cell.kind == Kind::Surroundings)
        {
            front.push(self.room);
        }
        while let Some(node) = front.pop() {
            for next in step(self, node) {
                let (owner, _) = self.owner(next);
                if owner == CellId::SCENE {
                    if seen.insert(next) {
                        front.push(next);
                    }
                } else if owner != id {
                    let _ = found.insert(self.places[&owner]);
                }
            }
        }
        found.into_iter().map(|place| self.ids[place]).collect()
    }

    pub(in crate::notebook) const fn notebook_mut(&mut self) -> &mut Notebook {
        &mut self.notebook
    }

    fn number(&mut self) -> CellId {
        let id = CellId(self.next);
        self.next += 1;
        id
    }

    fn count_places(&mut self) {
        self.places = self
            .ids
            .iter()
            .enumerate()
            .map(|(place, id)| (*id, place))
            .collect();
    }

    /// Returns the node of a slot, made if it is not there.
    fn node(&mut self, id: CellId, slot: Slot) -> Node {
        if let Some(node) = self.slot(id, slot) {
            return node;
        }
        let node = self.graph.add();
        self.tasks.resize(node.index() + 1, None);
        self.owners.resize(node.index() + 1, (id, slot));
        self.owners[node.index()] = (id, slot);
        // In an order of their own, not in that of the edits, because what is
        // told of a cell follows it: fields as the kind lists them, then groups,
        // then the check.
        let kind = self.cell(id).map(|cell| cell.kind);
        let rank = |slot: &Slot| match slot {
            Slot::Field(name) | Slot::Item(name, _) => kind
                .and_then(|kind| kind.fields().iter().position(|spec| spec.name == *name))
                .unwrap_or(usize::MAX - 2),
            Slot::Group(_) => usize::MAX - 1,
            Slot::Check => usize::MAX,
        };
        let key = |slot: &Slot| (rank(slot), *slot);
        let slots = self.slots.entry(id).or_default();
        let at = slots.partition_point(|(own, _)| key(own) < key(&slot));
        slots.insert(at, (slot, node));
        node
    }

    /// Gives a node its task, and marks it stale if that is a new one.
    fn set(&mut self, node: Node, task: Task) {
        let place = &mut self.tasks[node.index()];
        if place.as_ref() != Some(&task) {
            self.graph.set_inputs(node, task.inputs());
            *place = Some(task);
        }
    }

    /// Links a cell's nodes afresh. Returns whether it now has other nodes
    /// than before, so that those who mention it must be linked again.
    fn link(&mut self, id: CellId) -> bool {
        let before = self.slots.get(&id).map_or(0, Vec::len);
        let Some(cell) = self.cell(id).cloned() else {
            return false;
        };
        if cell.kind.is_in_scene() {
            self.scene_changed = true;
        }
        let mut linker = Linker::new(self, id, cell);
        linker.link();
        let (used, mentions) = linker.finish();
        let old: Vec<(Slot, Node)> = self.slots.get(&id).cloned().unwrap_or_default();
        let mut removed = false;
        for (slot, node) in &old {
            if !used.contains(slot) {
                self.graph.remove(*node);
                self.tasks[node.index()] = None;
                removed = true;
            }
        }
        if let Some(slots) = self.slots.get_mut(&id) {
            slots.retain(|(slot, _)| used.contains(slot));
        }
        self.mention(id, &mentions);
        removed || before != old.len()
    }

    fn mention(&mut self, id: CellId, names: &BTreeSet<String>) {
        let old = self.mentions.insert(id, names.clone()).unwrap_or_default();
        for name in old.difference(names) {
            if let Some(cells) = self.mentioned.get_mut(name) {
                let _ = cells.remove(&id);
            }
        }
        for name in names.difference(&old) {
            let _ = self.mentioned.entry(name.clone()).or_default().insert(id);
        }
    }

    /// Links a cell and, where that changes what it offers, those who mention
    /// it.
    fn relink(&mut self, id: CellId) {
        if self.link(id)
            && let Some(name) = self.cell(id).map(|cell| cell.name.clone())
        {
            self.relink_mentions(&name);
        }
    }

    fn relink_mentions(&mut self, name: &str) {
        let cells: Vec<CellId> = self
            .mentioned
            .get(name)
            .map(|cells| cells.iter().copied().collect())
            .unwrap_or_default();
        for id in cells {
            let _ = self.link(id);
        }
    }

    fn gather_scene(&mut self) {
        if !std::mem::take(&mut self.scene_changed) {
            return;
        }
        let (mut names, mut ids) = (Vec::new(), Vec::new());
        let (mut shapes, mut senders, mut screens) = (Vec::new(), Vec::new(), Vec::new());
        let mut room = RoomTask::default();
        let mut formula = None;
        for (cell, id) in self.notebook.cells.iter().zip(&self.ids) {
            match cell.kind {
                Kind::Source | Kind::Screen => {
                    let is_screen = cell.kind == Kind::Screen;
                    let sends = if is_screen { "make" } else { "emission" };
                    let (Some(shape), Some(sends)) = (
                        self.slot(*id, Slot::Group("shape")),
                        self.slot(*id, Slot::Group(sends)),
                    ) else {
                        continue;
                    };
                    senders.push(if is_screen {
                        screens.push(*id);
                        Sender::Screen(sends)
                    } else {
                        Sender::Source(sends)
                    });
                    names.push(Arc::from(cell.name.as_str()));
                    ids.push(*id);
                    shapes.push(shape);
                }
                Kind::Surroundings => {
                    let field = |name| self.slot(*id, Slot::Field(name));
                    room.air = field("air_temperature");
                    room.radiant = field("radiant_temperature");
                    room.humidity = field("humidity");
                    room.speed = field("air_speed");
                    formula = cell.text("absorption").and_then(Formula::from_word);
                }
                _ => {}
            }
        }
        let layout = LayoutTask {
            names: names.clone(),
            ids,
            shapes: shapes.clone(),
        };
        self.set(self.layout, Task::Layout(layout));
        let form = FormTask {
            names,
            shapes,
            layout: self.layout,
            air: formula.is_some(),
        };
        self.set(self.form, Task::Form(form));
        // What nothing asks for must not make anything run.
        if formula.is_none() {
            room.humidity = None;
        }
        if screens.is_empty() {
            room.speed = None;
        }
        self.set(self.room, Task::Room(room));
        let balance = (!screens.is_empty()).then_some(self.balance);
        self.set(
            self.heat,
            Task::Heat(HeatTask {
                senders: senders.clone(),
                balance,
                air: formula.map(|formula| (self.room, formula)),
            }),
        );
        // Without screens nothing asks for the balance: it gathers nothing.
        if screens.is_empty() {
            senders.clear();
        }
        let balance = BalanceTask {
            form: self.form,
            room: self.room,
            senders,
            screens,
        };
        self.set(self.balance, Task::Balance(balance));
    }

    fn run(&mut self) -> Run {
        self.gather_scene();
        let (tasks, owners) = (&self.tasks, &self.owners);
        let owner = |node: Node| owners[node.index()].0;
        self.graph.run(
            &mut |node, values| match &tasks[node.index()] {
                Some(task) => task.run(node, values, &owner, None),
                // A node that another cell asked for, which its own cell never
                // made: that cell is waited for.
                None => Datum::Waiting(Arc::new(vec![owner(node)])),
            },
            &mut |node, _| {
                // Who is in it is told when the fault is, by the names of then.
                let mut fault = Diagnostic::of_cell("ring", "waits for itself");
                let (_, slot) = owners[node.index()];
                fault.field = slot.field();
                if let Slot::Item(_, item) = slot {
                    fault.item = Some(item);
                }
                Datum::Fault(Arc::new(vec![fault]))
            },
        )
    }
}

/// Returns the slot that holds the outputs of a kind.
pub(in crate::notebook) const fn outputs_of(kind: Kind) -> Option<Slot> {
    match kind {
        Kind::Value | Kind::Formula => Some(Slot::Field("entry")),
        Kind::Source | Kind::Screen => Some(Slot::Group("outcome")),
        Kind::Position => Some(Slot::Group("exposure")),
        Kind::Curve => Some(Slot::Group("rows")),
        Kind::Assessment => Some(Slot::Group("verdicts")),
        Kind::Zone => Some(Slot::Group("edge")),
        Kind::Surroundings | Kind::Note => None,
    }
}

fn check(notebook: &Notebook) -> Result<(), Vec<Error>> {
    if notebook.cells.len() > MOST_CELLS {
        return Err(vec![Error::TooManyCells(notebook.cells.len())]);
    }
    let mut errors = Vec::new();
    let mut names = BTreeSet::new();
    let mut room = false;
    for (at, cell) in notebook.cells.iter().enumerate() {
        let place = at + 1;
        if let Err(error) = name::check(&cell.name) {
            errors.push(Error::Name { place, error });
        } else if !names.insert(cell.name.as_str()) {
            errors.push(Error::Name {
                place,
                error: name::Error::Taken(cell.name.clone()),
            });
        }
        if cell.kind == Kind::Surroundings {
            if room {
                errors.push(Error::SecondSurroundings {
                    place,
                    name: cell.name.clone(),
                });
            }
            room = true;
        }
    }
    if errors.is_empty() {
        Ok(())
    } else {
        Err(errors)
    }
}
