//! Emitting regions in space: disc, polygon, sphere, in any pose.
//!
//! Metres; x east, y north, z up. A flat region emits to the side its normal
//! points to. Make regions with the constructors, which check.

use glam::DVec3;

use super::Error;
use super::view::Sight;

/// The greatest number of vertices of a polygon.
pub const MOST_VERTICES: usize = 10_000;

/// A region that emits: flat ones from the face their normal points away from.
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
}

impl Region {
    /// Returns a disc.
    ///
    /// # Errors
    ///
    /// [`Error`] where a number or the normal cannot be.
    pub fn disc(centre: DVec3, normal: DVec3, radius: f64) -> Result<Self, Error> {
        let _ = (centre, normal, radius);
        Err(Error::VertexCount { found: 0 })
    }
    /// Returns a rectangle.
    ///
    /// # Errors
    ///
    /// [`Error`] where a number or a direction cannot be.
    pub fn rectangle(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        width: f64,
        height: f64,
    ) -> Result<Self, Error> {
        let _ = (centre, normal, up, width, height);
        Err(Error::VertexCount { found: 0 })
    }
    /// Returns a polygon; anticlockwise as seen from in front.
    ///
    /// # Errors
    ///
    /// [`Error`] if it is no simple flat polygon.
    pub fn polygon(vertices: Vec<DVec3>) -> Result<Self, Error> {
        Err(Error::VertexCount {
            found: vertices.len(),
        })
    }
    /// Returns a polygon drawn in its own plane, from points `[sideways, up]`
    /// off its centre, in either order around it.
    ///
    /// # Errors
    ///
    /// [`Error`] if it is no simple polygon.
    pub fn outline(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        points: &[[f64; 2]],
    ) -> Result<Self, Error> {
        let _ = (centre, normal, up);
        Err(Error::VertexCount {
            found: points.len(),
        })
    }
    /// Returns a sphere.
    ///
    /// # Errors
    ///
    /// [`Error`] where a number cannot be.
    pub fn sphere(centre: DVec3, radius: f64) -> Result<Self, Error> {
        let _ = (centre, radius);
        Err(Error::VertexCount { found: 0 })
    }
    /// Returns the emitting area, m².
    #[must_use]
    pub fn area(&self) -> f64 {
        0.0
    }
    /// Returns the centre; of a polygon that of its area.
    #[must_use]
    pub fn centre(&self) -> DVec3 {
        DVec3::ZERO
    }
    /// Returns the distance from the centre to the outermost point.
    #[must_use]
    pub fn bounding_radius(&self) -> f64 {
        0.0
    }
    /// Says whether a point lies on the region, or inside a sphere.
    #[must_use]
    pub fn touches(&self, point: DVec3) -> bool {
        let _ = point;
        false
    }
    /// Says whether the straight way between two points meets the region.
    #[must_use]
    pub fn crosses(&self, from: DVec3, to: DVec3) -> bool {
        let _ = (from, to);
        false
    }
    /// Returns the horizontal distance from the centre to the outline, on the
    /// plan, along a direction.
    #[must_use]
    pub fn edge_along(&self, direction: DVec3) -> f64 {
        let _ = direction;
        0.0
    }
    /// Returns what is seen of the region from a point.
    #[must_use]
    pub fn view(&self, point: DVec3) -> Sight {
        let _ = point;
        Sight::Behind
    }
}
