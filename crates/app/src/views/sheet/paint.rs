//! A scene painted by egui.

use eframe::egui::epaint::{PathStroke, TextShape};
use eframe::egui::{
    Color32, FontFamily, FontId, Painter, Pos2, Rect, Shape, Stroke as ScreenStroke, Ui, emath::Rot2, vec2,
};
use sheet::scene::{Anchor, Item, Scene, Spot, Text};
use sheet::tokens::{Ground, Ink, Stroke, Weight};

use crate::theme;

/// The thinnest line that a screen shows evenly, points.
const THINNEST: f32 = 0.6;

/// Paints a page into its place; `scale` is points per mm.
pub(super) fn page(ui: &Ui, scene: &Scene, place: Rect, scale: f32) {
    let painter = ui.painter_at(place.expand(24.0).intersect(ui.clip_rect()));
    painter.add(ui.visuals().popup_shadow.as_shape(place, 0));
    painter.rect_filled(place, 0.0, paper_ink(Ink::Background));
    let painter = ui.painter_at(place.intersect(ui.clip_rect()));
    let on = OnScreen { painter: &painter, origin: place.min, scale };
    for item in &scene.items {
        on.item(item);
    }
}

fn paper_ink(ink: Ink) -> Color32 {
    theme::color(ink, Ground::Paper)
}

/// Where millimetres lie on the screen.
struct OnScreen<'a> {
    painter: &'a Painter,
    origin: Pos2,
    scale: f32,
}

impl OnScreen<'_> {
    fn item(&self, item: &Item) {
        match item {
            Item::Line { points, stroke, ink } => self.line(points, *stroke, *ink),
            Item::Area { points, fill, outline } => {
                let corners = points.iter().map(|&spot| self.at(spot)).collect();
                // egui feathers the edge of every area; small squares (the code on the sheet) want sharp ones.
                self.painter.add(match rectangle(points) {
                    true => Shape::rect_filled(Rect::from_points(&self.all(points)), 0.0, paper_ink(*fill)),
                    false => Shape::convex_polygon(corners, paper_ink(*fill), PathStroke::NONE),
                });
                if let Some((stroke, ink)) = outline
                    && let Some(&first) = points.first()
                {
                    let closed: Vec<Spot> = points.iter().copied().chain([first]).collect();
                    self.line(&closed, *stroke, *ink);
                }
            }
            Item::Text(text) => self.text(text),
        }
    }

    fn at(&self, spot: Spot) -> Pos2 {
        self.origin + vec2(spot.x_mm as f32, spot.y_mm as f32) * self.scale
    }

    fn all(&self, spots: &[Spot]) -> Vec<Pos2> {
        spots.iter().map(|&spot| self.at(spot)).collect()
    }

    fn line(&self, points: &[Spot], stroke: Stroke, ink: Ink) {
        let pen = ScreenStroke::new((stroke.width_mm() as f32 * self.scale).max(THINNEST), paper_ink(ink));
        let points = self.all(points);
        match stroke.dash_mm() {
            [dash, gap] => {
                let [dash, gap] = [dash, gap].map(|&mm| mm as f32 * self.scale);
                self.painter.extend(Shape::dashed_line(&points, pen, dash, gap));
            }
            _ => _ = self.painter.add(Shape::line(points, pen)),
        }
    }

    fn text(&self, text: &Text) {
        let family = match text.style.weight() {
            Weight::Regular => FontFamily::Proportional,
            Weight::Bold => theme::bold(),
        };
        let size = text.style.size_mm() as f32 * self.scale;
        let galley =
            self.painter.layout_no_wrap(text.text.clone(), FontId::new(size, family), paper_ink(text.ink));
        let Some(row) = galley.rows.first() else { return };
        let base = row.pos.y + row.glyphs.first().map_or(0.0, |glyph| glyph.pos.y);
        let lead = match text.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => galley.size().x / 2.0,
            Anchor::End => galley.size().x,
        };
        let turn = Rot2::from_angle(text.turn_deg.to_radians() as f32);
        let corner = self.at(text.at) - turn * vec2(lead, base);
        let shape = TextShape::new(corner, galley, paper_ink(text.ink));
        self.painter.add(TextShape { angle: turn.angle(), ..shape });
    }
}

/// Whether an area is an upright rectangle.
fn rectangle(points: &[Spot]) -> bool {
    let [a, b, c, d] = points else { return false };
    let same = |p: f64, q: f64| (p - q).abs() < 1e-9;
    same(a.y_mm, b.y_mm) && same(b.x_mm, c.x_mm) && same(c.y_mm, d.y_mm) && same(d.x_mm, a.x_mm)
}
