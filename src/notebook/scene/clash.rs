//! Sources and screens that go through one another.

use std::sync::Arc;

use glam::DVec3;

use crate::notebook::cell::source::Shape;
use crate::notebook::datum::CellId;
use crate::physics::region::Region;

/// Two that cannot stand as they do.
#[derive(Clone, Debug, PartialEq)]
pub struct Clash {
    /// The name of the one that stands first in the file.
    pub first: Arc<str>,
    /// The number of the other.
    pub second: CellId,
}

/// How much each shape is shrunk before it is tried, so that shapes may touch.
const SHRUNK: f64 = 1.0 - 1e-6;

/// How many chords stand for a circle.
const CHORDS: u32 = 64;

/// Returns the pairs that go through one another, by their places, the second
/// growing.
pub(super) fn all(shapes: &[(usize, &Arc<Shape>)]) -> Vec<(usize, usize)> {
    // A sweep along x: there may be thousands.
    let mut spans: Vec<(f64, f64, usize)> = shapes
        .iter()
        .enumerate()
        .map(|(index, (_, shape))| {
            let (centre, radius) = (shape.region.centre(), shape.region.bounding_radius());
            (centre.x - radius, centre.x + radius, index)
        })
        .collect();
    spans.sort_unstable_by(|a, b| a.0.total_cmp(&b.0).then(a.2.cmp(&b.2)));
    let mut found = Vec::new();
    for (at, (_, end, index)) in spans.iter().enumerate() {
        for (_, _, other) in spans[at + 1..].iter().take_while(|span| span.0 < *end) {
            let (first, second) = (*index.min(other), *index.max(other));
            if meet(shapes[first].1, shapes[second].1) {
                found.push((shapes[first].0, shapes[second].0));
            }
        }
    }
    found.sort_unstable_by_key(|(first, second)| (*second, *first));
    found
}

/// Returns whether two shapes go through one another, or one lies in the other.
fn meet(one: &Shape, other: &Shape) -> bool {
    let (a, b) = (&one.region, &other.region);
    let apart = a.centre().distance(b.centre());
    if apart >= a.bounding_radius() + b.bounding_radius() {
        return false;
    }
    if let (
        Region::Sphere { centre, radius },
        Region::Sphere {
            centre: middle,
            radius: size,
        },
    ) = (a, b)
    {
        return centre.distance(*middle) < (radius + size) * SHRUNK;
    }
    pierces(a, b) || pierces(b, a)
}

/// Returns whether the outline of one region meets another region.
fn pierces(one: &Region, other: &Region) -> bool {
    outline(one)
        .iter()
        .any(|(from, to)| other.crosses(*from, *to))
}

/// Returns the edges of a region, a little shrunk; of a solid body those that
/// tell where its surface runs.
fn outline(region: &Region) -> Vec<(DVec3, DVec3)> {
    let around = |centre: DVec3, normal: DVec3, radius: f64| -> Vec<(DVec3, DVec3)> {
        let (right, up) = normal.any_orthonormal_pair();
        let at = |step: u32| {
            let angle = std::f64::consts::TAU * f64::from(step) / f64::from(CHORDS);
            centre + (right * angle.cos() + up * angle.sin()) * (radius * SHRUNK)
        };
        (0..CHORDS).map(|step| (at(step), at(step + 1))).collect()
    };
    match region {
        Region::Disc {
            centre,
            normal,
            radius,
        } => around(*centre, *normal, *radius),
        Region::Polygon { vertices, .. } | Region::Plate { vertices, .. } => {
            let centre = region.centre();
            let shrunk: Vec<DVec3> = vertices
                .iter()
                .map(|vertex| centre + (*vertex - centre) * SHRUNK)
                .collect();
            (0..shrunk.len())
                .map(|at| (shrunk[at], shrunk[(at + 1) % shrunk.len()]))
                .collect()
        }
        Region::Cylinder { base, axis, radius } => {
            let way = axis.normalize_or(DVec3::Z);
            let (right, up) = way.any_orthonormal_pair();
            let mut edges = Vec::new();
            for end in [*base, *base + *axis] {
                edges.extend(around(end, way, *radius));
            }
            for side in [right, up, -right, -up] {
                let from = *base + side * (radius * SHRUNK);
                edges.push((from, from + *axis));
            }
            edges
        }
        Region::Sphere { centre, radius } => [DVec3::X, DVec3::Y, DVec3::Z]
            .into_iter()
            .flat_map(|axis| around(*centre, axis, *radius))
            .collect(),
    }
}
