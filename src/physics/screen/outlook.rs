//! What a place on a screen sees: sources, other screens, and between them the
//! room.

use glam::DVec3;

use super::{BACK, FRONT, Screen};
use crate::physics::Error;
use crate::physics::scene::{Glimpse, Part, Scene};
use crate::physics::surface::Emission;

/// What one face sees from one place.
///
/// Factors are configuration factors times what clear screens on the way let
/// through; those to screens are parallel to the faces of all screens, front and
/// back in turn.
#[derive(Clone, Debug)]
pub(super) struct Outlook {
    /// What falls on it from hot sources, W/m².
    pub fell: f64,
    /// What of that it absorbs, W/m².
    pub absorbed: f64,
    /// The factor to all hot sources, for radiation of room and screens.
    pub sources: f64,
    /// The factors to screens, for radiation of room and screens.
    pub long: Vec<f64>,
    /// The factors to screens, for radiation of hot sources.
    pub hot: Vec<f64>,
}

/// All sources and screens, as seen from the screens.
pub(super) struct Surroundings<'a> {
    scene: Scene,
    emissions: &'a [Emission],
    screens: &'a [Screen],
}

impl<'a> Surroundings<'a> {
    pub(super) fn new(
        parts: &[Part],
        emissions: &'a [Emission],
        screens: &'a [Screen],
    ) -> Result<Self, Error> {
        let faces = screens.iter().flat_map(|screen| {
            [FRONT, BACK].map(|face| Part::bare(screen.piece(face, [-1.0; 2], [1.0; 2])))
        });
        let parts: Vec<Part> = parts.iter().cloned().chain(faces).collect();
        let barriers = screens.iter().map(Screen::barrier).collect();
        Ok(Self {
            scene: Scene::new(parts, barriers)?,
            emissions,
            screens,
        })
    }

    /// Returns one of the screens.
    pub(super) fn screen(&self, index: usize) -> &Screen {
        &self.screens[index]
    }

    /// Returns what both faces of a screen see from a place on it.
    pub(super) fn outlook(&self, screen: usize, place: DVec3) -> Result<[Outlook; 2], Error> {
        let looked = self.scene.look(place);
        let sources = self.emissions.len();
        let faces = 2 * self.screens.len();
        if let Some(part) = looked.touched().filter(|part| *part < sources) {
            return Err(Error::ScreenTouches { screen, part });
        }
        let lies_on = |other: &usize| *other != screen && self.screens[*other].has(place);
        if let Some(other) = (0..self.screens.len()).find(lies_on) {
            return Err(Error::ScreensOverlap { screen, other });
        }
        let own = &self.screens[screen];
        Ok([FRONT, BACK].map(|face| {
            let normal = own.outward(face);
            let mut found = Outlook {
                fell: 0.0,
                absorbed: 0.0,
                sources: 0.0,
                long: vec![0.0; faces],
                hot: vec![0.0; faces],
            };
            for glimpse in looked.glimpses() {
                let factor = glimpse.view.factor(normal);
                if factor == 0.0 {
                    continue;
                }
                let (long, hot) = self.passage(glimpse, screen);
                if let Some(emission) = self.emissions.get(glimpse.part) {
                    let passed = self.dimmed(glimpse, screen, emission);
                    found.fell += factor * passed.total;
                    found.absorbed += factor * own.make.absorbed(face, &passed);
                    found.sources += factor * long;
                } else {
                    found.long[glimpse.part - sources] += factor * long;
                    found.hot[glimpse.part - sources] += factor * hot;
                }
            }
            found
        }))
    }

    /// The clear screens on the way of a glimpse, but for the one looked from.
    fn on_the_way<'b>(
        &'b self,
        glimpse: &'b Glimpse,
        screen: usize,
    ) -> impl Iterator<Item = &'b Screen> {
        (glimpse.through.iter())
            .map(|barrier| usize::from(*barrier))
            .filter(move |barrier| *barrier != screen)
            .map(|barrier| &self.screens[barrier])
    }

    /// What clear screens let through of the radiation of screens, and of that
    /// of hot sources which screens throw back.
    fn passage(&self, glimpse: &Glimpse, screen: usize) -> (f64, f64) {
        self.on_the_way(glimpse, screen)
            .fold((1.0, 1.0), |(long, hot), on_the_way| {
                (
                    long * on_the_way.make.long_transmittance(),
                    hot * (1.0 - on_the_way.make.hot_absorptance(FRONT)),
                )
            })
    }

    /// What clear screens let through of a source's emission.
    fn dimmed(&self, glimpse: &Glimpse, screen: usize, emission: &Emission) -> Emission {
        self.on_the_way(glimpse, screen)
            .fold(*emission, |emission, on_the_way| {
                on_the_way.make.passed(&emission)
            })
    }
}
