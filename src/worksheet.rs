//! The notebook as pages to sign and file.
//!
//! [`block`] says what stands on the sheet, [`layout`] breaks it into pages of
//! plain pictures, [`paint`] writes those as PDF, and [`attach`] puts a file
//! into the PDF and takes it out again. The same input gives the same bytes.

pub mod attach;
pub mod block;
mod error;
mod flow;
pub mod layout;
pub mod paint;
pub mod sheet;
mod wrap;

pub use error::Error;
