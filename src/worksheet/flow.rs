//! Blocks as items: stretches of marks of a known height, none of which is
//! broken by a page. No item is higher than the room it was measured for.

mod boxed;
mod table;

use std::rc::Rc;

use glam::DVec2;

use crate::drawing::font;
use crate::drawing::mark::{Mark, Shape, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;
use crate::worksheet::block::{Align, Block, Run};
use crate::worksheet::wrap;

/// Body text, in points.
pub(super) const BODY: f64 = 9.0;
/// From line to line of body text.
pub(super) const LEADING: f64 = 12.0;
/// Secondary text.
pub(super) const SMALL: f64 = 7.5;
/// From line to line of secondary text.
pub(super) const SMALL_LEADING: f64 = 10.0;

/// Marks that stay together, placed from their top left corner.
#[derive(Clone, Debug, Default)]
pub(super) struct Item {
    /// Space above, left out at the top of a page.
    pub before: f64,
    /// Space asked for below; the larger of this and the next item's counts.
    pub after: f64,
    pub height: f64,
    pub marks: Vec<Mark>,
    /// Whether the next item has to be on the same page.
    pub glue: bool,
    /// What is repeated above if a page begins here.
    pub head: Option<Rc<Head>>,
    /// Whether a page begins here in any case.
    pub break_before: bool,
}

/// The repeated head of a table.
#[derive(Clone, Debug)]
pub(super) struct Head {
    pub height: f64,
    pub marks: Vec<Mark>,
}

/// The room that blocks are measured for, in points.
#[derive(Clone, Copy, Debug)]
pub(super) struct Room {
    pub width: f64,
    pub height: f64,
}

/// Returns the baseline of a line of text `size` high in `leading`, from its top.
pub(super) fn baseline(size: f64, leading: f64) -> f64 {
    (leading + font::CAP_HEIGHT * size) / 2.0
}

/// Returns the items of all blocks, in order.
pub(super) fn items(blocks: &[Block], room: Room) -> Vec<Item> {
    let mut found = Vec::new();
    let mut break_next = false;
    for block in blocks {
        if matches!(block, Block::NewPage) {
            break_next = true;
            continue;
        }
        let mut next = block_items(block, room);
        if let Some(first) = next.first_mut() {
            first.break_before |= break_next;
            break_next = false;
        }
        let after = found.last().map_or(0.0, |item: &Item| item.after);
        if let Some(first) = next.first_mut() {
            first.before = first.before.max(after);
        }
        found.append(&mut next);
    }
    found
}

fn block_items(block: &Block, room: Room) -> Vec<Item> {
    match block {
        Block::Title { text, under } => title(text, under, room),
        Block::Heading(text) => heading(text, room),
        Block::Paragraph(runs) => text_items(runs, BODY, LEADING, 0.0, room, None, 4.0),
        Block::Bullet(runs) => {
            let bullet = Mark::Text(Text::new(
                DVec2::new(2.0, baseline(BODY, LEADING)),
                BODY,
                "•",
            ));
            text_items(runs, BODY, LEADING, 12.0, room, Some(bullet), 2.0)
        }
        Block::Pairs { columns, pairs } => boxed::pairs(*columns, pairs, room),
        Block::Table(table) => table::items(table, room),
        Block::Picture { picture, caption } => picture_items(picture, caption, room),
        Block::Caution(paragraphs) => boxed::caution(paragraphs, room),
        Block::Finding { shape, word, text } => finding(*shape, word, text, room),
        Block::Signatures(signatures) => boxed::signatures(signatures, room),
        Block::Together(blocks) => {
            let mut found = items(blocks, room);
            glue_all(&mut found);
            found
        }
        Block::WithNext(block) => {
            let mut found = block_items(block, room);
            if let Some(last) = found.last_mut() {
                last.glue = true;
            }
            found
        }
        Block::NewPage => Vec::new(),
    }
}

/// Glues every item but the last to the one after it.
fn glue_all(items: &mut [Item]) {
    if let Some((_, others)) = items.split_last_mut() {
        for item in others {
            item.glue = true;
        }
    }
}

fn title(text: &str, under: &str, room: Room) -> Vec<Item> {
    let mut found = text_items(&[Run::bold(text)], 20.0, 24.0, 0.0, room, None, 0.0);
    if !under.is_empty() {
        found.append(&mut text_items(
            &[Run::muted(under)],
            10.0,
            16.0,
            0.0,
            room,
            None,
            0.0,
        ));
    }
    for item in &mut found {
        item.glue = true;
    }
    found
}

fn heading(text: &str, room: Room) -> Vec<Item> {
    let mut found = text_items(&[Run::bold(text)], 11.0, 16.0, 0.0, room, None, 16.0);
    if let Some(last) = found.last_mut() {
        let y = last.height + 1.0;
        let rule = Stroke::solid(Role::Ink, 0.75);
        last.marks.push(Mark::line(
            DVec2::new(0.0, y),
            DVec2::new(room.width, y),
            rule,
        ));
        last.height += 4.0;
    }
    for item in &mut found {
        item.glue = true;
    }
    found
}

/// One item a line; the first two and the last two lines stay together.
fn text_items(
    runs: &[Run],
    size: f64,
    leading: f64,
    indent: f64,
    room: Room,
    mark: Option<Mark>,
    before: f64,
) -> Vec<Item> {
    let lines = wrap::lines(runs, size, room.width - indent);
    let count = lines.len();
    let mut found: Vec<Item> = lines
        .iter()
        .enumerate()
        .map(|(i, line)| Item {
            before: if i == 0 { before } else { 0.0 },
            height: leading,
            marks: line.marks(
                indent,
                baseline(size, leading),
                room.width - indent,
                size,
                Align::Start,
            ),
            glue: count > 1 && (i == 0 || i + 2 == count),
            ..Item::default()
        })
        .collect();
    if let (Some(first), Some(mark)) = (found.first_mut(), mark) {
        first.marks.push(mark);
    }
    found
}

fn finding(shape: Shape, word: &str, text: &[Run], room: Room) -> Vec<Item> {
    let (size, leading) = (10.0, 14.0);
    let mut runs = vec![Run {
        text: word.to_owned(),
        bold: true,
        role: shape.role(),
    }];
    if !text.is_empty() {
        runs.push(Run {
            text: ": ".to_owned(),
            bold: true,
            role: shape.role(),
        });
        runs.extend(text.iter().cloned());
    }
    let mark = Mark::Shape {
        shape,
        at: DVec2::new(5.0, leading / 2.0),
        size: 10.0,
    };
    let mut found = text_items(&runs, size, leading, 18.0, room, Some(mark), 4.0);
    glue_all(&mut found);
    found
}

fn picture_items(picture: &Picture, caption: &str, room: Room) -> Vec<Item> {
    let sane = picture.width.is_finite()
        && picture.height.is_finite()
        && picture.width > 0.0
        && picture.height > 0.0;
    if !sane {
        return Vec::new();
    }
    let mut under = if caption.is_empty() {
        Vec::new()
    } else {
        text_items(
            &[Run::muted(caption)],
            SMALL,
            SMALL_LEADING,
            0.0,
            room,
            None,
            4.0,
        )
    };
    // A page's share is left for the caption and for a heading above.
    let most = room.height - 64.0;
    let factor = (room.width / picture.width)
        .min(most / picture.height)
        .min(1.0);
    let scaled = if factor < 1.0 {
        picture.clone().scaled(factor)
    } else {
        picture.clone()
    };
    let mut found = vec![Item {
        before: 8.0,
        height: scaled.height,
        marks: scaled.marks,
        glue: !under.is_empty(),
        ..Item::default()
    }];
    found.append(&mut under);
    if let Some(last) = found.last_mut() {
        last.after = 8.0;
    }
    found
}
