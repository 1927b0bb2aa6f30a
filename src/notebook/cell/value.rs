//! A quantity that a person gives.

use super::field::{Expect, Form, Need, Spec};

/// The fields of a value.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "entry",
        form: Form::Entry(Expect::ANYTHING),
        need: Need::Required,
        about: "the quantity, such as `1250 ± 25 °C`",
    },
    Spec {
        name: "basis",
        form: Form::Basis,
        need: Need::Optional,
        about: "where the quantity came from",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];
