//! The cells: a reading column of cards. Answers with what is to change; only
//! the window changes the notebook.

mod card;
mod change;
mod column;
mod field;
mod figure;
mod found;
mod height;
mod new;
mod prose;
mod sentence;
mod typing;

use iced::widget::text_editor;

use crate::notebook::cell::{Basis, Cell, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::edit::Edit;
use crate::notebook::engine::Engine;

pub use column::COLUMN;
pub use field::{REMARK, TYPING};

/// A place in a cell that can be open for typing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Place {
    /// The cell.
    pub cell: CellId,
    /// What of it.
    pub part: Part,
}

/// What of a cell can be open for typing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Part {
    /// Its name.
    Name,
    /// A field.
    Field(&'static str),
}

/// The cells.
#[derive(Debug, Default)]
pub struct Area {
    open: Option<Place>,
    /// Whether the open field was typed into, so that further letters join.
    typed: bool,
    /// What is typed but cannot be stored as it stands.
    draft: Option<String>,
    /// The prose that is open, line by line.
    prose: Option<text_editor::Content>,
    /// The remark on the open input, and whether it was typed into.
    remark: Option<text_editor::Content>,
    remarked: bool,
    refused: Option<String>,
    adding: bool,
    offset: f32,
    seen: f32,
}

/// What happens in the cells.
#[derive(Clone, Debug)]
pub enum Message {
    /// Select a cell.
    Select(CellId),
    /// Open a field for typing.
    Open(Place),
    /// The open field's text.
    Typed(String),
    /// Keep what was typed, and close the field.
    Keep,
    /// One of the words that the open field is chosen from.
    Chosen(String),
    /// The basis of the open field's input.
    Based(Basis),
    /// In the open prose.
    Edited(text_editor::Action),
    /// In the remark on the open field's input.
    Remarked(text_editor::Action),
    /// Show or hide the kinds of cell that can be added.
    ToggleAdding,
    /// Add a cell of a kind after the selected one.
    Add(Kind),
    /// Add an assessment of this position.
    Assess(CellId),
    /// Copy a cell.
    Duplicate(CellId),
    /// Remove it.
    Remove(CellId),
    /// Move it up.
    Raise(CellId),
    /// Move it down.
    Lower(CellId),
    /// How far the column is scrolled, and how much of it is seen.
    Scrolled(f32, f32),
}

/// What the window is to do.
#[derive(Clone, Debug, PartialEq)]
pub enum Action {
    /// Nothing.
    None,
    /// Select this cell.
    Select(CellId),
    /// Select this cell, and put the typing into its open field.
    Focus(CellId),
    /// Change the notebook.
    Change {
        /// The change's title in undo and redo.
        title: String,
        /// The change.
        edit: Edit,
        /// Whether it belongs to the last one.
        joins: bool,
        /// The name of the cell to select afterwards.
        select: Option<String>,
    },
}

impl Area {
    /// Returns the cells, with nothing open.
    #[must_use]
    pub fn new() -> Self {
        Area {
            seen: 800.0,
            ..Area::default()
        }
    }

    /// Returns the place that is open.
    #[must_use]
    pub const fn open_place(&self) -> Option<Place> {
        self.open
    }

    /// Returns whether text is being typed into a field.
    #[must_use]
    pub const fn is_typing(&self) -> bool {
        self.open.is_some()
    }

    fn is_open(&self, place: Place) -> bool {
        self.open == Some(place)
    }

    fn draft(&self) -> Option<&str> {
        self.draft.as_deref()
    }

    fn refused(&self) -> Option<&str> {
        self.refused.as_deref()
    }

    fn prose(&self) -> Option<&text_editor::Content> {
        self.prose.as_ref()
    }

    fn remark_held(&self) -> Option<&text_editor::Content> {
        self.remark.as_ref()
    }

    /// The text in the open field: the draft, or what is stored.
    fn text(&self, cell: &Cell, field: &str) -> String {
        self.draft
            .clone()
            .or_else(|| sentence::typed(cell, field))
            .unwrap_or_default()
    }

    /// Closes whatever is open; returns whether something was.
    pub fn close(&mut self) -> bool {
        let was = self.open.take().is_some() || self.adding;
        self.adding = false;
        self.break_run();
        self.prose = None;
        self.remark = None;
        was
    }

    /// Closes a name that is open for typing: it was given.
    pub fn close_name(&mut self) {
        if self.open.is_some_and(|open| open.part == Part::Name) {
            let _ = self.close();
        }
    }

    /// Lets the next letter begin a change of its own.
    pub fn break_run(&mut self) {
        self.typed = false;
        self.remarked = false;
        self.draft = None;
        self.refused = None;
    }

    /// Lets the next letter begin a change of its own, and shows prose as it is
    /// stored now.
    pub fn reload(&mut self, engine: &Engine) {
        self.break_run();
        let (mut text, mut remark) = (None, None);
        if let Some((cell, field)) = self.open_field(engine) {
            if sentence::is_prose(cell, field) {
                text = Some(sentence::typed(cell, field).unwrap_or_default());
            }
            if sentence::is_input(cell, field) {
                remark = Some(change::note_of(cell, field));
            }
        }
        prose::follow(&mut self.prose, text);
        prose::follow(&mut self.remark, remark);
    }

    /// Says why a change of the open place could not be made.
    pub fn refuse(&mut self, reason: String) {
        self.refused = Some(reason);
    }

    /// Returns the place after (or before) the open one in the selected cell.
    #[must_use]
    pub fn neighbour(&self, engine: &Engine, cell: CellId, back: bool) -> Option<Place> {
        let typed = engine.cell(cell)?;
        let mut fields: Vec<&'static str> = sentence::sentence(typed)
            .iter()
            .filter_map(|piece| match piece {
                sentence::Piece::Field(field, _) => Some(*field),
                _ => None,
            })
            .collect();
        fields.extend(sentence::others(typed));
        let place = |field: &'static str| Place {
            cell,
            part: Part::Field(field),
        };
        let at = self
            .open
            .and_then(|open| fields.iter().position(|field| place(field) == open));
        let next = match (at, back) {
            (None, false) => 0,
            (None, true) => fields.len().checked_sub(1)?,
            (Some(at), false) => (at + 1) % fields.len(),
            (Some(at), true) => (at + fields.len() - 1) % fields.len(),
        };
        fields.get(next).map(|field| place(field))
    }

    /// Follows a message.
    pub fn update(
        &mut self,
        message: Message,
        engine: &Engine,
        selected: Option<CellId>,
    ) -> Action {
        match message {
            Message::Select(id) => {
                let mut action = Action::Select(id);
                if self.open.is_some_and(|open| open.cell != id) {
                    // A name that was typed is not lost by looking elsewhere.
                    action = self.renaming(engine, Some(id)).unwrap_or(action);
                    let _ = self.close();
                }
                action
            }
            Message::Open(place) => {
                let mut action = Action::Focus(place.cell);
                if self.open != Some(place) {
                    action = self.renaming(engine, Some(place.cell)).unwrap_or(action);
                    self.open = Some(place);
                    self.prose = None;
                    self.remark = None;
                    self.reload(engine);
                }
                action
            }
            Message::Typed(text) => self.type_in(text, engine),
            Message::Keep => self.keep(engine),
            Message::Chosen(word) => self.choose(&word, engine),
            Message::Based(basis) => self.base(basis, engine),
            Message::Edited(action) => self.edit(action, engine),
            Message::Remarked(action) => self.remark(action, engine),
            Message::ToggleAdding => {
                self.adding = !self.adding;
                Action::None
            }
            Message::Add(kind) => {
                self.adding = false;
                let (cell, at) = new::cell(engine, kind, selected);
                change::added(format!("add {}", cell.name), cell, at)
            }
            Message::Assess(id) => {
                let (mut cell, at) = new::cell(engine, Kind::Assessment, Some(id));
                let Some(position) = engine.cell(id) else {
                    return Action::None;
                };
                cell.fields.retain(|field| field.name != "position");
                let cell = cell.with("position", &position.name);
                change::added(format!("add {}", cell.name), cell, at)
            }
            Message::Duplicate(id) => change::duplicate(engine, id),
            Message::Remove(id) => {
                if self.open.is_some_and(|open| open.cell == id) {
                    let _ = self.close();
                }
                change::with_name(engine, id, |name| {
                    change::one(format!("remove {name}"), Edit::Remove { name })
                })
            }
            Message::Raise(id) => change::shift(engine, id, false),
            Message::Lower(id) => change::shift(engine, id, true),
            Message::Scrolled(offset, seen) => {
                self.offset = offset;
                self.seen = seen;
                Action::None
            }
        }
    }

    fn open_field<'e>(&self, engine: &'e Engine) -> Option<(&'e Cell, &'static str)> {
        let place = self.open?;
        let Part::Field(field) = place.part else {
            return None;
        };
        Some((engine.cell(place.cell)?, field))
    }
}
