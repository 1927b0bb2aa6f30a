//! The plot itself: axes, lines, pins, and names that never cover each other.

use glam::DVec2;

use crate::drawing::curve::scale::Scale;
use crate::drawing::curve::{Axes, Curve, LimitLine, drawable};
use crate::drawing::font::{self, Weight};
use crate::drawing::label::{self, Field, Wish};
use crate::drawing::mark::{Anchor, Backing, Dash, Fill, Mark, Rectangle, Shape, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;

const SMALL: f64 = 7.5;
pub(super) const BODY: f64 = 8.0;
pub(super) const TITLE: f64 = 10.0;
const LINE: f64 = 10.0;
const SYMBOL: f64 = 7.0;

/// Shortens a text to a width with an ellipsis.
pub(in crate::drawing) fn fit(text: &str, width: f64, size: f64, weight: Weight) -> String {
    if font::width(text, size, weight) <= width {
        return text.to_owned();
    }
    let room = width - font::width("…", size, weight);
    let mut used = 0.0;
    let mut cut: String = text
        .chars()
        .take_while(|c| {
            used += font::advance(*c, weight) * size;
            used <= room
        })
        .collect();
    cut.truncate(cut.trim_end().len());
    cut + "…"
}

/// One entry of the column beside the plot.
struct Entry {
    point: DVec2,
    leader: Stroke,
    shape: Option<Shape>,
    name: String,
    note: String,
}

pub(super) struct Plot<'a> {
    curve: &'a Curve,
    picture: Picture,
    area: Rectangle,
    x: Scale,
    y: Scale,
    field: Field,
    entries: Vec<Entry>,
}

impl<'a> Plot<'a> {
    pub(super) fn new(curve: &'a Curve, picture: Picture, xs: (f64, f64), ys: (f64, f64)) -> Self {
        let (width, height) = (picture.width, picture.height);
        let unit = unit_of(curve);
        let y = Scale::new(ys.0 / unit, ys.1 / unit);
        let x = Scale::new(xs.0, xs.1);
        let tick_width = |scale: &Scale| {
            scale
                .ticks(1e9)
                .iter()
                .map(|t| font::width(&(curve.number)(*t), SMALL, Weight::Regular))
                .fold(0.0, f64::max)
        };
        let left = (tick_width(&y) + 6.0).min(width * 0.25);
        let gutter = curve
            .limits
            .iter()
            .map(|limit| {
                let name = font::width(&limit.label, SMALL, Weight::SemiBold);
                name.max(font::width(&note(limit), SMALL, Weight::Regular))
            })
            .fold(
                if curve.positions.is_empty() {
                    0.0
                } else {
                    72.0
                },
                f64::max,
            );
        let gutter = if gutter > 0.0 {
            (gutter + 22.0).min(width * 0.36)
        } else {
            8.0
        };
        let top = TITLE + 8.0 + LINE * 2.0 + 12.0;
        let area = Rectangle {
            from: DVec2::new(left, top),
            to: DVec2::new(width - gutter, height - 2.0 * LINE - 6.0),
        };
        Self {
            curve,
            picture,
            area,
            x,
            y,
            field: Field::new(area.grown(-1.0)),
            entries: Vec::new(),
        }
    }

    pub(super) fn axes(self) -> Axes {
        let unit = self.unit();
        Axes {
            area: self.area,
            x: self.x,
            y: self.y,
            unit,
        }
    }

    fn unit(&self) -> f64 {
        unit_of(self.curve)
    }

    pub(super) fn finish(mut self) -> Picture {
        self.legend();
        self.grid();
        self.limits();
        self.lines();
        self.picture
            .push(Mark::frame(self.area, Stroke::solid(Role::Ink, 0.75)));
        self.gaps();
        self.pins();
        self.positions();
        self.column();
        self.picture
    }

    fn at(&self, distance: f64, value: f64) -> DVec2 {
        let unit = self.unit();
        DVec2::new(
            self.area.from.x + self.x.fraction(distance) * self.area.width(),
            self.area.to.y - self.y.fraction(value / unit) * self.area.height(),
        )
    }

    fn inside(&self, p: DVec2) -> bool {
        self.area.grown(0.01).holds(&Rectangle { from: p, to: p })
    }

    fn text(&mut self, text: Text) {
        self.picture.push(Mark::Text(text));
    }

    /// What each kind of line is, above the plot.
    fn legend(&mut self) {
        let mut samples = vec![("nominal", Self::nominal())];
        if self.curve.upper.is_some() {
            samples.push(("97.5 % bound", Self::bound()));
        }
        if self.curve.inverse_square.is_some() {
            samples.push(("inverse square, for comparison", Self::comparison()));
        }
        if !self.curve.limits.is_empty() {
            samples.push(("limit", Self::limit()));
        }
        let mut pen = 0.0;
        let baseline = TITLE + 8.0 + LINE;
        for (name, stroke) in samples {
            let wide = font::width(name, SMALL, Weight::Regular);
            if pen > 0.0 && pen + 22.0 + wide > self.picture.width {
                break;
            }
            let middle = baseline - font::X_HEIGHT * SMALL / 2.0;
            self.picture.push(Mark::line(
                DVec2::new(pen, middle),
                DVec2::new(pen + 18.0, middle),
                stroke,
            ));
            self.text(Text::new(DVec2::new(pen + 22.0, baseline), SMALL, name).role(Role::Muted));
            pen += 22.0 + wide + 14.0;
        }
        let label = fit(
            &self.curve.y_label,
            self.picture.width,
            SMALL,
            Weight::Regular,
        );
        let at = DVec2::new(0.0, self.area.from.y - 6.0);
        self.text(Text::new(at, SMALL, label));
    }

    pub(super) const fn nominal() -> Stroke {
        Stroke {
            role: Role::Ink,
            width: 1.5,
            dash: Dash::Solid,
        }
    }

    pub(super) const fn bound() -> Stroke {
        Stroke {
            role: Role::Ink,
            width: 1.0,
            dash: Dash::Short,
        }
    }

    pub(super) const fn comparison() -> Stroke {
        Stroke {
            role: Role::Muted,
            width: 0.9,
            dash: Dash::Dots,
        }
    }

    pub(super) const fn limit() -> Stroke {
        Stroke {
            role: Role::Action,
            width: 0.9,
            dash: Dash::DashDot,
        }
    }

    fn grid(&mut self) {
        let hair = Stroke {
            role: Role::Line,
            width: Stroke::HAIR,
            dash: Dash::Solid,
        };
        let number = self.curve.number;
        let baseline = self.area.to.y + 3.0 + LINE - 2.0;
        let mut free = f64::NEG_INFINITY;
        let ticks = self.x.ticks(self.area.width() / 22.0);
        for tick in &ticks {
            let x = self.area.from.x + self.x.fraction(*tick) * self.area.width();
            self.picture.push(Mark::line(
                DVec2::new(x, self.area.from.y),
                DVec2::new(x, self.area.to.y),
                hair,
            ));
            let text =
                Text::new(DVec2::new(x, baseline), SMALL, number(*tick)).anchored(Anchor::Middle);
            let extent = text.extent();
            if extent.from.x > free.max(0.0) && extent.to.x <= self.picture.width {
                free = extent.to.x + 4.0;
                self.text(text);
            }
        }
        for tick in self.y.ticks(self.area.height() / 11.0) {
            let y = self.area.to.y - self.y.fraction(tick) * self.area.height();
            self.picture.push(Mark::line(
                DVec2::new(self.area.from.x, y),
                DVec2::new(self.area.to.x, y),
                hair,
            ));
            let at = DVec2::new(self.area.from.x - 4.0, y + font::CAP_HEIGHT * SMALL / 2.0);
            let text = fit(&number(tick), at.x, SMALL, Weight::Regular);
            self.text(Text::new(at, SMALL, text).anchored(Anchor::End));
        }
        for value in self.x.between(self.area.width()) {
            let foot = DVec2::new(
                self.area.from.x + self.x.fraction(value) * self.area.width(),
                self.area.to.y,
            );
            self.picture.push(Mark::line(
                foot,
                foot - DVec2::new(0.0, 3.0),
                Stroke::hair(Role::Ink),
            ));
        }
        for value in self.y.between(self.area.height()) {
            let foot = DVec2::new(
                self.area.from.x,
                self.area.to.y - self.y.fraction(value) * self.area.height(),
            );
            self.picture.push(Mark::line(
                foot,
                foot + DVec2::new(3.0, 0.0),
                Stroke::hair(Role::Ink),
            ));
        }
        let room = self.picture.width;
        let label = fit(&self.curve.x_label, room, SMALL, Weight::Regular);
        let at = DVec2::new((self.area.from.x + self.area.to.x) / 2.0, baseline + LINE);
        let text = Text::new(at, SMALL, label).anchored(Anchor::Middle);
        let over = (text.extent().to.x - room).max(0.0) - (-text.extent().from.x).max(0.0);
        let at = text.at - DVec2::new(over, 0.0);
        self.text(Text { at, ..text });
    }

    fn limits(&mut self) {
        let curve = self.curve;
        for limit in &curve.limits {
            let y = self.at(1.0, limit.value).y;
            let to = DVec2::new(self.area.to.x, y);
            // A limit that cannot be drawn is still named, or it would seem not to exist.
            if !y.is_finite() || !self.inside(to) {
                self.entries.push(Entry {
                    point: DVec2::NAN,
                    leader: Stroke::hair(Role::Action),
                    shape: None,
                    name: limit.label.clone(),
                    note: "off this plot".to_owned(),
                });
                continue;
            }
            let from = DVec2::new(self.area.from.x, y);
            self.picture.push(Mark::line(from, to, Self::limit()));
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

    /// The curves themselves, broken where there is nothing to draw.
    fn lines(&mut self) {
        let curve = self.curve;
        let mut marks = Vec::new();
        if let Some(point) = curve.inverse_square.filter(drawable) {
            let (from, to) = self.x.ends();
            let value = |distance: f64| point.1 * (point.0 / distance).powi(2);
            let line = vec![self.at(from, value(from)), self.at(to, value(to))];
            marks.push(Mark::Line {
                points: line,
                stroke: Self::comparison(),
            });
        }
        let upper = curve.upper.as_deref().unwrap_or_default();
        for (rows, stroke) in [
            (upper, Self::bound()),
            (curve.rows.as_slice(), Self::nominal()),
        ] {
            for run in rows.split(|row| !drawable(row)) {
                let mut points: Vec<DVec2> = run.iter().map(|row| self.at(row.0, row.1)).collect();
                match points.as_slice() {
                    [] => continue,
                    // A lone value between gaps still shows, as a short dash.
                    [only] => {
                        points = vec![*only - DVec2::new(1.5, 0.0), *only + DVec2::new(1.5, 0.0)];
                    }
                    _ => {}
                }
                self.field.avoid(&points, 40.0);
                marks.push(Mark::Line { points, stroke });
            }
        }
        self.picture.push(Mark::Clip {
            window: self.area,
            marks,
        });
    }

    /// A gap around each position's shape keeps it legible on top of a line;
    /// all of them come first, so that none eats into another's shape.
    fn gaps(&mut self) {
        let curve = self.curve;
        for marker in &curve.positions {
            let at = self.at(marker.distance, marker.value);
            if at.is_finite() && self.inside(at) {
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
    fn pins(&mut self) {
        let curve = self.curve;
        let mut pins: Vec<(DVec2, Shape, Option<&str>)> = Vec::new();
        for limit in &curve.limits {
            let governs = limit.upper_crossing.as_ref().or(limit.crossing.as_ref());
            if let (Some(crossing), Some(_)) = (&limit.crossing, &limit.upper_crossing) {
                pins.push((
                    self.at(crossing.distance, limit.value),
                    Shape::NominalPin,
                    None,
                ));
            }
            if let Some(crossing) = governs {
                pins.push((
                    self.at(crossing.distance, limit.value),
                    Shape::Pin,
                    Some(&crossing.text),
                ));
            }
        }
        pins.retain(|(at, _, _)| at.is_finite() && self.inside(*at));
        for (at, shape, _) in &pins {
            let size = if *shape == Shape::Pin {
                SYMBOL
            } else {
                SYMBOL - 2.0
            };
            self.field.take(shape.extent(*at, size));
            if *shape == Shape::Pin {
                let foot = DVec2::new(at.x, self.area.to.y);
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
            let at = self.at(marker.distance, marker.value);
            if at.is_finite() && self.inside(at) {
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

    fn positions(&mut self) {
        let curve = self.curve;
        for marker in &curve.positions {
            let at = self.at(marker.distance, marker.value);
            if !at.is_finite() || !drawable(&(marker.distance, marker.value)) || !self.inside(at) {
                self.entries.push(Entry {
                    point: DVec2::NAN,
                    leader: Stroke::hair(Role::Muted),
                    shape: Some(marker.shape),
                    name: marker.label.clone(),
                    note: "off this plot".to_owned(),
                });
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
            match self.field.place(Wish {
                at,
                gap: SYMBOL / 2.0 + 2.0,
                reach: 120.0,
                size,
            }) {
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

    /// The column beside the plot: limits by height, then what found no room.
    fn column(&mut self) {
        let mut entries = std::mem::take(&mut self.entries);
        entries.sort_by(|a, b| {
            let key = |entry: &Entry| {
                if entry.point.is_finite() {
                    entry.point.y
                } else {
                    f64::INFINITY
                }
            };
            key(a).total_cmp(&key(b))
        });
        let (top, bottom) = (self.area.from.y - LINE, self.picture.height - LINE);
        let lines = |entry: &Entry| if entry.note.is_empty() { 1.0 } else { 2.0 };
        let total: f64 = entries.iter().map(|entry| lines(entry) * LINE + 3.0).sum();
        if total > bottom - top {
            for entry in &mut entries {
                if !entry.note.is_empty() {
                    let note = std::mem::take(&mut entry.note);
                    entry.name = format!("{} · {note}", entry.name);
                }
            }
        }
        let room = ((bottom - top) / (LINE + 1.0)).floor().max(1.0) as usize;
        let left_out = if entries.len() > room {
            entries.len() - (room - 1)
        } else {
            0
        };
        entries.truncate(entries.len() - left_out);
        if left_out > 0 {
            entries.push(Entry {
                point: DVec2::NAN,
                leader: Stroke::hair(Role::Muted),
                shape: None,
                name: format!("and {left_out} more"),
                note: String::new(),
            });
        }
        let gap = if total > bottom - top { 1.0 } else { 3.0 };
        let wishes: Vec<(f64, f64)> = entries
            .iter()
            .map(|entry| {
                let middle = if entry.point.is_finite() {
                    entry.point.y
                } else {
                    bottom
                };
                (middle, lines(entry) * LINE + gap)
            })
            .collect();
        let tops = label::column(&wishes, top, bottom);
        let left = self.area.to.x + 16.0;
        for ((entry, place), (_, high)) in entries.iter().zip(tops).zip(wishes) {
            let middle = place + high / 2.0;
            if entry.point.is_finite() {
                let points = vec![
                    entry.point,
                    entry
                        .point
                        .max(DVec2::new(self.area.to.x + 3.0, f64::NEG_INFINITY)),
                    DVec2::new(left - 4.0, middle),
                    DVec2::new(left - 2.0, middle),
                ];
                self.picture.push(Mark::Line {
                    points,
                    stroke: entry.leader,
                });
            }
            let mut pen = left;
            if let Some(shape) = entry.shape {
                self.picture.push(Mark::Shape {
                    shape,
                    at: DVec2::new(left + SYMBOL / 2.0, place + LINE / 2.0 + 1.0),
                    size: SYMBOL,
                });
                pen += SYMBOL + 3.0;
            }
            let room = self.picture.width - pen;
            let weight = if entry.shape.is_none() {
                Weight::SemiBold
            } else {
                Weight::Regular
            };
            let baseline = place + gap / 2.0 + (LINE + font::CAP_HEIGHT * SMALL) / 2.0;
            let name = fit(&entry.name, room, SMALL, weight);
            self.text(Text {
                weight,
                ..Text::new(DVec2::new(pen, baseline), SMALL, name)
            });
            if !entry.note.is_empty() {
                let note = fit(&entry.note, room, SMALL, Weight::Regular);
                self.text(
                    Text::new(DVec2::new(pen, baseline + LINE), SMALL, note).role(Role::Muted),
                );
            }
        }
    }
}

fn unit_of(curve: &Curve) -> f64 {
    if curve.y_unit.is_finite() && curve.y_unit > 0.0 {
        curve.y_unit
    } else {
        1.0
    }
}

/// What stands under a limit's name: where it is met from.
fn note(limit: &LimitLine) -> String {
    match (&limit.upper_crossing, &limit.crossing) {
        (Some(upper), Some(nominal)) => {
            format!("met from {} (nominal {})", upper.text, nominal.text)
        }
        (Some(only), None) | (None, Some(only)) => format!("met from {}", only.text),
        (None, None) => "not crossed on this line".to_owned(),
    }
}
