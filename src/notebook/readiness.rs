//! What still stops a worksheet from being issued as final.

use super::caution::{is_assessed, is_unconfirmed, unconfirmed_limits};
use super::cell::Kind;
use super::engine::Engine;
use super::results::{CellResult, State};

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
    let used = notebook
        .cells
        .iter()
        .filter(|cell| matches!(cell.kind, Kind::Assessment | Kind::Zone))
        .flat_map(|cell| cell.texts("guidance"));
    let recalled = unconfirmed_limits(engine, used);
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
    for (line, what) in NEEDED_LINES {
        let text = notebook
            .job
            .lines()
            .into_iter()
            .find(|(name, _)| *name == line)
            .and_then(|(_, text)| text);
        if text.is_none_or(|text| text.trim().is_empty()) {
            items.push(Item {
                code: "job-line",
                text: format!("fill in {what}"),
                cell: None,
            });
        }
    }
    items
}
