use std::fmt::Write as _;

use serde_json::json;

use super::{Kind, LARGEST, MOST_LEVELS, Node, Place, Value, canonical, parse, write};

fn read(text: &str) -> Node {
    parse(text.as_bytes()).unwrap_or_else(|error| panic!("{text}: {error}"))
}

fn refused(bytes: &[u8]) -> String {
    match parse(bytes) {
        Ok(node) => panic!("{:?} was read as {node:?}", String::from_utf8_lossy(bytes)),
        Err(error) => error.to_string(),
    }
}

fn at(node: &Node) -> (usize, usize, usize) {
    (node.place.line, node.place.column, node.place.offset)
}

#[test]
fn every_value_knows_its_place() {
    // é has two bytes, 😀 four; lines may end either way.
    let text = " {\r\n  \"é😀\": [1.50, \"ü\", null],\n\t\"b\" : { \"c\": true } }";
    let node = read(text);
    assert_eq!(at(&node), (1, 2, 1));
    let members = node.as_object().expect("it is an object");
    assert_eq!(members[0].key, "é😀");
    assert_eq!(
        members[0].key_place,
        Place {
            offset: 6,
            line: 2,
            column: 3
        }
    );
    let list = members[0].value.as_list().expect("it is a list");
    assert_eq!(at(&members[0].value), (2, 9, 16));
    assert_eq!(
        list.iter().map(at).collect::<Vec<_>>(),
        [(2, 10, 17), (2, 16, 23), (2, 21, 29)]
    );
    assert_eq!(list[0].value, Value::Number(1.5, "1.50".to_owned()));
    assert_eq!(
        members[1].key_place,
        Place {
            offset: 37,
            line: 3,
            column: 2
        }
    );
    let inner = members[1].value.get("c").expect("it is there");
    assert_eq!((at(inner), &inner.value), ((3, 15, 50), &Value::Bool(true)));
    for member in members {
        let offset = member.key_place.offset;
        assert!(text[offset..].starts_with('"'), "{:?}", &text[offset..]);
    }
}

#[test]
fn texts_come_without_their_escapes() {
    let node = read(r#"{ "a\u0062\n": "\ud83d\ude00 \"\\\/\t\u00b5" }"#);
    let members = node.as_object().expect("it is an object");
    assert_eq!(members[0].key, "ab\n");
    assert_eq!(members[0].value.as_text(), Some("😀 \"\\/\tµ"));
}

#[test]
fn numbers_are_rounded_to_the_nearest() {
    // Halfway cases of the decimal-to-binary conversion are what quick readers miss.
    for (written, bits) in [
        ("0.1", 0x3fb9_9999_9999_999a_u64),
        ("-0", 0x8000_0000_0000_0000),
        ("9007199254740993", 0x4340_0000_0000_0000),
        ("2.2250738585072011e-308", 0x000f_ffff_ffff_ffff),
        ("1.7976931348623157e308", 0x7fef_ffff_ffff_ffff),
        ("5e-324", 1),
        ("0e999", 0),
    ] {
        let node = read(written);
        let number = node.as_number().expect("it is a number");
        assert_eq!(number.to_bits(), bits, "{written} was read as {number:e}");
        assert_eq!(node.value, Value::Number(number, written.to_owned()));
    }
}

#[test]
fn faults_are_said_with_their_place() {
    for (text, expected) in [
        (
            "",
            "the file is empty: a JSON object was expected, take a copy of it or start a new one",
        ),
        (
            " \r\n\t ",
            "the file is empty: a JSON object was expected, take a copy of it or start a new one",
        ),
        (
            "{\n  \"a\": [1, 2",
            "line 2, column 13: the file breaks off here, before the `[` of line 2, column 8 is closed: is a part of it missing?",
        ),
        (
            "{ \"a\": \"b]\\\"",
            "line 1, column 13: the file breaks off here, in the text that begins at line 1, column 8: is a part of it missing?",
        ),
        (
            "{ \"a\": 1 }\n{",
            "line 2, column 1: expected the end of the file, found `{`: one file holds one value",
        ),
        (
            "tru",
            "line 1, column 4: the file breaks off here, in the middle of a value: is a part of it missing?",
        ),
        (
            "{} \u{a0}",
            "line 1, column 4: expected the end of the file, found `\u{a0}`: one file holds one value",
        ),
        (
            "{ \"é\" 1 }",
            "line 1, column 7: expected a colon after the key, found `1`",
        ),
        (
            "[1 2]",
            "line 1, column 4: expected a comma or `]`, found `2`",
        ),
        (
            "{ \"a\": 1\n\"b\": 2 }",
            "line 2, column 1: expected a comma or `}`, found `\"`",
        ),
        (
            "{ a: 1 }",
            "line 1, column 3: expected a key in double quotes, found `a`",
        ),
        (
            "[nul]",
            "line 1, column 5: expected `true`, `false` or `null`, found `]`",
        ),
        (
            "[NaN]",
            "line 1, column 2: expected a value (text in double quotes, a number, a list or an object), found `N`",
        ),
        (
            "[1,]",
            "line 1, column 4: expected one more entry after the comma, or no comma, found `]`",
        ),
        (
            "{\"a\":1,}",
            "line 1, column 8: expected one more entry after the comma, or no comma, found `}`",
        ),
        (
            "[01]",
            "line 1, column 3: expected a number such as -12.5 or 3e-4 (no leading zeros, digits on both sides of a point), found `1`",
        ),
        (
            "[\n\n 1e999]",
            "line 3, column 2: the number `1e999` is beyond what can be calculated with, about 1e-308 to 1e308",
        ),
        (
            "[-1e-999]",
            "line 1, column 2: the number `-1e-999` is beyond what can be calculated with, about 1e-308 to 1e308",
        ),
        (
            "{ \"a\": 1,\n  \"b\": 2,\n  \"\\u0061\": 3, \"b\": 4 }",
            "line 3, column 3: the key `a` is given twice, first at line 1, column 3: remove one of them",
        ),
    ] {
        assert_eq!(refused(text.as_bytes()), expected, "{text:?}");
    }
}

#[test]
fn texts_with_what_a_text_may_not_hold_are_refused_in_their_place() {
    for (text, start) in [
        (
            "[\"é\\x\"]",
            "line 1, column 4: a backslash in a text must begin one of",
        ),
        (
            "[\"a\tb\"]",
            "line 1, column 4: a line break, tab or other control",
        ),
        (
            "[\n\"a\nb\"]",
            "line 2, column 3: a line break, tab or other control",
        ),
        (
            "[\"ok\", \"\\ud800\"]",
            "line 1, column 9: half a character",
        ),
        (
            "[\"ok\",\n \"é\\ud83d\\u0041\"]",
            "line 2, column 4: half a character",
        ),
        ("{\"\\udc00\": 1}", "line 1, column 3: half a character"),
        ("[\"\\u12g4\"]", "line 1, column 3: a backslash in a text"),
    ] {
        let said = refused(text.as_bytes());
        assert!(
            said.starts_with(start),
            "{text:?}: {said} does not start with {start}"
        );
    }
}

#[test]
fn what_is_not_utf_8_is_refused_with_byte_and_line() {
    for (bytes, expected) in [
        (
            &b"{\n \"a\": \"\xe9\" }"[..],
            "line 2, column 8 (byte 9): the byte 0xe9 is not UTF-8: save the file as UTF-8",
        ),
        (
            b"\xff\xfe{\x00",
            "line 1, column 1 (byte 0): the file looks like UTF-16: save it as UTF-8",
        ),
        (
            b"\xef\xbb\xbf{}",
            "the file begins with a byte-order mark: save it as UTF-8 without one",
        ),
        (
            b"\"\xe2\x82",
            "line 1, column 2 (byte 1): the byte 0xe2 is not UTF-8: save the file as UTF-8",
        ),
    ] {
        assert_eq!(refused(bytes), expected);
    }
}

#[test]
fn levels_are_counted_up_to_the_limit() {
    let nested = |levels: usize| "[".repeat(levels) + &"]".repeat(levels);
    let _ = read(&nested(MOST_LEVELS));
    let error = parse(nested(MOST_LEVELS + 1).as_bytes()).expect_err("one level too many");
    assert_eq!(
        (error.place.column, &error.kind),
        (MOST_LEVELS + 1, &Kind::TooDeep)
    );
    let error = parse(nested(2_000_000).as_bytes()).expect_err("far too many levels");
    assert_eq!(
        (error.place.column, error.kind),
        (MOST_LEVELS + 1, Kind::TooDeep)
    );
    let said = refused("{\"a\":".repeat(1_000_000).as_bytes());
    assert!(said.contains("breaks off"), "{said}");
}

#[test]
fn too_large_a_file_is_refused_unread() {
    let mut bytes = vec![b' '; LARGEST];
    bytes[0] = b'1';
    assert!(parse(&bytes).is_ok());
    bytes.push(b' ');
    assert_eq!(
        refused(&bytes),
        "the file has 67108865 bytes, and at most 67108864 are read: split it"
    );
}

#[test]
fn too_many_values_are_refused() {
    let mut text = String::from("[0");
    text.push_str(&",0".repeat(super::MOST_VALUES));
    text.push(']');
    assert!(refused(text.as_bytes()).contains("more than 4000000 values"));
}

#[test]
fn long_or_strange_keys_do_not_spoil_the_message() {
    let key = "\\u0007".to_owned() + &"k".repeat(50);
    let said = refused(format!("{{\"{key}\":1,\"{key}\":2}}").as_bytes());
    assert!(
        said.contains(&format!("`\\u{{7}}{}…`", "k".repeat(39))),
        "{said}"
    );
}

/// Counting columns from the start of each line would take hours here.
#[test]
fn a_long_line_is_not_read_over_and_over() {
    let mut text = String::from("{\"cells\":[");
    for cell in 0..100_000 {
        let comma = if cell > 0 { "," } else { "" };
        write!(
            text,
            "{comma}{{\"kind\":\"value\",\"name\":\"v{cell}\",\"entry\":\"12 ± 1 kW/m²\",\"note\":\"{}\"}}",
            "é".repeat(60)
        )
        .expect("texts grow");
    }
    text.push_str("]}");
    assert!(text.len() > 18_000_000, "{}", text.len());
    let node = read(&text);
    let cells = node
        .get("cells")
        .and_then(Node::as_list)
        .unwrap_or_default();
    assert_eq!(cells.len(), 100_000);
    let last = cells.last().expect("there are cells");
    assert_eq!(last.get("name").and_then(Node::as_text), Some("v99999"));
    let columns = text.chars().count();
    let length = text[last.place.offset..].chars().count();
    assert_eq!(
        (last.place.line, last.place.column),
        (1, columns - length + 1)
    );
}

/// Source: RFC 8785, section 3.2.2: the example and its canonical form.
#[test]
fn the_canonical_form_is_that_of_the_example() {
    let node = read(
        r#"{
  "numbers": [333333333.33333329, 1E30, 4.50,
              2e-3, 0.000000000000000000000000001],
  "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
  "literals": [null, true, false]
}"#,
    );
    assert_eq!(
        canonical(&node.to_value()),
        r#"{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\u000f\nA'B\"\\\\\"/"}"#
    );
}

/// Source: RFC 8785, section 3.2.3: keys in the order of their UTF-16 units, so
/// that U+1F600 comes before U+FB33.
#[test]
fn canonical_keys_are_sorted_as_utf_16() {
    let node = read(
        r#"{ "\u20ac": 5, "\r": 1, "\ufb33": 7, "1": 2, "\ud83d\ude00": 6, "\u0080": 3, "\u00f6": 4 }"#,
    );
    assert_eq!(
        canonical(&node.to_value()),
        "{\"\\r\":1,\"1\":2,\"\u{80}\":3,\"ö\":4,\"€\":5,\"😀\":6,\"\u{fb33}\":7}"
    );
}

/// Source: RFC 8785, appendix B, the finite rows (as quoted alike in the tests
/// of several public implementations).
#[test]
fn canonical_numbers_are_those_of_the_table() {
    for (bits, expected) in [
        (0x0000_0000_0000_0000_u64, "0"),
        (0x8000_0000_0000_0000, "0"),
        (0x0000_0000_0000_0001, "5e-324"),
        (0x8000_0000_0000_0001, "-5e-324"),
        (0x7fef_ffff_ffff_ffff, "1.7976931348623157e+308"),
        (0xffef_ffff_ffff_ffff, "-1.7976931348623157e+308"),
        (0x4340_0000_0000_0000, "9007199254740992"),
        (0xc340_0000_0000_0000, "-9007199254740992"),
        (0x4430_0000_0000_0000, "295147905179352830000"),
        (0x44b5_2d02_c7e1_4af5, "9.999999999999997e+22"),
        (0x44b5_2d02_c7e1_4af6, "1e+23"),
        (0x44b5_2d02_c7e1_4af7, "1.0000000000000001e+23"),
        (0x444b_1ae4_d6e2_ef4e, "999999999999999700000"),
        (0x444b_1ae4_d6e2_ef4f, "999999999999999900000"),
        (0x444b_1ae4_d6e2_ef50, "1e+21"),
        (0x3eb0_c6f7_a0b5_ed8c, "9.999999999999997e-7"),
        (0x3eb0_c6f7_a0b5_ed8d, "0.000001"),
        (0x41b3_de43_5555_5553, "333333333.3333332"),
        (0x41b3_de43_5555_5554, "333333333.33333325"),
        (0x41b3_de43_5555_5555, "333333333.3333333"),
        (0x41b3_de43_5555_5556, "333333333.3333334"),
        (0x41b3_de43_5555_5557, "333333333.33333343"),
        (0xbecb_f647_612f_3696, "-0.0000033333333333333333"),
        (0x4314_3ff3_c1cb_0959, "1424953923781206.2"),
    ] {
        let number = f64::from_bits(bits);
        assert_eq!(canonical(&json!(number)), expected, "{bits:#x}");
        let read_back = read(expected).as_number().expect("it is a number");
        assert_eq!(read_back, number, "{expected}");
    }
}

#[test]
fn written_text_is_laid_out_line_by_line() {
    let value = json!({
        "farglow": 1,
        "title": "Door \"2\"\n",
        "job": {},
        "cells": [
            { "kind": "value", "name": "t", "entry": { "entry": "1 m", "basis": "measured" } },
            { "kind": "assessment", "guidance": ["one", "two"], "none": [] },
            { "kind": "source", "vertices": [["0 m", "0 m"], ["1 m", "0 m"]] },
        ],
        "long": ["x".repeat(40), "y".repeat(40)],
    });
    let expected = r#"{
  "farglow": 1,
  "title": "Door \"2\"\n",
  "job": {},
  "cells": [
    {
      "kind": "value",
      "name": "t",
      "entry": {
        "entry": "1 m",
        "basis": "measured"
      }
    },
    {
      "kind": "assessment",
      "guidance": ["one", "two"],
      "none": []
    },
    {
      "kind": "source",
      "vertices": [
        ["0 m", "0 m"],
        ["1 m", "0 m"]
      ]
    }
  ],
  "long": [
    "xxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxx",
    "yyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyyy"
  ]
}
"#;
    let text = write(&value);
    assert_eq!(text, expected);
    let node = read(&text);
    assert_eq!(node.to_value(), value);
    assert_eq!(write(&node.to_value()), text);
}
