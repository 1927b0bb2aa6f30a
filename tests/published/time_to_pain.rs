//! Time to pain on bare skin: the fit of the SFPE guide of 2000 beside the
//! table of older editions of API 521. Both are recalled, from memory.

use farglow::physics::skin::pain::{Relation, shortest};

use crate::guidance_rows::{self, Row, longest};

/// Holds a row of the file of checks, if it is one of this source's.
pub fn row(row: &Row) -> bool {
    if !row.id.starts_with("pain_") {
        return false;
    }
    assert_eq!(row.tolerance, "table rounding; fit within 12 percent");
    let found = longest("pain-time", row.input("q_kW_m2") * 1000.0);
    // Printed to a tenth of a second.
    row.holds("fit", found, row.expected("sfpe_fit_s"), 0.05);
    let table = row.expected("t_s");
    row.holds("table", found, table, 0.12 * table);
    let by = |relation: Relation| {
        relation
            .time(row.input("q_kW_m2") * 1000.0)
            .expect("a fair irradiance")
            .unwrap_or_else(|| panic!("{}: {relation:?} is silent", row.id))
    };
    // The library's formula and the model's are one; the table is met exactly.
    row.holds("the same fit", by(Relation::Guide2000), found, 1e-9 * found);
    row.holds(
        "the table itself",
        by(Relation::FlareTable),
        table,
        1e-12 * table,
    );
    true
}

/// Source: API 521, older table, recalled; the fit of the SFPE guide, recalled.
#[test]
fn fit_gives_its_printed_times_and_stays_by_the_table() {
    for q in ["1.74", "2.33", "2.9", "6.94", "9.46", "19.87"] {
        assert!(row(&guidance_rows::get(&format!("pain_{q}"))), "{q}");
    }
}

/// Source: the same table, from memory; rows that the file of checks leaves out.
#[test]
fn fit_stays_by_the_rest_of_the_table() {
    for (q, table) in [(4.73, 16.0), (11.67, 4.0)] {
        let found = longest("pain-time", q * 1000.0);
        assert!(
            (found - table).abs() <= 0.12 * table,
            "at {q} kW/m²: {found} s, in the table {table} s"
        );
    }
}

/// Source: thermal dose for pain, 92 (kW/m²)^(4/3)·s, read in a text that cites HSL/2004/04; Mudan and Croce, t = 125·q^-1.9 s, from memory.
#[test]
fn other_figures_are_shorter_as_the_caution_says() {
    for q in [1.71, 3.0, 5.0, 10.0, 20.0, 40.0_f64] {
        let found = longest("pain-time", q * 1000.0);
        let (dose, conservative) = (92.0 * q.powf(-4.0 / 3.0), 125.0 * q.powf(-1.9));
        assert!(
            dose < found && conservative < found,
            "at {q} kW/m²: {found} s, by dose {dose} s, by Mudan and Croce {conservative} s"
        );
    }
}

/// Source: Stoll and Greene 1959, recalled; API 521, older table, recalled.
#[test]
fn shortest_time_is_never_above_any_published_table() {
    for (q, forearm) in [
        (4.2, 13.5),
        (6.3, 7.8),
        (8.4, 5.5),
        (12.6, 2.9),
        (16.8, 2.2),
    ] {
        let best = shortest(q * 1000.0).expect("fair").expect("it hurts");
        assert!(
            best.time <= forearm,
            "at {q} kW/m²: {} s by {:?}, in the table {forearm} s",
            best.time,
            best.relation
        );
    }
    for (q, flare) in [(1.74, 60.0), (4.73, 16.0), (9.46, 6.0), (19.87, 2.0)] {
        let best = shortest(q * 1000.0).expect("fair").expect("it hurts");
        assert!(
            best.time <= flare,
            "at {q} kW/m²: {} s against {flare} s",
            best.time
        );
    }
}

/// Source: the reference data warns of the form 35·q^-1.33, a third of the right one.
#[test]
fn the_ratio_is_raised_to_the_power_and_not_the_irradiance_alone() {
    let found = longest("pain-time", 4730.0);
    let wrong = 35.0 * 4.73_f64.powf(-1.33);
    assert!(
        found > 3.0 * wrong,
        "{found} s, by the wrong form {wrong} s"
    );
}
