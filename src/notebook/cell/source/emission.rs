//! What a source emits: of its hot surface, and of each of its parts.

use std::sync::Arc;

use super::{Kind, POOL_NEAR_INFRARED};
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::Datum;
use crate::notebook::engine::Linker;
use crate::notebook::task::Inputs;
use crate::physics;
use crate::physics::spectrum::Spectrum;
use crate::physics::surface::Emission;

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

/// How strongly a surface emits, with the nodes of what was typed.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) enum Surface {
    /// By a number, and another one below 3000 nm where it was given.
    Grey {
        emissivity: Node,
        near_infrared: Option<Node>,
    },
    /// By a table of wavelengths and emissivities.
    Spectral(Vec<[Node; 2]>),
}

/// Works out what a source emits.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct EmissionTask {
    pub(super) kind: Kind,
    pub(super) temperature: Node,
    pub(super) surface: Surface,
}

impl EmissionTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.push(self.temperature);
        match &self.surface {
            Surface::Grey {
                emissivity,
                near_infrared,
            } => {
                nodes.push(*emissivity);
                nodes.extend(near_infrared);
            }
            Surface::Spectral(rows) => nodes.extend(rows.iter().flatten()),
        }
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let temperature = inputs.si(self.temperature);
        let face = match &self.surface {
            Surface::Grey {
                emissivity,
                near_infrared,
            } => {
                let emissivity = inputs.si(*emissivity);
                let near_infrared = inputs.maybe(*near_infrared).unwrap_or(match self.kind {
                    Kind::Pool => (POOL_NEAR_INFRARED * emissivity).min(1.0),
                    Kind::Opening | Kind::Body | Kind::Screen => emissivity,
                });
                Emission::grey(temperature, emissivity, near_infrared)
            }
            Surface::Spectral(rows) => {
                let rows: Vec<[f64; 2]> = rows
                    .iter()
                    .map(|row| row.map(|node| inputs.si(node)))
                    .collect();
                let spectrum = Spectrum::new(&rows).map_err(of_spectrum)?;
                Emission::spectral(temperature, &spectrum)
            }
        };
        face.map(|face| Datum::Emission(Arc::new(Emitted::simple(face))))
            .map_err(|error| {
                Diagnostic::of_field("temperature", "no-such-emission", error.to_string())
                    .with_hint("check the temperature and the emissivities")
            })
    }
}

/// Returns the fault of a table at its place.
fn of_spectrum(error: physics::Error) -> Diagnostic {
    let fault = Diagnostic::of_field("spectrum", "no-such-table", error.to_string())
        .with_hint("give the wavelengths in growing order, each once");
    match error {
        physics::Error::TableOrder { row, .. } => {
            fault.in_item(u16::try_from(row.saturating_sub(1)).ok().map(|row| (row, 0)))
        }
        _ => fault,
    }
}

/// Reads how strongly the surface emits, or says what is missing.
pub(super) fn surface_of(linker: &mut Linker<'_>) -> Option<Surface> {
    if linker.has("spectrum") {
        linker.refuse(
            &["emissivity", "near_ir_emissivity"],
            "does not go with `spectrum`, which says it for every wavelength",
        );
        return Some(Surface::Spectral(linker.pairs("spectrum")?));
    }
    let emissivity = linker.need("emissivity", "a source without a `spectrum`");
    let near_infrared = linker.entry("near_ir_emissivity");
    Some(Surface::Grey {
        emissivity: emissivity?,
        near_infrared,
    })
}
