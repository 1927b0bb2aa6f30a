//! The place on a screen that takes up most.

use glam::DVec3;

use super::exchange::Exchange;
use crate::physics::screen::grid::Grid;
use crate::physics::screen::outlook::Surroundings;

/// A place on a screen and what it absorbs there, W/m².
pub(super) struct Place {
    pub place: DVec3,
    pub absorbed: f64,
}

/// How often the search halves its step: a piece of a seventh of the side is
/// searched to a hundredth of the side.
const HALVINGS: u32 = 3;

/// Finds the place that absorbs most, from the piece that does, by steps along
/// both sides of the screen.
pub(super) fn place(
    around: &Surroundings<'_>,
    index: usize,
    grid: &Grid,
    exchange: &Exchange,
) -> Place {
    let screen = around.screen(index);
    let mut best = Place {
        place: screen.centre,
        absorbed: f64::NEG_INFINITY,
    };
    for piece in &grid.pieces {
        let absorbed = exchange.taken(index, &piece.outlook).absorbed();
        if absorbed > best.absorbed {
            best = Place {
                place: piece.centre,
                absorbed,
            };
        }
    }
    let mut steps = [
        screen.side / f64::from(grid.columns),
        screen.up / f64::from(grid.rows),
    ];
    for _ in 0..HALVINGS {
        let mut moved = true;
        let mut moves = 0;
        while moved && moves < 4 {
            moved = false;
            moves += 1;
            for step in [steps[0], -steps[0], steps[1], -steps[1]] {
                let tried = best.place + step;
                if !screen.holds(tried) {
                    continue;
                }
                // A place that lies on something else is no place on the screen.
                let Ok(outlook) = around.outlook(index, tried) else {
                    continue;
                };
                let absorbed = exchange.taken(index, &outlook).absorbed();
                if absorbed > best.absorbed {
                    best = Place {
                        place: tried,
                        absorbed,
                    };
                    moved = true;
                    break;
                }
            }
        }
        steps = steps.map(|step| 0.5 * step);
    }
    best
}
