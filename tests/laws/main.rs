//! Laws that hold for any input: properties, tried on random ones.

mod entry_never_panics;
mod entry_reads_like_a_book;
mod exposure_laws;
mod graph_laws;
mod heat_strain_laws;
mod json_laws;
mod notebook_laws;
mod opening_laws;
mod printing_and_parsing_agree;
mod rays;
mod screen_laws;
mod skin_laws;
mod view_factor_laws;
mod visibility_laws;
