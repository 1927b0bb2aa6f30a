//! A log scale whose ends are ticks of the row 1, 2, 5.

/// A log scale between two ticks.
#[derive(Clone, Debug)]
pub(super) struct Scale {
    low: Step,
    high: Step,
}

/// A tick: 1, 2 or 5 times a power of ten, counted through.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Step(i32);

impl Step {
    fn value(self) -> f64 {
        let digit = [1.0, 2.0, 5.0][self.0.rem_euclid(3) as usize];
        let decade = self.0.div_euclid(3);
        // Dividing keeps 0.1 and 0.05 the numbers that they read as.
        if decade < 0 {
            digit / 10_f64.powi(-decade)
        } else {
            digit * 10_f64.powi(decade)
        }
    }

    /// The last step at or below a value; a hair of rounding noise is forgiven.
    fn below(value: f64) -> Self {
        let mut step = Step(value.log10().floor() as i32 * 3);
        while Step(step.0 + 1).value() <= value * (1.0 + 1e-9) {
            step.0 += 1;
        }
        step
    }
}

impl Scale {
    /// Returns the scale that holds `low..=high`, both positive and finite, with
    /// at least two ticks.
    pub(super) fn new(low: f64, high: f64) -> Self {
        // A hundred decades are more than any quantity has; powers stay finite.
        let low = low.clamp(1e-100, 1e100);
        let high = high.clamp(low, 1e100);
        let (first, mut last) = (Step::below(low), Step::below(high));
        if last.value() < high * (1.0 - 1e-9) {
            last.0 += 1;
        }
        if last == first {
            return Self {
                low: Step(first.0 - 1),
                high: Step(last.0 + 1),
            };
        }
        Self {
            low: first,
            high: last,
        }
    }

    /// Returns both ends.
    pub(super) fn ends(&self) -> (f64, f64) {
        (self.low.value(), self.high.value())
    }

    /// Returns how far along the scale a value lies, 0 at the low end.
    pub(super) fn fraction(&self, value: f64) -> f64 {
        let (low, high) = self.ends();
        (value / low).ln() / (high / low).ln()
    }

    /// Returns the value at a share of the scale's length, 0 at the low end.
    pub(super) fn value(&self, fraction: f64) -> f64 {
        let (low, high) = self.ends();
        low * (high / low).powf(fraction)
    }

    /// Returns the ticks: 1, 2, 5 of every decade, or the decades alone, or every
    /// other one …, so that there are at most `most` (never fewer than the ends).
    pub(super) fn ticks(&self, most: f64) -> Vec<f64> {
        let steps: Vec<Step> = (self.low.0..=self.high.0).map(Step).collect();
        if steps.len() as f64 <= most.max(2.0) {
            return steps.into_iter().map(Step::value).collect();
        }
        for every in 1..=200 {
            let decades: Vec<f64> = steps
                .iter()
                .filter(|s| s.0.rem_euclid(3 * every) == 0)
                .map(|s| s.value())
                .collect();
            if decades.len() as f64 <= most.max(2.0) {
                return decades;
            }
        }
        Vec::new()
    }

    /// Returns the places between the ticks, 3, 4, 6 … 9 of every decade, if
    /// `length` points leave room to tell them apart.
    pub(super) fn between(&self, length: f64) -> Vec<f64> {
        let (low, high) = self.ends();
        // From 9 to 10 is the closest pair.
        let closest = (10.0_f64 / 9.0).ln() / (high / low).ln() * length;
        if closest < 2.0 {
            return Vec::new();
        }
        let first = self.low.0.div_euclid(3);
        let last = self.high.0.div_euclid(3);
        (first..=last)
            .flat_map(|decade| {
                [3.0, 4.0, 6.0, 7.0, 8.0, 9.0].map(|digit| digit * Step(decade * 3).value())
            })
            .filter(|value| *value > low && *value < high)
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ends_are_ticks_of_the_row_1_2_5() {
        for (low, high, expected) in [
            (0.5, 20.0, (0.5, 20.0)),
            (0.6, 19.0, (0.5, 20.0)),
            (2.1, 4.8, (2.0, 5.0)),
            (3.0, 3.0, (2.0, 5.0)),
            (5.0, 5.0, (2.0, 10.0)),
            (0.011, 95.0, (0.01, 100.0)),
        ] {
            let ends = Scale::new(low, high).ends();
            assert_eq!(ends, expected, "{low}..{high}");
        }
    }

    #[test]
    fn ticks_thin_out_to_decades() {
        assert_eq!(Scale::new(1.0, 10.0).ticks(9.0), vec![1.0, 2.0, 5.0, 10.0]);
        assert_eq!(
            Scale::new(0.01, 10.0).ticks(5.0),
            vec![0.01, 0.1, 1.0, 10.0]
        );
        let wide = Scale::new(1e-90, 1e90).ticks(9.0);
        assert!((2..=9).contains(&wide.len()), "{} ticks", wide.len());
    }

    #[test]
    fn places_between_ticks_show_where_there_is_room() {
        assert_eq!(
            Scale::new(2.0, 10.0).between(300.0),
            vec![3.0, 4.0, 6.0, 7.0, 8.0, 9.0]
        );
        assert_eq!(Scale::new(2.0, 10.0).between(20.0), Vec::<f64>::new());
        assert_eq!(Scale::new(1e-6, 1e6).between(300.0), Vec::<f64>::new());
    }

    #[test]
    fn values_and_fractions_agree() {
        let scale = Scale::new(0.6, 19.0);
        for share in [0.0, 0.1, 0.5, 0.9, 1.0] {
            let back = scale.fraction(scale.value(share));
            assert!((back - share).abs() < 1e-12, "{back}, wanted {share}");
        }
    }

    #[test]
    fn a_decade_is_the_same_length_everywhere() {
        let scale = Scale::new(0.1, 100.0);
        for (value, expected) in [
            (0.1, 0.0),
            (1.0, 1.0 / 3.0),
            (10.0, 2.0 / 3.0),
            (100.0, 1.0),
        ] {
            let got = scale.fraction(value);
            assert!(
                (got - expected).abs() < 1e-12,
                "{value}: {got}, wanted {expected}"
            );
        }
    }
}
