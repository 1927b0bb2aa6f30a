//! One edge of an outline, and where a direction lies along it.

use std::f64::consts::TAU;

use glam::DVec3;

use crate::physics::view::loops::Piece;
use crate::physics::view_factor::contour::Circle;

/// An edge as seen from the receiver at the origin; the inside on its left.
#[derive(Clone, Copy, Debug)]
pub(in crate::physics) enum Edge {
    /// A straight one: the directions of its ends and the normal of the plane
    /// through it and the receiver, on the inner side; all of length one.
    Straight {
        from: DVec3,
        to: DVec3,
        inward: DVec3,
    },
    /// An arc from one angle to another.
    Round { rim: Rim, start: f64, stop: f64 },
}

impl Edge {
    /// A straight edge; none if its ends lie in one direction.
    pub(in crate::physics) fn straight(from: DVec3, to: DVec3) -> Option<Self> {
        let (from, to) = (from.normalize(), to.normalize());
        let inward = (to - from).cross(from);
        let length = inward.length();
        (length > 0.0).then(|| Self::Straight {
            from,
            to,
            inward: inward / length,
        })
    }

    /// The edge of this piece of an outline. Arcs that are seen edge on are
    /// straight; none if nothing is left of it.
    pub(in crate::physics) fn of_piece(piece: &Piece) -> Option<Self> {
        match *piece {
            Piece::Straight { from, to } => Self::straight(from, to),
            Piece::Round {
                circle,
                start,
                stop,
                from,
                to,
            } => {
                let rim = Rim::new(circle);
                if rim.is_edge_on() {
                    Self::straight(from, to)
                } else {
                    Some(Self::Round { rim, start, stop })
                }
            }
        }
    }

    /// The directions of its ends.
    pub(super) fn ends(&self) -> (DVec3, DVec3) {
        match *self {
            Self::Straight { from, to, .. } => (from, to),
            Self::Round { rim, start, stop } => (
                rim.circle.point(start).normalize(),
                rim.circle.point(stop).normalize(),
            ),
        }
    }

    /// How far along a direction near the edge lies: 0 to 1 of a straight edge,
    /// the angle on an arc; none if it lies off its ends by more than `slack`.
    pub(super) fn place_of(&self, direction: DVec3, slack: f64) -> Option<f64> {
        match *self {
            Self::Straight { from, to, inward } => {
                let after = direction.cross(from).dot(inward);
                let before = to.cross(direction).dot(inward);
                let whole = after + before;
                let inside = whole > 0.0 && after >= -slack && before >= -slack;
                inside.then(|| (after / whole).clamp(0.0, 1.0))
            }
            Self::Round { rim, start, stop } => {
                let angle = rim.angle_of(direction)?;
                let (low, high) = (start.min(stop), start.max(stop));
                let slack = slack / rim.reach();
                let past = (angle - low).rem_euclid(TAU);
                if past <= high - low + slack {
                    Some((low + past).min(high))
                } else if past >= TAU - slack {
                    Some(low)
                } else {
                    None
                }
            }
        }
    }

    /// Whether a direction passes the edge, or the way on past its ends, within
    /// a hair.
    pub(super) fn is_passed_by(&self, direction: DVec3, hair: f64) -> bool {
        match self {
            Self::Straight { inward, .. } => {
                inward.dot(direction).abs() <= 4.0 * hair * direction.length()
            }
            Self::Round { rim, .. } => rim.is_passed_by(direction, hair),
        }
    }

    /// Where it starts and where it ends, in the terms of [`Edge::place_of`].
    pub(super) fn span(&self) -> (f64, f64) {
        match *self {
            Self::Straight { .. } => (0.0, 1.0),
            Self::Round { start, stop, .. } => (start, stop),
        }
    }

    /// The way along the edge at a direction that lies on it.
    pub(super) fn heading(&self, direction: DVec3) -> DVec3 {
        match *self {
            // Inward stands left of the way: way × direction points inward.
            Self::Straight { inward, .. } => direction.cross(inward),
            Self::Round { rim, start, stop } => {
                let angle = rim.angle_of(direction).unwrap_or(start);
                rim.circle.step(angle) * (stop - start).signum()
            }
        }
    }
}

/// A circle and the cone over it.
#[derive(Clone, Copy, Debug)]
pub(in crate::physics) struct Rim {
    /// The circle; its normal is on the receiver's side.
    pub(super) circle: Circle,
    /// The receiver's distance from its plane.
    pub(super) height: f64,
}

impl Rim {
    pub(super) fn new(circle: Circle) -> Self {
        Self {
            circle,
            height: -circle.centre().dot(circle.normal()),
        }
    }

    /// Whether the circle is seen so flat that it passes for a straight edge:
    /// what it encloses is less than 10⁻⁷ sr.
    pub(super) fn is_edge_on(&self) -> bool {
        self.height <= 1e-7 * (self.circle.offset() - self.circle.radius())
    }

    /// A direction in the circle's plane: what multiplies its distance there
    /// (above zero in front of the receiver), and so many times its place off
    /// the centre.
    pub(super) fn seen(&self, direction: DVec3) -> (f64, DVec3) {
        let share = -self.circle.normal().dot(direction);
        let off = direction * self.height - self.circle.centre() * share;
        (share, off)
    }

    /// Whether a direction lies within the cone.
    pub(super) fn holds(&self, direction: DVec3) -> bool {
        let (share, off) = self.seen(direction);
        let reach = share * self.circle.radius();
        share > 0.0 && off.length_squared() < reach * reach
    }

    /// How far off the circle a direction passes, in the circle's plane and
    /// over the distance there; none behind the receiver.
    pub(super) fn miss(&self, direction: DVec3) -> Option<f64> {
        let (share, off) = self.seen(direction);
        if share <= 0.0 {
            return None;
        }
        let apart = off.length() - share * self.circle.radius();
        Some(apart.abs() / (self.height * direction.length()))
    }

    /// Whether a direction passes the circle within a hair.
    pub(super) fn is_passed_by(&self, direction: DVec3, hair: f64) -> bool {
        self.miss(direction).is_some_and(|miss| miss <= 4.0 * hair)
    }

    /// The angle on the circle of a direction near its cone.
    pub(super) fn angle_of(&self, direction: DVec3) -> Option<f64> {
        let (share, off) = self.seen(direction);
        (share > 0.0).then(|| {
            off.dot(self.circle.along())
                .atan2(off.dot(self.circle.away()))
        })
    }

    /// The radius over the distance: what angle on the circle is what angle
    /// seen, roughly.
    fn reach(&self) -> f64 {
        self.circle.radius() / (self.circle.centre().length() + self.circle.radius())
    }
}
