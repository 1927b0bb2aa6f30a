//! One cell as a card that reads as a sentence.

use iced::widget::{button, column, container, mouse_area, row, space};
use iced::{Alignment, Element, Length};

use super::figure::{self, Told};
use super::sentence::{self, Piece};
use super::{Area, Message, Part, Place, field, found, prose};
use crate::app::shared::{Look, Shared};
use crate::app::theme::{self, BODY, RESULT, SMALL, Stand};
use crate::drawing::role::Role;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::results::CellResult;

/// The space around what is in a card.
const AROUND: f32 = 14.0;

/// The space between what stands below one another in a card.
const BETWEEN: f32 = 2.0;

/// The widest that a result gets, and the space beside it.
const FIGURE: f32 = 170.0;
const BESIDE: f32 = 12.0;

/// Below this width the result stands under the sentence.
const NARROW: f32 = 320.0;

/// How wide the labels of listed fields are.
const LABEL: f32 = 140.0;

/// A card that is being built.
struct Card<'a, 's> {
    area: &'a Area,
    shared: Shared<'a>,
    cell: &'a Cell,
    result: &'s CellResult,
    selected: bool,
    /// How wide what is in it is.
    inner: f32,
}

/// Returns the card of a cell, `wide` points wide.
pub fn view<'a>(
    area: &'a Area,
    shared: Shared<'a>,
    result: &'a CellResult,
    stand: Stand,
    wide: f32,
) -> Element<'a, Message> {
    let look = shared.look;
    let Some(cell) = shared.engine.cell(result.id) else {
        return space().into();
    };
    let selected = stand == Stand::Selected;
    let card = Card {
        area,
        shared,
        cell,
        result,
        selected,
        inner: wide - 2.0 * AROUND,
    };
    let told = figure::told(&shared, cell, result);
    let kind = theme::words(cell.kind.name(), SMALL, Role::Muted, look);
    let first = card.first(&told);
    let mut said = column![].spacing(BETWEEN);
    if let Some(origin) = card.origin() {
        said = said.push(theme::words(origin, SMALL, Role::Muted, look));
    }
    for line in told.lines {
        said = said.push(theme::words(line, SMALL, Role::Muted, look));
    }
    for finding in told.findings {
        said = said.push(found::finding(finding, look));
    }
    if cell.kind == Kind::Assessment && selected && shared.fresh {
        for limit in figure::limits(&shared, result) {
            said = said.push(found::limit(limit, look));
        }
    }
    said = said.push(found::state(cell, result, look));
    // Each part has a place of its own, empty or not: what is said of a cell
    // comes and goes with every letter that is typed, and a field that moved to
    // another place would lose the rest of the word.
    let body = column![
        kind,
        below(Some(first)),
        below(Some(said.into())),
        below(card.editing()),
        below(selected.then(|| card.others())),
        below((!result.cautions.is_empty()).then(|| found::cautions(result, selected, look))),
        below(selected.then(|| card.foot())),
    ];
    mouse_area(
        container(body)
            .padding([9.0, AROUND])
            .width(Length::Fill)
            .style(theme::card(stand, look)),
    )
    .on_press(Message::Select(result.id))
    .into()
}

/// A part of a card below another, or nothing in its place.
fn below<'a>(part: Option<Element<'a, Message>>) -> Element<'a, Message> {
    match part {
        Some(part) => container(part)
            .padding(iced::Padding::ZERO.top(BETWEEN))
            .into(),
        None => space().into(),
    }
}

impl<'a> Card<'a, '_> {
    fn place(&self, part: Part) -> Place {
        Place {
            cell: self.result.id,
            part,
        }
    }

    /// What can be done with the whole cell.
    fn foot(&self) -> Element<'a, Message> {
        let (look, id) = (self.shared.look, self.result.id);
        let tool = |text: &'static str, message: Message| -> Element<'a, Message> {
            button(iced::widget::text(text).size(SMALL).font(theme::REGULAR))
                .padding([0, 4])
                .style(theme::plain(look))
                .on_press(message)
                .into()
        };
        let tools = [
            theme::words("this cell:", SMALL, Role::Muted, look).into(),
            tool("rename", Message::Open(self.place(Part::Name))),
            tool("up", Message::Raise(id)),
            tool("down", Message::Lower(id)),
            tool("copy", Message::Duplicate(id)),
            tool("remove", Message::Remove(id)),
        ];
        row(tools).spacing(4).align_y(Alignment::Center).into()
    }

    /// The sentence, with the governing quantity at the right edge.
    fn first(&self, told: &Told) -> Element<'a, Message> {
        let look = self.shared.look;
        let Some(large) = told.large.clone() else {
            // As with a figure, so that a field being typed into stays where it
            // is when the figure goes.
            let sentence = self.sentence(self.inner);
            return if self.inner < NARROW {
                column![sentence, space()].into()
            } else {
                row![sentence, space()].into()
            };
        };
        let ink = if self.shared.fresh {
            Role::Ink
        } else {
            Role::Muted
        };
        let mut right = column![theme::bold(large, RESULT, ink, look)].align_x(Alignment::End);
        if let Some(under) = told.under.clone() {
            right = right.push(theme::words(under, SMALL, Role::Muted, look));
        }
        if self.inner < NARROW {
            let right = container(right).align_right(Length::Fill);
            return column![self.sentence(self.inner), right].into();
        }
        row![
            self.sentence(self.inner - FIGURE - BESIDE),
            container(right).max_width(FIGURE),
        ]
        .spacing(BESIDE)
        .align_y(Alignment::Start)
        .into()
    }

    fn sentence(&self, wide: f32) -> Element<'a, Message> {
        let look = self.shared.look;
        let mut pieces: Vec<Element<'a, Message>> = Vec::new();
        // A sign stands on the line of what it belongs to.
        let mut sign = None;
        for piece in sentence::sentence(self.cell) {
            match piece {
                Piece::Name => pieces.push(self.name(wide)),
                Piece::Words(words) if words.chars().count() == 1 => {
                    sign = Some(theme::words(words, BODY, Role::Ink, look));
                }
                Piece::Words(words) => {
                    pieces.extend(
                        words
                            .split(' ')
                            .map(|word| theme::words(word, BODY, Role::Ink, look).into()),
                    );
                }
                Piece::Field(field, after) => {
                    let mut words = self.field(field, after, wide).into_iter();
                    if let Some(sign) = sign.take() {
                        let first = words.next();
                        pieces.push(row![sign].push(first).spacing(4).into());
                    }
                    pieces.extend(words);
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

    /// A field as it stands in the sentence, or open for typing.
    fn field(
        &self,
        name: &'static str,
        after: &'static str,
        wide: f32,
    ) -> Vec<Element<'a, Message>> {
        let look = self.shared.look;
        let place = self.place(Part::Field(name));
        if self.area.is_open(place) {
            if sentence::is_prose(self.cell, name)
                && let Some(content) = self.area.prose()
            {
                return vec![prose::open(
                    content,
                    field::TYPING,
                    "",
                    BODY,
                    wide,
                    Message::Edited,
                    look,
                )];
            }
            if !sentence::is_chosen(self.cell, name) {
                let text = self.area.text(self.cell, name);
                return vec![field::open(look, &text, wide)];
            }
        }
        let faulty = self
            .result
            .errors
            .iter()
            .any(|error| error.field == Some(name));
        field::Resting {
            cell: self.cell,
            place,
            after,
            faulty,
            whole: self.selected,
            wide,
        }
        .view(look)
    }

    fn name(&self, wide: f32) -> Element<'a, Message> {
        let look = self.shared.look;
        if self.area.is_open(self.place(Part::Name)) {
            let draft = self.area.draft().unwrap_or(&self.cell.name);
            return field::open(look, draft, wide);
        }
        theme::bold(self.cell.name.as_str(), BODY, Role::Ink, look).into()
    }

    /// Where a cell's main input came from; listed where the cell is selected.
    fn origin(&self) -> Option<String> {
        if self.selected {
            return None;
        }
        let mut parts: Vec<&str> = Vec::new();
        if self.cell.kind == Kind::Value {
            parts.extend(self.cell.text("basis"));
        }
        parts.extend(self.cell.text("note").filter(|note| !note.is_empty()));
        (!parts.is_empty()).then(|| field::one_line(&parts.join(" · "), SMALL, self.inner))
    }

    /// What stands under the sentence while something of the cell is open.
    fn editing(&self) -> Option<Element<'a, Message>> {
        let look = self.shared.look;
        let place = self
            .area
            .open_place()
            .filter(|place| place.cell == self.result.id)?;
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
                let remark = self.area.remark_held();
                lines = lines.push(field::strip(
                    self.shared,
                    self.cell,
                    name,
                    remark,
                    self.inner,
                ));
            }
        }
        if let Some(refused) = self.area.refused() {
            lines = lines.push(theme::words(refused, SMALL, Role::Over, look));
        }
        Some(lines.into())
    }

    /// The fields that the sentence leaves out.
    fn others(&self) -> Element<'a, Message> {
        let look: Look = self.shared.look;
        let label = LABEL.min(self.inner * 0.4);
        let wide = self.inner - label - theme::STEP;
        // What is open below the sentence is not listed again.
        let open =
            self.cell.kind == Kind::Value && self.area.is_open(self.place(Part::Field("entry")));
        let listed = sentence::others(self.cell)
            .into_iter()
            .filter(|name| !(open && matches!(*name, "basis" | "note")));
        let lines = listed.map(|name| {
            let pieces = row(self.field(name, "", wide))
                .spacing(4)
                .wrap()
                .vertical_spacing(2);
            row![
                container(theme::words(
                    sentence::label(name),
                    SMALL,
                    Role::Muted,
                    look
                ))
                .width(Length::Fixed(label)),
                container(pieces).width(Length::Fill),
            ]
            .spacing(theme::STEP)
            .into()
        });
        column(lines).spacing(2).padding([4, 0]).into()
    }
}
