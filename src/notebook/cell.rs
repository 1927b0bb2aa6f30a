//! One named item of a notebook: its kind, its fields as typed, and the table
//! of the fields that each kind may have.
//!
//! A kind lives in one file of `cell/`: its fields, its nodes and its outputs.
//! `DEVELOPERS.md` walks through adding one.

pub mod assessment;
pub mod curve;
pub mod field;
pub mod formula;
pub mod note;
pub mod position;
pub mod screen;
pub mod source;
pub mod surroundings;
pub mod value;
pub mod zone;

use std::borrow::Cow;
use std::fmt;

pub use field::{Basis, Content, Field, Form, Need, Spec};

/// The kinds of cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Kind {
    /// A quantity that a person gives.
    Value,
    /// A quantity worked out from others.
    Formula,
    /// The room: air and walls.
    Surroundings,
    /// A hot emitter: an opening, a pool or a body.
    Source,
    /// A barrier between a source and people.
    Screen,
    /// Where a person stands.
    Position,
    /// Irradiance along a line.
    Curve,
    /// A position judged by guidance.
    Assessment,
    /// The ground inside which one rule is not met.
    Zone,
    /// Words.
    Note,
}

impl Kind {
    /// All kinds, in the order in which the program lists them.
    pub const ALL: [Kind; 10] = [
        Kind::Value,
        Kind::Formula,
        Kind::Surroundings,
        Kind::Source,
        Kind::Screen,
        Kind::Position,
        Kind::Curve,
        Kind::Assessment,
        Kind::Zone,
        Kind::Note,
    ];

    /// Returns the kind's name, as it stands in a file.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Kind::Value => "value",
            Kind::Formula => "formula",
            Kind::Surroundings => "surroundings",
            Kind::Source => "source",
            Kind::Screen => "screen",
            Kind::Position => "position",
            Kind::Curve => "curve",
            Kind::Assessment => "assessment",
            Kind::Zone => "zone",
            Kind::Note => "note",
        }
    }

    /// Returns the kind of this name.
    #[must_use]
    pub fn from_name(name: &str) -> Option<Kind> {
        Kind::ALL.into_iter().find(|kind| kind.name() == name)
    }

    /// Returns the fields that a cell of this kind may have, in the order in
    /// which they are shown.
    #[must_use]
    pub const fn fields(self) -> &'static [Spec] {
        match self {
            Kind::Value => value::FIELDS,
            Kind::Formula => formula::FIELDS,
            Kind::Surroundings => surroundings::FIELDS,
            Kind::Source => source::FIELDS,
            Kind::Screen => screen::FIELDS,
            Kind::Position => position::FIELDS,
            Kind::Curve => curve::FIELDS,
            Kind::Assessment => assessment::FIELDS,
            Kind::Zone => zone::FIELDS,
            Kind::Note => note::FIELDS,
        }
    }

    /// Returns the names of the outputs that a cell of this kind works out.
    #[must_use]
    pub const fn outputs(self) -> &'static [&'static str] {
        match self {
            Kind::Value | Kind::Formula => &["value"],
            Kind::Surroundings => surroundings::OUTPUTS,
            Kind::Source => source::OUTPUTS,
            Kind::Screen => screen::OUTPUTS,
            Kind::Position => position::OUTPUTS,
            Kind::Curve => curve::OUTPUTS,
            Kind::Assessment => assessment::OUTPUTS,
            Kind::Zone => zone::OUTPUTS,
            Kind::Note => &[],
        }
    }

    /// Returns the output that the bare name of a cell of this kind stands
    /// for in an entry; `None` where a bare name means nothing.
    #[must_use]
    pub const fn main_output(self) -> Option<&'static str> {
        match self {
            Kind::Value | Kind::Formula => Some("value"),
            Kind::Source => Some("exitance"),
            Kind::Screen => Some("temperature"),
            Kind::Position => Some("irradiance"),
            Kind::Zone => Some("distance"),
            Kind::Surroundings | Kind::Curve | Kind::Assessment | Kind::Note => None,
        }
    }

    /// Returns whether cells of this kind are part of what all positions see.
    #[must_use]
    pub const fn is_in_scene(self) -> bool {
        matches!(self, Kind::Source | Kind::Screen | Kind::Surroundings)
    }

    /// Returns the field of this name.
    #[must_use]
    pub fn field(self, name: &str) -> Option<&'static Spec> {
        self.fields().iter().find(|spec| spec.name == name)
    }
}

impl fmt::Display for Kind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.name())
    }
}

/// One named item of a notebook, with its fields as typed, in file order.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// The name by which others refer to it, unique in its notebook.
    pub name: String,
    /// What it is.
    pub kind: Kind,
    /// The fields that were typed; a field left out is not here.
    pub fields: Vec<Field>,
}

impl Cell {
    /// Returns an empty cell.
    #[must_use]
    pub fn new(kind: Kind, name: impl Into<String>) -> Self {
        Cell {
            name: name.into(),
            kind,
            fields: Vec::new(),
        }
    }

    /// Returns this cell with a field added: for building notebooks in code.
    ///
    /// # Panics
    ///
    /// If the kind has no field of this name, which is a mistake of the code
    /// that calls.
    #[must_use]
    pub fn with(mut self, name: &str, text: impl Into<String>) -> Self {
        let spec = self
            .kind
            .field(name)
            .expect("the caller names a field of the kind");
        self.fields
            .push(Field::new(spec.name, Content::Text(text.into())));
        self
    }

    /// Returns the field of this name, if it was typed.
    #[must_use]
    pub fn field(&self, name: &str) -> Option<&Field> {
        self.fields.iter().find(|field| field.name == name)
    }

    /// Returns the text of the field of this name, if it was typed and is one
    /// text.
    #[must_use]
    pub fn text(&self, name: &str) -> Option<&str> {
        match &self.field(name)?.content {
            Content::Text(text) => Some(text),
            Content::List(_) | Content::Count(_) | Content::Pairs(_) => None,
        }
    }

    /// Returns the pairs of a field, if it was typed and holds them: as such,
    /// or as one text.
    #[must_use]
    pub fn pairs(&self, name: &str) -> Option<Cow<'_, [[String; 2]]>> {
        match &self.field(name)?.content {
            Content::Pairs(pairs) => Some(Cow::Borrowed(pairs)),
            Content::Text(text) => field::pairs(text).map(Cow::Owned),
            Content::List(_) | Content::Count(_) => None,
        }
    }

    /// Returns the text in which a fault is found: of a field, or of one entry
    /// of a field of pairs.
    #[must_use]
    pub fn faulty(&self, fault: &super::Diagnostic) -> Option<String> {
        let field = fault.field?;
        match fault.item {
            None => Some(self.field(field)?.content.to_text()),
            Some((pair, side)) => self
                .pairs(field)?
                .get(usize::from(pair))?
                .get(usize::from(side))
                .cloned(),
        }
    }

    /// Returns the texts of the field of this name: one, several, or none.
    #[must_use]
    pub fn texts(&self, name: &str) -> Vec<&str> {
        match self.field(name).map(|field| &field.content) {
            Some(Content::Text(text)) => vec![text.as_str()],
            Some(Content::List(list)) => list.iter().map(String::as_str).collect(),
            Some(Content::Count(_) | Content::Pairs(_)) | None => Vec::new(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_kind_is_found_by_its_name() {
        for kind in Kind::ALL {
            assert_eq!(Kind::from_name(kind.name()), Some(kind));
        }
        assert_eq!(Kind::from_name("Value"), None);
    }

    #[test]
    fn fields_and_outputs_of_a_kind_are_disjoint_and_unique() {
        for kind in Kind::ALL {
            let mut names: Vec<&str> = kind.fields().iter().map(|spec| spec.name).collect();
            names.extend(kind.outputs());
            // A value and a formula show their entry as `value`, which is no field.
            let mut unique = names.clone();
            unique.sort_unstable();
            unique.dedup();
            assert_eq!(names.len(), unique.len(), "{kind}: {names:?}");
        }
    }

    #[test]
    fn a_main_output_is_one_of_the_outputs() {
        for kind in Kind::ALL {
            if let Some(output) = kind.main_output() {
                assert!(kind.outputs().contains(&output), "{kind}: {output}");
            }
        }
    }
}
