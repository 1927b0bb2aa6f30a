//! The worksheet: where it goes, on what paper, and what is left before it is
//! final.

use std::path::{Path, PathBuf};

use iced::widget::{button, column, row, text_input};
use iced::{Alignment, Element, Length};

use super::desk::{Desk, Writer};
use super::dialog::{Ask, Purpose};
use super::shared::Shared;
use super::theme::{self, BODY, SMALL};
use crate::drawing::role::Role;
use crate::store::schema;
use crate::worksheet::layout::Paper;
use crate::worksheet::sheet::Sheet;

/// The worksheet's path field.
pub const PATH: &str = "worksheet";

/// The worksheet.
#[derive(Debug)]
pub struct Area {
    path: String,
    paper: Paper,
    /// The sheet that was written last: it may be replaced unasked.
    written: Option<PathBuf>,
}

/// What happens with the worksheet.
#[derive(Clone, Debug)]
pub enum Message {
    /// The path's text.
    PathTyped(String),
    /// Ask the system's dialog for a place.
    Look,
    /// The paper.
    Chosen(Paper),
    /// Write it.
    Write,
}

/// What the window is to do.
#[derive(Clone, Debug, PartialEq)]
pub enum Action {
    /// Nothing.
    None,
    /// Ask the system's dialog.
    Look(Ask),
    /// Write the worksheet, over whatever is there.
    Write(PathBuf, Paper),
    /// Ask before something that is there is replaced.
    AskFirst(PathBuf),
    /// Say this.
    Say(String),
}

impl Area {
    /// Returns the worksheet of a notebook, beside its file.
    #[must_use]
    pub fn new(notebook: Option<&Path>) -> Self {
        let path = notebook.map_or_else(
            || PathBuf::from("worksheet.pdf"),
            |path| path.with_extension("pdf"),
        );
        Area {
            path: path.display().to_string(),
            paper: Paper::A4,
            written: None,
        }
    }

    /// Puts a path into the field.
    pub fn take(&mut self, path: &Path) {
        let path = match path.extension() {
            Some(_) => path.to_owned(),
            None => path.with_extension("pdf"),
        };
        self.path = path.display().to_string();
    }

    /// Returns the paper that is chosen.
    #[must_use]
    pub const fn paper(&self) -> Paper {
        self.paper
    }

    /// Says that a sheet was written.
    pub fn wrote(&mut self, path: PathBuf) {
        self.written = Some(path);
    }

    /// Follows a message.
    pub fn update(&mut self, message: Message) -> Action {
        match message {
            Message::PathTyped(path) => self.path = path,
            Message::Chosen(paper) => self.paper = paper,
            Message::Look => {
                let typed = self.path.trim();
                return Action::Look(Ask {
                    purpose: Purpose::Worksheet,
                    near: (!typed.is_empty()).then(|| PathBuf::from(typed)),
                });
            }
            Message::Write => {
                let typed = self.path.trim();
                if typed.is_empty() {
                    return Action::Say(
                        "type the path of the PDF first, such as /home/you/door.pdf".to_owned(),
                    );
                }
                let path = PathBuf::from(typed);
                if path.exists() && self.written.as_ref() != Some(&path) {
                    return Action::AskFirst(path);
                }
                return Action::Write(path, self.paper);
            }
        }
        Action::None
    }

    /// Returns the drawer with the worksheet.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let left = &shared.results.readiness;
        let paper = |text: &'static str, paper: Paper| {
            button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
                .padding([2, 10])
                .style(theme::choice(self.paper == paper, look))
                .on_press(Message::Chosen(paper))
        };
        let (words, said) = if left.is_empty() {
            (
                "write the worksheet",
                "Nothing is left: it is issued as final.".to_owned(),
            )
        } else {
            (
                "write the draft",
                format!(
                    "It is marked DRAFT on every page: {} left before it is final.",
                    match left.len() {
                        1 => "one thing is".to_owned(),
                        many => format!("{many} things are"),
                    }
                ),
            )
        };
        // Paper carries bounds: they are waited for.
        let ready = shared.fresh.then_some(Message::Write);
        column![
            row![
                theme::words("Worksheet", BODY, Role::Ink, look),
                text_input("path of the PDF", &self.path)
                    .id(PATH)
                    .on_input(Message::PathTyped)
                    .on_submit_maybe(ready.clone())
                    .size(BODY)
                    .font(theme::REGULAR)
                    .padding([5, 8])
                    .width(Length::Fill)
                    .style(theme::typing(look)),
                button(
                    iced::widget::text("look for a place")
                        .size(BODY)
                        .font(theme::REGULAR)
                )
                .padding([5, 12])
                .style(theme::framed(look))
                .on_press(Message::Look),
                paper("A4", Paper::A4),
                paper("letter", Paper::Letter),
                button(iced::widget::text(words).size(BODY).font(theme::REGULAR))
                    .padding([5, 12])
                    .style(theme::chief(look))
                    .on_press_maybe(ready),
            ]
            .spacing(10)
            .align_y(Alignment::Center),
            theme::words(said, SMALL, Role::Muted, look),
        ]
        .spacing(6)
        .into()
    }
}

/// Writes the worksheet of what is on the desk, and returns what to say.
///
/// # Errors
///
/// What was refused, in words.
pub fn write(desk: &Desk, path: &Path, paper: Paper, writer: Writer) -> Result<String, String> {
    let same = |a: &Path, b: &Path| {
        a == b || matches!((a.canonicalize(), b.canonicalize()), (Ok(a), Ok(b)) if a == b)
    };
    if desk.file().is_some_and(|file| same(file, path)) {
        return Err(format!(
            "{} is the notebook itself and was left alone: give the worksheet another name",
            path.display()
        ));
    }
    let notebook = desk.engine().notebook();
    let contents = schema::write(notebook);
    let digest = schema::digest(&schema::to_value(notebook));
    let name = desk.file().and_then(Path::file_name).map_or_else(
        || "notebook.farglow".to_owned(),
        |name| name.to_string_lossy().into_owned(),
    );
    let sheet = Sheet {
        engine: desk.engine(),
        results: desk.results(),
        digest: &digest,
        file: &name,
        contents: contents.as_bytes(),
    };
    let pdf = sheet.pdf(paper).map_err(|error| error.to_string())?;
    writer(path, &pdf.bytes).map_err(|error| error.to_string())?;
    let standing = if desk.results().readiness.is_empty() {
        "final"
    } else {
        "DRAFT"
    };
    Ok(format!(
        "wrote {} ({} pages, {standing})",
        path.display(),
        pdf.pages
    ))
}
