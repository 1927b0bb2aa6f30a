//! What is asked before anything could be lost, and the answers.

use std::path::PathBuf;

use iced::widget::{button, row, text};
use iced::{Alignment, Element, Length};

use super::shared::Look;
use super::theme::{self, BODY};
use crate::drawing::role::Role;
use crate::store::template::Template;

/// What would take the notebook from the desk.
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
}

/// What is asked.
#[derive(Clone, Debug, PartialEq)]
pub enum Question {
    /// The notebook has changes that no file holds.
    Lose(Wish),
    /// Something is in the file that the notebook would be stored in.
    Replace {
        /// The file.
        path: PathBuf,
        /// What is the matter with it.
        why: &'static str,
    },
    /// Something is where the worksheet would be written.
    ReplaceSheet(PathBuf),
    /// Somebody else changed the notebook's own file.
    Changed {
        /// The file.
        path: PathBuf,
        /// Whether the notebook has changes of its own.
        dirty: bool,
        /// Whether it was found while saving.
        saving: bool,
    },
    /// The notebook's own file is gone.
    Gone(PathBuf),
}

/// An answer.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Answer {
    /// Store first, then go on.
    SaveFirst,
    /// Go on, and lose it.
    GoOn,
    /// Do nothing.
    Stay,
    /// Put what is on the disk on the desk.
    TakeTheirs,
    /// Keep what is on the desk.
    KeepMine,
    /// Store what is on the desk over what is on the disk.
    Replace,
    /// Store it under another name.
    SaveElsewhere,
}

impl Question {
    /// Returns the words, and the answers that there are.
    fn words(&self) -> (String, Vec<(&'static str, Answer)>) {
        let stay = ("stay", Answer::Stay);
        match self {
            Question::Lose(Wish::Close) => (
                "There are changes that no file holds. Close all the same?".to_owned(),
                vec![
                    ("save first", Answer::SaveFirst),
                    ("close and lose them", Answer::GoOn),
                    stay,
                ],
            ),
            Question::Lose(_) => (
                "There are changes that no file holds. Go on all the same?".to_owned(),
                vec![
                    ("save first", Answer::SaveFirst),
                    ("go on and lose them", Answer::GoOn),
                    stay,
                ],
            ),
            Question::Replace { path, why } => (
                format!(
                    "{} {why}. Saving replaces what is in it now.",
                    path.display()
                ),
                vec![("replace it", Answer::GoOn), stay],
            ),
            Question::ReplaceSheet(path) => (
                format!(
                    "{} is there already. Writing the worksheet replaces it.",
                    path.display()
                ),
                vec![("replace it", Answer::GoOn), stay],
            ),
            Question::Changed {
                path,
                dirty,
                saving,
            } => {
                let lost = if *dirty {
                    " Taking that one loses the changes made here."
                } else {
                    ""
                };
                let keep = if *saving {
                    ("replace it with mine", Answer::Replace)
                } else {
                    ("keep mine", Answer::KeepMine)
                };
                (
                    format!(
                        "{} was changed by somebody else since it was opened.{lost}",
                        path.display()
                    ),
                    vec![
                        ("take the one on disk", Answer::TakeTheirs),
                        keep,
                        ("save under another name", Answer::SaveElsewhere),
                    ],
                )
            }
            Question::Gone(path) => (
                format!(
                    "{} is no longer on the disk. What is on the desk is whole.",
                    path.display()
                ),
                vec![
                    ("write it again", Answer::Replace),
                    ("save under another name", Answer::SaveElsewhere),
                    ("leave it so", Answer::KeepMine),
                ],
            ),
        }
    }
}

/// Returns the question with its answers.
pub fn view<'a>(question: &Question, look: Look) -> Element<'a, Answer> {
    let (words, answers) = question.words();
    let mut line = row![theme::words(words, BODY, Role::CautionInk, look).width(Length::Fill)]
        .spacing(10)
        .align_y(Alignment::Center);
    for (word, answer) in answers {
        line = line.push(
            button(text(word).size(BODY).font(theme::REGULAR))
                .padding([4, 12])
                .style(theme::framed(look))
                .on_press(answer),
        );
    }
    theme::band(line, Role::CautionGround, look).into()
}
