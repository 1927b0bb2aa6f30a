//! What the parts of a scene send, and what of it arrives.

use std::sync::Arc;

use super::{Balanced, Tag};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::cell::position::Band;
use crate::notebook::cell::surroundings::Formula;
use crate::notebook::datum::Datum;
use crate::notebook::task::Inputs;
use crate::physics::atmosphere::{self, Transmitted};
use crate::physics::screen::{Make, REFLECTING};
use crate::physics::surface::Emission;

/// The air of a shop, where the notebook has it absorb.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Air {
    /// By which formula.
    pub formula: Formula,
    /// The temperature, K.
    pub temperature: f64,
    /// The relative humidity, from 0 to 1.
    pub humidity: f64,
}

impl Air {
    /// Returns what is left of the total of a source after so many metres.
    #[must_use]
    pub fn transmitted(&self, path: f64) -> Transmitted {
        let found = match self.formula {
            Formula::PowerLaw => atmosphere::vapour_pressure(self.humidity, self.temperature)
                .and_then(|pressure| atmosphere::power_law(pressure, path)),
            Formula::Wayne => atmosphere::wayne(self.humidity, self.temperature, path),
        };
        // Air for which the formula does not hold takes nothing off.
        found.unwrap_or(Transmitted {
            transmittance: 1.0,
            in_range: false,
        })
    }
}

/// What the parts of all sources and screens send, and what lets it through.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Heat {
    /// Parallel to the parts of the form.
    pub parts: Vec<Emission>,
    /// What each barrier of the form is made of, in order.
    pub barriers: Vec<Make>,
    /// The air, where it absorbs.
    pub air: Option<Air>,
    /// The screens, where one of them may be polished.
    pub polished: Option<Arc<Balanced>>,
}

impl Heat {
    /// Returns what the parts send in a band.
    #[must_use]
    pub fn weights(&self, band: Band) -> Weights<'_> {
        Weights::new(self, band, false)
    }

    /// Returns the same for judging: where a band exceeds the whole, the whole
    /// is taken as that band.
    #[must_use]
    pub fn judged(&self, band: Band) -> Weights<'_> {
        Weights::new(self, band, true)
    }

    /// Returns what of a piece's emission passes the barriers on its way.
    #[must_use]
    pub fn passing(&self, tag: &Tag) -> Emission {
        let mut emission = self.parts[tag.part];
        for barrier in &tag.through {
            // A barrier that is not known lets everything through.
            if let Some(make) = self.barriers.get(usize::from(*barrier)) {
                emission = make.passed(&emission);
            }
        }
        emission
    }

    /// Returns what of a piece's emission arrives: through the barriers on its
    /// way, and through the air.
    ///
    /// The air takes from the total alone, and never so much that the skin's
    /// band would be more than the whole.
    #[must_use]
    pub fn arriving(&self, tag: &Tag) -> Emission {
        let mut emission = self.passing(tag);
        if let Some(air) = &self.air {
            let left = emission.total * air.transmitted(tag.path).transmittance;
            emission.total = left.max(emission.skin.min(emission.total));
        }
        emission
    }

    /// Returns the heat of parts that send so much over all wavelengths, W/m²:
    /// for tests.
    #[cfg(test)]
    pub(in crate::notebook) fn of_totals(totals: &[f64]) -> Heat {
        Heat {
            parts: totals
                .iter()
                .map(|total| Emission {
                    total: *total,
                    ..Emission::default()
                })
                .collect(),
            ..Heat::default()
        }
    }
}

/// What every part sends in one band, and what of it arrives.
#[derive(Clone, Debug)]
pub struct Weights<'a> {
    heat: &'a Heat,
    band: Band,
    judged: bool,
    /// The exitance of each part, W/m².
    sent: Vec<f64>,
}

impl<'a> Weights<'a> {
    fn new(heat: &'a Heat, band: Band, judged: bool) -> Weights<'a> {
        let mut weights = Weights {
            heat,
            band,
            judged,
            sent: Vec::new(),
        };
        weights.sent = heat.parts.iter().map(|part| weights.of(part)).collect();
        weights
    }

    fn of(&self, emission: &Emission) -> f64 {
        if self.judged {
            self.band.judged_of(emission)
        } else {
            self.band.of(emission)
        }
    }

    /// Returns the exitance of each part in the band, W/m²: more than that
    /// never arrives.
    #[must_use]
    pub fn sent(&self) -> &[f64] {
        &self.sent
    }

    /// Returns what of a piece's exitance arrives, W/m².
    #[must_use]
    pub fn arriving(&self, tag: &Tag) -> f64 {
        if tag.through.is_empty() && self.heat.air.is_none() {
            return self.sent[tag.part];
        }
        self.of(&self.heat.arriving(tag))
    }
}

/// Whose parts come next in the scene.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Sender {
    /// A source, with the node of what it emits.
    Source(Node),
    /// The next of the screens, with the node of what it is made of.
    Screen(Node),
}

/// Gathers what all sources and screens send.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct HeatTask {
    pub(in crate::notebook) senders: Vec<Sender>,
    /// The balance, where there are screens.
    pub(in crate::notebook) balance: Option<Node>,
    /// The room and the formula, where the air absorbs.
    pub(in crate::notebook) air: Option<(Node, Formula)>,
}

impl HeatTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        for sender in &self.senders {
            let (Sender::Source(node) | Sender::Screen(node)) = sender;
            nodes.push(*node);
        }
        nodes.extend(self.balance);
        nodes.extend(self.air.map(|(room, _)| room));
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let balanced = match self.balance.map(|node| inputs.balance(node)).transpose() {
            Ok(balanced) => balanced,
            // That screen says why.
            Err((id, _)) => return Ok(Datum::Waiting(Arc::new(vec![id]))),
        };
        let mut screens = balanced.iter().flat_map(|balanced| balanced.screens.iter());
        let mut heat = Heat {
            parts: Vec::with_capacity(self.senders.len()),
            barriers: Vec::new(),
            air: self.air.map(|(room, formula)| {
                let room = inputs.room(room);
                Air {
                    formula,
                    temperature: room.air_temperature,
                    humidity: room.humidity,
                }
            }),
            polished: None,
        };
        for sender in &self.senders {
            match sender {
                Sender::Source(node) => heat.parts.extend(&inputs.emission(*node).parts),
                Sender::Screen(node) => {
                    heat.barriers.push(*inputs.make(*node));
                    let state = screens.next().expect("every screen is in the balance");
                    heat.parts.extend(&state.parts);
                }
            }
        }
        if heat.barriers.iter().any(may_be_polished) {
            heat.polished = balanced.cloned();
        }
        Ok(Datum::Heat(Arc::new(heat)))
    }
}

/// Returns whether a screen may throw the picture of a source at people.
#[must_use]
pub fn may_be_polished(make: &Make) -> bool {
    match make {
        Make::Solid {
            emissivities,
            absorptances,
        } => (0..2).any(|face| 1.0 - emissivities[face].min(absorptances[face]) > REFLECTING),
        Make::Mesh { .. } | Make::Filter { .. } => false,
    }
}
