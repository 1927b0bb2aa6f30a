//! What a small receiver sees of everything hot at once, past everything that
//! hides it.
//!
//! A scene holds the emitting parts and the barriers; it is built once and then
//! looked at from many points. Lengths in metres.

mod clip;
mod look;
mod looked;
mod mouth;
mod relation;
mod shade;
mod solid;
#[cfg(test)]
mod tests;

use super::Error;
use super::region::Region;
use relation::Relation;
use solid::Solid;

pub use looked::{Glimpse, Looked, Stance};

/// The most clear barriers that a scene may have.
pub const MOST_BARRIERS: usize = 60_000;

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

impl Barrier {
    /// Returns a barrier that hides all that is behind it.
    #[must_use]
    pub fn solid(region: Region) -> Self {
        Self {
            region,
            clear: false,
        }
    }

    /// Returns a barrier that lets part through.
    #[must_use]
    pub fn clear(region: Region) -> Self {
        Self {
            region,
            clear: true,
        }
    }
}

/// Something that hides: a barrier, or a body among the parts.
#[derive(Clone, Debug)]
struct Occluder {
    solid: Solid,
    /// Which barrier it is; none of a body.
    barrier: Option<usize>,
    /// As in [`Barrier`].
    clear: bool,
}

/// A part as it is looked at.
#[derive(Clone, Debug)]
struct Target {
    solid: Solid,
    through: Option<Solid>,
    less: Option<Solid>,
    /// How each occluder stands to it.
    relations: Vec<Relation>,
}

/// Says whether two regions overlap: whether they have more in common than
/// touching, to a millionth of their size. Flat ones overlap in one plane, or
/// where they run through each other.
///
/// Of use to refuse sources and screens that cannot both be there; a scene can
/// be looked at in spite of many overlaps, and [`Scene::new`] refuses only
/// those in which it cannot be said what hides what.
#[must_use]
pub fn overlap(one: &Region, other: &Region) -> bool {
    let others = relation::pieces(other);
    relation::pieces(one)
        .iter()
        .any(|piece| others.iter().any(|other| piece.meets(other)))
}

/// Emitting parts and what hides them.
///
/// # Examples
///
/// ```
/// use farglow::physics::region::Region;
/// use farglow::physics::scene::{Barrier, Part, Scene};
/// use glam::DVec3;
///
/// let door = Region::rectangle(DVec3::Z, DVec3::Y, DVec3::Z, 0.9, 0.7)?;
/// let plate = Region::rectangle(DVec3::new(0.0, 1.0, 0.5), DVec3::Y, DVec3::Z, 2.0, 1.0)?;
/// let scene = Scene::new(vec![Part::bare(door)], vec![Barrier::solid(plate)])?;
/// let looked = scene.look(DVec3::new(0.0, 2.0, 1.0));
/// let seen = looked.of(0)[0].view.factor(DVec3::NEG_Y);
/// assert!(seen > 0.02 && seen < 0.03, "the upper half shows over the plate");
/// # Ok::<(), farglow::physics::Error>(())
/// ```
#[derive(Clone, Debug)]
pub struct Scene {
    parts: Vec<Part>,
    barriers: Vec<Barrier>,
    targets: Vec<Target>,
    occluders: Vec<Occluder>,
}

impl Scene {
    /// Returns the scene of these parts and barriers.
    ///
    /// A barrier that lies in the plane of a flat part covers it, unless it has
    /// the part's very outline: then the part is taken as the barrier's own hot
    /// face. Bodies among the parts hide the other parts; flat parts do not,
    /// but for plates.
    ///
    /// # Errors
    ///
    /// [`Error::PartsOverlap`] or [`Error::BarrierOverlaps`] where a body that
    /// emits and what hides it overlap (by more than a millionth of the
    /// smaller), so that which hides the other cannot be said;
    /// [`Error::NotAnOutline`]; [`Error::OutOfRange`] and its kin for a region
    /// that its constructor would refuse, or more than [`MOST_BARRIERS`].
    pub fn new(parts: Vec<Part>, barriers: Vec<Barrier>) -> Result<Self, Error> {
        if barriers.len() > MOST_BARRIERS {
            return Err(Error::OutOfRange {
                parameter: "the number of barriers",
                range: "at most 60000",
                value: barriers.len() as f64,
            });
        }
        let mut occluders = Vec::with_capacity(barriers.len());
        for (index, barrier) in barriers.iter().enumerate() {
            barrier.region.checked()?;
            occluders.push(Occluder {
                solid: Solid::new(barrier.region.clone()),
                barrier: Some(index),
                clear: barrier.clear,
            });
        }
        let mut bodies = Vec::new();
        for (index, part) in parts.iter().enumerate() {
            part.region.checked()?;
            for outline in part.through.iter().chain(&part.less) {
                outline.checked()?;
                if outline.normal().is_none() {
                    return Err(Error::NotAnOutline { part: index });
                }
            }
            let hides = !matches!(part.region, Region::Disc { .. } | Region::Polygon { .. });
            if hides
                && !parts[..index]
                    .iter()
                    .any(|other| other.region == part.region)
            {
                bodies.push(index);
                occluders.push(Occluder {
                    solid: Solid::new(part.region.clone()),
                    barrier: None,
                    clear: false,
                });
            }
        }
        let mut targets = Vec::with_capacity(parts.len());
        for (index, part) in parts.iter().enumerate() {
            let solid = Solid::new(part.region.clone());
            let less = part.less.clone().map(Solid::new);
            let mut relations = Vec::with_capacity(occluders.len());
            for (place, occluder) in occluders.iter().enumerate() {
                let relation = relation::between(&solid, less.as_ref(), &occluder.solid);
                if matches!(relation, Relation::Overlapping) {
                    return Err(match occluder.barrier {
                        Some(barrier) => Error::BarrierOverlaps {
                            barrier,
                            part: index,
                        },
                        None => Error::PartsOverlap {
                            first: index.min(bodies[place - barriers.len()]),
                            second: index.max(bodies[place - barriers.len()]),
                        },
                    });
                }
                relations.push(relation);
            }
            targets.push(Target {
                solid,
                through: part.through.clone().map(Solid::new),
                less,
                relations,
            });
        }
        let scene = Self {
            parts,
            barriers,
            targets,
            occluders,
        };
        scene.refuse_faces_under_barriers()?;
        Ok(scene)
    }

    /// Two screens in one plane that overlap, or a screen and a plate: each
    /// would hide the other's face.
    fn refuse_faces_under_barriers(&self) -> Result<(), Error> {
        for (index, target) in self.targets.iter().enumerate() {
            let Some(plane) = target.solid.plane() else {
                continue;
            };
            let is_face = target
                .relations
                .iter()
                .any(|relation| matches!(relation, Relation::Never));
            if !is_face {
                continue;
            }
            for (occluder, relation) in self.occluders.iter().zip(&target.relations) {
                let grain = target.solid.grain + occluder.solid.grain;
                let Some(barrier) = occluder.barrier else {
                    continue;
                };
                if !matches!(relation, Relation::InFront) {
                    continue;
                }
                let (low, high) = occluder.solid.heights(plane);
                if low < -grain || high > grain {
                    continue;
                }
                let point = target.solid.centre + plane.normal * target.solid.radius;
                let pair = Self {
                    parts: vec![Part::bare(target.solid.region.clone())],
                    barriers: vec![Barrier::solid(occluder.solid.region.clone())],
                    targets: vec![Target {
                        solid: target.solid.clone(),
                        through: None,
                        less: None,
                        relations: vec![Relation::InFront],
                    }],
                    occluders: vec![Occluder {
                        solid: occluder.solid.clone(),
                        barrier: Some(0),
                        clear: false,
                    }],
                };
                let all = target.solid.region.view(point).into_view();
                let all = all.map_or(0.0, |view| view.factor(-plane.normal));
                let looked = pair.look(point);
                let left: f64 = looked
                    .of(0)
                    .iter()
                    .map(|glimpse| glimpse.view.factor(-plane.normal))
                    .sum();
                if left < all * (1.0 - 1e-6) {
                    return Err(Error::BarrierOverlaps {
                        barrier,
                        part: index,
                    });
                }
            }
        }
        Ok(())
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
}

const fn is_shared_between_threads<T: Send + Sync>() {}
const _: () = is_shared_between_threads::<Scene>();
