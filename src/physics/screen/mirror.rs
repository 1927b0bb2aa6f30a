//! Where a polished screen throws the picture of a source at people.

use glam::DVec3;

use super::{BACK, FRONT, Make, Screen};
use crate::physics::Error;
use crate::physics::region::Region;
use crate::physics::scene::{Part, Scene, Stance};
use crate::physics::view::View;

/// A face that throws back more than this share of what falls on it counts as a
/// mirror.
///
/// # Source
///
/// Ours: oxidised and painted steel (emissivity 0.8 and above) lies below,
/// galvanised, rolled or aluminised sheet above.
pub const REFLECTING: f64 = 0.3;

/// The picture of a source in a polished screen, as seen from a point.
#[derive(Clone, Debug, PartialEq)]
pub struct Image {
    /// Which part of the sources.
    pub part: usize,
    /// The most that the screen may throw back of it: its exitance times this,
    /// times the factor of the view, is a bound on the irradiance.
    pub reflectance: f64,
    /// The picture, through the outline of the screen.
    pub view: View,
}

impl Make {
    /// Returns the greatest share of a hot source's radiation that a face may
    /// throw back, clean or soiled: one less the lesser of its emissivity and
    /// its absorptance.
    pub(super) fn greatest_reflectance(&self, face: usize) -> f64 {
        match self {
            Self::Solid {
                emissivities,
                absorptances,
            } => 1.0 - emissivities[face].min(absorptances[face]),
            // Scattered by wires to all sides, or a few per cent from glass.
            Self::Mesh { .. } | Self::Filter { .. } => 0.0,
        }
    }
}

impl Screen {
    /// Returns the pictures of sources that are seen in this screen from a point,
    /// if it is polished: its truth is then higher there than what the model
    /// says, by at most what the pictures would give.
    ///
    /// `parts` are those of the sources. A face counts as polished if it may
    /// throw back more than [`REFLECTING`]. Other screens do not hide the
    /// pictures, and of a part that is seen through an outline the picture is
    /// that of the outline: both err to the safe side. A point on the screen or
    /// within a picture sees none.
    ///
    /// # Errors
    ///
    /// What [`Scene::new`] refuses.
    ///
    /// # Source
    ///
    /// Plane mirror: the picture lies as far behind it as the source before it.
    pub fn images(&self, parts: &[Part], point: DVec3) -> Result<Vec<Image>, Error> {
        let mut found = Vec::new();
        for face in [FRONT, BACK] {
            let reflectance = self.make.greatest_reflectance(face);
            let normal = self.outward(face);
            if reflectance <= REFLECTING || (point - self.centre).dot(normal) <= 0.0 {
                continue;
            }
            let outline = self.outline(face);
            let pictures = parts
                .iter()
                .map(|part| Part {
                    region: self.mirrored(part.through.as_ref().unwrap_or(&part.region)),
                    through: Some(outline.clone()),
                    less: None,
                })
                .collect();
            let looked = Scene::new(pictures, Vec::new())?.look(point);
            for glimpse in looked.glimpses() {
                if looked.stance(glimpse.part) != Stance::InFront
                    || !self.is_before(&parts[glimpse.part], face)
                {
                    continue;
                }
                found.push(Image {
                    part: glimpse.part,
                    reflectance,
                    view: glimpse.view.clone(),
                });
            }
        }
        Ok(found)
    }

    /// Says whether any of a part lies on the side of a face.
    fn is_before(&self, part: &Part, face: usize) -> bool {
        let region = part.through.as_ref().unwrap_or(&part.region);
        let ahead = (region.centre() - self.centre).dot(self.outward(face));
        ahead > -region.bounding_radius()
    }

    /// The region behind the screen's plane that looks like one before it.
    fn mirrored(&self, region: &Region) -> Region {
        let turned = |vector: DVec3| vector - 2.0 * vector.dot(self.normal) * self.normal;
        let place = |place: DVec3| self.centre + turned(place - self.centre);
        // Backwards, so that they go round as before when seen from in front.
        let round =
            |vertices: &[DVec3]| vertices.iter().rev().map(|vertex| place(*vertex)).collect();
        match region {
            Region::Disc {
                centre,
                normal,
                radius,
            } => Region::Disc {
                centre: place(*centre),
                normal: turned(*normal),
                radius: *radius,
            },
            Region::Polygon { vertices, normal } => Region::Polygon {
                vertices: round(vertices),
                normal: turned(*normal),
            },
            Region::Plate { vertices, normal } => Region::Plate {
                vertices: round(vertices),
                normal: turned(*normal),
            },
            Region::Sphere { centre, radius } => Region::Sphere {
                centre: place(*centre),
                radius: *radius,
            },
            Region::Cylinder { base, axis, radius } => Region::Cylinder {
                base: place(*base),
                axis: turned(*axis),
                radius: *radius,
            },
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::view_factor::disc;

    /// A screen 2 m in front of a disc in a wall, its front towards it.
    fn screen(width: f64, height: f64, make: Make) -> Screen {
        Screen::new(DVec3::Y * 2.0, DVec3::NEG_Y, DVec3::Z, width, height, make).expect("a screen")
    }

    fn polished() -> Make {
        Make::soiled(0.1, 0.9).expect("a make")
    }

    fn source() -> Vec<Part> {
        vec![Part::bare(
            Region::disc(DVec3::ZERO, DVec3::Y, 0.4).expect("a disc"),
        )]
    }

    #[test]
    fn picture_lies_as_far_behind_as_the_source_before() {
        // From 1.2 m before a large mirror the disc is seen 3.2 m off.
        let found = screen(50.0, 50.0, polished())
            .images(&source(), DVec3::Y * 0.8)
            .expect("pictures");
        let [image] = &found[..] else {
            panic!("{found:?}")
        };
        let expected = disc::from_coaxial_element(0.4, 3.2).expect("a disc");
        let factor = image.view.factor(DVec3::Y);
        assert!(
            (factor / expected - 1.0).abs() < 1e-9,
            "{factor} against {expected}"
        );
        assert_eq!((image.part, image.reflectance), (0, 0.9));
        assert_eq!(image.view.factor(DVec3::NEG_Y), 0.0);
    }

    #[test]
    fn picture_is_cut_by_the_outline_of_the_mirror() {
        // Through a square of 0.1 m the disc is more than covered: what is seen
        // is the square itself.
        let small = screen(0.1, 0.1, polished());
        let found = small.images(&source(), DVec3::Y * 0.8).expect("pictures");
        let [image] = &found[..] else {
            panic!("{found:?}")
        };
        let outline = small
            .region()
            .view(DVec3::Y * 0.8)
            .into_view()
            .expect("ahead");
        let (factor, expected) = (image.view.factor(DVec3::Y), outline.factor(DVec3::Y));
        assert!(
            (factor / expected - 1.0).abs() < 1e-6,
            "{factor} against {expected}"
        );
        // Aside, the picture lies outside the small square.
        let found = small
            .images(&source(), DVec3::new(3.0, 0.8, 0.0))
            .expect("pictures");
        assert!(found.is_empty(), "{found:?}");
    }

    #[test]
    fn no_picture_from_behind_or_in_a_dull_plate() {
        let from_behind = screen(2.0, 2.0, polished())
            .images(&source(), DVec3::Y * 3.0)
            .expect("pictures");
        assert!(from_behind.is_empty(), "{from_behind:?}");
        for make in [
            Make::soiled(0.9, 0.1).expect("a make"),
            Make::Mesh { open_fraction: 0.2 },
        ] {
            let found = screen(2.0, 2.0, make)
                .images(&source(), DVec3::Y * 0.8)
                .expect("pictures");
            assert!(found.is_empty(), "{make:?}: {found:?}");
        }
        // Behind a mirror turned away from it there is nothing to see either.
        let away = Screen::new(DVec3::Y * 2.0, DVec3::Y, DVec3::Z, 2.0, 2.0, polished())
            .expect("a screen");
        let found = away.images(&source(), DVec3::Y * 3.0).expect("pictures");
        assert!(found.is_empty(), "{found:?}");
    }
}
