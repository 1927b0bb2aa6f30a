//! Reading JSON against serde_json's own reading, on good and on spoilt texts.

use farglow::json::{self, Kind, Place};
use proptest::prelude::*;
use serde_json::Value;

fn value() -> impl Strategy<Value = Value> {
    let leaf = prop_oneof![
        Just(Value::Null),
        any::<bool>().prop_map(Value::from),
        (-1000..1000_i64).prop_map(Value::from),
        prop::num::f64::NORMAL.prop_map(Value::from),
        "\\PC{0,6}".prop_map(Value::from),
        prop::collection::vec(any::<char>(), 0..4)
            .prop_map(|v| v.into_iter().collect::<String>().into()),
    ];
    leaf.prop_recursive(5, 40, 6, |inner| {
        prop_oneof![
            prop::collection::vec(inner.clone(), 0..6).prop_map(Value::from),
            prop::collection::vec(("[a-cé\"\\\\]{0,3}", inner), 0..6)
                .prop_map(|members| Value::Object(members.into_iter().collect())),
        ]
    })
}

/// One change: a byte put in, taken out, doubled or replaced, or the end cut off.
fn spoil(bytes: &mut Vec<u8>, at: usize, how: u8, byte: u8) {
    if bytes.is_empty() {
        return;
    }
    let at = at % bytes.len();
    match how % 5 {
        0 => bytes.insert(at, byte),
        1 => {
            let _ = bytes.remove(at);
        }
        2 => bytes.insert(at, bytes[at]),
        3 => bytes[at] = byte,
        _ => bytes.truncate(at),
    }
}

/// Line and column counted the slow way.
fn place_of(bytes: &[u8], offset: usize) -> Place {
    let before = String::from_utf8_lossy(&bytes[..offset]);
    let line_start = before.rfind('\n').map_or(0, |at| at + 1);
    Place {
        offset,
        line: before.matches('\n').count() + 1,
        column: before[line_start..].chars().count() + 1,
    }
}

fn check_places(node: &json::Node, bytes: &[u8]) -> Result<(), TestCaseError> {
    prop_assert_eq!(node.place, place_of(bytes, node.place.offset));
    for member in node.as_object().unwrap_or_default() {
        prop_assert_eq!(member.key_place, place_of(bytes, member.key_place.offset));
        prop_assert_eq!(bytes[member.key_place.offset], b'"');
        check_places(&member.value, bytes)?;
    }
    for element in node.as_list().unwrap_or_default() {
        check_places(element, bytes)?;
    }
    let first = bytes[node.place.offset];
    let fits = match node.value {
        json::Value::Null => first == b'n',
        json::Value::Bool(truth) => first == if truth { b't' } else { b'f' },
        json::Value::Number(..) => first == b'-' || first.is_ascii_digit(),
        json::Value::Text(_) => first == b'"',
        json::Value::List(_) => first == b'[',
        json::Value::Object(_) => first == b'{',
    };
    prop_assert!(fits, "{:?} begins with {:?}", node.value, char::from(first));
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1000, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn what_is_written_is_read_back(value in value()) {
        let text = json::write(&value);
        let node = json::parse(text.as_bytes());
        let node = node.map_err(|error| TestCaseError::fail(format!("{error} in {text}")))?;
        // Canonical forms, since 1.0 and 1 are one number.
        prop_assert_eq!(json::canonical(&node.to_value()), json::canonical(&value));
        let canonical = json::canonical(&value);
        let again = json::parse(canonical.as_bytes()).map_err(|e| TestCaseError::fail(e.to_string()))?;
        prop_assert_eq!(json::canonical(&again.to_value()), canonical.as_str());
        check_places(&node, text.as_bytes())?;
        check_places(&again, canonical.as_bytes())?;
    }

    #[test]
    fn a_spoilt_text_is_read_as_others_read_it_or_refused_with_a_place(
        value in value(),
        changes in prop::collection::vec(
            (
                any::<usize>(),
                any::<u8>(),
                prop_oneof![any::<u8>(), prop::sample::select(&b"{}[]\",:\\ntfu0123456789eE.-+\n \t/"[..])],
            ),
            1..4,
        ),
    ) {
        let mut bytes = json::write(&value).into_bytes();
        for (at, how, byte) in changes {
            spoil(&mut bytes, at, how, byte);
        }
        let other: Result<Value, _> = serde_json::from_slice(&bytes);
        match (json::parse(&bytes), other) {
            (Ok(node), Ok(other)) => {
                check_places(&node, &bytes)?;
                let same = json::canonical(&node.to_value()) == json::canonical(&other);
                // serde_json may round the last digit of a number wrongly.
                let node_is_close = same || bytes.iter().any(|byte| matches!(byte, b'.' | b'e' | b'E'));
                prop_assert!(node_is_close, "{node:?} is not {other:?}");
            }
            (Ok(node), Err(error)) => prop_assert!(false, "{error} is not seen: {node:?}"),
            (Err(error), other) => {
                if let Kind::KeyTwice { .. } | Kind::OutOfRange { .. } = error.kind {
                    // What serde_json lets pass.
                } else {
                    prop_assert!(other.is_err(), "{error} is no fault: {other:?}");
                }
                prop_assert!(!error.to_string().is_empty());
                prop_assert!(error.place.offset <= bytes.len(), "{error:?}");
                prop_assert_eq!(error.place, place_of(&bytes, error.place.offset));
            }
        }
    }
}
