//! The Yard's words: heading, loops and nodes, supports, the feed line. Each finds a free place or stays away.

use eframe::egui::{Pos2, Rect, Vec2, pos2, vec2};
use sheet::tokens::Ink;
use station::report::MarkKind;
use station::units::{amperes, megahertz, volts, watts};

use super::labels::{Board, Side, Wanted};
use super::layout::{Asking, EDGE_PX, Layout, Measure, Text, Type, watts_to_wire};
use super::model::Model;

/// How far from its mark a number may stand, px.
const NUMBER_REACH_PX: f32 = 88.0;
/// Up to so many marks are named in words; more are told by their shapes and the legend.
const WORDY: usize = 4;
/// Samples of the wave's outline that are kept free of labels together.
const OUTLINE_STRIDE: usize = 3;
/// Reach around a wire's end in which the mark of a node already says the volts, px.
const END_REACH_PX: f32 = 14.0;
/// Room that the legend needs, px.
pub const LEGEND: Vec2 = vec2(470.0, 16.0);

/// Places labels on a board.
struct Writer<'w, 'm> {
    board: Board,
    measure: &'w Measure<'m>,
    texts: Vec<Text>,
}

impl Writer<'_, '_> {
    /// The first of the texts that fits at the anchor.
    fn write(
        &mut self,
        anchor: Pos2,
        choices: &[String],
        look: (Ink, Type),
        sides: &[Side],
        reach: (f32, f32),
    ) {
        let (ink, size) = look;
        let sizes: Vec<Vec2> = choices.iter().map(|text| (self.measure)(text, size)).collect();
        let wanted = Wanted { anchor, sizes: &sizes, sides, reach: reach.0..=reach.1 };
        if let Some(placed) = self.board.place(&wanted) {
            self.texts.push(Text { rect: placed.rect, text: choices[placed.text].clone(), ink, size });
        }
    }
}

impl<'a> Layout<'a> {
    /// Writes everything; what matters most goes first.
    pub(super) fn lay_texts(&mut self, model: &Model<'_>, asking: &Asking<'a>, measure: &Measure<'_>) {
        let mut writer = Writer { board: Board::new(self.view.frame), measure, texts: Vec::new() };
        writer.board.block(self.buttons);
        writer.board.block(self.soil);
        self.write_heading(&mut writer, asking);
        self.block_things(&mut writer.board);
        self.write_legend(&mut writer, asking);
        self.write_supports(&mut writer, model);
        self.write_marks(&mut writer);
        self.write_ends(&mut writer, model);
        self.write_feed_line(&mut writer, asking);
        self.texts = writer.texts;
    }

    fn write_heading(&mut self, writer: &mut Writer<'_, '_>, asking: &Asking<'_>) {
        let corner = self.view.frame.left_top() + vec2(EDGE_PX, EDGE_PX);
        let choices = match asking.band {
            None => vec!["no answer yet".to_owned()],
            Some(band) => {
                let power = watts(watts_to_wire(band, asking.feed.0));
                let frequency = megahertz(band.wave.frequency_hz);
                vec![
                    format!("{} at {frequency}: {power} to the wire through {}", band.name, asking.feed.1),
                    format!("{} at {frequency}: {power} to the wire", band.name),
                    format!("{}: {power}", band.name),
                ]
            }
        };
        let room = self.buttons.left() - EDGE_PX - corner.x;
        let fits = choices.iter().map(|text| (text, (writer.measure)(text, Type::Body)));
        let Some((text, size)) = fits.into_iter().find(|(_, size)| size.x <= room) else { return };
        let rect = Rect::from_min_size(corner, size);
        writer.board.block(rect);
        writer.texts.push(Text { rect, text: text.clone(), ink: Ink::Text, size: Type::Body });
    }

    /// The legend goes under the heading or, if something else is there, into the earth beside the soil.
    fn write_legend(&mut self, writer: &mut Writer<'_, '_>, asking: &Asking<'_>) {
        let Some(heading) = writer.texts.first().map(|text| text.rect) else { return };
        if asking.band.is_none() || self.marks.is_empty() {
            return;
        }
        let beside_buttons = heading.left() + LEGEND.x < self.buttons.left();
        let top = if beside_buttons { heading.bottom() } else { self.buttons.bottom().max(heading.bottom()) };
        let tops = [top + 4.0, self.soil.center().y - 0.5 * LEGEND.y];
        let mut places = tops.map(|top| Rect::from_min_size(pos2(heading.left(), top), LEGEND)).into_iter();
        self.legend = places.find(|place| writer.board.take(*place));
    }

    /// Labels keep out of the wave, the lines, the supports and the grips.
    fn block_things(&self, board: &mut Board) {
        for (_, wave) in &self.waves {
            let outline = wave.outline();
            let pairs: Vec<(Pos2, Pos2)> = outline.upper.into_iter().zip(outline.lower).collect();
            for piece in pairs.windows(OUTLINE_STRIDE + 1).step_by(OUTLINE_STRIDE) {
                let points = piece.iter().flat_map(|(a, b)| [*a, *b]);
                board.block(points.fold(Rect::NOTHING, |rect, p| rect.union(Rect::from_pos(p))).expand(1.0));
            }
        }
        for line in self.wires.iter().chain(&self.ropes).chain([&self.feed_line]) {
            for pair in line.windows(2) {
                block_line(board, pair[0], pair[1]);
            }
        }
        for support in &self.supports {
            board.block(Rect::from_two_pos(support.foot, support.top).expand2(vec2(4.0, 2.0)));
        }
        for mark in &self.marks {
            board.block(Rect::from_center_size(mark.sign, Vec2::splat(14.0)));
        }
        for handle in self.handles.iter().filter(|h| !h.grip.is_new_point()) {
            board.block(Rect::from_center_size(handle.at, Vec2::splat(14.0)));
            if handle.at != handle.anchor {
                block_line(board, handle.anchor, handle.at);
            }
        }
    }

    fn write_supports(&self, writer: &mut Writer<'_, '_>, model: &Model<'_>) {
        for (support, shape) in model.plan.site.supports.iter().zip(&self.supports) {
            let anchor = pos2(shape.foot.x, self.view.earth_y());
            writer.write(
                anchor,
                std::slice::from_ref(&support.name),
                (Ink::Text, Type::Small),
                &[Side::Below, Side::BelowRight, Side::BelowLeft],
                (11.0, 26.0),
            );
        }
    }

    fn write_marks(&self, writer: &mut Writer<'_, '_>) {
        for mark in &self.marks {
            let current = amperes(mark.reading.current_a);
            let voltage = volts(mark.reading.voltage_v);
            let (words, number, ink, [first, second]) = match mark.mark.kind {
                MarkKind::CurrentLoop => ("current loop", current, Ink::Current, [Side::Above, Side::Below]),
                MarkKind::CurrentNode => ("current node", voltage, Ink::Voltage, [Side::Below, Side::Above]),
            };
            let (out, back) =
                if mark.off.x >= 0.0 { (Side::Right, Side::Left) } else { (Side::Left, Side::Right) };
            // On a steep wire there is more room beside it than above it.
            let steep = mark.off.x.abs() > mark.off.y.abs();
            let [a, b, c, d] = if steep { [out, back, first, second] } else { [first, second, out, back] };
            let sides = [a, b, c, d, Side::BelowLeft, Side::BelowRight];
            let mut choices = vec![format!("{words} {number}"), number];
            if self.marks.len() > WORDY {
                choices.remove(0);
            }
            writer.write(mark.at, &choices, (ink, Type::Small), &sides, (9.0, NUMBER_REACH_PX));
        }
    }

    /// The volts at the wire's ends, where the insulators are.
    fn write_ends(&self, writer: &mut Writer<'_, '_>, model: &Model<'_>) {
        for (wire, wave) in &self.waves {
            let Some(line) = self.wires.get(*wire) else { continue };
            let (Some(first), Some(last)) = (line.first(), line.last()) else { continue };
            let readings = wave.at_ends();
            let [begins, ends] = model.joined_ends(*wire);
            for (at, reading, joined) in [(*first, readings.0, begins), (*last, readings.1, ends)] {
                // Only an open end has an insulator.
                if joined || self.marks.iter().any(|m| m.at.distance(at) < END_REACH_PX) {
                    continue;
                }
                let number = volts(reading.voltage_v);
                writer.write(
                    at,
                    &[format!("end {number}"), number],
                    (Ink::Voltage, Type::Small),
                    &[Side::Below, Side::Above, Side::Left, Side::Right],
                    (10.0, NUMBER_REACH_PX),
                );
            }
        }
    }

    fn write_feed_line(&self, writer: &mut Writer<'_, '_>, asking: &Asking<'_>) {
        if let Some(&at) = self.feed_line.get(self.feed_line.len() / 2) {
            let look = (Ink::feed(asking.feed.0), Type::Small);
            writer.write(at, &[asking.feed.1.to_owned()], look, &[Side::Right, Side::Left], (7.0, 30.0));
        }
        if let Some(&at) = self.feed_line.last() {
            let sides = [Side::Right, Side::Left, Side::Above];
            writer.write(at, &["entrance".to_owned()], (Ink::Faint, Type::Small), &sides, (14.0, 28.0));
        }
    }
}

/// Blocks small boxes along a line, so that a sloping line does not block everything around it.
fn block_line(board: &mut Board, from: Pos2, to: Pos2) {
    const STEP_PX: f32 = 16.0;
    let count = (from.distance(to) / STEP_PX).ceil().max(1.0) as usize;
    // Lines far outside the plot need no boxes.
    let count = count.min(200);
    for n in 0..count {
        let share = |n: usize| n as f32 / count as f32;
        board.block(Rect::from_two_pos(from.lerp(to, share(n)), from.lerp(to, share(n + 1))).expand(2.0));
    }
}
