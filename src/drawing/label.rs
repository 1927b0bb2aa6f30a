//! Where labels go so that none covers another: a greedy search that takes
//! labels in order and is the same every time.

use glam::DVec2;

use crate::drawing::mark::Rectangle;

/// What is already on the drawing, and where labels may stand.
#[derive(Clone, Debug)]
pub struct Field {
    within: Rectangle,
    boxes: Vec<Rectangle>,
    lines: Vec<[DVec2; 2]>,
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

    /// Marks a line as drawn: labels keep clear of it where they can.
    pub fn avoid(&mut self, points: &[DVec2]) {
        self.lines
            .extend(points.windows(2).map(|pair| [pair[0], pair[1]]));
    }

    /// Returns the place of a label of `width` by `height` points around `at`, a
    /// point whose own mark reaches `gap` points to each side, and takes it.
    ///
    /// The nearest place that is free of boxes and lines wins; if every place
    /// has a line through it, the nearest free of boxes that crosses fewest.
    /// `None` if no place is free of boxes.
    pub fn place(&mut self, at: DVec2, gap: f64, width: f64, height: f64) -> Option<Rectangle> {
        let mut best: Option<(usize, Rectangle)> = None;
        for ring in 0..12 {
            let out = gap + f64::from(ring) * (height * 0.75);
            for direction in DIRECTIONS {
                let (x, y) = direction;
                let centre = at + DVec2::new(x * (out + width / 2.0), y * (out + height / 2.0));
                let area = Rectangle::new(
                    centre.x - width / 2.0,
                    centre.y - height / 2.0,
                    width,
                    height,
                );
                if !self.within.holds(&area) || self.boxes.iter().any(|taken| taken.meets(&area)) {
                    continue;
                }
                let crossed = self
                    .lines
                    .iter()
                    .filter(|line| crosses(&area, line))
                    .count();
                if crossed == 0 {
                    self.take(area);
                    return Some(area);
                }
                if best.is_none_or(|(fewest, _)| crossed < fewest) {
                    best = Some((crossed, area));
                }
            }
        }
        let (_, area) = best?;
        self.take(area);
        Some(area)
    }
}

/// Right first, where one reads on, then the other sides and corners.
const DIRECTIONS: [(f64, f64); 8] = [
    (1.0, 0.0),
    (1.0, -1.0),
    (0.0, -1.0),
    (-1.0, -1.0),
    (-1.0, 0.0),
    (1.0, 1.0),
    (0.0, 1.0),
    (-1.0, 1.0),
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

    #[test]
    fn labels_of_one_point_never_cover_each_other() {
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 200.0, 100.0));
        let places: Vec<Rectangle> = (0..10)
            .filter_map(|_| field.place(DVec2::new(100.0, 50.0), 4.0, 40.0, 9.0))
            .collect();
        assert!(
            places.len() >= 8,
            "{} placed, wanted at least 8",
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
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 200.0, 100.0));
        field.avoid(&[DVec2::new(0.0, 50.0), DVec2::new(200.0, 50.0)]);
        let place = field
            .place(DVec2::new(100.0, 50.0), 4.0, 40.0, 9.0)
            .expect("there is room");
        assert!(
            !crosses(&place, &[DVec2::new(0.0, 50.0), DVec2::new(200.0, 50.0)]),
            "{place:?}"
        );
    }

    #[test]
    fn a_full_field_says_so() {
        let mut field = Field::new(Rectangle::new(0.0, 0.0, 30.0, 30.0));
        assert_eq!(field.place(DVec2::new(15.0, 15.0), 4.0, 40.0, 9.0), None);
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
