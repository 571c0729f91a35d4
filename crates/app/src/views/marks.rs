//! Marks that several views share: letters and line patterns of feeds, verdicts by shape, text that ends in an
//! ellipsis before it is cut.

use std::sync::Arc;

use eframe::egui::text::{LayoutJob, TextWrapping};
use eframe::egui::{
    Align, Color32, FontId, Galley, Painter, Pos2, Rect, Shape, Stroke, TextFormat, pos2, vec2,
};
use sheet::tokens::{Ground, Ink, Pattern, Pen};
use station::report::VerdictKind;

use crate::theme::color;

/// The letter of a feed, by its index in the plan.
#[must_use]
pub fn letter(feed: usize) -> char {
    u8::try_from(feed).ok().filter(|&f| f < 26).map_or('?', |f| char::from(b'A' + f))
}

/// A stroke in an ink.
#[must_use]
pub fn stroke(pen: Pen, ink: Ink, ground: Ground) -> Stroke {
    Stroke::new(pen.width(), color(ink, ground))
}

/// The ink of a verdict.
#[must_use]
pub fn verdict_ink(kind: VerdictKind) -> Ink {
    match kind {
        VerdictKind::Direct => Ink::Works,
        VerdictKind::WithMatchingUnit => Ink::WorksWithUnit,
        VerdictKind::TooLossy => Ink::TooLossy,
        VerdictKind::Overstressed => Ink::Overstressed,
        VerdictKind::OutOfRange => Ink::OutOfRange,
    }
}

/// What a verdict means, in one sentence.
#[must_use]
pub fn verdict_sentence(kind: VerdictKind) -> &'static str {
    match kind {
        VerdictKind::Direct => {
            "Direct: the transmitter gives full power over the whole band without a matching unit."
        }
        VerdictKind::WithMatchingUnit => {
            "With matching unit: its coil and capacitor bring every frequency of the band within the transmitter's limit."
        }
        VerdictKind::TooLossy => {
            "Too lossy: it can be tuned, but less than the stated share of the watts reaches the wire."
        }
        VerdictKind::Overstressed => {
            "Overstressed: a part would stand more volts than it is rated for at the set power."
        }
        VerdictKind::OutOfRange => {
            "Out of range: neither the transmitter alone nor the matching unit can cope with the worst frequency."
        }
    }
}

/// Draws a verdict as a shape that reads without colour: a full disc, a half disc, a shrinking wedge, a spark, a cross.
pub fn verdict(painter: &Painter, centre: Pos2, radius: f32, kind: VerdictKind, ground: Ground) {
    let ink = color(verdict_ink(kind), ground);
    let line = Stroke::new(Pen::Curve.width(), ink);
    match kind {
        VerdictKind::Direct => {
            painter.circle_filled(centre, radius, ink);
        }
        VerdictKind::WithMatchingUnit => {
            let half = (0..=12)
                .map(|step| {
                    let angle = std::f32::consts::PI * (0.5 + step as f32 / 12.0);
                    centre + radius * vec2(angle.cos(), angle.sin())
                })
                .collect();
            painter.add(Shape::convex_polygon(half, ink, Stroke::NONE));
            painter.circle_stroke(centre, radius - 0.5 * line.width, line);
        }
        VerdictKind::TooLossy => {
            let at = |x: f32, y: f32| centre + radius * vec2(x, y);
            painter.add(Shape::closed_line(vec![at(-0.9, -0.8), at(0.9, -0.8), at(0.0, 0.9)], line));
        }
        VerdictKind::Overstressed => {
            let at = |x: f32, y: f32| centre + radius * vec2(x, y);
            let upper = vec![at(0.35, -1.1), at(-0.7, 0.25), at(0.15, 0.15)];
            let lower = vec![at(-0.35, 1.1), at(0.7, -0.25), at(-0.15, -0.15)];
            painter.add(Shape::convex_polygon(upper, ink, Stroke::NONE));
            painter.add(Shape::convex_polygon(lower, ink, Stroke::NONE));
        }
        VerdictKind::OutOfRange => {
            let arm = 0.8 * radius;
            painter.line_segment([centre + vec2(-arm, -arm), centre + vec2(arm, arm)], line);
            painter.line_segment([centre + vec2(-arm, arm), centre + vec2(arm, -arm)], line);
        }
    }
}

/// A polyline in a feed's pattern.
pub fn patterned(points: Vec<Pos2>, pattern: Pattern, stroke: Stroke, out: &mut Vec<Shape>) {
    match pattern.dash_and_gap() {
        None => out.push(Shape::line(points, stroke)),
        Some((dash, gap)) => out.extend(dashes(&points, dash, gap).map(|dash| Shape::line(dash, stroke))),
    }
}

/// The dashes of a polyline, each a polyline of its own: egui's own dashes fall to pieces where points lie closer than
/// a dash is long.
fn dashes(points: &[Pos2], dash: f32, gap: f32) -> impl Iterator<Item = Vec<Pos2>> {
    let mut done = Vec::new();
    let mut open: Vec<Pos2> = points.first().copied().into_iter().collect();
    let (mut drawing, mut left) = (true, dash);
    for pair in points.windows(2) {
        let (mut from, to) = (pair[0], pair[1]);
        let mut length = (to - from).length();
        while length > left {
            from += (to - from) * (left / length);
            length -= left;
            if drawing {
                open.push(from);
                done.push(std::mem::take(&mut open));
            } else {
                open.push(from);
            }
            drawing = !drawing;
            left = if drawing { dash } else { gap };
        }
        left -= length;
        if drawing {
            open.push(to);
        }
    }
    done.push(open);
    done.into_iter().filter(|dash| dash.len() > 1)
}

/// A piece of text in one colour; pieces of different size stand on one middle line.
#[must_use]
pub fn piece(font: FontId, colour: Color32) -> TextFormat {
    TextFormat { font_id: font, color: colour, valign: Align::Center, ..TextFormat::default() }
}

/// One line of text no wider than `width`; what does not fit ends in an ellipsis (see [`Galley::elided`]).
#[must_use]
pub fn one_line(painter: &Painter, mut job: LayoutJob, width: f32) -> Arc<Galley> {
    job.wrap =
        TextWrapping { max_width: width, max_rows: 1, break_anywhere: true, overflow_character: Some('…') };
    painter.layout_job(job)
}

/// Draws a line of text in the vertical middle of a box from its left edge; true if it had to be shortened.
pub fn text_in(painter: &Painter, within: Rect, job: LayoutJob) -> bool {
    let galley = one_line(painter, job, within.width());
    let elided = galley.elided;
    let at = pos2(within.left(), within.center().y - 0.5 * galley.size().y);
    painter.galley(at, galley, Color32::PLACEHOLDER);
    elided
}

#[cfg(test)]
mod tests {
    use super::*;

    fn length(points: &[Pos2]) -> f32 {
        points.windows(2).map(|pair| (pair[1] - pair[0]).length()).sum()
    }

    #[test]
    fn dashes_keep_their_length_however_close_the_points_are() {
        // 97.5 long: the tenth dash begins at 90.
        let fine: Vec<Pos2> = (0..=390).map(|i| pos2(0.25 * i as f32, 10.0 + 0.001 * i as f32)).collect();
        let coarse = [fine[0], fine[390]];
        for points in [&fine[..], &coarse[..]] {
            let dashes: Vec<Vec<Pos2>> = dashes(points, 6.0, 4.0).collect();
            assert_eq!(dashes.len(), 10, "{} points", points.len());
            for dash in &dashes[..9] {
                assert!((length(dash) - 6.0).abs() < 0.01, "{}", length(dash));
            }
        }
    }

    #[test]
    fn every_feed_has_its_letter() {
        assert_eq!([letter(0), letter(1), letter(2), letter(30)], ['A', 'B', 'C', '?']);
    }
}
