//! Straight ways, and the regions they meet.

use glam::DVec3;

use super::cylinder::Cylinder;
use super::{Region, TOUCH, outline, size};

impl Region {
    /// Says whether the straight way between two points meets the region,
    /// ends included.
    ///
    /// Ways that are not between finite places meet it, so that they are
    /// refused.
    #[must_use]
    pub fn crosses(&self, from: DVec3, to: DVec3) -> bool {
        if !from.is_finite() || !to.is_finite() {
            return true;
        }
        let way = to - from;
        // Too far away to come near, with room for all rounding: most ways are.
        let (centre, radius) = self.ball();
        let apart = from.distance(centre) - way.length();
        if apart > radius + 1e-6 * (radius + size(from) + size(to)) {
            return false;
        }
        if self.touches(from) || self.touches(to) {
            return true;
        }
        match self {
            Self::Sphere { centre, radius } => distance_to_segment(*centre, from, to) <= *radius,
            Self::Cylinder { base, axis, radius } => {
                Cylinder::new(*base, *axis, *radius).is_met_by(from, to)
            }
            Self::Disc {
                centre,
                normal,
                radius,
            } => match meeting(*centre, *normal, from, way) {
                Meeting::Apart => false,
                Meeting::At(place) => place.distance(*centre) <= *radius,
                Meeting::InPlane => distance_to_segment(*centre, from, to) <= *radius,
            },
            Self::Polygon { vertices, normal } | Self::Plate { vertices, normal } => {
                match meeting(vertices[0], *normal, from, way) {
                    Meeting::Apart => false,
                    Meeting::At(place) => outline::holds(vertices, *normal, place, 0.0),
                    Meeting::InPlane => outline::is_met_by(vertices, *normal, from, to),
                }
            }
        }
    }
}

/// How a segment meets a plane.
enum Meeting {
    Apart,
    At(DVec3),
    InPlane,
}

fn meeting(on: DVec3, normal: DVec3, from: DVec3, way: DVec3) -> Meeting {
    let reach = TOUCH * ((from - on).length() + way.length() + on.length());
    let (start, end) = ((from - on).dot(normal), (from + way - on).dot(normal));
    if start.abs() <= reach && end.abs() <= reach {
        Meeting::InPlane
    } else if start * end > 0.0 {
        Meeting::Apart
    } else {
        Meeting::At(from + way * (start / (start - end)))
    }
}

pub(super) fn distance_to_segment(place: DVec3, from: DVec3, to: DVec3) -> f64 {
    let way = to - from;
    let square = way.length_squared();
    let share = if square > 0.0 {
        ((place - from).dot(way) / square).clamp(0.0, 1.0)
    } else {
        0.0
    };
    (from + way * share).distance(place)
}
