//! Published exposure limits as data, and how an exposure is judged by them.
//!
//! Limits live in `resources/guidance/*.json`, never in code; shipped files and
//! a user's own pass the same gate. Nothing here claims to be the law.
//!
//! A row is always judged with its whole family, that is, what it is continued
//! by and what continues into it: one row alone would allow what its neighbour
//! forbids.
//!
//! # How to add a limit
//!
//! Write one object in a file of its own, name it in `library.rs`, and hold a
//! published number against it in `tests/published`. A user's file holds one
//! such object or a list of them.
//!
//! | field | holds |
//! | --- | --- |
//! | `id` | small letters, digits, hyphens: how notebooks call it, for ever |
//! | `title` | what it limits, in a few words |
//! | `document`, `issuer`, `edition`, `clause` | the citation: without it nothing is loaded |
//! | `reference`, `reference_how_known` | where it appeared, if known; `memory` if left out |
//! | `standing` | `law`, `guidance`, `evidence` or `site rule` |
//! | `jurisdiction` | where that holds, in words |
//! | `effect`, `organ` | the harm in words; one of [`Organ::ALL`] by name |
//! | `metric` | `quantity`, `band` and `weighting`, as [`Metric::written`] |
//! | `limit` | list of pieces in order of time: `until` (its end belongs to it) or `before` (it does not), and `limit`, an entry in the exposure time `t` with its unit |
//! | `from` | the time at which it begins, for rows that continue another |
//! | `continued_by` | the row that holds from where this one ends |
//! | `valid` | where it applies, and to which side its bounds belong |
//! | `how_known`, `band_how_known` | `read`, `memory` or `common practice`: never more surely than so |
//! | `where_known` | where it was read, and what of it was recalled |
//! | `caution` | what must be said beside it |
//!
//! As an irradiance, a limit is positive and never rises with time. Where two
//! `pieces` or rows meet with a step, the step is kept.

mod course;
mod error;
mod finding;
mod form;
mod gate;
mod library;
mod limit;
mod link;
mod metric;
mod overall;
mod read;
mod standing;
mod written;

pub use course::{Allowed, Course};
pub use error::{Error, Fault};
pub use finding::{Dose, Finding, Judgement, Reason};
pub use library::Library;
pub use limit::{Limit, Origin, Piece};
pub use metric::{Envelope, Exposure, Metric, Organ};
pub use overall::{NEEDED, Overall, overall};
pub use standing::{HowKnown, Standing};

/// What is printed beside every limit.
pub const CHECK_EDITION: &str = "check the edition in force where you work";
