//! A position judged by guidance.

use std::sync::Arc;

use super::Kind;
use super::field::{Form, Need, Spec};
use super::position::Band;
use crate::graph::Node;
use crate::guidance::{self, Allowed, Finding, Judgement, Library, Limit, Overall, Reason};
use crate::notebook::Diagnostic;
use crate::notebook::datum::{Datum, Output, Slot, Span};
use crate::notebook::engine::{Linker, Slot as Own};
use crate::notebook::task::{Inputs, Task};
use crate::units::{Dimension, Quantity};

/// The fields of an assessment.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "position",
        form: Form::Cell(&[Kind::Position]),
        need: Need::Required,
        about: "the position that is judged",
    },
    Spec {
        name: "guidance",
        form: Form::GuidanceList,
        need: Need::Required,
        about: "the limits that judge it, by their ids",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];

/// The outputs of an assessment.
pub const OUTPUTS: &[&str] = &["rows", "finding", "allowed_time", "governed_by"];

/// One limit's answer, on the nominal exposure.
#[derive(Clone, Debug, PartialEq)]
pub struct Verdict {
    /// The limit's id.
    pub guidance: String,
    /// What was judged and what was found.
    pub judgement: Judgement,
    /// The stay in seconds, where one is stated.
    pub stay: Option<f64>,
    /// Whether a polished screen mirrors a source at people here, so that
    /// nothing is known but what is over.
    pub mirrored: bool,
}

impl Verdict {
    /// Returns the judgement of another exposure in place of this one's.
    #[must_use]
    pub fn judged(mut self, judgement: Judgement) -> Verdict {
        self.judgement = judgement;
        if self.mirrored && matches!(judgement.finding, Finding::Within | Finding::BelowOnset) {
            self.judgement.finding = Finding::NotAssessed(Reason::Mirrored);
            self.judgement.allowed = Allowed::CappedAt(0.0);
        }
        self
    }

    fn limit(&self) -> &'static Limit {
        limit(&self.guidance)
    }
}

/// Returns the limit of an id that was checked while linking.
fn limit(id: &str) -> &'static Limit {
    Library::shipped()
        .get(id)
        .expect("ids are checked while linking")
}

/// Judges a position by several limits.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct VerdictsTask {
    pub(in crate::notebook) exposure: Node,
    pub(in crate::notebook) stay: Option<Node>,
    pub(in crate::notebook) guidance: Vec<String>,
}

impl VerdictsTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.push(self.exposure);
        nodes.extend(self.stay);
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let exposure = inputs.exposure(self.exposure);
        let stay = inputs.maybe(self.stay);
        let mut verdicts = Vec::with_capacity(self.guidance.len());
        for id in &self.guidance {
            let limit = limit(id);
            let judged = exposure.judged(limit.envelope(), Band::judged(limit.metric.exposure()));
            let judgement = Library::shipped()
                .judge(id, judged, stay)
                .map_err(|error| {
                    Diagnostic::of_field("guidance", "not-judged", error.to_string())
                })?;
            let verdict = Verdict {
                guidance: id.clone(),
                judgement,
                stay,
                mirrored: !exposure.mirrored.is_empty(),
            };
            verdicts.push(verdict.judged(judgement));
        }
        Ok(Datum::Verdicts(Arc::new(verdicts)))
    }
}

/// Returns an allowed time as a span.
#[must_use]
pub const fn span(allowed: Allowed) -> Span {
    match allowed {
        Allowed::Seconds(seconds) => Span::Seconds(seconds),
        Allowed::CappedAt(seconds) => Span::Capped(seconds),
        Allowed::Unlimited => Span::Unlimited,
    }
}

/// Returns the verdicts drawn together.
#[must_use]
pub fn overall(verdicts: &[Verdict]) -> Overall {
    guidance::overall(
        verdicts
            .iter()
            .map(|verdict| (verdict.limit(), verdict.judgement.finding)),
    )
}

/// Returns the verdict that governs the stay, the first of equals: the limit
/// that is reached first; where none is reached, the guidance that falls silent
/// first; else any.
#[must_use]
pub fn governing(verdicts: &[Verdict]) -> Option<&Verdict> {
    let rank = |verdict: &Verdict| match span(verdict.judgement.allowed) {
        Span::Seconds(seconds) => (0, seconds),
        Span::Capped(seconds) => (1, seconds),
        Span::Unlimited => (2, f64::INFINITY),
    };
    verdicts.iter().reduce(|first, verdict| {
        if rank(verdict) < rank(first) {
            verdict
        } else {
            first
        }
    })
}

pub(in crate::notebook) fn visit(verdicts: &[Verdict], see: &mut dyn FnMut(Slot<'_>, Output<'_>)) {
    for (row, verdict) in verdicts.iter().enumerate() {
        let judgement = &verdict.judgement;
        see(
            Slot::column("guidance", row),
            Output::Word(&verdict.guidance),
        );
        let mut irradiance = |name, si: Option<f64>| {
            see(
                Slot::column(name, row),
                si.map_or(Output::Nothing, |si| {
                    Output::Quantity(Quantity::new(si, Dimension::IRRADIANCE))
                }),
            );
        };
        irradiance("exposure", Some(judgement.exposure));
        irradiance("limit", judgement.limit);
        see(
            Slot::column("ratio", row),
            judgement.ratio.map_or(Output::Nothing, |ratio| {
                Output::Quantity(Quantity::number(ratio))
            }),
        );
        see(
            Slot::column("allowed_time", row),
            Output::Time(span(judgement.allowed)),
        );
        see(
            Slot::column("finding", row),
            Output::Word(judgement.finding.word()),
        );
    }
    if let Some(verdict) = governing(verdicts) {
        see(
            Slot::named("allowed_time"),
            Output::Time(span(verdict.judgement.allowed)),
        );
        see(Slot::named("governed_by"), Output::Word(&verdict.guidance));
    }
    let overall = overall(verdicts);
    see(Slot::named("finding"), Output::Word(overall.word()));
}

pub(in crate::notebook) fn link(linker: &mut Linker<'_>) {
    let position = linker.target("position");
    let guidance = linker.guidance("guidance");
    let exposure = position.map(|position| linker.foreign(position, Own::Group("exposure")));
    let stay = position.and_then(|position| linker.foreign_entry(position, "stay"));
    let verdicts = exposure.zip(guidance).map(|(exposure, guidance)| {
        Task::Verdicts(VerdictsTask {
            exposure,
            stay,
            guidance,
        })
    });
    let _ = linker.group("verdicts", verdicts);
}
