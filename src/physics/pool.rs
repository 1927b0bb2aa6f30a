//! Pools of metal or glass in a vessel: what of them is seen over the rim, and
//! the inner wall between the metal and the rim.
//!
//! Lengths in metres, z up; the metal lies level. The vessel's inner wall is
//! straight along its axis, and its bottom lies below the metal everywhere.

pub mod stream;
#[cfg(test)]
mod tests;

use std::f64::consts::TAU;

use glam::DVec3;

use super::Error;
use super::error::{SHORTEST, offset};
use super::opening::section;
use super::region::Region;
use super::scene::Part;

/// Sides of the polygon that stands for an ellipse of the same area.
///
/// With 96 sides it leaves the ellipse by at most 3.6·10⁻⁴ of the half axes.
const SIDES: u16 = 96;

/// A pool in a vessel, with what of its wall is seen.
#[derive(Clone, Debug)]
pub struct Pool {
    parts: Vec<Part>,
}

impl Pool {
    /// Returns a pool in an upright vessel.
    ///
    /// `metal` is the outline of the metal's surface, facing straight up;
    /// `freeboard` is its depth below the rim, which may be zero.
    ///
    /// # Accuracy
    ///
    /// Exact outlines. Radiation that metal and wall reflect of each other is
    /// left out: the truth is higher, the more so the deeper the metal lies and
    /// the barer it is.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the freeboard is negative (the rim would lie
    /// below the metal) or beyond 10⁹ m; [`Error::WrongShape`] if the outline
    /// is not a level disc or polygon; [`Error::NotConvex`] if it has a dent,
    /// below a rim.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::pool::Pool;
    /// use farglow::physics::region::Region;
    /// use farglow::physics::scene::Scene;
    /// use glam::DVec3;
    ///
    /// let metal = Region::disc(DVec3::ZERO, DVec3::Z, 0.5)?;
    /// let ladle = Pool::new(metal, 0.4)?;
    /// let scene = Scene::new(ladle.parts().to_vec(), Vec::new())?;
    /// // From the side, just above the rim, only the far wall is seen.
    /// let looked = scene.look(DVec3::new(3.0, 0.0, 0.6));
    /// assert!(looked.of(0).is_empty() && !looked.of(1).is_empty());
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn new(metal: Region, freeboard: f64) -> Result<Self, Error> {
        let freeboard = offset("freeboard", freeboard)?;
        let normal = flat(&metal, "a pool")?;
        if normal.z < 1.0 - 1e-9 {
            return Err(Error::WrongShape {
                parameter: "the surface of a pool",
                wanted: "level, facing up",
            });
        }
        if freeboard < SHORTEST {
            return Ok(Self {
                parts: vec![Part::bare(metal)],
            });
        }
        without_dents(&metal, normal)?;
        let rim = metal.moved(normal * freeboard);
        Ok(Self::within(metal, rim))
    }

    /// Returns a pool in a vessel that is tilted: the rim tilts, the metal stays
    /// level.
    ///
    /// `rim` is the inner outline of the rim, its normal along the vessel's axis
    /// and upwards; `level` is the height z of the metal's surface.
    ///
    /// # Accuracy
    ///
    /// The metal's outline is the cut of the vessel's inner wall with the level
    /// plane: exact for a polygon. For a round rim it is an ellipse, here a
    /// polygon of 96 sides and of the same area, which leaves it by at most
    /// `3.6e-4` of its half axes; the factor to all of the metal is then good
    /// to `1e-6` from a diameter away. Reflections as [`Pool::new`].
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the vessel lies on its side or beyond, or the
    /// lowest place of the rim below the metal, which would run out;
    /// [`Error::WrongShape`] and [`Error::NotConvex`] for the rim.
    ///
    /// # Source
    ///
    /// A cylinder cut at a slant; checked in this module's tests against a
    /// vessel that stands upright, and by counting rays.
    pub fn tilted(rim: Region, level: f64) -> Result<Self, Error> {
        let axis = flat(&rim, "the rim of a vessel")?;
        let level = super::error::place("level of the metal", DVec3::new(0.0, 0.0, level))?.z;
        if axis.z < 1e-3 {
            return Err(Error::OutOfRange {
                parameter: "the tilt of a vessel's axis off the vertical, as cosine",
                range: "at least 0.001, mouth up",
                value: axis.z,
            });
        }
        without_dents(&rim, axis)?;
        let lowest = lowest(&rim);
        let clearance = lowest - level;
        if clearance < -1e-9 * (lowest.abs() + level.abs()) {
            return Err(Error::OutOfRange {
                parameter: "the height of the rim's lowest place above the metal",
                range: "zero or more, or the metal runs out",
                value: clearance,
            });
        }
        let metal = surface(&rim, axis, level)?;
        if axis.z >= 1.0 - 1e-12 && clearance < SHORTEST {
            return Ok(Self {
                parts: vec![Part::bare(metal)],
            });
        }
        Ok(Self::within(metal, rim))
    }

    fn within(metal: Region, rim: Region) -> Self {
        Self {
            parts: vec![
                Part {
                    region: metal.clone(),
                    through: Some(rim.clone()),
                    less: None,
                },
                Part {
                    region: rim,
                    through: None,
                    less: Some(metal),
                },
            ],
        }
    }

    /// Returns the parts: first the metal, then, if there is a freeboard, the
    /// inner wall.
    #[must_use]
    pub fn parts(&self) -> &[Part] {
        &self.parts
    }

    /// Returns the outline of the metal's surface.
    #[must_use]
    pub fn metal(&self) -> &Region {
        &self.parts[0].region
    }
}

/// The normal of a disc or polygon.
fn flat(region: &Region, parameter: &'static str) -> Result<DVec3, Error> {
    match region {
        Region::Disc { normal, .. } | Region::Polygon { normal, .. } => Ok(*normal),
        Region::Sphere { .. } | Region::Cylinder { .. } | Region::Plate { .. } => {
            Err(Error::WrongShape {
                parameter,
                wanted: "a flat disc or polygon",
            })
        }
    }
}

/// Refuses outlines part of whose wall another part hides.
fn without_dents(region: &Region, normal: DVec3) -> Result<(), Error> {
    if let Region::Polygon { vertices, .. } = region {
        section::convex(vertices, normal)?;
    }
    Ok(())
}

/// The height of a region's lowest place.
fn lowest(region: &Region) -> f64 {
    match region {
        Region::Disc {
            centre,
            normal,
            radius,
        } => centre.z - radius * normal.truncate().length(),
        Region::Polygon { vertices, .. } => vertices
            .iter()
            .map(|vertex| vertex.z)
            .fold(f64::INFINITY, f64::min),
        Region::Sphere { .. } | Region::Cylinder { .. } | Region::Plate { .. } => {
            region.centre().z - region.bounding_radius()
        }
    }
}

/// The cut of the wall below a rim with the level plane.
fn surface(rim: &Region, axis: DVec3, level: f64) -> Result<Region, Error> {
    let down = |place: DVec3| {
        let place = place + axis * ((level - place.z) / axis.z);
        DVec3::new(place.x, place.y, level)
    };
    match rim {
        Region::Disc { centre, radius, .. } => {
            let middle = down(*centre);
            if axis.z >= 1.0 - 1e-12 {
                return Region::disc(middle, DVec3::Z, *radius);
            }
            // The long half axis points the way the vessel tilts.
            let way = axis.truncate().normalize().extend(0.0);
            let across = DVec3::Z.cross(way);
            let step = TAU / f64::from(SIDES);
            let scale = radius * (step / step.sin()).sqrt();
            let corner = |index: u16| {
                let (sine, cosine) = (step * (f64::from(index) + 0.5)).sin_cos();
                middle + way * (scale / axis.z * cosine) + across * (scale * sine)
            };
            Region::polygon((0..SIDES).map(corner).collect())
        }
        Region::Polygon { vertices, .. } => {
            Region::polygon(vertices.iter().map(|vertex| down(*vertex)).collect())
        }
        Region::Sphere { .. } | Region::Cylinder { .. } | Region::Plate { .. } => {
            Err(Error::WrongShape {
                parameter: "the rim of a vessel",
                wanted: "a flat disc or polygon",
            })
        }
    }
}
