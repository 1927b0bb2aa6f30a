//! What follows from each message: the one place where the window, its files
//! and the notebook change.

mod files;
mod keys;

use iced::Task;
use iced::futures::channel::oneshot;
use iced::widget::operation;

use super::guard::Wish;
use super::{Message, Window, bar, cautions, cells, curve, job, rail, readiness, shortcut, split};
use crate::notebook::edit::Edit;

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
            Message::Print(message) => return self.follow_print(message),
            Message::Job(message) => match self.job.update(message, self.desk.engine()) {
                job::Action::Change { title, edit, joins } => {
                    let _ = self.change(title, edit, joins);
                }
                job::Action::Say(said) => self.said = Some((true, said)),
            },
            Message::Guard(answer) => return self.answer(answer),
            Message::Split(split::Message::Drawn(x)) => {
                self.wide = split::fitting(x, self.size.width);
            }
            Message::Split(split::Message::Dropped) => self.remember(),
            Message::DialogAnswered(purpose, answer) => {
                return self.follow_dialog(purpose, answer);
            }
            Message::Focused => self.look_at_the_disk(),
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
                    readiness::Action::AddAssessment(id) => {
                        self.follow(Message::Cells(cells::Message::Assess(id)))
                    }
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
                    self.cells.close_name();
                }
                let selects = select.is_some();
                if let Some(id) = select.and_then(|name| self.desk.engine().find(&name)) {
                    self.selected = Some(id);
                }
                self.drop_lost_selection();
                if !selects {
                    return Task::none();
                }
                let reveal = self.reveal();
                if self.cells.is_typing() {
                    return Task::batch([reveal, operation::focus(cells::TYPING)]);
                }
                reveal
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
}
