//! The notebook on the desk with everything that belongs to it: the engine, the
//! history, the results, the work under way and the file. The one place where
//! the notebook changes.

use std::path::{Path, PathBuf};
use std::time::SystemTime;

use sha2::{Digest, Sha256};

use crate::notebook::Notebook;
use crate::notebook::edit::{self, Edit, History};
use crate::notebook::engine::{self, Engine};
use crate::notebook::results::Results;
use crate::notebook::snapshot::Snapshot;
use crate::notebook::uncertainty::{Bounds, Settings};
use crate::store::{file, schema, template};
use crate::work::Job;

/// A notebook on the desk.
#[derive(Debug)]
pub struct Desk {
    engine: Engine,
    history: History,
    results: Results,
    /// Whether the results carry their bounds.
    fresh: bool,
    /// Counts the states of the notebook, so that late work is known.
    round: u64,
    job: Option<Job>,
    file: Option<PathBuf>,
    /// What the file held when it was read, written or looked at last; `None`
    /// where it was not there.
    stamp: Option<Stamp>,
    /// The notebook as it is stored.
    stored: Stored,
    dirty: bool,
}

/// What the file holds of the notebook.
#[derive(Debug)]
enum Stored {
    /// There never was one.
    Never,
    /// This.
    Holds(Box<Notebook>),
    /// Nothing: it is gone, or somebody else's.
    Lost,
}

/// Who brings bytes to a file: the disk, or a test.
pub type Writer = fn(&Path, &[u8]) -> Result<(), file::Error>;

/// By what a file that somebody else changed is known.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Stamp {
    length: u64,
    written: Option<SystemTime>,
    /// The digest of what is in it.
    digest: [u8; 32],
}

impl Stamp {
    fn of(path: &Path, bytes: &[u8]) -> Option<Stamp> {
        let found = std::fs::metadata(path).ok()?;
        Some(Stamp {
            length: found.len(),
            written: found.modified().ok(),
            digest: Sha256::digest(bytes).into(),
        })
    }

    /// Returns whether a file was not touched since.
    fn holds(&self, path: &Path) -> bool {
        std::fs::metadata(path)
            .is_ok_and(|found| found.len() == self.length && found.modified().ok() == self.written)
    }
}

/// How the file on the disk stands to what was read from it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Standing {
    /// It is as it was.
    Same,
    /// Somebody else changed it.
    Changed,
    /// It is gone.
    Gone,
}

/// Why a notebook could not be put on the desk, or stored.
#[derive(Debug, thiserror::Error)]
pub enum Error {
    /// The file could not be read or written.
    #[error(transparent)]
    File(#[from] file::Error),
    /// It is no notebook.
    #[error("cannot open `{}`: {source}", path.display())]
    Schema {
        /// The file.
        path: PathBuf,
        /// What is wrong with it.
        source: schema::Error,
    },
    /// Its cells cannot stand together.
    #[error("cannot open the notebook: {}", .0.iter().map(ToString::to_string).collect::<Vec<_>>().join("; "))]
    Engine(Vec<engine::Error>),
}

impl Desk {
    /// Puts a notebook on the desk that no file holds.
    ///
    /// # Errors
    ///
    /// [`Error::Engine`] where its cells cannot stand together.
    pub fn new(notebook: Notebook) -> Result<Desk, Error> {
        let engine = Engine::open(notebook).map_err(Error::Engine)?;
        let results = Results::new(&engine, &Bounds::default());
        let mut desk = Desk {
            engine,
            history: History::default(),
            results,
            fresh: false,
            round: 0,
            job: None,
            file: None,
            stamp: None,
            stored: Stored::Never,
            dirty: false,
        };
        desk.work_out();
        Ok(desk)
    }

    /// Puts the notebook of a file on the desk.
    ///
    /// # Errors
    ///
    /// [`Error`] where it cannot be read or is no notebook.
    pub fn open(path: &Path) -> Result<Desk, Error> {
        let bytes = file::read(path)?;
        let stamp = Stamp::of(path, &bytes);
        let stored = schema::read(&bytes).map_err(|source| Error::Schema {
            path: path.to_owned(),
            source,
        })?;
        let mut desk = Desk::new(stored.notebook)?;
        desk.stored = Stored::Holds(Box::new(desk.engine.notebook().clone()));
        desk.file = Some(path.to_owned());
        desk.stamp = stamp;
        Ok(desk)
    }

    /// Puts a template on the desk, as a notebook that no file holds.
    ///
    /// # Errors
    ///
    /// [`Error`] where it is no notebook, which a test rules out.
    pub fn from_template(template: &template::Template) -> Result<Desk, Error> {
        let stored = schema::read(template.text.as_bytes()).map_err(|source| Error::Schema {
            path: PathBuf::from(template.name),
            source,
        })?;
        Desk::new(stored.notebook)
    }

    /// Writes the notebook to a file, which it then belongs to.
    ///
    /// # Errors
    ///
    /// [`Error::File`]; the notebook on the desk and the old file are then as
    /// they were.
    pub fn save(&mut self, path: &Path, writer: Writer) -> Result<(), Error> {
        let text = schema::write(self.engine.notebook());
        writer(path, text.as_bytes())?;
        self.stored = Stored::Holds(Box::new(self.engine.notebook().clone()));
        self.file = Some(path.to_owned());
        self.stamp = Stamp::of(path, text.as_bytes());
        self.dirty = false;
        Ok(())
    }

    /// Returns the engine that holds the notebook.
    #[must_use]
    pub const fn engine(&self) -> &Engine {
        &self.engine
    }

    /// Returns what was worked out.
    #[must_use]
    pub const fn results(&self) -> &Results {
        &self.results
    }

    /// Returns whether the results carry their bounds.
    #[must_use]
    pub const fn is_fresh(&self) -> bool {
        self.fresh
    }

    /// Returns the share of the work under way that is done.
    #[must_use]
    pub fn progress(&self) -> Option<f32> {
        self.job.as_ref().map(Job::progress)
    }

    /// Returns the file that the notebook belongs to.
    #[must_use]
    pub fn file(&self) -> Option<&Path> {
        self.file.as_deref()
    }

    /// Returns whether something would be lost if the notebook went away.
    #[must_use]
    pub const fn is_dirty(&self) -> bool {
        self.dirty
    }

    /// Returns how the file on the disk stands to what was last seen of it. A
    /// file that was only touched is as it was.
    pub fn standing(&mut self) -> Standing {
        let Some(path) = &self.file else {
            return Standing::Same;
        };
        if !path.exists() {
            return match self.stamp {
                Some(_) => Standing::Gone,
                None => Standing::Same,
            };
        }
        if self.stamp.is_some_and(|stamp| stamp.holds(path)) {
            return Standing::Same;
        }
        let found = file::read(path)
            .ok()
            .and_then(|bytes| Stamp::of(path, &bytes));
        match (found, self.stamp) {
            (Some(found), Some(known)) if found.digest == known.digest => {
                self.stamp = Some(found);
                Standing::Same
            }
            _ => Standing::Changed,
        }
    }

    /// Takes the file on the disk as seen: what is on the desk is kept, and no
    /// file holds it.
    pub fn keep(&mut self) {
        let Some(path) = &self.file else {
            return;
        };
        self.stamp = file::read(path)
            .ok()
            .and_then(|bytes| Stamp::of(path, &bytes));
        self.stored = Stored::Lost;
        self.dirty = true;
    }

    /// Returns the title of the change that would be taken back.
    #[must_use]
    pub fn next_undo(&self) -> Option<&str> {
        self.history.next_undo()
    }

    /// Returns the title of the change that would be made again.
    #[must_use]
    pub fn next_redo(&self) -> Option<&str> {
        self.history.next_redo()
    }

    /// Makes a change; one that `joins` is taken back together with the last.
    ///
    /// # Errors
    ///
    /// [`edit::Error`] where it cannot be made; nothing is changed then.
    pub fn change(&mut self, title: String, edit: Edit, joins: bool) -> Result<(), edit::Error> {
        // What stands at the head of the sheet changes no figure.
        let heads = matches!(edit, Edit::SetTitle(_) | Edit::SetJob { .. });
        if joins {
            self.history.extend(&mut self.engine, title, edit)?;
        } else {
            self.history.apply(&mut self.engine, title, edit)?;
        }
        self.changed(heads);
        Ok(())
    }

    /// Takes the last change back.
    pub fn undo(&mut self) -> Option<String> {
        self.step(History::undo)
    }

    /// Makes the last change that was taken back again.
    pub fn redo(&mut self) -> Option<String> {
        self.step(History::redo)
    }

    fn step(&mut self, step: fn(&mut History, &mut Engine) -> Option<String>) -> Option<String> {
        let before = self.engine.notebook();
        let (cells, confirmed) = (before.cells.clone(), before.confirmed.clone());
        let title = step(&mut self.history, &mut self.engine)?;
        let after = self.engine.notebook();
        let heads = after.cells == cells && after.confirmed == confirmed;
        self.changed(heads);
        Some(title)
    }

    /// Follows a change; one of the sheet's head alone leaves every figure, and
    /// whatever draws bounds for it, as they are.
    fn changed(&mut self, heads: bool) {
        let notebook = self.engine.notebook();
        self.dirty = match &self.stored {
            Stored::Holds(stored) => **stored != *notebook,
            Stored::Never => self.history.next_undo().is_some(),
            Stored::Lost => true,
        };
        if heads {
            self.results.gather_left(&self.engine);
        } else {
            self.work_out();
        }
    }

    /// Puts the nominal results in place of the old ones at once. Whatever is
    /// still drawn for an older state is given up.
    fn work_out(&mut self) {
        self.round += 1;
        self.job = None;
        // Without a spread there is nothing to draw, and nothing is asked.
        let bounds = self.engine.bounds(Settings::default(), &mut |_| false);
        self.fresh = bounds.is_some();
        self.results = Results::new(&self.engine, &bounds.unwrap_or_default());
    }

    /// Starts drawing the bounds, if they are missing and nobody draws them;
    /// `finished` is called from another thread, with the state's number.
    pub fn draw_bounds(&mut self, finished: impl FnOnce(u64, Results) + Send + 'static) {
        if self.fresh || self.job.is_some() {
            return;
        }
        let round = self.round;
        self.job = Some(Job::start(
            Snapshot::of(&self.engine),
            Settings::default(),
            move |results| finished(round, results),
        ));
    }

    /// Returns whether bounds are missing and nobody draws them.
    #[must_use]
    pub const fn wants_bounds(&self) -> bool {
        !self.fresh && self.job.is_none()
    }

    /// Takes results that were drawn; those of an older state are left aside.
    pub fn take_bounds(&mut self, round: u64, results: Results) {
        if round == self.round {
            self.results = results;
            // The sheet's head may have changed meanwhile.
            self.results.gather_left(&self.engine);
            self.fresh = true;
            self.job = None;
        }
    }

    /// Draws the bounds here and now: for paper, and for presets.
    pub fn settle(&mut self) {
        if self.fresh {
            return;
        }
        let results = Snapshot::of(&self.engine)
            .results(Settings::default(), &mut |_| true)
            .expect("the work is never told to stop");
        self.take_bounds(self.round, results);
    }
}
