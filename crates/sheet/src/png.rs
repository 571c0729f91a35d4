//! A scene as a picture: the same shapes and glyphs, rasterised.

use tiny_skia::{
    Color, FillRule, LineCap, LineJoin, Paint, Path, PathBuilder, Pixmap, Stroke as SkiaStroke, StrokeDash,
    Transform,
};
use ttf_parser::OutlineBuilder;

use crate::error::SheetError;
use crate::fonts;
use crate::scene::{Item, Scene, Spot, Text};
use crate::tokens::{Ground, Ink, Stroke};

/// Millimetres in an inch.
const MM_PER_INCH: f64 = 25.4;

/// Draws one page as a PNG with so many dots per inch.
///
/// # Errors
/// [`SheetError::Picture`] where the picture would have no size or too large a one.
pub fn write(scene: &Scene, dots_per_inch: f64) -> Result<Vec<u8>, SheetError> {
    let refuse = |why: &str| SheetError::Picture(why.to_owned());
    // 600 dots per inch on A3 and then some: more would be a mistake.
    const MOST_DOTS: f64 = 12_000.0;
    let dots_per_mm = dots_per_inch / MM_PER_INCH;
    let dots = |mm: f64| (mm * dots_per_mm).round();
    let (width, height) = (dots(scene.width_mm), dots(scene.height_mm));
    let is_possible = |side: f64| (1.0..=MOST_DOTS).contains(&side);
    if !is_possible(width) || !is_possible(height) {
        return Err(refuse("its size is not between 1 and 12 000 dots"));
    }
    let mut pixmap =
        Pixmap::new(width as u32, height as u32).ok_or_else(|| refuse("there is no room for it"))?;
    pixmap.fill(color(Ink::Background));
    let scale = Transform::from_scale(dots_per_mm as f32, dots_per_mm as f32);
    for item in &scene.items {
        draw(&mut pixmap, item, scale);
    }
    pixmap.encode_png().map_err(|error| SheetError::Picture(error.to_string()))
}

fn draw(pixmap: &mut Pixmap, item: &Item, scale: Transform) {
    match item {
        Item::Line { points, stroke, ink } => {
            if let Some(path) = path(points, false) {
                pixmap.stroke_path(&path, &paint(*ink), &skia_stroke(*stroke), scale, None);
            }
        }
        Item::Area { points, fill, outline } => {
            if let Some(path) = path(points, true) {
                pixmap.fill_path(&path, &paint(*fill), FillRule::Winding, scale, None);
                if let Some((stroke, ink)) = outline {
                    pixmap.stroke_path(&path, &paint(*ink), &skia_stroke(*stroke), scale, None);
                }
            }
        }
        Item::Text(text) => {
            if let Some(path) = glyphs(text) {
                let at = Transform::from_translate(text.at.x_mm as f32, text.at.y_mm as f32);
                let turn = Transform::from_rotate(text.turn_deg as f32);
                pixmap.fill_path(
                    &path,
                    &paint(text.ink),
                    FillRule::Winding,
                    scale.pre_concat(at).pre_concat(turn),
                    None,
                );
            }
        }
    }
}

/// The outlines of a text, mm from its spot, unturned.
fn glyphs(text: &Text) -> Option<Path> {
    let size_mm = text.style.size_mm();
    let mut outlines = Outlines { builder: PathBuilder::new(), pen_mm: -text.lead_mm(), mm_per_unit: 0.0 };
    for c in text.text.chars() {
        let glyph = fonts::glyph(text.style.weight(), c);
        outlines.mm_per_unit = size_mm / fonts::units_per_em(text.style.weight());
        fonts::outline(text.style.weight(), glyph, &mut outlines);
        outlines.pen_mm += glyph.advance * size_mm;
    }
    outlines.builder.finish()
}

struct Outlines {
    builder: PathBuilder,
    pen_mm: f64,
    mm_per_unit: f64,
}

impl Outlines {
    fn at(&self, x: f32, y: f32) -> (f32, f32) {
        let x_mm = self.pen_mm + f64::from(x) * self.mm_per_unit;
        (x_mm as f32, (-f64::from(y) * self.mm_per_unit) as f32)
    }
}

impl OutlineBuilder for Outlines {
    fn move_to(&mut self, x: f32, y: f32) {
        let (x, y) = self.at(x, y);
        self.builder.move_to(x, y);
    }

    fn line_to(&mut self, x: f32, y: f32) {
        let (x, y) = self.at(x, y);
        self.builder.line_to(x, y);
    }

    fn quad_to(&mut self, x1: f32, y1: f32, x: f32, y: f32) {
        let ((x1, y1), (x, y)) = (self.at(x1, y1), self.at(x, y));
        self.builder.quad_to(x1, y1, x, y);
    }

    fn curve_to(&mut self, x1: f32, y1: f32, x2: f32, y2: f32, x: f32, y: f32) {
        let ((x1, y1), (x2, y2), (x, y)) = (self.at(x1, y1), self.at(x2, y2), self.at(x, y));
        self.builder.cubic_to(x1, y1, x2, y2, x, y);
    }

    fn close(&mut self) {
        self.builder.close();
    }
}

fn path(points: &[Spot], is_closed: bool) -> Option<Path> {
    let mut builder = PathBuilder::new();
    for (index, spot) in points.iter().enumerate() {
        let (x, y) = (spot.x_mm as f32, spot.y_mm as f32);
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

fn skia_stroke(stroke: Stroke) -> SkiaStroke {
    let dash = stroke.dash_mm();
    SkiaStroke {
        width: stroke.width_mm() as f32,
        line_cap: if dash.is_empty() { LineCap::Round } else { LineCap::Butt },
        line_join: LineJoin::Round,
        dash: StrokeDash::new(dash.iter().map(|&mm| mm as f32).collect(), 0.0),
        ..SkiaStroke::default()
    }
}

fn paint(ink: Ink) -> Paint<'static> {
    let mut paint = Paint::default();
    paint.set_color(color(ink));
    paint
}

fn color(ink: Ink) -> Color {
    let [red, green, blue] = ink.rgb(Ground::Paper);
    Color::from_rgba8(red, green, blue, u8::MAX)
}
