//! Lambert's contour integral, edge by edge and arc by arc.
//!
//! The flux vector of a region is (1/π) ∫ ω dΩ over the directions ω in which
//! it is seen, and equals (1/2π) ∮ dr × r / r² round its outline, taken
//! anticlockwise as the receiver at the origin sees it. Its component along a
//! receiver's normal is the configuration factor, if all of the region lies
//! above that receiver's horizon; a region that does not is cut there first.

use std::f64::consts::{PI, TAU};

use glam::DVec3;

use crate::numeric::{LARGEST_SQUARE, arc_over_tangent};

/// Returns the part of the contour integral that a straight edge gives.
///
/// `from` and `to` are the edge's ends as seen from the receiver, in metres.
///
/// # Accuracy
///
/// Relative error a few times `1e-16` times the edge's distance over its
/// length; an edge that passes through the receiver gives zero.
///
/// # Source
///
/// J. H. Lambert, *Photometria* (1760); checked with the families `polygon` and
/// `rect_pose` in `tests/published/view_factor_catalogue.rs`.
#[must_use]
#[inline]
pub fn edge(from: DVec3, to: DVec3) -> DVec3 {
    // The edge's own vector keeps the digits that `to × from` would lose far away.
    let cross = (to - from).cross(from);
    let (sine, cosine) = (cross.length_squared(), from.dot(to));
    if cosine > 0.0 && sine < LARGEST_SQUARE * (cosine * cosine) {
        return cross * (arc_over_tangent(sine / (cosine * cosine)) / (TAU * cosine));
    }
    wide_edge(cross, sine.sqrt(), cosine)
}

/// An edge that is seen under a wide angle, or of which nothing is.
#[cold]
fn wide_edge(cross: DVec3, sine: f64, cosine: f64) -> DVec3 {
    if sine == 0.0 {
        return DVec3::ZERO;
    }
    cross * (sine.atan2(cosine) / (TAU * sine))
}

/// Returns the part that an edge lying in the receiver's horizon gives.
///
/// `normal` is the receiver's; the angle counts with its sense about it, so
/// that ways along the horizon that go back and forth cancel exactly.
#[must_use]
pub(in crate::physics) fn horizon_edge(from: DVec3, to: DVec3, normal: DVec3) -> DVec3 {
    let sine = (to - from).cross(from).dot(normal);
    normal * (sine.atan2(from.dot(to)) / TAU)
}

/// Returns the flux vector of what lies above a receiver's horizon of a
/// polygon.
///
/// `vertices` as seen from the receiver, anticlockwise; `normal` the
/// receiver's, of length one. The outline may have dents.
#[must_use]
pub(in crate::physics) fn polygon_above(vertices: &[DVec3], normal: DVec3) -> DVec3 {
    let mut sum = DVec3::ZERO;
    let (mut first_entry, mut exit) = (None, None);
    let Some(last) = vertices.last() else {
        return sum;
    };
    let (mut from, mut from_height) = (*last, last.dot(normal));
    for &to in vertices {
        let to_height = to.dot(normal);
        let crossing = || from + (to - from) * (from_height / (from_height - to_height));
        match (from_height >= 0.0, to_height >= 0.0) {
            (true, true) => sum += edge(from, to),
            (true, false) => {
                let place = crossing();
                sum += edge(from, place);
                exit = Some(place);
            }
            (false, true) => {
                let place = crossing();
                match exit.take() {
                    Some(left) => sum += horizon_edge(left, place, normal),
                    None => first_entry = Some(place),
                }
                sum += edge(place, to);
            }
            (false, false) => {}
        }
        (from, from_height) = (to, to_height);
    }
    if let (Some(left), Some(entered)) = (exit, first_entry) {
        sum += horizon_edge(left, entered, normal);
    }
    sum
}

/// A circle in space as seen from a receiver at the origin, which lies in front
/// of its plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Circle {
    /// From the receiver to the centre.
    centre: DVec3,
    /// Of length one, towards the receiver's side.
    normal: DVec3,
    radius: f64,
    /// In the plane, of length one, away from the foot of the receiver's
    /// perpendicular.
    away: DVec3,
    /// In the plane, `normal × away`.
    along: DVec3,
    /// Distance of the centre from the foot of the perpendicular.
    offset: f64,
}

impl Circle {
    /// Returns the circle; `normal` of length one and towards the receiver.
    #[must_use]
    pub fn new(centre: DVec3, normal: DVec3, radius: f64) -> Self {
        let lateral = centre - normal * centre.dot(normal);
        // Taken off twice, so that it is perpendicular however short it is.
        let lateral = lateral - normal * lateral.dot(normal);
        let offset = lateral.length();
        let (away, offset) = if offset > 4.0 * f64::EPSILON * centre.length() {
            (lateral / offset, offset)
        } else {
            (normal.any_orthonormal_vector(), 0.0)
        };
        Self {
            centre,
            normal,
            radius,
            away,
            along: normal.cross(away),
            offset,
        }
    }

    /// Returns the point at an angle, anticlockwise from the farthest one.
    #[must_use]
    pub fn point(&self, angle: f64) -> DVec3 {
        let (sine, cosine) = angle.sin_cos();
        self.centre + (self.away * cosine + self.along * sine) * self.radius
    }

    /// Returns the centre, from the receiver.
    pub(in crate::physics) fn centre(&self) -> DVec3 {
        self.centre
    }

    /// Returns the normal on the receiver's side, of length one.
    pub(in crate::physics) fn normal(&self) -> DVec3 {
        self.normal
    }

    /// Returns the radius.
    pub(in crate::physics) fn radius(&self) -> f64 {
        self.radius
    }

    /// Returns the distance of the centre from the foot of the receiver's
    /// perpendicular on the circle's plane.
    pub(in crate::physics) fn offset(&self) -> f64 {
        self.offset
    }

    /// Returns the direction of angle zero in the plane, of length one.
    pub(in crate::physics) fn away(&self) -> DVec3 {
        self.away
    }

    /// Returns the direction of a quarter turn in the plane, of length one.
    pub(in crate::physics) fn along(&self) -> DVec3 {
        self.along
    }

    /// Returns the derivative of [`Circle::point`] by the angle.
    pub(in crate::physics) fn step(&self, angle: f64) -> DVec3 {
        let (sine, cosine) = angle.sin_cos();
        (self.along * cosine - self.away * sine) * self.radius
    }

    /// Returns the circle about the same centre, so many times as large.
    pub(in crate::physics) fn widened(&self, times: f64) -> Self {
        Self {
            radius: self.radius * times,
            ..*self
        }
    }

    /// Returns how the height above a receiver's horizon goes round the circle.
    pub(in crate::physics) fn swing(&self, normal: DVec3) -> Swing {
        let cosine = self.radius * normal.dot(self.away);
        let sine = self.radius * normal.dot(self.along);
        Swing {
            middle: normal.dot(self.centre),
            half: cosine.hypot(sine),
            highest: sine.atan2(cosine),
        }
    }

    /// Returns the part of the contour integral that an arc gives.
    ///
    /// The arc runs from one angle to another, in radians.
    ///
    /// On it r² = P (1 + q cos φ), so that the integrand is linear in sin φ and
    /// cos φ over 1 + q cos φ. With s = √(1 − q²) and β = q / (1 + s) the
    /// integrals follow from
    /// ∫ dφ / (1 + q cos φ) = (φ − 2 arg(1 + β exp iφ)) / s, the form of the
    /// half-angle substitution that has no jump at ±π.
    ///
    /// # Accuracy
    ///
    /// Exact relation; absolute error of a region closed with it below `1e-14`.
    ///
    /// # Source
    ///
    /// Derived here; checked with the families `disc_perpendicular_cut`,
    /// `disc_pose` and `sphere_tilt` in
    /// `tests/published/view_factor_catalogue.rs`.
    #[must_use]
    pub fn arc(&self, from: f64, to: f64) -> DVec3 {
        let height = self.centre.dot(self.normal);
        let (radius, offset) = (self.radius, self.offset);
        let mean = height * height + offset * offset + radius * radius;
        let q = 2.0 * radius * offset / mean;
        let s = {
            let (near, far) = (offset - radius, offset + radius);
            ((height * height + near * near) * (height * height + far * far)).sqrt() / mean
        };
        let beta = q / (1.0 + s);
        let swing = |angle: f64| {
            let (sine, cosine) = angle.sin_cos();
            (beta * sine).atan2(1.0 + beta * cosine)
        };
        let turn = to - from;
        let swung = swing(to) - swing(from);
        let plain = (turn - 2.0 * swung) / s;
        // As q goes to zero, 2 arg(…) / q goes to sin φ.
        let (cosines, sines) = if q > 1e-200 {
            let step = q * (to.cos() - from.cos()) / (1.0 + q * from.cos());
            ((2.0 * swung / q - beta * turn) / s, -step.ln_1p() / q)
        } else {
            (to.sin() - from.sin(), from.cos() - to.cos())
        };
        let sum = self.centre.cross(self.along) * cosines - self.centre.cross(self.away) * sines
            + self.normal * (radius * plain);
        sum * (-radius / (TAU * mean))
    }

    /// Returns the flux vector of what lies above a receiver's horizon of the
    /// disc in this circle: all of it, nothing, or a segment.
    ///
    /// `normal` is the receiver's, of length one.
    #[must_use]
    pub fn above(&self, normal: DVec3) -> DVec3 {
        let swing = self.swing(normal);
        if swing.middle >= swing.half {
            return self.arc(-PI, PI);
        }
        if swing.middle <= -swing.half {
            return DVec3::ZERO;
        }
        let half = swing.reach();
        let (from, to) = (swing.highest - half, swing.highest + half);
        self.arc(from, to) + horizon_edge(self.point(to), self.point(from), normal)
    }
}

/// The height of a circle's points above a plane through the receiver:
/// `middle + half cos(angle − highest)`.
#[derive(Clone, Copy, Debug)]
pub(in crate::physics) struct Swing {
    pub(in crate::physics) middle: f64,
    pub(in crate::physics) half: f64,
    pub(in crate::physics) highest: f64,
}

impl Swing {
    /// Returns the height at an angle.
    pub(in crate::physics) fn at(&self, angle: f64) -> f64 {
        self.middle + self.half * (angle - self.highest).cos()
    }

    /// Returns how far to either side of the highest point the circle stays
    /// above: of use where it crosses.
    fn reach(&self) -> f64 {
        ((self.half - self.middle) * (self.half + self.middle))
            .max(0.0)
            .sqrt()
            .atan2(-self.middle)
    }

    /// Returns the angles strictly between `start` and `stop` at which the
    /// height is zero, in the order of the way from one to the other.
    pub(in crate::physics) fn stations(&self, start: f64, stop: f64) -> [Option<f64>; 4] {
        let mut found = [None; 4];
        if self.middle.abs() >= self.half {
            return found;
        }
        let (low, high) = (start.min(stop), start.max(stop));
        let reach = self.reach();
        let mut count = 0;
        for angle in [self.highest - reach, self.highest + reach] {
            let mut angle = low + (angle - low).rem_euclid(TAU);
            while angle < high && count < 4 {
                if angle > low {
                    found[count] = Some(angle);
                    count += 1;
                }
                angle += TAU;
            }
        }
        found[..count].sort_by(|one, other| {
            let order = one.partial_cmp(other).unwrap_or(std::cmp::Ordering::Equal);
            if start <= stop {
                order
            } else {
                order.reverse()
            }
        });
        found
    }
}
