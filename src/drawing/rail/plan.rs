//! Where everything on the rail goes, in points: the ruler, the flags above it,
//! its numbers, legend and notes under it.

mod flag;
mod paint;

use super::Rail;
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::mark::Rectangle;
use crate::drawing::screen::Shadow;

use flag::{Flag, Of};

const HEADING: &str = "Distance rail";
const TITLE: f64 = 10.0;
const SMALL: f64 = 7.5;
const LINE: f64 = 10.0;
const SYMBOL: f64 = 7.0;
/// The height of a flag with its two lines, and what stays free under it.
const LANE: f64 = 2.0 * LINE + 4.0;
/// The height of the shaded ruler.
const BAR: f64 = 14.0;
/// How far the ruler stands in from the sheet's sides.
const SIDE: f64 = 12.0;
/// From a pole to the words of its flag.
const BESIDE: f64 = 7.0;
/// Between a flag and the next pole to its right.
const APART: f64 = 5.0;
/// The least length of the ruler, m.
const LEAST: f64 = 5.0;
/// How much a height may fall short and still be enough: what the window's
/// single precision loses. A flag that is left out costs a line that tells of
/// it, so that a hair too little would cost all of them.
const SLACK: f64 = 0.05;
/// No flag is slimmer than this.
const SLIMMEST: f64 = 16.0;

/// A rail laid out at a width.
#[derive(Debug)]
pub(super) struct Plan<'a> {
    rail: &'a Rail,
    width: f64,
    /// How many metres the ruler shows.
    end: f64,
    flags: Vec<Flag<'a>>,
    /// The names of flags that found no room.
    left_out: Vec<&'a str>,
    notes: Vec<String>,
    /// What stands beside the title.
    about: String,
}

impl<'a> Plan<'a> {
    pub(super) fn new(rail: &'a Rail, width: f64) -> Self {
        let pins = rail.pins.iter().map(Of::Pin);
        let all = pins
            .chain(rail.stands.iter().map(Of::Stand))
            .chain(rail.screens.iter().map(Of::Screen));
        let known = all.filter(|of| of.distance().is_finite() && of.distance() >= 0.0);
        Self::with(rail, width, known.collect(), Vec::new())
    }

    /// Lays out as many flags as a height has room for.
    pub(super) fn fitted(rail: &'a Rail, width: f64, height: f64) -> Self {
        let mut plan = Self::new(rail, width);
        // More than this have no room however they lie: there may be thousands.
        let lanes = (height / LANE).max(1.0);
        let most = (lanes * (plan.width / SLIMMEST)).ceil() as usize;
        while plan.height() > height + SLACK && !plan.flags.is_empty() {
            let mut kept: Vec<Of<'a>> = plan.flags.iter().map(|flag| flag.of).collect();
            // The most needed stay; of equals, the nearest.
            kept.sort_by(|a, b| {
                let key = |of: &Of<'_>| (of.rank(), of.distance());
                let (a, b) = (key(a), key(b));
                a.0.cmp(&b.0).then(a.1.total_cmp(&b.1))
            });
            let mut left_out = plan.left_out.clone();
            let stay = (kept.len() - 1).min(most);
            left_out.extend(kept.drain(stay..).rev().map(Of::name));
            plan = Self::with(rail, width, kept, left_out);
        }
        plan
    }

    fn with(rail: &'a Rail, width: f64, all: Vec<Of<'a>>, left_out: Vec<&'a str>) -> Self {
        let width = drawn(width);
        let (end, flags) = flag::placed(all, width);
        let mut notes: Vec<String> = Vec::new();
        let mut about = rail.about.clone();
        if !rail.elsewhere.is_empty() {
            let text = format!("not on this line: {}", rail.elsewhere.join(", "));
            let longer = format!("{about} · {text}");
            if font::width(&longer, SMALL, Weight::Regular) <= width - title_width() {
                about = longer;
            } else {
                notes.extend(wrapped(&text, width));
            }
        }
        if !left_out.is_empty() {
            let text = format!("and {} more: {}", left_out.len(), left_out.join(", "));
            notes.push(fit(&text, width, SMALL, Weight::Regular));
        }
        if !rail.shadows.is_empty() {
            let text = format!("hatched, {}", Shadow::words(&rail.shadows));
            notes.extend(wrapped(&text, width));
        }
        for note in &rail.notes {
            notes.extend(wrapped(note, width));
        }
        Self {
            rail,
            width,
            end,
            flags,
            left_out,
            notes,
            about,
        }
    }

    pub(super) fn height(&self) -> f64 {
        let lanes = self.flags.iter().map(|flag| flag.lane + 1).max();
        TITLE + 8.0 + lanes.unwrap_or(0) as f64 * LANE + SYMBOL + BAR + self.under()
    }

    /// What stands under the ruler: its numbers, the legend, the notes.
    fn under(&self) -> f64 {
        let legend = if self.beside() { 1.0 } else { 2.0 };
        4.0 + LINE + 8.0 + legend * (LINE + 2.0) + LINE * self.notes.len() as f64 + 10.0
    }

    fn x(&self, distance: f64) -> f64 {
        SIDE + (self.width - 2.0 * SIDE) * (distance / self.end).clamp(0.0, 1.0)
    }

    /// The steps that the ruler shows, the weakest and the strongest.
    fn steps(&self) -> (usize, usize) {
        let shown = self
            .rail
            .stretches
            .iter()
            .filter(|stretch| stretch.from < self.end)
            .map(|stretch| stretch.step);
        let last = shown.clone().max().unwrap_or(0);
        (shown.min().unwrap_or(0), last)
    }

    /// The strength on the ramp of a step: the whole ramp is used by what the
    /// ruler shows.
    fn strength(&self, step: usize) -> f64 {
        let (first, last) = self.steps();
        let above = step.saturating_sub(first) as f64;
        ((above + 0.5) / (last - first + 1) as f64).min(1.0)
    }

    /// The texts between the steps that the ruler shows.
    fn level_texts(&self) -> &[String] {
        let (first, last) = self.steps();
        self.rail.level_texts.get(first..last).unwrap_or_default()
    }

    /// The width of one swatch of the legend.
    fn swatch(&self) -> f64 {
        let widest = self
            .level_texts()
            .iter()
            .map(|text| font::width(text, SMALL, Weight::Regular))
            .fold(0.0, f64::max);
        let (first, last) = self.steps();
        let steps = (last - first + 1) as f64;
        (widest + 4.0)
            .max(14.0)
            .min((self.width - 2.0 * SIDE) / steps)
    }

    fn legend_width(&self) -> f64 {
        let (first, last) = self.steps();
        self.swatch() * (last - first + 1) as f64
    }

    /// Whether the legend and its title stand in one row.
    fn beside(&self) -> bool {
        let title = font::width(&self.rail.quantity, SMALL, Weight::Regular);
        title + 16.0 + self.legend_width() <= self.width - SIDE
    }

    /// The top of a lane, over a ruler whose top is given.
    fn lane(top: f64, lane: usize) -> f64 {
        top - SYMBOL - (lane + 1) as f64 * LANE
    }

    /// Returns the height that the picture really has.
    fn drawn(&self, height: f64) -> f64 {
        let least = self.height();
        if height.is_finite() {
            height.max(least)
        } else {
            least
        }
    }

    /// Returns the boxes of the flags, with the cells that they stand for.
    pub(super) fn hits(&self, height: f64) -> Vec<(Rectangle, String)> {
        let top = self.drawn(height) - self.under() - BAR;
        self.flags
            .iter()
            .map(|flag| {
                let wide = flag
                    .lines
                    .iter()
                    .map(|line| font::width(line, SMALL, Weight::SemiBold))
                    .fold(0.0, f64::max);
                let left = flag.x - SYMBOL / 2.0;
                let area = Rectangle::new(
                    left,
                    Self::lane(top, flag.lane),
                    SYMBOL / 2.0 + BESIDE + wide,
                    2.0 * LINE,
                );
                (area, flag.of.cell().to_owned())
            })
            .collect()
    }
}

/// The width that is really drawn.
fn drawn(width: f64) -> f64 {
    if width.is_finite() {
        width.max(240.0)
    } else {
        240.0
    }
}

/// How much of the first row the heading takes.
fn title_width() -> f64 {
    font::width(HEADING, TITLE, Weight::SemiBold) + 8.0
}

/// Breaks a note into lines at its spaces.
fn wrapped(text: &str, width: f64) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    for word in text.split_whitespace() {
        match lines.last_mut() {
            Some(line) => {
                let longer = format!("{line} {word}");
                if font::width(&longer, SMALL, Weight::Regular) <= width {
                    *line = longer;
                } else {
                    lines.push(word.to_owned());
                }
            }
            None => lines.push(word.to_owned()),
        }
    }
    lines
        .iter()
        .map(|line| fit(line, width, SMALL, Weight::Regular))
        .collect()
}
