//! Everything that was worked out, cell by cell, with bounds: what the command
//! line prints, the worksheet paints and the window shows.

use std::collections::BTreeMap;

use super::caution::{self, Caution};
use super::cell::assessment::{self, Verdict};
use super::cell::zone::Extent;
use super::cell::{Kind, position};
use super::datum::{CellId, Datum, Output, Span};
use super::engine::{Engine, Slot};
use super::uncertainty::{Bounds, NodeBounds};
use super::{Diagnostic, readiness};
use crate::graph::Node;
use crate::guidance::{Library, Overall};
use crate::units::Quantity;

/// The results of a whole notebook.
#[derive(Clone, Debug)]
pub struct Results {
    /// Each cell's, in file order.
    pub cells: Vec<CellResult>,
    /// What still stops a worksheet from being issued as final.
    pub readiness: Vec<readiness::Item>,
    /// How many inputs carry a spread.
    pub spreads: usize,
    /// How many draws bound the outputs; none where no input has a spread.
    pub draws: u32,
    /// What the draws are keyed by.
    pub seed: u64,
}

/// Whether a cell could be worked out.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum State {
    /// It was.
    Ok,
    /// It has faults of its own.
    Error,
    /// It depends on these cells, which have.
    Waiting(Vec<String>),
}

impl State {
    /// Returns the word for it.
    #[must_use]
    pub const fn word(&self) -> &'static str {
        match self {
            State::Ok => "ok",
            State::Error => "error",
            State::Waiting(_) => "waiting",
        }
    }
}

/// The results of one cell.
#[derive(Clone, Debug)]
pub struct CellResult {
    /// Its number.
    pub id: CellId,
    /// Its name.
    pub name: String,
    /// Its kind.
    pub kind: Kind,
    /// Whether it could be worked out.
    pub state: State,
    /// Its outputs, in the order of its kind; none unless the state is `Ok`.
    pub figures: Vec<Figure>,
    /// Its own faults.
    pub errors: Vec<Diagnostic>,
    /// The warnings that its values call up.
    pub cautions: Vec<Caution>,
    /// An assessment's limits, judged on the unfavourable bound.
    pub verdicts: Vec<Verdict>,
    /// An assessment's limits drawn together, on the unfavourable bound.
    pub overall: Option<Overall>,
    /// In how many draws it had no value.
    pub failed: u32,
    /// Out of how many.
    pub draws: u32,
}

/// One output, with its place in the cell.
#[derive(Clone, Debug, PartialEq)]
pub struct Figure {
    /// The output's name, or a table's column.
    pub name: String,
    /// The source that it is about, where it is about one.
    pub part: Option<String>,
    /// The row of the cell's table, for a column.
    pub row: Option<usize>,
    /// Its value.
    pub shown: Shown,
}

/// A value with the bounds of its central 95 %, where spreads reach it.
#[derive(Clone, Debug, PartialEq)]
pub enum Shown {
    /// A quantity.
    Quantity {
        /// The nominal one.
        quantity: Quantity,
        /// The lower bound in SI units.
        low: Option<f64>,
        /// The upper bound in SI units.
        high: Option<f64>,
    },
    /// A duration.
    Time {
        /// The nominal one.
        span: Span,
        /// The shortest.
        low: Option<Span>,
        /// The longest.
        high: Option<Span>,
    },
    /// A distance along a line.
    Extent {
        /// The nominal one.
        extent: Extent,
        /// The nearest.
        low: Option<Extent>,
        /// The farthest.
        high: Option<Extent>,
    },
    /// A word.
    Word(String),
}

impl Shown {
    /// Returns the nominal quantity.
    #[must_use]
    pub const fn quantity(&self) -> Option<Quantity> {
        match self {
            Shown::Quantity { quantity, .. } => Some(*quantity),
            Shown::Time { .. } | Shown::Extent { .. } | Shown::Word(_) => None,
        }
    }

    /// Returns the upper bound of a quantity, its nominal value without one.
    #[must_use]
    pub fn upper(&self) -> Option<f64> {
        match self {
            Shown::Quantity { quantity, high, .. } => Some(high.unwrap_or(quantity.si)),
            Shown::Time { .. } | Shown::Extent { .. } | Shown::Word(_) => None,
        }
    }

    /// Returns the word.
    #[must_use]
    pub fn word(&self) -> Option<&str> {
        match self {
            Shown::Word(word) => Some(word),
            Shown::Quantity { .. } | Shown::Time { .. } | Shown::Extent { .. } => None,
        }
    }

    fn new(output: &Output<'_>, ranks: Option<(f64, f64)>) -> Option<Shown> {
        let (low, high) = ranks.unzip();
        Some(match *output {
            Output::Quantity(quantity) => Shown::Quantity {
                quantity,
                low,
                high,
            },
            Output::Time(span) => {
                let like = |rank: f64| match span {
                    _ if rank == f64::INFINITY => Span::Unlimited,
                    Span::Capped(cap) if rank >= cap => Span::Capped(cap),
                    _ => Span::Seconds(rank),
                };
                Shown::Time {
                    span,
                    low: low.map(like),
                    high: high.map(like),
                }
            }
            Output::Extent { extent, end } => {
                let like = |rank: f64| match rank {
                    f64::INFINITY => Extent::NotMetWithin(end),
                    f64::NEG_INFINITY => Extent::MetEverywhere,
                    distance => Extent::At(distance),
                };
                Shown::Extent {
                    extent,
                    low: low.map(like),
                    high: high.map(like),
                }
            }
            Output::Word(word) => Shown::Word(word.to_owned()),
            Output::Nothing => return None,
        })
    }
}

impl Results {
    /// Gathers everything that an engine has worked out, with the bounds that
    /// were drawn for it.
    #[must_use]
    pub fn new(engine: &Engine, bounds: &Bounds) -> Results {
        let mut cells = Vec::with_capacity(engine.notebook().cells.len());
        for place in 0..engine.notebook().cells.len() {
            if let Some(id) = engine.id(place) {
                cells.push(cell_result(engine, bounds, id));
            }
        }
        let readiness = readiness::items(engine, &cells);
        let spreads = bounds.spreads();
        let settings = bounds.settings();
        Results {
            cells,
            readiness,
            spreads,
            draws: if spreads > 0 { settings.draws } else { 0 },
            seed: settings.seed,
        }
    }

    /// Gathers anew what is left before issue, after a change of the title or
    /// the job block: no figure depends on those.
    pub fn gather_left(&mut self, engine: &Engine) {
        self.readiness = readiness::items(engine, &self.cells);
    }

    /// Returns the result of the cell of this name.
    #[must_use]
    pub fn cell(&self, name: &str) -> Option<&CellResult> {
        self.cells.iter().find(|cell| cell.name == name)
    }

    /// Returns the finding's word of a position: the worst of the assessments
    /// that judge it; `None` where none does, or none could be worked out.
    #[must_use]
    pub fn word_of(&self, engine: &Engine, position: &str) -> Option<&'static str> {
        let judging = self
            .cells
            .iter()
            .filter(|cell| cell.judges(engine, position));
        worst_word(judging)
    }

    /// Returns the assessments of every position, by its name: for whoever asks
    /// about many positions.
    #[must_use]
    pub fn assessments<'a>(&'a self, engine: &'a Engine) -> BTreeMap<&'a str, Vec<&'a CellResult>> {
        let mut found: BTreeMap<&str, Vec<&CellResult>> = BTreeMap::new();
        for cell in &self.cells {
            if cell.kind == Kind::Assessment
                && let Some(position) = engine.cell(cell.id).and_then(|cell| cell.text("position"))
            {
                found.entry(position).or_default().push(cell);
            }
        }
        found
    }

    /// Returns whether every cell was worked out.
    #[must_use]
    pub fn is_whole(&self) -> bool {
        self.cells.iter().all(|cell| cell.state == State::Ok)
    }
}

/// Returns the worst finding's word of some assessments; `None` where none
/// could be worked out.
#[must_use]
pub fn worst_word<'a>(
    assessments: impl IntoIterator<Item = &'a CellResult>,
) -> Option<&'static str> {
    let words: Vec<&str> = assessments
        .into_iter()
        .filter_map(|cell| cell.overall.as_ref().map(Overall::word))
        .collect();
    ["over", "not assessed", "within"]
        .into_iter()
        .find(|word| words.contains(word))
}

impl CellResult {
    /// Returns the value of an output that is in no table and about no source.
    #[must_use]
    pub fn shown(&self, name: &str) -> Option<&Shown> {
        self.figures
            .iter()
            .find(|figure| figure.name == name && figure.row.is_none() && figure.part.is_none())
            .map(|figure| &figure.shown)
    }

    /// Returns the value in a row of the cell's table.
    #[must_use]
    pub fn in_row(&self, row: usize, name: &str) -> Option<&Shown> {
        self.figures
            .iter()
            .find(|figure| figure.name == name && figure.row == Some(row))
            .map(|figure| &figure.shown)
    }

    /// Returns how long the limit in a row allows on the bound; `None` where
    /// the draws failed, so that nothing is known of it but that it is over.
    #[must_use]
    pub fn allowed(&self, row: usize) -> Option<Span> {
        let judgement = &self.verdicts.get(row)?.judgement;
        (self.failed == 0 || judgement.finding.counts_as_over())
            .then(|| assessment::span(judgement.allowed))
    }

    /// Returns whether this is an assessment of the position of this name.
    #[must_use]
    pub fn judges(&self, engine: &Engine, position: &str) -> bool {
        self.kind == Kind::Assessment
            && engine
                .cell(self.id)
                .is_some_and(|cell| cell.text("position") == Some(position))
    }

    /// Returns the number of rows of the cell's table.
    #[must_use]
    pub fn rows(&self) -> usize {
        self.figures
            .iter()
            .filter_map(|figure| figure.row)
            .max()
            .map_or(0, |last| last + 1)
    }
}

fn cell_result(engine: &Engine, bounds: &Bounds, id: CellId) -> CellResult {
    let cell = engine.cell(id).expect("the engine numbers its own cells");
    let mut errors = Vec::new();
    let mut waits = Vec::new();
    for (_, node) in engine.nodes(id) {
        match engine.value(*node) {
            Some(Datum::Fault(faults)) => {
                errors.extend(faults.iter().map(|fault| told(engine, *node, fault)));
            }
            Some(Datum::Waiting(cells)) => waits.extend(cells.iter().copied()),
            _ => {}
        }
    }
    // The check comes last in the nodes, but the same fault may be at a field.
    let mut unique: Vec<Diagnostic> = Vec::with_capacity(errors.len());
    for error in errors {
        if !unique.contains(&error) {
            unique.push(error);
        }
    }
    waits.retain(|cell| *cell != id);
    // In file order: numbers tell in which order cells were added.
    waits.sort_unstable_by_key(|cell| (engine.place(*cell), *cell));
    waits.dedup();
    let state = if !unique.is_empty() {
        State::Error
    } else if waits.is_empty() {
        State::Ok
    } else {
        State::Waiting(
            waits
                .into_iter()
                .filter_map(|cell| engine.cell(cell))
                .map(|cell| cell.name.clone())
                .collect(),
        )
    };
    let mut result = CellResult {
        id,
        name: cell.name.clone(),
        kind: cell.kind,
        figures: Vec::new(),
        errors: unique,
        cautions: Vec::new(),
        verdicts: Vec::new(),
        overall: None,
        failed: 0,
        draws: 0,
        state,
    };
    if result.state == State::Ok
        && let Some(node) = engine.result(id)
    {
        fill(engine, bounds, node, &mut result);
    }
    result.cautions = caution::of_cell(engine, id, &result);
    result
}

/// Returns a fault with what depends on the other cells as they are now.
fn told(engine: &Engine, node: Node, fault: &Diagnostic) -> Diagnostic {
    let mut fault = fault.clone();
    if let Some(name) = &fault.missing {
        fault.hint = Some(engine.remedy(name).into());
    }
    if fault.code == "ring" {
        fault.message = engine.ring(node);
        fault.hint = Some("give one of them a quantity of its own".into());
    }
    fault
}

fn fill(engine: &Engine, bounds: &Bounds, node: Node, result: &mut CellResult) {
    let Some(datum) = engine.value(node) else {
        return;
    };
    let node_bounds = bounds.of(node);
    if let Some(node_bounds) = node_bounds {
        result.failed = node_bounds.failed;
        result.draws = bounds.settings().draws;
    }
    let mut at = 0;
    datum.visit(&mut |slot, output| {
        let ranks = node_bounds.and_then(|bounds| bounds.ranks.get(at).copied().flatten());
        at += 1;
        if let Some(shown) = Shown::new(&output, ranks) {
            result.figures.push(Figure {
                name: slot.name.to_owned(),
                part: slot.part.map(str::to_owned),
                row: slot.row,
                shown,
            });
        }
    });
    if matches!(datum, Datum::Edge(_)) && result.failed > 0 {
        // Without bounds an edge would pass for certain: it is none.
        for figure in &mut result.figures {
            match (&mut figure.shown, figure.name.as_str()) {
                (Shown::Extent { extent, low, high }, _) => {
                    (*extent, *low, *high) = (Extent::NotAssessed, None, None);
                }
                (Shown::Word(word), "state") => {
                    Extent::NotAssessed.words().clone_into(word);
                }
                _ => {}
            }
        }
    }
    if let Datum::Verdicts(verdicts) = datum {
        let stay = stay_bound(engine, bounds, result.id);
        judge(verdicts, node_bounds, stay, result);
    }
}

/// Returns the longest stay of an assessment's position, on the bound.
fn stay_bound(engine: &Engine, bounds: &Bounds, id: CellId) -> Option<f64> {
    let position = engine.cell(id)?.text("position")?;
    let node = engine.slot(engine.find(position)?, Slot::Field("stay"))?;
    bounds
        .of(node)
        .and_then(|bounds| bounds.ranks.first().copied().flatten())
        .map(|(_, high)| high)
}

/// Judges every limit on the unfavourable bound of exposure and stay, and puts
/// those findings in place of the nominal ones.
fn judge(
    nominal: &[Verdict],
    bounds: Option<&NodeBounds>,
    stay: Option<f64>,
    result: &mut CellResult,
) {
    let library = Library::shipped();
    let mut verdicts = Vec::with_capacity(nominal.len());
    for (row, verdict) in nominal.iter().enumerate() {
        let mut verdict = verdict.clone();
        let exposure = match result.in_row(row, "exposure") {
            Some(shown) => shown.upper(),
            None => None,
        };
        let stay = stay.or(verdict.stay);
        if let Some(exposure) = exposure
            && let Ok(judgement) = library.judge(&verdict.guidance, exposure, stay)
        {
            verdict = verdict.judged(judgement);
        }
        verdicts.push(verdict);
    }
    let mut overall = assessment::overall(&verdicts);
    let failed = bounds.is_some_and(|bounds| bounds.failed > 0);
    if failed && !matches!(overall, Overall::Over { .. }) {
        // Without bounds nothing is within.
        overall = Overall::NotAssessed {
            missing: crate::guidance::NEEDED.to_vec(),
            within: Vec::new(),
        };
    }
    let governed = assessment::governing(&verdicts).map(|verdict| verdict.guidance.clone());
    if let Some(governed) = &governed {
        govern(&verdicts, governed, result);
    }
    for figure in &mut result.figures {
        let word = match (figure.name.as_str(), figure.row) {
            ("finding", Some(row)) => {
                let finding = verdicts[row].judgement.finding;
                if failed && !finding.counts_as_over() {
                    "not assessed"
                } else {
                    finding.word()
                }
            }
            ("finding", None) => overall.word(),
            ("governed_by", None) => match &governed {
                Some(id) => id,
                None => continue,
            },
            _ => continue,
        };
        figure.shown = Shown::Word(word.to_owned());
    }
    result.verdicts = verdicts;
    result.overall = Some(overall);
}

/// Shows as allowed time of the whole that of the limit which governs on the
/// bound, so that the two belong together.
fn govern(verdicts: &[Verdict], governed: &str, result: &mut CellResult) {
    let row = verdicts
        .iter()
        .position(|verdict| verdict.guidance == governed);
    let Some(shown) = row.and_then(|row| result.in_row(row, "allowed_time").cloned()) else {
        return;
    };
    let whole = result
        .figures
        .iter_mut()
        .find(|figure| figure.name == "allowed_time" && figure.row.is_none());
    if let Some(figure) = whole {
        figure.shown = shown;
    }
}

/// Returns what reaches a position, nominal, for drawings.
#[must_use]
pub fn sights(engine: &Engine, id: CellId) -> Option<&position::Sights> {
    match engine.value_of(id, Slot::Group("sights"))? {
        Datum::Sights(sights) => Some(sights),
        _ => None,
    }
}
