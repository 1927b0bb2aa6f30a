//! The window: the notebook on the desk.

pub mod shared;
