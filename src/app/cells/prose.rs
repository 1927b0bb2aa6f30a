//! Prose that is open for typing over several lines.

use iced::Element;
use iced::widget::text_editor::{self, Action, Content, Motion};

use super::Message;
use crate::app::shared::Look;
use crate::app::theme;

/// How high prose grows before it scrolls.
const TALLEST: f32 = 220.0;

/// Makes the text that is edited the one that is stored. What reads the same
/// already keeps its cursor.
pub fn follow(content: &mut Option<Content>, text: Option<String>) {
    let Some(text) = text else {
        *content = None;
        return;
    };
    if content.as_ref().is_some_and(|held| held.text() == text) {
        return;
    }
    let mut held = Content::with_text(&text);
    held.perform(Action::Move(Motion::DocumentEnd));
    *content = Some(held);
}

/// Follows an action, and returns the text if that changed it.
pub fn perform(content: &mut Content, action: Action) -> Option<String> {
    let edits = action.is_edit();
    content.perform(action);
    edits.then(|| content.text())
}

/// Returns prose that is open for typing.
pub fn open<'a>(
    content: &'a Content,
    id: &'static str,
    empty: &'static str,
    size: f32,
    wide: f32,
    on_action: impl Fn(Action) -> Message + 'a,
    look: Look,
) -> Element<'a, Message> {
    text_editor::TextEditor::new(content)
        .id(id)
        .placeholder(empty)
        .on_action(on_action)
        .size(size)
        .font(theme::REGULAR)
        .padding([3, 6])
        .width(wide)
        .max_height(TALLEST)
        .style(theme::prose(look))
        .into()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_text_comes_back_as_it_was_put_in() {
        for text in [
            "",
            "one line",
            "two\nlines",
            "ends with one\n",
            "\n\n",
            "tab\tand ± °C",
            "two\r\nlines",
        ] {
            let mut content = None;
            follow(&mut content, Some(text.to_owned()));
            let held = content.map(|content: Content| content.text());
            assert_eq!(held.as_deref(), Some(text));
        }
    }
}
