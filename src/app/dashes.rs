//! A row of dashes under what can be changed inside a sentence.

use iced::advanced::widget::{Operation, Tree};
use iced::advanced::{Layout, Renderer as _, Widget, layout, mouse, renderer};
use iced::{Color, Element, Length, Rectangle, Renderer, Size, Theme};

/// How far the dashes stand below the text.
const BELOW: f32 = 2.0;

/// Something with dashes under it.
pub struct Dashes<'a, Message> {
    content: Element<'a, Message>,
    colour: Color,
}

/// Returns `content` with dashes of a colour under it.
pub fn dashes<'a, Message: 'a>(
    content: impl Into<Element<'a, Message>>,
    colour: Color,
) -> Element<'a, Message> {
    Element::new(Dashes {
        content: content.into(),
        colour,
    })
}

impl<Message> Widget<Message, Theme, Renderer> for Dashes<'_, Message> {
    fn children(&self) -> Vec<Tree> {
        vec![Tree::new(&self.content)]
    }

    fn diff(&self, tree: &mut Tree) {
        tree.diff_children(std::slice::from_ref(&self.content));
    }

    fn size(&self) -> Size<Length> {
        self.content.as_widget().size()
    }

    fn layout(
        &mut self,
        tree: &mut Tree,
        renderer: &Renderer,
        limits: &layout::Limits,
    ) -> layout::Node {
        let node = self
            .content
            .as_widget_mut()
            .layout(&mut tree.children[0], renderer, limits);
        layout::Node::with_children(node.size(), vec![node])
    }

    fn operate(
        &mut self,
        tree: &mut Tree,
        layout: Layout<'_>,
        renderer: &Renderer,
        operation: &mut dyn Operation,
    ) {
        for layout in layout.children() {
            self.content.as_widget_mut().operate(
                &mut tree.children[0],
                layout,
                renderer,
                operation,
            );
        }
    }

    fn draw(
        &self,
        tree: &Tree,
        renderer: &mut Renderer,
        theme: &Theme,
        style: &renderer::Style,
        layout: Layout<'_>,
        cursor: mouse::Cursor,
        viewport: &Rectangle,
    ) {
        for layout in layout.children() {
            self.content.as_widget().draw(
                &tree.children[0],
                renderer,
                theme,
                style,
                layout,
                cursor,
                viewport,
            );
        }
        let bounds = layout.bounds();
        let y = bounds.y + bounds.height - BELOW;
        let (dash, gap) = (4.0_f32, 2.5_f32);
        let mut x = bounds.x;
        while x < bounds.x + bounds.width {
            let width = dash.min(bounds.x + bounds.width - x);
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
            x += dash + gap;
        }
    }
}
