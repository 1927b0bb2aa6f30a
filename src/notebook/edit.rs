//! Every change to a notebook as a value, whose inverse takes it back.

use super::cell::{Cell, Field, Kind};
use super::engine::Engine;
use super::{Confirmation, name};

/// One change.
#[derive(Clone, Debug, PartialEq)]
pub enum Edit {
    /// Another title, or none.
    SetTitle(Option<String>),
    /// Another text in a line of the job block, or none.
    SetJob {
        /// The line's name in the file.
        line: &'static str,
        /// The text.
        text: Option<String>,
    },
    /// Another list of confirmed limits.
    SetConfirmed(Vec<Confirmation>),
    /// A new cell at this place.
    Add {
        /// The place, from 0.
        at: usize,
        /// The cell.
        cell: Cell,
    },
    /// The cell of this name goes.
    Remove {
        /// Its name.
        name: String,
    },
    /// The cell of this name goes to another place.
    Move {
        /// Its name.
        name: String,
        /// The place, from 0, counted without it.
        to: usize,
    },
    /// The cell of this name gets another, and every entry and link follows.
    Rename {
        /// Its name.
        name: String,
        /// The new one.
        to: String,
    },
    /// Another content of a field, or none.
    SetField {
        /// The cell's name.
        name: String,
        /// The field's name.
        field: &'static str,
        /// The content with basis and note.
        content: Option<Field>,
    },
    /// All fields of a cell, in this order. Taking the removal of a field back
    /// puts it where it stood.
    SetFields {
        /// The cell's name.
        name: String,
        /// Its fields.
        fields: Vec<Field>,
    },
    /// The cell of this name gets its former one back, and the cells whose
    /// texts had followed get their former fields. It takes a renaming back:
    /// cells that mentioned the new name before are not caught by it.
    Unrename {
        /// Its name.
        name: String,
        /// The former one.
        to: String,
        /// The former fields of the cells that had followed, by name.
        fields: Vec<(String, Vec<Field>)>,
    },
    /// Several changes, made in order as one.
    Several(Vec<Edit>),
}

/// Why a change cannot be made.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Error {
    /// There is no such cell.
    #[error("no cell is named `{0}`: the change cannot be made")]
    NoCell(String),
    /// The kind has no such field.
    #[error("a {kind} has no field `{field}`")]
    NoField {
        /// The kind.
        kind: Kind,
        /// The field asked for.
        field: &'static str,
    },
    /// The job block has no such line.
    #[error("the job block has no line `{0}`")]
    NoLine(&'static str),
    /// The name cannot be given.
    #[error(transparent)]
    Name(#[from] name::Error),
    /// There is a room already.
    #[error(
        "a notebook has one cell of kind surroundings at most, and `{0}` is there: change that"
    )]
    SecondSurroundings(String),
    /// There are as many cells as there may be.
    #[error("a notebook has at most {} cells", super::engine::MOST_CELLS)]
    TooManyCells,
}

impl Engine {
    /// Makes a change without working anything out, and returns its inverse.
    pub(super) fn change(&mut self, edit: Edit) -> Result<Edit, Error> {
        match edit {
            Edit::SetTitle(title) => Ok(Edit::SetTitle(std::mem::replace(
                &mut self.notebook_mut().title,
                title,
            ))),
            Edit::SetJob { line, text } => {
                let place = self
                    .notebook_mut()
                    .job
                    .line_mut(line)
                    .ok_or(Error::NoLine(line))?;
                Ok(Edit::SetJob {
                    line,
                    text: std::mem::replace(place, text),
                })
            }
            Edit::SetConfirmed(confirmed) => Ok(Edit::SetConfirmed(std::mem::replace(
                &mut self.notebook_mut().confirmed,
                confirmed,
            ))),
            Edit::Add { at, cell } => self.add(at, cell),
            Edit::Remove { name } => self.remove(&name),
            Edit::Move { name, to } => self.shift(name, to),
            Edit::Rename { name, to } => self.rename(name, to),
            Edit::SetField {
                name,
                field,
                content,
            } => self.set_field(name, field, content),
            Edit::SetFields { name, fields } => self.set_fields(name, fields),
            Edit::Unrename { name, to, fields } => self.unrename(name, to, fields),
            Edit::Several(edits) => {
                let mut inverses = Vec::with_capacity(edits.len());
                for edit in edits {
                    match self.change(edit) {
                        Ok(inverse) => inverses.push(inverse),
                        Err(error) => {
                            for inverse in inverses.into_iter().rev() {
                                let _ = self
                                    .change(inverse)
                                    .expect("what was done can be taken back in reverse");
                            }
                            return Err(error);
                        }
                    }
                }
                inverses.reverse();
                Ok(Edit::Several(inverses))
            }
        }
    }
}

/// What was done and can be taken back, and what was taken back and can be
/// done again.
#[derive(Clone, Debug, Default)]
pub struct History {
    done: Vec<(String, Edit)>,
    undone: Vec<(String, Edit)>,
}

impl History {
    /// Makes a change, known by `title` in lists of changes.
    ///
    /// # Errors
    ///
    /// [`Error`] where the change cannot be made; nothing is changed then.
    pub fn apply(
        &mut self,
        engine: &mut Engine,
        title: impl Into<String>,
        edit: Edit,
    ) -> Result<(), Error> {
        let (inverse, _) = engine.apply(edit)?;
        self.done.push((title.into(), inverse));
        self.undone.clear();
        Ok(())
    }

    /// Makes a change that belongs to the last one, such as the next letter of
    /// the same entry: both are taken back together.
    ///
    /// # Errors
    ///
    /// [`Error`] where the change cannot be made; nothing is changed then.
    pub fn extend(
        &mut self,
        engine: &mut Engine,
        title: impl Into<String>,
        edit: Edit,
    ) -> Result<(), Error> {
        let Some((_, before)) = self.done.last() else {
            return self.apply(engine, title, edit);
        };
        let covered = match (before, &edit) {
            (
                Edit::SetField { name, field, .. },
                Edit::SetField {
                    name: other,
                    field: same,
                    ..
                },
            ) => name == other && field == same,
            (Edit::SetJob { line, .. }, Edit::SetJob { line: same, .. }) => line == same,
            (Edit::SetTitle(_), Edit::SetTitle(_)) => true,
            _ => false,
        };
        let (inverse, _) = engine.apply(edit)?;
        self.undone.clear();
        if let Some((last, before)) = self.done.last_mut() {
            *last = title.into();
            // What the field held before the first letter covers the rest.
            if !covered {
                let first = std::mem::replace(before, Edit::Several(Vec::new()));
                *before = Edit::Several(vec![inverse, first]);
            }
        }
        Ok(())
    }

    /// Takes the last change back, and returns its title.
    pub fn undo(&mut self, engine: &mut Engine) -> Option<String> {
        Self::step(&mut self.done, &mut self.undone, engine)
    }

    /// Makes the last change that was taken back again, and returns its title.
    pub fn redo(&mut self, engine: &mut Engine) -> Option<String> {
        Self::step(&mut self.undone, &mut self.done, engine)
    }

    /// Returns the title of the change that [`undo`](Self::undo) would take
    /// back.
    #[must_use]
    pub fn next_undo(&self) -> Option<&str> {
        self.done.last().map(|(title, _)| title.as_str())
    }

    /// Returns the title of the change that [`redo`](Self::redo) would make.
    #[must_use]
    pub fn next_redo(&self) -> Option<&str> {
        self.undone.last().map(|(title, _)| title.as_str())
    }

    fn step(
        from: &mut Vec<(String, Edit)>,
        to: &mut Vec<(String, Edit)>,
        engine: &mut Engine,
    ) -> Option<String> {
        let (title, edit) = from.pop()?;
        let (inverse, _) = engine
            .apply(edit)
            .expect("a change is taken back from the state that it led to");
        to.push((title.clone(), inverse));
        Some(title)
    }
}
