//! Worked examples of textbooks.

use farglow::physics::view_factor::{disc, rectangle};

use crate::rows::{self, Row};

pub fn factor(row: &Row) -> Option<f64> {
    match row.id.as_str() {
        "textbook-04" => disc::to_coaxial_disc(
            row.number("R_small_m"),
            row.number("R_large_m"),
            row.number("h_m"),
        )
        .ok(),
        "textbook-07" => {
            let side = |index: usize| row.inputs["ceiling_m"][index].as_f64();
            rectangle::to_parallel_rectangle(side(0)?, side(1)?, row.number("height_m")).ok()
        }
        _ => {
            let angle = row.inputs["alpha_deg"].as_f64()?.to_radians();
            disc::from_coaxial_element(angle.tan(), 1.0).ok()
        }
    }
}

/// Source: Sukhatme, *A Textbook on Heat Transfer*, example 3.6 p. 132 (F = sin² α), read in the FOSSEE companion; `textbook-05`. Lienhard & Lienhard, *A Heat Transfer Textbook*, example 10.2 (disc to disc, computed from inputs read in the FOSSEE companion); `textbook-04`. Gray, Mueller & Hopkins, furnace box 5 × 4 × 3 m, a chart value 4 % high, read in a copy; `textbook-07`.
#[test]
fn factors_of_worked_examples() {
    assert_eq!(rows::check("textbook", factor), 3);
}
