//! farglow works out the irradiance that a person meets near a hot source,
//! judges it by cited occupational exposure guidance, and issues the result as
//! a worksheet that can be signed and filed.
//!
//! The layers, from the ground up; imports point down only:
//!
//! | layer | modules |
//! | --- | --- |
//! | ground | [`units`], [`json`], [`graph`], [`physics`], [`spelling`], [`numeric`] |
//! | what a person types, published limits, materials of the trade | [`entry`], [`guidance`], [`material`] |
//! | the linked cells | [`notebook`] |
//! | files | [`store`] |
//! | pictures and paper | [`drawing`], [`worksheet`] |
//! | work off the calling thread | [`work`] |
//! | the window | [`app`] |
//! | the command line | [`command`] |

pub mod app;
pub mod command;
pub mod drawing;
pub mod entry;
pub mod graph;
pub mod guidance;
pub mod json;
pub mod material;
pub mod notebook;
pub mod numeric;
pub mod physics;
pub mod spelling;
pub mod store;
pub mod units;
pub mod work;
pub mod worksheet;
