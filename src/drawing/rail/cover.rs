//! What stands across a line and hides a source from its ground.

use std::sync::Arc;

use glam::DVec3;

use super::line::Probe;
use crate::drawing::screen::{Screen, Shadow};
use crate::notebook::cell::position::Views;
use crate::notebook::cell::source::Shape;
use crate::notebook::scene::Form;

/// Into how many steps the line is cut to find where a source is hidden: no
/// stretch that shows on paper is passed over.
const STEPS: u32 = 160;

/// How often a step is halved to find where hiding begins.
const HALVINGS: u32 = 10;

/// A source of which less than this share is hidden is not called so.
const SOME: f64 = 1e-3;

impl Probe {
    /// Returns the screens that stand across the line, nearest first, and the
    /// stretches of its ground from which solid screens hide some of a source,
    /// sources in file order.
    ///
    /// Distances in metres from the centre of the line's source; only what lies
    /// between `from` and `to` is looked for. A shadow that reaches `to` does
    /// not end.
    #[must_use]
    pub fn cover(&self, from: f64, to: f64) -> (Vec<Screen>, Vec<Shadow>) {
        let form = self.form();
        let mut screens = Vec::new();
        for (name, shape) in form.names.iter().zip(&form.shapes) {
            if shape.is_source() {
                continue;
            }
            if let Some(distance) = self.crossing(shape).filter(|d| *d > 0.0 && *d < to) {
                screens.push(Screen {
                    cell: name.to_string(),
                    label: name.to_string(),
                    distance,
                });
            }
        }
        screens.sort_by(|one, other| one.distance.total_cmp(&other.distance));
        let screened = form.shapes.iter().any(|shape| !shape.is_source());
        let shadows = if !screened || from >= to {
            Vec::new()
        } else {
            self.shadows(from, to)
        };
        (screens, shadows)
    }

    /// Where a screen meets the upright plane through the line: the middle of
    /// what lies in it.
    fn crossing(&self, screen: &Shape) -> Option<f64> {
        let frame = screen.frame.as_ref()?;
        let across = frame.up.cross(frame.normal) * (0.5 * frame.width);
        let up = frame.up * (0.5 * frame.height);
        let corners = [-across - up, across - up, across + up, up - across]
            .map(|corner| screen.centre + corner);
        let (origin, ahead) = self.way();
        let aside = ahead.cross(DVec3::Z);
        let place = |vertex: DVec3| {
            let off = vertex - origin;
            (off.dot(ahead), off.dot(aside))
        };
        let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
        let mut last = place(corners[3]);
        for corner in corners {
            let next = place(corner);
            if (last.1 <= 0.0) != (next.1 <= 0.0) {
                let share = last.1 / (last.1 - next.1);
                let at = last.0 + (next.0 - last.0) * share;
                (low, high) = (low.min(at), high.max(at));
            }
            last = next;
        }
        (low <= high).then_some(0.5 * (low + high))
    }

    fn shadows(&self, from: f64, to: f64) -> Vec<Shadow> {
        let form = self.form();
        let sources: Vec<usize> = (0..form.shapes.len())
            .filter(|at| form.shapes[*at].is_source())
            .collect();
        // The same scene without its screens.
        let names = sources.iter().map(|at| Arc::clone(&form.names[*at]));
        let shapes = sources.iter().map(|at| Arc::clone(&form.shapes[*at]));
        let Ok(open) = Form::new(names.collect(), shapes.collect(), false) else {
            return Vec::new();
        };
        let flux = |form: &Form, distance: f64| -> Option<Vec<DVec3>> {
            let views = Views::standing(form, vec![self.point(distance)]).ok()?;
            let mut seen = vec![DVec3::ZERO; form.shapes.len()];
            for (part, view) in views.parts(0) {
                seen[form.owner(part)] += view.flux();
            }
            Some(seen)
        };
        let hidden = |distance: f64| -> Vec<bool> {
            let Some((seen, whole)) = flux(form, distance).zip(flux(&open, distance)) else {
                return vec![false; sources.len()];
            };
            sources
                .iter()
                .zip(whole)
                .map(|(at, whole)| seen[*at].length() < whole.length() * (1.0 - SOME))
                .collect()
        };
        let place = |step: u32| from + (to - from) * f64::from(step) / f64::from(STEPS);
        let looks: Vec<Vec<bool>> = (0..=STEPS).map(|step| hidden(place(step))).collect();
        let edge = |source: usize, mut low: f64, mut high: f64, begins: bool| {
            for _ in 0..HALVINGS {
                let middle = 0.5 * (low + high);
                if hidden(middle)[source] == begins {
                    high = middle;
                } else {
                    low = middle;
                }
            }
            0.5 * (low + high)
        };
        let mut shadows = Vec::new();
        for (source, at) in sources.iter().enumerate() {
            let mut start = looks[0][source].then_some(from);
            for step in 1..=STEPS {
                let (before, now) = (step - 1, step);
                let is = looks[now as usize][source];
                if is && start.is_none() {
                    start = Some(edge(source, place(before), place(now), true));
                } else if !is && let Some(begin) = start.take() {
                    shadows.push(Shadow {
                        from: begin,
                        to: edge(source, place(before), place(now), false),
                        source: form.names[*at].to_string(),
                    });
                }
            }
            if let Some(begin) = start {
                shadows.push(Shadow {
                    from: begin,
                    to: f64::INFINITY,
                    source: form.names[*at].to_string(),
                });
            }
        }
        shadows
    }
}
