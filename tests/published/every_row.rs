//! No row of the file of checks is forgotten: each runs, or waits for a reason.

use crate::rows::{self, Row, Work};
use crate::{
    blackbody_tables, cavities, defining_constants, fixed_points, quadrature_of_planck, shields,
    shop_air, textbook_examples, thick_openings, view_factor_catalogue,
};

/// The families that run, with what works their rows out.
const RUNNING: [(&str, Work); 42] = [
    ("constant", defining_constants::constant),
    ("its90", fixed_points::celsius),
    ("bb_table_modest", blackbody_tables::below),
    ("bb_table_incropera", blackbody_tables::below),
    ("bb_table_misprint", blackbody_tables::below),
    ("bb_exact", blackbody_tables::below),
    ("bb_band", quadrature_of_planck::band),
    ("disc_axis", view_factor_catalogue::disc_axis),
    ("disc_parallel", view_factor_catalogue::disc_parallel),
    (
        "disc_perpendicular",
        view_factor_catalogue::disc_perpendicular,
    ),
    (
        "disc_perpendicular_cut",
        view_factor_catalogue::disc_perpendicular,
    ),
    ("disc_pose", view_factor_catalogue::disc_pose),
    ("ring", view_factor_catalogue::ring),
    ("sphere_tilt", view_factor_catalogue::sphere_tilt),
    ("disc_axis_tilt", view_factor_catalogue::disc_axis_tilt),
    (
        "rect_parallel_corner",
        view_factor_catalogue::rect_parallel_corner,
    ),
    (
        "rect_perpendicular_corner",
        view_factor_catalogue::rect_perpendicular_corner,
    ),
    ("rect_pose", view_factor_catalogue::rect_pose),
    ("polygon", view_factor_catalogue::polygon),
    ("strip", view_factor_catalogue::strip),
    ("textbook", textbook),
    ("shield", shields::net_flux),
    ("plate_balance", shields::plate_balance),
    ("atmosphere_pw", shop_air::power_law),
    ("atmosphere_wayne", shop_air::wayne),
    ("atmosphere_bound", shop_air::most_absorbed),
    ("disc_disc", view_factor_catalogue::disc_disc),
    (
        "rect_rect_parallel",
        view_factor_catalogue::rect_rect_parallel,
    ),
    (
        "rect_rect_perpendicular",
        view_factor_catalogue::rect_rect_perpendicular,
    ),
    ("thick_round_black", thick_openings::round_black),
    ("thick_round_reradiating", thick_openings::round_reradiating),
    ("thick_square_black", thick_openings::square_black),
    (
        "thick_square_reradiating",
        thick_openings::square_reradiating,
    ),
    ("thick_slot_black", thick_openings::slot_black),
    ("thick_slot_reradiating", thick_openings::slot_reradiating),
    ("thick_on_axis", thick_openings::on_axis),
    ("thick_beam", thick_openings::beam),
    ("thick_published", thick_openings::chart),
    ("cavity_exact", cavities::exact),
    ("cavity_enclosure", cavities::enclosure),
    ("cavity_gouffe", cavities::gouffe),
    ("cylinder", view_factor_catalogue::cylinder),
];

/// Worked examples of textbooks, whichever relation they are of.
fn textbook(row: &Row) -> Option<f64> {
    textbook_examples::factor(row).or_else(|| shields::textbook(row))
}

/// Rows, or whole families, that the program cannot work out yet.
const PENDING: [(&str, &str); 8] = [
    (
        "its90-01",
        "a defining point, nothing to work out: for the list of process temperatures",
    ),
    (
        "its90-04",
        "a defining point, nothing to work out: for the list of process temperatures",
    ),
    (
        "its90-05",
        "a defining point, nothing to work out: for the list of process temperatures",
    ),
    (
        "its90-06",
        "a defining point, nothing to work out: for the list of process temperatures",
    ),
    (
        "textbook-01",
        "exchange between cylinder and slotted shell: no such source",
    ),
    (
        "textbook-03",
        "exchange between cylinder and slotted shell: no such source",
    ),
    (
        "uncertainty",
        "spread of results is the notebook's: checked with it",
    ),
    (
        "fresnel_emissivity",
        "emissivity of glass melts: with the list of materials",
    ),
];

/// Source: `resources/checks/physics_checks.json`, all 353 rows.
#[test]
fn every_row_runs_or_waits_for_a_stated_reason() {
    let rows = rows::all();
    assert_eq!(
        rows.len(),
        353,
        "the file of checks has changed: state what is new here"
    );
    let (mut ran, mut waits) = (0, 0);
    let mut used = vec![false; PENDING.len()];
    for row in &rows {
        let work = RUNNING.iter().find(|(family, _)| *family == row.family);
        let pending = PENDING
            .iter()
            .position(|(name, _)| *name == row.id || *name == row.family);
        let value = work.and_then(|(_, work)| work(row));
        match (value, pending) {
            (Some(value), None) => {
                assert!(value.is_finite(), "{} gives {value}", row.id);
                ran += 1;
            }
            (None, Some(index)) => {
                assert!(
                    !PENDING[index].1.is_empty(),
                    "{} waits without a reason",
                    row.id
                );
                used[index] = true;
                waits += 1;
            }
            (Some(_), Some(_)) => panic!("{} runs and is listed as pending", row.id),
            (None, None) => panic!("{} of family {} neither runs nor waits", row.id, row.family),
        }
    }
    for (index, used) in used.iter().enumerate() {
        assert!(used, "no row is called {}", PENDING[index].0);
    }
    assert_eq!(
        (ran, waits),
        (RAN, rows.len() - RAN),
        "rows that ran and rows that wait"
    );
}

/// How many rows run: it may only grow.
const RAN: usize = 337;
