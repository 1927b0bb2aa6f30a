//! The results as JSON for other programs.

use serde_json::{Map, Value, json};

use crate::command::load::Loaded;
use crate::notebook::Diagnostic;
use crate::notebook::caution::{self, Caution};
use crate::notebook::cell::zone::Extent;
use crate::notebook::datum::Span;
use crate::notebook::engine::Engine;
use crate::notebook::listed::Named;
use crate::notebook::results::{CellResult, Figure, Shown};
use crate::units::{Dimension, Quantity};

/// Returns the object of one notebook.
pub(super) fn notebook(file: &str, loaded: &Loaded) -> Value {
    let cells: Vec<Value> = loaded
        .results
        .cells
        .iter()
        .map(|worked_out| cell(&loaded.engine, worked_out))
        .collect();
    let readiness: Vec<Value> = loaded
        .results
        .readiness
        .iter()
        .map(|item| json!({ "code": item.code, "text": item.text, "place": item.cell }))
        .collect();
    let cautions: Vec<Value> = caution::always()
        .iter()
        .map(|caution| self::caution("", caution))
        .collect();
    json!({
        "file": file,
        "title": loaded.engine.notebook().title.as_deref().unwrap_or_default(),
        "digest": format!("sha256:{}", loaded.digest),
        "cells": cells,
        "cautions": cautions,
        "readiness": readiness,
        "draws": { "count": loaded.results.draws, "seed": loaded.results.seed },
    })
}

fn cell(engine: &Engine, cell: &CellResult) -> Value {
    let errors: Vec<Value> = cell
        .errors
        .iter()
        .map(|error| fault(&cell.name, error))
        .collect();
    let cautions: Vec<Value> = cell
        .cautions
        .iter()
        .map(|caution| self::caution(&cell.name, caution))
        .collect();
    let mut object = Map::new();
    let mut put = |key: &str, value: Value| {
        let _ = object.insert(key.to_owned(), value);
    };
    put("name", cell.name.as_str().into());
    put("kind", cell.kind.name().into());
    put("state", cell.state.word().into());
    if let crate::notebook::results::State::Waiting(cells) = &cell.state {
        put("waiting_for", cells.as_slice().into());
    }
    put("outputs", outputs(cell));
    let rows: Vec<Value> = engine.rows_named(cell.id).iter().map(row).collect();
    if !rows.is_empty() {
        put("rows", rows.into());
    }
    put("errors", errors.into());
    put("cautions", cautions.into());
    Value::Object(object)
}

/// A row of a library that a field names.
fn row(named: &Named) -> Value {
    let row = named.row;
    let unit = row.quantity().dimension.si_unit();
    json!({
        "field": named.field,
        "row": row.id,
        "text": row.said(),
        "value": { "si": row.typical, "unit": unit, "low": row.low, "high": row.high },
        "source": row.source,
        "how_known": row.how_known.words(),
    })
}

fn fault(cell: &str, error: &Diagnostic) -> Value {
    let mut text = error.message.clone();
    if let Some(hint) = &error.hint {
        text.push_str("; ");
        text.push_str(hint);
    }
    json!({ "code": error.code, "text": text, "place": place(cell, &error.place()) })
}

fn caution(cell: &str, caution: &Caution) -> Value {
    let field = caution
        .field
        .map(|field| format!("field {field}"))
        .unwrap_or_default();
    json!({ "code": caution.code, "text": caution.text, "place": place(cell, &field) })
}

fn place(cell: &str, rest: &str) -> String {
    match (cell.is_empty(), rest.is_empty()) {
        (true, _) => rest.to_owned(),
        (false, true) => format!("cell {cell}"),
        (false, false) => format!("cell {cell}, {rest}"),
    }
}

fn outputs(cell: &CellResult) -> Value {
    let mut outputs = Map::new();
    let mut rows: Vec<Map<String, Value>> = vec![Map::new(); cell.rows()];
    for figure in &cell.figures {
        let value = shown(&figure.shown);
        match figure.row {
            Some(row) => {
                let _ = rows[row].insert(key(figure), value);
            }
            None => {
                let _ = outputs.insert(key(figure), value);
            }
        }
    }
    if !rows.is_empty() {
        let rows: Vec<Value> = rows.into_iter().map(Value::Object).collect();
        let _ = outputs.insert("rows".to_owned(), json!({ "rows": rows }));
    }
    Value::Object(outputs)
}

fn key(figure: &Figure) -> String {
    match &figure.part {
        Some(part) => format!("{}.{part}", figure.name),
        None => figure.name.clone(),
    }
}

fn shown(shown: &Shown) -> Value {
    match shown {
        Shown::Quantity {
            quantity,
            low,
            high,
        } => {
            let mut object = number(*quantity);
            bounds(&mut object, low.map(Value::from), high.map(Value::from));
            Value::Object(object)
        }
        Shown::Time { span, low, high } => {
            let mut object = match span {
                Span::Seconds(seconds) => number(Quantity::new(*seconds, Dimension::TIME)),
                Span::Capped(seconds) => {
                    let mut object = number(Quantity::new(*seconds, Dimension::TIME));
                    let _ = object.insert("text".to_owned(), "not assessed beyond".into());
                    object
                }
                Span::Unlimited => word("unlimited"),
            };
            let end = |span: &Span| match span {
                Span::Seconds(seconds) | Span::Capped(seconds) => Some(Value::from(*seconds)),
                Span::Unlimited => None,
            };
            bounds(
                &mut object,
                low.as_ref().and_then(end),
                high.as_ref().and_then(end),
            );
            Value::Object(object)
        }
        Shown::Extent { extent, low, high } => {
            let mut object = match extent {
                Extent::At(distance) => number(Quantity::new(*distance, Dimension::LENGTH)),
                Extent::MetEverywhere | Extent::NotMetWithin(_) | Extent::NotAssessed => {
                    word(extent.words())
                }
            };
            let end = |extent: &Extent| match extent {
                Extent::At(distance) => Some(Value::from(*distance)),
                Extent::MetEverywhere | Extent::NotMetWithin(_) | Extent::NotAssessed => None,
            };
            bounds(
                &mut object,
                low.as_ref().and_then(end),
                high.as_ref().and_then(end),
            );
            if let Some(
                bound @ (Extent::MetEverywhere | Extent::NotMetWithin(_) | Extent::NotAssessed),
            ) = high
            {
                let _ = object.insert("high_text".to_owned(), bound.words().into());
            }
            Value::Object(object)
        }
        Shown::Word(text) => Value::Object(word(text)),
    }
}

fn number(quantity: Quantity) -> Map<String, Value> {
    let mut object = Map::new();
    let _ = object.insert("si".to_owned(), quantity.si.into());
    let _ = object.insert("unit".to_owned(), quantity.dimension.si_unit().into());
    object
}

fn word(text: &str) -> Map<String, Value> {
    let mut object = Map::new();
    let _ = object.insert("text".to_owned(), text.into());
    object
}

fn bounds(object: &mut Map<String, Value>, low: Option<Value>, high: Option<Value>) {
    if let Some(low) = low {
        let _ = object.insert("low".to_owned(), low);
    }
    if let Some(high) = high {
        let _ = object.insert("high".to_owned(), high);
    }
}
