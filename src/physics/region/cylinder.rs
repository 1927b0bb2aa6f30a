//! Solid cylinders: what is seen of them, and what meets them.

use std::f64::consts::PI;

use glam::{DVec2, DVec3};

use super::super::view::View;
use super::super::view::loops::{Loops, Piece};
use super::super::view_factor::contour::Circle;
use super::{TOUCH, plan, size};

/// A solid cylinder in terms that its relations need.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::physics) struct Cylinder {
    /// The centre of one end face.
    pub base: DVec3,
    /// From there to the other end, of length one.
    pub along: DVec3,
    /// The distance of the end faces.
    pub length: f64,
    /// The radius.
    pub radius: f64,
}

impl Cylinder {
    /// Returns the cylinder; `axis` from one end to the other.
    pub(in crate::physics) fn new(base: DVec3, axis: DVec3, radius: f64) -> Self {
        let length = axis.length();
        Self {
            base,
            along: axis / length,
            length,
            radius,
        }
    }

    /// Returns the place along the axis, and the vector off it.
    fn parted(&self, point: DVec3) -> (f64, DVec3) {
        let off = point - self.base;
        let along = off.dot(self.along);
        let across = off - self.along * along;
        // Taken off twice, so that it is perpendicular however short it is.
        (along, across - self.along * across.dot(self.along))
    }

    /// Says whether a point lies in the solid or on it.
    pub(super) fn touches(&self, point: DVec3) -> bool {
        let (along, across) = self.parted(point);
        let reach = TOUCH * (self.length + self.radius + size(point));
        along >= -reach && along <= self.length + reach && across.length() <= self.radius + reach
    }

    /// Returns from where to where, as shares of the way, a line lies in the
    /// solid; none if it misses it. The ends are not held to `0..=1`.
    pub(in crate::physics) fn stretch(&self, from: DVec3, way: DVec3) -> Option<(f64, f64)> {
        let (start, across) = self.parted(from);
        let (rise, drift) = {
            let rise = way.dot(self.along);
            (rise, way - self.along * rise)
        };
        let mut range = (f64::NEG_INFINITY, f64::INFINITY);
        let square = drift.length_squared();
        if square > 0.0 {
            let middle = -across.dot(drift) / square;
            // The nearest approach by itself: no difference of large squares.
            let nearest = across + drift * middle;
            let left = (self.radius - nearest.length()) * (self.radius + nearest.length());
            if left < 0.0 {
                return None;
            }
            let half = (left / square).sqrt();
            range = (middle - half, middle + half);
        } else if across.length() > self.radius {
            return None;
        }
        if rise == 0.0 {
            if !(0.0..=self.length).contains(&start) {
                return None;
            }
        } else {
            let (one, other) = (-start / rise, (self.length - start) / rise);
            range = (range.0.max(one.min(other)), range.1.min(one.max(other)));
        }
        (range.0 <= range.1).then_some(range)
    }

    /// Returns the place of the solid that is nearest to a point.
    pub(in crate::physics) fn nearest(&self, point: DVec3) -> DVec3 {
        let (along, across) = self.parted(point);
        let offset = across.length();
        let across = if offset > self.radius {
            across * (self.radius / offset)
        } else {
            across
        };
        self.base + self.along * along.clamp(0.0, self.length) + across
    }

    /// Says whether a segment meets the solid.
    pub(super) fn is_met_by(&self, from: DVec3, to: DVec3) -> bool {
        self.stretch(from, to - from)
            .is_some_and(|(enter, leave)| enter <= 1.0 && leave >= 0.0)
    }

    /// Returns what is seen of the solid from a point outside.
    pub(super) fn view(&self, point: DVec3) -> View {
        match self.outline(point) {
            Outline::End {
                centre,
                normal,
                radius,
            } => View::of_disc(centre, normal, radius),
            Outline::Side(pieces) => {
                // All of a convex body lies beyond the plane through its nearest
                // place, square to the way there.
                View::of_loops(Loops::new(pieces, self.nearest(point) - point))
            }
        }
    }

    /// Returns the outline as seen from a point outside: one end face alone, or
    /// two generators between arcs of both end circles. Of an end whose face is
    /// seen the outline follows the far side, of the other the near side.
    pub(in crate::physics) fn outline(&self, point: DVec3) -> Outline {
        let (place, across) = self.parted(point);
        let offset = across.length();
        if offset <= self.radius * (1.0 + 1e-12) {
            let (end, normal) = if place > 0.5 * self.length {
                (self.base + self.along * self.length, self.along)
            } else {
                (self.base, -self.along)
            };
            return Outline::End {
                centre: end - point,
                normal,
                radius: self.radius,
            };
        }
        let towards = across / offset;
        let beside = self.along.cross(towards);
        // The tangent points stand at this angle to either side of `towards`.
        let cosine = self.radius / offset;
        let sine = ((offset - self.radius) * (offset + self.radius)).sqrt() / offset;
        let half = sine.atan2(cosine);
        let end = |centre: DVec3, outward: DVec3, faced: bool| {
            let centre = centre - point;
            let normal = if faced { outward } else { -outward };
            let circle = Circle::new(centre, normal, self.radius);
            let (start, stop) = if faced {
                (half - PI, PI - half)
            } else {
                (PI - half, PI + half)
            };
            // Along the arc, anticlockwise as seen, from one tangent point to
            // the other.
            let first = {
                let side = beside.dot(circle.point(start) - centre).signum();
                (towards * cosine + beside * (sine * side)) * self.radius + centre
            };
            let last = {
                let side = beside.dot(circle.point(stop) - centre).signum();
                (towards * cosine + beside * (sine * side)) * self.radius + centre
            };
            (circle, start, stop, first, last)
        };
        let top = end(
            self.base + self.along * self.length,
            self.along,
            place > self.length,
        );
        let bottom = end(self.base, -self.along, place < 0.0);
        let round = |(circle, start, stop, from, to)| Piece::Round {
            circle,
            start,
            stop,
            from,
            to,
        };
        Outline::Side(Box::new([
            round(top),
            Piece::Straight {
                from: top.4,
                to: bottom.3,
            },
            round(bottom),
            Piece::Straight {
                from: bottom.4,
                to: top.3,
            },
        ]))
    }

    /// The outermost distance at which a line on the plan leaves the solid.
    pub(super) fn edge_from(&self, place: DVec3, heading: DVec2) -> f64 {
        let lean = self.along.truncate();
        let short = lean.normalize_or(DVec2::X);
        let half = self.radius * self.along.z.abs();
        let ends = [self.base, self.base + self.along * self.length];
        let round = ends
            .map(|end| {
                plan::ellipse(
                    end.truncate() - place.truncate(),
                    heading,
                    short,
                    half,
                    self.radius,
                )
            })
            .into_iter()
            .fold(0.0, f64::max);
        if lean == DVec2::ZERO {
            return round;
        }
        // Between the ends the outline on the plan is a rectangle.
        let wide = (short.perp() * self.radius).extend(0.0);
        let [one, other] = ends;
        let corners = [one - wide, other - wide, other + wide, one + wide];
        round.max(plan::polygon(&corners, place, heading))
    }
}

/// The outline of a cylinder as seen from a point, anticlockwise.
#[derive(Clone, Debug)]
pub(in crate::physics) enum Outline {
    /// One end face; the normal towards the point.
    End {
        centre: DVec3,
        normal: DVec3,
        radius: f64,
    },
    /// An arc of one end, a generator, an arc of the other end, a generator.
    Side(Box<[Piece]>),
}
