//! `farglow calc`: the shape of its JSON, which other programs rely on, and
//! that its text for people tells the same.

use std::collections::BTreeSet;

use farglow::notebook::caution;
use serde_json::Value;

use crate::notebook_files::EXAMPLE;
use crate::program::{Desk, cell, notebook};

/// A cell of every kind. Only the temperature `t` carries a spread, and only
/// `door` is fed by it.
const WHOLE: &str = r#"
    { "kind": "note", "name": "about", "text": "an invented bay" },
    { "kind": "value", "name": "t", "entry": "1250 ± 25 °C" },
    { "kind": "formula", "name": "area", "entry": "door.width * door.height", "unit": "m²" },
    { "kind": "formula", "name": "hotter", "entry": "t > 1000 K" },
    { "kind": "surroundings", "name": "bay", "air_temperature": "30 °C" },
    { "kind": "source", "name": "door", "form": "opening", "outline": "rectangle", "width": "0.9 m",
      "height": "0.7 m", "temperature": "t", "emissivity": "0.95", "z": "1.2 m" },
    { "kind": "source", "name": "pot", "form": "pool", "outline": "disc", "diameter": "0.4 m",
      "temperature": "1100 °C", "emissivity": "0.3", "x": "3 m", "z": "0.6 m" },
    { "kind": "position", "name": "charger", "from": "door", "distance": "2.5 m", "faces": "door", "stay": "4 min" },
    { "kind": "position", "name": "gate", "from": "door", "distance": "120 m", "stay": "8 h" },
    { "kind": "curve", "name": "falloff", "from": "door", "points": 7 },
    { "kind": "assessment", "name": "near", "position": "charger",
      "guidance": ["eu-2006-25-m", "eu-2006-25-o", "icnirp-2013-ir-eye", "icnirp-2013-skin", "pain-time"] },
    { "kind": "assessment", "name": "far", "position": "gate", "guidance": "icnirp-2013-ir-eye" },
    { "kind": "zone", "name": "line", "from": "door", "guidance": "icnirp-2013-ir-eye", "stay": "8 h" },
    { "kind": "zone", "name": "short", "from": "door", "guidance": "icnirp-2013-ir-eye", "stay": "8 h", "farthest": "3 m" },
    { "kind": "zone", "name": "free", "from": "pot", "heading": "90 °", "guidance": "icnirp-2013-ir-eye", "stay": "10 s" }"#;

fn whole() -> (Desk, Value) {
    let desk = Desk::new();
    let _ = desk.put("whole.farglow", notebook(WHOLE));
    let told = desk.calc(&["whole.farglow"], 0);
    (desk, told)
}

fn keys(value: &Value) -> BTreeSet<&str> {
    value
        .as_object()
        .unwrap_or_else(|| panic!("expected an object, found {value}"))
        .keys()
        .map(String::as_str)
        .collect()
}

fn set<'a>(names: &[&'a str]) -> BTreeSet<&'a str> {
    names.iter().copied().collect()
}

/// Which of the three forms an output has, or what is wrong with it.
fn form(value: &Value) -> Result<&'static str, String> {
    let keys = keys(value);
    let bad = || Err(format!("no form of an output: {value}"));
    if keys == set(&["rows"]) {
        return Ok("table");
    }
    let bare: BTreeSet<&str> = keys
        .iter()
        .copied()
        .filter(|key| !["low", "high"].contains(key))
        .collect();
    let number = |key: &str| {
        value
            .get(key)
            .is_none_or(|bound| bound.as_f64().is_some_and(f64::is_finite))
    };
    if bare == set(&["si", "unit"]) {
        if !number("si") || !value["unit"].is_string() {
            return bad();
        }
        if keys.contains("low") != keys.contains("high") || !number("low") || !number("high") {
            return bad();
        }
        return Ok("quantity");
    }
    if bare == set(&["text"]) && value["text"].is_string() {
        return Ok("word");
    }
    bad()
}

#[test]
fn a_notebook_is_one_object_of_the_agreed_shape() {
    let (_, told) = whole();
    let keys = keys(&told);
    for key in ["file", "title", "digest", "cells"] {
        assert!(keys.contains(key), "{key} is missing in {keys:?}");
    }
    assert_eq!(told["file"], "whole.farglow");
    assert_eq!(told["title"], "");
    let digest = told["digest"].as_str().expect("a text");
    assert!(
        digest.len() == 71
            && digest.starts_with("sha256:")
            && digest[7..].chars().all(|sign| sign.is_ascii_hexdigit()),
        "{digest}"
    );
    let cells = told["cells"].as_array().expect("a list");
    assert_eq!(cells.len(), 15);
    for cell in cells {
        assert_eq!(
            self::keys(cell),
            set(&["name", "kind", "state", "outputs", "errors", "cautions"]),
            "{cell}"
        );
        assert_eq!(cell["state"], "ok");
        for (name, output) in cell["outputs"].as_object().expect("an object") {
            let form = form(output).unwrap_or_else(|error| panic!("{name}: {error}"));
            if form == "table" {
                for row in output["rows"].as_array().expect("a list") {
                    for (column, value) in row.as_object().expect("an object") {
                        let form = self::form(value);
                        assert!(
                            matches!(form, Ok("quantity" | "word")),
                            "{name} {column}: {form:?}"
                        );
                    }
                }
            }
        }
        for list in ["errors", "cautions"] {
            for told in cell[list].as_array().expect("a list") {
                assert_eq!(self::keys(told), set(&["code", "text", "place"]), "{told}");
                let place = told["place"].as_str().expect("a text");
                let name = cell["name"].as_str().expect("a text");
                assert!(place.starts_with(&format!("cell {name}")), "{told}");
            }
        }
    }
}

#[test]
fn every_kind_has_the_outputs_that_must_exist_in_their_units() {
    let (_, told) = whole();
    for (name, kind, outputs) in [
        ("about", "note", &[][..]),
        ("t", "value", &[("value", "K")]),
        ("area", "formula", &[("value", "m²")]),
        ("bay", "surroundings", &[("background", "W/m²")]),
        (
            "door",
            "source",
            &[
                ("exitance", "W/m²"),
                ("near_ir_exitance", "W/m²"),
                ("power", "W"),
                ("peak_wavelength", "m"),
                ("radiance", "W/(m²·sr)"),
                ("area", "m²"),
                ("effective_emissivity", ""),
            ],
        ),
        (
            "charger",
            "position",
            &[
                ("irradiance", "W/m²"),
                ("near_ir_irradiance", "W/m²"),
                ("skin_irradiance", "W/m²"),
                ("background", "W/m²"),
                ("blue_light_radiance", "W/(m²·sr)"),
                ("retinal_radiance_2006", "W/(m²·sr)"),
                ("retinal_radiance_2013", "W/(m²·sr)"),
                ("ir_a_radiance", "W/(m²·sr)"),
                ("envelope_irradiance", "W/m²"),
                ("envelope_near_ir_irradiance", "W/m²"),
                ("irradiance_from.door", "W/m²"),
                ("irradiance_from.pot", "W/m²"),
                ("view_factor.door", ""),
                ("view_factor.pot", ""),
                ("angular_subtense.door", "rad"),
                ("mean_radiant_temperature", "K"),
            ],
        ),
        (
            "line",
            "zone",
            &[("distance", "m"), ("clear_distance", "m")],
        ),
    ] {
        let cell = cell(&told, name);
        assert_eq!(cell["kind"], kind);
        for (output, unit) in outputs {
            let value = &cell["outputs"][output];
            assert_eq!(value["unit"], *unit, "{name}.{output}: {value}");
            let si = value["si"].as_f64();
            assert!(si.is_some_and(|si| si >= 0.0), "{name}.{output}: {value}");
        }
    }
    for (name, kind, rows, columns) in [
        (
            "falloff",
            "curve",
            7,
            &[
                ("distance", Some("m")),
                ("clear_distance", Some("m")),
                ("irradiance", Some("W/m²")),
                ("near_ir_irradiance", Some("W/m²")),
            ][..],
        ),
        (
            "near",
            "assessment",
            5,
            &[
                ("guidance", None),
                ("exposure", Some("W/m²")),
                ("limit", Some("W/m²")),
                ("ratio", Some("")),
                ("allowed_time", Some("s")),
                ("finding", None),
            ],
        ),
    ] {
        let cell = cell(&told, name);
        assert_eq!(cell["kind"], kind);
        let table = cell["outputs"]["rows"]["rows"].as_array().expect("a list");
        assert_eq!(table.len(), rows, "{name}");
        for (column, unit) in columns {
            let value = &table[0][column];
            match unit {
                Some(unit) => assert_eq!(value["unit"], *unit, "{name} {column}: {value}"),
                None => assert!(value["text"].is_string(), "{name} {column}: {value}"),
            }
        }
    }
    assert!(cell(&told, "near")["outputs"]["finding"]["text"] == "over");
    assert_eq!(
        cell(&told, "hotter")["outputs"]["value"]["text"],
        "true",
        "a comparison is a word"
    );
}

#[test]
fn words_stand_where_there_is_no_number() {
    let (_, told) = whole();
    // 120 m off, the near infrared lies below the limit without end.
    let far = &cell(&told, "far")["outputs"];
    assert_eq!(
        far["rows"]["rows"][0]["allowed_time"],
        serde_json::json!({"text": "unlimited"})
    );
    assert_eq!(
        far["allowed_time"],
        serde_json::json!({"text": "unlimited"})
    );
    assert_eq!(
        far["finding"]["text"], "not assessed",
        "other effects are missing"
    );
    for (zone, words) in [
        ("short", "met nowhere within range"),
        ("free", "met everywhere"),
    ] {
        let outputs = &cell(&told, zone)["outputs"];
        assert_eq!(outputs["distance"]["text"], words, "{zone}: {outputs}");
        assert_eq!(
            outputs["clear_distance"]["text"], words,
            "{zone}: {outputs}"
        );
        assert!(outputs["distance"].get("si").is_none(), "{zone}: {outputs}");
    }
}

#[test]
fn bounds_are_there_where_a_spread_reaches_and_nowhere_else() {
    let (_, told) = whole();
    let mut bounded = BTreeSet::new();
    let mut exact = BTreeSet::new();
    let mut note = |name: String, value: &Value| {
        let Some(si) = value["si"].as_f64() else {
            return;
        };
        match (value["low"].as_f64(), value["high"].as_f64()) {
            (Some(low), Some(high)) => {
                assert!(low < si && si < high, "{name}: {low} {si} {high}");
                let _ = bounded.insert(name);
            }
            _ => drop(exact.insert(name)),
        }
    };
    for cell in told["cells"].as_array().expect("a list") {
        let name = cell["name"].as_str().expect("a text");
        for (output, value) in cell["outputs"].as_object().expect("an object") {
            for row in value["rows"].as_array().into_iter().flatten() {
                for (column, value) in row.as_object().expect("an object") {
                    note(format!("{name}.{column}"), value);
                }
            }
            note(format!("{name}.{output}"), value);
        }
    }
    for name in [
        "t.value",
        "door.exitance",
        "door.near_ir_exitance",
        "door.power",
        "door.peak_wavelength",
        "door.radiance",
        "charger.irradiance",
        "charger.near_ir_irradiance",
        "charger.envelope_irradiance",
        "charger.blue_light_radiance",
        "charger.irradiance_from.door",
        "falloff.irradiance",
        "near.exposure",
        "near.ratio",
        "near.allowed_time",
        "line.distance",
        "line.clear_distance",
    ] {
        assert!(bounded.contains(name), "{name} has no bounds");
    }
    for name in [
        "area.value",
        "bay.background",
        "door.area",
        "pot.exitance",
        "pot.power",
        "pot.area",
        "charger.irradiance_from.pot",
        "charger.view_factor.pot",
        "falloff.distance",
        "near.limit",
        "line.limit",
    ] {
        assert!(
            exact.contains(name) && !bounded.contains(name),
            "{name} has bounds"
        );
    }
    // Without a spread there is none at all.
    let desk = Desk::new();
    let _ = desk.put(
        "exact.farglow",
        notebook(&WHOLE.replace("1250 ± 25", "1250")),
    );
    let plain = desk.calc(&["exact.farglow"], 0);
    assert!(!plain.to_string().contains("\"low\""), "{plain}");
    assert_eq!(
        cell(&plain, "charger")["outputs"]["irradiance"]["si"],
        cell(&told, "charger")["outputs"]["irradiance"]["si"],
        "a spread moves no nominal value"
    );
}

#[test]
fn a_cell_in_error_has_no_outputs_and_those_behind_it_wait() {
    let desk = Desk::new();
    let _ = desk.put(
        "bad.farglow",
        notebook(
            r#"{ "kind": "value", "name": "t", "entry": "1250 °C + 20 K" },
               { "kind": "source", "name": "door", "form": "opening", "outline": "disc", "diameter": "1 m",
                 "temperature": "t", "emissivity": "1", "z": "1 m" },
               { "kind": "position", "name": "stand", "from": "door", "distance": "3 m", "stay": "1 min" },
               { "kind": "assessment", "name": "judged", "position": "stand", "guidance": "eu-2006-25-m" },
               { "kind": "value", "name": "free", "entry": "2 m" }"#,
        ),
    );
    let told = desk.calc(&["bad.farglow"], 3);
    for (name, state) in [
        ("t", "error"),
        ("door", "waiting"),
        ("stand", "waiting"),
        ("judged", "waiting"),
        ("free", "ok"),
    ] {
        let cell = cell(&told, name);
        assert_eq!(cell["state"], state, "{cell}");
        let outputs = cell["outputs"].as_object().expect("an object").len();
        assert_eq!(outputs == 0, state != "ok", "{cell}");
        let errors = cell["errors"].as_array().expect("a list").len();
        assert_eq!(errors == 0, state != "error", "{cell}");
        if state == "waiting" {
            assert_eq!(cell["waiting_for"], serde_json::json!(["t"]), "{cell}");
        }
    }
    let error = &cell(&told, "t")["errors"][0];
    assert_eq!(keys(error), set(&["code", "text", "place"]));
    assert_eq!(error["place"], "cell t, field entry, character 9");
}

#[test]
fn several_files_are_a_list_in_their_order_whatever_the_number_of_jobs() {
    let desk = Desk::new();
    let mut names = Vec::new();
    for number in 0..5 {
        let name = format!("{number}.farglow");
        let _ = desk.put(
            &name,
            EXAMPLE.replace("2.5 m", &format!("{}.5 m", number + 2)),
        );
        names.push(name);
    }
    let _ = desk.put("broken.farglow", "{");
    names.insert(2, "broken.farglow".to_owned());
    let names: Vec<&str> = names.iter().map(String::as_str).collect();
    let told = desk.calc(&names, 2);
    let list = told.as_array().expect("several files are a list");
    let files: Vec<&str> = list.iter().filter_map(|one| one["file"].as_str()).collect();
    assert_eq!(files, names);
    assert!(
        list[2]["error"]
            .as_str()
            .is_some_and(|error| error.contains("line 1"))
    );
    for form in [&["--json"][..], &[]] {
        let run = |jobs: &str| {
            let mut arguments = vec!["calc", "--jobs", jobs];
            arguments.extend(form);
            arguments.extend(&names);
            let ran = desk.run(&arguments);
            (ran.code, ran.out, ran.err)
        };
        let one = run("1");
        assert_eq!(one.0, 2);
        assert_eq!(one, run("2"), "{form:?}");
        assert_eq!(one, run("64"), "{form:?}");
    }
}

#[test]
fn the_same_file_gives_the_same_bytes() {
    let (desk, _) = whole();
    let run = || desk.run(&["calc", "--json", "whole.farglow"]).out;
    assert_eq!(run(), run());
}

#[test]
fn the_text_names_every_caution_and_every_cell() {
    let (desk, told) = whole();
    let text = desk.run(&["calc", "whole.farglow"]).out;
    for caution in caution::always() {
        assert!(text.contains(&caution.text), "{} is missing", caution.code);
    }
    let always = told["cautions"].as_array().expect("a list");
    assert_eq!(always.len(), caution::always().len());
    let mut called = 0;
    for cell in told["cells"].as_array().expect("a list") {
        let head = format!(
            "{} ({})",
            cell["name"].as_str().expect("a text"),
            cell["kind"].as_str().expect("a text")
        );
        assert!(text.contains(&head), "{head} is missing");
        for caution in cell["cautions"].as_array().expect("a list") {
            let caution = caution["text"].as_str().expect("a text");
            assert!(text.contains(caution), "{caution} is missing");
            called += 1;
        }
    }
    assert!(called >= 4, "only {called} cautions were called up");
}

#[test]
fn the_text_of_a_cell_in_error_tells_it_and_whom_the_others_wait_for() {
    let desk = Desk::new();
    let _ = desk.put(
        "bad.farglow",
        notebook(
            r#"{ "kind": "value", "name": "a", "entry": "b + 1 m" },
               { "kind": "value", "name": "b", "entry": "2 mtr" }"#,
        ),
    );
    let ran = desk.run(&["calc", "bad.farglow"]);
    assert_eq!(ran.code, 3);
    assert!(ran.out.contains("waiting for b"), "{}", ran.out);
    assert!(ran.out.contains("mtr"), "{}", ran.out);
}

/// Screens, and what a position tells of them.
#[test]
fn screens_have_their_outputs_and_radiate_at_positions() {
    let desk = Desk::new();
    let cells = r#"
    { "kind": "source", "name": "door", "form": "opening", "outline": "rectangle", "width": "0.9 m",
      "height": "0.7 m", "wall_thickness": "0.2 m", "temperature": "1250 ± 25 °C", "emissivity": "0.95", "z": "1.2 m" },
    { "kind": "screen", "name": "plate", "make": "solid", "width": "0.6 m", "height": "1 m", "y": "1 m",
      "z": "0.9 m", "heading": "180 °" },
    { "kind": "screen", "name": "curtain", "make": "mesh", "open_fraction": "0.2", "width": "2 m",
      "height": "2 m", "y": "2 m", "z": "1 m", "heading": "180 °" },
    { "kind": "position", "name": "charger", "from": "door", "distance": "3.5 m", "stay": "4 min",
      "surface_temperature": "33 °C" },
    { "kind": "formula", "name": "share", "entry": "charger.irradiance_from.plate / charger" },
    { "kind": "formula", "name": "hot", "entry": "plate", "unit": "°C" }"#;
    let _ = desk.put("screens.farglow", notebook(cells));
    let told = desk.calc(&["screens.farglow"], 0);
    for (name, outputs) in [
        (
            "plate",
            &[
                ("temperature", "K"),
                ("hottest_temperature", "K"),
                ("absorbed", "W/m²"),
                ("absorbed_power", "W"),
                ("front_exitance", "W/m²"),
                ("back_exitance", "W/m²"),
                ("convected", "W/m²"),
            ][..],
        ),
        ("curtain", &[("temperature", "K"), ("absorbed", "W/m²")]),
        (
            "charger",
            &[
                ("irradiance_from.door", "W/m²"),
                ("irradiance_from.plate", "W/m²"),
                ("irradiance_from.curtain", "W/m²"),
                ("view_factor.curtain", ""),
                ("net_radiant_heat", "W/m²"),
                ("mean_radiant_temperature", "K"),
            ],
        ),
    ] {
        for (output, unit) in outputs {
            let value = &cell(&told, name)["outputs"][output];
            assert_eq!(value["unit"], *unit, "{name}.{output}: {value}");
            let [low, si, high] = ["low", "si", "high"].map(|key| value[key].as_f64());
            let bounded = low < si && si < high && low > Some(0.0);
            let geometric = output.starts_with("view_factor");
            assert!(bounded || geometric, "{name}.{output}: {value}");
        }
    }
    let [share, hot] =
        ["share", "hot"].map(|name| cell(&told, name)["outputs"]["value"]["si"].clone());
    assert!(
        share
            .as_f64()
            .is_some_and(|share| share > 0.0 && share < 1.0),
        "{share}"
    );
    assert_eq!(hot, cell(&told, "plate")["outputs"]["temperature"]["si"]);
}
