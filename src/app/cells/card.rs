//! One cell as a card that reads as a sentence.

use iced::widget::{button, column, container, mouse_area, row, space};
use iced::{Alignment, Element, Length};

use super::figure::{self, Found};
use super::sentence::{self, Piece};
use super::{Area, Message, Part, Place, field};
use crate::app::canvas;
use crate::app::shared::{Look, Shared};
use crate::app::theme::{self, BODY, RESULT, SMALL, Stand};
use crate::drawing::mark::Shape;
use crate::drawing::role::Role;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::results::{CellResult, State};

/// The widest that a field open for typing gets, beside a result and alone.
const WIDEST: f32 = 250.0;
const WIDE: f32 = 370.0;

/// Returns the card of a cell.
pub fn view<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    id: CellId,
    result: &'a CellResult,
    stand: Stand,
) -> Element<'a, Message> {
    let look = shared.look;
    let Some(cell) = shared.engine.cell(id) else {
        return space().into();
    };
    let selected = stand == Stand::Selected;
    let mut body = column![head(shared, cell, id, selected)].spacing(2);
    let told = figure::told(&shared, cell, result);
    let ink = if shared.fresh { Role::Ink } else { Role::Muted };
    let mut first = row![sentence_of(area, shared, cell, id, result)]
        .spacing(12)
        .align_y(Alignment::Start);
    if let Some(large) = told.large {
        let mut right = column![theme::bold(large, RESULT, ink, look)].align_x(Alignment::End);
        if let Some(under) = told.under {
            right = right.push(theme::words(under, SMALL, Role::Muted, look));
        }
        first = first.push(container(right).max_width(170));
    }
    body = body.push(first);
    if let Some(origin) = origin(cell) {
        body = body.push(theme::words(origin, SMALL, Role::Muted, look));
    }
    for line in told.lines {
        body = body.push(theme::words(line, SMALL, Role::Muted, look));
    }
    for found in told.findings {
        body = body.push(finding(found, look));
    }
    if cell.kind == Kind::Assessment && selected && shared.fresh {
        for limit in figure::limits(&shared, result) {
            body = body.push(limit_line(limit, look));
        }
    }
    body = body.push(state(cell, result, look));
    if let Some(strip) = editing(area, shared, cell, id) {
        body = body.push(strip);
    }
    if selected {
        body = body.push(others(area, shared, cell, id, result));
    }
    if !result.cautions.is_empty() {
        body = body.push(cautions(result, selected, look));
    }
    mouse_area(
        container(body)
            .padding([9, 14])
            .width(Length::Fill)
            .style(theme::card(stand, look)),
    )
    .on_press(Message::Select(id))
    .into()
}

/// The kind, and what can be done with the whole cell.
fn head<'a>(shared: Shared<'a>, cell: &Cell, id: CellId, selected: bool) -> Element<'a, Message> {
    let look = shared.look;
    let kind = theme::words(cell.kind.name(), SMALL, Role::Muted, look);
    if !selected {
        return kind.into();
    }
    let tool = |text: &'static str, message: Message| {
        button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
            .padding([0, 5])
            .style(theme::plain(look))
            .on_press(message)
    };
    row![
        kind,
        space().width(Length::Fill),
        tool(
            "rename",
            Message::Open(Place {
                cell: id,
                part: Part::Name
            })
        ),
        tool("up", Message::Raise(id)),
        tool("down", Message::Lower(id)),
        tool("copy", Message::Duplicate(id)),
        tool("remove", Message::Remove(id)),
    ]
    .align_y(Alignment::Center)
    .into()
}

fn sentence_of<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    cell: &'a Cell,
    id: CellId,
    result: &CellResult,
) -> Element<'a, Message> {
    let look = shared.look;
    let mut pieces: Vec<Element<'a, Message>> = Vec::new();
    for piece in sentence::sentence(cell) {
        match piece {
            Piece::Name => pieces.push(name(area, cell, id, look)),
            Piece::Words(words) => {
                pieces.extend(
                    words
                        .split(' ')
                        .map(|word| theme::words(word, BODY, Role::Ink, look).into()),
                );
            }
            Piece::Field(field, after) => {
                pieces.push(piece_of(area, shared, cell, id, field, after, result));
            }
        }
    }
    container(
        row(pieces)
            .spacing(4)
            .align_y(Alignment::Center)
            .wrap()
            .vertical_spacing(2),
    )
    .width(Length::Fill)
    .into()
}

fn piece_of<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    cell: &'a Cell,
    id: CellId,
    name: &'static str,
    after: &'static str,
    result: &CellResult,
) -> Element<'a, Message> {
    let place = Place {
        cell: id,
        part: Part::Field(name),
    };
    if area.is_open(place) && !sentence::is_chosen(cell, name) {
        let widest = if cell.kind == Kind::Note {
            WIDE
        } else {
            WIDEST
        };
        return field::open(shared.look, &area.text(cell, name), widest);
    }
    let faulty = result.errors.iter().any(|error| error.field == Some(name));
    field::shown(shared, cell, place, after, faulty)
}

fn name<'a>(area: &'a Area, cell: &'a Cell, id: CellId, look: Look) -> Element<'a, Message> {
    let place = Place {
        cell: id,
        part: Part::Name,
    };
    if area.is_open(place) {
        let draft = area.draft().unwrap_or(&cell.name);
        return field::open(look, draft, WIDEST);
    }
    theme::bold(cell.name.as_str(), BODY, Role::Ink, look).into()
}

/// Where a cell's main input came from.
fn origin(cell: &Cell) -> Option<String> {
    let mut parts: Vec<&str> = Vec::new();
    if cell.kind == Kind::Value {
        parts.extend(cell.text("basis"));
    }
    parts.extend(cell.text("note").filter(|note| !note.is_empty()));
    (!parts.is_empty()).then(|| parts.join(" · "))
}

fn finding<'a>(found: Found, look: Look) -> Element<'a, Message> {
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

fn limit_line<'a>(found: Found, look: Look) -> Element<'a, Message> {
    let role = found.shape.role();
    row![
        container(canvas::shape(found.shape, 11.0, look)).padding([3, 0]),
        theme::words(found.word, SMALL, role, look),
        theme::words(found.text, SMALL, Role::Muted, look).width(Length::Fill),
    ]
    .spacing(7)
    .into()
}

/// The cell's own faults, or whom it waits for.
fn state<'a>(cell: &Cell, result: &CellResult, look: Look) -> Element<'a, Message> {
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
                .map(|fault| field::fault(cell, fault, look));
            let mut all = column(faults).spacing(4);
            if result.errors.len() > 4 {
                let more = format!("and {} more", result.errors.len() - 4);
                all = all.push(theme::words(more, SMALL, Role::Over, look));
            }
            all.into()
        }
    }
}

/// What stands under the sentence while something of the cell is open.
fn editing<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    cell: &'a Cell,
    id: CellId,
) -> Option<Element<'a, Message>> {
    let look = shared.look;
    let place = area.open_place().filter(|place| place.cell == id)?;
    let mut lines = column![].spacing(4);
    match place.part {
        Part::Name => {
            lines = lines.push(theme::words(
                "letters a to z, digits and underscores; every mention follows",
                SMALL,
                Role::Muted,
                look,
            ));
        }
        Part::Field(name) => {
            lines = lines.push(field::strip(
                shared,
                cell,
                name,
                &super::note_of(cell, name),
            ));
        }
    }
    if let Some(refused) = area.refused() {
        lines = lines.push(theme::words(refused, SMALL, Role::Over, look));
    }
    Some(lines.into())
}

/// The fields that the sentence leaves out.
fn others<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    cell: &'a Cell,
    id: CellId,
    result: &CellResult,
) -> Element<'a, Message> {
    let look = shared.look;
    let lines = sentence::others(cell).into_iter().map(|name| {
        row![
            container(theme::words(
                sentence::label(name),
                SMALL,
                Role::Muted,
                look
            ))
            .width(Length::Fixed(140.0)),
            piece_of(area, shared, cell, id, name, "", result),
        ]
        .spacing(8)
        .align_y(Alignment::Center)
        .into()
    });
    column(lines).spacing(2).padding([4, 0]).into()
}

fn cautions<'a>(result: &CellResult, selected: bool, look: Look) -> Element<'a, Message> {
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
