//! The bar along the top: which job this is, whether it is stored, and what
//! can be done with the whole of it.

use iced::widget::{button, column, container, row, space, tooltip};
use iced::{Alignment, Element, Length};

use super::desk::Desk;
use super::shared::{Look, Shared};
use super::theme::{self, BODY, SMALL};
use crate::drawing::role::Role;

/// What is wished for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Message {
    /// Files and templates.
    Files,
    /// Title and job.
    Job,
    /// Take the last change back.
    Undo,
    /// Make it again.
    Redo,
    /// What is left before issue.
    Left,
    /// The worksheet.
    Print,
    /// The next theme.
    Theme,
    /// The other system of units.
    Measure,
    /// The list of keys.
    Keys,
}

/// Returns the bar.
pub fn view<'a>(desk: &'a Desk, shared: Shared<'a>) -> Element<'a, Message> {
    let look = shared.look;
    let left = shared.results.readiness.len();
    let left_words = match left {
        0 => "ready to issue".to_owned(),
        1 => "1 left before issue".to_owned(),
        _ => format!("{left} left before issue"),
    };
    let print = if left == 0 {
        "Print worksheet"
    } else {
        "Print draft"
    };
    theme::band(
        row![
            about(desk, shared),
            framed("Files".to_owned(), Some(Message::Files), look),
            step("Undo", desk.next_undo(), Message::Undo, look),
            step("Redo", desk.next_redo(), Message::Redo, look),
            framed(left_words, Some(Message::Left), look),
            button(style_text(print))
                .padding([7, 14])
                .style(theme::chief(look))
                .on_press(Message::Print),
        ]
        .spacing(10)
        .align_y(Alignment::Center),
        Role::Panel,
        look,
    )
    .into()
}

/// Title, job and whether it is stored; opens the job block.
fn about<'a>(desk: &'a Desk, shared: Shared<'a>) -> Element<'a, Message> {
    let look = shared.look;
    let notebook = shared.engine.notebook();
    let title = notebook
        .title
        .as_deref()
        .filter(|title| !title.trim().is_empty())
        .unwrap_or("Untitled job");
    let job = &notebook.job;
    let revision = job.revision.as_ref().map(|text| format!("revision {text}"));
    let parts: Vec<&str> = [
        job.site.as_deref(),
        job.area.as_deref(),
        revision.as_deref(),
    ]
    .into_iter()
    .flatten()
    .filter(|part| !part.trim().is_empty())
    .collect();
    let line = if parts.is_empty() {
        "say which job this is".to_owned()
    } else {
        parts.join(" · ")
    };
    let opened = button(
        row![
            theme::bold(title, 16.0, Role::Ink, look).wrapping(iced::widget::text::Wrapping::None),
            theme::words(line, BODY, Role::Muted, look)
                .wrapping(iced::widget::text::Wrapping::None),
        ]
        .spacing(16)
        .align_y(Alignment::Center),
    )
    .padding([4, 0])
    .style(theme::plain(look))
    .on_press(Message::Job);
    let mut words = row![
        container(opened).clip(true),
        theme::words(stored(desk), BODY, Role::Muted, look),
    ]
    .spacing(16)
    .align_y(Alignment::Center);
    if let Some(progress) = desk.progress() {
        words = words.push(theme::words(
            format!("bounds {:.0} %", f64::from(progress) * 100.0),
            SMALL,
            Role::Muted,
            look,
        ));
    }
    words.width(Length::Fill).clip(true).into()
}

/// Returns whether the notebook is stored, in a word.
#[must_use]
pub fn stored(desk: &Desk) -> &'static str {
    match (desk.file(), desk.is_dirty()) {
        (_, true) => "not saved",
        (Some(_), false) => "saved",
        (None, false) => "no file yet",
    }
}

fn style_text<'a>(text: impl iced::widget::text::IntoFragment<'a>) -> iced::widget::Text<'a> {
    iced::widget::text(text)
        .size(BODY)
        .font(theme::REGULAR)
        .wrapping(iced::widget::text::Wrapping::None)
}

fn framed<'a>(text: String, message: Option<Message>, look: Look) -> Element<'a, Message> {
    button(style_text(text))
        .padding([7, 12])
        .style(theme::framed(look))
        .on_press_maybe(message)
        .into()
}

/// Undo or redo, with the name of the change under the pointer.
fn step<'a>(
    word: &'static str,
    title: Option<&str>,
    message: Message,
    look: Look,
) -> Element<'a, Message> {
    let Some(title) = title else {
        return framed(word.to_owned(), None, look);
    };
    let short: String = title.chars().take(22).collect();
    let label = if short.len() < title.len() {
        format!("{word} {short}…")
    } else {
        format!("{word} {title}")
    };
    tooltip(
        framed(label, Some(message), look),
        container(theme::words(title.to_owned(), SMALL, Role::Ink, look))
            .padding([4, 8])
            .style(theme::card(theme::Stand::Apart, look)),
        tooltip::Position::Bottom,
    )
    .into()
}

/// Returns the foot of the keys' drawer: what the window can be told to be.
pub fn manners<'a>(look: Look) -> Element<'a, Message> {
    column![
        row![
            framed(
                "light, dark, high contrast".to_owned(),
                Some(Message::Theme),
                look
            ),
            framed(
                "metric or US units".to_owned(),
                Some(Message::Measure),
                look
            ),
            space().width(Length::Fill),
        ]
        .spacing(10)
    ]
    .into()
}
