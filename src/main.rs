//! The farglow program.

fn main() {}
