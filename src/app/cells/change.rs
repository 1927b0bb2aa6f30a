//! The changes that are made in the cells, each with its title in undo.

use super::{Action, new, sentence};
use crate::notebook::cell::{Basis, Cell, Content, Field, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::edit::Edit;
use crate::notebook::engine::Engine;

fn what(cell: &Cell, field: &str) -> String {
    match (cell.kind, field) {
        (Kind::Value | Kind::Formula, "entry") | (Kind::Note, _) => cell.name.clone(),
        _ => format!("{} of {}", sentence::label(field), cell.name),
    }
}

/// Returns one change.
pub fn one(title: String, edit: Edit) -> Action {
    Action::Change {
        title,
        edit,
        joins: false,
        select: None,
    }
}

/// Returns the adding of a cell, which is then selected.
pub fn added(title: String, cell: Cell, at: usize) -> Action {
    Action::Change {
        title,
        select: Some(cell.name.clone()),
        edit: Edit::Add { at, cell },
        joins: false,
    }
}

/// Returns what follows for the cell of this number, by its name.
pub fn with_name(engine: &Engine, id: CellId, then: impl FnOnce(String) -> Action) -> Action {
    engine
        .cell(id)
        .map_or(Action::None, |cell| then(cell.name.clone()))
}

/// Sets a field, keeping its basis and remark. An emptied field that may be
/// left out is left out.
pub fn set(cell: &Cell, field: &'static str, content: Content, joins: bool) -> Action {
    let empty = match &content {
        Content::Text(text) => text.is_empty(),
        Content::List(list) => list.is_empty(),
        Content::Count(_) => false,
        Content::Pairs(pairs) => pairs.is_empty(),
    };
    let old = cell.field(field);
    let keeps = old.is_some_and(|old| old.basis.is_some() || old.note.is_some());
    let content = (!empty || keeps).then(|| match old {
        Some(old) => Field {
            content,
            ..old.clone()
        },
        None => Field::new(field, content),
    });
    Action::Change {
        title: format!("change {}", what(cell, field)),
        edit: Edit::SetField {
            name: cell.name.clone(),
            field,
            content,
        },
        joins,
        select: None,
    }
}

/// Leaves a field out.
pub fn leave_out(cell: &Cell, field: &'static str) -> Action {
    if cell.field(field).is_none() {
        return Action::None;
    }
    one(
        format!("change {}", what(cell, field)),
        Edit::SetField {
            name: cell.name.clone(),
            field,
            content: None,
        },
    )
}

/// Sets the basis of an input, or takes it back if it has this one; `None`
/// where there is no input to be the basis of.
pub fn base(cell: &Cell, field: &'static str, basis: Basis) -> Option<Action> {
    if cell.kind == Kind::Value {
        // It is a field of its own there.
        let own = cell.text("basis") == Some(basis.words());
        let text = if own { "" } else { basis.words() };
        return Some(set(cell, "basis", Content::Text(text.to_owned()), false));
    }
    described(cell, field, false, |field| {
        field.basis = (field.basis != Some(basis)).then_some(basis);
    })
}

/// Sets the remark on an input; `None` where there is none.
pub fn remark(cell: &Cell, field: &'static str, text: String, joins: bool) -> Option<Action> {
    if cell.kind == Kind::Value {
        return Some(set(cell, "note", Content::Text(text), joins));
    }
    described(cell, field, joins, |field| {
        field.note = (!text.is_empty()).then_some(text);
    })
}

fn described(
    cell: &Cell,
    field: &'static str,
    joins: bool,
    describe: impl FnOnce(&mut Field),
) -> Option<Action> {
    let mut content = cell.field(field)?.clone();
    describe(&mut content);
    Some(Action::Change {
        title: format!("say where {} came from", what(cell, field)),
        edit: Edit::SetField {
            name: cell.name.clone(),
            field,
            content: Some(content),
        },
        joins,
        select: None,
    })
}

/// Returns the remark on a field's input.
pub fn note_of(cell: &Cell, field: &str) -> String {
    match cell.kind {
        Kind::Value => cell.text("note").map(str::to_owned),
        _ => cell.field(field).and_then(|field| field.note.clone()),
    }
    .unwrap_or_default()
}

/// Adds a copy of a cell after it.
pub fn duplicate(engine: &Engine, id: CellId) -> Action {
    let Some(cell) = engine.cell(id) else {
        return Action::None;
    };
    let at = engine.notebook().find(&cell.name).map_or(0, |at| at + 1);
    let mut copy = cell.clone();
    copy.name = new::free(engine, &cell.name);
    added(format!("copy {}", cell.name), copy, at)
}

/// Moves a cell up or down.
pub fn shift(engine: &Engine, id: CellId, down: bool) -> Action {
    with_name(engine, id, |name| {
        let cells = engine.notebook().cells.len();
        let at = engine.notebook().find(&name).unwrap_or(0);
        let to = if down { at + 1 } else { at.saturating_sub(1) };
        if to == at || to >= cells {
            return Action::None;
        }
        one(format!("move {name}"), Edit::Move { name, to })
    })
}
