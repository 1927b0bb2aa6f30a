//! What farglow promises to the world outside: files that other tools read.

mod sheet;

mod pdf_read_back;
