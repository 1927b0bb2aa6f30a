//! The irradiance that several regions give together.
//!
//! `views` and `weights` are parallel: what is seen of each source, and its
//! exitance for the quantity that is judged, W/m². A weight that is not above
//! zero, or not finite, counts as zero.

use glam::DVec3;

use super::view::View;

/// Returns the irradiance on a receiver of a given normal, W/m².
///
/// # Source
///
/// E = Σ M F; checked in `tests/published/ladle_case.rs`.
#[must_use]
pub fn facing(views: &[View], weights: &[f64], normal: DVec3) -> f64 {
    seen(views, weights)
        .map(|(view, weight)| weight * view.factor(normal))
        .sum()
}

/// Returns the greatest irradiance over all receiver orientations, W/m², and
/// the normal at which it is reached.
///
/// With nothing seen, or no weight, the irradiance is zero and the normal
/// straight up. Of orientations that are equally strong to 10⁻¹² the first in
/// the order of the views wins.
///
/// # Accuracy
///
/// Where everything is seen within 45° of the sum of the flux vectors that sum
/// is the answer, exactly. Else the greatest of the local maxima reached from
/// many starts, each to a relative error of `1e-12`; checked against dense
/// trials in `tests/laws/exposure_laws.rs`.
///
/// # Source
///
/// Derived here. G(n) = Σ M F(n) is convex and homogeneous in n with the
/// gradient W(n) = Σ M times the clipped flux, so that the step from n to
/// W(n)/|W(n)| never makes it less. If every direction that is seen lies within
/// 45° of the sum S, then up to 45° off S nothing is clipped and G is |S| times
/// a cosine; farther off, max(0, n·ω) ≤ ω·S (1 + (e·ω)/(S·ω)) / √2 with e the
/// direction from S to n, whose sum over all that is seen is |S|/√2.
///
/// # Examples
///
/// ```
/// use farglow::physics::{exposure, region::Region};
/// use glam::DVec3;
///
/// let door = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 0.9, 0.7)?;
/// let view = door.view(DVec3::new(0.0, 2.5, 0.0)).into_view().expect("in front of the door");
/// let (irradiance, normal) = exposure::strongest(&[view], &[290e3]);
/// assert!(irradiance > 8e3 && irradiance < 10e3);
/// assert!(normal.dot(DVec3::NEG_Y) > 0.999);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
#[must_use]
pub fn strongest(views: &[View], weights: &[f64]) -> (f64, DVec3) {
    let most = seen(views, weights)
        .map(|(_, weight)| weight)
        .fold(0.0, f64::max);
    if most == 0.0 {
        return (0.0, DVec3::Z);
    }
    // Shares of the greatest weight: no sum overflows on the way.
    let sum: DVec3 = seen(views, weights)
        .map(|(view, weight)| view.flux() * (weight / most))
        .sum();
    let length = sum.length();
    if length > 0.0 {
        let axis = sum / length;
        if seen(views, weights).all(|(view, _)| view.lies_within_half_right_angle(axis)) {
            return (most * length, axis);
        }
    }
    let lit: Vec<(&View, f64)> = seen(views, weights)
        .map(|(view, weight)| (view, weight / most))
        .collect();
    let (value, normal) = search(&lit, sum);
    (most * value, normal)
}

/// The views that count, with their weights.
fn seen<'a>(views: &'a [View], weights: &'a [f64]) -> impl Iterator<Item = (&'a View, f64)> {
    views
        .iter()
        .zip(weights.iter().copied())
        .filter(|(view, weight)| weight.is_finite() && *weight > 0.0 && view.flux() != DVec3::ZERO)
}

/// Up to this many sources every way to part them by a plane is tried.
const FEW: usize = 12;

/// The greatest of the local maxima reached from many starts.
fn search(lit: &[(&View, f64)], sum: DVec3) -> (f64, DVec3) {
    let mut best = (0.0, DVec3::Z);
    let mut attempt = |start: DVec3| {
        if let Some(start) = start.try_normalize() {
            let found = ascend(lit, start);
            if found.0 > best.0 * (1.0 + 1e-12) {
                best = found;
            }
        }
    };
    for (view, _) in lit {
        attempt(view.flux());
    }
    attempt(sum);
    if lit.len() <= FEW {
        for part in parts(lit) {
            attempt(part);
        }
    } else {
        for code in 0..27_u8 {
            let step = |digit: u8| f64::from(digit) - 1.0;
            attempt(DVec3::new(
                step(code % 3),
                step(code / 3 % 3),
                step(code / 9),
            ));
        }
    }
    // A source that fills a wide angle may hold more than one maximum itself.
    for (view, _) in lit {
        if !view.lies_within_half_right_angle(view.flux().normalize_or_zero()) {
            for place in view.extremes() {
                attempt(place);
            }
        }
    }
    best
}

/// The sums of the flux vectors over each set of sources that a plane through
/// the receiver parts from the others.
fn parts(lit: &[(&View, f64)]) -> Vec<DVec3> {
    let fluxes: Vec<DVec3> = lit
        .iter()
        .map(|(view, weight)| view.flux() * *weight)
        .collect();
    let mut sets: Vec<u32> = Vec::new();
    for (first, one) in fluxes.iter().enumerate() {
        for (second, other) in fluxes.iter().enumerate().skip(first + 1) {
            let plane = one.cross(*other);
            // Planes through both, and, for sources all at one height, planes
            // through one of them across the plane that holds them all.
            for normal in [plane, plane.cross(*one), plane.cross(*other)] {
                for normal in [normal, -normal] {
                    let base = (fluxes.iter().enumerate())
                        .filter(|(index, flux)| {
                            *index != first && *index != second && flux.dot(normal) > 0.0
                        })
                        .fold(0, |set, (index, _)| set | 1 << index);
                    for on_plane in [0, 1 << first, 1 << second, 1 << first | 1 << second] {
                        sets.push(base | on_plane);
                    }
                }
            }
        }
    }
    sets.sort_unstable();
    sets.dedup();
    sets.iter()
        .map(|set| {
            let chosen = fluxes
                .iter()
                .enumerate()
                .filter(|(index, _)| set >> index & 1 == 1);
            chosen.map(|(_, flux)| *flux).sum()
        })
        .collect()
}

/// Goes uphill from a start of length one until the value stands still.
fn ascend(lit: &[(&View, f64)], start: DVec3) -> (f64, DVec3) {
    let gradient = |normal: DVec3| -> DVec3 {
        lit.iter()
            .map(|(view, weight)| view.clipped_flux(normal) * *weight)
            .sum()
    };
    let mut normal = start;
    let mut uphill = gradient(normal);
    for _ in 0..500 {
        let length = uphill.length();
        if length == 0.0 {
            return (0.0, normal);
        }
        let gained = length - uphill.dot(normal);
        normal = uphill / length;
        uphill = gradient(normal);
        if gained <= 1e-15 * length {
            break;
        }
    }
    (uphill.dot(normal).max(0.0), normal)
}
