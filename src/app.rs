//! The window: the notebook on the desk.
//!
//! Areas answer with an action; only the window changes the notebook, the files
//! and itself. Everything that is drawn comes from one [`shared::Shared`].

mod action;
mod bar;
pub mod canvas;
pub mod cautions;
mod cells;
pub mod curve;
mod dashes;
mod desk;
pub mod dialog;
mod drawer;
mod files;
mod follow;
mod guard;
mod job;
mod listen;
mod open;
pub mod preset;
mod print;
pub mod rail;
pub mod readiness;
pub mod shared;
mod shortcut;
mod split;
pub mod theme;
mod wrap;

use std::path::PathBuf;

use iced::widget::{column, container, responsive, row, rule};
use iced::{Element, Event, Length, Size, Subscription, Theme, event, window};

use crate::drawing::role::{self, Role};
use crate::notebook::datum::CellId;
use crate::notebook::results::Results;
use crate::store::settings::Settings;
use desk::Desk;
use dialog::Dialog;
use drawer::Drawer;
use shared::{Look, Measure, Shared};
use theme::BODY;

pub use cells::{REMARK, TYPING};
pub use desk::Error;
pub use files::PATH;
pub use open::{Unopened, start};

/// The least height in which drawing and rail can be read.
const DRAWING: f32 = 608.0;

/// The window with everything in it.
#[derive(Debug)]
pub struct Window {
    desk: Desk,
    selected: Option<CellId>,
    look: Look,
    size: Size,
    /// How wide the column of cells is wished to be.
    wide: f32,
    drawer: Drawer,
    cells: cells::Area,
    files: files::Area,
    print: print::Area,
    job: job::Area,
    curve: curve::Area,
    rail: rail::Area,
    cautions: cautions::Area,
    readiness: readiness::Area,
    /// What is asked before anything could be lost.
    pending: Option<guard::Question>,
    /// What was said last: whether it is bad, and the words.
    said: Option<(bool, String)>,
    /// Where the window's settings live; nowhere in tests.
    settings: Option<PathBuf>,
    /// Who is asked for files.
    dialog: Dialog,
    /// Whether that one has not answered yet.
    asking: bool,
    /// Who brings bytes to files.
    writer: desk::Writer,
}

/// Everything that happens in the window.
#[derive(Clone, Debug)]
pub enum Message {
    /// In the bar.
    Bar(bar::Message),
    /// In the cells.
    Cells(cells::Message),
    /// In the drawer with files.
    Files(files::Message),
    /// In the drawer with the worksheet.
    Print(print::Message),
    /// In the drawer with the job.
    Job(job::Message),
    /// In the drawing.
    Curve(curve::Message),
    /// On the distance rail.
    Rail(rail::Message),
    /// In the band of cautions.
    Cautions(cautions::Message),
    /// In the list of what is left.
    Readiness(readiness::Message),
    /// An answer to the guard.
    Guard(guard::Answer),
    /// On the line between the cells and the drawing.
    Split(split::Message),
    /// The system's dialog answered.
    DialogAnswered(dialog::Purpose, dialog::Answer),
    /// The window came to the front again.
    Focused,
    /// A key was pressed.
    Key(shortcut::Wish),
    /// Shut what is open under the bar.
    ShutDrawer,
    /// Take away what was said.
    Unsay,
    /// The bounds of a state of the notebook were drawn.
    BoundsDrawn(u64, Box<Results>),
    /// Some of the work under way is done.
    Advanced,
    /// The window has another size.
    Resized(Size),
    /// The window was asked to close.
    CloseRequested,
}

impl Message {
    /// Says how far the column of cells is scrolled, and how much of it is
    /// seen: what the window reports when it is scrolled.
    #[must_use]
    pub const fn seen(offset: f32, height: f32) -> Message {
        Message::Cells(cells::Message::Scrolled(offset, height))
    }

    /// Says that the open field now holds this text: what it reports when a
    /// text is put into it as one piece.
    #[must_use]
    pub fn typed(text: &str) -> Message {
        Message::Cells(cells::Message::Typed(text.to_owned()))
    }
}

impl Window {
    fn new(desk: Desk, settings: &Settings, place: Option<PathBuf>) -> Self {
        let theme = match settings.theme.as_str() {
            "dark" => role::Theme::Dark,
            "contrast" => role::Theme::Contrast,
            _ => role::Theme::Light,
        };
        let measure = match settings.measure.as_str() {
            "us" => Measure::Us,
            _ => Measure::Metric,
        };
        Window {
            selected: None,
            look: Look {
                theme,
                zoom: settings.zoom,
                measure,
            },
            size: Size::new(settings.size.0, settings.size.1),
            wide: settings.cells,
            drawer: Drawer::Shut,
            cells: cells::Area::new(),
            files: files::Area::new(desk.file()),
            print: print::Area::new(desk.file()),
            job: job::Area::default(),
            curve: curve::Area::new(),
            rail: rail::Area::new(),
            cautions: cautions::Area::new(),
            readiness: readiness::Area::new(),
            pending: None,
            said: None,
            settings: place,
            dialog: Dialog::system(),
            asking: false,
            writer: crate::store::file::write,
            desk,
        }
    }

    /// Returns what every area may read.
    fn shared(&self) -> Shared<'_> {
        Shared {
            engine: self.desk.engine(),
            results: self.desk.results(),
            fresh: self.desk.is_fresh(),
            look: self.look,
            selected: self.selected,
        }
    }

    /// Returns the notebook as it stands, for whoever tests the window.
    #[must_use]
    pub fn notebook(&self) -> &crate::notebook::Notebook {
        self.desk.engine().notebook()
    }

    /// Returns the nominal value of an output in coherent SI units, for whoever
    /// tests the window.
    #[must_use]
    pub fn result(&self, cell: &str, output: &str) -> Option<f64> {
        let shown = self.desk.results().cell(cell)?.shown(output)?;
        shown.quantity().map(|quantity| quantity.si)
    }

    /// Draws the bounds here and now, for whoever tests the window.
    pub fn settle(&mut self) {
        self.desk.settle();
    }

    /// Returns the title of the window.
    #[must_use]
    pub fn title(&self) -> String {
        let title = self.notebook().title.as_deref().unwrap_or("Untitled job");
        let mark = if self.desk.is_dirty() {
            " · not saved"
        } else {
            ""
        };
        format!("{title}{mark} · farglow")
    }

    /// Returns the theme of the widgets that have no style of their own.
    #[must_use]
    pub fn theme(&self) -> Theme {
        theme::theme(self.look)
    }

    /// Returns the window as it is seen.
    #[must_use]
    pub fn view(&self) -> Element<'_, Message> {
        let shared = self.shared();
        let look = self.look;
        let mut page = column![bar::view(&self.desk, shared).map(Message::Bar), line(look)];
        if let Some((bad, said)) = &self.said {
            page = page.push(drawer::notice(*bad, said, look)).push(line(look));
        }
        if let Some(question) = &self.pending {
            page = page
                .push(guard::view(question, look).map(Message::Guard))
                .push(line(look));
        }
        if let Some(drawer) = self.drawer(shared) {
            page = page.push(drawer).push(line(look));
        }
        let wide = self.width_of_cells();
        let cells = container(self.cells.view(shared, wide).map(Message::Cells))
            .width(Length::Fixed(wide))
            .height(Length::Fill)
            .style(theme::ground(Role::Ground, look));
        // Where there is little room the drawing keeps its height, and scrolls.
        let right = responsive(move |size| {
            let both = column![
                self.curve.view(shared).map(Message::Curve),
                self.rail.view(shared).map(Message::Rail),
            ]
            .spacing(12)
            .padding([14, 14])
            .width(Length::Fill);
            if size.height < DRAWING {
                theme::scrolling(both.height(Length::Fixed(DRAWING)), look).into()
            } else {
                both.height(Length::Fill).into()
            }
        });
        page = page
            .push(row![cells, split::line(look).map(Message::Split), right].height(Length::Fill));
        page = page.push(self.cautions.view(shared).map(Message::Cautions));
        let typing = self.cells.is_typing() || self.drawer != Drawer::Shut;
        listen::listen(
            container(page)
                .width(Length::Fill)
                .height(Length::Fill)
                .style(theme::ground(Role::Ground, look)),
            move |key, modifiers| shortcut::wish(key, modifiers, typing).map(Message::Key),
        )
    }

    /// Returns how wide the column of cells is.
    fn width_of_cells(&self) -> f32 {
        split::fitting(self.wide, self.size.width)
    }

    fn drawer<'a>(&'a self, shared: Shared<'a>) -> Option<Element<'a, Message>> {
        let content = match self.drawer {
            Drawer::Shut => return None,
            Drawer::Files => self.files.view(shared).map(Message::Files),
            Drawer::Job => job::view(shared).map(Message::Job),
            Drawer::Print => self.print.view(shared).map(Message::Print),
            Drawer::Left => self.readiness.view(shared).map(Message::Readiness),
            Drawer::Keys => drawer::keys(shared.look),
        };
        Some(drawer::view(content, self.size.height, shared.look))
    }

    /// Returns what the window listens to. Nothing ticks while nothing is
    /// worked out.
    pub fn subscription(&self) -> Subscription<Message> {
        let mut all = vec![
            window::resize_events().map(|(_, size)| Message::Resized(size)),
            window::close_requests().map(|_| Message::CloseRequested),
            event::listen_with(|event, _, _| match event {
                Event::Window(window::Event::Focused) => Some(Message::Focused),
                _ => None,
            }),
        ];
        if self.desk.progress().is_some() {
            let often = std::time::Duration::from_millis(150);
            all.push(iced::time::every(often).map(|_| Message::Advanced));
        }
        Subscription::batch(all)
    }
}

fn rule_style(look: Look) -> rule::Style {
    rule::Style {
        color: theme::colour(Role::Line, look),
        radius: 0.0.into(),
        fill_mode: rule::FillMode::Full,
        snap: true,
    }
}

fn line<'a>(look: Look) -> Element<'a, Message> {
    rule::horizontal(1).style(move |_| rule_style(look)).into()
}

/// Returns the settings of fonts for the window, and for whoever tests it.
#[must_use]
pub fn settings() -> iced::Settings {
    iced::Settings {
        fonts: theme::fonts(),
        default_font: theme::REGULAR,
        default_text_size: BODY.into(),
        antialiasing: true,
        ..iced::Settings::default()
    }
}
