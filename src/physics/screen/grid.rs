//! A screen in pieces small enough to be of one temperature each.

use glam::DVec3;

use super::Screen;
use super::outlook::{Outlook, Surroundings};
use crate::physics::Error;

/// One piece of a screen.
#[derive(Clone, Debug)]
pub(super) struct Piece {
    pub centre: DVec3,
    /// What front and back see from the centre.
    pub outlook: [Outlook; 2],
}

/// A screen in equal pieces, row by row from the lower left as seen from in
/// front.
#[derive(Clone, Debug)]
pub(super) struct Grid {
    pub columns: u32,
    pub rows: u32,
    pub pieces: Vec<Piece>,
}

/// What a screen of unknown temperature may send for each unit of factor, W/m²:
/// only weighs how finely a screen is cut.
const NOMINAL: f64 = 2000.0;

/// Differences below this, W/m², do not matter.
const LITTLE: f64 = 200.0;

impl Grid {
    /// Cuts a screen as finely as what it sees asks for.
    ///
    /// From nine places it is found how much what is absorbed differs along each
    /// side: by less than 1 % there is one piece along it, less than 10 % three,
    /// less than 50 % five, else seven.
    pub(super) fn new(
        around: &Surroundings<'_>,
        screens: &[Screen],
        index: usize,
    ) -> Result<Self, Error> {
        let coarse = Self::of(around, screens, index, 3, 3)?;
        let values: Vec<f64> = coarse
            .pieces
            .iter()
            .map(|piece| {
                piece.outlook.iter().fold(0.0, |sum, outlook| {
                    sum + outlook.absorbed + NOMINAL * outlook.long.iter().sum::<f64>()
                })
            })
            .collect();
        let scale = (values.iter().sum::<f64>() / 9.0).max(LITTLE);
        let spread = |places: [usize; 3]| {
            let of = places.map(|place| values[place]);
            let most = of
                .iter()
                .fold(f64::NEG_INFINITY, |most, value| most.max(*value));
            let least = of
                .iter()
                .fold(f64::INFINITY, |least, value| least.min(*value));
            (most - least) / scale
        };
        let needed = |lines: [[usize; 3]; 3]| {
            let most = lines.into_iter().map(spread).fold(0.0, f64::max);
            match most {
                _ if most < 0.01 => 1,
                _ if most < 0.10 => 3,
                _ if most < 0.50 => 5,
                _ => 7,
            }
        };
        let columns = needed([[0, 1, 2], [3, 4, 5], [6, 7, 8]]);
        let rows = needed([[0, 3, 6], [1, 4, 7], [2, 5, 8]]);
        if columns == 3 && rows == 3 {
            return Ok(coarse);
        }
        Self::of(around, screens, index, columns, rows)
    }

    pub(super) fn of(
        around: &Surroundings<'_>,
        screens: &[Screen],
        index: usize,
        columns: u32,
        rows: u32,
    ) -> Result<Self, Error> {
        let screen = &screens[index];
        let mut pieces = Vec::with_capacity((columns * rows) as usize);
        for row in 0..rows {
            for column in 0..columns {
                let centre = screen.centre
                    + screen.side * middle(column, columns)
                    + screen.up * middle(row, rows);
                pieces.push(Piece {
                    centre,
                    outlook: around.outlook(index, centre)?,
                });
            }
        }
        Ok(Self {
            columns,
            rows,
            pieces,
        })
    }

    /// The share of the screen that one piece is.
    pub(super) fn share(&self) -> f64 {
        1.0 / f64::from(self.columns * self.rows)
    }

    /// The corners of a piece, from −1 to 1 along both sides of the screen.
    pub(super) fn corners(&self, piece: usize) -> [[f64; 2]; 2] {
        // At most 49 pieces.
        let piece = u32::try_from(piece).unwrap_or(u32::MAX);
        let (row, column) = (piece / self.columns, piece % self.columns);
        let ends = |index: u32, count: u32| {
            let at = |index: u32| 2.0 * f64::from(index) / f64::from(count) - 1.0;
            [at(index), at(index + 1)]
        };
        let ([left, right], [low, high]) = (ends(column, self.columns), ends(row, self.rows));
        [[left, low], [right, high]]
    }
}

/// The middle of one of equal steps from −1 to 1.
fn middle(index: u32, count: u32) -> f64 {
    (2.0 * f64::from(index) + 1.0) / f64::from(count) - 1.0
}
