//! All screens at once: the temperatures at which each gives off what it
//! absorbs, while it heats the others.

mod exchange;
mod hottest;
#[cfg(test)]
mod tests;

use glam::DVec3;

use self::exchange::Exchange;
use super::grid::Grid;
use super::outlook::Surroundings;
use super::{BACK, FRONT, Plate, Room, Screen};
use crate::physics::scene::Part;
use crate::physics::surface::Emission;
use crate::physics::{Error, planck};

/// All screens in balance.
#[derive(Clone, Debug, PartialEq)]
pub struct Balance {
    /// The screens, in the order in which they were given.
    pub screens: Vec<Heated>,
    /// The greatest difference between what a piece absorbs and what it gives
    /// off, W/m².
    pub residual: f64,
    /// What all screens together give to room and sources by radiation, less
    /// what they get from the room, W.
    pub radiated: f64,
}

/// One screen in balance.
#[derive(Clone, Debug, PartialEq)]
pub struct Heated {
    /// The mean temperature, K.
    pub mean_temperature: f64,
    /// The temperature of the hottest place, K: where it absorbs most, and
    /// convection takes the least that it takes anywhere on a plate.
    pub hottest_temperature: f64,
    /// Where that is.
    pub hottest: DVec3,
    /// What both faces absorb from hot sources, directly or thrown back by other
    /// screens, W per m² of the screen.
    pub absorbed: f64,
    /// The same over the whole screen, W.
    pub power: f64,
    /// The mean exitance of front and back, W/m²: what they emit by themselves.
    pub exitances: [f64; 2],
    /// What both faces give to the air, W per m² of the screen.
    pub convected: f64,
    /// The faces in pieces of one temperature, front and back of each in turn.
    pub patches: Vec<Patch>,
}

/// A piece of one face of a screen.
#[derive(Clone, Debug, PartialEq)]
pub struct Patch {
    /// What emits, to its own side alone.
    pub part: Part,
    /// Whether it is of the front.
    pub is_front: bool,
    /// The temperature, K.
    pub temperature: f64,
    /// What it emits by itself.
    pub emission: Emission,
    /// What it throws back, as a diffuse surface, of the radiation of hot
    /// sources that falls on it, W/m² at all wavelengths. It is not part of
    /// the emission.
    pub thrown_back: f64,
}

/// Works out the temperatures of all screens together.
///
/// `parts` are those of hot sources and `emissions` parallel to them. Screens
/// hide each other, heat each other, and throw radiation back to each other, as
/// diffuse surfaces; what they throw back to sources is lost. The room is black
/// and fills what is seen of nothing else.
///
/// Each screen is cut into 1 to 49 pieces, each in balance for itself: heat led
/// along the plate would only even them out, and send on less (what is
/// radiated goes with the fourth power, so that an uneven plate gives more of
/// its heat to people and less to the air). A person near a plate sees the hot
/// middle of it: patches put together to larger ones of their mean would say too
/// little there.
///
/// # Accuracy
///
/// The balance of every piece to `1e-7` of what it absorbs: the residual is in
/// the result. Large plates close together meet the published relation for
/// shields to `1e-4` K. By its pieces, for plates of 0.6 m to 2 m before a furnace door at
/// 0.3 m to 5 m, against 1600 pieces: what is absorbed within 1 %, the irradiance
/// behind the plate within 1 % from 1 m on and 2.5 % at 0.2 m, the hottest place
/// within 0.1 K; checked in `balance/tests.rs`. What one screen gives to another
/// is made equal to what that one gets, so that no heat is lost.
///
/// # Errors
///
/// [`Error::OutOfRange`] if a number of the room lies outside its range or the
/// emissions are not as many as the parts; [`Error::ScreenTouches`],
/// [`Error::ScreensOverlap`]; what [`Scene::new`](crate::physics::scene::Scene::new)
/// refuses.
///
/// # Source
///
/// Radiosity of grey diffuse faces in two groups of wavelengths: that of hot
/// sources, and that of room and screens. In the limit of large plates the
/// published relations for radiation shields: checked in
/// `tests/laws/screen_laws.rs`.
///
/// # Examples
///
/// ```
/// use farglow::physics::region::Region;
/// use farglow::physics::scene::Part;
/// use farglow::physics::screen::{Convection, Make, Room, Screen, balance};
/// use farglow::physics::surface::Emission;
/// use glam::DVec3;
///
/// let door = Region::rectangle(DVec3::Z, DVec3::Y, DVec3::Z, 0.9, 0.7)?;
/// let hot = Emission::grey(1523.15, 0.95, 0.95)?;
/// let plate = Screen::new(
///     DVec3::new(0.0, 1.5, 1.0), DVec3::NEG_Y, DVec3::Z, 2.0, 2.0, Make::soiled(0.3, 0.9)?,
/// )?;
/// let room = Room { air: 298.15, radiant: 298.15, convection: Convection::Moving(0.0) };
/// let found = balance(&[Part::bare(door)], &[hot], &[plate], &room)?;
/// let plate = &found.screens[0];
/// assert!(plate.mean_temperature > 450.0 && plate.hottest_temperature < 900.0);
/// # Ok::<(), farglow::physics::Error>(())
/// ```
pub fn balance(
    parts: &[Part],
    emissions: &[Emission],
    screens: &[Screen],
    room: &Room,
) -> Result<Balance, Error> {
    let room = room.checked()?;
    if emissions.len() != parts.len() {
        return Err(Error::OutOfRange {
            parameter: "number of emissions",
            range: "that of the emitting parts",
            value: emissions.len() as f64,
        });
    }
    if let Some(total) = (emissions.iter().map(|emission| emission.total))
        .find(|total| !(0.0..=1e13).contains(total))
    {
        return Err(Error::OutOfRange {
            parameter: "exitance",
            range: "from 0 W/m² to 10¹³ W/m²",
            value: total,
        });
    }
    let around = Surroundings::new(parts, emissions, screens)?;
    let mut grids = (0..screens.len())
        .map(|index| Grid::new(&around, screens, index))
        .collect::<Result<Vec<Grid>, Error>>()?;
    let exchange = Exchange::solve(screens, &mut grids, &room);
    let mut residual = 0.0_f64;
    let mut heated = Vec::with_capacity(screens.len());
    for (index, (screen, grid)) in screens.iter().zip(&grids).enumerate() {
        let plate = screen.plate(&room);
        let found = screen_in_balance(screen, index, grid, &exchange, &plate)?;
        residual = residual.max(found.1);
        let mut found = found.0;
        let hottest = hottest::place(&around, index, grid, &exchange);
        found.hottest = hottest.place;
        found.hottest_temperature = plate.hottest(hottest.absorbed);
        heated.push(found);
    }
    Ok(Balance {
        screens: heated,
        residual,
        radiated: exchange.radiated(screens, &grids),
    })
}

/// One screen, all but its hottest place, and its residual.
fn screen_in_balance(
    screen: &Screen,
    index: usize,
    grid: &Grid,
    exchange: &Exchange,
    plate: &Plate,
) -> Result<(Heated, f64), Error> {
    let emissivities = screen.make.emissivities();
    let share = grid.share();
    let mut found = Heated {
        mean_temperature: 0.0,
        hottest_temperature: 0.0,
        hottest: screen.centre,
        absorbed: 0.0,
        power: 0.0,
        exitances: [0.0; 2],
        convected: 0.0,
        patches: Vec::with_capacity(2 * grid.pieces.len()),
    };
    let mut residual = 0.0_f64;
    for (number, piece) in grid.pieces.iter().enumerate() {
        let taken = exchange.taken(index, &piece.outlook);
        let temperature = plate.temperature(taken.absorbed());
        let convected = plate.convected(temperature);
        let black = planck::exitance(temperature);
        residual = residual.max((plate.emissivities * black + convected - taken.absorbed()).abs());
        found.mean_temperature += share * temperature;
        found.absorbed += share * (taken.hot[FRONT] + taken.hot[BACK]);
        found.convected += share * convected;
        let [low, high] = grid.corners(number);
        for face in [FRONT, BACK] {
            let emissivity = emissivities[face];
            found.exitances[face] += share * emissivity * black;
            found.patches.push(Patch {
                part: Part::bare(screen.piece(face, low, high)),
                is_front: face == FRONT,
                temperature,
                emission: Emission::grey(temperature, emissivity, emissivity)?,
                thrown_back: screen.make.hot_reflectances()[face] * taken.fell[face],
            });
        }
    }
    found.power = found.absorbed * screen.area();
    Ok((found, residual + exchange.residual()))
}
