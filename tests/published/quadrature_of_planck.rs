//! Bands of Planck's law against independent quadrature.

use farglow::physics::constant::SECOND_RADIATION;
use farglow::physics::spectrum::Spectrum;
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

/// The integral of x³/(eˣ − 1) over 15/π⁴ from `x` to `x + width`, by Simpson's rule.
fn simpson(x: f64, width: f64, weight: &dyn Fn(f64) -> f64) -> f64 {
    let steps = 40_000_u32;
    let step = width / f64::from(steps);
    let value = |t: f64| {
        if t > 0.0 {
            t * t * t * (-t).exp() / -(-t).exp_m1() * weight(t)
        } else {
            0.0
        }
    };
    let sum: f64 = (0..=steps)
        .map(|index| {
            let share = match index {
                0 => 1.0,
                _ if index == steps => 1.0,
                _ if index % 2 == 1 => 4.0,
                _ => 2.0,
            };
            share * value(x + f64::from(index) * step)
        })
        .sum();
    15.0 / std::f64::consts::PI.powi(4) * sum * step / 3.0
}

/// Source: own quadrature here by Simpson's rule in x = c₂/(λT), below and above, at 97 places from λT = 21 µm·K to 14 m·K, to 1e-12 relative.
#[test]
fn fractions_keep_twelve_digits_over_the_whole_range() {
    let one = |_: f64| 1.0;
    let mut worst = 0.0_f64;
    for index in 0..=96_u8 {
        // From 680 down to 0.001, evenly in the logarithm.
        let x = 680.0 * (1e-3_f64 / 680.0).powf(f64::from(index) / 96.0);
        let product = SECOND_RADIATION / x;
        let below = simpson(x, 60.0, &one);
        let above = simpson(0.0, x.min(60.0), &one);
        let found = [
            planck::fraction(product),
            planck::band_fraction(0.0, product, 1.0),
            planck::band_fraction(product, f64::INFINITY, 1.0),
        ];
        for (found, expected) in found.into_iter().zip([below, below, above]) {
            let error = (found / expected - 1.0).abs();
            worst = worst.max(error);
            assert!(
                error < 1e-12,
                "x {x}: {found:e} against {expected:e}, {error:e}"
            );
        }
    }
    println!("worst of all: {worst:e}");
    assert!(worst > 0.0, "nothing was compared");
}

/// Source: own quadrature here by Simpson's rule in x, bands from one part in a million wide to a whole octave, to 1e-12 relative.
#[test]
fn bands_of_any_width_keep_twelve_digits() {
    for x in [0.01, 0.3, 1.0, 1.999, 3.0, 10.0, 40.0, 200.0, 650.0] {
        for width in [1e-6, 1e-4, 0.03, 0.5] {
            let (from, to) = (SECOND_RADIATION / x, SECOND_RADIATION / x * (1.0 + width));
            // The width in x from the band's own ends, without their difference in x.
            let wide = x * ((to - from) / to);
            // What lies more than 60 beyond its far end is below e⁻⁶⁰ of it.
            let expected = simpson(SECOND_RADIATION / to, wide.min(60.0), &|_| 1.0);
            let found = planck::band_fraction(from, to, 1.0);
            let error = (found / expected - 1.0).abs();
            assert!(
                error < 1e-12,
                "x {x}, width {width}: {found:e} against {expected:e}, {error:e}"
            );
        }
    }
}

/// The first moment of Planck's law below x, ∫ t²/(eᵗ − 1) dt from x on: Σ e^(−nx) (x²/n + 2x/n² + 2/n³).
fn moment(x: f64) -> f64 {
    (1..400_u16)
        .map(|n| {
            let n = f64::from(n);
            (-n * x).exp() * (x * x / n + 2.0 * x / (n * n) + 2.0 / (n * n * n))
        })
        .sum()
}

/// Source: the closed form of ∫ λ M_λ dλ, integrated term by term here, and Simpson's rule for a table of four rows; 1e-12 relative.
#[test]
fn bands_of_a_spectral_table_agree_with_a_closed_form_and_with_simpson() {
    let norm = 15.0 / std::f64::consts::PI.powi(4);
    let rows = [
        [0.6e-6, 0.42],
        [1.1e-6, 0.36],
        [2.6e-6, 0.27],
        [9.0e-6, 0.09],
    ];
    let table = Spectrum::new(&rows).expect("a table");
    for temperature in [400.0, 900.0, 1273.15, 1673.15, 3000.0] {
        let whole = SECOND_RADIATION / temperature;
        // One stretch of the table at a time, in closed form: a + b λ.
        let mut sum = 0.42 * planck::fraction(0.6e-6 * temperature)
            + 0.09 * planck::band_fraction(9e-6, f64::INFINITY, temperature);
        for pair in rows.windows(2) {
            let ([from, first], [to, last]) = (pair[0], pair[1]);
            let slope = (last - first) / (to - from);
            let moments = moment(whole / to) - moment(whole / from);
            sum += (first - slope * from) * planck::band_fraction(from, to, temperature)
                + slope * whole * norm * moments;
        }
        let total = table.total(temperature);
        assert!(
            (total / sum - 1.0).abs() < 1e-12,
            "total at {temperature} K: {total} against {sum}"
        );
        let found = Emission::spectral(temperature, &table).expect("a possible surface");
        let black = planck::exitance(temperature);
        for (name, found, from, to) in [
            ("near infrared", found.near_infrared, 780e-9, 3000e-9),
            ("skin", found.skin, 380e-9, 3000e-9),
            ("IR-A", found.infrared_a, 780e-9, 1400e-9),
            ("UV-A", found.ultraviolet_a, 315e-9, 400e-9),
        ] {
            // Cut at the rows, since Simpson's rule does not like kinks.
            let mut ends = vec![from, to];
            ends.extend(
                rows.iter()
                    .map(|row| row[0])
                    .filter(|at| from < *at && *at < to),
            );
            ends.sort_by(f64::total_cmp);
            let expected: f64 = ends
                .windows(2)
                .map(|pair| {
                    let (far, near) = (whole / pair[1], whole / pair[0]);
                    simpson(far, near - far, &|x| table.at(whole / x))
                })
                .sum();
            let error = (found / (black * expected) - 1.0).abs();
            assert!(
                error < 1e-12,
                "{name} at {temperature} K: {found} against {}, {error:e}",
                black * expected
            );
        }
    }
}

fn weighted(table: &str, temperature: f64, emissivity: &dyn Fn(f64) -> f64) -> f64 {
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
            sum += planck
                * (first + (second - first) * place)
                * emissivity(wavelength)
                * (to - from)
                * 1e-9
                / f64::from(steps);
        }
    }
    sum
}

fn agree_with_a_fine_quadrature(
    found: &Emission,
    temperature: f64,
    emissivity: &dyn Fn(f64) -> f64,
) {
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
        (
            "ultraviolet",
            found.ultraviolet,
            include_str!("../../resources/spectra/spectra_S.csv"),
        ),
    ] {
        let expected = weighted(table, temperature, emissivity);
        assert!(
            (found / expected - 1.0).abs() < 2e-5,
            "{name} at {temperature} K: {found:e} against {expected:e}"
        );
    }
}

/// Source: own quadrature here of the same integrand (weight linear between the rows of `resources/spectra`), midpoint rule with 200 steps a row.
#[test]
fn weighted_exitances_agree_with_a_fine_quadrature() {
    for temperature in [800.0, 1000.0, 1273.15, 1753.15, 2300.0, 6000.0] {
        let found = Emission::grey(temperature, 1.0, 1.0).expect("a possible surface");
        agree_with_a_fine_quadrature(&found, temperature, &|_| 1.0);
    }
}

/// Source: as before, with a table of emissivity whose rows lie on, between and beyond those of the weights, one of them nearly a step.
#[test]
fn weighted_exitances_of_a_spectral_table_agree_with_a_fine_quadrature() {
    let rows = [
        [250e-9, 0.2],
        [390e-9, 0.5],
        [452e-9, 0.9],
        [453e-9, 0.3],
        [1.0e-6, 0.4],
        [2.0e-6, 0.1],
    ];
    let table = Spectrum::new(&rows).expect("a table");
    for temperature in [800.0, 1273.15, 1753.15, 6000.0] {
        let found = Emission::spectral(temperature, &table).expect("a possible surface");
        agree_with_a_fine_quadrature(&found, temperature, &|wavelength| table.at(wavelength));
    }
}
