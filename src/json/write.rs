use serde_json::Value;

/// The most characters that a list of plain values may take on one line.
const LINE: usize = 80;

/// Returns the canonical form of a value: the same bytes for the same content,
/// whatever the order of keys and the spelling of numbers and texts.
///
/// # Source
///
/// RFC 8785, *JSON Canonicalization Scheme*; its examples of sections 3.2.2,
/// 3.2.3 and appendix B are checked in `json/tests.rs`.
///
/// # Examples
///
/// ```
/// let value = serde_json::json!({ "b": 1.0, "a": [true, null] });
/// assert_eq!(farglow::json::canonical(&value), r#"{"a":[true,null],"b":1}"#);
/// ```
#[must_use]
pub fn canonical(value: &Value) -> String {
    serde_json_canonicalizer::to_string(value)
        .expect("a JSON value holds no number that is not finite, and memory does not fail")
}

/// Returns a value as a text to be read and compared line by line.
///
/// Two spaces a level, keys in the order given, a member or element a line; a
/// list of plain values stays on one line if it is short. The text ends with
/// one line break, and the same value always gives the same bytes.
#[must_use]
pub fn write(value: &Value) -> String {
    let mut text = String::new();
    write_value(value, 0, &mut text);
    text.push('\n');
    text
}

fn write_value(value: &Value, level: usize, text: &mut String) {
    match value {
        Value::Array(elements) if !elements.is_empty() => {
            if let Some(line) = on_one_line(elements) {
                text.push_str(&line);
                return;
            }
            text.push('[');
            for (place, element) in elements.iter().enumerate() {
                new_line(place, level + 1, text);
                write_value(element, level + 1, text);
            }
            end_line(level, text);
            text.push(']');
        }
        Value::Object(members) if !members.is_empty() => {
            text.push('{');
            for (place, (key, member)) in members.iter().enumerate() {
                new_line(place, level + 1, text);
                text.push_str(&Value::from(key.as_str()).to_string());
                text.push_str(": ");
                write_value(member, level + 1, text);
            }
            end_line(level, text);
            text.push('}');
        }
        plain => text.push_str(&plain.to_string()),
    }
}

/// Returns a list of plain values as one line, if it is short enough.
fn on_one_line(elements: &[Value]) -> Option<String> {
    let mut line = String::from("[");
    for (place, element) in elements.iter().enumerate() {
        if matches!(element, Value::Array(_) | Value::Object(_)) {
            return None;
        }
        if place > 0 {
            line.push_str(", ");
        }
        line.push_str(&element.to_string());
        if line.len() > 4 * LINE {
            return None;
        }
    }
    line.push(']');
    (line.chars().count() <= LINE).then_some(line)
}

fn new_line(place: usize, level: usize, text: &mut String) {
    if place > 0 {
        text.push(',');
    }
    end_line(level, text);
}

fn end_line(level: usize, text: &mut String) {
    text.push('\n');
    for _ in 0..level {
        text.push_str("  ");
    }
}
