//! What follows where notebooks and worksheets come from and go to: nothing is
//! lost without a question, and whatever the disk does is said.

use std::path::{Path, PathBuf};

use iced::futures::channel::oneshot;
use iced::widget::operation;
use iced::{Task, exit};

use crate::app::desk::{Desk, Standing};
use crate::app::dialog::{Answer as Found, Ask, Purpose};
use crate::app::drawer::Drawer;
use crate::app::guard::{Answer, Question, Wish};
use crate::app::{Message, Window, cells, files, print};
use crate::notebook::Notebook;

impl Window {
    pub(super) fn follow_files(&mut self, message: files::Message) -> Task<Message> {
        match self.files.update(message) {
            files::Action::None => {}
            files::Action::Look(ask) => return self.ask(ask),
            files::Action::Open(path) => return self.wish(Wish::Open(path)),
            files::Action::Begin(template) => return self.wish(Wish::Begin(template)),
            files::Action::BeginEmpty => return self.wish(Wish::BeginEmpty),
            files::Action::Save(path) => self.save_as(path),
            files::Action::Say(said) => self.said = Some((true, said)),
        }
        Task::none()
    }

    pub(super) fn follow_print(&mut self, message: print::Message) -> Task<Message> {
        match self.print.update(message) {
            print::Action::None => {}
            print::Action::Look(ask) => return self.ask(ask),
            print::Action::Write(path, _) => self.write_sheet(path),
            print::Action::AskFirst(path) => self.pending = Some(Question::ReplaceSheet(path)),
            print::Action::Say(said) => self.said = Some((true, said)),
        }
        Task::none()
    }

    fn write_sheet(&mut self, path: PathBuf) {
        let written = print::write(&self.desk, &path, self.print.paper(), self.writer);
        self.said = Some(match written {
            Ok(said) => {
                self.print.wrote(path);
                (false, said)
            }
            Err(error) => (true, error),
        });
    }

    /// Asks the system's dialog, off this thread.
    fn ask(&mut self, ask: Ask) -> Task<Message> {
        if self.asking {
            self.said = Some((false, "the system's dialog is open already".to_owned()));
            return Task::none();
        }
        let (sender, receiver) = oneshot::channel();
        let dialog = self.dialog.clone();
        let purpose = ask.purpose;
        let started = std::thread::Builder::new()
            .name("dialog".to_owned())
            .spawn(move || {
                // A window that was closed meanwhile waits for nothing.
                let _ = sender.send(dialog.ask(&ask));
            });
        if started.is_err() {
            let missing = Found::Missing("the system gives no thread for it");
            return Task::done(Message::DialogAnswered(purpose, missing));
        }
        self.asking = true;
        Task::future(receiver).map(move |answer| {
            let failed = Found::Missing("it ended without an answer");
            Message::DialogAnswered(purpose, answer.unwrap_or(failed))
        })
    }

    pub(super) fn follow_dialog(&mut self, purpose: Purpose, answer: Found) -> Task<Message> {
        self.asking = false;
        let path = match answer {
            Found::Chosen(path) => path,
            Found::Left => {
                let said = "no file was chosen; its path can be typed as well".to_owned();
                self.said = Some((false, said));
                return Task::none();
            }
            Found::Missing(reason) => {
                self.said = Some((
                    false,
                    format!(
                        "this machine has no dialog for files ({reason}): type the path instead"
                    ),
                ));
                return operation::focus(match purpose {
                    Purpose::Open | Purpose::Save => files::PATH,
                    Purpose::Worksheet => print::PATH,
                });
            }
        };
        match purpose {
            Purpose::Open => {
                self.files.take(&path);
                self.wish(Wish::Open(path))
            }
            Purpose::Save => {
                let path = files::named(path);
                self.files.take(&path);
                self.save_as(path);
                Task::none()
            }
            Purpose::Worksheet => {
                self.print.take(&path);
                // Paper carries bounds: until they are drawn, the path waits.
                if self.desk.is_fresh() {
                    return self.follow_print(print::Message::Write);
                }
                Task::none()
            }
        }
    }

    /// Does what would lose changes, or asks first.
    pub(super) fn wish(&mut self, wish: Wish) -> Task<Message> {
        if self.desk.is_dirty() {
            self.pending = Some(Question::Lose(wish));
            return Task::none();
        }
        self.grant(&wish)
    }

    fn grant(&mut self, wish: &Wish) -> Task<Message> {
        self.pending = None;
        let desk = match wish {
            Wish::Close => {
                self.remember();
                return exit();
            }
            Wish::Open(path) => Desk::open(path),
            Wish::Begin(template) => Desk::from_template(template),
            Wish::BeginEmpty => Desk::new(Notebook::default()),
        };
        match desk {
            Ok(desk) => self.put(desk),
            Err(error) => self.said = Some((true, error.to_string())),
        }
        operation::scroll_to(cells::COLUMN, operation::AbsoluteOffset { x: 0.0, y: 0.0 })
    }

    /// Puts another notebook on the desk.
    fn put(&mut self, desk: Desk) {
        self.desk = desk;
        self.selected = None;
        self.said = None;
        self.drawer = Drawer::Shut;
        self.cells = cells::Area::new();
        self.files = files::Area::new(self.desk.file());
        self.print = print::Area::new(self.desk.file());
        self.job.break_run();
        self.remember();
    }

    pub(super) fn answer(&mut self, answer: Answer) -> Task<Message> {
        let Some(question) = self.pending.take() else {
            return Task::none();
        };
        match (answer, question) {
            (Answer::Stay, _) => {}
            (Answer::GoOn, Question::Lose(wish)) => return self.grant(&wish),
            (Answer::SaveFirst, Question::Lose(wish)) => return self.save_first(&wish),
            (Answer::GoOn | Answer::Replace, Question::ReplaceSheet(path)) => {
                self.write_sheet(path);
            }
            (
                Answer::GoOn | Answer::Replace,
                Question::Replace { path, .. }
                | Question::Changed { path, .. }
                | Question::Gone(path),
            ) => self.save(&path),
            (Answer::TakeTheirs, Question::Changed { path, .. }) => {
                let task = self.grant(&Wish::Open(path));
                if self.said.is_none() {
                    let said = "the notebook is now the one on the disk".to_owned();
                    self.said = Some((false, said));
                }
                return task;
            }
            (Answer::KeepMine, _) => self.desk.keep(),
            (Answer::SaveElsewhere, _) => {
                self.drawer = Drawer::Files;
                let said = "type another path, and save there".to_owned();
                self.said = Some((false, said));
                return operation::focus(files::PATH);
            }
            // No question has these answers.
            (Answer::SaveFirst | Answer::Replace | Answer::TakeTheirs, _) => {}
        }
        Task::none()
    }

    fn save_first(&mut self, wish: &Wish) -> Task<Message> {
        let Some(path) = self.desk.file().map(Path::to_owned) else {
            return self.ask_for_a_path();
        };
        let task = self.save_checked(path);
        if self.desk.is_dirty() {
            return task;
        }
        self.grant(wish)
    }

    /// Shows where a notebook that no file holds can be stored.
    pub(super) fn ask_for_a_path(&mut self) -> Task<Message> {
        self.drawer = Drawer::Files;
        let said = "no file holds this notebook yet: type a path and save it".to_owned();
        self.said = Some((false, said));
        operation::focus(files::PATH)
    }

    /// Saves in a file that may be another's.
    fn save_as(&mut self, path: PathBuf) {
        if self.desk.file() == Some(path.as_path()) {
            let _ = self.save_checked(path);
        } else if path.exists() {
            let why = "is there already";
            self.pending = Some(Question::Replace { path, why });
        } else {
            self.save(&path);
        }
    }

    /// Saves in the notebook's own file, unless somebody else changed it.
    pub(super) fn save_checked(&mut self, path: PathBuf) -> Task<Message> {
        if self.desk.standing() == Standing::Changed {
            self.pending = Some(Question::Changed {
                path,
                dirty: self.desk.is_dirty(),
                saving: true,
            });
        } else {
            self.save(&path);
        }
        Task::none()
    }

    /// Looks whether the file on the disk is still the one that was read.
    pub(super) fn look_at_the_disk(&mut self) {
        // What is asked already is answered first.
        if matches!(
            self.pending,
            Some(Question::Lose(_) | Question::Replace { .. } | Question::ReplaceSheet(_))
        ) {
            return;
        }
        let standing = self.desk.standing();
        let Some(path) = self.desk.file().map(Path::to_owned) else {
            return;
        };
        self.pending = match standing {
            Standing::Same => None,
            Standing::Changed => Some(Question::Changed {
                path,
                dirty: self.desk.is_dirty(),
                saving: false,
            }),
            Standing::Gone => Some(Question::Gone(path)),
        };
    }

    fn save(&mut self, path: &Path) {
        let own = self.desk.file() == Some(path);
        let gone = own && self.desk.standing() == Standing::Gone;
        self.said = Some(match self.desk.save(path, self.writer) {
            Ok(()) => {
                self.files.take(path);
                if !own {
                    self.print.take(&path.with_extension("pdf"));
                }
                self.pending = None;
                let again = if gone { ", which had vanished," } else { "" };
                (false, format!("saved {}{again}", path.display()))
            }
            Err(error) => {
                self.drawer = Drawer::Files;
                (true, error.to_string())
            }
        });
        self.remember();
    }
}
