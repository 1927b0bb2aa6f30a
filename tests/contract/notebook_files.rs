//! The notebooks that are shipped: every one opens, works out and is stable.

use std::collections::BTreeSet;
use std::path::Path;

use farglow::guidance::Library;
use farglow::store::schema;
use farglow::store::template;

use crate::program::Desk;

#[test]
fn every_template_works_out_and_nothing_in_it_is_dropped() {
    for template in template::ALL {
        let desk = Desk::new();
        let name = format!("{}.farglow", template.name);
        let _ = desk.put(&name, template.text);
        let told = desk.calc(&[&name], 0);
        let raw: serde_json::Value = serde_json::from_str(template.text).expect("JSON");
        let cells = told["cells"].as_array().expect("a list").len();
        assert_eq!(cells, raw["cells"].as_array().expect("a list").len());
        for cell in told["cells"].as_array().expect("a list") {
            assert_eq!(cell["state"], "ok", "{}: {cell}", template.name);
        }
        // Read and written again it is the very same file.
        let stored = schema::read(template.text.as_bytes()).expect("it opens");
        assert_eq!(schema::write(&stored.notebook), template.text, "{name}");
        assert_eq!(schema::to_value(&stored.notebook), raw, "{name}");
        assert_eq!(told["digest"], format!("sha256:{}", stored.digest));
        assert_eq!(desk.read(&name), template.text.as_bytes(), "{name}");
    }
}

#[test]
fn every_file_in_the_folder_of_templates_is_built_in_and_no_other() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("templates");
    let there: BTreeSet<String> = std::fs::read_dir(folder)
        .expect("the folder can be listed")
        .map(|entry| {
            let name = entry.expect("an entry").file_name();
            name.to_string_lossy().into_owned()
        })
        .collect();
    let built_in: BTreeSet<String> = template::ALL
        .iter()
        .map(|template| format!("{}.farglow", template.name))
        .collect();
    assert_eq!(there, built_in);
}

#[test]
fn every_template_leaves_its_inputs_to_be_confirmed_and_judges_every_position() {
    for template in template::ALL {
        let desk = Desk::new();
        let name = format!("{}.farglow", template.name);
        let _ = desk.put(&name, template.text);
        let told = desk.calc(&[&name], 0);
        let open = |code: &str| {
            told["readiness"]
                .as_array()
                .expect("a list")
                .iter()
                .filter(|item| item["code"] == code)
                .count()
        };
        assert!(open("unconfirmed") > 0, "{name}: nothing to confirm");
        assert_eq!(open("not-judged"), 0, "{name}");
        assert_eq!(open("no-position"), 0, "{name}");
        assert!(open("job-line") > 0, "{name}: it is signed by somebody");
    }
}

#[test]
fn the_digest_is_that_of_another_program() {
    // Source: SHA-256 by `sha256sum` over the canonical form of RFC 8785, which
    // for these plain texts is JSON without blanks and with sorted keys.
    let desk = Desk::new();
    let text = "{\"cells\":[{\"entry\":\"2 m\",\"kind\":\"value\",\"name\":\"a\"}],\"farglow\":1}";
    let _ = desk.put("canonical", text);
    let output = std::process::Command::new("sha256sum")
        .arg(desk.path("canonical"))
        .output()
        .expect("sha256sum is there: apt-get install -y coreutils");
    let expected = String::from_utf8_lossy(&output.stdout)
        .split_whitespace()
        .next()
        .map(str::to_owned)
        .expect("a digest");
    let _ = desk.put(
        "a.farglow",
        "{ \"farglow\": 1,\n \"cells\": [ {\"kind\": \"value\", \"name\": \"a\", \"entry\": \"2\\u0020m\"} ] }\n",
    );
    let told = desk.calc(&["a.farglow"], 0);
    assert_eq!(told["digest"], format!("sha256:{expected}"));
}

#[test]
fn the_notebook_of_the_handbook_page_opens_and_works_out() {
    // The example by which the file format is explained.
    let desk = Desk::new();
    let _ = desk.put("door.farglow", EXAMPLE);
    let told = desk.calc(&["door.farglow"], 0);
    assert_eq!(told["title"], "Charging door, furnace 2");
    for id in ["eu-2006-25-m", "icnirp-2013-ir-eye"] {
        assert!(Library::shipped().get(id).is_some(), "{id}");
    }
}

/// The example by which the file format is explained.
pub const EXAMPLE: &str = r#"{
  "farglow": 1,
  "title": "Charging door, furnace 2",
  "job": { "site": "", "area": "", "task": "", "revision": "A", "prepared_by": "", "checked_by": "", "date": "2026-12-01" },
  "cells": [
    { "kind": "value",    "name": "t_hearth", "entry": "1250 ± 25 °C", "basis": "measured", "note": "two-colour pyrometer, door open" },
    { "kind": "formula",  "name": "door_area", "entry": "door.width * door.height", "unit": "m²" },
    { "kind": "source",   "name": "door", "form": "opening", "outline": "rectangle",
      "width": "0.90 m", "height": "0.70 m", "wall_thickness": "0 m",
      "temperature": "t_hearth", "emissivity": "0.95 ± 0.03",
      "x": "0 m", "y": "0 m", "z": "1.20 m", "heading": "0 °" },
    { "kind": "position", "name": "charger", "from": "door", "distance": "2.5 m", "z": "1.60 m", "faces": "strongest", "stay": "4 min" },
    { "kind": "curve",    "name": "falloff", "from": "door", "z": "1.60 m", "nearest": "0.5 m", "farthest": "20 m", "points": 60 },
    { "kind": "assessment", "name": "charger_eye", "position": "charger", "guidance": ["eu-2006-25-m", "icnirp-2013-ir-eye"] },
    { "kind": "zone",     "name": "eye_line", "from": "door", "guidance": "icnirp-2013-ir-eye", "stay": "8 h" }
  ]
}"#;
