//! What is met at one distance of a curve, and how long guidance allows there.

use crate::app::shared::{Look, Shared};
use crate::drawing::curve::Curve;
use crate::drawing::rail::{Line, Probe, Reading};
use crate::guidance::{Allowed, Library};
use crate::notebook::Kind;
use crate::notebook::cell::assessment;
use crate::notebook::cell::position::{Band, Orientation};
use crate::notebook::datum::{Datum, Span};
use crate::notebook::engine::Slot;
use crate::notebook::results::{CellResult, Shown};
use crate::notebook::wording;

/// What is met at one distance, at the point itself: reach is not counted.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Readout {
    /// From the centre of the source, m.
    pub distance: f64,
    /// From its edge, m.
    pub clear: f64,
    /// The nominal value of the quantity that is drawn, W/m².
    pub drawn: f64,
    near_infrared: (f64, Option<f64>),
    total: (f64, Option<f64>),
    governing: Option<(String, Span)>,
    fresh: bool,
}

impl Readout {
    /// Reads a curve at a distance; `None` where a source is touched or in
    /// error.
    pub(super) fn of(
        shared: Shared<'_>,
        cell: &CellResult,
        curve: &Curve,
        distance: f64,
    ) -> Option<Readout> {
        let line = Line::of(shared.engine, cell.id)?.at_height_of(shared.engine, cell.id);
        let orientation = orientation(shared, cell);
        let probe = Probe::new(shared.engine, &line, orientation)?;
        let reading = probe.read(distance)?;
        let bound = |column: &str| above_nominal(cell, column, distance);
        let factors = (bound("near_ir_irradiance"), bound("irradiance"));
        let upper = |nominal: f64, factor: Option<f64>| factor.map(|factor| nominal * factor);
        let readout = Readout {
            distance,
            clear: distance - line.edge,
            drawn: reading.band(curve.band),
            near_infrared: (
                reading.near_infrared,
                upper(reading.near_infrared, factors.0),
            ),
            total: (reading.total, upper(reading.total, factors.1)),
            governing: governing(shared, &line, reading, factors),
            fresh: shared.fresh,
        };
        Some(readout)
    }

    /// Where it is.
    pub(super) fn place(&self, look: Look) -> String {
        let measure = look.measure;
        if (self.distance - self.clear).abs() < 1e-9 {
            return format!("{} from the face", measure.standing(self.clear));
        }
        format!(
            "{} clear, {} from the centre",
            measure.standing(self.clear),
            measure.standing(self.distance)
        )
    }

    /// What is met there: the bound first, the nominal beside it.
    pub(super) fn met(&self, look: Look) -> String {
        let told = |(nominal, upper): (f64, Option<f64>)| match upper {
            Some(upper) => format!(
                "at most {} (nominal {})",
                look.measure.safe_irradiance(upper),
                look.measure.safe_irradiance(nominal)
            ),
            None => look.measure.safe_irradiance(nominal),
        };
        format!(
            "near infrared {} · in all {}",
            told(self.near_infrared),
            told(self.total)
        )
    }

    /// How long the governing guidance allows there.
    pub(super) fn allowed(&self) -> String {
        if !self.fresh {
            return "bounds and allowed time are being worked out".to_owned();
        }
        match &self.governing {
            None => "no guidance judges on this line: not assessed".to_owned(),
            Some((id, Span::Seconds(seconds))) if *seconds < 10.0 => {
                format!(
                    "{id}: no planned stay (reached after {} s)",
                    seconds.floor()
                )
            }
            Some((id, Span::Unlimited)) => format!("{id}: not limited by this"),
            Some((id, span)) => {
                format!("{id} allows {}, without reach", wording::span(*span))
            }
        }
    }
}

/// Which way the curve's receiver faces.
fn orientation(shared: Shared<'_>, cell: &CellResult) -> Orientation {
    let engine = shared.engine;
    let faces = engine.cell(cell.id).and_then(|cell| cell.text("faces"));
    let Some(faces) = faces.filter(|text| text.trim() != "strongest") else {
        return Orientation::Strongest;
    };
    if let Some(id) = engine.find(faces.trim())
        && let Some(Datum::Shape(shape)) = engine.value_of(id, Slot::Group("shape"))
    {
        return Orientation::Towards(shape.centre);
    }
    engine
        .value_of(cell.id, Slot::Field("faces"))
        .and_then(Datum::as_quantity)
        .map_or(Orientation::Strongest, |heading| {
            Orientation::Normal(crate::notebook::cell::source::direction(heading.si))
        })
}

/// Returns how many times the bound exceeds the nominal value around a
/// distance: the greater of the two rows beside it. `None` without bounds.
fn above_nominal(cell: &CellResult, column: &str, distance: f64) -> Option<f64> {
    let mut before: Option<f64> = None;
    let mut at: Vec<f64> = vec![f64::NAN; cell.rows()];
    for figure in &cell.figures {
        if figure.name == "distance"
            && let (Some(row), Some(quantity)) = (figure.row, figure.shown.quantity())
        {
            at[row] = quantity.si;
        }
    }
    for figure in &cell.figures {
        let (Some(row), true) = (figure.row, figure.name == column) else {
            continue;
        };
        let Shown::Quantity {
            quantity,
            high: Some(high),
            ..
        } = &figure.shown
        else {
            continue;
        };
        let factor = if quantity.si > 0.0 {
            high / quantity.si
        } else {
            1.0
        };
        if at[row] >= distance {
            return Some(before.map_or(factor, |before| before.max(factor)));
        }
        before = Some(factor);
    }
    before
}

/// Returns the guidance that allows the shortest time, of all that judges: on
/// zones of this line, and by assessments.
fn governing(
    shared: Shared<'_>,
    line: &Line,
    reading: Reading,
    factors: (Option<f64>, Option<f64>),
) -> Option<(String, Span)> {
    let engine = shared.engine;
    let mut ids: Vec<&str> = Vec::new();
    for (place, cell) in engine.notebook().cells.iter().enumerate() {
        let judges = match cell.kind {
            Kind::Assessment => true,
            Kind::Zone => engine.id(place).is_some_and(|id| line.carries(engine, id)),
            _ => false,
        };
        if judges {
            ids.extend(cell.texts("guidance"));
        }
    }
    ids.sort_unstable();
    ids.dedup();
    let (near_infrared, total) = (factors.0.unwrap_or(1.0), factors.1.unwrap_or(1.0));
    let rank = |span: Span| match span {
        Span::Seconds(seconds) => (0, seconds),
        Span::Capped(seconds) => (1, seconds),
        Span::Unlimited => (2, f64::INFINITY),
    };
    ids.into_iter()
        .filter_map(|id| {
            let band = Band::of_guidance(id)?;
            let factor = match band {
                Band::NearInfrared => near_infrared,
                Band::Total => total,
                // The skin band lies between the two.
                Band::Skin => near_infrared.max(total),
            };
            let allowed: Allowed = Library::shipped()
                .allowed(id, reading.band(band) * factor)
                .ok()?;
            Some((id.to_owned(), assessment::span(allowed)))
        })
        .reduce(|first, other| {
            if rank(other.1) < rank(first.1) {
                other
            } else {
                first
            }
        })
}
