//! Looking at a scene from one point.

use std::borrow::Cow;

use glam::DVec3;

use super::looked::{Looked, Stance};
use super::shade::{Around, Cast, in_front};
use super::solid::Solid;
use super::{Scene, Target, mouth};
use crate::physics::view::loops::Loops;
use crate::physics::view::{Sight, View};
use crate::physics::visibility::{Overlay, Shadow};

/// What is seen of a part: pieces, each with the clear barriers it passes.
type Glimpses = Vec<(Box<[u16]>, View)>;

/// How often a point is moved a hair where rounding left an outline open.
const ATTEMPTS: u8 = 4;

impl Scene {
    /// Returns what is seen of every part from a point.
    ///
    /// A barrier hides what lies strictly behind it: one that lies edge on, or
    /// that the point touches, hides nothing. From a point that is not finite
    /// every part counts as touched.
    ///
    /// # Accuracy
    ///
    /// Where nothing hides a part its view is that of
    /// [`Region::view`](crate::physics::region::Region::view). Else the edges that remain
    /// are exact; the factor's absolute error is below `1e-12` of the
    /// unobstructed one. Two exceptions: a cylinder that pierces the plane of a
    /// flat part, within the part's outline and not square to it, is cut there
    /// along a polygon of 360 sides (`1e-7`), and a disc or the end of a
    /// cylinder passes for a straight edge where it fills less than `1e-7` sr.
    /// What is all hidden is exactly zero.
    ///
    /// # Source
    ///
    /// Checked against rays and quadrature in `tests/laws/visibility_laws.rs`.
    #[must_use]
    pub fn look(&self, point: DVec3) -> Looked {
        let mut looked = Looked::with_room(self.targets.len());
        if !point.is_finite() {
            for _ in &self.targets {
                looked.add(Stance::Touching, []);
            }
            return looked;
        }
        looked.barrier = self.occluders.iter().find_map(|occluder| {
            occluder
                .barrier
                .filter(|_| occluder.solid.region.touches(point))
        });
        let around = Around::new(self, point);
        for target in &self.targets {
            match stance(target, point) {
                (Stance::InFront, view) => {
                    let shadows = self.shadows(target, &around);
                    if shadows.is_empty() && target.is_bare() {
                        looked.add(Stance::InFront, [(Box::default(), view)]);
                    } else {
                        let glimpses = self.glimpses(target, view, &around, shadows, 0);
                        looked.add(Stance::InFront, glimpses);
                    }
                }
                (stance, _) => looked.add(stance, []),
            }
        }
        looked
    }

    /// What is left of a part by its mouth, what it leaves out and shadows.
    fn glimpses(
        &self,
        target: &Target,
        view: View,
        around: &Around<'_>,
        shadows: Vec<Cast<'_>>,
        attempt: u8,
    ) -> Glimpses {
        if view == View::EMPTY {
            return Vec::new();
        }
        let point = around.point;
        if shadows.is_empty()
            && let Some(plane) = target.solid.plane()
            && let Some(pieces) = mouth::seen(
                &target.solid,
                target.through.as_ref(),
                target.less.as_ref(),
                point,
            )
        {
            let view = View::of_loops(Loops::new(pieces.into(), -plane.normal));
            return if view == View::EMPTY {
                Vec::new()
            } else {
                vec![(Box::default(), view)]
            };
        }
        let Some((own, axis)) = target.solid.outline(point) else {
            // A disc seen so flat that what hides it makes no odds.
            return vec![(Box::default(), view)];
        };
        let mut overlay = Overlay {
            outlines: vec![Cow::Owned(own)],
            frames: 1,
            less: None,
            shadows: Vec::new(),
            hair: hair(&target.solid, point),
        };
        if let Some(through) = &target.through {
            let Some((outline, _)) = through.outline(point) else {
                return Vec::new();
            };
            overlay.outlines.push(Cow::Owned(outline));
            overlay.frames = 2;
        }
        if let Some(less) = &target.less
            && in_front(less, point)
            && let Some((outline, _)) = less.outline(point)
        {
            overlay.less = Some(overlay.outlines.len());
            overlay.outlines.push(Cow::Owned(outline));
        }
        // Which clear barriers the bits stand for, and those that cover it all.
        let mut bits: Vec<u16> = Vec::new();
        let mut over_all = 0_u128;
        for cast in shadows {
            let own = &overlay.outlines[0];
            if cast.outline.misses(own) || own.misses(&cast.outline) {
                continue;
            }
            let covers = cast.within.is_none() && cast.outline.covers(own);
            let clear = match cast.clear {
                None if covers => return Vec::new(),
                None => None,
                Some(barrier) => {
                    let known = bits.iter().position(|other| *other == barrier);
                    let bit = known.unwrap_or_else(|| {
                        bits.push(barrier);
                        bits.len() - 1
                    });
                    // More than so many curtains behind one another let nothing
                    // through that counts; leaving them out errs to the hot side.
                    let Some(bit) = u32::try_from(bit).ok().filter(|bit| *bit < 128) else {
                        continue;
                    };
                    if covers {
                        over_all |= 1_u128 << bit;
                        continue;
                    }
                    Some(bit)
                }
            };
            let outline = overlay.outlines.len();
            overlay.outlines.push(cast.outline);
            let within = cast.within.map(|within| {
                overlay.outlines.push(Cow::Owned(within));
                outline + 1
            });
            overlay.shadows.push(Shadow {
                outline,
                within,
                clear,
            });
        }
        let named = |through: u128| -> Box<[u16]> {
            let mut barriers: Vec<u16> = (bits.iter().enumerate().take(128))
                .filter(|(bit, _)| through >> bit & 1 == 1)
                .map(|(_, barrier)| *barrier)
                .collect();
            barriers.sort_unstable();
            barriers.into()
        };
        if overlay.outlines.len() == 1 {
            return vec![(named(over_all), view)];
        }
        let Some(seen) = overlay.seen() else {
            return self.seen_a_hair_off(target, view, point, attempt);
        };
        let mut glimpses: Glimpses = seen
            .into_iter()
            .map(|part| {
                let view = if part.whole {
                    view.clone()
                } else {
                    View::of_loops(Loops::new(part.pieces.into(), axis))
                };
                (named(part.through | over_all), view)
            })
            .collect();
        glimpses.sort_by(|one, other| one.0.cmp(&other.0));
        glimpses
    }

    /// Looks again from a point so near that no one could tell, off the odd
    /// place at which edges meet so closely that rounding left a gap.
    #[cold]
    fn seen_a_hair_off(&self, target: &Target, view: View, point: DVec3, attempt: u8) -> Glimpses {
        if attempt >= ATTEMPTS {
            // Nothing is known to be hidden: the hot side.
            return vec![(Box::default(), view)];
        }
        let distance = target.solid.nearest(point).distance(point);
        let step = 1e-11 * distance * 20_f64.powi(i32::from(attempt));
        let sense = if attempt.is_multiple_of(2) { 1.0 } else { -1.0 };
        let moved = point + DVec3::new(0.36, 0.48, 0.8 * sense) * step * sense;
        match stance(target, moved) {
            (Stance::InFront, view) => {
                let around = Around::new(self, moved);
                let shadows = self.shadows(target, &around);
                self.glimpses(target, view, &around, shadows, attempt + 1)
            }
            _ => vec![(Box::default(), view)],
        }
    }
}

impl Target {
    /// Whether all of it belongs to it, and is seen from everywhere.
    fn is_bare(&self) -> bool {
        self.through.is_none() && self.less.is_none()
    }
}

/// How a point stands to a part, and the view of all of it.
fn stance(target: &Target, point: DVec3) -> (Stance, View) {
    let sight = target.solid.region.view(point);
    if let Some(through) = &target.through
        && !in_front(through, point)
    {
        // Behind the mouth: inside the tunnel, or beside it.
        let inside = through.plane().is_some_and(|plane| {
            let foot = point - plane.normal * plane.height(point);
            through.region.touches(foot) && matches!(sight, Sight::Seen(_))
        });
        return if inside || sight == Sight::Touching {
            (Stance::Touching, View::EMPTY)
        } else {
            (Stance::Behind, View::EMPTY)
        };
    }
    match sight {
        Sight::Touching => (Stance::Touching, View::EMPTY),
        Sight::Behind => (Stance::Behind, View::EMPTY),
        Sight::Seen(view) => (Stance::InFront, view),
    }
}

/// The angle below which directions count as one: well above rounding, well
/// below what counts of the part.
fn hair(solid: &Solid, point: DVec3) -> f64 {
    let distance = solid.centre.distance(point).max(solid.radius);
    1e-12 * solid.radius / distance + 1e-15 * (2.0 + point.abs().max_element() / distance)
}
