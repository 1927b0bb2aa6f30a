//! The bundled font, and how wide a text is in it.
//!
//! Widths come from a table that is read once; there is no kerning and every
//! digit is equally wide, in the window and on paper alike.

use std::sync::LazyLock;

use ttf_parser::Face;

/// The family's name, as a window has to ask for it.
pub const FAMILY: &str = "Farglow Sans";

/// Height of a capital letter, in em.
pub const CAP_HEIGHT: f64 = 0.727;

/// Height of a lower-case x, in em.
pub const X_HEIGHT: f64 = 0.546;

/// How far the tallest letters rise above the baseline, in em; what a text box counts.
pub const ASCENT: f64 = 0.80;

/// How far letters fall below the baseline, in em; what a text box counts.
pub const DESCENT: f64 = 0.22;

/// What stands for a character that the font lacks.
pub const REPLACEMENT: char = '□';

/// The weight of a text.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Weight {
    /// Body text, weight 400.
    #[default]
    Regular,
    /// Headings and results, weight 600.
    SemiBold,
}

impl Weight {
    /// Both weights.
    pub const ALL: [Weight; 2] = [Weight::Regular, Weight::SemiBold];

    /// Returns the font file of this weight: TrueType outlines, one face.
    pub const fn bytes(self) -> &'static [u8] {
        match self {
            Weight::Regular => include_bytes!("../../resources/fonts/FarglowSans-Regular.ttf"),
            Weight::SemiBold => include_bytes!("../../resources/fonts/FarglowSans-SemiBold.ttf"),
        }
    }

    /// Returns the PostScript name of this weight.
    pub const fn name(self) -> &'static str {
        match self {
            Weight::Regular => "FarglowSans-Regular",
            Weight::SemiBold => "FarglowSans-SemiBold",
        }
    }
}

/// Characters below this one are looked up in the table; the font has none above.
const END: usize = 0x2720;

struct Table {
    glyphs: Vec<u16>,
    advances: Vec<f32>,
    replacement: u16,
}

impl Table {
    fn read(weight: Weight) -> Self {
        let face = Face::parse(weight.bytes(), 0).expect("the bundled font is read by a test");
        let em = f32::from(face.units_per_em());
        let replacement = face.glyph_index(REPLACEMENT).map_or(0, |glyph| glyph.0);
        let mut glyphs = vec![0; END];
        for (code, slot) in (0_u32..).zip(glyphs.iter_mut()) {
            if let Some(glyph) = char::from_u32(code).and_then(|c| face.glyph_index(c)) {
                *slot = glyph.0;
            }
        }
        let advances = (0..face.number_of_glyphs())
            .map(|glyph| {
                let advance = face.glyph_hor_advance(ttf_parser::GlyphId(glyph));
                f32::from(advance.unwrap_or(0)) / em
            })
            .collect();
        Self {
            glyphs,
            advances,
            replacement,
        }
    }

    fn glyph(&self, c: char) -> Option<u16> {
        self.glyphs
            .get(c as usize)
            .copied()
            .filter(|glyph| *glyph != 0)
    }

    fn advance(&self, c: char) -> f64 {
        let glyph = self.glyph(c).unwrap_or(self.replacement);
        self.advances
            .get(usize::from(glyph))
            .copied()
            .map_or(0.0, f64::from)
    }
}

static REGULAR: LazyLock<Table> = LazyLock::new(|| Table::read(Weight::Regular));
static SEMI_BOLD: LazyLock<Table> = LazyLock::new(|| Table::read(Weight::SemiBold));

fn table(weight: Weight) -> &'static Table {
    match weight {
        Weight::Regular => &REGULAR,
        Weight::SemiBold => &SEMI_BOLD,
    }
}

/// Returns the advance width of one character, in em; that of [`REPLACEMENT`]
/// if the font lacks it.
pub fn advance(c: char, weight: Weight) -> f64 {
    table(weight).advance(c)
}

/// Returns how wide `text` is on one line, in the unit of `size` (points on
/// paper), where `size` is the height of the em.
///
/// # Accuracy
///
/// Single precision a character: relative error below `1e-6`. A PDF file rounds
/// each character down to 1/1000 em.
///
/// # Examples
///
/// ```
/// use farglow::drawing::font::{self, Weight};
///
/// let ones = font::width("1111", 9.0, Weight::Regular);
/// let eights = font::width("8888", 9.0, Weight::Regular);
/// assert_eq!(ones, eights);
/// ```
pub fn width(text: &str, size: f64, weight: Weight) -> f64 {
    let table = table(weight);
    text.chars().map(|c| table.advance(c)).sum::<f64>() * size
}

/// Returns a text shortened to `width` with an ellipsis, where it is longer.
#[must_use]
pub fn fit(text: &str, width: f64, size: f64, weight: Weight) -> String {
    if self::width(text, size, weight) <= width {
        return text.to_owned();
    }
    let room = width - self::width("…", size, weight);
    let mut used = 0.0;
    let mut cut: String = text
        .chars()
        .take_while(|c| {
            used += advance(*c, weight) * size;
            used <= room
        })
        .collect();
    cut.truncate(cut.trim_end().len());
    cut + "…"
}

/// Returns the glyph of a character, or `None` if the font lacks it.
pub fn glyph(c: char, weight: Weight) -> Option<u16> {
    table(weight).glyph(c)
}

/// Returns the characters of `text` that the font lacks, each once, in order;
/// they are printed as [`REPLACEMENT`].
pub fn missing(text: &str) -> Vec<char> {
    let mut found = Vec::new();
    for c in text.chars() {
        if glyph(c, Weight::Regular).is_none() && !c.is_control() && !found.contains(&c) {
            found.push(c);
        }
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The signs of quantities, formulas and citations that a worksheet prints.
    const SIGNS: &str = "±°µμ×·−–—≤≥≈√²³⁻⁴₀₁αελσθπΣΔτ→“”‘’…•\u{2009}\u{202f}⁰¹⁵⁶⁷⁸⁹₂∞§‰′″Ωω⚠";

    #[test]
    fn every_sign_of_a_worksheet_is_in_both_weights() {
        let latin = (0x20_u32..0x7f)
            .chain(0xa0..0x180)
            .filter_map(char::from_u32);
        for c in SIGNS.chars().chain(latin).filter(|c| *c != '\u{149}') {
            for weight in Weight::ALL {
                assert!(
                    glyph(c, weight).is_some(),
                    "{c:?} (U+{:04X}) in {weight:?}",
                    c as u32
                );
            }
        }
    }

    #[test]
    fn widths_are_those_of_the_font_file() {
        // Read from `hmtx` with fontTools 4.68: 1328 and 1325 of 2048 units.
        for (weight, units) in [(Weight::Regular, 1328.0), (Weight::SemiBold, 1325.0)] {
            for digit in '0'..='9' {
                let (got, expected) = (advance(digit, weight), units / 2048.0);
                assert!(
                    (got - expected).abs() < 1e-7,
                    "{digit}: {got}, wanted {expected}"
                );
            }
        }
    }

    #[test]
    fn a_text_is_shortened_to_its_room() {
        assert_eq!(fit("crane hand", 90.0, 8.0, Weight::Regular), "crane hand");
        let short = fit("crane hand", 30.0, 8.0, Weight::Regular);
        assert_eq!(short, "crane…");
        assert_eq!(fit("crane hand", 0.0, 8.0, Weight::Regular), "…");
    }

    #[test]
    fn heights_are_those_of_the_font_file() {
        for weight in Weight::ALL {
            let face = Face::parse(weight.bytes(), 0).expect("the bundled font is whole");
            let em = f64::from(face.units_per_em());
            let cap = f64::from(face.capital_height().expect("OS/2 is there")) / em;
            let x = f64::from(face.x_height().expect("OS/2 is there")) / em;
            assert!(
                (cap - CAP_HEIGHT).abs() < 0.001,
                "{cap}, wanted {CAP_HEIGHT}"
            );
            assert!((x - X_HEIGHT).abs() < 0.001, "{x}, wanted {X_HEIGHT}");
        }
    }

    #[test]
    fn what_the_font_lacks_is_named_once() {
        assert_eq!(missing("Kupol 炉 2, 炉 ☃"), vec!['炉', '☃']);
        assert_eq!(missing("Žďár, Ærøskøbing, Ξ, Печь"), Vec::<char>::new());
        assert_eq!(
            advance('炉', Weight::Regular),
            advance(REPLACEMENT, Weight::Regular)
        );
    }
}
