//! What ties rows to one another: unique ids, and successors that adjoin.

use std::collections::BTreeMap;
use std::collections::btree_map::Entry;

use super::course::{Course, Stretch};
use super::error::{irradiance, seconds};
use super::read::Read;
use super::{Fault, Limit};
use crate::spelling::nearest;

/// The rows of one family by their place in the library, and their course.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Family {
    pub(super) rows: Vec<usize>,
    pub(super) course: Course,
}

/// Limits in the order of their ids, with the family of each.
pub(super) struct Linked {
    pub(super) limits: Vec<Limit>,
    pub(super) families: Vec<Family>,
    /// For each limit, its family.
    pub(super) family_of: Vec<usize>,
}

/// Links limits that were read to those there are.
///
/// # Errors
///
/// Every fault between rows, at the place in the file that brought it.
pub(super) fn link(there: &[Limit], read: &[Read]) -> Result<Linked, Vec<Fault>> {
    let mut faults = Vec::new();
    let mut limits = there.to_vec();
    let mut titles: BTreeMap<&str, &str> = there
        .iter()
        .map(|limit| (limit.id.as_str(), limit.title.as_str()))
        .collect();
    for new in read {
        let (id, title) = (new.limit.id.as_str(), new.limit.title.as_str());
        match titles.entry(id) {
            Entry::Vacant(free) => {
                let _ = free.insert(title);
                limits.push(new.limit.clone());
            }
            Entry::Occupied(taken) => faults.push(new.fault(
                new.id_place,
                "id",
                format!(
                    "the id `{id}` is taken by \"{}\": give this limit another",
                    taken.get()
                ),
            )),
        }
    }
    if !faults.is_empty() {
        return Err(faults);
    }
    limits.sort_by(|a, b| a.id.cmp(&b.id));
    let read_of = |id: &str| read.iter().find(|new| new.limit.id == id);

    let mut next: Vec<Option<usize>> = vec![None; limits.len()];
    let mut previous: Vec<Option<usize>> = vec![None; limits.len()];
    for (at, limit) in limits.iter().enumerate() {
        let Some(successor) = &limit.continued_by else {
            continue;
        };
        // A fault between two rows belongs to the one that was read now.
        let mut refuse = |message: String| {
            if let Some(new) = read_of(&limit.id) {
                faults.push(new.fault(new.continued_place, "continued_by", message));
            } else if let Some(new) = read_of(successor) {
                faults.push(new.fault(new.from_place, "from", message));
            }
        };
        let Some(found) = find(&limits, successor) else {
            let remedy = nearest(successor, limits.iter().map(|limit| limit.id.as_str()))
                .map_or_else(
                    || ": write the id of a limit that is loaded".to_owned(),
                    |near| format!(", did you mean `{near}`?"),
                );
            refuse(format!("no limit is named `{successor}`{remedy}"));
            continue;
        };
        // Times only grow along a chain, so one that closes does not fit somewhere.
        if let Some(message) = misfit(limit, &limits[found]) {
            refuse(if loops(&limits, at) {
                format!(
                    "`{}` comes to continue itself by way of `{successor}`: one row of a chain must be the last",
                    limit.id
                )
            } else {
                message
            });
        }
        if let Some(other) = previous[found] {
            refuse(format!(
                "`{successor}` already continues `{}`, and a row continues one other at most",
                limits[other].id
            ));
        }
        previous[found] = Some(at);
        next[at] = Some(found);
    }
    if !faults.is_empty() {
        return Err(faults);
    }

    // Successors begin where a row ends and every row ends after it begins, so no chain closes.
    let mut families = Vec::new();
    let mut family_of = vec![0; limits.len()];
    for first in (0..limits.len()).filter(|&at| previous[at].is_none()) {
        let rows: Vec<usize> = std::iter::successors(Some(first), |&at| next[at]).collect();
        for &row in &rows {
            family_of[row] = families.len();
        }
        let course = course(rows.iter().map(|&row| &limits[row]));
        families.push(Family { rows, course });
    }
    Ok(Linked {
        limits,
        families,
        family_of,
    })
}

/// Returns where the limit of that id is among limits in the order of their ids.
pub(super) fn find(limits: &[Limit], id: &str) -> Option<usize> {
    limits
        .binary_search_by(|limit| limit.id.as_str().cmp(id))
        .ok()
}

/// Returns whether the chain of successors of a row comes back to it.
fn loops(limits: &[Limit], from: usize) -> bool {
    let mut at = from;
    for _ in limits {
        let next = limits[at].continued_by.as_deref();
        let Some(next) = next.and_then(|id| find(limits, id)) else {
            return false;
        };
        if next == from {
            return true;
        }
        at = next;
    }
    false
}

/// Returns why a row cannot be continued by another, if it cannot.
fn misfit(row: &Limit, successor: &Limit) -> Option<String> {
    let id = &successor.id;
    if row.metric != successor.metric || row.organ != successor.organ {
        return Some(format!(
            "expected a successor for {} of the {}, found `{id}` for {} of the {}",
            row.metric.name(),
            row.organ.name(),
            successor.metric.name(),
            successor.organ.name()
        ));
    }
    if row.is_evidence() != successor.is_evidence() {
        return Some(format!(
            "expected evidence to be continued by evidence and limits by limits, found `{id}`, which is {}",
            successor.standing.word()
        ));
    }
    let (last, first) = (row.pieces.last()?, successor.pieces.first()?);
    let end = last.until?;
    // Both times are written by people: the same text gives the same bits.
    if end.to_bits() != successor.from.to_bits() {
        return Some(format!(
            "expected a successor from {}, where this row ends, found `{id}` from {}",
            seconds(end),
            seconds(successor.from)
        ));
    }
    let (before, after) = (last.form.at(end), first.form.at(end));
    (after > before * (1.0 + 1e-12)).then(|| {
        format!(
            "expected a limit that never rises with time, found a step up from {} to {} at {}, where `{id}` begins",
            irradiance(before), irradiance(after), seconds(end)
        )
    })
}

/// Joins the pieces of a family's rows, which are in order of time and adjoin.
fn course<'a>(rows: impl Iterator<Item = &'a Limit>) -> Course {
    let mut stretches: Vec<Stretch> = Vec::new();
    let (mut evidence, mut dose) = (false, false);
    for row in rows {
        evidence = row.is_evidence();
        dose = row.metric.is_dose();
        for piece in &row.pieces {
            let (start, start_taken) = stretches
                .last()
                .and_then(|before| Some((before.end?, before.includes_end)))
                .unwrap_or((row.from, true));
            stretches.push(Stretch {
                start,
                start_taken,
                end: piece.until,
                includes_end: piece.includes_end,
                form: piece.form.clone(),
            });
        }
    }
    Course::new(stretches, evidence, dose)
}
