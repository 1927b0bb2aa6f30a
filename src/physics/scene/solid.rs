//! A region as something that hides: its bounds, its outline from a point, and
//! planes that part it from another.

use glam::{DVec2, DVec3};

use crate::physics::region::Region;
use crate::physics::region::cylinder::{self, Cylinder};
use crate::physics::view_factor::contour::Circle;
use crate::physics::view_factor::sphere;
use crate::physics::visibility::Outline;

/// A region with what is worked out of it once.
#[derive(Clone, Debug)]
pub(super) struct Solid {
    pub(super) region: Region,
    /// The middle and the radius of a ball that holds it.
    pub(super) centre: DVec3,
    pub(super) radius: f64,
    /// Whether it is convex.
    pub(super) convex: bool,
    /// The corners of the smallest convex outline round a polygon.
    hull: Vec<DVec3>,
    /// How much rounding its coordinates carry, in metres.
    pub(super) grain: f64,
}

/// A plane: where `normal` · place is `offset`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Plane {
    pub(super) normal: DVec3,
    pub(super) offset: f64,
}

impl Plane {
    pub(super) fn new(on: DVec3, normal: DVec3) -> Self {
        Self {
            normal,
            offset: on.dot(normal),
        }
    }

    pub(super) fn height(&self, place: DVec3) -> f64 {
        place.dot(self.normal) - self.offset
    }
}

impl Solid {
    pub(super) fn new(region: Region) -> Self {
        let centre = region.centre();
        let radius = region.bounding_radius();
        let (convex, hull) = match &region {
            Region::Polygon { vertices, normal } | Region::Plate { vertices, normal } => {
                (is_convex(vertices, *normal), hull(vertices, *normal))
            }
            _ => (true, Vec::new()),
        };
        let grain = 1e-11 * radius + 1e-14 * centre.abs().max_element();
        Self {
            region,
            centre,
            radius,
            convex,
            hull,
            grain,
        }
    }

    /// The plane of a flat region.
    pub(super) fn plane(&self) -> Option<Plane> {
        self.region
            .normal()
            .map(|normal| Plane::new(self.centre, normal))
    }

    /// The least and the greatest height over a plane.
    pub(super) fn heights(&self, plane: Plane) -> (f64, f64) {
        (
            -self.support(-plane.normal) - plane.offset,
            self.support(plane.normal) - plane.offset,
        )
    }

    /// How far it reaches in a direction of any length.
    pub(super) fn support(&self, way: DVec3) -> f64 {
        match &self.region {
            Region::Sphere { centre, radius } => centre.dot(way) + radius * way.length(),
            Region::Disc {
                centre,
                normal,
                radius,
            } => centre.dot(way) + radius * (way - *normal * way.dot(*normal)).length(),
            Region::Cylinder { base, axis, radius } => {
                let along = axis.normalize();
                let across = (way - along * way.dot(along)).length();
                base.dot(way) + axis.dot(way).max(0.0) + radius * across
            }
            Region::Polygon { .. } | Region::Plate { .. } => {
                let reach = self.hull.iter().map(|corner| corner.dot(way));
                reach.fold(f64::NEG_INFINITY, f64::max)
            }
        }
    }

    /// The place of its convex hull that is nearest to a point.
    pub(super) fn nearest(&self, point: DVec3) -> DVec3 {
        match &self.region {
            Region::Sphere { centre, radius } => {
                let off = point - *centre;
                let distance = off.length();
                if distance <= *radius {
                    point
                } else {
                    *centre + off * (radius / distance)
                }
            }
            Region::Disc {
                centre,
                normal,
                radius,
            } => {
                let off = point - *centre;
                let off = off - *normal * off.dot(*normal);
                *centre + off.clamp_length_max(*radius)
            }
            Region::Cylinder { base, axis, radius } => {
                Cylinder::new(*base, *axis, *radius).nearest(point)
            }
            Region::Polygon { normal, .. } | Region::Plate { normal, .. } => {
                nearest_of_polygon(&self.hull, *normal, point)
            }
        }
    }

    /// The same of the hull a millionth smaller about its centre.
    fn nearest_within(&self, point: DVec3) -> DVec3 {
        const SHARE: f64 = 1.0 - 1e-6;
        let there = self.centre + (point - self.centre) / SHARE;
        self.centre + (self.nearest(there) - self.centre) * SHARE
    }

    /// The outline as seen from a point, and the direction towards which all of
    /// it lies within a right angle; none where it lies edge on, or the point
    /// on it or in it.
    pub(super) fn outline(&self, point: DVec3) -> Option<(Outline, DVec3)> {
        match &self.region {
            Region::Sphere { centre, radius } => {
                let way = *centre - point;
                let distance = way.length();
                if distance <= *radius + self.grain {
                    return None;
                }
                let (middle, normal, radius) =
                    sphere::silhouette(way / distance, *radius, distance);
                let circle = Circle::new(middle, normal, radius);
                Some((Outline::of_circle(circle)?, way))
            }
            Region::Disc {
                centre,
                normal,
                radius,
            } => {
                let normal = self.facing(*normal, point)?;
                let circle = Circle::new(*centre - point, normal, *radius);
                Some((Outline::of_circle(circle)?, -normal))
            }
            Region::Cylinder { base, axis, radius } => {
                if self.region.touches(point) {
                    return None;
                }
                let cylinder = Cylinder::new(*base, *axis, *radius);
                let axis = cylinder.nearest(point) - point;
                let outline = match cylinder.outline(point) {
                    cylinder::Outline::End {
                        centre,
                        normal,
                        radius,
                    } => Outline::of_circle(Circle::new(centre, normal, radius))?,
                    cylinder::Outline::Side(pieces) => {
                        Outline::of_cylinder(cylinder, point, &pieces)
                    }
                };
                Some((outline, axis))
            }
            Region::Polygon { vertices, normal } | Region::Plate { vertices, normal } => {
                let facing = self.facing(*normal, point)?;
                let mut corners: Vec<DVec3> =
                    vertices.iter().map(|vertex| *vertex - point).collect();
                if facing != *normal {
                    corners.reverse();
                }
                let outline = Outline::of_polygon(&corners, facing, self.convex);
                Some((outline, -facing))
            }
        }
    }

    /// The normal on the point's side; none where the point lies in the plane.
    fn facing(&self, normal: DVec3, point: DVec3) -> Option<DVec3> {
        let height = (point - self.centre).dot(normal);
        let grain = 1e-12 * (self.radius + (point - self.centre).length())
            + 1e-15 * point.abs().max_element();
        if height.abs() <= grain {
            None
        } else if height > 0.0 {
            Some(normal)
        } else {
            Some(-normal)
        }
    }

    /// Whether both are flat, in one plane, and of one outline.
    pub(super) fn is_face_of(&self, other: &Self) -> bool {
        let near = |one: DVec3, two: DVec3| one.distance(two) <= 10.0 * (self.grain + other.grain);
        match (&self.region, &other.region) {
            (
                Region::Disc {
                    centre,
                    normal,
                    radius,
                },
                Region::Disc {
                    centre: other_centre,
                    normal: other_normal,
                    radius: other_radius,
                },
            ) => {
                near(*centre, *other_centre)
                    && (radius - other_radius).abs() <= 10.0 * (self.grain + other.grain)
                    && normal.cross(*other_normal).length() <= 1e-9
            }
            (
                Region::Polygon { vertices: one, .. } | Region::Plate { vertices: one, .. },
                Region::Polygon { vertices: two, .. } | Region::Plate { vertices: two, .. },
            ) => {
                let holds = |all: &[DVec3], some: &[DVec3]| {
                    some.iter()
                        .all(|place| all.iter().any(|corner| near(*corner, *place)))
                };
                holds(one, two) && holds(two, one)
            }
            (one, two) => one == two,
        }
    }

    /// Returns a plane that parts the convex hulls of two regions, this one on
    /// the side its normal points to; none if they overlap by more than a
    /// millionth of the smaller.
    pub(super) fn parted_from(&self, other: &Self) -> Option<Plane> {
        let least = 1e-6 * self.radius.min(other.radius);
        let by = |way: DVec3| -> Option<Plane> {
            let normal = way.try_normalize()?;
            let (high, low) = (-self.support(-normal), other.support(normal));
            (high - low >= -least).then_some(Plane {
                normal,
                offset: 0.5 * (high + low),
            })
        };
        let mut ways = vec![self.centre - other.centre];
        for solid in [self, other] {
            let face = match &solid.region {
                Region::Cylinder { axis, .. } => Some(*axis),
                flat => flat.normal(),
            };
            ways.extend(face.into_iter().flat_map(|face| [face, -face]));
        }
        if let Some(plane) = ways.into_iter().find_map(by) {
            return Some(plane);
        }
        // By turns the nearest place of the one and of the other.
        let mut there = other.nearest_within(self.centre);
        for _ in 0..2000 {
            let here = self.nearest_within(there);
            there = other.nearest_within(here);
            if let Some(plane) = by(here - there) {
                return Some(plane);
            }
            if here.distance(there) <= 1e-9 * least {
                return None;
            }
        }
        None
    }
}

impl Solid {
    /// Whether the convex hulls have more in common than touching: by turns the
    /// nearest place of the one and of the other, both a millionth smaller.
    pub(super) fn meets(&self, other: &Self) -> bool {
        let apart = self.centre.distance(other.centre);
        if apart >= self.radius + other.radius {
            return false;
        }
        let least = self.radius.min(other.radius);
        let mut there = other.nearest_within(self.centre);
        let mut last = f64::INFINITY;
        for _ in 0..5000 {
            let here = self.nearest_within(there);
            there = other.nearest_within(here);
            let gap = here.distance(there);
            if gap <= 1e-9 * least {
                return true;
            }
            // It only ever shrinks: once it stands still they are apart.
            if gap > last * (1.0 - 1e-9) {
                return false;
            }
            last = gap;
        }
        last <= 1e-7 * least
    }
}

fn is_convex(vertices: &[DVec3], normal: DVec3) -> bool {
    let count = vertices.len();
    (0..count).all(|index| {
        let (a, b, c) = (
            vertices[index],
            vertices[(index + 1) % count],
            vertices[(index + 2) % count],
        );
        let (come, go) = (b - a, c - b);
        come.cross(go).dot(normal) >= -1e-12 * come.length() * go.length()
    })
}

/// The corners of the smallest convex outline round flat corners, anticlockwise
/// about the normal (Andrew's monotone chain).
pub(super) fn hull(vertices: &[DVec3], normal: DVec3) -> Vec<DVec3> {
    let (right, up) = normal.any_orthonormal_pair();
    let first = vertices.first().copied().unwrap_or_default();
    let mut points: Vec<(DVec2, DVec3)> = vertices
        .iter()
        .map(|vertex| {
            let off = *vertex - first;
            (DVec2::new(off.dot(right), off.dot(up)), *vertex)
        })
        .collect();
    points.sort_by(|(one, _), (other, _)| {
        (one.x.total_cmp(&other.x)).then(one.y.total_cmp(&other.y))
    });
    points.dedup_by(|(one, _), (other, _)| one == other);
    if points.len() < 3 {
        return points.into_iter().map(|(_, vertex)| vertex).collect();
    }
    let chain = |points: &mut dyn Iterator<Item = (DVec2, DVec3)>| {
        let mut chain: Vec<(DVec2, DVec3)> = Vec::new();
        for point in points {
            while let [.., before, last] = chain[..]
                && (last.0 - before.0).perp_dot(point.0 - last.0) <= 0.0
            {
                let _ = chain.pop();
            }
            chain.push(point);
        }
        let _ = chain.pop();
        chain
    };
    let mut outline = chain(&mut points.iter().copied());
    outline.extend(chain(&mut points.iter().rev().copied()));
    outline.into_iter().map(|(_, vertex)| vertex).collect()
}

fn nearest_of_polygon(hull: &[DVec3], normal: DVec3, point: DVec3) -> DVec3 {
    let first = hull.first().copied().unwrap_or_default();
    let foot = point - normal * (point - first).dot(normal);
    let mut inside = true;
    let mut best = (f64::INFINITY, first);
    let mut from = hull.last().copied().unwrap_or(first);
    for to in hull {
        let way = *to - from;
        if normal.cross(way).dot(foot - from) < 0.0 {
            inside = false;
        }
        let square = way.length_squared();
        let share = if square > 0.0 {
            ((foot - from).dot(way) / square).clamp(0.0, 1.0)
        } else {
            0.0
        };
        let place = from + way * share;
        let apart = place.distance_squared(foot);
        if apart < best.0 {
            best = (apart, place);
        }
        from = *to;
    }
    if inside { foot } else { best.1 }
}
