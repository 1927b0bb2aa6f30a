//! The cross-section of a tunnel: what its balance must know of it.
//!
//! Metres. A section does not change along the tunnel; its walls are straight.

use std::f64::consts::{FRAC_2_PI, PI};

use glam::{DVec2, DVec3};

use crate::numeric::gauss;
use crate::physics::Error;
use crate::physics::error::{SHORTEST, length};
use crate::physics::view_factor::{contour, disc, rectangle, strip};

/// The greatest number of vertices of a polygon that is a tunnel's section.
pub const MOST_CORNERS: usize = 64;

/// The cross-section of a tunnel.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    kind: Kind,
}

#[derive(Clone, Debug, PartialEq)]
enum Kind {
    Disc { radius: f64 },
    Rectangle { width: f64, height: f64 },
    Slot { width: f64 },
    Polygon { corners: Vec<DVec2> },
}

impl Section {
    /// Returns a round section.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the radius is not from 10⁻⁹ m to 10⁹ m.
    pub fn disc(radius: f64) -> Result<Self, Error> {
        let radius = length("radius", radius)?;
        Ok(Self {
            kind: Kind::Disc { radius },
        })
    }

    /// Returns a rectangular section.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m.
    pub fn rectangle(width: f64, height: f64) -> Result<Self, Error> {
        let (width, height) = (length("width", width)?, length("height", height)?);
        Ok(Self {
            kind: Kind::Rectangle { width, height },
        })
    }

    /// Returns a slot that is long beyond both ends.
    ///
    /// `width` is that of the gap.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the width is not from 10⁻⁹ m to 10⁹ m.
    pub fn slot(width: f64) -> Result<Self, Error> {
        let width = length("width", width)?;
        Ok(Self {
            kind: Kind::Slot { width },
        })
    }

    /// Returns a polygon without dents, its corners in order, anticlockwise.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if there are more than [`MOST_CORNERS`];
    /// [`Error::NotConvex`] if it has a dent, runs clockwise or is flat.
    pub fn polygon(corners: Vec<DVec2>) -> Result<Self, Error> {
        let count = corners.len();
        if count > MOST_CORNERS {
            return Err(Error::OutOfRange {
                parameter: "number of vertices of an opening through a thick wall",
                range: "at most 64",
                value: count as f64,
            });
        }
        without_dents(&corners)?;
        Ok(Self {
            kind: Kind::Polygon { corners },
        })
    }

    /// Returns the same of a polygon in space, anticlockwise about its normal.
    pub(in crate::physics) fn turning(vertices: &[DVec3], normal: DVec3) -> Result<Self, Error> {
        Self::polygon(flattened(vertices, normal))
    }

    /// Returns the least distance between two parallel lines that hold the
    /// section between them, in metres.
    #[must_use]
    pub fn least_width(&self) -> f64 {
        match &self.kind {
            Kind::Disc { radius } => 2.0 * radius,
            Kind::Rectangle { width, height } => width.min(*height),
            Kind::Slot { width } => *width,
            Kind::Polygon { corners } => edges(corners)
                .map(|(from, to)| {
                    let along = (to - from).normalize_or_zero();
                    corners
                        .iter()
                        .map(|corner| along.perp_dot(*corner - from))
                        .fold(0.0, f64::max)
                })
                .fold(f64::INFINITY, f64::min),
        }
    }

    /// Returns the sides of a rectangle, in metres.
    #[must_use]
    pub fn sides(&self) -> Option<[f64; 2]> {
        match self.kind {
            Kind::Rectangle { width, height } => Some([width, height]),
            Kind::Disc { .. } | Kind::Slot { .. } | Kind::Polygon { .. } => None,
        }
    }

    /// Returns the length of the outline over the area, 1/m.
    #[must_use]
    pub fn outline_over_area(&self) -> f64 {
        match &self.kind {
            Kind::Disc { radius } => 2.0 / radius,
            Kind::Rectangle { width, height } => 2.0 / width + 2.0 / height,
            Kind::Slot { width } => 2.0 / width,
            Kind::Polygon { corners } => {
                let double: f64 = edges(corners)
                    .map(|(from, to)| (from - corners[0]).perp_dot(to - corners[0]))
                    .sum();
                2.0 * outline(corners) / double
            }
        }
    }

    /// Returns the configuration factor between two planes across the tunnel,
    /// `distance` apart, which may be zero.
    ///
    /// # Accuracy
    ///
    /// As the closed forms; of a polygon an absolute error below `1e-7`.
    #[must_use]
    pub fn through(&self, distance: f64) -> f64 {
        if distance == 0.0 {
            return 1.0;
        }
        match &self.kind {
            Kind::Disc { radius } => disc::between(*radius, *radius, distance),
            Kind::Rectangle { width, height } => rectangle::between(*width, *height, distance),
            Kind::Slot { width } => strip::between(*width, distance),
            Kind::Polygon { .. } => {
                // What a plane sends and another does not get, the walls
                // between them do; finely where the walls' share bends.
                let mut lost = 0.0;
                let mut from = 0.0;
                let mut to = (0.02 * self.least_width()).min(distance);
                while from < distance {
                    lost += gauss::SIXTEEN.integral(from, to, |x| self.from_wall(x));
                    (from, to) = (to, (3.0 * to).min(distance));
                }
                (1.0 - self.outline_over_area() * lost).clamp(0.0, 1.0)
            }
        }
    }

    /// Returns the configuration factor from the walls at one depth, all round
    /// the outline together, to a plane across the tunnel, `distance` away.
    ///
    /// It is −A F′/P, with the factor F between planes, the area A and the
    /// outline P; one half at no distance.
    ///
    /// # Accuracy
    ///
    /// Absolute error below `1e-14`; of a polygon below `1e-6`.
    #[must_use]
    pub fn from_wall(&self, distance: f64) -> f64 {
        if distance <= 0.0 {
            return 0.5;
        }
        match &self.kind {
            Kind::Disc { radius } => {
                let ratio = distance / radius;
                let root = ratio.hypot(2.0);
                // (ρ² + 2)/(2√(ρ² + 4)) − ρ/2, rationalised: nothing cancels.
                2.0 / (root * (ratio * ratio + 2.0 + ratio * root))
            }
            Kind::Slot { width } => {
                let slant = width.hypot(distance);
                0.5 * width * (width / slant / (slant + distance))
            }
            Kind::Rectangle { width, height } => {
                let (x, y) = (width / distance, height / distance);
                let (wide, tall) = (1.0_f64.hypot(x), 1.0_f64.hypot(y));
                let more = (x * y / wide.hypot(y)).powi(2);
                let sum = x * (x.atan() - (x / tall).atan() / tall)
                    + y * (y.atan() - (y / wide).atan() / wide)
                    - more.ln_1p();
                (FRAC_2_PI * sum / (2.0 * (x + y))).clamp(0.0, 0.5)
            }
            Kind::Polygon { corners } => of_polygon(corners, distance),
        }
    }
}

/// A polygon in space, in two coordinates of its plane.
fn flattened(vertices: &[DVec3], normal: DVec3) -> Vec<DVec2> {
    let right = normal.any_orthonormal_vector();
    let up = normal.cross(right);
    vertices
        .iter()
        .map(|vertex| {
            let place = *vertex - vertices[0];
            DVec2::new(place.dot(right), place.dot(up))
        })
        .collect()
}

/// Says that a polygon in space has no dent, whatever its number of corners.
pub(in crate::physics) fn convex(vertices: &[DVec3], normal: DVec3) -> Result<(), Error> {
    without_dents(&flattened(vertices, normal))
}

/// One turn about and no more: each edge turns left of the one before.
fn without_dents(corners: &[DVec2]) -> Result<(), Error> {
    let count = corners.len();
    let mut turned = 0.0;
    for (index, corner) in corners.iter().enumerate() {
        let came = *corner - corners[(index + count - 1) % count];
        let goes = corners[(index + 1) % count] - *corner;
        let turn = came.perp_dot(goes).atan2(came.dot(goes));
        if turn.is_nan() || turn < -1e-9 || came.length() < SHORTEST {
            return Err(Error::NotConvex { vertex: index + 1 });
        }
        turned += turn;
    }
    if count < 3 || (turned - 2.0 * PI).abs() > 1e-6 {
        return Err(Error::NotConvex { vertex: 1 });
    }
    Ok(())
}

/// The edges of a polygon.
fn edges(corners: &[DVec2]) -> impl Iterator<Item = (DVec2, DVec2)> + '_ {
    let next = corners.iter().cycle().skip(1);
    corners.iter().copied().zip(next.copied())
}

fn outline(corners: &[DVec2]) -> f64 {
    edges(corners).map(|(from, to)| from.distance(to)).sum()
}

/// The mean over the outline of the factor to a polygon, exact at each place.
fn of_polygon(corners: &[DVec2], distance: f64) -> f64 {
    let mut sum = 0.0;
    for (from, to) in edges(corners) {
        let along = to - from;
        let inward = along.perp().normalize_or_zero().extend(0.0);
        // Near a corner the factor changes within the distance: the points
        // crowd to both ends, s = u² (3 − 2u).
        sum += along.length()
            * gauss::SIXTEEN.integral(0.0, 1.0, |u| {
                let place = from + along * (u * u * (3.0 - 2.0 * u));
                let seen = |corner: DVec2| (corner - place).extend(distance);
                let flux: DVec3 = edges(corners)
                    .map(|(one, other)| contour::edge(seen(other), seen(one)))
                    .sum();
                6.0 * u * (1.0 - u) * flux.dot(inward).abs()
            });
    }
    (sum / outline(corners)).clamp(0.0, 0.5)
}
