//! Where a person stands, which way they face, how high the eye is, for how
//! long.

pub mod sights;

use std::f64::consts::PI;
use std::sync::Arc;

use glam::DVec3;

use super::Kind;
use super::field::{self, Expect, Need, Spec};
use super::source::{Shape, direction};
use super::surroundings::Room;
use crate::graph::Node;
use crate::guidance::Envelope;
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::{Linker, Slot as Own};
use crate::notebook::scene::{Heat, Weights};
use crate::notebook::task::{Inputs, Task};
use crate::physics::region::Region;
use crate::physics::view::View;
use crate::physics::{radiant, subtense};
use crate::units::{Dimension, Quantity};

pub use crate::notebook::scene::Form;
pub(in crate::notebook) use sights::Facing;
pub use sights::{Band, Orientation, Views};
use sights::{Hit, envelope};

/// The fields of a position.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "x",
        form: field::Form::Entry(Expect::COORDINATE),
        need: Need::Optional,
        about: "to the east; with y, in place of from and distance",
    },
    Spec {
        name: "y",
        form: field::Form::Entry(Expect::COORDINATE),
        need: Need::Optional,
        about: "to the north; with x, in place of from and distance",
    },
    Spec {
        name: "from",
        form: field::Form::Cell(&[Kind::Source]),
        need: Need::Optional,
        about: "the source that the distance is taken from",
    },
    Spec {
        name: "distance",
        form: field::Form::Entry(Expect::SIZE),
        need: Need::Optional,
        about: "horizontal distance from the centre of the source's outline",
    },
    Spec {
        name: "bearing",
        form: field::Form::Entry(Expect::HEADING),
        need: Need::Default("0 °"),
        about: "clockwise off the source's own heading, 0 ° straight out",
    },
    Spec {
        name: "z",
        form: field::Form::Entry(Expect::COORDINATE),
        need: Need::Default("1.6 m"),
        about: "height of the eye above the floor",
    },
    Spec {
        name: "ground",
        form: field::Form::Entry(Expect::COORDINATE),
        need: Need::Default("0 m"),
        about: "height of what the person stands on: the floor, or a platform",
    },
    Spec {
        name: "faces",
        form: field::Form::Facing,
        need: Need::Default("strongest"),
        about: "`strongest`, the name of a source, or a heading",
    },
    Spec {
        name: "tilt",
        form: field::Form::Entry(Expect::TILT),
        need: Need::Default("0 °"),
        about: "how far the face is raised, where faces is a heading",
    },
    Spec {
        name: "stay",
        form: field::Form::Entry(Expect::DURATION),
        need: Need::Optional,
        about: "how long the person stays, once a shift",
    },
    Spec {
        name: "reach",
        form: field::Form::Entry(Expect::REACH),
        need: Need::Default("0.3 m"),
        about: "how far eyes, face and hands may stray from the stated point",
    },
    Spec {
        name: "surface_temperature",
        form: field::Form::Entry(Expect::TEMPERATURE),
        need: Need::Optional,
        about: "temperature of skin or clothing, where the net radiant heat into it is asked for",
    },
    Spec {
        name: "surface_emissivity",
        form: field::Form::Entry(Expect::EMISSIVITY),
        need: Need::Default("0.97"),
        about: "emissivity and absorptance of that surface",
    },
    Spec {
        name: "note",
        form: field::Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of a position. Those of [`BY_SOURCE`] carry the name of a source
/// or a screen behind a further point.
pub const OUTPUTS: &[&str] = &[
    "irradiance",
    "near_ir_irradiance",
    "skin_irradiance",
    "background",
    "envelope_irradiance",
    "envelope_near_ir_irradiance",
    "envelope_skin_irradiance",
    "blue_light_radiance",
    "retinal_radiance_2006",
    "retinal_radiance_2013",
    "ir_a_radiance",
    "mean_radiant_temperature",
    "net_radiant_heat",
    "irradiance_from",
    "view_factor",
    "angular_subtense",
];

/// The outputs that a position has for each source and screen.
pub const BY_SOURCE: [&str; 3] = ["irradiance_from", "view_factor", "angular_subtense"];

/// Where a position stands, as linked.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Place {
    At {
        x: Node,
        y: Node,
    },
    From {
        shape: Node,
        distance: Node,
        bearing: Node,
    },
}

/// What a position sees, from the stated point and from its envelopes.
#[derive(Clone, Debug)]
pub struct Sights {
    /// The eye at the stated point.
    pub eye: DVec3,
    /// The height of what the person stands on.
    pub ground: f64,
    /// How far eyes, face and hands may stray.
    pub reach: f64,
    /// The names of the sources that it lies behind.
    pub behind: Vec<String>,
    /// Where everything is.
    pub form: Arc<Form>,
    /// The eye's envelope; the first point is the stated one.
    pub around_eye: Views,
    /// The skin's envelope.
    pub around_skin: Views,
    /// Of each source and screen the angular subtense from the stated point, in
    /// rad: the mean of its greatest and its smallest angle.
    pub subtenses: Vec<f64>,
    /// Of each piece that is seen from the stated point its solid angle, sr.
    pub solid_angles: Vec<f64>,
}

/// Works out what a position sees.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct SightsTask {
    pub(in crate::notebook) form: Node,
    pub(in crate::notebook) place: Place,
    pub(in crate::notebook) z: Node,
    pub(in crate::notebook) ground: Node,
    pub(in crate::notebook) reach: Node,
}

impl SightsTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.form, self.z, self.ground, self.reach]);
        match self.place {
            Place::At { x, y } => nodes.extend([x, y]),
            Place::From {
                shape,
                distance,
                bearing,
            } => nodes.extend([shape, distance, bearing]),
        }
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let form = inputs.form(self.form);
        let z = inputs.si(self.z);
        let eye = match self.place {
            Place::At { x, y } => DVec3::new(inputs.si(x), inputs.si(y), z),
            Place::From {
                shape,
                distance,
                bearing,
            } => {
                let shape = inputs.shape(shape);
                let heading = shape.ahead.x.atan2(shape.ahead.y) + inputs.si(bearing);
                (shape.centre + direction(heading) * inputs.si(distance)).with_z(z)
            }
        };
        let (ground, reach) = (inputs.si(self.ground), inputs.si(self.reach));
        let look = |kind| {
            Views::look(form, eye, envelope(eye, ground, reach, kind))
                .map_err(|hit| self.touching(hit, form, reach))
        };
        let around_eye = look(Envelope::Eye)?;
        let subtense = |shape: &Arc<Shape>| {
            let found = match &shape.region {
                // A screen is seen from both sides.
                Region::Polygon { vertices, normal } if !shape.is_source() => {
                    let plate = Region::Plate {
                        vertices: vertices.clone(),
                        normal: *normal,
                    };
                    subtense::of(&plate, eye)
                }
                region => subtense::of(region, eye),
            };
            found.map_or(0.0, subtense::Subtense::mean)
        };
        Ok(Datum::Sights(Arc::new(Sights {
            subtenses: form.shapes.iter().map(subtense).collect(),
            solid_angles: around_eye.at(0).iter().map(View::solid_angle).collect(),
            eye,
            ground,
            reach,
            behind: form
                .behind(eye)
                .into_iter()
                .map(|index| form.names[index].to_string())
                .collect(),
            form: Arc::clone(form),
            around_eye,
            around_skin: look(Envelope::Skin)?,
        })))
    }

    fn touching(&self, hit: Hit, form: &Form, reach: f64) -> Diagnostic {
        let field = match self.place {
            Place::At { .. } => "x",
            Place::From { .. } => "distance",
        };
        match hit {
            Hit::Inside(index) => Diagnostic::of_field(
                field,
                "inside-source",
                format!(
                    "the position lies inside or touches source {}: no irradiance can be given",
                    form.names[index]
                ),
            )
            .with_hint("move it away from the hot surface"),
            Hit::Reached(index) => Diagnostic::of_field(
                field,
                "reach-touches-source",
                format!(
                    "within its reach of {reach} m the position touches source {}: this is \
                     contact, not irradiance",
                    form.names[index]
                ),
            )
            .with_hint("move it away, or state a smaller `reach` if a barrier makes it certain"),
        }
    }
}

/// What reaches a position. Irradiances in W/m², radiances in W/(m²·sr).
#[derive(Clone, Debug, PartialEq)]
pub struct Exposure {
    /// At the stated point, by [`Band`].
    pub stated: [f64; 3],
    /// The worst of the eye's envelope, by [`Band`].
    pub worst_eye: [f64; 3],
    /// The worst of the skin's envelope, by [`Band`].
    pub worst_skin: [f64; 3],
    /// From the room, on the receiver that faces as it does for the total.
    pub background: f64,
    /// The greatest weighted radiances of what is seen: blue light, retinal of
    /// 2006, retinal of 2013, IR-A.
    pub radiances: [f64; 4],
    /// For each source and screen its name, its part of the total irradiance
    /// and its configuration factor, on that same receiver.
    pub parts: Vec<(Arc<str>, f64, f64)>,
    /// Parallel to the parts, their angular subtenses, rad.
    pub subtenses: Vec<f64>,
    /// The mean radiant temperature at the stated point, K: that of a small
    /// black sphere, as a globe thermometer in still air would tell it.
    pub radiant_temperature: f64,
    /// The net radiant heat into skin or clothing, where it is asked for.
    pub net: Option<f64>,
    /// The polished screens in which a source is mirrored within reach: the
    /// truth is higher there than these figures.
    pub mirrored: Vec<Arc<str>>,
    /// Which way the receiver faces for the total, a unit vector.
    pub normal: DVec3,
}

impl Exposure {
    /// Returns what guidance judges: the worst of an envelope in a band.
    ///
    /// Where a near infrared emissivity above the total one makes a band exceed
    /// the whole, the whole is taken as that band: the larger figure is judged.
    #[must_use]
    pub fn judged(&self, envelope: Envelope, band: Band) -> f64 {
        let worst = match envelope {
            Envelope::Eye => &self.worst_eye,
            Envelope::Skin => &self.worst_skin,
        };
        match band {
            Band::Total => worst.iter().copied().fold(0.0, f64::max),
            Band::NearInfrared | Band::Skin => worst[band as usize],
        }
    }

    pub(in crate::notebook) fn visit(&self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        let [total, near, skin] = self.stated;
        let [blue, retinal_2006, retinal_2013, infrared_a] = self.radiances;
        let irradiance = Dimension::IRRADIANCE;
        for (name, si, dimension) in [
            ("irradiance", total, irradiance),
            ("near_ir_irradiance", near, irradiance),
            ("skin_irradiance", skin, irradiance),
            ("background", self.background, irradiance),
            (
                "envelope_irradiance",
                self.worst_skin[Band::Total as usize],
                irradiance,
            ),
            (
                "envelope_near_ir_irradiance",
                self.judged(Envelope::Eye, Band::NearInfrared),
                irradiance,
            ),
            (
                "envelope_skin_irradiance",
                self.judged(Envelope::Skin, Band::Skin),
                irradiance,
            ),
            ("blue_light_radiance", blue, Dimension::RADIANCE),
            ("retinal_radiance_2006", retinal_2006, Dimension::RADIANCE),
            ("retinal_radiance_2013", retinal_2013, Dimension::RADIANCE),
            ("ir_a_radiance", infrared_a, Dimension::RADIANCE),
        ] {
            see(
                Slot::named(name),
                Output::Quantity(Quantity::new(si, dimension)),
            );
        }
        see(
            Slot::named("mean_radiant_temperature"),
            Output::Quantity(Quantity::new(
                self.radiant_temperature,
                Dimension::TEMPERATURE,
            )),
        );
        if let Some(net) = self.net {
            see(
                Slot::named("net_radiant_heat"),
                Output::Quantity(Quantity::new(net, irradiance)),
            );
        }
        for ((name, part, factor), subtense) in self.parts.iter().zip(&self.subtenses) {
            let slot = |output| Slot {
                name: output,
                part: Some(name),
                row: None,
            };
            see(
                slot("irradiance_from"),
                Output::Quantity(Quantity::new(*part, irradiance)),
            );
            see(
                slot("view_factor"),
                Output::Quantity(Quantity::number(*factor)),
            );
            see(
                slot("angular_subtense"),
                Output::Quantity(Quantity::new(*subtense, Dimension::ANGLE)),
            );
        }
    }
}

/// Works out what reaches a position.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct ExposureTask {
    pub(in crate::notebook) sights: Node,
    pub(in crate::notebook) heat: Node,
    pub(in crate::notebook) room: Node,
    pub(in crate::notebook) facing: Facing,
    /// Temperature and emissivity of skin or clothing.
    pub(in crate::notebook) surface: Option<[Node; 2]>,
}

impl ExposureTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.sights, self.heat, self.room]);
        nodes.extend(self.surface.iter().flatten());
        self.facing.inputs(nodes);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let sights = inputs.sights(self.sights);
        let heat = inputs.heat(self.heat);
        let orientation = self.facing.orientation(inputs);
        let weights = Band::ALL.map(|band| heat.weights(band));
        let at_eye = |weights: &Weights<'_>| sights.around_eye.irradiance(0, orientation, weights);
        let [total, near_infrared, skin] = weights.each_ref().map(at_eye);
        let worst = |around: &Views| weights.each_ref().map(|w| around.worst(orientation, w));
        let normal = total.1;
        let parts = self::parts(sights, &weights[Band::Total as usize], normal);
        let seen: f64 = parts.iter().map(|(_, _, factor)| factor).sum();
        let room = inputs.room(self.room);
        let background = room.background * (1.0 - seen).max(0.0);
        let mut radiances = [0.0_f64; 4];
        for (piece, (part, view)) in sights.around_eye.parts(0).enumerate() {
            if view.flux() == DVec3::ZERO {
                continue;
            }
            let emission = sights
                .around_eye
                .tag(0, piece)
                .map_or_else(|| heat.parts[part], |tag| heat.passing(tag));
            for (greatest, exitance) in radiances.iter_mut().zip([
                emission.blue_light,
                emission.retinal_2006,
                emission.retinal_2013,
                emission.infrared_a,
            ]) {
                *greatest = greatest.max(exitance / PI);
            }
        }
        Ok(Datum::Exposure(Arc::new(Exposure {
            stated: [total.0, near_infrared.0, skin.0],
            worst_eye: worst(&sights.around_eye),
            worst_skin: worst(&sights.around_skin),
            background,
            radiances,
            subtenses: sights.subtenses.clone(),
            radiant_temperature: self.radiant_temperature(sights, &weights, room)?,
            net: self.net(inputs, total.0, background)?,
            mirrored: mirrored(sights, heat),
            parts,
            normal,
        })))
    }
}

impl ExposureTask {
    fn radiant_temperature(
        &self,
        sights: &Sights,
        weights: &[Weights<'_>; 3],
        room: &Room,
    ) -> Result<f64, Diagnostic> {
        let arriving = sights
            .around_eye
            .arriving(0, &weights[Band::Total as usize]);
        radiant::mean_temperature_of_sphere(
            &sights.solid_angles,
            &arriving,
            room.radiant_temperature,
        )
        .map_err(|error| {
            Diagnostic::of_cell("no-radiant-temperature", error.to_string())
                .with_hint("check the temperatures of the sources and of the room")
        })
    }

    fn net(
        &self,
        inputs: Inputs<'_>,
        irradiance: f64,
        background: f64,
    ) -> Result<Option<f64>, Diagnostic> {
        let Some([temperature, emissivity]) = self.surface else {
            return Ok(None);
        };
        let emissivity = inputs.si(emissivity);
        let surface = inputs.si(temperature);
        radiant::net_heat(irradiance, background, emissivity, emissivity, surface)
            .map(Some)
            .map_err(|error| {
                Diagnostic::of_field("surface_temperature", "no-net-heat", error.to_string())
                    .with_hint("check the temperature of the surface")
            })
    }
}

/// Returns the polished screens in which a source is mirrored anywhere within
/// reach.
fn mirrored(sights: &Sights, heat: &Heat) -> Vec<Arc<str>> {
    let Some(balanced) = &heat.polished else {
        return Vec::new();
    };
    balanced
        .screens
        .iter()
        .filter(|state| {
            sights.around_skin.points.iter().any(|point| {
                // Where nothing can be said, it may well be so.
                state
                    .screen
                    .images(&balanced.sources, *point)
                    .map_or(true, |images| !images.is_empty())
            })
        })
        .map(|state| Arc::clone(&state.name))
        .collect()
}

/// Returns for each emitter its name, what it sends to a receiver of this
/// normal at the stated point in W/m², and its configuration factor there:
/// that of all of it that is seen, behind a mesh or a filter too.
fn parts(sights: &Sights, weights: &Weights<'_>, normal: DVec3) -> Vec<(Arc<str>, f64, f64)> {
    let form = &sights.form;
    let mut parts: Vec<(Arc<str>, f64, f64)> = form
        .names
        .iter()
        .map(|name| (Arc::clone(name), 0.0, 0.0))
        .collect();
    let arriving = sights.around_eye.arriving(0, weights);
    for ((part, view), exitance) in sights.around_eye.parts(0).zip(arriving.iter()) {
        let factor = view.factor(normal);
        let (_, sent, seen) = &mut parts[form.owner(part)];
        *sent += exitance * factor;
        *seen += factor;
    }
    parts
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let place = place(linker);
    let facing = linker.facing();
    if linker.has("tilt") && !matches!(facing, Some(Facing::Heading { .. })) {
        linker.refuse(&["tilt"], "only goes with a heading in `faces`");
    }
    let [form, heat, room] = linker.scene();
    let [z, ground, reach] = ["z", "ground", "reach"].map(|field| linker.always(field));
    let sights = place.map(|place| {
        Task::Sights(SightsTask {
            form,
            place,
            z,
            ground,
            reach,
        })
    });
    let sights = linker.group("sights", sights);
    let temperature = linker.entry("surface_temperature");
    let emissivity = linker.always("surface_emissivity");
    if temperature.is_none() {
        linker.refuse(
            &["surface_emissivity"],
            "goes with `surface_temperature` only",
        );
    }
    let surface = temperature.map(|temperature| [temperature, emissivity]);
    let exposure = facing.map(|facing| {
        Task::Exposure(ExposureTask {
            sights,
            heat,
            room,
            facing,
            surface,
        })
    });
    let _ = linker.group("exposure", exposure);
}

fn place(linker: &mut Linker<'_>) -> Option<Place> {
    let by_source = linker.has("from") || linker.has("distance");
    let by_point = linker.has("x") || linker.has("y");
    if by_source && by_point {
        linker.refuse(
            &["x", "y"],
            "does not go with `from` and `distance`: a position has one place",
        );
        return None;
    }
    if by_point {
        linker.refuse(&["bearing"], "goes with `from` and `distance` only");
        let x = linker.need("x", "a position given by its point");
        let y = linker.need("y", "a position given by its point");
        return Some(Place::At { x: x?, y: y? });
    }
    if !by_source {
        linker.fault(
            Diagnostic::of_cell(
                "no-place",
                "expected a place: `from` and `distance`, or `x` and `y`; found neither",
            )
            .with_hint("say how far from which source the person stands"),
        );
        return None;
    }
    let distance = linker.need("distance", "a position placed from a source");
    if !linker.has("from") {
        linker.fault(
            Diagnostic::of_field(
                "from",
                "missing-field",
                "expected the source that the distance is taken from, found nothing",
            )
            .with_hint("add `from`"),
        );
    }
    let source = linker.target("from")?;
    let shape = linker.foreign(source, Own::Group("shape"));
    let bearing = linker.always("bearing");
    Some(Place::From {
        shape,
        distance: distance?,
        bearing,
    })
}
