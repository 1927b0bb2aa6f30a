//! What follows from each message: the one place where the window, its files
//! and the notebook change.

use std::path::{Path, PathBuf};

use iced::futures::channel::oneshot;
use iced::widget::operation;
use iced::{Task, exit};

use super::desk::{Desk, Standing};
use super::files::{self, Answer, Wish};
use super::shared::Measure;
use super::{
    Drawer, Message, Window, bar, cautions, cells, curve, job, print, rail, readiness, shortcut,
};
use crate::drawing::role::Theme;
use crate::notebook::Notebook;
use crate::notebook::edit::Edit;
use crate::store::settings::{self, Settings};

impl Window {
    /// Follows a message, and sees to it that missing bounds are drawn.
    pub fn update(&mut self, message: Message) -> Task<Message> {
        let task = self.follow(message);
        Task::batch([task, self.draw_bounds()])
    }

    /// Starts drawing bounds off this thread, if they are missing.
    pub(super) fn draw_bounds(&mut self) -> Task<Message> {
        if !self.desk.wants_bounds() {
            return Task::none();
        }
        let (sender, receiver) = oneshot::channel();
        self.desk.draw_bounds(move |round, results| {
            // Nobody waits any more for work that was given up.
            let _ = sender.send((round, Box::new(results)));
        });
        Task::future(receiver).then(|answer| match answer {
            Ok((round, results)) => Task::done(Message::BoundsDrawn(round, results)),
            Err(oneshot::Canceled) => Task::none(),
        })
    }

    fn follow(&mut self, message: Message) -> Task<Message> {
        match message {
            Message::Bar(wish) => return self.follow_bar(wish),
            Message::Cells(message) => {
                let action = self
                    .cells
                    .update(message, self.desk.engine(), self.selected);
                return self.follow_cells(action);
            }
            Message::Files(message) => return self.follow_files(message),
            Message::Print(message) => {
                if let print::Action::Write(path, paper) = self.print.update(message) {
                    self.said = Some(match print::write(&self.desk, &path, paper) {
                        Ok(said) => (false, said),
                        Err(error) => (true, error),
                    });
                }
            }
            Message::Job(message) => match self.job.update(message, self.desk.engine()) {
                job::Action::Change { title, edit, joins } => {
                    let _ = self.change(title, edit, joins);
                }
                job::Action::Say(said) => self.said = Some((true, said)),
            },
            Message::Guard(answer) => return self.answer(answer),
            Message::Key(wish) => return self.follow_key(wish),
            Message::ShutDrawer => self.shut(),
            Message::Unsay => self.said = None,
            Message::Curve(message) => {
                if let curve::Action::SelectCell(id) = self.curve.update(message) {
                    return self.select(id);
                }
            }
            Message::Rail(message) => {
                if let rail::Action::SelectCell(id) = self.rail.update(message) {
                    return self.select(id);
                }
            }
            Message::Cautions(message) => {
                if let cautions::Action::SelectCell(id) = self.cautions.update(message) {
                    return self.select(id);
                }
            }
            Message::Readiness(message) => {
                return match self.readiness.update(message) {
                    readiness::Action::None => Task::none(),
                    readiness::Action::SelectCell(id) => self.select(id),
                    readiness::Action::OpenJob => self.follow_key(shortcut::Wish::Job),
                    readiness::Action::AddPosition => {
                        let add = cells::Message::Add(crate::notebook::Kind::Position);
                        self.follow(Message::Cells(add))
                    }
                };
            }
            Message::BoundsDrawn(round, results) => self.desk.take_bounds(round, *results),
            Message::Advanced => {}
            Message::Resized(size) => self.size = size,
            Message::CloseRequested => return self.wish(Wish::Close),
        }
        Task::none()
    }

    fn follow_bar(&mut self, wish: bar::Message) -> Task<Message> {
        match wish {
            bar::Message::Files => self.follow_key(shortcut::Wish::Open),
            bar::Message::Job => self.follow_key(shortcut::Wish::Job),
            bar::Message::Undo => self.follow_key(shortcut::Wish::Undo),
            bar::Message::Redo => self.follow_key(shortcut::Wish::Redo),
            bar::Message::Left => self.follow_key(shortcut::Wish::Left),
            bar::Message::Print => self.follow_key(shortcut::Wish::Print),
            bar::Message::Theme => self.follow_key(shortcut::Wish::Theme),
            bar::Message::Measure => self.follow_key(shortcut::Wish::Measure),
            bar::Message::Keys => self.follow_key(shortcut::Wish::Keys),
        }
    }

    fn follow_cells(&mut self, action: cells::Action) -> Task<Message> {
        match action {
            cells::Action::None => Task::none(),
            cells::Action::Select(id) => {
                self.selected = Some(id);
                Task::none()
            }
            cells::Action::Focus(id) => {
                self.selected = Some(id);
                self.job.break_run();
                let reveal = self.reveal();
                Task::batch([
                    reveal,
                    operation::focus(cells::TYPING),
                    operation::select_all(cells::TYPING),
                ])
            }
            cells::Action::Change {
                title,
                edit,
                joins,
                select,
            } => {
                let renames = matches!(edit, Edit::Rename { .. });
                if self.change(title, edit, joins) && renames {
                    let _ = self.cells.close();
                }
                let selects = select.is_some();
                if let Some(id) = select.and_then(|name| self.desk.engine().find(&name)) {
                    self.selected = Some(id);
                }
                self.drop_lost_selection();
                if selects { self.reveal() } else { Task::none() }
            }
        }
    }

    /// Selects a cell that another area speaks of, and brings it into view.
    fn select(&mut self, id: crate::notebook::datum::CellId) -> Task<Message> {
        if self.cells.open_place().is_some_and(|open| open.cell != id) {
            let _ = self.cells.close();
        }
        self.selected = Some(id);
        self.reveal()
    }

    /// Makes a change, or says why it cannot be made.
    fn change(&mut self, title: String, edit: Edit, joins: bool) -> bool {
        match self.desk.change(title, edit, joins) {
            Ok(()) => true,
            Err(error) => {
                if self.cells.is_typing() {
                    self.cells.refuse(error.to_string());
                } else {
                    self.said = Some((true, error.to_string()));
                }
                false
            }
        }
    }

    fn drop_lost_selection(&mut self) {
        if self
            .selected
            .is_some_and(|id| self.desk.engine().cell(id).is_none())
        {
            self.selected = None;
        }
    }

    fn follow_files(&mut self, message: files::Message) -> Task<Message> {
        match self.files.update(message) {
            files::Action::None => Task::none(),
            files::Action::Open(path) => self.wish(Wish::Open(path)),
            files::Action::Begin(template) => self.wish(Wish::Begin(template)),
            files::Action::BeginEmpty => self.wish(Wish::BeginEmpty),
            files::Action::Save(path) => {
                let own = self.desk.file() == Some(path.as_path());
                if !own && path.exists() {
                    self.pending = Some(Wish::Replace(path, "is there already"));
                    return Task::none();
                }
                self.save_checked(path)
            }
            files::Action::Say(said) => {
                self.said = Some((true, said));
                Task::none()
            }
        }
    }

    /// Does what would lose changes, or asks first.
    fn wish(&mut self, wish: Wish) -> Task<Message> {
        if self.desk.is_dirty() {
            self.pending = Some(wish);
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
            Wish::Replace(path, _) => {
                self.save(path);
                return Task::none();
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

    fn answer(&mut self, answer: Answer) -> Task<Message> {
        let Some(wish) = self.pending.clone() else {
            return Task::none();
        };
        match answer {
            Answer::Stay => {
                self.pending = None;
                Task::none()
            }
            Answer::GoOn => self.grant(&wish),
            Answer::SaveFirst => match self.desk.file().map(Path::to_owned) {
                None => {
                    self.pending = None;
                    self.drawer = Drawer::Files;
                    self.said = Some((
                        false,
                        "no file holds this notebook yet: type a path and save it".to_owned(),
                    ));
                    operation::focus(files::PATH)
                }
                Some(path) => {
                    self.save(&path);
                    if self.desk.is_dirty() {
                        self.pending = None;
                        return Task::none();
                    }
                    self.grant(&wish)
                }
            },
        }
    }

    /// Saves, unless somebody else changed the file meanwhile.
    fn save_checked(&mut self, path: PathBuf) -> Task<Message> {
        let own = self.desk.file() == Some(path.as_path());
        if own && self.desk.standing() == Standing::Changed {
            self.pending = Some(Wish::Replace(
                path,
                "was changed by somebody else since it was opened",
            ));
            return Task::none();
        }
        self.save(&path);
        Task::none()
    }

    fn save(&mut self, path: &Path) {
        let gone = self.desk.file() == Some(path) && self.desk.standing() == Standing::Gone;
        self.said = Some(match self.desk.save(path) {
            Ok(()) => {
                self.files = files::Area::new(self.desk.file());
                self.print = print::Area::new(self.desk.file());
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

    fn shut(&mut self) {
        self.drawer = Drawer::Shut;
        self.job.break_run();
    }

    fn toggle(&mut self, drawer: Drawer) -> bool {
        let opens = self.drawer != drawer;
        self.shut();
        let _ = self.cells.close();
        if opens {
            self.drawer = drawer;
        }
        opens
    }

    fn follow_key(&mut self, wish: shortcut::Wish) -> Task<Message> {
        use shortcut::Wish as Key;
        match wish {
            Key::Open | Key::SaveAs if self.toggle(Drawer::Files) => {
                return operation::focus(files::PATH);
            }
            Key::Print if self.toggle(Drawer::Print) => return operation::focus(print::PATH),
            Key::Job if self.toggle(Drawer::Job) => return operation::focus("title"),
            Key::Left if self.toggle(Drawer::Left) => {}
            Key::Keys if self.toggle(Drawer::Keys) => {}
            Key::Open | Key::SaveAs | Key::Print | Key::Job | Key::Left | Key::Keys => {}
            Key::Save => match self.desk.file().map(Path::to_owned) {
                Some(path) => return self.save_checked(path),
                None => {
                    self.drawer = Drawer::Files;
                    self.said = Some((
                        false,
                        "no file holds this notebook yet: type a path and save it".to_owned(),
                    ));
                    return operation::focus(files::PATH);
                }
            },
            Key::Undo | Key::Redo => {
                // The buttons name what comes next: nothing needs to be said.
                let _ = if wish == Key::Undo {
                    self.desk.undo()
                } else {
                    self.desk.redo()
                };
                self.cells.break_run();
                self.job.break_run();
                self.drop_lost_selection();
            }
            Key::Close => return self.wish(Wish::Close),
            Key::Larger => self.zoom(self.look.zoom + 0.125),
            Key::Smaller => self.zoom(self.look.zoom - 0.125),
            Key::Plain => self.zoom(1.0),
            Key::Theme => {
                self.look.theme = match self.look.theme {
                    Theme::Light => Theme::Dark,
                    Theme::Dark => Theme::Contrast,
                    Theme::Contrast => Theme::Light,
                };
                self.remember();
            }
            Key::Measure => {
                self.look.measure = match self.look.measure {
                    Measure::Metric => Measure::Us,
                    Measure::Us => Measure::Metric,
                };
                self.remember();
            }
            Key::Leave => self.leave(),
            Key::Add
            | Key::Duplicate
            | Key::Remove
            | Key::Rename
            | Key::Raise
            | Key::Lower
            | Key::Above
            | Key::Below
            | Key::Enter
            | Key::Next
            | Key::Previous => return self.follow_cell_key(wish),
        }
        Task::none()
    }

    fn leave(&mut self) {
        if self.pending.take().is_some() || self.cells.close() {
            return;
        }
        if self.drawer != Drawer::Shut {
            self.shut();
        } else if self.said.take().is_none() {
            self.selected = None;
        }
    }

    fn follow_cell_key(&mut self, wish: shortcut::Wish) -> Task<Message> {
        use shortcut::Wish as Key;
        let message = match (wish, self.selected) {
            (Key::Add, _) => {
                let last = self.desk.engine().notebook().cells.len();
                let task = self.follow(Message::Cells(cells::Message::ToggleAdding));
                // The kinds stand under the last card.
                let end = operation::snap_to_end(cells::COLUMN);
                return if last > 0 {
                    Task::batch([task, end])
                } else {
                    task
                };
            }
            (Key::Above | Key::Below, _) => return self.step(wish == Key::Below),
            (Key::Next | Key::Previous, _) if self.drawer != Drawer::Shut => {
                return if wish == Key::Next {
                    operation::focus_next()
                } else {
                    operation::focus_previous()
                };
            }
            (_, None) => {
                return match wish {
                    Key::Next | Key::Enter => self.step(true),
                    Key::Previous => self.step(false),
                    _ => Task::none(),
                };
            }
            (Key::Duplicate, Some(id)) => cells::Message::Duplicate(id),
            (Key::Remove, Some(id)) => cells::Message::Remove(id),
            (Key::Raise, Some(id)) => cells::Message::Raise(id),
            (Key::Lower, Some(id)) => cells::Message::Lower(id),
            (Key::Rename, Some(id)) => cells::Message::Open(cells::Place {
                cell: id,
                part: cells::Part::Name,
            }),
            (_, Some(id)) => {
                let back = wish == Key::Previous;
                match self.cells.neighbour(self.desk.engine(), id, back) {
                    Some(place) => cells::Message::Open(place),
                    None => return Task::none(),
                }
            }
        };
        self.follow(Message::Cells(message))
    }

    /// Selects the cell above or below, the first if none is.
    fn step(&mut self, down: bool) -> Task<Message> {
        let engine = self.desk.engine();
        let count = engine.notebook().cells.len();
        let at = self
            .selected
            .and_then(|id| engine.cell(id))
            .and_then(|cell| engine.notebook().find(&cell.name));
        let next = match (at, down) {
            (None, true) => 0,
            (None, false) => count.saturating_sub(1),
            (Some(at), true) => (at + 1).min(count.saturating_sub(1)),
            (Some(at), false) => at.saturating_sub(1),
        };
        self.selected = engine.id(next);
        self.reveal()
    }

    /// Scrolls the column so that the selected cell is seen.
    fn reveal(&mut self) -> Task<Message> {
        let Some(id) = self.selected else {
            return Task::none();
        };
        let (engine, results) = (self.desk.engine(), self.desk.results());
        match self.cells.reveal(engine, results, id) {
            Some(y) => operation::scroll_to(cells::COLUMN, operation::AbsoluteOffset { x: 0.0, y }),
            None => Task::none(),
        }
    }

    fn zoom(&mut self, zoom: f32) {
        self.look.zoom = zoom.clamp(settings::ZOOM.0, settings::ZOOM.1);
        self.remember();
    }

    /// Writes the window's settings, and says so if that is refused.
    fn remember(&mut self) {
        let Some(place) = &self.settings else {
            return;
        };
        let settings = Settings {
            size: (
                self.size.width * self.look.zoom,
                self.size.height * self.look.zoom,
            ),
            theme: match self.look.theme {
                Theme::Light => "light",
                Theme::Dark => "dark",
                Theme::Contrast => "contrast",
            }
            .to_owned(),
            zoom: self.look.zoom,
            measure: match self.look.measure {
                Measure::Metric => "metric",
                Measure::Us => "us",
            }
            .to_owned(),
            last: self.desk.file().and_then(|path| path.canonicalize().ok()),
        };
        if let Err(error) = settings::save(place, &settings) {
            self.said = Some((true, format!("the window's settings are not kept: {error}")));
        }
    }
}
