//! The flags of a rail, in lanes above its ruler.

use super::{APART, BESIDE, LEAST, SIDE, SMALL, SYMBOL};
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::mark::Shape;
use crate::drawing::rail::{Pin, Stand};
use crate::drawing::screen::Screen;

/// What a flag stands for.
#[derive(Clone, Copy, Debug)]
pub(super) enum Of<'a> {
    Pin(&'a Pin),
    Stand(&'a Stand),
    Screen(&'a Screen),
}

impl<'a> Of<'a> {
    pub(super) fn distance(&self) -> f64 {
        match self {
            Of::Pin(pin) => pin.distance,
            Of::Stand(stand) => stand.distance,
            Of::Screen(screen) => screen.distance,
        }
    }

    pub(super) fn cell(self) -> &'a str {
        match self {
            Of::Pin(pin) => &pin.cell,
            Of::Stand(stand) => &stand.cell,
            Of::Screen(screen) => &screen.cell,
        }
    }

    pub(super) fn name(self) -> &'a str {
        match self {
            Of::Pin(pin) => &pin.label,
            Of::Stand(stand) => &stand.cell,
            Of::Screen(screen) => &screen.cell,
        }
    }

    fn lines(&self) -> [String; 2] {
        match self {
            Of::Pin(pin) => [
                format!("{}: {}", pin.label, pin.text),
                pin.nominal
                    .as_ref()
                    .map_or_else(String::new, |(_, text)| format!("nominal {text}")),
            ],
            Of::Stand(stand) => [
                format!("{} {}", stand.cell, stand.text),
                stand.finding.clone(),
            ],
            Of::Screen(screen) => [screen.label.clone(), "screen".to_owned()],
        }
    }

    /// What is left out first where there is no room: greatest first.
    pub(super) fn rank(&self) -> u8 {
        match self {
            Of::Pin(_) | Of::Screen(_) => 0,
            Of::Stand(stand) => match stand.shape {
                Shape::Over => 1,
                Shape::Within => 3,
                _ => 2,
            },
        }
    }
}

/// A flag in its lane.
#[derive(Clone, Debug)]
pub(super) struct Flag<'a> {
    pub of: Of<'a>,
    pub x: f64,
    pub lane: usize,
    pub lines: [String; 2],
}

/// Returns how many metres a ruler of `width` points shows, and the flags in
/// their lanes: none covers another, and no pole runs through one.
pub(super) fn placed(mut all: Vec<Of<'_>>, width: f64) -> (f64, Vec<Flag<'_>>) {
    all.sort_by(|a, b| a.distance().total_cmp(&b.distance()));
    let room = width - 2.0 * SIDE;
    let flags: Vec<(Of<'_>, [String; 2], f64)> = all
        .into_iter()
        .map(|of| {
            let most = room * 0.45;
            let [first, second] = of.lines();
            let lines = [
                fit(&first, most, SMALL, Weight::SemiBold),
                fit(&second, most, SMALL, Weight::Regular),
            ];
            let wide = font::width(&lines[0], SMALL, Weight::SemiBold).max(font::width(
                &lines[1],
                SMALL,
                Weight::Regular,
            ));
            (of, lines, wide)
        })
        .collect();
    // The words stand to the right of their pole: the ruler goes on until
    // the last of them has room.
    let needed = flags
        .iter()
        .map(|(of, _, wide)| of.distance() * room / (room + SIDE - wide - BESIDE).max(room * 0.4));
    let end = needed.fold(LEAST, f64::max);
    let x = |distance: f64| SIDE + room * (distance / end).min(1.0);
    let mut placed: Vec<Flag<'_>> = Vec::new();
    // From the right: a flag stands above every pole that its words pass.
    for (of, lines, wide) in flags.into_iter().rev() {
        let at = x(of.distance());
        let right = at + BESIDE + wide;
        let lane = placed
            .iter()
            .filter(|other| other.x - SYMBOL / 2.0 <= right + APART)
            .map(|other| other.lane + 1)
            .max()
            .unwrap_or(0);
        placed.push(Flag {
            of,
            x: at,
            lane,
            lines,
        });
    }
    placed.reverse();
    (end, placed)
}
