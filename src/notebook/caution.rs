//! The warnings that are always printed, and those that a notebook's own
//! values call up. None of them can be switched off.

use std::collections::BTreeMap;
use std::sync::LazyLock;

use serde::Deserialize;

use super::cell::position::Sights;
use super::cell::surroundings::{self, Formula};
use super::cell::{Basis, Kind, assessment, source, zone};
use super::datum::{CellId, Datum};
use super::engine::{Engine, Slot};
use super::listed;
use super::results::{CellResult, Shown};
use super::scene::may_be_polished;
use crate::guidance::{Library, Limit};
use crate::physics::screen::Make;
use crate::units::format;

/// One warning.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Caution {
    /// A stable word for machines.
    pub code: String,
    /// What is said.
    pub text: String,
    /// The field that called it up, where one did.
    pub field: Option<&'static str>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Texts {
    always: Vec<Always>,
    called: BTreeMap<String, String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Always {
    code: String,
    text: String,
}

static TEXTS: LazyLock<Texts> = LazyLock::new(|| {
    serde_json::from_str(include_str!("../../resources/cautions.json"))
        .expect("the shipped cautions are read by a test")
});

/// Returns the warnings that stand on every screen, sheet and listing.
#[must_use]
pub fn always() -> Vec<Caution> {
    TEXTS
        .always
        .iter()
        .map(|always| Caution {
            code: always.code.clone(),
            text: always.text.clone(),
            field: None,
        })
        .collect()
}

/// Returns a warning with its gaps filled in, in order.
pub(super) fn called(code: &str, field: Option<&'static str>, gaps: &[&str]) -> Caution {
    let pattern = TEXTS
        .called
        .get(code)
        .expect("every code that is called up has a text, which a test proves");
    let mut text = String::with_capacity(pattern.len());
    let mut gaps = gaps.iter();
    for (index, piece) in pattern.split("{}").enumerate() {
        if index > 0 {
            text.push_str(gaps.next().copied().unwrap_or_default());
        }
        text.push_str(piece);
    }
    Caution {
        code: code.to_owned(),
        text,
        field,
    }
}

/// The share of a limit from which a measurement is called for.
const NEAR: f64 = 0.8;

/// Outside these temperatures in kelvin (200 °C to 2500 °C) a source is no hot
/// one of the trade, and most likely a slip of the hand. Common practice, no
/// source.
const TRADE: std::ops::RangeInclusive<f64> = 473.15..=2773.15;

/// Below this temperature in kelvin (400 °C) less than 4 % of a black body's
/// radiation lies below 3000 nm.
const COOL: f64 = 673.15;

/// Returns the warnings that one cell's values call up.
#[must_use]
pub(super) fn of_cell(engine: &Engine, id: CellId, result: &CellResult) -> Vec<Caution> {
    let mut cautions = Vec::new();
    let Some(cell) = engine.cell(id) else {
        return cautions;
    };
    for field in &cell.fields {
        if is_unconfirmed(cell, field) {
            let what = match field.name {
                "basis" => cell.name.clone(),
                name => format!("{} of {}", name.replace('_', " "), cell.name),
            };
            cautions.push(called("unconfirmed", Some(field.name), &[&what]));
        }
    }
    listed::cautions(engine, id, &mut cautions);
    match cell.kind {
        Kind::Source => of_source(engine, id, &mut cautions),
        Kind::Screen => of_screen(engine, id, &mut cautions),
        Kind::Surroundings => of_room(cell, &mut cautions),
        Kind::Curve => polished_line(engine, &mut cautions),
        Kind::Position => of_position(engine, id, &mut cautions),
        Kind::Assessment => of_assessment(engine, result, &mut cautions),
        Kind::Zone => of_zone(engine, id, result, &mut cautions),
        Kind::Value | Kind::Formula | Kind::Note => {}
    }
    if result.failed > 0 {
        cautions.push(called(
            "unbounded",
            None,
            &[&result.failed.to_string(), &result.draws.to_string()],
        ));
    }
    cautions
}

/// Returns whether an input of a cell still waits to be confirmed for this job.
pub(super) fn is_unconfirmed(cell: &super::Cell, field: &super::cell::Field) -> bool {
    field.basis == Some(Basis::Unconfirmed)
        || (field.name == "basis"
            && cell.text("basis").and_then(Basis::from_words) == Some(Basis::Unconfirmed))
}

fn si(engine: &Engine, id: CellId, field: &'static str) -> Option<f64> {
    Some(engine.value_of(id, Slot::Field(field))?.as_quantity()?.si)
}

fn of_source(engine: &Engine, id: CellId, cautions: &mut Vec<Caution>) {
    let typed = |field: &str| {
        engine
            .cell(id)
            .is_some_and(|cell| cell.field(field).is_some())
    };
    if si(engine, id, "wall_thickness").is_some_and(|depth| depth > 0.0) {
        let cold = engine.cell(id).and_then(|cell| cell.text("wall")) == Some("cold");
        cautions.push(if cold {
            called("wall-cold", Some("wall"), &[])
        } else {
            called("wall-in-balance", Some("wall_thickness"), &[])
        });
    }
    if let Some(Datum::Shape(shape)) = engine.value_of(id, Slot::Group("shape"))
        && shape.kind == source::Kind::Pool
        && shape.parts.len() > 1
    {
        if !typed("wall_temperature") {
            cautions.push(called("wall-as-melt", Some("wall_temperature"), &[]));
        }
        cautions.push(called("vessel-reflects", Some("freeboard"), &[]));
    }
    let has_own = typed("near_ir_emissivity") || typed("spectrum");
    if !has_own && let Some(Datum::Shape(shape)) = engine.value_of(id, Slot::Group("shape")) {
        match shape.kind {
            source::Kind::Pool => cautions.push(called("near-infrared-assumed", None, &[])),
            source::Kind::Body => cautions.push(called("near-infrared-as-total", None, &[])),
            source::Kind::Opening | source::Kind::Screen => {}
        }
    }
    if let Some(Datum::Shape(shape)) = engine.value_of(id, Slot::Group("shape"))
        && shape.kind == source::Kind::Pool
    {
        cautions.push(called("pool-poured", None, &[]));
    }
    if let Some(Datum::Emission(emission)) = engine.value_of(id, Slot::Group("emission"))
        && emission.face.skin > emission.face.total
    {
        cautions.push(called("band-above-whole", Some("emissivity"), &[]));
    }
    if let Some(temperature) = si(engine, id, "temperature") {
        if !TRADE.contains(&temperature) {
            let unit =
                format::natural_unit(crate::units::Dimension::TEMPERATURE, temperature, None);
            let text = format::exactly(temperature, &unit);
            cautions.push(called("odd-temperature", Some("temperature"), &[&text]));
        } else if temperature < COOL {
            cautions.push(called("cool-source", Some("temperature"), &[]));
        }
    }
}

/// Beyond these film temperatures in kelvin the properties of air that stand
/// behind the convection are not known to hold.
const FILM: std::ops::RangeInclusive<f64> = 200.0..=1200.0;

/// A plate hotter than this, in kelvin (60 °C), burns whoever touches it. Common
/// practice, no source.
const BURNS: f64 = 333.15;

fn of_screen(engine: &Engine, id: CellId, cautions: &mut Vec<Caution>) {
    let typed = |field: &str| {
        engine
            .cell(id)
            .is_some_and(|cell| cell.field(field).is_some())
    };
    if let Some(Datum::Make(make)) = engine.value_of(id, Slot::Group("make")) {
        match make {
            Make::Solid { .. } => {
                if may_be_polished(make) {
                    cautions.push(called("polished", Some("front_emissivity"), &[]));
                }
                if !typed("front_absorptance") || !typed("back_absorptance") {
                    cautions.push(called("soiled", Some("front_absorptance"), &[]));
                }
            }
            Make::Mesh { .. } => {
                cautions.push(called("mesh-aslant", Some("open_fraction"), &[]));
            }
            Make::Filter { .. } => {
                if !typed("visible_transmittance") {
                    cautions.push(called("filter-visible", Some("visible_transmittance"), &[]));
                }
                cautions.push(called("filter-breaks", None, &[]));
            }
        }
    }
    let Some(Datum::Screen(outcome)) = engine.value_of(id, Slot::Group("outcome")) else {
        return;
    };
    let told = |kelvin: f64| {
        let unit = format::natural_unit(crate::units::Dimension::TEMPERATURE, kelvin, None);
        format::quantity(kelvin, &unit, 3, format::Rounding::Up)
    };
    if outcome.hottest > BURNS {
        cautions.push(called("screen-hot", None, &[&told(outcome.hottest)]));
    }
    let air = engine
        .room()
        .map_or(surroundings::AIR_TEMPERATURE, |room| room.air_temperature);
    for film in [
        0.5 * (outcome.temperature + air),
        0.5 * (outcome.hottest + air),
    ] {
        if !FILM.contains(&film) {
            cautions.push(called("screen-convection", None, &[&told(film)]));
            break;
        }
    }
}

fn of_room(cell: &super::Cell, cautions: &mut Vec<Caution>) {
    if let Some(formula) = cell.text("absorption").and_then(Formula::from_word) {
        cautions.push(called(
            "air-absorbs",
            Some("absorption"),
            &[formula.citation()],
        ));
    }
}

/// Warns of polished screens beside a line that is not looked at place by place.
fn polished_line(engine: &Engine, cautions: &mut Vec<Caution>) {
    let names: Vec<String> = engine
        .heat()
        .and_then(|heat| heat.polished.as_ref())
        .map(|balanced| {
            let polished = balanced
                .screens
                .iter()
                .filter(|state| may_be_polished(&state.screen.make()));
            polished.map(|state| state.name.to_string()).collect()
        })
        .unwrap_or_default();
    if !names.is_empty() {
        cautions.push(called("polished-line", None, &[&names.join(", ")]));
    }
}

/// Warns where a way through shop air lies outside the range of its formula.
fn air_range(engine: &Engine, sights: &Sights, cautions: &mut Vec<Caution>) {
    let Some(air) = engine.heat().and_then(|heat| heat.air.as_ref()) else {
        return;
    };
    let mut outside: Vec<&str> = Vec::new();
    for (piece, (part, _)) in sights.around_eye.parts(0).enumerate() {
        let name = &sights.form.names[sights.form.owner(part)];
        let in_range = sights
            .around_eye
            .tag(0, piece)
            .is_none_or(|tag| air.transmitted(tag.path).in_range);
        if !in_range && !outside.contains(&name.as_ref()) {
            outside.push(name);
        }
    }
    if !outside.is_empty() {
        cautions.push(called("air-range", None, &[&outside.join(", ")]));
    }
}

fn of_position(engine: &Engine, id: CellId, cautions: &mut Vec<Caution>) {
    if let Some(Datum::Exposure(exposure)) = engine.value_of(id, Slot::Group("exposure"))
        && !exposure.mirrored.is_empty()
    {
        cautions.push(called("mirrored", None, &[&exposure.mirrored.join(", ")]));
    }
    if let Some(Datum::Sights(sights)) = engine.value_of(id, Slot::Group("sights")) {
        air_range(engine, sights, cautions);
        let past: Vec<&str> = sights
            .form
            .names
            .iter()
            .zip(&sights.form.shapes)
            .filter(|(_, shape)| {
                let mut points = sights.around_skin.points.iter();
                !shape.is_source()
                    && points.any(|point| {
                        let from = sights.eye.with_z(point.z);
                        shape.region.crosses(from, *point)
                    })
            })
            .map(|(name, _)| name.as_ref())
            .collect();
        if !past.is_empty() {
            let unit = crate::units::Unit::coherent(crate::units::Dimension::LENGTH);
            let reach = format::quantity(sights.reach, &unit, 2, format::Rounding::Nearest);
            cautions.push(called(
                "reach-past-screen",
                Some("reach"),
                &[&reach, &past.join(", ")],
            ));
        }
        if !sights.behind.is_empty() {
            let verb = if sights.behind.len() == 1 {
                "is"
            } else {
                "are"
            };
            let names = format!("{} {verb}", sights.behind.join(", "));
            cautions.push(called("behind", None, &[&names]));
        }
        let above = sights.eye.z - sights.ground;
        if !(0.3..=2.2).contains(&above) {
            let unit = format::natural_unit(crate::units::Dimension::LENGTH, above, None);
            let text = format::quantity(above, &unit, 3, format::Rounding::Nearest);
            cautions.push(called("eye-height", Some("z"), &[&text]));
        }
    }
    let Some(cell) = engine.cell(id) else { return };
    if cell
        .text("faces")
        .is_some_and(|text| text.trim() != "strongest")
    {
        cautions.push(called("fixed-facing", Some("faces"), &[]));
    }
    if !is_assessed(engine, &cell.name) {
        cautions.push(called("not-judged", None, &[]));
    } else if cell.field("stay").is_none() {
        cautions.push(called("no-stay", Some("stay"), &[]));
    }
}

/// Returns whether any assessment judges the position of this name.
pub(super) fn is_assessed(engine: &Engine, position: &str) -> bool {
    engine
        .mentioning(position)
        .any(|cell| cell.kind == Kind::Assessment && cell.text("position") == Some(position))
}

fn of_assessment(engine: &Engine, result: &CellResult, cautions: &mut Vec<Caution>) {
    use crate::guidance::Overall;
    let limits: Vec<&Limit> = result
        .verdicts
        .iter()
        .filter_map(|verdict| Library::shipped().get(&verdict.guidance))
        .collect();
    recalled(
        engine,
        limits.iter().map(|limit| limit.id.as_str()),
        cautions,
    );
    for limit in &limits {
        if limit.is_evidence() {
            cautions.push(called("evidence", None, &[&limit.title, &limit.caution]));
        }
    }
    let near = result
        .verdicts
        .iter()
        .filter_map(|verdict: &assessment::Verdict| verdict.judgement.ratio)
        .filter(|ratio| (NEAR..=1.0).contains(ratio))
        .fold(f64::NAN, f64::max);
    if near.is_finite() {
        cautions.push(called("near-limit", None, &[&format::safe_ratio(near)]));
    }
    if let Some(Overall::NotAssessed { missing, .. }) = &result.overall {
        let names: Vec<&str> = missing.iter().map(|organ| organ.name()).collect();
        cautions.push(called("missing-effects", None, &[&names.join(", ")]));
    }
}

fn of_zone(engine: &Engine, id: CellId, result: &CellResult, cautions: &mut Vec<Caution>) {
    polished_line(engine, cautions);
    if let Some(cell) = engine.cell(id) {
        recalled(engine, cell.texts("guidance").into_iter(), cautions);
        if cell
            .text("faces")
            .is_some_and(|text| text.trim() != "strongest")
        {
            cautions.push(called("fixed-facing", Some("faces"), &[]));
        }
    }
    if let Some(Shown::Extent { extent, high, .. }) = result.shown("distance")
        && let Some(zone::Extent::NotMetWithin(farthest)) = [Some(*extent), *high]
            .into_iter()
            .flatten()
            .find(|extent| matches!(extent, zone::Extent::NotMetWithin(_)))
    {
        cautions.push(called(
            "range-end",
            Some("farthest"),
            &[&format::safe_distance(farthest)],
        ));
    }
}

/// Returns the limits among a family that nobody has confirmed yet.
pub(super) fn unconfirmed_limits<'a>(
    engine: &Engine,
    ids: impl Iterator<Item = &'a str>,
) -> Vec<&'static Limit> {
    let mut open: Vec<&'static Limit> = Vec::new();
    for limit in ids.flat_map(|id| Library::shipped().family(id)) {
        if limit.needs_confirming()
            && !engine.notebook().is_confirmed(&limit.id, &limit.edition)
            && !open.iter().any(|known| known.id == limit.id)
        {
            open.push(limit);
        }
    }
    open
}

fn recalled<'a>(engine: &Engine, ids: impl Iterator<Item = &'a str>, cautions: &mut Vec<Caution>) {
    let open = unconfirmed_limits(engine, ids);
    if !open.is_empty() {
        let names: Vec<&str> = open.iter().map(|limit| limit.id.as_str()).collect();
        cautions.push(called("recalled", Some("guidance"), &[&names.join(", ")]));
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_three_cautions_that_may_never_be_missing_are_there() {
        let codes: Vec<String> = always().into_iter().map(|caution| caution.code).collect();
        for code in ["planning-aid", "local-law", "measure-first"] {
            assert!(codes.iter().any(|known| known == code), "{code}: {codes:?}");
        }
    }

    #[test]
    fn every_code_in_the_source_has_a_text() {
        let whole = include_str!("caution.rs");
        let (own, _) = whole
            .split_once("#[cfg(test)]")
            .expect("tests end the file");
        let source = format!("{own}{}", include_str!("listed.rs"));
        let mut found = 0;
        for piece in source.split("called(").skip(1) {
            let Some(code) = piece.split('"').nth(1) else {
                continue;
            };
            if piece.trim_start().starts_with('"') {
                assert!(TEXTS.called.contains_key(code), "{code}");
                found += 1;
            }
        }
        assert!(
            found >= TEXTS.called.len(),
            "{found} {}",
            TEXTS.called.len()
        );
    }

    #[test]
    fn gaps_are_filled_in_order() {
        let caution = called("unbounded", None, &["3", "1000"]);
        assert!(
            caution.text.contains("in 3 of 1000 draws"),
            "{}",
            caution.text
        );
    }
}
