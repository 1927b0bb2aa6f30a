//! Random notebooks and edits, drawn from one list of numbers: a shorter list
//! of smaller numbers is a simpler case.

use std::collections::BTreeSet;

use farglow::notebook::cell::{Basis, Cell, Content, Field, Form, Kind};
use farglow::notebook::edit::Edit;
use farglow::notebook::{Confirmation, Job, Notebook};
use farglow::units::Dimension;
use proptest::prelude::*;

/// The names that cells may have, few, so that they meet.
const NAMES: [&str; 13] = [
    "a", "door", "stand", "b", "pool", "bench", "judged", "fall", "edge", "room", "c", "ball",
    "plate",
];

const LENGTHS: &[&str] = &[
    "2 m",
    "1.5 ± 0.1 m",
    "a",
    "b * 1 m",
    "door.width + 0.4 m",
    "door.z",
    "0.3 m",
    "stand.distance",
    "edge",
    "c",
    "-1 m",
    "0 m",
    "1e999 m",
    "2,5 m",
    "8 ft",
    "door.width * nothing",
];
const TEMPERATURES: &[&str] = &[
    "1250 ± 25 °C",
    "1400 K",
    "a",
    "pool.temperature",
    "b * 300 K",
    "room.air_temperature + 900 K",
    "1250 °C + 20 K",
    "0 K",
    "2000 °F",
    "-300 °C",
];
const ANGLES: &[&str] = &[
    "0 °",
    "90 °",
    "a",
    "door.heading",
    "-40 ± 2 °",
    "1",
    "500 mrad",
];
const TIMES: &[&str] = &[
    "4 min",
    "8 h",
    "30 s",
    "a",
    "stand.stay",
    "2 * 1 min",
    "-1 s",
    "9 s",
];
const NUMBERS: &[&str] = &[
    "0.9",
    "0.5 ± 0.3",
    "b",
    "stand.irradiance / door",
    "room.humidity",
    "50 %",
    "1.2",
    "0",
    "1/0",
    "a > b",
    "c",
];
const ANYTHING: &[&str] = &[
    "1.5",
    "2 m",
    "1250 ± 25 °C",
    "a + b",
    "door.width * door.height",
    "stand",
    "stand.irradiance_from.door",
    "stand.view_factor.pool / 2",
    "pool.power",
    "c",
    "2 * c",
    "edge.distance",
    "room.background",
    "judged.rows",
    "a > 2 m",
    "sqrt(b)",
    "max(door, pool)",
    "fall",
    "door.",
    "(((",
    "",
    "a = 1",
    "stand.irradiance_from",
    "99 ± 60 K",
];
const FACES: &[&str] = &["strongest", "door", "90 °", " pool ", "a", "nobody", "down"];
const GUIDANCE: &[&str] = &[
    "icnirp-2013-ir-eye",
    "eu-2006-25-m",
    "pain-time",
    "icnirp-2013-skin",
    "eu-2006-25-o",
    "eu-2006-25-n",
    "no-such-limit",
];
const UNITS: &[&str] = &["m²", "kW/m²", "K", "m", "furlong", "°C", "%"];
const WORDS: &[&str] = &[
    "",
    "a remark",
    "Ofen 2 — „heiß“\n\t\\",
    "{\"farglow\": 1}",
    "\u{202e}x",
];

/// A list of numbers that decides everything; when it is used up, the first of
/// every choice is taken.
#[derive(Clone, Debug)]
pub struct Dice {
    numbers: Vec<u16>,
    at: usize,
}

pub fn dice() -> impl Strategy<Value = Dice> {
    proptest::collection::vec(any::<u16>(), 0..500).prop_map(|numbers| Dice { numbers, at: 0 })
}

impl Dice {
    pub fn upto(&mut self, count: usize) -> usize {
        let number = self.numbers.get(self.at).copied().unwrap_or(0);
        self.at += 1;
        usize::from(number) % count.max(1)
    }

    fn pick<'a>(&mut self, list: &[&'a str]) -> &'a str {
        // The sound choices stand first, and are twice as likely.
        let most = if self.upto(2) == 0 {
            list.len().div_ceil(2)
        } else {
            list.len()
        };
        list[self.upto(most)]
    }

    fn text(&mut self, list: &[&str]) -> Content {
        Content::Text(self.pick(list).to_owned())
    }

    pub fn notebook(&mut self) -> Notebook {
        let mut notebook = Notebook::default();
        if self.upto(2) == 1 {
            notebook.title = Some(self.pick(WORDS).to_owned());
        }
        if self.upto(2) == 1 {
            notebook.job = Job {
                site: Some(self.pick(WORDS).to_owned()),
                date: Some("2026-12-01".to_owned()),
                ..Job::default()
            };
        }
        if self.upto(3) == 1 {
            notebook.confirmed = self.confirmed();
        }
        for _ in 0..3 + self.upto(8) {
            let cell = self.cell();
            let taken = notebook.find(&cell.name).is_some();
            let second = cell.kind == Kind::Surroundings
                && notebook
                    .cells
                    .iter()
                    .any(|cell| cell.kind == Kind::Surroundings);
            if !taken && !second {
                notebook.cells.push(cell);
            }
        }
        notebook
    }

    fn confirmed(&mut self) -> Vec<Confirmation> {
        (0..self.upto(3))
            .map(|_| Confirmation {
                guidance: self.pick(GUIDANCE).to_owned(),
                edition: self.pick(WORDS).to_owned(),
                by: "R. Aldous".to_owned(),
                date: "2026-12-01".to_owned(),
            })
            .collect()
    }

    /// A cell with the fields that its kind needs, most of them sound; a kind
    /// goes with a name more often than not.
    fn cell(&mut self) -> Cell {
        let (name, kind) = [
            ("door", Kind::Source),
            ("stand", Kind::Position),
            ("a", Kind::Value),
            ("judged", Kind::Assessment),
            ("b", Kind::Formula),
            ("pool", Kind::Source),
            ("fall", Kind::Curve),
            ("edge", Kind::Zone),
            ("room", Kind::Surroundings),
            ("c", Kind::Formula),
            ("ball", Kind::Source),
            ("plate", Kind::Screen),
            ("bench", Kind::Position),
            ("note", Kind::Note),
        ][self.upto(14)];
        let kind = if self.upto(8) == 7 {
            Kind::ALL[self.upto(Kind::ALL.len())]
        } else {
            kind
        };
        let mut cell = Cell::new(kind, name);
        let needed: &[&str] = match kind {
            Kind::Value | Kind::Formula => &["entry"],
            Kind::Surroundings => &["air_temperature"],
            Kind::Source => &["form", "outline", "temperature", "emissivity", "z"],
            Kind::Screen => &["make", "width", "height", "z", "y"],
            Kind::Position => &["from", "distance", "stay"],
            Kind::Curve => &["from", "points"],
            Kind::Assessment => &["position", "guidance"],
            Kind::Zone => &["from", "guidance", "stay"],
            Kind::Note => &["text"],
        };
        for field in needed {
            let content = self.fill(kind, field);
            cell.fields.push(content);
        }
        if kind == Kind::Screen {
            let own: &[&str] = match cell.text("make") {
                Some("mesh") => &["open_fraction"],
                Some("filter") => &["transmittance", "near_ir_transmittance"],
                _ => &[],
            };
            for field in own {
                let content = self.fill(kind, field);
                cell.fields.push(content);
            }
        }
        if kind == Kind::Source {
            // Every form with the outline and the sizes that go with it.
            let (form, outline, sizes): (_, _, &[&str]) = match (name, self.upto(2)) {
                ("ball", _) => [
                    ("body", "sphere", &["diameter"][..]),
                    ("body", "cylinder", &["diameter", "height"]),
                    ("body", "plate", &["width", "height"]),
                ][self.upto(3)],
                ("pool", 0) => ("pool", "disc", &["diameter"]),
                ("pool", _) => ("pool", "rectangle", &["width", "length"]),
                ("a", _) => ("opening", "polygon", &["vertices"]),
                (_, 0) => ("opening", "rectangle", &["width", "height"]),
                _ => ("opening", "disc", &["diameter"]),
            };
            cell.fields[0].content = Content::Text(form.to_owned());
            cell.fields[1].content = Content::Text(outline.to_owned());
            for size in sizes {
                let content = self.fill(kind, size);
                cell.fields.push(content);
            }
        }
        for _ in 0..self.upto(4) {
            let spec = &kind.fields()[self.upto(kind.fields().len())];
            if cell.field(spec.name).is_none() {
                let content = self.fill(kind, spec.name);
                cell.fields.push(content);
            }
        }
        cell
    }

    pub fn content(&mut self, notebook: &Notebook, name: &str, field: &str) -> Field {
        let at = notebook.find(name).expect("a cell that is there");
        self.fill(notebook.cells[at].kind, field)
    }

    fn entry(&mut self, dimension: Option<Dimension>) -> &'static str {
        self.pick(match dimension {
            Some(Dimension::LENGTH) => LENGTHS,
            Some(Dimension::TEMPERATURE) => TEMPERATURES,
            Some(Dimension::ANGLE) => ANGLES,
            Some(Dimension::TIME) => TIMES,
            Some(Dimension::NONE) => NUMBERS,
            _ => ANYTHING,
        })
    }

    fn fill(&mut self, kind: Kind, field: &str) -> Field {
        let spec = kind.field(field).expect("a field of the kind");
        let content = match spec.form {
            Form::Entry(expect) => Content::Text(self.entry(expect.dimension).to_owned()),
            Form::Pairs(pairs) => {
                let count = pairs.least + self.upto(3);
                Content::Pairs(
                    (0..count)
                        .map(|_| {
                            pairs
                                .sides
                                .map(|side| self.entry(side.dimension).to_owned())
                        })
                        .collect(),
                )
            }
            Form::Word(words) => {
                let mut list = words.to_vec();
                list.push("other");
                self.text(&list)
            }
            Form::Cell(kinds) => {
                let mut list = match kinds {
                    [Kind::Source, ..] => vec!["door", "pool", "ball", "plate"],
                    _ => vec!["stand", "bench"],
                };
                list.extend(["a", "nobody"]);
                self.text(&list)
            }
            Form::Facing => self.text(FACES),
            Form::Guidance => self.text(GUIDANCE),
            Form::GuidanceList if self.upto(4) == 3 => {
                Content::Text(self.pick(GUIDANCE).to_owned())
            }
            Form::GuidanceList => Content::List(
                (0..1 + self.upto(3))
                    .map(|_| self.pick(GUIDANCE).to_owned())
                    .collect(),
            ),
            Form::Count(..) => Content::Count([5.0, 2.0, 1.0, 2.5, -1.0, 1e300][self.upto(6)]),
            Form::Unit => self.text(UNITS),
            Form::Basis => Content::Text(Basis::ALL[self.upto(6)].words().to_owned()),
            Form::Text => self.text(WORDS),
        };
        let mut filled = Field::new(spec.name, content);
        if matches!(spec.form, Form::Entry(_) | Form::Facing | Form::Pairs(_)) && self.upto(4) == 1
        {
            filled.wrapped = true;
            if self.upto(2) == 1 {
                filled.basis = Some(Basis::ALL[self.upto(6)]);
            }
            if self.upto(2) == 1 {
                filled.note = Some(self.pick(WORDS).to_owned());
            }
        }
        filled
    }

    /// A cell that is there, now and then one that is not.
    fn name(&mut self, notebook: &Notebook) -> String {
        if notebook.cells.is_empty() || self.upto(16) == 15 {
            return "nobody".to_owned();
        }
        notebook.cells[self.upto(notebook.cells.len())].name.clone()
    }

    /// A field of a cell that is there.
    pub fn field(&mut self, notebook: &Notebook) -> Option<(String, &'static str)> {
        if notebook.cells.is_empty() {
            return None;
        }
        let cell = &notebook.cells[self.upto(notebook.cells.len())];
        let fields = cell.kind.fields();
        Some((cell.name.clone(), fields[self.upto(fields.len())].name))
    }

    pub fn edit(&mut self, notebook: &Notebook) -> Edit {
        match self.upto(16) {
            0..=4 => self.set_field(notebook),
            5..=7 => Edit::Rename {
                name: self.name(notebook),
                to: if self.upto(12) == 11 {
                    "2nd".to_owned()
                } else {
                    NAMES[self.upto(NAMES.len())].to_owned()
                },
            },
            8 | 9 => Edit::Add {
                at: self.upto(12),
                cell: self.cell(),
            },
            10 | 11 => Edit::Remove {
                name: self.name(notebook),
            },
            12 | 13 => Edit::Move {
                name: self.name(notebook),
                to: self.upto(12),
            },
            14 => match self.upto(3) {
                0 => Edit::SetTitle((self.upto(2) == 1).then(|| self.pick(WORDS).to_owned())),
                1 => Edit::SetJob {
                    line: ["site", "date", "checked_by"][self.upto(3)],
                    text: (self.upto(2) == 1).then(|| self.pick(WORDS).to_owned()),
                },
                _ => Edit::SetConfirmed(self.confirmed()),
            },
            _ => {
                // The later ones may fail for what the earlier ones did.
                let count = 1 + self.upto(4);
                Edit::Several((0..count).map(|_| self.edit(notebook)).collect())
            }
        }
    }

    fn set_field(&mut self, notebook: &Notebook) -> Edit {
        let Some((name, field)) = self.field(notebook) else {
            return Edit::SetTitle(None);
        };
        let content = (self.upto(5) != 4).then(|| self.content(notebook, &name, field));
        Edit::SetField {
            name,
            field,
            content,
        }
    }
}

/// The cells that a cell can reach, by the words that stand in the fields, not
/// by the engine's links: a source and the surroundings reach whoever stands
/// in the scene.
pub fn reach(notebook: &Notebook, from: &str) -> BTreeSet<String> {
    let mentions = |cell: &Cell, name: &str| {
        cell.fields.iter().any(|field| {
            let texts = match &field.content {
                Content::Text(text) => vec![text.as_str()],
                Content::List(list) => list.iter().map(String::as_str).collect(),
                Content::Count(_) => Vec::new(),
                Content::Pairs(pairs) => pairs.iter().flatten().map(String::as_str).collect(),
            };
            texts.iter().any(|text| {
                text.split(|sign: char| !(sign.is_alphanumeric() || sign == '_'))
                    .any(|word| word == name)
            })
        })
    };
    let mut reached = BTreeSet::from([from.to_owned()]);
    let mut front = vec![from.to_owned()];
    while let Some(name) = front.pop() {
        let kind = notebook.find(&name).map(|at| notebook.cells[at].kind);
        for cell in &notebook.cells {
            // Of two that emit each must know where the other is.
            let in_scene = matches!(
                cell.kind,
                Kind::Position | Kind::Curve | Kind::Zone | Kind::Source | Kind::Screen
            );
            let by_scene = in_scene && kind.is_some_and(Kind::is_in_scene);
            if (by_scene || mentions(cell, &name)) && reached.insert(cell.name.clone()) {
                front.push(cell.name.clone());
            }
        }
    }
    reached
}
