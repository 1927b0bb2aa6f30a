//! The linked cells of one job, and what is worked out from them.
