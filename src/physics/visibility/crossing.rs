//! Where two edges cross, and where they run along each other.

use glam::DVec3;

use super::edge::{Edge, Rim};
use super::quartic;

/// What two edges have in common.
#[derive(Debug, Default)]
pub(super) struct Common {
    /// Directions that lie on both: all crossings, and a few that are not.
    pub(super) places: Vec<DVec3>,
    /// Directions in which they only touch. Rounding puts them anywhere on a
    /// stretch on which the two lie within a hair of each other.
    pub(super) touches: Vec<DVec3>,
    /// They run along each other, at least in part; the places are the ends.
    pub(super) shared: bool,
}

/// Finds what two edges have in common and puts it into `common`, emptied first.
///
/// `hair` is the angle in radians below which directions count as one.
pub(super) fn find(one: &Edge, other: &Edge, hair: f64, common: &mut Common) {
    common.places.clear();
    common.touches.clear();
    common.shared = false;
    match (one, other) {
        (Edge::Straight { .. }, Edge::Straight { .. }) => {
            if straight(one, other, hair, common) {
                return;
            }
        }
        (Edge::Straight { from, to, .. }, Edge::Round { rim, .. }) => {
            mixed(*from, *to, rim, hair, common);
        }
        (Edge::Round { rim, .. }, Edge::Straight { from, to, .. }) => {
            mixed(*from, *to, rim, hair, common);
        }
        (Edge::Round { rim: first, .. }, Edge::Round { rim: second, .. }) => {
            if runs_along(first, second, hair) {
                common.shared = true;
                let (a, b) = one.ends();
                let (c, d) = other.ends();
                common.places.extend([a, b, c, d]);
            } else {
                round(first, second, hair, common);
            }
        }
    }
    let on_both = |place: &DVec3| {
        one.place_of(*place, hair).is_some() && other.place_of(*place, hair).is_some()
    };
    common.places.retain(on_both);
    common.touches.retain(on_both);
    if common.shared && common.places.len() < 2 {
        common.shared = false;
    }
}

/// Two straight edges; true if what was found needs no second look.
fn straight(one: &Edge, other: &Edge, hair: f64, common: &mut Common) -> bool {
    let (
        Edge::Straight {
            from: a,
            to: b,
            inward: first,
        },
        Edge::Straight {
            from: c,
            to: d,
            inward: second,
        },
    ) = (one, other)
    else {
        return true;
    };
    let (a, b, c, d) = (*a, *b, *c, *d);
    let side = |height: f64| {
        if height.abs() <= hair {
            0.0
        } else {
            height.signum()
        }
    };
    let (high_c, high_d) = (first.dot(c), first.dot(d));
    let (side_c, side_d) = (side(high_c), side(high_d));
    if side_c * side_d > 0.0 {
        return true;
    }
    let (high_a, high_b) = (second.dot(a), second.dot(b));
    let (side_a, side_b) = (side(high_a), side(high_b));
    if side_a * side_b > 0.0 {
        return true;
    }
    for (place, side) in [(a, side_a), (b, side_b), (c, side_c), (d, side_d)] {
        if side == 0.0 {
            common.places.push(place);
        }
    }
    match common.places.len() {
        0 => {
            // Each passes between the other's ends, if not on the far side.
            let place = c * high_d.abs() + d * high_c.abs();
            if place.dot(a + b) > 0.0 {
                common.places.push(place.normalize_or(c));
            }
            true
        }
        // An end of one on the other: that end is the crossing.
        1 => false,
        // Two ends near the other edge: along it, unless they are one corner
        // or lie beyond its ends.
        _ => {
            common.places.retain(|place| {
                one.place_of(*place, hair).is_some() && other.place_of(*place, hair).is_some()
            });
            let first = common.places.first().copied().unwrap_or_default();
            common.shared = common
                .places
                .iter()
                .any(|place| place.distance(first) > 4.0 * hair);
            false
        }
    }
}

/// A straight edge and a circle: a + u (b − a) on the cone is quadratic in u.
fn mixed(a: DVec3, b: DVec3, rim: &Rim, hair: f64, common: &mut Common) {
    let (share_a, off_a) = rim.seen(a);
    let (share_b, off_b) = rim.seen(b);
    let (share, off) = (share_b - share_a, off_b - off_a);
    let radius = rim.circle.radius();
    let square = radius * radius;
    let second = square * share * share - off.length_squared();
    let first = square * share_a * share - off_a.dot(off);
    let constant = square * share_a * share_a - off_a.length_squared();
    let root = first * first - second * constant;
    let bound = first * first + (second * constant).abs();
    if root < -1e-12 * bound {
        return;
    }
    let middle = (second != 0.0).then(|| a + (b - a) * (-first / second));
    let touches = middle.is_some_and(|middle| rim.is_passed_by(middle, hair));
    // One that only touches has one place in common, not two that rounding
    // puts anywhere.
    let root = if touches { 0.0 } else { root.max(0.0).sqrt() };
    let sum = -(first + root.copysign(first));
    let mut push = |share: f64| {
        if (-1e-9..=1.0 + 1e-9).contains(&share) {
            let place = a + (b - a) * share.clamp(0.0, 1.0);
            if rim.seen(place).0 > 0.0 {
                let found = if touches {
                    &mut common.touches
                } else {
                    &mut common.places
                };
                found.push(place.normalize_or(a));
            }
        }
    };
    if second != 0.0 {
        push(sum / second);
    }
    if sum != 0.0 {
        push(constant / sum);
    }
}

/// Whether two circles lie on one cone: five points of one do on the other.
fn runs_along(first: &Rim, second: &Rim, hair: f64) -> bool {
    (0..5_u8).all(|corner| {
        let place = first.circle.point(1.0 + 1.256 * f64::from(corner));
        second
            .miss(place.normalize_or(place))
            .is_some_and(|miss| miss <= 4.0 * hair)
    })
}

/// Two circles: on the first the second's cone is quadratic in sin and cos, and
/// of degree four in the tangent of the half angle.
fn round(first: &Rim, second: &Rim, hair: f64, common: &mut Common) {
    let circle = &first.circle;
    let bases = [
        circle.centre(),
        circle.away() * circle.radius(),
        circle.along() * circle.radius(),
    ];
    let seen = bases.map(|base| second.seen(base));
    let square = second.circle.radius() * second.circle.radius();
    let term = |i: usize, j: usize| square * seen[i].0 * seen[j].0 - seen[i].1.dot(seen[j].1);
    let (m00, m11, m22, m12) = (term(0, 0), term(1, 1), term(2, 2), term(1, 2));
    let (m01, m02) = (term(0, 1), term(0, 2));
    // The half about angle zero, then the half about π.
    for (turn, m01, m02) in [(0.0, m01, m02), (std::f64::consts::PI, -m01, -m02)] {
        let terms = [
            m00 + 2.0 * m01 + m11,
            4.0 * (m02 + m12),
            2.0 * (m00 - m11) + 4.0 * m22,
            4.0 * (m02 - m12),
            m00 - 2.0 * m01 + m11,
        ];
        // Roots at which the circles only touch come in twos or threes, with no
        // more than a hair between the circles all the way.
        let mut run: Option<(f64, f64)> = None;
        let mut settle = |run: Option<(f64, f64)>| {
            let Some((first, last)) = run else { return };
            let place = circle.point(0.5 * (first + last));
            if second.seen(place).0 > 0.0 {
                let place = place.normalize_or(place);
                let beside = |angle: f64| second.is_passed_by(circle.point(angle), hair);
                if first < last || (beside(first - 3e-7) && beside(first + 3e-7)) {
                    common.touches.push(place);
                } else {
                    common.places.push(place);
                }
            }
        };
        for tangent in quartic::roots(terms) {
            let angle = turn + 2.0 * tangent.atan();
            run = match run {
                Some((first, last))
                    if angle - last < 0.1
                        && second.is_passed_by(circle.point(0.5 * (last + angle)), hair) =>
                {
                    Some((first, angle))
                }
                before => {
                    settle(before);
                    Some((angle, angle))
                }
            };
        }
        settle(run);
    }
}
