//! The guidance that was used: citation, standing, how it is known, and its
//! limits in its own words.

use super::Sheet;
use crate::guidance::{CHECK_EDITION, Library, Limit};
use crate::notebook::cell::Kind;
use crate::worksheet::block::{Block, Run};

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let limits = used(sheet);
    if limits.is_empty() {
        return Vec::new();
    }
    let mut blocks = vec![
        Block::Heading("Guidance".to_owned()),
        Block::Paragraph(vec![Run::plain(format!(
            "Each limit with its edition and standing; {CHECK_EDITION}. A row is judged together \
             with the rows that continue it."
        ))]),
    ];
    for limit in limits {
        blocks.extend(one(sheet, limit));
    }
    blocks
}

/// Returns every limit that judges something, with its family, in the order of
/// their first use.
fn used(sheet: &Sheet<'_>) -> Vec<&'static Limit> {
    let mut limits: Vec<&'static Limit> = Vec::new();
    let cells = sheet.engine.notebook().cells.iter();
    let ids = cells
        .filter(|cell| matches!(cell.kind, Kind::Assessment | Kind::Zone))
        .flat_map(|cell| cell.texts("guidance"));
    for limit in ids.flat_map(|id| Library::shipped().family(id)) {
        if !limits.iter().any(|known| known.id == limit.id) {
            limits.push(limit);
        }
    }
    limits
}

fn one(sheet: &Sheet<'_>, limit: &'static Limit) -> Vec<Block> {
    let confirmed = sheet
        .engine
        .notebook()
        .confirmed
        .iter()
        .find(|line| line.guidance == limit.id && line.edition == limit.edition);
    let known = match confirmed {
        Some(line) => format!(
            "compared with edition {} by {} on {}; shipped as {}",
            line.edition,
            line.by,
            line.date,
            limit.how_known.word()
        ),
        None => limit.how_known.words().to_owned(),
    };
    let mut blocks = vec![
        Block::WithNext(Box::new(Block::Paragraph(vec![
            Run::bold(limit.id.clone()),
            Run::plain(format!(": {}. {}.", limit.title, limit.effect)),
        ]))),
        Block::Bullet(vec![
            Run::plain(limit.citation()),
            Run::plain(format!(". Standing: {}.", limit.standing_words())),
        ]),
        Block::Bullet(vec![
            Run::plain(format!("{}: ", limit.metric.name())),
            Run::bold(limit.limit_text()),
            Run::plain(format!(". {}.", limit.valid)),
        ]),
        Block::Bullet(vec![
            Run::bold("Known: ".to_owned()),
            Run::plain(format!("{known}. {}", limit.where_known)),
        ]),
    ];
    if !limit.caution.is_empty() {
        blocks.push(Block::Bullet(vec![Run::plain(limit.caution.clone())]));
    }
    blocks
}
