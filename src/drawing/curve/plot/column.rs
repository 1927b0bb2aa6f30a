//! The column beside the plot: limits by height, then what found no room in
//! the plot itself.

use glam::DVec2;

use super::{LINE, Plot, SMALL, SYMBOL};
use crate::drawing::curve::LimitLine;
use crate::drawing::font::{self, Weight, fit};
use crate::drawing::label;
use crate::drawing::mark::{Mark, Shape, Stroke, Text};
use crate::drawing::role::Role;

/// One entry of the column.
pub(super) struct Entry {
    /// What it names; not finite where that is not on the plot.
    pub point: DVec2,
    pub leader: Stroke,
    pub shape: Option<Shape>,
    pub name: String,
    pub note: String,
}

impl Entry {
    /// Returns an entry for what is not on the plot.
    pub(super) fn off(name: String, leader: Stroke, shape: Option<Shape>) -> Self {
        Entry {
            point: DVec2::NAN,
            leader,
            shape,
            name,
            note: "off this plot".to_owned(),
        }
    }

    fn lines(&self) -> f64 {
        if self.note.is_empty() { 1.0 } else { 2.0 }
    }

    /// The height that it would like to stand at, if it has one.
    fn height(&self) -> Option<f64> {
        self.point.is_finite().then_some(self.point.y)
    }
}

/// Returns what stands under a limit's name: where it is met from.
pub(in crate::drawing::curve) fn note(limit: &LimitLine) -> String {
    match (&limit.upper_crossing, &limit.crossing) {
        (Some(upper), Some(nominal)) => {
            format!("met from {} (nominal {})", upper.text, nominal.text)
        }
        (Some(only), None) | (None, Some(only)) => format!("met from {}", only.text),
        (None, None) => "not crossed on this line".to_owned(),
    }
}

/// Leaves out what finds no room between two heights, and says how many.
fn fitted(mut entries: Vec<Entry>, room: f64) -> Vec<Entry> {
    let room = (room / (LINE + 1.0)).floor().max(1.0) as usize;
    if entries.len() > room {
        let left_out = entries.len() - (room - 1);
        entries.truncate(room - 1);
        entries.push(Entry {
            point: DVec2::NAN,
            leader: Stroke::hair(Role::Muted),
            shape: None,
            name: format!("and {left_out} more"),
            note: String::new(),
        });
    }
    entries
}

impl Plot<'_> {
    pub(super) fn column(&mut self) {
        let mut entries = std::mem::take(&mut self.entries);
        entries.sort_by(|a, b| {
            let key = |entry: &Entry| entry.height().unwrap_or(f64::INFINITY);
            key(a).total_cmp(&key(b))
        });
        let (top, bottom) = (self.axes.area.from.y - LINE, self.picture.height - LINE);
        let total: f64 = entries.iter().map(|entry| entry.lines() * LINE + 3.0).sum();
        let crowded = total > bottom - top;
        if crowded {
            for entry in &mut entries {
                if !entry.note.is_empty() {
                    let note = std::mem::take(&mut entry.note);
                    entry.name = format!("{} · {note}", entry.name);
                }
            }
        }
        let entries = fitted(entries, bottom - top);
        let gap = if crowded { 1.0 } else { 3.0 };
        let wishes: Vec<(f64, f64)> = entries
            .iter()
            .map(|entry| {
                let middle = entry.height().unwrap_or(bottom);
                (middle, entry.lines() * LINE + gap)
            })
            .collect();
        let tops = label::column(&wishes, top, bottom);
        for ((entry, place), (_, high)) in entries.iter().zip(tops).zip(wishes) {
            self.entry(entry, place, high, gap);
        }
    }

    /// Draws an entry whose box begins at a height, with its leader.
    fn entry(&mut self, entry: &Entry, place: f64, high: f64, gap: f64) {
        let left = self.axes.area.to.x + 16.0;
        let middle = place + high / 2.0;
        if entry.point.is_finite() {
            let beside = DVec2::new(self.axes.area.to.x + 3.0, f64::NEG_INFINITY);
            let points = vec![
                entry.point,
                entry.point.max(beside),
                DVec2::new(left - 4.0, middle),
                DVec2::new(left - 2.0, middle),
            ];
            self.picture.push(Mark::Line {
                points,
                stroke: entry.leader,
            });
        }
        let mut pen = left;
        if let Some(shape) = entry.shape {
            self.picture.push(Mark::Shape {
                shape,
                at: DVec2::new(left + SYMBOL / 2.0, place + LINE / 2.0 + 1.0),
                size: SYMBOL,
            });
            pen += SYMBOL + 3.0;
        }
        let room = self.picture.width - pen;
        let weight = if entry.shape.is_none() {
            Weight::SemiBold
        } else {
            Weight::Regular
        };
        let baseline = place + gap / 2.0 + (LINE + font::CAP_HEIGHT * SMALL) / 2.0;
        let name = fit(&entry.name, room, SMALL, weight);
        self.text(Text {
            weight,
            ..Text::new(DVec2::new(pen, baseline), SMALL, name)
        });
        if !entry.note.is_empty() {
            let note = fit(&entry.note, room, SMALL, Weight::Regular);
            self.text(Text::new(DVec2::new(pen, baseline + LINE), SMALL, note).role(Role::Muted));
        }
    }
}
