//! What follows from keys, and from the buttons that stand for them.

use std::path::Path;

use iced::Task;
use iced::widget::operation;

use crate::app::drawer::Drawer;
use crate::app::guard::Wish;
use crate::app::shared::Measure;
use crate::app::{Message, Window, cells, files, print, shortcut, split};
use crate::drawing::role::Theme;
use crate::store::settings::{self, Settings};

impl Window {
    pub(super) fn shut(&mut self) {
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

    pub(super) fn follow_key(&mut self, wish: shortcut::Wish) -> Task<Message> {
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
                None => return self.ask_for_a_path(),
            },
            Key::Undo | Key::Redo => {
                // The buttons name what comes next: nothing needs to be said.
                let _ = if wish == Key::Undo {
                    self.desk.undo()
                } else {
                    self.desk.redo()
                };
                self.cells.reload(self.desk.engine());
                self.job.break_run();
                self.drop_lost_selection();
            }
            Key::Narrower => self.widen(-split::STEP),
            Key::Wider => self.widen(split::STEP),
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
    pub(super) fn reveal(&mut self) -> Task<Message> {
        let Some(id) = self.selected else {
            return Task::none();
        };
        let (engine, results) = (self.desk.engine(), self.desk.results());
        let wide = self.width_of_cells();
        match self.cells.reveal(engine, results, id, wide) {
            Some(y) => operation::scroll_to(cells::COLUMN, operation::AbsoluteOffset { x: 0.0, y }),
            None => Task::none(),
        }
    }

    /// Moves the line between the cells and the drawing.
    fn widen(&mut self, by: f32) {
        self.wide = split::fitting(self.width_of_cells() + by, self.size.width);
        self.remember();
    }

    fn zoom(&mut self, zoom: f32) {
        self.look.zoom = zoom.clamp(settings::ZOOM.0, settings::ZOOM.1);
        self.remember();
    }

    /// Writes the window's settings, and says so if that is refused.
    pub(super) fn remember(&mut self) {
        let Some(place) = &self.settings else {
            return;
        };
        let settings = Settings {
            size: (
                self.size.width * self.look.zoom,
                self.size.height * self.look.zoom,
            ),
            cells: self.wide,
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
