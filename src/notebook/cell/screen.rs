//! A screen between a source and people: a plate, a mesh, or filter glass. It
//! hides or dims what lies behind it, heats up, and radiates by itself.

use std::sync::Arc;

use glam::DVec3;

use super::field::{Expect, Form, Need, Range, Spec};
use super::source::{Frame, Kind, Shape, direction};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{CellId, Datum, Output, Slot};
use crate::notebook::engine::Linker;
use crate::notebook::task::{Inputs, Task};
use crate::physics::region::Region;
use crate::physics::scene::{Barrier, Part};
use crate::physics::screen::SOILED;
use crate::physics::surface::Emission;
use crate::units::{Dimension, Quantity};

pub use crate::physics::screen::Make;

/// An open fraction is less than the whole.
const OPEN: Expect = Expect::of(Dimension::NONE, Range::Share);

/// The fields of a screen.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "make",
        form: Form::Word(&["solid", "mesh", "filter"]),
        need: Need::Required,
        about: "a solid plate, a mesh or chain curtain, or filter glass",
    },
    Spec {
        name: "width",
        form: Form::Entry(Expect::SIZE),
        need: Need::Required,
        about: "width",
    },
    Spec {
        name: "height",
        form: Form::Entry(Expect::SIZE),
        need: Need::Required,
        about: "height",
    },
    Spec {
        name: "front_emissivity",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "of a plate, on the side that it faces; 0.9 if left out",
    },
    Spec {
        name: "back_emissivity",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "of a plate, on the other side; 0.9 if left out",
    },
    Spec {
        name: "front_absorptance",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "of a plate, for radiation from hot sources on the side that it faces; 0.6, or the emissivity if that is more, if left out: plates are soiled",
    },
    Spec {
        name: "back_absorptance",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "the same on the other side",
    },
    Spec {
        name: "open_fraction",
        form: Form::Entry(OPEN),
        need: Need::Optional,
        about: "of a mesh or a curtain: the share of its area that lets through",
    },
    Spec {
        name: "transmittance",
        form: Form::Entry(Expect::FRACTION),
        need: Need::Optional,
        about: "of a filter: the share of all radiation of a hot source that it lets through",
    },
    Spec {
        name: "near_ir_transmittance",
        form: Form::Entry(Expect::FRACTION),
        need: Need::Optional,
        about: "of a filter: the share of 780–3000 nm that it lets through",
    },
    Spec {
        name: "visible_transmittance",
        form: Form::Entry(Expect::FRACTION),
        need: Need::Optional,
        about: "of a filter: the share of visible light that it lets through; all of it if left out",
    },
    Spec {
        name: "x",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Default("0 m"),
        about: "centre, to the east",
    },
    Spec {
        name: "y",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Default("0 m"),
        about: "centre, to the north",
    },
    Spec {
        name: "z",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Required,
        about: "centre above the floor",
    },
    Spec {
        name: "heading",
        form: Form::Entry(Expect::HEADING),
        need: Need::Default("0 °"),
        about: "where its front faces, clockwise from north",
    },
    Spec {
        name: "tilt",
        form: Form::Entry(Expect::TILT),
        need: Need::Default("0 °"),
        about: "how far its front is raised above the horizontal",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of a screen.
pub const OUTPUTS: &[&str] = &[
    "temperature",
    "hottest_temperature",
    "absorbed",
    "absorbed_power",
    "front_exitance",
    "back_exitance",
    "convected",
];

/// The emissivity of a plate's face where none is given: painted or oxidised
/// steel. Common practice, no source.
pub const EMISSIVITY: f64 = 0.9;

/// Into how many pieces along either side a face is cut for what it sends: each
/// has one temperature.
pub const PATCHES: usize = 7;

/// How far in front of the plate its faces are taken to lie, m: so near that no
/// figure shows it, and so far that rounding cannot put them behind the plate.
const SKIN: f64 = 1e-6;

/// What a screen is made of, with the nodes of its numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Made {
    Solid {
        emissivities: [Option<Node>; 2],
        absorptances: [Option<Node>; 2],
    },
    Mesh {
        open_fraction: Node,
    },
    Filter {
        transmittance: Node,
        near_infrared: Node,
        visible: Option<Node>,
    },
}

/// Works out what a screen is made of.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct MakeTask {
    made: Made,
}

impl MakeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        match self.made {
            Made::Solid {
                emissivities,
                absorptances,
            } => nodes.extend(emissivities.into_iter().chain(absorptances).flatten()),
            Made::Mesh { open_fraction } => nodes.push(open_fraction),
            Made::Filter {
                transmittance,
                near_infrared,
                visible,
            } => {
                nodes.extend([transmittance, near_infrared]);
                nodes.extend(visible);
            }
        }
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        Ok(Datum::Make(match self.made {
            Made::Solid {
                emissivities,
                absorptances,
            } => {
                let emissivities =
                    emissivities.map(|node| inputs.maybe(node).unwrap_or(EMISSIVITY));
                let absorptance = |face: usize| {
                    inputs
                        .maybe(absorptances[face])
                        .unwrap_or(emissivities[face].max(SOILED))
                };
                Make::Solid {
                    emissivities,
                    absorptances: [absorptance(0), absorptance(1)],
                }
            }
            Made::Mesh { open_fraction } => Make::Mesh {
                open_fraction: inputs.si(open_fraction),
            },
            Made::Filter {
                transmittance,
                near_infrared,
                visible,
            } => Make::Filter {
                transmittance: inputs.si(transmittance),
                near_infrared_transmittance: inputs.si(near_infrared),
                visible_transmittance: inputs.maybe(visible).unwrap_or(1.0),
            },
        }))
    }
}

/// Works out where a screen is.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct StandTask {
    place: [Node; 3],
    heading: Node,
    tilt: Node,
    width: Node,
    height: Node,
    clear: bool,
}

impl StandTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(self.place);
        nodes.extend([self.heading, self.tilt, self.width, self.height]);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let [x, y, z] = self.place.map(|node| inputs.si(node));
        let centre = DVec3::new(x, y, z);
        let ahead = direction(inputs.si(self.heading));
        let (sin, cos) = inputs.si(self.tilt).sin_cos();
        let frame = Frame {
            normal: ahead * cos + DVec3::Z * sin,
            up: DVec3::Z * cos - ahead * sin,
            width: inputs.si(self.width),
            height: inputs.si(self.height),
        };
        let fault = |error: crate::physics::Error| {
            Diagnostic::of_cell("no-such-shape", error.to_string())
                .with_hint("check the sizes and the place of the screen")
        };
        let region = Region::rectangle(centre, frame.normal, frame.up, frame.width, frame.height)
            .map_err(fault)?;
        let parts = pieces(centre, &frame).map_err(fault)?;
        Ok(Datum::Shape(Arc::new(Shape {
            kind: Kind::Screen,
            centre,
            ahead,
            depth: 0.0,
            parts,
            barrier: Some(Barrier {
                region: region.clone(),
                clear: self.clear,
            }),
            frame: Some(frame),
            tunnel: None,
            region,
        })))
    }
}

/// Returns the faces of a screen in pieces: the front's, row by row from the
/// lower left as seen from in front, then the back's, over the same places.
fn pieces(centre: DVec3, frame: &Frame) -> Result<Vec<Part>, crate::physics::Error> {
    // A few pieces: far below the limit of exact doubles.
    #[allow(clippy::cast_precision_loss)]
    let (count, middle) = (PATCHES as f64, |at: usize| {
        (at as f64 + 0.5) / PATCHES as f64 - 0.5
    });
    let side = frame.up.cross(frame.normal);
    let mut parts = Vec::with_capacity(2 * PATCHES * PATCHES);
    for normal in [frame.normal, -frame.normal] {
        for row in 0..PATCHES {
            for column in 0..PATCHES {
                let place = centre
                    + side * (frame.width * middle(column))
                    + frame.up * (frame.height * middle(row))
                    + normal * SKIN;
                let (width, height) = (frame.width / count, frame.height / count);
                let region = Region::rectangle(place, normal, frame.up, width, height)?;
                parts.push(Part::bare(region));
            }
        }
    }
    Ok(parts)
}

/// Adds a share of one emission to another.
pub(in crate::notebook) fn add(sum: &mut Emission, emission: &Emission, share: f64) {
    sum.total += share * emission.total;
    sum.near_infrared += share * emission.near_infrared;
    sum.skin += share * emission.skin;
    sum.blue_light += share * emission.blue_light;
    sum.retinal_2006 += share * emission.retinal_2006;
    sum.retinal_2013 += share * emission.retinal_2013;
    sum.infrared_a += share * emission.infrared_a;
    sum.ultraviolet += share * emission.ultraviolet;
    sum.ultraviolet_a += share * emission.ultraviolet_a;
}

/// What a screen is asked for. Temperatures in K, fluxes in W per m² of the
/// screen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outcome {
    /// The mean temperature.
    pub temperature: f64,
    /// That of its hottest place.
    pub hottest: f64,
    /// What both faces absorb from hot sources.
    pub absorbed: f64,
    /// The same over all of it, W.
    pub power: f64,
    /// What front and back emit by themselves.
    pub exitances: [f64; 2],
    /// What both faces give to the air.
    pub convected: f64,
}

impl Outcome {
    pub(in crate::notebook) fn visit(&self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        let flux = Dimension::IRRADIANCE;
        for (name, si, dimension) in [
            ("temperature", self.temperature, Dimension::TEMPERATURE),
            ("hottest_temperature", self.hottest, Dimension::TEMPERATURE),
            ("absorbed", self.absorbed, flux),
            ("absorbed_power", self.power, Dimension::POWER),
            ("front_exitance", self.exitances[0], flux),
            ("back_exitance", self.exitances[1], flux),
            ("convected", self.convected, flux),
        ] {
            see(
                Slot::named(name),
                Output::Quantity(Quantity::new(si, dimension)),
            );
        }
    }
}

/// Works out what a screen is asked for, from the balance of all.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct OutcomeTask {
    balance: Node,
    id: CellId,
}

impl OutcomeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.push(self.balance);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let fault = |text: &str| {
            Diagnostic::of_cell("no-balance", text)
                .with_hint("check where it stands, and the temperatures around it")
        };
        let balanced = match inputs.balance(self.balance) {
            Ok(balanced) => balanced,
            Err((_, text)) => return Err(fault(text)),
        };
        let state = balanced.screens.iter().find(|state| state.id == self.id);
        let Some(state) = state else {
            return Err(fault(
                "expected this screen in the balance, found it left out",
            ));
        };
        Ok(Datum::Screen(Outcome {
            temperature: state.heated.mean_temperature,
            hottest: state.heated.hottest_temperature,
            absorbed: state.heated.absorbed,
            power: state.heated.power,
            exitances: state.heated.exitances,
            convected: state.heated.convected,
        }))
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let word = linker.word("make");
    let made = word.and_then(|word| made(linker, word));
    let place = ["x", "y", "z"].map(|field| linker.always(field));
    let [heading, tilt, width, height] =
        ["heading", "tilt", "width", "height"].map(|field| linker.always(field));
    let stand = word.map(|word| {
        Task::Stand(StandTask {
            place,
            heading,
            tilt,
            width,
            height,
            clear: word != "solid",
        })
    });
    let _ = linker.group("shape", stand);
    let _ = linker.group("make", made.map(|made| Task::Make(MakeTask { made })));
    let task = OutcomeTask {
        balance: linker.balance(),
        id: linker.id(),
    };
    let _ = linker.group("outcome", Some(Task::Screen(task)));
    linker.apart();
}

fn made(linker: &mut Linker<'_>, word: &str) -> Option<Made> {
    const SOLID: [&str; 4] = [
        "front_emissivity",
        "back_emissivity",
        "front_absorptance",
        "back_absorptance",
    ];
    const FILTER: [&str; 3] = [
        "transmittance",
        "near_ir_transmittance",
        "visible_transmittance",
    ];
    const ELSE: &str = "does not belong to this make of screen";
    if word != "solid" {
        linker.refuse(&SOLID, ELSE);
    }
    if word != "mesh" {
        linker.refuse(&["open_fraction"], ELSE);
    }
    if word != "filter" {
        linker.refuse(&FILTER, ELSE);
    }
    Some(match word {
        "solid" => {
            let [front, back, absorbs, behind] = SOLID.map(|field| linker.entry(field));
            Made::Solid {
                emissivities: [front, back],
                absorptances: [absorbs, behind],
            }
        }
        "mesh" => Made::Mesh {
            open_fraction: linker.need("open_fraction", "a mesh or a curtain")?,
        },
        _ => {
            let transmittance = linker.need("transmittance", "a filter");
            let near_infrared = linker.need("near_ir_transmittance", "a filter");
            Made::Filter {
                transmittance: transmittance?,
                near_infrared: near_infrared?,
                visible: linker.entry("visible_transmittance"),
            }
        }
    })
}
