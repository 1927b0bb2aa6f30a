//! What a small receiver sees of everything hot at once, past everything that
//! hides it.
//!
//! A scene holds the emitting parts and the barriers; it is built once and then
//! looked at from many points. Lengths in metres.

mod looked;

use glam::DVec3;

use super::Error;
use super::region::Region;
use super::view::Sight;

pub use looked::{Glimpse, Looked, Stance};

/// One emitting part of a source, all of one exitance.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// Where it emits from.
    pub region: Region,
    /// It is seen only through this flat outline (the rim of a vessel, the outer
    /// edge of an opening in a wall), and only from in front of it; none if it
    /// is seen from everywhere.
    pub through: Option<Region>,
    /// What is seen through this flat outline does not belong to the part: it
    /// lies within `region` as seen through the mouth (the next deeper edge of
    /// a tunnel, the metal within a rim).
    pub less: Option<Region>,
}

impl Part {
    /// Returns a part that is seen from everywhere, all of it.
    #[must_use]
    pub fn bare(region: Region) -> Self {
        Self {
            region,
            through: None,
            less: None,
        }
    }
}

/// Something that hides, or dims, what lies behind it.
#[derive(Clone, Debug, PartialEq)]
pub struct Barrier {
    /// What it covers; a flat one covers from both sides.
    pub region: Region,
    /// False if it hides all that is behind it, true if it lets part through
    /// (mesh, chain curtain, filter): then the glimpses say that they pass it.
    pub clear: bool,
}

/// Emitting parts and what hides them.
#[derive(Clone, Debug)]
pub struct Scene {
    parts: Vec<Part>,
    barriers: Vec<Barrier>,
}

impl Scene {
    /// Returns the scene of these parts and barriers.
    ///
    /// # Errors
    ///
    /// None yet.
    pub fn new(parts: Vec<Part>, barriers: Vec<Barrier>) -> Result<Self, Error> {
        Ok(Self { parts, barriers })
    }

    /// Returns the parts.
    #[must_use]
    pub fn parts(&self) -> &[Part] {
        &self.parts
    }

    /// Returns the barriers.
    #[must_use]
    pub fn barriers(&self) -> &[Barrier] {
        &self.barriers
    }

    /// Returns what is seen of every part from a point.
    #[must_use]
    pub fn look(&self, point: DVec3) -> Looked {
        let mut looked = Looked::with_room(self.parts.len());
        for part in &self.parts {
            match part.region.view(point) {
                Sight::Touching => looked.add(Stance::Touching, []),
                Sight::Behind => looked.add(Stance::Behind, []),
                Sight::Seen(view) => looked.add(Stance::InFront, [(Box::default(), view)]),
            }
        }
        looked
    }
}
