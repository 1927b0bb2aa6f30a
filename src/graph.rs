//! What depends on what, and what must run again; generic, knows no cells.
