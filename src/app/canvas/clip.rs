//! Lines and areas cut to a window, because the canvas does not do it.

use glam::DVec2;

use crate::drawing::mark::Rectangle;

/// Returns what both windows show; an empty one where they share nothing.
pub(super) fn both(a: &Rectangle, b: &Rectangle) -> Rectangle {
    let from = a.from.max(b.from);
    Rectangle {
        from,
        to: a.to.min(b.to).max(from),
    }
}

/// Returns the part of a segment inside the window, as shares of its length
/// (Liang and Barsky 1984).
fn segment(from: DVec2, to: DVec2, window: &Rectangle) -> Option<(f64, f64)> {
    let run = to - from;
    let (mut enter, mut leave) = (0.0_f64, 1.0_f64);
    for (p, q) in [
        (-run.x, from.x - window.from.x),
        (run.x, window.to.x - from.x),
        (-run.y, from.y - window.from.y),
        (run.y, window.to.y - from.y),
    ] {
        if p == 0.0 {
            if q < 0.0 {
                return None;
            }
        } else if p < 0.0 {
            enter = enter.max(q / p);
        } else {
            leave = leave.min(q / p);
        }
    }
    (enter <= leave).then_some((enter, leave))
}

/// Returns the runs of a line that lie inside the window.
pub(super) fn line(points: &[DVec2], window: &Rectangle) -> Vec<Vec<DVec2>> {
    let mut runs: Vec<Vec<DVec2>> = Vec::new();
    let mut joined = false;
    for pair in points.windows(2) {
        let (from, to) = (pair[0], pair[1]);
        let Some((enter, leave)) = segment(from, to, window) else {
            joined = false;
            continue;
        };
        let (start, end) = (from.lerp(to, enter), from.lerp(to, leave));
        match runs.last_mut() {
            Some(run) if joined && enter == 0.0 => run.push(end),
            _ => runs.push(vec![start, end]),
        }
        joined = leave == 1.0;
    }
    runs
}

/// Returns an area cut to the window, empty where nothing of it is inside
/// (Sutherland and Hodgman 1974).
pub(super) fn area(outline: &[DVec2], window: &Rectangle) -> Vec<DVec2> {
    // How far inside a point lies, for each side in turn.
    let sides: [&dyn Fn(DVec2) -> f64; 4] = [
        &|p| p.x - window.from.x,
        &|p| window.to.x - p.x,
        &|p| p.y - window.from.y,
        &|p| window.to.y - p.y,
    ];
    let mut kept = outline.to_vec();
    for inside in sides {
        let mut next = Vec::with_capacity(kept.len() + 4);
        for (index, to) in kept.iter().enumerate() {
            let from = kept[(index + kept.len() - 1) % kept.len()];
            let (a, b) = (inside(from), inside(*to));
            if (a < 0.0) != (b < 0.0) {
                next.push(from.lerp(*to, a / (a - b)));
            }
            if b >= 0.0 {
                next.push(*to);
            }
        }
        kept = next;
    }
    kept
}

#[cfg(test)]
mod tests {
    use super::*;

    fn window() -> Rectangle {
        Rectangle::new(0.0, 0.0, 10.0, 10.0)
    }

    #[test]
    fn a_line_is_cut_where_it_leaves_and_goes_on_where_it_comes_back() {
        let points = [
            (-5.0, 5.0),
            (5.0, 5.0),
            (15.0, 5.0),
            (15.0, 8.0),
            (5.0, 8.0),
        ]
        .map(DVec2::from);
        let runs = line(&points, &window());
        let expected: Vec<Vec<DVec2>> = vec![
            vec![(0.0, 5.0).into(), (5.0, 5.0).into(), (10.0, 5.0).into()],
            vec![(10.0, 8.0).into(), (5.0, 8.0).into()],
        ];
        assert_eq!(runs, expected);
    }

    #[test]
    fn a_line_outside_leaves_nothing() {
        let points = [(-5.0, 20.0), (15.0, 20.0)].map(DVec2::from);
        assert!(line(&points, &window()).is_empty());
    }

    #[test]
    fn an_area_keeps_its_share_of_the_window() {
        let outline = [(5.0, -5.0), (15.0, -5.0), (15.0, 5.0), (5.0, 5.0)].map(DVec2::from);
        let cut = area(&outline, &window());
        let twice: f64 = (0..cut.len())
            .map(|i| cut[i].perp_dot(cut[(i + 1) % cut.len()]))
            .sum();
        assert!(
            (twice.abs() / 2.0 - 25.0).abs() < 1e-12,
            "{twice}, wanted 50"
        );
        let away = outline.map(|p| p + DVec2::splat(40.0));
        assert!(area(&away, &window()).is_empty());
    }
}
