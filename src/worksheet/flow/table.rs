//! Tables: columns as wide as their content asks for, rows that no page breaks.

use std::rc::Rc;

use glam::DVec2;

use crate::drawing::mark::{Mark, Stroke};
use crate::drawing::role::Role;
use crate::worksheet::block::{Align, Cell, Run, Table};
use crate::worksheet::flow::{Head, Item, Room, SMALL, SMALL_LEADING, baseline};
use crate::worksheet::wrap::{self, Line};

const SIZE: f64 = 8.5;
const LEADING: f64 = 11.0;
const PAD: f64 = 3.0;
/// Between columns.
const GAP: f64 = 12.0;
/// Room that a finding's shape takes in front of its word.
const SHAPE: f64 = 11.0;

struct Column {
    left: f64,
    width: f64,
    align: Align,
}

/// A cell cut into lines.
struct Wrapped {
    lines: Vec<Line>,
    cell: Cell,
}

pub(in crate::worksheet) fn items(table: &Table, room: Room) -> Vec<Item> {
    if table.columns.is_empty() {
        return Vec::new();
    }
    let rows: Vec<Vec<Cell>> = table
        .rows
        .iter()
        .map(|row| squared(row, table.columns.len()))
        .collect();
    let columns = columns(table, &rows, room.width);
    let head = Rc::new(head(table, &columns, room));
    let repeat = (head.height <= room.height / 3.0).then(|| Rc::clone(&head));
    let mut found = Vec::with_capacity(rows.len() + 1);
    let top = head.height.min(room.height);
    found.push(Item {
        before: 8.0,
        height: top,
        marks: head.marks.clone(),
        glue: !rows.is_empty(),
        ..Item::default()
    });

    // A row higher than this is cut after all, or it would fit on no page.
    let most = ((room.height - top.min(room.height / 3.0) - 2.0 * PAD) / LEADING)
        .floor()
        .max(1.0) as usize;
    let count = rows.len();
    for (index, row) in rows.into_iter().enumerate() {
        let cells: Vec<Wrapped> = row
            .into_iter()
            .zip(&columns)
            .map(|(cell, column)| {
                let indent = if cell.shape.is_some() { SHAPE } else { 0.0 };
                Wrapped {
                    lines: wrap::lines(&cell.runs, SIZE, column.width - indent),
                    cell,
                }
            })
            .collect();
        let lines = cells.iter().map(|cell| cell.lines.len()).max().unwrap_or(1);
        let parts = lines.div_ceil(most).max(1);
        for part in 0..parts {
            let last = part + 1 == parts;
            let mut item = part_of_row(&cells, &columns, room.width, part * most, most, last);
            item.head.clone_from(&repeat);
            // The last row does not stand alone on a page.
            item.glue = parts == 1 && index + 2 == count;
            found.push(item);
        }
    }
    if let Some(last) = found.last_mut() {
        last.after = 8.0;
    }
    found
}

/// The row with exactly `count` cells.
fn squared(row: &[Cell], count: usize) -> Vec<Cell> {
    let mut cells: Vec<Cell> = row.iter().take(count).cloned().collect();
    if let Some(last) = cells.last_mut() {
        for extra in row.iter().skip(count) {
            last.runs.push(Run::plain(" "));
            last.runs.extend(extra.runs.iter().cloned());
        }
    }
    cells.resize(count, Cell::default());
    cells
}

/// Widths by content: what fits gets its full width and a share of the rest;
/// what does not shrinks in proportion to how much it could.
fn columns(table: &Table, rows: &[Vec<Cell>], width: f64) -> Vec<Column> {
    let count = table.columns.len();
    let gap = GAP.min(width / (count as f64 * 2.0));
    let room = width - gap * (count as f64 - 1.0);
    let mut wants = Vec::with_capacity(count);
    for (index, column) in table.columns.iter().enumerate() {
        let title = wrap::extremes(&[Run::bold(column.title.as_str())], SMALL);
        let (mut longest, mut widest) = title;
        for row in rows {
            if let Some(cell) = row.get(index) {
                let indent = if cell.shape.is_some() { SHAPE } else { 0.0 };
                let (line, word) = wrap::extremes(&cell.runs, SIZE);
                longest = longest.max(line + indent);
                widest = widest.max(word + indent);
            }
        }
        // One word may not claim more than half the table.
        wants.push((longest, widest.min(room / 2.0).min(longest)));
    }
    let longest: f64 = wants.iter().map(|w| w.0).sum();
    let widest: f64 = wants.iter().map(|w| w.1).sum();
    let share = |index: usize| match (index, table.columns[index].align) {
        (_, Align::Start) => 1.0,
        // Numbers that begin the table stay at its edge.
        (0, _) => 0.0,
        (_, Align::Middle | Align::End) => 0.5,
    };
    // One column of numbers has no other to share with, and stays narrow.
    let shares = (0..count).map(share).sum::<f64>().max(0.5);
    let mut left = 0.0;
    table
        .columns
        .iter()
        .zip(wants)
        .enumerate()
        .map(|(index, (column, (line, word)))| {
            let width = if longest <= room {
                // Spare room is shared out evenly, with less for numbers, which
                // are compared down the column and not across.
                line + (room - longest) * share(index) / shares
            } else if widest <= room {
                let stretch = longest - widest;
                word + if stretch > 0.0 {
                    (room - widest) * (line - word) / stretch
                } else {
                    0.0
                }
            } else {
                room * word / widest
            };
            let placed = Column {
                left,
                width,
                align: column.align,
            };
            left += width + gap;
            placed
        })
        .collect()
}

fn head(table: &Table, columns: &[Column], room: Room) -> Head {
    let titles: Vec<Vec<Line>> = table
        .columns
        .iter()
        .zip(columns)
        .map(|(title, column)| wrap::lines(&[Run::bold(title.title.as_str())], SMALL, column.width))
        .collect();
    let most = ((room.height / 2.0) / SMALL_LEADING).floor().max(1.0) as usize;
    let lines = titles.iter().map(Vec::len).max().unwrap_or(1).min(most);
    let height = PAD + lines as f64 * SMALL_LEADING + PAD;
    let mut marks = Vec::new();
    for (title, column) in titles.iter().zip(columns) {
        // Headings stand on the rule, however many lines they have.
        let shown = title.len().min(lines);
        let mut y = PAD + (lines - shown) as f64 * SMALL_LEADING;
        for line in title.iter().take(lines) {
            let at = y + baseline(SMALL, SMALL_LEADING);
            marks.append(&mut line.marks(column.left, at, column.width, SMALL, column.align));
            y += SMALL_LEADING;
        }
    }
    let rule = Stroke::hair(Role::Ink);
    marks.push(Mark::line(
        DVec2::new(0.0, height),
        DVec2::new(room.width, height),
        rule,
    ));
    Head { height, marks }
}

fn part_of_row(
    cells: &[Wrapped],
    columns: &[Column],
    width: f64,
    first: usize,
    most: usize,
    last: bool,
) -> Item {
    let mut marks = Vec::new();
    let mut lines = 1;
    for (wrapped, column) in cells.iter().zip(columns) {
        let indent = if wrapped.cell.shape.is_some() {
            SHAPE
        } else {
            0.0
        };
        let mut y = PAD;
        for (i, line) in wrapped.lines.iter().skip(first).take(most).enumerate() {
            let (left, room) = (column.left + indent, column.width - indent);
            marks.append(&mut line.marks(
                left,
                y + baseline(SIZE, LEADING),
                room,
                SIZE,
                column.align,
            ));
            y += LEADING;
            lines = lines.max(i + 1);
        }
        if let Some(shape) = wrapped.cell.shape.filter(|_| first == 0) {
            let at = DVec2::new(column.left + 4.0, PAD + LEADING / 2.0);
            marks.push(Mark::Shape {
                shape,
                at,
                size: 7.5,
            });
        }
    }
    let height = PAD + lines as f64 * LEADING + PAD;
    if last {
        let rule = Stroke::hair(Role::Line);
        marks.push(Mark::line(
            DVec2::new(0.0, height),
            DVec2::new(width, height),
            rule,
        ));
    }
    Item {
        height,
        marks,
        ..Item::default()
    }
}
