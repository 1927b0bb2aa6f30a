//! The bridge to the physics: its relations by name.

use super::argument::{Kind, Parameter};
use super::{Function, Work};
use crate::physics::radiant::Globe;
use crate::physics::surface::Band;
use crate::physics::view_factor::{disc, rectangle, sphere};
use crate::physics::{atmosphere, planck};
use crate::units::Dimension;

pub(super) use crate::physics::Error;
pub(super) use crate::physics::constant::STEFAN_BOLTZMANN;

const TEMPERATURE: Parameter = Parameter::new("temperature", Kind::Temperature);
const RADIUS: Parameter = Parameter::new("radius", Kind::Length);
const DISTANCE: Parameter = Parameter::new("distance", Kind::Length);
const OFFSET: Parameter = Parameter::new("offset", Kind::Offset);
const WIDTH: Parameter = Parameter::new("width", Kind::Length);
const HEIGHT: Parameter = Parameter::new("height", Kind::Length);

/// The emissivity of a globe thermometer's matt black paint.
const GLOBE: f64 = 0.95;

/// A function all of whose arguments must be there.
const fn function(
    name: &'static str,
    parameters: &'static [Parameter],
    about: &'static str,
    result: Dimension,
    work: fn(&[f64]) -> Result<f64, Error>,
) -> Function {
    Function {
        name,
        about,
        parameters,
        least: parameters.len(),
        most: parameters.len(),
        work: Work::Numbers(result, work),
    }
}

/// This function with its last argument left to be given or not.
const fn last_at_will(mut function: Function) -> Function {
    function.least -= 1;
    function
}

pub(super) static FUNCTIONS: &[Function] = &[
    function(
        "band_fraction",
        &[
            TEMPERATURE,
            Parameter::new("from", Kind::Wavelength),
            Parameter::new("to", Kind::Wavelength),
        ],
        "the part of a black body's exitance between two wavelengths",
        Dimension::NONE,
        |x| {
            if x[1] > x[2] {
                return Err(Error::OutOfRange {
                    parameter: "to",
                    range: "at or above `from`, the shorter wavelength first",
                    value: x[2],
                });
            }
            Ok(planck::band_fraction(x[1], x[2], x[0]))
        },
    ),
    function(
        "blackbody_exitance",
        &[TEMPERATURE],
        "σT⁴",
        Dimension::IRRADIANCE,
        |x| Ok(planck::exitance(x[0])),
    ),
    function(
        "blackbody_temperature",
        &[Parameter::new("exitance", Kind::Exitance)],
        "the temperature of a black body of this exitance",
        Dimension::TEMPERATURE,
        |x| Ok((x[0] / STEFAN_BOLTZMANN).sqrt().sqrt()),
    ),
    function(
        "exitance",
        &[TEMPERATURE, Parameter::new("emissivity", Kind::Emissivity)],
        "εσT⁴",
        Dimension::IRRADIANCE,
        |x| Ok(x[1] * planck::exitance(x[0])),
    ),
    function(
        "mean_radiant_temperature",
        &[
            Parameter::called("globe_temperature", Kind::Temperature, "globe temperature"),
            Parameter::called(
                "air_temperature",
                Kind::Temperature,
                "temperature of the air",
            ),
            Parameter::called("air_speed", Kind::Speed, "speed of the air"),
            Parameter::called("globe_diameter", Kind::Length, "diameter of the globe"),
        ],
        "what a black globe thermometer (emissivity 0.95) shows, after ISO 7726 (from memory)",
        Dimension::TEMPERATURE,
        |x| Globe::new(x[3], GLOBE, x[1], x[2])?.radiant_temperature(x[0]),
    ),
    function(
        "near_ir_fraction",
        &[TEMPERATURE],
        "the part of a black body's exitance from 780 nm to 3000 nm",
        Dimension::NONE,
        |x| Ok(Band::NEAR_INFRARED.fraction(x[0])),
    ),
    function(
        "peak_wavelength",
        &[TEMPERATURE],
        "where the exitance per wavelength is greatest",
        Dimension::LENGTH,
        |x| Ok(planck::peak_wavelength(x[0])),
    ),
    function(
        "saturation_pressure",
        &[Parameter::called(
            "air_temperature",
            Kind::Temperature,
            "temperature of the air",
        )],
        "of water vapour over water, Buck's formula (from memory)",
        Dimension::PRESSURE,
        |x| atmosphere::saturation_pressure(x[0]),
    ),
    function(
        "spectral_exitance",
        &[TEMPERATURE, Parameter::new("wavelength", Kind::Wavelength)],
        "a black body's exitance per wavelength, Planck's law",
        Dimension::SPECTRAL_EXITANCE,
        |x| Ok(planck::spectral_exitance(x[1], x[0])),
    ),
    function(
        "view_factor_disc_disc",
        &[
            RADIUS,
            Parameter::called("other_radius", Kind::Length, "other radius"),
            DISTANCE,
        ],
        "from a disc of the first radius to one of the other, both on one axis, face to face",
        Dimension::NONE,
        |x| disc::to_coaxial_disc(x[0], x[1], x[2]),
    ),
    last_at_will(function(
        "view_factor_disc_parallel",
        &[RADIUS, DISTANCE, OFFSET],
        "from a small element to a disc parallel to it; without an offset on its axis",
        Dimension::NONE,
        |x| match *x {
            [radius, distance] => disc::from_coaxial_element(radius, distance),
            _ => disc::from_parallel_element(x[0], x[1], x[2]),
        },
    )),
    function(
        "view_factor_disc_perpendicular",
        &[RADIUS, DISTANCE, OFFSET],
        "from a small element that faces the axis of a disc square to it",
        Dimension::NONE,
        |x| disc::from_perpendicular_element(x[0], x[1], x[2]),
    ),
    function(
        "view_factor_rectangle_parallel",
        &[WIDTH, HEIGHT, DISTANCE],
        "from a small element to a parallel rectangle, opposite its corner",
        Dimension::NONE,
        |x| rectangle::from_parallel_element_at_corner(x[0], x[1], x[2]),
    ),
    function(
        "view_factor_rectangle_perpendicular",
        &[WIDTH, HEIGHT, DISTANCE],
        "from a small element to a rectangle that stands on its plane, opposite the end of its foot",
        Dimension::NONE,
        |x| rectangle::from_perpendicular_element_at_corner(x[1], x[0], x[2]),
    ),
    function(
        "view_factor_rectangle_rectangle",
        &[WIDTH, HEIGHT, DISTANCE],
        "from one of two equal rectangles to the other, parallel and face to face",
        Dimension::NONE,
        |x| rectangle::to_parallel_rectangle(x[0], x[1], x[2]),
    ),
    last_at_will(function(
        "view_factor_sphere",
        &[RADIUS, DISTANCE, Parameter::new("tilt", Kind::Angle)],
        "from a small element to a sphere, by the distance of its centre; without a tilt facing it",
        Dimension::NONE,
        |x| sphere::from_tilted_element(x[0], x[1], x.get(2).copied().unwrap_or(0.0)),
    )),
];
