//! What a notebook's rail shows: the zones that run along its line, the
//! positions that stand on it, and the irradiance between them.

use std::collections::BTreeMap;

use super::line::si;
use super::shading::Shading;
use super::{Line, Pin, Probe, Rail, Stand};
use crate::drawing::mark::Shape;
use crate::drawing::measure::Measure;
use crate::notebook::cell::assessment::{self, Verdict};
use crate::notebook::cell::position::{Band, Orientation};
use crate::notebook::cell::zone::Extent;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::engine::Engine;
use crate::notebook::results::{CellResult, Results, Shown, State, worst_word};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};

/// The least length of the ruler, m.
const LEAST: f64 = 5.0;

impl Rail {
    /// Returns the rail of a line; `None` where a source is in error, so that
    /// nothing is known about any distance.
    #[must_use]
    pub fn of(engine: &Engine, results: &Results, line: &Line, measure: Measure) -> Option<Rail> {
        Rail::held(engine, results, line, measure, &mut None)
    }

    /// Returns the same as [`Rail::of`], with the shading taken from what is
    /// held where that still holds, and put there where not: it is what costs.
    #[must_use]
    pub fn held(
        engine: &Engine,
        results: &Results,
        line: &Line,
        measure: Measure,
        held: &mut Option<Shading>,
    ) -> Option<Rail> {
        let probe = Probe::new(engine, line, Orientation::Strongest)?;
        let mut rail = Rail {
            about: format!(
                "from the face of {}, {}, at {}, facing strongest",
                line.source,
                line.way(),
                measure.height(line.height)
            ),
            quantity: String::new(),
            levels: Vec::new(),
            level_texts: Vec::new(),
            stretches: Vec::new(),
            pins: Vec::new(),
            stands: Vec::new(),
            elsewhere: Vec::new(),
            notes: Vec::new(),
            screens: Vec::new(),
            shadows: Vec::new(),
            measure,
            settled: true,
        };
        let mut bands = Vec::new();
        let judged = results.assessments(engine);
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
                    Some(distance) => {
                        let judging = judged.get(result.name.as_str());
                        let judging = judging.map(Vec::as_slice).unwrap_or_default();
                        rail.stand(engine, judging, line, result, distance);
                    }
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
        let shown = match band {
            Band::Total => "all wavelengths",
            Band::NearInfrared => "near infrared, 780–3000 nm",
            Band::Skin => "380–3000 nm",
        };
        rail.quantity = format!("{shown}, nominal ({})", measure.irradiance().symbol());
        rail.shade(probe, line.edge, band, held);
        Some(rail)
    }

    /// Puts a zone's edge on the rail, or into the notes where it has none.
    fn zone(&mut self, engine: &Engine, line: &Line, cell: &Cell, result: &CellResult) {
        let mut label = rule(engine, cell, result);
        if let Some(z) = si(engine, result.id, "z")
            && (z - line.height).abs() > 1e-9
        {
            label.push_str(&format!(" at {}", self.measure.height(z)));
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
            (Some(_), Extent::At(distance)) => {
                Some((*distance, self.measure.safe_distance(*distance)))
            }
            _ => None,
        };
        match safe {
            Extent::At(distance) => self.pins.push(Pin {
                cell: result.name.clone(),
                label,
                distance,
                text: self.measure.safe_distance(distance),
                nominal,
            }),
            Extent::NotMetWithin(distance) => self.notes.push(format!(
                "{label}: farther than {}",
                self.measure.safe_distance(distance)
            )),
            Extent::MetEverywhere | Extent::NotAssessed => {
                self.notes.push(format!("{label}: {}", safe.words()));
            }
        }
    }

    fn stand(
        &mut self,
        engine: &Engine,
        judging: &[&CellResult],
        line: &Line,
        result: &CellResult,
        distance: f64,
    ) {
        let word = worst_word(judging.iter().copied());
        let mut finding = word.unwrap_or("not assessed").to_owned();
        if matches!(word, Some("over" | "within")) {
            let verdicts: Vec<Verdict> = judging
                .iter()
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
        let mut text = self.measure.standing(distance);
        if let Some(z) = si(engine, result.id, "z")
            && (z - line.height).abs() > 1e-9
        {
            text.push_str(&format!(", eye {}", self.measure.height(z)));
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
        let mut alike: BTreeMap<String, usize> = BTreeMap::new();
        for pin in &self.pins {
            *alike.entry(pin.label.clone()).or_default() += 1;
        }
        for pin in &mut self.pins {
            if alike.get(&pin.label).is_some_and(|count| *count > 1)
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
        let (screens, shadows) = probe.cover(edge, edge + reach);
        self.screens = screens;
        self.shadows = shadows;
        for screen in &mut self.screens {
            screen.distance -= edge;
        }
        for shadow in &mut self.shadows {
            shadow.from -= edge;
            shadow.to -= edge;
        }
        let shading = match held {
            Some(known) if known.holds(&probe, edge, reach, band, self.measure) => known,
            _ => held.insert(Shading::new(probe, edge, reach, band, self.measure)),
        };
        self.levels.clone_from(&shading.levels);
        self.stretches.clone_from(&shading.stretches);
        let unit = self.measure.irradiance();
        self.level_texts = self
            .levels
            .iter()
            .map(|level| format::significant(unit.from_si(*level), 1, Rounding::Nearest))
            .collect();
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
