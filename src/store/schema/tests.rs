use super::*;
use crate::notebook::Kind;
use crate::notebook::cell::{Basis, Content};

const WHOLE: &str = r#"{
  "farglow": 1,
  "title": "Charging door, furnace 2",
  "job": { "site": "Harrow Bank Foundry", "revision": "A", "date": "2026-12-01" },
  "confirmed": [
    { "guidance": "eu-2006-25-m", "edition": "2006", "by": "R. Vane", "date": "2026-11-30" }
  ],
  "cells": [
    { "kind": "value", "name": "t_hearth", "entry": "1250 ± 25 °C", "basis": "measured", "note": "door open" },
    { "kind": "source", "name": "door", "form": "opening", "outline": "rectangle",
      "width": { "entry": "0.90 m", "basis": "nameplate" }, "height": { "entry": "0.70 m" },
      "temperature": "t_hearth", "emissivity": "0.95", "z": "1.20 m" },
    { "kind": "curve", "name": "falloff", "from": "door", "points": 60 },
    { "kind": "assessment", "name": "eye", "position": "charger", "guidance": ["eu-2006-25-m"] }
  ]
}"#;

#[test]
fn a_notebook_is_read_and_written_back_the_same() {
    let stored = read(WHOLE.as_bytes()).expect("a whole notebook");
    let notebook = &stored.notebook;
    assert_eq!(notebook.cells.len(), 4);
    assert_eq!(notebook.cells[1].kind, Kind::Source);
    let width = notebook.cells[1].field("width").expect("typed");
    assert_eq!(width.basis, Some(Basis::Nameplate));
    assert_eq!(width.content, Content::Text("0.90 m".to_owned()));
    let again = read(write(notebook).as_bytes()).expect("what was written");
    assert_eq!(again, stored);
    assert_eq!(digest(&to_value(notebook)), stored.digest);
    assert_eq!(write(&again.notebook), write(notebook));
}

#[test]
fn faults_have_their_places() {
    for (text, place, says) in [
        ("", "", "empty"),
        ("[]", "line 1, column 1", "expected an object"),
        ("{}", "line 1, column 1", "`\"farglow\": 1`"),
        (
            r#"{"farglow": 2, "cells": [], "new": 1}"#,
            "line 1, column 13",
            "format 2",
        ),
        (
            r#"{"farglow": 0, "cells": []}"#,
            "line 1, column 13",
            "found 0",
        ),
        (
            r#"{"farglow": "1", "cells": []}"#,
            "line 1, column 13",
            "a format number",
        ),
        (r#"{"farglow": 1}"#, "line 1, column 1", "`cells`"),
        (
            r#"{"farglow": 1, "cels": [], "cells": []}"#,
            "line 1, column 16",
            "did you mean `cells`?",
        ),
        (
            r#"{"farglow": 1, "cells": {}}"#,
            "line 1, column 25",
            "expected a list",
        ),
        (
            r#"{"farglow": 1, "job": {"sit": ""}, "cells": []}"#,
            "line 1, column 24",
            "did you mean `site`?",
        ),
        (
            r#"{"farglow": 1, "confirmed": [{"guidance": "x"}], "cells": []}"#,
            "line 1, column 30",
            "`edition`",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value"}]}"#,
            "line 1, column 26",
            "expected `name`",
        ),
        (
            r#"{"farglow": 1, "cells": [{"name": "a"}]}"#,
            "line 1, column 26",
            "expected `kind`",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "valu", "name": "a"}]}"#,
            "line 1, column 35",
            "did you mean `value`?",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value", "name": "a", "entri": "1"}]}"#,
            "line 1, column 57",
            "did you mean `entry`?",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value", "name": "2a", "entry": "1"}]}"#,
            "line 1, column 52",
            "found `2a`",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value", "name": "m", "entry": "1"}]}"#,
            "line 1, column 52",
            "stands for a unit",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value", "name": "a", "entry": 1}]}"#,
            "line 1, column 66",
            "expected a text",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "value", "name": "a", "entry": "1", "basis": "guess"}]}"#,
            "line 1, column 80",
            "unknown basis `guess`",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "note", "name": "a", "text": "1"}, {"kind": "note", "name": "a", "text": "2"}]}"#,
            "line 1, column 95",
            "another cell has",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "curve", "name": "a", "from": "b", "points": "60"}]}"#,
            "line 1, column 80",
            "a whole number",
        ),
        (
            r#"{"farglow": 1, "cells": [{"kind": "surroundings", "name": "a"}, {"kind": "surroundings", "name": "b"}]}"#,
            "line 1, column 65",
            "a second",
        ),
        (
            r#"{"farglow": 1, "farglow": 1, "cells": []}"#,
            "line 1, column 16",
            "farglow",
        ),
    ] {
        let error = read(text.as_bytes()).expect_err(text).to_string();
        assert!(
            error.contains(place) && error.contains(says),
            "{text}\n{error}"
        );
    }
}

#[test]
fn all_faults_of_a_file_are_told_at_once() {
    let text = r#"{"farglow": 1, "titel": "", "cells": [{"kind": "x", "name": "a"}, {"kind": "value", "name": "b", "entry": 2}]}"#;
    let Err(Error::Faults(faults)) = read(text.as_bytes()) else {
        panic!("three faults expected");
    };
    assert_eq!(faults.len(), 3, "{faults:?}");
}

#[test]
fn the_digest_does_not_see_the_layout() {
    let tight = r#"{"farglow":1,"cells":[{"kind":"note","name":"n","text":"é"}]}"#;
    let loose = "{ \"cells\" : [ { \"name\":\"n\", \"text\":\"\\u00e9\",\n \"kind\":\"note\" } ],\n\"farglow\":1 }";
    let digest = |text: &str| read(text.as_bytes()).map(|stored| stored.digest);
    assert_eq!(digest(tight), digest(loose));
    // SHA-256 of the canonical form, by an independent tool (sha256sum).
    assert_eq!(
        digest(tight).as_deref(),
        Ok("2c76402d082770529f55e7e21fa25795f2c6718ee2878769d6b5898674fa6b7b")
    );
}
