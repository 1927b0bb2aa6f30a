//! What is seen of several emitting parts from a point, with what hides them.

use glam::DVec3;

use super::Error;
use super::region::Region;
use super::view::{Sight, View};

/// One emitting part of a source: all of one exitance.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// What emits.
    pub region: Region,
    /// Seen only through this flat outline.
    pub through: Option<Region>,
    /// What is seen of this region does not belong to the part.
    pub less: Option<Region>,
}

/// Something that hides or dims what lies behind it.
#[derive(Clone, Debug, PartialEq)]
pub struct Barrier {
    /// Where it is.
    pub region: Region,
    /// Whether it lets part through.
    pub clear: bool,
}

/// A piece of a part seen through the same set of clear barriers.
#[derive(Clone, Debug, PartialEq)]
pub struct Glimpse {
    /// Which part.
    pub part: usize,
    /// The clear barriers, ascending.
    pub through: Box<[u16]>,
    /// What is seen.
    pub view: View,
}

/// What is seen from a point.
#[derive(Clone, Debug, PartialEq)]
pub struct Looked {
    /// The pieces, by part.
    pub glimpses: Vec<Glimpse>,
    /// The parts that the point touches.
    pub touching: Vec<usize>,
}

/// Parts and barriers.
#[derive(Clone, Debug, PartialEq)]
pub struct Scene {
    parts: Vec<Part>,
    barriers: Vec<Barrier>,
}

impl Scene {
    /// Returns the scene.
    ///
    /// # Errors
    ///
    /// None.
    pub fn new(parts: Vec<Part>, barriers: Vec<Barrier>) -> Result<Scene, Error> {
        Ok(Scene { parts, barriers })
    }

    /// Returns what is seen of every part from a point.
    #[must_use]
    pub fn look(&self, point: DVec3) -> Looked {
        let mut looked = Looked {
            glimpses: Vec::new(),
            touching: Vec::new(),
        };
        for (part, of) in self.parts.iter().enumerate() {
            match of.region.view(point) {
                Sight::Behind => {}
                Sight::Touching => looked.touching.push(part),
                Sight::Seen(view) => looked.glimpses.push(Glimpse {
                    part,
                    through: Box::new([]),
                    view,
                }),
            }
        }
        looked
    }
}
