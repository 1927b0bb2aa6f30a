//! Hatching: parallel lines cut to an outline, so that a zone is told apart
//! without colour. Lines lie on one lattice through the origin, so neighbouring
//! areas with the same hatch join without a seam.

use glam::DVec2;

use crate::drawing::role::Role;

/// More lines than this are not drawn: the spacing is widened instead.
const MOST_LINES: f64 = 4000.0;

/// How an area is hatched.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hatch {
    /// Distance between lines, in points.
    pub spacing: f64,
    /// Direction of the lines, in degrees anticlockwise from the right.
    pub angle: f64,
    /// Width of a line, in points.
    pub width: f64,
    /// What the lines are for.
    pub role: Role,
}

/// Returns the lines of a hatch inside `outline` (a closed polygon, in points;
/// even-odd where it crosses itself).
///
/// `spacing` is in points and `angle` in degrees anticlockwise from the right.
/// Empty for an outline that is degenerate or not finite, or a spacing that is
/// not positive. Never more than 4,000 lines: beyond, they stand wider apart.
pub fn lines(outline: &[DVec2], spacing: f64, angle: f64) -> Vec<[DVec2; 2]> {
    let finite = outline.iter().all(|p| p.is_finite());
    if outline.len() < 3 || !finite || !angle.is_finite() || !spacing.is_finite() || spacing <= 0.0
    {
        return Vec::new();
    }
    // y runs downwards, so a line rising to the right has a negative y part.
    let (sine, cosine) = angle.to_radians().sin_cos();
    let along = DVec2::new(cosine, -sine);
    let across = DVec2::new(sine, cosine);
    let heights: Vec<f64> = outline.iter().map(|p| p.dot(across)).collect();
    let low = heights.iter().copied().fold(f64::INFINITY, f64::min);
    let high = heights.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let spacing = spacing.max((high - low) / MOST_LINES);
    let (first, last) = ((low / spacing).ceil(), (high / spacing).floor());
    // Far from the origin neighbouring lattice numbers run together.
    if !first.is_finite() || !last.is_finite() || first.abs().max(last.abs()) > 1e12 {
        return Vec::new();
    }

    let mut found = Vec::new();
    for step in first as i64..=last as i64 {
        // A hair off the lattice, so that a line never runs through a corner.
        let height = (step as f64 + 1e-9) * spacing;
        let mut crossings = Vec::new();
        for (i, from) in outline.iter().enumerate() {
            let to = outline[(i + 1) % outline.len()];
            let (a, b) = (from.dot(across) - height, to.dot(across) - height);
            if (a < 0.0) != (b < 0.0) {
                crossings.push((*from + (to - *from) * (a / (a - b))).dot(along));
            }
        }
        crossings.sort_by(f64::total_cmp);
        for pair in crossings.chunks_exact(2) {
            if pair[1] > pair[0] {
                found.push([0, 1].map(|end| along * pair[end] + across * height));
            }
        }
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    fn square() -> Vec<DVec2> {
        vec![
            DVec2::new(0.5, 0.5),
            DVec2::new(10.5, 0.5),
            DVec2::new(10.5, 10.5),
            DVec2::new(0.5, 10.5),
        ]
    }

    #[test]
    fn length_of_lines_times_spacing_is_the_area() {
        for angle in [0.0, 30.0, 45.0, 90.0, 135.0] {
            let spacing = 0.01;
            let total: f64 = lines(&square(), spacing, angle)
                .iter()
                .map(|l| l[0].distance(l[1]))
                .sum();
            let area = total * spacing;
            assert!(
                (area - 100.0).abs() < 0.3,
                "angle {angle}: {area}, wanted 100"
            );
        }
    }

    #[test]
    fn lines_leave_a_notch_free() {
        let notched = [
            (0.0, 0.0),
            (10.0, 0.0),
            (10.0, 10.0),
            (7.0, 10.0),
            (7.0, 4.0),
            (3.0, 4.0),
            (3.0, 10.0),
            (0.0, 10.0),
        ]
        .map(|(x, y)| DVec2::new(x, y));
        let found = lines(&notched, 1.0, 0.0);
        assert!(!found.is_empty());
        for line in found {
            let middle = (line[0] + line[1]) / 2.0;
            let in_notch = middle.x > 3.0 && middle.x < 7.0 && middle.y > 4.0;
            assert!(!in_notch, "line through the notch at {middle}");
        }
    }

    #[test]
    fn a_line_at_45_degrees_rises_to_the_right() {
        let found = lines(&square(), 2.0, 45.0);
        let line = found[found.len() / 2];
        let run = line[1] - line[0];
        assert!(run.x > 0.0 && run.y < 0.0, "run {run}");
    }

    #[test]
    fn degenerate_input_gives_no_lines() {
        let nan = vec![DVec2::NAN; 4];
        let flat = vec![DVec2::ZERO; 4];
        assert!(lines(&nan, 1.0, 45.0).is_empty());
        assert!(lines(&flat, 1.0, 45.0).is_empty());
        assert!(lines(&square(), 0.0, 45.0).is_empty());
        assert!(lines(&square(), f64::NAN, 45.0).is_empty());
        assert!(lines(&square()[..2], 1.0, 45.0).is_empty());
        let many = lines(&square(), 1e-12, 0.0).len();
        assert!(many <= 4001, "{many} lines, wanted at most 4001");
    }
}
