//! From JSON to a notebook, collecting every fault.

use std::collections::BTreeSet;

use super::{Error, FORMAT, Fault};
use crate::json::{Member, Node, Place, Value};
use crate::notebook::cell::{Basis, Cell, Content, Field, Form, Kind, Spec};
use crate::notebook::name;
use crate::notebook::{Confirmation, Job, Notebook, engine};
use crate::spelling::nearest;

const TOP: [&str; 5] = ["farglow", "title", "job", "confirmed", "cells"];
const JOB: [&str; 7] = [
    "site",
    "area",
    "task",
    "revision",
    "prepared_by",
    "checked_by",
    "date",
];
const CONFIRMED: [&str; 4] = ["guidance", "edition", "by", "date"];
const WRAPPED: [&str; 3] = ["entry", "basis", "note"];

/// Faults in the order in which they were met.
#[derive(Default)]
struct Faults(Vec<Fault>);

impl Faults {
    fn add(&mut self, place: Place, path: &str, message: impl Into<String>) {
        // A file that is not a notebook at all would fill pages.
        const MOST: usize = 50;
        if self.0.len() < MOST {
            self.0.push(Fault {
                place,
                path: path.to_owned(),
                message: message.into(),
            });
        }
    }

    fn unknown(&mut self, member: &Member, path: &str, known: &[&str]) {
        let hint = nearest(&member.key, known.iter().copied()).map_or_else(
            || format!("known are {}", known.join(", ")),
            |near| format!("did you mean `{near}`?"),
        );
        self.add(
            member.key_place,
            path,
            format!("unknown field `{}`; {hint}", member.key),
        );
    }

    fn wrong(&mut self, node: &Node, path: &str, expected: &str) {
        self.add(
            node.place,
            path,
            format!("expected {expected}, found {}", node.value.kind()),
        );
    }
}

pub(super) fn notebook(node: &Node) -> Result<Notebook, Error> {
    let mut faults = Faults::default();
    let Some(members) = node.as_object() else {
        faults.wrong(node, "", "an object, `{ \"farglow\": 1, \"cells\": [] }`");
        return Err(Error::Faults(faults.0));
    };
    // The number decides whether anything else in the file can be judged.
    match node.get("farglow") {
        None => faults.add(
            node.place,
            "",
            format!(
                "expected `\"farglow\": {FORMAT}`, which says that this is a notebook, found none"
            ),
        ),
        Some(number) => match &number.value {
            Value::Number(value, written) if *value > f64::from(FORMAT) => {
                return Err(Error::Newer {
                    place: number.place,
                    found: written.clone(),
                });
            }
            Value::Number(value, _) if (*value - f64::from(FORMAT)).abs() < f64::EPSILON => {}
            Value::Number(_, written) => faults.add(
                number.place,
                "",
                format!("expected format {FORMAT}, found {written}"),
            ),
            _ => faults.wrong(number, "field farglow", "a format number"),
        },
    }
    let mut notebook = Notebook::default();
    for member in members {
        let value = &member.value;
        match member.key.as_str() {
            "farglow" => {}
            "title" => notebook.title = text(value, "field title", &mut faults),
            "job" => notebook.job = job(value, &mut faults),
            "confirmed" => notebook.confirmed = confirmed(value, &mut faults),
            "cells" => notebook.cells = cells(value, &mut faults),
            _ => faults.unknown(member, "", &TOP),
        }
    }
    if node.get("cells").is_none() {
        faults.add(node.place, "", "expected `cells`, a list, found none");
    }
    if faults.0.is_empty() {
        Ok(notebook)
    } else {
        Err(Error::Faults(faults.0))
    }
}

fn text(node: &Node, path: &str, faults: &mut Faults) -> Option<String> {
    if let Some(text) = node.as_text() {
        return Some(text.to_owned());
    }
    faults.wrong(node, path, "a text");
    None
}

fn job(node: &Node, faults: &mut Faults) -> Job {
    let mut job = Job::default();
    let Some(members) = node.as_object() else {
        faults.wrong(node, "field job", "an object");
        return job;
    };
    for member in members {
        let path = format!("field job, {}", member.key);
        match job.line_mut(&member.key) {
            Some(line) => *line = text(&member.value, &path, faults),
            None => faults.unknown(member, "field job", &JOB),
        }
    }
    job
}

fn confirmed(node: &Node, faults: &mut Faults) -> Vec<Confirmation> {
    let Some(nodes) = node.as_list() else {
        faults.wrong(node, "field confirmed", "a list");
        return Vec::new();
    };
    let mut list = Vec::with_capacity(nodes.len());
    for (at, node) in nodes.iter().enumerate() {
        let path = format!("confirmed {}", at + 1);
        let Some(members) = node.as_object() else {
            faults.wrong(node, &path, "an object");
            continue;
        };
        for member in members {
            if !CONFIRMED.contains(&member.key.as_str()) {
                faults.unknown(member, &path, &CONFIRMED);
            }
        }
        let mut line = |key: &str| match node.get(key) {
            Some(value) => text(value, &format!("{path}, {key}"), faults).unwrap_or_default(),
            None => {
                faults.add(
                    node.place,
                    &path,
                    format!("expected `{key}`, found none: a confirmation names limit, edition, person and date"),
                );
                String::new()
            }
        };
        let [guidance, edition, by, date] = CONFIRMED.map(&mut line);
        list.push(Confirmation {
            guidance,
            edition,
            by,
            date,
        });
    }
    list
}

fn cells(node: &Node, faults: &mut Faults) -> Vec<Cell> {
    let Some(nodes) = node.as_list() else {
        faults.wrong(node, "field cells", "a list");
        return Vec::new();
    };
    if nodes.len() > engine::MOST_CELLS {
        faults.add(
            node.place,
            "field cells",
            engine::Error::TooManyCells(nodes.len()).to_string(),
        );
        return Vec::new();
    }
    let mut cells = Vec::with_capacity(nodes.len());
    let mut names: BTreeSet<String> = BTreeSet::new();
    let mut room = false;
    for (at, node) in nodes.iter().enumerate() {
        let Some(cell) = cell(node, at + 1, faults) else {
            continue;
        };
        let path = format!("cell {} ({})", at + 1, cell.name);
        let place = node.get("name").map_or(node.place, |name| name.place);
        if let Err(error) = name::check(&cell.name) {
            faults.add(
                place,
                &format!("cell {}, field name", at + 1),
                error.to_string(),
            );
        } else if !names.insert(cell.name.clone()) {
            let error = name::Error::Taken(cell.name.clone());
            faults.add(place, &format!("{path}, field name"), error.to_string());
        }
        if cell.kind == Kind::Surroundings && std::mem::replace(&mut room, true) {
            faults.add(
                node.place,
                &path,
                "expected one cell of kind surroundings at most, found a second: remove one",
            );
        }
        cells.push(cell);
    }
    cells
}

fn cell(node: &Node, number: usize, faults: &mut Faults) -> Option<Cell> {
    let mut path = format!("cell {number}");
    let Some(members) = node.as_object() else {
        faults.wrong(node, &path, "an object");
        return None;
    };
    let name = match node.get("name") {
        Some(name) => text(name, &format!("{path}, field name"), faults)?,
        None => {
            faults.add(
                node.place,
                &path,
                "expected `name`, found none: every cell has one",
            );
            return None;
        }
    };
    if !name.is_empty() && name.chars().count() <= name::LONGEST {
        path = format!("cell {number} ({name})");
    }
    let kind = match node.get("kind") {
        Some(value) => {
            let word = text(value, &format!("{path}, field kind"), faults)?;
            let Some(kind) = Kind::from_name(&word) else {
                let known: Vec<&str> = Kind::ALL.iter().map(|kind| kind.name()).collect();
                let hint = nearest(&word, known.iter().copied()).map_or_else(
                    || format!("known are {}", known.join(", ")),
                    |near| format!("did you mean `{near}`?"),
                );
                faults.add(
                    value.place,
                    &format!("{path}, field kind"),
                    format!("unknown kind `{word}`; {hint}"),
                );
                return None;
            };
            kind
        }
        None => {
            faults.add(
                node.place,
                &path,
                "expected `kind`, found none: every cell has one",
            );
            return None;
        }
    };
    let mut cell = Cell::new(kind, name);
    for member in members {
        if matches!(member.key.as_str(), "name" | "kind") {
            continue;
        }
        let Some(spec) = kind.field(&member.key) else {
            let mut known: Vec<&str> = vec!["kind", "name"];
            known.extend(kind.fields().iter().map(|spec| spec.name));
            faults.unknown(member, &path, &known);
            continue;
        };
        let path = format!("{path}, field {}", spec.name);
        if let Some(field) = field(spec, &member.value, &path, faults) {
            cell.fields.push(field);
        }
    }
    Some(cell)
}

fn field(spec: &'static Spec, node: &Node, path: &str, faults: &mut Faults) -> Option<Field> {
    let Some(members) = node.as_object() else {
        let content = content(spec, node, path, faults)?;
        return Some(Field::new(spec.name, content));
    };
    if !matches!(spec.form, Form::Entry(_) | Form::Facing | Form::Pairs(_)) {
        faults.wrong(node, path, expected(spec.form));
        return None;
    }
    for member in members {
        if !WRAPPED.contains(&member.key.as_str()) {
            faults.unknown(member, path, &WRAPPED);
        }
    }
    let Some(entry) = node.get("entry") else {
        faults.add(node.place, path, "expected `entry`, found none");
        return None;
    };
    let mut field = Field::new(spec.name, content(spec, entry, path, faults)?);
    field.wrapped = true;
    if let Some(basis) = node.get("basis") {
        let words = text(basis, &format!("{path}, basis"), faults)?;
        field.basis = basis_of(&words, basis.place, path, faults);
    }
    if let Some(note) = node.get("note") {
        field.note = text(note, &format!("{path}, note"), faults);
    }
    Some(field)
}

fn basis_of(words: &str, place: Place, path: &str, faults: &mut Faults) -> Option<Basis> {
    let basis = Basis::from_words(words);
    if basis.is_none() {
        let known: Vec<&str> = Basis::ALL.iter().map(|basis| basis.words()).collect();
        faults.add(
            place,
            path,
            format!("unknown basis `{words}`; known are {}", known.join(", ")),
        );
    }
    basis
}

fn content(spec: &Spec, node: &Node, path: &str, faults: &mut Faults) -> Option<Content> {
    let content = match (spec.form, &node.value) {
        (Form::Count(..), Value::Number(number, _)) => Content::Count(*number),
        (Form::Basis, Value::Text(words)) => {
            let _ = basis_of(words, node.place, path, faults)?;
            Content::Text(words.clone())
        }
        (Form::GuidanceList, Value::List(nodes)) => {
            let mut list = Vec::with_capacity(nodes.len());
            for node in nodes {
                list.push(text(node, path, faults)?);
            }
            Content::List(list)
        }
        (Form::Pairs(_), Value::List(nodes)) => {
            let mut pairs = Vec::with_capacity(nodes.len());
            for (number, node) in nodes.iter().enumerate() {
                let path = format!("{path}[{number}]");
                let Some([one, other]) = node.as_list() else {
                    faults.wrong(node, &path, "a pair such as [\"0 m\", \"1 m\"]");
                    return None;
                };
                let one = text(one, &format!("{path}[0]"), faults);
                let other = text(other, &format!("{path}[1]"), faults);
                pairs.push([one?, other?]);
            }
            Content::Pairs(pairs)
        }
        (Form::Count(..), _) => {
            faults.wrong(node, path, expected(spec.form));
            return None;
        }
        (_, Value::Text(text)) => Content::Text(text.clone()),
        _ => {
            faults.wrong(node, path, expected(spec.form));
            return None;
        }
    };
    Some(content)
}

const fn expected(form: Form) -> &'static str {
    match form {
        Form::Entry(_) | Form::Facing => {
            "a text such as \"2.5 m\", or an object with entry, basis and note"
        }
        Form::Pairs(_) => {
            "a list of pairs such as [[\"0 m\", \"1 m\"]], or an object with entry, basis and note"
        }
        Form::GuidanceList => "the id of a limit, or a list of them",
        Form::Count(..) => "a whole number",
        Form::Word(_) | Form::Cell(_) | Form::Guidance | Form::Unit | Form::Basis | Form::Text => {
            "a text"
        }
    }
}
