//! Turns a cell's fields into nodes, tasks and links.

use std::collections::BTreeSet;
use std::sync::Arc;

use super::{Engine, Slot, outputs_of};
use crate::entry::{self, Entry, NameUse};
use crate::graph::Node;
use crate::guidance::Library;
use crate::notebook::Diagnostic;
use crate::notebook::cell::field::{Content, Expect, Form, Need, Pairs, Spec};
use crate::notebook::cell::position::Facing;
use crate::notebook::cell::{
    Cell, Kind, assessment, curve, position, screen, source, surroundings, zone,
};
use crate::notebook::datum::CellId;
use crate::notebook::listed::{self, ListedTask};
use crate::notebook::scene::ApartTask;
use crate::notebook::task::{EntryTask, Pick, Task};
use crate::spelling::nearest;
use crate::units::Unit;

/// What linking one cell needs: its fields to read, its faults to say, its
/// groups to set.
pub(in crate::notebook) struct Linker<'e> {
    engine: &'e mut Engine,
    id: CellId,
    cell: Arc<Cell>,
    faults: Vec<Diagnostic>,
    mentions: BTreeSet<String>,
    used: BTreeSet<Slot>,
    /// The unit that a formula is to be shown in.
    unit: Option<Unit>,
}

impl<'e> Linker<'e> {
    pub(super) fn new(engine: &'e mut Engine, id: CellId, cell: Cell) -> Self {
        Linker {
            engine,
            id,
            cell: Arc::new(cell),
            faults: Vec::new(),
            mentions: BTreeSet::new(),
            used: BTreeSet::new(),
            unit: None,
        }
    }

    /// Links every field that is an entry, then what the kind makes of them.
    pub(super) fn link(&mut self) {
        let cell = Arc::clone(&self.cell);
        self.read_unit();
        for spec in cell.kind.fields() {
            if let Form::Entry(mut expect) = spec.form {
                if let Some(unit) = &self.unit {
                    expect.dimension = Some(unit.dimension());
                }
                self.entry_field(spec, expect);
            } else if let Form::Pairs(pairs) = spec.form {
                self.pair_field(spec, pairs);
            } else if matches!(spec.need, Need::Required) && cell.field(spec.name).is_none() {
                self.fault(missing(spec));
            }
        }
        match cell.kind {
            Kind::Value | Kind::Formula | Kind::Note => {}
            Kind::Surroundings => surroundings::link(self),
            Kind::Source => source::link(self),
            Kind::Screen => screen::link(self),
            Kind::Position => position::link(self),
            Kind::Curve => curve::link(self),
            Kind::Assessment => assessment::link(self),
            Kind::Zone => zone::link(self),
        }
    }

    /// Returns the slots in use and the names mentioned.
    pub(super) fn finish(mut self) -> (BTreeSet<Slot>, BTreeSet<String>) {
        if !self.faults.is_empty() {
            let faults = Arc::new(std::mem::take(&mut self.faults));
            let _ = self.set(Slot::Check, Task::Fault(faults));
        }
        (self.used, self.mentions)
    }

    /// Says a fault of this cell.
    pub(in crate::notebook) fn fault(&mut self, fault: Diagnostic) {
        self.faults.push(fault);
    }

    /// Returns the hidden nodes: where all sources are, what they emit, and
    /// the room.
    pub(in crate::notebook) fn scene(&self) -> [Node; 3] {
        [self.engine.form, self.engine.heat, self.engine.room]
    }

    /// Returns the number of the cell.
    pub(in crate::notebook) const fn id(&self) -> CellId {
        self.id
    }

    /// Returns the hidden node of the balance of all screens.
    pub(in crate::notebook) const fn balance(&self) -> Node {
        self.engine.balance
    }

    /// Sets the node that says whether this source or screen stands clear of
    /// all others.
    pub(in crate::notebook) fn apart(&mut self) {
        let task = ApartTask {
            layout: self.engine.layout,
            id: self.id,
            screen: self.cell.kind != Kind::Source,
        };
        let _ = self.group("apart", Some(Task::Apart(task)));
    }

    /// Returns whether a field was typed.
    pub(in crate::notebook) fn has(&self, field: &str) -> bool {
        self.cell.field(field).is_some()
    }

    /// Returns the node of an entry, if it was typed or has a default.
    pub(in crate::notebook) fn entry(&mut self, field: &'static str) -> Option<Node> {
        // The node of a field that was removed is there until linking ends.
        self.used
            .contains(&Slot::Field(field))
            .then(|| self.engine.slot(self.id, Slot::Field(field)))
            .flatten()
    }

    /// Returns the node of an entry that has a default or must be there.
    pub(in crate::notebook) fn always(&mut self, field: &'static str) -> Node {
        self.entry(field)
            .expect("a field with a default, or a required one, always has a node")
    }

    /// Returns the node of an entry that is needed here, or says that it is
    /// missing.
    pub(in crate::notebook) fn need(&mut self, field: &'static str, why: &str) -> Option<Node> {
        let node = self.entry(field);
        if node.is_none() {
            self.fault(
                Diagnostic::of_field(
                    field,
                    "missing-field",
                    format!("expected `{field}` for {why}, found nothing"),
                )
                .with_hint(format!("add `{field}`")),
            );
        }
        node
    }

    /// Returns the nodes of a field of pairs that is needed here, or says that
    /// it is missing.
    pub(in crate::notebook) fn need_pairs(
        &mut self,
        field: &'static str,
        why: &str,
    ) -> Option<Vec<[Node; 2]>> {
        if !self.has(field) {
            self.fault(
                Diagnostic::of_field(
                    field,
                    "missing-field",
                    format!("expected `{field}` for {why}, found nothing"),
                )
                .with_hint(format!("add `{field}`")),
            );
        }
        self.pairs(field)
    }

    /// Says that fields do not belong here, where they were typed.
    pub(in crate::notebook) fn refuse(&mut self, fields: &[&'static str], why: &str) {
        for field in fields {
            if self.has(field) {
                self.fault(
                    Diagnostic::of_field(
                        field,
                        "field-out-of-place",
                        format!("found `{field}`, which {why}"),
                    )
                    .with_hint(format!("remove `{field}`")),
                );
            }
        }
    }

    /// Returns the word of a field, or says which words there are.
    pub(in crate::notebook) fn word(&mut self, field: &'static str) -> Option<&'static str> {
        let spec = self.cell.kind.field(field)?;
        let Form::Word(words) = spec.form else {
            return None;
        };
        let text = self.cell.text(field)?.to_owned();
        let word = words.iter().find(|word| **word == text).copied();
        if word.is_none() {
            self.fault(
                Diagnostic::of_field(
                    field,
                    "unknown-word",
                    format!("expected one of {}, found `{text}`", words.join(", ")),
                )
                .with_hint(
                    suggest(nearest(&text, words.iter().copied()))
                        .unwrap_or_else(|| "choose one of them".to_owned()),
                ),
            );
        }
        word
    }

    /// Returns the cell that a field names, or says why there is none.
    pub(in crate::notebook) fn target(&mut self, field: &'static str) -> Option<CellId> {
        let spec = self.cell.kind.field(field)?;
        let Form::Cell(kinds) = spec.form else {
            return None;
        };
        let name = self.cell.text(field)?.to_owned();
        let _ = self.mentions.insert(name.clone());
        let found = self
            .engine
            .find(&name)
            .and_then(|id| Some((id, self.engine.cell(id)?.kind)));
        match found {
            Some((id, kind)) if kinds.contains(&kind) => Some(id),
            Some((_, kind)) => {
                self.fault(
                    Diagnostic::of_field(
                        field,
                        "wrong-kind",
                        format!(
                            "expected the name of a {}, found `{name}`, which is a {kind}",
                            kinds
                                .iter()
                                .map(|kind| kind.name())
                                .collect::<Vec<_>>()
                                .join(" or ")
                        ),
                    )
                    .with_hint("name another cell"),
                );
                None
            }
            None => {
                let fault = self.unknown(field, &name);
                self.fault(fault);
                None
            }
        }
    }

    /// Returns a node of another cell.
    pub(in crate::notebook) fn foreign(&mut self, id: CellId, slot: Slot) -> Node {
        self.engine.node(id, slot)
    }

    /// Returns the node of an entry of another cell, if it has one.
    pub(in crate::notebook) fn foreign_entry(
        &mut self,
        id: CellId,
        field: &'static str,
    ) -> Option<Node> {
        let cell = self.engine.cell(id)?;
        let spec = cell.kind.field(field)?;
        let given = matches!(spec.form, Form::Entry(_))
            && (cell.field(field).is_some() || !matches!(spec.need, Need::Optional));
        given.then(|| self.foreign(id, Slot::Field(field)))
    }

    /// Returns the ids of guidance in a field, or says which are not known.
    pub(in crate::notebook) fn guidance(&mut self, field: &'static str) -> Option<Vec<String>> {
        let texts: Vec<String> = self
            .cell
            .texts(field)
            .into_iter()
            .map(str::to_owned)
            .collect();
        let mut sound = !texts.is_empty();
        for (at, id) in texts.iter().enumerate() {
            if Library::shipped().get(id).is_none() {
                sound = false;
                let ids: Vec<&str> = Library::shipped().ids().collect();
                self.fault(
                    Diagnostic::of_field(
                        field,
                        "unknown-guidance",
                        format!("no guidance is known by the id `{id}`"),
                    )
                    .with_hint(
                        suggest(Library::shipped().suggest(id))
                            .unwrap_or_else(|| format!("known are {}", ids.join(", "))),
                    ),
                );
            } else if texts[..at].contains(id) {
                sound = false;
                self.fault(
                    Diagnostic::of_field(
                        field,
                        "twice",
                        format!("expected each limit once, found `{id}` twice"),
                    )
                    .with_hint("remove one of them"),
                );
            }
        }
        if texts.is_empty() && self.has(field) {
            self.fault(
                Diagnostic::of_field(
                    field,
                    "no-guidance",
                    "expected at least one limit, found none",
                )
                .with_hint("name a limit, such as `icnirp-2013-ir-eye`"),
            );
        }
        sound.then_some(texts)
    }

    /// Returns the whole number in a field, its default if it was left out, or
    /// says what is wrong with it.
    pub(in crate::notebook) fn count(&mut self, field: &'static str) -> Option<u32> {
        let spec = self.cell.kind.field(field)?;
        let Form::Count(least, most) = spec.form else {
            return None;
        };
        let number = match self.cell.field(field).map(|field| &field.content) {
            Some(Content::Count(number)) => *number,
            Some(Content::Text(_) | Content::List(_) | Content::Pairs(_)) => f64::NAN,
            None => match spec.need {
                Need::Default(text) => text.parse().unwrap_or(f64::NAN),
                Need::Required | Need::Optional => return None,
            },
        };
        if number.fract() == 0.0 && (f64::from(least)..=f64::from(most)).contains(&number) {
            // In range and whole, so the cast loses nothing.
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
            return Some(number as u32);
        }
        self.fault(
            Diagnostic::of_field(
                field,
                "not-a-count",
                format!("expected a whole number from {least} to {most}, found {number}"),
            )
            .with_hint(format!("write it as in `\"{field}\": 60`")),
        );
        None
    }

    /// Returns which way the receiver faces.
    pub(in crate::notebook) fn facing(&mut self) -> Option<Facing> {
        let text = match self.cell.field("faces").map(|field| &field.content) {
            None => return Some(Facing::Strongest),
            Some(Content::Text(text)) => text.trim().to_owned(),
            Some(Content::List(_) | Content::Count(_) | Content::Pairs(_)) => String::new(),
        };
        if text == "strongest" {
            return Some(Facing::Strongest);
        }
        if entry::is_name(&text) {
            let _ = self.mentions.insert(text.clone());
            match self.engine.find(&text) {
                None => {
                    let fault = Diagnostic::of_field(
                        "faces",
                        "unknown-name",
                        format!("no cell is named `{text}`"),
                    );
                    self.fault(
                        fault.with_hint(
                            "write `strongest`, the name of a source, or a heading in °",
                        ),
                    );
                    return None;
                }
                Some(id) if self.engine.cell(id).is_some_and(|c| c.kind == Kind::Source) => {
                    return Some(Facing::Source(self.foreign(id, Slot::Group("shape"))));
                }
                Some(_) => {}
            }
        }
        let heading = self.set_entry(Slot::Field("faces"), &text, Expect::HEADING, None);
        Some(Facing::Heading {
            heading,
            tilt: self.entry("tilt"),
        })
    }

    /// Sets the task of one group; without one, the group waits for its cell.
    pub(in crate::notebook) fn group(&mut self, name: &'static str, task: Option<Task>) -> Node {
        let task = task.unwrap_or(Task::Stuck(self.id));
        self.set(Slot::Group(name), task)
    }

    fn set(&mut self, slot: Slot, task: Task) -> Node {
        let node = self.engine.node(self.id, slot);
        let _ = self.used.insert(slot);
        self.engine.set(node, task);
        node
    }

    fn read_unit(&mut self) {
        let Some(text) = self.cell.text("unit").map(str::to_owned) else {
            return;
        };
        match Unit::parse(&text) {
            Ok(unit) => self.unit = Some(unit),
            Err(error) => self.fault(
                Diagnostic::of_field("unit", "unknown-unit", error.to_string()).with_hint(
                    suggest(Unit::suggest(&text))
                        .unwrap_or_else(|| "write a unit such as `kW/m²`".to_owned()),
                ),
            ),
        }
    }

    fn entry_field(&mut self, spec: &'static Spec, expect: Expect) {
        let cell = Arc::clone(&self.cell);
        let text = match (cell.field(spec.name).map(|f| &f.content), spec.need) {
            (Some(Content::Text(text)), _) => text.as_str(),
            (Some(Content::List(_) | Content::Count(_) | Content::Pairs(_)), _) => "",
            (None, Need::Default(text)) => text,
            (None, Need::Optional) => return,
            (None, Need::Required) => {
                let _ = self.set(
                    Slot::Field(spec.name),
                    Task::Fault(Arc::new(vec![missing(spec)])),
                );
                return;
            }
        };
        let unit = self.unit.clone();
        let _ = self.set_entry(Slot::Field(spec.name), text, expect, unit);
    }

    fn pair_field(&mut self, spec: &'static Spec, form: &'static Pairs) {
        let cell = Arc::clone(&self.cell);
        if cell.field(spec.name).is_none() {
            return;
        }
        let Some(pairs) = cell.pairs(spec.name) else {
            let found = cell.field(spec.name).map(|field| field.content.to_text());
            self.fault(
                Diagnostic::of_field(
                    spec.name,
                    "not-pairs",
                    format!(
                        "expected pairs such as `{}`, found `{}`",
                        form.example,
                        found.unwrap_or_default()
                    ),
                )
                .with_hint("part the two of a pair by a comma, and pairs by a semicolon"),
            );
            return;
        };
        if !(form.least..=form.most).contains(&pairs.len()) {
            self.fault(
                Diagnostic::of_field(
                    spec.name,
                    "pair-count",
                    format!(
                        "expected from {} to {} pairs, found {}",
                        form.least,
                        form.most,
                        pairs.len()
                    ),
                )
                .with_hint(format!("write them as in `{}`", form.example)),
            );
            return;
        }
        for (number, pair) in (0_u16..).zip(pairs.iter()) {
            for (side, (text, expect)) in (0_u8..).zip(pair.iter().zip(form.sides)) {
                let slot = Slot::Item(spec.name, (number, side));
                let _ = self.set_entry(slot, text, expect, None);
            }
        }
    }

    /// Returns the nodes of a field of pairs, if it was typed and has as many
    /// as it may.
    pub(in crate::notebook) fn pairs(&self, field: &'static str) -> Option<Vec<[Node; 2]>> {
        let node = |number, side| {
            let slot = Slot::Item(field, (number, side));
            self.used
                .contains(&slot)
                .then(|| self.engine.slot(self.id, slot))
                .flatten()
        };
        let pairs: Vec<[Node; 2]> = (0_u16..)
            .map_while(|number| Some([node(number, 0)?, node(number, 1)?]))
            .collect();
        (!pairs.is_empty()).then_some(pairs)
    }

    fn set_entry(&mut self, slot: Slot, text: &str, expect: Expect, unit: Option<Unit>) -> Node {
        let field = slot.field().expect("an entry stands in a field");
        let item = match slot {
            Slot::Item(_, item) => Some(item),
            _ => None,
        };
        match listed::read(field, text) {
            Some(Ok(row)) => {
                let task = ListedTask {
                    field,
                    item,
                    row,
                    expect,
                    unit,
                };
                return self.set(slot, Task::Listed(task));
            }
            Some(Err(fault)) => {
                let faults = vec![fault.in_item(item)];
                return self.set(slot, Task::Fault(Arc::new(faults)));
            }
            None => {}
        }
        let entry = match self.parsed(slot, text) {
            Ok(entry) => entry,
            Err(faults) => {
                let faults = faults
                    .into_iter()
                    .map(|fault| Diagnostic::from_entry(field, fault).in_item(item))
                    .collect();
                return self.set(slot, Task::Fault(Arc::new(faults)));
            }
        };
        let mut picks = Vec::with_capacity(entry.names().len());
        let mut faults = Vec::new();
        for name in entry.names() {
            match self.pick(field, name) {
                Ok(pick) => picks.push(pick),
                Err(fault) => faults.push(fault.in_item(item)),
            }
        }
        if faults.is_empty() {
            self.set(
                slot,
                Task::Entry(EntryTask {
                    field,
                    item,
                    entry,
                    expect,
                    unit,
                    picks,
                }),
            )
        } else {
            self.set(slot, Task::Fault(Arc::new(faults)))
        }
    }

    /// Parses an entry, unless it is the one that stands there already.
    fn parsed(&self, slot: Slot, text: &str) -> Result<Arc<Entry>, Vec<entry::Diagnostic>> {
        let old = self
            .engine
            .slot(self.id, slot)
            .and_then(|node| self.engine.task(node));
        if let Some(Task::Entry(task)) = old
            && task.entry.text() == text
        {
            return Ok(Arc::clone(&task.entry));
        }
        Entry::parse(text).map(Arc::new)
    }

    /// Finds what a name in an entry stands for.
    fn pick(&mut self, field: &'static str, name: &NameUse) -> Result<Pick, Diagnostic> {
        let _ = self.mentions.insert(name.cell.clone());
        let at = name.span.clone();
        let Some(id) = self.engine.find(&name.cell) else {
            return Err(self.unknown(field, &name.cell).at(at));
        };
        let kind = self
            .engine
            .cell(id)
            .map(|cell| cell.kind)
            .expect("the index holds cells that are there");
        let (member, part) = match name.member.as_slice() {
            [] => match kind.main_output() {
                Some(output) => (output, None),
                None => {
                    return Err(Diagnostic::of_field(
                        field,
                        "no-main-value",
                        format!("`{}` is a {kind}, which has no single value", name.cell),
                    )
                    .at(at)
                    .with_hint(format!("write `{}.` and what you mean of it", name.cell)));
                }
            },
            [member] => (member.as_str(), None),
            [member, part] => (member.as_str(), Some(part.clone())),
            [_, _, ..] => {
                return Err(Diagnostic::of_field(
                    field,
                    "unknown-member",
                    format!("`{}` has nothing so deep inside", name.cell),
                )
                .at(at)
                .with_hint("write `cell.field` or `cell.output`"));
            }
        };
        if let Some(spec) = kind.field(member)
            && part.is_none()
        {
            return match self.foreign_entry(id, spec.name) {
                Some(node) => Ok(Pick { node, output: None }),
                None => Err(Diagnostic::of_field(
                    field,
                    "no-such-value",
                    format!("`{}` has no quantity in its field `{member}`", name.cell),
                )
                .at(at)
                .with_hint("give that field there, or name another")),
            };
        }
        let listed = kind.outputs().contains(&member) && member != "rows";
        let takes_part = kind == Kind::Position && position::BY_SOURCE.contains(&member);
        if !listed || takes_part != part.is_some() {
            let known: Vec<&str> =
                kind.outputs()
                    .iter()
                    .copied()
                    .filter(|output| *output != "rows")
                    .chain(kind.fields().iter().filter_map(|spec| {
                        matches!(spec.form, Form::Entry(_)).then_some(spec.name)
                    }))
                    .collect();
            let hint = if takes_part {
                format!("name the source too: `{}.{member}.door`", name.cell)
            } else {
                suggest(nearest(member, known.iter().copied()))
                    .unwrap_or_else(|| format!("a {kind} has {}", known.join(", ")))
            };
            return Err(Diagnostic::of_field(
                field,
                "unknown-member",
                format!(
                    "`{}` has no quantity `{}`",
                    name.cell,
                    name.member.join(".")
                ),
            )
            .at(at)
            .with_hint(hint));
        }
        if let Some(part) = &part {
            let _ = self.mentions.insert(part.clone());
        }
        let node = match outputs_of(kind) {
            Some(slot) => self.foreign(id, slot),
            None => self.engine.room,
        };
        let plain = matches!(kind, Kind::Value | Kind::Formula);
        Ok(Pick {
            node,
            output: (!plain).then(|| (member.to_owned(), part)),
        })
    }

    fn unknown(&self, field: &'static str, name: &str) -> Diagnostic {
        Diagnostic {
            missing: Some(name.into()),
            ..Diagnostic::of_field(field, "unknown-name", format!("no cell is named `{name}`"))
        }
    }
}

impl Engine {
    /// Returns the remedy for a name that no cell has.
    pub(in crate::notebook) fn remedy(&self, name: &str) -> String {
        // A damaged file may hold very many unknown names: the search is bounded.
        let cells = self.notebook.cells.iter().take(2000);
        let known = cells.map(|cell| cell.name.as_str());
        suggest(nearest(name, known))
            .unwrap_or_else(|| "add a cell of that name, or name another".to_owned())
    }
}

fn suggest(near: Option<&str>) -> Option<String> {
    near.map(|near| format!("did you mean `{near}`?"))
}

fn missing(spec: &Spec) -> Diagnostic {
    Diagnostic::of_field(
        spec.name,
        "missing-field",
        format!("expected {}, found nothing", spec.about),
    )
    .with_hint(format!("add `{}`", spec.name))
}
