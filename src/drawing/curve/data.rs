//! What a notebook's curve cell shows: its rows, the rules that judge on them,
//! and the positions that stand on its line.

use super::comparison::value_at;
use super::{Crossing, Curve, InverseSquare, LimitLine, Marker, drawable};
use crate::drawing::mark::Shape;
use crate::drawing::measure::Measure;
use crate::drawing::rail::{Line, Probe};
use crate::drawing::screen::{Screen, Shadow};
use crate::notebook::cell::position::{Band, Orientation};
use crate::notebook::cell::zone::Extent;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::datum::{CellId, Datum};
use crate::notebook::engine::{Engine, Slot};
use crate::notebook::results::{CellResult, Results, Shown, sights, worst_word};
use crate::units::format::{self, Rounding};

impl Curve {
    /// Returns the plot of a curve cell that was worked out, told in a system of
    /// units.
    ///
    /// It shows the near infrared irradiance, or the irradiance over all
    /// wavelengths where only that is judged by a limit on this line.
    #[must_use]
    pub fn of(engine: &Engine, results: &Results, cell: &CellResult, measure: Measure) -> Curve {
        let limits = |band| limits(engine, results, cell, band, measure);
        let (band, limits) = match limits(Band::NearInfrared) {
            none if none.is_empty() => match limits(Band::Total) {
                none if none.is_empty() => (Band::NearInfrared, none),
                total => (Band::Total, total),
            },
            near_infrared => (Band::NearInfrared, near_infrared),
        };
        let column = match band {
            Band::NearInfrared => "near_ir_irradiance",
            Band::Total | Band::Skin => "irradiance",
        };
        let typed = engine.cell(cell.id);
        let from = typed.and_then(|cell| cell.text("from")).unwrap_or_default();
        let rows: Vec<(f64, f64)> = series(cell, column, |shown| {
            shown.quantity().map(|quantity| quantity.si)
        });
        let bounded = cell
            .in_row(0, column)
            .is_some_and(|shown| matches!(shown, Shown::Quantity { high: Some(_), .. }));
        let upper = bounded.then(|| series(cell, column, Shown::upper));
        let height = engine
            .value_of(cell.id, Slot::Field("z"))
            .and_then(Datum::as_quantity)
            .map_or_else(String::new, |z| format!(", at {}", measure.height(z.si)));
        let positions = positions(engine, results, cell, column);
        let (length, irradiance) = (measure.length(), measure.irradiance());
        let (screens, shadows) = cover(engine, cell.id, &rows);
        Curve {
            band,
            title: format!("{}: from {from}{height}", cell.name),
            x_label: format!(
                "horizontal distance from the centre of {from} ({})",
                length.symbol()
            ),
            y_label: format!(
                "{} ({})",
                match band {
                    Band::NearInfrared => "near infrared irradiance, 780–3000 nm",
                    Band::Total | Band::Skin => "irradiance, all wavelengths",
                },
                irradiance.symbol()
            ),
            x_unit: length.factor(),
            y_unit: irradiance.factor(),
            inverse_square: inverse_square(&rows, &positions, measure),
            limits,
            positions,
            screens,
            shadows,
            rows,
            upper,
            number: |value| format::significant(value, 1, Rounding::Nearest),
        }
    }
}

/// Returns what stands across the curve's line between its ends.
fn cover(engine: &Engine, id: CellId, rows: &[(f64, f64)]) -> (Vec<Screen>, Vec<Shadow>) {
    let ends = rows.first().zip(rows.last());
    let found = ends.and_then(|(first, last)| {
        let line = Line::of(engine, id)?.at_height_of(engine, id);
        let probe = Probe::new(engine, &line, Orientation::Strongest)?;
        Some(probe.cover(first.0, last.0))
    });
    found.unwrap_or_default()
}

/// Returns the inverse square that goes on from the nearest position on the
/// curve, as a sheet does that takes one figure there; without a position, from
/// the middle of the curve.
fn inverse_square(
    rows: &[(f64, f64)],
    positions: &[Marker],
    measure: Measure,
) -> Option<InverseSquare> {
    let nearest = positions
        .iter()
        .filter_map(|marker| Some((marker, value_at(rows, marker.distance)?)))
        .min_by(|a, b| a.0.distance.total_cmp(&b.0.distance));
    if let Some((marker, value)) = nearest {
        return Some(InverseSquare {
            distance: marker.distance,
            value,
            from: format!("{}, {}", marker.cell, measure.standing(marker.distance)),
        });
    }
    let (distance, value) = rows.get(rows.len() / 2).copied().filter(drawable)?;
    Some(InverseSquare {
        distance,
        value,
        from: measure.standing(distance),
    })
}

/// Returns a column against the distances, in one pass: a table may have
/// thousands of rows.
fn series(
    cell: &CellResult,
    column: &str,
    value: impl Fn(&Shown) -> Option<f64>,
) -> Vec<(f64, f64)> {
    let mut rows = vec![(None, None); cell.rows()];
    for figure in &cell.figures {
        let Some(row) = figure.row else { continue };
        if figure.name == "distance" {
            rows[row].0 = figure.shown.quantity().map(|distance| distance.si);
        } else if figure.name == column {
            rows[row].1 = value(&figure.shown);
        }
    }
    rows.into_iter()
        .filter_map(|(distance, value)| distance.zip(value))
        .collect()
}

/// Returns the rules that judge on this quantity: those of the zones that run
/// along the curve's own line, with their crossings. A crossing read off the
/// curve would leave the reach out: a person there could be judged over.
fn limits(
    engine: &Engine,
    results: &Results,
    curve: &CellResult,
    quantity: Band,
    measure: Measure,
) -> Vec<LimitLine> {
    let Some(line) = engine.cell(curve.id) else {
        return Vec::new();
    };
    let mut limits: Vec<LimitLine> = Vec::new();
    for cell in &results.cells {
        let Some(typed) = engine.cell(cell.id) else {
            continue;
        };
        if cell.kind != Kind::Zone || !same_line(engine, line, typed) {
            continue;
        }
        let id = typed.text("guidance").unwrap_or_default();
        let value = cell
            .shown("limit")
            .and_then(Shown::quantity)
            .map(|limit| limit.si);
        let (Some(value), true) = (value, judges(id, quantity)) else {
            continue;
        };
        let (nominal, safe) = match cell.shown("distance") {
            Some(Shown::Extent { extent, high, .. }) => (Some(*extent), *high),
            _ => (None, None),
        };
        limits.push(LimitLine {
            label: format!("{id}, {}", typed.text("stay").unwrap_or_default()),
            value,
            crossing: nominal.and_then(|extent| crossing(extent, measure)),
            upper_crossing: safe.and_then(|extent| crossing(extent, measure)),
        });
    }
    limits
}

fn judges(id: &str, quantity: Band) -> bool {
    Band::of_guidance(id) == Some(quantity)
}

fn crossing(extent: Extent, measure: Measure) -> Option<Crossing> {
    match extent {
        Extent::At(distance) => Some(Crossing {
            distance,
            text: measure.safe_distance(distance),
        }),
        Extent::MetEverywhere | Extent::NotMetWithin(_) | Extent::NotAssessed => None,
    }
}

/// Returns whether two cells name the same source, heading and height.
fn same_line(engine: &Engine, a: &Cell, b: &Cell) -> bool {
    let value = |cell: &Cell, field: &'static str| {
        let id = engine.find(&cell.name)?;
        Some(
            engine
                .value_of(id, Slot::Field(field))?
                .as_quantity()?
                .si
                .to_bits(),
        )
    };
    a.text("from") == b.text("from")
        && value(a, "heading") == value(b, "heading")
        && value(a, "z") == value(b, "z")
}

/// Returns the positions that stand on the curve's own line.
fn positions(engine: &Engine, results: &Results, curve: &CellResult, column: &str) -> Vec<Marker> {
    let Some(Datum::Line(line)) = engine.value_of(curve.id, Slot::Group("line")) else {
        return Vec::new();
    };
    let (Some(first), Some(last)) = (line.views.points.first(), line.views.points.last()) else {
        return Vec::new();
    };
    let Some(ahead) = (*last - *first).try_normalize() else {
        return Vec::new();
    };
    let mut markers = Vec::new();
    let judged = results.assessments(engine);
    for cell in &results.cells {
        let Some(sights) = sights(engine, cell.id) else {
            continue;
        };
        let along = (sights.eye - *first).dot(ahead);
        let aside = sights.eye - (*first + ahead * along);
        let distance = line.distances.first().copied().unwrap_or(0.0) + along;
        let in_range =
            distance > 0.0 && line.distances.last().is_some_and(|last| distance <= *last);
        if aside.length() > 0.05 || !in_range {
            continue;
        }
        let Some(value) = cell.shown(column).and_then(Shown::quantity) else {
            continue;
        };
        let judging = judged.get(cell.name.as_str()).into_iter().flatten();
        let word = worst_word(judging.copied());
        markers.push(Marker {
            cell: cell.name.clone(),
            label: format!("{} · {}", cell.name, word.unwrap_or("not assessed")),
            distance,
            value: value.si,
            shape: word.map_or(Shape::NotAssessed, Shape::of_word),
        });
    }
    markers
}
