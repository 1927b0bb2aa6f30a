//! Worked examples of textbooks.

use farglow::physics::view_factor::disc;

use crate::rows::{self, Row};

pub fn on_axis(row: &Row) -> Option<f64> {
    let angle = row.inputs["alpha_deg"].as_f64()?.to_radians();
    Some(disc::from_coaxial_element(angle.tan(), 1.0).expect("a possible disc"))
}

/// Source: Sukhatme, *A Textbook on Heat Transfer*, example 3.6 p. 132 (F = sin² α), read in the FOSSEE companion; `textbook-05`.
#[test]
fn disc_on_the_axis_fills_the_square_of_the_sine() {
    assert_eq!(rows::check("textbook", on_axis), 1);
}
