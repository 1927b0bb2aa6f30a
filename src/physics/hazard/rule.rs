//! Tables of weights as one sum over a black body's spectrum.
//!
//! The tables become weights at fixed wavelengths, and these become weights at
//! even steps of 1/λ, where the exponentials are powers of one: a temperature
//! costs under a microsecond.

use super::Table;
use crate::physics::constant::{FIRST_RADIATION, SECOND_RADIATION};

/// Where the two points of Gauss's rule stand between the ends of a stretch.
pub(super) const PLACES: [f64; 2] = [0.211_324_865_405_187_13, 0.788_675_134_594_812_9];

/// Between the steps of a panel Planck's law is a polynomial of this degree.
const DEGREE: usize = 8;

/// One wavelength of the rule: c₂/λ, and for each weighting c₁ λ⁻⁵ times the
/// weight times the share of the wavelength axis.
#[derive(Clone, Copy)]
struct Node<const N: usize> {
    inverse: f64,
    shares: [f64; N],
}

/// The rule for `N` weightings, at the wavelengths of the tables and at even
/// steps.
pub(super) struct Rule<const N: usize> {
    nodes: Vec<Node<N>>,
    /// For each step of c₂/λ, from `first` on, the share of each weighting.
    steps: Vec<[f64; N]>,
    /// c₂/λ at the longest wavelength of the tables, m·K.
    first: f64,
    /// One step of c₂/λ, m·K.
    step: f64,
}

impl<const N: usize> Rule<N> {
    /// Returns the rule of these tables over so many panels.
    pub(super) fn new(tables: [&Table; N], panels: usize) -> Self {
        let mut marks: Vec<u32> = tables
            .iter()
            .flat_map(|table| table.iter().map(|row| row.0))
            .collect();
        marks.sort_unstable();
        marks.dedup();
        let at = |mark: Option<&u32>| {
            let mark = mark.expect("the tables are part of the program and have rows");
            SECOND_RADIATION / (f64::from(*mark) * 1e-9)
        };
        let (first, last) = (at(marks.last()), at(marks.first()));
        // A small whole number.
        #[allow(clippy::cast_precision_loss)]
        let step = (last - first) / (DEGREE * panels) as f64;
        let nodes = nodes(tables, &marks);
        let steps = steps(&nodes, panels, first, step);
        Self {
            nodes,
            steps,
            first,
            step,
        }
    }

    /// Returns the weighted exitances of a black body, W/m², from the even
    /// steps.
    pub(super) fn at_the_steps(&self, temperature: f64) -> [f64; N] {
        let mut sums = [0.0; N];
        let mut power = (-self.first / temperature).exp();
        let ratio = (-self.step / temperature).exp();
        for shares in &self.steps {
            add(&mut sums, power, shares);
            power *= ratio;
        }
        sums
    }

    /// The same with an exponential for every wavelength of the tables.
    pub(super) fn at_the_tables(&self, temperature: f64) -> [f64; N] {
        let mut sums = [0.0; N];
        for node in &self.nodes {
            add(&mut sums, (-node.inverse / temperature).exp(), &node.shares);
        }
        sums
    }
}

/// Adds Planck's law at one place, from e⁻ˣ, which is cheaper than eˣ − 1; x
/// never comes near zero here.
fn add<const N: usize>(sums: &mut [f64; N], power: f64, shares: &[f64; N]) {
    let planck = power / (1.0 - power);
    for (sum, share) in sums.iter_mut().zip(shares) {
        *sum += planck * share;
    }
}

/// Hands the shares of every node to the steps of its panel, by the Lagrange
/// polynomials of those steps.
// All numbers are small, and places are above zero.
#[allow(
    clippy::cast_precision_loss,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss
)]
fn steps<const N: usize>(nodes: &[Node<N>], panels: usize, first: f64, step: f64) -> Vec<[f64; N]> {
    let mut steps = vec![[0.0; N]; DEGREE * panels + 1];
    for node in nodes {
        let place = (node.inverse - first) / step;
        let from = (place as usize / DEGREE).min(panels - 1) * DEGREE;
        for own in 0..=DEGREE {
            let polynomial: f64 = (0..=DEGREE)
                .filter(|other| *other != own)
                .map(|other| (place - (from + other) as f64) / (own as f64 - other as f64))
                .product();
            for (sum, share) in steps[from + own].iter_mut().zip(node.shares) {
                *sum += polynomial * share;
            }
        }
    }
    steps
}

/// Two Gauss points between any two rows of the tables taken together; all
/// tables of one rule share the same grid.
fn nodes<const N: usize>(tables: [&Table; N], marks: &[u32]) -> Vec<Node<N>> {
    let mut nodes = Vec::with_capacity(2 * marks.len());
    for pair in marks.windows(2) {
        let (from, to) = (f64::from(pair[0]), f64::from(pair[1]));
        for place in PLACES {
            let wavelength = (from + (to - from) * place) * 1e-9;
            let share = 0.5 * (to - from) * 1e-9 * FIRST_RADIATION / wavelength.powi(5);
            nodes.push(Node {
                inverse: SECOND_RADIATION / wavelength,
                shares: tables.map(|table| share * between(table, pair[0], pair[1], place)),
            });
        }
    }
    nodes
}

/// The weight at `place` (0 to 1) between two rows; zero outside the table.
fn between(rows: &Table, from: u32, to: u32, place: f64) -> f64 {
    let at = |mark| {
        rows.binary_search_by_key(&mark, |row| row.0)
            .map(|index| rows[index].1)
    };
    match (at(from), at(to)) {
        (Ok(first), Ok(second)) => first + (second - first) * place,
        _ => 0.0,
    }
}
