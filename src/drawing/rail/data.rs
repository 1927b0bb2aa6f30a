//! What a notebook's rail shows: the zones that run along its line, the
//! positions that stand on it, and the irradiance between them.

use super::line::si;
use super::{Lengths, Line, Pin, Probe, Rail, Stand, Stretch};
use crate::drawing::mark::Shape;
use crate::notebook::cell::assessment::{self, Verdict};
use crate::notebook::cell::position::{Band, Orientation};
use crate::notebook::cell::zone::Extent;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::engine::Engine;
use crate::notebook::results::{CellResult, Results, Shown, State};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};

/// The nearest clear distance that is looked at, m.
const NEAREST: f64 = 0.01;

/// How many points are looked at along the line.
const POINTS: u32 = 200;

/// How many steps the shading has at most.
const MOST_LEVELS: usize = 11;

/// The least length of the ruler, m.
const LEAST: f64 = 5.0;

impl Rail {
    /// Returns the rail of a line; `None` where a source is in error, so that
    /// nothing is known about any distance.
    #[must_use]
    pub fn of(engine: &Engine, results: &Results, line: &Line, lengths: Lengths) -> Option<Rail> {
        Rail::held(engine, results, line, lengths, &mut None)
    }

    /// Returns the same as [`Rail::of`], with the shading taken from what is
    /// held where that still holds, and put there where not: it is what costs.
    #[must_use]
    pub fn held(
        engine: &Engine,
        results: &Results,
        line: &Line,
        lengths: Lengths,
        held: &mut Option<Shading>,
    ) -> Option<Rail> {
        let probe = Probe::new(engine, line, Orientation::Strongest)?;
        let mut rail = Rail {
            about: format!(
                "from the face of {}, {}, at {}, facing strongest",
                line.source,
                line.way(),
                lengths.standing(line.height)
            ),
            quantity: String::new(),
            levels: Vec::new(),
            level_texts: Vec::new(),
            stretches: Vec::new(),
            pins: Vec::new(),
            stands: Vec::new(),
            elsewhere: Vec::new(),
            notes: Vec::new(),
            lengths,
            settled: true,
        };
        let mut bands = Vec::new();
        for result in &results.cells {
            let Some(cell) = engine.cell(result.id) else {
                continue;
            };
            match result.kind {
                Kind::Zone if line.carries(engine, result.id) => {
                    bands.extend(cell.text("guidance").and_then(Band::of_guidance));
                    rail.zone(engine, line, cell, result);
                }
                Kind::Position => match line.standing(engine, result.id) {
                    Some(distance) => rail.stand(engine, results, line, result, distance),
                    None => rail.elsewhere.push(result.name.clone()),
                },
                _ => {}
            }
        }
        rail.tell_apart(engine);
        if rail.pins.is_empty() && rail.stands.is_empty() && rail.notes.is_empty() {
            rail.notes
                .push("no zone runs along this line and no position stands on it".to_owned());
        }
        let band = [Band::NearInfrared, Band::Skin, Band::Total]
            .into_iter()
            .find(|band| bands.contains(band))
            .unwrap_or(Band::NearInfrared);
        rail.quantity = match band {
            Band::Total => "all wavelengths, nominal (W/m²)",
            Band::NearInfrared => "near infrared, 780–3000 nm, nominal (W/m²)",
            Band::Skin => "380–3000 nm, nominal (W/m²)",
        }
        .to_owned();
        rail.shade(probe, line.edge, band, held);
        Some(rail)
    }

    /// Puts a zone's edge on the rail, or into the notes where it has none.
    fn zone(&mut self, engine: &Engine, line: &Line, cell: &Cell, result: &CellResult) {
        let mut label = rule(engine, cell, result);
        if let Some(z) = si(engine, result.id, "z")
            && (z - line.height).abs() > 1e-9
        {
            label.push_str(&format!(" at {}", self.lengths.standing(z)));
        }
        let Some(Shown::Extent {
            extent: nominal,
            high,
            ..
        }) = result.shown("clear_distance")
        else {
            let why = match &result.state {
                State::Waiting(cells) => format!("waiting for {}", cells.join(", ")),
                State::Error | State::Ok => "could not be worked out".to_owned(),
            };
            self.notes.push(format!("{label}: {why}"));
            return;
        };
        let safe = high.unwrap_or(*nominal);
        let nominal = match (high, nominal) {
            (Some(_), Extent::At(distance)) => Some((*distance, self.lengths.safe(*distance))),
            _ => None,
        };
        match safe {
            Extent::At(distance) => self.pins.push(Pin {
                cell: result.name.clone(),
                label,
                distance,
                text: self.lengths.safe(distance),
                nominal,
            }),
            Extent::NotMetWithin(distance) => self.notes.push(format!(
                "{label}: farther than {}",
                self.lengths.safe(distance)
            )),
            Extent::MetEverywhere | Extent::NotAssessed => {
                self.notes.push(format!("{label}: {}", safe.words()));
            }
        }
    }

    fn stand(
        &mut self,
        engine: &Engine,
        results: &Results,
        line: &Line,
        result: &CellResult,
        distance: f64,
    ) {
        let word = results.word_of(engine, &result.name);
        let mut finding = word.unwrap_or("not assessed").to_owned();
        if matches!(word, Some("over" | "within")) {
            let verdicts: Vec<Verdict> = results
                .cells
                .iter()
                .filter(|other| other.judges(engine, &result.name))
                .flat_map(|other| other.verdicts.iter().cloned())
                .collect();
            if let Some(verdict) = assessment::governing(&verdicts) {
                let allowed = wording::span(assessment::span(verdict.judgement.allowed));
                finding = match allowed.as_str() {
                    "no planned stay" => format!("{finding}: {allowed}"),
                    _ => format!("{finding}: allowed {allowed}"),
                };
            }
        }
        let mut text = self.lengths.standing(distance);
        if let Some(z) = si(engine, result.id, "z")
            && (z - line.height).abs() > 1e-9
        {
            text.push_str(&format!(", eye {}", self.lengths.standing(z)));
        }
        self.stands.push(Stand {
            cell: result.name.clone(),
            distance,
            text,
            shape: word.map_or(Shape::NotAssessed, Shape::of_word),
            finding,
        });
    }

    /// Names the guidance too where two pins would be called the same.
    fn tell_apart(&mut self, engine: &Engine) {
        let labels: Vec<String> = self.pins.iter().map(|pin| pin.label.clone()).collect();
        for pin in &mut self.pins {
            let alike = labels.iter().filter(|label| **label == pin.label).count();
            if alike > 1
                && let Some(id) = engine
                    .find(&pin.cell)
                    .and_then(|id| engine.cell(id)?.text("guidance"))
            {
                pin.label = format!("{} by {id}", pin.label);
            }
        }
    }

    /// Shades the ruler as far as the flags need it.
    fn shade(&mut self, probe: Probe, edge: f64, band: Band, held: &mut Option<Shading>) {
        let flags = self
            .pins
            .iter()
            .map(|pin| pin.distance)
            .chain(self.stands.iter().map(|stand| stand.distance));
        // Flags read to the right of their poles: the ruler goes on beyond.
        let reach = flags.fold(LEAST, f64::max) * 2.2;
        let shading = match held {
            Some(known) if known.holds(&probe, edge, reach, band) => known,
            _ => held.insert(Shading::new(probe, edge, reach, band)),
        };
        self.levels.clone_from(&shading.levels);
        self.stretches.clone_from(&shading.stretches);
        self.level_texts = self
            .levels
            .iter()
            .map(|level| format::significant(*level, 1, Rounding::Nearest))
            .collect();
    }
}

/// The shading of a ruler, with what it was worked out from.
#[derive(Clone, Debug)]
pub struct Shading {
    probe: Probe,
    edge: f64,
    reach: f64,
    band: Band,
    levels: Vec<f64>,
    stretches: Vec<Stretch>,
}

impl Shading {
    fn holds(&self, probe: &Probe, edge: f64, reach: f64, band: Band) -> bool {
        self.edge == edge && self.reach == reach && self.band == band && self.probe.same(probe)
    }

    /// Works out the shading: steps of the row 1, 2, 5 between the weakest and
    /// the strongest irradiance on the ruler.
    fn new(probe: Probe, edge: f64, reach: f64, band: Band) -> Self {
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
        let levels = levels(low, high);
        Shading {
            stretches: stretches(&samples, &levels),
            levels,
            probe,
            edge,
            reach,
            band,
        }
    }
}

/// Returns what a zone's rule is called: what it protects, and for how long.
fn rule(engine: &Engine, cell: &Cell, result: &CellResult) -> String {
    let organ = wording::organ(cell.text("guidance").unwrap_or_default());
    let organ = organ.split(" (").next().unwrap_or(organ);
    let stay = si(engine, result.id, "stay").map_or_else(
        || cell.text("stay").unwrap_or_default().to_owned(),
        wording::plain_time,
    );
    format!("{organ}, {stay}")
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
