//! What a small receiver at a point sees of one region.
//!
//! A view holds the flux vector of the whole region and its outline as seen
//! from the point, so that any receiver orientation costs a few products, and a
//! cut at the receiver's horizon only where there is one.

pub(super) mod loops;
#[cfg(test)]
mod tests;

use std::f64::consts::PI;

use glam::DVec3;

use super::view_factor::contour::{self, Circle};
use super::view_factor::four::Four;
use super::view_factor::{disc, sphere};
use loops::{Loops, Piece};

/// What is seen of a region from a point.
#[derive(Clone, Debug, PartialEq)]
pub enum Sight {
    /// The point lies behind a flat region's plane: nothing is seen.
    Behind,
    /// The point lies on the region, or inside it.
    Touching,
    /// The region is seen, or lies edge on and nothing of it is.
    Seen(View),
}

impl Sight {
    /// Returns the view: an empty one from behind, none when touching.
    #[must_use]
    #[inline]
    pub fn into_view(self) -> Option<View> {
        match self {
            Self::Behind => Some(View::EMPTY),
            Self::Touching => None,
            Self::Seen(view) => Some(view),
        }
    }
}

/// The outline of a region as seen from the point.
#[derive(Clone, Debug, PartialEq)]
enum Shape {
    /// Nothing is seen.
    Nothing,
    /// A disc, or the silhouette of a sphere.
    Circle {
        centre: DVec3,
        normal: DVec3,
        radius: f64,
    },
    /// A polygon of up to four vertices, anticlockwise as seen.
    Few(Four),
    /// A polygon of more.
    Many(Box<[DVec3]>),
    /// Anything else: closed loops of straight edges and arcs.
    Loops(Box<Loops>),
}

/// The view of one region from one point.
#[derive(Clone, Debug, PartialEq)]
pub struct View {
    flux: DVec3,
    shape: Shape,
}

impl View {
    /// The view in which nothing is seen.
    pub const EMPTY: Self = Self {
        flux: DVec3::ZERO,
        shape: Shape::Nothing,
    };

    /// A disc; `centre` from the point, `normal` towards it.
    #[inline]
    pub(super) fn of_disc(centre: DVec3, normal: DVec3, radius: f64) -> Self {
        Self {
            flux: disc::flux(centre, normal, radius),
            shape: Shape::Circle {
                centre,
                normal,
                radius,
            },
        }
    }

    /// A sphere; `centre` from the point, which lies outside.
    #[inline]
    pub(super) fn of_sphere(centre: DVec3, radius: f64) -> Self {
        let distance = centre.length();
        let direction = centre / distance;
        let share = radius / distance;
        let (centre, normal, radius) = sphere::silhouette(direction, radius, distance);
        Self {
            flux: direction * (share * share),
            shape: Shape::Circle {
                centre,
                normal,
                radius,
            },
        }
    }

    /// A polygon; `vertices` in space, anticlockwise as seen from `point`.
    #[inline]
    pub(super) fn of_polygon(vertices: &[DVec3], point: DVec3) -> Self {
        if let Some(four) = Four::seen(vertices, point) {
            Self {
                flux: four.flux(),
                shape: Shape::Few(four),
            }
        } else {
            let many: Box<[DVec3]> = vertices.iter().map(|vertex| *vertex - point).collect();
            Self {
                flux: whole(&many),
                shape: Shape::Many(many),
            }
        }
    }

    /// What lies inside closed loops.
    pub(super) fn of_loops(loops: Loops) -> Self {
        if loops.pieces().is_empty() {
            return Self::EMPTY;
        }
        Self {
            flux: loops.flux(),
            shape: Shape::Loops(Box::new(loops)),
        }
    }

    /// Returns the flux vector, (1/π) ∫ ω dΩ over the directions in which the
    /// region is seen.
    ///
    /// For a receiver above whose horizon the whole region lies the
    /// configuration factor is its component along the normal. Dimensionless;
    /// it points at the region.
    ///
    /// # Accuracy
    ///
    /// Exact relations. Discs and spheres: relative error below `1e-14` at any
    /// distance. Polygons: `1e-16` times distance over size. Cylinders, and
    /// what shadows leave: absolute error below `1e-13`.
    #[must_use]
    pub fn flux(&self) -> DVec3 {
        self.flux
    }

    /// Returns the configuration factor for a receiver of a given normal.
    ///
    /// `normal` in any length; the result is dimensionless, in `0..=1`. Parts
    /// of the region below the receiver's horizon do not count.
    ///
    /// # Accuracy
    ///
    /// As [`View::flux`]; where the horizon cuts the region the absolute error
    /// is below `1e-13`.
    ///
    /// # Source
    ///
    /// Checked in `tests/published/view_factor_catalogue.rs`, and against
    /// quadrature in `tests/laws/view_factor_laws.rs`.
    #[must_use]
    #[inline]
    pub fn factor(&self, normal: DVec3) -> f64 {
        let normal = unit(normal);
        let flux = if self.reaches_below_unit(normal) {
            self.cut(normal)
        } else {
            self.flux
        };
        normal.dot(flux).clamp(0.0, 1.0)
    }

    /// Returns the solid angle in which the region is seen, in sr.
    ///
    /// # Accuracy
    ///
    /// Exact relation for polygons and spheres, absolute error below `1e-13`;
    /// edges that are arcs by quadrature of the contour, `1e-9`.
    ///
    /// # Source
    ///
    /// Spherical triangles by van Oosterom and Strackee (1983); checked against
    /// 2π(1 − cos α) of a cone and the closed form of a rectangle on its axis in
    /// `view/tests.rs`.
    #[must_use]
    pub fn solid_angle(&self) -> f64 {
        let polygon = |vertices: &[DVec3]| {
            let axis = self.flux;
            let from = vertices.iter().cycle().skip(vertices.len() - 1);
            let pieces = (from.zip(vertices))
                .map(|(from, to)| Piece::Straight {
                    from: *from,
                    to: *to,
                })
                .collect();
            Loops::new(pieces, axis).solid_angle()
        };
        match &self.shape {
            Shape::Nothing => 0.0,
            Shape::Circle {
                centre,
                normal,
                radius,
            } => {
                // On the axis in closed form; it is that of every sphere.
                let lateral = centre.cross(*normal).length();
                if lateral <= 1e-15 * centre.length() {
                    let far = centre.length().hypot(*radius);
                    return 2.0 * PI * (radius / far) * (radius / (far + centre.length()));
                }
                let circle = Circle::new(*centre, *normal, *radius);
                Loops::new([Piece::whole(circle)].into(), self.flux).solid_angle()
            }
            Shape::Few(four) => polygon(&four.vertices()),
            Shape::Many(vertices) => polygon(vertices),
            Shape::Loops(loops) => loops.solid_angle(),
        }
    }

    /// Returns a bound on the configuration factor over all receiver
    /// orientations, in `0..=1`.
    ///
    /// Where the whole region is seen within 45° of its flux vector the bound
    /// is the vector's length and is reached; else it is one.
    ///
    /// # Source
    ///
    /// Derived at [`exposure::strongest`](super::exposure::strongest); checked
    /// against all orientations in `tests/laws/exposure_laws.rs`.
    #[must_use]
    pub fn ceiling(&self) -> f64 {
        let length = self.flux.length();
        if length > 0.0 && !self.lies_within_half_right_angle(self.flux / length) {
            return 1.0;
        }
        length.min(1.0)
    }

    /// Returns the flux vector of the part above a receiver's horizon.
    ///
    /// Its component along `normal` is the configuration factor.
    #[must_use]
    pub fn clipped_flux(&self, normal: DVec3) -> DVec3 {
        let normal = unit(normal);
        if self.reaches_below_unit(normal) {
            self.cut(normal)
        } else {
            self.flux
        }
    }

    /// Says whether part of the region lies below a receiver's horizon.
    #[must_use]
    pub fn reaches_below(&self, normal: DVec3) -> bool {
        self.reaches_below_unit(unit(normal))
    }

    #[inline]
    fn reaches_below_unit(&self, normal: DVec3) -> bool {
        match &self.shape {
            Shape::Nothing => false,
            Shape::Circle {
                centre,
                normal: own,
                radius,
            } => {
                let middle = normal.dot(*centre);
                let swing = normal - *own * normal.dot(*own);
                middle < 0.0 || middle * middle < radius * radius * swing.length_squared()
            }
            Shape::Few(four) => four.lowest(normal) < 0.0,
            Shape::Many(vertices) => vertices.iter().any(|vertex| vertex.dot(normal) < 0.0),
            Shape::Loops(loops) => loops.reaches_below(normal),
        }
    }

    #[cold]
    fn cut(&self, normal: DVec3) -> DVec3 {
        match &self.shape {
            Shape::Nothing => DVec3::ZERO,
            Shape::Circle {
                centre,
                normal: own,
                radius,
            } => Circle::new(*centre, *own, *radius).above(normal),
            Shape::Few(four) => contour::polygon_above(&four.vertices(), normal),
            Shape::Many(vertices) => contour::polygon_above(vertices, normal),
            Shape::Loops(loops) => loops.above(normal),
        }
    }

    /// Says whether all of the region is seen within half a right angle of an
    /// axis of length one. May say no of a disc that just fits.
    pub(super) fn lies_within_half_right_angle(&self, axis: DVec3) -> bool {
        const COSINE: f64 = std::f64::consts::FRAC_1_SQRT_2;
        let within = |place: DVec3| place.dot(axis) >= COSINE * place.length();
        match &self.shape {
            Shape::Nothing => true,
            Shape::Circle { centre, radius, .. } => {
                // The ball about the disc subtends asin(R/d) to either side.
                let square = centre.length_squared() - radius * radius;
                if square > 0.0 && centre.dot(axis) >= COSINE * (square.sqrt() + radius) {
                    return true;
                }
                self.extremes().iter().all(|place| within(*place))
            }
            Shape::Few(four) => four.vertices().iter().all(|vertex| within(*vertex)),
            Shape::Many(vertices) => vertices.iter().all(|vertex| within(*vertex)),
            Shape::Loops(loops) => loops.extremes().all(within),
        }
    }

    /// Points whose cone holds the region: the vertices, or those of an octagon
    /// round a circle.
    pub(super) fn extremes(&self) -> Vec<DVec3> {
        match &self.shape {
            Shape::Nothing => Vec::new(),
            Shape::Circle {
                centre,
                normal,
                radius,
            } => {
                const STEP: f64 = std::f64::consts::FRAC_PI_4;
                let around = Circle::new(*centre, *normal, *radius / (0.5 * STEP).cos());
                (0..8_u8)
                    .map(|corner| around.point((f64::from(corner) + 0.5) * STEP))
                    .collect()
            }
            Shape::Few(four) => four.vertices().to_vec(),
            Shape::Many(vertices) => vertices.to_vec(),
            Shape::Loops(loops) => loops.extremes().collect(),
        }
    }
}

/// The flux vector of a whole polygon.
#[inline]
fn whole(vertices: &[DVec3]) -> DVec3 {
    let mut sum = DVec3::ZERO;
    let Some(mut from) = vertices.last() else {
        return sum;
    };
    for to in vertices {
        sum += contour::edge(*from, *to);
        from = to;
    }
    sum
}

/// The vector with length one, or as it is if it points nowhere.
#[inline]
fn unit(vector: DVec3) -> DVec3 {
    if (vector.length_squared() - 1.0).abs() < 1e-15 {
        return vector;
    }
    scaled(vector)
}

#[cold]
fn scaled(vector: DVec3) -> DVec3 {
    let most = vector.abs().max_element();
    if most > 0.0 && vector.is_finite() {
        (vector / most).normalize_or_zero()
    } else {
        DVec3::ZERO
    }
}
