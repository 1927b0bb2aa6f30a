//! Every input as typed, with its value, basis and note, and every formula with
//! its substituted numbers.

use super::Sheet;
use crate::notebook::cell::{Field, Form, Kind, Need, Spec};
use crate::notebook::datum::Datum;
use crate::notebook::engine::Slot;
use crate::notebook::listed;
use crate::notebook::results::CellResult;
use crate::notebook::wording;
use crate::units::Quantity;
use crate::units::format::{self, Rounding};
use crate::worksheet::block::{Block, Cell, Column, Run, Table};

pub(super) fn blocks(sheet: &Sheet<'_>) -> Vec<Block> {
    let mut inputs = Table {
        columns: vec![
            Column::words("cell"),
            Column::words("field"),
            Column::words("as typed"),
            Column::words("basis"),
            Column::words("note"),
        ],
        rows: Vec::new(),
    };
    let mut formulas = Table {
        columns: vec![
            Column::words("name"),
            Column::words("formula"),
            Column::words("with its numbers"),
            Column::numbers("result"),
        ],
        rows: Vec::new(),
    };
    let mut notes = Vec::new();
    for cell in &sheet.results.cells {
        if cell.kind == Kind::Note {
            if let Some(text) = sheet
                .engine
                .cell(cell.id)
                .and_then(|cell| cell.text("text"))
            {
                notes.push(Block::Paragraph(vec![
                    Run::bold(format!("{}: ", cell.name)),
                    Run::plain(text),
                ]));
            }
            continue;
        }
        let mut first = true;
        let mut left_out = Vec::new();
        for spec in cell.kind.fields() {
            if let Some(row) = input(sheet, cell, spec, first) {
                first = false;
                inputs.rows.push(row);
            } else if let Need::Default(text) = spec.need
                && applies(sheet, cell, spec.name)
            {
                left_out.push(format!("{} {text}", spec.name.replace('_', " ")));
            }
            formulas.rows.extend(formula(sheet, cell, spec));
        }
        if !left_out.is_empty() {
            inputs.rows.push(vec![
                Cell::plain(""),
                Cell::runs(vec![Run::muted("left out")]),
                Cell::runs(vec![Run::muted(left_out.join(", "))]),
            ]);
        }
    }
    let mut blocks = Vec::new();
    if !notes.is_empty() {
        blocks.push(Block::Heading("Notes".to_owned()));
        blocks.extend(notes);
    }
    blocks.push(Block::Heading("Inputs".to_owned()));
    blocks.push(Block::Paragraph(vec![Run::muted(
        "A spread (±) is an expanded uncertainty with coverage factor 2, about 95 %. A row of the \
         library (`of …`) counts with its typical value and has its range as 95 %. What was left \
         out is listed with the value that counts instead; what is worked out stands under Formulas.",
    )]));
    blocks.push(Block::Table(inputs));
    if !formulas.rows.is_empty() {
        blocks.push(Block::Heading("Formulas".to_owned()));
        blocks.push(Block::Table(formulas));
    }
    blocks
}

/// Returns whether a field that was left out has a meaning for this cell.
fn applies(sheet: &Sheet<'_>, cell: &CellResult, field: &str) -> bool {
    let Some(typed) = sheet.engine.cell(cell.id) else {
        return false;
    };
    match (cell.kind, typed.text("form")) {
        (Kind::Source, form) => match field {
            "wall_thickness" => form == Some("opening"),
            "freeboard" | "vessel_tilt" => form == Some("pool"),
            "wall_emissivity" => {
                typed.field("freeboard").is_some() || typed.field("vessel_tilt").is_some()
            }
            "tilt" => {
                form == Some("opening")
                    || typed.text("outline") == Some("plate")
                    || typed.text("stance") == Some("lying")
            }
            _ => true,
        },
        (Kind::Position, _) => match field {
            "surface_emissivity" => typed.field("surface_temperature").is_some(),
            "bearing" => typed.field("from").is_some(),
            "tilt" => sheet.engine.entry(cell.id, "faces").is_some(),
            _ => true,
        },
        _ => true,
    }
}

/// Returns the row of one field; `None` where nothing was typed, or where the
/// field is shown elsewhere.
fn input(sheet: &Sheet<'_>, cell: &CellResult, spec: &Spec, first: bool) -> Option<Vec<Cell>> {
    let typed = sheet.engine.cell(cell.id)?;
    let field = typed.field(spec.name)?;
    if matches!(spec.form, Form::Basis | Form::Text) {
        return None;
    }
    let is_main = spec.name == "entry";
    let basis = match field.basis {
        Some(basis) => basis.words().to_owned(),
        None if is_main => typed.text("basis").unwrap_or_default().to_owned(),
        None => String::new(),
    };
    let mut notes = match field.note.clone() {
        Some(note) => vec![note],
        None if is_main => typed.text("note").map(str::to_owned).into_iter().collect(),
        None => Vec::new(),
    };
    let mut of_row = None;
    for named in sheet.engine.rows_named(cell.id) {
        if named.field == spec.name {
            of_row = Some(listed::basis(named.row).words().to_owned());
            notes.push(format!("{}. {}", named.row.said(), named.row.cited()));
        }
    }
    // A basis that somebody typed is their word; without one it is the row's.
    let basis = if basis.is_empty() {
        of_row.unwrap_or_default()
    } else {
        basis
    };
    let name = if first {
        Cell::runs(vec![Run::bold(cell.name.clone())])
    } else {
        Cell::plain("")
    };
    let basis = if basis == "unconfirmed" {
        Cell::runs(vec![Run::bold(basis)])
    } else {
        Cell::plain(basis)
    };
    Some(vec![
        name,
        Cell::plain(spec.name.replace('_', " ")),
        Cell::plain(text(field)),
        basis,
        Cell::plain(notes.join(" · ")),
    ])
}

fn text(field: &Field) -> String {
    field.content.to_text()
}

/// Returns the rows of a field that is worked out from others.
fn formula(sheet: &Sheet<'_>, cell: &CellResult, spec: &Spec) -> Option<Vec<Cell>> {
    let entry = sheet.engine.entry(cell.id, spec.name)?;
    let worked_out = !entry.names().is_empty() || entry.is_single_literal().is_none();
    if !worked_out {
        return None;
    }
    let names: Vec<String> = sheet
        .engine
        .read_by(cell.id, field_name(cell, spec)?)
        .into_iter()
        .map(|quantity| quantity.map_or_else(|| "unknown".to_owned(), shown))
        .collect();
    let label = if spec.name == "entry" {
        cell.name.clone()
    } else {
        format!("{}.{}", cell.name, spec.name)
    };
    let unit = wording::unit_of(sheet.engine, cell);
    let result = match sheet.engine.value_of(cell.id, Slot::Field(spec.name))? {
        Datum::Quantity(quantity) => {
            let unit = unit.filter(|_| spec.name == "entry");
            format::of(*quantity, unit.as_ref(), 4, Rounding::Nearest)
        }
        Datum::Truth(truth) => truth.to_string(),
        _ => "not worked out".to_owned(),
    };
    Some(vec![
        Cell::runs(vec![Run::bold(label)]),
        Cell::plain(entry.text()),
        Cell::plain(entry.substituted(&names)),
        Cell::plain(result),
    ])
}

fn field_name(cell: &CellResult, spec: &Spec) -> Option<&'static str> {
    cell.kind.field(spec.name).map(|spec| spec.name)
}

fn shown(quantity: Quantity) -> String {
    format::of(quantity, None, 4, Rounding::Nearest)
}
