//! Paints a laid-out Yard: few shapes, one polyline per colour, meshes for ribbons.

use eframe::egui::{
    Align2, Color32, FontId, Mesh, Painter, Pos2, Rect, Shape, Stroke, TextStyle, Ui, pos2, vec2,
};
use sheet::tokens::{Ground, Ink, Pattern, Pen};
use station::plan::Earth;
use station::report::MarkKind;

use crate::theme::{color, wash};
use crate::views::{loads, marks::patterned};

use super::grip::Grip;
use super::layout::{GRIP_PX, Handle, Layout, SupportShape, Text, Type};
use super::rulers::Tick;
use super::things;
use super::wave::{Phase, Ribbon, Wave};

/// How far what is out of date steps back toward the background.
const STALE: f32 = 0.55;
/// Share of its ink in the area of an envelope, in its rim, and in the moving ribbon.
const ENVELOPE: f32 = 0.1;
const ENVELOPE_RIM: f32 = 0.38;
const RIBBON: f32 = 0.58;

/// What the painter has to know besides where things are.
#[derive(Clone, Copy)]
pub struct Look<'a> {
    /// Light or dark.
    pub ground: Ground,
    /// The wave answers an older plan.
    pub stale: bool,
    /// Where the RF cycle is.
    pub phase: Phase,
    /// Index of the chosen feed.
    pub feed: usize,
    /// What lies under the wire.
    pub earth: &'a Earth,
    /// The unit's symbol.
    pub unit: &'static str,
    /// Where the pointer is, if it is over the view.
    pub pointer: Option<Pos2>,
    /// The grip under the pointer or in the hand.
    pub hot: Option<Grip>,
    /// The grip whose numbers can be typed.
    pub chosen: Option<Grip>,
}

impl Look<'_> {
    /// An ink at full strength.
    pub fn ink(&self, ink: Ink) -> Color32 {
        color(ink, self.ground)
    }

    /// An opaque mixture of an ink and the background.
    pub fn mix(&self, ink: Ink, share: f32) -> Color32 {
        self.ink(Ink::Background).lerp_to_gamma(self.ink(ink), share)
    }

    /// A mixture for the wave, which steps back while it is out of date.
    fn wave(&self, ink: Ink, share: f32) -> Color32 {
        self.mix(ink, if self.stale { share * STALE } else { share })
    }
}

/// The font of a size of text.
pub fn font(ui: &Ui, size: Type) -> FontId {
    let style = match size {
        Type::Small => TextStyle::Small,
        Type::Body => TextStyle::Body,
    };
    style.resolve(ui.style())
}

/// Paints all but the grips' tags and the buttons.
pub fn paint(ui: &Ui, frame: Rect, layout: &Layout<'_>, look: &Look<'_>) {
    let painter = ui.painter().with_clip_rect(frame);
    painter.rect_filled(frame, 0.0, look.ink(Ink::Background));
    let inside = painter.with_clip_rect(layout.view.frame);
    paint_earth(&painter, frame, layout, look);
    for (_, wave) in &layout.waves {
        paint_envelope(&inside, wave, look);
    }
    for support in &layout.supports {
        things::support(&inside, support, look);
    }
    paint_lines(&inside, layout, look);
    for (_, wave) in &layout.waves {
        paint_wave(&inside, wave, look);
    }
    let wire = Stroke::new(Pen::Curve.width(), look.ink(Ink::Wire));
    inside.extend(layout.wires.iter().map(|line| Shape::line(line.clone(), wire)));
    paint_marks(&inside, layout, look);
    for load in &layout.loads {
        let (ink, fill) = (look.ink(Ink::Wire), look.ink(Ink::Background));
        loads::mark(&inside, load.at, load.along, load.kind, ink, fill);
    }
    paint_rulers(ui, &painter, frame, layout, look);
    for text in &layout.texts {
        paint_text(ui, &inside, text, look);
    }
    if let Some(rect) = layout.legend {
        things::legend(&inside, rect, font(ui, Type::Small), look);
    }
    for handle in &layout.handles {
        paint_handle(&inside, handle, look);
    }
}

fn paint_text(ui: &Ui, painter: &Painter, text: &Text, look: &Look<'_>) {
    let ink = match text.ink {
        ink @ (Ink::Current | Ink::Voltage) => look.wave(ink, 1.0),
        ink => look.ink(ink),
    };
    painter.text(text.rect.left_top(), Align2::LEFT_TOP, &text.text, font(ui, text.size), ink);
}

fn paint_earth(painter: &Painter, frame: Rect, layout: &Layout<'_>, look: &Look<'_>) {
    let plot = layout.view.frame;
    let y = layout.view.earth_y().max(plot.top());
    if y >= plot.bottom() {
        return;
    }
    let painter = painter.with_clip_rect(Rect::from_min_max(plot.left_top(), frame.right_bottom()));
    if !matches!(look.earth, Earth::NoEarth) {
        painter.rect_filled(
            Rect::from_min_max(pos2(plot.left(), y), plot.right_bottom()),
            0.0,
            look.ink(Ink::Earth),
        );
    }
    let surface = match look.earth {
        Earth::NoEarth => Stroke::new(Pen::Hairline.width(), look.ink(Ink::Rule)),
        Earth::Mirror => Stroke::new(Pen::Bold.width(), look.ink(Ink::Faint)),
        _ => Stroke::new(Pen::Fine.width(), look.mix(Ink::Support, 0.6)),
    };
    painter.hline(plot.x_range(), y, surface);
}

fn paint_lines(painter: &Painter, layout: &Layout<'_>, look: &Look<'_>) {
    let mut shapes = Vec::with_capacity(16);
    let rope = Stroke::new(Pen::Fine.width(), look.ink(Ink::Rope));
    for line in &layout.ropes {
        shapes.extend(Shape::dashed_line(line, rope, 5.0, 3.0));
    }
    let lead = Stroke::new(Pen::Curve.width(), look.ink(Ink::Wire));
    for &[top, foot] in &layout.leads {
        shapes.push(Shape::line_segment([top, foot], lead));
        // The sign for earth: three bars, each shorter than the one above.
        for (below, half) in [(0.0, 8.0), (3.5, 5.0), (7.0, 2.0)] {
            let bar = foot + vec2(0.0, below);
            shapes.push(Shape::line_segment([bar - vec2(half, 0.0), bar + vec2(half, 0.0)], lead));
        }
    }
    if layout.feed_line.len() > 1 {
        let stroke = Stroke::new(Pen::Curve.width(), look.ink(Ink::feed(look.feed)));
        patterned(layout.feed_line.clone(), Pattern::feed(look.feed), stroke, &mut shapes);
    }
    painter.extend(shapes);
}

/// A ribbon as a mesh.
fn area(ribbon: &Ribbon, fill: Color32) -> Shape {
    let mut mesh = Mesh::default();
    mesh.reserve_vertices(2 * ribbon.upper.len());
    mesh.reserve_triangles(2 * ribbon.upper.len());
    for (n, (&upper, &lower)) in (0_u32..).zip(ribbon.upper.iter().zip(&ribbon.lower)) {
        mesh.colored_vertex(upper, fill);
        mesh.colored_vertex(lower, fill);
        if n > 0 {
            mesh.add_triangle(2 * n - 2, 2 * n - 1, 2 * n);
            mesh.add_triangle(2 * n - 1, 2 * n, 2 * n + 1);
        }
    }
    Shape::mesh(mesh)
}

fn rims(ribbon: Ribbon, stroke: Stroke) -> [Shape; 2] {
    [Shape::line(ribbon.upper, stroke), Shape::line(ribbon.lower, stroke)]
}

fn paint_envelope(painter: &Painter, wave: &Wave<'_>, look: &Look<'_>) {
    let hairline = |ink| Stroke::new(Pen::Hairline.width(), look.wave(ink, ENVELOPE_RIM));
    painter.extend(rims(wave.voltage_envelope(), hairline(Ink::Voltage)));
    let envelope = wave.current_envelope();
    painter.add(area(&envelope, look.wave(Ink::Current, ENVELOPE)));
    painter.extend(rims(envelope, hairline(Ink::Current)));
}

fn paint_wave(painter: &Painter, wave: &Wave<'_>, look: &Look<'_>) {
    let whisker = Stroke::new(Pen::Fine.width(), look.wave(Ink::Voltage, 0.85));
    painter.extend(wave.whiskers(look.phase).into_iter().map(|line| Shape::line_segment(line, whisker)));
    let ribbon = wave.ribbon(look.phase);
    painter.add(area(&ribbon, look.wave(Ink::Current, RIBBON)));
    painter.extend(rims(ribbon, Stroke::new(Pen::Hairline.width(), look.wave(Ink::Current, 1.0))));
    let grain = Stroke::new(Pen::Fine.width(), look.ink(Ink::Background));
    painter.extend(wave.grain(look.phase).into_iter().map(|chevron| Shape::line(chevron.to_vec(), grain)));
}

fn paint_marks(painter: &Painter, layout: &Layout<'_>, look: &Look<'_>) {
    for mark in &layout.marks {
        match mark.mark.kind {
            MarkKind::CurrentLoop => things::lozenge(painter, mark.sign, look),
            MarkKind::CurrentNode => things::circle(painter, mark.sign, look),
        }
    }
}

fn paint_rulers(ui: &Ui, painter: &Painter, frame: Rect, layout: &Layout<'_>, look: &Look<'_>) {
    let plot = layout.view.frame;
    let rule = Stroke::new(Pen::Hairline.width(), look.ink(Ink::Rule));
    let faint = Stroke::new(Pen::Hairline.width(), look.mix(Ink::Faint, 0.7));
    let numbers = look.ink(Ink::Faint);
    let small = font(ui, Type::Small);
    painter.vline(plot.left(), plot.y_range(), rule);
    painter.hline(plot.x_range(), plot.bottom(), rule);
    let reach = |tick: &Tick| if tick.number.is_some() { 7.0 } else { 3.5 };
    for tick in &layout.heights {
        painter.hline(plot.left() - reach(tick)..=plot.left(), tick.at, faint);
        if let Some(number) = &tick.number {
            let at = pos2(plot.left() - 10.0, tick.at);
            let half = 0.5 * small.size;
            if tick.at - half > plot.top() && tick.at + half < plot.bottom() {
                painter.text(at, Align2::RIGHT_CENTER, number, small.clone(), numbers);
            }
        }
    }
    for tick in &layout.distances {
        painter.vline(tick.at, plot.bottom()..=plot.bottom() + reach(tick), faint);
        if let Some(number) = &tick.number {
            let at = pos2(tick.at, plot.bottom() + 8.0);
            if tick.at > plot.left() + 4.0 && tick.at < plot.right() - 10.0 {
                painter.text(at, Align2::CENTER_TOP, number, small.clone(), numbers);
            }
        }
    }
    let corner = pos2(frame.left() + 18.0, plot.bottom() + 8.0);
    painter.text(corner, Align2::CENTER_TOP, look.unit, small, numbers);
}

fn paint_handle(painter: &Painter, handle: &Handle, look: &Look<'_>) {
    let (hot, chosen) = (look.hot == Some(handle.grip), look.chosen == Some(handle.grip));
    if handle.grip.is_new_point() {
        let near = look.pointer.is_some_and(|p| p.distance(handle.at) < 70.0);
        if !(hot || chosen || near) {
            return;
        }
    }
    if handle.at != handle.anchor {
        let leader = Stroke::new(Pen::Hairline.width(), look.mix(Ink::Faint, 0.6));
        painter.line_segment([handle.anchor, handle.at], leader);
    }
    things::grip(painter, handle, look);
    if hot || chosen {
        let pen = if chosen { Pen::Bold } else { Pen::Curve };
        painter.circle_stroke(handle.at, GRIP_PX - 1.0, Stroke::new(pen.width(), look.ink(Ink::Chosen)));
    }
}

/// A box behind words that lie over the drawing.
pub fn plate(painter: &Painter, rect: Rect, look: &Look<'_>) {
    let stroke = Stroke::new(Pen::Hairline.width(), look.ink(Ink::Rule));
    painter.rect(rect, 4.0, look.ink(Ink::Panel), stroke, eframe::egui::StrokeKind::Inside);
}

/// A sentence in a quiet box, as near to a place as the frame allows.
pub fn hint(ui: &Ui, at: Pos2, sentence: &str, within: Rect, look: &Look<'_>) {
    let painter = ui.painter().with_clip_rect(within);
    let galley = painter.layout_no_wrap(sentence.to_owned(), font(ui, Type::Small), look.ink(Ink::Caution));
    let size = galley.size() + vec2(12.0, 6.0);
    let room = within.shrink(4.0);
    let corner = pos2(
        (at.x - 0.5 * size.x).clamp(room.left(), (room.right() - size.x).max(room.left())),
        (at.y + 18.0).clamp(room.top(), (room.bottom() - size.y).max(room.top())),
    );
    let rect = Rect::from_min_size(corner, size);
    painter.rect_filled(rect, 4.0, wash(Ink::Caution, look.ground));
    painter.galley(corner + vec2(6.0, 3.0), galley, look.ink(Ink::Caution));
}

impl SupportShape {
    /// Its height on screen, px.
    pub fn height_px(&self) -> f32 {
        (self.foot.y - self.top.y).max(1.0)
    }
}
