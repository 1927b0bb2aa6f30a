//! Plain pictures of the drawing module on the window's canvas.
//!
//! The canvas draws the text of a frame above all of its shapes, and clips
//! neither: lines and areas are therefore cut to their window here.

mod clip;

use std::cell::RefCell;
use std::fmt;
use std::sync::LazyLock;

use glam::DVec2;
use iced::widget::canvas::{self, Canvas, Frame, LineDash, Path, Text as Words};
use iced::widget::text::{LineHeight, Shaping};
use iced::{Element, Length, Point, Radians, Rectangle, Renderer, Size, Theme, Vector, mouse};

use super::shared::Look;
use super::theme::{BOLD, REGULAR, rgb};
use crate::drawing::font::{self, Weight};
use crate::drawing::hatch::{self, Hatch};
use crate::drawing::mark::{Backing, Fill, Mark, Shape, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::ramp;
use crate::drawing::role;

/// How much larger a picture made for paper is drawn in the window: its
/// smallest text, 7.5 points there, is 13 pixels here.
pub const SCALE: f64 = 13.0 / 7.5;

/// What makes a picture for the size that it is given, in the picture's own
/// points.
type Make<'a> = dyn Fn(f64, f64) -> Picture + 'a;

/// A picture on the canvas, made for the room that there is.
struct Sheet<'a> {
    make: Box<Make<'a>>,
    scale: f64,
    theme: role::Theme,
}

impl fmt::Debug for Sheet<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Sheet")
            .field("scale", &self.scale)
            .field("theme", &self.theme)
            .finish_non_exhaustive()
    }
}

/// What is kept between two frames, so that a picture that stays as it was is
/// not drawn again.
#[derive(Debug, Default)]
pub struct Held {
    last: RefCell<Option<(Picture, role::Theme)>>,
    cache: canvas::Cache,
}

impl Held {
    /// Draws a picture, or takes what was drawn if it is still the same.
    pub fn draw(
        &self,
        renderer: &Renderer,
        size: Size,
        picture: Picture,
        theme: role::Theme,
    ) -> canvas::Geometry {
        let mut last = self.last.borrow_mut();
        let same = last
            .as_ref()
            .is_some_and(|(known, in_theme)| *known == picture && *in_theme == theme);
        if !same {
            self.cache.clear();
            *last = Some((picture, theme));
        }
        let last = &*last;
        self.cache.draw(renderer, size, |frame| {
            if let Some((picture, theme)) = last {
                paint(frame, picture, *theme);
            }
        })
    }
}

impl<Message> canvas::Program<Message> for Sheet<'_> {
    type State = Held;

    fn draw(
        &self,
        held: &Held,
        renderer: &Renderer,
        _theme: &Theme,
        bounds: Rectangle,
        _cursor: mouse::Cursor,
    ) -> Vec<canvas::Geometry> {
        let (width, height) = (f64::from(bounds.width), f64::from(bounds.height));
        let picture = (self.make)(width / self.scale, height / self.scale).scaled(self.scale);
        vec![held.draw(renderer, bounds.size(), picture, self.theme)]
    }
}

/// Returns a picture that fills the room that there is. `make` is given width
/// and height in points of the picture, [`SCALE`] times smaller than pixels.
pub fn show<'a, Message: 'a>(
    make: impl Fn(f64, f64) -> Picture + 'a,
    look: Look,
) -> Element<'a, Message> {
    Canvas::new(Sheet {
        make: Box::new(make),
        scale: SCALE,
        theme: look.theme,
    })
    .width(Length::Fill)
    .height(Length::Fill)
    .into()
}

/// Returns the shape of a finding or a caution, `size` pixels high.
pub fn shape<'a, Message: 'a>(shape: Shape, size: f32, look: Look) -> Element<'a, Message> {
    Canvas::new(Sheet {
        make: Box::new(move |width, height| {
            let mut picture = Picture::new(width, height);
            let middle = DVec2::new(width, height) / 2.0;
            let side = width.min(height) - 1.0;
            let at = match shape {
                Shape::Pin | Shape::NominalPin => middle + DVec2::new(0.0, side / 2.0),
                Shape::Over | Shape::Within | Shape::NotAssessed | Shape::Caution => middle,
            };
            picture.push(Mark::Shape {
                shape,
                at,
                size: side,
            });
            picture
        }),
        scale: 1.0,
        theme: look.theme,
    })
    .width(size)
    .height(size)
    .into()
}

/// Paints a picture onto a frame, one point a pixel.
pub fn paint(frame: &mut Frame, picture: &Picture, theme: role::Theme) {
    marks(frame, &picture.marks, theme, None);
}

fn marks(
    frame: &mut Frame,
    marks: &[Mark],
    theme: role::Theme,
    window: Option<&crate::drawing::mark::Rectangle>,
) {
    for mark in marks {
        match mark {
            Mark::Line { points, stroke } => {
                line(frame, points, false, *stroke, theme, window);
            }
            Mark::Area {
                outline,
                fill,
                hatch,
                edge,
            } => {
                let cut = window.map(|window| clip::area(outline, window));
                let inside = cut.as_deref().unwrap_or(outline);
                if let Some(fill) = fill {
                    paint_fill(frame, inside, *fill, theme);
                }
                if let Some(hatch) = hatch {
                    paint_hatch(frame, inside, *hatch, theme);
                }
                if let Some(edge) = edge {
                    line(frame, outline, true, *edge, theme, window);
                }
            }
            Mark::Shape { shape, at, size } => {
                self::marks(frame, &shape.marks(*at, *size), theme, window);
            }
            Mark::Text(text) => {
                let seen = window.is_none_or(|window| window.meets(&text.extent()));
                if seen {
                    paint_text(frame, text, theme);
                }
            }
            Mark::Clip {
                window: own,
                marks: inner,
            } => {
                let both = window.map_or(*own, |outer| clip::both(outer, own));
                self::marks(frame, inner, theme, Some(&both));
            }
        }
    }
}

fn point(p: DVec2) -> Point {
    Point::new(p.x as f32, p.y as f32)
}

/// The path through runs of points, closed or not.
fn path<'a>(runs: impl IntoIterator<Item = &'a [DVec2]>, closed: bool) -> Path {
    Path::new(|builder| {
        for run in runs {
            let Some((first, rest)) = run.split_first() else {
                continue;
            };
            builder.move_to(point(*first));
            for next in rest {
                builder.line_to(point(*next));
            }
            if closed {
                builder.close();
            }
        }
    })
}

fn line(
    frame: &mut Frame,
    points: &[DVec2],
    closed: bool,
    stroke: Stroke,
    theme: role::Theme,
    window: Option<&crate::drawing::mark::Rectangle>,
) {
    if points.len() < 2 || !points.iter().all(|p| p.is_finite()) {
        return;
    }
    let drawn = match window {
        None => path([points], closed),
        Some(window) => {
            let mut open = points.to_vec();
            if closed {
                open.push(points[0]);
            }
            let runs = clip::line(&open, window);
            path(runs.iter().map(Vec::as_slice), false)
        }
    };
    let dashes: Vec<f32> = stroke
        .dash
        .pattern()
        .iter()
        .map(|length| (length * SCALE) as f32)
        .collect();
    let style = canvas::Stroke {
        width: stroke.width as f32,
        line_dash: LineDash {
            segments: &dashes,
            offset: 0,
        },
        line_join: canvas::LineJoin::Round,
        ..canvas::Stroke::default().with_color(rgb(stroke.role.colour(theme)))
    };
    frame.stroke(&drawn, style);
}

fn paint_fill(frame: &mut Frame, outline: &[DVec2], fill: Fill, theme: role::Theme) {
    if outline.len() < 3 || !outline.iter().all(|p| p.is_finite()) {
        return;
    }
    let colour = match fill {
        Fill::Role(role) => role.colour(theme),
        Fill::Ramp(strength) => ramp::colour(strength, theme),
    };
    frame.fill(
        &path([outline], true),
        canvas::Fill {
            rule: canvas::fill::Rule::EvenOdd,
            ..canvas::Fill::from(rgb(colour))
        },
    );
    if let Fill::Ramp(strength) = fill
        && let Some(mut lines) = ramp::hatch(strength, theme)
    {
        lines.spacing *= SCALE;
        lines.width *= SCALE;
        paint_hatch(frame, outline, lines, theme);
    }
}

fn paint_hatch(frame: &mut Frame, outline: &[DVec2], hatch: Hatch, theme: role::Theme) {
    let lines = hatch::lines(outline, hatch.spacing, hatch.angle);
    if lines.is_empty() {
        return;
    }
    let drawn = path(lines.iter().map(<[DVec2; 2]>::as_slice), false);
    let style = canvas::Stroke::default()
        .with_width(hatch.width as f32)
        .with_color(rgb(hatch.role.colour(theme)));
    frame.stroke(&drawn, style);
}

/// Ascent and descent of the bundled font as the window counts them, in em.
static LINE: LazyLock<(f64, f64)> = LazyLock::new(|| {
    let face = ttf_parser::Face::parse(Weight::Regular.bytes(), 0)
        .expect("the bundled font is read by a test");
    let em = f64::from(face.units_per_em());
    (
        f64::from(face.ascender()) / em,
        -f64::from(face.descender()) / em,
    )
});

fn paint_text(frame: &mut Frame, text: &Text, theme: role::Theme) {
    if !text.at.is_finite() || !text.size.is_finite() || text.size <= 0.0 {
        return;
    }
    let (ascent, descent) = *LINE;
    let start = text.start();
    let shown: String = text
        .text
        .chars()
        .map(|c| match c {
            c if c.is_control() => ' ',
            c if font::glyph(c, text.weight).is_none() => font::REPLACEMENT,
            c => c,
        })
        .collect();
    let at = |start: DVec2| point(start - DVec2::new(0.0, ascent * text.size));
    let words = Words {
        content: shown,
        position: at(start),
        max_width: f32::INFINITY,
        color: rgb(text.role.colour(theme)),
        size: (text.size as f32).into(),
        line_height: LineHeight::Relative((ascent + descent) as f32),
        font: match text.weight {
            Weight::Regular => REGULAR,
            Weight::SemiBold => BOLD,
        },
        shaping: Shaping::Basic,
        ..Words::default()
    };
    if text.turn != 0.0 {
        frame.with_save(|frame| {
            frame.translate(Vector::new(text.at.x as f32, text.at.y as f32));
            frame.rotate(Radians((-text.turn.to_radians()) as f32));
            frame.fill_text(Words {
                position: at(start - text.at),
                ..words
            });
        });
        return;
    }
    match text.backing {
        Backing::None => {}
        Backing::Box(role) => {
            let area = text.extent().corners();
            paint_fill(frame, &area, Fill::Role(role), theme);
        }
        Backing::Halo(role) => {
            let reach = text.size * 0.14;
            for turn in 0..12 {
                let angle = std::f64::consts::TAU * f64::from(turn) / 12.0;
                let off = DVec2::new(angle.cos(), angle.sin()) * reach;
                frame.fill_text(Words {
                    position: at(start + off),
                    color: rgb(role.colour(theme)),
                    ..words.clone()
                });
            }
        }
    }
    if text.hollow {
        let style = canvas::Stroke::default().with_color(words.color);
        words.draw_with(|outline, _| frame.stroke(&outline, style));
    } else {
        frame.fill_text(words);
    }
}
