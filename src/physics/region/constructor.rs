//! Making regions: what is not possible is refused at the door.

use glam::DVec3;

use super::super::Error;
use super::super::error::{direction, length, place};
use super::{MOST_VERTICES, Region, outline};

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

    /// Checks what the constructors do, but for the outline of a polygon.
    pub(in crate::physics) fn checked(&self) -> Result<(), Error> {
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
