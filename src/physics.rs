//! Thermal radiation between a hot surface and a person: SI `f64` in, SI `f64` out.
