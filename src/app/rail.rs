//! The distance rail under the drawing: where may a person stand?

use std::cell::RefCell;
use std::fmt;

use iced::widget::canvas::{self, Canvas};
use iced::widget::{button, column, container, pick_list, responsive, row, scrollable, text};
use iced::{Alignment, Element, Event, Length, Rectangle, Renderer, Theme, mouse};

use super::canvas::{Held, SCALE};
use super::shared::{Look, Shared};
use super::theme::{self, BODY, REGULAR, SMALL, words};
use crate::drawing::mark::Rectangle as Box;
use crate::drawing::rail::{self, Line, Rail, Shading};
use crate::drawing::role::Role;
use crate::notebook::datum::CellId;

pub use super::action::Action;

/// How high the panel is, at 100 %.
const HEIGHT: f32 = 216.0;

/// How much higher where there are lines to choose from.
const CHOICES: f32 = 34.0;

/// How high the rail grows before flags are left out and counted.
const TALLEST: f32 = 900.0;

/// How much room a scrolling bar takes.
const BAR: f32 = 16.0;

/// The area's own state.
#[derive(Clone, Debug, Default)]
pub struct Area {
    /// The line that was chosen, by its source and its way.
    chosen: Option<(String, String)>,
    /// What was selected when it was chosen: another selection chooses anew.
    selected: Option<CellId>,
    /// The shading that was shown last.
    shading: RefCell<Option<Shading>>,
}

/// What happens in the area.
#[derive(Clone, Debug)]
pub enum Message {
    /// Show this line, while this cell is selected.
    Choose(String, String, Option<CellId>),
    /// Go to the cell of a flag.
    Show(CellId),
}

impl Area {
    /// Returns the area as it is at first.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Takes a message in.
    pub fn update(&mut self, message: Message) -> Action {
        match message {
            Message::Choose(source, way, selected) => {
                self.chosen = Some((source, way));
                self.selected = selected;
                Action::None
            }
            Message::Show(id) => Action::SelectCell(id),
        }
    }

    /// Returns the line that is shown: the chosen one, else that of what is
    /// selected, else the first.
    fn line(&self, shared: Shared<'_>, lines: &[Line]) -> Option<Line> {
        let chosen = self
            .chosen
            .as_ref()
            .and_then(|(source, way)| {
                lines
                    .iter()
                    .find(|line| line.source == *source && line.way() == *way)
            })
            .cloned();
        let of_selected = shared
            .selected
            .and_then(|id| Line::of(shared.engine, id))
            .filter(|_| chosen.is_none() || self.selected != shared.selected);
        of_selected.or(chosen).or_else(|| lines.first().cloned())
    }

    /// Returns the panel as it is seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let lines = Line::all(shared.engine);
        let line = self.line(shared, &lines);
        let mut panel = column![].spacing(6).width(Length::Fill);
        if lines.len() > 1 {
            panel = panel.push(choices(shared, &lines, line.as_ref()));
        }
        let known = line.and_then(|line| {
            let mut held = self.shading.borrow_mut();
            let (engine, results) = (shared.engine, shared.results);
            let rail = Rail::held(engine, results, &line, look.measure, &mut held)?;
            Some(if shared.fresh {
                rail
            } else {
                rail.provisional()
            })
        });
        panel = panel.push(match known {
            Some(rail) => drawn(shared, rail),
            None => nothing(shared),
        });
        container(panel)
            .padding([10, 14])
            .width(Length::Fill)
            .height(HEIGHT + if lines.len() > 1 { CHOICES } else { 0.0 })
            .style(theme::panel(look))
            .into()
    }
}

/// A line that can be chosen.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Choice {
    source: String,
    way: String,
}

impl fmt::Display for Choice {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}, {}", self.source, self.way)
    }
}

/// More lines than this are chosen from a list that opens.
const BUTTONS: usize = 4;

fn choices<'a>(shared: Shared<'a>, lines: &[Line], shown: Option<&Line>) -> Element<'a, Message> {
    let look = shared.look;
    let selected = shared.selected;
    let choose = move |choice: Choice| Message::Choose(choice.source, choice.way, selected);
    let choice = |line: &Line| Choice {
        source: line.source.clone(),
        way: line.way(),
    };
    if lines.len() > BUTTONS {
        let all: Vec<Choice> = lines.iter().map(choice).collect();
        return pick_list(all, shown.map(choice), choose)
            .text_size(SMALL)
            .font(REGULAR)
            .padding([2, 10])
            .style(theme::pick(look))
            .menu_style(theme::menu(look))
            .into();
    }
    let choices = lines.iter().map(|line| {
        let is_shown = shown.is_some_and(|shown| shown.same(line));
        let choice = choice(line);
        button(text(choice.to_string()).size(SMALL).font(REGULAR))
            .padding([2, 10])
            .style(theme::choice(is_shown, look))
            .on_press(choose(choice))
            .into()
    });
    row(choices)
        .spacing(6)
        .align_y(Alignment::Center)
        .wrap()
        .into()
}

/// What is said where there is no line, or nothing is known about it.
fn nothing(shared: Shared<'_>) -> Element<'_, Message> {
    let look = shared.look;
    let has_source = shared
        .engine
        .notebook()
        .cells
        .iter()
        .any(|cell| cell.kind == crate::notebook::Kind::Source);
    let what = if has_source {
        "No distance can be told while a source has an error: mend it first."
    } else {
        "Distances are told from the face of a source: add one."
    };
    column![
        theme::bold("Distance rail", theme::RESULT, Role::Ink, look),
        words(what, BODY, Role::Muted, look),
    ]
    .spacing(6)
    .into()
}

fn drawn(shared: Shared<'_>, rail: Rail) -> Element<'_, Message> {
    let look = shared.look;
    let ids = rail
        .pins
        .iter()
        .map(|pin| pin.cell.as_str())
        .chain(rail.stands.iter().map(|stand| stand.cell.as_str()))
        .filter_map(|name| Some((name.to_owned(), shared.engine.find(name)?)))
        .collect::<Vec<_>>();
    responsive(move |size| {
        let needed = |width: f32| {
            let height = rail::height(&rail, f64::from(width) / SCALE) * SCALE;
            (height as f32).min(TALLEST)
        };
        let ruler = |height: f32| {
            Canvas::new(Ruler {
                rail: rail.clone(),
                ids: ids.clone(),
                look,
            })
            .width(Length::Fill)
            .height(height)
        };
        if needed(size.width) <= size.height {
            return ruler(size.height).into();
        }
        // What scrolls leaves room for the bar beside it.
        let room = container(ruler(needed(size.width - BAR))).padding(iced::padding::right(BAR));
        scrollable(room)
            .style(move |theme, status| theme::scroll(look, theme, status))
            .into()
    })
    .into()
}

/// The rail on a canvas whose flags can be clicked.
#[derive(Debug)]
struct Ruler {
    rail: Rail,
    ids: Vec<(String, CellId)>,
    look: Look,
}

impl Ruler {
    /// Returns the cell of the flag under the pointer.
    fn under(&self, bounds: Rectangle, cursor: mouse::Cursor) -> Option<CellId> {
        let at = cursor.position_in(bounds)?;
        let (width, height) = size(bounds);
        let (x, y) = (f64::from(at.x) / SCALE, f64::from(at.y) / SCALE);
        let point = Box::new(x, y, 0.0, 0.0);
        let (_, name) = rail::hits(&self.rail, width, height)
            .into_iter()
            .find(|(area, _)| area.holds(&point))?;
        self.ids
            .iter()
            .find(|(known, _)| *known == name)
            .map(|(_, id)| *id)
    }
}

/// The size of the picture in its own points.
fn size(bounds: Rectangle) -> (f64, f64) {
    (
        f64::from(bounds.width) / SCALE,
        f64::from(bounds.height) / SCALE,
    )
}

impl canvas::Program<Message> for Ruler {
    type State = Held;

    fn update(
        &self,
        _held: &mut Held,
        event: &Event,
        bounds: Rectangle,
        cursor: mouse::Cursor,
    ) -> Option<canvas::Action<Message>> {
        let pressed = matches!(
            event,
            Event::Mouse(mouse::Event::ButtonPressed(mouse::Button::Left))
        );
        let id = pressed.then(|| self.under(bounds, cursor)).flatten()?;
        Some(canvas::Action::publish(Message::Show(id)).and_capture())
    }

    fn draw(
        &self,
        held: &Held,
        renderer: &Renderer,
        _theme: &Theme,
        bounds: Rectangle,
        _cursor: mouse::Cursor,
    ) -> Vec<canvas::Geometry> {
        let (width, height) = size(bounds);
        let picture = rail::picture(&self.rail, width, height).scaled(SCALE);
        vec![held.draw(renderer, bounds.size(), picture, self.look.theme)]
    }

    fn mouse_interaction(
        &self,
        _held: &Held,
        bounds: Rectangle,
        cursor: mouse::Cursor,
    ) -> mouse::Interaction {
        match self.under(bounds, cursor) {
            Some(_) => mouse::Interaction::Pointer,
            None => mouse::Interaction::default(),
        }
    }
}
