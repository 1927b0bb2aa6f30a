//! The line of a zone, and the search for where its rule begins to be met.

use std::sync::{Arc, OnceLock};

use glam::{DVec3, Vec3Swizzles};

use super::Extent;
use crate::guidance::Envelope;
use crate::notebook::cell::curve::steps;
use crate::notebook::cell::position::sights::envelope;
use crate::notebook::cell::position::{Orientation, Views};
use crate::notebook::scene::{Form, Weights};

/// Where a zone's line runs, and who walks along it.
#[derive(Clone, Debug)]
pub(super) struct Line {
    pub(super) form: Arc<Form>,
    pub(super) origin: DVec3,
    pub(super) ahead: DVec3,
    pub(super) z: f64,
    pub(super) ground: f64,
    pub(super) reach: f64,
    pub(super) envelope: Envelope,
}

/// What is asked at every distance: whether `limit` in W/m² is passed, for the
/// exitances `weights` of the sources.
pub(super) struct Rule<'a> {
    pub(super) orientation: Orientation,
    pub(super) weights: &'a Weights<'a>,
    pub(super) limit: f64,
}

/// The line of a zone with the distances at which it is looked at, and what is
/// seen from each of them that was looked at so far.
#[derive(Clone, Debug)]
pub struct Track {
    line: Line,
    /// How far the outline reaches along the line, m.
    pub edge: f64,
    /// For each part its centre on the plan and its bounding radius, m.
    balls: Vec<(glam::DVec2, f64)>,
    /// By distance, growing.
    stops: Vec<Stop>,
    /// The first stop beyond the feet of all sources on the line: from here on
    /// every step leads away from all of them.
    beyond: usize,
}

/// One distance, m, with what is seen from around it: nothing where a source is
/// touched. What is seen depends on nothing that could change afterwards, so
/// that it does not matter who asks first.
#[derive(Clone, Debug)]
struct Stop {
    distance: f64,
    views: OnceLock<Option<Views>>,
}

/// The nearest clear distance that is looked at, m.
const NEAREST: f64 = 0.01;

/// How many stops there are from the nearest to the farthest.
const STOPS: u32 = 160;

impl Line {
    fn look(&self, distance: f64) -> Option<Views> {
        let (eye, points) = self.points(distance);
        Views::look(&self.form, eye, points).ok()
    }

    /// Looks from one of the points around a distance alone.
    fn look_from(&self, distance: f64, point: usize) -> Option<Views> {
        let (eye, points) = self.points(distance);
        Views::look(&self.form, eye, vec![*points.get(point)?]).ok()
    }

    fn points(&self, distance: f64) -> (DVec3, Vec<DVec3>) {
        let eye = (self.origin + self.ahead * distance).with_z(self.z);
        let points = envelope(eye, self.ground, self.reach, self.envelope);
        (eye, points)
    }

    /// Returns the distances at which the line is looked at: geometric steps,
    /// and closer ones where the line passes a source, whose reach along the
    /// line could fall between two steps.
    fn distances(&self, edge: f64, farthest: f64) -> Vec<f64> {
        let clear = farthest - edge;
        let mut distances: Vec<f64> = steps(NEAREST.min(clear / 2.0), clear, STOPS)
            .into_iter()
            .map(|step| edge + step)
            .collect();
        for shape in &self.form.shapes {
            let centre = shape.region.centre();
            let foot = (centre - self.origin).dot(self.ahead);
            let aside = (centre - self.origin).with_z(0.0) - self.ahead * foot;
            let spread = shape.region.bounding_radius() + aside.length() + self.reach;
            for share in [-2.0, -1.0, -0.5, -0.2, 0.0, 0.2, 0.5, 1.0, 2.0] {
                distances.push(foot + share * spread);
            }
        }
        distances.retain(|distance| *distance > edge && *distance <= farthest);
        distances.sort_unstable_by(f64::total_cmp);
        distances.dedup();
        distances
    }
}

impl Rule<'_> {
    /// Returns the worst irradiance. Where a source is touched it is what all
    /// sources together send out: no irradiance can be more. Touching is not
    /// judged here, and a cool surface that is touched is no zone.
    fn exposure(&self, views: Option<&Views>) -> f64 {
        views.map_or_else(
            || self.weights.sent().iter().sum(),
            |views| views.worst(self.orientation, self.weights),
        )
    }

    /// Returns the logarithm of exposure over limit: above zero where the rule
    /// is not met.
    fn height(&self, exposure: f64) -> f64 {
        if exposure > 0.0 {
            (exposure / self.limit).ln()
        } else {
            f64::NEG_INFINITY
        }
    }
}

impl Track {
    pub(super) fn new(line: Line, edge: f64, farthest: f64) -> Track {
        let (mut balls, mut foot) = (Vec::new(), f64::NEG_INFINITY);
        for (centre, radius) in line.form.balls() {
            balls.push((centre.xy(), *radius));
            foot = foot.max((*centre - line.origin).dot(line.ahead));
        }
        let stops: Vec<Stop> = line
            .distances(edge, farthest)
            .into_iter()
            .map(|distance| Stop {
                distance,
                views: OnceLock::new(),
            })
            .collect();
        Track {
            beyond: stops.partition_point(|stop| stop.distance <= foot),
            edge,
            balls,
            stops,
            line,
        }
    }

    /// Returns the outermost distance at which the irradiance passes the limit.
    ///
    /// # Accuracy
    ///
    /// 0.1 mm, given that between two stops the irradiance does not rise and
    /// fall again.
    pub(super) fn outermost(&self, rule: &Rule<'_>) -> Extent {
        // Beyond all sources the bound only falls: no stop in the part that is
        // left out here could pass the limit.
        let tail = &self.stops[self.beyond..];
        let over =
            tail.partition_point(|stop| self.bound(stop.distance, rule.weights) > rule.limit);
        let mut outside = tail.get(over);
        for stop in self.stops[..self.beyond + over].iter().rev() {
            if self.bound(stop.distance, rule.weights) > rule.limit
                && rule.exposure(self.views(stop)) > rule.limit
            {
                return outside.map_or(Extent::NotMetWithin(stop.distance), |outside| {
                    Extent::At(self.narrow(stop, outside, rule))
                });
            }
            outside = Some(stop);
        }
        Extent::MetEverywhere
    }

    /// Returns where the line ends, m.
    pub(super) fn end(&self) -> f64 {
        self.stops.last().map_or(self.edge, |stop| stop.distance)
    }

    fn views<'a>(&'a self, stop: &'a Stop) -> Option<&'a Views> {
        stop.views
            .get_or_init(|| self.line.look(stop.distance))
            .as_ref()
    }

    /// Returns what the irradiance around a distance stays below, in any
    /// orientation: a region in a ball of radius R at a distance r sends at
    /// most what the whole ball would, of which (R/r)² is seen.
    fn bound(&self, distance: f64, weights: &Weights<'_>) -> f64 {
        let stand = (self.line.origin + self.line.ahead * distance).xy();
        self.balls
            .iter()
            .zip(weights.sent())
            .map(|((centre, radius), weight)| {
                let nearest = stand.distance(*centre) - self.line.reach;
                if nearest > *radius {
                    weight * (radius / nearest).powi(2) * (1.0 + 1e-9)
                } else {
                    f64::INFINITY
                }
            })
            .sum()
    }

    /// Narrows a crossing between two stops down, and returns its outer side.
    fn narrow(&self, inside: &Stop, outside: &Stop, rule: &Rule<'_>) -> f64 {
        let height = |views: Option<&Views>| rule.height(rule.exposure(views));
        let whole = |distance| height(self.line.look(distance).as_ref());
        let a = (inside.distance, height(self.views(inside)));
        let b = (outside.distance, height(self.views(outside)));
        // Past much that hides, looking costs: the point that is worst on the
        // inner side is followed alone, and all the others are asked at the end.
        if !self.line.form.is_plain()
            && let Some(views) = self.views(inside)
        {
            let (_, point) = views.worst_point(rule.orientation, rule.weights);
            let alone = |distance| height(self.line.look_from(distance, point).as_ref());
            let end = close_in(a, (b.0, alone(b.0)), alone);
            let there = whole(end);
            if there <= 0.0 {
                return end;
            }
            return close_in((end, there), b, whole);
        }
        close_in(a, b, whole)
    }
}

/// Closes a crossing in between a place inside and one outside, each with the
/// logarithm of exposure over limit, and returns its outer side.
///
/// The Illinois variant of the regula falsi (Dowell and Jarratt 1971) on the
/// logarithms of distance and of exposure over limit, which make a nearly
/// straight line; each guess but the first is aimed a little beyond the
/// crossing, so that it closes it in. Halving where a source is touched or the
/// steps stay large.
fn close_in(inside: (f64, f64), outside: (f64, f64), between: impl Fn(f64) -> f64) -> f64 {
    const WIDTH: f64 = 1e-4;
    let (mut a, mut fa) = inside;
    let (mut b, mut fb) = outside;
    let (mut side, mut beyond) = (0_i8, 0.0);
    for round in 0..100 {
        if b - a <= WIDTH {
            break;
        }
        let straight = (b.ln() - fb * (b.ln() - a.ln()) / (fb - fa)).exp() + beyond;
        let margin = 0.25 * WIDTH;
        let next = if round % 4 < 3 && straight.is_finite() {
            straight.clamp(a + margin, b - margin)
        } else {
            0.5 * (a + b)
        };
        let f = between(next);
        if f > 0.0 {
            (a, fa) = (next, f);
            if side == 1 {
                fb /= 2.0;
            }
            (side, beyond) = (1, 0.4 * WIDTH);
        } else {
            (b, fb) = (next, f);
            if side == -1 {
                fa /= 2.0;
            }
            (side, beyond) = (-1, -0.4 * WIDTH);
        }
    }
    b
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::notebook::cell::position::Band;
    use crate::notebook::cell::source::{Kind, Shape};
    use crate::notebook::scene::Heat;
    use crate::physics::region::Region;

    fn track(envelope: Envelope, heading: f64) -> Track {
        let regions = [
            Region::rectangle(DVec3::Z, DVec3::Y, DVec3::Z, 0.9, 0.7),
            Region::disc(DVec3::new(2.0, 9.0, 0.6), DVec3::Z, 0.8),
            Region::sphere(DVec3::new(-3.0, 4.0, 1.0), 0.4),
        ];
        let shapes = regions.map(|region| {
            let region = region.expect("a source");
            let centre = region.centre();
            Arc::new(Shape::simple(region, Kind::Body, centre, DVec3::Y))
        });
        let line = Line {
            form: Arc::new(
                Form::new(
                    ["door", "pool", "ball"].map(Arc::from).to_vec(),
                    shapes.to_vec(),
                    false,
                )
                .expect("a small scene"),
            ),
            origin: DVec3::Z,
            ahead: DVec3::new(heading.sin(), heading.cos(), 0.0),
            z: 1.6,
            ground: 0.0,
            reach: 0.3,
            envelope,
        };
        Track::new(line, 0.0, 200.0)
    }

    /// A walk over every stop, from the farthest on, with nothing passed over.
    fn walked(track: &Track, rule: &Rule<'_>) -> Option<(f64, f64)> {
        let mut outside = f64::INFINITY;
        for stop in track.stops.iter().rev() {
            let exposure = rule.exposure(track.views(stop));
            let bound = track.bound(stop.distance, rule.weights);
            assert!(
                exposure <= bound || exposure.is_infinite() && bound.is_infinite(),
                "at {}: {exposure} above {bound}",
                stop.distance
            );
            if exposure > rule.limit {
                return Some((stop.distance, outside));
            }
            outside = stop.distance;
        }
        None
    }

    #[test]
    fn nothing_that_is_passed_over_hides_the_outermost_crossing() {
        let mut found = 0;
        for envelope in [Envelope::Eye, Envelope::Skin] {
            for heading in [0.0, 0.2, -0.7, 1.5] {
                let track = track(envelope, heading);
                for weights in [[3e5, 1e5, 2e5], [3e5, 0.0, 0.0], [1e2, 9e5, 1e4]] {
                    for limit in [0.01, 10.0, 100.0, 1000.0, 8000.0, 1e7] {
                        let heat = Heat::of_totals(&weights);
                        let rule = Rule {
                            orientation: Orientation::Strongest,
                            weights: &heat.weights(Band::Total),
                            limit,
                        };
                        let extent = track.outermost(&rule);
                        match (walked(&track, &rule), extent) {
                            (None, Extent::MetEverywhere) => {}
                            (Some((farthest, f64::INFINITY)), Extent::NotMetWithin(end)) => {
                                assert!(farthest == end, "{farthest} {end}");
                            }
                            (Some((inside, outside)), Extent::At(distance)) => {
                                assert!(inside < distance && distance <= outside, "{distance}");
                                let at = |distance: f64| {
                                    rule.exposure(track.line.look(distance).as_ref())
                                };
                                // The first stops are closer together than that.
                                let nearer = (distance - 1.01e-4).max(inside);
                                let (before, here) = (at(nearer), at(distance));
                                assert!(
                                    before > limit && here <= limit,
                                    "{distance}: {before} and {here} about {limit}"
                                );
                                found += 1;
                            }
                            other => panic!("{limit}: {other:?}"),
                        }
                    }
                }
            }
        }
        assert!(found > 60, "{found}");
    }
}
