//! The irradiance that several regions give together.

use glam::DVec3;

use super::view::View;

/// Returns the irradiance on a receiver of a given normal, W/m².
#[must_use]
pub fn facing(views: &[View], weights: &[f64], normal: DVec3) -> f64 {
    views
        .iter()
        .zip(weights)
        .map(|(view, weight)| weight * view.factor(normal))
        .sum()
}

/// Returns the greatest irradiance over all receiver orientations, W/m², and
/// the normal at which it is reached.
#[must_use]
pub fn strongest(views: &[View], weights: &[f64]) -> (f64, DVec3) {
    let sum: DVec3 = views
        .iter()
        .zip(weights)
        .map(|(view, weight)| *weight * view.flux())
        .sum();
    (sum.length(), sum.try_normalize().unwrap_or(DVec3::Z))
}
