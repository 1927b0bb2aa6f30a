//! What is marked in the plot: limits, where they are met, and positions; each
//! with a label that covers no other.

use glam::DVec2;

use super::column::{Entry, note};
use super::{LINE, Plot, SMALL, SYMBOL, stroke};
use crate::drawing::curve::drawable;
use crate::drawing::font::{self, Weight};
use crate::drawing::label::Wish;
use crate::drawing::mark::{Backing, Dash, Fill, Mark, Rectangle, Shape, Stroke, Text};
use crate::drawing::role::Role;
use crate::drawing::screen::{HIDDEN, PLATE, THICK};

/// Of more positions than this, the others are named in the column alone: no
/// plot has room for their labels.
const LABELLED: usize = 60;

impl Plot<'_> {
    /// The ground from which a source is hidden, under everything else.
    pub(super) fn shadows(&mut self) {
        let (low, high) = self.axes.ends();
        for shadow in &self.curve.shadows {
            let Some((from, to)) = shadow.between(low, high) else {
                continue;
            };
            // Any value will do: only the way across is asked for.
            let x = [from, to].map(|distance| self.axes.at(distance, 1.0).x);
            let area = self.axes.area;
            self.picture.push(Mark::Area {
                outline: Rectangle::new(x[0], area.from.y, x[1] - x[0], area.height()).corners(),
                fill: None,
                hatch: Some(HIDDEN),
                edge: None,
            });
        }
    }

    /// Screens that stand across the line, named at their head.
    pub(super) fn screens(&mut self) {
        let curve = self.curve;
        let area = self.axes.area;
        for screen in &curve.screens {
            let x = self.axes.at(screen.distance, 1.0).x;
            if !x.is_finite() || !(area.from.x..=area.to.x).contains(&x) {
                self.entries.push(Entry::off(
                    screen.label.clone(),
                    Stroke::hair(Role::Steel),
                    None,
                ));
                continue;
            }
            let bar = Rectangle::new(x - THICK / 2.0, area.from.y, THICK, area.height());
            self.picture.push(Mark::Area {
                outline: bar.corners(),
                fill: Some(Fill::Role(Role::Steel)),
                hatch: Some(PLATE),
                edge: Some(Stroke::hair(Role::Ink)),
            });
            self.field.take(bar);
            let size = DVec2::new(
                font::width(&screen.label, SMALL, Weight::SemiBold) + 2.0,
                LINE,
            );
            let wish = Wish {
                at: DVec2::new(x, area.from.y + LINE),
                gap: THICK,
                reach: 40.0,
                size,
            };
            match self.field.place(wish) {
                Some(place) => {
                    self.label(place.area, &screen.label, Role::Ink, Weight::SemiBold);
                }
                None => self.entries.push(Entry {
                    point: DVec2::new(x, area.from.y),
                    leader: Stroke::hair(Role::Muted),
                    shape: None,
                    name: screen.label.clone(),
                    note: String::new(),
                }),
            }
        }
    }

    pub(super) fn limits(&mut self) {
        let curve = self.curve;
        for limit in &curve.limits {
            let y = self.axes.at(1.0, limit.value).y;
            let to = DVec2::new(self.axes.area.to.x, y);
            // A limit that cannot be drawn is still named, or it would seem not to exist.
            if !y.is_finite() || !self.axes.holds(to) {
                let leader = Stroke::hair(Role::Action);
                self.entries
                    .push(Entry::off(limit.label.clone(), leader, None));
                continue;
            }
            let from = DVec2::new(self.axes.area.from.x, y);
            self.picture.push(Mark::line(from, to, stroke::limit()));
            self.field.avoid(&[from, to], 12.0);
            self.entries.push(Entry {
                point: to,
                leader: Stroke::hair(Role::Action),
                shape: None,
                name: limit.label.clone(),
                note: note(limit),
            });
        }
    }

    /// A gap around each position's shape keeps it legible on top of a line;
    /// all of them come first, so that none eats into another's shape.
    pub(super) fn gaps(&mut self) {
        let curve = self.curve;
        for marker in &curve.positions {
            let at = self.axes.at(marker.distance, marker.value);
            if at.is_finite() && self.axes.holds(at) {
                self.picture.push(Mark::Area {
                    outline: Shape::Within.outline(at, SYMBOL + 3.0),
                    fill: Some(Fill::Role(Role::Card)),
                    hatch: None,
                    edge: None,
                });
            }
        }
    }

    /// Where each limit is reached: the tip on the line, a drop line to the rail.
    pub(super) fn pins(&mut self) {
        let curve = self.curve;
        let mut pins: Vec<(DVec2, Shape, Option<&str>)> = Vec::new();
        for limit in &curve.limits {
            let governs = limit.upper_crossing.as_ref().or(limit.crossing.as_ref());
            if let (Some(crossing), Some(_)) = (&limit.crossing, &limit.upper_crossing) {
                pins.push((
                    self.axes.at(crossing.distance, limit.value),
                    Shape::NominalPin,
                    None,
                ));
            }
            if let Some(crossing) = governs {
                pins.push((
                    self.axes.at(crossing.distance, limit.value),
                    Shape::Pin,
                    Some(&crossing.text),
                ));
            }
        }
        pins.retain(|(at, _, _)| at.is_finite() && self.axes.holds(*at));
        for (at, shape, _) in &pins {
            let size = if *shape == Shape::Pin {
                SYMBOL
            } else {
                SYMBOL - 2.0
            };
            self.field.take(shape.extent(*at, size));
            if *shape == Shape::Pin {
                let foot = DVec2::new(at.x, self.axes.area.to.y);
                let drop = Stroke {
                    role: Role::Action,
                    width: Stroke::HAIR,
                    dash: Dash::Short,
                };
                self.picture.push(Mark::line(*at, foot, drop));
                self.field.avoid(&[*at, foot], 8.0);
            }
            self.picture.push(Mark::Shape {
                shape: *shape,
                at: *at,
                size,
            });
        }
        // Positions have the first choice of places later on; so pins take only
        // a near one, and their distances stand in the column in any case.
        for marker in &curve.positions {
            let at = self.axes.at(marker.distance, marker.value);
            if at.is_finite() && self.axes.holds(at) {
                self.field.take(marker.shape.extent(at, SYMBOL).grown(1.0));
            }
        }
        for (at, _, text) in pins {
            let Some(text) = text else { continue };
            let size = DVec2::new(font::width(text, SMALL, Weight::SemiBold) + 2.0, LINE);
            let middle = at - DVec2::new(0.0, SYMBOL / 2.0);
            let gap = SYMBOL / 2.0 + 2.0;
            if let Some(place) = self.field.place(Wish {
                at: middle,
                gap,
                reach: LINE,
                size,
            }) {
                self.label(place.area, text, Role::Action, Weight::SemiBold);
            }
        }
    }

    pub(super) fn positions(&mut self) {
        let curve = self.curve;
        for (index, marker) in curve.positions.iter().enumerate() {
            let at = self.axes.at(marker.distance, marker.value);
            if !at.is_finite()
                || !drawable(&(marker.distance, marker.value))
                || !self.axes.holds(at)
            {
                let leader = Stroke::hair(Role::Muted);
                self.entries
                    .push(Entry::off(marker.label.clone(), leader, Some(marker.shape)));
                continue;
            }
            self.picture.push(Mark::Shape {
                shape: marker.shape,
                at,
                size: SYMBOL,
            });
            let size = DVec2::new(
                font::width(&marker.label, SMALL, Weight::Regular) + 2.0,
                LINE,
            );
            let wish = Wish {
                at,
                gap: SYMBOL / 2.0 + 2.0,
                reach: 120.0,
                size,
            };
            let place = (index < LABELLED).then(|| self.field.place(wish)).flatten();
            match place {
                Some(place) => {
                    if let Some([from, to]) = place.leader {
                        self.picture
                            .push(Mark::line(from, to, Stroke::hair(Role::Ink)));
                    }
                    self.label(place.area, &marker.label, Role::Ink, Weight::Regular);
                }
                None => self.entries.push(Entry {
                    point: at,
                    leader: Stroke::hair(Role::Muted),
                    shape: Some(marker.shape),
                    name: marker.label.clone(),
                    note: String::new(),
                }),
            }
        }
    }

    fn label(&mut self, place: Rectangle, text: &str, role: Role, weight: Weight) {
        let at = DVec2::new(
            place.from.x + 1.0,
            place.from.y + (LINE + font::CAP_HEIGHT * SMALL) / 2.0,
        );
        self.text(
            Text {
                weight,
                ..Text::new(at, SMALL, text)
            }
            .role(role)
            .backed(Backing::Box(Role::Card)),
        );
    }
}
