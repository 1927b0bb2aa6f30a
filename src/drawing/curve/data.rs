//! What a notebook's curve cell shows: its rows, the rules that judge on them,
//! and the positions that stand on its line.

use super::{Crossing, Curve, LimitLine, Marker};
use crate::drawing::mark::Shape;
use crate::notebook::cell::position::Band;
use crate::notebook::cell::zone::Extent;
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::datum::Datum;
use crate::notebook::engine::{Engine, Slot};
use crate::notebook::results::{CellResult, Results, Shown, sights};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};

impl Curve {
    /// Returns the plot of a curve cell that was worked out.
    ///
    /// It shows the near infrared irradiance, or the irradiance over all
    /// wavelengths where only that is judged by a limit on this line.
    #[must_use]
    pub fn of(engine: &Engine, results: &Results, cell: &CellResult) -> Curve {
        let near_infrared = plot(engine, results, cell, Band::NearInfrared);
        let total = plot(engine, results, cell, Band::Total);
        if near_infrared.limits.is_empty() && !total.limits.is_empty() {
            total
        } else {
            near_infrared
        }
    }
}

fn plot(engine: &Engine, results: &Results, cell: &CellResult, quantity: Band) -> Curve {
    let column = match quantity {
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
    let height = typed.and_then(|cell| cell.text("z")).unwrap_or("1.6 m");
    Curve {
        band: quantity,
        title: format!("{}: from {from}, at {height}", cell.name),
        x_label: format!("horizontal distance from the centre of {from} (m)"),
        y_label: format!(
            "{} (W/m²)",
            match quantity {
                Band::NearInfrared => "near infrared irradiance, 780–3000 nm",
                Band::Total | Band::Skin => "irradiance, all wavelengths",
            }
        ),
        y_unit: 1.0,
        inverse_square: rows.last().copied(),
        limits: limits(engine, results, cell, quantity),
        positions: positions(engine, results, cell, column),
        rows,
        upper,
        number: |value| format::significant(value, 1, Rounding::Nearest),
    }
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
            crossing: nominal.and_then(crossing),
            upper_crossing: safe.and_then(crossing),
        });
    }
    limits
}

fn judges(id: &str, quantity: Band) -> bool {
    Band::of_guidance(id) == Some(quantity)
}

fn crossing(extent: Extent) -> Option<Crossing> {
    match extent {
        Extent::At(distance) => Some(Crossing {
            distance,
            text: wording::extent(extent),
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
        let word = results.word_of(engine, &cell.name);
        markers.push(Marker {
            label: format!("{} · {}", cell.name, word.unwrap_or("not assessed")),
            distance,
            value: value.si,
            shape: word.map_or(Shape::NotAssessed, Shape::of_word),
        });
    }
    markers
}
