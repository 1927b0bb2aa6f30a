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
mod files;
mod follow;
mod job;
mod listen;
mod open;
pub mod preset;
mod print;
pub mod rail;
pub mod readiness;
pub mod shared;
mod shortcut;
pub mod theme;

use std::path::PathBuf;

use iced::widget::{button, column, container, row, rule, scrollable};
use iced::{Alignment, Element, Length, Size, Subscription, Theme, window};

use crate::drawing::role::{self, Role};
use crate::notebook::datum::CellId;
use crate::notebook::results::Results;
use crate::store::settings::Settings;
use desk::Desk;
use shared::{Look, Measure, Shared};
use theme::{BODY, SMALL};

pub use cells::TYPING;
pub use desk::Error;
pub use files::PATH;
pub use open::{Unopened, start};

/// How wide the column of cells is.
const CELLS: f32 = 428.0;

/// The window with everything in it.
#[derive(Debug)]
pub struct Window {
    desk: Desk,
    selected: Option<CellId>,
    look: Look,
    size: Size,
    drawer: Drawer,
    cells: cells::Area,
    files: files::Area,
    print: print::Area,
    job: job::Area,
    curve: curve::Area,
    rail: rail::Area,
    cautions: cautions::Area,
    readiness: readiness::Area,
    /// What the guard asks about.
    pending: Option<files::Wish>,
    /// What was said last: whether it is bad, and the words.
    said: Option<(bool, String)>,
    /// Where the window's settings live; nowhere in tests.
    settings: Option<PathBuf>,
}

/// What is open under the bar.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
enum Drawer {
    #[default]
    Shut,
    Files,
    Job,
    Left,
    Print,
    Keys,
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
    Guard(files::Answer),
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
            page = page.push(notice(*bad, said, look)).push(line(look));
        }
        if let Some(wish) = &self.pending {
            page = page
                .push(files::guard(wish, look).map(Message::Guard))
                .push(line(look));
        }
        if let Some(drawer) = self.drawer(shared) {
            page = page.push(drawer).push(line(look));
        }
        let cells = container(self.cells.view(shared).map(Message::Cells))
            .width(Length::Fixed(CELLS))
            .height(Length::Fill)
            .style(theme::ground(Role::Ground, look));
        let right = column![
            self.curve.view(shared).map(Message::Curve),
            self.rail.view(shared).map(Message::Rail),
        ]
        .spacing(12)
        .padding([14, 18])
        .width(Length::Fill)
        .height(Length::Fill);
        page = page.push(
            row![
                cells,
                rule::vertical(1).style(move |_| rule_style(look)),
                right
            ]
            .height(Length::Fill),
        );
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

    fn drawer<'a>(&'a self, shared: Shared<'a>) -> Option<Element<'a, Message>> {
        let look = self.look;
        let content = match self.drawer {
            Drawer::Shut => return None,
            Drawer::Files => self.files.view(shared).map(Message::Files),
            Drawer::Job => job::view(shared).map(Message::Job),
            Drawer::Print => self.print.view(shared).map(Message::Print),
            Drawer::Left => self.readiness.view(shared).map(Message::Readiness),
            Drawer::Keys => keys(look),
        };
        let shut = button(iced::widget::text("close").size(SMALL).font(theme::REGULAR))
            .padding([2, 6])
            .style(theme::plain(look))
            .on_press(Message::ShutDrawer);
        Some(
            container(
                // A long drawer scrolls, so that the desk stays in sight.
                scrollable(row![content, shut].spacing(16).padding([12, 20]))
                    .style(move |theme, status| theme::scroll(look, theme, status)),
            )
            .max_height(320)
            .width(Length::Fill)
            .style(theme::ground(Role::Panel, look))
            .into(),
        )
    }

    /// Returns what the window listens to. Nothing ticks while nothing is
    /// worked out.
    pub fn subscription(&self) -> Subscription<Message> {
        let mut all = vec![
            window::resize_events().map(|(_, size)| Message::Resized(size)),
            window::close_requests().map(|_| Message::CloseRequested),
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

/// What was said last.
fn notice<'a>(bad: bool, said: &'a str, look: Look) -> Element<'a, Message> {
    let role = if bad { Role::Over } else { Role::Ink };
    container(
        row![
            theme::words(said, BODY, role, look).width(Length::Fill),
            button(
                iced::widget::text("all right")
                    .size(SMALL)
                    .font(theme::REGULAR)
            )
            .padding([2, 6])
            .style(theme::plain(look))
            .on_press(Message::Unsay),
        ]
        .spacing(10)
        .align_y(Alignment::Center),
    )
    .padding([8, 20])
    .width(Length::Fill)
    .style(theme::ground(Role::Panel, look))
    .into()
}

/// The list of keys.
fn keys<'a>(look: Look) -> Element<'a, Message> {
    let third = shortcut::ALL.len().div_ceil(3);
    let columns = shortcut::ALL.chunks(third).map(|some| {
        let lines = some.iter().map(|shortcut| {
            row![
                container(theme::bold(shortcut.keys, SMALL, Role::Ink, look))
                    .width(Length::Fixed(110.0)),
                theme::words(shortcut.about, SMALL, Role::Muted, look),
            ]
            .into()
        });
        column(lines).spacing(3).width(Length::Fill).into()
    });
    column![
        row(columns).spacing(20),
        bar::manners(look).map(Message::Bar)
    ]
    .spacing(10)
    .width(Length::Fill)
    .into()
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
