//! A row of dashes under each line of what can be changed inside a sentence.

use iced::advanced::{Renderer as _, renderer};
use iced::widget::text;
use iced::{Color, Element, Pixels, Rectangle, Renderer};

use super::wrap::{Around, wrap};

/// How far the dashes stand above the foot of a line.
const ABOVE: f32 = 2.0;

/// How long a dash is, and the gap after it.
const DASH: f32 = 4.0;
const GAP: f32 = 2.5;

/// Dashes of a colour under every line of this height.
struct Dashes {
    colour: Color,
    line: f32,
}

impl<Message> Around<Message> for Dashes {
    fn over(&self, renderer: &mut Renderer, bounds: Rectangle) {
        let lines = (bounds.height / self.line).round().max(1.0);
        let high = bounds.height / lines;
        let mut foot = high;
        while foot < bounds.height + 0.5 {
            let y = bounds.y + foot - ABOVE;
            let mut x = bounds.x;
            while x < bounds.x + bounds.width {
                let width = DASH.min(bounds.x + bounds.width - x);
                renderer.fill_quad(
                    renderer::Quad {
                        bounds: Rectangle {
                            x,
                            y,
                            width,
                            height: 1.0,
                        },
                        ..renderer::Quad::default()
                    },
                    self.colour,
                );
                x += DASH + GAP;
            }
            foot += high;
        }
    }
}

/// Returns a text of this size with dashes of a colour under each of its lines.
pub fn dashes<'a, Message: 'a>(
    content: impl Into<Element<'a, Message>>,
    size: f32,
    colour: Color,
) -> Element<'a, Message> {
    let line = text::LineHeight::default().to_absolute(Pixels(size)).0;
    wrap(content, Dashes { colour, line })
}
