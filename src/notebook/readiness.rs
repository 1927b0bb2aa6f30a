//! What still stops a worksheet from being issued as final.

use super::caution::{is_assessed, is_unconfirmed, unconfirmed_limits};
use super::cell::{Cell, Form, Kind, Need};
use super::date;
use super::datum::Datum;
use super::engine::{Engine, Slot};
use super::listed;
use super::results::{CellResult, State};
use crate::guidance::{Library, Limit};

/// One thing that is left to do.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Item {
    /// A stable word for machines.
    pub code: &'static str,
    /// What is to be done.
    pub text: String,
    /// The cell it is about, where it is about one.
    pub cell: Option<String>,
}

/// The lines of the job block without which a sheet cannot be filed.
const NEEDED_LINES: [(&str, &str); 5] = [
    ("site", "the site"),
    ("task", "what is done there"),
    ("revision", "the revision"),
    ("prepared_by", "who prepared it"),
    ("date", "the date"),
];

/// Returns the limits in use, with their families, that are known only by recall
/// and that nobody has confirmed.
#[must_use]
pub fn unconfirmed(engine: &Engine) -> Vec<&'static Limit> {
    let used = engine
        .notebook()
        .cells
        .iter()
        .filter(|cell| matches!(cell.kind, Kind::Assessment | Kind::Zone))
        .flat_map(|cell| cell.texts("guidance"));
    unconfirmed_limits(engine, used)
}

/// Returns everything that is left to do, in the order in which it is best
/// done.
pub(super) fn items(engine: &Engine, cells: &[CellResult]) -> Vec<Item> {
    let mut items = Vec::new();
    let notebook = engine.notebook();
    for cell in cells {
        let text = match &cell.state {
            State::Ok => continue,
            State::Error => format!("mend {}: it has an error", cell.name),
            State::Waiting(_) => continue,
        };
        items.push(Item {
            code: "error",
            text,
            cell: Some(cell.name.clone()),
        });
    }
    for cell in &notebook.cells {
        for field in &cell.fields {
            if is_unconfirmed(cell, field) {
                let what = if field.name == "basis" {
                    "value"
                } else {
                    field.name
                };
                items.push(Item {
                    code: "unconfirmed",
                    text: format!("confirm {what} of {} for this job", cell.name),
                    cell: Some(cell.name.clone()),
                });
            }
        }
    }
    if !notebook
        .cells
        .iter()
        .any(|cell| cell.kind == Kind::Position)
    {
        items.push(Item {
            code: "no-position",
            text: "add a position: a sheet without one decides nothing".to_owned(),
            cell: None,
        });
    }
    for cell in &notebook.cells {
        if cell.kind == Kind::Position && !is_assessed(engine, &cell.name) {
            items.push(Item {
                code: "not-judged",
                text: format!("assess position {}", cell.name),
                cell: Some(cell.name.clone()),
            });
        }
        if cell.kind == Kind::Position && cell.field("stay").is_none() {
            items.push(Item {
                code: "no-stay",
                text: format!("state how long people stay at {}", cell.name),
                cell: Some(cell.name.clone()),
            });
        }
    }
    for cell in cells {
        if cell.failed > 0 {
            items.push(Item {
                code: "unbounded",
                text: format!("narrow the spreads that reach {}", cell.name),
                cell: Some(cell.name.clone()),
            });
        }
    }
    doubts(cells, engine, &mut items);
    baseless(engine, &mut items);
    listed::readiness(engine, &mut items);
    let recalled = unconfirmed(engine);
    if !recalled.is_empty() {
        let ids: Vec<&str> = recalled.iter().map(|limit| limit.id.as_str()).collect();
        items.push(Item {
            code: "recalled",
            text: format!(
                "compare these limits, which are recalled and not read, with their editions in \
                 force, and confirm them in the notebook under `confirmed`: {}",
                ids.join(", ")
            ),
            cell: None,
        });
    }
    other_editions(engine, &mut items);
    let mut missing = |what: &str| {
        items.push(Item {
            code: "job-line",
            text: format!("fill in {what}"),
            cell: None,
        });
    };
    let empty = |text: Option<&str>| text.is_none_or(|text| text.trim().is_empty());
    if empty(notebook.title.as_deref()) {
        missing("the title");
    }
    for (line, what) in NEEDED_LINES {
        let text = notebook
            .job
            .lines()
            .into_iter()
            .find(|(name, _)| *name == line)
            .and_then(|(_, text)| text);
        if empty(text) {
            missing(what);
        } else if line == "date" && !text.is_some_and(date::is_date) {
            missing("the date as in 2026-12-01");
        }
    }
    items
}

/// The cautions that most likely tell of a slip: they are answered by a note.
const DOUBTS: [&str; 4] = [
    "odd-temperature",
    "band-above-whole",
    "eye-height",
    "behind",
];

fn doubts(cells: &[CellResult], engine: &Engine, items: &mut Vec<Item>) {
    for cell in cells {
        let answered = engine
            .cell(cell.id)
            .and_then(|typed| typed.text("note"))
            .is_some_and(|note| !note.trim().is_empty());
        for caution in &cell.cautions {
            if !answered && DOUBTS.contains(&caution.code.as_str()) {
                items.push(Item {
                    code: "doubt",
                    text: format!(
                        "look at {} again, or say in its note why it is right: {}",
                        cell.name, caution.text
                    ),
                    cell: Some(cell.name.clone()),
                });
            }
        }
    }
}

/// The inputs that a finding rests on: each says where it came from, unless it
/// is worked out from others.
const BASED: [(Kind, &[&str]); 4] = [
    (Kind::Value, &["entry"]),
    (
        Kind::Source,
        &[
            "diameter",
            "width",
            "height",
            "length",
            "temperature",
            "emissivity",
            "near_ir_emissivity",
            "vertices",
            "spectrum",
            "wall_thickness",
            "freeboard",
            "vessel_tilt",
            "wall_temperature",
        ],
    ),
    (
        Kind::Screen,
        &[
            "width",
            "height",
            "open_fraction",
            "transmittance",
            "near_ir_transmittance",
            "visible_transmittance",
            "front_emissivity",
            "back_emissivity",
            "front_absorptance",
            "back_absorptance",
        ],
    ),
    (Kind::Position, &["x", "y", "distance"]),
];

/// Returns whether an input says that there is none of it: no wall, no
/// freeboard, no tilt. That needs no basis.
fn is_none(engine: &Engine, place: usize, cell: &Cell, name: &str) -> bool {
    let value = engine
        .id(place)
        .zip(cell.kind.field(name))
        .and_then(|(id, spec)| engine.value_of(id, Slot::Field(spec.name)));
    matches!(spec_default(cell, name), Some("0 m" | "0 °"))
        && value
            .and_then(Datum::as_quantity)
            .is_some_and(|quantity| quantity.si == 0.0)
}

fn spec_default(cell: &Cell, name: &str) -> Option<&'static str> {
    match cell.kind.field(name)?.need {
        Need::Default(text) => Some(text),
        Need::Required | Need::Optional => None,
    }
}

fn baseless(engine: &Engine, items: &mut Vec<Item>) {
    for (place, cell) in engine.notebook().cells.iter().enumerate() {
        let Some((_, fields)) = BASED.iter().find(|(kind, _)| *kind == cell.kind) else {
            continue;
        };
        let missing: Vec<String> = fields
            .iter()
            .filter(|name| cell.field(name).is_some())
            .filter(|name| !is_none(engine, place, cell, name))
            .filter(|name| {
                let typed = engine
                    .id(place)
                    .zip(cell.kind.field(name))
                    .and_then(|(id, spec)| engine.entry(id, spec.name));
                let is_input = typed.is_some_and(|entry| entry.names().is_empty())
                    || cell.pairs(name).is_some_and(|_| {
                        cell.kind
                            .field(name)
                            .is_some_and(|spec| matches!(spec.form, Form::Pairs(_)))
                    });
                let has_basis = cell.field(name).is_some_and(|field| field.basis.is_some())
                    || (**name == "entry" && cell.field("basis").is_some());
                is_input && !has_basis
            })
            .map(|name| match *name {
                "entry" => "value".to_owned(),
                name => name.replace('_', " "),
            })
            .collect();
        if !missing.is_empty() {
            items.push(Item {
                code: "no-basis",
                text: format!(
                    "say where the {} of {} came from (its basis)",
                    missing.join(", "),
                    cell.name
                ),
                cell: Some(cell.name.clone()),
            });
        }
    }
}

/// Says which confirmations do not count, and why.
fn other_editions(engine: &Engine, items: &mut Vec<Item>) {
    for line in &engine.notebook().confirmed {
        let Some(limit) = Library::shipped().get(&line.guidance) else {
            items.push(Item {
                code: "confirmation",
                text: format!("no guidance is known by the confirmed id {}", line.guidance),
                cell: None,
            });
            continue;
        };
        let wrong = if line.edition != limit.edition {
            format!(
                "it names edition {}, but what is shipped is of {}: a limit of another edition \
                 has to be added as your own",
                line.edition, limit.edition
            )
        } else if line.by.trim().is_empty() {
            "it does not say who compared it".to_owned()
        } else if !date::is_date(&line.date) {
            "its date is not one as in 2026-12-01".to_owned()
        } else {
            continue;
        };
        items.push(Item {
            code: "confirmation",
            text: format!(
                "the confirmation of {} does not count: {wrong}",
                line.guidance
            ),
            cell: None,
        });
    }
}
