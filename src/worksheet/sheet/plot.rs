//! The curves: irradiance against distance with limit lines, crossings and the
//! positions on that line.

use super::Sheet;
use crate::drawing::curve::{self, Curve};
use crate::notebook::cell::Kind;
use crate::notebook::results::State;
use crate::worksheet::block::Block;

/// The size of a plot on paper, in points.
const SIZE: (f64, f64) = (490.0, 280.0);

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = Vec::new();
    for cell in &sheet.results.cells {
        if cell.kind != Kind::Curve || cell.state != State::Ok {
            continue;
        }
        if blocks.is_empty() {
            blocks.push(Block::Heading("Irradiance against distance".to_owned()));
        }
        let shown = Curve::of(sheet.engine, sheet.results, cell);
        blocks.push(Block::Picture {
            picture: curve::picture(&shown, SIZE.0, SIZE.1),
            caption: caption(&shown),
        });
    }
    blocks
}

fn caption(curve: &Curve) -> String {
    let mut text = "Full line: nominal. ".to_owned();
    if curve.upper.is_some() {
        text.push_str("Dashed: upper bound (97.5 %). ");
    }
    text.push_str(
        "Dotted: inverse square through the farthest point, for comparison: too high or too low \
         near the source. Pins mark where a rule begins to be met: for zones with the reach counted.",
    );
    text
}
