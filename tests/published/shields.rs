//! Radiation shields and plates in balance: computed rows, and textbooks.

use farglow::physics::screen::{Convection, Face, Plate, Walls};

use crate::rows::{self, Row};

/// Net flux between two large walls with plates between them.
pub fn net_flux(row: &Row) -> Option<f64> {
    let plates: Vec<[f64; 2]> =
        serde_json::from_value(row.inputs["shields_front_back"].clone()).ok()?;
    walls(row, &plates).net_flux().ok()
}

fn walls<'a>(row: &Row, plates: &'a [[f64; 2]]) -> Walls<'a> {
    // The reduction by a shield does not depend on the temperatures.
    let temperature = |name: &str, otherwise| row.inputs[name].as_f64().unwrap_or(otherwise);
    Walls {
        from: temperature("T1_K", 1000.0),
        from_emissivity: row.number("e1"),
        to: temperature("T2_K", 300.0),
        to_emissivity: row.number("e2"),
        plates,
    }
}

/// The worked examples of textbooks on one shield.
pub fn textbook(row: &Row) -> Option<f64> {
    let emissivity = row.inputs["e_shield"].as_f64()?;
    let plates = [[emissivity; 2]];
    let (with, without) = (walls(row, &plates), walls(row, &[]));
    match row.quantity.as_str() {
        "net flux with one shield [W/m2]" => with.net_flux().ok(),
        "shield temperature [K]" => Some(with.temperatures().ok()?[0]),
        "reduction by one shield [%]" => {
            Some(100.0 * (1.0 - with.net_flux().ok()? / without.net_flux().ok()?))
        }
        _ => None,
    }
}

/// Temperature of a plate that absorbs from a hot source and from the room, and
/// gives off by both faces and to the air.
pub fn plate_balance(row: &Row) -> Option<f64> {
    let room = row.number("T_air_and_surroundings_K");
    let emissivities = row.number("e_front") + row.number("e_back");
    let black = farglow::physics::planck::exitance(room);
    let face = Face {
        along: 1.0,
        area_over_perimeter: 0.25,
        longest: 1.0,
        upward: 0.0,
    };
    let plate = Plate {
        emissivities,
        covered: 1.0,
        faces: [face; 2],
        convection: Convection::Stated(row.number("h_W_m2K_each_side")),
        air: room,
    };
    let absorbed = row.number("absorptance_front") * row.number("G_W_m2") + emissivities * black;
    Some(plate.temperature(absorbed))
}

/// Source: large parallel grey plates, computed (rows of family shield).
#[test]
fn shields_let_through_what_the_relation_says() {
    assert_eq!(rows::check("shield", net_flux), 3);
}

/// Source: thin plate in balance, computed by another root finder (rows of family plate_balance).
#[test]
fn plates_take_the_temperature_of_their_balance() {
    assert_eq!(rows::check("plate_balance", plate_balance), 3);
}

/// Source: the same rows, their notes: exitance of the back face, W/m², to the digits printed.
#[test]
fn plates_send_on_what_the_notes_say() {
    for (id, expected) in [
        ("plate_balance-01", 2918.28),
        ("plate_balance-03", 48.21),
        ("plate_balance-05", 1285.66),
    ] {
        let rows = rows::all();
        let row = rows
            .iter()
            .find(|row| row.id == id)
            .expect("the row is there");
        let temperature = plate_balance(row).expect("the row runs");
        let found = row.number("e_back") * farglow::physics::planck::exitance(temperature);
        assert!(
            (found - expected).abs() <= 0.005,
            "{id}: {found} against {expected}"
        );
    }
}

/// Source: a solution sheet on radiation heat transfer, problem 12-100 (read); Cengel and Rajput (memory): rows textbook-09, -10, -13 and -14.
#[test]
fn textbook_shields_are_met() {
    assert_eq!(rows::check("textbook", textbook), 4);
}
