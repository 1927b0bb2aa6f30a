//! The bundled font cut to the characters that pages use.

use std::collections::{BTreeMap, BTreeSet};

use printpdf::{FontId, FontMetrics, ParsedFont, PdfFont, PdfFontMap, PdfFontMetricsStub};
use sha2::{Digest, Sha256};
use subsetter::GlyphRemapper;
use ttf_parser::Face;

use crate::drawing::font::{self, Weight};
use crate::drawing::picture::Picture;
use crate::worksheet::Error;

/// Returns the name by which pages call a weight.
pub(super) fn id(weight: Weight) -> FontId {
    FontId(match weight {
        Weight::Regular => "R".to_owned(),
        Weight::SemiBold => "S".to_owned(),
    })
}

/// Returns a text with only characters that the cut font can show, each the one
/// that is found again when the page is searched.
pub(super) fn printed(text: &str, weight: Weight) -> String {
    text.chars()
        .map(|c| match c {
            c if c.is_control() => ' ',
            // These share a glyph with their neighbour, and a glyph is read back as one character.
            '\u{ad}' => '-',
            '\u{2126}' => 'Ω',
            '\u{2206}' => 'Δ',
            c if font::glyph(c, weight).is_none() => font::REPLACEMENT,
            c => c,
        })
        .collect()
}

/// Puts every weight that the pages use into the document's fonts.
pub(super) fn fonts(pages: &[Picture], fonts: &mut PdfFontMap) -> Result<(), Error> {
    let mut used: BTreeMap<Weight, BTreeSet<char>> = BTreeMap::new();
    for text in pages.iter().flat_map(Picture::texts) {
        used.entry(text.weight)
            .or_default()
            .extend(printed(&text.text, text.weight).chars());
    }
    for (weight, characters) in used
        .into_iter()
        .filter(|(_, characters)| !characters.is_empty())
    {
        let font = cut(weight, &characters)?;
        let _ = fonts.map.insert(id(weight), PdfFont::new(font));
    }
    Ok(())
}

fn cut(weight: Weight, characters: &BTreeSet<char>) -> Result<ParsedFont, Error> {
    let fault = |what: &dyn std::fmt::Display| Error::Font(what.to_string());
    let face = Face::parse(weight.bytes(), 0).map_err(|error| fault(&error))?;
    let mut remapper = GlyphRemapper::new();
    let mut glyphs = BTreeMap::new();
    let mut widths = BTreeMap::new();
    let mut hash = Sha256::new();
    for c in characters {
        let Some(old) = font::glyph(*c, weight) else {
            continue;
        };
        let new = remapper.remap(old);
        let _ = glyphs.insert(u32::from(*c), new);
        let _ = widths.insert(
            new,
            face.glyph_hor_advance(ttf_parser::GlyphId(old))
                .unwrap_or(0),
        );
        hash.update(u32::from(*c).to_be_bytes());
    }
    let bytes = subsetter::subset(weight.bytes(), 0, &remapper).map_err(|error| fault(&error))?;
    // Six letters before the name say that the font is cut; ours follow from the cut.
    let tag: String = hash
        .finalize()
        .iter()
        .take(6)
        .map(|byte| char::from(b'A' + byte % 26))
        .collect();
    let metrics = FontMetrics {
        ascent: face.ascender(),
        descent: face.descender(),
    };
    let name = Some(format!("{tag}+{}", weight.name()));
    let mut font =
        ParsedFont::with_glyph_data(bytes, 0, name, glyphs, widths, face.units_per_em(), metrics);
    let extent = face.global_bounding_box();
    font.pdf_font_metrics = PdfFontMetricsStub {
        units_per_em: face.units_per_em(),
        x_min: extent.x_min,
        y_min: extent.y_min,
        x_max: extent.x_max,
        y_max: extent.y_max,
        us_weight_class: face.weight().to_number(),
        ..PdfFontMetricsStub::default()
    };
    Ok(font)
}
