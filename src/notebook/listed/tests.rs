use super::*;
use crate::notebook::Notebook;
use crate::notebook::edit::Edit;
use crate::notebook::results::{CellResult, Results, Shown};
use crate::notebook::snapshot::Snapshot;
use crate::notebook::uncertainty::Settings;

fn value(name: &str, entry: &str) -> Cell {
    Cell::new(Kind::Value, name).with("entry", entry)
}

fn formula(name: &str, entry: &str) -> Cell {
    Cell::new(Kind::Formula, name).with("entry", entry)
}

fn pool(temperature: &str, emissivity: &str) -> Cell {
    Cell::new(Kind::Source, "ladle")
        .with("form", "pool")
        .with("outline", "disc")
        .with("diameter", "1 m")
        .with("temperature", temperature)
        .with("emissivity", emissivity)
        .with("z", "0.8 m")
}

fn engine(cells: Vec<Cell>) -> Engine {
    let notebook = Notebook {
        cells,
        ..Notebook::default()
    };
    Engine::open(notebook).expect("cells with names of their own")
}

fn worked_out(cells: Vec<Cell>) -> Results {
    Snapshot::of(&engine(cells))
        .results(Settings::default(), &mut |_| true)
        .expect("nobody tells it to stop")
}

fn cell<'a>(results: &'a Results, name: &str) -> &'a CellResult {
    results.cell(name).expect(name)
}

/// The nominal value of an output and its bounds.
fn bounds(results: &Results, name: &str, output: &str) -> (f64, Option<(f64, f64)>) {
    match cell(results, name).shown(output) {
        Some(Shown::Quantity {
            quantity,
            low,
            high,
        }) => (quantity.si, low.zip(*high)),
        other => panic!("{name}.{output}: {other:?}"),
    }
}

fn codes(results: &Results, name: &str) -> Vec<String> {
    cell(results, name)
        .cautions
        .iter()
        .filter(|caution| caution.code.starts_with("row-"))
        .map(|caution| caution.code.clone())
        .collect()
}

#[test]
fn a_row_gives_its_typical_value_and_its_range() {
    let results = worked_out(vec![
        pool("of grey_iron_pouring", "of cast_iron_molten_clean"),
        value("cloth", "of aluminised_fabric"),
    ]);
    // 0.29 σ (1370 °C)⁴ by hand.
    let expected = 0.29 * 5.670_374_419e-8 * 1643.15_f64.powi(4);
    let (found, around) = bounds(&results, "ladle", "exitance");
    assert!(
        (found / expected - 1.0).abs() < 1e-9,
        "{found} against {expected}"
    );
    let (low, high) = around.expect("both rows have a range");
    assert!(
        0.5 * expected < low && low < found && found < high && high < 1.5 * expected,
        "{low} {found} {high}"
    );
    // Low to high is the central 95 %, lopsided as it is.
    let (found, around) = bounds(&results, "cloth", "value");
    let (low, high) = around.expect("the row has a range");
    assert_eq!(found, 0.15);
    assert!((low - 0.05).abs() < 2e-3, "{low}");
    assert!((high - 0.4).abs() < 5e-3, "{high}");
    assert_eq!(results.spreads, 3);
}

#[test]
fn a_row_in_a_field_is_one_input_of_its_own() {
    let results = worked_out(vec![
        value("first", "of slag_on_metal"),
        value("second", "of slag_on_metal"),
        formula("apart", "first - second + 1"),
        formula("same", "first - first + 1"),
    ]);
    let (_, apart) = bounds(&results, "apart", "value");
    let (low, high) = apart.expect("two fields are two inputs");
    assert!(low < 0.92 && high > 1.08, "{low} {high}");
    assert_eq!(bounds(&results, "same", "value"), (1.0, None));
}

#[test]
fn rows_that_are_not_there_are_told_at_their_place_with_the_nearest() {
    for (entry, code, span, hint) in [
        (
            "of cast-iron-molten-clean",
            "unknown-row",
            Some(3..25),
            "did you mean `of cast_iron_molten_clean`?",
        ),
        (
            "  of cast_iron_moltn_clean",
            "unknown-row",
            Some(5..26),
            "did you mean `of cast_iron_molten_clean`?",
        ),
        (
            "of unobtainium",
            "unknown-row",
            Some(3..14),
            "look the row up in the list of materials and temperatures",
        ),
        (
            "of cast_iron_molten_clean * 1.2",
            "not-one-row",
            Some(26..31),
            "write the row alone; to reckon with it, put it into a value cell and use its name",
        ),
        (
            "of grey_iron_pouring",
            "wrong-dimension",
            None,
            "write it as in `0.95`",
        ),
    ] {
        let results = worked_out(vec![pool("1370 °C", entry)]);
        let errors = &cell(&results, "ladle").errors;
        let [error] = errors.as_slice() else {
            panic!("{entry}: {errors:?}");
        };
        assert_eq!(
            (
                error.code,
                error.field,
                error.span.clone(),
                error.hint.as_deref()
            ),
            (code, Some("emissivity"), span, Some(hint)),
            "{entry}: {error}"
        );
    }
}

#[test]
fn a_row_outside_its_range_or_of_another_kind_calls_up_a_caution() {
    for (temperature, emissivity, expected) in [
        ("1370 °C", "of cast_iron_molten_clean", vec!["row-normal"]),
        (
            "1450 °C",
            "of cast_iron_molten_clean",
            vec!["row-temperature", "row-normal"],
        ),
        ("1300 °C", "of cast_iron_molten_clean", vec!["row-normal"]),
        ("2372 degF", "of cast_iron_molten_clean", vec!["row-normal"]),
        ("1370 °C", "of cast_iron_molten_1um", vec!["row-spectral"]),
        ("1400 °C", "of slag_on_metal", vec![]),
        (
            "800 °C",
            "of aluminium_molten_skimmed",
            vec!["row-recalled"],
        ),
        // Also where the row stands in a cell of its own.
        ("1450 °C", "e_metal", vec!["row-temperature", "row-normal"]),
        ("1450 °C", "e_metal * 1.1", vec![]),
        ("1450 °C", "0.3", vec![]),
    ] {
        let results = worked_out(vec![
            value("e_metal", "of cast_iron_molten_clean"),
            pool(temperature, emissivity),
        ]);
        assert_eq!(
            codes(&results, "ladle"),
            expected,
            "{temperature}, {emissivity}"
        );
    }
    let results = worked_out(vec![
        pool("1370 °C", "of cast_iron_molten_clean")
            .with("near_ir_emissivity", "of cast_iron_molten_clean"),
    ]);
    assert_eq!(codes(&results, "ladle"), ["row-normal", "row-total"]);
}

#[test]
fn readiness_takes_the_basis_from_the_row_and_asks_for_recalled_ones() {
    let told = |basis: Option<Basis>, entry: &str| {
        let mut cell = value("e_metal", entry);
        if let Some(basis) = basis {
            cell = cell.with("basis", basis.words());
        }
        worked_out(vec![cell])
            .readiness
            .into_iter()
            .filter(|item| item.cell.as_deref() == Some("e_metal"))
            .map(|item| item.code)
            .collect::<Vec<&str>>()
    };
    let (read, recalled) = ("of cast_iron_molten_clean", "of zinc_molten");
    assert_eq!(told(None, read), Vec::<&str>::new());
    assert_eq!(told(None, recalled), ["row-recalled"]);
    assert_eq!(told(Some(Basis::Handbook), recalled), Vec::<&str>::new());
    assert_eq!(told(Some(Basis::Measured), read), ["basis-above-row"]);
    assert_eq!(told(Some(Basis::Unconfirmed), read), ["unconfirmed"]);
    let library = Library::shipped();
    for (id, expected) in [
        ("cast_iron_molten_clean", Basis::Handbook),
        ("glass_pool", Basis::Handbook),
        ("slag_on_metal", Basis::CommonPractice),
        ("zinc_molten", Basis::Unconfirmed),
    ] {
        assert_eq!(basis(library.get(id).expect(id)), expected, "{id}");
    }
}

#[test]
fn rows_survive_renaming_and_give_way_to_what_is_typed() {
    let mut engine = engine(vec![
        value("slag_on_metal", "0.5"),
        value("e_metal", "of slag_on_metal"),
        formula("twice", "2 * e_metal"),
    ]);
    let si = |engine: &Engine, name: &str| {
        let id = engine.find(name).expect(name);
        engine
            .value_of(id, Slot::Field("entry"))
            .and_then(Datum::as_quantity)
            .expect(name)
            .si
    };
    assert_eq!(si(&engine, "twice"), 1.7);
    let rename = |from: &str, to: &str| Edit::Rename {
        name: from.to_owned(),
        to: to.to_owned(),
    };
    let _ = engine
        .apply(rename("slag_on_metal", "other"))
        .expect("a name that nobody has");
    let _ = engine
        .apply(rename("e_metal", "e"))
        .expect_err("a reserved name");
    let _ = engine
        .apply(rename("e_metal", "e_bath"))
        .expect("a name that nobody has");
    assert_eq!(
        engine.notebook().cells[1].text("entry"),
        Some("of slag_on_metal")
    );
    assert_eq!(si(&engine, "twice"), 1.7);
    let id = engine.find("e_bath").expect("the renamed cell");
    let named = engine.rows_named(id);
    assert_eq!((named.len(), named[0].field), (1, "entry"));
    assert_eq!(named[0].row.id, "slag_on_metal");
}
