//! Hazard weightings of the black body: Planck's law times a table.
//!
//! The tables of `resources/spectra` are read once and turned into weights at
//! fixed wavelengths, and these into weights at even steps of 1/λ, where the
//! exponentials are powers of one: a temperature costs under a microsecond.

use std::sync::LazyLock;

use super::constant::{FIRST_RADIATION, SECOND_RADIATION};

/// Weighted exitances of a black body, W/m².
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Weighted {
    pub(super) blue_light: f64,
    pub(super) retinal_2006: f64,
    pub(super) retinal_2013: f64,
}

/// B(λ) of directive 2006/25/EC, annex I table 1.3.
const BLUE_LIGHT: &str = include_str!("../../resources/spectra/spectra_B_directive.csv");
/// R(λ) of directive 2006/25/EC, annex I table 1.3, peak 10.
const RETINAL_2006: &str = include_str!("../../resources/spectra/spectra_R_directive.csv");
/// R(λ) of ICNIRP 2013, table 2, peak 1.
const RETINAL_2013: &str = include_str!("../../resources/spectra/spectra_R_icnirp2013.csv");

/// One wavelength of the rule: c₂/λ, and for each weighting c₁ λ⁻⁵ times the
/// weight times the share of the wavelength axis.
#[derive(Clone, Copy, Default)]
struct Node {
    inverse: f64,
    shares: [f64; 3],
}

/// The rule, at the wavelengths of the tables and at even steps.
struct Rule {
    nodes: Vec<Node>,
    /// For each step of c₂/λ, from [`FIRST`] on, the share of each weighting.
    steps: Vec<[f64; 3]>,
}

static RULE: LazyLock<Rule> = LazyLock::new(|| {
    let nodes = nodes(&[BLUE_LIGHT, RETINAL_2006, RETINAL_2013].map(rows));
    let steps = steps(&nodes);
    Rule { nodes, steps }
});

/// c₂/λ at the longest and the shortest wavelength of the tables, m·K.
const FIRST: f64 = SECOND_RADIATION / 1400e-9;
const LAST: f64 = SECOND_RADIATION / 300e-9;

/// Between the steps of a panel Planck's law is a polynomial of this degree.
const DEGREE: usize = 8;
/// So many panels there are.
const PANELS: usize = 24;
/// One step of c₂/λ, m·K.
// A small whole number.
#[allow(clippy::cast_precision_loss)]
const STEP: f64 = (LAST - FIRST) / (DEGREE * PANELS) as f64;

/// Below this temperature, K, Planck's law is too steep for the panels.
const STEEP: f64 = 600.0;

/// Returns the weighted exitances of a black body at `temperature`, in kelvin
/// and above zero.
///
/// From 600 K up the polynomials stand for Planck's law to a relative error of
/// `1e-6` at 600 K and `1e-7` from 800 K up, which the test below holds.
pub(super) fn exitances(temperature: f64) -> Weighted {
    if temperature < STEEP {
        return at_the_tables(temperature);
    }
    let mut sums = [0.0; 3];
    let mut power = (-FIRST / temperature).exp();
    let ratio = (-STEP / temperature).exp();
    for shares in &RULE.steps {
        add(&mut sums, power, shares);
        power *= ratio;
    }
    Weighted::from(sums)
}

/// The same with an exponential for every wavelength of the tables.
fn at_the_tables(temperature: f64) -> Weighted {
    let mut sums = [0.0; 3];
    for node in &RULE.nodes {
        let power = (-node.inverse / temperature).exp();
        add(&mut sums, power, &node.shares);
    }
    Weighted::from(sums)
}

/// Adds Planck's law at one place, from e⁻ˣ, which is cheaper than eˣ − 1; x
/// never comes near zero here.
fn add(sums: &mut [f64; 3], power: f64, shares: &[f64; 3]) {
    let planck = power / (1.0 - power);
    for (sum, share) in sums.iter_mut().zip(shares) {
        *sum += planck * share;
    }
}

impl From<[f64; 3]> for Weighted {
    fn from([blue_light, retinal_2006, retinal_2013]: [f64; 3]) -> Self {
        Weighted {
            blue_light,
            retinal_2006,
            retinal_2013,
        }
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
fn steps(nodes: &[Node]) -> Vec<[f64; 3]> {
    let mut steps = vec![[0.0; 3]; DEGREE * PANELS + 1];
    for node in nodes {
        let place = (node.inverse - FIRST) / STEP;
        let from = (place as usize / DEGREE).min(PANELS - 1) * DEGREE;
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

/// The rows of a table: wavelength in whole nanometres, weight.
fn rows(table: &str) -> Vec<(u32, f64)> {
    table
        .lines()
        .filter(|line| line.starts_with(|sign: char| sign.is_ascii_digit()))
        .map(|line| {
            let (wavelength, weight) = line
                .split_once(',')
                .expect("the tables are part of the program: two columns");
            (
                wavelength
                    .parse()
                    .expect("the tables are part of the program: whole nanometres"),
                weight
                    .parse()
                    .expect("the tables are part of the program: plain numbers"),
            )
        })
        .collect()
}

/// Two Gauss points between any two rows of the tables taken together; all
/// tables share the same 5 nm grid.
fn nodes(tables: &[Vec<(u32, f64)>; 3]) -> Vec<Node> {
    let mut marks: Vec<u32> = tables.iter().flatten().map(|row| row.0).collect();
    marks.sort_unstable();
    marks.dedup();
    let mut nodes = Vec::with_capacity(2 * marks.len());
    for pair in marks.windows(2) {
        let (from, to) = (f64::from(pair[0]), f64::from(pair[1]));
        for side in [-1.0, 1.0] {
            let place = 0.5 + side * 0.5 / 3.0_f64.sqrt();
            let wavelength = (from + (to - from) * place) * 1e-9;
            let share = 0.5 * (to - from) * 1e-9 * FIRST_RADIATION / wavelength.powi(5);
            nodes.push(Node {
                inverse: SECOND_RADIATION / wavelength,
                shares: [0, 1, 2]
                    .map(|table: usize| share * between(&tables[table], pair[0], pair[1], place)),
            });
        }
    }
    nodes
}

/// The weight at `place` (0 to 1) between two rows; zero outside the table.
fn between(rows: &[(u32, f64)], from: u32, to: u32, place: f64) -> f64 {
    let at = |mark| {
        rows.binary_search_by_key(&mark, |row| row.0)
            .map(|index| rows[index].1)
    };
    match (at(from), at(to)) {
        (Ok(first), Ok(second)) => first + (second - first) * place,
        _ => 0.0,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The even steps give what the tables' own wavelengths give.
    #[test]
    fn even_steps_agree_with_the_wavelengths_of_the_tables() {
        for (temperature, tolerance) in [
            (600.0, 1e-6),
            (700.0, 3e-7),
            (800.0, 1e-7),
            (1523.15, 1e-8),
            (3000.0, 1e-9),
            (5500.0, 1e-9),
            (1e5, 1e-9),
        ] {
            let (steps, tables) = (exitances(temperature), at_the_tables(temperature));
            for (found, expected) in [
                (steps.blue_light, tables.blue_light),
                (steps.retinal_2006, tables.retinal_2006),
                (steps.retinal_2013, tables.retinal_2013),
            ] {
                let error = (found / expected - 1.0).abs();
                assert!(
                    error < tolerance,
                    "{temperature} K: {found:e} against {expected:e}, {error:e}"
                );
            }
        }
    }
}
