//! The SI of 2019: defining constants, and what follows from them.

use farglow::physics::constant;

use crate::rows::{self, Row};

pub fn constant(row: &Row) -> Option<f64> {
    Some(match row.id.as_str() {
        "constant-01" => constant::PLANCK,
        "constant-02" => constant::LIGHT,
        "constant-03" => constant::BOLTZMANN,
        "constant-04" => constant::STEFAN_BOLTZMANN,
        "constant-08" => constant::WIEN,
        "constant-09" => constant::WIEN_FREQUENCY,
        _ => return None,
    })
}

/// Source: SI defining constants (exact since 2019), read in scipy.constants (CODATA 2022); family `constant`.
#[test]
fn constants_are_those_of_the_si() {
    assert_eq!(rows::check("constant", constant), 6);
}

/// Source: σ = 2π⁵k⁴/(15h³c²) and c₂ = hc/k, arithmetic on the defining constants.
#[test]
fn derived_constants_follow_from_the_defining_ones() {
    let pi = std::f64::consts::PI;
    let (h, c, k) = (constant::PLANCK, constant::LIGHT, constant::BOLTZMANN);
    let sigma = 2.0 * pi.powi(5) * k.powi(4) / (15.0 * h.powi(3) * c * c);
    let second = h * c / k;
    for (name, found, expected) in [
        ("sigma", constant::STEFAN_BOLTZMANN, sigma),
        ("c2", constant::SECOND_RADIATION, second),
        ("c1", constant::FIRST_RADIATION, 2.0 * pi * h * c * c),
    ] {
        assert!(
            (found / expected - 1.0).abs() < 2e-15,
            "{name}: {found:e} against {expected:e}"
        );
    }
}

/// Source: at the peak x = c₂/(λT) solves x = 5 (1 − e⁻ˣ), at that per frequency x = 3 (1 − e⁻ˣ).
#[test]
fn wien_constants_solve_their_equations() {
    let solve = |order: f64| (0..200).fold(order, |x: f64, _| order * (1.0 - (-x).exp()));
    let wavelength = constant::SECOND_RADIATION / solve(5.0);
    let frequency = solve(3.0) * constant::BOLTZMANN / constant::PLANCK;
    assert!(
        (constant::WIEN / wavelength - 1.0).abs() < 2e-15,
        "{:e} against {wavelength:e}",
        constant::WIEN
    );
    assert!(
        (constant::WIEN_FREQUENCY / frequency - 1.0).abs() < 2e-15,
        "{:e} against {frequency:e}",
        constant::WIEN_FREQUENCY
    );
}
