//! Each kind of cell as a sentence with the fields that can be changed in it:
//! one table for the sentences, one for the fields that mean nothing yet.

use crate::notebook::cell::{Cell, Form, Kind, Need};

/// One piece of a sentence.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Piece {
    /// The cell's name.
    Name,
    /// Words between the fields.
    Words(&'static str),
    /// A field that is changed in place, with the words that cling to it.
    Field(&'static str, &'static str),
}

use Piece::{Field, Name, Words};

/// What must hold of a cell.
#[derive(Clone, Copy, Debug)]
enum When {
    /// The field was typed.
    Typed(&'static str),
    /// It was left out.
    Absent(&'static str),
    /// It holds one of these words.
    Is(&'static str, &'static [&'static str]),
    /// It holds none of them.
    IsNot(&'static str, &'static [&'static str]),
}

use When::{Absent, Is, IsNot, Typed};

impl When {
    fn holds(self, cell: &Cell) -> bool {
        match self {
            Typed(field) => cell.field(field).is_some(),
            Absent(field) => cell.field(field).is_none(),
            Is(field, words) => cell.text(field).is_some_and(|text| words.contains(&text)),
            IsNot(field, words) => !cell.text(field).is_some_and(|text| words.contains(&text)),
        }
    }
}

/// A sentence: of a kind, where all this holds.
struct Telling(Kind, &'static [When], &'static [Piece]);

/// The sentences; the first that fits a cell is told. A kind without one is
/// told by its name, and all its fields are listed.
const TELLINGS: &[Telling] = &[
    Telling(Kind::Value, &[], &[Name, Words("is"), Field("entry", "")]),
    Telling(
        Kind::Formula,
        &[],
        &[
            Name,
            Words("is"),
            Field("entry", ""),
            Words("in"),
            Field("unit", ""),
        ],
    ),
    Telling(
        Kind::Surroundings,
        &[],
        &[
            Name,
            Words("has air at"),
            Field("air_temperature", ","),
            Words("walls at"),
            Field("radiant_temperature", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Typed("spectrum")],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε by wavelength"),
            Field("spectrum", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("form", &["opening"]), Is("outline", &["polygon"])],
        &[
            Name,
            Words("is an"),
            Field("form", ","),
            Field("outline", ""),
            Words("through"),
            Field("vertices", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("outline", &["polygon"])],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ""),
            Words("through"),
            Field("vertices", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("outline", &["cylinder"])],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ""),
            Field("diameter", ""),
            Words("across,"),
            Field("height", ""),
            Words("from end to end, at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("outline", &["plate"])],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ""),
            Field("width", ""),
            Words("×"),
            Field("height", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("form", &["opening"]), Is("outline", &["rectangle"])],
        &[
            Name,
            Words("is an"),
            Field("form", ","),
            Field("outline", ""),
            Field("width", ""),
            Words("×"),
            Field("height", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("form", &["pool"]), Is("outline", &["rectangle"])],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ""),
            Field("width", ""),
            Words("×"),
            Field("length", ","),
            Words("at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[Is("form", &["opening"])],
        &[
            Name,
            Words("is an"),
            Field("form", ","),
            Field("outline", ""),
            Field("diameter", ""),
            Words("across, at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Source,
        &[],
        &[
            Name,
            Words("is a"),
            Field("form", ","),
            Field("outline", ""),
            Field("diameter", ""),
            Words("across, at"),
            Field("temperature", ","),
            Words("ε"),
            Field("emissivity", ""),
        ],
    ),
    Telling(
        Kind::Screen,
        &[Is("make", &["mesh"])],
        &[
            Name,
            Words("is a"),
            Field("make", ""),
            Words("screen"),
            Field("width", ""),
            Words("×"),
            Field("height", ","),
            Words("open by"),
            Field("open_fraction", ","),
            Words("its centre"),
            Field("z", ""),
            Words("high"),
        ],
    ),
    Telling(
        Kind::Screen,
        &[Is("make", &["filter"])],
        &[
            Name,
            Words("is a"),
            Field("make", ""),
            Words("screen"),
            Field("width", ""),
            Words("×"),
            Field("height", ","),
            Words("lets through"),
            Field("transmittance", ""),
            Words("of all and"),
            Field("near_ir_transmittance", ""),
            Words("of near infrared"),
        ],
    ),
    Telling(
        Kind::Screen,
        &[],
        &[
            Name,
            Words("is a"),
            Field("make", ""),
            Words("screen"),
            Field("width", ""),
            Words("×"),
            Field("height", ","),
            Words("its centre"),
            Field("z", ""),
            Words("high, facing"),
            Field("heading", ""),
        ],
    ),
    Telling(
        Kind::Position,
        &[Absent("from"), Typed("x")],
        &[
            Name,
            Words("stands at"),
            Field("x", " east,"),
            Field("y", " north,"),
            Words("eye"),
            Field("z", ","),
            Words("for"),
            Field("stay", ""),
        ],
    ),
    Telling(
        Kind::Position,
        &[Typed("bearing")],
        &[
            Name,
            Words("stands"),
            Field("distance", ""),
            Words("from"),
            Field("from", ","),
            Field("bearing", ""),
            Words("off its axis, eye"),
            Field("z", ","),
            Words("for"),
            Field("stay", ""),
        ],
    ),
    Telling(
        Kind::Position,
        &[],
        &[
            Name,
            Words("stands"),
            Field("distance", ""),
            Words("from"),
            Field("from", ","),
            Words("eye"),
            Field("z", ","),
            Words("for"),
            Field("stay", ""),
        ],
    ),
    Telling(
        Kind::Curve,
        &[],
        &[
            Name,
            Words("runs out from"),
            Field("from", ","),
            Words("from"),
            Field("nearest", ""),
            Words("to"),
            Field("farthest", ","),
            Words("at height"),
            Field("z", ""),
        ],
    ),
    Telling(
        Kind::Assessment,
        &[],
        &[
            Name,
            Words("judges"),
            Field("position", ""),
            Words("by"),
            Field("guidance", ""),
        ],
    ),
    Telling(
        Kind::Zone,
        &[],
        &[
            Name,
            Words("is the ground around"),
            Field("from", ""),
            Words("where"),
            Field("stay", ""),
            Words("is more than"),
            Field("guidance", ""),
            Words("allows"),
        ],
    ),
    Telling(Kind::Note, &[], &[Field("text", "")]),
];

/// The fields that mean something only where all this holds; every other field
/// of a kind always does.
const MEANINGS: &[(Kind, &str, &[When])] = &[
    (
        Kind::Source,
        "diameter",
        &[IsNot("outline", &["rectangle", "polygon", "plate"])],
    ),
    (
        Kind::Source,
        "width",
        &[Is("outline", &["rectangle", "plate"])],
    ),
    (
        Kind::Source,
        "height",
        &[
            Is("outline", &["rectangle", "cylinder", "plate"]),
            IsNot("form", &["pool"]),
        ],
    ),
    (
        Kind::Source,
        "length",
        &[Is("outline", &["rectangle"]), Is("form", &["pool"])],
    ),
    (Kind::Source, "vertices", &[Is("outline", &["polygon"])]),
    (Kind::Source, "stance", &[Is("outline", &["cylinder"])]),
    (Kind::Source, "wall_thickness", &[Is("form", &["opening"])]),
    (
        Kind::Source,
        "wall",
        &[Is("form", &["opening"]), Typed("wall_thickness")],
    ),
    (
        Kind::Source,
        "tilt",
        &[IsNot("form", &["pool"]), IsNot("outline", &["sphere"])],
    ),
    (Kind::Source, "freeboard", &[Is("form", &["pool"])]),
    (
        Kind::Source,
        "vessel_tilt",
        &[Is("form", &["pool"]), Typed("freeboard")],
    ),
    (
        Kind::Source,
        "wall_temperature",
        &[Is("form", &["pool"]), Typed("freeboard")],
    ),
    (
        Kind::Source,
        "wall_emissivity",
        &[Is("form", &["pool"]), Typed("freeboard")],
    ),
    (Kind::Source, "emissivity", &[Absent("spectrum")]),
    (Kind::Source, "near_ir_emissivity", &[Absent("spectrum")]),
    (Kind::Source, "spectrum", &[Absent("emissivity")]),
    (Kind::Screen, "front_emissivity", &[Is("make", &["solid"])]),
    (Kind::Screen, "back_emissivity", &[Is("make", &["solid"])]),
    (Kind::Screen, "front_absorptance", &[Is("make", &["solid"])]),
    (Kind::Screen, "back_absorptance", &[Is("make", &["solid"])]),
    (Kind::Screen, "open_fraction", &[Is("make", &["mesh"])]),
    (Kind::Screen, "transmittance", &[Is("make", &["filter"])]),
    (
        Kind::Screen,
        "near_ir_transmittance",
        &[Is("make", &["filter"])],
    ),
    (
        Kind::Screen,
        "visible_transmittance",
        &[Is("make", &["filter"])],
    ),
    (Kind::Position, "x", &[Absent("from")]),
    (Kind::Position, "y", &[Absent("from")]),
    (
        Kind::Position,
        "surface_emissivity",
        &[Typed("surface_temperature")],
    ),
];

/// Returns the sentence of a cell.
#[must_use]
pub fn sentence(cell: &Cell) -> Vec<Piece> {
    TELLINGS
        .iter()
        .find(|Telling(kind, when, _)| {
            *kind == cell.kind && when.iter().all(|when| when.holds(cell))
        })
        .map_or_else(
            || vec![Name, Words("is a"), Words(cell.kind.name())],
            |Telling(_, _, pieces)| pieces.to_vec(),
        )
}

/// Returns the fields that the sentence leaves out and this cell can use, in
/// the order of its kind.
#[must_use]
pub fn others(cell: &Cell) -> Vec<&'static str> {
    let told = sentence(cell);
    cell.kind
        .fields()
        .iter()
        .map(|spec| spec.name)
        .filter(|name| {
            !told
                .iter()
                .any(|piece| matches!(piece, Field(field, _) if field == name))
        })
        .filter(|name| fits(cell, name))
        .collect()
}

/// Returns whether a field means something in this cell.
fn fits(cell: &Cell, field: &str) -> bool {
    // What was typed is shown, whatever it means.
    cell.field(field).is_some()
        || MEANINGS
            .iter()
            .filter(|(kind, name, _)| *kind == cell.kind && *name == field)
            .all(|(_, _, when)| when.iter().all(|when| when.holds(cell)))
}

/// Returns the words that stand where a field was left out.
#[must_use]
pub fn absent(kind: Kind, field: &str) -> &'static str {
    match (kind, field) {
        (Kind::Formula, "unit") => "its own unit",
        (Kind::Surroundings, "radiant_temperature") => "that of the air",
        (Kind::Position, "stay") => "how long?",
        (Kind::Curve | Kind::Zone, "heading") => "straight out",
        (Kind::Source, "near_ir_emissivity") => "taken from ε",
        (Kind::Source, "wall") => "reradiating",
        (Kind::Source, "stance") => "upright",
        (Kind::Source, "wall_temperature") => "that of the melt",
        (Kind::Surroundings, "absorption") => "off",
        (Kind::Screen, "front_emissivity" | "back_emissivity") => "0.9",
        (Kind::Screen, "front_absorptance" | "back_absorptance") => "as of a soiled plate",
        (Kind::Screen, "visible_transmittance") => "all",
        _ => match kind.field(field).map(|spec| spec.need) {
            Some(Need::Default(text)) => text,
            Some(Need::Required) => "not given",
            Some(Need::Optional) | None => "none",
        },
    }
}

/// Returns what a field is called in a list of fields.
#[must_use]
pub fn label(field: &str) -> String {
    match field {
        "z" => "height".to_owned(),
        "x" => "x, to the east".to_owned(),
        "y" => "y, to the north".to_owned(),
        "near_ir_emissivity" => "ε near infrared".to_owned(),
        _ => field.replace('_', " "),
    }
}

/// Returns the text of a field as it is shown; `None` where it was left out.
#[must_use]
pub fn typed(cell: &Cell, field: &str) -> Option<String> {
    Some(cell.field(field)?.content.to_text())
}

/// Returns the words that a field is chosen from, where it is a choice.
#[must_use]
pub fn choices(cell: &Cell, field: &str, names: &dyn Fn(&[Kind]) -> Vec<String>) -> Vec<String> {
    use crate::notebook::cell::Basis;
    let guidance = || {
        crate::guidance::Library::shipped()
            .ids()
            .map(str::to_owned)
            .collect()
    };
    match cell.kind.field(field).map(|spec| spec.form) {
        Some(Form::Word(words)) => words.iter().map(|word| (*word).to_owned()).collect(),
        Some(Form::Cell(kinds)) => names(kinds),
        Some(Form::Facing) => std::iter::once("strongest".to_owned())
            .chain(names(&[Kind::Source]))
            .collect(),
        Some(Form::Guidance | Form::GuidanceList) => guidance(),
        Some(Form::Basis) => Basis::ALL.map(|basis| basis.words().to_owned()).to_vec(),
        Some(Form::Entry(_) | Form::Pairs(_) | Form::Count(..) | Form::Unit | Form::Text)
        | None => Vec::new(),
    }
}

/// Returns whether a field is only chosen, never typed.
#[must_use]
pub fn is_chosen(cell: &Cell, field: &str) -> bool {
    matches!(
        cell.kind.field(field).map(|spec| spec.form),
        Some(Form::Word(_) | Form::Cell(_) | Form::Guidance | Form::GuidanceList | Form::Basis)
    )
}

/// Returns whether a field is prose, edited over several lines.
#[must_use]
pub fn is_prose(cell: &Cell, field: &str) -> bool {
    matches!(
        cell.kind.field(field).map(|spec| spec.form),
        Some(Form::Text)
    )
}

/// Returns whether a field is an input that came from somewhere.
#[must_use]
pub fn is_input(cell: &Cell, field: &str) -> bool {
    matches!(
        cell.kind.field(field).map(|spec| spec.form),
        Some(Form::Entry(_) | Form::Pairs(_) | Form::Facing)
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_tables_name_fields_that_their_kinds_have() {
        for Telling(kind, when, pieces) in TELLINGS {
            for piece in *pieces {
                if let Field(field, _) = piece {
                    assert!(kind.field(field).is_some(), "{kind}: {field}");
                }
            }
            for when in *when {
                let (Typed(field) | Absent(field) | Is(field, _) | IsNot(field, _)) = when;
                assert!(kind.field(field).is_some(), "{kind}: {field}");
            }
        }
        for (kind, field, _) in MEANINGS {
            assert!(kind.field(field).is_some(), "{kind}: {field}");
        }
    }

    #[test]
    fn every_field_of_a_kind_is_told_or_listed() {
        for kind in Kind::ALL {
            let cell = Cell::new(kind, "it");
            let told: Vec<&str> = sentence(&cell)
                .iter()
                .filter_map(|piece| match piece {
                    Field(field, _) => Some(*field),
                    Name | Words(_) => None,
                })
                .collect();
            let listed = others(&cell);
            for spec in kind.fields() {
                let conditional = MEANINGS
                    .iter()
                    .any(|(of, name, _)| *of == kind && *name == spec.name);
                assert!(
                    conditional || told.contains(&spec.name) || listed.contains(&spec.name),
                    "{kind}: {}",
                    spec.name
                );
            }
        }
    }

    #[test]
    fn a_source_tells_the_sizes_of_its_outline() {
        let pool = Cell::new(Kind::Source, "pool")
            .with("form", "pool")
            .with("outline", "rectangle");
        assert!(sentence(&pool).contains(&Field("length", ",")));
        assert!(!others(&pool).contains(&"height"));
        assert!(others(&pool).contains(&"freeboard"));
    }
}
