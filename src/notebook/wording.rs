//! How results read: the labels of outputs, their figures rounded to the safe
//! side, and the sentences that a person acts on. One wording for the command
//! line, the worksheet and the window.

use super::cell::Kind;
use super::cell::assessment::{self, Verdict};
use super::cell::zone::Extent;
use super::datum::{Datum, Span};
use super::engine::{Engine, Slot};
use super::results::{CellResult, Figure, Shown, State};
use crate::guidance::{Finding, Library, Overall};
use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Quantity, Unit};

/// Returns the label of an output or a column.
#[must_use]
pub fn label(name: &str) -> &str {
    match name {
        "value" => "value",
        "exitance" => "exitance",
        "near_ir_exitance" => "near infrared exitance",
        "power" => "power sent out",
        "peak_wavelength" => "wavelength of the peak",
        "radiance" => "radiance",
        "area" => "area",
        "effective_emissivity" => "effective emissivity",
        "irradiance" => "irradiance",
        "near_ir_irradiance" => "near infrared, 780–3000 nm",
        "skin_irradiance" => "skin band, 380–3000 nm",
        "background" => "the room's own heat, in no limit",
        "envelope_irradiance" => "worst within reach",
        "envelope_near_ir_irradiance" => "near infrared, worst at the eye",
        "envelope_skin_irradiance" => "skin band, worst within reach",
        "blue_light_radiance" => "blue-light radiance",
        "retinal_radiance_2006" => "retinal radiance, 2006",
        "retinal_radiance_2013" => "retinal radiance, 2013",
        "ir_a_radiance" => "IR-A radiance, 780–1400 nm",
        "temperature" => "mean temperature",
        "hottest_temperature" => "hottest place",
        "absorbed" => "absorbed from hot sources",
        "absorbed_power" => "absorbed in all",
        "front_exitance" => "front sends out",
        "back_exitance" => "back sends out",
        "convected" => "given to the air",
        "mean_radiant_temperature" => "mean radiant temperature",
        "net_radiant_heat" => "net radiant heat taken up",
        "angular_subtense" => "angular subtense of",
        "irradiance_from" => "irradiance from",
        "view_factor" => "configuration factor of",
        "clear_distance" => "clear distance",
        "distance" => "distance",
        "allowed_time" => "allowed time",
        "governed_by" => "governed by",
        other => other,
    }
}

/// Returns the label of a figure, with the source that it is about.
#[must_use]
pub fn figure_label(figure: &Figure) -> String {
    match &figure.part {
        Some(part) => format!("{} {part}", label(&figure.name)),
        None => label(&figure.name).to_owned(),
    }
}

/// Which way the figures of an output are rounded.
fn rounding(name: &str) -> Rounding {
    match name {
        "limit" => Rounding::Down,
        "exposure"
        | "ratio"
        | "exitance"
        | "near_ir_exitance"
        | "power"
        | "radiance"
        | "irradiance"
        | "near_ir_irradiance"
        | "skin_irradiance"
        | "background"
        | "envelope_irradiance"
        | "envelope_near_ir_irradiance"
        | "envelope_skin_irradiance"
        | "blue_light_radiance"
        | "retinal_radiance_2006"
        | "retinal_radiance_2013"
        | "ir_a_radiance"
        | "temperature"
        | "hottest_temperature"
        | "absorbed"
        | "absorbed_power"
        | "front_exitance"
        | "back_exitance"
        | "mean_radiant_temperature"
        | "net_radiant_heat"
        | "irradiance_from" => Rounding::Up,
        _ => Rounding::Nearest,
    }
}

/// Returns a quantity as the output of this name is shown.
#[must_use]
pub fn quantity(name: &str, quantity: Quantity, unit: Option<&Unit>) -> String {
    if name == "ratio" {
        return format::safe_ratio(quantity.si);
    }
    if name == "peak_wavelength" {
        let micrometre = Unit::parse("µm").expect("the unit of wavelengths is known");
        return format::quantity(quantity.si, &micrometre, 3, Rounding::Nearest);
    }
    if name == "value" {
        return format::at_most(quantity, unit, 4);
    }
    let figures = match name {
        "distance" | "clear_distance" | "view_factor" => 4,
        _ => 3,
    };
    format::of(quantity, unit, figures, rounding(name))
}

/// Returns an allowed time rounded to the safe side.
#[must_use]
pub fn span(span: Span) -> String {
    match span {
        Span::Seconds(seconds) => format::safe_time(seconds),
        Span::Capped(seconds) if seconds <= 0.0 => "not assessed".to_owned(),
        Span::Capped(seconds) => format!("not assessed past {}", plain_time(seconds)),
        Span::Unlimited => "sets no end".to_owned(),
    }
}

/// Returns a duration to the nearest second below 10 min, else to the minute:
/// for stays that are stated, not permitted.
#[must_use]
pub fn plain_time(seconds: f64) -> String {
    if seconds < 10.0 {
        let unit = Unit::coherent(Dimension::TIME);
        return format::quantity(seconds, &unit, 2, Rounding::Nearest);
    }
    format::safe_time(seconds)
}

/// Returns where a zone ends, rounded to the safe side.
#[must_use]
pub fn extent(extent: Extent) -> String {
    match extent {
        Extent::At(distance) => format::safe_distance(distance),
        Extent::NotMetWithin(distance) => {
            format!("farther than {}", format::safe_distance(distance))
        }
        Extent::MetEverywhere | Extent::NotAssessed => extent.words().to_owned(),
    }
}

/// Returns the nominal figure of an output.
#[must_use]
pub fn nominal(name: &str, shown: &Shown, unit: Option<&Unit>) -> String {
    match shown {
        Shown::Quantity { quantity: q, .. } => quantity(name, *q, unit),
        Shown::Time { span: s, .. } => span(*s),
        Shown::Extent { extent: e, .. } => extent(*e),
        Shown::Word(word) => word.clone(),
    }
}

/// Returns the bound that people act on, where spreads reach the output: the
/// upper one of what burns, the shortest time, the farthest edge.
#[must_use]
pub fn bound(name: &str, shown: &Shown, unit: Option<&Unit>) -> Option<String> {
    match shown {
        Shown::Quantity {
            quantity: q, high, ..
        } => high.map(|si| quantity(name, Quantity { si, ..*q }, unit)),
        Shown::Time { low, .. } => low.map(span),
        Shown::Extent { high, .. } => high.map(extent),
        Shown::Word(_) => None,
    }
}

/// Returns both bounds of a quantity, such as `269 kW/m² to 312 kW/m²`.
#[must_use]
pub fn interval(name: &str, shown: &Shown, unit: Option<&Unit>) -> Option<String> {
    let Shown::Quantity {
        quantity: q,
        low: Some(low),
        high: Some(high),
    } = shown
    else {
        return None;
    };
    let text = |si| quantity(name, Quantity { si, ..*q }, unit);
    Some(format!("{} to {}", text(*low), text(*high)))
}

/// Returns a figure as people act on it: the unfavourable bound before the
/// nominal value where there is one, else the value with its interval.
#[must_use]
pub fn beside(name: &str, shown: &Shown, unit: Option<&Unit>) -> String {
    let nominal = nominal(name, shown, unit);
    let acted_on = match shown {
        Shown::Quantity { .. } => rounding(name) == Rounding::Up,
        Shown::Time { .. } | Shown::Extent { .. } => true,
        Shown::Word(_) => false,
    };
    match (
        acted_on,
        bound(name, shown, unit),
        interval(name, shown, unit),
    ) {
        (true, Some(bound), _) => format!("{bound}   (nominal {nominal})"),
        (false, _, Some(interval)) => format!("{nominal}   ({interval})"),
        _ => nominal,
    }
}

/// Returns the unit in which a cell's main value is to be shown, where its
/// maker chose one.
#[must_use]
pub fn unit_of(engine: &Engine, result: &CellResult) -> Option<Unit> {
    let cell = engine.cell(result.id)?;
    match cell.kind {
        Kind::Formula => Unit::parse(cell.text("unit")?).ok(),
        Kind::Value => super::cell::field::typed_unit(engine.entry(result.id, "entry")?).cloned(),
        _ => None,
    }
}

/// Returns the limit that an exposure was compared with, rounded down, and the
/// time that it belongs to where that is not the stay: guidance that ends
/// before the stay does is asked at its last second.
#[must_use]
pub fn permitted(verdict: &Verdict) -> Option<String> {
    let judgement = &verdict.judgement;
    let si = judgement.limit?;
    let unit = format::natural_unit(Dimension::IRRADIANCE, si, None);
    let limit = format::permitted(si, &unit, 3);
    Some(match judgement.judged_at {
        Some(time) if verdict.stay.is_some_and(|stay| time < stay) => {
            format!("{limit} at {}", plain_time(time))
        }
        _ => limit,
    })
}

/// Returns where a zone ends in words, on the safe bound, with the nominal edge
/// beside it, and what its rule does not judge.
#[must_use]
pub fn zone(engine: &Engine, result: &CellResult) -> String {
    let typed = engine.cell(result.id);
    let text = |field: &str| typed.and_then(|cell| cell.text(field)).unwrap_or_default();
    let (from, guidance) = (text("from"), text("guidance"));
    let Some(Shown::Extent {
        extent: nominal,
        high,
        ..
    }) = result.shown("distance")
    else {
        return not_worked_out(result);
    };
    let judged = organ(guidance);
    let safe = high.unwrap_or(*nominal);
    let mut words = match safe {
        Extent::At(_) => {
            let mut words = format!(
                "not met closer than {} to the centre of {from}",
                extent(safe)
            );
            if let Some(clear) = result.shown("clear_distance") {
                let clear = bound("clear_distance", clear, None)
                    .unwrap_or_else(|| self::nominal("clear_distance", clear, None));
                words.push_str(&format!(", {clear} to its edge"));
            }
            words
        }
        Extent::MetEverywhere => "met at every distance that was searched".to_owned(),
        Extent::NotMetWithin(end) => {
            format!(
                "met nowhere up to {}, where the search ended",
                format::safe_distance(end)
            )
        }
        Extent::NotAssessed if result.failed > 0 => {
            "not assessed: the spreads reach values for which nothing can be said".to_owned()
        }
        Extent::NotAssessed => {
            return format!(
                "not assessed: {guidance} says nothing about a stay of {}",
                text("stay")
            );
        }
    };
    if high.is_some() {
        words.push_str(&format!(" (nominal {})", extent(*nominal)));
    }
    words.push_str(&format!("; it judges {judged} alone"));
    words
}

/// Returns what the guidance of this id protects.
#[must_use]
pub fn organ(guidance: &str) -> &'static str {
    Library::shipped()
        .get(guidance)
        .map_or("one effect", |limit| limit.organ.name())
}

/// Says why a cell has no results.
#[must_use]
pub fn not_worked_out(result: &CellResult) -> String {
    match (&result.state, result.errors.first()) {
        (State::Waiting(cells), _) => format!("not worked out: it waits for {}", cells.join(", ")),
        (_, Some(error)) => format!("not worked out: {error}"),
        (_, None) => "not worked out".to_owned(),
    }
}

/// A finding as a person reads it: its word and one sentence.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Sentence {
    /// The word of the overall finding.
    pub word: &'static str,
    /// What follows the word.
    pub text: String,
}

/// Returns an assessment's finding in one sentence: for how long the person
/// wants to stay, what decides, and for how long it allows that.
#[must_use]
pub fn finding(engine: &Engine, result: &CellResult) -> Option<Sentence> {
    let overall = result.overall.as_ref()?;
    let position = engine.cell(result.id)?.text("position")?;
    let planned = planned(engine, position);
    let governing = assessment::governing(&result.verdicts);
    let mut text = match (overall, governing) {
        (Overall::NotAssessed { .. }, _) if result.failed > 0 => format!(
            "{planned}; the spreads reach values that cannot be, and without bounds nothing is \
             assessed: narrow them"
        ),
        (Overall::Over { .. }, Some(verdict)) => {
            let mut text = format!("{planned}, but {}", reached(verdict));
            let silent: Vec<&str> = result
                .verdicts
                .iter()
                .filter(|verdict| matches!(verdict.judgement.finding, Finding::NotAssessed(_)))
                .map(|verdict| verdict.guidance.as_str())
                .collect();
            if !silent.is_empty() {
                text.push_str(&format!("; not assessed by {}", silent.join(", ")));
            }
            text
        }
        (Overall::NotAssessed { missing, within }, _) => {
            let names = |organs: &[crate::guidance::Organ]| {
                organs
                    .iter()
                    .map(|organ| organ.name())
                    .collect::<Vec<_>>()
                    .join(", ")
            };
            let mut text = format!("{planned}; no limit here covers {}", names(missing));
            match governing.map(|verdict| (verdict, assessment::span(verdict.judgement.allowed))) {
                Some((verdict, Span::Seconds(_))) => {
                    text.push_str(&format!("; {}", allows(verdict)));
                }
                _ => text.push_str(", so that no allowed time can be given"),
            }
            if !within.is_empty() {
                text.push_str(&format!("; {} alone is within", names(within)));
            }
            text
        }
        (Overall::Within { covers }, Some(verdict)) => {
            let names: Vec<&str> = covers.iter().map(|organ| organ.name()).collect();
            format!("{planned}, for {}; {}", names.join(", "), allows(verdict))
        }
        (_, None) => planned,
    };
    let behind = engine
        .find(position)
        .and_then(|id| super::results::sights(engine, id))
        .map_or(&[][..], |sights| &sights.behind);
    if !behind.is_empty() {
        text.push_str(&format!(
            "; {} seen from behind, and counted as nothing",
            behind.join(", ")
        ));
    }
    let mirrored = engine
        .find(position)
        .and_then(|id| engine.value_of(id, Slot::Group("exposure")))
        .map_or(&[][..], |datum| match datum {
            Datum::Exposure(exposure) => exposure.mirrored.as_slice(),
            _ => &[],
        });
    if !mirrored.is_empty() {
        text.push_str(&format!(
            "; {} may be polished and mirrors a source here: the truth is higher",
            mirrored.join(", ")
        ));
    }
    Some(Sentence {
        word: overall.word(),
        text,
    })
}

/// Returns how long people want to stay at a position, as it was typed.
fn planned(engine: &Engine, position: &str) -> String {
    let stay = engine.find(position).and_then(|id| {
        let entry = engine.entry(id, "stay")?;
        if entry.is_single_literal().is_some() {
            return Some(entry.text().trim().to_owned());
        }
        let stay = engine.value_of(id, Slot::Field("stay"))?.as_quantity()?;
        Some(format::of(stay, None, 4, Rounding::Nearest))
    });
    stay.map_or_else(
        || "no stay is stated".to_owned(),
        |stay| format!("planned {stay}"),
    )
}

fn title(verdict: &Verdict) -> &'static str {
    Library::shipped()
        .get(&verdict.guidance)
        .map_or("", |limit| limit.title.as_str())
}

/// Says when a limit is reached.
fn reached(verdict: &Verdict) -> String {
    let what = match verdict.judgement.finding {
        Finding::OnsetReached => "the onset",
        _ => "the limit",
    };
    match assessment::span(verdict.judgement.allowed) {
        Span::Seconds(seconds) if seconds < 10.0 => format!(
            "{what} of {} ({}) is reached after {} s: no planned stay",
            verdict.guidance,
            title(verdict),
            seconds.floor()
        )
        .replace("after 0 s", "at once"),
        Span::Seconds(seconds) => format!(
            "{what} of {} ({}) is reached after {}",
            verdict.guidance,
            title(verdict),
            format::safe_time(seconds)
        ),
        Span::Capped(_) | Span::Unlimited => allows(verdict),
    }
}

/// Says how long the shortest limit allows.
fn allows(verdict: &Verdict) -> String {
    match assessment::span(verdict.judgement.allowed) {
        Span::Seconds(seconds) => format!(
            "{} ({}) allows the shortest stay: {}",
            verdict.guidance,
            title(verdict),
            format::safe_time(seconds)
        ),
        Span::Capped(seconds) => format!(
            "{} ({}) speaks only of the first {}",
            verdict.guidance,
            title(verdict),
            plain_time(seconds)
        ),
        Span::Unlimited => "no limit that is listed sets an end to it".to_owned(),
    }
}
