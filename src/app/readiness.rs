//! To be said.

use iced::Element;
use iced::widget::space;

use super::shared::Shared;
use crate::notebook::datum::CellId;

/// The area's own state.
#[derive(Clone, Debug, Default)]
pub struct Area {}

/// What happens in the area.
#[derive(Clone, Debug)]
pub enum Message {
    /// Go to a cell.
    Show(CellId),
}

/// What the window has to do.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Action {
    /// Nothing.
    None,
    /// Select this cell and bring it into view.
    SelectCell(CellId),
}

impl Area {
    /// Returns the area as it is at first.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Takes a message in.
    pub fn update(&mut self, message: Message) -> Action {
        match message {
            Message::Show(id) => Action::SelectCell(id),
        }
    }

    /// Returns the area as it is seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let _ = shared;
        space().into()
    }
}
