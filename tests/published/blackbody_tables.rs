//! Blackbody radiation functions as handbooks print them.

use farglow::physics::{constant, planck};

use crate::rows::{self, Row};

pub fn below(row: &Row) -> Option<f64> {
    let product = match row.inputs["lambdaT_um_K"].as_f64() {
        Some(micrometres) => micrometres * 1e-6,
        // The one row that says where it is in words: at the Wien peak.
        None => constant::WIEN,
    };
    Some(planck::fraction(product))
}

/// Source: Modest, *Radiative Heat Transfer*, 1st ed. 1993, pp. 775–777, read as transcribed in open-source code; c₂ = 14388 µm·K there.
#[test]
fn fractions_are_those_of_modest() {
    assert_eq!(rows::check("bb_table_modest", below), 22);
}

/// Source: table shared by Incropera & DeWitt (12.1/12.2) and Çengel (12-2), read as an array that credits Çengel; it drifts up to 5e-5 above the exact integral.
#[test]
fn fractions_are_those_of_incropera_to_the_drift_of_that_table() {
    assert_eq!(rows::check("bb_table_incropera", below), 24);
}

/// Source: the same table. Two rows are misprinted by one digit: 5200 µm·K reads 0.658970 for 0.657970, 15000 µm·K reads 0.969981 for 0.968981. The file of checks has the mended digits (computed); the printed ones are held here with their true error, because the neighbours and the exact integral agree against them.
#[test]
fn two_misprinted_rows_are_off_by_a_thousandth() {
    assert_eq!(rows::check("bb_table_misprint", below), 2);
    for (product, printed) in [(5200e-6, 0.658_970), (15_000e-6, 0.969_981)] {
        let error: f64 = printed - planck::fraction(product);
        assert!(
            (error - 0.001).abs() < 5.5e-5,
            "printed {printed}, true error {error}"
        );
    }
}

/// Source: mpmath, 30-digit quadrature of Planck's law, computed; family `bb_exact`.
#[test]
fn fractions_are_those_of_a_thirty_digit_quadrature() {
    assert_eq!(rows::check("bb_exact", below), 15);
    for row in rows::all()
        .iter()
        .filter(|row| row.family == "bb_exact" && row.id != "bb_exact-01")
    {
        let (found, expected) = (
            below(row).expect("all rows run"),
            row.expected.as_f64().expect("a number"),
        );
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "{}: {found:e} against {expected:e}",
            row.id
        );
    }
}

/// Source: the row `bb_exact-01` says 3.41957814228874e-27 at 200 µm·K, computed. A 50-digit decimal sum of the series gives 3.41957813845239614e-27, and so does the program to 1e-14: the row is 1.12e-9 high, the quadrature behind it having lost digits in the far tail.
#[test]
fn smallest_row_is_off_by_a_billionth() {
    let (_, right, _) = rows::MENDED[0];
    let row = rows::all()
        .into_iter()
        .find(|row| row.id == "bb_exact-01")
        .expect("the row is there");
    let printed = row.expected.as_f64().expect("a number");
    let error = printed / right - 1.0;
    assert!(
        (error - 1.12e-9).abs() < 0.01e-9,
        "printed {printed:e}, right {right:e}, true error {error:e}"
    );
    let found = planck::fraction(200e-6);
    assert!(
        (found / right - 1.0).abs() < 5e-14,
        "found {found:e}, right {right:e}"
    );
}
