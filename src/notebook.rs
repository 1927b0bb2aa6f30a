//! The linked cells of one job, and what is worked out from them.
//!
//! A [`Notebook`] is what is stored: cells with their fields as typed. An
//! [`engine::Engine`] keeps it worked out while it is edited; a
//! [`snapshot::Snapshot`] is the same, frozen, and evaluated purely, which is
//! what uncertainty and worksheets read. Nothing here knows a clock, a file or
//! a thread.

pub mod caution;
pub mod cell;
pub mod date;
pub mod datum;
pub mod diagnostic;
pub mod edit;
pub mod engine;
pub mod listed;
pub mod name;
pub mod readiness;
pub mod reference;
pub mod results;
pub mod scene;
pub mod snapshot;
mod task;
pub mod uncertainty;
pub mod wording;

pub use cell::{Cell, Kind};
pub use diagnostic::Diagnostic;

/// One job on one site: the cells with what was typed into them, nothing
/// worked out and no default filled in.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Notebook {
    /// The title that stands over the worksheet.
    pub title: Option<String>,
    /// Who, where and when.
    pub job: Job,
    /// Limits that somebody has compared with the edition in force.
    pub confirmed: Vec<Confirmation>,
    /// The cells, in reading order.
    pub cells: Vec<Cell>,
}

impl Notebook {
    /// Returns the index of the cell of this name.
    #[must_use]
    pub fn find(&self, name: &str) -> Option<usize> {
        self.cells.iter().position(|cell| cell.name == name)
    }

    /// Returns whether somebody has confirmed this limit in this edition.
    #[must_use]
    pub fn is_confirmed(&self, guidance: &str, edition: &str) -> bool {
        self.confirmed.iter().any(|confirmation| {
            confirmation.guidance == guidance
                && confirmation.edition == edition
                && !confirmation.by.trim().is_empty()
                && date::is_date(&confirmation.date)
        })
    }
}

/// The job block: who did what, where, when; `None` where the file leaves a
/// line out.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Job {
    /// The works.
    pub site: Option<String>,
    /// The bay or building.
    pub area: Option<String>,
    /// What is done there.
    pub task: Option<String>,
    /// The revision of this sheet.
    pub revision: Option<String>,
    /// Who prepared it.
    pub prepared_by: Option<String>,
    /// Who checked it.
    pub checked_by: Option<String>,
    /// The date of the sheet, `YYYY-MM-DD`.
    pub date: Option<String>,
}

impl Job {
    /// The lines of the block in order: the name in the file and the text.
    #[must_use]
    pub fn lines(&self) -> [(&'static str, Option<&str>); 7] {
        [
            ("site", self.site.as_deref()),
            ("area", self.area.as_deref()),
            ("task", self.task.as_deref()),
            ("revision", self.revision.as_deref()),
            ("prepared_by", self.prepared_by.as_deref()),
            ("checked_by", self.checked_by.as_deref()),
            ("date", self.date.as_deref()),
        ]
    }

    /// Returns the line of this name, to be changed; `None` for a name that
    /// the block does not have.
    pub fn line_mut(&mut self, name: &str) -> Option<&mut Option<String>> {
        Some(match name {
            "site" => &mut self.site,
            "area" => &mut self.area,
            "task" => &mut self.task,
            "revision" => &mut self.revision,
            "prepared_by" => &mut self.prepared_by,
            "checked_by" => &mut self.checked_by,
            "date" => &mut self.date,
            _ => return None,
        })
    }
}

/// A person's word that a limit known only by recall was compared with the
/// edition in force.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Confirmation {
    /// The limit's id.
    pub guidance: String,
    /// The edition it was compared with: must be the one the limit cites.
    pub edition: String,
    /// Who compared it.
    pub by: String,
    /// When, `YYYY-MM-DD`.
    pub date: String,
}
