//! Pictures as the pages of a PDF file, with the bundled font cut to the
//! characters used. The same pictures give the same bytes.

mod cut;
mod page;

use printpdf::{PdfConformance, PdfDocument, PdfPage, PdfSaveOptions, Pt, Rect};
use sha2::{Digest, Sha256};

use crate::drawing::picture::Picture;
use crate::worksheet::Error;

/// What a PDF says about itself.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Meta {
    /// The title, shown in the title bar of a viewer.
    pub title: String,
    /// Who prepared it, if known.
    pub author: Option<String>,
    /// What it is about, if anything is to be said.
    pub subject: Option<String>,
    /// The job's own date, as `2026-12-01`; without one the file has no date.
    pub date: Option<String>,
}

/// What wrote the file, as its metadata says.
pub const PRODUCER: &str = concat!("farglow ", env!("CARGO_PKG_VERSION"));

/// Returns the PDF file of `pages`, in order.
///
/// Text stays text: it can be searched and copied. A character that the bundled
/// font lacks is printed as [`crate::drawing::font::REPLACEMENT`].
///
/// # Errors
///
/// [`Error::NoPages`], [`Error::PageSize`] for a page without a usable size,
/// [`Error::Date`], or [`Error::Font`] and [`Error::Write`] if the libraries
/// beneath fail.
///
/// # Examples
///
/// ```
/// use farglow::drawing::picture::Picture;
/// use farglow::worksheet::paint::{self, Meta};
///
/// let pages = [Picture::new(595.0, 842.0)];
/// let meta = Meta { title: "Charging door".into(), ..Meta::default() };
/// let bytes = paint::pdf(&pages, &meta)?;
/// assert!(bytes.starts_with(b"%PDF-1.7"));
/// assert_eq!(bytes, paint::pdf(&pages, &meta)?);
/// # Ok::<(), farglow::worksheet::Error>(())
/// ```
pub fn pdf(pages: &[Picture], meta: &Meta) -> Result<Vec<u8>, Error> {
    if pages.is_empty() {
        return Err(Error::NoPages);
    }
    for (index, page) in pages.iter().enumerate() {
        let fits = |length: f64| (1.0..=14_400.0).contains(&length);
        if !fits(page.width) || !fits(page.height) {
            let found = format!("{} by {}", page.width, page.height);
            return Err(Error::PageSize {
                page: index + 1,
                found,
            });
        }
    }
    let date = meta.date.as_deref().map(pdf_date).transpose()?;

    let mut document = PdfDocument::new(&meta.title);
    let PdfConformance::Custom(custom) = &mut document.metadata.info.conformance else {
        return Err(Error::Write(
            "the PDF library changed its default conformance".to_owned(),
        ));
    };
    custom.requires_xmp_metadata = false;
    custom.requires_icc_profile = false;
    cut::fonts(pages, &mut document.resources.fonts)?;
    for page in pages {
        // Built by hand: a detour over millimetres would cost the last digit.
        let sheet = Rect::from_wh(Pt(page.width as f32), Pt(page.height as f32));
        document.pages.push(PdfPage {
            media_box: sheet.clone(),
            trim_box: sheet.clone(),
            crop_box: sheet,
            ops: page::operations(page),
        });
    }

    let mut warnings = Vec::new();
    let options = PdfSaveOptions {
        image_optimization: None,
        ..PdfSaveOptions::default()
    };
    let mut file = printpdf::to_lopdf_doc(&document, &options, &mut warnings);
    if let Some(fault) = warnings
        .iter()
        .find(|w| w.severity == printpdf::PdfParseErrorSeverity::Error)
    {
        return Err(Error::Write(fault.msg.clone()));
    }
    describe(&mut file, meta, date)?;
    file.compress();
    identify(&mut file);
    let mut bytes = Vec::new();
    file.save_to(&mut bytes)
        .map_err(|error| Error::Write(error.to_string()))?;
    Ok(bytes)
}

/// Reads `2026-12-01` as a date of PDF.
fn pdf_date(text: &str) -> Result<String, Error> {
    let fault = || Error::Date(text.to_owned());
    let parts: Vec<&str> = text.split('-').collect();
    let [year, month, day] = parts.as_slice() else {
        return Err(fault());
    };
    let number = |part: &str, digits: usize, most: u32| {
        let plain = part.len() == digits && part.bytes().all(|b| b.is_ascii_digit());
        let value = part.parse::<u32>().ok()?;
        (plain && (1..=most).contains(&value)).then_some(value)
    };
    let read = (
        number(year, 4, 9999),
        number(month, 2, 12),
        number(day, 2, 31),
    );
    let (Some(year), Some(month), Some(day)) = read else {
        return Err(fault());
    };
    Ok(format!("D:{year:04}{month:02}{day:02}"))
}

/// Writes title, language and dates as we want them; the library's own are
/// random or of the year 1970.
fn describe(file: &mut lopdf::Document, meta: &Meta, date: Option<String>) -> Result<(), Error> {
    file.version = "1.7".to_owned();
    let mut info = lopdf::Dictionary::new();
    info.set("Title", lopdf::text_string(&meta.title));
    if let Some(author) = meta.author.as_deref().filter(|text| !text.is_empty()) {
        info.set("Author", lopdf::text_string(author));
    }
    if let Some(subject) = meta.subject.as_deref().filter(|text| !text.is_empty()) {
        info.set("Subject", lopdf::text_string(subject));
    }
    info.set("Creator", lopdf::text_string(PRODUCER));
    info.set("Producer", lopdf::text_string(PRODUCER));
    if let Some(date) = date {
        info.set("CreationDate", lopdf::Object::string_literal(date.clone()));
        info.set("ModDate", lopdf::Object::string_literal(date));
    }
    let place = file
        .trailer
        .get(b"Info")
        .and_then(lopdf::Object::as_reference);
    let place = place.map_err(|error| Error::Write(error.to_string()))?;
    file.set_object(place, info);

    let catalog = file
        .catalog_mut()
        .map_err(|error| Error::Write(error.to_string()))?;
    catalog.set("Lang", lopdf::Object::string_literal("en-GB"));
    let mut view = lopdf::Dictionary::new();
    view.set("DisplayDocTitle", true);
    catalog.set("ViewerPreferences", view);
    Ok(())
}

/// Gives the file an identifier from its own content.
fn identify(file: &mut lopdf::Document) {
    let mut hash = Sha256::new();
    for (id, object) in &file.objects {
        hash.update(id.0.to_be_bytes());
        match object {
            lopdf::Object::Stream(stream) => hash.update(&stream.content),
            other => hash.update(format!("{other:?}").as_bytes()),
        }
    }
    let id = lopdf::Object::String(
        hash.finalize()[..16].to_vec(),
        lopdf::StringFormat::Hexadecimal,
    );
    file.trailer.set("ID", vec![id.clone(), id]);
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn dates_are_read_or_refused() {
        for (text, expected) in [
            ("2026-12-01", Some("D:20261201")),
            ("2026-1-1", None),
            ("2026-13-01", None),
            ("2026-12-32", None),
            ("01.12.2026", None),
            ("", None),
            ("２０２６-12-01", None),
        ] {
            assert_eq!(pdf_date(text).ok().as_deref(), expected, "{text}");
        }
    }

    #[test]
    fn a_page_without_a_size_is_refused() {
        assert_eq!(pdf(&[], &Meta::default()), Err(Error::NoPages));
        for (width, height) in [(0.0, 10.0), (10.0, f64::NAN), (1e9, 10.0), (10.0, -1.0)] {
            let got = pdf(&[Picture::new(width, height)], &Meta::default());
            assert!(
                matches!(got, Err(Error::PageSize { page: 1, .. })),
                "{width} by {height}: {got:?}"
            );
        }
    }
}
