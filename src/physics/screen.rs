//! Screens between hot sources and people: what heats them, and what they send
//! on.
//!
//! Kelvin, metres, W/m². A screen takes the temperature at which it gives off
//! what it absorbs. Nothing is led sideways in it: its hottest place is as hot
//! as it can be, and it sends on the most that it can.

mod air;
mod balance;
mod convection;
mod grid;
mod make;
mod mirror;
mod outlook;
mod plate;

pub use air::Air;
pub use balance::{Balance, Heated, Patch, balance};
pub use convection::{Convection, Face, LEAST_SHARE};
pub use make::{Make, SOILED};
pub use mirror::{Image, REFLECTING};
pub use plate::{Plate, Walls};

use glam::DVec3;

use super::Error;
use super::error::positive;
use super::region::Region;
use super::scene::Barrier;
use super::surface::Emission;

/// A flat rectangular screen in space.
#[derive(Clone, Debug, PartialEq)]
pub struct Screen {
    region: Region,
    centre: DVec3,
    normal: DVec3,
    /// Half of its width, to the right as seen from in front.
    side: DVec3,
    /// Half of its height.
    up: DVec3,
    make: Make,
}

impl Screen {
    /// Returns a screen.
    ///
    /// `normal` is that of its front, `up` runs along its height (what of it is
    /// perpendicular to the normal counts); both of any length. `width` and
    /// `height` in metres.
    ///
    /// # Errors
    ///
    /// As [`Region::rectangle`], and [`Error::OutOfRange`] for a number of its
    /// make.
    pub fn new(
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
        width: f64,
        height: f64,
        make: Make,
    ) -> Result<Self, Error> {
        let make = make.checked()?;
        let region = Region::rectangle(centre, normal, up, width, height)?;
        let Region::Polygon { vertices, normal } = &region else {
            unreachable!("a rectangle is made as a polygon")
        };
        let (side, up) = (
            0.5 * (vertices[1] - vertices[0]),
            0.5 * (vertices[3] - vertices[0]),
        );
        Ok(Self {
            centre,
            normal: *normal,
            side,
            up,
            make,
            region,
        })
    }

    /// Returns its outline, with the normal of its front.
    #[must_use]
    pub fn region(&self) -> &Region {
        &self.region
    }

    /// Returns what it is made of.
    #[must_use]
    pub fn make(&self) -> Make {
        self.make
    }

    /// Returns the area of one face, m².
    #[must_use]
    pub fn area(&self) -> f64 {
        4.0 * self.side.length() * self.up.length()
    }

    /// Returns what it hides, or lets through only in part.
    #[must_use]
    pub fn barrier(&self) -> Barrier {
        Barrier {
            region: self.region.clone(),
            clear: self.make.is_clear(),
        }
    }

    /// Returns the outline of a face, with its normal.
    fn outline(&self, face: usize) -> Region {
        self.rectangle(face, [-1.0; 2], [1.0; 2], DVec3::ZERO)
    }

    /// Returns the rectangle of a face from `low` to `high`, both in −1..=1 along
    /// side and up, a hair in front of the screen, which hides what lies in its
    /// plane.
    fn piece(&self, face: usize, low: [f64; 2], high: [f64; 2]) -> Region {
        self.rectangle(face, low, high, self.outward(face) * self.lift())
    }

    fn lift(&self) -> f64 {
        LIFT * self.side.length().min(self.up.length())
    }

    fn rectangle(&self, face: usize, low: [f64; 2], high: [f64; 2], lift: DVec3) -> Region {
        let at = |x: f64, y: f64| self.centre + self.side * x + self.up * y + lift;
        let mut vertices = vec![
            at(low[0], low[1]),
            at(high[0], low[1]),
            at(high[0], high[1]),
            at(low[0], high[1]),
        ];
        if face == BACK {
            vertices.reverse();
        }
        Region::Polygon {
            vertices,
            normal: self.outward(face),
        }
    }

    /// Says whether a place in its plane lies within its outline.
    fn holds(&self, place: DVec3) -> bool {
        let from = place - self.centre;
        let within = |edge: DVec3| from.dot(edge).abs() <= edge.length_squared() * (1.0 + 1e-12);
        within(self.side) && within(self.up)
    }

    /// Says whether a place lies in it, between its faces.
    fn has(&self, place: DVec3) -> bool {
        (place - self.centre).dot(self.normal).abs() <= self.lift() && self.holds(place)
    }

    /// The normal of a face.
    fn outward(&self, face: usize) -> DVec3 {
        if face == FRONT {
            self.normal
        } else {
            -self.normal
        }
    }

    /// A small piece of it, with the room it stands in.
    fn plate(&self, room: &Room) -> Plate {
        let (width, height) = (2.0 * self.side.length(), 2.0 * self.up.length());
        let rise = |edge: DVec3| edge.z.abs() / edge.length();
        let along = if rise(self.side) > rise(self.up) {
            width
        } else {
            height
        };
        let face = |normal: DVec3| Face {
            along,
            area_over_perimeter: width * height / (2.0 * (width + height)),
            longest: width.max(height),
            upward: normal.z,
        };
        let [front, back] = self.make.emissivities();
        Plate {
            emissivities: front + back,
            covered: 1.0 - self.make.long_transmittance(),
            faces: [face(self.normal), face(-self.normal)],
            convection: room.convection,
            air: room.air,
        }
    }
}

/// Returns what of an emission goes through several clear screens.
///
/// `through` holds the places of the screens in `screens`, as a glimpse of a
/// scene tells them whose first barriers are those of the screens, in their
/// order; a place that is not among them dims nothing.
#[must_use]
pub fn passed(screens: &[Screen], through: &[u16], emission: &Emission) -> Emission {
    (through.iter())
        .filter_map(|place| screens.get(usize::from(*place)))
        .fold(*emission, |emission, screen| screen.make.passed(&emission))
}

/// How far a face is taken to lie in front of its screen, relative to half of its
/// shorter side: far above rounding, a micrometre on a screen of 2 m.
const LIFT: f64 = 1e-6;

/// The faces of a screen, as indices.
const FRONT: usize = 0;
const BACK: usize = 1;

/// What surrounds screens.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Room {
    /// The temperature of the air, K.
    pub air: f64,
    /// The mean temperature of the room's surfaces, K.
    pub radiant: f64,
    /// How heat passes to the air.
    pub convection: Convection,
}

impl Room {
    /// Returns itself if every number lies in its range.
    fn checked(self) -> Result<Self, Error> {
        const RANGE: &str = "above 0 K and at most 2000 K";
        let _ = positive("temperature of the air", self.air, 2000.0, RANGE)?;
        let _ = positive("temperature of the room", self.radiant, 2000.0, RANGE)?;
        let (parameter, range, value, most) = match self.convection {
            Convection::Moving(speed) => {
                ("speed of the air", "from 0 m/s to 100 m/s", speed, 100.0)
            }
            Convection::Stated(coefficient) => (
                "coefficient of convection",
                "from 0 W/(m²·K) to 1000 W/(m²·K)",
                coefficient,
                1000.0,
            ),
        };
        if (0.0..=most).contains(&value) {
            Ok(self)
        } else {
            Err(Error::OutOfRange {
                parameter,
                range,
                value,
            })
        }
    }
}
