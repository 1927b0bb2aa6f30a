//! Where labels go so that none covers another: a greedy search that takes
//! labels in order and is the same every time.

use glam::DVec2;

use crate::drawing::mark::Rectangle;

/// What is already on the drawing, and where labels may stand.
#[derive(Clone, Debug)]
pub struct Field {
    within: Rectangle,
    boxes: Vec<Rectangle>,
    lines: Vec<([DVec2; 2], f64)>,
}

/// What a label asks for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wish {
    /// The point that it names.
    pub at: DVec2,
    /// How far the point's own mark reaches to each side, in points.
    pub gap: f64,
    /// How far beyond that the label may stand, in points.
    pub reach: f64,
    /// Width and height of the label, in points.
    pub size: DVec2,
}

/// Where a label stands.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Its box.
    pub area: Rectangle,
    /// The line that leads to it from its point, if it stands off.
    pub leader: Option<[DVec2; 2]>,
}

impl Field {
    /// Returns an empty field; labels stay inside `within`.
    pub const fn new(within: Rectangle) -> Self {
        Self {
            within,
            boxes: Vec::new(),
            lines: Vec::new(),
        }
    }

    /// Marks a box as taken: no label may cover it.
    pub fn take(&mut self, area: Rectangle) {
        self.boxes.push(area);
    }

    /// Marks a line as drawn: a label goes up to `weight` points out of its way
    /// to keep clear of it.
    pub fn avoid(&mut self, points: &[DVec2], weight: f64) {
        self.lines
            .extend(points.windows(2).map(|pair| ([pair[0], pair[1]], weight)));
    }

    /// Returns the best place for a label and takes it: near its point, clear of
    /// lines, never on a box, and with no box between it and its point.
    ///
    /// `None` if there is no such place within reach.
    pub fn place(&mut self, wish: Wish) -> Option<Place> {
        let mut best: Option<(f64, Place)> = None;
        for ring in 0..=RINGS {
            let out = wish.reach * f64::from(ring) / f64::from(RINGS);
            // Rings farther out cost more, whatever lies clear there.
            if best.is_some_and(|(cost, _)| cost <= out) {
                break;
            }
            for (x, y) in DIRECTIONS {
                let span = wish.gap + out;
                let centre = wish.at
                    + DVec2::new(
                        x * (span + wish.size.x / 2.0),
                        y * (span + wish.size.y / 2.0),
                    );
                let area = Rectangle {
                    from: centre - wish.size / 2.0,
                    to: centre + wish.size / 2.0,
                };
                let Some(place) = self.free(wish, area) else {
                    continue;
                };
                let cost = out + self.crossed(&area);
                if best.is_none_or(|(least, _)| cost < least) {
                    best = Some((cost, place));
                }
            }
        }
        let (_, place) = best?;
        self.take(place.area);
        if let Some(leader) = place.leader {
            self.avoid(&leader, wish.reach);
        }
        Some(place)
    }

    /// The place with its leader, if no box is in the way of either.
    fn free(&self, wish: Wish, area: Rectangle) -> Option<Place> {
        if !self.within.holds(&area) || self.boxes.iter().any(|taken| taken.meets(&area)) {
            return None;
        }
        let near = wish.at.clamp(area.from, area.to);
        let run = near - wish.at;
        if run.length() <= wish.gap * 1.5 + 1.0 {
            return Some(Place { area, leader: None });
        }
        let leader = [
            wish.at + run.normalize_or_zero() * wish.gap.min(run.length()),
            near,
        ];
        let blocked = self.boxes.iter().any(|taken| crosses(taken, &leader));
        (!blocked).then_some(Place {
            area,
            leader: Some(leader),
        })
    }

    fn crossed(&self, area: &Rectangle) -> f64 {
        let crossed = self.lines.iter().filter(|(line, _)| crosses(area, line));
        crossed
            .map(|(_, weight)| weight)
            .fold(0.0, |sum, weight| sum.max(*weight))
    }
}

/// How many distances are tried on the way to the farthest.
const RINGS: u32 = 16;

/// Right first, where one reads on, then the other sides and corners, then between.
const DIRECTIONS: [(f64, f64); 16] = [
    (1.0, 0.0),
    (1.0, -1.0),
    (0.0, -1.0),
    (-1.0, -1.0),
    (-1.0, 0.0),
    (1.0, 1.0),
    (0.0, 1.0),
    (-1.0, 1.0),
    (1.0, -0.5),
    (0.5, -1.0),
    (-0.5, -1.0),
    (-1.0, -0.5),
    (1.0, 0.5),
    (0.5, 1.0),
    (-0.5, 1.0),
    (-1.0, 0.5),
];

/// Whether a segment has a point inside the box (Liang and Barsky's clipping).
fn crosses(area: &Rectangle, line: &[DVec2; 2]) -> bool {
    let run = line[1] - line[0];
    let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
    for (p, q) in [
        (-run.x, line[0].x - area.from.x),
        (run.x, area.to.x - line[0].x),
        (-run.y, line[0].y - area.from.y),
        (run.y, area.to.y - line[0].y),
    ] {
        if p == 0.0 {
            if q <= 0.0 {
                return false;
            }
        } else if p < 0.0 {
            enter = enter.max(q / p);
        } else {
            leave = leave.min(q / p);
        }
    }
    enter < leave
}

/// Returns tops for boxes stacked in a column, none covering another, each as
/// near to where it would like its middle as the others leave room.
///
/// `wishes` are pairs of wished middle and height, in points, in the order of
/// the stack; the column runs from `top` to `bottom`. If they do not fit, they
/// are stacked from the top without gaps and run over the bottom.
pub fn column(wishes: &[(f64, f64)], top: f64, bottom: f64) -> Vec<f64> {
    let mut tops = Vec::with_capacity(wishes.len());
    let mut free = top;
    for (middle, height) in wishes {
        let place = (middle - height / 2.0).max(free);
        tops.push(place);
        free = place + height;
    }
    // What ran over the bottom pushes the ones above it back up.
    let mut end = bottom;
    for (place, (_, height)) in tops.iter_mut().zip(wishes).rev() {
        *place = place.min(end - height);
        end = *place;
    }
    let mut free = top;
    for (place, (_, height)) in tops.iter_mut().zip(wishes) {
        *place = place.max(free);
        free = *place + height;
    }
    tops
}

#[cfg(test)]
mod tests {
    use super::*;

    fn wish() -> Wish {
        Wish {
            at: DVec2::new(100.0, 50.0),
            gap: 4.0,
            reach: 100.0,
            size: DVec2::new(40.0, 9.0),
        }
    }

    #[test]
    fn labels_of_one_point_never_cover_each_other() {
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 200.0, 100.0));
        let places: Vec<Rectangle> = (0..10)
            .filter_map(|_| field.place(wish()).map(|place| place.area))
            .collect();
        // Once labels stand all around, no leader gets out between them.
        assert!(
            places.len() >= 5,
            "{} placed, wanted at least 5",
            places.len()
        );
        for (i, a) in places.iter().enumerate() {
            for b in &places[i + 1..] {
                assert!(!a.meets(b), "{a:?} covers {b:?}");
            }
        }
    }

    #[test]
    fn a_label_steps_off_a_line() {
        let line = [DVec2::new(0.0, 50.0), DVec2::new(200.0, 50.0)];
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 200.0, 100.0));
        field.avoid(&line, 30.0);
        let place = field.place(wish()).expect("there is room");
        assert!(!crosses(&place.area, &line), "{place:?}");
    }

    #[test]
    fn no_leader_runs_through_a_label() {
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 200.0, 100.0));
        let places: Vec<Place> = (0..12).filter_map(|_| field.place(wish())).collect();
        assert!(
            places.iter().any(|place| place.leader.is_some()),
            "none had to stand off"
        );
        for (i, place) in places.iter().enumerate() {
            for earlier in &places[..i] {
                let through = place
                    .leader
                    .is_some_and(|leader| crosses(&earlier.area, &leader));
                assert!(!through, "{place:?} through {earlier:?}");
            }
        }
    }

    #[test]
    fn a_full_field_says_so() {
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 30.0, 30.0));
        let at = DVec2::new(15.0, 15.0);
        assert_eq!(field.place(Wish { at, ..wish() }), None);
    }

    #[test]
    fn a_column_keeps_order_and_apart() {
        let wishes = [
            (10.0, 8.0),
            (11.0, 8.0),
            (12.0, 8.0),
            (95.0, 8.0),
            (99.0, 8.0),
        ];
        let tops = column(&wishes, 0.0, 100.0);
        for (pair, (_, height)) in tops.windows(2).zip(wishes) {
            assert!(pair[1] - pair[0] >= height - 1e-9, "{tops:?}");
        }
        assert!(tops[4] + 8.0 <= 100.0, "{tops:?}");
        assert!(tops[0] >= 0.0, "{tops:?}");
    }
}
