//! The shading of a rail: the irradiance along its line, in steps.

use super::{Probe, Stretch};
use crate::drawing::measure::Measure;
use crate::notebook::cell::position::Band;

/// The nearest clear distance that is looked at, m.
const NEAREST: f64 = 0.01;

/// How many points are looked at along the line.
const POINTS: u32 = 200;

/// How many steps the shading has at most.
const MOST_LEVELS: usize = 11;

/// The shading of a ruler, with what it was worked out from.
#[derive(Clone, Debug)]
pub struct Shading {
    probe: Probe,
    edge: f64,
    reach: f64,
    band: Band,
    measure: Measure,
    pub(super) levels: Vec<f64>,
    pub(super) stretches: Vec<Stretch>,
}

impl Shading {
    /// Returns whether it is the shading of the same ruler, told in the same
    /// units.
    pub(super) fn holds(
        &self,
        probe: &Probe,
        edge: f64,
        reach: f64,
        band: Band,
        measure: Measure,
    ) -> bool {
        self.edge == edge
            && self.reach == reach
            && self.band == band
            && self.measure == measure
            && self.probe.same(probe)
    }

    /// Works out the shading: steps of the row 1, 2, 5 between the weakest and
    /// the strongest irradiance on the ruler.
    pub(super) fn new(probe: Probe, edge: f64, reach: f64, band: Band, measure: Measure) -> Self {
        let samples: Vec<(f64, f64)> = (0..=POINTS)
            .map(|index| {
                let share = (f64::from(index) / f64::from(POINTS)).powf(1.6);
                let clear = NEAREST + (reach - NEAREST) * share;
                let value = probe
                    .read(edge + clear)
                    .map_or(f64::INFINITY, |reading| reading.band(band));
                (clear, value)
            })
            .collect();
        let drawn = samples
            .iter()
            .map(|sample| sample.1)
            .filter(|value| value.is_finite() && *value > 0.0);
        let (low, high) = drawn.fold((f64::INFINITY, 0.0_f64), |(low, high), value| {
            (low.min(value), high.max(value))
        });
        // Round numbers are those of the unit that they are told in.
        let unit = measure.irradiance();
        let levels: Vec<f64> = levels(unit.from_si(low), unit.from_si(high))
            .into_iter()
            .map(|level| level * unit.factor())
            .collect();
        Shading {
            stretches: stretches(&samples, &levels),
            levels,
            probe,
            edge,
            reach,
            band,
            measure,
        }
    }
}

/// Returns the numbers 1, 2, 5 of every decade between two values, or the
/// decades alone where those are too many.
fn levels(low: f64, high: f64) -> Vec<f64> {
    // Nothing above zero leaves the ends the wrong way round.
    if !(low < high && high.is_finite()) {
        return Vec::new();
    }
    let (first, last) = (low.log10().floor() as i32, high.log10().ceil() as i32);
    // What is a million times weaker than the strongest is as good as nothing.
    let first = first.max(last - 6);
    for digits in [&[1.0, 2.0, 5.0][..], &[1.0][..]] {
        let found: Vec<f64> = (first..=last)
            .flat_map(|decade| {
                digits.iter().map(move |digit| {
                    if decade < 0 {
                        digit / 10_f64.powi(-decade)
                    } else {
                        digit * 10_f64.powi(decade)
                    }
                })
            })
            .filter(|level| *level > low && *level < high)
            .collect();
        if found.len() <= MOST_LEVELS {
            return found;
        }
    }
    Vec::new()
}

/// Returns the stretches of one step each, cut where the irradiance passes a
/// level, between samples on straight lines of its logarithm.
fn stretches(samples: &[(f64, f64)], levels: &[f64]) -> Vec<Stretch> {
    let step = |value: f64| levels.iter().filter(|level| value >= **level).count();
    let mut found: Vec<Stretch> = Vec::new();
    let mut add = |to: f64, step: usize| match found.last_mut() {
        Some(last) if last.step == step => last.to = to,
        Some(last) => {
            let from = last.to;
            if to > from {
                found.push(Stretch { from, to, step });
            }
        }
        None => found.push(Stretch {
            from: 0.0,
            to,
            step,
        }),
    };
    if let Some(first) = samples.first() {
        add(first.0, step(first.1));
    }
    for pair in samples.windows(2) {
        let [(near, a), (far, b)] = [pair[0], pair[1]];
        let (from, to) = (step(a), step(b));
        // The levels that are passed on the way, in the order of passing.
        let passed: Vec<usize> = if from > to {
            (to..from).rev().collect()
        } else {
            (from..to).collect()
        };
        for index in passed {
            let level = levels[index];
            let share = if a.is_finite() && b.is_finite() && a > 0.0 && b > 0.0 {
                ((a / level).ln() / (a / b).ln()).clamp(0.0, 1.0)
            } else if a > b {
                // Towards nothing, or away from a source that is touched: as
                // far as the stronger side may reach.
                1.0
            } else {
                0.0
            };
            let before = if from > to { index + 1 } else { index };
            add(near + (far - near) * share, before);
        }
        add(far, to);
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn levels_are_round_and_few() {
        for (low, high, expected) in [
            (30.0, 900.0, vec![50.0, 100.0, 200.0, 500.0]),
            (0.5, 1.0, vec![]),
            (0.04, 0.3, vec![0.05, 0.1, 0.2]),
            (f64::INFINITY, 0.0, vec![]),
            (5.0, 5.0, vec![]),
            (0.9, 1.1e6, (1..=6).map(|d| 10_f64.powi(d)).collect()),
        ] {
            assert_eq!(levels(low, high), expected, "{low}..{high}");
        }
    }

    #[test]
    fn stretches_are_cut_at_the_levels_and_leave_no_gap() {
        // An inverse square of 900 W/m² at 1 m: 100 at 3 m, 225 at 2 m.
        let samples: Vec<(f64, f64)> = (10..=600)
            .map(|i| f64::from(i) / 100.0)
            .map(|d| (d, 900.0 / (d * d)))
            .collect();
        let found = stretches(&samples, &[100.0, 225.0]);
        let steps: Vec<usize> = found.iter().map(|stretch| stretch.step).collect();
        assert_eq!(steps, vec![2, 1, 0]);
        for (stretch, expected) in found.iter().zip([2.0, 3.0, 6.0]) {
            assert!(
                (stretch.to - expected).abs() < 1e-6,
                "{}, wanted {expected}",
                stretch.to
            );
        }
        assert_eq!(found[0].from, 0.0);
        for pair in found.windows(2) {
            assert_eq!(pair[0].to, pair[1].from);
        }
    }

    #[test]
    fn a_source_on_the_way_counts_as_the_strongest() {
        let samples = [(1.0, 50.0), (2.0, f64::INFINITY), (3.0, 50.0)];
        let found = stretches(&samples, &[100.0]);
        let expected = [(0.0, 1.0, 0), (1.0, 3.0, 1)];
        assert_eq!(found.len(), expected.len(), "{found:?}");
        for (stretch, (from, to, step)) in found.iter().zip(expected) {
            assert_eq!((stretch.from, stretch.to, stretch.step), (from, to, step));
        }
    }
}
