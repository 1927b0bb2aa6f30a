//! Openings through thick walls: the furnace behind the inner edge, the walls
//! of the tunnel, cold or re-radiating in balance.
//!
//! Lengths in metres. A wall's depth is measured inwards from the outer face,
//! the one towards people. What a person sees follows from the parts, looked at
//! in a scene; [`Opening::effective_emissivity`] is a mean over all directions
//! and never the way to an irradiance.

mod faces;
pub mod section;
#[cfg(test)]
mod tests;
pub mod tunnel;

use glam::DVec3;

use self::section::Section;
use self::tunnel::Tunnel;
use super::Error;
use super::constant::STEFAN_BOLTZMANN;
use super::error::{SHORTEST, offset};
use super::region::Region;
use super::scene::Part;
use super::surface::Emission;
use crate::numeric::gauss::Rule;

/// What the walls of a tunnel do with what falls on them.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Walls {
    /// They keep it: cooled walls, or walls that have not yet warmed up.
    Cold,
    /// They send all of it on, diffusely, from temperatures that leave them in
    /// balance: hot refractory. The safe assumption.
    #[default]
    Reradiating,
}

/// An opening through a thick wall, with its walls in balance.
#[derive(Clone, Debug)]
pub struct Opening {
    parts: Vec<Part>,
    exitances: Vec<f64>,
    transmitted: f64,
    /// Width, height and depth of a rectangular tunnel that re-radiates.
    sides: Option<[f64; 3]>,
}

impl Opening {
    /// Returns the opening through a wall.
    ///
    /// `outer` is the outline in the outer face, a disc or a polygon without
    /// dents, its normal towards people; `depth` is the wall's thickness in
    /// metres. With no thickness the opening is its outline, of any flat shape.
    ///
    /// # Accuracy
    ///
    /// What is seen of the parts together, times their exitances, is that of
    /// the smooth exitance of the walls, in shares of what the unhidden outline
    /// would send to a receiver that faces along its axis: to `1e-4`, for walls
    /// deeper than four openings to `2e-4`; zones meet at the points of a Gauss
    /// rule for that. Round walls have that exitance exactly. Walls of other
    /// outlines differ round the outline and are taken at their mean: of a
    /// rectangle, held against walls worked out face by face, what is seen is
    /// off by up to `1e-3` of the unhidden outline, and by up to `2e-3` within
    /// a width of the hole or more than 60° off its axis. Of other polygons
    /// that was not worked out.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the depth is negative or above
    /// [`tunnel::DEEPEST`] times the least width of the opening, or the outline
    /// has more than [`section::MOST_CORNERS`] vertices; [`Error::NotConvex`];
    /// [`Error::WrongShape`] for a body.
    ///
    /// # Source
    ///
    /// As [`Tunnel::new`]; checked in `tests/published/thick_openings.rs`.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::opening::{Opening, Walls};
    /// use farglow::physics::region::Region;
    /// use glam::DVec3;
    ///
    /// let outer = Region::disc(DVec3::Z, DVec3::Y, 0.5)?;
    /// let door = Opening::new(outer, 0.5, Walls::Reradiating)?;
    /// assert!((door.effective_emissivity(1.0)? - 0.671_98).abs() < 1e-5);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn new(outer: Region, depth: f64, walls: Walls) -> Result<Self, Error> {
        let depth = offset("wall thickness", depth)?;
        let Some(normal) = outer.normal() else {
            return Err(Error::WrongShape {
                parameter: "an opening",
                wanted: "a flat disc or polygon",
            });
        };
        if depth < SHORTEST {
            return Ok(Self {
                parts: vec![Part::bare(outer)],
                exitances: vec![1.0],
                transmitted: 1.0,
                sides: None,
            });
        }
        let tunnel = Tunnel::new(section(&outer, normal)?, depth)?;
        let edge = |depth: f64| outer.moved(normal * -depth);
        match walls {
            Walls::Cold => Ok(Self {
                parts: vec![Part {
                    region: edge(depth),
                    through: Some(outer),
                    less: None,
                }],
                exitances: vec![1.0],
                transmitted: tunnel.section().through(depth),
                sides: None,
            }),
            Walls::Reradiating => {
                let (edges, exitances) = zones(&tunnel, depth / tunnel.section().least_width());
                let parts = (0..edges.len())
                    .map(|index| Part {
                        region: edge(edges[index]),
                        through: (index > 0).then(|| outer.clone()),
                        less: edges.get(index + 1).map(|next| edge(*next)),
                    })
                    .collect();
                Ok(Self {
                    parts,
                    exitances,
                    transmitted: tunnel.transmitted(),
                    sides: tunnel
                        .section()
                        .sides()
                        .map(|[width, height]| [width, height, depth]),
                })
            }
        }
    }

    /// Returns what is seen of the opening: the zones of its walls from the
    /// outer edge inwards, if they send anything, and last the furnace behind
    /// the inner edge.
    #[must_use]
    pub fn parts(&self) -> &[Part] {
        &self.parts
    }

    /// Returns the exitances of the parts, of the furnace's own, in `0..=1`.
    ///
    /// Parallel to [`Opening::parts`]; the last is one.
    #[must_use]
    pub fn exitances(&self) -> &[f64] {
        &self.exitances
    }

    /// Returns what leaves the outer face over σT⁴ times its area, for a furnace
    /// of an emissivity in (0, 1].
    ///
    /// A mean over all directions: on the axis the opening is up to twice as
    /// strong. Never the way to an irradiance.
    ///
    /// # Accuracy
    ///
    /// Round: `1e-9`. Rectangles with re-radiating walls: `3e-5` for sides up
    /// to 1:10 and walls up to six openings deep, worked out face by face, which
    /// takes some milliseconds a call; beyond, and for polygons, high by at
    /// most `2e-4`. Cold walls: as the closed forms.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] for the emissivity.
    ///
    /// # Source
    ///
    /// As [`Tunnel::new`]; checked in `tests/published/thick_openings.rs`.
    pub fn effective_emissivity(&self, emissivity: f64) -> Result<f64, Error> {
        let emissivity =
            super::error::positive("emissivity", emissivity, 1.0, "above 0 and at most 1")?;
        let by_faces = self
            .sides
            .and_then(|[width, height, depth]| faces::transmitted(width, height, depth));
        Ok(emissivity * by_faces.unwrap_or(self.transmitted))
    }

    /// Returns by how much the furnace's own reflection raises its exitance,
    /// at least one.
    ///
    /// `emissivity` ε in (0, 1] of the furnace behind the inner edge, as it
    /// would be seen without a wall. What the tunnel sends back falls into the
    /// furnace, which reflects 1 − ε of it: with walls that re-radiate, the
    /// share W that gets through and diffuse reflection this is
    /// 1/(1 − (1 − ε)(1 − W)). Nothing here counts it in: an emissivity that
    /// was estimated for the hole as it stands holds it already.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] for the emissivity.
    ///
    /// # Source
    ///
    /// The sum of the geometric series of reflections; checked in this module.
    pub fn reflection_gain(&self, emissivity: f64) -> Result<f64, Error> {
        let emissivity =
            super::error::positive("emissivity", emissivity, 1.0, "above 0 and at most 1")?;
        let returned = if self.parts.len() > 1 {
            1.0 - self.transmitted
        } else {
            0.0
        };
        Ok(1.0 / (1.0 - (1.0 - emissivity) * returned))
    }

    /// Returns what leaves each of the parts, in W/m² by band and weighting.
    ///
    /// `furnace` is what leaves the furnace behind the inner edge. A wall's
    /// total is its share of the furnace's. Walls send on part of what falls on
    /// them as it came, and part as their own emission, by an emissivity that
    /// nobody knows: for each band the greater of the furnace's and that of the
    /// wall's own temperature at the same total counts. That errs to the safe
    /// side; for furnaces below 2000 K the furnace's own is the greater in all
    /// bands.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the furnace's total is that of no possible
    /// temperature.
    pub fn emissions(&self, furnace: &Emission) -> Result<Vec<Emission>, Error> {
        let last = self.parts.len() - 1;
        self.exitances
            .iter()
            .enumerate()
            .map(|(index, share)| {
                if index == last {
                    Ok(*furnace)
                } else {
                    of_wall(furnace, *share)
                }
            })
            .collect()
    }
}

/// The temperature of a black body of an exitance, K.
fn temperature(exitance: f64) -> f64 {
    (exitance / STEFAN_BOLTZMANN).sqrt().sqrt()
}

fn of_wall(furnace: &Emission, share: f64) -> Result<Emission, Error> {
    let own = Emission::grey(temperature(share * furnace.total), 1.0, 1.0)?;
    let greater = |furnace: f64, own: f64| own.max(share * furnace);
    Ok(Emission {
        total: share * furnace.total,
        near_infrared: greater(furnace.near_infrared, own.near_infrared),
        skin: greater(furnace.skin, own.skin),
        blue_light: greater(furnace.blue_light, own.blue_light),
        retinal_2006: greater(furnace.retinal_2006, own.retinal_2006),
        retinal_2013: greater(furnace.retinal_2013, own.retinal_2013),
        infrared_a: greater(furnace.infrared_a, own.infrared_a),
        ultraviolet: greater(furnace.ultraviolet, own.ultraviolet),
        ultraviolet_a: greater(furnace.ultraviolet_a, own.ultraviolet_a),
    })
}

/// Where the zones begin, from the outer edge to the inner one, and their
/// exitances.
///
/// Zone by zone the exitance rises by what a Gauss rule gives its slope at
/// that edge. What is seen then is that rule's value of ∫ F dJ, which for a
/// smooth F is good far beyond what as many zones of mean exitance would be.
fn zones(tunnel: &Tunnel, ratio: f64) -> (Vec<f64>, Vec<f64>) {
    let count = zone_count(ratio);
    let mut edges = vec![0.0];
    let mut exitances = vec![tunnel.exitance(0.0)];
    let mut exitance = tunnel.exitance(0.0);
    let deepest = tunnel.depth();
    for (place, weight) in Rule::new(count).on(0.0, 1.0) {
        // Closer towards the outer edge, which is what is seen from the side.
        let depth = 0.5 * deepest * (place + place * place);
        let rise = weight * deepest * (0.5 + place) * tunnel.slope(depth);
        exitance += rise.max(0.0);
        edges.push(depth);
        exitances.push(exitance.min(1.0));
    }
    edges.push(tunnel.depth());
    exitances.push(1.0);
    (edges, exitances)
}

/// How many edges lie between the outer and the inner one, of a tunnel so many
/// openings deep.
fn zone_count(ratio: f64) -> u16 {
    4 + (16.0 * ratio).ceil().min(20.0) as u16
}

/// The section of the tunnel behind an outline.
fn section(outer: &Region, normal: DVec3) -> Result<Section, Error> {
    match outer {
        Region::Disc { radius, .. } => Section::disc(*radius),
        Region::Polygon { vertices, .. } => {
            if let Some((width, height)) = sides(vertices) {
                return Section::rectangle(width, height);
            }
            Section::turning(vertices, normal)
        }
        Region::Sphere { .. } | Region::Cylinder { .. } | Region::Plate { .. } => {
            Err(Error::WrongShape {
                parameter: "an opening",
                wanted: "a flat disc or polygon",
            })
        }
    }
}

/// Width and height of a polygon that is a rectangle.
fn sides(vertices: &[DVec3]) -> Option<(f64, f64)> {
    let [a, b, c, d] = vertices else { return None };
    let (width, height) = (*b - *a, *d - *a);
    let skew = width.dot(height).abs() / (width.length() * height.length());
    let off = (*c - *b - height).length() / height.length();
    (skew < 1e-9 && off < 1e-9).then(|| (width.length(), height.length()))
}
