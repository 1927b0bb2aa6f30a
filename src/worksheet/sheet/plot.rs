//! The curves: irradiance against distance with limit lines, crossings and the
//! positions on that line, and under them the rails: where may I stand?

use super::Sheet;
use crate::drawing::curve::{self, Curve};
use crate::drawing::measure::Measure;
use crate::drawing::rail::{self, Line, Rail};
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
        let shown = Curve::of(sheet.engine, sheet.results, cell, Measure::Metric);
        blocks.push(Block::Picture {
            picture: curve::picture(&shown, SIZE.0, SIZE.1),
            caption: caption(&shown),
        });
    }
    blocks.extend(rails(sheet));
    blocks
}

/// One rail for every line on which a zone or a curve runs or a position stands.
fn rails(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = Vec::new();
    for line in Line::all(sheet.engine) {
        let Some(rail) = Rail::of(sheet.engine, sheet.results, &line, Measure::Metric) else {
            continue;
        };
        let drawn = sheet.results.cells.iter().any(|cell| {
            matches!(cell.kind, Kind::Zone | Kind::Curve) && line.carries(sheet.engine, cell.id)
        });
        if !drawn && rail.stands.is_empty() {
            continue;
        }
        let height = rail::height(&rail, SIZE.0);
        let caption = "Clear distances, from the edge of the source's outline. Filled pins: where \
                       a rule is met from, on the safe bound and with the reach counted; hollow \
                       pins: the same on the nominal values."
            .to_owned();
        let picture = Block::Picture {
            picture: rail::picture(&rail, SIZE.0, height),
            caption,
        };
        blocks.push(if blocks.is_empty() {
            Block::Together(vec![
                Block::Heading("Where each rule begins to be met".to_owned()),
                picture,
            ])
        } else {
            picture
        });
    }
    blocks
}

fn caption(curve: &Curve) -> String {
    let mut text = "Full line: nominal. ".to_owned();
    if curve.upper.is_some() {
        text.push_str("Dashed: upper bound (97.5 %). ");
    }
    if let Some(square) = &curve.inverse_square {
        let error = square.error(&curve.rows);
        let error = if error.is_empty() {
            "agrees with the model along this line".to_owned()
        } else {
            format!("reads {error}")
        };
        text.push_str(&format!(
            "Dotted: {}, what a sheet says that goes on from one figure with the square of the \
             distance; it {error}. ",
            square.name()
        ));
    }
    text.push_str("Pins mark where a rule begins to be met: for zones with the reach counted.");
    text
}
