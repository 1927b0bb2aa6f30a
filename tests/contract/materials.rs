//! Rows of the libraries, from the file through the command line to the paper,
//! and the list of what a cell may hold.

use std::fs;
use std::path::Path;

use farglow::material::Library;
use farglow::notebook::reference;
use serde_json::Value;

use crate::program::{Desk, cell, notebook, text};
use crate::tools;

/// A ladle whose temperature and emissivities name rows, one of them recalled.
const LADLE: &str = r#"
    { "kind": "value", "name": "e_zinc", "entry": "of zinc_molten" },
    { "kind": "source", "name": "ladle", "form": "pool", "outline": "disc", "diameter": "1 m",
      "temperature": "of grey_iron_pouring", "emissivity": "of cast_iron_molten_clean",
      "near_ir_emissivity": "of cast_iron_molten_1um", "z": "0.8 m" },
    { "kind": "position", "name": "pourer", "from": "ladle", "distance": "2 m", "stay": "60 s" }"#;

#[test]
fn rows_are_told_with_their_value_range_and_source() {
    let desk = Desk::new();
    let _ = desk.put("ladle.farglow", notebook(LADLE));
    let told = desk.calc(&["ladle.farglow"], 0);
    let ladle = cell(&told, "ladle");
    let rows = ladle["rows"].as_array().expect("a list of rows");
    let fields: Vec<&str> = rows
        .iter()
        .map(|row| row["field"].as_str().expect("a field"))
        .collect();
    assert_eq!(fields, ["temperature", "emissivity", "near_ir_emissivity"]);
    let library = Library::shipped();
    for told in rows {
        let id = told["row"].as_str().expect("an id");
        let row = library.get(id).expect("a row of the library");
        assert_eq!(told["value"]["si"].as_f64(), Some(row.typical), "{told}");
        assert_eq!(told["value"]["low"].as_f64(), Some(row.low), "{told}");
        assert_eq!(told["source"], row.source.as_str());
        assert_eq!(told["how_known"], "read");
    }
    // The ranges reach the outputs.
    let exitance = &ladle["outputs"]["exitance"];
    let number = |name: &str| exitance[name].as_f64().expect(name);
    assert!(
        number("low") < number("si") && number("si") < number("high"),
        "{exitance}"
    );
    let codes = |value: &Value| -> Vec<String> {
        value["cautions"]
            .as_array()
            .expect("a list")
            .iter()
            .map(|caution| caution["code"].as_str().expect("a code").to_owned())
            .collect()
    };
    assert!(codes(ladle).contains(&"row-normal".to_owned()), "{ladle}");
    let zinc = cell(&told, "e_zinc");
    assert_eq!(codes(zinc), ["row-recalled"]);
    let left: Vec<&Value> = told["readiness"]
        .as_array()
        .expect("a list")
        .iter()
        .filter(|item| item["code"] == "row-recalled")
        .collect();
    assert_eq!(left.len(), 1, "{left:?}");
    // The text for people says it too.
    let out = desk.run(&["calc", text(&desk.path("ladle.farglow"))]).out;
    for needed in [
        "emissivity of cast_iron_molten_clean",
        "emissivity: cast iron, molten, clean: total normal emissivity 0.29 (0.2 to 0.35)",
        "[recalled, not read]",
    ] {
        assert!(out.contains(needed), "{needed}:\n{out}");
    }
}

#[test]
fn an_unknown_row_is_told_at_its_character() {
    let desk = Desk::new();
    let broken = LADLE.replace("cast_iron_molten_clean", "cast-iron-molten-clean");
    let _ = desk.put("ladle.farglow", notebook(&broken));
    let told = desk.calc(&["ladle.farglow"], 3);
    let error = &cell(&told, "ladle")["errors"][0];
    assert_eq!(error["code"], "unknown-row");
    let text = error["text"].as_str().expect("a text");
    assert!(
        text.contains("did you mean `of cast_iron_molten_clean`?"),
        "{error}"
    );
    let place = error["place"].as_str().expect("a place");
    assert!(
        place.contains("emissivity") && place.contains("character 4"),
        "{error}"
    );
}

#[test]
fn the_worksheet_cites_the_rows() {
    let desk = Desk::new();
    let path = desk.put("ladle.farglow", notebook(LADLE));
    let pdf = desk.path("ladle.pdf");
    let ran = desk.run(&["issue", text(&path), "-o", text(&pdf)]);
    assert_eq!(ran.code, 0, "{}", ran.err);
    if !tools::are_there() {
        return;
    }
    let output = tools::output("pdftotext", &[text(&pdf), "-"]);
    let words: String = String::from_utf8_lossy(&output.stdout)
        .split_whitespace()
        .collect::<Vec<&str>>()
        .join(" ");
    for needed in [
        "total normal emissivity 0.29 (0.2 to 0.35)",
        "temperature 1370 °C (1300 °C to 1440 °C)",
        "pyrometry handbook table",
        "[recalled, not read]",
        "handbook",
        "The row `zinc_molten` is recalled, not read",
    ] {
        assert!(words.contains(needed), "{needed}:\n{words}");
    }
}

const BEGIN: &str = "<!-- what a cell may hold: begin -->\n";
const END: &str = "<!-- what a cell may hold: end -->\n";

/// With `FARGLOW_REWRITE` set the text in the file is put right instead.
#[test]
fn the_readme_lists_what_a_cell_may_hold() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md");
    let whole = fs::read_to_string(&path).expect("the file that one reads first");
    let (before, rest) = whole.split_once(BEGIN).expect("the mark where it begins");
    let (found, after) = rest.split_once(END).expect("the mark where it ends");
    let expected = format!("\n{}\n", reference::text());
    if found != expected && std::env::var_os("FARGLOW_REWRITE").is_some() {
        fs::write(&path, format!("{before}{BEGIN}{expected}{END}{after}"))
            .expect("the file can be written");
    }
    let now = fs::read_to_string(&path).expect("the file that one reads first");
    assert!(
        now.contains(&format!("{BEGIN}{expected}{END}")),
        "README.md is out of date: run this test once with FARGLOW_REWRITE=1"
    );
    let desk = Desk::new();
    let help = desk.run(&["calc", "--help"]).out;
    for needed in ["mean_radiant_temperature(", "cast_iron_molten_clean", "°F"] {
        assert!(help.contains(needed), "{needed}:\n{help}");
    }
}
