//! Roots of a polynomial of degree four near an interval.

/// Returns the places in −1 to 1, and a little beyond, at which a polynomial of
/// degree four is zero or touches zero, in ascending order.
///
/// `terms` from the constant up. Each root is held between two places where the
/// derivative changes its sign, so that none is lost; places where the
/// polynomial comes within rounding of zero are given as well.
pub(super) fn roots(terms: [f64; 5]) -> impl Iterator<Item = f64> {
    const EDGE: f64 = 1.000_001;
    let [constant, first, second, third, fourth] = terms;
    let slopes = first.abs() + second.abs() + third.abs() + fourth.abs();
    let mut found = Few::default();
    if constant.abs() > 1.000_01 * slopes {
        return found.into_iter();
    }
    let scale = constant.abs() + slopes;
    let value = |at: f64| (((fourth * at + third) * at + second) * at + first) * at + constant;
    let slope = |at: f64| ((4.0 * fourth * at + 3.0 * third) * at + 2.0 * second) * at + first;
    let bend = |at: f64| (12.0 * fourth * at + 6.0 * third) * at + 2.0 * second;
    let mut turns = Few::default();
    let mut last = -EDGE;
    for at in quadratic(2.0 * second, 6.0 * third, 12.0 * fourth)
        .into_iter()
        .flatten()
        .filter(|at| at.abs() < EDGE)
        .chain([EDGE])
    {
        turns.push(between(last, at, slope, bend));
        last = at;
    }
    let mut last = -EDGE;
    for at in turns.into_iter().chain([EDGE]) {
        found.push(between(last, at, value, slope));
        if at < EDGE && value(at).abs() <= 1e-13 * scale {
            found.push(Some(at));
        }
        last = at;
    }
    found.into_iter()
}

/// Up to eight numbers.
#[derive(Clone, Copy, Debug, Default)]
struct Few {
    held: [f64; 8],
    count: usize,
}

impl Few {
    fn push(&mut self, value: Option<f64>) {
        if let Some(value) = value
            && self.count < self.held.len()
        {
            self.held[self.count] = value;
            self.count += 1;
        }
    }

    fn into_iter(self) -> impl Iterator<Item = f64> {
        self.held.into_iter().take(self.count)
    }
}

/// The roots of a polynomial of degree two, ascending.
fn quadratic(constant: f64, first: f64, second: f64) -> [Option<f64>; 2] {
    let square = first * first - 4.0 * second * constant;
    if square < 0.0 {
        return [None, None];
    }
    let sum = -0.5 * (first + square.sqrt().copysign(first));
    let one = (second != 0.0).then(|| sum / second);
    let other = (sum != 0.0).then(|| constant / sum);
    match (one, other) {
        (Some(one), Some(other)) if one > other => [Some(other), Some(one)],
        both => [both.0, both.1],
    }
}

/// The root between two places if the signs there differ.
fn between(
    low: f64,
    high: f64,
    value: impl Fn(f64) -> f64,
    slope: impl Fn(f64) -> f64,
) -> Option<f64> {
    let (mut low, mut high) = (low, high);
    let (start, end) = (value(low), value(high));
    if start == 0.0 {
        return Some(low);
    }
    if end == 0.0 {
        return Some(high);
    }
    if (start < 0.0) == (end < 0.0) {
        return None;
    }
    let mut at = low + (high - low) * (start / (start - end));
    for _ in 0..100 {
        let found = value(at);
        if found == 0.0 {
            return Some(at);
        }
        if (found < 0.0) == (start < 0.0) {
            low = at;
        } else {
            high = at;
        }
        let mut next = at - found / slope(at);
        // Written so that a NaN is not between either.
        if !(next > low && next < high) {
            next = 0.5 * (low + high);
        }
        if (next - at).abs() <= 1e-16 || high - low <= 2e-16 {
            return Some(next);
        }
        at = next;
    }
    Some(at)
}

#[cfg(test)]
mod tests {
    use super::roots;

    /// Products of four linear factors, with near and double roots.
    #[test]
    fn every_root_of_a_product_is_found() {
        for factors in [
            [-0.9, -0.2, 0.3, 0.8],
            [0.1, 0.1 + 1e-7, 0.5, 5.0],
            [-0.5, -0.5, 0.25, 0.25],
            [-3.0, 0.0, 1.0, 2.0],
            [1e-12, 0.4, 4.0, 1e6],
        ] {
            let mut terms = [1.0, 0.0, 0.0, 0.0, 0.0];
            for root in factors {
                for degree in (0..5).rev() {
                    let lower: f64 = if degree > 0 { terms[degree - 1] } else { 0.0 };
                    terms[degree] = lower - root * terms[degree];
                }
            }
            let found: Vec<f64> = roots(terms).collect();
            for root in factors.into_iter().filter(|root: &f64| root.abs() <= 1.0) {
                assert!(
                    found.iter().any(|at| (at - root).abs() < 1e-6),
                    "{root} of {factors:?} is not among {found:?}"
                );
            }
        }
    }

    #[test]
    fn without_roots_none_is_found() {
        for terms in [
            [1.0, 0.0, 0.0, 0.0, 0.0],
            [1.0, 0.0, 1.0, 0.0, 1.0],
            [-5.0, 1.0, 1.0, 1.0, 1.0],
            [0.01, 0.0, 1.0, 0.0, 0.5],
        ] {
            let found: Vec<f64> = roots(terms).collect();
            assert!(found.is_empty(), "{found:?} of {terms:?}");
        }
    }
}
