//! Hears keys before the widgets inside do, so that a shortcut works wherever
//! the typing is.

use iced::keyboard::{self, Key, Modifiers};
use iced::{Element, Event};

use super::wrap::{Around, wrap};

/// Hears keys first.
struct Listen<F>(F);

impl<Message, F: Fn(&Key, Modifiers) -> Option<Message>> Around<Message> for Listen<F> {
    fn hear(&self, event: &Event) -> Option<Message> {
        match event {
            Event::Keyboard(keyboard::Event::KeyPressed { key, modifiers, .. }) => {
                (self.0)(key, *modifiers)
            }
            _ => None,
        }
    }
}

/// Returns `content`, with `hear` asked for the message of each key first.
pub fn listen<'a, Message: 'a>(
    content: impl Into<Element<'a, Message>>,
    hear: impl Fn(&Key, Modifiers) -> Option<Message> + 'a,
) -> Element<'a, Message> {
    wrap(content, Listen(hear))
}
