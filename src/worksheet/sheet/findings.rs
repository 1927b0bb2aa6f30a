//! What was found: one sentence a position, the edges of the zones, and the
//! tables behind them.

use super::Sheet;
use crate::drawing::mark::Shape;
use crate::notebook::cell::Kind;
use crate::notebook::results::{CellResult, State};
use crate::notebook::wording;
use crate::units::format;
use crate::worksheet::block::{Block, Cell, Column, Pair, Run, Table};

fn judges(sheet: &Sheet<'_>, cell: &CellResult, position: &str) -> bool {
    cell.judges(sheet.engine, position)
}

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = vec![Block::Heading("Findings".to_owned())];
    for cell in &sheet.results.cells {
        match cell.kind {
            Kind::Position => blocks.extend(of_position(sheet, cell)),
            Kind::Zone => blocks.push(of_zone(sheet, cell)),
            _ => {}
        }
    }
    for cell in &sheet.results.cells {
        blocks.extend(faults(cell));
    }
    if blocks.len() == 1 {
        blocks.push(Block::Finding {
            shape: Shape::NotAssessed,
            word: "not assessed".to_owned(),
            text: vec![Run::plain(
                ": there is no position in this notebook, so nothing is decided here.",
            )],
        });
    }
    blocks
}

fn of_position(sheet: &Sheet<'_>, position: &CellResult) -> Vec<Block> {
    let mut blocks = Vec::new();
    for cell in &sheet.results.cells {
        if !judges(sheet, cell, &position.name) {
            continue;
        }
        let (word, text) = match wording::finding(sheet.engine, cell) {
            Some(sentence) => (sentence.word, sentence.text),
            None => ("not assessed", wording::not_worked_out(cell)),
        };
        blocks.push(Block::Finding {
            shape: Shape::of_word(word),
            word: word.to_owned(),
            text: vec![
                Run::plain(" at "),
                Run::bold(position.name.clone()),
                Run::plain(format!(": {text}.")),
            ],
        });
    }
    if blocks.is_empty() {
        blocks.push(Block::Finding {
            shape: Shape::NotAssessed,
            word: "not assessed".to_owned(),
            text: vec![
                Run::plain(" at "),
                Run::bold(position.name.clone()),
                Run::plain(": nothing in this notebook judges it."),
            ],
        });
    }
    blocks
}

fn of_zone(sheet: &Sheet<'_>, cell: &CellResult) -> Block {
    let typed = sheet.engine.cell(cell.id);
    let text = |field: &str| typed.and_then(|cell| cell.text(field)).unwrap_or("");
    let rule = format!("{} for one stay of {}", text("guidance"), text("stay"));
    Block::Bullet(vec![
        Run::bold(format!("Zone {}", cell.name)),
        Run::plain(format!(" ({rule}): ")),
        Run::bold(wording::zone(sheet.engine, cell)),
        Run::plain("."),
    ])
}

fn faults(cell: &CellResult) -> Vec<Block> {
    let finding = |text: String| Block::Finding {
        shape: Shape::NotAssessed,
        word: "not worked out".to_owned(),
        text: vec![Run::bold(cell.name.clone()), Run::plain(text)],
    };
    match &cell.state {
        State::Ok => Vec::new(),
        State::Error => cell
            .errors
            .iter()
            .map(|error| finding(format!(", {error}")))
            .collect(),
        State::Waiting(cells) => vec![finding(format!(" waits for {}", cells.join(", ")))],
    }
}

/// Returns what reaches each position, and what each limit says of it.
pub(super) fn tables(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = Vec::new();
    for position in &sheet.results.cells {
        if position.kind != Kind::Position || position.state != State::Ok {
            continue;
        }
        blocks.push(Block::Heading(format!("Position {}", position.name)));
        blocks.push(Block::Pairs {
            columns: 4,
            pairs: exposures(position),
        });
        for cell in &sheet.results.cells {
            if judges(sheet, cell, &position.name) && cell.state == State::Ok {
                blocks.push(Block::Table(verdicts(cell)));
            }
        }
    }
    blocks
}

fn exposures(position: &CellResult) -> Vec<Pair> {
    position
        .figures
        .iter()
        .map(|figure| {
            let nominal = wording::nominal(&figure.name, &figure.shown, None);
            let value = match wording::bound(&figure.name, &figure.shown, None) {
                Some(bound) if bound != nominal => {
                    vec![Run::bold(bound), Run::muted(format!("\nnominal {nominal}"))]
                }
                _ => vec![Run::plain(nominal)],
            };
            Pair {
                name: wording::figure_label(figure),
                value,
            }
        })
        .collect()
}

fn verdicts(cell: &CellResult) -> Table {
    let columns = vec![
        Column::words("guidance"),
        Column::numbers("exposure"),
        Column::numbers("limit"),
        Column::numbers("ratio"),
        Column::numbers("allowed time"),
        Column::words("finding"),
    ];
    let rows = cell
        .verdicts
        .iter()
        .enumerate()
        .map(|(row, verdict)| {
            let judgement = &verdict.judgement;
            let word = cell
                .in_row(row, "finding")
                .and_then(|shown| shown.word())
                .unwrap_or("not assessed");
            let limit = wording::permitted(verdict).unwrap_or_else(|| "–".to_owned());
            vec![
                Cell::plain(verdict.guidance.clone()),
                Cell::plain(format::safe_irradiance(judgement.exposure)),
                Cell::plain(limit),
                Cell::plain(
                    judgement
                        .ratio
                        .map_or_else(|| "–".to_owned(), format::safe_ratio),
                ),
                Cell::plain(
                    cell.allowed(row)
                        .map_or_else(|| "not assessed".to_owned(), wording::span),
                ),
                Cell::finding(Shape::of_word(word), word),
            ]
        })
        .collect();
    Table { columns, rows }
}
