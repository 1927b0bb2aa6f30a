//! The marks of one picture as operations of a page.

use glam::DVec2;
use printpdf::{
    Color, Line, LineCapStyle, LineDashPattern, LineJoinStyle, LinePoint, Op, PaintMode,
    PdfFontHandle, Point, Polygon, PolygonRing, Pt, Rgb, TextItem, TextMatrix, TextRenderingMode,
    WindingOrder,
};

use crate::drawing::hatch;
use crate::drawing::mark::{Backing, Fill, Mark, Rectangle, Stroke, Text};
use crate::drawing::picture::Picture;
use crate::drawing::ramp;
use crate::drawing::role::{Colour, Role, Theme};
use crate::worksheet::paint::cut;

/// Returns the operations that paint a picture in the light theme.
pub(super) fn operations(picture: &Picture) -> Vec<Op> {
    let mut painter = Painter {
        height: picture.height,
        ops: Vec::new(),
        fill: None,
        stroke: None,
    };
    painter.ops.push(Op::SetLineJoinStyle {
        join: LineJoinStyle::Round,
    });
    painter.ops.push(Op::SetLineCapStyle {
        cap: LineCapStyle::Butt,
    });
    painter.marks(&picture.marks);
    painter.ops
}

struct Painter {
    height: f64,
    ops: Vec<Op>,
    fill: Option<Colour>,
    stroke: Option<(Stroke, Colour)>,
}

/// A hundredth of a point is finer than any printer, and keeps the file small.
fn rounded(value: f64) -> f32 {
    ((value * 100.0).round() / 100.0) as f32
}

fn colour(colour: Colour) -> Color {
    // Thousandths, for the same reason.
    let channel = |c: u8| ((f32::from(c) / 255.0) * 1000.0).round() / 1000.0;
    Color::Rgb(Rgb {
        r: channel(colour.red),
        g: channel(colour.green),
        b: channel(colour.blue),
        icc_profile: None,
    })
}

impl Painter {
    fn point(&self, p: DVec2) -> LinePoint {
        let point = Point {
            x: Pt(rounded(p.x)),
            y: Pt(rounded(self.height - p.y)),
        };
        LinePoint {
            p: point,
            bezier: false,
        }
    }

    fn points(&self, points: &[DVec2]) -> Vec<LinePoint> {
        points.iter().map(|p| self.point(*p)).collect()
    }

    fn marks(&mut self, marks: &[Mark]) {
        for mark in marks {
            self.mark(mark);
        }
    }

    fn mark(&mut self, mark: &Mark) {
        match mark {
            Mark::Line { points, stroke } => self.line(points, *stroke, false),
            Mark::Area {
                outline,
                fill,
                hatch,
                edge,
            } => {
                if !outline.iter().all(|p| p.is_finite()) {
                    return;
                }
                if let Some(fill) = fill {
                    self.area(outline, *fill);
                }
                if let Some(hatch) = hatch {
                    for line in hatch::lines(outline, hatch.spacing, hatch.angle) {
                        self.line(&line, Stroke::solid(hatch.role, hatch.width), false);
                    }
                }
                if let Some(edge) = edge {
                    self.line(outline, *edge, true);
                }
            }
            Mark::Shape { shape, at, size } => self.marks(&shape.marks(*at, *size)),
            Mark::Text(text) => self.text(text),
            Mark::Clip { window, marks } => self.clip(window, marks),
        }
    }

    fn set_fill(&mut self, wanted: Colour) {
        if self.fill != Some(wanted) {
            self.fill = Some(wanted);
            self.ops.push(Op::SetFillColor {
                col: colour(wanted),
            });
        }
    }

    fn set_stroke(&mut self, stroke: Stroke) {
        let wanted = (stroke, stroke.role.colour(Theme::Light));
        if self.stroke != Some(wanted) {
            self.stroke = Some(wanted);
            let dash: Vec<f32> = stroke
                .dash
                .pattern()
                .iter()
                .map(|length| *length as f32)
                .collect();
            self.ops.push(Op::SetOutlineColor {
                col: colour(wanted.1),
            });
            self.ops.push(Op::SetOutlineThickness {
                pt: Pt(rounded(stroke.width)),
            });
            self.ops.push(Op::SetLineDashPattern {
                dash: LineDashPattern::new(0.0, &dash),
            });
        }
    }

    fn line(&mut self, points: &[DVec2], stroke: Stroke, closed: bool) {
        if points.len() < 2 || !points.iter().all(|p| p.is_finite()) {
            return;
        }
        self.set_stroke(stroke);
        let line = Line {
            points: self.points(points),
            is_closed: closed,
        };
        self.ops.push(Op::DrawLine { line });
    }

    fn area(&mut self, outline: &[DVec2], fill: Fill) {
        if outline.len() < 3 {
            return;
        }
        self.set_fill(match fill {
            Fill::Role(role) => role.colour(Theme::Light),
            Fill::Ramp(strength) => ramp::colour(strength, Theme::Light),
        });
        self.polygon(outline, PaintMode::Fill);
    }

    fn polygon(&mut self, outline: &[DVec2], mode: PaintMode) {
        let rings = vec![PolygonRing {
            points: self.points(outline),
        }];
        let polygon = Polygon {
            rings,
            mode,
            winding_order: WindingOrder::EvenOdd,
        };
        self.ops.push(Op::DrawPolygon { polygon });
    }

    fn clip(&mut self, window: &Rectangle, marks: &[Mark]) {
        let corners = window.corners();
        if !corners.iter().all(|p| p.is_finite()) {
            return;
        }
        self.ops.push(Op::SaveGraphicsState);
        let before = (self.fill, self.stroke);
        self.polygon(&corners, PaintMode::Clip);
        self.marks(marks);
        self.ops.push(Op::RestoreGraphicsState);
        (self.fill, self.stroke) = before;
    }

    fn text(&mut self, text: &Text) {
        let shown = cut::printed(&text.text, text.weight);
        let start = text.start();
        if shown.trim().is_empty()
            || !start.is_finite()
            || !text.size.is_finite()
            || text.size <= 0.0
        {
            return;
        }
        match text.backing {
            Backing::None => {}
            Backing::Box(role) => {
                let area = Rectangle {
                    from: text.extent().from - DVec2::new(1.0, 0.0),
                    to: text.extent().to + DVec2::new(1.0, 0.0),
                };
                self.area(&area.corners(), Fill::Role(role));
            }
            Backing::Halo(role) => self.halo(text, role, &shown),
        }
        if text.hollow {
            self.set_stroke(Stroke::solid(text.role, 1.0));
            self.letters(text, &shown, TextRenderingMode::Stroke);
        } else {
            self.set_fill(text.role.colour(Theme::Light));
            self.letters(text, &shown, TextRenderingMode::Fill);
        }
    }

    fn halo(&mut self, text: &Text, role: Role, shown: &str) {
        self.set_stroke(Stroke::solid(role, text.size * 0.25));
        self.letters(text, shown, TextRenderingMode::Stroke);
    }

    fn letters(&mut self, text: &Text, shown: &str, mode: TextRenderingMode) {
        let start = text.start();
        let (sine, cosine) = if text.turn == 0.0 {
            (0.0, 1.0)
        } else {
            text.turn.to_radians().sin_cos()
        };
        // Turned about the anchored point, not about the start.
        let back = text.at - start;
        let origin = text.at - DVec2::new(back.x * cosine, -back.x * sine);
        let matrix = [cosine, sine, -sine, cosine].map(|part| ((part * 1e6).round() / 1e6) as f32);
        let [a, b, c, d] = matrix;
        let place = TextMatrix::Raw([
            a,
            b,
            c,
            d,
            rounded(origin.x),
            rounded(self.height - origin.y),
        ]);
        let plain = mode == TextRenderingMode::Fill;
        self.ops.push(Op::StartTextSection);
        self.ops.push(Op::SetFont {
            font: PdfFontHandle::External(cut::id(text.weight)),
            size: Pt(rounded(text.size)),
        });
        if !plain {
            self.ops.push(Op::SetTextRenderingMode { mode });
        }
        self.ops.push(Op::SetTextMatrix { matrix: place });
        self.ops.push(Op::ShowText {
            items: vec![TextItem::Text(shown.to_owned())],
        });
        if !plain {
            // The mode outlives the text section.
            self.ops.push(Op::SetTextRenderingMode {
                mode: TextRenderingMode::Fill,
            });
        }
        self.ops.push(Op::EndTextSection);
    }
}
