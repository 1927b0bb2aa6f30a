//! Bands of Planck's law against independent quadrature.

use farglow::physics::constant::SECOND_RADIATION;
use farglow::physics::surface::Emission;
use farglow::physics::{constant, planck};

use crate::rows::{self, Row};

pub fn band(row: &Row) -> Option<f64> {
    let temperature = row.number("T_K");
    let band = row.inputs["band"].as_str().expect("a band");
    let (from, to) = match band.strip_prefix('>') {
        Some(_) => (3000e-9, f64::INFINITY),
        None => {
            let (from, to) = band
                .strip_suffix(" nm")
                .expect("in nanometres")
                .split_once('-')
                .expect("two ends");
            let metres = |text: &str| text.parse::<f64>().expect("a number") * 1e-9;
            (metres(from), metres(to))
        }
    };
    Some(planck::band_fraction(from, to, temperature))
}

/// Source: mpmath, 30-digit quadrature of Planck's law, computed; family `bb_band`, tolerance 1e-10 relative.
#[test]
fn band_fractions_are_those_of_a_thirty_digit_quadrature() {
    assert_eq!(rows::check("bb_band", band), 75);
}

/// Source: own quadrature here, x³/(eˣ − 1) by Simpson's rule, to 1e-12 relative on both sides of the meeting of the series.
#[test]
fn fractions_agree_with_simpson_where_the_series_meet() {
    let norm = 15.0 / std::f64::consts::PI.powi(4);
    for x in [
        0.3, 1.0, 1.9, 1.999_999, 2.0, 2.000_001, 2.1, 3.0, 6.0, 12.0,
    ] {
        // From x to x + 60 in 60,000 steps; what lies beyond is below e⁻⁶⁰.
        let steps = 60_000_u32;
        let step = 60.0 / f64::from(steps);
        let value = |t: f64| t.powi(3) / t.exp_m1();
        let sum: f64 = (0..=steps)
            .map(|index| {
                let share = if index == 0 || index == steps {
                    1.0
                } else if index % 2 == 1 {
                    4.0
                } else {
                    2.0
                };
                share * value(x + f64::from(index) * step)
            })
            .sum();
        let expected = norm * sum * step / 3.0;
        let found = planck::fraction(SECOND_RADIATION / x);
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "x {x}: {found:e} against {expected:e}"
        );
    }
}

fn weighted(table: &str, temperature: f64) -> f64 {
    let rows: Vec<(f64, f64)> = table
        .lines()
        .filter_map(|line| line.split_once(','))
        .filter_map(|(wavelength, weight)| Some((wavelength.parse().ok()?, weight.parse().ok()?)))
        .collect();
    let mut sum = 0.0;
    for pair in rows.windows(2) {
        let ((from, first), (to, second)) = (pair[0], pair[1]);
        let steps = 200_u32;
        for step in 0..steps {
            let place = (f64::from(step) + 0.5) / f64::from(steps);
            let wavelength = (from + (to - from) * place) * 1e-9;
            let planck = constant::FIRST_RADIATION
                / wavelength.powi(5)
                / (SECOND_RADIATION / (wavelength * temperature)).exp_m1();
            sum +=
                planck * (first + (second - first) * place) * (to - from) * 1e-9 / f64::from(steps);
        }
    }
    sum
}

/// Source: own quadrature here of the same integrand (weight linear between the rows of `resources/spectra`), midpoint rule with 200 steps a row.
#[test]
fn weighted_exitances_agree_with_a_fine_quadrature() {
    for temperature in [800.0, 1000.0, 1273.15, 1753.15, 2300.0, 6000.0] {
        let found = Emission::grey(temperature, 1.0, 1.0).expect("a possible surface");
        for (name, found, table) in [
            (
                "blue light",
                found.blue_light,
                include_str!("../../resources/spectra/spectra_B_directive.csv"),
            ),
            (
                "retinal 2006",
                found.retinal_2006,
                include_str!("../../resources/spectra/spectra_R_directive.csv"),
            ),
            (
                "retinal 2013",
                found.retinal_2013,
                include_str!("../../resources/spectra/spectra_R_icnirp2013.csv"),
            ),
        ] {
            let expected = weighted(table, temperature);
            assert!(
                (found / expected - 1.0).abs() < 2e-5,
                "{name} at {temperature} K: {found:e} against {expected:e}"
            );
        }
    }
}
