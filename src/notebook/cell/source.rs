//! A hot emitter: an opening, a pool or a body.

mod emission;
mod shape;

use super::field::{Expect, Form, Need, Pairs, Range, Spec};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::Linker;
use crate::notebook::task::{Inputs, Task};
use crate::physics::planck;
use crate::units::{Dimension, Quantity};
use shape::Behind;

pub(in crate::notebook) use emission::EmissionTask;
pub use emission::Emitted;
pub(in crate::notebook) use shape::ShapeTask;
pub use shape::{Frame, Shape, direction};

/// The corners of a polygon.
const VERTICES: Pairs = Pairs {
    sides: [Expect::COORDINATE; 2],
    least: 3,
    most: 200,
    example: "0 m, 0 m; 1 m, 0 m; 0 m, 1 m",
};

/// A table of emissivities.
const SPECTRUM: Pairs = Pairs {
    sides: [Expect::SIZE, Expect::EMISSIVITY],
    least: 2,
    most: 200,
    example: "1 µm, 0.4; 3 µm, 0.3; 10 µm, 0.2",
};

/// A vessel leans by less than a right angle.
const VESSEL_TILT: Expect = Expect::of(Dimension::ANGLE, Range::Lean);

/// The fields of a source.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "form",
        form: Form::Word(&["opening", "pool", "body"]),
        need: Need::Required,
        about: "an opening in a wall, a pool of melt in its vessel, or a body seen from all sides",
    },
    Spec {
        name: "outline",
        form: Form::Word(&[
            "disc",
            "rectangle",
            "polygon",
            "sphere",
            "cylinder",
            "plate",
        ]),
        need: Need::Required,
        about: "disc, rectangle or polygon for an opening or a pool; sphere, cylinder or plate for a body",
    },
    Spec {
        name: "diameter",
        form: Form::Entry(Expect::SIZE),
        need: Need::Optional,
        about: "diameter of a disc, a sphere or a cylinder",
    },
    Spec {
        name: "width",
        form: Form::Entry(Expect::SIZE),
        need: Need::Optional,
        about: "width of a rectangle or a plate",
    },
    Spec {
        name: "height",
        form: Form::Entry(Expect::SIZE),
        need: Need::Optional,
        about: "height of a rectangular opening or a plate; of a cylinder from end to end",
    },
    Spec {
        name: "length",
        form: Form::Entry(Expect::SIZE),
        need: Need::Optional,
        about: "length of a rectangular pool, along its heading",
    },
    Spec {
        name: "vertices",
        form: Form::Pairs(&VERTICES),
        need: Need::Optional,
        about: "corners of a polygon in order, each as sideways, up from its centre",
    },
    Spec {
        name: "stance",
        form: Form::Word(&["upright", "lying"]),
        need: Need::Optional,
        about: "how a cylinder stands: `upright` if left out, or `lying` along its heading, raised by `tilt`",
    },
    Spec {
        name: "wall_thickness",
        form: Form::Entry(Expect::REACH),
        need: Need::Default("0 m"),
        about: "depth of the wall around an opening",
    },
    Spec {
        name: "wall",
        form: Form::Word(&["reradiating", "cold"]),
        need: Need::Optional,
        about: "what the tunnel through the wall does: `reradiating` if left out, hot from the furnace, or `cold`",
    },
    Spec {
        name: "freeboard",
        form: Form::Entry(Expect::REACH),
        need: Need::Default("0 m"),
        about: "depth of the melt below the rim of its vessel",
    },
    Spec {
        name: "vessel_tilt",
        form: Form::Entry(VESSEL_TILT),
        need: Need::Default("0 °"),
        about: "how far a vessel leans towards its heading, as for pouring; the melt stays level",
    },
    Spec {
        name: "wall_temperature",
        form: Form::Entry(Expect::TEMPERATURE),
        need: Need::Optional,
        about: "temperature of the inner wall above the melt; the melt's own, the hottest, if left out",
    },
    Spec {
        name: "wall_emissivity",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Default("0.9"),
        about: "emissivity of the inner wall above the melt",
    },
    Spec {
        name: "temperature",
        form: Form::Entry(Expect::TEMPERATURE),
        need: Need::Required,
        about: "temperature of the hot surface",
    },
    Spec {
        name: "emissivity",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "total emissivity, above 0 and at most 1; or give `spectrum`",
    },
    Spec {
        name: "near_ir_emissivity",
        form: Form::Entry(Expect::EMISSIVITY),
        need: Need::Optional,
        about: "emissivity below 3000 nm; the total, or for a pool 1.5 times it, if left out",
    },
    Spec {
        name: "spectrum",
        form: Form::Pairs(&SPECTRUM),
        need: Need::Optional,
        about: "emissivity by wavelength, in growing order, in place of the two emissivities",
    },
    Spec {
        name: "x",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Default("0 m"),
        about: "centre of the outline, to the east",
    },
    Spec {
        name: "y",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Default("0 m"),
        about: "centre of the outline, to the north",
    },
    Spec {
        name: "z",
        form: Form::Entry(Expect::COORDINATE),
        need: Need::Required,
        about: "centre of the outline above the floor; the melt's surface for a pool",
    },
    Spec {
        name: "heading",
        form: Form::Entry(Expect::HEADING),
        need: Need::Default("0 °"),
        about: "where an opening or a plate faces or a cylinder lies along, clockwise from north; how a pool is turned",
    },
    Spec {
        name: "tilt",
        form: Form::Entry(Expect::TILT),
        need: Need::Default("0 °"),
        about: "how far the face of an opening or a plate, or the end of a lying cylinder, is raised",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of a source.
pub const OUTPUTS: &[&str] = &[
    "exitance",
    "near_ir_exitance",
    "power",
    "peak_wavelength",
    "radiance",
    "area",
    "effective_emissivity",
];

/// What a pool's short-wave emissivity is taken as, times its total one, where
/// it is not given: bare metals emit more strongly at short waves (ε falls as
/// λ^-1/2, Hagen and Rubens, up to about 1.3 times at casting temperatures).
pub const POOL_NEAR_INFRARED: f64 = 1.5;

/// The three forms of a source.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// An opening in a wall.
    Opening,
    /// A pool with its surface upwards.
    Pool,
    /// A body seen from all sides.
    Body,
    /// No source but a screen, which heats up and sends too.
    Screen,
}

/// What a source is asked for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outcome {
    exitance: f64,
    near_infrared: f64,
    power: f64,
    peak_wavelength: f64,
    area: f64,
    effective_emissivity: f64,
}

impl Outcome {
    pub(in crate::notebook) fn visit(&self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        let radiance = self.exitance / std::f64::consts::PI;
        for (name, si, dimension) in [
            ("exitance", self.exitance, Dimension::IRRADIANCE),
            (
                "near_ir_exitance",
                self.near_infrared,
                Dimension::IRRADIANCE,
            ),
            ("power", self.power, Dimension::POWER),
            ("peak_wavelength", self.peak_wavelength, Dimension::LENGTH),
            ("radiance", radiance, Dimension::RADIANCE),
            ("area", self.area, Dimension::AREA),
            (
                "effective_emissivity",
                self.effective_emissivity,
                Dimension::NONE,
            ),
        ] {
            see(
                Slot::named(name),
                Output::Quantity(Quantity::new(si, dimension)),
            );
        }
    }
}

/// Works out what a source is asked for.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct OutcomeTask {
    pub(in crate::notebook) shape: Node,
    pub(in crate::notebook) emission: Node,
    pub(in crate::notebook) temperature: Node,
}

impl OutcomeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.shape, self.emission, self.temperature]);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let shape = inputs.shape(self.shape);
        let area = shape.region.area();
        let emission = &inputs.emission(self.emission).face;
        let temperature = inputs.si(self.temperature);
        // Of a thin source: what leaves it over what a black one would send.
        let emissivity = emission.total / planck::exitance(temperature);
        let (effective_emissivity, power) = match &shape.tunnel {
            None => (emissivity, emission.total * area),
            Some(tunnel) => {
                let effective = tunnel
                    .effective_emissivity(emissivity.min(1.0))
                    .map_err(|error| Diagnostic::of_cell("no-such-emission", error.to_string()))?;
                (effective, effective * planck::exitance(temperature) * area)
            }
        };
        let outcome = Outcome {
            exitance: emission.total,
            near_infrared: emission.near_infrared,
            power,
            peak_wavelength: planck::peak_wavelength(temperature),
            area,
            effective_emissivity,
        };
        if outcome.power.is_finite() && outcome.effective_emissivity.is_finite() {
            Ok(Datum::Source(outcome))
        } else {
            Err(Diagnostic::of_cell(
                "not-finite",
                "expected numbers of a furnace's order, found one beyond what can be worked out",
            )
            .with_hint("check the sizes and the temperature"))
        }
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let kind = linker.word("form").map(|word| match word {
        "opening" => Kind::Opening,
        "pool" => Kind::Pool,
        _ => Kind::Body,
    });
    let outline = linker.word("outline");
    let outline = kind.and_then(|kind| {
        let outline = outline?;
        shape::outline_of(linker, kind, outline)
    });
    if let Some(kind) = kind {
        const VESSEL: [&str; 4] = [
            "freeboard",
            "vessel_tilt",
            "wall_temperature",
            "wall_emissivity",
        ];
        const WALL: [&str; 2] = ["wall_thickness", "wall"];
        const ELSE: &str = "does not belong to this form of source";
        if kind != Kind::Pool {
            linker.refuse(&VESSEL, ELSE);
        } else {
            linker.refuse(
                &["tilt"],
                "goes with openings, plates and lying cylinders only",
            );
        }
        if kind != Kind::Opening {
            linker.refuse(&WALL, ELSE);
        }
        let turned = match &outline {
            Some(shape::Outline::Sphere { .. }) => false,
            Some(shape::Outline::Cylinder { lying, .. }) => *lying,
            _ => true,
        };
        if kind == Kind::Body && !turned {
            linker.refuse(
                &["tilt"],
                "goes with openings, plates and lying cylinders only",
            );
        }
    }
    let place = ["x", "y", "z"].map(|field| linker.always(field));
    let [heading, tilt, temperature] =
        ["heading", "tilt", "temperature"].map(|field| linker.always(field));
    let behind = kind.map_or(Behind::Nothing, |kind| shape::behind(linker, kind));
    let surface = emission::surface_of(linker);
    let shape = kind.zip(outline).map(|(kind, outline)| {
        Task::Shape(ShapeTask {
            kind,
            outline,
            place,
            heading,
            tilt,
            behind,
        })
    });
    let shape = linker.group("shape", shape);
    let parts = emission::parts_of(linker, behind, shape);
    let emission = kind.zip(surface).map(|(kind, surface)| {
        Task::Emission(EmissionTask {
            kind,
            temperature,
            surface,
            parts,
        })
    });
    let emission = linker.group("emission", emission);
    let _ = linker.group(
        "outcome",
        Some(Task::Source(OutcomeTask {
            shape,
            emission,
            temperature,
        })),
    );
    linker.apart();
}
