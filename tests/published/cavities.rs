//! Apparent emissivity of cavities: collocation of another program, and two
//! published formulas as they stand.

use farglow::physics::cavity;

use crate::rows::{self, Row};

pub fn exact(row: &Row) -> Option<f64> {
    cavity::of_cylinder(1.0, row.number("L_over_R"), row.number("wall_emissivity")).ok()
}

/// Mouth over wall and bottom of a cylinder: 1/(1 + 2 L/R).
pub fn enclosure(row: &Row) -> Option<f64> {
    let share = 1.0 / (1.0 + 2.0 * row.number("L_over_R"));
    cavity::enclosure(share, row.number("wall_emissivity")).ok()
}

pub fn gouffe(row: &Row) -> Option<f64> {
    cavity::gouffe(1.0, row.number("L_over_R"), row.number("wall_emissivity")).ok()
}

/// Source: isothermal grey diffuse cylinder with flat bottom, collocation of another program; family `cavity_exact`.
#[test]
fn cylinder_with_a_flat_bottom() {
    assert_eq!(rows::check("cavity_exact", exact), 11);
}

/// Source: isothermal enclosure with a plane mouth, exact only if the wall is lit evenly; family `cavity_enclosure`.
#[test]
fn enclosure_that_is_lit_evenly() {
    assert_eq!(rows::check("cavity_enclosure", enclosure), 3);
}

/// Source: Gouffé 1945, formula from memory; family `cavity_gouffe`.
#[test]
fn gouffes_formula() {
    assert_eq!(rows::check("cavity_gouffe", gouffe), 3);
}

/// Source: as `cavity_exact`, to the digits given there (1e-7, and 2.4e-7 for the first).
#[test]
fn cylinders_to_more_digits() {
    for (depth, emissivity, expected) in [
        (1.0, 0.3, 0.556_308_409_863_052_6),
        (1.0, 0.9, 0.961_870_167_958_566),
        (2.0, 0.5, 0.808_299_023_135_565_5),
        (4.0, 0.3, 0.709_541_971_488_365),
        (8.0, 0.5, 0.836_537_893_917_199_3),
        (8.0, 0.9, 0.974_960_710_661_277_2),
    ] {
        let found = cavity::of_cylinder(1.0, depth, emissivity).expect("a possible cavity");
        assert!(
            (found - expected).abs() < 1e-6,
            "L/R {depth}, ε {emissivity}: {found} against {expected}"
        );
    }
}
