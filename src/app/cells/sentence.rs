//! Each kind of cell as a sentence with the fields that can be changed in it.

use crate::notebook::cell::{Cell, Form, Kind, Need};

/// One piece of a sentence.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Piece {
    /// The cell's name.
    Name,
    /// Words between the fields.
    Words(&'static str),
    /// A field that is changed in place, with the words that cling to it.
    Field(&'static str, &'static str),
}

use Piece::{Field, Name, Words};

/// Returns the sentence of a cell.
#[must_use]
pub fn sentence(cell: &Cell) -> Vec<Piece> {
    match cell.kind {
        Kind::Value => vec![Name, Words("is"), Field("entry", "")],
        Kind::Formula => vec![
            Name,
            Words("is"),
            Field("entry", ""),
            Words("in"),
            Field("unit", ""),
        ],
        Kind::Surroundings => vec![
            Name,
            Words("has air at"),
            Field("air_temperature", ","),
            Words("walls at"),
            Field("radiant_temperature", ""),
        ],
        Kind::Source => source(cell),
        Kind::Position if cell.field("from").is_none() && cell.field("x").is_some() => vec![
            Name,
            Words("stands at"),
            Field("x", " east,"),
            Field("y", " north,"),
            Words("eye"),
            Field("z", ","),
            Words("for"),
            Field("stay", ""),
        ],
        Kind::Position => {
            let mut pieces = vec![
                Name,
                Words("stands"),
                Field("distance", ""),
                Words("from"),
                Field("from", ","),
            ];
            if cell.field("bearing").is_some() {
                pieces.extend([Field("bearing", ""), Words("off its axis,")]);
            }
            pieces.extend([
                Words("eye"),
                Field("z", ","),
                Words("for"),
                Field("stay", ""),
            ]);
            pieces
        }
        Kind::Curve => vec![
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
        Kind::Assessment => vec![
            Name,
            Words("judges"),
            Field("position", ""),
            Words("by"),
            Field("guidance", ""),
        ],
        Kind::Zone => vec![
            Name,
            Words("is the ground around"),
            Field("from", ""),
            Words("where"),
            Field("stay", ""),
            Words("is more than"),
            Field("guidance", ""),
            Words("allows"),
        ],
        Kind::Note => vec![Field("text", "")],
    }
}

fn source(cell: &Cell) -> Vec<Piece> {
    let article = match cell.text("form") {
        Some("opening") => "an",
        _ => "a",
    };
    let mut pieces = vec![
        Name,
        Words("is"),
        Words(article),
        Field("form", ","),
        Field("outline", ""),
    ];
    match (cell.text("outline"), cell.text("form")) {
        (Some("rectangle"), Some("pool")) => {
            pieces.extend([Field("width", ""), Words("×"), Field("length", ",")]);
        }
        (Some("rectangle"), _) => {
            pieces.extend([Field("width", ""), Words("×"), Field("height", ",")]);
        }
        _ => pieces.extend([Field("diameter", ""), Words("across,")]),
    }
    pieces.extend([
        Words("at"),
        Field("temperature", ","),
        Words("ε"),
        Field("emissivity", ""),
    ]);
    pieces
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
    if cell.field(field).is_some() {
        return true;
    }
    match cell.kind {
        Kind::Source => {
            let (form, outline) = (cell.text("form"), cell.text("outline"));
            match field {
                "diameter" => matches!(outline, Some("disc" | "sphere")),
                "width" => outline == Some("rectangle"),
                "height" => outline == Some("rectangle") && form != Some("pool"),
                "length" => outline == Some("rectangle") && form == Some("pool"),
                "wall_thickness" | "tilt" => form == Some("opening"),
                "freeboard" => form == Some("pool"),
                _ => true,
            }
        }
        Kind::Position => {
            let by_source = cell.field("from").is_some();
            match field {
                "x" | "y" => !by_source,
                _ => true,
            }
        }
        _ => true,
    }
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
        Some(
            Form::Entry(_) | Form::Pairs(_) | Form::Count(..) | Form::Unit | Form::Text,
        )
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

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_field_of_a_kind_is_told_or_listed() {
        for kind in Kind::ALL {
            let cell = Cell::new(kind, "it");
            for piece in sentence(&cell) {
                if let Field(field, _) = piece {
                    assert!(kind.field(field).is_some(), "{kind}: {field}");
                }
            }
            if kind == Kind::Source || kind == Kind::Position {
                continue;
            }
            let told = sentence(&cell)
                .iter()
                .filter(|piece| matches!(piece, Field(..)))
                .count();
            let all = told + others(&cell).len();
            assert_eq!(all, kind.fields().len(), "{kind}");
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
