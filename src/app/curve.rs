//! The curve view: irradiance against distance, with what is met under the
//! pointer and how long guidance allows there.

mod read;

use std::fmt;

use glam::DVec2;
use iced::widget::canvas::{self, Canvas};
use iced::widget::{button, column, container, row, text};
use iced::{
    Alignment, Color, Element, Event, Length, Point, Rectangle, Renderer, Size, Theme, mouse,
};

use super::canvas::{Held, SCALE, paint};
use super::shared::{Look, Shared};
use super::theme::{self, BODY, REGULAR, SMALL, words};
use crate::drawing::curve::{self, Axes, Curve};
use crate::drawing::mark::{Dash, Fill, Mark, Shape, Stroke};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;
use crate::notebook::Kind;
use crate::notebook::datum::CellId;
use crate::notebook::results::{CellResult, State};

use read::Readout;

pub use super::action::Action;

/// The area's own state.
#[derive(Clone, Debug, Default)]
pub struct Area {
    /// The curve that was chosen.
    chosen: Option<CellId>,
    /// The distance under the pointer, from the centre of the source, m.
    pointed: Option<f64>,
}

/// What happens in the area.
#[derive(Clone, Copy, Debug)]
pub enum Message {
    /// Show this curve.
    Choose(CellId),
    /// The pointer rests over this distance in metres, or beside the plot.
    Pointed(Option<f64>),
    /// Go to a cell.
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
            Message::Choose(id) => {
                self.chosen = Some(id);
                self.pointed = None;
                Action::SelectCell(id)
            }
            Message::Pointed(distance) => {
                self.pointed = distance;
                Action::None
            }
            Message::Show(id) => Action::SelectCell(id),
        }
    }

    /// Returns the view as it is seen.
    pub fn view<'a>(&'a self, shared: Shared<'a>) -> Element<'a, Message> {
        let look = shared.look;
        let curves: Vec<&CellResult> = shared
            .results
            .cells
            .iter()
            .filter(|cell| cell.kind == Kind::Curve)
            .collect();
        let shown = self.shown(shared, &curves);
        let mut panel = column![].spacing(8).width(Length::Fill);
        if curves.len() > 1 {
            panel = panel.push(choices(&curves, shown.map(|cell| cell.id), look));
        }
        panel = match shown {
            Some(cell) if cell.state == State::Ok => {
                let curve = Curve::of(shared.engine, shared.results, cell, look.measure);
                let readout = self
                    .pointed
                    .and_then(|distance| Readout::of(shared, cell, &curve, distance));
                panel
                    .push(plot(curve, readout.as_ref(), look))
                    .push(told(readout.as_ref(), look))
            }
            Some(cell) => panel.push(
                row![
                    words(
                        format!("{} could not be worked out.", cell.name),
                        BODY,
                        Role::Ink,
                        look
                    ),
                    button(text("go there").size(SMALL).font(REGULAR))
                        .padding([2, 8])
                        .style(theme::framed(look))
                        .on_press(Message::Show(cell.id)),
                ]
                .spacing(8)
                .align_y(Alignment::Center),
            ),
            None => panel.push(words(
                "No curve yet: add a cell of kind curve to see irradiance against distance.",
                BODY,
                Role::Muted,
                look,
            )),
        };
        container(panel)
            .padding(14)
            .width(Length::Fill)
            .height(Length::Fill)
            .style(theme::panel(look))
            .into()
    }

    /// Returns the curve that is shown: the selected one, else the chosen one,
    /// else the first.
    fn shown<'a>(&self, shared: Shared<'a>, curves: &[&'a CellResult]) -> Option<&'a CellResult> {
        [shared.selected, self.chosen]
            .into_iter()
            .flatten()
            .find_map(|id| curves.iter().find(|cell| cell.id == id))
            .or_else(|| curves.first())
            .copied()
    }
}

fn choices<'a>(curves: &[&CellResult], shown: Option<CellId>, look: Look) -> Element<'a, Message> {
    let choices = curves.iter().map(|cell| {
        button(text(cell.name.clone()).size(SMALL).font(REGULAR))
            .padding([2, 10])
            .style(theme::choice(shown == Some(cell.id), look))
            .on_press(Message::Choose(cell.id))
            .into()
    });
    row(choices).spacing(6).wrap().into()
}

/// The line under the plot: what is met under the pointer.
fn told<'a>(readout: Option<&Readout>, look: Look) -> Element<'a, Message> {
    let line = match readout {
        Some(readout) => row![
            theme::bold(readout.place(look), BODY, Role::Ink, look),
            words(readout.met(look), BODY, Role::Ink, look),
            words(readout.allowed(), BODY, Role::Ink, look),
        ]
        .spacing(16)
        .wrap()
        .vertical_spacing(2)
        .into(),
        None => Element::from(words(
            "Rest the pointer on the plot to read distance, irradiance and allowed time there.",
            SMALL,
            Role::Muted,
            look,
        )),
    };
    container(line).height(44).align_y(Alignment::Center).into()
}

fn plot<'a>(curve: Curve, readout: Option<&Readout>, look: Look) -> Element<'a, Message> {
    Canvas::new(Plot {
        curve,
        pointed: readout.map(|readout| (readout.distance, readout.drawn)),
        look,
    })
    .width(Length::Fill)
    .height(Length::Fill)
    .into()
}

/// The plot on a canvas that follows the pointer.
struct Plot {
    curve: Curve,
    /// The distance under the pointer and the nominal value there.
    pointed: Option<(f64, f64)>,
    look: Look,
}

impl fmt::Debug for Plot {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Plot")
            .field("title", &self.curve.title)
            .field("pointed", &self.pointed)
            .finish_non_exhaustive()
    }
}

fn size(bounds: Rectangle) -> (f64, f64) {
    (
        f64::from(bounds.width) / SCALE,
        f64::from(bounds.height) / SCALE,
    )
}

impl canvas::Program<Message> for Plot {
    type State = Held;

    fn update(
        &self,
        _held: &mut Held,
        event: &Event,
        bounds: Rectangle,
        cursor: mouse::Cursor,
    ) -> Option<canvas::Action<Message>> {
        match event {
            Event::Mouse(mouse::Event::CursorMoved { .. } | mouse::Event::CursorLeft) => {}
            _ => return None,
        }
        let (width, height) = size(bounds);
        let distance = cursor.position_in(bounds).and_then(|Point { x, y }| {
            let axes = Axes::of(&self.curve, width, height)?;
            let y = f64::from(y) / SCALE;
            if !(axes.area.from.y..=axes.area.to.y).contains(&y) {
                return None;
            }
            axes.distance(f64::from(x) / SCALE)
        });
        let known = self.pointed.map(|(distance, _)| distance);
        (distance != known).then(|| canvas::Action::publish(Message::Pointed(distance)))
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
        let picture = curve::picture(&self.curve, width, height).scaled(SCALE);
        let mut layers = vec![held.draw(renderer, bounds.size(), picture, self.look.theme)];
        let axes = self
            .pointed
            .and_then(|_| Axes::of(&self.curve, width, height));
        if let (Some((distance, value)), Some(axes)) = (self.pointed, axes) {
            let mut frame = canvas::Frame::new(renderer, bounds.size());
            if let Some(at) = axes.place(distance, value) {
                soak(&mut frame, &axes, at);
            }
            let over = hair(&axes, distance, value, width, height).scaled(SCALE);
            paint(&mut frame, &over, self.look.theme);
            layers.push(frame.into_geometry());
        }
        layers
    }

    fn mouse_interaction(
        &self,
        _held: &Held,
        bounds: Rectangle,
        cursor: mouse::Cursor,
    ) -> mouse::Interaction {
        if self.pointed.is_some() && cursor.is_over(bounds) {
            mouse::Interaction::Crosshair
        } else {
            mouse::Interaction::default()
        }
    }
}

/// Lays clear areas around the line and its ring. What is drawn again in a
/// window are the bounds of the paths that changed, strokes not counted: an
/// upright line has none and would stay behind where the pointer was.
fn soak(frame: &mut canvas::Frame, axes: &Axes, at: DVec2) {
    for (reach, from, to) in [
        (3.0, axes.area.from.y, axes.area.to.y),
        (6.0, at.y - 6.0, at.y + 6.0),
    ] {
        let corner = DVec2::new(at.x - reach, from) * SCALE;
        let size = DVec2::new(2.0 * reach, to - from) * SCALE;
        frame.fill_rectangle(
            Point::new(corner.x as f32, corner.y as f32),
            Size::new(size.x as f32, size.y as f32),
            Color::TRANSPARENT,
        );
    }
}

/// A line at the distance under the pointer, and a ring where it meets the
/// curve.
fn hair(axes: &Axes, distance: f64, value: f64, width: f64, height: f64) -> Picture {
    let mut picture = Picture::new(width, height);
    // The upper end of the value axis is on the plot for any distance that is.
    let Some(at) = axes.place(distance, value) else {
        return picture;
    };
    let stroke = Stroke {
        role: Role::Action,
        width: 0.8,
        dash: Dash::Solid,
    };
    picture.push(Mark::line(
        DVec2::new(at.x, axes.area.from.y),
        DVec2::new(at.x, axes.area.to.y),
        stroke,
    ));
    picture.push(Mark::Area {
        outline: Shape::Within.outline(at, 6.0),
        fill: Some(Fill::Role(Role::Card)),
        hatch: None,
        edge: Some(Stroke::solid(Role::Action, 1.4)),
    });
    picture
}
