//! The band of cautions along the bottom: always there, all of them one click
//! away, and never shut to nothing.

use iced::widget::{Space, button, column, container, row};
use iced::{Alignment, Element, Length};

use super::dashes::dashes;
use super::shared::{Look, Shared};
use super::theme::{self, BODY, SMALL, bold, words};
use crate::drawing::mark::Shape;
use crate::drawing::role::Role;
use crate::notebook::caution;
use crate::notebook::datum::CellId;

pub use super::action::Action;

/// What is said first, whatever the notebook holds.
const FIRST: &str = "Planning aid.";

/// What is said next to it: local law, licensed practice, measuring.
const NEXT: &str =
    "Local law and licensed practice decide; measure before anyone relies on these figures.";

/// How high the open list grows before it scrolls.
const TALLEST: f32 = 300.0;

/// What a notebook's own numbers call up, the most pressing first; what is not
/// named here follows in file order.
const PRESSING: [&str; 9] = [
    "unbounded",
    "band-above-whole",
    "not-judged",
    "missing-effects",
    "near-limit",
    "range-end",
    "behind",
    "no-stay",
    "fixed-facing",
];

/// The band's own state.
#[derive(Clone, Debug, Default)]
pub struct Area {
    open: bool,
}

/// What happens in the band.
#[derive(Clone, Copy, Debug)]
pub enum Message {
    /// Show all cautions.
    Open,
    /// Show the first ones only.
    Shut,
    /// Go to the cell that calls a caution up.
    Show(CellId),
}

/// One warning with the cells that call it up.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Called {
    code: String,
    text: String,
    cells: Vec<(CellId, String)>,
}

impl Area {
    /// Returns the band as it is at first.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Returns whether all cautions are shown.
    #[must_use]
    pub const fn is_open(&self) -> bool {
        self.open
    }

    /// Takes a message in.
    pub fn update(&mut self, message: Message) -> Action {
        match message {
            Message::Open => self.open = true,
            Message::Shut => self.open = false,
            Message::Show(id) => return Action::SelectCell(id),
        }
        Action::None
    }

    /// Returns the band as it is seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let called = called(shared);
        let always = caution::always();
        let mut band = column![first(look)].spacing(4).width(Length::Fill);
        // What is in the band already: the first three, and the first called up.
        let mut told = 3.min(always.len());
        if !self.open
            && let Some(first) = called.first()
        {
            band = band.push(line(first, look));
            told += 1;
        }
        let total = always.len() + called.len();
        let (label, message) = if self.open {
            ("fewer".to_owned(), Message::Shut)
        } else {
            (more(total - told), Message::Open)
        };
        let label = words(label, BODY, Role::CautionInk, look);
        let more = button(dashes(label, BODY, theme::colour(Role::CautionInk, look)))
            .padding([2, 4])
            .style(theme::link(Role::CautionInk, Role::CautionGround, look))
            .on_press(message);
        let head = row![super::canvas::shape(Shape::Caution, 22.0, look), band, more]
            .spacing(16)
            .align_y(Alignment::Center);
        let mut whole = column![].spacing(10).width(Length::Fill);
        if self.open {
            whole = whole.push(all(&called, look));
        }
        container(whole.push(head))
            .padding([10, 20])
            .width(Length::Fill)
            .style(theme::cautions(look))
            .into()
    }
}

fn more(count: usize) -> String {
    match count {
        0 => "all cautions".to_owned(),
        1 => "1 more caution".to_owned(),
        _ => format!("{count} more cautions"),
    }
}

fn first<'a>(look: Look) -> Element<'a, Message> {
    row![
        bold(FIRST, BODY, Role::CautionInk, look),
        words(NEXT, BODY, Role::CautionInk, look).width(Length::Fill),
    ]
    .spacing(5)
    .into()
}

/// One warning on a line of its own.
fn line<'a>(called: &Called, look: Look) -> Element<'a, Message> {
    let mut content = row![].spacing(5);
    for (index, (id, name)) in called.cells.iter().enumerate() {
        // More names than a line holds say nothing more.
        if index == 3 && called.cells.len() > 4 {
            let rest = format!("and {} more:", called.cells.len() - index);
            content = content.push(words(rest, SMALL, Role::CautionInk, look));
            break;
        }
        let last = index + 1 == called.cells.len();
        let name = bold(
            if last {
                format!("{name}:")
            } else {
                format!("{name},")
            },
            SMALL,
            Role::CautionInk,
            look,
        );
        content = content.push(
            button(name)
                .padding(0)
                .style(theme::link(Role::CautionInk, Role::CautionGround, look))
                .on_press(Message::Show(*id)),
        );
    }
    content
        .push(words(called.text.clone(), SMALL, Role::CautionInk, look).width(Length::Fill))
        .into()
}

/// Every caution, those of this notebook first.
fn all<'a>(called: &[Called], look: Look) -> Element<'a, Message> {
    let heading = |text: &'static str| bold(text, SMALL, Role::CautionInk, look);
    let mut list = column![].spacing(6).width(Length::Fill);
    if !called.is_empty() {
        list = list.push(heading("Called up by this notebook"));
    }
    for called in called {
        list = list.push(line(called, look));
    }
    list = list.push(Space::new().height(4)).push(heading("Always"));
    for caution in caution::always() {
        list = list.push(words(caution.text, SMALL, Role::CautionInk, look).width(Length::Fill));
    }
    let list = container(list).padding(iced::padding::right(16));
    container(theme::scrolling(list, look))
        .max_height(TALLEST)
        .into()
}

/// Returns what the notebook calls up: the same words once, with all cells
/// that call them up, the most pressing first.
fn called(shared: Shared<'_>) -> Vec<Called> {
    let mut found: Vec<Called> = Vec::new();
    for result in &shared.results.cells {
        for caution in &result.cautions {
            let cell = (result.id, result.name.clone());
            match found.iter_mut().find(|known| known.text == caution.text) {
                Some(known) => known.cells.push(cell),
                None => found.push(Called {
                    code: caution.code.clone(),
                    text: caution.text.clone(),
                    cells: vec![cell],
                }),
            }
        }
    }
    let rank = |called: &Called| {
        PRESSING
            .iter()
            .position(|code| *code == called.code)
            .unwrap_or(PRESSING.len())
    };
    // The sort is stable: file order stays among equals.
    found.sort_by_key(rank);
    found
}
