/// The number of a run; later runs have higher numbers, 0 is before the first.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug, Default)]
pub struct Revision(u64);

impl Revision {
    pub(super) fn next(self) -> Revision {
        Revision(self.0.wrapping_add(1))
    }

    /// Returns the revision as a plain number.
    #[must_use]
    pub fn number(self) -> u64 {
        self.0
    }
}
