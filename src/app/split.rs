//! The line between the cells and the drawing, which is dragged or moved with
//! keys; neither side can be made too narrow to read.

use iced::advanced::widget::Tree;
use iced::advanced::widget::tree;
use iced::advanced::{
    Clipboard, Layout, Renderer as _, Shell, Widget, layout, mouse as pointer, renderer,
};
use iced::{Color, Element, Event, Length, Rectangle, Renderer, Size, Theme, mouse};

use super::shared::Look;
use super::theme;
use crate::drawing::role::Role;

/// The least width of the cells: what a sentence and its result need.
pub const CELLS: f32 = 320.0;
/// The least width of the drawing.
pub const DRAWING: f32 = 400.0;
/// How far a key moves the line.
pub const STEP: f32 = 24.0;

/// How wide the line can be taken hold of.
const GRIP: f32 = 7.0;

/// Returns the width of the cells next to `wished` in a window that is `wide`.
#[must_use]
pub fn fitting(wished: f32, wide: f32) -> f32 {
    wished.min(wide - DRAWING).max(CELLS)
}

/// What happens to the line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Message {
    /// It is drawn so that the cells get this width.
    Drawn(f32),
    /// It was let go.
    Dropped,
}

/// The line.
struct Line {
    rest: Color,
    held: Color,
}

/// Returns the line between the two halves.
pub fn line<'a>(look: Look) -> Element<'a, Message> {
    Element::new(Line {
        rest: theme::colour(Role::Line, look),
        held: theme::colour(Role::Action, look),
    })
}

#[derive(Default)]
struct State {
    /// Where the pointer took hold of it, right of its middle.
    held: Option<f32>,
    /// Whether the pointer rests on it.
    over: bool,
}

impl Widget<Message, Theme, Renderer> for Line {
    fn tag(&self) -> tree::Tag {
        tree::Tag::of::<State>()
    }

    fn state(&self) -> tree::State {
        tree::State::new(State::default())
    }

    fn size(&self) -> Size<Length> {
        Size::new(Length::Fixed(GRIP), Length::Fill)
    }

    fn layout(
        &mut self,
        _tree: &mut Tree,
        _renderer: &Renderer,
        limits: &layout::Limits,
    ) -> layout::Node {
        layout::atomic(limits, Length::Fixed(GRIP), Length::Fill)
    }

    fn update(
        &mut self,
        tree: &mut Tree,
        event: &Event,
        layout: Layout<'_>,
        cursor: pointer::Cursor,
        _renderer: &Renderer,
        _clipboard: &mut dyn Clipboard,
        shell: &mut Shell<'_, Message>,
        _viewport: &Rectangle,
    ) {
        let state = tree.state.downcast_mut::<State>();
        let bounds = layout.bounds();
        match event {
            Event::Mouse(mouse::Event::ButtonPressed(mouse::Button::Left)) => {
                if let Some(at) = cursor.position_over(bounds) {
                    state.held = Some(at.x - bounds.center_x());
                    shell.capture_event();
                    shell.request_redraw();
                }
            }
            Event::Mouse(mouse::Event::CursorMoved { position }) => {
                let over = cursor.is_over(bounds);
                if std::mem::replace(&mut state.over, over) != over {
                    shell.request_redraw();
                }
                if let Some(off) = state.held {
                    shell.publish(Message::Drawn(position.x - off - GRIP / 2.0));
                    shell.capture_event();
                }
            }
            Event::Mouse(mouse::Event::ButtonReleased(mouse::Button::Left))
                if state.held.take().is_some() =>
            {
                shell.publish(Message::Dropped);
                shell.capture_event();
                shell.request_redraw();
            }
            _ => {}
        }
    }

    fn mouse_interaction(
        &self,
        tree: &Tree,
        layout: Layout<'_>,
        cursor: pointer::Cursor,
        _viewport: &Rectangle,
        _renderer: &Renderer,
    ) -> pointer::Interaction {
        let held = tree.state.downcast_ref::<State>().held.is_some();
        if held || cursor.is_over(layout.bounds()) {
            pointer::Interaction::ResizingHorizontally
        } else {
            pointer::Interaction::default()
        }
    }

    fn draw(
        &self,
        tree: &Tree,
        renderer: &mut Renderer,
        _theme: &Theme,
        _style: &renderer::Style,
        layout: Layout<'_>,
        _cursor: pointer::Cursor,
        _viewport: &Rectangle,
    ) {
        let bounds = layout.bounds();
        let state = tree.state.downcast_ref::<State>();
        let (width, colour) = if state.held.is_some() || state.over {
            (3.0, self.held)
        } else {
            (1.0, self.rest)
        };
        renderer.fill_quad(
            renderer::Quad {
                bounds: Rectangle {
                    x: (bounds.center_x() - width / 2.0).round(),
                    width,
                    ..bounds
                },
                ..renderer::Quad::default()
            },
            colour,
        );
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neither_side_can_be_made_too_narrow() {
        for (wished, wide, expected) in [
            (428.0, 1440.0, 428.0),
            (10.0, 1440.0, 320.0),
            (2000.0, 1440.0, 1040.0),
            // The least window there is: the cells keep what they need.
            (428.0, 720.0, 320.0),
            (428.0, 500.0, 320.0),
        ] {
            let found = fitting(wished, wide);
            assert!(
                (found - expected).abs() < 1e-3,
                "{wished} of {wide}: {found}, wanted {expected}"
            );
        }
    }
}
