//! ITS-90, table 1: defining fixed points (<http://its-90.com/table1.html>).

use farglow::physics::constant::ZERO_CELSIUS;

use crate::rows::{self, Row};

pub fn celsius(row: &Row) -> Option<f64> {
    (row.quantity == "t90 [C]").then(|| row.number("T_K") - ZERO_CELSIUS)
}

/// Source: ITS-90, triple point of water 273.16 K = 0.01 °C, read; family `its90`.
#[test]
fn triple_point_of_water_lies_at_a_hundredth_of_a_degree() {
    assert_eq!(rows::check("its90", celsius), 1);
}
