//! What can go wrong between blocks and a finished PDF.

/// Why a PDF could not be written or read.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// There was no page to write.
    #[error("cannot write the worksheet: expected at least one page, found none")]
    NoPages,
    /// A page has a size that no paper has.
    #[error(
        "cannot write page {page}: expected a width and height between 1 and 14 400 points, found {found}"
    )]
    PageSize {
        /// Which page, from 1.
        page: usize,
        /// Its size in words.
        found: String,
    },
    /// A date is not of the form `2026-12-01`.
    #[error(
        "cannot write the date of the worksheet: expected year-month-day like 2026-12-01, found `{0}`"
    )]
    Date(String),
    /// The bundled font could not be cut to the characters used.
    #[error("cannot cut the bundled font to the characters used: {0}")]
    Font(String),
    /// Writing the PDF failed.
    #[error("cannot write the PDF: {0}")]
    Write(String),
    /// The bytes are not a PDF that can be read.
    #[error(
        "cannot read the PDF: {0}; expected a whole file as it was issued, not one printed again or cut short"
    )]
    Damaged(String),
    /// The PDF is protected by a password.
    #[error("cannot read the PDF: it is encrypted; remove the protection and try again")]
    Encrypted,
    /// The PDF carries no file.
    #[error(
        "this PDF carries no notebook: expected a worksheet as it was issued; printing or scanning drops what is attached"
    )]
    NothingAttached,
    /// An attached file is larger than any notebook.
    #[error("cannot read `{name}` from the PDF: expected at most {most} bytes, found more")]
    TooLarge {
        /// The attached file's name.
        name: String,
        /// The limit, in bytes.
        most: usize,
    },
    /// A name that an attached file cannot have.
    #[error("cannot attach `{0}`: expected a plain file name without folders")]
    Name(String),
}
