//! Heat conduction into layers of tissue under an absorbed surface flux.
//!
//! One dimension, properties constant in each layer, the deep end held at its
//! temperature, no loss at the surface: the hottest assumption. Solved by
//! spectral elements in depth and exactly in time, mode by mode.

mod history;
mod modes;

use std::sync::OnceLock;

use super::{Error, irradiance, time, within};
pub(super) use history::Course;
pub use history::{Budget, History};

use history::Span;
use modes::Modes;

/// One layer of tissue.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Layer {
    /// Thickness, m.
    pub thickness: f64,
    /// Thermal conductivity, W/(m·K).
    pub conductivity: f64,
    /// Heat capacity by volume, ρ·c, J/(m³·K).
    pub heat_capacity: f64,
    /// Heat that blood at the temperature of the base carries off, W/(m³·K);
    /// zero in the published model of burns.
    pub perfusion: f64,
}

/// A span of absorbed surface flux that runs in a straight line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pulse {
    /// How long it lasts, s.
    pub duration: f64,
    /// Absorbed flux at its beginning, W/m².
    pub from: f64,
    /// Absorbed flux at its end, W/m².
    pub to: f64,
}

impl Pulse {
    /// A pulse of steady flux: `duration` in seconds, `absorbed` in W/m².
    #[must_use]
    pub const fn steady(duration: f64, absorbed: f64) -> Pulse {
        Pulse {
            duration,
            from: absorbed,
            to: absorbed,
        }
    }
}

/// The most pulses that one history takes.
pub const MOST_PULSES: usize = 20_000;

/// The shortest pulse that is not passed over as none, s.
pub const SHORTEST_PULSE: f64 = 1e-9;

/// The most layers that a tissue has.
pub const MOST_LAYERS: usize = 8;

/// The layers of the published model of skin burns.
///
/// # Source
///
/// ASTM F1930 and ISO 13506-2, skin model: epidermis, dermis, subcutaneous
/// tissue; from memory, confirmed as a set by the published check of the burn
/// integral in `tests/published/burns.rs`.
pub const STANDARD: [Layer; 3] = [
    Layer {
        thickness: 75e-6,
        conductivity: 0.6280,
        heat_capacity: 4.40e6,
        perfusion: 0.0,
    },
    Layer {
        thickness: 1125e-6,
        conductivity: 0.5820,
        heat_capacity: 4.186e6,
        perfusion: 0.0,
    },
    Layer {
        thickness: 3885e-6,
        conductivity: 0.2930,
        heat_capacity: 2.60e6,
        perfusion: 0.0,
    },
];

/// Temperature of the surface in the published model before exposure, K: 32.5 °C.
pub const STANDARD_SURFACE: f64 = 305.65;

/// Temperature of the base in the published model, K: 33.5 °C.
pub const STANDARD_BASE: f64 = 306.65;

/// Polynomial degree of a layer: finest near the surface, where time is short.
const DEGREES: [usize; MOST_LAYERS] = [14, 18, 12, 12, 12, 12, 12, 12];

/// Layered tissue, ready to be heated; immutable.
pub struct Tissue {
    layers: Vec<Layer>,
    depth: f64,
    surface: f64,
    base: f64,
    modes: Modes,
    rest: Vec<f64>,
}

impl std::fmt::Debug for Tissue {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Tissue")
            .field("layers", &self.layers)
            .field("surface", &self.surface)
            .field("base", &self.base)
            .finish_non_exhaustive()
    }
}

impl Tissue {
    /// Returns tissue of the given layers, the first one at the surface.
    ///
    /// `surface` and `base` are the temperatures at both ends before exposure,
    /// K; between them the profile is a straight line in depth.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if there is no layer or over 8, a thickness is
    /// outside 1 µm to 0.1 m, a conductivity outside 0.01 to 100 W/(m·K), a
    /// heat capacity outside 10⁵ to 10⁷ J/(m³·K), a perfusion negative or
    /// above 10⁶ W/(m³·K), or a temperature outside 273.15 K to 316.15 K
    /// (43 °C, below where burning begins).
    pub fn new(layers: &[Layer], surface: f64, base: f64) -> Result<Tissue, Error> {
        Tissue::of_degrees(layers, surface, base, &DEGREES)
    }

    fn of_degrees(
        layers: &[Layer],
        surface: f64,
        base: f64,
        degrees: &[usize],
    ) -> Result<Tissue, Error> {
        let _ = within(
            "number of layers",
            layers.len() as f64,
            1.0,
            MOST_LAYERS as f64,
            "from 1 to 8",
        )?;
        for layer in layers {
            let _ = within(
                "thickness of a layer",
                layer.thickness,
                1e-6,
                0.1,
                "from 1 µm to 0.1 m",
            )?;
            let _ = within(
                "conductivity of a layer",
                layer.conductivity,
                0.01,
                100.0,
                "from 0.01 to 100 W/(m·K)",
            )?;
            let _ = within(
                "heat capacity of a layer",
                layer.heat_capacity,
                1e5,
                1e7,
                "from 10⁵ to 10⁷ J/(m³·K)",
            )?;
            let _ = within(
                "perfusion of a layer",
                layer.perfusion,
                0.0,
                1e6,
                "from 0 to 10⁶ W/(m³·K)",
            )?;
        }
        for (parameter, value) in [
            ("temperature of the skin before exposure", surface),
            ("temperature of the base", base),
        ] {
            let _ = within(
                parameter,
                value,
                273.15,
                316.15,
                "from 273.15 K to 316.15 K",
            )?;
        }
        let depth: f64 = layers.iter().map(|layer| layer.thickness).sum();
        let modes = Modes::new(layers, &degrees[..layers.len()]);
        let rest = modes.amplitudes(|at| (surface - base) * (1.0 - at / depth));
        Ok(Tissue {
            layers: layers.to_vec(),
            depth,
            surface,
            base,
            modes,
            rest,
        })
    }

    /// Returns the tissue of the published model of skin burns.
    ///
    /// # Source
    ///
    /// [`STANDARD`], [`STANDARD_SURFACE`], [`STANDARD_BASE`].
    #[must_use]
    pub fn standard() -> &'static Tissue {
        static TISSUE: OnceLock<Tissue> = OnceLock::new();
        TISSUE.get_or_init(|| {
            Tissue::new(&STANDARD, STANDARD_SURFACE, STANDARD_BASE)
                .expect("the published layers lie in range")
        })
    }

    /// Returns how deep the tissue goes, m.
    #[must_use]
    pub fn depth(&self) -> f64 {
        self.depth
    }

    /// Returns what pulses of absorbed flux, one after the other, do to the
    /// tissue; after the last one there is no flux.
    ///
    /// # Accuracy
    ///
    /// Exact in time for the elements; in depth, for the published layers and
    /// a step of flux, temperatures differ from those of elements of 8 degrees
    /// more by less than 5e-6 of the largest rise from 10 ms after the step,
    /// and less than 1e-3 at the surface from 0.1 ms (tests in this file).
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if there are over 20 000 pulses, or a flux or a
    /// duration is negative, above 10⁹ or not finite.
    ///
    /// # Source
    ///
    /// Fourier's law with Pennes' term for blood (Carslaw and Jaeger,
    /// *Conduction of Heat in Solids*; Pennes 1948). Checked against the
    /// semi-infinite solid in `tests/laws/skin_laws.rs` and against a published
    /// table in `tests/published/burns.rs`.
    pub fn heated(&self, pulses: &[Pulse]) -> Result<History<'_>, Error> {
        let _ = within(
            "number of pulses",
            pulses.len() as f64,
            0.0,
            MOST_PULSES as f64,
            "at most 20 000",
        )?;
        let count = self.modes.count();
        let mut spans = Vec::with_capacity(pulses.len() + 1);
        let mut amplitudes = Vec::with_capacity((pulses.len() + 1) * count);
        amplitudes.extend_from_slice(&self.rest);
        let mut start = 0.0;
        for pulse in pulses {
            let span = Span {
                start,
                duration: time("duration of a pulse", pulse.duration)?,
                flux: irradiance("absorbed flux", pulse.from)?,
                slope: (irradiance("absorbed flux", pulse.to)? - pulse.from)
                    / pulse.duration.max(SHORTEST_PULSE),
            };
            if pulse.duration < SHORTEST_PULSE {
                continue;
            }
            let last = amplitudes.len() - count;
            for k in 0..count {
                let (free, still, drift) = self.solution(&span, k, amplitudes[last + k]);
                let decay = (-self.modes.rates[k] * span.duration).exp();
                amplitudes.push(free * decay + still + drift * span.duration);
            }
            start = time("time of all pulses", start + span.duration)?;
            spans.push(span);
        }
        spans.push(Span {
            start,
            duration: f64::INFINITY,
            flux: 0.0,
            slope: 0.0,
        });
        Ok(History::new(self, spans, amplitudes))
    }

    /// An amplitude in a span is free·e^(−rate·τ) + still + drift·τ.
    fn solution(&self, span: &Span, k: usize, at_start: f64) -> (f64, f64, f64) {
        let (rate, gain) = (self.modes.rates[k], self.modes.gains[k]);
        let drift = gain * span.slope / rate;
        let still = (gain * span.flux - drift) / rate;
        (at_start - still, still, drift)
    }
}

#[cfg(test)]
mod tests;
