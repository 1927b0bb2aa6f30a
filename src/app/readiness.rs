//! What is left before a worksheet can be issued as final, each leading to
//! where it is done.

use iced::widget::{button, column, container, row};
use iced::{Alignment, Element, Length};

use super::shared::Shared;
use super::theme::{self, BODY, SMALL, bold, words};
use crate::drawing::mark::Shape;
use crate::drawing::role::Role;
use crate::notebook::datum::CellId;
use crate::notebook::readiness::Item;

/// How high the list grows before it scrolls.
const TALLEST: f32 = 320.0;

/// The area's own state: it has none.
#[derive(Clone, Copy, Debug, Default)]
pub struct Area;

/// Where an item is done.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Target {
    /// At a cell.
    Cell(CellId),
    /// In the job block.
    Job,
    /// By a new position.
    NewPosition,
    /// By a new assessment of this position.
    NewAssessment(CellId),
}

/// What happens in the area.
#[derive(Clone, Copy, Debug)]
pub enum Message {
    /// Go to where an item is done.
    Go(Target),
}

/// What the window has to do.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Action {
    /// Nothing.
    None,
    /// Select this cell and bring it into view.
    SelectCell(CellId),
    /// Open the job block.
    OpenJob,
    /// Add a cell of kind position.
    AddPosition,
    /// Add a cell of kind assessment that judges this position.
    AddAssessment(CellId),
}

impl Area {
    /// Returns the area.
    #[must_use]
    pub const fn new() -> Self {
        Area
    }

    /// Takes a message in.
    pub fn update(&mut self, message: Message) -> Action {
        match message {
            Message::Go(Target::Cell(id)) => Action::SelectCell(id),
            Message::Go(Target::Job) => Action::OpenJob,
            Message::Go(Target::NewPosition) => Action::AddPosition,
            Message::Go(Target::NewAssessment(id)) => Action::AddAssessment(id),
        }
    }

    /// Returns the list as it is seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let items = &shared.results.readiness;
        let heading = match items.len() {
            0 => "Nothing is left: the worksheet can be issued as final".to_owned(),
            1 => "1 left before issue".to_owned(),
            count => format!("{count} left before issue"),
        };
        let mut list = column![].spacing(4).width(Length::Fill);
        for item in items {
            let words =
                words(item.text.replace('`', ""), BODY, Role::Ink, look).width(Length::Fill);
            let line = row![super::canvas::shape(Shape::NotAssessed, 10.0, look), words]
                .spacing(8)
                .align_y(Alignment::Center);
            list = list.push(match target(shared, item) {
                Some(target) => line.push(
                    button(theme::words(verb(target), SMALL, Role::Action, look))
                        .padding([2, 8])
                        .style(theme::framed(look))
                        .on_press(Message::Go(target)),
                ),
                None => line,
            });
        }
        if !shared.fresh {
            list = list.push(words(
                "bounds are being worked out: more may follow",
                SMALL,
                Role::Muted,
                look,
            ));
        }
        let list = container(list).padding(iced::padding::right(16));
        let list = container(theme::scrolling(list, look)).max_height(TALLEST);
        column![bold(heading, BODY, Role::Ink, look), list]
            .spacing(8)
            .width(Length::Fill)
            .into()
    }
}

/// Returns what the button of an item says.
const fn verb(target: Target) -> &'static str {
    match target {
        Target::Cell(_) | Target::Job => "go there",
        Target::NewPosition | Target::NewAssessment(_) => "add it",
    }
}

/// Returns where an item is done: at its own cell, in the job block, where
/// limits are confirmed too, or by a new cell.
fn target(shared: Shared<'_>, item: &Item) -> Option<Target> {
    let cell = item.cell.as_ref().and_then(|name| shared.engine.find(name));
    match (item.code, cell) {
        ("not-judged", Some(id)) => Some(Target::NewAssessment(id)),
        (_, Some(id)) => Some(Target::Cell(id)),
        ("no-position", None) => Some(Target::NewPosition),
        ("job-line" | "recalled" | "confirmation", None) => Some(Target::Job),
        _ => None,
    }
}
