//! The irradiance ramp: perceptually even, right in greyscale and for
//! colour-blind eyes. Strong is dark on light ground and bright on dark ground,
//! so every drawing that uses it carries its legend.

use std::sync::LazyLock;

use crate::drawing::hatch::Hatch;
use crate::drawing::role::{Colour, Role, Theme};

/// The published table: 256 lines of red, green, blue in `0..=1`, dark to light.
const TABLE: &str = include_str!("../../resources/ramp/lajolla.txt");

static COLOURS: LazyLock<Vec<Colour>> = LazyLock::new(|| {
    TABLE
        .lines()
        .filter_map(|line| {
            let mut channels = line.split_whitespace().map(|text| {
                // The table is a resource of ours, read by a test.
                (text.parse::<f64>().unwrap_or(0.0).clamp(0.0, 1.0) * 255.0).round() as u8
            });
            Some(Colour::new(
                channels.next()?,
                channels.next()?,
                channels.next()?,
            ))
        })
        .collect()
});

/// Returns the colour of a strength, weakest 0 and strongest 1.
///
/// Strengths outside `0..=1` are clamped; one that is not a number reads as the
/// strongest, the safe side.
///
/// # Source
///
/// Crameri, *Scientific colour maps* 8.0, doi:10.5281/zenodo.8035877, lajolla;
/// values as packed in cmcrameri 1.10 (read). Its evenness is checked in this
/// file.
///
/// # Examples
///
/// ```
/// use farglow::drawing::{ramp, role::Theme};
///
/// let weak = ramp::colour(0.0, Theme::Light);
/// let strong = ramp::colour(1.0, Theme::Light);
/// assert!(weak.lightness() > strong.lightness());
/// ```
pub fn colour(strength: f64, theme: Theme) -> Colour {
    let strength = if strength.is_nan() {
        1.0
    } else {
        strength.clamp(0.0, 1.0)
    };
    let last = COLOURS.len().saturating_sub(1);
    let step = (strength * last as f64).round() as usize;
    let index = match theme {
        Theme::Light => last - step.min(last),
        Theme::Dark => step.min(last),
        // Told by `hatch` alone.
        Theme::Contrast => return Role::Card.colour(theme),
    };
    COLOURS.get(index).copied().unwrap_or(Colour::new(0, 0, 0))
}

/// Returns the hatch that stands for a strength where there are no tints: the
/// stronger, the closer its lines; none in the other themes.
///
/// Strengths are taken as [`colour`] takes them. Lines are 11 to 1.1 points
/// apart, in even ratios, so that equal steps of strength look alike.
///
/// # Examples
///
/// ```
/// use farglow::drawing::{ramp, role::Theme};
///
/// let weak = ramp::hatch(0.1, Theme::Contrast).expect("this theme hatches");
/// let strong = ramp::hatch(0.9, Theme::Contrast).expect("this theme hatches");
/// assert!(weak.spacing > strong.spacing);
/// ```
pub fn hatch(strength: f64, theme: Theme) -> Option<Hatch> {
    let strength = if strength.is_nan() {
        1.0
    } else {
        strength.clamp(0.0, 1.0)
    };
    (theme == Theme::Contrast).then(|| Hatch {
        spacing: 11.0 * 0.1_f64.powf(strength),
        angle: 45.0,
        width: 0.7,
        role: Role::Ink,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_published_table_is_read_whole() {
        assert_eq!(COLOURS.len(), 256, "colours: {}, wanted 256", COLOURS.len());
        // First and last line of the published file.
        assert_eq!(COLOURS[0], Colour::new(25, 25, 0));
        assert_eq!(COLOURS[255], Colour::new(255, 254, 203));
    }

    #[test]
    fn lightness_rises_evenly_along_the_ramp() {
        let lightness: Vec<f64> = (0..=32)
            .map(|i| colour(f64::from(i) / 32.0, Theme::Dark).lightness())
            .collect();
        let mean = (lightness[32] - lightness[0]) / 32.0;
        for (i, pair) in lightness.windows(2).enumerate() {
            let step = pair[1] - pair[0];
            assert!(step > 0.0, "step {i} falls: {step}");
            assert!(
                step < 2.0 * mean,
                "step {i} is uneven: {step:.2}, mean {mean:.2}"
            );
        }
    }

    #[test]
    fn strong_is_dark_on_paper_and_bright_in_the_dark() {
        for (theme, sign) in [(Theme::Light, -1.0), (Theme::Dark, 1.0)] {
            let rise = colour(1.0, theme).lightness() - colour(0.0, theme).lightness();
            assert!(rise * sign > 70.0, "{theme:?}: {rise}");
        }
    }

    #[test]
    fn without_tints_the_hatch_grows_closer_with_strength() {
        let spacing = |strength| {
            hatch(strength, Theme::Contrast)
                .expect("this theme hatches")
                .spacing
        };
        for (strength, expected) in [(0.0, 11.0), (1.0, 1.1), (7.0, 1.1), (f64::NAN, 1.1)] {
            let got = spacing(strength);
            assert!(
                (got - expected).abs() < 1e-12,
                "{strength}: {got}, wanted {expected}"
            );
        }
        assert!(hatch(0.5, Theme::Light).is_none() && hatch(0.5, Theme::Dark).is_none());
    }

    #[test]
    fn what_is_not_a_number_reads_as_the_strongest() {
        let strongest = colour(1.0, Theme::Light);
        assert_eq!(colour(f64::NAN, Theme::Light), strongest);
        assert_eq!(colour(f64::INFINITY, Theme::Light), strongest);
        assert_eq!(colour(-3.0, Theme::Light), colour(0.0, Theme::Light));
    }
}
