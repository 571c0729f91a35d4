//! Scenes as a PDF: fonts subset and embedded, text selectable, the same bytes for the same input.

use krilla::Document;
use krilla::color::rgb;
use krilla::geom::{Path, PathBuilder, Point, Transform};
use krilla::metadata::{DateTime, Metadata};
use krilla::num::NormalizedF32;
use krilla::page::PageSettings;
use krilla::paint::{Fill, LineCap, LineJoin, Stroke as PdfStroke, StrokeDash};
use krilla::surface::Surface;
use krilla::text::{Font, GlyphId, KrillaGlyph};

use crate::error::SheetError;
use crate::fonts;
use crate::request::Date;
use crate::scene::{Item, Scene, Spot, Text};
use crate::tokens::{Ground, Ink, MM_PER_POINT, Stroke, Weight};

/// What a PDF says about itself.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Meta {
    /// Title that viewers show.
    pub title: String,
    /// One sentence.
    pub subject: String,
    /// Day it was made.
    pub date: Date,
}

/// Writes pages into one PDF.
///
/// # Errors
/// [`SheetError::Pdf`] where a page has no size or the writer refuses.
pub fn write(pages: &[Scene], meta: &Meta) -> Result<Vec<u8>, SheetError> {
    let fonts = Fonts::load()?;
    let mut document = Document::new();
    document.set_metadata(metadata(meta));
    for scene in pages {
        let settings = PageSettings::from_wh(points(scene.width_mm), points(scene.height_mm))
            .ok_or_else(|| SheetError::Pdf("a page has no size".to_owned()))?;
        let mut page = document.start_page_with(settings);
        let mut surface = page.surface();
        for item in &scene.items {
            draw(&mut surface, item, &fonts);
        }
        surface.finish();
        page.finish();
    }
    document.finish().map_err(|error| SheetError::Pdf(error.to_string()))
}

fn metadata(meta: &Meta) -> Metadata {
    let date = DateTime::new(meta.date.year).month(meta.date.month).day(meta.date.day);
    Metadata::new()
        .title(meta.title.clone())
        .description(meta.subject.clone())
        .creator("Wirewright".to_owned())
        .language("en".to_owned())
        .creation_date(date)
}

struct Fonts {
    regular: Font,
    bold: Font,
}

impl Fonts {
    fn load() -> Result<Self, SheetError> {
        let font = |weight| {
            Font::new(fonts::bytes(weight).into(), 0)
                .ok_or_else(|| SheetError::Pdf("an embedded font cannot be read".to_owned()))
        };
        Ok(Self { regular: font(Weight::Regular)?, bold: font(Weight::Bold)? })
    }

    fn get(&self, weight: Weight) -> &Font {
        match weight {
            Weight::Regular => &self.regular,
            Weight::Bold => &self.bold,
        }
    }
}

fn draw(surface: &mut Surface<'_>, item: &Item, fonts: &Fonts) {
    match item {
        Item::Line { points, stroke, ink } => {
            if let Some(path) = path(points, false) {
                surface.set_fill(None);
                surface.set_stroke(Some(pdf_stroke(*stroke, *ink)));
                surface.draw_path(&path);
            }
        }
        Item::Area { points, fill: ink, outline } => {
            if let Some(path) = path(points, true) {
                surface.set_fill(Some(fill(*ink)));
                surface.set_stroke(outline.map(|(stroke, ink)| pdf_stroke(stroke, ink)));
                surface.draw_path(&path);
            }
        }
        Item::Text(text) => draw_text(surface, text, fonts),
    }
}

fn draw_text(surface: &mut Surface<'_>, text: &Text, fonts: &Fonts) {
    let weight = text.style.weight();
    let glyphs: Vec<KrillaGlyph> = text
        .text
        .char_indices()
        .map(|(at, c)| {
            let glyph = fonts::glyph(weight, c);
            let id = GlyphId::new(u32::from(glyph.id.0));
            KrillaGlyph::new(id, glyph.advance as f32, 0.0, 0.0, 0.0, at..at + c.len_utf8(), None)
        })
        .collect();
    surface.set_stroke(None);
    surface.set_fill(Some(fill(text.ink)));
    let (x, y) = (points(text.at.x_mm), points(text.at.y_mm));
    let is_turned = text.turn_deg != 0.0;
    if is_turned {
        surface.push_transform(&Transform::from_rotate_at(text.turn_deg as f32, x, y));
    }
    let start = Point::from_xy(x - points(text.lead_mm()), y);
    let size = text.style.size_pt() as f32;
    surface.draw_glyphs(start, &glyphs, fonts.get(weight).clone(), &text.text, size, false);
    if is_turned {
        surface.pop();
    }
}

fn path(spots: &[Spot], is_closed: bool) -> Option<Path> {
    let mut builder = PathBuilder::new();
    for (index, spot) in spots.iter().enumerate() {
        let (x, y) = (points(spot.x_mm), points(spot.y_mm));
        if index == 0 {
            builder.move_to(x, y);
        } else {
            builder.line_to(x, y);
        }
    }
    if is_closed {
        builder.close();
    }
    builder.finish()
}

fn fill(ink: Ink) -> Fill {
    Fill { paint: color(ink).into(), opacity: NormalizedF32::ONE, ..Fill::default() }
}

fn pdf_stroke(stroke: Stroke, ink: Ink) -> PdfStroke {
    let dash = stroke.dash_mm();
    PdfStroke {
        paint: color(ink).into(),
        width: points(stroke.width_mm()),
        line_cap: if dash.is_empty() { LineCap::Round } else { LineCap::Butt },
        line_join: LineJoin::Round,
        dash: (!dash.is_empty())
            .then(|| StrokeDash { array: dash.iter().map(|&mm| points(mm)).collect(), offset: 0.0 }),
        ..PdfStroke::default()
    }
}

fn color(ink: Ink) -> rgb::Color {
    let [red, green, blue] = ink.rgb(Ground::Paper);
    rgb::Color::new(red, green, blue)
}

/// Millimetres as PDF points.
fn points(mm: f64) -> f32 {
    (mm / MM_PER_POINT) as f32
}
