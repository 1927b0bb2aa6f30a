//! The column of cards: only what is seen, and a little around it, is built.

use iced::widget::{button, column, container, keyed_column, row, space};
use iced::{Element, Length};

use super::{Area, Message, card, height, new};
use crate::app::shared::Shared;
use crate::app::theme::{self, SMALL, Stand};
use crate::drawing::role::Role;
use crate::notebook::cell::Kind;
use crate::notebook::datum::CellId;
use crate::notebook::engine::Engine;
use crate::notebook::results::Results;

/// The column's scrolling part.
pub const COLUMN: &str = "cells";

/// The space between two cards.
const GAP: f32 = 8.0;

/// The space left and right of the cards.
const BESIDE: f32 = 16.0;

/// The space above the first card and below the last.
const ENDS: f32 = 14.0;

/// Returns how wide a card is in a column of this width.
#[must_use]
pub fn card_width(column: f32) -> f32 {
    column - 2.0 * BESIDE
}

impl Area {
    /// Brings a cell into view, and returns how far the column must be scrolled
    /// for it; `None` where it is seen already.
    pub fn reveal(
        &mut self,
        engine: &Engine,
        results: &Results,
        id: CellId,
        wide: f32,
    ) -> Option<f32> {
        let wide = card_width(wide);
        let mut y = ENDS;
        for result in &results.cells {
            let high = height::estimate(engine, result, result.id == id, wide);
            if result.id == id {
                let seen = y >= self.offset && y + high.min(self.seen) <= self.offset + self.seen;
                if seen {
                    return None;
                }
                // Built at once, so that a field in it can take the typing.
                self.offset = (y - 60.0_f32).max(0.0);
                return Some(self.offset);
            }
            y += high + GAP;
        }
        None
    }

    /// Returns the cells as they are seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>, wide: f32) -> Element<'a, Message> {
        let look = shared.look;
        let wide = card_width(wide);
        let cells = &shared.results.cells;
        let mut linked = Vec::new();
        if let Some(selected) = shared.selected {
            linked = shared.engine.feeds(selected);
            linked.extend(shared.engine.fed_by(selected));
        }
        let stand = |id: CellId| {
            if shared.selected == Some(id) {
                Stand::Selected
            } else if linked.contains(&id) {
                Stand::Linked
            } else {
                Stand::Apart
            }
        };
        // Only what is seen, and a little around it, is built.
        let (from, to) = (self.offset - 400.0, self.offset + self.seen + 400.0);
        let (mut above, mut below, mut y) = (0.0, 0.0, 0.0);
        let mut cards = keyed_column::<CellId, Message, _, _>([])
            .spacing(GAP)
            .width(Length::Fill);
        for result in cells {
            let high = height::estimate(
                shared.engine,
                result,
                stand(result.id) == Stand::Selected,
                wide,
            );
            if y + high < from {
                above += high + GAP;
            } else if y > to {
                below += high + GAP;
            } else {
                let card = card::view(self, shared, result, stand(result.id), wide);
                cards = cards.push(result.id, card);
            }
            y += high + GAP;
        }
        let mut body = column![space().height(above), cards].width(Length::Fill);
        if below > 0.0 {
            body = body.push(space().height(below));
        } else {
            body = body.push(space().height(GAP)).push(self.bottom(shared));
        }
        theme::scrolling(container(body).padding([ENDS, BESIDE]), look)
            .id(COLUMN)
            .on_scroll(|viewport| {
                Message::Scrolled(viewport.absolute_offset().y, viewport.bounds().height)
            })
            .height(Length::Fill)
            .width(Length::Fill)
            .into()
    }

    /// What can be added.
    fn bottom<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let plain = |text: String, message: Message| {
            button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
                .padding([4, 10])
                .style(theme::framed(look))
                .on_press(message)
        };
        let empty = shared.engine.notebook().cells.is_empty();
        if !self.adding && !empty {
            return plain("add a cell".to_owned(), Message::ToggleAdding).into();
        }
        let said = if empty {
            "This notebook is empty. Begin with what is hot: add a source, then a position."
        } else {
            "Add after the selected cell:"
        };
        let kinds = Kind::ALL.into_iter().map(|kind| {
            row![
                container(plain(kind.name().to_owned(), Message::Add(kind)))
                    .width(Length::Fixed(116.0)),
                theme::words(new::about(kind), SMALL, Role::Muted, look),
            ]
            .spacing(8)
            .align_y(iced::Alignment::Center)
            .into()
        });
        column![
            theme::words(said, SMALL, Role::Ink, look),
            column(kinds).spacing(4)
        ]
        .spacing(6)
        .into()
    }
}
