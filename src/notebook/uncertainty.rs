//! What the spreads of inputs do to the outputs, by drawing.
//!
//! Each `±` literal is one independent normal input whose expanded uncertainty
//! (coverage factor 2) is the spread, and each row of a library that a field
//! names is one with the row's range as its central 95 %. The notebook is worked out once a draw,
//! without changing it, and the central 95 % of each output are its bounds.

mod record;

use std::collections::BTreeMap;
use std::f64::consts::SQRT_2;

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::{RngCore, SeedableRng};
use sha2::{Digest, Sha256};

use super::datum::Datum;
use super::engine::Engine;
use crate::graph::{Node, Plan};

use record::{Record, rank};

/// How the drawing is done.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Settings {
    /// What the draws are keyed by, beside cell, field, literal and number.
    pub seed: u64,
    /// How many draws there are: at least 40, since fewer have no 95 %.
    pub draws: u32,
}

impl Default for Settings {
    fn default() -> Self {
        Settings {
            seed: 1,
            draws: 1000,
        }
    }
}

/// The bounds of all outputs that the spreads reach, by node.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Bounds {
    settings: Settings,
    /// How many literals and rows carry a spread.
    spreads: usize,
    nodes: BTreeMap<Node, NodeBounds>,
}

/// The bounds of one node's outputs.
#[derive(Clone, Debug, PartialEq)]
pub struct NodeBounds {
    /// For each output, in the order of [`Datum::visit`], the ranks that bound
    /// the central 95 %; `None` where it cannot be bounded.
    pub ranks: Vec<Option<(f64, f64)>>,
    /// In how many draws the node had no value.
    pub failed: u32,
}

impl Bounds {
    /// Returns how the drawing was done.
    #[must_use]
    pub const fn settings(&self) -> Settings {
        self.settings
    }

    /// Returns how many literals and rows carry a spread.
    #[must_use]
    pub const fn spreads(&self) -> usize {
        self.spreads
    }

    /// Returns the bounds of a node's outputs, where spreads reach it.
    #[must_use]
    pub fn of(&self, node: Node) -> Option<&NodeBounds> {
        self.nodes.get(&node)
    }
}

/// One draw: the literals that it puts in place of the typed ones.
#[derive(Debug)]
pub(super) struct Draw<'a> {
    drawn: &'a BTreeMap<Node, Drawn>,
    number: usize,
}

impl Draw<'_> {
    /// Returns the literals of a node's entry in SI units, if any of them
    /// carries a spread.
    pub(super) fn literals(&self, node: Node) -> Option<&[f64]> {
        let drawn = self.drawn.get(&node)?;
        let from = self.number * drawn.literals;
        Some(&drawn.values[from..from + drawn.literals])
    }
}

/// The literals of one entry for every draw, draw by draw.
#[derive(Debug)]
struct Drawn {
    literals: usize,
    values: Vec<f64>,
}

impl Engine {
    /// Draws all spreads and returns the bounds of what they reach.
    ///
    /// `go_on` is asked now and then with the share that is done, and ends the
    /// work by answering `false`; the result is then `None`. The same notebook
    /// and settings give the same bounds.
    ///
    /// # Source
    ///
    /// Propagation of distributions, JCGM 101:2008, with the probabilistically
    /// symmetric coverage interval of its clause 7.7; draws by Latin hypercube
    /// sampling (McKay, Beckman and Conover 1979), which keeps the quantiles
    /// of what one input governs nearly free of sampling noise.
    #[must_use]
    pub fn bounds(&self, settings: Settings, go_on: &mut dyn FnMut(f64) -> bool) -> Option<Bounds> {
        let count = settings.draws.max(40) as usize;
        let drawn = self.draw(settings.seed, count);
        let spreads = self
            .entries()
            .flat_map(|(.., entry)| entry.literals())
            .filter(|used| used.literal.spread.is_some_and(|spread| spread > 0.0))
            .count()
            + self.listed().count();
        let mut bounds = Bounds {
            settings,
            spreads,
            nodes: BTreeMap::new(),
        };
        if drawn.is_empty() {
            return Some(bounds);
        }
        let seeds: Vec<Node> = drawn.keys().copied().collect();
        let plan = self.graph().downstream(&seeds);
        let mut records = self.records(&plan);
        let mut overlay = self.graph().overlay();
        let owner = |node: Node| self.owner(node).0;
        for number in 0..count {
            if number % 16 == 0 {
                // Counts of draws are far below the limit of exact doubles.
                #[allow(clippy::cast_precision_loss)]
                let share = number as f64 / count as f64;
                if !go_on(share) {
                    return None;
                }
            }
            let draw = Draw {
                drawn: &drawn,
                number,
            };
            overlay.follow(self.graph(), &plan, &[], &mut |node, values| {
                self.task(node).map_or_else(
                    || Datum::Waiting(std::sync::Arc::new(vec![owner(node)])),
                    |task| task.run(node, values, &owner, Some(&draw)),
                )
            });
            for record in &mut records {
                // What does not differ has its nominal values.
                if overlay.differs(record.node) {
                    record.note(number, count, overlay.value(self.graph(), record.node));
                } else {
                    record.note_nominal();
                }
            }
        }
        bounds.nodes = records
            .into_iter()
            .map(|record| (record.node, record.bounds()))
            .collect();
        Some(bounds)
    }

    fn draw(&self, seed: u64, count: usize) -> BTreeMap<Node, Drawn> {
        let mut drawn = BTreeMap::new();
        for (id, slot, node, entry) in self.entries() {
            let spread = |at: usize| {
                entry.literals()[at]
                    .literal
                    .spread_si()
                    .filter(|spread| *spread > 0.0)
            };
            let literals = entry.literals().len();
            if (0..literals).all(|at| spread(at).is_none()) {
                continue;
            }
            let name = self.cell(id).map_or("", |cell| cell.name.as_str());
            let field = slot.key();
            let nominal = entry.nominal_literals();
            let mut values: Vec<f64> = nominal.repeat(count);
            for at in 0..literals {
                let Some(spread) = spread(at) else { continue };
                // Expanded uncertainty with coverage factor 2.
                let deviation = spread / 2.0;
                let scores = scores(seed, name, &field, at, count);
                for (number, score) in scores.into_iter().enumerate() {
                    values[number * literals + at] = nominal[at] + deviation * score;
                }
            }
            let _ = drawn.insert(node, Drawn { literals, values });
        }
        for (id, slot, node, row) in self.listed() {
            let name = self.cell(id).map_or("", |cell| cell.name.as_str());
            let scores = scores(seed, name, &slot.key(), 0, count);
            let values = scores.into_iter().map(|score| row.at_score(score));
            let drawn_row = Drawn {
                literals: 1,
                values: values.collect(),
            };
            let _ = drawn.insert(node, drawn_row);
        }
        drawn
    }

    /// Returns an empty record for every downstream node that has outputs.
    fn records(&self, plan: &Plan) -> Vec<Record> {
        plan.nodes()
            .filter_map(|node| {
                let mut nominal = Vec::new();
                self.value(node)?
                    .visit(&mut |_, output| nominal.push(rank(&output)));
                (!nominal.is_empty()).then(|| Record {
                    node,
                    tails: vec![None; nominal.len()],
                    nominal,
                    failed: 0,
                })
            })
            .collect()
    }
}

/// Returns `count` standard normal scores, one from each of as many equally
/// likely strata, in an order of their own for each literal.
fn scores(seed: u64, cell: &str, field: &str, literal: usize, count: usize) -> Vec<f64> {
    let key = Sha256::new()
        .chain_update(seed.to_le_bytes())
        .chain_update(cell)
        .chain_update([0])
        .chain_update(field)
        .chain_update([0])
        .chain_update((literal as u64).to_le_bytes())
        .finalize();
    let mut random = ChaCha8Rng::from_seed(key.into());
    // In [0, 1), with the 53 bits that a double holds.
    #[allow(clippy::cast_precision_loss)]
    let mut unit = move || (random.next_u64() >> 11) as f64 / (1_u64 << 53) as f64;
    // Far below 2^53.
    #[allow(clippy::cast_precision_loss)]
    let mut scores: Vec<f64> = (0..count)
        .map(|stratum| {
            let share = (stratum as f64 + unit().max(1e-9)) / count as f64;
            normal_quantile(share)
        })
        .collect();
    for last in (1..count).rev() {
        #[allow(
            clippy::cast_precision_loss,
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss
        )]
        let other = (unit() * (last + 1) as f64) as usize;
        scores.swap(last, other.min(last));
    }
    scores
}

/// Returns the standard normal score below which a share of the draws lies.
fn normal_quantile(share: f64) -> f64 {
    -SQRT_2 * statrs::function::erf::erfc_inv(2.0 * share)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn normal_scores_have_their_published_values() {
        // Abramowitz and Stegun, Table 26.5 (from memory), 5 decimals.
        for (share, score) in [
            (0.5, 0.0),
            (0.975, 1.95996),
            (0.025, -1.95996),
            (0.99, 2.32635),
        ] {
            let found = normal_quantile(share);
            assert!((found - score).abs() < 5e-6, "{share}: {found} {score}");
        }
    }

    #[test]
    fn scores_have_one_in_each_stratum_and_their_own_order() {
        let a = scores(1, "door", "temperature", 0, 1000);
        let b = scores(1, "door", "temperature", 1, 1000);
        assert_ne!(a, b);
        assert_eq!(a, scores(1, "door", "temperature", 0, 1000));
        let mut sorted = a.clone();
        sorted.sort_unstable_by(f64::total_cmp);
        for (stratum, score) in sorted.iter().enumerate() {
            let low = normal_quantile((stratum as f64 / 1000.0).max(1e-12));
            let high = normal_quantile((stratum as f64 + 1.0).min(999.999_999) / 1000.0);
            assert!(low <= *score && *score <= high, "{low} {score} {high}");
        }
        let correlation: f64 = a.iter().zip(&b).map(|(a, b)| a * b).sum::<f64>() / 1000.0;
        assert!(correlation.abs() < 0.1, "{correlation}");
    }
}
