//! What stands under the bar: what was said last, and the one drawer that is
//! open.

use iced::widget::{button, column, container, row, text};
use iced::{Alignment, Element, Length};

use super::shared::Look;
use super::theme::{self, BODY, SMALL};
use super::{Message, bar, shortcut};
use crate::drawing::role::Role;

/// How high a drawer grows before it scrolls: this, or this share of the
/// window, so that the desk stays in sight.
const TALLEST: f32 = 320.0;
const SHARE: f32 = 0.45;

/// What is open under the bar.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Drawer {
    /// Nothing.
    #[default]
    Shut,
    /// Files and templates.
    Files,
    /// Title and job.
    Job,
    /// What is left before issue.
    Left,
    /// The worksheet.
    Print,
    /// The list of keys.
    Keys,
}

/// Returns a drawer with a way to shut it, in a window that is `high`.
pub fn view<'a>(content: Element<'a, Message>, high: f32, look: Look) -> Element<'a, Message> {
    let shut = link("close", Message::ShutDrawer, look);
    let inside = row![content, shut].spacing(16).padding([12, 20]);
    container(theme::scrolling(inside, look))
        .max_height(TALLEST.max(SHARE * high))
        .width(Length::Fill)
        .style(theme::ground(Role::Panel, look))
        .into()
}

/// Returns what was said last.
pub fn notice<'a>(bad: bool, said: &'a str, look: Look) -> Element<'a, Message> {
    let role = if bad { Role::Over } else { Role::Ink };
    let line = row![
        theme::words(said, BODY, role, look).width(Length::Fill),
        link("all right", Message::Unsay, look),
    ]
    .spacing(10)
    .align_y(Alignment::Center);
    theme::band(line, Role::Panel, look).into()
}

fn link<'a>(word: &'static str, message: Message, look: Look) -> Element<'a, Message> {
    button(text(word).size(SMALL).font(theme::REGULAR))
        .padding([2, 6])
        .style(theme::plain(look))
        .on_press(message)
        .into()
}

/// Returns the list of keys.
pub fn keys<'a>(look: Look) -> Element<'a, Message> {
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
