//! The whole window from presets, without a display: clicks, letters and keys
//! in, shown text and the stored notebook out.

mod areas;
mod desk;
mod disk;
mod editing;
mod files;
mod pictures;
mod prose;
mod reading;
mod width;
