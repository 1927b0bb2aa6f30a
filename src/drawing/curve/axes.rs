//! Where the plot stands in its picture, and what its axes say there.

use glam::DVec2;

use super::plot::{LINE, SMALL, TITLE, column, legend};
use super::scale::Scale;
use super::{Curve, domains, drawn};
use crate::drawing::font::{self, Weight};
use crate::drawing::mark::Rectangle;

/// The two axes of a plot, in their place.
#[derive(Clone, Debug)]
pub struct Axes {
    /// The frame of the plot, in points.
    pub area: Rectangle,
    pub(super) x: Scale,
    pub(super) y: Scale,
    /// How many SI units one unit of either axis is.
    units: (f64, f64),
}

impl Axes {
    /// Returns the axes of the picture of a size in points; `None` where there
    /// is nothing to draw.
    #[must_use]
    pub fn of(curve: &Curve, width: f64, height: f64) -> Option<Axes> {
        let (width, height) = drawn(width, height);
        let (xs, ys) = domains(curve)?;
        let units = (unit(curve.x_unit), unit(curve.y_unit));
        let x = Scale::new(xs.0 / units.0, xs.1 / units.0);
        let y = Scale::new(ys.0 / units.1, ys.1 / units.1);
        let numbers = y
            .ticks(1e9)
            .into_iter()
            .map(|tick| font::width(&(curve.number)(tick), SMALL, Weight::Regular));
        let left = (numbers.fold(0.0, f64::max) + 6.0).min(width * 0.25);
        let rows = legend::rows(curve, width) as f64;
        let top = TITLE + 8.0 + LINE * (rows + 1.0) + 12.0;
        let area = Rectangle {
            from: DVec2::new(left, top),
            to: DVec2::new(width - gutter(curve, width), height - 2.0 * LINE - 6.0),
        };
        Some(Axes { area, x, y, units })
    }

    /// Returns the distance in metres above a point of the lower axis, `None`
    /// beside the plot.
    #[must_use]
    pub fn distance(&self, x: f64) -> Option<f64> {
        let share = (x - self.area.from.x) / self.area.width();
        (0.0..=1.0)
            .contains(&share)
            .then(|| self.x.value(share) * self.units.0)
    }

    /// Returns the place of a distance in metres and a value in SI units, `None`
    /// outside the plot.
    #[must_use]
    pub fn place(&self, distance: f64, value: f64) -> Option<DVec2> {
        let at = self.at(distance, value);
        (at.is_finite() && self.holds(at)).then_some(at)
    }

    /// The same, wherever that is: not finite for what no log scale has.
    pub(super) fn at(&self, distance: f64, value: f64) -> DVec2 {
        DVec2::new(
            self.across(distance / self.units.0),
            self.up(value / self.units.1),
        )
    }

    /// The place of a number of the lower axis.
    pub(super) fn across(&self, number: f64) -> f64 {
        self.area.from.x + self.x.fraction(number) * self.area.width()
    }

    /// The place of a number of the upright axis.
    pub(super) fn up(&self, number: f64) -> f64 {
        self.area.to.y - self.y.fraction(number) * self.area.height()
    }

    pub(super) fn holds(&self, p: DVec2) -> bool {
        self.area.grown(0.01).holds(&Rectangle { from: p, to: p })
    }

    /// Both ends of the lower axis, in metres.
    pub(super) fn ends(&self) -> (f64, f64) {
        let (low, high) = self.x.ends();
        (low * self.units.0, high * self.units.0)
    }
}

fn unit(typed: f64) -> f64 {
    if typed.is_finite() && typed > 0.0 {
        typed
    } else {
        1.0
    }
}

/// How much room is kept beside the plot for the names of limits and positions.
fn gutter(curve: &Curve, width: f64) -> f64 {
    let least = if curve.positions.is_empty() {
        0.0
    } else {
        72.0
    };
    let names = curve.limits.iter().map(|limit| {
        let name = font::width(&limit.label, SMALL, Weight::SemiBold);
        name.max(font::width(&column::note(limit), SMALL, Weight::Regular))
    });
    let widest = names.fold(least, f64::max);
    if widest > 0.0 {
        (widest + 22.0).min(width * 0.36)
    } else {
        8.0
    }
}
