//! Checks against published numbers: one module per source, each test headed
//! by where its numbers come from and how they are known.

mod rows;

mod blackbody_tables;
mod common_practice;
mod defining_constants;
mod every_row;
mod fixed_points;
mod ladle_case;
mod quadrature_of_planck;
mod textbook_examples;
mod view_factor_catalogue;
