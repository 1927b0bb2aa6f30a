//! What a notebook costs: aimed at 50 µs for an edit among 1,000 cells, 2 ms for
//! working them all out, 30 ms for `calc` of the demo from start to end of the
//! process, and 150 ms and 150 kB for its worksheet.

use std::process::{Command, Stdio};

use divan::Bencher;
use farglow::command::load;
use farglow::notebook::cell::{Cell, Content, Field, Kind};
use farglow::notebook::edit::Edit;
use farglow::notebook::engine::Engine;
use farglow::notebook::results::Results;
use farglow::notebook::uncertainty::{Bounds, Settings};
use farglow::notebook::{Notebook, snapshot::Snapshot};
use farglow::store::template::DEMO;
use farglow::worksheet::layout::Paper;
use farglow::worksheet::sheet::Sheet;

const DEMO_FILE: &str = concat!(
    env!("CARGO_MANIFEST_DIR"),
    "/templates/furnace-door.farglow"
);

fn main() {
    let loaded = demo();
    let pdf = sheet(&loaded).pdf(Paper::A4).expect("it is written");
    println!(
        "worksheet of the demo: {} bytes, {} pages",
        pdf.bytes.len(),
        pdf.pages
    );
    divan::main();
}

fn demo() -> load::Loaded {
    load::bytes(DEMO.text.as_bytes().to_vec()).expect("the demo opens")
}

fn sheet(loaded: &load::Loaded) -> Sheet<'_> {
    Sheet {
        engine: &loaded.engine,
        results: &loaded.results,
        digest: &loaded.digest,
        file: "demo.farglow",
        contents: &loaded.bytes,
    }
}

fn opened(notebook: Notebook) -> Engine {
    Engine::open(notebook).expect("the names are sound")
}

fn of(cells: Vec<Cell>) -> Notebook {
    Notebook {
        cells,
        ..Notebook::default()
    }
}

fn value(name: &str, entry: &str) -> Cell {
    Cell::new(Kind::Value, name).with("entry", entry)
}

fn formula(name: &str, entry: &str) -> Cell {
    Cell::new(Kind::Formula, name).with("entry", entry)
}

/// Groups of a value and ten formulas that depend on it.
fn groups(cells: usize) -> Notebook {
    let cell = |index: usize| {
        let (group, member) = (index / 11, index % 11);
        if member == 0 {
            value(&format!("v{group}"), "2.5 m")
        } else {
            let name = format!("f{group}_{member}");
            formula(&name, &format!("sqrt(v{group} * v{group}) + {member} m"))
        }
    };
    of((0..cells).map(cell).collect())
}

/// A value on which every other cell depends, by way of the one before it.
fn chain(cells: usize) -> Notebook {
    let cell = |index: usize| match index {
        0 => value("f0", "2.5 m"),
        _ => formula(
            &format!("f{index}"),
            &format!("0.5 * f{} + sqrt(f0 * f0)", index - 1),
        ),
    };
    of((0..cells).map(cell).collect())
}

/// Positions in front of sources, each judged by two limits, with zones.
fn shop(
    sources: usize,
    positions: usize,
    zones: usize,
    temperature: &str,
    width: &str,
) -> Notebook {
    let mut cells = Vec::new();
    for index in 0..sources {
        cells.push(
            Cell::new(Kind::Source, format!("s{index}"))
                .with("form", "opening")
                .with("outline", "rectangle")
                .with("width", width)
                .with("height", "0.7 m")
                .with("temperature", temperature)
                .with("emissivity", "0.95")
                .with("x", format!("{} m", 3 * index))
                .with("z", "1.2 m"),
        );
    }
    for index in 0..positions {
        let name = format!("p{index}");
        cells.push(
            Cell::new(Kind::Position, &name)
                .with("x", format!("{} m", index % 50))
                .with("y", format!("{} m", 2 + index / 50))
                .with("stay", "4 min"),
        );
        let mut assessment =
            Cell::new(Kind::Assessment, format!("a{index}")).with("position", &name);
        assessment.fields.push(Field::new(
            "guidance",
            Content::List(vec!["icnirp-2013-ir-eye".into(), "pain-time".into()]),
        ));
        cells.push(assessment);
    }
    for index in 0..zones {
        cells.push(
            Cell::new(Kind::Zone, format!("z{index}"))
                .with("from", format!("s{}", index % sources))
                .with("heading", format!("{} °", index % 60))
                .with("guidance", "icnirp-2013-ir-eye")
                .with("stay", "8 h"),
        );
    }
    of(cells)
}

/// Benches an edit that is made over and over with two entries in turn.
fn edits(bencher: Bencher<'_, '_>, notebook: Notebook, name: &str, entries: [&str; 2]) {
    let mut engine = opened(notebook);
    let mut turn = 0;
    bencher.bench_local(|| {
        turn = 1 - turn;
        let edit = Edit::SetField {
            name: name.to_owned(),
            field: "entry",
            content: Some(Field::new("entry", Content::Text(entries[turn].to_owned()))),
        };
        engine.apply(edit).expect("the cell is there").1.ran.len()
    });
}

/// An edit among 1,000 formulas and values, with ten dependents: aimed at 50 µs.
#[divan::bench]
fn edit_with_ten_dependents(bencher: Bencher<'_, '_>) {
    edits(bencher, groups(1000), "v45", ["2.5 m", "3 m"]);
}

/// The same among 100,000.
#[divan::bench]
fn edit_with_ten_dependents_in_100_000(bencher: Bencher<'_, '_>) {
    edits(bencher, groups(100_000), "v45", ["2.5 m", "3 m"]);
}

/// A full recalculation: an edit of the one value on which all 999 others
/// depend, so that all 1,000 nodes run and change. Aimed at 2 ms.
#[divan::bench]
fn every_cell_runs(bencher: Bencher<'_, '_>) {
    edits(bencher, chain(1000), "f0", ["2.5 m", "3 m"]);
}

/// Parsing, linking and working out.
#[divan::bench(args = [1000, 100_000], sample_count = 10)]
fn open_formulas(bencher: Bencher<'_, '_>, cells: usize) {
    bencher.with_inputs(|| groups(cells)).bench_values(opened);
}

/// Everything gathered for printing, without bounds.
#[divan::bench(args = [1000, 100_000], sample_count = 10)]
fn results_of_formulas(bencher: Bencher<'_, '_>, cells: usize) {
    let engine = opened(groups(cells));
    bencher.bench(|| Results::new(&engine, &Bounds::default()));
}

/// 5,000 cells, 200 positions with their assessments, 20 sources among them.
fn large() -> Notebook {
    let mut notebook = shop(20, 200, 4, "1250 °C", "0.9 m");
    notebook
        .cells
        .extend(groups(5000 - notebook.cells.len()).cells);
    notebook
}

#[divan::bench(sample_count = 10)]
fn open_5_000_cells_with_200_positions() -> Engine {
    opened(large())
}

/// A source changes its temperature: every position, assessment and zone follows.
#[divan::bench(sample_count = 20)]
fn heat_a_source_before_200_positions(bencher: Bencher<'_, '_>) {
    sources(bencher, "temperature", ["1250 °C", "1260 °C"]);
}

/// A source moves: every position looks afresh.
#[divan::bench(sample_count = 20)]
fn move_a_source_before_200_positions(bencher: Bencher<'_, '_>) {
    sources(bencher, "z", ["1.2 m", "1.3 m"]);
}

fn sources(bencher: Bencher<'_, '_>, field: &'static str, entries: [&str; 2]) {
    let mut engine = opened(large());
    let mut turn = 0;
    bencher.bench_local(|| {
        turn = 1 - turn;
        let edit = Edit::SetField {
            name: "s3".to_owned(),
            field,
            content: Some(Field::new(field, Content::Text(entries[turn].to_owned()))),
        };
        engine.apply(edit).expect("the cell is there").1.ran.len()
    });
}

#[divan::bench(sample_count = 10)]
fn results_of_5_000_cells_with_200_positions(bencher: Bencher<'_, '_>) {
    let engine = opened(large());
    bencher.bench(|| Snapshot::of(&engine).nominal());
}

/// 1,000 draws of the demo, its temperature and emissivity uncertain.
#[divan::bench]
fn bounds_of_the_demo(bencher: Bencher<'_, '_>) {
    let engine = demo().engine;
    bencher.bench(|| bounds(&engine));
}

fn bounds(engine: &Engine) -> Bounds {
    engine
        .bounds(Settings::default(), &mut |_| true)
        .expect("nobody stops it")
}

#[divan::bench]
fn results_of_the_demo(bencher: Bencher<'_, '_>) {
    let engine = demo().engine;
    let bounds = bounds(&engine);
    bencher.bench(|| Results::new(&engine, &bounds));
}

/// The worksheet of the demo, from its results to the bytes of the PDF with
/// the notebook attached: aimed at 150 ms.
#[divan::bench]
fn worksheet_of_the_demo(bencher: Bencher<'_, '_>) {
    let loaded = demo();
    bencher.bench(|| sheet(&loaded).pdf(Paper::A4).expect("it is written").bytes);
}

fn child(arguments: &[&str]) -> bool {
    Command::new(env!("CARGO_BIN_EXE_farglow"))
        .args(arguments)
        .stdout(Stdio::null())
        .status()
        .expect("the program starts")
        .success()
}

/// From the start to the end of the process: aimed at 30 ms.
#[divan::bench]
fn calc_of_the_demo() {
    assert!(child(&["calc", DEMO_FILE]), "calc fails");
}

/// What any process of the program costs at least.
#[divan::bench]
fn help() {
    assert!(child(&["--help"]), "help fails");
}
