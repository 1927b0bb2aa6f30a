//! The balance of a rectangular tunnel face by face: how the walls differ round
//! the outline, where one sees more of its neighbour and another less.
//!
//! Lengths in metres; depths below the outer edge.

use std::f64::consts::PI;

use crate::numeric::gauss::Rule;
use crate::numeric::linear;
use crate::physics::view_factor::rectangle;

/// How many gaps long an outline may be to be worked out face by face; beyond,
/// its ends matter little.
const LONGEST: f64 = 10.0;

/// How many gaps deep a wall may be; beyond, the walls hardly differ where most
/// is sent.
const DEEPEST: f64 = 6.0;

/// A place on a wall; it stands for the four places that are as it, and, for
/// those as deep from the inner edge, as it but for the sign.
#[derive(Clone, Copy, Debug)]
struct Place {
    /// Whether it is one of the walls along the width.
    wide: bool,
    /// From the nearer corner.
    along: f64,
    depth: f64,
    area: f64,
}

/// Returns what leaves the outer edge of a rectangular tunnel of what enters at
/// the inner one, its walls re-radiating.
///
/// None where it is not worked out: for outlines longer than ten times their
/// gap, and walls deeper than six times.
///
/// # Accuracy
///
/// Absolute error below `2e-5`, seen against extrapolated zones and by taking
/// more places.
///
/// # Source
///
/// Nyström's method for what the exitance differs from one half, with the
/// difference of two places under the integral, so that the kernel may be
/// steep, and the factors to the mouths exact. Checked in
/// `tests/published/thick_openings.rs`.
pub(super) fn transmitted(width: f64, height: f64, depth: f64) -> Option<f64> {
    let gap = width.min(height);
    if width.max(height) > LONGEST * gap || depth > DEEPEST * gap {
        return None;
    }
    let points = |length: f64, most: f64| (7.0 + 2.0 * length / gap).min(most).ceil() as u16;
    let counts = [
        points(width, 18.0),
        points(height, 18.0),
        points(2.0 * depth, 24.0),
    ];
    with_places(width, height, depth, counts).map(|(transmitted, _)| transmitted)
}

/// What leaves the outer edge, and by how much the exitance at each place is
/// above one half.
fn with_places(
    width: f64,
    height: f64,
    depth: f64,
    counts: [u16; 3],
) -> Option<(f64, Vec<(Place, f64)>)> {
    let mut places = Vec::new();
    for (wide, length, count) in [(true, width, counts[0]), (false, height, counts[1])] {
        for (along, across) in crowded(count, 0.5 * length) {
            for (down, weight) in crowded(counts[2], 0.5 * depth) {
                places.push(Place {
                    wide,
                    along,
                    depth: down,
                    area: across * weight,
                });
            }
        }
    }
    let length = |wide: bool| if wide { width } else { height };
    let mouth = |place: &Place, distance: f64| {
        let across = length(!place.wide);
        let side = |along: f64| {
            rectangle::from_perpendicular_element_at_corner(across, along, distance).ok()
        };
        Some(side(place.along)? + side(length(place.wide) - place.along)?)
    };
    let mut rows = Vec::with_capacity(places.len());
    let mut net = Vec::with_capacity(places.len());
    for (index, here) in places.iter().enumerate() {
        let (outer, inner) = (mouth(here, here.depth)?, mouth(here, depth - here.depth)?);
        let own = length(here.wide);
        let mut row = Vec::with_capacity(places.len() + 1);
        let mut sum = outer + inner;
        for there in &places {
            let (mut same, mut other) = (0.0, 0.0);
            for along in [there.along, length(there.wide) - there.along] {
                for (down, sign) in [(there.depth, 1.0), (depth - there.depth, -1.0)] {
                    let deep = (here.depth - down).powi(2);
                    let kernel = if here.wide == there.wide {
                        let gap = length(!here.wide);
                        let square = gap * gap + (here.along - along).powi(2) + deep;
                        (gap / square).powi(2)
                    } else {
                        let seen = |off: f64| {
                            let square = off * off + along * along + deep;
                            off * along / (square * square)
                        };
                        seen(here.along) + seen(own - here.along)
                    };
                    same += kernel;
                    other += sign * kernel;
                }
            }
            sum += there.area * same / PI;
            row.push(-there.area * other / PI);
        }
        row[index] += sum;
        row.push(0.5 * (inner - outer));
        rows.push(row);
        net.push(outer - inner);
    }
    let above = linear::solve(rows)?;
    // Four places each, of both halves of the depth.
    let walls: f64 = places
        .iter()
        .zip(&net)
        .zip(&above)
        .map(|((place, net), above)| 4.0 * place.area * net * above)
        .sum();
    let straight = rectangle::between(width, height, depth);
    let transmitted = 0.5 * (1.0 + straight) + walls / (width * height);
    let above = places.into_iter().zip(above).collect();
    Some((transmitted.clamp(straight, 1.0), above))
}

/// Points from zero to a length, crowded towards zero, with their weights.
fn crowded(count: u16, length: f64) -> Vec<(f64, f64)> {
    Rule::new(count)
        .on(0.0, 1.0)
        .map(|(u, weight)| {
            let place = length * u * u * (1.5 - 0.5 * u);
            (place, length * weight * u * (3.0 - 1.5 * u))
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use glam::DVec3;

    use super::*;
    use crate::physics::opening::section::Section;
    use crate::physics::opening::tunnel::Tunnel;
    use crate::physics::region::Region;

    #[test]
    fn more_places_change_little() {
        for (width, height, depth) in [
            (1.0, 1.0, 0.05),
            (1.0, 1.0, 0.5),
            (0.7, 0.7, 1.4),
            (2.0, 1.0, 0.5),
            (1.0, 5.0, 3.0),
        ] {
            let found = transmitted(width, height, depth).expect("worked out");
            let finer = with_places(width, height, depth, [16, 16, 18]);
            let (finer, _) = finer.expect("worked out");
            assert!(
                (found - finer).abs() < 2e-5,
                "{width} × {height}, {depth} deep: {found} against {finer}"
            );
        }
    }

    #[test]
    fn walls_that_share_their_heat_let_a_little_more_through() {
        for (width, height) in [(1.0, 1.0), (2.0, 1.0), (1.0, 4.0), (10.0, 1.0)] {
            for depth in [0.03, 0.1, 0.25, 0.5, 1.0, 3.0] {
                let section = Section::rectangle(width, height).expect("a rectangle");
                let tunnel = Tunnel::new(section, depth).expect("a possible wall");
                let (shared, own) = (
                    tunnel.transmitted(),
                    transmitted(width, height, depth).expect("worked out"),
                );
                assert!(
                    shared > own - 1e-6 && shared < own + 2e-4,
                    "{width} × {height}, {depth} deep: {own}, shared {shared}"
                );
            }
        }
    }

    /// What a receiver before the opening gets of the walls that it sees, with
    /// their exitances face by face and as if they shared their heat, and what
    /// it would get without a wall.
    fn looked_at(
        [width, height, depth]: [f64; 3],
        places: &[(Place, f64)],
        point: DVec3,
    ) -> [f64; 3] {
        let normal = -point.normalize();
        let section = Section::rectangle(width, height).expect("a rectangle");
        let tunnel = Tunnel::new(section, depth).expect("a possible wall");
        let mut sums = [0.0; 2];
        for (place, above) in places.iter().copied() {
            for turn in 0..8_u8 {
                let flip = |bit: u8| turn >> bit & 1 == 1;
                let own = if place.wide { width } else { height };
                let along = 0.5 * own - place.along;
                let along = if flip(0) { along } else { -along };
                let (down, above) = if flip(1) {
                    (depth - place.depth, -above)
                } else {
                    (place.depth, above)
                };
                let side = if flip(2) { 0.5 } else { -0.5 };
                let (at, inward) = if place.wide {
                    (DVec3::new(along, -down, side * height), DVec3::Z * -side)
                } else {
                    (DVec3::new(side * width, -down, along), DVec3::X * -side)
                };
                let way = at - point;
                let through = point + way * (point.y / -way.y);
                let cosines = way.dot(normal).max(0.0) * (-way.dot(inward)).max(0.0) * 2.0;
                if through.x.abs() < 0.5 * width && through.z.abs() < 0.5 * height {
                    let share = place.area * cosines / (PI * way.length_squared().powi(2));
                    sums[0] += share * (0.5 + above);
                    sums[1] += share * tunnel.exitance(down);
                }
            }
        }
        let outer = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, width, height);
        let plain = outer.expect("a rectangle").view(point).into_view();
        [
            sums[0],
            sums[1],
            plain.map_or(0.0, |view| view.factor(normal)),
        ]
    }

    #[test]
    fn walls_that_share_their_heat_look_nearly_the_same() {
        for sides in [
            [1.0, 1.0, 0.5],
            [1.0, 1.0, 2.0],
            [2.0, 1.0, 0.5],
            [2.0, 1.0, 3.0],
            [5.0, 1.0, 1.0],
            [5.0, 1.0, 3.0],
        ] {
            let [width, height, depth] = sides;
            let (_, places) = with_places(width, height, depth, [16, 16, 16]).expect("worked out");
            for (point, most) in [
                (DVec3::new(0.0, 0.3, 0.0), 1.5e-3),
                (DVec3::new(0.0, 1.0, 0.0), 1e-3),
                (DVec3::new(0.0, 3.0, 0.0), 1e-3),
                (DVec3::new(0.0, 10.0, 0.0), 5e-4),
                (DVec3::new(1.5, 2.0, 0.0), 1e-3),
                (DVec3::new(1.5, 2.0, 1.5), 1e-3),
                (DVec3::new(2.0, 5.0, 0.0), 1e-3),
                (DVec3::new(2.0, 1.0, 2.0), 2e-3),
            ] {
                let [own, shared, plain] = looked_at(sides, &places, point);
                assert!(
                    (shared - own).abs() < most * plain,
                    "{sides:?} from {point}: {own}, shared {shared}, of {plain}"
                );
            }
        }
    }

    #[test]
    fn a_turned_outline_sends_the_same() {
        let (one, other) = (transmitted(2.0, 1.0, 0.7), transmitted(1.0, 2.0, 0.7));
        let difference = one.expect("worked out") - other.expect("worked out");
        assert!(difference.abs() < 1e-12, "{one:?} against {other:?}");
        assert_eq!(transmitted(10.1, 1.0, 0.5), None);
        assert_eq!(transmitted(1.0, 1.0, 6.1), None);
    }
}
