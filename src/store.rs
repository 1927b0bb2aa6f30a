//! Notebooks as files: read, checked, written whole or not at all.

pub mod file;
pub mod schema;
pub mod settings;
pub mod template;
