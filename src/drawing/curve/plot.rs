//! The plot itself: its lines inside the frame. What stands around them, what
//! is marked on them and the column beside them have files of their own.

pub(super) mod column;
mod flag;
mod frame;
pub(super) mod legend;
pub(super) mod stroke;

use glam::DVec2;

use super::axes::Axes;
use super::{Curve, drawable};
use crate::drawing::label::Field;
use crate::drawing::mark::{Mark, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;

use column::Entry;

pub(super) const SMALL: f64 = 7.5;
pub(super) const BODY: f64 = 8.0;
pub(super) const TITLE: f64 = 10.0;
pub(super) const LINE: f64 = 10.0;
const SYMBOL: f64 = 7.0;

pub(super) struct Plot<'a> {
    curve: &'a Curve,
    picture: Picture,
    axes: Axes,
    field: Field,
    entries: Vec<Entry>,
}

impl<'a> Plot<'a> {
    pub(super) fn new(curve: &'a Curve, picture: Picture, axes: Axes) -> Self {
        Self {
            curve,
            picture,
            field: Field::new(axes.area.grown(-1.0)),
            axes,
            entries: Vec::new(),
        }
    }

    pub(super) fn finish(mut self) -> Picture {
        self.legend();
        self.shadows();
        self.grid();
        self.limits();
        self.lines();
        self.picture
            .push(Mark::frame(self.axes.area, Stroke::solid(Role::Ink, 0.75)));
        self.screens();
        self.gaps();
        self.pins();
        self.positions();
        self.column();
        self.picture
    }

    fn text(&mut self, text: Text) {
        self.picture.push(Mark::Text(text));
    }

    /// The curves themselves, broken where there is nothing to draw.
    fn lines(&mut self) {
        let curve = self.curve;
        let mut marks = Vec::new();
        if let Some(square) = curve
            .inverse_square
            .as_ref()
            .filter(|square| drawable(&(square.distance, square.value)))
        {
            let (from, to) = self.axes.ends();
            marks.push(Mark::Line {
                points: [from, to]
                    .map(|distance| self.axes.at(distance, square.at(distance)))
                    .to_vec(),
                stroke: stroke::comparison(),
            });
        }
        let upper = curve.upper.as_deref().unwrap_or_default();
        for (rows, stroke) in [
            (upper, stroke::bound()),
            (curve.rows.as_slice(), stroke::nominal()),
        ] {
            for run in rows.split(|row| !drawable(row)) {
                let mut points: Vec<DVec2> =
                    run.iter().map(|row| self.axes.at(row.0, row.1)).collect();
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
            window: self.axes.area,
            marks,
        });
    }
}
