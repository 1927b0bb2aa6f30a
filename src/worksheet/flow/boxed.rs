//! Framed items: particulars in a grid, cautions, lines to sign on.

use glam::DVec2;

use crate::drawing::font::{self, Weight};
use crate::drawing::mark::{Fill, Mark, Rectangle, Shape, Stroke, Text};
use crate::drawing::role::Role;
use crate::worksheet::block::{Align, Pair, Run, Signature};
use crate::worksheet::flow::{BODY, Item, LEADING, Room, SMALL, SMALL_LEADING, baseline, glue_all};
use crate::worksheet::wrap;

const FRAME: f64 = 0.75;
const SIDE: f64 = 6.0;

/// Keeps what follows off the frame.
fn spaced(mut items: Vec<Item>) -> Vec<Item> {
    if let Some(last) = items.last_mut() {
        last.after = 8.0;
    }
    items
}

/// A grid of small names with values under them, like the title block of a drawing.
pub(in crate::worksheet) fn pairs(columns: usize, pairs: &[Pair], room: Room) -> Vec<Item> {
    let columns = columns.clamp(1, 8);
    let wide = room.width / columns as f64;
    let inner = wide - 2.0 * SIDE;
    let rows: Vec<&[Pair]> = pairs.chunks(columns).collect();
    let most = (((room.height / 2.0) - SMALL_LEADING - 8.0) / LEADING)
        .floor()
        .max(1.0) as usize;
    let mut found = Vec::new();
    for (index, row) in rows.iter().enumerate() {
        let values: Vec<Vec<wrap::Line>> = row
            .iter()
            .map(|pair| wrap::lines(&pair.value, BODY, inner))
            .collect();
        let count = values.iter().map(Vec::len).max().unwrap_or(1);
        let parts = count.div_ceil(most);
        for part in 0..parts {
            let first = part * most;
            let lines = (count - first).min(most);
            let height = 4.0 + SMALL_LEADING + lines as f64 * LEADING + 4.0;
            let mut marks = Vec::new();
            for (column, (pair, value)) in row.iter().zip(&values).enumerate() {
                let left = column as f64 * wide;
                let name = wrap::lines(&[Run::muted(pair.name.as_str())], SMALL, inner);
                if let Some(line) = name.first() {
                    let at = 4.0 + baseline(SMALL, SMALL_LEADING);
                    marks.append(&mut line.marks(left + SIDE, at, inner, SMALL, Align::Start));
                }
                let mut y = 4.0 + SMALL_LEADING;
                for line in value.iter().skip(first).take(lines) {
                    marks.append(&mut line.marks(
                        left + SIDE,
                        y + baseline(BODY, LEADING),
                        inner,
                        BODY,
                        Align::Start,
                    ));
                    y += LEADING;
                }
                if column > 0 {
                    marks.push(Mark::line(
                        DVec2::new(left, 0.0),
                        DVec2::new(left, height),
                        Stroke::hair(Role::Muted),
                    ));
                }
            }
            let top = index == 0 && part == 0;
            let bottom = index + 1 == rows.len() && part + 1 == parts;
            for (y, outer) in [(0.0, top), (height, bottom)] {
                let stroke = if outer {
                    Stroke::solid(Role::Ink, FRAME)
                } else {
                    Stroke::hair(Role::Muted)
                };
                marks.push(Mark::line(
                    DVec2::new(0.0, y),
                    DVec2::new(room.width, y),
                    stroke,
                ));
            }
            for x in [0.0, room.width] {
                marks.push(Mark::line(
                    DVec2::new(x, 0.0),
                    DVec2::new(x, height),
                    Stroke::solid(Role::Ink, FRAME),
                ));
            }
            found.push(Item {
                before: if top { 8.0 } else { 0.0 },
                height,
                marks,
                ..Item::default()
            });
        }
    }
    glue_all(&mut found);
    spaced(found)
}

/// Cautions on their own ground, with a frame that survives black-and-white print.
pub(in crate::worksheet) fn caution(paragraphs: &[Vec<Run>], room: Room) -> Vec<Item> {
    let (side, text_left) = (10.0, 38.0);
    let inner = room.width - text_left - side;
    // Lines with the space above each; text stands in the caution's own ink.
    let mut lines: Vec<(f64, wrap::Line)> = Vec::new();
    for runs in paragraphs {
        let runs: Vec<Run> = runs
            .iter()
            .map(|run| Run {
                role: Role::CautionInk,
                ..run.clone()
            })
            .collect();
        for (i, line) in wrap::lines(&runs, BODY, inner).into_iter().enumerate() {
            let above = if i == 0 && !lines.is_empty() {
                4.0
            } else {
                0.0
            };
            lines.push((above, line));
        }
    }
    // Whole if it takes up to half a page; else in boxes of that size.
    let most = ((room.height / 2.0 - 16.0) / (LEADING + 4.0))
        .floor()
        .max(1.0) as usize;
    let mut found = Vec::new();
    for part in lines.chunks(most) {
        let mut marks = Vec::new();
        let mut y = 8.0;
        for (i, (above, line)) in part.iter().enumerate() {
            y += if i == 0 { 0.0 } else { *above };
            marks.append(&mut line.marks(
                text_left,
                y + baseline(BODY, LEADING),
                inner,
                BODY,
                Align::Start,
            ));
            y += LEADING;
        }
        let height = (y + 8.0).max(32.0);
        let ground = Mark::Area {
            outline: Rectangle::new(0.0, 0.0, room.width, height).corners(),
            fill: Some(Fill::Role(Role::CautionGround)),
            hatch: None,
            edge: Some(Stroke::solid(Role::CautionInk, 1.0)),
        };
        let sign = Mark::Shape {
            shape: Shape::Caution,
            at: DVec2::new(20.0, 16.0),
            size: 17.0,
        };
        let marks = [ground, sign].into_iter().chain(marks).collect();
        found.push(Item {
            before: if found.is_empty() { 8.0 } else { 4.0 },
            height,
            marks,
            ..Item::default()
        });
    }
    spaced(found)
}

/// A row for each person: act, name, date, signature.
pub(in crate::worksheet) fn signatures(signatures: &[Signature], room: Room) -> Vec<Item> {
    let shares = [0.16, 0.30, 0.18, 0.36];
    let lefts = [
        0.0,
        shares[0],
        shares[0] + shares[1],
        shares[0] + shares[1] + shares[2],
    ]
    .map(|s| s * room.width);
    let high = 36.0;
    let mut found = Vec::new();
    for (i, signature) in signatures.iter().enumerate() {
        let mut marks = Vec::new();
        let y = baseline(SMALL, SMALL_LEADING) + 4.0;
        let write = high - 8.0;
        for (left, name) in lefts.into_iter().skip(1).zip(["name", "date", "signature"]) {
            marks.push(Mark::Text(
                Text::new(DVec2::new(left + SIDE, y), SMALL, name).role(Role::Muted),
            ));
            marks.push(Mark::line(
                DVec2::new(left, 0.0),
                DVec2::new(left, high),
                Stroke::hair(Role::Muted),
            ));
        }
        let texts = [
            (&signature.act, Weight::SemiBold),
            (&signature.name, Weight::Regular),
            (&signature.date, Weight::Regular),
        ];
        for ((text, weight), (left, share)) in texts.into_iter().zip(lefts.into_iter().zip(shares))
        {
            let inner = share * room.width - 2.0 * SIDE;
            let run = Run {
                text: text.clone(),
                bold: weight == Weight::SemiBold,
                role: Role::Ink,
            };
            // One line: a name too long for it is set smaller, never cut.
            let wide = font::width(text, BODY, weight);
            let size = if wide > inner {
                BODY * inner / wide
            } else {
                BODY
            };
            let baseline = if weight == Weight::SemiBold { y } else { write };
            if let Some(line) = wrap::lines(&[run], size, inner).first() {
                marks.append(&mut line.marks(left + SIDE, baseline, inner, size, Align::Start));
            }
        }
        marks.push(Mark::frame(
            Rectangle::new(0.0, 0.0, room.width, high),
            Stroke::solid(Role::Ink, FRAME),
        ));
        found.push(Item {
            before: if i == 0 { 8.0 } else { 0.0 },
            height: high,
            marks,
            ..Item::default()
        });
    }
    glue_all(&mut found);
    spaced(found)
}
