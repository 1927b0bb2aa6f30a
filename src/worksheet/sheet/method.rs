//! How the figures came about: the laws with their substituted numbers, the
//! limits with the stay put in, and what the model leaves out.

use super::Sheet;
use crate::notebook::cell::{Kind, position, source};
use crate::notebook::datum::Datum;
use crate::notebook::engine::Slot;
use crate::notebook::results::{CellResult, Shown, State};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Quantity, Unit};
use crate::worksheet::block::{Block, Run};

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = vec![Block::Heading("How it was worked out".to_owned())];
    for cell in &sheet.results.cells {
        if cell.state != State::Ok {
            continue;
        }
        match cell.kind {
            Kind::Source => blocks.extend(of_source(sheet, cell)),
            Kind::Position => blocks.extend(of_position(sheet, cell)),
            _ => {}
        }
    }
    blocks.push(Block::Paragraph(vec![Run::plain(model())]));
    if sheet.results.draws > 0 {
        blocks.push(Block::Paragraph(vec![Run::plain(format!(
            "Uncertainty: {} inputs carry a spread. Each is drawn from a normal distribution whose \
             expanded uncertainty (coverage factor 2) is the spread, {} times by Latin hypercube \
             sampling with seed {}; a drawn emissivity above 1 counts as 1. Bounds are the central 95 % of the \
             draws (JCGM 101:2008); findings and distances are those of the unfavourable bound, \
             the nominal value stands beside it.",
            sheet.results.spreads, sheet.results.draws, sheet.results.seed
        ))]));
    }
    blocks
}

/// What holds for every sheet. Each thing left out is said with its direction.
fn model() -> String {
    let heights: Vec<String> = position::sights::SKIN_HEIGHTS
        .iter()
        .map(|height| format::significant(*height, 2, Rounding::Nearest))
        .collect();
    format!(
        "The model: sources are diffuse emitters with exitance M = ε σ T⁴ (Stefan and Boltzmann); \
         the share of a band is Planck's. The irradiance is E = Σ M F, F the configuration factor \
         from a small surface at the point to what it sees of each source above its own horizon, \
         by closed form or by Lambert's contour integral, exact. Eyes are judged at the stated \
         point and at the reach along each axis, skin at {} m above the ground and the reach \
         around. Unless a way is stated, the receiver faces where each quantity is greatest. \
         Distances are horizontal, from the centre of the outline. Left out, so that the truth is \
         higher: reflections between objects, flames and hot gases, warm air from plumes. Left \
         out, so that the truth is lower: absorption by shop air. Not in the model: splash, \
         contact, steam. Figures are rounded to the safe side.",
        heights.join(", ")
    )
}

fn three(si: f64, dimension: Dimension) -> String {
    format::of(Quantity::new(si, dimension), None, 4, Rounding::Nearest)
}

fn plain(number: f64) -> String {
    format::significant(number, 4, Rounding::Nearest)
}

fn si(sheet: &Sheet<'_>, cell: &CellResult, field: &'static str) -> Option<f64> {
    Some(
        sheet
            .engine
            .value_of(cell.id, Slot::Field(field))?
            .as_quantity()?
            .si,
    )
}

fn of_source(sheet: &Sheet<'_>, cell: &CellResult) -> Option<Block> {
    let temperature = si(sheet, cell, "temperature")?;
    let emissivity = si(sheet, cell, "emissivity")?;
    let Some(Datum::Emission(emission)) = sheet.engine.value_of(cell.id, Slot::Group("emission"))
    else {
        return None;
    };
    let near = match (
        si(sheet, cell, "near_ir_emissivity"),
        sheet.engine.value_of(cell.id, Slot::Group("shape")),
    ) {
        (Some(near), _) => format!(" (near infrared emissivity {})", plain(near)),
        (None, Some(Datum::Shape(shape))) if shape.kind == source::Kind::Pool => format!(
            " (near infrared emissivity taken as {} times the total, at most 1)",
            source::POOL_NEAR_INFRARED
        ),
        (None, _) => String::new(),
    };
    let kelvin = Unit::coherent(Dimension::TEMPERATURE);
    Some(Block::Bullet(vec![
        Run::bold(format!("{}: ", cell.name)),
        Run::plain(format!(
            "M = ε σ T⁴ = {} · 5.670×10⁻⁸ W/(m²·K⁴) · ({})⁴ = {}; in 780–3000 nm {}{near}.",
            plain(emissivity),
            format::quantity(temperature, &kelvin, 6, Rounding::Nearest),
            three(emission.face.total, Dimension::IRRADIANCE),
            three(emission.face.near_infrared, Dimension::IRRADIANCE),
        )),
    ]))
}

fn of_position(sheet: &Sheet<'_>, cell: &CellResult) -> Option<Block> {
    let Some(Datum::Exposure(exposure)) = sheet.engine.value_of(cell.id, Slot::Group("exposure"))
    else {
        return None;
    };
    let mut terms = Vec::new();
    for (name, part, factor) in &exposure.parts {
        let exitance = sheet
            .results
            .cell(name)
            .and_then(|source| source.shown("exitance"))
            .and_then(Shown::quantity)
            .map_or(0.0, |exitance| exitance.si);
        terms.push(format!(
            "{} · {} ({name}) = {}",
            three(exitance, Dimension::IRRADIANCE),
            plain(*factor),
            three(*part, Dimension::IRRADIANCE)
        ));
    }
    if terms.is_empty() {
        terms.push("no source in this notebook".to_owned());
    }
    let irradiance = wording::quantity(
        "irradiance",
        Quantity::new(exposure.stated[0], Dimension::IRRADIANCE),
        None,
    );
    Some(Block::Bullet(vec![
        Run::bold(format!("{}: ", cell.name)),
        Run::plain(format!(
            "E = Σ M F: {}; in all {irradiance} at the stated point.",
            terms.join("; ")
        )),
    ]))
}
