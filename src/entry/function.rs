//! The functions of entries, and the bridge to the physics.
