//! The notebook as pages to sign and file.
