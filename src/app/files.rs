//! Where notebooks come from and go to: a path that is always there to type
//! into, the system's own dialog beside it, and templates.

use std::path::{Path, PathBuf};

use iced::widget::{button, column, row, text_input};
use iced::{Alignment, Element, Length};

use super::dialog::{Ask, Purpose};
use super::shared::Shared;
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
    /// Ask the system's dialog for a file to open.
    LookToOpen,
    /// Ask it where to store the notebook.
    LookToSave,
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
    /// Ask the system's dialog.
    Look(Ask),
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
        let mut area = Area::default();
        if let Some(path) = path {
            area.take(path);
        }
        area
    }

    /// Puts a path into the field.
    pub fn take(&mut self, path: &Path) {
        self.path = path.display().to_string();
    }

    /// Returns the path that is typed.
    fn typed(&self) -> Option<PathBuf> {
        let typed = self.path.trim();
        (!typed.is_empty()).then(|| PathBuf::from(typed))
    }

    /// Follows a message.
    pub fn update(&mut self, message: Message) -> Action {
        let look = |purpose| {
            Action::Look(Ask {
                purpose,
                near: self.typed(),
            })
        };
        let nothing = || {
            Action::Say("type the path of a file first, such as /home/you/door.farglow".to_owned())
        };
        match message {
            Message::PathTyped(typed) => {
                self.path = typed;
                Action::None
            }
            Message::LookToOpen => look(Purpose::Open),
            Message::LookToSave => look(Purpose::Save),
            Message::Open => self.typed().map_or_else(nothing, Action::Open),
            Message::Save => self
                .typed()
                .map_or_else(nothing, |path| Action::Save(named(path))),
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
        let templates = template::ALL
            .iter()
            .map(|template| (template.name, template.about, Message::Begin(template)));
        let nothing = (
            "empty",
            "a notebook with nothing in it",
            Message::BeginEmpty,
        );
        let begin = templates
            .chain(std::iter::once(nothing))
            .map(|(name, about, message)| {
                row![
                    act(name, message).width(Length::Fixed(WIDE)),
                    theme::words(about, SMALL, Role::Muted, look).width(Length::Fill),
                ]
                .spacing(12)
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
            row![
                theme::words("or in the system's dialog:", SMALL, Role::Muted, look),
                act("look for a file to open", Message::LookToOpen),
                act("look for a place to save", Message::LookToSave),
            ]
            .spacing(10)
            .align_y(Alignment::Center),
            theme::words("Or begin with a template:", SMALL, Role::Muted, look),
            column(begin).spacing(4),
        ]
        .spacing(8)
        .into()
    }
}

/// How wide the names of templates are.
const WIDE: f32 = 164.0;

/// Returns a path with the notebook's own ending where it has none.
#[must_use]
pub fn named(path: PathBuf) -> PathBuf {
    if path.extension().is_none() {
        path.with_extension("farglow")
    } else {
        path
    }
}
