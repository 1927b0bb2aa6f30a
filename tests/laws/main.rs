//! Laws that hold for any input: properties, tried on random ones.

mod graph_laws;
mod json_laws;
