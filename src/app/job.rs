//! The title and the job block, as they stand on the worksheet.

use iced::widget::{button, column, container, row, space, text, text_input};
use iced::{Alignment, Element, Length};

use super::shared::Shared;
use super::theme::{self, BODY, SMALL};
use crate::drawing::role::Role;
use crate::guidance::{Library, Limit};
use crate::notebook::edit::Edit;
use crate::notebook::engine::Engine;
use crate::notebook::{Confirmation, Kind, Notebook};

/// A line that is typed into.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Line {
    /// The title.
    Title,
    /// A line of the job block, by its name in the file.
    Job(&'static str),
}

/// What happens in the job block.
#[derive(Clone, Debug)]
pub enum Message {
    /// A line's text.
    Typed(Line, String),
    /// Somebody compared a limit with the edition in force.
    Compared(&'static Limit),
    /// Take the word on this limit back.
    TakenBack(String),
}

/// What the window is to do.
#[derive(Clone, Debug, PartialEq)]
pub enum Action {
    /// Change the notebook.
    Change {
        /// The change's title.
        title: String,
        /// The change.
        edit: Edit,
        /// Whether it belongs to the last one.
        joins: bool,
    },
    /// Say this.
    Say(String),
}

/// The job block.
#[derive(Debug, Default)]
pub struct Area {
    typed: Option<Line>,
}

impl Area {
    /// Lets the next letter begin a change of its own.
    pub fn break_run(&mut self) {
        self.typed = None;
    }

    /// Follows a message.
    pub fn update(&mut self, message: Message, engine: &Engine) -> Action {
        let (line, text) = match message {
            Message::Typed(line, text) => (line, text),
            Message::Compared(limit) => {
                self.typed = None;
                return compared(engine.notebook(), limit);
            }
            Message::TakenBack(id) => {
                self.typed = None;
                return taken_back(engine.notebook(), &id);
            }
        };
        let joins = self.typed.replace(line) == Some(line);
        let text = (!text.is_empty()).then_some(text);
        match line {
            Line::Title => Action::Change {
                title: "change the title".to_owned(),
                edit: Edit::SetTitle(text),
                joins,
            },
            Line::Job(line) => Action::Change {
                title: format!("change {}", line.replace('_', " ")),
                edit: Edit::SetJob { line, text },
                joins,
            },
        }
    }
}

/// Takes a person's word that a limit was compared with its edition: the one
/// who prepares the sheet, on the sheet's date.
fn compared(notebook: &Notebook, limit: &'static Limit) -> Action {
    let filled = |text: &Option<String>| text.clone().filter(|text| !text.trim().is_empty());
    let (Some(by), Some(date)) = (
        filled(&notebook.job.prepared_by),
        filled(&notebook.job.date),
    ) else {
        return Action::Say(
            "fill in who prepared this sheet and its date first: a limit is confirmed by a \
             person, on a day"
                .to_owned(),
        );
    };
    let mut confirmed = notebook.confirmed.clone();
    confirmed.retain(|other| other.guidance != limit.id);
    confirmed.push(Confirmation {
        guidance: limit.id.clone(),
        edition: limit.edition.clone(),
        by,
        date,
    });
    Action::Change {
        title: format!("confirm {}", limit.id),
        edit: Edit::SetConfirmed(confirmed),
        joins: false,
    }
}

fn taken_back(notebook: &Notebook, id: &str) -> Action {
    let mut confirmed = notebook.confirmed.clone();
    confirmed.retain(|word| word.guidance != id);
    Action::Change {
        title: format!("take the word on {id} back"),
        edit: Edit::SetConfirmed(confirmed),
        joins: false,
    }
}

/// Returns the limits in use that are recalled and that nobody has confirmed.
fn recalled(notebook: &Notebook) -> Vec<&'static Limit> {
    let mut open: Vec<&'static Limit> = Vec::new();
    let used = notebook
        .cells
        .iter()
        .filter(|cell| matches!(cell.kind, Kind::Assessment | Kind::Zone))
        .flat_map(|cell| cell.texts("guidance"));
    for limit in used.flat_map(|id| Library::shipped().family(id)) {
        if limit.needs_confirming()
            && !notebook.is_confirmed(&limit.id, &limit.edition)
            && !open.iter().any(|known| known.id == limit.id)
        {
            open.push(limit);
        }
    }
    open
}

/// The limits that wait for somebody's word.
fn confirming(shared: Shared<'_>) -> Element<'_, Message> {
    let look = shared.look;
    let limits = recalled(shared.engine.notebook());
    if limits.is_empty() {
        return space().into();
    }
    let lines = limits.into_iter().map(|limit| {
        row![
            button(
                text(format!("I compared {}", limit.id))
                    .size(SMALL)
                    .font(theme::REGULAR)
            )
            .padding([2, 10])
            .style(theme::framed(look))
            .on_press(Message::Compared(limit)),
            theme::words(limit.citation(), SMALL, Role::Muted, look).width(Length::Fill),
        ]
        .spacing(10)
        .align_y(Alignment::Center)
        .into()
    });
    column![
        theme::words(
            "These limits are recalled, not read. Compare each with its edition in force where \
             you work, then say so:",
            SMALL,
            Role::Ink,
            look
        ),
        column(lines).spacing(4),
    ]
    .spacing(6)
    .into()
}

/// The limits that somebody gave a word on.
fn confirmed(shared: Shared<'_>) -> Element<'_, Message> {
    let look = shared.look;
    let words = &shared.engine.notebook().confirmed;
    if words.is_empty() {
        return space().into();
    }
    let lines = words.iter().map(|word| {
        row![
            theme::words(
                format!(
                    "{}, edition {}, compared by {} on {}",
                    word.guidance, word.edition, word.by, word.date
                ),
                SMALL,
                Role::Muted,
                look
            ),
            button(text("take back").size(SMALL).font(theme::REGULAR))
                .padding([0, 6])
                .style(theme::plain(look))
                .on_press(Message::TakenBack(word.guidance.clone())),
        ]
        .spacing(10)
        .align_y(Alignment::Center)
        .into()
    });
    column(lines).spacing(2).into()
}

/// Returns the drawer with title and job.
pub fn view(shared: Shared<'_>) -> Element<'_, Message> {
    let look = shared.look;
    let notebook = shared.engine.notebook();
    let line = |label: String, about: &'static str, text: &str, line: Line, id: &'static str| {
        row![
            container(theme::words(label, SMALL, Role::Muted, look)).width(Length::Fixed(110.0)),
            text_input(about, text)
                .id(id)
                .on_input(move |text| Message::Typed(line, text))
                .size(BODY)
                .font(theme::REGULAR)
                .padding([4, 8])
                .style(theme::typing(look)),
        ]
        .spacing(8)
        .align_y(Alignment::Center)
    };
    let title = notebook.title.as_deref().unwrap_or_default();
    let mut lines: Vec<Element<'_, Message>> =
        vec![line("title".to_owned(), "", title, Line::Title, "title").into()];
    for (name, text) in notebook.job.lines() {
        let about = match name {
            "date" => "YYYY-MM-DD",
            "site" => "the works",
            "area" => "the bay or building",
            "task" => "what is done there",
            _ => "",
        };
        lines.push(
            line(
                name.replace('_', " "),
                about,
                text.unwrap_or_default(),
                Line::Job(name),
                name,
            )
            .into(),
        );
    }
    let half = lines.len().div_ceil(2);
    let right = lines.split_off(half);
    column![
        row![
            column(lines).spacing(6).width(Length::Fill),
            column(right).spacing(6).width(Length::Fill),
        ]
        .spacing(24),
        confirming(shared),
        confirmed(shared),
    ]
    .spacing(12)
    .into()
}
