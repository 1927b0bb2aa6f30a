//! Fields whose entry names a row of a library, `of cast_iron_molten_clean`.
//!
//! Such a field is one independent input: its nominal value is the row's typical
//! one, and its draws have the row's range as their central 95 %. Two fields
//! that name the same row are two inputs; what they are to share stands in a
//! value cell of its own.

use super::Diagnostic;
use super::caution::{Caution, called};
use super::cell::field::{Expect, Item};
use super::cell::{Basis, Cell, Kind};
use super::datum::{CellId, Datum};
use super::engine::{Engine, Slot};
use super::readiness;
use super::task::{Task, fits};
use super::uncertainty::Draw;
use crate::entry::RowUse;
use crate::graph::Node;
use crate::material::{Directions, HowKnown, Library, Property, Row};
use crate::units::{Dimension, Unit, format};

/// Takes the value of a row.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct ListedTask {
    pub(super) field: &'static str,
    pub(super) item: Option<Item>,
    pub(super) row: &'static Row,
    pub(super) expect: Expect,
    /// The unit that the value is to be shown in, where that was said.
    pub(super) unit: Option<Unit>,
}

impl ListedTask {
    pub(super) fn run(&self, node: Node, draw: Option<&Draw<'_>>) -> Result<Datum, Diagnostic> {
        let mut quantity = self.row.quantity();
        if let Some([drawn]) = draw.and_then(|draw| draw.literals(node)) {
            quantity.si = *drawn;
        }
        fits(self.field, self.expect, self.unit.as_ref(), &quantity)
            .map_err(|fault| fault.in_item(self.item))?;
        Ok(Datum::Quantity(quantity))
    }
}

/// Returns the row that an entry names; `None` for an entry that names none.
///
/// # Errors
///
/// The fault at its place: no such row, with the nearest one, or something else
/// behind it.
pub(super) fn read(field: &'static str, text: &str) -> Option<Result<&'static Row, Diagnostic>> {
    let used = match RowUse::read(text)? {
        Ok(used) => used,
        Err(fault) => return Some(Err(Diagnostic::from_entry(field, fault))),
    };
    let library = Library::shipped();
    Some(library.get(&used.id).ok_or_else(|| {
        let hint = library.suggest(&used.id).map_or_else(
            || "look the row up in the list of materials and temperatures".to_owned(),
            |near| format!("did you mean `of {near}`?"),
        );
        let message = format!("no material or process is known by the id `{}`", used.id);
        Diagnostic::of_field(field, "unknown-row", message)
            .with_hint(hint)
            .at(used.span)
    }))
}

/// A field that names a row.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Named {
    /// The field.
    pub field: &'static str,
    /// The row.
    pub row: &'static Row,
}

impl Engine {
    /// Returns the fields of a cell that name a row, in the order of its kind.
    #[must_use]
    pub fn rows_named(&self, id: CellId) -> Vec<Named> {
        self.nodes(id)
            .iter()
            .filter_map(|(_, node)| match self.task(*node)? {
                Task::Listed(task) => Some(Named {
                    field: task.field,
                    row: task.row,
                }),
                _ => None,
            })
            .collect()
    }

    /// Returns all nodes that take the value of a row with a range, in file
    /// order.
    pub(super) fn listed(&self) -> impl Iterator<Item = (CellId, Slot, Node, &'static Row)> {
        self.notebook()
            .cells
            .iter()
            .filter_map(|cell| self.find(&cell.name))
            .flat_map(move |id| {
                self.nodes(id)
                    .iter()
                    .filter_map(move |(slot, node)| match self.task(*node)? {
                        Task::Listed(task) if task.row.has_spread() => {
                            Some((id, *slot, *node, task.row))
                        }
                        _ => None,
                    })
            })
    }

    /// Returns the row whose value a field has: that which it names, or that
    /// which stands in the cell that it names and nothing else.
    fn row_behind(&self, id: CellId, field: &'static str) -> Option<&'static Row> {
        let mut node = self.slot(id, Slot::Field(field))?;
        // Longer chains of bare names are nobody's, and a ring never ends.
        for _ in 0..16 {
            match self.task(node)? {
                Task::Listed(task) => return Some(task.row),
                Task::Entry(task) => {
                    let ([name], [pick]) = (task.entry.names(), task.picks.as_slice()) else {
                        return None;
                    };
                    let is_bare = name.span.len() == task.entry.text().trim().chars().count();
                    if !is_bare || pick.output.is_some() {
                        return None;
                    }
                    node = pick.node;
                }
                _ => return None,
            }
        }
        None
    }
}

/// Returns the basis of a field that names a row, where nobody gave it one of
/// its own: a handbook at best, and unconfirmed where the row is recalled.
#[must_use]
pub const fn basis(row: &Row) -> Basis {
    match row.how_known {
        HowKnown::Read | HowKnown::Computed => Basis::Handbook,
        HowKnown::CommonPractice => Basis::CommonPractice,
        HowKnown::Memory => Basis::Unconfirmed,
    }
}

/// The basis that was typed for a field.
fn typed_basis(cell: &Cell, field: &str) -> Option<Basis> {
    let own = cell.field(field).and_then(|field| field.basis);
    let whole = (field == "entry").then(|| cell.text("basis").and_then(Basis::from_words));
    own.or(whole.flatten())
}

/// The fields with an emissivity, and that with the temperature that it has to
/// be for; a screen's is worked out.
const EMISSIVITIES: [(&str, Option<&str>); 5] = [
    ("emissivity", Some("temperature")),
    ("near_ir_emissivity", Some("temperature")),
    ("wall_emissivity", Some("wall_temperature")),
    ("front_emissivity", None),
    ("back_emissivity", None),
];

/// Below this an emissivity is a bare metal's, whose emission grows towards
/// grazing angles.
const BARE: f64 = 0.5;

/// Adds the warnings that the rows behind a cell's fields call up.
pub(super) fn cautions(engine: &Engine, id: CellId, cautions: &mut Vec<Caution>) {
    for named in engine.rows_named(id) {
        if named.row.how_known == HowKnown::Memory {
            cautions.push(called("row-recalled", Some(named.field), &[&named.row.id]));
        }
    }
    let Some(cell) = engine.cell(id) else { return };
    for (name, beside) in EMISSIVITIES {
        let Some(field) = cell.kind.field(name).map(|spec| spec.name) else {
            continue;
        };
        let Some(row) = engine.row_behind(id, field) else {
            continue;
        };
        let temperature = match beside {
            Some(beside) => cell
                .kind
                .field(beside)
                .and_then(|spec| engine.value_of(id, Slot::Field(spec.name)))
                .and_then(Datum::as_quantity),
            None => engine
                .value_of(id, Slot::Group("outcome"))
                .and_then(|outcome| outcome.pick("temperature", None)),
        };
        if let (Some([from, to]), Some(valid), Some(found)) =
            (row.valid, row.valid_words(), temperature)
            && !(from - HAIR..=to + HAIR).contains(&found.si)
        {
            let unit = format::natural_unit(Dimension::TEMPERATURE, found.si, None);
            let found = format::quantity(found.si, &unit, 4, format::Rounding::Nearest);
            cautions.push(called(
                "row-temperature",
                Some(field),
                &[&row.id, &valid, &found],
            ));
        }
        let is_near_infrared = name == "near_ir_emissivity";
        match row.property {
            Property::SpectralEmissivity(_) if !is_near_infrared => {
                let words = row.property.words();
                cautions.push(called("row-spectral", Some(field), &[&row.id, &words]));
            }
            Property::TotalEmissivity(_) if is_near_infrared => {
                cautions.push(called("row-total", Some(field), &[&row.id]));
            }
            Property::TotalEmissivity(Directions::Normal)
                if row.typical < BARE && cell.kind == Kind::Source =>
            {
                cautions.push(called("row-normal", Some(field), &[&row.id]));
            }
            _ => {}
        }
    }
}

/// Temperatures that differ by less, in kelvin, are the same: the rounding of
/// °C and °F.
const HAIR: f64 = 0.01;

/// Adds what is left to do about rows before a sheet is issued as final.
pub(super) fn readiness(engine: &Engine, items: &mut Vec<readiness::Item>) {
    for (place, cell) in engine.notebook().cells.iter().enumerate() {
        let Some(id) = engine.id(place) else { continue };
        for named in engine.rows_named(id) {
            let what = match named.field {
                "entry" => "the value".to_owned(),
                field => format!("the {}", field.replace('_', " ")),
            };
            let (code, text) = match typed_basis(cell, named.field) {
                Some(Basis::Measured | Basis::Nameplate) => (
                    "basis-above-row",
                    format!(
                        "{what} of {} names a row of the library, which is a handbook's at best: \
                         type the value that was measured, or give it another basis",
                        cell.name
                    ),
                ),
                None if named.row.how_known == HowKnown::Memory => (
                    "row-recalled",
                    format!(
                        "compare the row {} with a handbook, since it is recalled and not read, \
                         and give {what} of {} its basis",
                        named.row.id, cell.name
                    ),
                ),
                _ => continue,
            };
            items.push(readiness::Item {
                code,
                text,
                cell: Some(cell.name.clone()),
            });
        }
    }
}

#[cfg(test)]
mod tests;
