//! Dimensions, quantities, units, literals, and the one place where numbers become text.
