//! What a source emits: of its hot surface, and of each of its parts.

use std::sync::Arc;

use super::shape::Behind;
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
    /// Its parts, where there may be more than one.
    pub(super) parts: Parts,
}

/// What may emit beside the hot surface itself.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Parts {
    /// Nothing.
    Face,
    /// The tunnel through the wall, whose zones are in the shape.
    Tunnel { shape: Node },
    /// The inner wall of a vessel above the melt.
    Vessel {
        shape: Node,
        temperature: Option<Node>,
        emissivity: Node,
    },
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
        match self.parts {
            Parts::Face => {}
            Parts::Tunnel { shape } => nodes.push(shape),
            Parts::Vessel {
                shape,
                temperature,
                emissivity,
            } => {
                nodes.extend([shape, emissivity]);
                nodes.extend(temperature);
            }
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
        let fault = |error: physics::Error| {
            Diagnostic::of_field("temperature", "no-such-emission", error.to_string())
                .with_hint("check the temperature and the emissivities")
        };
        let face = face.map_err(fault)?;
        let parts = match self.parts {
            Parts::Face => vec![face],
            Parts::Tunnel { shape } => match &inputs.shape(shape).tunnel {
                None => vec![face],
                Some(tunnel) => tunnel.emissions(&face).map_err(fault)?,
            },
            Parts::Vessel {
                shape,
                temperature: own,
                emissivity,
            } => {
                let mut parts = vec![face];
                if inputs.shape(shape).parts.len() > 1 {
                    let temperature = inputs.maybe(own).unwrap_or(temperature);
                    let emissivity = inputs.si(emissivity);
                    let wall = Emission::grey(temperature, emissivity, emissivity);
                    parts.push(wall.map_err(|error| {
                        Diagnostic::of_field(
                            "wall_temperature",
                            "no-such-emission",
                            error.to_string(),
                        )
                        .with_hint("check the wall's temperature and emissivity")
                    })?);
                }
                parts
            }
        };
        Ok(Datum::Emission(Arc::new(Emitted { face, parts })))
    }
}

/// Returns the fault of a table at its place.
fn of_spectrum(error: physics::Error) -> Diagnostic {
    let fault = Diagnostic::of_field("spectrum", "no-such-table", error.to_string())
        .with_hint("give the wavelengths in growing order, each once");
    match error {
        physics::Error::TableOrder { row, .. } => fault.in_item(
            u16::try_from(row.saturating_sub(1))
                .ok()
                .map(|row| (row, 0)),
        ),
        _ => fault,
    }
}

/// Reads what may emit beside the hot surface.
pub(super) fn parts_of(linker: &mut Linker<'_>, behind: Behind, shape: Node) -> Parts {
    match behind {
        Behind::Nothing => Parts::Face,
        Behind::Wall { .. } => Parts::Tunnel { shape },
        Behind::Vessel { .. } => Parts::Vessel {
            shape,
            temperature: linker.entry("wall_temperature"),
            emissivity: linker.always("wall_emissivity"),
        },
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
