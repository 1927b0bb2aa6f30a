//! Checks against published numbers: one module per source, each test headed
//! by where its numbers come from and how they are known.

mod guidance_rows;
mod rows;

mod blackbody_tables;
mod burns;
mod cavities;
mod common_practice;
mod defining_constants;
mod directive_2006_25;
mod every_guidance_row;
mod every_row;
mod fixed_points;
mod globe;
mod heat_strain_library;
mod heat_strain_rows;
mod ladle_case;
mod ladle_notebook;
mod natural_wet_bulb;
mod quadrature_of_planck;
mod screened_scenes;
mod shields;
mod shop_air;
mod textbook_examples;
mod thick_openings;
mod time_to_pain;
mod view_factor_catalogue;
