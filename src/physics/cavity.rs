//! Apparent emissivity of cavities: deep openings with walls and bottom of one
//! temperature.
//!
//! Emissivities are dimensionless, those of the walls in (0, 1]; what leaves the
//! mouth over σT⁴ times its area, a mean over all directions.

#[cfg(test)]
mod tests;

use super::Error;
use super::error::{length, positive};
use super::opening::section::Section;
use super::view_factor::disc;
use crate::numeric::gauss::Rule;
use crate::numeric::legendre::Legendre;
use crate::numeric::linear;

/// How many radii deep a cylinder may be: beyond, the mouth no longer changes.
const DEEPEST: f64 = 100.0;

/// Returns the apparent emissivity of a cylinder with a flat bottom, grey,
/// diffuse and of one temperature.
///
/// `radius` and `depth` in metres, `emissivity` of wall and bottom.
///
/// # Accuracy
///
/// The balance of all reflections by collocation with polynomials along the
/// wall and across the bottom: absolute error below `1e-6`.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a length is not from 10⁻⁹ m to 10⁹ m, the depth
/// above 100 radii, or the emissivity not in (0, 1].
///
/// # Source
///
/// J = ε + (1 − ε) ∫ J dF on wall and bottom, integrated by parts, so that only
/// factors to whole discs occur. Checked in `tests/published/cavities.rs`.
///
/// # Examples
///
/// ```
/// use farglow::physics::cavity;
///
/// let found = cavity::of_cylinder(0.1, 0.2, 0.5)?;
/// assert!((found - 0.808_299).abs() < 1e-6);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn of_cylinder(radius: f64, depth: f64, emissivity: f64) -> Result<f64, Error> {
    let (ratio, emissivity) = checked(radius, depth, emissivity)?;
    Cylinder::new(ratio, emissivity).map(|cylinder| cylinder.apparent().clamp(0.0, 1.0))
}

/// Returns the effective emissivity of an enclosure with a small mouth, as if
/// its wall were lit evenly.
///
/// `mouth_over_wall` is the area of the mouth over that of all walls, in (0, 1].
/// High for deep cavities, where the wall near the mouth is lit less.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a number is not in (0, 1].
///
/// # Source
///
/// 1/(1 + (a/S)(1/ε − 1)), isothermal enclosure with a plane mouth. Checked in
/// `tests/published/cavities.rs`, family `cavity_enclosure`.
pub fn enclosure(mouth_over_wall: f64, emissivity: f64) -> Result<f64, Error> {
    const RANGE: &str = "above 0 and at most 1";
    let share = positive("mouth over wall", mouth_over_wall, 1.0, RANGE)?;
    let emissivity = positive("emissivity", emissivity, 1.0, RANGE)?;
    Ok(emissivity / (emissivity + share * (1.0 - emissivity)))
}

/// Returns the effective emissivity of a cylinder by Gouffé's formula.
///
/// `radius` and `depth` in metres, `emissivity` of wall and bottom. High for
/// deep cylinders with walls that reflect: 0.91 where 0.72 is right for a depth
/// of eight radii and an emissivity of 0.3.
///
/// # Errors
///
/// As [`of_cylinder`].
///
/// # Source
///
/// A. Gouffé, *Revue d'optique* 24 (1945), from memory: ε₀ = ε [1 + (1 − ε)(a/S −
/// a/S₀)] / [ε (1 − a/S) + a/S], S the area with the mouth and, for a cylinder,
/// a/S₀ = 1/(1 + (L/R)²). Checked in `tests/published/cavities.rs`, family
/// `cavity_gouffe`.
pub fn gouffe(radius: f64, depth: f64, emissivity: f64) -> Result<f64, Error> {
    let (ratio, emissivity) = checked(radius, depth, emissivity)?;
    let of_all = 0.5 / (1.0 + ratio);
    let of_sphere = 1.0 / (1.0 + ratio * ratio);
    let first = emissivity * (1.0 + (1.0 - emissivity) * (of_all - of_sphere));
    Ok((first / (emissivity * (1.0 - of_all) + of_all)).clamp(0.0, 1.0))
}

/// The depth in radii, and the emissivity, if both are possible.
fn checked(radius: f64, depth: f64, emissivity: f64) -> Result<(f64, f64), Error> {
    let ratio = length("depth", depth)? / length("radius", radius)?;
    let ratio = positive(
        "depth over radius",
        ratio,
        DEEPEST,
        "above 0 and at most 100",
    )?;
    let emissivity = positive("emissivity", emissivity, 1.0, "above 0 and at most 1")?;
    Ok((ratio, emissivity))
}

/// What leaves wall and bottom of a cylinder of radius one, over σT⁴.
struct Cylinder {
    depth: f64,
    section: Section,
    /// Legendre terms of the wall, from −1 at the bottom to 1 at the mouth.
    wall: Vec<f64>,
    /// Legendre terms of the bottom in r², from −1 in the middle to 1.
    bottom: Vec<f64>,
}

/// Terms of the exitance across the bottom.
const ACROSS: u16 = 26;

impl Cylinder {
    fn new(depth: f64, emissivity: f64) -> Result<Self, Error> {
        let along = 26 + (0.4 * depth).ceil() as u16;
        Self::with_terms(depth, emissivity, along, ACROSS)
    }

    fn with_terms(depth: f64, emissivity: f64, along: u16, across: u16) -> Result<Self, Error> {
        let section = Section::disc(1.0)?;
        let (on_wall, on_bottom) = (usize::from(along), usize::from(across));
        let fine = Rule::new(along.max(across) + 16);
        let reflected = 1.0 - emissivity;
        let mut rows = Vec::with_capacity(on_wall + on_bottom);
        for (height, _) in Rule::new(along).on(0.0, depth) {
            // What the wall gets here of each term.
            let own = section.from_wall(height);
            let mut row: Vec<f64> = Legendre::at(2.0 * height / depth - 1.0)
                .take(on_wall)
                .zip(ends(1.0))
                .zip(ends(-1.0))
                .map(|(((value, _), mouth), foot)| {
                    let lit = value - section.from_wall(depth - height) * mouth - own * foot;
                    value - reflected * lit
                })
                .collect();
            for (from, to, sign) in [(0.0, height, 1.0), (height, depth, -1.0)] {
                for (t, weight) in fine.on(from, to) {
                    let factor = sign * weight * section.from_wall((t - height).abs());
                    let slopes = Legendre::at(2.0 * t / depth - 1.0);
                    for (entry, (_, slope)) in row.iter_mut().zip(slopes) {
                        *entry += reflected * factor * slope * 2.0 / depth;
                    }
                }
            }
            row.extend(ends(1.0).take(on_bottom).map(|rim| -reflected * own * rim));
            for (r, weight) in fine.on(0.0, 1.0) {
                let factor = weight * disc::components(r, height, 1.0).1;
                let slopes = Legendre::at(2.0 * r * r - 1.0);
                for (entry, (_, slope)) in row[on_wall..].iter_mut().zip(slopes) {
                    *entry += reflected * factor * slope * 4.0 * r;
                }
            }
            row.push(emissivity);
            rows.push(row);
        }
        for (square, _) in Rule::new(across).on(0.0, 1.0) {
            let r = square.sqrt();
            let through = disc::components(1.0, depth, r).0;
            let mut row: Vec<f64> = ends(1.0)
                .zip(ends(-1.0))
                .take(on_wall)
                .map(|(mouth, foot)| -reflected * (foot - through * mouth))
                .collect();
            // The factor to a plane bends where it lies as high as the rim is far.
            let bend = (1.0 - r).min(depth);
            for (from, to) in [(0.0, bend), (bend, depth)] {
                for (t, weight) in fine.on(from, to) {
                    let factor = weight * disc::components(1.0, t, r).0;
                    let slopes = Legendre::at(2.0 * t / depth - 1.0);
                    for (entry, (_, slope)) in row.iter_mut().zip(slopes) {
                        *entry -= reflected * factor * slope * 2.0 / depth;
                    }
                }
            }
            row.extend(
                Legendre::at(2.0 * square - 1.0)
                    .take(on_bottom)
                    .map(|(value, _)| value),
            );
            row.push(emissivity);
            rows.push(row);
        }
        let mut wall = linear::solve(rows).ok_or(Error::OutOfRange {
            parameter: "depth over radius",
            range: "one for which the reflections can be solved",
            value: depth,
        })?;
        let bottom = wall.split_off(on_wall);
        Ok(Self {
            depth,
            section,
            wall,
            bottom,
        })
    }

    /// What leaves the wall at a height above the bottom.
    fn of_wall(&self, height: f64) -> f64 {
        Legendre::sum(2.0 * height / self.depth - 1.0, &self.wall)
    }

    /// What leaves the bottom at a square of the distance from the axis.
    fn of_bottom(&self, square: f64) -> f64 {
        Legendre::sum(2.0 * square - 1.0, &self.bottom)
    }

    /// What leaves the mouth.
    fn apparent(&self) -> f64 {
        let fine = Rule::new(64);
        let wall = fine.integral(0.0, self.depth, |height| {
            2.0 * self.section.from_wall(self.depth - height) * self.of_wall(height)
        });
        let bottom = fine.integral(0.0, 1.0, |square| {
            disc::components(1.0, self.depth, square.sqrt()).0 * self.of_bottom(square)
        });
        wall + bottom
    }

    /// What wall and bottom emit less what they take back, over the mouth.
    #[cfg(test)]
    fn given_off(&self, emissivity: f64) -> f64 {
        let fine = Rule::new(64);
        let wall = fine.integral(0.0, self.depth, |height| 2.0 * (1.0 - self.of_wall(height)));
        let bottom = fine.integral(0.0, 1.0, |square| 1.0 - self.of_bottom(square));
        (wall + bottom) * emissivity / (1.0 - emissivity)
    }
}

/// The Legendre polynomials at one end, −1 or 1.
fn ends(z: f64) -> impl Iterator<Item = f64> {
    std::iter::successors(Some(1.0), move |value| Some(value * z))
}
