//! Words.

use super::field::{Form, Need, Spec};

/// The fields of a note.
pub const FIELDS: &[Spec] = &[Spec {
    name: "text",
    form: Form::Text,
    need: Need::Required,
    about: "the words",
}];
