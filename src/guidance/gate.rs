//! Fields of a guidance file: taken out one by one, each fault kept with its place.

use super::{Fault, HowKnown, Origin};
use crate::json::{Member, Node, Place, Value};
use crate::spelling::nearest;

/// Returns a fault of a file.
pub(super) fn fault(file: &str, place: Place, field: String, message: String) -> Fault {
    Fault {
        file: file.to_owned(),
        place,
        field,
        message,
    }
}

/// The faults of one file, gathered while its fields are read.
pub(super) struct Gate<'a> {
    pub(super) file: &'a str,
    pub(super) origin: &'a Origin,
    pub(super) faults: Vec<Fault>,
}

/// One object of the file, with the words that name it in faults.
pub(super) struct Object<'a> {
    pub(super) place: Place,
    pub(super) name: String,
    members: &'a [Member],
}

impl<'a> Object<'a> {
    pub(super) fn get(&self, key: &str) -> Option<&'a Node> {
        self.members
            .iter()
            .find(|member| member.key == key)
            .map(|member| &member.value)
    }

    /// Returns the place of a field's value, or of the object if it has none.
    pub(super) fn place_of(&self, key: &str) -> Place {
        self.get(key).map_or(self.place, |node| node.place)
    }

    /// Returns the name of one of its fields.
    pub(super) fn field(&self, key: &str) -> String {
        format!("{}, {key}", self.name)
    }
}

impl Gate<'_> {
    pub(super) fn refuse(&mut self, place: Place, field: &str, message: String) {
        self.faults
            .push(fault(self.file, place, field.to_owned(), message));
    }

    /// Returns a node as an object that has no fields but those known.
    pub(super) fn object<'n>(
        &mut self,
        node: &'n Node,
        name: String,
        known: &[&str],
    ) -> Option<Object<'n>> {
        let Value::Object(members) = &node.value else {
            self.refuse(
                node.place,
                &name,
                format!(
                    "expected an object with the fields {}, found {}",
                    known.join(", "),
                    node.value.kind()
                ),
            );
            return None;
        };
        for member in members {
            if !known.contains(&member.key.as_str()) {
                let remedy = nearest(&member.key, known.iter().copied()).map_or_else(
                    || format!("; the fields are {}", known.join(", ")),
                    |near| format!(", did you mean `{near}`?"),
                );
                self.refuse(
                    member.key_place,
                    &name,
                    format!("unknown field `{}`{remedy}", member.key),
                );
            }
        }
        Some(Object {
            place: node.place,
            name,
            members,
        })
    }

    /// Returns a field that may be absent, as text that is not blank.
    pub(super) fn optional<'n>(&mut self, object: &Object<'n>, key: &str) -> Option<&'n str> {
        let node = object.get(key)?;
        match &node.value {
            Value::Text(text) if !text.trim().is_empty() => Some(text),
            Value::Text(_) => {
                self.refuse(
                    node.place,
                    &object.field(key),
                    "expected text, found none between the quotation marks".to_owned(),
                );
                None
            }
            _ => {
                self.refuse(
                    node.place,
                    &object.field(key),
                    format!(
                        "expected text in quotation marks, found {}",
                        node.value.kind()
                    ),
                );
                None
            }
        }
    }

    /// Returns a field that must be there, as text that is not blank.
    pub(super) fn text<'n>(
        &mut self,
        object: &Object<'n>,
        key: &str,
        why: &str,
    ) -> Option<&'n str> {
        if object.get(key).is_none() {
            self.refuse(
                object.place,
                &object.name,
                format!("the field `{key}` is missing: {why}"),
            );
            return None;
        }
        self.optional(object, key)
    }

    /// Returns a field whose text must be one of a few words.
    pub(super) fn word<T>(
        &mut self,
        object: &Object<'_>,
        key: &str,
        why: &str,
        words: &[&'static str],
        from_word: impl Fn(&str) -> Option<T>,
    ) -> Option<T> {
        let text = self.text(object, key, why)?;
        let value = from_word(text);
        if value.is_none() {
            let remedy = nearest(text, words.iter().copied())
                .map_or_else(String::new, |near| format!(", did you mean `{near}`?"));
            self.refuse(
                object.place_of(key),
                &object.field(key),
                format!(
                    "expected one of `{}`, found `{text}`{remedy}",
                    words.join("`, `")
                ),
            );
        }
        value
    }

    pub(super) fn how_known(
        &mut self,
        object: &Object<'_>,
        key: &str,
        of: &str,
    ) -> Option<HowKnown> {
        let why = format!("say how {of} known, and never more surely than so");
        self.word(
            object,
            key,
            &why,
            &HowKnown::ALL.map(HowKnown::word),
            HowKnown::from_word,
        )
    }
}
