//! Flat polygons: the checks at the door, area, centroid, what lies inside.

use glam::{DVec2, DVec3};

use super::super::Error;
use super::super::error::{SHORTEST, place};
use super::MOST_VERTICES;
use super::way::distance_to_segment;

/// How far off its plane a vertex may lie, relative to the polygon's extent.
const FLATNESS: f64 = 1e-9;

/// Twice the area as a vector along the normal (Newell's sum).
pub(super) fn double_area(vertices: &[DVec3]) -> DVec3 {
    // Off the first vertex, so that a far origin costs no digits.
    vertices
        .windows(2)
        .skip(1)
        .map(|pair| (pair[0] - vertices[0]).cross(pair[1] - vertices[0]))
        .sum()
}

/// The centroid of the area.
pub(super) fn centroid(vertices: &[DVec3], normal: DVec3) -> DVec3 {
    let origin = vertices[0];
    let (mut moment, mut whole) = (DVec3::ZERO, 0.0);
    for pair in vertices.windows(2).skip(1) {
        let (first, second) = (pair[0] - origin, pair[1] - origin);
        let area = first.cross(second).dot(normal);
        moment += (first + second) * (area / 3.0);
        whole += area;
    }
    origin + moment / whole
}

/// Returns the vertices without repetitions, and the normal about which they
/// run anticlockwise, if they make a flat simple polygon.
pub(super) fn checked(mut vertices: Vec<DVec3>) -> Result<(Vec<DVec3>, DVec3), Error> {
    let found = vertices.len();
    if !(3..=MOST_VERTICES).contains(&found) {
        return Err(Error::VertexCount { found });
    }
    for vertex in &vertices {
        let _ = place("vertex", *vertex)?;
    }
    vertices.dedup();
    while vertices.len() > 1 && vertices.first() == vertices.last() {
        let _ = vertices.pop();
    }
    let double = double_area(&vertices);
    let extent = vertices
        .iter()
        .map(|vertex| vertex.distance(vertices[0]))
        .fold(0.0, f64::max);
    let size = double.length();
    // Written so that a NaN is no area either.
    if vertices.len() < 3 || !(size > 1e-12 * extent * extent && extent >= SHORTEST) {
        return Err(Error::NoArea { area: 0.5 * size });
    }
    let normal = (double / size).normalize();
    for (index, vertex) in vertices.iter().enumerate() {
        let distance = (*vertex - vertices[0]).dot(normal).abs();
        if distance > FLATNESS * extent {
            return Err(Error::NotFlat {
                vertex: index + 1,
                distance,
            });
        }
    }
    crosses_itself(&vertices, normal)?;
    Ok((vertices, normal))
}

/// Points of the plane in two coordinates of it.
fn flattened(normal: DVec3) -> impl Fn(DVec3) -> DVec2 {
    let (right, up) = normal.any_orthonormal_pair();
    move |place| DVec2::new(place.dot(right), place.dot(up))
}

fn crosses_itself(vertices: &[DVec3], normal: DVec3) -> Result<(), Error> {
    let flat = flattened(normal);
    let points: Vec<DVec2> = vertices
        .iter()
        .map(|vertex| flat(*vertex - vertices[0]))
        .collect();
    let count = points.len();
    let edge = |index: usize| (points[index], points[(index + 1) % count]);
    for first in 0..count {
        for second in first + 1..count {
            let (a, b) = edge(first);
            let (c, d) = edge(second);
            let fault = if second == first + 1 {
                folds_back(a, b, d)
            } else if (second + 1) % count == first {
                folds_back(c, d, b)
            } else {
                meet(a, b, c, d)
            };
            if fault {
                return Err(Error::CrossesItself {
                    first: first + 1,
                    second: second + 1,
                });
            }
        }
    }
    Ok(())
}

/// Whether the way a, b, c turns back upon itself at b.
fn folds_back(a: DVec2, b: DVec2, c: DVec2) -> bool {
    let (come, go) = (b - a, c - b);
    come.dot(go) < 0.0 && come.perp_dot(go).abs() <= 1e-12 * come.length() * go.length()
}

/// Whether two segments meet, ends included.
fn meet(a: DVec2, b: DVec2, c: DVec2, d: DVec2) -> bool {
    let apart = a.max(b).cmplt(c.min(d)).any() || c.max(d).cmplt(a.min(b)).any();
    let splits = |from: DVec2, to: DVec2, one: DVec2, two: DVec2| {
        (to - from).perp_dot(one - from) * (to - from).perp_dot(two - from) <= 0.0
    };
    !apart && splits(a, b, c, d) && splits(c, d, a, b)
}

/// Says whether a point of the plane lies inside, or within `reach` of the
/// outline.
pub(super) fn holds(vertices: &[DVec3], normal: DVec3, point: DVec3, reach: f64) -> bool {
    let Some(mut from) = vertices.last() else {
        return false;
    };
    let flat = flattened(normal);
    let mut inside = false;
    for to in vertices {
        if distance_to_segment(point, *from, *to) <= reach {
            return true;
        }
        // Even-odd rule; one end of an edge counts, the other not.
        let (a, b) = (flat(*from - point), flat(*to - point));
        if (a.y > 0.0) != (b.y > 0.0) && (b.y > a.y) == (a.perp_dot(b) > 0.0) {
            inside = !inside;
        }
        from = to;
    }
    inside
}

/// Says whether a segment in the plane meets the polygon.
pub(super) fn is_met_by(vertices: &[DVec3], normal: DVec3, from: DVec3, to: DVec3) -> bool {
    let flat = flattened(normal);
    let (start, end) = (DVec2::ZERO, flat(to - from));
    let Some(mut last) = vertices.last() else {
        return false;
    };
    for vertex in vertices {
        if meet(start, end, flat(*last - from), flat(*vertex - from)) {
            return true;
        }
        last = vertex;
    }
    holds(vertices, normal, from, 0.0)
}
