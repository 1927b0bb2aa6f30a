//! The gate: a guidance file becomes limits, or a list of faults with places.
//!
//! Shipped files and a user's own pass through it alike. Every fault is
//! collected; what ties rows to one another is checked in `link`.

use super::error::{irradiance, seconds};
use super::form::Form;
use super::gate::{Gate, Object, fault};
use super::written::{self, Written};
use super::{Fault, HowKnown, Limit, Metric, Organ, Origin, Piece, Standing};
use crate::json::{self, Node, Place, Value};

const FIELDS: [&str; 21] = [
    "id",
    "title",
    "document",
    "issuer",
    "edition",
    "clause",
    "reference",
    "reference_how_known",
    "standing",
    "jurisdiction",
    "effect",
    "organ",
    "metric",
    "from",
    "limit",
    "continued_by",
    "valid",
    "how_known",
    "band_how_known",
    "where_known",
    "caution",
];
const METRIC_FIELDS: [&str; 3] = ["quantity", "band", "weighting"];
const PIECE_FIELDS: [&str; 3] = ["until", "before", "limit"];

/// The most limits in one file, and pieces in one limit: more are no guidance for people.
const MOST: usize = 1000;

/// A limit as read, with the places that linking may have to name.
pub(super) struct Read {
    pub(super) limit: Limit,
    pub(super) file: String,
    pub(super) id_place: Place,
    pub(super) from_place: Place,
    pub(super) continued_place: Place,
}

impl Read {
    /// Returns a fault of this limit's field `field` at `place`.
    pub(super) fn fault(&self, place: Place, field: &str, message: String) -> Fault {
        fault(
            &self.file,
            place,
            format!("{}, {field}", self.limit.id),
            message,
        )
    }
}

/// Returns a fault of the JSON itself; its text would give the place a second time.
fn syntax(file: &str, error: &json::Error) -> Fault {
    let text = error.to_string();
    let message = text
        .strip_prefix(&format!("{}: ", error.place))
        .unwrap_or(&text)
        .to_owned();
    fault(file, error.place, String::new(), message)
}

/// Reads one file: one limit, or a list of them.
///
/// # Errors
///
/// Every fault of the file, in the order of the file.
pub(super) fn file(name: &str, bytes: &[u8], origin: &Origin) -> Result<Vec<Read>, Vec<Fault>> {
    let root = json::parse(bytes).map_err(|error| vec![syntax(name, &error)])?;
    let nodes = match &root.value {
        Value::List(nodes) => nodes.as_slice(),
        _ => std::slice::from_ref(&root),
    };
    let mut gate = Gate {
        file: name,
        origin,
        faults: Vec::new(),
    };
    if nodes.is_empty() {
        gate.refuse(
            root.place,
            "",
            "expected at least one limit, found an empty list".to_owned(),
        );
    }
    if nodes.len() > MOST {
        let found = nodes.len();
        let message = format!("expected at most {MOST} limits in a file, found {found}: split it");
        gate.refuse(root.place, "", message);
        return Err(gate.faults);
    }
    let limits: Vec<Option<Read>> = nodes
        .iter()
        .enumerate()
        .map(|(at, node)| gate.limit(node, at + 1))
        .collect();
    if gate.faults.is_empty() {
        Ok(limits.into_iter().flatten().collect())
    } else {
        Err(gate.faults)
    }
}

impl Gate<'_> {
    fn limit(&mut self, node: &Node, number: usize) -> Option<Read> {
        let named = match &node.value {
            Value::Object(members) => members.iter().find(|m| m.key == "id"),
            _ => None,
        };
        let name = match named.map(|member| &member.value.value) {
            Some(Value::Text(id)) if !id.trim().is_empty() => id.clone(),
            _ => format!("limit {number}"),
        };
        let object = self.object(node, name, &FIELDS)?;
        let cited = "a limit without its citation is not used";
        let id = self.id(&object);
        let title = self.text(&object, "title", "say in a few words what it limits");
        let document = self.text(&object, "document", cited);
        let issuer = self.text(&object, "issuer", cited);
        let edition = self.text(&object, "edition", cited);
        let clause = self.text(&object, "clause", cited);
        let reference = self.optional(&object, "reference").unwrap_or_default();
        let standing = self.word(
            &object,
            "standing",
            "say what weight it carries",
            &Standing::ALL.map(Standing::word),
            Standing::from_word,
        );
        let jurisdiction = self.text(&object, "jurisdiction", "say where it holds");
        let effect = self.text(&object, "effect", "say which harm it guards against");
        let organ = self.word(
            &object,
            "organ",
            "say what it protects",
            &Organ::ALL.map(Organ::name),
            Organ::from_name,
        );
        let metric = self.metric(&object);
        let from = match object.get("from") {
            Some(_) => self.time(&object, "from"),
            None => Some(0.0),
        };
        let pieces = match (metric, from) {
            (Some(metric), Some(from)) => self.pieces(&object, metric, from),
            _ => None,
        };
        let continued_by = self.optional(&object, "continued_by").map(str::to_owned);
        if let (Some(next), Some(pieces)) = (&continued_by, &pieces)
            && pieces.last().is_some_and(|piece| piece.until.is_none())
        {
            let place = object.place_of("continued_by");
            self.refuse(
                place,
                &object.field("continued_by"),
                format!("`{next}` cannot continue a limit that has no end: give its last piece an `until` or `before`"),
            );
        }
        let valid = self.text(
            &object,
            "valid",
            "say where it applies, and to which side its bounds belong",
        );
        let how_known = self.how_known(&object, "how_known", "its numbers are");
        let band_how_known = self.how_known(&object, "band_how_known", "its band is");
        let reference_how_known = match object.get("reference_how_known") {
            Some(_) => self.how_known(&object, "reference_how_known", "the reference is"),
            None => Some(HowKnown::Memory),
        };
        let where_known = self.text(&object, "where_known", "say where it was read");
        let caution = self.text(&object, "caution", "say what must be said beside it");
        Some(Read {
            limit: Limit {
                id: id?,
                title: title?.to_owned(),
                document: document?.to_owned(),
                issuer: issuer?.to_owned(),
                edition: edition?.to_owned(),
                clause: clause?.to_owned(),
                reference: reference.to_owned(),
                standing: standing?,
                jurisdiction: jurisdiction?.to_owned(),
                effect: effect?.to_owned(),
                organ: organ?,
                metric: metric?,
                from: from?,
                pieces: pieces?,
                continued_by,
                valid: valid?.to_owned(),
                how_known: how_known?,
                band_how_known: band_how_known?,
                reference_how_known: reference_how_known?,
                where_known: where_known?.to_owned(),
                caution: caution?.to_owned(),
                origin: self.origin.clone(),
            },
            file: self.file.to_owned(),
            id_place: object.place_of("id"),
            from_place: object.place_of("from"),
            continued_place: object.place_of("continued_by"),
        })
    }

    fn id(&mut self, object: &Object<'_>) -> Option<String> {
        let id = self.text(object, "id", "notebooks call a limit by its id")?;
        let legal = id.len() <= 60
            && id.starts_with(|c: char| c.is_ascii_lowercase())
            && !id.ends_with('-')
            && id
                .chars()
                .all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-');
        if !legal {
            self.refuse(
                object.place_of("id"),
                &object.field("id"),
                format!(
                    "expected small letters a to z, digits and hyphens, beginning with a letter, at most 60, found `{id}`"
                ),
            );
            return None;
        }
        Some(id.to_owned())
    }

    fn metric(&mut self, object: &Object<'_>) -> Option<Metric> {
        let Some(node) = object.get("metric") else {
            self.refuse(
                object.place,
                &object.name,
                "the field `metric` is missing: say which quantity, band and weighting it limits"
                    .to_owned(),
            );
            return None;
        };
        let metric = self.object(node, object.field("metric"), &METRIC_FIELDS)?;
        let why = "a metric is named by quantity, band and weighting";
        let [quantity, band, weighting] = METRIC_FIELDS.map(|key| self.text(&metric, key, why));
        let (quantity, band, weighting) = (quantity?, band?, weighting?);
        let found = Metric::from_written(quantity, band, weighting);
        if found.is_none() {
            let known: Vec<String> = Metric::ALL
                .iter()
                .map(|metric| metric.written().join(" / "))
                .collect();
            self.refuse(
                node.place,
                &metric.name,
                format!(
                    "unknown metric {quantity} / {band} / {weighting}: expected one of {}",
                    known.join("; ")
                ),
            );
        }
        found
    }

    /// Returns a field that is an exposure time greater than zero, in seconds.
    fn time(&mut self, object: &Object<'_>, key: &str) -> Option<f64> {
        let text = self.optional(object, key)?;
        let messages = match written::time(text) {
            Ok(time) if time > 0.0 => return Some(time),
            Ok(time) => vec![format!(
                "expected a time greater than zero, found {}",
                seconds(time)
            )],
            Err(messages) => messages,
        };
        for message in messages {
            self.refuse(object.place_of(key), &object.field(key), message);
        }
        None
    }

    fn pieces(&mut self, object: &Object<'_>, metric: Metric, from: f64) -> Option<Vec<Piece>> {
        let nodes = match object.get("limit") {
            Some(Node {
                value: Value::List(nodes),
                ..
            }) if (1..=MOST).contains(&nodes.len()) => nodes,
            other => {
                let found = other.map_or("none", |node| node.value.kind());
                self.refuse(
                    other.map_or(object.place, |node| node.place),
                    &object.field("limit"),
                    format!(
                        "expected a list of 1 to {MOST} pieces with `until` or `before`, and `limit`, found {found}"
                    ),
                );
                return None;
            }
        };
        let mut pieces: Vec<Piece> = Vec::with_capacity(nodes.len());
        let mut start = from;
        for (at, node) in nodes.iter().enumerate() {
            let name = object.field(&format!("piece {}", at + 1));
            let last = at + 1 == nodes.len();
            let piece = self.piece(node, name.clone(), metric, start, last)?;
            if let Some(before) = pieces.last()
                && piece.form.at(start) > before.form.at(start) * (1.0 + 1e-12)
            {
                self.refuse(
                    node.place,
                    &name,
                    format!(
                        "expected a limit that never rises with time, found a step up from {} to {} at {}",
                        irradiance(before.form.at(start)), irradiance(piece.form.at(start)), seconds(start)
                    ),
                );
            }
            start = piece.until.unwrap_or(f64::MAX);
            pieces.push(piece);
        }
        Some(pieces)
    }

    fn piece(
        &mut self,
        node: &Node,
        name: String,
        metric: Metric,
        start: f64,
        last: bool,
    ) -> Option<Piece> {
        let piece = self.object(node, name, &PIECE_FIELDS)?;
        let (until, includes_end) = match (piece.get("until"), piece.get("before")) {
            (Some(_), Some(_)) => {
                self.refuse(
                    piece.place,
                    &piece.name,
                    "expected `until` (the end belongs to the piece) or `before` (it does not), found both".to_owned(),
                );
                return None;
            }
            (Some(_), None) => (Some(self.time(&piece, "until")?), true),
            (None, Some(_)) => (Some(self.time(&piece, "before")?), false),
            (None, None) if last => (None, false),
            (None, None) => {
                self.refuse(
                    piece.place,
                    &piece.name,
                    "expected an end, found none: only the last piece may go on for ever"
                        .to_owned(),
                );
                return None;
            }
        };
        if let Some(end) = until.filter(|&end| end <= start) {
            self.refuse(
                piece.place,
                &piece.name,
                format!(
                    "expected an end later than its start at {}, found {}",
                    seconds(start),
                    seconds(end)
                ),
            );
            return None;
        }
        let text = self.text(&piece, "limit", "say what the limit is")?;
        let form = Written::limit(text, metric.dimension()).and_then(|written| {
            Form::new(written, metric.is_dose(), start, until).map_err(|message| vec![message])
        });
        match form {
            Ok(form) => Some(Piece {
                until,
                includes_end,
                limit: text.to_owned(),
                form,
            }),
            Err(messages) => {
                for message in messages {
                    self.refuse(piece.place_of("limit"), &piece.field("limit"), message);
                }
                None
            }
        }
    }
}
