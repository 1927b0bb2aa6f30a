//! What farglow promises to the world outside: files that other tools read,
//! commands that other programs run, and the layers of its own code.

mod program;
mod sheet;
mod tools;

mod bad_input;
mod calc_json;
mod commands;
mod layers;
mod materials;
mod notebook_files;
mod pdf_read_back;
