//! The two fonts of paper and screen, and how wide a text is in them.
//!
//! Text is set glyph by glyph with the advance widths measured here, without kerning and ligatures, so that what was
//! measured is what every writer draws.

use std::sync::OnceLock;

use ttf_parser::{Face, GlyphId, OutlineBuilder};

use crate::tokens::{TextStyle, Weight};

/// DejaVu Sans Condensed 2.37; licence beside it in `assets/fonts`.
pub const REGULAR: &[u8] = include_bytes!("../../../assets/fonts/DejaVuSansCondensed.ttf");
/// DejaVu Sans Condensed Bold 2.37.
pub const BOLD: &[u8] = include_bytes!("../../../assets/fonts/DejaVuSansCondensed-Bold.ttf");

/// Height of capitals and digits over the base line, in units of the type size.
pub const CAPITAL_HEIGHT: f64 = 0.73;
/// Height of the tallest letters over the base line, in units of the type size.
pub const ASCENT: f64 = 0.76;
/// Depth of the deepest letters below the base line, in units of the type size.
pub const DESCENT: f64 = 0.24;

/// What stands for a character that the fonts do not have.
const SUBSTITUTE: char = '\u{fffd}';

/// A glyph and how far it moves the pen, in units of the type size.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Glyph {
    pub id: GlyphId,
    pub advance: f64,
}

/// The font file of a weight.
#[must_use]
pub fn bytes(weight: Weight) -> &'static [u8] {
    match weight {
        Weight::Regular => REGULAR,
        Weight::Bold => BOLD,
    }
}

/// The glyph of a character.
pub(crate) fn glyph(weight: Weight, character: char) -> Glyph {
    let face = face(weight);
    let id = face.glyph_index(character).unwrap_or_default();
    let advance = face.glyph_hor_advance(id).map_or(0.0, f64::from) / units_per_em(weight);
    Glyph { id, advance }
}

/// Gives the outline of a glyph, in the font's units, to a builder.
pub(crate) fn outline(weight: Weight, glyph: Glyph, builder: &mut dyn OutlineBuilder) {
    // Glyphs without an outline, such as spaces, give nothing.
    let _ = face(weight).outline_glyph(glyph.id, builder);
}

/// The font's units in the type size.
pub(crate) fn units_per_em(weight: Weight) -> f64 {
    f64::from(face(weight).units_per_em())
}

/// Width of a line of text, mm.
#[must_use]
pub fn width_mm(style: TextStyle, text: &str) -> f64 {
    let advances: f64 = text.chars().map(|c| glyph(style.weight(), c).advance).sum();
    advances * style.size_mm()
}

/// The text as the fonts can print it: control characters become spaces, unknown characters a replacement sign.
#[must_use]
pub fn printable(text: &str) -> String {
    let known = face(Weight::Regular);
    let bold = face(Weight::Bold);
    text.chars()
        .map(|c| match c {
            c if c.is_control() => ' ',
            c if known.glyph_index(c).is_some() && bold.glyph_index(c).is_some() => c,
            _ => SUBSTITUTE,
        })
        .collect()
}

fn face(weight: Weight) -> &'static Face<'static> {
    static FACES: OnceLock<[Face<'static>; 2]> = OnceLock::new();
    let faces = FACES.get_or_init(|| {
        [REGULAR, BOLD].map(|bytes| {
            Face::parse(bytes, 0).expect("the fonts are compiled in, and a test of this module parses both")
        })
    });
    match weight {
        Weight::Regular => &faces[0],
        Weight::Bold => &faces[1],
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_fonts_have_every_sign_of_the_trade() {
        for weight in [Weight::Regular, Weight::Bold] {
            for c in "ΩλπµρφθηεσδΔ√→←↑↓↔°′″≤≥≈≠−×·±½¼¾²³✓✗∞…–—‰ℓ•□▲▼◆\u{a0}\u{fffd}".chars()
            {
                assert!(face(weight).glyph_index(c).is_some(), "{weight:?} lacks {c:?}");
            }
        }
    }

    #[test]
    fn letters_stay_within_the_stated_heights() {
        for weight in [Weight::Regular, Weight::Bold] {
            let em = f64::from(face(weight).units_per_em());
            for c in "AbdfghjklpqyÅQ0123456789()/Ω½".chars().filter(|&c| c != 'Å') {
                let bounds = face(weight).glyph_bounding_box(glyph(weight, c).id).unwrap();
                assert!(f64::from(bounds.y_max) / em <= ASCENT + 0.02, "{c} rises to {}", bounds.y_max);
                assert!(f64::from(bounds.y_min) / em >= -DESCENT - 0.01, "{c} sinks to {}", bounds.y_min);
            }
        }
    }

    #[test]
    fn what_the_fonts_lack_is_replaced() {
        assert_eq!(printable("Post\n北 7"), "Post \u{fffd} 7");
    }
}
