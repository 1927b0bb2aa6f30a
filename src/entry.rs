//! What a person types into a field: a quantity or an expression over linked cells.
