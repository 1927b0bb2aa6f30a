//! Regions on the plan: how far the outline reaches along a heading.

use glam::{DVec2, DVec3};

use super::Region;
use super::cylinder::Cylinder;

/// What counts as no width on the plan, relative to the region's size: a
/// vertical plate whose normal carries rounding is still a line.
const HAIR: f64 = 1e-9;

/// The outermost distance at which a line on the plan leaves the region.
pub(super) fn edge_from(region: &Region, place: DVec3, heading: DVec3) -> f64 {
    let Some(heading) = heading.truncate().try_normalize() else {
        return 0.0;
    };
    match region {
        Region::Sphere { centre, radius } => ellipse(
            centre.truncate() - place.truncate(),
            heading,
            DVec2::X,
            *radius,
            *radius,
        ),
        Region::Disc {
            centre,
            normal,
            radius,
        } => {
            let short = normal.truncate().normalize_or(DVec2::X);
            // A hair of width keeps rounding of a vertical disc out of the answer.
            let half = radius * normal.z.abs().max(HAIR);
            ellipse(
                centre.truncate() - place.truncate(),
                heading,
                short,
                half,
                *radius,
            )
        }
        Region::Cylinder { base, axis, radius } => {
            Cylinder::new(*base, *axis, *radius).edge_from(place, heading)
        }
        Region::Polygon { vertices, .. } | Region::Plate { vertices, .. } => {
            polygon(vertices, place, heading)
        }
    }
}

/// An ellipse with half axis `half` along `short` and `long` across it.
pub(super) fn ellipse(centre: DVec2, heading: DVec2, short: DVec2, half: f64, long: f64) -> f64 {
    let scaled =
        |vector: DVec2| DVec2::new(vector.dot(short) / half, short.perp_dot(vector) / long);
    let (way, middle) = (scaled(heading), scaled(centre));
    let square = way.length_squared();
    let along = way.dot(middle);
    let root = square * (1.0 - middle.length_squared()) + along * along;
    if root < 0.0 {
        0.0
    } else {
        ((along + root.sqrt()) / square).max(0.0)
    }
}

pub(super) fn polygon(vertices: &[DVec3], place: DVec3, heading: DVec2) -> f64 {
    let seen = |vertex: DVec3| {
        let vertex = (vertex - place).truncate();
        DVec2::new(vertex.dot(heading), heading.perp_dot(vertex))
    };
    let Some(last) = vertices.last() else {
        return 0.0;
    };
    let size = vertices
        .iter()
        .map(|vertex| (*vertex - *last).length())
        .fold(0.0, f64::max);
    let mut from = seen(*last);
    let mut farthest: f64 = 0.0;
    for vertex in vertices {
        let to = seen(*vertex);
        if to.y.abs() <= HAIR * size {
            farthest = farthest.max(to.x);
        }
        if (from.y > 0.0) != (to.y > 0.0) {
            farthest = farthest.max(from.x + (to.x - from.x) * (from.y / (from.y - to.y)));
        }
        from = to;
    }
    farthest
}
