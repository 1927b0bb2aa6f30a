//! The inverse square, for comparison: what a sheet says that takes one figure
//! where a person stands and goes on from it with the square of the distance.

use super::drawable;

/// How far two figures may differ, relative to the true one, and still agree:
/// less than any meter tells.
const AGREES: f64 = 0.02;

/// An inverse square through one point of the curve.
#[derive(Clone, Debug, PartialEq)]
pub struct InverseSquare {
    /// The distance of that point, in metres from the centre of the source.
    pub distance: f64,
    /// The curve's value there, in SI units.
    pub value: f64,
    /// Where that is, in words: `charger, 2.50 m`.
    pub from: String,
}

impl InverseSquare {
    /// Returns what the inverse square says at a distance in metres.
    #[must_use]
    pub fn at(&self, distance: f64) -> f64 {
        self.value * (self.distance / distance).powi(2)
    }

    /// Returns what the line is called: `inverse square from charger, 2.50 m`.
    #[must_use]
    pub fn name(&self) -> String {
        format!("inverse square from {}", self.from)
    }

    /// Returns how it reads beside the curve of these rows, on either side of
    /// its point: `too high nearer in, too low farther out`. Empty where it
    /// agrees with the curve everywhere.
    #[must_use]
    pub fn error(&self, rows: &[(f64, f64)]) -> String {
        let side = |is_nearer: bool| {
            let side = rows
                .iter()
                .filter(|row| drawable(row) && (row.0 < self.distance) == is_nearer);
            let (mut low, mut high) = (false, false);
            for (distance, value) in side {
                let ratio = self.at(*distance) / value;
                low |= ratio < 1.0 - AGREES;
                high |= ratio > 1.0 + AGREES;
            }
            match (low, high) {
                (false, false) => None,
                (true, false) => Some("too low"),
                (false, true) => Some("too high"),
                (true, true) => Some("too low or too high"),
            }
        };
        match (side(true), side(false)) {
            (None, None) => String::new(),
            (Some(near), None) => format!("{near} nearer in"),
            (None, Some(far)) => format!("{far} farther out"),
            (Some(near), Some(far)) if near == far => {
                format!("{near} nearer in and farther out")
            }
            (Some(near), Some(far)) => format!("{near} nearer in, {far} farther out"),
        }
    }
}

/// Returns the value of a curve at a distance, on a straight line of logarithms
/// between its rows; `None` beside the rows, and next to a gap.
#[must_use]
pub(super) fn value_at(rows: &[(f64, f64)], distance: f64) -> Option<f64> {
    if let Some(row) = rows.iter().find(|row| row.0 == distance) {
        return drawable(row).then_some(row.1);
    }
    let pair = rows
        .windows(2)
        .find(|pair| pair[0].0 < distance && distance < pair[1].0)?;
    if !pair.iter().all(drawable) {
        return None;
    }
    let share = (distance / pair[0].0).ln() / (pair[1].0 / pair[0].0).ln();
    Some(pair[0].1 * (pair[1].1 / pair[0].1).powf(share))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rows(value: impl Fn(f64) -> f64) -> Vec<(f64, f64)> {
        (1..=20)
            .map(|i| f64::from(i) / 2.0)
            .map(|d| (d, value(d)))
            .collect()
    }

    fn through(distance: f64, rows: &[(f64, f64)]) -> InverseSquare {
        InverseSquare {
            distance,
            value: value_at(rows, distance).expect("it is on the curve"),
            from: "charger, 2.50 m".to_owned(),
        }
    }

    /// Source: the exact factor of a disc to an element on its axis, facing it,
    /// `r²/(r² + d²)` (Howell's catalogue, from memory): near a wide source the
    /// irradiance grows less than the inverse square says.
    #[test]
    fn straight_out_from_a_disc_it_reads_too_high_nearer_in() {
        let rows = rows(|d| 1e5 * 0.25 / (0.25 + d * d));
        let error = through(2.5, &rows).error(&rows);
        assert_eq!(error, "too high nearer in, too low farther out");
    }

    /// Source: far off, a small level pool seen at a low angle sends out as the
    /// cube of the distance (Lambert's cosine law), so that the square makes too
    /// little of coming nearer.
    #[test]
    fn beside_a_pool_it_reads_too_low_nearer_in() {
        let rows = rows(|d| 1e4 / (d * d * d));
        let error = through(2.5, &rows).error(&rows);
        assert_eq!(error, "too low nearer in, too high farther out");
    }

    #[test]
    fn a_point_source_agrees_everywhere() {
        let rows = rows(|d| 300.0 / (d * d));
        let line = through(2.5, &rows);
        assert_eq!(line.error(&rows), "");
        assert!((line.at(5.0) - 12.0).abs() < 1e-9, "{}", line.at(5.0));
        assert_eq!(line.name(), "inverse square from charger, 2.50 m");
    }

    #[test]
    fn between_rows_a_power_law_is_kept() {
        let rows = [(1.0, 100.0), (4.0, 100.0 / 64.0), (8.0, 0.0)];
        let value = value_at(&rows, 2.0).expect("it lies between two rows");
        assert!((value - 12.5).abs() < 1e-9, "{value}, wanted 12.5");
        assert_eq!(value_at(&rows, 0.5), None);
        assert_eq!(value_at(&rows, 6.0), None);
        assert_eq!(value_at(&rows, 8.0), None);
        assert_eq!(value_at(&[], 1.0), None);
    }
}
