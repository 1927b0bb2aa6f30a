//! What a card says of its own state: findings, limits, faults, whom it waits
//! for, and how many cautions it calls up.

use iced::widget::{column, container, row, space};
use iced::{Alignment, Element, Length};

use super::figure::Found;
use super::{Message, sentence};
use crate::app::canvas;
use crate::app::dashes::dashes;
use crate::app::shared::Look;
use crate::app::theme::{self, BODY, SMALL};
use crate::drawing::mark::Shape;
use crate::drawing::role::Role;
use crate::notebook::Diagnostic;
use crate::notebook::cell::Cell;
use crate::notebook::results::{CellResult, State};

/// Returns a finding in shape, colour and word.
pub fn finding<'a>(found: Found, look: Look) -> Element<'a, Message> {
    let role = found.shape.role();
    let word = theme::bold(format!("{}:", found.word), BODY, role, look);
    let short = found.text.chars().count() < 60;
    let mut words = if short {
        let text = theme::words(found.text, BODY, role, look).width(Length::Fill);
        column![row![word, text].spacing(5)]
    } else {
        column![word, theme::words(found.text, SMALL, Role::Ink, look)]
    }
    .width(Length::Fill);
    if let Some(by) = found.by {
        words = words.push(theme::words(by, SMALL, Role::Muted, look));
    }
    row![
        container(canvas::shape(found.shape, 13.0, look)).padding([3, 0]),
        words
    ]
    .spacing(7)
    .into()
}

/// Returns one limit of an assessment.
pub fn limit<'a>(found: Found, look: Look) -> Element<'a, Message> {
    let role = found.shape.role();
    row![
        container(canvas::shape(found.shape, 11.0, look)).padding([3, 0]),
        theme::words(found.word, SMALL, role, look),
        theme::words(found.text, SMALL, Role::Muted, look).width(Length::Fill),
    ]
    .spacing(7)
    .into()
}

/// Returns the cell's own faults, or whom it waits for.
pub fn state<'a>(cell: &Cell, result: &CellResult, look: Look) -> Element<'a, Message> {
    match &result.state {
        State::Ok => space().into(),
        State::Waiting(names) => row![
            canvas::shape(Shape::NotAssessed, 12.0, look),
            theme::words(
                format!("waiting for {}", names.join(", ")),
                SMALL,
                Role::Muted,
                look
            ),
        ]
        .spacing(7)
        .align_y(Alignment::Center)
        .into(),
        State::Error => {
            let faults = result
                .errors
                .iter()
                .take(4)
                .map(|found| fault(cell, found, look));
            let mut all = column(faults).spacing(4);
            if result.errors.len() > 4 {
                let more = format!("and {} more", result.errors.len() - 4);
                all = all.push(theme::words(more, SMALL, Role::Over, look));
            }
            all.into()
        }
    }
}

/// Returns a fault where it is: the text with the faulty characters marked,
/// what is wrong with them, and the remedy.
fn fault<'a>(cell: &Cell, fault: &Diagnostic, look: Look) -> Element<'a, Message> {
    let mut lines = column![].spacing(1);
    let typed = cell.faulty(fault);
    if let (Some(span), Some(text)) = (&fault.span, &typed) {
        let letters: Vec<char> = text.chars().collect();
        let part = |range: std::ops::Range<usize>| -> String {
            let end = range.end.min(letters.len());
            letters[range.start.min(end)..end].iter().collect()
        };
        // A fault at the end of the text has nothing to mark: it is pointed at.
        let marked = match part(span.start..span.end.max(span.start + 1)) {
            marked if marked.trim().is_empty() => "▯".to_owned(),
            marked => marked,
        };
        // What is far from the fault is left out.
        let before = part(span.start.saturating_sub(24)..span.start);
        let after = part(span.end.max(span.start + 1)..span.end + 24);
        lines = lines.push(
            row![
                theme::words(before, SMALL, Role::Muted, look),
                dashes(
                    theme::bold(marked, SMALL, Role::Over, look),
                    SMALL,
                    theme::colour(Role::Over, look)
                ),
                theme::words(after, SMALL, Role::Muted, look),
                theme::words(
                    format!("   character {}", span.start + 1),
                    SMALL,
                    Role::Muted,
                    look
                ),
            ]
            .wrap(),
        );
    }
    let place = match fault.field {
        Some(field) if typed.is_some() || fault.span.is_none() => {
            format!("{}: ", sentence::label(field))
        }
        _ => String::new(),
    };
    lines = lines.push(theme::words(
        format!("{place}{}", fault.message),
        SMALL,
        Role::Over,
        look,
    ));
    if let Some(hint) = &fault.hint {
        lines = lines.push(theme::words(hint.to_string(), SMALL, Role::Ink, look));
    }
    lines.into()
}

/// Returns how many cautions a cell calls up, with their words where it is
/// selected.
pub fn cautions<'a>(result: &CellResult, selected: bool, look: Look) -> Element<'a, Message> {
    let count = result.cautions.len();
    let text = if count == 1 {
        "1 caution".to_owned()
    } else {
        format!("{count} cautions")
    };
    let head = row![
        canvas::shape(Shape::Caution, 12.0, look),
        theme::words(text, SMALL, Role::Muted, look),
    ]
    .spacing(7)
    .align_y(Alignment::Center);
    if !selected {
        return head.into();
    }
    let texts = result
        .cautions
        .iter()
        .map(|caution| theme::words(caution.text.clone(), SMALL, Role::Muted, look).into());
    column![head, column(texts).spacing(2)].spacing(2).into()
}
