//! How high a card is, without building it.

use super::sentence::{self, Piece};
use crate::drawing::font::{self, Weight};
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::engine::Engine;
use crate::notebook::results::{CellResult, State};

/// The height of a line of body text, and of secondary text.
const LINE: f64 = 20.2;
const SMALL: f64 = 18.9;

/// Returns the estimated height of a card that is `card` wide.
///
/// # Accuracy
///
/// Within a line of text for cards that are not selected: it only decides how
/// long the bar is and where cards out of sight begin, never what is drawn.
// Heights of cards are far below the limits of single precision.
#[allow(clippy::cast_possible_truncation)]
pub fn estimate(engine: &Engine, result: &CellResult, selected: bool, card: f32) -> f32 {
    let Some(cell) = engine.cell(result.id) else {
        return 60.0;
    };
    let inner = f64::from(card) - 30.0;
    let wide = match cell.kind {
        Kind::Note | Kind::Surroundings | Kind::Curve => inner,
        _ => (inner - 130.0).max(100.0),
    };
    let text = match cell.kind {
        // Prose at rest is one line.
        Kind::Note if !selected => 1.0,
        _ => lines(width(cell), wide),
    };
    let mut height = 20.0 + SMALL + text * (LINE + 2.0);
    height += match cell.kind {
        Kind::Position => 3.0 * SMALL + 3.0 * LINE,
        Kind::Assessment => 3.0 * SMALL,
        Kind::Zone => 2.0 * SMALL,
        Kind::Surroundings | Kind::Source | Kind::Curve => SMALL,
        _ => 0.0,
    };
    match &result.state {
        State::Ok => {}
        State::Waiting(_) => height += SMALL,
        State::Error => height += 3.0 * SMALL * result.errors.len().min(4) as f64,
    }
    if !result.cautions.is_empty() {
        height += SMALL;
    }
    if selected {
        height += LINE * sentence::others(cell).len() as f64;
    }
    height as f32
}

/// Returns how wide the sentence is on one line.
fn width(cell: &Cell) -> f64 {
    let text = |text: &str| font::width(text, 14.0, Weight::Regular) + 4.0;
    sentence::sentence(cell)
        .iter()
        .map(|piece| match piece {
            Piece::Name => text(&cell.name),
            Piece::Words(words) => text(words),
            Piece::Field(field, after) => {
                sentence::typed(cell, field).map_or_else(
                    || text(sentence::absent(cell.kind, field)),
                    |typed| text(&typed),
                ) + text(after)
            }
        })
        .sum()
}

fn lines(width: f64, wide: f64) -> f64 {
    (width / wide).ceil().max(1.0)
}
