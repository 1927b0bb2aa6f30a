//! Facts of the trade. Common practice, no source.

use farglow::physics::planck;
use farglow::physics::region::Region;
use glam::DVec3;

/// Source: common practice, no source: 77 K peaks near 38 µm and emits about 2 W/m²; 300 K 9.7 µm, about 460 W/m²; 600 K near 5 µm, about 7.4 kW/m²; 5500 K near 530 nm. Peaks to half the last digit said; exitances to 1 %: 600 K gives 7.349 kW/m², 0.7 % below what is said.
#[test]
fn bodies_peak_and_emit_where_the_trade_says() {
    for (temperature, peak, half_digit) in [
        (77.0, 38e-6, 0.5e-6),
        (300.0, 9.7e-6, 0.05e-6),
        (600.0, 5e-6, 0.5e-6),
        (5500.0, 530e-9, 5e-9),
    ] {
        let found = planck::peak_wavelength(temperature);
        assert!(
            (found - peak).abs() <= half_digit,
            "{temperature} K peaks at {found:e} m, said to be {peak:e} m"
        );
    }
    for (temperature, exitance) in [(77.0, 2.0), (300.0, 460.0), (600.0, 7.4e3)] {
        let found = planck::exitance(temperature);
        assert!(
            (found / exitance - 1.0).abs() <= 0.01,
            "{temperature} K emits {found} W/m², said to be about {exitance}"
        );
    }
}

/// Source: common practice, no source: the peak is where the exitance per wavelength is greatest.
#[test]
fn nothing_is_brighter_than_the_peak() {
    for temperature in [77.0, 300.0, 600.0, 1523.15, 5500.0] {
        let peak = planck::peak_wavelength(temperature);
        let top = planck::spectral_exitance(peak, temperature);
        for step in 1..400 {
            let wavelength = peak * 0.01 * f64::from(step);
            let found = planck::spectral_exitance(wavelength, temperature);
            assert!(
                found <= top * (1.0 + 1e-14),
                "{temperature} K: {found:e} at {wavelength:e} m above {top:e} at the peak"
            );
        }
    }
}

/// Source: common practice, no source: twice the absolute temperature is sixteen times the flux.
#[test]
fn twice_as_hot_is_sixteen_times_the_flux() {
    for temperature in [77.0, 300.0, 650.0, 1200.0] {
        let ratio = planck::exitance(2.0 * temperature) / planck::exitance(temperature);
        assert!(
            (ratio - 16.0).abs() < 1e-13,
            "{temperature} K: ratio {ratio}"
        );
    }
}

/// Source: common practice, no source: flux falls with distance, and the source's power stays. What passes a closed sphere about the source, by quadrature, is the area times the exitance, near and far.
#[test]
fn power_through_a_closed_sphere_is_the_power_of_the_source() {
    let sources = [
        Region::disc(DVec3::ZERO, DVec3::new(0.2, -0.3, 1.0), 0.4),
        Region::rectangle(DVec3::ZERO, DVec3::new(1.0, 0.5, 0.2), DVec3::Z, 0.9, 0.7),
        Region::sphere(DVec3::new(0.1, 0.0, -0.05), 0.4),
    ];
    for source in sources {
        let source = source.expect("a possible source");
        let mut strongest_before = f64::INFINITY;
        for radius in [1.5, 4.0, 25.0] {
            // Equal steps in z and in the angle: equal areas of the sphere.
            let (rings, steps) = (400_u32, 400_u32);
            let (mut power, mut strongest) = (0.0, 0.0_f64);
            for ring in 0..rings {
                let z = -1.0 + 2.0 * (f64::from(ring) + 0.5) / f64::from(rings);
                for step in 0..steps {
                    let angle = std::f64::consts::TAU * (f64::from(step) + 0.5) / f64::from(steps);
                    let across = (1.0 - z * z).sqrt();
                    let outward = DVec3::new(across * angle.cos(), across * angle.sin(), z);
                    let view = source
                        .view(outward * radius)
                        .into_view()
                        .expect("away from the source");
                    let irradiance = view.factor(-outward);
                    power += irradiance * 4.0 * std::f64::consts::PI * radius * radius
                        / f64::from(rings * steps);
                    strongest = strongest.max(irradiance);
                }
            }
            let expected = source.area();
            assert!(
                (power / expected - 1.0).abs() < 2e-4,
                "{source:?} at {radius} m: power {power} against {expected}"
            );
            assert!(
                strongest < strongest_before,
                "{source:?} at {radius} m: {strongest} is no less than {strongest_before}"
            );
            strongest_before = strongest;
        }
    }
}
