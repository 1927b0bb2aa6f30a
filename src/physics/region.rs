//! Emitting regions in space: disc, polygon, plate, sphere, cylinder, in any pose.
//!
//! Metres; x east, y north, z up. A flat region emits to the side its normal
//! points to. Make regions with the constructors, which check: the rest stands
//! on normals of length one and polygons that are flat and simple.

pub(in crate::physics) mod cylinder;
mod outline;
mod plan;
#[cfg(test)]
mod tests;

use std::f64::consts::{PI, TAU};

use glam::DVec3;

use super::Error;
use super::error::{direction, length, place};
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
    /// Returns a flat disc.
    ///
    /// `normal` of any length, to the side that emits; `radius` in metres.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the radius is not from 10⁻⁹ m to 10⁹ m
    /// or a coordinate beyond that; [`Error::NoDirection`] for the normal.
    pub fn disc(centre: DVec3, normal: DVec3, radius: f64) -> Result<Self, Error> {
        Ok(Self::Disc {
            centre: place("centre", centre)?,
            normal: direction("normal", normal)?,
            radius: length("radius", radius)?,
        })
    }

    /// Returns a rectangle, as a polygon.
    ///
    /// `normal` to the side that emits, `up` along its height (what of it is
    /// perpendicular to the normal counts), both of any length; `width` and
    /// `height` in metres.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m or
    /// a coordinate beyond that; [`Error::NoDirection`] for the normal, or for
    /// `up` if it runs along the normal.
    pub fn rectangle(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        width: f64,
        height: f64,
    ) -> Result<Self, Error> {
        let centre = place("centre", centre)?;
        let normal = direction("normal", normal)?;
        let up = upright(up, normal)?;
        let side = up.cross(normal) * (0.5 * length("width", width)?);
        let up = up * (0.5 * length("height", height)?);
        let vertices = vec![
            centre - side - up,
            centre + side - up,
            centre + side + up,
            centre - side + up,
        ];
        Ok(Self::Polygon { vertices, normal })
    }

    /// Returns a flat simple polygon; dents are allowed.
    ///
    /// `vertices` in metres, in order, anticlockwise as seen from the side that
    /// emits. A vertex given twice in a row counts once.
    ///
    /// # Errors
    ///
    /// [`Error::VertexCount`] unless there are 3 to [`MOST_VERTICES`];
    /// [`Error::OutOfRange`] for a coordinate beyond 10⁹ m;
    /// [`Error::NoArea`], [`Error::NotFlat`] (by more than 10⁻⁹ of its extent),
    /// [`Error::CrossesItself`].
    pub fn polygon(vertices: Vec<DVec3>) -> Result<Self, Error> {
        let (vertices, normal) = outline::checked(vertices)?;
        Ok(Self::Polygon { vertices, normal })
    }

    /// Returns a polygon drawn in its own plane.
    ///
    /// `points` are `[sideways, up]` off the centre, in metres, in either order
    /// round the outline; sideways is to the right as seen from in front.
    /// `normal` and `up` as for [`Region::rectangle`].
    ///
    /// # Errors
    ///
    /// As [`Region::rectangle`] and [`Region::polygon`].
    pub fn outline(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        points: &[[f64; 2]],
    ) -> Result<Self, Error> {
        let centre = place("centre", centre)?;
        let normal = direction("normal", normal)?;
        let up = upright(up, normal)?;
        let side = up.cross(normal);
        let vertices: Vec<DVec3> = points
            .iter()
            .map(|[right, above]| centre + side * *right + up * *above)
            .collect();
        let (mut vertices, found) = outline::checked(vertices)?;
        if found.dot(normal) < 0.0 {
            vertices.reverse();
        }
        Ok(Self::Polygon { vertices, normal })
    }

    /// Returns a sphere.
    ///
    /// `radius` in metres.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the radius is not from 10⁻⁹ m to 10⁹ m,
    /// or a coordinate beyond that.
    pub fn sphere(centre: DVec3, radius: f64) -> Result<Self, Error> {
        Ok(Self::Sphere {
            centre: place("centre", centre)?,
            radius: length("radius", radius)?,
        })
    }

    /// Returns a solid cylinder.
    ///
    /// `base` is the centre of one end face and `axis` leads from there to the
    /// centre of the other; lengths in metres.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the radius or the axis is not from 10⁻⁹ m to
    /// 10⁹ m long, or a coordinate beyond that; [`Error::NoDirection`] for the
    /// axis.
    pub fn cylinder(base: DVec3, axis: DVec3, radius: f64) -> Result<Self, Error> {
        let base = place("base", base)?;
        let _ = direction("axis", axis)?;
        let axis = place("axis", axis)?;
        let _ = length("length of the axis", axis.length())?;
        Ok(Self::Cylinder {
            base,
            axis,
            radius: length("radius", radius)?,
        })
    }

    /// Returns a thin rectangular plate, which emits from both faces.
    ///
    /// As [`Region::rectangle`]; `normal` is that of its front.
    ///
    /// # Errors
    ///
    /// As [`Region::rectangle`].
    pub fn plate(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        width: f64,
        height: f64,
    ) -> Result<Self, Error> {
        match Self::rectangle(centre, normal, up, width, height)? {
            Self::Polygon { vertices, normal } => Ok(Self::Plate { vertices, normal }),
            other => Ok(other),
        }
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

    /// Checks what the constructors do, but for the outline of a polygon.
    pub(super) fn checked(&self) -> Result<(), Error> {
        match self {
            Self::Disc {
                centre,
                normal,
                radius,
            } => Self::disc(*centre, *normal, *radius).map(drop),
            Self::Sphere { centre, radius } => Self::sphere(*centre, *radius).map(drop),
            Self::Cylinder { base, axis, radius } => {
                Self::cylinder(*base, *axis, *radius).map(drop)
            }
            Self::Polygon { vertices, normal } | Self::Plate { vertices, normal } => {
                let found = vertices.len();
                if !(3..=MOST_VERTICES).contains(&found) {
                    return Err(Error::VertexCount { found });
                }
                for vertex in vertices {
                    let _ = place("vertex", *vertex)?;
                }
                direction("normal", *normal).map(drop)
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

    /// Says whether the straight way between two points meets the region,
    /// ends included.
    ///
    /// Ways that are not between finite places meet it, so that they are
    /// refused.
    #[must_use]
    pub fn crosses(&self, from: DVec3, to: DVec3) -> bool {
        if !from.is_finite() || !to.is_finite() {
            return true;
        }
        let way = to - from;
        // Too far away to come near, with room for all rounding: most ways are.
        let (centre, radius) = self.ball();
        let apart = from.distance(centre) - way.length();
        if apart > radius + 1e-6 * (radius + size(from) + size(to)) {
            return false;
        }
        if self.touches(from) || self.touches(to) {
            return true;
        }
        match self {
            Self::Sphere { centre, radius } => distance_to_segment(*centre, from, to) <= *radius,
            Self::Cylinder { base, axis, radius } => {
                Cylinder::new(*base, *axis, *radius).is_met_by(from, to)
            }
            Self::Disc {
                centre,
                normal,
                radius,
            } => match meeting(*centre, *normal, from, way) {
                Meeting::Apart => false,
                Meeting::At(place) => place.distance(*centre) <= *radius,
                Meeting::InPlane => distance_to_segment(*centre, from, to) <= *radius,
            },
            Self::Polygon { vertices, normal } | Self::Plate { vertices, normal } => {
                match meeting(vertices[0], *normal, from, way) {
                    Meeting::Apart => false,
                    Meeting::At(place) => outline::holds(vertices, *normal, place, 0.0),
                    Meeting::InPlane => outline::is_met_by(vertices, *normal, from, to),
                }
            }
        }
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

/// What of `up` is perpendicular to `normal`, with length one.
fn upright(up: DVec3, normal: DVec3) -> Result<DVec3, Error> {
    let up = direction("up", up)?;
    let upright = up - normal * up.dot(normal);
    let found = upright.length();
    if found < 1e-9 {
        return Err(Error::NoDirection {
            parameter: "what of `up` lies in the region's plane",
            length: found,
        });
    }
    // Taken off twice, so that it is perpendicular however short it was.
    let upright = upright / found;
    Ok((upright - normal * upright.dot(normal)).normalize())
}

/// How a segment meets a plane.
enum Meeting {
    Apart,
    At(DVec3),
    InPlane,
}

fn meeting(on: DVec3, normal: DVec3, from: DVec3, way: DVec3) -> Meeting {
    let reach = TOUCH * ((from - on).length() + way.length() + on.length());
    let (start, end) = ((from - on).dot(normal), (from + way - on).dot(normal));
    if start.abs() <= reach && end.abs() <= reach {
        Meeting::InPlane
    } else if start * end > 0.0 {
        Meeting::Apart
    } else {
        Meeting::At(from + way * (start / (start - end)))
    }
}

fn distance_to_segment(place: DVec3, from: DVec3, to: DVec3) -> f64 {
    let way = to - from;
    let square = way.length_squared();
    let share = if square > 0.0 {
        ((place - from).dot(way) / square).clamp(0.0, 1.0)
    } else {
        0.0
    };
    (from + way * share).distance(place)
}
