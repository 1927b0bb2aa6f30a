//! The wording of what the token pass refuses.

use crate::entry::Diagnostic;
use crate::entry::function::{CONSTANTS, FUNCTIONS};
use crate::spelling::nearest;
use crate::units::Unit;

pub(super) fn too_long() -> Diagnostic {
    Diagnostic::new("too-long", "expected at most 1000 characters, found more")
        .with_hint("move parts of it into cells of their own and use their names")
}

pub(super) fn empty() -> Diagnostic {
    Diagnostic::new(
        "empty",
        "expected a quantity or an expression, found nothing",
    )
    .with_hint("write a quantity such as `2.5 m`, or an expression such as `door.width / 2`")
}

pub(super) fn too_deep() -> Diagnostic {
    Diagnostic::new(
        "too-deep",
        "expected at most 64 brackets within one another, found more",
    )
    .with_hint("move the inner part into a cell of its own and use its name")
}

pub(super) fn expected_value(found: &str) -> Diagnostic {
    Diagnostic::new("missing-value", format!("expected a value, found {found}"))
        .with_hint("write a quantity, a name or an expression in brackets here")
}

pub(super) fn expected_operator(found: &str, thousands: bool) -> Diagnostic {
    let hint = if thousands {
        "write a number without spaces: `1250`"
    } else {
        "write an operator such as `*` between the two values"
    };
    Diagnostic::new(
        "missing-operator",
        format!("expected an operator, found {found}"),
    )
    .with_hint(hint)
}

pub(super) fn second_point() -> Diagnostic {
    Diagnostic::new("missing-operator", "expected an operator, found a point")
        .with_hint("a number has one decimal point, and a name has none before it")
}

pub(super) fn sign_run() -> Diagnostic {
    Diagnostic::new(
        "sign-run",
        "expected one sign before a value, found several",
    )
    .with_hint("write one sign, or brackets: `-(-x)`")
}

pub(super) fn prefix_plus() -> Diagnostic {
    Diagnostic::new("prefix-plus", "expected a value, found `+`")
        .with_hint("leave the plus out: a value without a sign is positive")
}

pub(super) fn power_chain() -> Diagnostic {
    Diagnostic::new("power-chain", "expected one power, found a chain of them")
        .with_hint("write which one you mean: `(a^b)^c` or `a^(b^c)`")
}

pub(super) fn power_after_unit(symbol: &str) -> Diagnostic {
    Diagnostic::new(
        "power-after-unit",
        format!("expected a power that is clear, found `^` behind the unit `{symbol}`"),
    )
    .with_hint(if symbol.chars().all(char::is_alphabetic) {
        format!(
            "write `{symbol}^2` without spaces for the unit, or brackets round the quantity: `(3 {symbol})^2`"
        )
    } else {
        format!("write brackets round the quantity: `(3 {symbol})^2`")
    })
}

/// `before` and `after` are the digits on both sides of the comma: the remedy
/// shows the number that was typed, and never guesses between 1370 and 1.370.
pub(super) fn decimal_comma(is_call: bool, before: &str, after: &str) -> Diagnostic {
    let mut hint = if after.len() == 3 {
        format!(
            "if the comma parts thousands, write `{before}{after}`; if it is a decimal comma, \
             write `{before}.{after}`"
        )
    } else {
        format!("write a decimal point: `{before}.{after}`")
    };
    if is_call {
        hint.push_str("; arguments are separated by a comma and a space, as in `max(2, 5)`");
    }
    Diagnostic::new("decimal-comma", "expected one number, found a comma in it").with_hint(hint)
}

pub(super) fn stray_comma() -> Diagnostic {
    Diagnostic::new(
        "stray-comma",
        "expected one value, found a comma outside of a function's brackets",
    )
    .with_hint("write a decimal point in numbers; only arguments are separated by a comma")
}

pub(super) fn unmatched_close() -> Diagnostic {
    Diagnostic::new(
        "unmatched-bracket",
        "expected an opening bracket before this `)`, found none",
    )
    .with_hint("remove it, or open one before")
}

pub(super) fn unclosed() -> Diagnostic {
    Diagnostic::new(
        "unmatched-bracket",
        "expected `)` for this bracket, found the end",
    )
    .with_hint("close the bracket")
}

pub(super) fn empty_brackets() -> Diagnostic {
    Diagnostic::new(
        "empty-brackets",
        "expected a value between the brackets, found none",
    )
    .with_hint("write a value, or remove the brackets")
}

pub(super) fn stray_spread() -> Diagnostic {
    Diagnostic::new(
        "stray-spread",
        "expected `±` between two numbers, found it elsewhere",
    )
    .with_hint(
        "write number ± number unit, such as `1250 ± 25 °C`; the unit stands once, behind both",
    )
}

pub(super) fn comment() -> Diagnostic {
    Diagnostic::new("comment", "expected an expression, found a comment")
        .with_hint("write it into the note of the field")
}

pub(super) fn string() -> Diagnostic {
    Diagnostic::new(
        "string",
        "expected a quantity, found text in quotation marks",
    )
    .with_hint("leave the quotation marks out")
}

pub(super) fn assignment() -> Diagnostic {
    Diagnostic::new("assignment", "expected an expression, found an assignment")
        .with_hint("give the value a cell of its own; to compare, write `==`")
}

pub(super) fn chain() -> Diagnostic {
    Diagnostic::new("chain", "expected one expression, found `;`")
        .with_hint("write each expression into a cell of its own")
}

pub(super) fn conditional() -> Diagnostic {
    Diagnostic::new(
        "conditional",
        "expected an expression without conditions, found one",
    )
    .with_hint("use `min`, `max` or a comparison, or a cell for each case")
}

pub(super) fn percent() -> Diagnostic {
    Diagnostic::new(
        "percent",
        "expected an operator, found `%`, which is only ever a unit",
    )
    .with_hint("write it behind a number: `6 %`")
}

pub(super) fn superscript() -> Diagnostic {
    Diagnostic::new(
        "superscript",
        "expected an operator, found a raised digit outside of a unit",
    )
    .with_hint("write a power with `^`: `x^2`")
}

pub(super) fn doubled(sign: char) -> Diagnostic {
    let hint = match sign {
        '*' => "write `^` for a power",
        '&' => "write `&&` for and",
        _ => "write `||` for or",
    };
    let message = match sign {
        '*' => "expected one `*`, found two".to_owned(),
        _ => format!("expected two `{sign}`, found one"),
    };
    Diagnostic::new("operator", message).with_hint(hint)
}

pub(super) fn sign_not_allowed(sign: char) -> Diagnostic {
    let shown = if sign.is_control() {
        format!("U+{:04X}", u32::from(sign))
    } else {
        format!("`{sign}`")
    };
    let hint = match sign {
        '[' | ']' | '{' | '}' => "write round brackets",
        '÷' | '∕' | '⁄' => "write `/`",
        '–' | '—' => "write a minus, `-`",
        '√' => "write `sqrt(…)`",
        'π' => "write `pi`",
        _ if sign.is_alphabetic() => "names have Latin letters, digits and `_`",
        _ => "allowed are numbers, names, units, and + - * / ^ ( ) < > == != && || !",
    };
    Diagnostic::new(
        "character",
        format!("expected a value or an operator, found {shown}"),
    )
    .with_hint(hint)
}

pub(super) fn name_too_long() -> Diagnostic {
    Diagnostic::new(
        "name-too-long",
        "expected a name of at most 40 characters, found a longer one",
    )
    .with_hint("check the name of the cell")
}

pub(super) fn broken_member(name: &str) -> Diagnostic {
    Diagnostic::new(
        "broken-name",
        format!("expected a field or output behind `{name}.`, found none"),
    )
    .with_hint("write it without spaces, such as `door.width`")
}

pub(super) fn too_many_members() -> Diagnostic {
    Diagnostic::new(
        "broken-name",
        "expected at most two dots in a name, found more",
    )
    .with_hint("write cell, output and source, such as `charger.irradiance_from.door`")
}

pub(super) fn bare_unit(symbol: &str) -> Diagnostic {
    Diagnostic::new(
        "bare-unit",
        format!("expected a value, found the bare unit `{symbol}`"),
    )
    .with_hint(format!("write `1 {symbol}`"))
}

pub(super) fn bare_function(name: &str) -> Diagnostic {
    if Unit::symbols().contains(&name) {
        let hint =
            format!("write `1 {name}` for the unit, or its arguments in brackets: `{name}(…)`");
        return Diagnostic::new(
            "bare-unit",
            format!("expected a value, found the bare unit `{name}`"),
        )
        .with_hint(hint);
    }
    Diagnostic::new(
        "bare-function",
        format!("expected a value, found the function `{name}` without its brackets"),
    )
    .with_hint(format!("write its arguments in brackets: `{name}(…)`"))
}

pub(super) fn reserved_word(name: &str) -> Diagnostic {
    let hint = match name {
        "e" => "write `exp(1)`",
        "true" | "false" => "write a comparison such as `door.width > 1 m`",
        _ => "write a finite number",
    };
    Diagnostic::new(
        "reserved-word",
        format!("expected a value, found the reserved word `{name}`"),
    )
    .with_hint(hint)
}

pub(super) fn member_of_reserved(name: &str) -> Diagnostic {
    Diagnostic::new(
        "reserved-word",
        format!("expected the name of a cell before the dot, found the reserved word `{name}`"),
    )
    .with_hint("no cell can have this name: check it")
}

pub(super) fn unknown_function(name: &str) -> Diagnostic {
    let functions = FUNCTIONS.iter().map(|function| function.name);
    let message = format!("unknown function `{name}`");
    match nearest(name, functions) {
        Some(near) => Diagnostic::new(
            "unknown-function",
            format!("{message}, did you mean `{near}`?"),
        )
        .with_hint(format!("write `{near}(…)`")),
        None if CONSTANTS.iter().any(|constant| constant.name == name) => {
            Diagnostic::new("unknown-function", message).with_hint("a constant has no brackets")
        }
        None => {
            let known: Vec<&str> = FUNCTIONS.iter().map(|function| function.name).collect();
            Diagnostic::new("unknown-function", message).with_hint(format!(
                "known are {}; for a product write `*` before the bracket",
                known.join(", ")
            ))
        }
    }
}
