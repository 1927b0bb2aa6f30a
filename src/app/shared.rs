//! What every area of the window may read and none may change.

use crate::drawing::role::Theme;
use crate::notebook::datum::CellId;
use crate::notebook::engine::Engine;
use crate::notebook::results::Results;

pub use crate::drawing::measure::Measure;

/// What is shown.
#[derive(Clone, Copy, Debug)]
pub struct Shared<'a> {
    /// The engine that holds the notebook.
    pub engine: &'a Engine,
    /// What was worked out; nominal only while `fresh` is false.
    pub results: &'a Results,
    /// Whether the results belong to the notebook as it stands, with bounds.
    /// While they are being drawn, figures fade to the muted ink.
    pub fresh: bool,
    /// How it is shown.
    pub look: Look,
    /// The cell that is selected.
    pub selected: Option<CellId>,
}

/// How the window looks.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Look {
    /// The theme.
    pub theme: Theme,
    /// How much larger than 100 % everything is, such as 1.25.
    pub zoom: f32,
    /// The units that quantities are shown in; what was typed stays as typed.
    pub measure: Measure,
}
