//! Hazard weightings of what a surface emits: Planck's law times a table.
//!
//! The tables of `resources/spectra` are read once. Of a black body, and so of
//! a grey surface, a [`rule::Rule`] makes them cheap; a spectral emissivity is
//! integrated row by row.

mod rule;

use std::sync::LazyLock;

use super::planck;
use super::spectrum::Spectrum;
use rule::Rule;

/// Weighted exitances, W/m².
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Weighted {
    pub(super) blue_light: f64,
    pub(super) retinal_2006: f64,
    pub(super) retinal_2013: f64,
    pub(super) ultraviolet: f64,
}

/// B(λ) of directive 2006/25/EC, annex I table 1.3.
const BLUE_LIGHT: &str = include_str!("../../resources/spectra/spectra_B_directive.csv");
/// R(λ) of directive 2006/25/EC, annex I table 1.3, peak 10.
const RETINAL_2006: &str = include_str!("../../resources/spectra/spectra_R_directive.csv");
/// R(λ) of ICNIRP 2013, table 2, peak 1.
const RETINAL_2013: &str = include_str!("../../resources/spectra/spectra_R_icnirp2013.csv");
/// S(λ) of directive 2006/25/EC, annex I table 1.2.
const ULTRAVIOLET: &str = include_str!("../../resources/spectra/spectra_S.csv");

/// One table: wavelength in whole nanometres, weight.
type Table = Vec<(u32, f64)>;

static TABLES: LazyLock<[Table; 4]> =
    LazyLock::new(|| [BLUE_LIGHT, RETINAL_2006, RETINAL_2013, ULTRAVIOLET].map(rows));

/// The three for the retina, 300–1400 nm.
static EYE: LazyLock<Rule<3>> = LazyLock::new(|| {
    let [blue_light, retinal_2006, retinal_2013, _] = &*TABLES;
    Rule::new([blue_light, retinal_2006, retinal_2013], 24)
});

/// The ultraviolet one, 180–400 nm.
static SHORT: LazyLock<Rule<1>> = LazyLock::new(|| Rule::new([&TABLES[3]], 28));

/// Below this temperature, K, Planck's law is too steep for the panels.
const STEEP: f64 = 600.0;

/// Returns the weighted exitances of a black body at `temperature`, in kelvin
/// and above zero.
///
/// From 600 K up the polynomials stand for Planck's law to a relative error of
/// `2e-6` at 600 K and `1e-7` from 800 K up, which the test below holds.
pub(super) fn exitances(temperature: f64) -> Weighted {
    let (eye, short) = if temperature < STEEP {
        (
            EYE.at_the_tables(temperature),
            SHORT.at_the_tables(temperature),
        )
    } else {
        (
            EYE.at_the_steps(temperature),
            SHORT.at_the_steps(temperature),
        )
    };
    Weighted {
        blue_light: eye[0],
        retinal_2006: eye[1],
        retinal_2013: eye[2],
        ultraviolet: short[0],
    }
}

/// Returns the weighted exitances of a surface with a spectral emissivity.
///
/// `temperature` in kelvin, above zero. Two Gauss points between any two
/// wavelengths of the weight's table and of the emissivity's taken together:
/// the weight and the emissivity have no kink between those.
pub(super) fn spectral(temperature: f64, emissivity: &Spectrum) -> Weighted {
    let kinks: Vec<f64> = emissivity.wavelengths().collect();
    let [blue_light, retinal_2006, retinal_2013, ultraviolet] = [0, 1, 2, 3].map(|table: usize| {
        TABLES[table]
            .windows(2)
            .map(|pair| stretch(temperature, emissivity, &kinks, [pair[0], pair[1]]))
            .sum()
    });
    Weighted {
        blue_light,
        retinal_2006,
        retinal_2013,
        ultraviolet,
    }
}

/// The weighted exitance between two rows of a weight's table.
fn stretch(
    temperature: f64,
    emissivity: &Spectrum,
    kinks: &[f64],
    [(from, first), (to, last)]: [(u32, f64); 2],
) -> f64 {
    let (from, to) = (f64::from(from) * 1e-9, f64::from(to) * 1e-9);
    let inside =
        kinks.partition_point(|kink| *kink <= from)..kinks.partition_point(|kink| *kink < to);
    let ends = kinks
        .get(inside)
        .unwrap_or_default()
        .iter()
        .copied()
        .chain([to]);
    let (mut sum, mut start) = (0.0, from);
    for end in ends {
        for place in rule::PLACES {
            let wavelength = start + (end - start) * place;
            let weight = first + (last - first) * ((wavelength - from) / (to - from));
            sum += 0.5
                * (end - start)
                * weight
                * emissivity.at(wavelength)
                * planck::spectral_exitance(wavelength, temperature);
        }
        start = end;
    }
    sum
}

/// The rows of a table: wavelength in whole nanometres, weight.
fn rows(table: &str) -> Table {
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

#[cfg(test)]
mod tests {
    use super::*;

    /// The even steps give what the tables' own wavelengths give.
    #[test]
    fn even_steps_agree_with_the_wavelengths_of_the_tables() {
        for (temperature, tolerance) in [
            (600.0, 2e-6),
            (700.0, 3e-7),
            (800.0, 1e-7),
            (1523.15, 1e-8),
            (3000.0, 1e-9),
            (5500.0, 1e-9),
            (1e5, 1e-9),
        ] {
            let eye = (
                EYE.at_the_steps(temperature),
                EYE.at_the_tables(temperature),
            );
            let short = (
                SHORT.at_the_steps(temperature),
                SHORT.at_the_tables(temperature),
            );
            for (found, expected) in [
                (eye.0[0], eye.1[0]),
                (eye.0[1], eye.1[1]),
                (eye.0[2], eye.1[2]),
                (short.0[0], short.1[0]),
            ] {
                let error = (found / expected - 1.0).abs();
                assert!(
                    error < tolerance,
                    "{temperature} K: {found:e} against {expected:e}, {error:e}"
                );
            }
        }
    }

    /// A flat table goes another way than the rule for grey surfaces.
    #[test]
    fn a_flat_table_gives_what_a_grey_surface_gives() {
        let flat = Spectrum::new(&[[400e-9, 1.0], [403.3e-9, 1.0], [2e-6, 1.0]]).expect("a table");
        for temperature in [77.0, 300.0, 1523.15, 6000.0] {
            let (found, expected) = (spectral(temperature, &flat), exitances(temperature));
            for (found, expected) in [
                (found.blue_light, expected.blue_light),
                (found.retinal_2006, expected.retinal_2006),
                (found.retinal_2013, expected.retinal_2013),
                (found.ultraviolet, expected.ultraviolet),
            ] {
                // At 77 K the law is so steep that one more kink tells.
                let tolerance = if temperature < 100.0 { 1e-2 } else { 1e-6 };
                assert!(
                    (found - expected).abs() <= tolerance * expected,
                    "{temperature} K: {found:e} against {expected:e}"
                );
            }
        }
    }
}
