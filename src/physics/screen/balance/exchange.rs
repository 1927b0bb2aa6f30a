//! The radiation between screens, as a whole.

use crate::numeric::linear;
use crate::physics::planck;
use crate::physics::screen::grid::Grid;
use crate::physics::screen::outlook::Outlook;
use crate::physics::screen::{BACK, FRONT, Make, Plate, Room, Screen};

/// The number of rounds after which an answer is taken as it is; some five are
/// needed.
const ROUNDS: u32 = 200;

/// How near the radiosities come to standing still, relative to the greatest:
/// what rounding in the balances of pieces allows, with room.
const STILL: f64 = 1e-10;

/// What leaves the faces of all screens. Vectors and the rows of matrices are
/// parallel to the faces, front and back of each screen in turn.
#[derive(Debug)]
pub(super) struct Exchange {
    makes: Vec<Make>,
    /// What faces throw back of the radiation of hot sources, W/m².
    thrown_back: Vec<f64>,
    /// What else leaves faces, emitted or thrown back, W/m².
    radiosities: Vec<f64>,
    /// The exitance of the room, W/m².
    room: f64,
    residual: f64,
}

/// What a place on a screen takes up.
#[derive(Clone, Copy, Debug)]
pub(super) struct Taken {
    /// What falls on both faces of the radiation of hot sources, W/m².
    pub fell: [f64; 2],
    /// What both faces absorb of it.
    pub hot: [f64; 2],
    /// What falls on both faces from room and screens.
    pub long: [f64; 2],
    emissivities: [f64; 2],
}

impl Taken {
    /// All that is absorbed, W/m².
    pub(super) fn absorbed(&self) -> f64 {
        let of = |face: usize| self.hot[face] + self.emissivities[face] * self.long[face];
        of(FRONT) + of(BACK)
    }
}

impl Exchange {
    /// Finds the radiosities of all faces; first makes what screens see of each
    /// other agree.
    pub(super) fn solve(screens: &[Screen], grids: &mut [Grid], room: &Room) -> Self {
        agree(screens, grids);
        let makes: Vec<Make> = screens.iter().map(|screen| screen.make).collect();
        let faces = 2 * screens.len();
        let mut found = Self {
            thrown_back: thrown_back(&makes, grids),
            radiosities: vec![0.0; faces],
            room: planck::exitance(room.radiant),
            residual: 0.0,
            makes,
        };
        let plates: Vec<Plate> = screens.iter().map(|screen| screen.plate(room)).collect();
        let mut temperatures: Vec<Vec<f64>> = (grids.iter())
            .map(|grid| vec![room.radiant; grid.pieces.len()])
            .collect();
        let coupled = any(grids, |outlook| &outlook.long);
        let (mut leaving, mut slopes) = found.leaving(grids, &plates, &mut temperatures);
        if !coupled {
            found.radiosities = leaving;
            return found;
        }
        let mut before = f64::INFINITY;
        for _ in 0..ROUNDS {
            let off: Vec<f64> = (leaving.iter().zip(&found.radiosities))
                .map(|(leaving, radiosity)| leaving - radiosity)
                .collect();
            let most = off.iter().fold(0.0, |most: f64, off| most.max(off.abs()));
            let greatest = leaving
                .iter()
                .fold(0.0, |most: f64, value| most.max(*value));
            found.residual = most;
            if most <= STILL * greatest {
                break;
            }
            // Newton's step while it helps; a plain one always comes nearer.
            let step = if most < before {
                newton(&slopes, &off)
            } else {
                None
            };
            before = most;
            for (face, radiosity) in found.radiosities.iter_mut().enumerate() {
                let change = step.as_ref().map_or(off[face], |step| step[face]);
                *radiosity = (*radiosity + change).max(0.0);
            }
            (leaving, slopes) = found.leaving(grids, &plates, &mut temperatures);
        }
        found
    }

    /// What the balances leave open, W/m².
    pub(super) fn residual(&self) -> f64 {
        self.residual
    }

    /// Returns what a place on a screen takes up.
    pub(super) fn taken(&self, screen: usize, outlook: &[Outlook; 2]) -> Taken {
        let make = &self.makes[screen];
        let falls = |outlook: &Outlook| {
            along(&outlook.long, &self.radiosities) + self.share_of_room(outlook) * self.room
        };
        let back = outlook
            .each_ref()
            .map(|outlook| along(&outlook.hot, &self.thrown_back));
        let hot = [FRONT, BACK]
            .map(|face| outlook[face].absorbed + make.hot_absorptance(face) * back[face]);
        Taken {
            fell: [FRONT, BACK].map(|face| outlook[face].fell + back[face]),
            hot,
            long: outlook.each_ref().map(falls),
            emissivities: make.emissivities(),
        }
    }

    /// The share of the room in what a face sees.
    fn share_of_room(&self, outlook: &Outlook) -> f64 {
        (1.0 - outlook.sources - self.covered(&outlook.long)).max(0.0)
    }

    /// The share of screens in what a face sees: of a mesh its wires.
    fn covered(&self, factors: &[f64]) -> f64 {
        (self.makes.iter().zip(factors.chunks(2)))
            .map(|(make, faces)| (1.0 - make.long_transmittance()) * (faces[0] + faces[1]))
            .sum()
    }

    /// Returns what would leave each face if all others stay as they are, and
    /// how that grows with the radiosity of each, row by row.
    ///
    /// `temperatures` are those of the pieces before, and then the new ones.
    fn leaving(
        &self,
        grids: &[Grid],
        plates: &[Plate],
        temperatures: &mut [Vec<f64>],
    ) -> (Vec<f64>, Vec<Vec<f64>>) {
        let faces = 2 * grids.len();
        let mut leaving = vec![0.0; faces];
        let mut slopes = vec![vec![0.0; faces]; faces];
        for (screen, (grid, plate)) in grids.iter().zip(plates).enumerate() {
            let emissivities = self.makes[screen].emissivities();
            let reflectances = self.makes[screen].reflectances();
            let share = grid.share();
            for (piece, temperature) in grid.pieces.iter().zip(&mut temperatures[screen]) {
                let taken = self.taken(screen, &piece.outlook);
                *temperature = plate.temperature_near(taken.absorbed(), *temperature);
                let black = planck::exitance(*temperature);
                let gain = plate.gain(*temperature, plate.convected(*temperature));
                for face in [FRONT, BACK] {
                    let row = 2 * screen + face;
                    leaving[row] += share
                        * (emissivities[face] * black + reflectances[face] * taken.long[face]);
                    let own = share * emissivities[face] * gain;
                    for (from, slope) in slopes[row].iter_mut().enumerate() {
                        let heats = [FRONT, BACK]
                            .map(|face| emissivities[face] * piece.outlook[face].long[from]);
                        *slope += own * (heats[FRONT] + heats[BACK])
                            + share * reflectances[face] * piece.outlook[face].long[from];
                    }
                }
            }
        }
        (leaving, slopes)
    }

    /// What the screens radiate to room and sources less what they get from the
    /// room, W.
    pub(super) fn radiated(&self, screens: &[Screen], grids: &[Grid]) -> f64 {
        let mut sum = 0.0;
        for (index, (screen, grid)) in screens.iter().zip(grids).enumerate() {
            let absorbed = 1.0 - self.makes[index].long_transmittance();
            for face in [FRONT, BACK] {
                let radiosity = self.radiosities[2 * index + face];
                for piece in &grid.pieces {
                    let outlook = &piece.outlook[face];
                    let out = radiosity * (1.0 - self.covered(&outlook.long));
                    let back = absorbed * self.share_of_room(outlook) * self.room;
                    sum += screen.area() * grid.share() * (out - back);
                }
            }
        }
        sum
    }
}

/// The sum of the products.
fn along(factors: &[f64], values: &[f64]) -> f64 {
    factors
        .iter()
        .zip(values)
        .map(|(factor, value)| factor * value)
        .sum()
}

/// Says whether any screen sees another.
fn any(grids: &[Grid], of: fn(&Outlook) -> &Vec<f64>) -> bool {
    (grids
        .iter()
        .flat_map(|grid| &grid.pieces)
        .flat_map(|piece| &piece.outlook))
    .any(|outlook| of(outlook).iter().any(|factor| *factor != 0.0))
}

/// The step that would bring `off` to nothing if all went on along the slopes.
fn newton(slopes: &[Vec<f64>], off: &[f64]) -> Option<Vec<f64>> {
    linear::solve(
        slopes
            .iter()
            .zip(off)
            .enumerate()
            .map(|(row, (slopes, off))| {
                let mut line: Vec<f64> = slopes.iter().map(|slope| -slope).collect();
                line[row] += 1.0;
                line.push(*off);
                line
            })
            .collect(),
    )
}

/// What faces throw back of the radiation of hot sources, W/m²: from the
/// sources themselves and from one another.
fn thrown_back(makes: &[Make], grids: &[Grid]) -> Vec<f64> {
    let faces = 2 * grids.len();
    let mut reflectances = Vec::with_capacity(faces);
    let mut first = Vec::with_capacity(faces);
    for (make, grid) in makes.iter().zip(grids) {
        for face in [FRONT, BACK] {
            let reflectance = make.hot_reflectances()[face];
            let fell: f64 = grid
                .pieces
                .iter()
                .map(|piece| piece.outlook[face].fell)
                .sum();
            reflectances.push(reflectance);
            first.push(reflectance * grid.share() * fell);
        }
    }
    if first.iter().all(|value| *value == 0.0) || !any(grids, |outlook| &outlook.hot) {
        return first;
    }
    let factors = means(grids, |outlook| &outlook.hot);
    let slopes: Vec<Vec<f64>> = (factors.iter().zip(&reflectances))
        .map(|(row, reflectance)| row.iter().map(|factor| reflectance * factor).collect())
        .collect();
    // Rows sum to less than one but where all is thrown back; then the first
    // reflection stands.
    newton(&slopes, &first).unwrap_or(first)
}

/// The mean factors from face to face.
fn means(grids: &[Grid], of: fn(&Outlook) -> &Vec<f64>) -> Vec<Vec<f64>> {
    let mut found = Vec::with_capacity(2 * grids.len());
    for grid in grids {
        for face in [FRONT, BACK] {
            let mut row = vec![0.0; 2 * grids.len()];
            for piece in &grid.pieces {
                for (sum, factor) in row.iter_mut().zip(of(&piece.outlook[face])) {
                    *sum += grid.share() * factor;
                }
            }
            found.push(row);
        }
    }
    found
}

/// Makes what one screen sees of another, times its area, what that one sees of
/// it: both were found from the middles of pieces, and differ by a little. The
/// mean of both counts, that of the finer cut for more.
///
/// No face comes to see more than there is room for beside the sources.
fn agree(screens: &[Screen], grids: &mut [Grid]) {
    agree_on(
        screens,
        grids,
        |outlook| &outlook.long,
        |outlook| &mut outlook.long,
    );
    agree_on(
        screens,
        grids,
        |outlook| &outlook.hot,
        |outlook| &mut outlook.hot,
    );
}

fn agree_on(
    screens: &[Screen],
    grids: &mut [Grid],
    of: fn(&Outlook) -> &Vec<f64>,
    of_mut: fn(&mut Outlook) -> &mut Vec<f64>,
) {
    if !any(grids, of) {
        return;
    }
    let factors = means(grids, of);
    let faces = factors.len();
    let area = |face: usize| screens[face / 2].area();
    // The finer cut is the nearer to the truth: the error goes with its square.
    let pieces = |face: usize| (grids[face / 2].pieces.len() as f64).powi(2);
    let mut shared = vec![vec![0.0; faces]; faces];
    for one in 0..faces {
        for other in 0..faces {
            let (fine, coarse) = (pieces(one), pieces(other));
            shared[one][other] = (fine * area(one) * factors[one][other]
                + coarse * area(other) * factors[other][one])
                / (fine + coarse);
        }
    }
    let limits: Vec<f64> = (0..faces)
        .map(|face| {
            let grid = &grids[face / 2];
            let sources: f64 = (grid.pieces.iter())
                .map(|piece| grid.share() * piece.outlook[face % 2].sources)
                .sum();
            let covered: f64 = (0..faces)
                .map(|other| {
                    (1.0 - screens[other / 2].make.long_transmittance()) * shared[face][other]
                })
                .sum();
            let free = (1.0 - sources).max(0.0) * area(face);
            if covered > free { free / covered } else { 1.0 }
        })
        .collect();
    for (index, grid) in grids.iter_mut().enumerate() {
        for piece in &mut grid.pieces {
            for face in [FRONT, BACK] {
                let row = 2 * index + face;
                let seen = of_mut(&mut piece.outlook[face]);
                for (other, factor) in seen.iter_mut().enumerate() {
                    let agreed = shared[row][other] * limits[row].min(limits[other]);
                    let mean = factors[row][other];
                    if mean > 0.0 {
                        *factor *= agreed / (area(row) * mean);
                    } else {
                        *factor = agreed / area(row);
                    }
                }
            }
        }
    }
}
