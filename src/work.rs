//! Long work off the calling thread: bounds drawn for a frozen notebook, with
//! progress, and given up as soon as its inputs change.
//!
//! Dropping a [`Job`] gives it up; nothing that was given up is handed over.

use std::sync::Arc;
use std::sync::atomic::{AtomicBool, AtomicU32, Ordering};
use std::thread;

use crate::notebook::results::Results;
use crate::notebook::snapshot::Snapshot;
use crate::notebook::uncertainty::Settings;

/// Work that is under way on another thread.
#[derive(Debug)]
pub struct Job {
    flags: Arc<Flags>,
}

#[derive(Debug, Default)]
struct Flags {
    given_up: AtomicBool,
    /// What is done, in thousandths.
    done: AtomicU32,
}

impl Job {
    /// Draws the bounds of everything in a snapshot on a thread of its own, and
    /// hands the results to `finished` there.
    ///
    /// `finished` is not called once the job was given up. Where no thread can
    /// be had, the work is done before this returns: late, but done.
    pub fn start(
        snapshot: Snapshot,
        settings: Settings,
        finished: impl FnOnce(Results) + Send + 'static,
    ) -> Job {
        let flags = Arc::new(Flags::default());
        let job = Job {
            flags: Arc::clone(&flags),
        };
        // Handed over through a shared place, so that it is still here if the
        // thread is refused.
        let task = Arc::new(std::sync::Mutex::new(Some(move || {
            run(&snapshot, settings, &flags, finished);
        })));
        let there = Arc::clone(&task);
        let started = thread::Builder::new()
            .name("bounds".to_owned())
            .spawn(move || take(&there).map(|task| task()));
        if started.is_err() {
            let _ = take(&task).map(|task| task());
        }
        job
    }

    /// Returns the share that is done, `0..=1`.
    #[must_use]
    pub fn progress(&self) -> f32 {
        let thousandths = self.flags.done.load(Ordering::Relaxed).min(1000);
        // At most 1000, which a single holds exactly.
        #[allow(clippy::cast_precision_loss)]
        let share = thousandths as f32 / 1000.0;
        share
    }

    /// Gives the work up.
    pub fn give_up(&self) {
        self.flags.given_up.store(true, Ordering::Relaxed);
    }
}

impl Drop for Job {
    fn drop(&mut self) {
        self.give_up();
    }
}

fn take<T>(place: &std::sync::Mutex<Option<T>>) -> Option<T> {
    place.lock().ok().and_then(|mut task| task.take())
}

fn run(snapshot: &Snapshot, settings: Settings, flags: &Flags, finished: impl FnOnce(Results)) {
    let results = snapshot.results(settings, &mut |share| {
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
        let thousandths = (share.clamp(0.0, 1.0) * 1000.0) as u32;
        flags.done.store(thousandths, Ordering::Relaxed);
        !flags.given_up.load(Ordering::Relaxed)
    });
    if let Some(results) = results
        && !flags.given_up.load(Ordering::Relaxed)
    {
        flags.done.store(1000, Ordering::Relaxed);
        finished(results);
    }
}

#[cfg(test)]
mod tests {
    use std::sync::mpsc;
    use std::time::Duration;

    use super::*;
    use crate::notebook::engine::Engine;
    use crate::notebook::{Cell, Kind, Notebook};

    fn snapshot() -> Snapshot {
        let notebook = Notebook {
            cells: vec![
                Cell::new(Kind::Value, "t").with("entry", "1250 ± 25 °C"),
                Cell::new(Kind::Formula, "twice").with("entry", "2 * t"),
            ],
            ..Notebook::default()
        };
        Snapshot::of(&Engine::open(notebook).expect("the names are legal"))
    }

    #[test]
    fn bounds_from_the_thread_are_those_of_the_snapshot() {
        let (sender, receiver) = mpsc::channel();
        let job = Job::start(snapshot(), Settings::default(), move |results| {
            sender.send(results).expect("the test waits for it");
        });
        let found = receiver
            .recv_timeout(Duration::from_secs(60))
            .expect("the work ends");
        let expected = snapshot()
            .results(Settings::default(), &mut |_| true)
            .expect("it is never told to stop");
        let upper = |results: &Results| {
            results
                .cell("twice")
                .and_then(|cell| cell.shown("value"))
                .and_then(crate::notebook::results::Shown::upper)
        };
        assert_eq!(upper(&found), upper(&expected));
        assert!(upper(&found) > Some(2.0 * 1523.15), "{:?}", upper(&found));
        assert!((job.progress() - 1.0).abs() < 1e-6, "{}", job.progress());
    }

    #[test]
    fn what_was_given_up_is_not_handed_over() {
        let (sender, receiver) = mpsc::channel();
        let settings = Settings {
            draws: 2_000_000,
            ..Settings::default()
        };
        drop(Job::start(snapshot(), settings, move |results| {
            let _ = sender.send(results);
        }));
        // The sender goes away with the thread's end, without a result.
        let answer = receiver.recv_timeout(Duration::from_secs(60));
        assert_eq!(answer.err(), Some(mpsc::RecvTimeoutError::Disconnected));
    }
}
