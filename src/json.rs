//! JSON with the place of every value, and without duplicate keys.
