//! A notebook under random edits is the notebook that was opened afresh, and
//! every edit can be taken back.

mod random;

use std::collections::{BTreeMap, BTreeSet};

use farglow::graph::Run;
use farglow::notebook::Notebook;
use farglow::notebook::cell::{Content, Field};
use farglow::notebook::edit::{Edit, History};
use farglow::notebook::engine::{Engine, Slot};
use farglow::notebook::results::Results;
use farglow::notebook::snapshot::Snapshot;
use farglow::notebook::uncertainty::Settings;
use farglow::store::{schema, template};
use proptest::prelude::*;

use crate::view_factor_laws::config;
use random::dice;

fn open(notebook: &Notebook) -> Engine {
    Engine::open(notebook.clone()).expect("the notebook's names are sound")
}

/// Everything that is told of each cell, to the last bit: the shortest text of
/// a double that reads back as itself. Without the numbers of cells, which
/// tell the history.
fn picture(results: &Results) -> Vec<String> {
    let mut picture: Vec<String> = results
        .cells
        .iter()
        .map(|cell| {
            format!(
                "{} {:?} {:?}\n{:?}\n{:?}\n{:?}\n{:?}\n{:?}\n{}",
                cell.name,
                cell.kind,
                cell.state,
                cell.figures,
                cell.errors,
                cell.cautions,
                cell.verdicts,
                cell.overall,
                cell.failed
            )
        })
        .collect();
    picture.push(format!("{:?} {}", results.readiness, results.spreads));
    picture
}

fn nominal(engine: &Engine) -> Vec<String> {
    picture(&Snapshot::of(engine).nominal())
}

fn bounded(engine: &Engine) -> Vec<String> {
    let settings = Settings { seed: 7, draws: 40 };
    let results = Snapshot::of(engine)
        .results(settings, &mut |_| true)
        .expect("nobody tells it to stop");
    picture(&results)
}

/// The names of the cells that each cell feeds and is fed by.
fn links(engine: &Engine) -> Vec<String> {
    let name = |id| {
        engine
            .cell(id)
            .map_or_else(String::new, |cell| cell.name.clone())
    };
    (0..engine.notebook().cells.len())
        .filter_map(|place| engine.id(place))
        .map(|id| {
            let feeds: Vec<String> = engine.feeds(id).into_iter().map(name).collect();
            let fed_by: Vec<String> = engine.fed_by(id).into_iter().map(name).collect();
            format!("{} feeds {feeds:?}, fed by {fed_by:?}", name(id))
        })
        .collect()
}

/// Fails with the first line that differs.
fn same(what: &str, found: &[String], expected: &[String], notebook: &Notebook) {
    for (found, expected) in found.iter().zip(expected) {
        assert_eq!(found, expected, "{what}\n{}", schema::write(notebook));
    }
    assert_eq!(found.len(), expected.len(), "{what}");
}

fn as_if_opened_afresh(what: &str, engine: &Engine) {
    let fresh = open(engine.notebook());
    let notebook = engine.notebook();
    same(what, &nominal(engine), &nominal(&fresh), notebook);
    same(what, &links(engine), &links(&fresh), notebook);
}

proptest! {
    #![proptest_config(config(192))]

    #[test]
    fn after_every_edit_the_engine_is_as_if_opened_afresh(mut dice in dice()) {
        let notebook = dice.notebook();
        let mut engine = open(&notebook);
        for step in 0..10 {
            let edit = dice.edit(engine.notebook());
            let before = engine.notebook().clone();
            let told = format!("step {step}: {edit:?}");
            match engine.apply(edit) {
                Ok(_) => {}
                Err(error) => {
                    // A change that cannot be made changes nothing.
                    prop_assert_eq!(&before, engine.notebook(), "{} {}", told, error);
                }
            }
            as_if_opened_afresh(&told, &engine);
        }
        let fresh = open(engine.notebook());
        same("bounds", &bounded(&engine), &bounded(&fresh), engine.notebook());
    }

    #[test]
    fn taking_everything_back_and_making_it_again_restores_text_and_results(mut dice in dice()) {
        let notebook = dice.notebook();
        let mut engine = open(&notebook);
        let mut history = History::default();
        let mut states = vec![(schema::write(engine.notebook()), nominal(&engine))];
        for step in 0..10 {
            let edit = dice.edit(engine.notebook());
            if history.apply(&mut engine, format!("{step}: {edit:?}"), edit).is_ok() {
                states.push((schema::write(engine.notebook()), nominal(&engine)));
            }
        }
        for (text, results) in states.iter().rev().skip(1) {
            let told = history.undo(&mut engine).expect("as many as were done");
            let found = schema::write(engine.notebook());
            prop_assert_eq!(&found, text, "undo of {}", told);
            same(&format!("undo of {told}"), &nominal(&engine), results, engine.notebook());
        }
        prop_assert!(history.undo(&mut engine).is_none());
        for (text, results) in states.iter().skip(1) {
            let told = history.redo(&mut engine).expect("as many as were taken back");
            let found = schema::write(engine.notebook());
            prop_assert_eq!(&found, text, "redo of {}", told);
            same(&format!("redo of {told}"), &nominal(&engine), results, engine.notebook());
        }
        prop_assert!(history.redo(&mut engine).is_none());
        as_if_opened_afresh("after all", &engine);
    }

    #[test]
    fn what_is_written_is_read_back_the_same(mut dice in dice()) {
        let notebook = dice.notebook();
        let text = schema::write(&notebook);
        let stored = schema::read(text.as_bytes())
            .unwrap_or_else(|error| panic!("{error}\n{text}"));
        prop_assert_eq!(&stored.notebook, &notebook);
        prop_assert_eq!(schema::write(&stored.notebook), text);
        prop_assert_eq!(schema::digest(&schema::to_value(&notebook)), stored.digest);
    }

    #[test]
    fn no_text_in_any_field_makes_it_panic(
        mut dice in dice(),
        noise in proptest::collection::vec("\\PC{0,40}", 8),
        wild in proptest::collection::vec(any::<f64>(), 4),
    ) {
        let mut engine = open(&dice.notebook());
        for _ in 0..12 {
            let Some((name, field)) = dice.field(engine.notebook()) else { break };
            let content = match dice.upto(4) {
                0 | 1 => Content::Text(noise[dice.upto(noise.len())].clone()),
                2 => Content::List((0..dice.upto(3)).map(|at| noise[at].clone()).collect()),
                _ => Content::Count(wild[dice.upto(wild.len())]),
            };
            let content = Some(Field::new(field, content));
            let _ = engine
                .apply(Edit::SetField { name, field, content })
                .expect("the cell and the field are there");
        }
        as_if_opened_afresh("nonsense", &engine);
        let _ = bounded(&engine);
        for cell in &Snapshot::of(&engine).nominal().cells {
            for figure in &cell.figures {
                if let Some(quantity) = figure.shown.quantity() {
                    prop_assert!(quantity.si.is_finite(), "{} {figure:?}", cell.name);
                }
            }
        }
    }

    #[test]
    fn an_edit_of_one_value_runs_only_what_depends_on_it(mut dice in dice()) {
        let mut engine = open(&dice.notebook());
        for _ in 0..6 {
            let Some((name, field)) = dice.field(engine.notebook()) else { break };
            let before = by_node(&engine);
            let reach = random::reach(engine.notebook(), &name);
            let content = dice.content(engine.notebook(), &name, field);
            let (_, run) = engine
                .apply(Edit::SetField { name: name.clone(), field, content: Some(content) })
                .expect("the cell and the field are there");
            // A field that now mentions others or fewer has another reach.
            let mut reach = reach;
            reach.extend(random::reach(engine.notebook(), &name));
            let mut owners = before;
            owners.extend(by_node(&engine));
            let mut once = BTreeSet::new();
            for node in &run.ran {
                prop_assert!(once.insert(*node), "{node:?} ran twice");
                if let Some((cell, slot)) = owners.get(node) {
                    prop_assert!(
                        reach.contains(cell),
                        "{cell} {slot:?} ran after an edit of {name}.{field}, which reaches {reach:?}\n{}",
                        schema::write(engine.notebook())
                    );
                }
            }
        }
    }
}

/// Whose each node is and what it stands for.
fn by_node(engine: &Engine) -> BTreeMap<farglow::graph::Node, (String, Slot)> {
    let mut owners = BTreeMap::new();
    for (place, cell) in engine.notebook().cells.iter().enumerate() {
        let id = engine.id(place).expect("every cell has a number");
        for (slot, node) in engine.nodes(id) {
            let _ = owners.insert(*node, (cell.name.clone(), *slot));
        }
    }
    owners
}

fn demo() -> Engine {
    let stored = schema::read(template::DEMO.text.as_bytes()).expect("the demo is sound");
    open(&stored.notebook)
}

fn set(engine: &mut Engine, name: &str, field: &'static str, text: &str) -> Run {
    let content = engine
        .notebook()
        .find(name)
        .and_then(|at| engine.notebook().cells[at].field(field).cloned())
        .map_or_else(
            || Field::new(field, Content::Text(text.to_owned())),
            |old| Field {
                content: Content::Text(text.to_owned()),
                ..old
            },
        );
    let edit = Edit::SetField {
        name: name.to_owned(),
        field,
        content: Some(content),
    };
    engine
        .apply(edit)
        .expect("the cell and the field are there")
        .1
}

/// What ran, as `cell.slot`; nodes of no cell as `scene`.
fn ran(engine: &Engine, run: &Run) -> BTreeSet<String> {
    let owners = by_node(engine);
    run.ran
        .iter()
        .map(|node| match owners.get(node) {
            Some((cell, Slot::Field(slot) | Slot::Group(slot))) => format!("{cell}.{slot}"),
            Some((cell, Slot::Item(field, (pair, side)))) => {
                format!("{cell}.{field}[{pair}][{side}]")
            }
            Some((cell, Slot::Check)) => format!("{cell}.check"),
            None => "scene".to_owned(),
        })
        .collect()
}

fn names(list: &[&str]) -> BTreeSet<String> {
    list.iter().map(|name| (*name).to_owned()).collect()
}

#[test]
fn each_edit_of_the_demo_runs_exactly_what_hangs_on_it() {
    let views = ["charger.sights", "spotter.sights", "falloff.line"];
    let zones = ["eye_4_min.track", "eye_all_shift.track"];
    let results = [
        "scene",
        "charger.exposure",
        "spotter.exposure",
        "falloff.rows",
        "charger_limits.verdicts",
        "spotter_limits.verdicts",
        "eye_4_min.edge",
        "eye_all_shift.edge",
    ];
    for (name, field, text, expected) in [
        // A temperature: what is emitted, never where anything is.
        (
            "t_hearth",
            "entry",
            "1260 ± 25 °C",
            [
                &["t_hearth.entry", "door.temperature"][..],
                &["door.emission", "door.outcome"],
                &results,
            ]
            .concat(),
        ),
        // A size: where everything is and what is seen; what is emitted is asked,
        // for there is a wall, but stays as it is.
        (
            "door",
            "width",
            "0.95 m",
            [
                &[
                    "door.width",
                    "door.shape",
                    "door.emission",
                    "door.outcome",
                    "door_area.entry",
                ][..],
                &views,
                &zones,
                &results,
            ]
            .concat(),
        ),
        // A place: one position and its judgement.
        (
            "charger",
            "distance",
            "2.6 m",
            vec![
                "charger.distance",
                "charger.sights",
                "charger.exposure",
                "charger_limits.verdicts",
            ],
        ),
        // A stay: the judgement alone.
        (
            "charger",
            "stay",
            "5 min",
            vec!["charger.stay", "charger_limits.verdicts"],
        ),
        // The room: the background alone.
        (
            "bay",
            "radiant_temperature",
            "60 °C",
            vec![
                "bay.radiant_temperature",
                "scene",
                "charger.exposure",
                "spotter.exposure",
                "charger_limits.verdicts",
                "spotter_limits.verdicts",
            ],
        ),
        // Another text of the same quantity stops where it begins.
        ("door", "height", "70 cm", vec!["door.height"]),
        // A spread lives in no node.
        ("door", "emissivity", "0.95 ± 0.01", vec!["door.emissivity"]),
        ("bay", "humidity", "40 %", vec!["bay.humidity"]),
        ("about", "text", "other words", vec![]),
    ] {
        let mut engine = demo();
        let run = set(&mut engine, name, field, text);
        let (found, expected) = (ran(&engine, &run), names(&expected));
        assert_eq!(found, expected, "{name}.{field} = {text}");
        let changed: BTreeSet<_> = run.changed.iter().collect();
        let same_value = ["70 cm", "0.95 ± 0.01"].contains(&text);
        assert_eq!(
            changed.is_empty(),
            same_value || run.ran.is_empty(),
            "{text}"
        );
    }
}

#[test]
fn a_renamed_source_takes_every_link_along() {
    let mut engine = demo();
    let before = nominal(&engine);
    let text = schema::write(engine.notebook());
    let formula = farglow::notebook::Cell::new(farglow::notebook::Kind::Formula, "share")
        .with("entry", "charger.irradiance_from.door / charger");
    let _ = engine
        .apply(Edit::Add {
            at: 99,
            cell: formula,
        })
        .expect("the name is free");
    let _ = engine
        .apply(Edit::Rename {
            name: "door".to_owned(),
            to: "hatch".to_owned(),
        })
        .expect("the name is free");
    let written = schema::write(engine.notebook());
    for gone in ["\"door\"", "door.width", "door.height", ".door "] {
        assert!(!written.contains(gone), "{gone} is left in\n{written}");
    }
    for there in [
        "\"hatch\"",
        "hatch.width * hatch.height",
        "charger.irradiance_from.hatch / charger",
    ] {
        assert!(written.contains(there), "{there} is missing in\n{written}");
    }
    assert!(
        Snapshot::of(&engine).nominal().is_whole(),
        "{:?}",
        nominal(&engine)
    );
    // Through a file and back, and then the way back.
    let stored = schema::read(written.as_bytes()).expect("what was written is read");
    same(
        "read back",
        &nominal(&open(&stored.notebook)),
        &nominal(&engine),
        &stored.notebook,
    );
    for edit in [
        Edit::Rename {
            name: "hatch".to_owned(),
            to: "door".to_owned(),
        },
        Edit::Remove {
            name: "share".to_owned(),
        },
    ] {
        let _ = engine.apply(edit).expect("it is there");
    }
    assert_eq!(schema::write(engine.notebook()), text);
    same(
        "renamed back",
        &nominal(&engine),
        &before,
        engine.notebook(),
    );
}
