//! Irradiance against distance on log scales, with limit lines and crossings.
//!
//! Lines differ by dash and findings by shape, so that nothing is told by
//! colour alone. No label covers another: limits are named in a column beside
//! the plot, and a position that finds no room in the plot is named there too.

mod axes;
mod comparison;
mod data;
mod plot;
mod scale;

use glam::DVec2;

use crate::drawing::font::{Weight, fit};
use crate::drawing::mark::{Anchor, Mark, Shape, Text};
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;
use crate::drawing::screen::{Screen, Shadow};
use crate::notebook::cell::position::Band;

use plot::{BODY, Plot, TITLE};

pub use axes::Axes;
pub use comparison::InverseSquare;

/// Where a limit line meets the curve.
#[derive(Clone, Debug, PartialEq)]
pub struct Crossing {
    /// Distance of the crossing, in metres.
    pub distance: f64,
    /// The distance in words, rounded to the safe side: `11.1 m`.
    pub text: String,
}

/// A limit drawn across the plot.
#[derive(Clone, Debug, PartialEq)]
pub struct LimitLine {
    /// What it is called: `eye, 4 min`.
    pub label: String,
    /// Its value, in SI units of the curve's quantity.
    pub value: f64,
    /// Where the nominal curve meets it, if it does.
    pub crossing: Option<Crossing>,
    /// Where the curve of the unfavourable bound meets it; what people act on.
    pub upper_crossing: Option<Crossing>,
}

/// A work position on the plot.
#[derive(Clone, Debug, PartialEq)]
pub struct Marker {
    /// The position's cell.
    pub cell: String,
    /// What it is called, best with its finding's word: `charger · over`.
    pub label: String,
    /// Its distance, in metres.
    pub distance: f64,
    /// The quantity there, in SI units.
    pub value: f64,
    /// The shape of its finding.
    pub shape: Shape,
}

/// Everything that the plot shows, as plain data.
#[derive(Clone, Debug)]
pub struct Curve {
    /// What the plot is of.
    pub title: String,
    /// The band that is drawn.
    pub band: Band,
    /// The quantity along the bottom, with its unit: `distance from the face (m)`.
    pub x_label: String,
    /// The quantity upwards, with its unit.
    pub y_label: String,
    /// How many metres one unit of the lower axis is: 0.3048 for feet.
    pub x_unit: f64,
    /// How many SI units one unit of the upward axis is: 1000 for kW/m².
    pub y_unit: f64,
    /// Pairs of distance in metres and value in SI units, in order of distance.
    pub rows: Vec<(f64, f64)>,
    /// The same for the 97.5 % bound, where inputs carry an uncertainty.
    pub upper: Option<Vec<(f64, f64)>>,
    /// The inverse square that is drawn beside the curve.
    pub inverse_square: Option<InverseSquare>,
    /// Limits, in any order.
    pub limits: Vec<LimitLine>,
    /// Work positions, in any order.
    pub positions: Vec<Marker>,
    /// Screens that stand across the line.
    pub screens: Vec<Screen>,
    /// Stretches from which a source is hidden.
    pub shadows: Vec<Shadow>,
    /// Writes a number of an axis; the caller's one place where numbers become text.
    pub number: fn(f64) -> String,
}

/// More than this many times below its highest value, a curve is not followed.
const DEPTH: f64 = 1e6;

/// Returns the plot as a picture of `width` by `height` points.
///
/// Values that are zero, negative or not finite have no place on a log scale:
/// the curve is broken there, never bridged. With none left, the picture says
/// so in words. Sizes under 240 by 160 points are drawn at that size.
///
/// # Examples
///
/// ```
/// use farglow::drawing::curve::{self, Curve};
/// use farglow::notebook::cell::position::Band;
///
/// let curve = Curve {
///     title: "door, straight out".into(),
///     band: Band::Total,
///     x_label: "distance (m)".into(),
///     y_label: "irradiance (kW/m²)".into(),
///     x_unit: 1.0,
///     y_unit: 1000.0,
///     rows: (1..20).map(|m| (f64::from(m), 9e4 / f64::from(m * m))).collect(),
///     upper: None,
///     inverse_square: None,
///     limits: Vec::new(),
///     positions: Vec::new(),
///     screens: Vec::new(),
///     shadows: Vec::new(),
///     number: |value| value.to_string(),
/// };
/// let picture = curve::picture(&curve, 480.0, 280.0);
/// assert!(picture.texts().iter().any(|text| text.text == "irradiance (kW/m²)"));
/// ```
pub fn picture(curve: &Curve, width: f64, height: f64) -> Picture {
    let (width, height) = drawn(width, height);
    let mut picture = Picture::new(width, height);
    picture.push(Mark::Text(
        Text::new(
            DVec2::new(0.0, TITLE),
            TITLE,
            fit(&curve.title, width, TITLE, Weight::SemiBold),
        )
        .bold(),
    ));
    let Some(axes) = Axes::of(curve, width, height) else {
        let text = "nothing to draw: no value above zero on this line";
        picture.push(Mark::Text(
            Text::new(DVec2::new(width / 2.0, height / 2.0), BODY, text)
                .anchored(Anchor::Middle)
                .role(Role::Muted),
        ));
        return picture;
    };
    Plot::new(curve, picture, axes).finish()
}

/// The size that is really drawn.
fn drawn(width: f64, height: f64) -> (f64, f64) {
    let at_least = |size: f64, least: f64| {
        if size.is_finite() {
            size.max(least)
        } else {
            least
        }
    };
    (at_least(width, 240.0), at_least(height, 160.0))
}

/// The range of both axes, or nothing to show.
fn domains(curve: &Curve) -> Option<((f64, f64), (f64, f64))> {
    let upper = curve.upper.as_deref().unwrap_or_default();
    let rows: Vec<(f64, f64)> = curve
        .rows
        .iter()
        .chain(upper)
        .copied()
        .filter(drawable)
        .collect();
    if rows.is_empty() {
        return None;
    }
    let markers = curve
        .positions
        .iter()
        .map(|p| (p.distance, p.value))
        .filter(drawable);
    let all: Vec<(f64, f64)> = rows.iter().copied().chain(markers).collect();
    let limits = curve
        .limits
        .iter()
        .map(|limit| limit.value)
        .filter(|v| v.is_finite() && *v > 0.0);
    let xs = range(all.iter().map(|p| p.0));
    let top = range(all.iter().map(|p| p.1).chain(limits.clone())).1;
    let ys = range(
        all.iter()
            .map(|p| p.1)
            .chain(limits)
            .filter(|v| *v >= top / DEPTH),
    );
    Some((xs, ys))
}

fn drawable(row: &(f64, f64)) -> bool {
    row.0.is_finite() && row.0 > 0.0 && row.1.is_finite() && row.1 > 0.0
}

fn range(values: impl Iterator<Item = f64>) -> (f64, f64) {
    values.fold((f64::INFINITY, 0.0), |(low, high), v| {
        (v.min(low), v.max(high))
    })
}

#[cfg(test)]
mod tests;
