//! The cells: a reading column of cards. Answers with what is to change; only
//! the window changes the notebook.

mod card;
mod field;
mod figure;
mod height;
mod new;
mod sentence;

use iced::widget::{button, column, container, keyed_column, row, scrollable, space};
use iced::{Element, Length};

use super::shared::Shared;
use super::theme::{self, SMALL, Stand};
use crate::drawing::role::Role;
use crate::notebook::cell::{Basis, Cell, Content, Field, Form, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::edit::Edit;
use crate::notebook::engine::Engine;
use crate::notebook::name;
use crate::notebook::results::Results;

pub use field::TYPING;

/// The column's scrolling part.
pub const COLUMN: &str = "cells";

/// The space between two cards.
const GAP: f32 = 8.0;

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
    /// The remark on the open field's input.
    Remarked(String),
    /// Show or hide the kinds of cell that can be added.
    ToggleAdding,
    /// Add a cell of a kind after the selected one.
    Add(Kind),
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
        was
    }

    /// Lets the next letter begin a change of its own.
    pub fn break_run(&mut self) {
        self.typed = false;
        self.draft = None;
        self.refused = None;
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
                if self.open.is_some_and(|open| open.cell != id) {
                    let _ = self.close();
                }
                Action::Select(id)
            }
            Message::Open(place) => {
                if self.open != Some(place) {
                    self.break_run();
                    self.open = Some(place);
                }
                Action::Focus(place.cell)
            }
            Message::Typed(text) => self.type_in(text, engine),
            Message::Keep => self.keep(engine),
            Message::Chosen(word) => self.choose(&word, engine),
            Message::Based(basis) => self.describe(engine, |field| {
                field.basis = (field.basis != Some(basis)).then_some(basis);
            }),
            Message::Remarked(note) => self.describe(engine, |field| {
                field.note = (!note.is_empty()).then_some(note);
            }),
            Message::ToggleAdding => {
                self.adding = !self.adding;
                Action::None
            }
            Message::Add(kind) => {
                self.adding = false;
                let (cell, at) = new::cell(engine, kind, selected);
                added(format!("add {}", cell.name), cell, at)
            }
            Message::Duplicate(id) => duplicate(engine, id),
            Message::Remove(id) => {
                if self.open.is_some_and(|open| open.cell == id) {
                    let _ = self.close();
                }
                with_name(engine, id, |name| {
                    change(format!("remove {name}"), Edit::Remove { name })
                })
            }
            Message::Raise(id) => shift(engine, id, false),
            Message::Lower(id) => shift(engine, id, true),
            Message::Scrolled(offset, seen) => {
                self.offset = offset;
                self.seen = seen;
                Action::None
            }
        }
    }

    fn type_in(&mut self, text: String, engine: &Engine) -> Action {
        let Some(place) = self.open else {
            return Action::None;
        };
        let Some(cell) = engine.cell(place.cell) else {
            return Action::None;
        };
        self.refused = None;
        let field = match place.part {
            Part::Name => {
                // A name is given when it is whole: half of one may be taken.
                self.refused = (text != cell.name)
                    .then(|| name::check(&text).err().map(|error| error.to_string()))
                    .flatten();
                self.draft = Some(text);
                return Action::None;
            }
            Part::Field(field) => field,
        };
        let content = match cell.kind.field(field).map(|spec| spec.form) {
            Some(Form::Count(least, most)) => match text.trim().parse::<u32>() {
                Ok(number) => {
                    self.draft = None;
                    Content::Count(f64::from(number))
                }
                Err(_) => {
                    // The file has a number here, or nothing.
                    self.refused = Some(format!(
                        "expected a whole number from {least} to {most}, found `{text}`"
                    ));
                    self.draft = Some(text);
                    return Action::None;
                }
            },
            Some(form @ Form::Pairs(_)) => {
                // What is typed is kept as it is while it is being typed.
                self.draft = Some(text.clone());
                Content::typed(form, text)
            }
            _ => Content::Text(text),
        };
        let joins = std::mem::replace(&mut self.typed, true);
        set(cell, field, content, joins)
    }

    fn keep(&mut self, engine: &Engine) -> Action {
        let (Some(place), draft) = (self.open, self.draft.clone()) else {
            return Action::None;
        };
        if place.part != Part::Name {
            let _ = self.close();
            return Action::None;
        }
        let Some(cell) = engine.cell(place.cell) else {
            return Action::None;
        };
        match draft {
            Some(to) if to != cell.name => Action::Change {
                title: format!("rename {} to {to}", cell.name),
                edit: Edit::Rename {
                    name: cell.name.clone(),
                    to,
                },
                joins: false,
                select: None,
            },
            _ => {
                let _ = self.close();
                Action::None
            }
        }
    }

    fn choose(&mut self, word: &str, engine: &Engine) -> Action {
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        let content = match cell.kind.field(field).map(|spec| spec.form) {
            Some(Form::GuidanceList) => {
                let mut list: Vec<String> =
                    cell.texts(field).into_iter().map(str::to_owned).collect();
                if list.iter().any(|other| other == word) {
                    list.retain(|other| other != word);
                } else {
                    list.push(word.to_owned());
                }
                Content::List(list)
            }
            _ => Content::Text(word.to_owned()),
        };
        self.typed = false;
        set(cell, field, content, false)
    }

    fn describe(&mut self, engine: &Engine, describe: impl FnOnce(&mut Field)) -> Action {
        let Some((cell, field)) = self.open_field(engine) else {
            return Action::None;
        };
        self.typed = false;
        if cell.kind == Kind::Value {
            return describe_value(cell, describe);
        }
        let Some(mut content) = cell.field(field).cloned() else {
            self.refused = Some("type the input first, then say where it came from".to_owned());
            return Action::None;
        };
        describe(&mut content);
        change(
            format!("say where {} came from", what(cell, field)),
            Edit::SetField {
                name: cell.name.clone(),
                field,
                content: Some(content),
            },
        )
    }

    fn open_field<'e>(&self, engine: &'e Engine) -> Option<(&'e Cell, &'static str)> {
        let place = self.open?;
        let Part::Field(field) = place.part else {
            return None;
        };
        Some((engine.cell(place.cell)?, field))
    }

    /// Brings a cell into view, and returns how far the column must be scrolled
    /// for it; `None` where it is seen already.
    pub fn reveal(&mut self, engine: &Engine, results: &Results, id: CellId) -> Option<f32> {
        let mut y = 14.0;
        for result in &results.cells {
            let high = height::estimate(engine, result, result.id == id);
            if result.id == id {
                let seen = y >= self.offset && y + high.min(self.seen) <= self.offset + self.seen;
                if seen {
                    return None;
                }
                // Built at once, so that a field in it can take the typing.
                self.offset = (y - 60.0_f32).max(0.0);
                return Some(self.offset);
            }
            y += high + GAP;
        }
        None
    }

    /// Returns the cells as they are seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let cells = &shared.results.cells;
        let mut linked = Vec::new();
        if let Some(selected) = shared.selected {
            linked = shared.engine.feeds(selected);
            linked.extend(shared.engine.fed_by(selected));
        }
        let stand = |id: CellId| {
            if shared.selected == Some(id) {
                Stand::Selected
            } else if linked.contains(&id) {
                Stand::Linked
            } else {
                Stand::Apart
            }
        };
        // Only what is seen, and a little around it, is built.
        let (from, to) = (self.offset - 400.0, self.offset + self.seen + 400.0);
        let (mut above, mut below, mut y) = (0.0, 0.0, 0.0);
        let mut cards = keyed_column::<CellId, Message, _, _>([])
            .spacing(GAP)
            .width(Length::Fill);
        for result in cells {
            let high = height::estimate(shared.engine, result, stand(result.id) == Stand::Selected);
            if y + high < from {
                above += high + GAP;
            } else if y > to {
                below += high + GAP;
            } else {
                let card = card::view(self, shared, result.id, result, stand(result.id));
                cards = cards.push(result.id, card);
            }
            y += high + GAP;
        }
        let mut body = column![space().height(above), cards].width(Length::Fill);
        if below > 0.0 {
            body = body.push(space().height(below));
        } else {
            body = body.push(space().height(GAP)).push(self.bottom(shared));
        }
        scrollable(container(body).padding(iced::Padding {
            top: 14.0,
            right: 18.0,
            bottom: 14.0,
            left: 18.0,
        }))
        .id(COLUMN)
        .on_scroll(|viewport| {
            Message::Scrolled(viewport.absolute_offset().y, viewport.bounds().height)
        })
        .height(Length::Fill)
        .width(Length::Fill)
        .style(move |theme, status| theme::scroll(look, theme, status))
        .into()
    }

    /// What can be added.
    fn bottom<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let plain = |text: String, message: Message| {
            button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
                .padding([4, 10])
                .style(theme::framed(look))
                .on_press(message)
        };
        let empty = shared.engine.notebook().cells.is_empty();
        if !self.adding && !empty {
            return plain("add a cell".to_owned(), Message::ToggleAdding).into();
        }
        let said = if empty {
            "This notebook is empty. Begin with what is hot: add a source, then a position."
        } else {
            "Add after the selected cell:"
        };
        let kinds = Kind::ALL.into_iter().map(|kind| {
            row![
                container(plain(kind.name().to_owned(), Message::Add(kind)))
                    .width(Length::Fixed(116.0)),
                theme::words(new::about(kind), SMALL, Role::Muted, look),
            ]
            .spacing(8)
            .align_y(iced::Alignment::Center)
            .into()
        });
        column![
            theme::words(said, SMALL, Role::Ink, look),
            column(kinds).spacing(4)
        ]
        .spacing(6)
        .into()
    }
}

fn what(cell: &Cell, field: &str) -> String {
    match (cell.kind, field) {
        (Kind::Value | Kind::Formula, "entry") | (Kind::Note, _) => cell.name.clone(),
        _ => format!("{} of {}", sentence::label(field), cell.name),
    }
}

fn change(title: String, edit: Edit) -> Action {
    Action::Change {
        title,
        edit,
        joins: false,
        select: None,
    }
}

fn added(title: String, cell: Cell, at: usize) -> Action {
    Action::Change {
        title,
        select: Some(cell.name.clone()),
        edit: Edit::Add { at, cell },
        joins: false,
    }
}

fn with_name(engine: &Engine, id: CellId, then: impl FnOnce(String) -> Action) -> Action {
    engine
        .cell(id)
        .map_or(Action::None, |cell| then(cell.name.clone()))
}

/// Sets a field, keeping its basis and remark. An emptied field that may be
/// left out is left out.
fn set(cell: &Cell, field: &'static str, content: Content, joins: bool) -> Action {
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

/// Basis and note of a value are fields of their own.
fn describe_value(cell: &Cell, describe: impl FnOnce(&mut Field)) -> Action {
    let mut described = Field::new("entry", Content::Text(String::new()));
    described.basis = cell.text("basis").and_then(Basis::from_words);
    described.note = cell.text("note").map(str::to_owned);
    describe(&mut described);
    let content = |field: &'static str, text: Option<String>| Edit::SetField {
        name: cell.name.clone(),
        field,
        content: text.map(|text| Field::new(field, Content::Text(text))),
    };
    change(
        format!("say where {} came from", cell.name),
        Edit::Several(vec![
            content(
                "basis",
                described.basis.map(|basis| basis.words().to_owned()),
            ),
            content("note", described.note),
        ]),
    )
}

/// Returns the remark on a field's input.
fn note_of(cell: &Cell, field: &str) -> String {
    match cell.kind {
        Kind::Value => cell.text("note").map(str::to_owned),
        _ => cell.field(field).and_then(|field| field.note.clone()),
    }
    .unwrap_or_default()
}

fn duplicate(engine: &Engine, id: CellId) -> Action {
    let Some(cell) = engine.cell(id) else {
        return Action::None;
    };
    let at = engine.notebook().find(&cell.name).map_or(0, |at| at + 1);
    let mut copy = cell.clone();
    copy.name = new::free(engine, &cell.name);
    added(format!("copy {}", cell.name), copy, at)
}

fn shift(engine: &Engine, id: CellId, down: bool) -> Action {
    with_name(engine, id, |name| {
        let cells = engine.notebook().cells.len();
        let at = engine.notebook().find(&name).unwrap_or(0);
        let to = if down { at + 1 } else { at.saturating_sub(1) };
        if to == at || to >= cells {
            return Action::None;
        }
        change(format!("move {name}"), Edit::Move { name, to })
    })
}
