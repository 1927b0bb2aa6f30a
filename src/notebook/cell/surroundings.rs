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
        form: Form::Word(&["off"]),
        need: Need::Optional,
        about: "absorption by shop air; only `off` so far, which is the safe side",
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

/// The room as the physics needs it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Room {
    /// What the walls and the roof send to a small surface that sees nothing
    /// else, W/m²: they count as black.
    pub background: f64,
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
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct RoomTask {
    pub(in crate::notebook) air: Option<Node>,
    pub(in crate::notebook) radiant: Option<Node>,
}

impl RoomTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(self.air);
        nodes.extend(self.radiant);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let air = inputs.maybe(self.air).unwrap_or(AIR_TEMPERATURE);
        let radiant = inputs.maybe(self.radiant).unwrap_or(air);
        Ok(Datum::Room(Room {
            background: planck::exitance(radiant),
        }))
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let _ = linker.word("absorption");
}
