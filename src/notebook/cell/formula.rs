//! A quantity worked out from others.

use super::field::{Expect, Form, Need, Spec};

/// The fields of a formula.
pub const FIELDS: &[Spec] = &[
    Spec {
        name: "entry",
        form: Form::Entry(Expect::ANYTHING),
        need: Need::Required,
        about: "the expression, such as `door.width * door.height`",
    },
    Spec {
        name: "unit",
        form: Form::Unit,
        need: Need::Optional,
        about: "the unit to show the result in; the result must have its dimension",
    },
    Spec {
        name: "note",
        form: Form::Text,
        need: Need::Optional,
        about: "a remark",
    },
];
