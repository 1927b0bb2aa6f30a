//! The areas of the drawing half, each by itself: what they show, what they
//! answer, and how they look in every theme.

use std::path::{Path, PathBuf};

use farglow::app::shared::{Look, Shared};
use farglow::app::{self, canvas, cautions, curve, rail, readiness, theme};
use farglow::drawing;
use farglow::drawing::curve::Curve;
use farglow::drawing::measure::Measure;
use farglow::drawing::rail::{Line, Rail};
use farglow::drawing::role::{Role, Theme};
use farglow::drawing::screen::{Screen, Shadow};
use farglow::notebook::Kind;
use farglow::notebook::datum::CellId;
use farglow::notebook::engine::Engine;
use farglow::notebook::results::{Results, Shown};
use farglow::notebook::snapshot::Snapshot;
use farglow::notebook::uncertainty::Settings;
use farglow::store::{schema, template};
use iced::widget::container;
use iced::{Element, Event, Length, Point, Size, mouse};
use iced_test::Simulator;

const LOOK: Look = Look {
    theme: Theme::Light,
    zoom: 1.0,
    measure: Measure::Metric,
};

struct Job {
    engine: Engine,
    results: Results,
}

impl Job {
    fn new(text: &str) -> Job {
        let notebook = schema::read(text.as_bytes())
            .expect("the text is a notebook")
            .notebook;
        let engine = Engine::open(notebook).expect("its names are legal");
        let results = Snapshot::of(&engine)
            .results(Settings::default(), &mut |_| true)
            .expect("nothing stops the draws");
        Job { engine, results }
    }

    /// A job without bounds, which cost too much with many sources.
    fn nominal(text: &str) -> Job {
        let notebook = schema::read(text.as_bytes())
            .expect("the text is a notebook")
            .notebook;
        let engine = Engine::open(notebook).expect("its names are legal");
        let results = Snapshot::of(&engine).nominal();
        Job { engine, results }
    }

    fn demo() -> Job {
        Job::new(template::DEMO.text)
    }

    fn shared(&self, look: Look) -> Shared<'_> {
        Shared {
            engine: &self.engine,
            results: &self.results,
            fresh: true,
            look,
            selected: None,
        }
    }

    fn id(&self, name: &str) -> CellId {
        self.engine.find(name).expect("the cell is there")
    }
}

fn ui<'a, Message: 'a>(
    view: Element<'a, Message>,
    size: Size,
    look: Look,
) -> Simulator<'a, Message> {
    let page = container(view)
        .width(Length::Fill)
        .height(Length::Fill)
        .style(theme::ground(Role::Ground, look));
    Simulator::with_size(app::settings(), size, page)
}

fn click<Message>(ui: &mut Simulator<'_, Message>, text: &str) {
    if let Err(error) = ui.click(text) {
        panic!("`{text}` cannot be clicked: {error}");
    }
}

fn pictures() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/flows/pictures")
}

/// Compares a picture with the one that was looked at and kept. A picture that
/// is not there fails; with `FARGLOW_NEW_PICTURES` set it is made, and put
/// beside the build as an image, to be looked at before it is kept.
fn compare<Message>(name: &str, mut ui: Simulator<'_, Message>, look: Look) {
    let seen = ui
        .snapshot(&theme::theme(look))
        .expect("an area can be drawn without a display");
    let kept = pictures().join(format!("{name}-tiny-skia.sha256"));
    if std::env::var_os("FARGLOW_NEW_PICTURES").is_some() {
        let image = Path::new(env!("CARGO_TARGET_TMPDIR")).join(format!("{name}-tiny-skia.png"));
        for old in [&kept, &image] {
            if old.exists() {
                std::fs::remove_file(old).expect("the old picture can be removed");
            }
        }
        let image = image.with_file_name(name);
        assert!(seen.matches_image(image).expect("the image can be written"));
    } else {
        assert!(
            kept.exists(),
            "no picture is kept for {name}: {}",
            kept.display()
        );
    }
    let same = seen
        .matches_hash(pictures().join(name))
        .expect("the kept picture can be read");
    assert!(same, "{name} does not look as it was kept");
}

fn themes() -> [(&'static str, Look); 3] {
    Theme::ALL.map(|theme| {
        let name = match theme {
            Theme::Dark => "dark",
            Theme::Contrast => "contrast",
            _ => "light",
        };
        (name, Look { theme, ..LOOK })
    })
}

#[test]
fn the_curve_looks_as_it_was_kept_in_every_theme() {
    let job = Job::demo();
    for (name, look) in themes() {
        let area = curve::Area::new();
        let ui = ui(area.view(job.shared(look)), Size::new(980.0, 480.0), look);
        compare(&format!("curve-{name}"), ui, look);
    }
}

#[test]
fn the_curve_looks_as_it_was_kept_in_feet() {
    let job = Job::demo();
    let look = Look {
        measure: Measure::Us,
        ..LOOK
    };
    let mut area = curve::Area::new();
    let _ = area.update(curve::Message::Pointed(Some(4.0)));
    let ui = ui(area.view(job.shared(look)), Size::new(980.0, 480.0), look);
    compare("curve-feet", ui, look);
}

#[test]
fn the_curve_of_a_ladle_looks_as_it_was_kept() {
    let ladle = template::ALL
        .iter()
        .find(|template| template.name == "ladle")
        .expect("it is shipped");
    let job = Job::new(ladle.text);
    let area = curve::Area::new();
    let ui = ui(area.view(job.shared(LOOK)), Size::new(980.0, 480.0), LOOK);
    compare("curve-ladle", ui, LOOK);
}

/// A curve and a rail of the demo with a plate put across them by hand.
#[test]
fn screens_on_curve_and_rail_look_as_they_were_kept() {
    let job = Job::demo();
    for (name, look) in themes() {
        let cell = job
            .results
            .cells
            .iter()
            .find(|cell| cell.kind == Kind::Curve);
        let cell = cell.expect("the demo has a curve");
        let mut shown = Curve::of(&job.engine, &job.results, cell, Measure::Metric);
        let plate = Screen {
            cell: "plate".to_owned(),
            label: "plate · 208 °C".to_owned(),
            distance: 1.4,
        };
        let shadow = Shadow {
            from: 1.4,
            to: 4.4,
            source: "door".to_owned(),
        };
        shown.screens = vec![plate.clone()];
        shown.shadows = vec![shadow.clone()];
        let line = Line::all(&job.engine).into_iter().next();
        let line = line.expect("the demo has a line");
        let mut rail = Rail::of(&job.engine, &job.results, &line, Measure::Metric)
            .expect("no source is in error");
        rail.screens = vec![plate];
        rail.shadows = vec![shadow];
        let page: iced::widget::Column<'_, ()> = iced::widget::column![
            container(canvas::show(
                move |width, height| drawing::curve::picture(&shown, width, height),
                look
            ))
            .height(440),
            container(canvas::show(
                move |width, height| drawing::rail::picture(&rail, width, height),
                look
            ))
            .height(260),
        ];
        let ui = ui(page.into(), Size::new(980.0, 700.0), look);
        compare(&format!("screens-{name}"), ui, look);
    }
}

#[test]
fn the_readout_looks_as_it_was_kept() {
    let job = Job::demo();
    let mut area = curve::Area::new();
    let _ = area.update(curve::Message::Pointed(Some(4.0)));
    let ui = ui(area.view(job.shared(LOOK)), Size::new(980.0, 480.0), LOOK);
    compare("curve-readout", ui, LOOK);
}

#[test]
fn the_rail_looks_as_it_was_kept_in_every_theme() {
    let job = Job::demo();
    for (name, look) in themes() {
        let area = rail::Area::new();
        let ui = ui(area.view(job.shared(look)), Size::new(980.0, 250.0), look);
        compare(&format!("rail-{name}"), ui, look);
    }
}

#[test]
fn the_cautions_look_as_they_were_kept_in_every_theme() {
    let job = Job::demo();
    for (name, look) in themes() {
        let mut area = cautions::Area::new();
        let shut = ui(area.view(job.shared(look)), Size::new(1440.0, 110.0), look);
        compare(&format!("cautions-{name}"), shut, look);
        let _ = area.update(cautions::Message::Open);
        let open = ui(area.view(job.shared(look)), Size::new(1440.0, 420.0), look);
        compare(&format!("cautions-open-{name}"), open, look);
    }
}

#[test]
fn readiness_looks_as_it_was_kept_in_every_theme() {
    let job = Job::demo();
    for (name, look) in themes() {
        let area = readiness::Area::new();
        let ui = ui(area.view(job.shared(look)), Size::new(700.0, 380.0), look);
        compare(&format!("readiness-{name}"), ui, look);
    }
}

#[test]
fn the_first_three_cautions_are_shown_whatever_the_band_is_asked() {
    for job in [Job::demo(), Job::new("{\"farglow\": 1, \"cells\": []}")] {
        let mut area = cautions::Area::new();
        for message in [
            None,
            Some(cautions::Message::Open),
            Some(cautions::Message::Shut),
            Some(cautions::Message::Shut),
        ] {
            if let Some(message) = message {
                let _ = area.update(message);
            }
            let mut ui = ui(area.view(job.shared(LOOK)), Size::new(1280.0, 420.0), LOOK);
            for words in [
                "Planning aid.",
                "Local law and licensed practice decide; measure before anyone relies on these \
                 figures.",
            ] {
                assert!(ui.find(words).is_ok(), "`{words}` is not shown");
            }
        }
    }
}

#[test]
fn one_click_shows_every_caution() {
    let job = Job::demo();
    let mut area = cautions::Area::new();
    let size = Size::new(1280.0, 2000.0);
    let count = {
        let texts: std::collections::BTreeSet<&str> = job
            .results
            .cells
            .iter()
            .flat_map(|cell| &cell.cautions)
            .map(|caution| caution.text.as_str())
            .collect();
        texts.len() + farglow::notebook::caution::always().len()
    };
    let mut shut = ui(area.view(job.shared(LOOK)), size, LOOK);
    let label = format!("{} more cautions", count - 4);
    click(&mut shut, &label);
    let messages: Vec<cautions::Message> = shut.into_messages().collect();
    assert_eq!(messages.len(), 1);
    for message in messages {
        assert_eq!(area.update(message), cautions::Action::None);
    }
    let mut open = ui(area.view(job.shared(LOOK)), size, LOOK);
    let called = job.results.cells.iter().flat_map(|cell| &cell.cautions);
    for caution in called.chain(&farglow::notebook::caution::always()) {
        assert!(open.find(caution.text.as_str()).is_ok(), "{}", caution.text);
    }
}

#[test]
fn a_caution_leads_to_its_cell() {
    let job = Job::demo();
    let area = cautions::Area::new();
    let mut ui = ui(area.view(job.shared(LOOK)), Size::new(1280.0, 110.0), LOOK);
    click(&mut ui, "t_hearth:");
    let ids: Vec<CellId> = ui
        .into_messages()
        .filter_map(|message| match message {
            cautions::Message::Show(id) => Some(id),
            _ => None,
        })
        .collect();
    assert_eq!(ids, [job.id("t_hearth")]);
}

#[test]
fn everything_that_is_left_leads_to_where_it_is_done() {
    let job = Job::demo();
    let area = readiness::Area::new();
    let size = Size::new(700.0, 900.0);
    let mut seen = ui(area.view(job.shared(LOOK)), size, LOOK);
    let left = job.results.readiness.len();
    assert!(
        seen.find(format!("{left} left before issue").as_str())
            .is_ok()
    );
    for item in &job.results.readiness {
        assert!(seen.find(item.text.as_str()).is_ok(), "{}", item.text);
    }
    click(&mut seen, "go there");
    let mut area = readiness::Area::new();
    for message in seen.into_messages() {
        assert_eq!(
            area.update(message),
            readiness::Action::SelectCell(job.id("t_hearth"))
        );
    }
    let mut actions = Vec::new();
    for target in [
        readiness::Target::Job,
        readiness::Target::NewPosition,
        readiness::Target::Cell(job.id("door")),
    ] {
        actions.push(area.update(readiness::Message::Go(target)));
    }
    assert_eq!(
        actions,
        [
            readiness::Action::OpenJob,
            readiness::Action::AddPosition,
            readiness::Action::SelectCell(job.id("door")),
        ]
    );
}

/// Moves the pointer over an area and returns what it says.
fn pointed<'a, Message: 'a>(
    mut ui: Simulator<'a, Message>,
    at: Point,
    click: bool,
) -> Vec<Message> {
    ui.point_at(at);
    let _ = ui.simulate([Event::Mouse(mouse::Event::CursorMoved { position: at })]);
    if click {
        let _ = ui.simulate(iced_test::simulator::click());
    }
    ui.into_messages().collect()
}

#[test]
fn the_pointer_reads_distance_irradiance_and_allowed_time() {
    let job = Job::demo();
    let mut area = curve::Area::new();
    let size = Size::new(980.0, 480.0);
    let view = ui(area.view(job.shared(LOOK)), size, LOOK);
    let messages = pointed(view, Point::new(400.0, 200.0), false);
    let Some(curve::Message::Pointed(Some(distance))) = messages.last() else {
        panic!("{messages:?}");
    };
    assert!((0.5..25.0).contains(distance), "{distance}");
    let left = pointed(
        ui(area.view(job.shared(LOOK)), size, LOOK),
        Point::new(970.0, 5.0),
        false,
    );
    assert!(
        left.is_empty() || matches!(left.last(), Some(curve::Message::Pointed(None))),
        "{left:?}"
    );
    // 2.5 m is where the charger stands: its own card says 5.00 kW/m² of near
    // infrared, and 4 s by row m of the directive.
    let _ = area.update(curve::Message::Pointed(Some(2.5)));
    let mut read = ui(area.view(job.shared(LOOK)), size, LOOK);
    assert!(read.find("2.50 m from the face").is_ok());
    let charger = job.results.cell("charger").expect("the demo has a charger");
    let value = |name: &str| charger.shown(name).and_then(Shown::quantity);
    let nominal = value("near_ir_irradiance").expect("a position has it").si;
    let told = format!(
        "(nominal {})",
        farglow::units::format::safe_irradiance(nominal)
    );
    let shown = shown(&mut read);
    assert!(
        shown.iter().any(|text| text.contains(&told)),
        "{told}: {shown:?}"
    );
    assert!(
        shown.iter().any(|text| text.contains("no planned stay")),
        "{shown:?}"
    );
}

/// Every text that is shown.
fn shown<Message>(ui: &mut Simulator<'_, Message>) -> Vec<String> {
    use iced_test::selector::Candidate;
    let found = std::sync::Arc::new(std::sync::Mutex::new(Vec::new()));
    let seen = std::sync::Arc::clone(&found);
    let _ = ui.find(move |candidate: Candidate<'_>| {
        if let (Candidate::Text { content, .. }, Ok(mut seen)) = (candidate, seen.lock()) {
            seen.push(content.to_owned());
        }
        None::<iced::Rectangle>
    });
    let texts = found.lock().expect("no test panics while it holds this");
    texts.clone()
}

#[test]
fn times_wait_while_bounds_are_worked_out() {
    let job = Job::demo();
    let nominal = Snapshot::of(&job.engine).nominal();
    let shared = Shared {
        results: &nominal,
        fresh: false,
        ..job.shared(LOOK)
    };
    let mut area = curve::Area::new();
    let _ = area.update(curve::Message::Pointed(Some(4.0)));
    let mut read = ui(area.view(shared), Size::new(980.0, 480.0), LOOK);
    let shown = shown(&mut read);
    assert!(
        shown.iter().any(|text| text.contains("being worked out")),
        "{shown:?}"
    );
    assert!(
        !shown.iter().any(|text| text.contains("allows")),
        "{shown:?}"
    );
}

#[test]
fn a_click_on_a_flag_selects_its_cell() {
    let job = Job::demo();
    let area = rail::Area::new();
    let size = Size::new(980.0, 250.0);
    let mut hit = Vec::new();
    for x in (20..960).step_by(6) {
        for y in (30..200).step_by(8) {
            let view = ui(area.view(job.shared(LOOK)), size, LOOK);
            let at = Point::new(x as f32, y as f32);
            for message in pointed(view, at, true) {
                if let rail::Message::Show(id) = message
                    && !hit.contains(&id)
                {
                    hit.push(id);
                }
            }
        }
        if hit.len() == 3 {
            break;
        }
    }
    for name in ["charger", "eye_4_min", "eye_all_shift"] {
        assert!(hit.contains(&job.id(name)), "{name} not in {hit:?}");
    }
}

/// The demo with a second hot thing beside the door.
fn two_sources() -> Job {
    Job::new(&template::DEMO.text.replace(
        "    {\n      \"kind\": \"formula\",",
        "    { \"kind\": \"source\", \"name\": \"pot\", \"form\": \"body\", \"outline\": \"sphere\", \
         \"diameter\": \"0.5 m\", \"temperature\": \"900 °C\", \"emissivity\": \"0.8\", \
         \"x\": \"30 m\", \"y\": \"0 m\", \"z\": \"1 m\" },\n    {\n      \"kind\": \"formula\",",
    ))
}

#[test]
fn a_chosen_line_stays_until_something_on_another_one_is_selected() {
    let job = two_sources();
    let mut area = rail::Area::new();
    let size = Size::new(980.0, 250.0);
    let mut view = ui(area.view(job.shared(LOOK)), size, LOOK);
    assert!(view.find("door, straight out").is_ok());
    click(&mut view, "pot, heading 0 °");
    for message in view.into_messages().collect::<Vec<_>>() {
        assert_eq!(area.update(message), rail::Action::None);
    }
    compare(
        "rail-other-line",
        ui(area.view(job.shared(LOOK)), size, LOOK),
        LOOK,
    );
    let selected = Shared {
        selected: Some(job.id("charger")),
        ..job.shared(LOOK)
    };
    compare(
        "rail-selected-line",
        ui(area.view(selected), size, LOOK),
        LOOK,
    );
}

#[test]
fn many_lines_are_chosen_from_a_list() {
    let pots: String = (0..9)
        .map(|i| {
            format!(
                "    {{ \"kind\": \"source\", \"name\": \"pot_{i}\", \"form\": \"body\", \
                 \"outline\": \"sphere\", \"diameter\": \"0.5 m\", \"temperature\": \"900 °C\", \
                 \"emissivity\": \"0.8\", \"x\": \"{} m\", \"y\": \"0 m\", \"z\": \"1 m\" }},\n",
                30 + 2 * i
            )
        })
        .collect();
    let formula = "    {\n      \"kind\": \"formula\",";
    let job = Job::nominal(&template::DEMO.text.replace(formula, &(pots + formula)));
    let area = rail::Area::new();
    let view = ui(area.view(job.shared(LOOK)), Size::new(980.0, 250.0), LOOK);
    compare("rail-many-lines", view, LOOK);
}

#[test]
fn the_rail_is_told_in_feet_and_says_when_bounds_are_not_there_yet() {
    let job = Job::demo();
    let size = Size::new(980.0, 250.0);
    let us = Look {
        measure: Measure::Us,
        ..LOOK
    };
    let area = rail::Area::new();
    compare("rail-feet", ui(area.view(job.shared(us)), size, us), us);
    let nominal = Snapshot::of(&job.engine).nominal();
    let shared = Shared {
        results: &nominal,
        fresh: false,
        ..job.shared(LOOK)
    };
    compare("rail-nominal", ui(area.view(shared), size, LOOK), LOOK);
}

#[test]
fn what_is_missing_or_broken_is_said() {
    let empty = Job::new("{\"farglow\": 1, \"cells\": []}");
    let curve = curve::Area::new();
    let mut view = ui(
        curve.view(empty.shared(LOOK)),
        Size::new(980.0, 480.0),
        LOOK,
    );
    assert!(
        view.find("No curve yet: add a cell of kind curve to see irradiance against distance.")
            .is_ok()
    );
    let rail = rail::Area::new();
    let mut view = ui(rail.view(empty.shared(LOOK)), Size::new(980.0, 250.0), LOOK);
    assert!(
        view.find("Distances are told from the face of a source: add one.")
            .is_ok()
    );
    let broken = Job::new(&template::DEMO.text.replace("1250 ± 25 °C", "1250 ± 25 m"));
    let mut view = ui(
        rail.view(broken.shared(LOOK)),
        Size::new(980.0, 250.0),
        LOOK,
    );
    assert!(
        view.find("No distance can be told while a source has an error: mend it first.")
            .is_ok()
    );
    let mut view = ui(
        curve.view(broken.shared(LOOK)),
        Size::new(980.0, 480.0),
        LOOK,
    );
    assert!(view.find("falloff could not be worked out.").is_ok());
}

#[test]
fn every_picture_that_is_kept_is_compared() {
    let mut kept: Vec<String> = std::fs::read_dir(pictures())
        .expect("pictures are kept")
        .filter_map(|entry| entry.ok()?.file_name().into_string().ok())
        .filter(|name| {
            ["curve-", "rail-", "screens-", "cautions-", "readiness-"]
                .iter()
                .any(|area| name.starts_with(area))
        })
        .collect();
    kept.sort();
    let themes = ["contrast", "dark", "light"];
    let mut expected: Vec<String> = [
        "cautions",
        "cautions-open",
        "curve",
        "rail",
        "readiness",
        "screens",
    ]
    .iter()
    .flat_map(|area| themes.map(|theme| format!("{area}-{theme}-tiny-skia.sha256")))
    .chain(
        [
            "curve-feet",
            "curve-ladle",
            "curve-readout",
            "rail-feet",
            "rail-many-lines",
            "rail-nominal",
            "rail-other-line",
            "rail-selected-line",
        ]
        .map(|name| format!("{name}-tiny-skia.sha256")),
    )
    .collect();
    expected.sort();
    assert_eq!(kept, expected);
}
