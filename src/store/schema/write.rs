//! From a notebook to JSON, in a stable order.

use serde_json::{Map, Value, json};

use super::FORMAT;
use crate::notebook::cell::{Cell, Content, Field};
use crate::notebook::{Confirmation, Job, Notebook};

/// Returns a notebook as the JSON value that is stored.
#[must_use]
pub fn to_value(notebook: &Notebook) -> Value {
    let mut top = Map::new();
    put(&mut top, "farglow", FORMAT);
    if let Some(title) = &notebook.title {
        put(&mut top, "title", title.as_str());
    }
    if let Some(job) = job(&notebook.job) {
        put(&mut top, "job", job);
    }
    if !notebook.confirmed.is_empty() {
        let list: Vec<Value> = notebook.confirmed.iter().map(confirmation).collect();
        put(&mut top, "confirmed", list);
    }
    let cells: Vec<Value> = notebook.cells.iter().map(cell).collect();
    put(&mut top, "cells", cells);
    Value::Object(top)
}

fn put(map: &mut Map<String, Value>, key: &str, value: impl Into<Value>) {
    let _ = map.insert(key.to_owned(), value.into());
}

fn job(job: &Job) -> Option<Value> {
    let mut map = Map::new();
    for (name, text) in job.lines() {
        if let Some(text) = text {
            put(&mut map, name, text);
        }
    }
    (!map.is_empty()).then_some(Value::Object(map))
}

fn confirmation(confirmation: &Confirmation) -> Value {
    json!({
        "guidance": confirmation.guidance,
        "edition": confirmation.edition,
        "by": confirmation.by,
        "date": confirmation.date,
    })
}

fn cell(cell: &Cell) -> Value {
    let mut map = Map::new();
    put(&mut map, "kind", cell.kind.name());
    put(&mut map, "name", cell.name.as_str());
    for field in &cell.fields {
        put(&mut map, field.name, self::field(field));
    }
    Value::Object(map)
}

fn field(field: &Field) -> Value {
    let content = match &field.content {
        Content::Text(text) => Value::from(text.as_str()),
        Content::List(list) => Value::from(list.as_slice()),
        Content::Count(number) => count(*number),
        Content::Pairs(pairs) => pairs
            .iter()
            .map(|pair| Value::from(pair.as_slice()))
            .collect(),
    };
    if !field.wrapped && field.basis.is_none() && field.note.is_none() {
        return content;
    }
    let mut map = Map::new();
    put(&mut map, "entry", content);
    if let Some(basis) = field.basis {
        put(&mut map, "basis", basis.words());
    }
    if let Some(note) = &field.note {
        put(&mut map, "note", note.as_str());
    }
    Value::Object(map)
}

/// A whole number is written without a point.
fn count(number: f64) -> Value {
    const EXACT: f64 = 9_007_199_254_740_992.0;
    if number.fract() == 0.0 && number.abs() < EXACT {
        // Whole and below 2^53, so the cast loses nothing.
        #[allow(clippy::cast_possible_truncation)]
        return Value::from(number as i64);
    }
    Value::from(number)
}
