//! A small table of spectral emissivity.
//!
//! Wavelengths in metres, emissivities dimensionless. Between rows the
//! emissivity is linear in the wavelength; before the first row and after the
//! last it is held at that row's value.

use super::{Error, planck};

/// The most rows that a table may have.
pub const MOST_ROWS: usize = 1000;

/// The wavelengths that a row may stand at, in metres: 1 nm to 1 m.
const WAVELENGTHS: std::ops::RangeInclusive<f64> = 1e-9..=1.0;

/// The emissivity of a surface against wavelength.
#[derive(Clone, Debug, PartialEq)]
pub struct Spectrum {
    rows: Box<[Row]>,
}

/// One row of the table.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Row {
    wavelength: f64,
    emissivity: f64,
    /// What the emissivity gains per metre up to the next row.
    slope: f64,
}

impl Spectrum {
    /// Returns the table of these rows: wavelength in metres and emissivity,
    /// wavelengths growing.
    ///
    /// # Errors
    ///
    /// With the row's number, counted from 1: [`Error::TableLength`] unless
    /// there are 2 to [`MOST_ROWS`] rows; [`Error::TableOrder`] for a wavelength
    /// that is not above that of the row before; [`Error::TableValue`] for a
    /// wavelength not from 1 nm to 1 m, or an emissivity not above 0 and at most
    /// 1.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::spectrum::Spectrum;
    ///
    /// let metal = Spectrum::new(&[[1.0e-6, 0.36], [4.0e-6, 0.24]])?;
    /// assert!((metal.at(2.0e-6) - 0.32).abs() < 1e-15);
    /// assert_eq!(metal.at(0.5e-6), 0.36);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn new(rows: &[[f64; 2]]) -> Result<Self, Error> {
        if !(2..=MOST_ROWS).contains(&rows.len()) {
            return Err(Error::TableLength { found: rows.len() });
        }
        for (index, [wavelength, emissivity]) in rows.iter().enumerate() {
            let row = index + 1;
            if !WAVELENGTHS.contains(wavelength) {
                return Err(Error::TableValue {
                    row,
                    parameter: "wavelength",
                    range: "from 1 nm to 1 m",
                    value: *wavelength,
                });
            }
            if !(*emissivity > 0.0 && *emissivity <= 1.0) {
                return Err(Error::TableValue {
                    row,
                    parameter: "emissivity",
                    range: "above 0 and at most 1",
                    value: *emissivity,
                });
            }
            if let Some([before, _]) = index.checked_sub(1).map(|before| rows[before])
                && *wavelength <= before
            {
                return Err(Error::TableOrder {
                    row,
                    wavelength: *wavelength,
                    before,
                });
            }
        }
        let rows = rows.iter().enumerate().map(|(index, row)| {
            let [wavelength, emissivity] = *row;
            let slope = rows
                .get(index + 1)
                .map_or(0.0, |next| (next[1] - emissivity) / (next[0] - wavelength));
            Row {
                wavelength,
                emissivity,
                slope,
            }
        });
        Ok(Self {
            rows: rows.collect(),
        })
    }

    /// Returns the emissivity at a wavelength in metres.
    #[must_use]
    pub fn at(&self, wavelength: f64) -> f64 {
        let wavelength = wavelength.min(*WAVELENGTHS.end());
        let next = self
            .rows
            .partition_point(|row| row.wavelength <= wavelength);
        match next.checked_sub(1) {
            None => self.rows[0].emissivity,
            Some(index) => self.between(index, wavelength),
        }
    }

    /// Returns the wavelengths of the rows, growing, in metres.
    pub fn wavelengths(&self) -> impl DoubleEndedIterator<Item = f64> {
        self.rows.iter().map(|row| row.wavelength)
    }

    /// Returns the exitance in a band, over that of a black body at all
    /// wavelengths.
    ///
    /// `from` and `to` in metres, `to` may be infinite; `temperature` in kelvin.
    /// Dimensionless, in `0..=1`; zero if the band is empty or turned round.
    ///
    /// # Accuracy
    ///
    /// Relative error below `1e-12`, as [`planck::band_fraction`].
    ///
    /// # Source
    ///
    /// Planck's law times the table; checked against the closed form of its
    /// first moment and against a fine quadrature in
    /// `tests/published/quadrature_of_planck.rs`.
    #[must_use]
    pub fn band_fraction(&self, from: f64, to: f64, temperature: f64) -> f64 {
        if from.is_nan() || to.is_nan() || temperature.is_nan() {
            return f64::NAN;
        }
        if temperature <= 0.0 {
            return 0.0;
        }
        let (first, last) = (self.rows[0], self.rows[self.rows.len() - 1]);
        let held = first.emissivity
            * planck::band_fraction(from, to.min(first.wavelength), temperature)
            + last.emissivity * planck::band_fraction(from.max(last.wavelength), to, temperature);
        let mut sum = held;
        for (index, pair) in self.rows.windows(2).enumerate() {
            let (from, to) = (from.max(pair[0].wavelength), to.min(pair[1].wavelength));
            if from < to {
                sum += planck::weighted_fraction(from, to, temperature, |wavelength| {
                    self.between(index, wavelength)
                });
            }
        }
        sum
    }

    /// Returns the emissivity of all wavelengths together at a temperature in
    /// kelvin.
    ///
    /// Dimensionless, in `0..=1`, as accurate as [`Self::band_fraction`].
    #[must_use]
    pub fn total(&self, temperature: f64) -> f64 {
        self.band_fraction(0.0, f64::INFINITY, temperature)
    }

    /// The emissivity behind the row of this index, before the next.
    fn between(&self, index: usize, wavelength: f64) -> f64 {
        let row = self.rows[index];
        // Rounding must not lead beyond what the two rows say.
        let next = self
            .rows
            .get(index + 1)
            .map_or(row.emissivity, |next| next.emissivity);
        let (low, high) = (row.emissivity.min(next), row.emissivity.max(next));
        (row.emissivity + row.slope * (wavelength - row.wavelength)).clamp(low, high)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tables_with_a_fault_are_refused_with_the_number_of_the_row() {
        let text = |rows: &[[f64; 2]]| {
            Spectrum::new(rows).map_or_else(|error| error.to_string(), |made| format!("{made:?}"))
        };
        for (rows, expected) in [
            (&[][..], "a table must have from 2 to 1000 rows, found 0"),
            (
                &[[1e-6, 0.5]],
                "a table must have from 2 to 1000 rows, found 1",
            ),
            (
                &[[2e-6, 0.5], [1e-6, 0.5]],
                "row 2 of the table must stand at a longer wavelength than the row before it, \
                 found 0.000001 m after 0.000002 m; sort the rows by wavelength",
            ),
            (
                &[[1e-6, 0.5], [2e-6, 0.5], [2e-6, 0.5]],
                "row 3 of the table must stand at a longer wavelength than the row before it, \
                 found 0.000002 m after 0.000002 m; sort the rows by wavelength",
            ),
            (
                &[[1e-6, 0.5], [2e-6, 1.5]],
                "emissivity in row 2 of the table must be above 0 and at most 1, found 1.5",
            ),
            (
                &[[1e-6, 0.0], [2e-6, 0.5]],
                "emissivity in row 1 of the table must be above 0 and at most 1, found 0",
            ),
            (
                &[[1e-6, f64::NAN], [2e-6, 0.5]],
                "emissivity in row 1 of the table must be above 0 and at most 1, found NaN",
            ),
            (
                &[[1.0, 0.4], [f64::INFINITY, 0.5]],
                "wavelength in row 2 of the table must be from 1 nm to 1 m, found inf",
            ),
            (
                &[[780.0, 0.4], [3000.0, 0.5]],
                "wavelength in row 1 of the table must be from 1 nm to 1 m, found 780",
            ),
        ] {
            assert_eq!(text(rows), expected);
        }
        let many = vec![[1e-6, 0.5]; MOST_ROWS + 1];
        assert_eq!(
            Spectrum::new(&many),
            Err(Error::TableLength {
                found: MOST_ROWS + 1
            })
        );
    }

    #[test]
    fn emissivities_are_linear_between_rows_and_held_at_the_ends() {
        let table = Spectrum::new(&[[1e-6, 0.4], [2e-6, 0.2], [4e-6, 0.3]]).expect("a table");
        for (wavelength, expected) in [
            (0.0, 0.4),
            (1e-6, 0.4),
            (1.5e-6, 0.3),
            (2e-6, 0.2),
            (3e-6, 0.25),
            (4e-6, 0.3),
            (1.0, 0.3),
            (f64::INFINITY, 0.3),
        ] {
            let found = table.at(wavelength);
            assert!(
                (found - expected).abs() < 1e-15,
                "{wavelength}: {found} against {expected}"
            );
        }
    }

    #[test]
    fn a_flat_table_is_a_grey_surface() {
        let table = Spectrum::new(&[[0.5e-6, 0.3], [1.1e-6, 0.3], [7e-6, 0.3]]).expect("a table");
        for temperature in [1.0, 300.0, 1273.15, 3000.0, 1e5] {
            for (from, to) in [(0.0, f64::INFINITY), (780e-9, 3e-6), (2e-6, 2.001e-6)] {
                let found = table.band_fraction(from, to, temperature);
                let expected = 0.3 * planck::band_fraction(from, to, temperature);
                assert!(
                    (found - expected).abs() <= 1e-13 * expected,
                    "{temperature} K, {from} to {to}: {found:e} against {expected:e}"
                );
            }
        }
    }

    #[test]
    fn impossible_bands_give_what_they_mean() {
        let table = Spectrum::new(&[[1e-6, 0.4], [2e-6, 0.2]]).expect("a table");
        for (from, to, temperature) in [
            (2e-6, 1e-6, 1000.0),
            (1e-6, 1e-6, 1000.0),
            (0.0, 1.0, 0.0),
            (0.0, 1.0, -5.0),
            (0.0, 1.0, 1e-300),
        ] {
            let found = table.band_fraction(from, to, temperature);
            // At 10⁻³⁰⁰ K even a metre is a short wave.
            assert_eq!(found, 0.0, "{from} to {to} at {temperature} K");
        }
        assert!(table.band_fraction(f64::NAN, 1.0, 300.0).is_nan());
    }
}
