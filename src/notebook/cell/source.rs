//! A hot emitter: an opening, a pool or a body.

use std::sync::Arc;

use glam::DVec3;

use super::field::{Expect, Form, Need, Spec};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::Linker;
use crate::notebook::task::{Inputs, Task};
use crate::physics::planck;
use crate::physics::region::Region;
use crate::physics::scene::{Barrier, Part};
use crate::physics::surface::Emission;
use crate::units::{Dimension, Quantity};

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

/// The outline of a source, with the nodes of its sizes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Outline {
    Disc {
        diameter: Node,
    },
    /// `along` is the height of an opening, the length of a pool.
    Rectangle {
        width: Node,
        along: Node,
    },
    Sphere {
        diameter: Node,
    },
}

/// The place and the outline of a source or a screen in the room.
#[derive(Clone, Debug, PartialEq)]
pub struct Shape {
    /// The outline that people see first: of an opening its outer edge, of a
    /// pool its rim.
    pub region: Region,
    /// Which form it is.
    pub kind: Kind,
    /// The centre of its outline.
    pub centre: DVec3,
    /// Its heading on the plan, a horizontal unit vector.
    pub ahead: DVec3,
    /// How far it reaches behind its outline, m: the wall around an opening,
    /// the freeboard of a pool.
    pub depth: f64,
    /// What of it emits, each of one exitance.
    pub parts: Vec<Part>,
    /// What it hides or dims.
    pub barrier: Option<Barrier>,
}

impl Shape {
    /// Returns the shape of a region that emits as a whole.
    #[must_use]
    pub fn simple(region: Region, kind: Kind, centre: DVec3, ahead: DVec3) -> Shape {
        let part = Part {
            region: region.clone(),
            through: None,
            less: None,
        };
        Shape {
            region,
            kind,
            centre,
            ahead,
            depth: 0.0,
            parts: vec![part],
            barrier: None,
        }
    }

    /// Returns whether this is a source, not a screen.
    #[must_use]
    pub fn is_source(&self) -> bool {
        self.kind != Kind::Screen
    }

    /// Returns whether a point lies behind the outline of an opening or a rim,
    /// in the wall's tunnel or above the metal.
    #[must_use]
    pub fn swallows(&self, point: DVec3) -> bool {
        if self.depth <= 0.0 {
            return false;
        }
        let Some(normal) = self.region.normal() else {
            return false;
        };
        let above = (point - self.region.centre()).dot(normal);
        (-self.depth..=0.0).contains(&above) && self.region.touches(point - normal * above)
    }

    /// Returns whether the straight way between two points meets this source.
    /// A screen can be reached past.
    #[must_use]
    pub fn is_met(&self, from: DVec3, to: DVec3) -> bool {
        self.is_source() && self.region.crosses(from, to)
    }
}

/// What a source or a screen emits.
#[derive(Clone, Debug, PartialEq)]
pub struct Emitted {
    /// What the hot surface itself sends.
    pub face: Emission,
    /// What each part of the shape sends.
    pub parts: Vec<Emission>,
}

impl Emitted {
    /// Returns what is sent where all of it is of one exitance.
    #[must_use]
    pub fn simple(face: Emission) -> Emitted {
        Emitted {
            face,
            parts: vec![face],
        }
    }
}

/// Returns the horizontal unit vector of a heading in radians, clockwise from
/// north.
#[must_use]
pub fn direction(heading: f64) -> DVec3 {
    DVec3::new(heading.sin(), heading.cos(), 0.0)
}

/// Works out where a source is.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct ShapeTask {
    pub(in crate::notebook) kind: Kind,
    pub(in crate::notebook) outline: Outline,
    pub(in crate::notebook) place: [Node; 3],
    pub(in crate::notebook) heading: Node,
    pub(in crate::notebook) tilt: Node,
    pub(in crate::notebook) freeboard: Node,
}

impl ShapeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        match self.outline {
            Outline::Disc { diameter } | Outline::Sphere { diameter } => nodes.push(diameter),
            Outline::Rectangle { width, along } => nodes.extend([width, along]),
        }
        nodes.extend(self.place);
        nodes.extend([self.heading, self.tilt, self.freeboard]);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        if self.kind == Kind::Pool && inputs.si(self.freeboard) > 0.0 {
            // A rim hides metal, but the hot wall above the metal shows: leaving
            // both out could be on the unsafe side.
            return Err(Diagnostic::of_field(
                "freeboard",
                "not-worked-out",
                "expected a full pool, found a freeboard: the rim and the inner wall above the \
                 metal are not worked out in this version",
            )
            .with_hint(
                "write `0 m` and take the rim as the metal's surface, with its emissivity",
            ));
        }
        let [x, y, z] = self.place.map(|node| inputs.si(node));
        let centre = DVec3::new(x, y, z);
        let heading = inputs.si(self.heading);
        let ahead = direction(heading);
        let (normal, up) = match self.kind {
            Kind::Pool => (DVec3::Z, ahead),
            Kind::Opening | Kind::Body | Kind::Screen => {
                let (sin, cos) = inputs.si(self.tilt).sin_cos();
                (ahead * cos + DVec3::Z * sin, DVec3::Z * cos - ahead * sin)
            }
        };
        let region = match self.outline {
            Outline::Disc { diameter } => Region::disc(centre, normal, inputs.si(diameter) / 2.0),
            Outline::Rectangle { width, along } => {
                Region::rectangle(centre, normal, up, inputs.si(width), inputs.si(along))
            }
            Outline::Sphere { diameter } => Region::sphere(centre, inputs.si(diameter) / 2.0),
        };
        let region = region.map_err(|error| {
            Diagnostic::of_cell("no-such-shape", error.to_string())
                .with_hint("check the sizes and the place of the source")
        })?;
        Ok(Datum::Shape(Arc::new(Shape::simple(
            region, self.kind, centre, ahead,
        ))))
    }
}

/// Works out what a source emits.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct EmissionTask {
    pub(in crate::notebook) kind: Kind,
    pub(in crate::notebook) temperature: Node,
    pub(in crate::notebook) emissivity: Node,
    pub(in crate::notebook) near_infrared: Option<Node>,
}

impl EmissionTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.temperature, self.emissivity]);
        nodes.extend(self.near_infrared);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let emissivity = inputs.si(self.emissivity);
        let near_infrared = inputs.maybe(self.near_infrared).unwrap_or(match self.kind {
            Kind::Pool => (POOL_NEAR_INFRARED * emissivity).min(1.0),
            Kind::Opening | Kind::Body | Kind::Screen => emissivity,
        });
        Emission::grey(inputs.si(self.temperature), emissivity, near_infrared)
            .map(|face| Datum::Emission(Arc::new(Emitted::simple(face))))
            .map_err(|error| {
                Diagnostic::of_field("temperature", "no-such-emission", error.to_string())
                    .with_hint("check the temperature and the emissivities")
            })
    }
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
        let area = inputs.shape(self.shape).region.area();
        let emission = &inputs.emission(self.emission).face;
        let temperature = inputs.si(self.temperature);
        let outcome = Outcome {
            exitance: emission.total,
            near_infrared: emission.near_infrared,
            power: emission.total * area,
            peak_wavelength: planck::peak_wavelength(temperature),
            area,
            // Of a thin source: what leaves it over what a black one would send.
            effective_emissivity: emission.total / planck::exitance(temperature),
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
        outline_of(linker, kind, outline)
    });
    if let Some(kind) = kind {
        let not_here: &[&str] = match kind {
            Kind::Opening => &["freeboard"],
            Kind::Pool => &["wall_thickness", "tilt"],
            Kind::Body | Kind::Screen => &["wall_thickness", "freeboard", "tilt"],
        };
        linker.refuse(not_here, "does not belong to this form of source");
    }
    let place = ["x", "y", "z"].map(|field| linker.always(field));
    let [heading, tilt, freeboard, temperature, emissivity] =
        ["heading", "tilt", "freeboard", "temperature", "emissivity"]
            .map(|field| linker.always(field));
    let near_infrared = linker.entry("near_ir_emissivity");
    let shape = kind.zip(outline).map(|(kind, outline)| {
        Task::Shape(ShapeTask {
            kind,
            outline,
            place,
            heading,
            tilt,
            freeboard,
        })
    });
    let shape = linker.group("shape", shape);
    let emission = kind.map(|kind| {
        Task::Emission(EmissionTask {
            kind,
            temperature,
            emissivity,
            near_infrared,
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

fn outline_of(linker: &mut Linker<'_>, kind: Kind, outline: &'static str) -> Option<Outline> {
    const ELSE: &str = "does not belong to this outline";
    match (kind, outline) {
        (Kind::Opening | Kind::Pool, "disc") => {
            linker.refuse(&["width", "height", "length"], ELSE);
            let diameter = linker.need("diameter", "a disc")?;
            Some(Outline::Disc { diameter })
        }
        (Kind::Opening, "rectangle") => {
            linker.refuse(&["diameter", "length"], ELSE);
            let width = linker.need("width", "a rectangle");
            let along = linker.need("height", "a rectangular opening");
            Some(Outline::Rectangle {
                width: width?,
                along: along?,
            })
        }
        (Kind::Pool, "rectangle") => {
            linker.refuse(&["diameter", "height"], ELSE);
            let width = linker.need("width", "a rectangle");
            let along = linker.need("length", "a rectangular pool");
            Some(Outline::Rectangle {
                width: width?,
                along: along?,
            })
        }
        (Kind::Body, "sphere") => {
            linker.refuse(&["width", "height", "length"], ELSE);
            let diameter = linker.need("diameter", "a sphere")?;
            Some(Outline::Sphere { diameter })
        }
        (kind, outline) => {
            let (form, fits) = match kind {
                Kind::Opening => ("an opening", "disc or rectangle"),
                Kind::Pool => ("a pool", "disc or rectangle"),
                Kind::Body | Kind::Screen => ("a body", "sphere"),
            };
            linker.fault(
                Diagnostic::of_field(
                    "outline",
                    "outline-out-of-place",
                    format!("expected {fits} for {form}, found {outline}"),
                )
                .with_hint("change the outline or the form"),
            );
            None
        }
    }
}
