//! How a lane looks.

use eframe::egui::epaint::Mesh;
use eframe::egui::text::LayoutJob;
use eframe::egui::{self, Pos2, Rect, Shape, Stroke, StrokeKind, TextStyle, pos2, vec2};
use sheet::tokens::{Ground, Ink, Pattern, Pen};
use station::report::VerdictKind;
use station::units;

use super::layout;
use super::model::Ends;
use super::row::Row;
use crate::theme::{color, color_with_opacity};
use crate::views::marks::{self, piece, text_in};

/// How strongly the filled current shows.
const CURRENT_FILL: f32 = 0.38;
/// How strongly the area below the SWR after the matching unit shows.
const AFTER_FILL: f32 = 0.28;
/// Half the side of a channel's mark.
const CHANNEL_MARK: f32 = 2.5;
/// How strongly the watts of the earth show.
const EARTH_FILL: f32 = 0.75;
/// Where a gauge's words begin, right of its letter and sign, and what they keep from its watts.
const WORDS_LEFT: f32 = 29.0;
const WORDS_GAP: f32 = 6.0;
/// Least room for a verdict's reason.
const LEAST_REASON: f32 = 150.0;

/// Name and frequencies.
pub(super) fn name(ui: &egui::Ui, row: &Row<'_>) {
    let ground = row.snapshot.ground;
    let cell = layout::cell(row.rect, row.columns.name);
    let line =
        |top: f32, height: f32| Rect::from_min_size(pos2(cell.left(), top), vec2(cell.width(), height));
    let style = ui.style();
    let middle = cell.center().y;
    let body = piece(TextStyle::Body.resolve(style), color(Ink::Text, ground));
    let small = piece(TextStyle::Small.resolve(style), color(Ink::Faint, ground));
    text_in(
        ui.painter(),
        line(middle - 18.0, 19.0),
        LayoutJob::single_section(row.lane.name.to_owned(), body),
    );
    text_in(ui.painter(), line(middle + 1.0, 16.0), LayoutJob::single_section(row.lane.frequencies(), small));
}

/// The thumbnail of the standing wave.
pub(super) fn wave(ui: &egui::Ui, row: &Row<'_>) {
    let Some((found, report)) = row.lane.report.zip(row.snapshot.report) else {
        return;
    };
    let ground = row.snapshot.ground;
    let within = layout::cell(row.rect, row.columns.wave).shrink2(vec2(3.0, 2.0));
    let feed = (report.hung.feedpoint.wire, report.hung.feedpoint.arc_m);
    let thumbnail = layout::thumbnail(within, &found.wave, feed);
    let mut shapes = Vec::with_capacity(5);
    let ink = color(Ink::Current, ground);
    for points in &thumbnail.current {
        shapes.push(area(points, thumbnail.axis_y, color_with_opacity(Ink::Current, ground, CURRENT_FILL)));
        if let (Some(first), Some(last)) = (points.first(), points.last()) {
            let ends = [pos2(first.x, thumbnail.axis_y), pos2(last.x, thumbnail.axis_y)];
            shapes.push(Shape::line_segment(
                ends,
                Stroke::new(Pen::Hairline.width(), color(Ink::Wire, ground)),
            ));
        }
        shapes.push(Shape::line(points.clone(), Stroke::new(Pen::Hairline.width(), ink)));
    }
    let voltage = marks::stroke(Pen::Fine, Ink::Voltage, ground);
    shapes.extend(thumbnail.voltage.into_iter().map(|points| Shape::line(points, voltage)));
    shapes.push(Shape::circle_filled(thumbnail.feedpoint, 3.2, color(Ink::Background, ground)));
    shapes.push(Shape::circle_stroke(thumbnail.feedpoint, 3.2, marks::stroke(Pen::Fine, Ink::Wire, ground)));
    ui.painter().extend(shapes);
}

/// The area between a curve and a horizontal axis.
fn area(points: &[Pos2], axis_y: f32, fill: egui::Color32) -> Shape {
    let mut mesh = Mesh::default();
    for point in points {
        mesh.colored_vertex(*point, fill);
        mesh.colored_vertex(pos2(point.x, axis_y), fill);
    }
    for index in 1..points.len() as u32 {
        let (here, before) = (2 * index, 2 * index - 2);
        mesh.add_triangle(before, before + 1, here);
        mesh.add_triangle(before + 1, here, here + 1);
    }
    Shape::mesh(mesh)
}

/// Resistance above, reactance below.
pub(super) fn impedance(ui: &egui::Ui, row: &Row<'_>) {
    let Some(found) = row.lane.report else {
        return;
    };
    let ground = row.snapshot.ground;
    let cell = layout::cell(row.rect, row.columns.impedance);
    let font = TextStyle::Body.resolve(ui.style());
    let z = found.middle_point().feedpoint_ohm;
    let sign = if z.im < 0.0 { '−' } else { '+' };
    let lines = [
        (format!("{} Ω", units::short(z.re)), Ink::Resistance, -18.0),
        (format!("{sign} j{} Ω", units::short(z.im.abs())), Ink::Reactance, 0.0),
    ];
    for (text, ink, offset) in lines {
        let line = Rect::from_min_size(pos2(cell.left(), cell.center().y + offset), vec2(cell.width(), 18.0));
        text_in(ui.painter(), line, LayoutJob::single_section(text, piece(font.clone(), color(ink, ground))));
    }
}

/// The SWR strip of a feed.
pub(super) fn strip(ui: &egui::Ui, row: &Row<'_>, feed: usize) {
    let Some(found) = row.lane.report else {
        return;
    };
    let ground = row.snapshot.ground;
    let box_ = layout::cell(row.rect, row.columns.strips[feed]);
    let strip = box_.shrink(1.0);
    let mut shapes = vec![Shape::rect_filled(box_, 2.0, color(Ink::Background, ground))];

    let limit_y = layout::strip_y(strip, row.snapshot.plan.transmitter.swr_limit);
    let before = layout::strip_points(strip, found, feed, |f| f.before_unit.swr);
    let uses_unit = row.lane.uses_unit(feed);
    let pen = marks::stroke(Pen::Curve, Ink::feed(feed), ground);
    let fill = color_with_opacity(Ink::feed(feed), ground, AFTER_FILL);
    // A match lies on the very bottom: a sliver keeps its area visible.
    let after = || -> Vec<Pos2> {
        let lift = |p: Pos2| pos2(p.x, p.y.min(strip.bottom() - 2.0));
        layout::strip_points(strip, found, feed, |f| f.at_transmitter.swr).into_iter().map(lift).collect()
    };
    if row.lane.channels || before.len() < 2 {
        if uses_unit {
            let bar = |p: Pos2| {
                let bar =
                    Rect::from_x_y_ranges(p.x - CHANNEL_MARK..=p.x + CHANNEL_MARK, p.y..=strip.bottom());
                Shape::rect_filled(bar.intersect(box_), 0.0, fill)
            };
            shapes.extend(after().into_iter().map(bar));
        }
        let mark = |p: Pos2| {
            let side = Rect::from_center_size(p, vec2(2.0, 2.0) * CHANNEL_MARK);
            let inside = side.translate(vec2(
                (strip.left() - side.left()).max(0.0) + (strip.right() - side.right()).min(0.0),
                (strip.top() - side.top()).max(0.0) + (strip.bottom() - side.bottom()).min(0.0),
            ));
            Shape::rect_filled(inside, 0.0, pen.color)
        };
        shapes.extend(before.into_iter().map(mark));
    } else {
        if uses_unit {
            shapes.push(area(&after(), strip.bottom(), fill));
        }
        marks::patterned(before, Pattern::feed(feed), pen, &mut shapes);
    }
    let limit = marks::stroke(Pen::Hairline, Ink::Limit, ground);
    shapes.extend(Shape::dashed_line(
        &[pos2(strip.left(), limit_y), pos2(strip.right(), limit_y)],
        limit,
        3.0,
        2.5,
    ));
    let rim = marks::stroke(Pen::Hairline, Ink::Rule, ground);
    shapes.push(Shape::rect_stroke(box_, 2.0, rim, StrokeKind::Inside));
    ui.painter().extend(shapes);
}

/// A feed's verdict in words over a bar of its watts.
pub(super) fn gauge(ui: &egui::Ui, row: &Row<'_>, feed: usize) {
    let Some((found, at)) = row.lane.band_feed(feed).zip(row.lane.middle_feed(feed)) else {
        return;
    };
    let ground = row.snapshot.ground;
    let rect = layout::gauge(row.rect, row.columns.gauge, feed, row.names.len());
    let kind = found.verdict.kind;
    let painter = ui.painter();
    let text = layout::gauge_text(rect);
    let style = ui.style();
    let body = |ink: Ink| piece(TextStyle::Body.resolve(style), color(ink, ground));
    let small = |ink: Ink| piece(TextStyle::Small.resolve(style), color(ink, ground));

    let Some(ends) = row.lane.ends(feed) else { return };
    let mut words = LayoutJob::default();
    words.append(kind.words(), 0.0, body(Ink::Text));
    words.append(&row.lane.covered(feed), 8.0, small(Ink::Text));
    // The verdict comes before the earth's watts: the bar and the hover sentence tell those, too.
    let taken = WORDS_LEFT + painter.layout_job(words.clone()).size().x + WORDS_GAP;
    let sky = LayoutJob::single_section(units::watts(ends.sky_w), body(Ink::Text));
    let mut both = LayoutJob::default();
    both.append(&format!("earth {}", units::watts(ends.earth_w)), 0.0, small(Ink::Faint));
    both.append(&units::watts(ends.sky_w), 6.0, body(Ink::Text));
    let both = painter.layout_job(both);
    let watts = if ends.earth_w >= 0.5 && taken + both.size().x <= text.width() {
        both
    } else {
        marks::one_line(painter, sky, text.width())
    };
    let watts_left = text.right() - watts.size().x;
    painter.galley(
        pos2(watts_left, text.center().y - 0.5 * watts.size().y),
        watts,
        egui::Color32::PLACEHOLDER,
    );
    let letter = LayoutJob::single_section(marks::letter(feed).to_string(), body(Ink::feed(feed)));
    text_in(painter, text, letter);
    marks::verdict(painter, pos2(text.left() + 19.0, text.center().y), 4.8, kind, ground);
    // A reason cut to a few letters says nothing.
    if !found.verdict.reason.is_empty() && watts_left - text.left() - taken > LEAST_REASON {
        words.append(&found.verdict.reason, 8.0, small(Ink::Faint));
    }
    let words_box = Rect::from_x_y_ranges(text.left() + WORDS_LEFT..=watts_left - WORDS_GAP, text.y_range());
    text_in(painter, words_box, words);
    watts_bar(painter, row, (rect, at.watts_to_wire, ends), kind);
}

/// A bar as long as the transmitter's watts: filled what leaves for the sky, brown what the earth takes, outlined what
/// the wire itself turns into heat.
fn watts_bar(
    painter: &egui::Painter,
    row: &Row<'_>,
    (gauge, to_wire_w, ends): (Rect, f64, Ends),
    kind: VerdictKind,
) {
    let ground = row.snapshot.ground;
    let power_w = row.snapshot.plan.transmitter.power_w;
    let track = layout::gauge_track(gauge);
    let least = layout::filled(track, row.snapshot.plan.least_share_to_wire, 1.0).right();
    painter.rect_filled(track, 1.0, color(Ink::Raised, ground));
    let ink = color(marks::verdict_ink(kind), ground);
    let arrived = layout::filled(track, to_wire_w, power_w);
    painter.rect_stroke(
        arrived,
        1.0,
        marks::stroke(Pen::Hairline, marks::verdict_ink(kind), ground),
        StrokeKind::Inside,
    );
    let away = layout::filled(track, ends.sky_w + ends.earth_w, power_w);
    painter.rect_filled(away, 1.0, color_with_opacity(Ink::Support, ground, EARTH_FILL));
    painter.rect_filled(layout::filled(track, ends.sky_w, power_w), 1.0, ink);
    painter.vline(least, track.y_range(), marks::stroke(Pen::Curve, Ink::Text, ground));
}

/// A drawing pin: outlined while it can be set, filled once it is.
pub(super) fn pin(ui: &egui::Ui, place: Rect, pinned: bool, strong: bool, ground: Ground) {
    let ink = if pinned || strong { Ink::Chosen } else { Ink::Faint };
    let centre = place.center();
    let pen = marks::stroke(Pen::Fine, ink, ground);
    let head = centre - vec2(0.0, 2.5);
    if pinned {
        ui.painter().circle_filled(head, 4.0, pen.color);
    } else {
        ui.painter().circle_stroke(head, 3.5, pen);
    }
    ui.painter().line_segment([head + vec2(0.0, 4.0), centre + vec2(0.0, 7.5)], pen);
}
