//! What a card says beside its sentence: the governing quantity, large and on
//! the safe bound, what stands under it, and what was found.

use crate::app::shared::{Measure, Shared};
use crate::drawing::mark::Shape;
use crate::guidance::{self, Envelope, Library};
use crate::notebook::cell::zone::Extent;
use crate::notebook::cell::{Cell, Kind, assessment};
use crate::notebook::datum::Span;
use crate::notebook::results::{CellResult, Shown, State};
use crate::notebook::wording;
use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Quantity, Unit};

/// What a card says beside its sentence.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Told {
    /// The governing quantity.
    pub large: Option<String>,
    /// What stands under it at the right edge.
    pub under: Option<String>,
    /// Secondary lines.
    pub lines: Vec<String>,
    /// What was found, worst first.
    pub findings: Vec<Found>,
}

/// A finding as a card shows it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Found {
    /// Its shape and colour.
    pub shape: Shape,
    /// Its word.
    pub word: String,
    /// What follows the word.
    pub text: String,
    /// What decides it, in smaller letters.
    pub by: Option<String>,
}

/// Returns what the card of a cell says.
#[must_use]
pub fn told(shared: &Shared<'_>, cell: &Cell, result: &CellResult) -> Told {
    if result.state != State::Ok {
        return Told::default();
    }
    match cell.kind {
        Kind::Surroundings => Told {
            lines: one(shared, result, "background")
                .map(|text| {
                    format!("the room's own air and walls send {text}; no limit counts that")
                })
                .into_iter()
                .collect(),
            ..Told::default()
        },
        Kind::Source => source(shared, result),
        Kind::Position => position(shared, cell, result),
        Kind::Curve => curve(shared, result),
        Kind::Assessment => assessed(shared, result),
        Kind::Zone => zone(shared, cell, result),
        _ => quantity(shared, cell, result),
    }
}

/// Returns the unit of a system in which a quantity of this kind is shown;
/// `None` for the one that reads best in metres and watts.
#[must_use]
pub fn unit(measure: Measure, dimension: Dimension) -> Option<Unit> {
    if measure == Measure::Metric {
        return None;
    }
    let symbol = match dimension {
        Dimension::LENGTH => "ft",
        Dimension::AREA => "ft²",
        Dimension::TEMPERATURE => "°F",
        Dimension::IRRADIANCE => "Btu/(h·ft²)",
        _ => return None,
    };
    Unit::parse(symbol).ok()
}

fn hint(shared: &Shared<'_>, shown: &Shown, own: Option<Unit>) -> Option<Unit> {
    let dimension = shown.quantity()?.dimension;
    unit(shared.look.measure, dimension).or(own)
}

/// Returns a plain output, the safe bound where there is one.
fn one(shared: &Shared<'_>, result: &CellResult, name: &str) -> Option<String> {
    let shown = result.shown(name)?;
    let unit = hint(shared, shown, None);
    Some(
        wording::bound(name, shown, unit.as_ref())
            .unwrap_or_else(|| wording::nominal(name, shown, unit.as_ref())),
    )
}

/// Returns the nominal value beside a bound, where both are.
fn beside(shared: &Shared<'_>, result: &CellResult, name: &str) -> Option<String> {
    let shown = result.shown(name)?;
    let unit = hint(shared, shown, None);
    let bound = wording::bound(name, shown, unit.as_ref())?;
    let nominal = wording::nominal(name, shown, unit.as_ref());
    (bound != nominal).then(|| format!("nominal {nominal}"))
}

/// The main quantity of a cell that has nothing more to say.
fn quantity(shared: &Shared<'_>, cell: &Cell, result: &CellResult) -> Told {
    let main = cell.kind.main_output();
    let Some((name, shown)) = main.and_then(|name| Some((name, result.shown(name)?))) else {
        return Told::default();
    };
    let unit = hint(shared, shown, wording::unit_of(shared.engine, result));
    Told {
        large: Some(wording::nominal(name, shown, unit.as_ref())),
        under: wording::interval(name, shown, unit.as_ref()),
        ..Told::default()
    }
}

fn source(shared: &Shared<'_>, result: &CellResult) -> Told {
    let mut line = Vec::new();
    if let Some(power) = one(shared, result, "power") {
        line.push(format!("sends out {power}"));
    }
    if let Some(peak) = result.shown("peak_wavelength") {
        line.push(format!(
            "peak {}",
            wording::nominal("peak_wavelength", peak, None)
        ));
    }
    let si = |name: &str| result.shown(name).and_then(Shown::quantity).map(|q| q.si);
    if let (Some(all), Some(near)) = (si("exitance"), si("near_ir_exitance"))
        && all > 0.0
    {
        line.push(format!(
            "{} % near infrared",
            format::significant(100.0 * near / all, 2, Rounding::Up)
        ));
    }
    Told {
        large: one(shared, result, "exitance"),
        under: beside(shared, result, "exitance"),
        lines: vec![line.join(" · ")],
        ..Told::default()
    }
}

fn position(shared: &Shared<'_>, cell: &Cell, result: &CellResult) -> Told {
    let judges: Vec<&CellResult> = shared
        .results
        .cells
        .iter()
        .filter(|other| other.judges(shared.engine, &cell.name))
        .collect();
    let mut findings: Vec<Found> = judges
        .iter()
        .map(|other| found(shared, other).unwrap_or_else(|| unjudged(&other.name)))
        .collect();
    let rank = |shape: Shape| match shape {
        Shape::Over => 0,
        Shape::Within => 2,
        _ => 1,
    };
    findings.sort_by_key(|found| rank(found.shape));
    if findings.is_empty() {
        findings.push(Found {
            shape: Shape::NotAssessed,
            word: "not assessed".to_owned(),
            text: "no assessment judges this position".to_owned(),
            by: None,
        });
    }
    let verdicts: Vec<_> = judges
        .iter()
        .flat_map(|other| &other.verdicts)
        .cloned()
        .collect();
    let governing = assessment::governing(&verdicts)
        .and_then(|verdict| Library::shipped().get(&verdict.guidance));
    let total = one(shared, result, "irradiance");
    let Some(limit) = governing else {
        return Told {
            large: total,
            under: beside(shared, result, "irradiance"),
            lines: vec!["in all, at the stated point".to_owned()],
            findings,
        };
    };
    let (name, stated, what) = match (limit.metric.exposure(), limit.envelope()) {
        (guidance::Exposure::NearInfrared, Envelope::Eye) => (
            "envelope_near_ir_irradiance",
            "near_ir_irradiance",
            "near infrared, worst at the eye",
        ),
        (guidance::Exposure::Skin, _) => (
            "envelope_skin_irradiance",
            "skin_irradiance",
            "skin band, worst within reach",
        ),
        _ => (
            "envelope_irradiance",
            "irradiance",
            "in all, worst within reach",
        ),
    };
    let mut lines = vec![what.to_owned()];
    if let Some(stated) = one(shared, result, stated) {
        lines[0].push_str(&format!(" · {stated} at the point"));
    }
    if let Some(total) = total
        && stated != "irradiance"
    {
        lines[0].push_str(&format!(" · in all {total}"));
    }
    Told {
        large: one(shared, result, name),
        under: beside(shared, result, name),
        lines,
        findings,
    }
}

fn curve(shared: &Shared<'_>, result: &CellResult) -> Told {
    let at = |row: usize, name: &str| {
        let shown = result.in_row(row, name)?;
        let unit = hint(shared, shown, None);
        Some(
            wording::bound(name, shown, unit.as_ref())
                .unwrap_or_else(|| wording::nominal(name, shown, unit.as_ref())),
        )
    };
    let far = |row: usize| {
        let shown = result.in_row(row, "distance")?;
        let unit = hint(shared, shown, None);
        Some(format::at_most(shown.quantity()?, unit.as_ref(), 4))
    };
    let rows = result.rows();
    let line = (rows > 1)
        .then(|| {
            Some(format!(
                "{rows} points · {} at {}, {} at {}",
                at(0, "irradiance")?,
                far(0)?,
                at(rows - 1, "irradiance")?,
                far(rows - 1)?,
            ))
        })
        .flatten();
    Told {
        lines: line.into_iter().collect(),
        ..Told::default()
    }
}

fn assessed(shared: &Shared<'_>, result: &CellResult) -> Told {
    let large = result.shown("allowed_time").map(|shown| {
        wording::bound("allowed_time", shown, None)
            .unwrap_or_else(|| wording::nominal("allowed_time", shown, None))
    });
    Told {
        large,
        findings: found(shared, result).into_iter().collect(),
        ..Told::default()
    }
}

/// Returns the limits of an assessment, one line each.
#[must_use]
pub fn limits(shared: &Shared<'_>, result: &CellResult) -> Vec<Found> {
    result
        .verdicts
        .iter()
        .enumerate()
        .map(|(row, verdict)| {
            let word = result
                .in_row(row, "finding")
                .and_then(Shown::word)
                .unwrap_or_default();
            let exposure = irradiance(shared, verdict.judgement.exposure);
            let limit = wording::permitted(verdict)
                .map(|limit| format!(" of {limit}"))
                .unwrap_or_default();
            Found {
                shape: Shape::of_word(word),
                word: word.to_owned(),
                text: format!("{} · {exposure}{limit}", verdict.guidance),
                by: None,
            }
        })
        .collect()
}

fn irradiance(shared: &Shared<'_>, si: f64) -> String {
    let quantity = Quantity::new(si, Dimension::IRRADIANCE);
    let unit = unit(shared.look.measure, Dimension::IRRADIANCE);
    wording::quantity("exposure", quantity, unit.as_ref())
}

fn found(shared: &Shared<'_>, result: &CellResult) -> Option<Found> {
    let sentence = wording::finding(shared.engine, result)?;
    if !shared.fresh {
        // A finding is on the bound, and there is none yet.
        return Some(Found {
            shape: Shape::NotAssessed,
            word: "being worked out".to_owned(),
            text: format!("nominally {}", sentence.word),
            by: None,
        });
    }
    let shape = Shape::of_word(sentence.word);
    let word = sentence.word.to_owned();
    // Over has one thing to say, and says it in one line.
    if shape == Shape::Over
        && let Some(verdict) = assessment::governing(&result.verdicts)
        && let Span::Seconds(seconds) = assessment::span(verdict.judgement.allowed)
    {
        let planned = verdict.stay.map_or_else(
            || "no stay is stated".to_owned(),
            |stay| format!("planned {}", wording::plain_time(stay)),
        );
        let mut reached = format!("limit reached after {}", format::reached(seconds));
        if seconds < 10.0 {
            reached.push_str(": no planned stay");
        }
        let by = Library::shipped()
            .get(&verdict.guidance)
            .map(|limit| format!("{} · {}", limit.id, limit.title));
        return Some(Found {
            shape,
            word,
            text: format!("{planned}, {reached}"),
            by,
        });
    }
    Some(Found {
        shape,
        word,
        text: sentence.text,
        by: None,
    })
}

fn unjudged(name: &str) -> Found {
    Found {
        shape: Shape::NotAssessed,
        word: "not assessed".to_owned(),
        text: format!("{name} could not be worked out"),
        by: None,
    }
}

fn zone(shared: &Shared<'_>, cell: &Cell, result: &CellResult) -> Told {
    let Some(Shown::Extent {
        extent: nominal,
        high,
        ..
    }) = result.shown("distance")
    else {
        return Told::default();
    };
    let safe = high.unwrap_or(*nominal);
    let mut lines = Vec::new();
    if let (Extent::At(_), Some(Shown::Extent { extent, high, .. })) =
        (safe, result.shown("clear_distance"))
    {
        let from = cell.text("from").unwrap_or_default();
        let (centre, clear) = (
            distance(shared, safe),
            distance(shared, high.unwrap_or(*extent)),
        );
        lines.push(if centre == clear {
            format!("from the face of {from}; farther out the rule is met")
        } else {
            format!("from the centre of {from}, {clear} from its edge; farther out the rule is met")
        });
    }
    Told {
        large: Some(distance(shared, safe)),
        under: (high.is_some() && distance(shared, safe) != distance(shared, *nominal))
            .then(|| format!("nominal {}", distance(shared, *nominal))),
        lines,
        ..Told::default()
    }
}

/// Returns where a zone ends, rounded outwards.
fn distance(shared: &Shared<'_>, extent: Extent) -> String {
    match (shared.look.measure, extent) {
        (Measure::Us, Extent::At(si)) => format::safe_feet(si),
        (Measure::Us, Extent::NotMetWithin(si)) => {
            format!("farther than {}", format::safe_feet(si))
        }
        _ => wording::extent(extent),
    }
}
