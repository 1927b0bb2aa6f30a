//! Published exposure limits as data, and how an exposure is judged by them.
//!
//! Limits live in `resources/guidance/*.json`, never in code; shipped files and
//! a user's own pass the same gate. Nothing here claims to be the law.
//!
//! A row is always judged with its whole family, that is, what it is continued
//! by and what continues into it: one row alone would allow what its neighbour
//! forbids.

mod course;
mod error;
mod finding;
mod form;
mod library;
mod limit;
mod link;
mod metric;
mod nearest;
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
