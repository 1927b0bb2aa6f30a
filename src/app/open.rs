//! Opening the window: on a file, on the notebook that was open last, or on
//! the demo; or saying why no window can be had.

use std::ffi::OsStr;
use std::panic::{self, AssertUnwindSafe};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

use iced::{Size, Task, window};

use super::desk::Desk;
use super::{Message, Window};
use crate::store::settings::{self, Settings};
use crate::store::template::DEMO;

/// Why no window was opened; each in one helpful line.
#[derive(Debug, thiserror::Error)]
pub enum Unopened {
    /// There is no display.
    #[error(
        "there is no display to open a window on (neither DISPLAY nor WAYLAND_DISPLAY is set): \
         start farglow on a desktop, or run `farglow calc FILE` for the figures without a window"
    )]
    NoDisplay,
    /// A library that displays need is missing.
    #[error(
        "the library {0} is missing, without which no window opens: install it (on Debian or \
         Ubuntu: `sudo apt-get install libx11-6 libx11-xcb1 libxcursor1 libxi6 \
         libxkbcommon-x11-0 xkb-data`), or run `farglow calc FILE` for the figures without a window"
    )]
    NoLibrary(&'static str),
    /// Whatever answers for the display is silent: it, or something that it
    /// needs, is not there.
    #[error(
        "the display does not answer, so no window opens: see that DISPLAY or WAYLAND_DISPLAY names \
         one that runs and that what it needs is installed (on Debian or Ubuntu: `sudo apt-get \
         install libx11-6 libx11-xcb1 libxcursor1 libxi6 libxkbcommon-x11-0 xkb-data`), or run \
         `farglow calc FILE` for the figures without a window"
    )]
    Silent,
    /// The window could not be made.
    #[error(
        "the window could not be opened ({0}): run `farglow calc FILE` for the figures without a \
         window"
    )]
    Refused(String),
    /// The file that was asked for is no notebook.
    #[error(transparent)]
    File(#[from] super::Error),
}

/// Opens the window and returns when it was closed.
///
/// # Errors
///
/// [`Unopened`] where the file is no notebook or no window can be had.
pub fn start(file: Option<&Path>) -> Result<(), Unopened> {
    can_open(&|name| std::env::var_os(name), &library)?;
    let place = settings::place();
    let (settings, said) = place
        .as_deref()
        .map_or_else(|| (Settings::default(), None), settings::load);
    let (desk, said) = first(file, &settings, said)?;
    let mut window = Window::new(desk, &settings, place);
    window.said = said.map(|said| (true, said));
    run(window, &settings)
}

/// Returns the notebook to begin with, and what is to be said about it.
fn first(
    file: Option<&Path>,
    settings: &Settings,
    said: Option<String>,
) -> Result<(Desk, Option<String>), Unopened> {
    if let Some(file) = file {
        return Ok((Desk::open(file)?, said));
    }
    if let Some(last) = &settings.last {
        match Desk::open(last) {
            Ok(desk) => return Ok((desk, said)),
            Err(error) => {
                let said = format!("{error}; this is the demo instead");
                return Ok((Desk::from_template(DEMO)?, Some(said)));
            }
        }
    }
    Ok((Desk::from_template(DEMO)?, said))
}

fn run(window: Window, settings: &Settings) -> Result<(), Unopened> {
    // The window is made once; a program that boots twice would find it gone.
    let window = std::cell::RefCell::new(Some(window));
    let begun = Arc::new(AtomicBool::new(false));
    let beginning = Arc::clone(&begun);
    let boot = move || {
        beginning.store(true, Ordering::Relaxed);
        let mut window = window.borrow_mut().take().expect("the program boots once");
        let task = window.draw_bounds();
        (window, task)
    };
    let application = iced::application(boot, Window::update, Window::view)
        .title(Window::title)
        .theme(Window::theme)
        .scale_factor(|window: &Window| window.look.zoom)
        .subscription(Window::subscription)
        .settings(super::settings())
        .window(window::Settings {
            size: Size::new(settings.size.0, settings.size.1),
            min_size: Some(Size::new(720.0, 480.0)),
            exit_on_close_request: false,
            ..window::Settings::default()
        });
    guarded(&begun, || {
        application
            .run()
            .map_err(|error| Unopened::Refused(error.to_string()))
    })
}

/// Runs the event loop, which panics where the display does not answer: until
/// the window has begun, that is said like every other reason.
fn guarded(
    begun: &Arc<AtomicBool>,
    run: impl FnOnce() -> Result<(), Unopened>,
) -> Result<(), Unopened> {
    let usual = Arc::new(panic::take_hook());
    let (later, known) = (Arc::clone(&usual), Arc::clone(begun));
    panic::set_hook(Box::new(move |info| {
        if known.load(Ordering::Relaxed) {
            later(info);
        }
    }));
    let outcome = panic::catch_unwind(AssertUnwindSafe(run));
    panic::set_hook(Box::new(move |info| usual(info)));
    match outcome {
        Ok(outcome) => outcome,
        // Our own mistakes stay what they are.
        Err(payload) if begun.load(Ordering::Relaxed) => panic::resume_unwind(payload),
        Err(_) => Err(Unopened::Silent),
    }
}

/// Returns whether a window can be had: the event loop itself panics where it
/// cannot, so this is asked before.
fn can_open(
    variable: &dyn Fn(&str) -> Option<std::ffi::OsString>,
    library: &dyn Fn(&str) -> bool,
) -> Result<(), Unopened> {
    if !cfg!(target_os = "linux") {
        return Ok(());
    }
    let set = |name: &str| variable(name).is_some_and(|value| value.as_os_str() != OsStr::new(""));
    if set("WAYLAND_DISPLAY") {
        return Ok(());
    }
    if !set("DISPLAY") {
        return Err(Unopened::NoDisplay);
    }
    for name in [
        "libX11.so.6",
        "libX11-xcb.so.1",
        "libXcursor.so.1",
        "libXi.so.6",
        "libxkbcommon-x11.so.0",
    ] {
        if !library(name) {
            return Err(Unopened::NoLibrary(name));
        }
    }
    Ok(())
}

/// Returns whether the system's loader would find a library.
fn library(name: &str) -> bool {
    let own = std::env::var_os("LD_LIBRARY_PATH").unwrap_or_default();
    let usual = ["/lib", "/usr/lib", "/lib64", "/usr/lib64", "/usr/local/lib"];
    let folders = std::env::split_paths(&own)
        .chain(usual.into_iter().map(PathBuf::from))
        .flat_map(|folder| {
            // Debian keeps libraries in a folder for each kind of processor.
            let inner = folder.join(format!("{}-linux-gnu", std::env::consts::ARCH));
            [inner, folder]
        });
    let listed = || {
        std::fs::read("/etc/ld.so.cache").is_ok_and(|cache| {
            cache
                .windows(name.len())
                .any(|part| part == name.as_bytes())
        })
    };
    folders.into_iter().any(|folder| folder.join(name).exists()) || listed()
}

impl Window {
    /// Returns a window on a desk that no settings and no display belong to.
    pub(super) fn alone(desk: Desk) -> (Window, Task<Message>) {
        (Window::new(desk, &Settings::default(), None), Task::none())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn without_a_display_or_a_library_one_line_says_what_to_do() {
        let display = |name: &str| (name == "DISPLAY").then(|| ":0".into());
        let none = can_open(&|_| None, &|_| true).expect_err("there is no display");
        assert!(none.to_string().contains("farglow calc FILE"), "{none}");
        let missing = can_open(&display, &|name| name != "libxkbcommon-x11.so.0")
            .expect_err("the library is missing");
        let text = missing.to_string();
        assert!(
            text.contains("libxkbcommon-x11-0") && !text.contains('\n'),
            "{text}"
        );
        assert!(can_open(&display, &|_| true).is_ok());
        let wayland = |name: &str| (name == "WAYLAND_DISPLAY").then(|| "wayland-0".into());
        assert!(can_open(&wayland, &|_| false).is_ok());
    }
}
