//! Sections, curves and rails as plain pictures; knows no screen and no PDF.
