//! Hazard weightings of the black body: Planck's law times a table.
//!
//! The tables of `resources/spectra` are read once and turned into weights at
//! fixed wavelengths, so that one temperature costs a few microseconds.

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

static NODES: LazyLock<Vec<Node>> =
    LazyLock::new(|| nodes(&[BLUE_LIGHT, RETINAL_2006, RETINAL_2013].map(rows)));

/// Returns the weighted exitances of a black body at `temperature`, in kelvin
/// and above zero.
pub(super) fn exitances(temperature: f64) -> Weighted {
    let mut sums = [0.0; 3];
    for node in NODES.iter() {
        // In e⁻ˣ, which is cheaper than eˣ − 1; x never comes near zero here.
        let step = (-node.inverse / temperature).exp();
        let planck = step / (1.0 - step);
        for (sum, share) in sums.iter_mut().zip(node.shares) {
            *sum += planck * share;
        }
    }
    let [blue_light, retinal_2006, retinal_2013] = sums;
    Weighted {
        blue_light,
        retinal_2006,
        retinal_2013,
    }
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
