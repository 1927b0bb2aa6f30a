//! Laws that hold for any input: properties, tried on random ones.

mod exposure_laws;
mod graph_laws;
mod json_laws;
mod view_factor_laws;
