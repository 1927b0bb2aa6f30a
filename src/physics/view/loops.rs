//! Closed loops of straight edges and circular arcs as seen from a point.
//!
//! Anticlockwise as seen, the region on the left; holes run the other way.
//! Pieces that meet share the point at which they do to the last bit, so that
//! all agree on which side of a horizon it lies.

use std::f64::consts::{PI, TAU};

use glam::DVec3;

use crate::physics::view_factor::contour::{self, Circle};

/// One edge of an outline, from the receiver at the origin.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::physics) enum Piece {
    /// A straight edge.
    Straight { from: DVec3, to: DVec3 },
    /// An arc of a circle from one angle to another, either way round; `from`
    /// and `to` are its ends (in direction: their length is free).
    Round {
        circle: Circle,
        start: f64,
        stop: f64,
        from: DVec3,
        to: DVec3,
    },
}

impl Piece {
    /// A whole circle, anticlockwise as seen.
    pub(in crate::physics) fn whole(circle: Circle) -> Self {
        let seam = circle.point(PI);
        Self::Round {
            circle,
            start: -PI,
            stop: PI,
            from: seam,
            to: seam,
        }
    }

    /// The same edge the other way round.
    pub(in crate::physics) fn reversed(self) -> Self {
        match self {
            Self::Straight { from, to } => Self::Straight { from: to, to: from },
            Self::Round {
                circle,
                start,
                stop,
                from,
                to,
            } => Self::Round {
                circle,
                start: stop,
                stop: start,
                from: to,
                to: from,
            },
        }
    }

    fn ends(&self) -> (DVec3, DVec3) {
        match *self {
            Self::Straight { from, to } | Self::Round { from, to, .. } => (from, to),
        }
    }

    /// Its part of the contour integral.
    fn flux(&self) -> DVec3 {
        match *self {
            Self::Straight { from, to } => contour::edge(from, to),
            Self::Round {
                circle,
                start,
                stop,
                ..
            } => circle.arc(start, stop),
        }
    }

    /// Its part of the solid angle, by the triangle or fan off an axis.
    fn solid_angle(&self, axis: DVec3) -> f64 {
        match *self {
            Self::Straight { from, to } => triangle(axis, from, to),
            Self::Round {
                circle,
                start,
                stop,
                ..
            } => {
                let middle = 0.5 * (start + stop);
                fan(axis, &circle, start, middle, 0) + fan(axis, &circle, middle, stop, 0)
            }
        }
    }
}

/// The region inside closed loops.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::physics) struct Loops {
    pieces: Box<[Piece]>,
    /// Less than a right angle from every direction in which the region is
    /// seen, of length one.
    axis: DVec3,
}

impl Loops {
    /// Returns the region; `axis` of any length.
    pub(in crate::physics) fn new(pieces: Box<[Piece]>, axis: DVec3) -> Self {
        Self {
            pieces,
            axis: axis.normalize_or(DVec3::Z),
        }
    }

    /// Returns the pieces.
    pub(in crate::physics) fn pieces(&self) -> &[Piece] {
        &self.pieces
    }

    /// Returns the flux vector of all of it.
    pub(in crate::physics) fn flux(&self) -> DVec3 {
        self.pieces.iter().map(Piece::flux).sum()
    }

    /// Says whether part of it lies below a receiver's horizon.
    pub(in crate::physics) fn reaches_below(&self, normal: DVec3) -> bool {
        self.pieces.iter().any(|piece| {
            let (from, to) = piece.ends();
            if from.dot(normal) < 0.0 || to.dot(normal) < 0.0 {
                return true;
            }
            match piece {
                Piece::Straight { .. } => false,
                Piece::Round {
                    circle,
                    start,
                    stop,
                    ..
                } => {
                    let swing = circle.swing(normal);
                    swing.middle < swing.half && is_passed(swing.highest + PI, *start, *stop)
                }
            }
        })
    }

    /// Returns the flux vector of what lies above a receiver's horizon.
    ///
    /// Where the outline goes below the horizon and comes up again the region
    /// is closed along it. The directions of the region lie within a right
    /// angle of the axis, so that angles along the horizon, counted from the
    /// axis, never run round: each way below adds the angle at which it comes
    /// up and takes off that at which it went down, in any order.
    pub(in crate::physics) fn above(&self, normal: DVec3) -> DVec3 {
        let front = (self.axis - normal * normal.dot(self.axis)).normalize_or_zero();
        let angle = |place: DVec3| place.cross(front).dot(normal).atan2(place.dot(front));
        let mut sum = DVec3::ZERO;
        let mut turn = 0.0;
        for piece in &self.pieces {
            let (from, to) = piece.ends();
            let (start_height, end_height) = (from.dot(normal), to.dot(normal));
            let (starts, ends) = (start_height >= 0.0, end_height >= 0.0);
            match *piece {
                Piece::Straight { .. } => match (starts, ends) {
                    (true, true) => sum += contour::edge(from, to),
                    (false, false) => {}
                    (down, _) => {
                        let place =
                            from + (to - from) * (start_height / (start_height - end_height));
                        if down {
                            sum += contour::edge(from, place);
                            turn -= angle(place);
                        } else {
                            turn += angle(place);
                            sum += contour::edge(place, to);
                        }
                    }
                },
                Piece::Round {
                    circle,
                    start,
                    stop,
                    ..
                } => {
                    let mut is_above = starts;
                    let mut cross = |now: bool, place: DVec3| {
                        if now != is_above {
                            turn += if now { angle(place) } else { -angle(place) };
                        }
                        is_above = now;
                    };
                    let swing = circle.swing(normal);
                    let stations = swing.stations(start, stop);
                    let mut before = start;
                    for station in stations.into_iter().flatten().chain([stop]) {
                        let now = swing.at(0.5 * (before + station)) >= 0.0;
                        let place = if before == start {
                            from
                        } else {
                            circle.point(before)
                        };
                        cross(now, place);
                        if now {
                            sum += circle.arc(before, station);
                        }
                        before = station;
                    }
                    cross(ends, to);
                }
            }
        }
        sum + normal * (turn / TAU)
    }

    /// Returns the solid angle in sr.
    pub(in crate::physics) fn solid_angle(&self) -> f64 {
        self.pieces
            .iter()
            .map(|piece| piece.solid_angle(self.axis))
            .sum::<f64>()
            .clamp(0.0, TAU)
    }

    /// Points whose cone holds the region: ends of edges, and where the
    /// tangents of short arcs meet.
    pub(in crate::physics) fn extremes(&self) -> impl Iterator<Item = DVec3> {
        self.pieces.iter().flat_map(|piece| {
            let corners = match *piece {
                Piece::Straight { .. } => None,
                Piece::Round {
                    circle,
                    start,
                    stop,
                    ..
                } => {
                    let count = ((stop - start).abs() / (0.25 * PI)).ceil().clamp(1.0, 8.0);
                    let step = (stop - start) / count;
                    let around = circle.widened(1.0 / (0.5 * step).cos());
                    let corner = move |index: u8| {
                        let index = f64::from(index);
                        (index < count).then(|| around.point(start + (index + 0.5) * step))
                    };
                    Some((0..8_u8).map_while(corner))
                }
            };
            std::iter::once(piece.ends().0).chain(corners.into_iter().flatten())
        })
    }
}

/// Says whether an arc passes an angle, whole turns aside.
fn is_passed(angle: f64, start: f64, stop: f64) -> bool {
    let (low, high) = (start.min(stop), start.max(stop));
    low + (angle - low).rem_euclid(TAU) <= high
}

/// The solid angle of the triangle between three directions, with its sign:
/// positive where they run anticlockwise as seen. `axis` of length one.
///
/// Source: A. van Oosterom and J. Strackee, *The solid angle of a plane
/// triangle*, IEEE Transactions on Biomedical Engineering 30 (1983) 125.
fn triangle(axis: DVec3, from: DVec3, to: DVec3) -> f64 {
    let (near, far) = (from.length(), to.length());
    // The edge's own vector keeps the digits that `to × from` would lose.
    let volume = (to - from).cross(from).dot(axis);
    let below = near * far + from.dot(to) + axis.dot(from) * far + axis.dot(to) * near;
    2.0 * volume.atan2(below)
}

/// The solid angle between an axis and an arc: ∮ (a × r)·dr / (r (r + a·r)) by
/// Gauss quadrature, halved until two orders agree.
fn fan(axis: DVec3, circle: &Circle, start: f64, stop: f64, depth: u32) -> f64 {
    let (middle, half) = (0.5 * (start + stop), 0.5 * (stop - start));
    let along = |angle: f64| {
        let (place, step) = (circle.point(angle), circle.step(angle));
        let distance = place.length();
        step.cross(place).dot(axis) / (distance * (distance + axis.dot(place)))
    };
    let sum = |rule: &[(f64, f64)]| -> f64 {
        rule.iter()
            .map(|(place, weight)| {
                weight * (along(middle - half * place) + along(middle + half * place))
            })
            .sum::<f64>()
            * half
    };
    let (coarse, fine) = (sum(&FIVE), sum(&EIGHT));
    if (coarse - fine).abs() <= 1e-11 || depth >= 40 {
        return fine;
    }
    fan(axis, circle, start, middle, depth + 1) + fan(axis, circle, middle, stop, depth + 1)
}

/// Gauss points and weights on −1 to 1: five (the middle one split in two) and
/// eight of them, as pairs about zero.
const FIVE: [(f64, f64); 3] = [
    (0.0, 0.284_444_444_444_444_44),
    (0.538_469_310_105_683_1, 0.478_628_670_499_366_47),
    (0.906_179_845_938_664, 0.236_926_885_056_189_08),
];
const EIGHT: [(f64, f64); 4] = [
    (0.183_434_642_495_649_8, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887_27),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_48),
    (0.960_289_856_497_536_3, 0.101_228_536_290_376_26),
];
