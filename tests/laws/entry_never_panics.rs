//! Whatever is typed, an entry is read or refused with a place and a remedy,
//! and what it comes to is finite.

use farglow::entry::{Diagnostic, Entry, Outcome};
use farglow::units::{Literal, Quantity, Unit};
use proptest::prelude::*;

/// Checks one text, and returns whether it was read.
fn survives(text: &str) -> Result<bool, TestCaseError> {
    let _ = Unit::parse(text);
    let _ = Unit::longest(text);
    if let Ok(literal) = Literal::read(text) {
        prop_assert!(literal.length <= text.len());
        prop_assert!(literal.quantity().si.is_finite(), "{text:?}");
        prop_assert!(text.is_char_boundary(literal.length), "{text:?}");
    }
    let entry = match Entry::parse(text) {
        Ok(entry) => entry,
        Err(faults) => {
            prop_assert!(!faults.is_empty(), "{text:?} is refused without a fault");
            for fault in &faults {
                has_place_and_remedy(text, fault)?;
            }
            return Ok(false);
        }
    };
    let names = vec![Quantity::number(2.0); entry.names().len()];
    match entry.evaluate(&names, entry.nominal_literals()) {
        Ok(Outcome::Quantity(quantity)) => prop_assert!(quantity.si.is_finite(), "{text:?}"),
        Ok(Outcome::Truth(_)) => {}
        Err(fault) => has_place_and_remedy(text, &fault)?,
    }
    prop_assert_eq!(entry.renamed("x", "x"), text);
    Ok(true)
}

fn has_place_and_remedy(text: &str, fault: &Diagnostic) -> Result<(), TestCaseError> {
    let length = text.chars().count();
    if let Some(span) = &fault.span {
        prop_assert!(
            span.start <= span.end && span.end <= length,
            "{text:?}: {fault:?}"
        );
    }
    prop_assert!(
        fault.code != "syntax",
        "the parser met what the tokens allow: {text:?}: {fault}"
    );
    prop_assert!(
        fault.hint.is_some() || fault.code == "dimension",
        "{text:?}: {fault:?}"
    );
    Ok(())
}

const SOUP: &[&str] = &[
    "1",
    "2.5",
    "1e3",
    "1e999",
    "0",
    "x",
    "door.width",
    "a.b.c",
    "pi",
    "e",
    "true",
    "sqrt(",
    "max(",
    "min(",
    "if(",
    "(",
    ")",
    ",",
    ", ",
    "+",
    "-",
    "−",
    "*",
    "·",
    "×",
    "/",
    "^",
    "==",
    "!=",
    "<",
    ">=",
    "≤",
    "&&",
    "||",
    "!",
    "=",
    ";",
    "?",
    ":",
    "±",
    "+-",
    "%",
    "m",
    " m",
    " °C",
    " W/m²",
    " kcal/(m²·h)",
    "m2",
    "²",
    "°",
    "µm",
    "//",
    "/*",
    "\"",
    "#",
    ".",
    " ",
    "  ",
    "\t",
    "\u{202f}",
    "ü",
    "𝛑",
    "\u{0}",
];

proptest! {
    #![proptest_config(ProptestConfig { cases: 3_000, ..ProptestConfig::default() })]

    #[test]
    fn random_text_is_read_or_refused(text in "\\PC{0,60}") {
        let _ = survives(&text)?;
    }

    #[test]
    fn random_bytes_as_text_are_read_or_refused(bytes in prop::collection::vec(any::<u8>(), 0..60)) {
        let _ = survives(&String::from_utf8_lossy(&bytes))?;
    }

    #[test]
    fn soup_of_tokens_is_read_or_refused(soup in prop::collection::vec(prop::sample::select(SOUP), 0..40)) {
        let _ = survives(&soup.concat())?;
    }
}

#[test]
fn long_runs_of_one_sign_are_refused_at_once() {
    for sign in SOUP {
        for count in [500, 3_000, 20_000] {
            let text = sign.repeat(count);
            let _ =
                survives(&text).unwrap_or_else(|error| panic!("{count} times {sign:?}: {error}"));
        }
    }
}
