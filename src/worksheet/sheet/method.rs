//! How the figures came about: the laws with their substituted numbers, the
//! limits with the stay put in, and what the model leaves out.

use super::Sheet;
use crate::notebook::cell::screen::Make;
use crate::notebook::cell::{Kind, position, source};
use crate::notebook::datum::Datum;
use crate::notebook::engine::Slot;
use crate::notebook::results::{CellResult, Shown, State};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Quantity, Unit};
use crate::worksheet::block::{Block, Cell, Column, Run, Table};

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut blocks = vec![Block::Heading("How it was worked out".to_owned())];
    for cell in &sheet.results.cells {
        if cell.state != State::Ok {
            continue;
        }
        match cell.kind {
            Kind::Source => blocks.extend(of_source(sheet, cell)),
            Kind::Screen => blocks.extend(of_screen(sheet, cell)),
            Kind::Position => blocks.extend(of_position(sheet, cell)),
            _ => {}
        }
    }
    blocks.extend(screens(sheet));
    blocks.push(Block::Paragraph(vec![Run::plain(model(sheet))]));
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

/// What holds for every sheet, and what this one's scene adds. Each thing left
/// out is said with its direction.
fn model(sheet: &Sheet<'_>) -> String {
    let heights: Vec<String> = position::sights::SKIN_HEIGHTS
        .iter()
        .map(|height| format::significant(*height, 2, Rounding::Nearest))
        .collect();
    let absorption = sheet.engine.heat().and_then(|heat| heat.air.as_ref());
    let air = match absorption {
        Some(air) => format!(
            "Absorption by shop air is taken off the total, never off a band below 3000 nm, by {}.",
            air.formula.citation()
        ),
        None => "Left out, so that the truth is lower: absorption by shop air.".to_owned(),
    };
    format!(
        "The model: sources are diffuse emitters with exitance M = ε σ T⁴ (Stefan and Boltzmann); \
         the share of a band is Planck's. The irradiance is E = Σ M F, F the configuration factor \
         from a small surface at the point to what it sees of each source above its own horizon, \
         by closed form or by Lambert's contour integral over what nothing hides, exact; screens, \
         rims, the walls of openings and hot bodies hide what they cover, the floor hides nothing. \
         Eyes are judged at the stated point and at the reach along each axis, skin at {} m above \
         the ground and the reach around. Unless a way is stated, the receiver faces where each \
         quantity is greatest. Distances are horizontal, from the centre of the outline. Left out, \
         so that the truth is higher: reflections between objects, from polished screens and \
         walls, flames and hot gases, warm air from plumes. {air} Not in the model: splash, \
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
    let Some(Datum::Emission(emission)) = sheet.engine.value_of(cell.id, Slot::Group("emission"))
    else {
        return None;
    };
    let shape = match sheet.engine.value_of(cell.id, Slot::Group("shape")) {
        Some(Datum::Shape(shape)) => Some(shape),
        _ => None,
    };
    let typed = sheet.engine.cell(cell.id)?;
    let spectral = typed.field("spectrum").is_some();
    // Of a table the mean that its own integral gives.
    let whole = || Some(cell.shown("effective_emissivity")?.quantity()?.si);
    let emissivity = si(sheet, cell, "emissivity").or_else(whole)?;
    let near = match (si(sheet, cell, "near_ir_emissivity"), shape) {
        _ if spectral => " (ε and bands by the table of emissivities, integrated)".to_owned(),
        (Some(near), _) => format!(" (near infrared emissivity {})", plain(near)),
        (None, Some(shape)) if shape.kind == source::Kind::Pool => format!(
            " (near infrared emissivity taken as {} times the total, at most 1)",
            source::POOL_NEAR_INFRARED
        ),
        (None, _) => String::new(),
    };
    let kelvin = Unit::coherent(Dimension::TEMPERATURE);
    let mut text = format!(
        "M = ε σ T⁴ = {} · 5.670×10⁻⁸ W/(m²·K⁴) · ({})⁴ = {}; in 780–3000 nm {}{near}.",
        plain(emissivity),
        format::quantity(temperature, &kelvin, 6, Rounding::Nearest),
        three(emission.face.total, Dimension::IRRADIANCE),
        three(emission.face.near_infrared, Dimension::IRRADIANCE),
    );
    if let Some(shape) = shape.filter(|shape| shape.tunnel.is_some()) {
        let walls = if typed.text("wall") == Some("cold") {
            "the tunnel's walls are cold".to_owned()
        } else {
            format!(
                "the tunnel's walls re-radiate, in {} zones each in balance with what falls on \
                 them (Clausing 1932)",
                shape.parts.len() - 1
            )
        };
        text.push_str(&format!(
            " Through a wall of {} the hot inside is seen through its inner edge, and {walls}; in \
             all directions together the hole sends {} of what a black one would: never used for \
             a person in front of it.",
            three(shape.depth, Dimension::LENGTH),
            cell.shown("effective_emissivity")
                .and_then(Shown::quantity)
                .map_or_else(String::new, |share| plain(share.si)),
        ));
    } else if let Some([_, wall]) = emission
        .parts
        .get(..2)
        .and_then(|parts| parts.first_chunk())
    {
        text.push_str(&format!(
            " Over the rim the melt is seen, and of the inner wall above it what the rim does not \
             hide: that sends {}.",
            three(wall.total, Dimension::IRRADIANCE)
        ));
    }
    Some(Block::Bullet(vec![
        Run::bold(format!("{}: ", cell.name)),
        Run::plain(text),
    ]))
}

/// How a screen comes to its temperature.
fn of_screen(sheet: &Sheet<'_>, cell: &CellResult) -> Option<Block> {
    let Some(Datum::Make(make)) = sheet.engine.value_of(cell.id, Slot::Group("make")) else {
        return None;
    };
    let made = match make {
        Make::Solid {
            emissivities: [front, back],
            absorptances: [absorbs, behind],
        } => format!(
            "a plate, ε {} in front and {} behind, absorptance for hot sources {} and {}",
            plain(*front),
            plain(*back),
            plain(*absorbs),
            plain(*behind)
        ),
        Make::Mesh { open_fraction } => format!(
            "a mesh or curtain that lets {} through; its wires count as black",
            plain(*open_fraction)
        ),
        Make::Filter {
            transmittance,
            near_infrared_transmittance,
            visible_transmittance,
        } => format!(
            "filter glass that lets {} of the total, {} of 780–3000 nm and {} of what is visible \
             through; it counts as black by itself",
            plain(*transmittance),
            plain(*near_infrared_transmittance),
            plain(*visible_transmittance)
        ),
    };
    Some(Block::Bullet(vec![
        Run::bold(format!("{}: ", cell.name)),
        Run::plain(format!(
            "{made}. Its pieces take the temperatures at which absorbed = (ε + ε) σ T⁴ + given to \
             the air, all screens together; convection by Churchill and Chu (1975) or the air that \
             is blown along it, whichever takes more; the hottest place where most is absorbed and \
             the air takes least.",
        )),
    ]))
}

/// The screens with their temperatures, on the unfavourable bound.
fn screens(sheet: &Sheet<'_>) -> Option<Block> {
    const COLUMNS: [(&str, &str); 5] = [
        ("temperature", "mean temperature"),
        ("hottest_temperature", "hottest place"),
        ("absorbed", "absorbed"),
        ("front_exitance", "front sends out"),
        ("back_exitance", "back sends out"),
    ];
    let mut table = Table {
        columns: std::iter::once(Column::words("screen"))
            .chain(COLUMNS.map(|(_, head)| Column::numbers(head)))
            .collect(),
        rows: Vec::new(),
    };
    let screens = sheet.results.cells.iter();
    for cell in screens.filter(|cell| cell.kind == Kind::Screen && cell.state == State::Ok) {
        let mut row = vec![Cell::runs(vec![Run::bold(cell.name.clone())])];
        row.extend(COLUMNS.map(|(name, _)| {
            let text = cell.shown(name).map(|shown| {
                wording::bound(name, shown, None)
                    .unwrap_or_else(|| wording::nominal(name, shown, None))
            });
            Cell::plain(text.unwrap_or_default())
        }));
        table.rows.push(row);
    }
    (!table.rows.is_empty()).then_some(Block::Table(table))
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
        let whole = (exitance * factor - part).abs() <= 1e-9 * part.abs();
        terms.push(if whole {
            format!(
                "{} · {} ({name}) = {}",
                three(exitance, Dimension::IRRADIANCE),
                plain(*factor),
                three(*part, Dimension::IRRADIANCE)
            )
        } else {
            // Of several exitances, or dimmed on its way.
            format!(
                "{name} in its parts, {} of the view in all, {}",
                plain(*factor),
                three(*part, Dimension::IRRADIANCE)
            )
        });
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
