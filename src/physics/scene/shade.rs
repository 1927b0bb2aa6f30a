//! The shadows that may fall on a part as seen from one point.

use std::borrow::Cow;
use std::cell::OnceCell;

use glam::DVec3;

use super::relation::Relation;
use super::solid::{Plane, Solid};
use super::{Occluder, Scene, Target, clip};
use crate::physics::region::Region;
use crate::physics::visibility::Outline;

/// The cone about a ball as seen from a point.
#[derive(Clone, Copy, Debug)]
struct Cone {
    way: DVec3,
    near: f64,
    far: f64,
    sine: f64,
    cosine: f64,
}

impl Cone {
    fn of(solid: &Solid, point: DVec3) -> Self {
        let way = solid.centre - point;
        let distance = way.length();
        // Wider by a hair, so that rounding rejects nothing.
        let sine = (1.0 + 1e-9) * solid.radius / distance;
        let (near, far) = (distance - solid.radius, distance + solid.radius);
        if sine < 1.0 {
            Self {
                way: way / distance,
                near,
                far,
                sine,
                cosine: (1.0 - sine * sine).sqrt(),
            }
        } else {
            Self {
                way: DVec3::ZERO,
                near,
                far,
                sine: 1.0,
                cosine: 0.0,
            }
        }
    }

    /// Whether two cones have no direction in common.
    fn misses(&self, other: &Self) -> bool {
        self.way != DVec3::ZERO
            && other.way != DVec3::ZERO
            && (self.sine < other.cosine || other.sine < self.cosine)
            && self.way.dot(other.way) < self.cosine * other.cosine - self.sine * other.sine
    }
}

/// One point's look at the occluders, each worked out when first asked for.
pub(super) struct Around<'a> {
    scene: &'a Scene,
    pub(super) point: DVec3,
    cones: Vec<Cone>,
    outlines: Vec<OnceCell<Option<Box<Outline>>>>,
}

impl<'a> Around<'a> {
    pub(super) fn new(scene: &'a Scene, point: DVec3) -> Self {
        let occluders = &scene.occluders;
        Self {
            scene,
            point,
            cones: occluders
                .iter()
                .map(|occluder| Cone::of(&occluder.solid, point))
                .collect(),
            outlines: vec![OnceCell::new(); occluders.len()],
        }
    }

    fn outline(&self, index: usize) -> Option<&Outline> {
        self.outlines[index]
            .get_or_init(|| {
                let solid = &self.scene.occluders[index].solid;
                solid
                    .outline(self.point)
                    .map(|(outline, _)| Box::new(outline))
            })
            .as_deref()
    }
}

impl Scene {
    /// The shadows that may fall on a part.
    pub(super) fn shadows<'a>(&self, target: &'a Target, around: &'a Around<'a>) -> Vec<Cast<'a>> {
        let point = around.point;
        let own = Cone::of(&target.solid, point);
        let mut shadows = Vec::new();
        for (index, (occluder, relation)) in
            self.occluders.iter().zip(&target.relations).enumerate()
        {
            let cone = &around.cones[index];
            // Beside it, or surely beyond it.
            let beyond = cone.near > own.far && !matches!(relation, Relation::WithinMouth);
            if beyond || cone.misses(&own) {
                continue;
            }
            let whole = |shadows: &mut Vec<Cast<'a>>| {
                if let Some(outline) = around.outline(index) {
                    shadows.push(Cast {
                        outline: Cow::Borrowed(outline),
                        within: None,
                        clear: occluder.clear_name(),
                    });
                }
            };
            match relation {
                Relation::Never | Relation::Overlapping => {}
                Relation::Beyond(plane) => {
                    if plane.height(point) > 0.0 {
                        whole(&mut shadows);
                    }
                }
                Relation::Pieces(pieces) => {
                    for (piece, plane) in pieces {
                        if plane.height(point) > 0.0
                            && let Some((outline, _)) = piece.outline(point)
                        {
                            shadows.push(Cast {
                                outline: Cow::Owned(outline),
                                within: None,
                                clear: occluder.clear_name(),
                            });
                        }
                    }
                }
                Relation::InFront | Relation::WithinMouth => {
                    let within = matches!(relation, Relation::WithinMouth);
                    let back = match &target.less {
                        Some(less) if within && in_front(less, point) => less,
                        _ => &target.solid,
                    };
                    let Some(plane) = back.plane().map(|plane| towards(plane, point)) else {
                        continue;
                    };
                    let solid = &occluder.solid;
                    let grain = back.grain + solid.grain;
                    // By the ball first: most stand clear in front or behind.
                    let middle = plane.height(solid.centre);
                    if middle < -solid.radius - grain {
                        continue;
                    }
                    if middle > solid.radius {
                        whole(&mut shadows);
                        continue;
                    }
                    let (low, high) = solid.heights(plane);
                    if low >= -grain {
                        whole(&mut shadows);
                    } else if high > grain {
                        cut(occluder, plane, around, index, &mut shadows);
                    }
                }
            }
        }
        shadows
    }
}

impl Occluder {
    /// The barrier's number if it is clear.
    fn clear_name(&self) -> Option<u16> {
        let barrier = self.barrier.filter(|_| self.clear)?;
        u16::try_from(barrier).ok()
    }
}

/// A shadow that may fall on a part.
pub(super) struct Cast<'a> {
    pub(super) outline: Cow<'a, Outline>,
    pub(super) within: Option<Outline>,
    pub(super) clear: Option<u16>,
}

/// The shadow of what of an occluder lies in front of a plane that cuts it.
fn cut<'a>(
    occluder: &Occluder,
    plane: Plane,
    around: &'a Around<'a>,
    index: usize,
    shadows: &mut Vec<Cast<'a>>,
) {
    let solid = &occluder.solid;
    let clear = occluder.clear_name();
    if solid.plane().is_some() {
        let Some(outline) = around.outline(index) else {
            return;
        };
        if let Some(front) = clip::front_of_flat(solid, plane, around.point) {
            shadows.push(Cast {
                outline: Cow::Borrowed(outline),
                within: Some(front),
                clear,
            });
        }
        return;
    }
    if solid.region.touches(around.point) {
        return;
    }
    let halves = match &solid.region {
        Region::Sphere { centre, radius } => {
            clip::front_of_sphere(*centre, *radius, plane, around.point)
        }
        _ => clip::front_of_cylinder(solid, plane, around.point)
            .map(|outline| (outline, None))
            .into_iter()
            .collect(),
    };
    for (outline, within) in halves {
        shadows.push(Cast {
            outline: Cow::Owned(outline),
            within,
            clear,
        });
    }
}

/// Whether a point lies in front of a flat region.
pub(super) fn in_front(solid: &Solid, point: DVec3) -> bool {
    let both = matches!(solid.region, Region::Plate { .. });
    solid.plane().is_some_and(|plane| {
        let height = plane.height(point);
        height > solid.grain || (both && height < -solid.grain)
    })
}

/// The plane with its normal on the point's side.
fn towards(plane: Plane, point: DVec3) -> Plane {
    if plane.height(point) >= 0.0 {
        plane
    } else {
        Plane {
            normal: -plane.normal,
            offset: -plane.offset,
        }
    }
}
