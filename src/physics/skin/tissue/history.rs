//! How tissue warms and cools under given pulses, exactly in time.

use super::{Error, Tissue, time, within};

/// A pulse with its place in time.
#[derive(Clone, Copy, Debug)]
pub struct Span {
    pub start: f64,
    pub duration: f64,
    /// Absorbed flux at its beginning, W/m², and how it rises, W/(m²·s).
    pub flux: f64,
    pub slope: f64,
}

/// How tissue warms and cools under given pulses.
pub struct History<'a> {
    tissue: &'a Tissue,
    spans: Vec<Span>,
    amplitudes: Vec<f64>,
}

impl std::fmt::Debug for History<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("History")
            .field("tissue", self.tissue)
            .field("spans", &self.spans.len())
            .finish_non_exhaustive()
    }
}

/// Where the heat went, J/m², since the exposure began.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Budget {
    /// Absorbed at the surface.
    pub absorbed: f64,
    /// Stored in the tissue, above what was there before.
    pub stored: f64,
    /// Passed on into the base and the blood.
    pub passed_on: f64,
}

impl<'a> History<'a> {
    pub(super) fn new(tissue: &'a Tissue, spans: Vec<Span>, amplitudes: Vec<f64>) -> Self {
        History {
            tissue,
            spans,
            amplitudes,
        }
    }

    /// Returns the tissue.
    #[must_use]
    pub fn tissue(&self) -> &'a Tissue {
        self.tissue
    }

    /// Returns when the last pulse ends, s.
    #[must_use]
    pub fn end(&self) -> f64 {
        self.spans[self.spans.len() - 1].start
    }

    /// Returns the temperature at a depth and a time, K.
    ///
    /// `depth` in metres below the surface, `time` in seconds since the first
    /// pulse began.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the depth lies outside the tissue, or the time
    /// is negative, above 10⁹ s or not finite.
    pub fn temperature(&self, depth: f64, at: f64) -> Result<f64, Error> {
        let probe = self.probe(depth)?;
        let at = time("time", at)?;
        let index = self.span_at(at);
        Ok(probe.course(index).at(at - self.spans[index].start))
    }

    /// Returns where the absorbed heat is at a time.
    ///
    /// # Accuracy
    ///
    /// The three balance to 1e-9 of the heat absorbed (test in this file).
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the time is negative, above 10⁹ s or not finite.
    pub fn budget(&self, at: f64) -> Result<Budget, Error> {
        let at = time("time", at)?;
        let tissue = self.tissue;
        let (modes, count) = (&tissue.modes, tissue.modes.count());
        // Heat of each mode. The flux enters through the node at the surface, so
        // that its heat is taken up whole; what each mode loses leaves the tissue.
        let heats: Vec<f64> = (0..count)
            .map(|k| {
                (0..count)
                    .map(|i| modes.masses[i] * modes.shapes[i * count + k])
                    .sum()
            })
            .collect();
        let (mut absorbed, mut stored, mut passed_on) = (0.0, 0.0, 0.0);
        let reached = self.span_at(at);
        for (index, span) in self.spans.iter().enumerate().take(reached + 1) {
            let tau = if index == reached {
                at - span.start
            } else {
                span.duration
            };
            let taken = span.flux * tau + span.slope * tau * tau / 2.0;
            absorbed += taken;
            for (k, heat) in heats.iter().enumerate() {
                let rate = modes.rates[k];
                let before = self.amplitudes[index * count + k];
                let (free, still, drift) = tissue.solution(span, k, before);
                let lived =
                    free * -(-rate * tau).exp_m1() / rate + (still + drift * tau / 2.0) * tau;
                passed_on += heat * rate * lived;
                if index == reached {
                    let now = free * (-rate * tau).exp() + still + drift * tau;
                    stored += heat * (now - tissue.rest[k]);
                }
            }
        }
        Ok(Budget {
            absorbed,
            stored,
            passed_on,
        })
    }

    /// The span that holds a time.
    fn span_at(&self, at: f64) -> usize {
        self.spans
            .partition_point(|span| span.start <= at)
            .saturating_sub(1)
    }

    /// How many spans there are, the last one without flux and without end.
    pub(in crate::physics::skin) fn spans(&self) -> usize {
        self.spans.len()
    }

    /// How long a span lasts, s.
    pub(in crate::physics::skin) fn span_duration(&self, index: usize) -> f64 {
        self.spans[index].duration
    }

    /// What is seen of the modes at a depth.
    pub(in crate::physics::skin) fn probe(&self, depth: f64) -> Result<Probe<'_>, Error> {
        let depth = within(
            "depth",
            depth,
            0.0,
            self.tissue.depth,
            "between the surface of the skin and the base of the tissue",
        )?;
        Ok(Probe {
            history: self,
            values: self.tissue.modes.at(&self.tissue.layers, depth),
        })
    }
}

/// The modes as seen at one depth.
pub struct Probe<'a> {
    history: &'a History<'a>,
    values: Vec<f64>,
}

impl Probe<'_> {
    /// The course of the temperature in one span.
    pub fn course(&self, index: usize) -> Course {
        let tissue = self.history.tissue;
        let count = tissue.modes.count();
        let span = &self.history.spans[index];
        let (mut still, mut drift) = (tissue.base, 0.0);
        let mut fading = Vec::with_capacity(count);
        for (k, value) in self.values.iter().enumerate() {
            let before = self.history.amplitudes[index * count + k];
            let (free, steady, slope) = tissue.solution(span, k, before);
            still += value * steady;
            drift += value * slope;
            fading.push((value * free, tissue.modes.rates[k]));
        }
        Course {
            still,
            drift,
            fading,
        }
    }
}

/// A temperature in one span: still + drift·τ + Σ weight·e^(−rate·τ).
pub struct Course {
    still: f64,
    drift: f64,
    fading: Vec<(f64, f64)>,
}

impl Course {
    /// The temperature, K, at a time into the span, s.
    pub fn at(&self, tau: f64) -> f64 {
        let fading: f64 = self
            .fading
            .iter()
            .map(|(weight, rate)| {
                let exponent = rate * tau;
                if exponent > 45.0 {
                    0.0
                } else {
                    weight * (-exponent).exp()
                }
            })
            .sum();
        self.still + self.drift * tau + fading
    }
}
