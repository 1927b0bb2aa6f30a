//! The findings of one position drawn together.

use super::{Finding, Limit, Organ};

/// What must be covered before anything may be called `within`.
pub const NEEDED: [Organ; 4] = Organ::ALL;

/// The findings of one position drawn together.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Overall {
    /// At least one limit is passed or onset reached.
    Over {
        /// The organs whose limit is passed.
        limits: Vec<Organ>,
        /// The organs for which evidence says that the effect sets in.
        onsets: Vec<Organ>,
    },
    /// Nothing is over, but these effects are covered by no limit.
    NotAssessed {
        /// What is missing, in the order of [`NEEDED`].
        missing: Vec<Organ>,
        /// What is covered and within.
        within: Vec<Organ>,
    },
    /// Every needed effect is covered and within.
    Within {
        /// The effects it covers.
        covers: Vec<Organ>,
    },
}

/// Draws findings together: over if any is, else not assessed while a needed
/// effect is missing, else within.
///
/// Evidence never covers an effect: `below onset` is not `within`.
#[must_use]
pub fn overall<'a>(findings: impl IntoIterator<Item = (&'a Limit, Finding)>) -> Overall {
    let (mut limits, mut onsets, mut within) = (Vec::new(), Vec::new(), Vec::new());
    for (limit, finding) in findings {
        match finding {
            Finding::Over => limits.push(limit.organ),
            Finding::OnsetReached => onsets.push(limit.organ),
            Finding::Within => within.push(limit.organ),
            Finding::NotAssessed(_) | Finding::BelowOnset => {}
        }
    }
    for organs in [&mut limits, &mut onsets, &mut within] {
        organs.sort_unstable();
        organs.dedup();
    }
    if !limits.is_empty() || !onsets.is_empty() {
        return Overall::Over { limits, onsets };
    }
    let missing: Vec<Organ> = NEEDED
        .into_iter()
        .filter(|organ| !within.contains(organ))
        .collect();
    if missing.is_empty() {
        Overall::Within { covers: within }
    } else {
        Overall::NotAssessed { missing, within }
    }
}

impl Overall {
    /// Returns the word by which it is known everywhere.
    #[must_use]
    pub const fn word(&self) -> &'static str {
        match self {
            Self::Over { .. } => "over",
            Self::NotAssessed { .. } => "not assessed",
            Self::Within { .. } => "within",
        }
    }

    /// Returns the word with the effects it speaks of.
    ///
    /// # Examples
    ///
    /// "over: eye (cornea and lens); onset reached: skin" and
    /// "not assessed: retina, skin, heat strain".
    #[must_use]
    pub fn text(&self) -> String {
        match self {
            Self::Over { limits, onsets } if limits.is_empty() => {
                format!("over: onset reached: {}", list(onsets))
            }
            Self::Over { limits, onsets } if onsets.is_empty() => {
                format!("over: {}", list(limits))
            }
            Self::Over { limits, onsets } => {
                format!("over: {}; onset reached: {}", list(limits), list(onsets))
            }
            Self::NotAssessed { missing, within } if within.is_empty() => {
                format!("not assessed: {}", list(missing))
            }
            Self::NotAssessed { missing, within } => {
                format!("not assessed: {}; within: {}", list(missing), list(within))
            }
            Self::Within { covers } => format!("within: {}", list(covers)),
        }
    }
}

fn list(organs: &[Organ]) -> String {
    let names: Vec<&str> = organs.iter().map(|organ| organ.name()).collect();
    names.join(", ")
}
