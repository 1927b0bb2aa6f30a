//! Legendre's polynomials.

/// The Legendre polynomials at one place, with their slopes, from order zero up
/// and without end.
///
/// # Source
///
/// Bonnet's recursion, and P′ₙ₊₁ = P′ₙ₋₁ + (2n + 1) Pₙ; checked in this file.
#[derive(Clone, Debug)]
pub struct Legendre {
    place: f64,
    order: f64,
    value: f64,
    slope: f64,
    before: f64,
    slope_before: f64,
}

impl Legendre {
    /// Returns the polynomials at a place, from −1 to 1.
    #[must_use]
    pub fn at(place: f64) -> Self {
        Self {
            place,
            order: 0.0,
            value: 1.0,
            slope: 0.0,
            before: 0.0,
            slope_before: 0.0,
        }
    }

    /// Returns the sum of the polynomials times their terms.
    #[must_use]
    pub fn sum(place: f64, terms: &[f64]) -> f64 {
        Self::at(place)
            .zip(terms)
            .map(|((value, _), term)| value * term)
            .sum()
    }
}

impl Iterator for Legendre {
    /// The value and the slope.
    type Item = (f64, f64);

    fn next(&mut self) -> Option<(f64, f64)> {
        let found = (self.value, self.slope);
        let n = self.order;
        let value = ((2.0 * n + 1.0) * self.place * self.value - n * self.before) / (n + 1.0);
        let slope = self.slope_before + (2.0 * n + 1.0) * self.value;
        (self.before, self.value) = (self.value, value);
        (self.slope_before, self.slope) = (self.slope, slope);
        self.order += 1.0;
        Some(found)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_first_orders_are_their_polynomials() {
        for x in [-1.0, -0.3, 0.0, 0.7, 1.0_f64] {
            let expected = [
                (1.0, 0.0),
                (x, 1.0),
                (0.5 * (3.0 * x * x - 1.0), 3.0 * x),
                (
                    0.5 * (5.0 * x.powi(3) - 3.0 * x),
                    0.5 * (15.0 * x * x - 3.0),
                ),
                (
                    (35.0 * x.powi(4) - 30.0 * x * x + 3.0) / 8.0,
                    (140.0 * x.powi(3) - 60.0 * x) / 8.0,
                ),
            ];
            for (order, (found, expected)) in Legendre::at(x).zip(expected).enumerate() {
                let error = (found.0 - expected.0).abs() + (found.1 - expected.1).abs();
                assert!(
                    error < 2e-15,
                    "{order} at {x}: {found:?} against {expected:?}"
                );
            }
        }
    }
}
