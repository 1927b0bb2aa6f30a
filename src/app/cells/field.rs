//! A field inside a sentence: shown with dashes under it, or open for typing.

use iced::widget::{button, column, container, row, text_editor, text_input};
use iced::{Element, Length};

use super::{Message, Part, Place, prose, sentence};
use crate::app::dashes::dashes;
use crate::app::shared::{Look, Shared};
use crate::app::theme::{self, BODY, SMALL};
use crate::drawing::font::{self, Weight};
use crate::drawing::role::Role;
use crate::notebook::cell::{Basis, Cell};

/// The field that is open for typing.
pub const TYPING: &str = "typing";

/// The remark on the open input.
pub const REMARK: &str = "remark";

/// The longest entry that stands whole on a card at rest, in characters.
const LONG: usize = 160;

/// The longest text that is never broken between its words.
const UNBROKEN: usize = 24;

/// A field as it stands in a sentence.
pub struct Resting<'a> {
    /// Its cell.
    pub cell: &'a Cell,
    /// Where it is.
    pub place: Place,
    /// The words that cling to it.
    pub after: &'static str,
    /// Whether something is wrong with it.
    pub faulty: bool,
    /// Whether it is shown whole, however long it is.
    pub whole: bool,
    /// How wide a line is.
    pub wide: f32,
}

impl<'a> Resting<'a> {
    /// Returns its pieces: one, or the words of a long text.
    pub fn view(&self, look: Look) -> Vec<Element<'a, Message>> {
        let Part::Field(field) = self.place.part else {
            return Vec::new();
        };
        let typed = sentence::typed(self.cell, field).filter(|text| !text.is_empty());
        let (text, role) = match typed {
            Some(text) if self.faulty => (text, Role::Over),
            Some(text) => (text, Role::Ink),
            None => (
                sentence::absent(self.cell.kind, field).to_owned(),
                Role::Muted,
            ),
        };
        if sentence::is_prose(self.cell, field) {
            let text = if self.whole {
                text
            } else {
                one_line(&text, BODY, self.wide)
            };
            // Prose has no dashes: its lines are no fields of a sentence.
            return vec![self.link(theme::words(text, BODY, role, look).into(), look)];
        }
        let text = match text.char_indices().nth(LONG) {
            Some((at, _)) if !self.whole => format!("{}…", &text[..at]),
            _ => text,
        };
        let words: Vec<String> = if text.chars().count() > UNBROKEN {
            text.split(' ').map(str::to_owned).collect()
        } else {
            vec![text]
        };
        let last = words.len() - 1;
        let line = theme::colour(
            if self.faulty {
                Role::Over
            } else {
                Role::Action
            },
            look,
        );
        words
            .into_iter()
            .enumerate()
            .map(|(at, word)| {
                let word = theme::words(word, BODY, role, look)
                    .wrapping(iced::widget::text::Wrapping::WordOrGlyph);
                let opened = self.link(dashes(word, BODY, line), look);
                if at < last || self.after.is_empty() {
                    return opened;
                }
                row![opened, theme::words(self.after, BODY, Role::Ink, look)].into()
            })
            .collect()
    }

    fn link(&self, content: Element<'a, Message>, look: Look) -> Element<'a, Message> {
        button(content)
            .padding(0)
            .style(theme::plain(look))
            .on_press(Message::Open(self.place))
            .into()
    }
}

/// Returns the first line of a text, cut to a width; what is left out shows as
/// an ellipsis.
pub fn one_line(text: &str, size: f32, wide: f32) -> String {
    let first = text.lines().next().unwrap_or_default();
    let measure = |text: &str| font::width(text, f64::from(size), Weight::Regular);
    let wide = f64::from(wide);
    let whole = text.trim_end().len() <= first.len();
    if whole && measure(first) <= wide {
        return first.to_owned();
    }
    let room = wide - measure(" …");
    let (mut end, mut used) = (0, 0.0);
    for (at, letter) in first.char_indices() {
        used += measure(letter.encode_utf8(&mut [0; 4]));
        if used > room {
            break;
        }
        end = at + letter.len_utf8();
    }
    // Between two words, if there are any.
    let cut = first[..end].trim_end();
    let cut = cut.rfind(' ').map_or(cut, |at| cut[..at].trim_end());
    format!("{cut} …")
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
        .width(Length::Fixed(wide.min(widest).max(70.0)))
        .style(theme::typing(look))
        .into()
}

/// Returns what stands under the sentence while a field is open: what it
/// means, what can be chosen, where it came from.
pub fn strip<'a>(
    shared: Shared<'a>,
    cell: &'a Cell,
    field: &'static str,
    remark: Option<&'a text_editor::Content>,
    wide: f32,
) -> Element<'a, Message> {
    let look = shared.look;
    let mut strip = column![].spacing(6);
    // Prose needs no word on what it is.
    if let Some(spec) = cell.kind.field(field)
        && !sentence::is_prose(cell, field)
    {
        strip = strip.push(theme::words(
            // The marks of code say nothing on a card.
            spec.about.replace('`', ""),
            SMALL,
            Role::Muted,
            look,
        ));
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
    if let Some(remark) = remark {
        strip = strip.push(origin(cell, field, remark, wide, look));
    }
    container(strip).padding([6, 0]).into()
}

/// Where an input came from: its basis and a remark.
fn origin<'a>(
    cell: &Cell,
    field: &'static str,
    remark: &'a text_editor::Content,
    wide: f32,
    look: Look,
) -> Element<'a, Message> {
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
    let remark = prose::open(
        remark,
        REMARK,
        "a remark on where it came from",
        SMALL,
        wide,
        Message::Remarked,
        look,
    );
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
