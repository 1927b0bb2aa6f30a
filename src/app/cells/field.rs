//! A field inside a sentence: shown with dashes under it, or open for typing.

use iced::widget::{button, column, container, row, text_input};
use iced::{Element, Length, widget};

use super::{Message, Part, Place, sentence};
use crate::app::dashes::dashes;
use crate::app::shared::{Look, Shared};
use crate::app::theme::{self, BODY, SMALL};
use crate::drawing::font::{self, Weight};
use crate::drawing::role::Role;
use crate::notebook::Diagnostic;
use crate::notebook::cell::{Basis, Cell, Form};

/// The field that is open for typing.
pub const TYPING: &str = "typing";

/// Returns a field as it stands in a sentence, with the words that cling to it.
pub fn shown<'a>(
    shared: Shared<'a>,
    cell: &Cell,
    place: Place,
    after: &'static str,
    faulty: bool,
) -> Element<'a, Message> {
    let look = shared.look;
    let Part::Field(field) = place.part else {
        return widget::space().into();
    };
    let typed = sentence::typed(cell, field).filter(|text| !text.is_empty());
    let (text, role) = match typed {
        Some(text) => (text, if faulty { Role::Over } else { Role::Ink }),
        None => (sentence::absent(cell.kind, field).to_owned(), Role::Muted),
    };
    let dashes_role = if faulty { Role::Over } else { Role::Action };
    let words = theme::words(text, BODY, role, look);
    // Prose has no dashes: its lines are no fields of a sentence.
    let words = if cell.kind == crate::notebook::Kind::Note {
        words.into()
    } else {
        dashes(words, theme::colour(dashes_role, look))
    };
    let opened = button(words)
        .padding(0)
        .style(theme::plain(look))
        .on_press(Message::Open(place));
    if after.is_empty() {
        return opened.into();
    }
    row![opened, theme::words(after, BODY, Role::Ink, look)].into()
}

/// Returns a field that is open for typing, as wide as what is typed.
pub fn open<'a>(look: Look, text: &str, widest: f32) -> Element<'a, Message> {
    // Widths of texts that fit a screen.
    #[allow(clippy::cast_possible_truncation)]
    let wide = font::width(text, f64::from(BODY), Weight::Regular) as f32 + 22.0;
    text_input("", text)
        .id(TYPING)
        .on_input(Message::Typed)
        .on_submit(Message::Keep)
        .size(BODY)
        .font(theme::REGULAR)
        .padding([0, 4])
        .width(Length::Fixed(wide.clamp(70.0, widest)))
        .style(theme::typing(look))
        .into()
}

/// Returns what stands under the sentence while a field is open: what it
/// means, what can be chosen, where it came from.
pub fn strip<'a>(
    shared: Shared<'a>,
    cell: &'a Cell,
    field: &'static str,
    note: &str,
) -> Element<'a, Message> {
    let look = shared.look;
    let mut strip = column![].spacing(6);
    if let Some(spec) = cell.kind.field(field) {
        strip = strip.push(theme::words(spec.about, SMALL, Role::Muted, look));
    }
    let names = |kinds: &[crate::notebook::Kind]| {
        shared
            .engine
            .notebook()
            .cells
            .iter()
            .filter(|other| kinds.contains(&other.kind))
            .map(|other| other.name.clone())
            .take(40)
            .collect()
    };
    let choices = sentence::choices(cell, field, &names);
    if !choices.is_empty() {
        let chosen = cell.texts(field);
        let choices = choices.into_iter().map(|choice| {
            let is = chosen.contains(&choice.as_str());
            pill(choice.clone(), is, Message::Chosen(choice), look)
        });
        strip = strip.push(row(choices).spacing(4).wrap().vertical_spacing(4));
    }
    if matches!(
        cell.kind.field(field).map(|spec| spec.form),
        Some(Form::Entry(_) | Form::Pairs(_) | Form::Facing)
    ) {
        strip = strip.push(origin(cell, field, note, look));
    }
    container(strip).padding([6, 0]).into()
}

/// Where an input came from: its basis and a remark.
fn origin<'a>(cell: &Cell, field: &'static str, note: &str, look: Look) -> Element<'a, Message> {
    let own = match (cell.kind, field) {
        // A value's basis and note are fields of their own.
        (crate::notebook::Kind::Value, _) => cell.text("basis").and_then(Basis::from_words),
        _ => cell.field(field).and_then(|field| field.basis),
    };
    let bases = Basis::ALL.into_iter().map(|basis| {
        pill(
            basis.words().to_owned(),
            own == Some(basis),
            Message::Based(basis),
            look,
        )
    });
    let remark = text_input("a remark on where it came from", note)
        .id("remark")
        .on_input(Message::Remarked)
        .on_submit(Message::Keep)
        .size(SMALL)
        .font(theme::REGULAR)
        .padding([2, 6])
        .style(theme::typing(look));
    column![row(bases).spacing(4).wrap().vertical_spacing(4), remark]
        .spacing(6)
        .into()
}

fn pill<'a>(text: String, chosen: bool, message: Message, look: Look) -> Element<'a, Message> {
    // The role comes from the button's style, so that a chosen one reads.
    button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
        .padding([1, 8])
        .style(theme::choice(chosen, look))
        .on_press(message)
        .into()
}

/// Returns a fault where it is: the text with the faulty characters marked,
/// what is wrong with them, and the remedy.
pub fn fault<'a>(cell: &Cell, fault: &Diagnostic, look: Look) -> Element<'a, Message> {
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
        lines = lines.push(theme::words(hint.clone(), SMALL, Role::Ink, look));
    }
    lines.into()
}
