//! How a feed path looks.

use eframe::egui::epaint::Mesh;
use eframe::egui::text::LayoutJob;
use eframe::egui::{self, Color32, Rect, Response, Shape, StrokeKind, TextStyle, pos2, vec2};
use sheet::tokens::{Ink, Pattern, Pen};
use station::units;

use super::{Picked, View, layout};
use crate::theme::{color, color_with_opacity, wash};
use crate::views::marks::{self, piece, text_in};

/// How strongly the watts fill the path.
const FLOW_FILL: f32 = 0.34;
/// The same where the transmitter cannot give them.
const IDLE_FILL: f32 = 0.12;
/// How strongly the edges of the path show; figures stand over them.
const EDGE: f32 = 0.6;

/// The pipe as wide as all the watts, and in it the watts that are left.
pub(super) fn flow(ui: &egui::Ui, view: &View<'_>) {
    let ground = view.snapshot.ground;
    let path = view.path;
    let painter = ui.painter();
    painter.rect_filled(path.pipe, 0.0, color(Ink::Panel, ground));
    if path.flow.is_empty() {
        return;
    }
    let idle = !view.column.works_in_middle;
    let ink = Ink::feed(view.column.feed);
    let fill = color_with_opacity(ink, ground, if idle { IDLE_FILL } else { FLOW_FILL });
    let [left, right] = path.edges();
    let mut mesh = Mesh::default();
    for (l, r) in left.iter().zip(&right) {
        mesh.colored_vertex(*l, fill);
        mesh.colored_vertex(*r, fill);
    }
    for index in 1..left.len() as u32 {
        let (here, before) = (2 * index, 2 * index - 2);
        mesh.add_triangle(before, before + 1, here);
        mesh.add_triangle(before + 1, here, here + 1);
    }
    let pen = egui::Stroke::new(Pen::Fine.width(), color_with_opacity(ink, ground, EDGE));
    let pattern = if idle { Pattern::Dotted } else { Pattern::Solid };
    let mut shapes = vec![Shape::mesh(mesh)];
    marks::patterned(left, pattern, pen, &mut shapes);
    marks::patterned(right, pattern, pen, &mut shapes);
    painter.extend(shapes);
}

/// Letter and name; below them the verdict.
pub(super) fn head(ui: &egui::Ui, view: &View<'_>, response: &Response) {
    let ground = view.snapshot.ground;
    let (rect, feed) = (view.path.head, view.column.feed);
    let painter = ui.painter();
    let chosen = view.snapshot.feed == feed;
    let place = rect.shrink2(vec2(0.0, 1.0));
    if chosen {
        painter.rect_filled(place, 4.0, wash(Ink::Chosen, ground));
    } else if response.hovered() {
        painter.rect_filled(place, 4.0, color(Ink::Panel, ground));
    }
    if view.picked == Some(Picked::Feed(feed)) {
        picked(ui, place, view);
    }
    let style = ui.style();
    let inner = rect.shrink2(vec2(5.0, 2.0));
    let mut name = LayoutJob::default();
    let body = TextStyle::Body.resolve(style);
    name.append(&marks::letter(feed).to_string(), 0.0, piece(body.clone(), color(Ink::feed(feed), ground)));
    name.append(view.column.name, 6.0, piece(body, color(Ink::Text, ground)));
    text_in(painter, inner.with_max_y(inner.center().y), name);
    if let Some(kind) = view.column.verdict {
        let line = inner.with_min_y(inner.center().y);
        marks::verdict(painter, pos2(line.left() + 5.0, line.center().y), 4.5, kind, ground);
        let words = piece(TextStyle::Small.resolve(style), color(Ink::Text, ground));
        let words = LayoutJob::single_section(view.column.verdict_words.clone(), words);
        text_in(painter, line.with_min_x(line.left() + 15.0), words);
    }
}

/// The outline of what the editor shows.
fn picked(ui: &egui::Ui, rect: Rect, view: &View<'_>) {
    let pen = marks::stroke(Pen::Curve, Ink::Chosen, view.snapshot.ground);
    ui.painter().rect_stroke(rect, 4.0, pen, StrokeKind::Inside);
}

/// The transmitter: where the path begins.
pub(super) fn transmitter(ui: &egui::Ui, view: &View<'_>, response: &Response) {
    let ground = view.snapshot.ground;
    let rect = view.path.transmitter.shrink2(vec2(0.0, 1.0));
    frame(ui, rect, view, response, view.picked == Some(Picked::Transmitter));
    let inner = rect.shrink2(vec2(6.0, 2.0));
    let style = ui.style();
    let faint = piece(TextStyle::Small.resolve(style), color(Ink::Faint, ground));
    let words = LayoutJob::single_section("transmitter".to_owned(), faint);
    let power = view.column.given();
    let strong = piece(TextStyle::Body.resolve(style), color(Ink::Text, ground));
    let power = marks::one_line(ui.painter(), LayoutJob::single_section(power, strong), inner.width());
    let left = inner.right() - power.size().x;
    // The word goes where the watts leave room for all of it.
    if ui.painter().layout_job(words.clone()).size().x < left - 4.0 - inner.left() {
        text_in(ui.painter(), inner, words);
    }
    ui.painter().galley(pos2(left, inner.center().y - 0.5 * power.size().y), power, Color32::PLACEHOLDER);
}

fn frame(ui: &egui::Ui, rect: Rect, view: &View<'_>, response: &Response, is_picked: bool) {
    let ground = view.snapshot.ground;
    if is_picked {
        return picked(ui, rect, view);
    }
    let ink = if response.hovered() { Ink::Faint } else { Ink::Rule };
    ui.painter().rect_stroke(rect, 4.0, marks::stroke(Pen::Hairline, ink, ground), StrokeKind::Inside);
}

/// A link: its name and what it does.
pub(super) fn block(ui: &egui::Ui, view: &View<'_>, place: usize, response: &Response) {
    let ground = view.snapshot.ground;
    let block = &view.column.blocks[place];
    let rect = view.path.blocks[place];
    let is_picked = view.picked == Some(Picked::Link { feed: view.column.feed, link: block.link });
    frame(ui, rect, view, response, is_picked);
    let style = ui.style();
    let body = piece(TextStyle::Body.resolve(style), color(Ink::Text, ground));
    text_in(
        ui.painter(),
        layout::name_line(rect),
        LayoutJob::single_section(block.short_name().to_owned(), body),
    );

    let small = piece(TextStyle::Small.resolve(style), color(Ink::Text, ground));
    let mut texts = vec![block.detail.clone()];
    if let Some(figures) = block.figures {
        let link = figures.link;
        let lost = |text: String, nothing: bool| if nothing { text } else { format!("−{text}") };
        texts.extend([
            lost(units::decibels(link.loss_db), link.loss_db < 0.005),
            format!("SWR {}", units::swr(link.toward_transmitter.swr)),
            lost(units::watts(link.watts_lost), link.watts_lost < 0.005),
            units::volts(link.peak_v),
            units::amperes(link.rms_a),
        ]);
    }
    let job = |text: &str| LayoutJob::single_section(text.to_owned(), small.clone());
    if layout::is_narrow(rect.width()) {
        for (index, text) in texts.iter().enumerate() {
            text_in(ui.painter(), layout::figure_line(rect, index), job(text));
        }
        return;
    }
    // Two figures share a line: one from the left, one from the right.
    for (index, pair) in texts.chunks(2).enumerate() {
        let line = layout::figure_line(rect, index);
        let mut end = line.right();
        if let Some(text) = pair.get(1) {
            let right = marks::one_line(ui.painter(), job(text), line.width());
            let at = pos2(end - right.size().x, line.center().y - 0.5 * right.size().y);
            ui.painter().galley(at, right, Color32::PLACEHOLDER);
            end = at.x - 3.0;
        }
        text_in(ui.painter(), line.with_max_x(end), job(&pair[0]));
    }
}

/// The wire across the end of the path, and the watts that arrive.
pub(super) fn wire(ui: &egui::Ui, view: &View<'_>) {
    let ground = view.snapshot.ground;
    let rect = view.path.wire;
    let painter = ui.painter();
    painter.hline(rect.x_range(), rect.top() + 1.0, marks::stroke(Pen::Bold, Ink::Wire, ground));
    let Some(wire) = view.column.wire else {
        return;
    };
    let style = ui.style();
    let centred = |top: f32, text: String, style_: TextStyle, ink: Ink| {
        let job = LayoutJob::single_section(text, piece(style_.resolve(style), color(ink, ground)));
        let galley = marks::one_line(painter, job, rect.width());
        let at = pos2(rect.center().x - 0.5 * galley.size().x, rect.top() + top);
        painter.galley(at, galley, Color32::PLACEHOLDER);
    };
    centred(5.0, units::watts(wire.watts), TextStyle::Heading, Ink::Text);
    centred(26.0, "to the wire".to_owned(), TextStyle::Small, Ink::Faint);
    let [sky, earth, heat] = [("sky", wire.sky_w), ("earth", wire.earth_w), ("heat", wire.heat_w)]
        .map(|(name, watts)| format!("{name} {}", units::watts(watts)));
    let lines = if layout::is_narrow(rect.width()) {
        vec![(sky, Ink::Text), (earth, Ink::Text), (heat, Ink::Faint)]
    } else {
        vec![(format!("{sky}   {earth}"), Ink::Text), (heat, Ink::Faint)]
    };
    let mut top = 41.0;
    for (text, ink) in lines {
        centred(top, text, TextStyle::Small, ink);
        top += 15.0;
    }
}
