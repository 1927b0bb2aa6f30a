//! How what hides stands to a part, as far as that holds for every point.

use glam::DVec3;

use super::solid::{Plane, Solid};
use crate::physics::region::Region;

/// How an occluder stands to a part.
#[derive(Clone, Debug)]
pub(super) enum Relation {
    /// It never hides it: it is the same body, or the screen whose face it is.
    Never,
    /// What of it lies in front of the part's own plane hides it.
    InFront,
    /// What of it lies in front of the plane of what the part leaves out: it
    /// reaches in through the part's outline.
    WithinMouth,
    /// It hides the part from the side of this plane that the normal points to,
    /// and not from the other: the occluder lies there, the part beyond.
    Beyond(Plane),
    /// The same for convex pieces of it, each with a plane of its own.
    Pieces(Vec<(Solid, Plane)>),
    /// They overlap, and which hides the other cannot be said.
    Overlapping,
}

/// Returns how `occluder` stands to a part of region `solid` that leaves out
/// `less`.
pub(super) fn between(solid: &Solid, less: Option<&Solid>, occluder: &Solid) -> Relation {
    if solid.region == occluder.region {
        return Relation::Never;
    }
    match (solid.plane(), occluder.plane()) {
        (Some(plane), _) => to_flat(solid, plane, less, occluder),
        (None, Some(plane)) => to_body_from_flat(solid, occluder, plane),
        (None, None) => occluder
            .parted_from(solid)
            .map_or(Relation::Overlapping, Relation::Beyond),
    }
}

fn to_flat(solid: &Solid, plane: Plane, less: Option<&Solid>, occluder: &Solid) -> Relation {
    if solid.is_face_of(occluder) {
        return Relation::Never;
    }
    let grain = solid.grain + occluder.grain;
    let (low, high) = occluder.heights(plane);
    if low >= -grain || high <= grain {
        return Relation::InFront;
    }
    let is_flat = occluder.plane().is_some();
    if is_flat && less.is_none() {
        return Relation::InFront;
    }
    let parted = occluder.parted_from(solid);
    match (parted, less) {
        (Some(_), _) if is_flat => Relation::InFront,
        (Some(parting), _) => Relation::Beyond(parting),
        (None, None) => Relation::InFront,
        (None, Some(less)) => {
            let straddles = less.plane().is_some_and(|plane| {
                let (low, high) = occluder.heights(plane);
                low < -grain && high > grain
            });
            if straddles
                && !is_flat
                && let Some(parting) = occluder.parted_from(less)
            {
                return Relation::Beyond(parting);
            }
            Relation::WithinMouth
        }
    }
}

fn to_body_from_flat(solid: &Solid, occluder: &Solid, plane: Plane) -> Relation {
    let grain = solid.grain + occluder.grain;
    let (low, high) = solid.heights(plane);
    if low >= -grain {
        return Relation::Beyond(Plane {
            normal: -plane.normal,
            offset: -plane.offset,
        });
    }
    if high <= grain {
        return Relation::Beyond(plane);
    }
    if let Some(parting) = occluder.parted_from(solid) {
        return Relation::Beyond(parting);
    }
    if occluder.convex {
        return Relation::Overlapping;
    }
    let parted = pieces(&occluder.region).into_iter().map(|piece| {
        let parting = piece.parted_from(solid)?;
        Some((piece, parting))
    });
    parted
        .collect::<Option<Vec<_>>>()
        .map_or(Relation::Overlapping, Relation::Pieces)
}

/// The region in convex pieces: itself, or the triangles of a polygon with dents.
pub(super) fn pieces(region: &Region) -> Vec<Solid> {
    let solid = Solid::new(region.clone());
    match region {
        Region::Polygon { vertices, normal } | Region::Plate { vertices, normal }
            if !solid.convex =>
        {
            let triangles = triangles(vertices, *normal).into_iter();
            let piece = |corners: [DVec3; 3]| {
                Solid::new(Region::Polygon {
                    vertices: corners.to_vec(),
                    normal: *normal,
                })
            };
            triangles.map(piece).collect()
        }
        _ => vec![solid],
    }
}

/// A simple polygon as triangles, cut off ear by ear.
fn triangles(vertices: &[DVec3], normal: DVec3) -> Vec<[DVec3; 3]> {
    let mut left = vertices.to_vec();
    let mut found = Vec::with_capacity(left.len());
    let area = |a: DVec3, b: DVec3, c: DVec3| (b - a).cross(c - a).dot(normal);
    while left.len() > 3 {
        let count = left.len();
        let ear = (0..count).find(|index| {
            let [a, b, c] = [0, 1, 2].map(|step| left[(index + step) % count]);
            area(a, b, c) > 0.0
                && left.iter().all(|place| {
                    let corner = [a, b, c].contains(place);
                    corner
                        || area(a, b, *place) < 0.0
                        || area(b, c, *place) < 0.0
                        || area(c, a, *place) < 0.0
                })
        });
        // A corner without area may be dropped; every simple polygon has an ear.
        let index = ear.unwrap_or(0);
        let [a, b, c] = [0, 1, 2].map(|step| left[(index + step) % count]);
        if area(a, b, c) > 0.0 {
            found.push([a, b, c]);
        }
        let _ = left.remove((index + 1) % count);
    }
    if let [a, b, c] = left[..]
        && area(a, b, c) > 0.0
    {
        found.push([a, b, c]);
    }
    found
}
