//! Blocks broken into pages, each a plain picture with its running head and foot.

use glam::DVec2;

use crate::drawing::font::{self, Weight};
use crate::drawing::mark::{Anchor, Mark, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;
use crate::worksheet::block::Block;
use crate::worksheet::flow::{self, Item, Room, SMALL};

/// The paper that pages are laid out for.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum Paper {
    /// 210 mm by 297 mm.
    #[default]
    A4,
    /// 8½ in by 11 in.
    Letter,
}

impl Paper {
    /// Returns width and height, in points of 1/72 in.
    pub const fn size(self) -> (f64, f64) {
        match self {
            Paper::A4 => (210.0 * 72.0 / 25.4, 297.0 * 72.0 / 25.4),
            Paper::Letter => (612.0, 792.0),
        }
    }
}

/// The margin on every side of a page, in points: 18 mm.
pub const MARGIN: f64 = 18.0 * 72.0 / 25.4;

/// What stands on every page.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Furniture {
    /// The title of the sheet.
    pub title: String,
    /// The site; may be empty.
    pub site: String,
    /// The revision; may be empty.
    pub revision: String,
    /// The digest of the notebook: `sha256:…`.
    pub digest: String,
    /// The program and its version: `farglow 0.1.0`.
    pub program: String,
    /// Why the sheet is not final; marks every page DRAFT.
    pub draft: Option<String>,
}

const HEAD: f64 = 16.0;
const FOOT: f64 = 30.0;

/// Returns the pages of `blocks`, at least one.
///
/// A row of a table, a picture and a box are never broken by a page, unless a
/// single row is higher than one. Time and pages grow in proportion to the
/// content.
///
/// # Examples
///
/// ```
/// use farglow::worksheet::block::Block;
/// use farglow::worksheet::layout::{self, Furniture, Paper};
///
/// let blocks = [Block::Heading("Findings".into())];
/// let pages = layout::pages(&blocks, Paper::A4, &Furniture::default());
/// assert_eq!(pages.len(), 1);
/// assert!(pages[0].texts().iter().any(|text| text.text == "page 1 of 1"));
/// ```
pub fn pages(blocks: &[Block], paper: Paper, furniture: &Furniture) -> Vec<Picture> {
    let (width, height) = paper.size();
    let head = HEAD + 8.0 + if furniture.draft.is_some() { 12.0 } else { 0.0 };
    let top = MARGIN + head;
    let bottom = height - MARGIN - FOOT;
    let room = Room {
        width: width - 2.0 * MARGIN,
        height: bottom - top,
    };
    let bodies = break_into_pages(flow::items(blocks, room), room.height);
    let count = bodies.len();
    bodies
        .into_iter()
        .enumerate()
        .map(|(index, body)| {
            let mut page = Picture::new(width, height);
            under(&mut page, furniture);
            let by = DVec2::new(MARGIN, top);
            page.marks
                .extend(body.into_iter().map(|mark| mark.placed(1.0, by)));
            furnish(&mut page, furniture, index + 1, count);
            page
        })
        .collect()
}

/// Fills pages of `room` points in height; each is a list of marks from its top left.
fn break_into_pages(items: Vec<Item>, room: f64) -> Vec<Vec<Mark>> {
    let chains = chains(&items, room);
    let mut pages = Vec::new();
    let mut page: Vec<Mark> = Vec::new();
    let mut y = 0.0;
    let mut fresh = true;
    for (item, need) in items.into_iter().zip(chains) {
        let before = if fresh { 0.0 } else { item.before };
        if !fresh && (item.break_before || y + before + need > room + 1e-6) {
            pages.push(std::mem::take(&mut page));
            (y, fresh) = (0.0, true);
            if let Some(head) = &item.head {
                page.extend(head.marks.iter().cloned());
                y = head.height;
            }
        }
        if !fresh {
            y += item.before;
        }
        let by = DVec2::new(0.0, y);
        page.extend(item.marks.into_iter().map(|mark| mark.placed(1.0, by)));
        y += item.height;
        fresh = false;
    }
    pages.push(page);
    pages
}

/// Returns for each item how much room it asks for, itself included: that of
/// the whole chain it begins, or its own height inside a chain that was already
/// found to fit, or that fits on no page.
fn chains(items: &[Item], room: f64) -> Vec<f64> {
    let mut needs: Vec<f64> = items.iter().map(|item| item.height).collect();
    let mut from = 0;
    while from < items.len() {
        let mut to = from;
        let mut need = items[from].height;
        while items[to].glue && to + 1 < items.len() && !items[to + 1].break_before {
            to += 1;
            need += items[to].before + items[to].height;
        }
        if need <= room {
            needs[from] = need;
        } else {
            // Too long for any page: keep at least neighbours together.
            for i in from..to {
                let pair = items[i].height + items[i + 1].before + items[i + 1].height;
                if pair <= room {
                    needs[i] = pair;
                }
            }
        }
        from = to + 1;
    }
    needs
}

/// The word behind the content of a page that is not final.
fn under(page: &mut Picture, furniture: &Furniture) {
    if furniture.draft.is_none() {
        return;
    }
    let size = 150.0;
    let turn = page.height.atan2(page.width);
    // Turned about its start, so the middle of the letters lies in the middle of the page.
    let half = font::width("DRAFT", size, Weight::SemiBold) / 2.0;
    let along = DVec2::new(turn.cos(), -turn.sin());
    let down = DVec2::new(turn.sin(), turn.cos());
    let at = DVec2::new(page.width, page.height) / 2.0 - along * half
        + down * (font::CAP_HEIGHT * size / 2.0);
    let text = Text {
        turn: turn.to_degrees(),
        hollow: true,
        ..Text::new(at, size, "DRAFT")
    };
    page.push(Mark::Text(text.bold().role(Role::Draft)));
}

fn furnish(page: &mut Picture, furniture: &Furniture, number: usize, count: usize) {
    let (left, right) = (MARGIN, page.width - MARGIN);
    let rule = Stroke::solid(Role::Ink, 0.75);

    let mut room = right - left;
    let head = MARGIN + font::CAP_HEIGHT * SMALL;
    if furniture.draft.is_some() {
        let word = Text::new(DVec2::new(right, head + 2.5), 11.0, "DRAFT")
            .anchored(Anchor::End)
            .bold();
        room -= word.width() + 12.0;
        page.push(Mark::Text(word));
    }
    let mut pen = left;
    let parts = [
        (&furniture.title, true),
        (&furniture.site, false),
        (&furniture.revision, false),
    ];
    for (i, (part, bold)) in parts
        .into_iter()
        .filter(|(part, _)| !part.is_empty())
        .enumerate()
    {
        let part = if i == 0 {
            part.clone()
        } else {
            format!(" · {part}")
        };
        let weight = if bold {
            Weight::SemiBold
        } else {
            Weight::Regular
        };
        let shown = shortened(&part, left + room - pen, weight);
        let text = Text {
            weight,
            ..Text::new(DVec2::new(pen, head), SMALL, shown)
        };
        pen += text.width();
        page.push(Mark::Text(text));
    }
    let y = MARGIN + HEAD - 5.0;
    page.push(Mark::line(DVec2::new(left, y), DVec2::new(right, y), rule));
    if let Some(reason) = &furniture.draft {
        let reason = shortened(
            &format!("not for use: {reason}"),
            right - left,
            Weight::Regular,
        );
        let at = DVec2::new(right, y + 11.0);
        page.push(Mark::Text(
            Text::new(at, SMALL, reason).anchored(Anchor::End),
        ));
    }

    let y = page.height - MARGIN - FOOT + 12.0;
    page.push(Mark::line(
        DVec2::new(left, y),
        DVec2::new(right, y),
        Stroke::hair(Role::Muted),
    ));
    let line = |text: &str, row: f64| {
        Text::new(DVec2::new(left, y + 8.0 + row * 9.0), SMALL - 0.5, text).role(Role::Muted)
    };
    let place = Text::new(
        DVec2::new(right, y + 8.0),
        SMALL,
        format!("page {number} of {count}"),
    )
    .anchored(Anchor::End)
    .bold();
    let digest = shortened(
        &furniture.digest,
        right - left - place.width() - 12.0,
        Weight::Regular,
    );
    page.push(Mark::Text(line(&digest, 0.0)));
    page.push(Mark::Text(line(
        &shortened(&furniture.program, right - left, Weight::Regular),
        1.0,
    )));
    page.push(Mark::Text(place));
}

/// Cuts a text of the head or foot to its room, with an ellipsis.
fn shortened(text: &str, room: f64, weight: Weight) -> String {
    if font::width(text, SMALL, weight) <= room {
        return text.to_owned();
    }
    let room = room - font::width("…", SMALL, weight);
    let mut used = 0.0;
    let mut cut: String = text
        .chars()
        .take_while(|c| {
            used += font::advance(*c, weight) * SMALL;
            used <= room
        })
        .collect();
    cut.push('…');
    cut
}

#[cfg(test)]
mod tests;
