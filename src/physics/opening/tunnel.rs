//! The balance of a tunnel's walls between a furnace and the shop.
//!
//! The furnace sends one unit in at the inner edge, the shop nothing in at the
//! outer; walls re-radiate all that falls on them, diffusely. Depths are in
//! metres below the outer edge.

use crate::numeric::gauss::Rule;
use crate::numeric::legendre::Legendre;
use crate::numeric::linear;
use crate::physics::Error;
use crate::physics::error::length;

use super::section::Section;

/// How many openings deep a wall may be: the least width counts.
pub const DEEPEST: f64 = 20.0;

/// A tunnel whose walls re-radiate, in balance.
#[derive(Clone, Debug, PartialEq)]
pub struct Tunnel {
    section: Section,
    depth: f64,
    /// Of the odd Legendre polynomials from the first on, in z from −1 at the
    /// outer edge to 1 at the inner one; what they add to one half.
    terms: Vec<f64>,
    transmitted: f64,
}

impl Tunnel {
    /// Returns the tunnel of a section and a depth, with its walls in balance.
    ///
    /// Walls of one depth count together: exact for a round section and a slot,
    /// where no wall at one depth differs from another.
    ///
    /// # Accuracy
    ///
    /// Exitance and transmission of round sections and slots to `1e-9`. For
    /// other sections the transmission is that of walls that share their heat
    /// all round, which is high by at most `2e-4` for rectangles.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the depth is not from 10⁻⁹ m to 10⁹ m, or above
    /// [`DEEPEST`] times the section's least width.
    ///
    /// # Source
    ///
    /// Derived here. A wall in balance sends what it gets. Seen as edges, one
    /// within the other, through which the exitance J rises from the outer
    /// (J = 0 before it) to the inner (J = 1 behind it), what a wall gets at
    /// depth x less what it sends is ∫ ± f(|t − x|) dJ(t) = 0, where f is the
    /// factor from a wall to a plane across the tunnel, positive for edges
    /// deeper than x. J − ½ is odd about the middle; its odd Legendre terms
    /// follow from the balance at as many points of Gauss's rule. The same
    /// equation holds for the flow of a rarefied gas through a tube (P. Clausing,
    /// *Annalen der Physik* 404, 961, 1932). Checked in
    /// `tests/published/thick_openings.rs`.
    pub fn new(section: Section, depth: f64) -> Result<Self, Error> {
        let depth = length("wall thickness", depth)?;
        let ratio = depth / section.least_width();
        if ratio > DEEPEST {
            return Err(Error::OutOfRange {
                parameter: "wall thickness over the least width of the opening",
                range: "at most 20",
                value: ratio,
            });
        }
        // One term resolves about a width near the ends of a deep tunnel.
        let count = 10 + (0.8 * ratio).ceil() as u16;
        Self::with_terms(section, depth, count)
    }

    /// As [`Tunnel::new`] with a number of terms.
    fn with_terms(section: Section, depth: f64, count: u16) -> Result<Self, Error> {
        let (outer, inner) = (Rule::new(2 * count + 1), Rule::new(2 * count + 8));
        let mut rows = Vec::with_capacity(usize::from(count));
        // Half of the points: the balance is the same on the other side.
        for (z, _) in outer.on(-1.0, 1.0).skip(usize::from(count) + 1) {
            let x = 0.5 * depth * (1.0 + z);
            let difference = section.from_wall(depth - x) - section.from_wall(x);
            let mut row = vec![difference; usize::from(count) + 1];
            for (from, to, sign) in [(0.0, x, 1.0), (x, depth, -1.0)] {
                for (t, weight) in inner.on(from, to) {
                    let factor = sign * weight * section.from_wall((t - x).abs());
                    let z = 2.0 * t / depth - 1.0;
                    for (entry, (_, slope)) in row.iter_mut().zip(odd(z)).take(count.into()) {
                        *entry += factor * slope * 2.0 / depth;
                    }
                }
            }
            row[usize::from(count)] = 0.5 * difference;
            rows.push(row);
        }
        let unsolved = Error::OutOfRange {
            parameter: "wall thickness",
            range: "one for which the walls' balance can be solved",
            value: depth,
        };
        let mut tunnel = Self {
            terms: linear::solve(rows).ok_or(unsolved)?,
            transmitted: section.through(depth),
            section,
            depth,
        };
        let walls: f64 = inner
            .on(0.0, depth)
            .map(|(x, weight)| weight * tunnel.section.from_wall(x) * tunnel.exitance(x))
            .sum();
        tunnel.transmitted += tunnel.section.outline_over_area() * walls;
        if !(0.0..=1.0 + 1e-6).contains(&tunnel.transmitted) {
            return Err(unsolved);
        }
        tunnel.transmitted = tunnel.transmitted.min(1.0);
        Ok(tunnel)
    }

    /// Returns the section.
    #[must_use]
    pub fn section(&self) -> &Section {
        &self.section
    }

    /// Returns the depth from the outer to the inner edge, in metres.
    #[must_use]
    pub fn depth(&self) -> f64 {
        self.depth
    }

    /// Returns what leaves the outer edge of what enters at the inner one, in
    /// `0..=1`.
    ///
    /// What enters and does not leave goes back into the furnace.
    #[must_use]
    pub fn transmitted(&self) -> f64 {
        self.transmitted
    }

    /// Returns the exitance of the walls at a depth, of the furnace's, in
    /// `0..=1`.
    ///
    /// `depth` in metres below the outer edge; places outside the tunnel count
    /// as its nearest edge.
    #[must_use]
    pub fn exitance(&self, depth: f64) -> f64 {
        let z = (2.0 * depth / self.depth - 1.0).clamp(-1.0, 1.0);
        let above: f64 = odd(z)
            .zip(&self.terms)
            .map(|((value, _), term)| value * term)
            .sum();
        (0.5 + above).clamp(0.0, 1.0)
    }

    /// Returns how fast the exitance rises with depth, 1/m.
    #[must_use]
    pub fn slope(&self, depth: f64) -> f64 {
        let z = (2.0 * depth / self.depth - 1.0).clamp(-1.0, 1.0);
        let sum: f64 = odd(z)
            .zip(&self.terms)
            .map(|((_, slope), term)| slope * term)
            .sum();
        sum * 2.0 / self.depth
    }
}

/// The Legendre polynomials of odd order, with their slopes.
fn odd(z: f64) -> impl Iterator<Item = (f64, f64)> {
    Legendre::at(z).skip(1).step_by(2)
}

#[cfg(test)]
mod tests;
