//! Planck's law of the black body: fractions of the total, exitances, peak.
//!
//! Wavelengths in metres, temperatures in kelvin, exitances in W/m² into the
//! hemisphere. Functions of one number check nothing: at or below zero they
//! give zero, and only a NaN gives a NaN.

use super::constant::{
    BOLTZMANN, FIRST_RADIATION, LIGHT, PLANCK, SECOND_RADIATION, STEFAN_BOLTZMANN, WIEN,
};

/// 15/π⁴: one over the integral of x³/(eˣ − 1) from zero to infinity.
const NORM: f64 = 15.0
    / (std::f64::consts::PI * std::f64::consts::PI * std::f64::consts::PI * std::f64::consts::PI);

/// Where the two series meet, in x = c₂/(λT): here both need about 17 terms.
const MEETING: f64 = 2.0;

/// Returns the fraction of a black body's exitance below a wavelength.
///
/// `wavelength_temperature` is the product λT in m·K. The result is
/// dimensionless, in `0..=1`; zero at and below λT = 0.
///
/// # Accuracy
///
/// Relative error below `1e-12` everywhere, down to fractions of `1e-290`:
/// with x = c₂/(λT), the series in e⁻ˣ for x ≥ 2 and the Bernoulli series for
/// its complement below. Both end where a term no longer changes the sum.
///
/// # Source
///
/// Planck's law integrated term by term; checked against mpmath in
/// `tests/published/quadrature_of_planck.rs` and against handbook tables in
/// `tests/published/blackbody_tables.rs`.
///
/// # Examples
///
/// ```
/// let half = farglow::physics::planck::fraction(4107.0e-6);
/// assert!((half - 0.5).abs() < 1e-4);
/// ```
#[must_use]
pub fn fraction(wavelength_temperature: f64) -> f64 {
    if wavelength_temperature <= 0.0 {
        return 0.0;
    }
    let x = SECOND_RADIATION / wavelength_temperature;
    if x >= MEETING {
        below(x)
    } else {
        1.0 - above(x)
    }
}

/// Returns the fraction of a black body's exitance between two wavelengths.
///
/// `from` and `to` in metres, `to` may be infinite; `temperature` in kelvin.
/// The result is dimensionless; zero if the band is empty or turned round.
///
/// # Accuracy
///
/// Relative error below `1e-12` for bands of any width, down to fractions of
/// `1e-290`: a band narrower than one in x = c₂/(λT) by Gauss's rule over x
/// (eight points), a wider one as the difference of two fractions, taken on the
/// side where both are small.
///
/// # Source
///
/// As [`fraction`]; checked in `tests/published/quadrature_of_planck.rs`.
#[must_use]
pub fn band_fraction(from: f64, to: f64, temperature: f64) -> f64 {
    if from.is_nan() || to.is_nan() || temperature.is_nan() {
        return f64::NAN;
    }
    if temperature <= 0.0 || to <= from || to <= 0.0 {
        return 0.0;
    }
    let from = from.max(0.0);
    let (near, far) = (from * temperature, to * temperature);
    let (x_near, x_far) = (SECOND_RADIATION / near, SECOND_RADIATION / far);
    let width = width(from, to, x_near);
    let band = if width < 1.0 {
        panel(x_far, width, |_| 1.0)
    } else if x_near < MEETING {
        above(x_near) - above(x_far)
    } else if x_far < MEETING {
        (1.0 - above(x_far)) - below(x_near)
    } else {
        below(x_far) - below(x_near)
    };
    band.max(0.0)
}

/// Returns the exitance of a black body, σT⁴, in W/m².
///
/// `temperature` in kelvin.
#[must_use]
pub fn exitance(temperature: f64) -> f64 {
    if temperature <= 0.0 {
        return 0.0;
    }
    STEFAN_BOLTZMANN * (temperature * temperature) * (temperature * temperature)
}

/// Returns the wavelength in metres at which a black body's exitance per
/// wavelength is greatest (Wien's displacement law).
///
/// `temperature` in kelvin; at or below zero there is no peak and the result
/// is infinite.
#[must_use]
pub fn peak_wavelength(temperature: f64) -> f64 {
    if temperature <= 0.0 {
        f64::INFINITY
    } else {
        WIEN / temperature
    }
}

/// Returns the exitance of a black body per metre of wavelength, W/m³.
///
/// `wavelength` in metres, `temperature` in kelvin.
///
/// # Accuracy
///
/// Relative error below `1e-13` while x = c₂/(λT) stays below 100, then
/// growing as x times `1e-16`.
///
/// # Source
///
/// Planck's law, M_λ = c₁ λ⁻⁵ / (exp(c₂/(λT)) − 1); its integral and its peak
/// are checked in this file.
#[must_use]
pub fn spectral_exitance(wavelength: f64, temperature: f64) -> f64 {
    if wavelength <= 0.0 || temperature <= 0.0 {
        return 0.0;
    }
    let x = PLANCK * LIGHT / (BOLTZMANN * temperature) / wavelength;
    // In this order nothing overflows before the exponential has its say.
    FIRST_RADIATION
        / (wavelength * wavelength)
        / x.exp_m1()
        / wavelength
        / (wavelength * wavelength)
}

/// Returns the fraction of a black body's exitance between two wavelengths, each
/// wavelength counted with a weight.
///
/// `from` and `to` in metres, above zero and finite, `from` below `to`;
/// `temperature` in kelvin, above zero. `weight` of a wavelength in metres is
/// asked for inside the band only and has no kink there.
///
/// # Accuracy
///
/// Gauss's rule with eight points over each step of one in x: all terms are
/// positive, and for a weight that is linear in the wavelength the relative
/// error is below `1e-12`. What lies 60 steps beyond the longest wavelength
/// holds less than `1e-22` of the band and is left out.
pub(super) fn weighted_fraction(
    from: f64,
    to: f64,
    temperature: f64,
    weight: impl Fn(f64) -> f64,
) -> f64 {
    let whole = SECOND_RADIATION / temperature;
    let (x_near, x_far) = (whole / from, whole / to);
    if x_far > 800.0 {
        return 0.0;
    }
    let width = width(from, to, x_near).min(60.0);
    let panels = width.ceil().max(1.0);
    let step = width / panels;
    // At most 60.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let panels = panels as u8;
    (0..panels)
        .map(|index| {
            panel(x_far + f64::from(index) * step, step, |x| {
                // Rounding must not lead out of the band.
                weight((whole / x).clamp(from, to))
            })
        })
        .sum()
}

/// How much x = c₂/(λT) is greater at the near end of a band than at its far
/// end, without the difference of two values that are nearly the same.
fn width(from: f64, to: f64, x_near: f64) -> f64 {
    if to.is_infinite() {
        x_near
    } else {
        x_near * ((to - from) / to)
    }
}

/// The nodes of Gauss's rule with eight points on −1..1 and their weights.
///
/// Abramowitz and Stegun, table 25.4, n = 8 (from memory); a test holds that
/// polynomials of degree 15 come out exactly.
const GAUSS: [(f64, f64); 4] = [
    (0.183_434_642_495_649_8, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887_27),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_48),
    (0.960_289_856_497_536_3, 0.101_228_536_290_376_26),
];

/// The fraction from `x` to `x + width`, which is at most one, weighted by a
/// function of x.
fn panel(x: f64, width: f64, weight: impl Fn(f64) -> f64) -> f64 {
    let (middle, half) = (x + 0.5 * width, 0.5 * width);
    let value = |x: f64| {
        if x >= 1.0 {
            // From e⁻ˣ, which still has its digits where eˣ overflows.
            let power = (-x).exp();
            x * x * x * (power / (1.0 - power)) * weight(x)
        } else if x > 0.0 {
            x * x * (x / x.exp_m1()) * weight(x)
        } else {
            0.0
        }
    };
    let sum: f64 = GAUSS
        .iter()
        .map(|(node, share)| share * (value(middle - half * node) + value(middle + half * node)))
        .sum();
    NORM * half * sum
}

/// The fraction below, by the series in e⁻ˣ; x at least [`MEETING`].
fn below(x: f64) -> f64 {
    if x > 800.0 {
        return 0.0;
    }
    let step = (-x).exp();
    let mut power = step;
    let mut sum = 0.0;
    for n in 1..40_u8 {
        let n = f64::from(n);
        let y = 1.0 / n;
        let term = power * y * (x * x * x + y * (3.0 * x * x + y * (6.0 * x + 6.0 * y)));
        sum += term;
        if term <= sum * 1e-17 {
            break;
        }
        power *= step;
    }
    NORM * sum
}

/// The fraction above, by the Bernoulli series; x below [`MEETING`].
fn above(x: f64) -> f64 {
    // B₂ₖ / ((2k)! (2k + 3)), k from 0; the single odd term is −x/8.
    const TERMS: [f64; 17] = [
        0.333_333_333_333_333_3,
        0.016_666_666_666_666_666,
        -0.000_198_412_698_412_698_4,
        3.674_309_229_864_785_5e-6,
        -7.515_632_515_632_516e-8,
        1.605_904_383_682_161_5e-9,
        -3.522_793_425_791_662e-11,
        7.872_080_312_167_458e-13,
        -1.784_042_261_222_412e-14,
        4.088_600_979_179_926e-16,
        -9.455_950_863_295_921e-18,
        2.203_601_131_344_092e-19,
        -5.168_320_254_004_638_5e-21,
        1.218_864_496_423_954_2e-22,
        -2.888_231_428_076_628e-24,
        6.872_583_188_902_07e-26,
        -1.641_368_762_534_915e-27,
    ];
    let square = x * x;
    let even = TERMS
        .iter()
        .rev()
        .fold(0.0, |sum, term| sum * square + term);
    NORM * x * square * (even - x / 8.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn edges_give_what_they_mean() {
        for (found, expected) in [
            (fraction(0.0), 0.0),
            (fraction(-1.0), 0.0),
            (fraction(1e-9), 0.0),
            (fraction(f64::INFINITY), 1.0),
            (band_fraction(0.0, f64::INFINITY, 300.0), 1.0),
            (band_fraction(2e-6, 1e-6, 300.0), 0.0),
            (band_fraction(1e-6, 2e-6, 0.0), 0.0),
            (band_fraction(1e-6, 2e-6, -5.0), 0.0),
            (exitance(0.0), 0.0),
            (exitance(-300.0), 0.0),
            (peak_wavelength(0.0), f64::INFINITY),
            (spectral_exitance(0.0, 300.0), 0.0),
            (spectral_exitance(1e-6, 0.0), 0.0),
            (spectral_exitance(1e-9, 1.0), 0.0),
        ] {
            assert_eq!(found, expected);
        }
        assert!(fraction(f64::NAN).is_nan() && band_fraction(f64::NAN, 1.0, 300.0).is_nan());
    }

    #[test]
    fn fraction_rises_without_a_step_where_the_series_meet() {
        let product = |x: f64| SECOND_RADIATION / x;
        let mut last = fraction(product(2.001));
        for step in 1..=2000_u32 {
            let next = fraction(product(2.001 - 1e-6 * f64::from(step)));
            // Per step of 1e-6 in x the fraction rises by about 1.93e-7.
            assert!(
                (next - last - 1.93e-7).abs() < 2e-9,
                "step {step}: from {last} to {next}"
            );
            last = next;
        }
    }

    #[test]
    fn eight_points_take_polynomials_up_to_degree_fifteen_exactly() {
        for degree in (0..=14).step_by(2) {
            let sum: f64 = GAUSS
                .iter()
                .map(|(node, share)| 2.0 * share * node.powi(degree))
                .sum();
            let expected = 2.0 / (f64::from(degree) + 1.0);
            assert!((sum - expected).abs() < 1e-15, "{degree}: {sum} {expected}");
        }
    }

    #[test]
    fn narrow_bands_meet_wide_ones_without_a_step() {
        // Split in two, a band just above the limit of width goes the other way.
        for (x_far, x_near) in [(0.1, 1.11), (1.5, 2.51), (5.0, 6.01), (40.0, 41.01)] {
            let ends = [x_near, 0.5 * (x_near + x_far), x_far].map(|x| SECOND_RADIATION / x);
            let whole = band_fraction(ends[0], ends[2], 1.0);
            let parts = band_fraction(ends[0], ends[1], 1.0) + band_fraction(ends[1], ends[2], 1.0);
            assert!(
                (whole / parts - 1.0).abs() < 1e-13,
                "{x_far} to {x_near}: {whole:e} against {parts:e}"
            );
        }
    }

    #[test]
    fn far_complements_keep_their_digits() {
        // Above λT = 1 m·K the Rayleigh-Jeans tail: (5/π⁴) x³ (1 − 3x/8 + x²/20).
        for x in [1e-2, 1e-4, 1e-6] {
            let above = band_fraction(SECOND_RADIATION / x, f64::INFINITY, 1.0);
            let expected =
                5.0 / std::f64::consts::PI.powi(4) * x.powi(3) * (1.0 - 0.375 * x + 0.05 * x * x);
            assert!(
                (above / expected - 1.0).abs() < 1e-9,
                "{x}: {above:e} against {expected:e}"
            );
        }
    }
}
