//! A notebook worked out and frozen: it can go to another thread, and asking it
//! the same question gives the same answer.

use super::engine::Engine;
use super::results::Results;
use super::uncertainty::{Bounds, Settings};

/// A frozen copy of an engine.
#[derive(Clone, Debug)]
pub struct Snapshot {
    engine: Engine,
}

impl Snapshot {
    /// Freezes a copy of the engine as it stands.
    #[must_use]
    pub fn of(engine: &Engine) -> Self {
        Snapshot {
            engine: engine.clone(),
        }
    }

    /// Returns the engine that is frozen in it.
    #[must_use]
    pub const fn engine(&self) -> &Engine {
        &self.engine
    }

    /// Draws all spreads and returns every result with its bounds.
    ///
    /// `go_on` is asked now and then with the share that is done, and ends the
    /// work by answering `false`; the result is then `None`.
    #[must_use]
    pub fn results(
        &self,
        settings: Settings,
        go_on: &mut dyn FnMut(f64) -> bool,
    ) -> Option<Results> {
        let bounds = self.engine.bounds(settings, go_on)?;
        Some(Results::new(&self.engine, &bounds))
    }

    /// Returns every result without bounds, as it stands while an edit is
    /// being drawn. Findings are then those of the nominal values.
    #[must_use]
    pub fn nominal(&self) -> Results {
        Results::new(&self.engine, &Bounds::default())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_snapshot_can_go_to_another_thread() {
        fn assert_send<T: Send + Sync>() {}
        assert_send::<Snapshot>();
    }
}
