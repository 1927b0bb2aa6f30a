use std::fmt;

use serde::Deserialize;
use serde::Deserializer as _;
use serde::de::{MapAccess, SeqAccess, Visitor};
use serde_json::Deserializer;
use serde_json::value::RawValue;

use super::{Error, Kind, Member, Node, Place, Value};

/// The largest text that is read, in bytes: 64 MiB.
pub const LARGEST: usize = 64 << 20;

/// The most levels of lists and objects, the outermost counted.
pub const MOST_LEVELS: usize = 32;

/// The most values in one text; with places they take about 0.6 GB.
pub const MOST_VALUES: usize = 4_000_000;

/// Reads one JSON value and the places of all its parts.
///
/// # Accuracy
///
/// Numbers are rounded correctly to the nearest 64-bit floating point number
/// and are finite; the text of each is kept beside it.
///
/// # Errors
///
/// See [`Kind`]. Of several faults it is that of the syntax which stands first
/// in the text; without one, the first of the others.
///
/// # Source
///
/// RFC 8259, read by serde_json. Stricter in one point: names in an object must
/// be unique, which its section 4 only recommends.
///
/// # Examples
///
/// ```
/// let node = farglow::json::parse(br#"{ "title": "Door 2" }"#)?;
/// let title = node.get("title").expect("it is there");
/// assert_eq!(title.as_text(), Some("Door 2"));
/// assert_eq!(title.place.column, 12);
/// # Ok::<(), farglow::json::Error>(())
/// ```
pub fn parse(bytes: &[u8]) -> Result<Node, Error> {
    let text = as_text(bytes)?;
    let mut deserializer = Deserializer::from_str(text);
    let raw = <&RawValue>::deserialize(&mut deserializer)
        .map_err(|error| syntax_error(text, 0, &error))?;
    let rest = offset_in(text, raw.get()) + raw.get().len();
    if deserializer.end().is_err() {
        let space = text[rest..].len() - text[rest..].trim_start_matches(SPACE).len();
        let place = Place::START.advanced(bytes, rest + space);
        let found = text[place.offset..].chars().next();
        return Err(Error {
            place,
            kind: Kind::Trailing { found },
        });
    }
    let mut reader = Reader {
        text,
        place: Place::START,
        values: 0,
        failed: None,
    };
    reader.node(raw, 1)
}

/// White space as RFC 8259, section 2 has it.
const SPACE: [char; 4] = [' ', '\t', '\n', '\r'];

/// Checks all that can be said before anything is parsed.
fn as_text(bytes: &[u8]) -> Result<&str, Error> {
    let at_start = |kind| Error {
        place: Place::START,
        kind,
    };
    if bytes.len() > LARGEST {
        let size = bytes.len() as u64;
        return Err(at_start(Kind::TooLarge { size }));
    }
    if bytes.starts_with(b"\xEF\xBB\xBF") {
        return Err(at_start(Kind::ByteOrderMark));
    }
    let text = std::str::from_utf8(bytes).map_err(|error| {
        let at = error.valid_up_to();
        Error {
            place: Place::START.advanced(&bytes[..at], at),
            kind: Kind::NotUtf8 { byte: bytes[at] },
        }
    })?;
    if text.trim_start_matches(SPACE).is_empty() {
        return Err(at_start(Kind::Empty));
    }
    Ok(text)
}

fn offset_in(text: &str, part: &str) -> usize {
    part.as_ptr() as usize - text.as_ptr() as usize
}

/// Says a fault in our words; serde_json read `text` from `start` on.
fn syntax_error(text: &str, start: usize, error: &serde_json::Error) -> Error {
    let bytes = text.as_bytes();
    if error.is_eof() {
        return Error {
            place: Place::START.advanced(bytes, bytes.len()),
            kind: Kind::Truncated {
                open: last_open(bytes),
            },
        };
    }
    // Its lines and columns count from 1, the columns in bytes.
    let mut line_start = start;
    for _ in 1..error.line() {
        let rest = &bytes[line_start..];
        line_start += rest
            .iter()
            .position(|byte| *byte == b'\n')
            .map_or(0, |at| at + 1);
    }
    let mut offset = (line_start + error.column().saturating_sub(1)).min(bytes.len());
    let message = error.to_string();
    let message = message.split(" at line ").next().unwrap_or_default();
    if message.starts_with("control character") {
        // This one is placed before the character.
        let mut rest = bytes[offset..].iter();
        offset += rest.position(|byte| *byte < b' ').unwrap_or(0);
    }
    if message.contains("escape") {
        // And these inside the escape, or behind it.
        let is_half = message.contains("hex escape");
        let begins = |at: &usize| bytes[*at] == b'\\' && (!is_half || half_at(&bytes[*at..]));
        let mut near = offset.saturating_sub(12)..offset;
        offset = near.rfind(begins).unwrap_or(offset);
    }
    while !text.is_char_boundary(offset) {
        offset -= 1;
    }
    let place = Place::START.advanced(bytes, offset);
    let found = text[offset..].chars().next();
    let after_comma = text[..offset].trim_end_matches(SPACE).ends_with(',');
    let kind = match message {
        "expected `:`" => expected("a colon after the key", found),
        "expected `,` or `]`" => expected("a comma or `]`", found),
        "expected `,` or `}`" => expected("a comma or `}`", found),
        "expected ident" => expected("`true`, `false` or `null`", found),
        "expected value" | "key must be a string"
            if after_comma && matches!(found, Some(']' | '}')) =>
        {
            expected("one more entry after the comma, or no comma", found)
        }
        "expected value" => expected(
            "a value (text in double quotes, a number, a list or an object)",
            found,
        ),
        "key must be a string" => expected("a key in double quotes", found),
        "invalid number" => expected(
            "a number such as -12.5 or 3e-4 (no leading zeros, digits on both sides of a point)",
            found,
        ),
        "invalid escape" => bad_text(
            "a backslash in a text must begin one of \\\" \\\\ \\/ \\b \\f \\n \\r \\t \\u0000: write a backslash itself as \\\\",
        ),
        _ if message.starts_with("control character") => bad_text(
            "a line break, tab or other control character stands in a text: close the text before it, or write it as \\n, \\t or \\u0000",
        ),
        "lone leading surrogate in hex escape" | "unexpected end of hex escape" => {
            bad_text("half a character: escapes from \\ud800 to \\udfff only come in pairs")
        }
        _ => bad_text("this is not JSON"),
    };
    Error { place, kind }
}

/// Whether an escape of half a character begins here.
fn half_at(bytes: &[u8]) -> bool {
    matches!(
        bytes,
        [
            b'\\',
            b'u',
            b'd' | b'D',
            b'8' | b'9' | b'a'..=b'f' | b'A'..=b'F',
            ..,
        ]
    )
}

fn expected(what: &'static str, found: Option<char>) -> Kind {
    Kind::Expected { what, found }
}

fn bad_text(what: &'static str) -> Kind {
    Kind::BadText { what }
}

/// Finds the bracket, brace or quote that is still open at the end.
fn last_open(bytes: &[u8]) -> Option<(char, Place)> {
    let mut open: Vec<usize> = Vec::new();
    let mut quote = None;
    let mut at = 0;
    while let Some(byte) = bytes.get(at) {
        match (byte, quote) {
            (b'\\', Some(_)) => at += 1,
            (b'"', Some(_)) => quote = None,
            (b'"', None) => quote = Some(at),
            (b'[' | b'{', None) => open.push(at),
            (b']' | b'}', None) => {
                let _ = open.pop();
            }
            _ => {}
        }
        at += 1;
    }
    let last = quote.or_else(|| open.last().copied())?;
    Some((bytes[last].into(), Place::START.advanced(bytes, last)))
}

/// Reads a text whose syntax is known to hold, from its start to its end.
struct Reader<'a> {
    text: &'a str,
    /// The place looked up last: the next one is counted from it.
    place: Place,
    values: usize,
    /// The fault, on its way out through serde_json.
    failed: Option<Error>,
}

impl<'a> Reader<'a> {
    fn place(&mut self, part: &str) -> Place {
        let offset = offset_in(self.text, part);
        self.place = self.place.advanced(self.text.as_bytes(), offset);
        self.place
    }

    fn node(&mut self, raw: &'a RawValue, level: usize) -> Result<Node, Error> {
        let text = raw.get();
        let place = self.place(text);
        self.values += 1;
        if self.values > MOST_VALUES {
            let kind = Kind::TooMany;
            return Err(Error { place, kind });
        }
        let first = text.as_bytes().first();
        if level > MOST_LEVELS && matches!(first, Some(b'{' | b'[')) {
            let kind = Kind::TooDeep;
            return Err(Error { place, kind });
        }
        let value = match first {
            Some(b'{') => {
                let mut deserializer = Deserializer::from_str(text);
                let read = deserializer.deserialize_map(Members {
                    reader: self,
                    level,
                });
                Value::Object(read.map_err(|error| self.fault(text, &error))?)
            }
            Some(b'[') => {
                let mut deserializer = Deserializer::from_str(text);
                let read = deserializer.deserialize_seq(Elements {
                    reader: self,
                    level,
                });
                Value::List(read.map_err(|error| self.fault(text, &error))?)
            }
            Some(b'"') => Value::Text(self.string(text)?),
            Some(b't') => Value::Bool(true),
            Some(b'f') => Value::Bool(false),
            Some(b'n') => Value::Null,
            _ => number(text, place)?,
        };
        Ok(Node { value, place })
    }

    fn member(
        &mut self,
        key: &'a RawValue,
        value: &'a RawValue,
        level: usize,
    ) -> Result<Member, Error> {
        let key_place = self.place(key.get());
        Ok(Member {
            key: self.string(key.get())?,
            key_place,
            value: self.node(value, level)?,
        })
    }

    fn string(&mut self, text: &str) -> Result<String, Error> {
        serde_json::from_str(text).map_err(|error| self.fault(text, &error))
    }

    /// Turns what serde_json says of a part into a fault with a place.
    fn fault(&mut self, part: &str, error: &serde_json::Error) -> Error {
        let start = offset_in(self.text, part);
        self.failed
            .take()
            .unwrap_or_else(|| syntax_error(self.text, start, error))
    }

    fn fail<E: serde::de::Error>(&mut self, error: Error) -> E {
        self.failed = Some(error);
        E::custom("see the reader")
    }
}

fn number(text: &str, place: Place) -> Result<Value, Error> {
    let out_of_range = || Error {
        place,
        kind: Kind::OutOfRange {
            written: text.to_owned(),
        },
    };
    let number: f64 = text.parse().map_err(|_| out_of_range())?;
    let mut digits = text.split(['e', 'E']).next().unwrap_or_default().bytes();
    let vanished = number == 0.0 && digits.any(|digit| matches!(digit, b'1'..=b'9'));
    if !number.is_finite() || vanished {
        return Err(out_of_range());
    }
    Ok(Value::Number(number, text.to_owned()))
}

struct Members<'r, 'a> {
    reader: &'r mut Reader<'a>,
    level: usize,
}

impl<'a> Visitor<'a> for Members<'_, 'a> {
    type Value = Vec<Member>;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("an object")
    }

    fn visit_map<A: MapAccess<'a>>(self, mut map: A) -> Result<Self::Value, A::Error> {
        let mut members = Vec::new();
        while let Some(key) = map.next_key::<&'a RawValue>()? {
            let value = map.next_value::<&'a RawValue>()?;
            match self.reader.member(key, value, self.level + 1) {
                Ok(member) => members.push(member),
                Err(error) => return Err(self.reader.fail(error)),
            }
        }
        match key_twice(&members) {
            Some(error) => Err(self.reader.fail(error)),
            None => Ok(members),
        }
    }
}

/// Finds the first key that stands in the list already.
fn key_twice(members: &[Member]) -> Option<Error> {
    let mut by_key: Vec<&Member> = members.iter().collect();
    by_key.sort_by(|one, other| one.key.cmp(&other.key));
    by_key
        .windows(2)
        .filter(|pair| pair[0].key == pair[1].key)
        .min_by_key(|pair| pair[1].key_place)
        .map(|pair| Error {
            place: pair[1].key_place,
            kind: Kind::KeyTwice {
                key: pair[1].key.clone(),
                first: pair[0].key_place,
            },
        })
}

struct Elements<'r, 'a> {
    reader: &'r mut Reader<'a>,
    level: usize,
}

impl<'a> Visitor<'a> for Elements<'_, 'a> {
    type Value = Vec<Node>;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("a list")
    }

    fn visit_seq<A: SeqAccess<'a>>(self, mut list: A) -> Result<Self::Value, A::Error> {
        let mut nodes = Vec::new();
        while let Some(raw) = list.next_element::<&'a RawValue>()? {
            match self.reader.node(raw, self.level + 1) {
                Ok(node) => nodes.push(node),
                Err(error) => return Err(self.reader.fail(error)),
            }
        }
        Ok(nodes)
    }
}
