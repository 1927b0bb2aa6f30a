//! Emitting regions in space: disc, polygon, plate, sphere, cylinder, in any pose.
//!
//! Metres; x east, y north, z up. A flat region emits to the side its normal
//! points to. Make regions with the constructors, which check: the rest stands
//! on normals of length one and polygons that are flat and simple.

mod constructor;
pub(in crate::physics) mod cylinder;
mod outline;
mod plan;
#[cfg(test)]
mod tests;
mod way;

use std::f64::consts::{PI, TAU};

use glam::DVec3;

use super::view::{Sight, View};
use cylinder::Cylinder;

/// The greatest number of vertices of a polygon.
pub const MOST_VERTICES: usize = 1000;

/// How near counts as touching, relative to the lengths at play: well above
/// rounding, well below what a person can measure.
const TOUCH: f64 = 1e-12;

/// Farther than this, in metres, nothing is seen of any region.
const OUT_OF_SIGHT: f64 = 1e40;

/// A region that emits diffusely.
#[derive(Clone, Debug, PartialEq)]
pub enum Region {
    /// A flat disc.
    Disc {
        /// The centre.
        centre: DVec3,
        /// The outward normal, of length one.
        normal: DVec3,
        /// The radius.
        radius: f64,
    },
    /// A flat simple polygon.
    Polygon {
        /// The vertices, anticlockwise as seen from in front.
        vertices: Vec<DVec3>,
        /// The outward normal, of length one.
        normal: DVec3,
    },
    /// A sphere.
    Sphere {
        /// The centre.
        centre: DVec3,
        /// The radius.
        radius: f64,
    },
    /// A solid cylinder; all its faces emit.
    Cylinder {
        /// The centre of one end face.
        base: DVec3,
        /// From there to the centre of the other end face.
        axis: DVec3,
        /// The radius.
        radius: f64,
    },
    /// A thin flat plate, which emits from both faces.
    Plate {
        /// The vertices, anticlockwise as seen from in front.
        vertices: Vec<DVec3>,
        /// The normal of the front, of length one.
        normal: DVec3,
    },
}

impl Region {
    /// Returns the same region elsewhere.
    ///
    /// `by` in metres.
    #[must_use]
    pub fn moved(&self, by: DVec3) -> Self {
        let mut region = self.clone();
        match &mut region {
            Self::Disc { centre, .. } | Self::Sphere { centre, .. } => *centre += by,
            Self::Cylinder { base, .. } => *base += by,
            Self::Polygon { vertices, .. } | Self::Plate { vertices, .. } => {
                for vertex in vertices {
                    *vertex += by;
                }
            }
        }
        region
    }

    /// Returns the emitting area in m²: of a flat region one face, of a plate
    /// both, of a body all of it.
    #[must_use]
    pub fn area(&self) -> f64 {
        match self {
            Self::Disc { radius, .. } => PI * radius * radius,
            Self::Polygon { vertices, .. } => 0.5 * outline::double_area(vertices).length(),
            Self::Plate { vertices, .. } => outline::double_area(vertices).length(),
            Self::Sphere { radius, .. } => 4.0 * PI * radius * radius,
            Self::Cylinder { axis, radius, .. } => TAU * radius * (axis.length() + radius),
        }
    }

    /// Returns the centre; of a polygon the centroid of its area.
    #[must_use]
    pub fn centre(&self) -> DVec3 {
        match self {
            Self::Disc { centre, .. } | Self::Sphere { centre, .. } => *centre,
            Self::Cylinder { base, axis, .. } => *base + *axis * 0.5,
            Self::Polygon { vertices, normal } | Self::Plate { vertices, normal } => {
                outline::centroid(vertices, *normal)
            }
        }
    }

    /// Returns the outward normal of a flat region, of length one (of a plate
    /// that of its front); none of a sphere or a cylinder.
    #[must_use]
    pub fn normal(&self) -> Option<DVec3> {
        match self {
            Self::Disc { normal, .. }
            | Self::Polygon { normal, .. }
            | Self::Plate { normal, .. } => Some(*normal),
            Self::Sphere { .. } | Self::Cylinder { .. } => None,
        }
    }

    /// Returns the distance in metres from the centre to the outermost point.
    #[must_use]
    pub fn bounding_radius(&self) -> f64 {
        match self {
            Self::Disc { radius, .. } | Self::Sphere { radius, .. } => *radius,
            Self::Cylinder { axis, radius, .. } => (0.5 * axis.length()).hypot(*radius),
            Self::Polygon { vertices, .. } | Self::Plate { vertices, .. } => {
                let centre = self.centre();
                vertices
                    .iter()
                    .map(|vertex| vertex.distance(centre))
                    .fold(0.0, f64::max)
            }
        }
    }

    /// Returns a ball that holds the region, quickly rather than narrowly.
    pub(super) fn ball(&self) -> (DVec3, f64) {
        match self {
            Self::Disc { centre, radius, .. } | Self::Sphere { centre, radius } => {
                (*centre, *radius)
            }
            Self::Cylinder { .. } => (self.centre(), self.bounding_radius()),
            Self::Polygon { vertices, .. } | Self::Plate { vertices, .. } => {
                let first = vertices[0];
                let distances = vertices.iter().map(|vertex| vertex.distance(first));
                (first, distances.fold(0.0, f64::max))
            }
        }
    }

    /// Says whether a point lies on a flat region or its edge, or on or inside
    /// a body: to 10⁻¹² of the lengths at play.
    ///
    /// A point that is not a finite place counts as touching, so that it is
    /// refused.
    #[must_use]
    pub fn touches(&self, point: DVec3) -> bool {
        matches!(self.view(point), Sight::Touching)
    }

    /// Returns the horizontal distance in metres from the centre to the
    /// region's outline on the plan, along a direction.
    ///
    /// `heading` is the direction; what of it is horizontal counts. The result
    /// is that of the outermost place where the line leaves the outline: zero
    /// for a vertical plate seen square on, and for a direction straight up.
    #[must_use]
    pub fn edge_along(&self, heading: DVec3) -> f64 {
        self.edge_from(self.centre(), heading)
    }

    /// Returns the same from another place than the centre; zero if the line
    /// misses the region.
    #[must_use]
    pub fn edge_from(&self, place: DVec3, heading: DVec3) -> f64 {
        plan::edge_from(self, place, heading)
    }

    /// Returns what is seen of the region from a point.
    ///
    /// Behind the plane of a flat region nothing is; in that plane outside the
    /// outline it lies edge on, and the view is empty. On the region, on or
    /// inside a body (to 10⁻¹² of the lengths at play), and from a place that
    /// is not finite, the answer is [`Sight::Touching`].
    #[must_use]
    #[inline]
    pub fn view(&self, point: DVec3) -> Sight {
        if !point.is_finite() {
            return Sight::Touching;
        }
        match self {
            Self::Sphere { centre, radius } => {
                let seen = *centre - point;
                if size(seen) > OUT_OF_SIGHT {
                    return Sight::Seen(View::EMPTY);
                }
                let distance = seen.length();
                if distance <= *radius + TOUCH * (radius + size(point)) {
                    return Sight::Touching;
                }
                Sight::Seen(View::of_sphere(seen, *radius))
            }
            Self::Disc {
                centre,
                normal,
                radius,
            } => {
                let seen = *centre - point;
                let height = -seen.dot(*normal);
                let reach = TOUCH * (size(seen) + radius + size(point));
                if height > reach {
                    if size(seen) > OUT_OF_SIGHT {
                        return Sight::Seen(View::EMPTY);
                    }
                    return Sight::Seen(View::of_disc(seen, *normal, *radius));
                }
                if height < -reach {
                    return Sight::Behind;
                }
                if seen.length() <= radius + reach {
                    Sight::Touching
                } else {
                    Sight::Seen(View::EMPTY)
                }
            }
            Self::Cylinder { base, axis, radius } => {
                if size(*base - point) > OUT_OF_SIGHT {
                    return Sight::Seen(View::EMPTY);
                }
                let cylinder = Cylinder::new(*base, *axis, *radius);
                if cylinder.touches(point) {
                    return Sight::Touching;
                }
                Sight::Seen(cylinder.view(point))
            }
            Self::Polygon { vertices, normal } | Self::Plate { vertices, normal } => {
                let seen = vertices[0] - point;
                let height = -seen.dot(*normal);
                let reach = TOUCH * (size(seen) + size(point));
                if height > reach {
                    if size(seen) > OUT_OF_SIGHT {
                        return Sight::Seen(View::EMPTY);
                    }
                    return Sight::Seen(View::of_polygon(vertices, point));
                }
                if height < -reach {
                    if matches!(self, Self::Polygon { .. }) {
                        return Sight::Behind;
                    }
                    if size(seen) > OUT_OF_SIGHT {
                        return Sight::Seen(View::EMPTY);
                    }
                    let back: Vec<DVec3> = vertices.iter().rev().copied().collect();
                    return Sight::Seen(View::of_polygon(&back, point));
                }
                if outline::holds(vertices, *normal, point, reach) {
                    Sight::Touching
                } else {
                    Sight::Seen(View::EMPTY)
                }
            }
        }
    }
}

/// The largest coordinate: a length that costs no root.
#[inline]
fn size(vector: DVec3) -> f64 {
    vector.abs().max_element()
}
