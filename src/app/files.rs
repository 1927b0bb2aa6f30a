//! Where notebooks come from and go to: a path that is always there to type
//! into, templates, and the guard before anything would be lost.

use std::path::{Path, PathBuf};

use iced::widget::{button, column, container, row, text_input};
use iced::{Alignment, Element, Length};

use super::shared::{Look, Shared};
use super::theme::{self, BODY, SMALL};
use crate::drawing::role::Role;
use crate::store::template::{self, Template};

/// The path field.
pub const PATH: &str = "path";

/// The files.
#[derive(Debug, Default)]
pub struct Area {
    path: String,
}

/// What happens with files.
#[derive(Clone, Debug)]
pub enum Message {
    /// The path's text.
    PathTyped(String),
    /// Open what the path names.
    Open,
    /// Store the notebook there.
    Save,
    /// Begin with a template.
    Begin(&'static Template),
    /// Begin with nothing.
    BeginEmpty,
}

/// What the window is to do.
#[derive(Clone, Debug, PartialEq)]
pub enum Action {
    /// Nothing.
    None,
    /// Open a file.
    Open(PathBuf),
    /// Store the notebook.
    Save(PathBuf),
    /// Begin with a template.
    Begin(&'static Template),
    /// Begin with nothing.
    BeginEmpty,
    /// Say this.
    Say(String),
}

impl Area {
    /// Returns the files, beginning with the one that is open.
    #[must_use]
    pub fn new(path: Option<&Path>) -> Self {
        Area {
            path: path
                .map(|path| path.display().to_string())
                .unwrap_or_default(),
        }
    }

    /// Follows a message.
    pub fn update(&mut self, message: Message) -> Action {
        let path = || -> Result<PathBuf, Action> {
            let typed = self.path.trim();
            if typed.is_empty() {
                return Err(Action::Say(
                    "type the path of a file first, such as /home/you/door.farglow".to_owned(),
                ));
            }
            Ok(PathBuf::from(typed))
        };
        match message {
            Message::PathTyped(typed) => {
                self.path = typed;
                Action::None
            }
            Message::Open => path().map_or_else(|said| said, Action::Open),
            Message::Save => path().map_or_else(
                |said| said,
                |path| {
                    // A name without an ending gets the notebook's own.
                    let path = if path.extension().is_none() {
                        path.with_extension("farglow")
                    } else {
                        path
                    };
                    Action::Save(path)
                },
            ),
            Message::Begin(template) => Action::Begin(template),
            Message::BeginEmpty => Action::BeginEmpty,
        }
    }

    /// Returns the drawer with files and templates.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let act = |text: &'static str, message: Message| {
            button(iced::widget::text(text).size(BODY).font(theme::REGULAR))
                .padding([5, 12])
                .style(theme::framed(look))
                .on_press(message)
        };
        let templates = template::ALL.iter().map(|template| {
            row![
                act(template.name, Message::Begin(template)),
                theme::words(template.about, SMALL, Role::Muted, look),
            ]
            .spacing(10)
            .align_y(Alignment::Center)
            .into()
        });
        column![
            row![
                theme::words("File", BODY, Role::Ink, look),
                text_input(
                    "path of a notebook, such as /home/you/door.farglow",
                    &self.path
                )
                .id(PATH)
                .on_input(Message::PathTyped)
                .on_submit(Message::Open)
                .size(BODY)
                .font(theme::REGULAR)
                .padding([5, 8])
                .width(Length::Fill)
                .style(theme::typing(look)),
                act("open it", Message::Open),
                act("save here", Message::Save),
            ]
            .spacing(10)
            .align_y(Alignment::Center),
            theme::words("Or begin with a template:", SMALL, Role::Muted, look),
            column(templates).spacing(4),
            row![
                act("empty", Message::BeginEmpty),
                theme::words("a notebook with nothing in it", SMALL, Role::Muted, look),
            ]
            .spacing(10)
            .align_y(Alignment::Center),
        ]
        .spacing(8)
        .into()
    }
}

/// What would be lost, and what was wished for.
#[derive(Clone, Debug, PartialEq)]
pub enum Wish {
    /// Open another file.
    Open(PathBuf),
    /// Begin with a template.
    Begin(&'static Template),
    /// Begin with nothing.
    BeginEmpty,
    /// Close the window.
    Close,
    /// Store over a file that somebody else changed, or that is another's.
    Replace(PathBuf, &'static str),
}

/// An answer to the guard.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Answer {
    /// Store first, then go on.
    SaveFirst,
    /// Go on, and lose it.
    GoOn,
    /// Do nothing.
    Stay,
}

/// Returns the guard's question with its answers.
pub fn guard<'a>(wish: &Wish, look: Look) -> Element<'a, Answer> {
    let (question, go_on, save) = match wish {
        Wish::Replace(path, why) => (
            format!(
                "{} {why}. Saving replaces what is in it now.",
                path.display()
            ),
            "replace it",
            false,
        ),
        Wish::Close => (
            "There are changes that no file holds. Close all the same?".to_owned(),
            "close and lose them",
            true,
        ),
        Wish::Open(_) | Wish::Begin(_) | Wish::BeginEmpty => (
            "There are changes that no file holds. Go on all the same?".to_owned(),
            "go on and lose them",
            true,
        ),
    };
    let act = |text: &'static str, answer: Answer| {
        button(iced::widget::text(text).size(BODY).font(theme::REGULAR))
            .padding([4, 12])
            .style(theme::framed(look))
            .on_press(answer)
    };
    let mut answers =
        row![theme::words(question, BODY, Role::CautionInk, look).width(Length::Fill)]
            .spacing(10)
            .align_y(Alignment::Center);
    if save {
        answers = answers.push(act("save first", Answer::SaveFirst));
    }
    container(
        answers
            .push(act(go_on, Answer::GoOn))
            .push(act("stay", Answer::Stay)),
    )
    .padding([8, 20])
    .width(Length::Fill)
    .style(theme::ground(Role::CautionGround, look))
    .into()
}
