//! Numerical pieces that no well-kept crate gives.

pub mod linear;

/// The largest square of a tangent that [`arc_over_tangent`] takes: angles up to
/// 22.9°.
pub const LARGEST_SQUARE: f64 = 0.18;

/// Returns atan(t)/t from the square of the tangent t, without the calls and
/// the roots that the arc tangent itself would cost.
///
/// `square` in `0..=LARGEST_SQUARE`.
///
/// # Accuracy
///
/// Relative error below `4e-16`; of the polynomial itself 4e-17.
///
/// # Source
///
/// Polynomial through the Chebyshev points of the interval, worked out to 60
/// digits; checked against the arc tangent in this file.
#[must_use]
#[inline]
pub fn arc_over_tangent(square: f64) -> f64 {
    const TERMS: [f64; 13] = [
        1.0,
        -0.333_333_333_333_333_2,
        0.199_999_999_999_951_63,
        -0.142_857_142_851_203_82,
        0.111_111_110_731_371_55,
        -0.090_909_076_419_408_4,
        0.076_922_720_761_726_2,
        -0.066_660_770_841_390_05,
        0.058_756_223_409_192_28,
        -0.052_097_631_818_516_57,
        0.044_697_282_449_165_98,
        -0.032_714_487_087_539_39,
        0.014_448_559_120_252_396,
    ];
    TERMS
        .iter()
        .rev()
        .fold(0.0, |sum, term| sum * square + term)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn arc_over_tangent_is_the_arc_tangent_over_the_tangent() {
        assert_eq!(arc_over_tangent(0.0), 1.0);
        for step in 1..=100_000_u32 {
            let square = LARGEST_SQUARE * f64::from(step) / 100_000.0;
            let tangent = square.sqrt();
            let (found, expected) = (arc_over_tangent(square), tangent.atan() / tangent);
            assert!(
                (found / expected - 1.0).abs() < 5e-16,
                "{square}: {found} against {expected}"
            );
        }
    }
}
