//! The room: its air and its walls. A notebook has at most one.

use super::field::{Expect, Form, Need, Spec};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::Linker;
use crate::notebook::task::Inputs;
use crate::physics::planck;
use crate::units::{Dimension, Quantity};

/// The fields of the surroundings.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "air_temperature",
        form: Form::Entry(Expect::TEMPERATURE),
        need: Need::Default("25 °C"),
        about: "temperature of the air",
    },
    Spec {
        name: "radiant_temperature",
        form: Form::Entry(Expect::TEMPERATURE),
        need: Need::Optional,
        about: "mean radiant temperature of walls and roof; as the air if left out",
    },
    Spec {
        name: "humidity",
        form: Form::Entry(Expect::FRACTION),
        need: Need::Default("50 %"),
        about: "relative humidity",
    },
    Spec {
        name: "air_speed",
        form: Form::Entry(Expect::SPEED),
        need: Need::Default("0.3 m/s"),
        about: "speed of the air",
    },
    Spec {
        name: "absorption",
        form: Form::Word(&["off", "power_law", "wayne"]),
        need: Need::Optional,
        about: "absorption by shop air: `off` if left out, which is the safe side, or the formula by its name",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of the surroundings.
pub const OUTPUTS: &[&str] = &["background"];

/// What a room is taken to be where the notebook says nothing: kelvin.
pub const AIR_TEMPERATURE: f64 = 298.15;

/// The relative humidity where the notebook says nothing.
pub const HUMIDITY: f64 = 0.5;

/// The speed of the air where the notebook says nothing, m/s.
pub const AIR_SPEED: f64 = 0.3;

/// By which formula the air of a shop absorbs.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Formula {
    /// The power law in vapour pressure times path.
    PowerLaw,
    /// Wayne (1991).
    Wayne,
}

impl Formula {
    /// Returns the formula of this word; `None` where nothing is absorbed.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Formula> {
        match word {
            "power_law" => Some(Formula::PowerLaw),
            "wayne" => Some(Formula::Wayne),
            _ => None,
        }
    }

    /// Returns the formula as it is cited.
    #[must_use]
    pub const fn citation(self) -> &'static str {
        match self {
            Formula::PowerLaw => {
                "τ = 2.02 (p_w x)^−0.09 for 10⁴ < p_w x < 10⁵ Pa·m (literature on fire hazards, \
                 from memory)"
            }
            Formula::Wayne => {
                "Wayne (1991), J. Loss Prev. Process Ind. 4, 86, water vapour and carbon dioxide \
                 (from memory)"
            }
        }
    }
}

/// The room as the physics needs it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Room {
    /// What the walls and the roof send to a small surface that sees nothing
    /// else, W/m²: they count as black.
    pub background: f64,
    /// The temperature of the air, K.
    pub air_temperature: f64,
    /// The mean radiant temperature of walls and roof, K.
    pub radiant_temperature: f64,
    /// The relative humidity, from 0 to 1, where the air absorbs.
    pub humidity: f64,
    /// The speed of the air, m/s, where there are screens.
    pub air_speed: f64,
}

impl Room {
    pub(in crate::notebook) fn visit(self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        see(
            Slot::named("background"),
            Output::Quantity(Quantity::new(self.background, Dimension::IRRADIANCE)),
        );
    }
}

/// Works out the room, from the surroundings' fields where there are any.
#[derive(Clone, Debug, Default, PartialEq)]
pub(in crate::notebook) struct RoomTask {
    pub(in crate::notebook) air: Option<Node>,
    pub(in crate::notebook) radiant: Option<Node>,
    pub(in crate::notebook) humidity: Option<Node>,
    pub(in crate::notebook) speed: Option<Node>,
}

impl RoomTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        for node in [self.air, self.radiant, self.humidity, self.speed] {
            nodes.extend(node);
        }
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let air = inputs.maybe(self.air).unwrap_or(AIR_TEMPERATURE);
        let radiant = inputs.maybe(self.radiant).unwrap_or(air);
        Ok(Datum::Room(Room {
            background: planck::exitance(radiant),
            air_temperature: air,
            radiant_temperature: radiant,
            humidity: inputs.maybe(self.humidity).unwrap_or(HUMIDITY),
            air_speed: inputs.maybe(self.speed).unwrap_or(AIR_SPEED),
        }))
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let _ = linker.word("absorption");
}
