//! Quadrature of the burn integral over a history of temperatures.
//!
//! Each span is cut where the temperature crosses a branch of the kinetics, and
//! each piece is integrated by adaptive Gauss–Kronrod quadrature.

use super::super::tissue::{Course, History};
use super::super::{Error, LONGEST_TIME};
use super::Kinetics;

/// Nodes and weights of Kronrod's 15 points on −1..=1, and Gauss's 7 among them.
const NODES: [f64; 8] = [
    0.991_455_371_120_812_6,
    0.949_107_912_342_758_5,
    0.864_864_423_359_769_1,
    0.741_531_185_599_394_4,
    0.586_087_235_467_691_1,
    0.405_845_151_377_397_2,
    0.207_784_955_007_898_47,
    0.0,
];
const KRONROD: [f64; 8] = [
    0.022_935_322_010_529_224,
    0.063_092_092_629_978_55,
    0.104_790_010_322_250_18,
    0.140_653_259_715_525_92,
    0.169_004_726_639_267_9,
    0.190_350_578_064_785_4,
    0.204_432_940_075_298_9,
    0.209_482_141_084_727_83,
];
const GAUSS: [f64; 4] = [
    0.129_484_966_168_869_7,
    0.279_705_391_489_276_64,
    0.381_830_050_505_118_9,
    0.417_959_183_673_469_4,
];

/// How finely a span is looked at for crossings: first look after its
/// beginning, s, and growth of the looks.
const FIRST_LOOK: f64 = 0.02;
const GROWTH: f64 = 1.5;

/// Relative error that each piece may have.
const TOLERANCE: f64 = 1e-9;

pub fn over(history: &History<'_>, depth: f64, kinetics: &Kinetics) -> Result<f64, Error> {
    let probe = history.probe(depth)?;
    let last = history.spans() - 1;
    let mut sum = 0.0;
    for index in 0..=last {
        let course = probe.course(index);
        let duration = history.span_duration(index);
        let (mut from, mut at_from) = (0.0, course.at(0.0));
        let mut look = FIRST_LOOK;
        let mut was_hot = false;
        while from < duration {
            let to = look.min(duration).min(LONGEST_TIME);
            let at_to = course.at(to);
            sum += piece(&course, kinetics, (from, at_from), (to, at_to), sum);
            if index == last {
                // Without flux it only cools in the end: past the peak and
                // below 44 °C nothing more comes. Heat that is still on its
                // way down to a deep probe is waited for.
                was_hot |= at_to >= kinetics.low.from;
                let cools = at_to <= at_from;
                if (cools && at_to < kinetics.low.from && (was_hot || to > 600.0))
                    || to >= LONGEST_TIME
                {
                    break;
                }
            }
            (from, at_from) = (to, at_to);
            look = (to * GROWTH).max(to + FIRST_LOOK);
        }
    }
    Ok(sum)
}

/// The integral from one look to the next, cut where a branch begins.
fn piece(
    course: &Course,
    kinetics: &Kinetics,
    (from, at_from): (f64, f64),
    (to, at_to): (f64, f64),
    so_far: f64,
) -> f64 {
    for edge in [kinetics.low.from, kinetics.high.from] {
        if (at_from < edge) != (at_to < edge) {
            let cut = crossing(course, edge, from, to, at_from < edge);
            if cut > from && cut < to {
                // Just at the cut the temperature is the edge itself: each side
                // is told which branch it lies in.
                let (before, after) = if at_from < edge {
                    (edge.next_down(), edge)
                } else {
                    (edge, edge.next_down())
                };
                return piece(course, kinetics, (from, at_from), (cut, before), so_far)
                    + piece(course, kinetics, (cut, after), (to, at_to), so_far);
            }
        }
    }
    let middle = course.at(f64::midpoint(from, to));
    let hottest = at_from.max(at_to).max(middle);
    if hottest < kinetics.low.from {
        return 0.0;
    }
    quadrature(&|at| kinetics.rate(course.at(at)), from, to, so_far, 24)
}

/// Where a temperature crosses an edge, by bisection.
fn crossing(course: &Course, edge: f64, mut from: f64, mut to: f64, rises: bool) -> f64 {
    for _ in 0..60 {
        let middle = f64::midpoint(from, to);
        if middle <= from || middle >= to {
            break;
        }
        if (course.at(middle) < edge) == rises {
            from = middle;
        } else {
            to = middle;
        }
    }
    f64::midpoint(from, to)
}

/// The integral of a function, halved until Gauss and Kronrod agree.
fn quadrature(f: &dyn Fn(f64) -> f64, from: f64, to: f64, so_far: f64, depth: u32) -> f64 {
    let (centre, half) = (f64::midpoint(from, to), (to - from) / 2.0);
    let (mut fine, mut coarse) = (0.0, 0.0);
    for (index, node) in NODES.iter().enumerate() {
        let value = if *node == 0.0 {
            f(centre)
        } else {
            f(centre - half * node) + f(centre + half * node)
        };
        fine += KRONROD[index] * value;
        if index % 2 == 1 {
            coarse += GAUSS[index / 2] * value;
        }
    }
    let (fine, coarse) = (fine * half, coarse * half);
    if depth == 0 || (fine - coarse).abs() <= TOLERANCE * (so_far + fine) {
        return fine;
    }
    quadrature(f, from, centre, so_far, depth - 1) + quadrature(f, centre, to, so_far, depth - 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quadrature_is_exact_where_it_must_be() {
        for (power, expected) in [(0, 2.0), (13, 0.0), (22, 2.0 / 23.0)] {
            let found = quadrature(&|x: f64| x.powi(power), -1.0, 1.0, 0.0, 0);
            assert!(
                (found - expected).abs() < 1e-15,
                "x^{power}: {found} {expected}"
            );
        }
        let found = quadrature(&f64::exp, -30.0, 3.0, 0.0, 24);
        let expected = 3.0_f64.exp() - (-30.0_f64).exp();
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "{found} against {expected}"
        );
    }
}
