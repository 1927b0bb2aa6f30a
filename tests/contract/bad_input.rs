//! Bad input: each a clear message with its place and a remedy, the agreed
//! exit code, no panic, and the file on disk untouched.

use crate::program::{Desk, notebook};

/// A file that is refused (exit code 2) or has a cell in error (3).
struct Bad {
    what: &'static str,
    file: Vec<u8>,
    code: i32,
    /// Pieces of what is told: the place, what was found, the remedy.
    says: Vec<&'static str>,
}

/// A file that cannot be opened as a notebook.
fn refused(what: &'static str, file: impl Into<Vec<u8>>, says: &[&'static str]) -> Bad {
    Bad {
        what,
        file: file.into(),
        code: 2,
        says: says.to_vec(),
    }
}

/// A notebook of these cells, one of them in error.
fn wrong(what: &'static str, cells: &str, says: &[&'static str]) -> Bad {
    Bad {
        what,
        file: notebook(cells).into_bytes(),
        code: 3,
        says: says.to_vec(),
    }
}

/// A notebook with this entry in a value.
fn entry(what: &'static str, entry: &str, says: &[&'static str]) -> Bad {
    let entry = serde_json::Value::from(entry);
    wrong(
        what,
        &format!(r#"{{"kind": "value", "name": "a", "entry": {entry}}}"#),
        says,
    )
}

/// A notebook with a disc in the wall, one of its fields changed.
fn source(what: &'static str, field: &str, text: &str, says: &[&'static str]) -> Bad {
    wrong(what, &disc(field, text), says)
}

fn disc(field: &str, text: &str) -> String {
    let fields: Vec<String> = [
        ("diameter", "1 m"),
        ("temperature", "1250 °C"),
        ("emissivity", "0.95"),
        ("z", "1 m"),
    ]
    .iter()
    .map(|(name, usual)| {
        let text = if *name == field { text } else { usual };
        format!(r#""{name}": "{text}""#)
    })
    .collect();
    format!(
        r#"{{"kind": "source", "name": "door", "form": "opening", "outline": "disc", {}}}"#,
        fields.join(", ")
    )
}

/// A notebook with a good source and these cells.
fn beside(what: &'static str, cells: &str, says: &[&'static str]) -> Bad {
    wrong(what, &format!("{}, {cells}", disc("", "")), says)
}

fn table() -> Vec<Bad> {
    let good = notebook(r#"{"kind": "value", "name": "a", "entry": "1 m"}"#);
    let mut not_utf8 = good.clone().into_bytes();
    let at = good.find("1 m").expect("it is there");
    not_utf8[at] = 0xff;
    let deep = format!("{}1{}", "[".repeat(5000), "]".repeat(5000));
    let value = |name: &str| {
        notebook(&format!(
            r#"{{"kind": "value", "name": "{name}", "entry": "1 m"}}"#
        ))
    };
    vec![
        // The file.
        refused("empty", "", &["the file is empty", "a copy of it"]),
        refused("blanks alone", " \n ", &["empty"]),
        refused(
            "truncated",
            &good.as_bytes()[..good.len() - 4],
            &[
                "line 1, column 70",
                "breaks off here",
                "is a part of it missing?",
            ],
        ),
        refused(
            "not UTF-8",
            not_utf8,
            &[
                "line 1, column 67",
                "0xff is not UTF-8",
                "save the file as UTF-8",
            ],
        ),
        refused(
            "byte-order mark",
            format!("\u{feff}{good}"),
            &["byte-order mark", "save"],
        ),
        refused(
            "UTF-16",
            good.encode_utf16()
                .flat_map(u16::to_le_bytes)
                .collect::<Vec<u8>>(),
            &["line 1"],
        ),
        refused("bytes of no text", vec![0_u8; 64], &["line 1, column 1"]),
        refused(
            "newer",
            good.replace("\"farglow\": 1", "\"farglow\": 2"),
            &[
                "line 1, column 13",
                "format 2",
                "newer program",
                "untouched",
            ],
        ),
        refused(
            "far newer",
            good.replace("\"farglow\": 1", "\"farglow\": 1e300"),
            &["format 1e300", "newer program"],
        ),
        refused(
            "older than any",
            good.replace("\"farglow\": 1", "\"farglow\": 0"),
            &["line 1, column 13", "expected format 1", "found 0"],
        ),
        refused(
            "no format",
            good.replace("\"farglow\": 1, ", ""),
            &["line 1, column 1", "`\"farglow\": 1`"],
        ),
        refused(
            "another thing",
            "[1, 2]",
            &["line 1, column 1", "expected an object"],
        ),
        refused("deep JSON", deep, &["line 1, column 33", "32"]),
        refused(
            "deep JSON in an entry",
            good.replace(
                "\"1 m\"",
                &format!("{}1{}", "{\"a\":".repeat(9000), "}".repeat(9000)),
            ),
            &["line 1", "32"],
        ),
        refused(
            "1e999 as a number",
            good.replace("\"1 m\"", "1e999"),
            &["line 1, column 66"],
        ),
        // Fields, kinds, keys and names.
        refused(
            "unknown field",
            good.replace("entry", "entri"),
            &[
                "line 1, column 57",
                "cell 1 (a)",
                "unknown field `entri`",
                "did you mean `entry`?",
            ],
        ),
        refused(
            "unknown field at the top",
            good.replace("\"cells\"", "\"author\": \"me\", \"cells\""),
            &["line 1, column 16", "unknown field `author`", "known are"],
        ),
        refused(
            "unknown kind",
            good.replace("\"value\"", "\"valu\""),
            &[
                "line 1, column 35",
                "unknown kind `valu`",
                "did you mean `value`?",
            ],
        ),
        refused(
            "a kind to come",
            good.replace("\"value\"", "\"hologram\""),
            &["unknown kind `hologram`", "known are"],
        ),
        refused(
            "key twice",
            good.replace("\"name\": \"a\"", "\"name\": \"a\", \"name\": \"b\""),
            &["line 1, column 57", "`name`", "twice"],
        ),
        refused(
            "key twice at the top",
            good.replace("\"cells\"", "\"farglow\": 1, \"cells\""),
            &["line 1, column 16", "`farglow`", "twice"],
        ),
        refused(
            "duplicate name",
            notebook(
                r#"{"kind": "note", "name": "a", "text": ""}, {"kind": "note", "name": "a", "text": ""}"#,
            ),
            &[
                "line 1, column 94",
                "found `a`, which another cell has",
                "rename",
            ],
        ),
        refused(
            "illegal name",
            value("2nd door"),
            &["line 1, column 52", "found `2nd door`", "rename the cell"],
        ),
        refused(
            "a name of other letters",
            value("tür"),
            &["found `tür`", "letters a to z"],
        ),
        refused("empty name", value(""), &["expected a name, found nothing"]),
        refused(
            "long name",
            value(&"a".repeat(41)),
            &["at most 40 characters", "found 41", "shorten"],
        ),
        refused(
            "a unit as a name",
            value("m"),
            &["line 1, column 52", "found `m`", "stands for a unit"],
        ),
        refused(
            "a function as a name",
            value("sqrt"),
            &["found `sqrt`", "rename the cell"],
        ),
        refused(
            "no name",
            notebook(r#"{"kind": "note", "text": ""}"#),
            &["line 1, column 26", "expected `name`, found none"],
        ),
        refused(
            "no kind",
            notebook(r#"{"name": "a", "text": ""}"#),
            &["line 1, column 26", "expected `kind`, found none"],
        ),
        refused(
            "a number for an entry",
            good.replace("\"1 m\"", "1"),
            &["line 1, column 66", "expected a text", "field entry"],
        ),
        refused(
            "unknown basis",
            good.replace("\"1 m\"", "\"1 m\", \"basis\": \"guess\""),
            &["unknown basis `guess`", "measured"],
        ),
        refused(
            "two rooms",
            notebook(
                r#"{"kind": "surroundings", "name": "a"}, {"kind": "surroundings", "name": "b"}"#,
            ),
            &[
                "cell 2 (b)",
                "one cell of kind surroundings at most",
                "remove one",
            ],
        ),
        refused(
            "half a confirmation",
            good.replace(
                "\"cells\"",
                "\"confirmed\": [{\"guidance\": \"eu-2006-25-m\"}], \"cells\"",
            ),
            &[
                "confirmed 1",
                "expected `edition`",
                "names limit, edition, person and date",
            ],
        ),
        // Entries.
        entry(
            "empty entry",
            "",
            &["field entry", "found nothing", "write a quantity"],
        ),
        entry(
            "1e999",
            "1e999 m",
            &[
                "field entry, character 1",
                "below 1.8e308",
                "check the exponent",
            ],
        ),
        entry(
            "20,000 brackets",
            &"(".repeat(20_000),
            &["at most 1000 characters", "cells of their own"],
        ),
        entry(
            "3,000 minus signs",
            &format!("{}1", "-".repeat(3000)),
            &["at most 1000 characters", "cells of their own"],
        ),
        entry(
            "65 brackets",
            &format!("{}1{}", "(".repeat(65), ")".repeat(65)),
            &["at most 64 brackets", "cell of its own"],
        ),
        entry(
            "900 minus signs",
            &format!("{}1", "-".repeat(900)),
            &["character 2", "one sign", "`-(-x)`"],
        ),
        entry(
            "assignment",
            "b = 2 m",
            &[
                "character 3",
                "found an assignment",
                "a cell of its own",
                "`==`",
            ],
        ),
        entry(
            "assignment that adds",
            "b += 2 m",
            &["field entry, character", "assignment"],
        ),
        entry(
            "two expressions",
            "1 m; 2 m",
            &["character 4", "found `;`", "a cell of its own"],
        ),
        entry(
            "decimal comma",
            "2,5 m",
            &["character 2", "found a comma", "`2.5`"],
        ),
        entry(
            "negative spread",
            "1250 ± -25 K",
            &["character 6", "found a negative one", "leave out the minus"],
        ),
        entry(
            "°C in arithmetic",
            "1250 °C + 20 K",
            &["character 9", "°C", "write the temperature in K"],
        ),
        entry(
            "°F in arithmetic",
            "2 * 400 °F",
            &["field entry", "°F", "in K"],
        ),
        entry(
            "wrong dimensions",
            "1 m + 1 s",
            &["character 5", "a length (m) and a time (s)", "same kind"],
        ),
        entry(
            "division by zero",
            "1 / (2 - 2)",
            &[
                "character 3",
                "other than zero",
                "check the value of the divisor",
            ],
        ),
        entry(
            "a result beyond all numbers",
            "1e300 * 1e300",
            &["field entry", "character 7"],
        ),
        entry(
            "the root of a negative number",
            "sqrt(-1)",
            &["character 6", "`sqrt`", "check the sign"],
        ),
        entry(
            "a chain of powers",
            "2^3^2",
            &["character 4", "which one you mean"],
        ),
        entry("a bare unit", "m", &["bare unit `m`", "write `1 m`"]),
        entry(
            "unknown unit",
            "5 mtr",
            &["character 3", "unknown unit `mtr`", "did you mean `m`?"],
        ),
        entry(
            "missing name",
            "b * 2",
            &[
                "character 1",
                "no cell is named `b`",
                "add a cell of that name",
            ],
        ),
        entry(
            "self-reference",
            "a + 1",
            &["field entry", "in a ring: a → a", "a quantity of its own"],
        ),
        entry("infinity", "inf", &["reserved word `inf`", "finite"]),
        entry("text", "\"x\"", &["quotation marks", "leave"]),
        entry("a condition", "if(1, 2, 3)", &["conditions", "`min`"]),
        entry(
            "half an expression",
            "1 m +",
            &["character 6", "found the end"],
        ),
        entry("other signs", "1 m § 2 m", &["character 5", "§"]),
        wrong(
            "cycle",
            r#"{"kind": "formula", "name": "x", "entry": "y * 2"}, {"kind": "formula", "name": "y", "entry": "x"}"#,
            &["x → y → x", "a quantity of its own"],
        ),
        wrong(
            "a misspelt name",
            r#"{"kind": "value", "name": "width", "entry": "1 m"}, {"kind": "value", "name": "b", "entry": "2 * widht"}"#,
            &[
                "character 5",
                "no cell is named `widht`",
                "did you mean `width`?",
            ],
        ),
        wrong(
            "unknown unit of a result",
            r#"{"kind": "formula", "name": "x", "entry": "2 m", "unit": "furlongs"}"#,
            &["field unit", "furlongs"],
        ),
        wrong(
            "a unit of another kind",
            r#"{"kind": "formula", "name": "x", "entry": "2 m", "unit": "kW"}"#,
            &["field entry", "expected a power (W), found a length (m)"],
        ),
        // Physics.
        source(
            "wrong dimension",
            "diameter",
            "20 K",
            &[
                "field diameter",
                "expected a length (m), found a temperature (K)",
                "`2.5 m`",
            ],
        ),
        source(
            "zero kelvin",
            "temperature",
            "0 K",
            &["field temperature", "above absolute zero", "`1250 °C`"],
        ),
        source(
            "below zero kelvin",
            "temperature",
            "-5 K",
            &["field temperature", "above absolute zero"],
        ),
        source(
            "below zero kelvin in °C",
            "temperature",
            "-300 °C",
            &[
                "field temperature, character 1",
                "-273.15 °C or more",
                "check the sign",
            ],
        ),
        source(
            "emissivity zero",
            "emissivity",
            "0",
            &["field emissivity", "above 0 and at most 1", "`0.95`"],
        ),
        source(
            "emissivity above one",
            "emissivity",
            "1.01",
            &["field emissivity", "found 1.01", "`0.95`"],
        ),
        source(
            "negative emissivity",
            "emissivity",
            "-0.5",
            &["field emissivity", "above 0 and at most 1"],
        ),
        source(
            "zero size",
            "diameter",
            "0 m",
            &["field diameter", "a value above zero", "`2.5 m`"],
        ),
        source(
            "negative size",
            "diameter",
            "-1 m",
            &["field diameter", "a value above zero"],
        ),
        source(
            "a size that is lost in the distance",
            "z",
            "1e300 m",
            &["cell door"],
        ),
        beside(
            "position inside a source",
            r#"{"kind": "position", "name": "p", "x": "0 m", "y": "0 m", "z": "1 m"}"#,
            &["field x", "inside or touches source door", "move it away"],
        ),
        beside(
            "a reach that touches",
            r#"{"kind": "position", "name": "p", "from": "door", "distance": "0.2 m", "z": "1 m"}"#,
            &["field distance", "touches source door", "smaller `reach`"],
        ),
        beside(
            "unknown guidance",
            r#"{"kind": "position", "name": "p", "from": "door", "distance": "2 m"}, {"kind": "assessment", "name": "q", "position": "p", "guidance": ["icnirp-2013-ir-eyes"]}"#,
            &[
                "field guidance",
                "`icnirp-2013-ir-eyes`",
                "did you mean `icnirp-2013-ir-eye`?",
            ],
        ),
        beside(
            "a far guess of guidance",
            r#"{"kind": "zone", "name": "q", "from": "door", "stay": "1 h", "guidance": "no-rule"}"#,
            &["field guidance", "`no-rule`", "known are", "eu-2006-25-m"],
        ),
        beside(
            "a source that is none",
            r#"{"kind": "position", "name": "p", "from": "dor", "distance": "2 m"}"#,
            &[
                "field from",
                "no cell is named `dor`",
                "did you mean `door`?",
            ],
        ),
        beside(
            "a position twice placed",
            r#"{"kind": "position", "name": "p", "from": "door", "distance": "2 m", "x": "1 m"}"#,
            &["field x", "a position has one place"],
        ),
        beside(
            "a position nowhere",
            r#"{"kind": "position", "name": "p"}"#,
            &["expected a place", "say how far from which source"],
        ),
        beside(
            "a stay of nothing",
            r#"{"kind": "position", "name": "p", "from": "door", "distance": "2 m", "stay": "0 s"}"#,
            &["field stay", "a value above zero", "`4 min`"],
        ),
        beside(
            "too many points",
            r#"{"kind": "curve", "name": "p", "from": "door", "points": 1e9}"#,
            &["field points", "from 2 to 2000"],
        ),
        beside(
            "a range turned round",
            r#"{"kind": "curve", "name": "p", "from": "door", "nearest": "9 m", "farthest": "3 m"}"#,
            &["field farthest", "beyond nearest", "greater `farthest`"],
        ),
        wrong(
            "an outline that crosses itself",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m", "0 m"], ["2 m", "2 m"], ["2 m", "0 m"], ["0 m", "1 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &[
                "field vertices[",
                "must not cross itself",
                "in order around the outline",
            ],
        ),
        wrong(
            "an outline without area",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m", "0 m"], ["1 m", "1 m"], ["2 m", "2 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vertices", "enclose an area"],
        ),
        wrong(
            "two corners",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m", "0 m"], ["1 m", "1 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &[
                "field vertices",
                "from 3 to 200 pairs, found 2",
                "`0 m, 0 m; 1 m, 0 m; 0 m, 1 m`",
            ],
        ),
        wrong(
            "a fault in one corner",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m", "0 m"], ["1 m", "0 m"], ["1 m", "nothing.width"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vertices[2][1]", "no cell is named `nothing`"],
        ),
        wrong(
            "a corner of another dimension",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m", "0 m"], ["1 s", "0 m"], ["1 m", "1 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vertices[1][0]", "expected a length"],
        ),
        wrong(
            "corners as words",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": "round", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vertices", "expected pairs such as", "comma"],
        ),
        refused(
            "corners that are no pairs",
            notebook(
                r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "vertices": [["0 m"], ["1 m", "0 m"], ["1 m", "1 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            ),
            &["field vertices[0]", "expected a pair such as"],
        ),
        wrong(
            "a cylinder as an opening",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "cylinder", "diameter": "1 m", "height": "1 m", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &[
                "field outline",
                "expected disc or rectangle or polygon for an opening, found cylinder",
            ],
        ),
        wrong(
            "a table out of order",
            r#"{"kind": "source", "name": "hot", "form": "pool", "outline": "disc", "diameter": "1 m", "temperature": "1500 K", "z": "1 m", "spectrum": [["1 µm", "0.4"], ["3 µm", "0.3"], ["2 µm", "0.2"]]}"#,
            &["field spectrum[2][0]", "longer wavelength", "growing order"],
        ),
        wrong(
            "a table and a number",
            r#"{"kind": "source", "name": "hot", "form": "pool", "outline": "disc", "diameter": "1 m", "spectrum": [["1 µm", "0.4"], ["3 µm", "0.3"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field emissivity", "does not go with `spectrum`"],
        ),
        wrong(
            "no emissivity at all",
            r#"{"kind": "source", "name": "hot", "form": "pool", "outline": "disc", "diameter": "1 m", "temperature": "1500 K", "z": "1 m"}"#,
            &["field emissivity", "found nothing", "add `emissivity`"],
        ),
        wrong(
            "a wall thicker than twenty openings",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "disc", "diameter": "0.1 m", "wall_thickness": "2.1 m", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field wall_thickness", "20"],
        ),
        wrong(
            "a dent before a thick wall",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "polygon", "wall_thickness": "0.2 m", "vertices": [["0 m", "0 m"], ["1 m", "0 m"], ["0.2 m", "0.2 m"], ["0 m", "1 m"]], "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vertices", "dent"],
        ),
        wrong(
            "a rim below the melt",
            r#"{"kind": "source", "name": "hot", "form": "pool", "outline": "disc", "diameter": "1 m", "freeboard": "-0.1 m", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field freeboard", "zero or a value above it"],
        ),
        wrong(
            "a vessel that runs out",
            r#"{"kind": "source", "name": "hot", "form": "pool", "outline": "disc", "diameter": "1 m", "freeboard": "0.1 m", "vessel_tilt": "40 °", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field vessel_tilt", "the metal runs out"],
        ),
        wrong(
            "a freeboard of an opening",
            r#"{"kind": "source", "name": "hot", "form": "opening", "outline": "disc", "diameter": "1 m", "freeboard": "0.1 m", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &["field freeboard", "does not belong to this form"],
        ),
        beside(
            "two sources in one place",
            r#"{"kind": "source", "name": "hot", "form": "body", "outline": "sphere", "diameter": "0.4 m", "temperature": "1500 K", "emissivity": "0.9", "z": "1 m"}"#,
            &[
                "stands clear of all others",
                "through or inside door",
                "move one of them",
            ],
        ),
        beside(
            "a screen through a source",
            r#"{"kind": "screen", "name": "plate", "make": "solid", "width": "2 m", "height": "2 m", "z": "1 m", "heading": "90 °"}"#,
            &[
                "expected a screen that stands clear",
                "through or inside door",
            ],
        ),
        beside(
            "a plate that is a mesh",
            r#"{"kind": "screen", "name": "plate", "make": "solid", "width": "2 m", "height": "2 m", "y": "1 m", "z": "1 m", "open_fraction": "0.5"}"#,
            &["field open_fraction", "does not belong to this make"],
        ),
        beside(
            "a mesh that is all open",
            r#"{"kind": "screen", "name": "plate", "make": "mesh", "width": "2 m", "height": "2 m", "y": "1 m", "z": "1 m", "open_fraction": "1"}"#,
            &["field open_fraction", "from 0 to less than 1", "`50 %`"],
        ),
        beside(
            "a filter of one number",
            r#"{"kind": "screen", "name": "plate", "make": "filter", "width": "2 m", "height": "2 m", "y": "1 m", "z": "1 m", "transmittance": "0.5"}"#,
            &["field near_ir_transmittance", "add `near_ir_transmittance`"],
        ),
        beside(
            "a screen of nothing",
            r#"{"kind": "screen", "name": "plate", "make": "paper", "width": "2 m", "height": "2 m", "y": "1 m", "z": "1 m"}"#,
            &["field make", "expected one of solid, mesh, filter"],
        ),
        beside(
            "an unknown formula for the air",
            r#"{"kind": "surroundings", "name": "bay", "absorption": "beer"}"#,
            &["field absorption", "off, power_law, wayne"],
        ),
        beside(
            "a position in the tunnel",
            r#"{"kind": "source", "name": "hole", "form": "opening", "outline": "disc", "diameter": "1 m", "wall_thickness": "0.5 m", "temperature": "1500 K", "emissivity": "0.9", "x": "5 m", "z": "1.6 m"}, {"kind": "position", "name": "p", "x": "5 m", "y": "-0.2 m", "reach": "0 m"}"#,
            &["field x", "lies inside or touches source hole"],
        ),
    ]
}

#[test]
fn every_bad_input_is_told_with_its_place_and_leaves_the_file_untouched() {
    let mut failed = Vec::new();
    let table = table();
    assert!(table.len() >= 80, "{} cases", table.len());
    for bad in table {
        let desk = Desk::new();
        let _ = desk.put("bad.farglow", &bad.file);
        // `run` fails on a panic.
        let ran = desk.run(&["calc", "--json", "bad.farglow"]);
        let plain = desk.run(&["calc", "bad.farglow"]);
        let told = if bad.code == 2 {
            ran.err.clone()
        } else {
            let value: serde_json::Value = serde_json::from_str(&ran.out).unwrap_or_default();
            let cells = value["cells"].as_array().cloned().unwrap_or_default();
            cells
                .iter()
                .flat_map(|cell| cell["errors"].as_array().cloned().unwrap_or_default())
                .map(|error| {
                    let piece = |key: &str| error[key].as_str().unwrap_or_default().to_owned();
                    format!("{}: {}", piece("place"), piece("text"))
                })
                .collect::<Vec<_>>()
                .join("\n")
        };
        let mut note = |what: &str| {
            failed.push(format!("{}: {what}; told: {told}", bad.what));
        };
        if ran.code != bad.code || plain.code != bad.code {
            note(&format!(
                "exit codes {} and {}, expected {}",
                ran.code, plain.code, bad.code
            ));
        }
        for piece in &bad.says {
            if !told.contains(piece) {
                note(&format!("`{piece}` is not told"));
            }
        }
        if told.len() > 2000 {
            note(&format!("{} bytes of message", told.len()));
        }
        if bad.code == 2 && !ran.err.starts_with("farglow: bad.farglow: ") {
            note("the file is not named");
        }
        if bad.code == 3 && !plain.out.contains("error: ") {
            note("the text does not tell it");
        }
        // A worksheet of it touches the notebook no more than working it out.
        let issued = desk.run(&["issue", "bad.farglow", "-o", "bad.pdf"]);
        if issued.code != bad.code || desk.path("bad.pdf").exists() != (bad.code == 3) {
            note(&format!("issue ended with {}", issued.code));
        }
        if desk.read("bad.farglow") != bad.file {
            note("the file was touched");
        }
    }
    assert!(failed.is_empty(), "\n{}", failed.join("\n"));
}

#[test]
fn an_unreadable_file_outweighs_a_cell_in_error() {
    let desk = Desk::new();
    let _ = desk.put(
        "good.farglow",
        notebook(r#"{"kind": "value", "name": "a", "entry": "1 m"}"#),
    );
    let _ = desk.put(
        "wrong.farglow",
        notebook(r#"{"kind": "value", "name": "a", "entry": "1 mtr"}"#),
    );
    let _ = desk.put("broken.farglow", "{");
    for (files, code) in [
        (&["good.farglow"][..], 0),
        (&["good.farglow", "wrong.farglow"], 3),
        (&["wrong.farglow", "good.farglow"], 3),
        (&["wrong.farglow", "broken.farglow"], 2),
        (&["broken.farglow", "wrong.farglow"], 2),
        (&["wrong.farglow", "missing.farglow", "good.farglow"], 2),
        (&["."], 2),
    ] {
        let mut arguments = vec!["calc"];
        arguments.extend(files);
        let ran = desk.run(&arguments);
        assert_eq!(ran.code, code, "{files:?}: {}", ran.err);
        // The good one is worked out beside them.
        let told = ran.out.lines().any(|line| {
            let line = line.trim();
            line.starts_with("value ") && line.ends_with(" 1 m")
        });
        assert_eq!(
            told,
            files.contains(&"good.farglow"),
            "{files:?}: {}",
            ran.out
        );
    }
}

#[test]
fn all_faults_of_a_file_are_told_at_once() {
    let desk = Desk::new();
    let _ = desk.put(
        "bad.farglow",
        r#"{"farglow": 1, "titel": "", "cells": [
            {"kind": "valu", "name": "a"},
            {"kind": "value", "name": "m", "entry": "1"},
            {"kind": "value", "name": "c", "entry": 2}]}"#,
    );
    let ran = desk.run(&["calc", "bad.farglow"]);
    assert_eq!(ran.code, 2);
    for piece in [
        "line 1, column 16",
        "line 2, column 22",
        "line 3, column 39",
        "line 4, column 53",
    ] {
        assert!(ran.err.contains(piece), "{piece}: {}", ran.err);
    }
}

#[test]
fn very_large_input_ends_in_a_message() {
    let desk = Desk::new();
    // 100,001 cells are one too many.
    let cells: Vec<String> = (0..100_001)
        .map(|number| format!(r#"{{"kind":"note","name":"n{number}","text":""}}"#))
        .collect();
    let _ = desk.put("many.farglow", notebook(&cells.join(",")));
    let ran = desk.run(&["calc", "many.farglow"]);
    assert_eq!(ran.code, 2, "{}", ran.err);
    assert!(
        ran.err.contains("at most 100000 cells, found 100001"),
        "{}",
        ran.err
    );
    assert!(ran.err.contains("split the job"), "{}", ran.err);
    // One byte more than is read.
    let path = desk.path("large.farglow");
    let file = std::fs::File::create(&path).expect("a file can be made");
    file.set_len(64 * 1024 * 1024 + 1)
        .expect("a sparse file can be made");
    let ran = desk.run(&["calc", "large.farglow"]);
    assert_eq!(ran.code, 2, "{}", ran.err);
    assert!(ran.err.contains("at most 67108864 are read"), "{}", ran.err);
}

#[test]
fn a_long_chain_and_a_long_ring_of_cells_end_well() {
    let chain = |last: &str| {
        let mut cells: Vec<String> = (1..3000)
            .map(|number| {
                format!(
                    r#"{{"kind":"formula","name":"n{number}","entry":"n{} + 1"}}"#,
                    number - 1
                )
            })
            .collect();
        cells.push(format!(
            r#"{{"kind":"formula","name":"n0","entry":"{last}"}}"#
        ));
        notebook(&cells.join(","))
    };
    let desk = Desk::new();
    let _ = desk.put("chain.farglow", chain("0"));
    let told = desk.calc(&["chain.farglow"], 0);
    let last = &crate::program::cell(&told, "n2999")["outputs"]["value"]["si"];
    assert_eq!(last.as_f64(), Some(2999.0), "{last}");
    let _ = desk.put("ring.farglow", chain("n2999"));
    let told = desk.calc(&["ring.farglow"], 3);
    let cells = told["cells"].as_array().expect("a list");
    assert!(cells.iter().all(|cell| cell["state"] == "error"));
    let error = &crate::program::cell(&told, "n5")["errors"][0]["text"];
    let error = error.as_str().expect("a text");
    assert!(
        error.contains("n5 → n4 → n3") && error.contains("… → n5"),
        "{error}"
    );
}
