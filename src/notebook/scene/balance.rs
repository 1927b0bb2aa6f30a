//! All screens of a scene, each at the temperature that keeps it in balance.

use std::sync::Arc;

use super::heat::Sender;
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::cell::screen::{self, PATCHES};
use crate::notebook::cell::source::Shape;
use crate::notebook::datum::{CellId, Datum};
use crate::notebook::task::Inputs;
use crate::physics::scene::Part;
use crate::physics::screen::{self as physics, Convection, Heated, Make, Patch, Screen};
use crate::physics::surface::Emission;

/// All screens in balance, in file order.
#[derive(Clone, Debug, PartialEq)]
pub struct Balanced {
    /// Each screen's state.
    pub screens: Vec<State>,
    /// What the mirror pictures in polished screens are of: the parts of all
    /// sources.
    pub sources: Vec<Part>,
}

/// One screen in balance.
#[derive(Clone, Debug, PartialEq)]
pub struct State {
    /// The number of its cell.
    pub id: CellId,
    /// Its name.
    pub name: Arc<str>,
    /// Where it is and what it is made of.
    pub screen: Screen,
    /// Its temperatures and what it takes up.
    pub heated: Heated,
    /// What each of its parts in the scene sends: the front's pieces, row by
    /// row, then the back's.
    pub parts: Vec<Emission>,
}

/// Works out the balance of all screens together.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct BalanceTask {
    pub(in crate::notebook) form: Node,
    pub(in crate::notebook) room: Node,
    pub(in crate::notebook) senders: Vec<Sender>,
    pub(in crate::notebook) screens: Vec<CellId>,
}

impl BalanceTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend([self.form, self.room]);
        for sender in &self.senders {
            let (Sender::Source(node) | Sender::Screen(node)) = sender;
            nodes.push(*node);
        }
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let form = inputs.form(self.form);
        let room = inputs.room(self.room);
        let (mut sources, mut emissions) = (Vec::new(), Vec::new());
        let (mut screens, mut names) = (Vec::new(), Vec::new());
        let failed = |id: CellId, error: &crate::physics::Error| {
            Ok(Datum::Unbalanced(id, Arc::from(error.to_string())))
        };
        for ((sender, shape), name) in self.senders.iter().zip(&form.shapes).zip(&form.names) {
            match sender {
                Sender::Source(node) => {
                    sources.extend(shape.parts.iter().cloned());
                    emissions.extend(&inputs.emission(*node).parts);
                }
                Sender::Screen(node) => {
                    let id = self.screens[screens.len()];
                    match standing(shape, *inputs.make(*node)) {
                        Ok(screen) => screens.push(screen),
                        Err(error) => return failed(id, &error),
                    }
                    names.push(Arc::clone(name));
                }
            }
        }
        let around = physics::Room {
            air: room.air_temperature,
            radiant: room.radiant_temperature,
            convection: Convection::Moving(room.air_speed),
        };
        let balance = match physics::balance(&sources, &emissions, &screens, &around) {
            Ok(balance) => balance,
            Err(error) => {
                use crate::physics::Error;
                let at = match error {
                    Error::ScreenTouches { screen, .. } | Error::ScreensOverlap { screen, .. } => {
                        screen
                    }
                    _ => 0,
                };
                let id = self.screens.get(at).copied().unwrap_or(CellId::SCENE);
                return failed(id, &error);
            }
        };
        let states = screens
            .into_iter()
            .zip(balance.screens)
            .zip(names)
            .zip(&self.screens)
            .map(|(((screen, heated), name), id)| State {
                id: *id,
                name,
                parts: parts(&heated.patches),
                screen,
                heated,
            })
            .collect();
        Ok(Datum::Balanced(Arc::new(Balanced {
            screens: states,
            sources,
        })))
    }
}

/// Returns a screen where its shape stands.
fn standing(shape: &Shape, make: Make) -> Result<Screen, crate::physics::Error> {
    let frame = shape
        .frame
        .as_ref()
        .expect("the shape of a screen has a frame");
    Screen::new(
        shape.centre,
        frame.normal,
        frame.up,
        frame.width,
        frame.height,
        make,
    )
}

/// Returns what the parts of a screen send: the balance may cut it more finely
/// or less, but never unevenly, so that each part gets the mean over what it
/// covers. What both faces send in all stays the same.
fn parts(patches: &[Patch]) -> Vec<Emission> {
    let mut parts = Vec::with_capacity(2 * PATCHES * PATCHES);
    for is_front in [true, false] {
        let face: Vec<&Patch> = patches
            .iter()
            .filter(|patch| patch.is_front == is_front)
            .collect();
        let columns = columns(&face);
        let rows = face.len().checked_div(columns).unwrap_or(0).max(1);
        for row in 0..PATCHES {
            for column in 0..PATCHES {
                let mut sum = Emission::default();
                for (from, high) in overlaps(row, rows) {
                    for (at, wide) in overlaps(column, columns) {
                        if let Some(patch) = face.get(from * columns + at) {
                            screen::add(&mut sum, &patch.emission, high * wide);
                        }
                    }
                }
                parts.push(sum);
            }
        }
    }
    parts
}

/// Returns how many pieces of a face stand in one row: those whose centres lie
/// on one line with the first two.
fn columns(face: &[&Patch]) -> usize {
    let centres: Vec<_> = face
        .iter()
        .map(|patch| patch.part.region.centre())
        .collect();
    let [first, second, ..] = centres.as_slice() else {
        return 1;
    };
    let way = *second - *first;
    centres
        .iter()
        .take_while(|centre| {
            let from = **centre - *first;
            from.cross(way).length() <= 1e-6 * way.length() * from.length().max(way.length())
        })
        .count()
        .max(1)
}

/// Returns which of `count` equal steps lie within one of [`PATCHES`], each with
/// its share of that one.
fn overlaps(step: usize, count: usize) -> Vec<(usize, f64)> {
    // A few steps: far below the limit of exact doubles.
    #[allow(clippy::cast_precision_loss)]
    let ends = |at: usize, of: usize| (at as f64 / of as f64, (at + 1) as f64 / of as f64);
    let (low, high) = ends(step, PATCHES);
    (0..count)
        .filter_map(|at| {
            let (from, to) = ends(at, count);
            let shared = to.min(high) - from.max(low);
            (shared > 1e-12).then(|| (at, shared / (high - low)))
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn steps_are_shared_out_whole() {
        for count in [1, 3, 5, 7] {
            let mut given = vec![0.0; count];
            for step in 0..PATCHES {
                let shares = overlaps(step, count);
                let sum: f64 = shares.iter().map(|(_, share)| share).sum();
                assert!((sum - 1.0).abs() < 1e-12, "{count}: {sum}");
                for (at, share) in shares {
                    given[at] += share;
                }
            }
            for share in given {
                let expected = PATCHES as f64 / count as f64;
                assert!((share - expected).abs() < 1e-12, "{share} {expected}");
            }
        }
    }
}
