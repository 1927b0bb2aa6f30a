//! A rail that is laid out, as marks.

use glam::DVec2;

use super::flag::Of;
use super::{BAR, BESIDE, HEADING, LINE, Plan, SIDE, SMALL, SYMBOL, TITLE, title_width};
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::hatch::Hatch;
use crate::drawing::mark::{Anchor, Fill, Mark, Rectangle, Shape, Stroke, Text};
use crate::drawing::measure::Measure;
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;
use crate::drawing::screen::{HIDDEN, PLATE, THICK};

impl Plan<'_> {
    pub(in crate::drawing::rail) fn picture(&self, height: f64) -> Picture {
        let height = self.drawn(height);
        let mut picture = Picture::new(self.width, height);
        self.title(&mut picture);
        // What is left over stands between the title and the flags.
        let top = height - self.under() - BAR;
        self.ruler(&mut picture, top);
        self.poles(&mut picture, top);
        self.words(&mut picture, top);
        self.legend(&mut picture, top + BAR);
        picture
    }

    fn title(&self, picture: &mut Picture) {
        let title = Text::new(DVec2::new(0.0, TITLE), TITLE, HEADING).bold();
        let left = title_width();
        let about = fit(&self.about, self.width - left, SMALL, Weight::Regular);
        picture.push(Mark::Text(title));
        picture.push(Mark::Text(
            Text::new(DVec2::new(left, TITLE), SMALL, about).role(Role::Muted),
        ));
    }

    fn ruler(&self, picture: &mut Picture, top: f64) {
        for stretch in &self.rail.stretches {
            let (from, to) = (self.x(stretch.from), self.x(stretch.to));
            if to > from {
                picture.push(Mark::Area {
                    outline: Rectangle::new(from, top, to - from, BAR).corners(),
                    fill: Some(Fill::Ramp(self.strength(stretch.step))),
                    hatch: None,
                    edge: None,
                });
            }
        }
        // A hair with pale edges tells neighbours apart on any print.
        for pair in self.rail.stretches.windows(2) {
            let x = self.x(pair[0].to);
            // A sliver is told by its shade alone.
            let narrow = pair
                .iter()
                .any(|stretch| self.x(stretch.to) - self.x(stretch.from) < 2.5);
            if pair[0].to < self.end && !narrow {
                let ends = [DVec2::new(x, top), DVec2::new(x, top + BAR)];
                for stroke in [
                    Stroke::solid(Role::Card, 1.3),
                    Stroke::solid(Role::Ink, 0.4),
                ] {
                    picture.push(Mark::line(ends[0], ends[1], stroke));
                }
            }
        }
        self.shadows(picture, top);
        let frame = Rectangle::new(SIDE, top, self.width - 2.0 * SIDE, BAR);
        picture.push(Mark::frame(frame, Stroke::solid(Role::Ink, 0.75)));

        let unit = self.rail.measure.length().factor();
        let end = self.end / unit;
        let (step, parts) = tick(end, (self.width - 2.0 * SIDE) / 46.0);
        let count = (end / step * f64::from(parts) * (1.0 + 1e-9)).floor() as u32;
        let mut free = f64::NEG_INFINITY;
        for index in 0..=count {
            let value = step * f64::from(index) / f64::from(parts);
            let x = self.x(value * unit);
            let whole = index % parts == 0;
            let foot = top + BAR;
            let down = DVec2::new(0.0, if whole { 4.0 } else { 2.0 });
            let at = DVec2::new(x, foot);
            picture.push(Mark::line(at, at + down, Stroke::hair(Role::Ink)));
            if !whole {
                continue;
            }
            let text = number(value, self.rail.measure);
            let text = Text::new(DVec2::new(x, foot + 4.0 + LINE - 1.0), SMALL, text)
                .anchored(Anchor::Middle);
            let extent = text.extent();
            if extent.from.x > free && extent.from.x >= 0.0 && extent.to.x <= self.width {
                free = extent.to.x + 4.0;
                picture.push(Mark::Text(text));
            }
        }
    }

    /// The ground from which a source is hidden, hatched over its shade.
    fn shadows(&self, picture: &mut Picture, top: f64) {
        for shadow in &self.rail.shadows {
            let Some((from, to)) = shadow.between(0.0, self.end) else {
                continue;
            };
            let (from, to) = (self.x(from), self.x(to));
            let area = Rectangle::new(from, top, to - from, BAR);
            // Pale lines beside dark ones are seen on any shade.
            for (role, width) in [(Role::Card, 1.4), (Role::Ink, HIDDEN.width)] {
                picture.push(Mark::Area {
                    outline: area.corners(),
                    fill: None,
                    hatch: Some(Hatch {
                        width,
                        role,
                        ..HIDDEN
                    }),
                    edge: None,
                });
            }
        }
    }

    fn poles(&self, picture: &mut Picture, top: f64) {
        for flag in &self.flags {
            let role = match flag.of {
                Of::Pin(_) => Role::Action,
                Of::Stand(stand) => stand.shape.role(),
                Of::Screen(_) => Role::Steel,
            };
            let head = DVec2::new(flag.x, Self::lane(top, flag.lane) + LINE * 0.5);
            let foot = DVec2::new(flag.x, top + BAR);
            // A pale edge keeps the pole apart from the shading under it.
            let inside = DVec2::new(flag.x, top + 0.4);
            let edge = Stroke::solid(Role::Card, 2.6);
            picture.push(Mark::line(inside, foot - DVec2::new(0.0, 0.4), edge));
            picture.push(Mark::line(head, foot, Stroke::solid(role, 1.0)));
        }
        for pin in &self.rail.pins {
            if let Some((distance, _)) = pin.nominal
                && distance.is_finite()
                && (0.0..=self.end).contains(&distance)
                && distance != pin.distance
            {
                picture.push(Mark::Shape {
                    shape: Shape::NominalPin,
                    at: DVec2::new(self.x(distance), top),
                    size: SYMBOL - 1.0,
                });
            }
        }
        for flag in &self.flags {
            let (shape, at) = match flag.of {
                Of::Screen(_) => {
                    picture.push(plate(flag.x, top));
                    continue;
                }
                Of::Pin(_) if self.rail.settled => (Shape::Pin, DVec2::new(flag.x, top)),
                Of::Pin(_) => (Shape::NominalPin, DVec2::new(flag.x, top)),
                Of::Stand(stand) => {
                    let middle = Self::lane(top, flag.lane) + LINE * 0.5;
                    (stand.shape, DVec2::new(flag.x, middle))
                }
            };
            picture.push(Mark::Shape {
                shape,
                at,
                size: SYMBOL,
            });
        }
    }

    fn words(&self, picture: &mut Picture, top: f64) {
        for flag in &self.flags {
            let baseline = Self::lane(top, flag.lane) + (LINE + font::CAP_HEIGHT * SMALL) / 2.0;
            let at = DVec2::new(flag.x + BESIDE, baseline);
            let role = match flag.of {
                _ if !self.rail.settled => Role::Muted,
                Of::Pin(_) => Role::Action,
                Of::Stand(_) | Of::Screen(_) => Role::Ink,
            };
            let [first, second] = &flag.lines;
            picture.push(Mark::Text(
                Text::new(at, SMALL, first.as_str()).bold().role(role),
            ));
            if second.is_empty() {
                continue;
            }
            let role = match flag.of {
                Of::Stand(stand) if stand.shape != Shape::NotAssessed => stand.shape.role(),
                _ => Role::Muted,
            };
            let at = at + DVec2::new(0.0, LINE);
            picture.push(Mark::Text(Text::new(at, SMALL, second.as_str()).role(role)));
        }
    }

    fn legend(&self, picture: &mut Picture, foot: f64) {
        let mut row = foot + 4.0 + LINE + 8.0;
        let title = fit(&self.rail.quantity, self.width, SMALL, Weight::Regular);
        let at = DVec2::new(0.0, row + 7.0);
        picture.push(Mark::Text(Text::new(at, SMALL, title).role(Role::Muted)));
        let wide = self.swatch();
        let left = if self.beside() {
            self.width - SIDE - self.legend_width()
        } else {
            row += LINE + 2.0;
            SIDE
        };
        let (first, last) = self.steps();
        for step in first..=last {
            let x = left + wide * (step - first) as f64;
            picture.push(Mark::Area {
                outline: Rectangle::new(x, row, wide, 7.0).corners(),
                fill: Some(Fill::Ramp(self.strength(step))),
                hatch: None,
                edge: Some(Stroke::hair(Role::Ink)),
            });
        }
        let baseline = row + 7.0 + LINE - 1.5;
        let mut free = if self.beside() { left - 8.0 } else { 0.0 };
        for (step, text) in (1_u32..).zip(self.level_texts()) {
            let at = DVec2::new(left + wide * f64::from(step), baseline);
            let text = Text::new(at, SMALL, text.as_str()).anchored(Anchor::Middle);
            let extent = text.extent();
            if extent.from.x >= free && extent.to.x <= self.width {
                free = extent.to.x + 3.0;
                picture.push(Mark::Text(text));
            }
        }
        for note in &self.notes {
            row += LINE;
            let at = DVec2::new(0.0, row + 7.0 + LINE - 1.5);
            picture.push(Mark::Text(
                Text::new(at, SMALL, note.as_str()).role(Role::Muted),
            ));
        }
    }
}

/// A screen across the ruler: a thin hatched bar that stands out above it.
fn plate(x: f64, top: f64) -> Mark {
    let out = SYMBOL / 2.0;
    Mark::Area {
        outline: Rectangle::new(x - THICK / 2.0, top - out, THICK, BAR + out).corners(),
        fill: Some(Fill::Role(Role::Steel)),
        hatch: Some(PLATE),
        edge: Some(Stroke::hair(Role::Ink)),
    }
}

/// Writes a number of the ruler, with its unit.
fn number(value: f64, measure: Measure) -> String {
    // Steps are 1, 2, 5 times powers of ten: three places hold any of them.
    let text = format!("{value:.3}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    format!("{text} {}", measure.length().symbol())
}

/// Returns the step between numbers on a ruler, 1, 2 or 5 times a power of
/// ten so that there are at most `most`, and into how many parts it is divided.
fn tick(end: f64, most: f64) -> (f64, u32) {
    let least = end / most.max(1.0);
    let mut decade = 10_f64.powi(least.log10().floor() as i32);
    for _ in 0..3 {
        for (digit, parts) in [(1.0, 5), (2.0, 4), (5.0, 5)] {
            if digit * decade >= least * (1.0 - 1e-9) {
                return (digit * decade, parts);
            }
        }
        decade *= 10.0;
    }
    (end, 1)
}
