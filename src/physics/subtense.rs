//! How large a source looks from a point: its angular subtense.
//!
//! Angles in radians, places in metres. The whole outline counts, also where
//! something hides a part of it: a larger subtense only makes the limits that
//! hang on it stricter. Nothing is clipped here; limits clip for themselves.

mod hull;
#[cfg(test)]
mod tests;

use std::f64::consts::TAU;

use glam::DVec3;

use super::region::Region;

/// The greatest and the smallest angle under which a source is seen.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Subtense {
    /// The greatest angle between two points of the outline, rad.
    ///
    /// Of a rectangle that is its diagonal. Practice often takes the longer
    /// side, which is less: the diagonal errs to the safe side.
    pub greatest: f64,
    /// The smallest angle between two planes through the point that have the
    /// source between them, rad: the apparent width of its narrowest side.
    pub smallest: f64,
}

impl Subtense {
    /// Of what is not seen.
    pub const NONE: Self = Self {
        greatest: 0.0,
        smallest: 0.0,
    };

    /// Returns the angular subtense α: the mean of the greatest and the
    /// smallest angular dimension, rad.
    ///
    /// A limit that clips each dimension before it takes their mean clips
    /// [`Self::greatest`] and [`Self::smallest`] itself.
    ///
    /// # Source
    ///
    /// CIE S 017:2020, *ILV: International Lighting Vocabulary*, 17-25-085,
    /// note 4 (read): of a source that is not symmetrical, the arithmetic mean
    /// of the maximum and the minimum angular dimension; full angles, not half
    /// ones. The same rule from memory in IEC 62471:2006, ICNIRP 2013 and
    /// directive 2006/25/EC, annex I.
    #[must_use]
    pub fn mean(self) -> f64 {
        0.5 * (self.greatest + self.smallest)
    }
}

/// Returns the angular subtense of a region from a point.
///
/// [`Subtense::NONE`] where a flat region is seen from behind; `None` where the
/// point touches the region, lies in it, or is no finite place.
///
/// # Accuracy
///
/// Discs, spheres, polygons and plates exactly, to `1e-13` of a radian. The end
/// faces of a cylinder count as polygons of 96 sides drawn about their circles,
/// so that an angle is never less than the truth and the part of it that the
/// radius makes is greater by `6e-4` at most. The greatest angle of a polygon is
/// that between two of its corners, or the smallest if that is more; above a
/// right angle, where every limit has long been clipped, other points of it may
/// lie farther apart.
///
/// # Source
///
/// A disc is seen as an elliptic cone, whose principal angles are closed forms.
/// The narrowest pair of planes about a convex outline lies along one of its
/// sides: where neither plane does, turning both about the corners they touch
/// narrows the pair. Checked in this module's tests against a search over
/// directions.
///
/// # Examples
///
/// ```
/// use farglow::physics::region::Region;
/// use farglow::physics::subtense;
/// use glam::DVec3;
///
/// let door = Region::disc(DVec3::ZERO, DVec3::Y, 0.5)?;
/// let seen = subtense::of(&door, DVec3::new(0.0, 5.0, 0.0)).expect("in front of the door");
/// assert!((seen.mean() - 2.0 * 0.1_f64.atan()).abs() < 1e-15);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
#[must_use]
pub fn of(region: &Region, point: DVec3) -> Option<Subtense> {
    if region.touches(point) {
        return None;
    }
    Some(match region {
        Region::Disc {
            centre,
            normal,
            radius,
        } => disc(*centre - point, *normal, *radius),
        Region::Polygon { vertices, normal } => polygon(vertices, *normal, point),
        Region::Plate { vertices, normal } => plate(vertices, *normal, point),
        Region::Sphere { centre, radius } => sphere(centre.distance(point), *radius),
        Region::Cylinder { base, axis, radius } => cylinder(*base, *axis, *radius, point),
    })
}

/// A disc; `centre` from the point.
fn disc(centre: DVec3, normal: DVec3, radius: f64) -> Subtense {
    let height = -centre.dot(normal);
    if height < 0.0 {
        return Subtense::NONE;
    }
    let lateral = (centre + normal * height).length();
    // In the axes of the cone that the disc is seen as, (u, v, w) about its own
    // axis w: λ u² + h² v² = μ w², where λ − μ is `trace` and λ μ is (h R)².
    let (near, far) = (lateral - radius, lateral + radius);
    let trace = height * height + near * far;
    let root = trace.hypot(2.0 * height * radius);
    let (greatest, smallest) = if trace >= 0.0 {
        let lambda = 0.5 * (trace + root);
        (radius.atan2(lambda.sqrt()), (height * radius).atan2(lambda))
    } else {
        // λ is small: from μ, which then has all its digits.
        let mu = 0.5 * (root - trace);
        (mu.sqrt().atan2(height), mu.atan2(height * radius))
    };
    Subtense {
        greatest: 2.0 * greatest,
        smallest: 2.0 * smallest,
    }
}

/// A sphere whose centre lies at a distance.
fn sphere(distance: f64, radius: f64) -> Subtense {
    let tangent = ((distance - radius) * (distance + radius)).sqrt();
    let angle = 2.0 * radius.atan2(tangent);
    Subtense {
        greatest: angle,
        smallest: angle,
    }
}

/// A polygon, seen from in front of it.
fn polygon(vertices: &[DVec3], normal: DVec3, point: DVec3) -> Subtense {
    let rays: Vec<DVec3> = vertices.iter().map(|vertex| *vertex - point).collect();
    let height = -rays[0].dot(normal);
    if height <= 0.0 {
        return Subtense::NONE;
    }
    hull::subtense(&rays, -normal)
}

/// A thin plate, seen from either side.
fn plate(vertices: &[DVec3], normal: DVec3, point: DVec3) -> Subtense {
    match vertices.first() {
        Some(first) if (*first - point).dot(normal) > 0.0 => polygon(vertices, -normal, point),
        Some(_) => polygon(vertices, normal, point),
        None => Subtense::NONE,
    }
}

/// A solid cylinder, from a point outside it.
fn cylinder(base: DVec3, axis: DVec3, radius: f64, point: DVec3) -> Subtense {
    /// Sides of an end face.
    const SIDES: u8 = 96;
    let along = axis.normalize_or(DVec3::Z);
    let (right, up) = along.any_orthonormal_pair();
    let outer = radius / (0.5 * TAU / f64::from(SIDES)).cos();
    let from = base - point;
    let rays: Vec<DVec3> = (0..SIDES)
        .flat_map(|side| {
            let (sine, cosine) = (TAU * f64::from(side) / f64::from(SIDES)).sin_cos();
            let rim = from + (right * cosine + up * sine) * outer;
            [rim, rim + axis]
        })
        .collect();
    // The nearest point of the cylinder: all of it lies beyond the plane through
    // that point, square to the way there.
    let height = (-from).dot(along).clamp(0.0, axis.length());
    let foot = from + along * height;
    let aside = foot - along * foot.dot(along);
    let nearest = foot - aside.normalize_or_zero() * radius.min(aside.length());
    let ahead = nearest.normalize_or(along);
    // The sides drawn about the circles may reach nearer than the cylinder does.
    if rays.iter().all(|ray| ray.dot(ahead) > 0.0) {
        hull::subtense(&rays, ahead)
    } else {
        // So near that it fills half of what can be seen.
        let half = std::f64::consts::PI;
        Subtense {
            greatest: half,
            smallest: half,
        }
    }
}
