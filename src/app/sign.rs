//! The shape that stands beside the word of a finding.

use iced::widget::canvas::{self, Canvas, Frame, Path, Stroke};
use iced::{Color, Element, Point, Rectangle, Renderer, Theme, mouse};

use super::shared::Look;
use super::style;
use crate::drawing::mark::Shape;

/// A shape in its colour.
#[derive(Clone, Copy, Debug)]
struct Sign {
    shape: Shape,
    colour: Color,
    back: Color,
}

/// Returns the shape of a finding's word or of a caution, `size` points high.
pub fn sign<'a, Message: 'a>(shape: Shape, size: f32, look: Look) -> Element<'a, Message> {
    Canvas::new(Sign {
        shape,
        colour: style::colour(shape.role(), look),
        back: style::colour(crate::drawing::role::Role::Card, look),
    })
    .width(size)
    .height(size)
    .into()
}

impl<Message> canvas::Program<Message> for Sign {
    type State = ();

    fn draw(
        &self,
        (): &(),
        renderer: &Renderer,
        _theme: &Theme,
        bounds: Rectangle,
        _cursor: mouse::Cursor,
    ) -> Vec<canvas::Geometry> {
        let mut frame = Frame::new(renderer, bounds.size());
        let centre = Point::new(bounds.width / 2.0, bounds.height / 2.0);
        let radius = bounds.width.min(bounds.height) / 2.0 - 0.5;
        match self.shape {
            Shape::Over => {
                // An octagon that stands on an edge.
                frame.fill(&ring(centre, radius * 1.05, 8, 22.5), self.colour);
            }
            Shape::Within => frame.fill(&Path::circle(centre, radius), self.colour),
            Shape::NotAssessed => {
                let stroke = Stroke::default().with_color(self.colour).with_width(1.6);
                frame.stroke(&ring(centre, radius - 0.5, 4, 0.0), stroke);
            }
            Shape::Caution => {
                frame.fill(&ring(centre, radius * 1.1, 3, -90.0), self.colour);
                let bar = Path::rectangle(
                    Point::new(centre.x - 0.8, centre.y - radius * 0.4),
                    iced::Size::new(1.6, radius * 0.6),
                );
                frame.fill(&bar, self.back);
            }
            Shape::Pin | Shape::NominalPin => {
                frame.fill(&ring(centre, radius, 3, 90.0), self.colour);
            }
        }
        vec![frame.into_geometry()]
    }
}

/// A regular polygon; the first corner at `turn` degrees from the right.
fn ring(centre: Point, radius: f32, corners: u8, turn: f32) -> Path {
    Path::new(|path| {
        for corner in 0..corners {
            let angle = (turn + 360.0 * f32::from(corner) / f32::from(corners)).to_radians();
            let at = Point::new(
                centre.x + radius * angle.cos(),
                centre.y + radius * angle.sin(),
            );
            if corner == 0 {
                path.move_to(at);
            } else {
                path.line_to(at);
            }
        }
        path.close();
    })
}
