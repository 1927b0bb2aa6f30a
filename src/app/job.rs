//! The title and the job block, as they stand on the worksheet.

use iced::widget::{column, container, row, text_input};
use iced::{Alignment, Element, Length};

use super::shared::Shared;
use super::theme::{self, BODY, SMALL};
use crate::drawing::role::Role;
use crate::notebook::edit::Edit;

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
    pub fn update(&mut self, message: Message) -> Action {
        let Message::Typed(line, text) = message;
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
    row![
        column(lines).spacing(6).width(Length::Fill),
        column(right).spacing(6).width(Length::Fill),
    ]
    .spacing(24)
    .into()
}
