//! No row of `resources/checks/guidance_checks.json` is forgotten: each runs
//! here, runs in a module that is named, or waits for a reason.

use crate::{burns, directive_2006_25, guidance_rows, heat_strain_rows, time_to_pain};

/// Rows that another module holds, beside what is held here: id or its beginning, what is
/// held there, and that module's text, which must name them.
const RUN_ELSEWHERE: [(&str, &str, &str); 2] = [
    ("bb_", "run in ladle_case", LADLE_CASE),
    (
        "tros_ladle_numbers",
        "run in ladle_case, all but row m and ultraviolet",
        LADLE_CASE,
    ),
];

const LADLE_CASE: &str = include_str!("ladle_case.rs");

/// Rows that cannot be held yet: id or its beginning, reason.
const PENDING: [(&str, &str); 3] = [
    ("cont_", "rows g to i of the directive: with the retina"),
    (
        "tros_ladle_verdict",
        "rows a to l of the directive: with ultraviolet and retina",
    ),
    ("shade3", "scale numbers of filters: with protection worn"),
];

/// Source: `resources/checks/guidance_checks.json`, all rows.
#[test]
fn every_row_of_guidance_runs_or_waits_for_a_stated_reason() {
    let rows = guidance_rows::all();
    let (mut here, mut elsewhere, mut waits) = (0, 0, 0);
    let mut used = vec![false; PENDING.len()];
    for row in &rows {
        let held = directive_2006_25::row(row)
            | time_to_pain::row(row)
            | burns::row(row)
            | heat_strain_rows::row(row);
        let other = RUN_ELSEWHERE
            .iter()
            .any(|(name, _, _)| row.id.starts_with(name));
        let pending = PENDING
            .iter()
            .position(|(name, _)| row.id.starts_with(name));
        match (held, other, pending) {
            (true, _, None) => here += 1,
            (false, true, None) => elsewhere += 1,
            (false, false, Some(index)) => {
                assert!(!PENDING[index].1.is_empty(), "{} has no reason", row.id);
                used[index] = true;
                waits += 1;
            }
            (false, false, None) => panic!("{} neither runs nor waits", row.id),
            (true, _, Some(_)) | (_, true, Some(_)) => {
                panic!("{} runs and is listed as pending", row.id)
            }
        }
    }
    for (index, used) in used.iter().enumerate() {
        assert!(used, "no row is called {}", PENDING[index].0);
    }
    assert_eq!(
        here + elsewhere + waits,
        rows.len(),
        "every row counts once"
    );
    // Figures that may only grow on the left.
    assert_eq!(
        (here, elsewhere, waits),
        (48, 6, 4),
        "of {} rows",
        rows.len()
    );
}
