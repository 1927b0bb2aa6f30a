//! What weight a limit carries, and how its numbers are known.
//!
//! Both are said in words on screen and paper; neither is ever raised.

/// The weight of a limit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Standing {
    /// Binding where its jurisdiction reaches.
    Law,
    /// Advice of a recognised body; binding only where a law takes it up.
    Guidance,
    /// What was observed on people or skin: never a limit, never `within`.
    Evidence,
    /// A rule that this site set for itself.
    SiteRule,
}

impl Standing {
    /// Every standing, in order of weight.
    pub const ALL: [Self; 4] = [Self::Law, Self::Guidance, Self::Evidence, Self::SiteRule];

    /// Returns the word that files and people use.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Law => "law",
            Self::Guidance => "guidance",
            Self::Evidence => "evidence",
            Self::SiteRule => "site rule",
        }
    }

    /// Returns the standing that `word` names.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|s| s.word() == word)
    }
}

/// How a value is known to this program.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum HowKnown {
    /// Seen in a published text, or in one that quotes it.
    Read,
    /// Recalled; nobody has compared it with the published text.
    Memory,
    /// Custom of the trade, without a source.
    CommonPractice,
}

impl HowKnown {
    /// Every way, the surest first.
    pub const ALL: [Self; 3] = [Self::Read, Self::Memory, Self::CommonPractice];

    /// Returns the word that files use.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Read => "read",
            Self::Memory => "memory",
            Self::CommonPractice => "common practice",
        }
    }

    /// Returns the words that people read.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Read => "read in a text that prints or quotes it",
            Self::Memory => "recalled, not read: confirm in the edition in force",
            Self::CommonPractice => "common practice, no source",
        }
    }

    /// Returns the way that `word` names.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|h| h.word() == word)
    }
}
