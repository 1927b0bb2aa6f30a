//! Systems of linear equations, small and dense.

/// Returns the solution of a square system, none if it has no single one.
///
/// `rows` holds the coefficients of one equation each, followed by its right
/// side: n rows of n + 1 numbers.
///
/// # Accuracy
///
/// Gauss's elimination with the greatest pivot of each column: the relative
/// error is `1e-16` times the condition of the system. A pivot that is zero or
/// not finite ends it.
#[must_use]
pub fn solve(mut rows: Vec<Vec<f64>>) -> Option<Vec<f64>> {
    let count = rows.len();
    if rows.iter().any(|row| row.len() != count + 1) {
        return None;
    }
    for column in 0..count {
        let pivot = (column..count).max_by(|one, other| {
            let size = |row: &usize| rows[*row][column].abs();
            size(one).total_cmp(&size(other))
        })?;
        rows.swap(column, pivot);
        let (above, below) = rows.split_at_mut(column + 1);
        let leading = &above[column];
        let size = leading[column];
        if size == 0.0 || !size.is_finite() {
            return None;
        }
        for row in below {
            let share = row[column] / size;
            if share != 0.0 {
                for (value, led) in row[column..].iter_mut().zip(&leading[column..]) {
                    *value -= share * led;
                }
            }
        }
    }
    let mut solution = vec![0.0; count];
    for index in (0..count).rev() {
        let row = &rows[index];
        let known: f64 = (index + 1..count)
            .map(|column| row[column] * solution[column])
            .sum();
        solution[index] = (row[count] - known) / row[index];
    }
    solution
        .iter()
        .all(|value| value.is_finite())
        .then_some(solution)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn solutions_are_found_where_there_is_one() {
        for (rows, expected) in [
            (vec![vec![2.0, 4.0]], Some(vec![2.0])),
            // The first pivot is zero: rows must change places.
            (
                vec![vec![0.0, 1.0, 3.0], vec![2.0, 1.0, 7.0]],
                Some(vec![2.0, 3.0]),
            ),
            (vec![vec![1.0, 2.0, 3.0], vec![2.0, 4.0, 6.0]], None),
            (vec![vec![f64::NAN, 1.0]], None),
            (vec![vec![1.0, f64::INFINITY]], None),
            (vec![vec![1.0, 2.0, 3.0]], None),
            (Vec::new(), Some(Vec::new())),
        ] {
            assert_eq!(solve(rows.clone()), expected, "{rows:?}");
        }
    }

    #[test]
    fn hilberts_system_of_six_keeps_the_digits_it_can() {
        // Right sides are the sums of the rows, so that all unknowns are one.
        let rows = (0..6_u8)
            .map(|row| {
                let entry = |column: u8| 1.0 / f64::from(row + column + 1);
                let mut line: Vec<f64> = (0..6).map(entry).collect();
                line.push(line.iter().sum());
                line
            })
            .collect();
        let solution = solve(rows).expect("hard, but regular");
        for value in solution {
            // Condition 1.5e7.
            assert!((value - 1.0).abs() < 1e-8, "{value} against 1");
        }
    }
}
