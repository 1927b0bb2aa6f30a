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

/// Where a screen is looked from to find how finely it must be cut, from −1 to 1
/// along either side.
const PLACES: [f64; 5] = [-0.98, -2.0 / 3.0, 0.0, 2.0 / 3.0, 0.98];

/// Differences below this, W/m², do not matter.
const LITTLE: f64 = 200.0;

impl Grid {
    /// Cuts a screen as finely as what it sees asks for.
    ///
    /// From places in the middle and near every edge it is found how much what is
    /// absorbed differs along each side: by less than 1 % there is one piece
    /// along it, less than 10 % three, less than 50 % five, else seven. A rim or
    /// another screen may leave a strip along an edge alone in the heat, which
    /// places in the middle of pieces would miss.
    pub(super) fn new(
        around: &Surroundings<'_>,
        screens: &[Screen],
        index: usize,
    ) -> Result<Self, Error> {
        let coarse = Self::of(around, screens, index, 3, 3)?;
        let weighed = |outlooks: &[Outlook; 2]| {
            outlooks.iter().fold(0.0, |sum, outlook| {
                sum + outlook.absorbed + NOMINAL * outlook.long.iter().sum::<f64>()
            })
        };
        let screen = &screens[index];
        let mut values = [[f64::NAN; PLACES.len()]; PLACES.len()];
        for (row, up) in values.iter_mut().zip(PLACES) {
            for (value, aside) in row.iter_mut().zip(PLACES) {
                let place = screen.centre + screen.side * aside + screen.up * up;
                // A place on something else is no place on the screen.
                if let Ok(outlooks) = around.outlook(index, place) {
                    *value = weighed(&outlooks);
                }
            }
        }
        let known = values.iter().flatten().filter(|value| value.is_finite());
        let (sum, count) = known.fold((0.0, 0.0), |(sum, count), value| (sum + value, count + 1.0));
        let scale = (sum / f64::max(count, 1.0)).max(LITTLE);
        let spread = |of: [f64; PLACES.len()]| {
            // What is not known is passed over by both.
            let most = of.into_iter().fold(f64::NEG_INFINITY, f64::max);
            let least = of.into_iter().fold(f64::INFINITY, f64::min);
            (most - least) / scale
        };
        let needed = |lines: [[f64; PLACES.len()]; PLACES.len()]| {
            let most = lines.into_iter().map(spread).fold(0.0, f64::max);
            match most {
                _ if most < 0.01 => 1,
                _ if most < 0.10 => 3,
                _ if most < 0.50 => 5,
                _ => 7,
            }
        };
        let turned = std::array::from_fn(|column| std::array::from_fn(|row| values[row][column]));
        let (columns, rows) = (needed(values), needed(turned));
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
