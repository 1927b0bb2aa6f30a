//! The ground inside which one rule is not met.

mod track;

use std::sync::Arc;

use super::Kind;
use super::curve::along;
use super::field::{self, Expect, Need, Spec};
use super::position::{Band, Facing};
use crate::graph::Node;
use crate::guidance::{Allowed, Envelope, Library};
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot};
use crate::notebook::engine::{Linker, Slot as Own};
use crate::notebook::task::{Inputs, Task};
use crate::units::{Dimension, Quantity};

pub use track::Track;
use track::{Line, Rule};

/// The fields of a zone.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "from",
        form: field::Form::Cell(&[Kind::Source]),
        need: Need::Required,
        about: "the source from whose centre the line runs; all sources count",
    },
    Spec {
        name: "heading",
        form: field::Form::Entry(Expect::HEADING),
        need: Need::Optional,
        about: "direction of the line, clockwise from north; an opening's own if left out, else 0 °",
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
        about: "height of what people stand on",
    },
    Spec {
        name: "guidance",
        form: field::Form::Guidance,
        need: Need::Required,
        about: "the limit, by its id",
    },
    Spec {
        name: "stay",
        form: field::Form::Entry(Expect::DURATION),
        need: Need::Required,
        about: "how long people stay, once a shift",
    },
    Spec {
        name: "faces",
        form: field::Form::Facing,
        need: Need::Default("strongest"),
        about: "`strongest`, the name of a source, or a heading",
    },
    Spec {
        name: "reach",
        form: field::Form::Entry(Expect::REACH),
        need: Need::Default("0.3 m"),
        about: "how far eyes, face and hands may stray from the line",
    },
    Spec {
        name: "farthest",
        form: field::Form::Entry(Expect::SIZE),
        need: Need::Default("200 m"),
        about: "where the search along the line ends",
    },
    Spec {
        name: "note",
        form: field::Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of a zone.
pub const OUTPUTS: &[&str] = &["distance", "clear_distance", "limit", "state"];

/// Where a zone ends on its line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Extent {
    /// At this distance in m: everywhere farther along the line, as far as it
    /// is searched, the rule is met.
    At(f64),
    /// The rule is met everywhere on the line.
    MetEverywhere,
    /// The rule is not met at the end of the line, at this distance in m.
    NotMetWithin(f64),
    /// The guidance says nothing about this stay.
    NotAssessed,
}

impl Extent {
    /// Returns the words for it where it is no distance.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Extent::At(_) => "ends at a distance",
            Extent::MetEverywhere => "met everywhere",
            Extent::NotMetWithin(_) => "met nowhere within range",
            Extent::NotAssessed => "not assessed",
        }
    }

    /// Returns the same extent measured from a point `edge` metres along the
    /// line.
    #[must_use]
    pub fn from(self, edge: f64) -> Extent {
        match self {
            Extent::At(distance) => Extent::At(distance - edge),
            Extent::NotMetWithin(distance) => Extent::NotMetWithin(distance - edge),
            Extent::MetEverywhere | Extent::NotAssessed => self,
        }
    }

    /// Returns a number by which extents order: greater is farther.
    #[must_use]
    pub const fn rank(self) -> f64 {
        match self {
            Extent::At(distance) => distance,
            Extent::MetEverywhere => f64::NEG_INFINITY,
            Extent::NotMetWithin(_) => f64::INFINITY,
            Extent::NotAssessed => f64::NAN,
        }
    }
}

/// Where a zone ends, and what its rule allows there.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Edge {
    /// From the centre of the outline.
    pub extent: Extent,
    /// How far the outline reaches along the line, m.
    pub edge: f64,
    /// Where the search along the line ends, m.
    pub end: f64,
    /// The limit for the stay, as an irradiance in W/m².
    pub limit: Option<f64>,
}

impl Edge {
    pub(in crate::notebook) fn visit(&self, see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
        for (name, edge) in [("distance", 0.0), ("clear_distance", self.edge)] {
            see(
                Slot::named(name),
                Output::Extent {
                    extent: self.extent.from(edge),
                    end: self.end - edge,
                },
            );
        }
        see(
            Slot::named("limit"),
            self.limit.map_or(Output::Nothing, |limit| {
                Output::Quantity(Quantity::new(limit, Dimension::IRRADIANCE))
            }),
        );
        see(Slot::named("state"), Output::Word(self.extent.words()));
    }
}

/// Works out what is seen along a zone's line.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct TrackTask {
    pub(in crate::notebook) form: Node,
    pub(in crate::notebook) shape: Node,
    pub(in crate::notebook) heading: Option<Node>,
    pub(in crate::notebook) z: Node,
    pub(in crate::notebook) ground: Node,
    pub(in crate::notebook) reach: Node,
    pub(in crate::notebook) farthest: Node,
    pub(in crate::notebook) envelope: Envelope,
}

impl TrackTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([
            self.form,
            self.shape,
            self.z,
            self.ground,
            self.reach,
            self.farthest,
        ]);
        nodes.extend(self.heading);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let form = Arc::clone(inputs.form(self.form));
        let shape = inputs.shape(self.shape);
        let ahead = along(shape, inputs.maybe(self.heading));
        let edge = shape.edge_along(ahead);
        let farthest = inputs.si(self.farthest);
        if farthest <= edge {
            return Err(Diagnostic::of_field(
                "farthest",
                "inside-outline",
                format!(
                    "expected a distance outside the source's outline, whose edge is at {edge} m, \
                     found {farthest} m"
                ),
            )
            .with_hint("give a greater `farthest`"));
        }
        let line = Line {
            form,
            origin: shape.centre,
            ahead,
            z: inputs.si(self.z),
            ground: inputs.si(self.ground),
            reach: inputs.si(self.reach),
            envelope: self.envelope,
        };
        Ok(Datum::Track(Arc::new(Track::new(line, edge, farthest))))
    }
}

/// Works out where a zone ends.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct EdgeTask {
    pub(in crate::notebook) track: Node,
    pub(in crate::notebook) heat: Node,
    pub(in crate::notebook) stay: Node,
    pub(in crate::notebook) guidance: String,
    pub(in crate::notebook) facing: Facing,
}

impl EdgeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.track, self.heat, self.stay]);
        self.facing.inputs(nodes);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let track = inputs.track(self.track);
        let library = Library::shipped();
        let limit = library
            .get(&self.guidance)
            .expect("ids are checked while linking");
        let heat = inputs.heat(self.heat);
        let weights = heat.judged(Band::judged(limit.metric.exposure()));
        let stay = inputs.si(self.stay);
        let permitted = permitted(&self.guidance, stay);
        let extent = permitted.map_or(Extent::NotAssessed, |permitted| {
            track.outermost(&Rule {
                orientation: self.facing.orientation(inputs),
                weights: &weights,
                limit: permitted,
            })
        });
        Ok(Datum::Edge(Edge {
            extent,
            edge: track.edge,
            end: track.end(),
            limit: permitted,
        }))
    }
}

/// Returns the greatest irradiance in W/m² in which the whole stay is allowed;
/// `None` where the guidance says nothing about so long a stay.
fn permitted(guidance: &str, stay: f64) -> Option<f64> {
    let library = Library::shipped();
    let limit = library.limit_at(guidance, stay)?;
    // A family's limit never rises with time, so that at the end of the stay
    // is the least; asked the other way round it must allow the stay.
    match library.allowed(guidance, limit) {
        Ok(Allowed::Unlimited) => Some(limit),
        Ok(Allowed::Seconds(seconds) | Allowed::CappedAt(seconds))
            if seconds >= stay * (1.0 - 1e-12) =>
        {
            Some(limit)
        }
        Ok(_) | Err(_) => None,
    }
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let source = linker.target("from");
    let shape = source.map(|source| linker.foreign(source, Own::Group("shape")));
    let guidance = linker
        .guidance("guidance")
        .and_then(|ids| ids.into_iter().next());
    let facing = linker.facing();
    let heading = linker.entry("heading");
    let [form, heat, _] = linker.scene();
    let [z, ground, reach, farthest, stay] =
        ["z", "ground", "reach", "farthest", "stay"].map(|field| linker.always(field));
    let track = shape.zip(guidance.as_ref()).map(|(shape, guidance)| {
        let limit = Library::shipped()
            .get(guidance)
            .expect("the linker hands out known ids only");
        Task::Track(TrackTask {
            form,
            shape,
            heading,
            z,
            ground,
            reach,
            farthest,
            envelope: limit.envelope(),
        })
    });
    let track = linker.group("track", track);
    let edge = facing.zip(guidance).map(|(facing, guidance)| {
        Task::Edge(EdgeTask {
            track,
            heat,
            stay,
            guidance,
            facing,
        })
    });
    let _ = linker.group("edge", edge);
}
