//! What each kind of line is, above the plot, in as many rows as it takes.

use glam::DVec2;

use super::{LINE, Plot, SMALL, TITLE, stroke};
use crate::drawing::curve::Curve;
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::mark::{Mark, Rectangle, Stroke, Text};
use crate::drawing::role::Role;
use crate::drawing::screen::{HIDDEN, Shadow};

/// How long the sample of a line is, how far its name stands from its
/// beginning, and what stays free behind it.
const SAMPLE: f64 = 18.0;
const NAME: f64 = 22.0;
const FREE: f64 = 14.0;

/// More rows than this are not drawn; the samples run in order of need.
const MOST: usize = 3;

/// What a sample shows.
enum Sample {
    Line(Stroke),
    Hidden,
}

/// One sample in its place.
struct Placed {
    row: usize,
    x: f64,
    name: String,
    sample: Sample,
}

/// Returns how many rows the legend takes in a picture of a width.
pub(in crate::drawing::curve) fn rows(curve: &Curve, width: f64) -> usize {
    placed(curve, width).last().map_or(1, |last| last.row + 1)
}

fn placed(curve: &Curve, width: f64) -> Vec<Placed> {
    let mut samples = vec![("nominal".to_owned(), Sample::Line(stroke::nominal()))];
    if curve.upper.is_some() {
        samples.push(("97.5 % bound".to_owned(), Sample::Line(stroke::bound())));
    }
    if !curve.limits.is_empty() {
        samples.push(("limit".to_owned(), Sample::Line(stroke::limit())));
    }
    if !curve.shadows.is_empty() {
        samples.push((Shadow::words(&curve.shadows), Sample::Hidden));
    }
    if let Some(square) = &curve.inverse_square {
        let error = square.error(&curve.rows);
        let name = if error.is_empty() {
            square.name()
        } else {
            format!("{}: {error}", square.name())
        };
        samples.push((name, Sample::Line(stroke::comparison())));
    }
    let mut found: Vec<Placed> = Vec::new();
    let (mut row, mut x) = (0, 0.0);
    for (name, sample) in samples {
        let wide = font::width(&name, SMALL, Weight::Regular);
        if x > 0.0 && x + NAME + wide > width {
            (row, x) = (row + 1, 0.0);
        }
        if row == MOST {
            break;
        }
        let name = fit(&name, width - x - NAME, SMALL, Weight::Regular);
        found.push(Placed {
            row,
            x,
            name,
            sample,
        });
        x += NAME + wide + FREE;
    }
    found
}

impl Plot<'_> {
    pub(super) fn legend(&mut self) {
        for Placed {
            row,
            x,
            name,
            sample,
        } in placed(self.curve, self.picture.width)
        {
            let baseline = TITLE + 8.0 + LINE * (row + 1) as f64;
            let middle = baseline - font::X_HEIGHT * SMALL / 2.0;
            self.picture.push(match sample {
                Sample::Line(stroke) => Mark::line(
                    DVec2::new(x, middle),
                    DVec2::new(x + SAMPLE, middle),
                    stroke,
                ),
                Sample::Hidden => Mark::Area {
                    outline: Rectangle::new(x, middle - 3.5, SAMPLE, 7.0).corners(),
                    fill: None,
                    hatch: Some(HIDDEN),
                    edge: Some(Stroke::hair(Role::Muted)),
                },
            });
            self.text(Text::new(DVec2::new(x + NAME, baseline), SMALL, name).role(Role::Muted));
        }
    }
}
