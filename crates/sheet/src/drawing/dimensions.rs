//! Paints what the crew measures on the site: heights, spans, lengths.

use station::units::Units;

use super::elevation::{Elevation, Fastening, Piece, Place};
use super::labels::{AROUND, DOWN_FIRST, Labels, along, spots_on};
use super::scale::Sight;
use crate::fonts;
use crate::scene::{Anchor, Frame, Item, Spot, Text};
use crate::text::fit;
use crate::tokens::{Ink, Stroke, TextStyle};

/// Half the length of the stroke that ends a dimension line, mm.
const TICK_MM: f64 = 0.9;
/// From a support to its height's dimension line, mm.
const HEIGHT_OFF_MM: f64 = 7.0;
/// From the wire to the dimension line of a piece of it, mm.
const ARM_OFF_MM: f64 = 3.0;
/// Shorter spans and parts are not worth a number, m.
const LEAST_SPAN_M: f64 = 0.5;

/// A measured length: its line, and what stands at it.
pub(super) struct Dimension {
    line: (Spot, Spot),
    words: String,
    /// Where its number may be tied to if the line is too short for it.
    tied_to: Vec<Spot>,
    /// Where to look for a place there.
    directions: &'static [(f64, f64)],
}

impl Dimension {
    /// Draws the line with its ends.
    pub fn draw(&self, labels: &mut Labels, items: &mut Vec<Item>) {
        let (from, to) = self.line;
        let length_mm = (to.x_mm - from.x_mm).hypot(to.y_mm - from.y_mm).max(f64::MIN_POSITIVE);
        let (nx, ny) =
            (-(to.y_mm - from.y_mm) / length_mm * TICK_MM, (to.x_mm - from.x_mm) / length_mm * TICK_MM);
        labels.draw([from, to], Stroke::Rule, Ink::Faint, items);
        for end in [from, to] {
            let tick = [1.0, -1.0].map(|side| Spot::new(end.x_mm + side * nx, end.y_mm + side * ny));
            labels.draw(tick, Stroke::Frame, Ink::Faint, items);
        }
    }

    /// Puts its number over it or under it, if it has room there.
    pub fn number_along(&self, labels: &mut Labels) -> Option<()> {
        let (from, to) = self.line;
        labels.put(along(from, to, TextStyle::Strong, &self.words, 0.8))
    }

    /// Puts its number near it, tied to it.
    pub fn number_near(&self, labels: &mut Labels) {
        let text = Text::new(0.0, 0.0, TextStyle::Strong, &self.words);
        labels.put_near(&self.tied_to, &text, self.directions);
    }
}

/// Rows of names: two where three or more supports may stand close.
fn name_rows(elevation: &Elevation) -> u32 {
    if elevation.supports.len() > 2 { 2 } else { 1 }
}

/// Height of the rows of names, mm.
pub(super) fn names_mm(elevation: &Elevation) -> f64 {
    TextStyle::Body.leading_mm() + f64::from(name_rows(elevation) - 1) * name_pitch_mm()
}

/// From one row of names to the next, mm: far enough that labels count as clear of each other.
fn name_pitch_mm() -> f64 {
    TextStyle::Body.leading_mm() + 1.0
}

/// Height of the row of spans, mm.
pub(super) const SPANS_MM: f64 = 5.8 + TICK_MM + 0.3;

/// Places along the plane where the path is made fast, from left to right.
fn stations(elevation: &Elevation) -> Vec<f64> {
    let mut out: Vec<f64> = elevation.fastenings.iter().map(|fastening| fastening.at.along_m).collect();
    out.sort_by(f64::total_cmp);
    out.dedup_by(|a, b| (*a - *b).abs() < LEAST_SPAN_M);
    out
}

/// Spans between fastenings, in a row below the earth.
pub(super) fn spans(elevation: &Elevation, sight: &Sight, units: Units, top_mm: f64) -> Vec<Dimension> {
    let y_mm = top_mm + SPANS_MM - TICK_MM - 0.3;
    let at = |along_m: f64| Spot::new(sight.spot(Place { along_m, up_m: 0.0 }).x_mm, y_mm);
    let span = |pair: &[f64]| Dimension {
        line: (at(pair[0]), at(pair[1])),
        words: units.tape(pair[1] - pair[0]),
        tied_to: spots_on(at(pair[0]), at(pair[1])).to_vec(),
        directions: &[(0.0, 1.0), (1.0, 0.0), (-1.0, 0.0)],
    };
    stations(elevation).windows(2).map(span).collect()
}

/// Heights at which the wire's path is made fast, over the foot of each support.
pub(super) fn heights(
    elevation: &Elevation,
    sight: &Sight,
    units: Units,
    (labels, items): (&mut Labels, &mut Vec<Item>),
) -> Vec<Dimension> {
    let mut out = Vec::new();
    let last = elevation.fastenings.len().saturating_sub(1);
    let is_leftward = elevation
        .fastenings
        .first()
        .zip(elevation.fastenings.last())
        .is_some_and(|(first, last)| first.at.along_m > last.at.along_m);
    for (index, fastening) in elevation.fastenings.iter().enumerate() {
        // Two corners beside the feedpoint are one place to measure.
        if index > 0 && is_beside(&elevation.fastenings[index - 1], fastening) {
            continue;
        }
        let height_m = fastening.at.up_m - fastening.foot_m;
        let side = if (index == last && last > 0) != is_leftward { 1.0 } else { -1.0 };
        let off = |spot: Spot| Spot::new(spot.x_mm + side * HEIGHT_OFF_MM, spot.y_mm);
        let top = sight.spot(fastening.at);
        let foot = sight.spot(Place { up_m: fastening.foot_m, ..fastening.at });
        let beyond = Spot::new(off(top).x_mm + side * TICK_MM, top.y_mm);
        labels.draw([top, beyond], Stroke::Hair, Ink::Rule, items);
        out.push(Dimension {
            line: (off(foot), off(top)),
            words: units.tape(height_m),
            tied_to: [off(top)].into_iter().chain(spots_on(off(foot), off(top))).collect(),
            directions: &AROUND,
        });
    }
    out
}

/// Marks of the loads, beside their boxes.
pub(super) fn loads(elevation: &Elevation, sight: &Sight, labels: &mut Labels) {
    for load in &elevation.loads {
        let text = Text::new(0.0, 0.0, TextStyle::Strong, &load.mark);
        let below_first = [(0.0, 1.0), (0.0, -1.0), (0.71, 0.71), (-0.71, 0.71), (1.0, 0.0), (-1.0, 0.0)];
        labels.put_near(&[sight.spot(load.at)], &text, &below_first);
    }
}

/// Lengths of the straight pieces of wire.
pub(super) fn arms(elevation: &Elevation, sight: &Sight, units: Units) -> Vec<Dimension> {
    let straight = elevation.arms.iter().filter(|arm| measured_parts(arm).len() == 1);
    let dimension = |arm: &Piece| {
        let line = measured(arm, sight)?;
        let words = format!("{} {}", arm.mark, units.tape(arm.length_m()));
        Some(Dimension { line, words, tied_to: spots_on(line.0, line.1).to_vec(), directions: &AROUND })
    };
    straight.filter_map(dimension).collect()
}

/// Lengths of the bent pieces of wire: each part has its number, the longest that of the whole piece too.
pub(super) fn bent_arms(elevation: &Elevation, sight: &Sight, units: Units, labels: &mut Labels) {
    for arm in &elevation.arms {
        let parts = measured_parts(arm);
        if parts.len() == 1 {
            continue;
        }
        let longest = longest(arm);
        for index in parts {
            let length = units.tape(arm.lengths_m[index]);
            let part = if index == longest {
                let whole = format!("{} {}", arm.mark, units.tape(arm.length_m()));
                Text::new(0.0, 0.0, TextStyle::Strong, format!("{whole}, here {length}"))
            } else {
                Text::new(0.0, 0.0, TextStyle::Body, length)
            };
            let (from, to) = (sight.spot(arm.places[index]), sight.spot(arm.places[index + 1]));
            if labels.put(along(from, to, part.style, &part.text, 1.0)).is_none() {
                labels.put_near(&spots_on(from, to), &part, &AROUND);
            }
        }
    }
}

/// The straight parts that are worth a number: all but the shortest, and the longest in any case.
fn measured_parts(arm: &Piece) -> Vec<usize> {
    let longest = longest(arm);
    let is_worth = |&index: &usize| index == longest || arm.lengths_m[index] >= LEAST_SPAN_M;
    (0..arm.lengths_m.len()).filter(is_worth).collect()
}

/// Where the dimension line of a straight piece runs.
fn measured(arm: &Piece, sight: &Sight) -> Option<(Spot, Spot)> {
    let index = longest(arm);
    let (from, to) = (arm.places.get(index)?, arm.places.get(index + 1)?);
    Some(lifted(sight.spot(*from), sight.spot(*to), ARM_OFF_MM))
}

/// Whether two fastenings are so near that one height says both.
fn is_beside(a: &Fastening, b: &Fastening) -> bool {
    const SAME_M: f64 = 0.005;
    let is_near = (a.at.along_m - b.at.along_m).abs() < LEAST_SPAN_M;
    is_near && (a.at.up_m - b.at.up_m).abs() < SAME_M && (a.foot_m - b.foot_m).abs() < SAME_M
}

/// Lengths of ropes and lines.
pub(super) fn names(
    elevation: &Elevation,
    sight: &Sight,
    units: Units,
    lines: &[String],
    labels: &mut Labels,
) {
    for rope in &elevation.ropes {
        let words = format!("{} {}", rope.mark, units.tape(rope.length_m()));
        let longest = longest(rope);
        if let Some(pair) = rope.places.windows(2).nth(longest) {
            let (from, to) = (sight.spot(pair[0]), sight.spot(pair[1]));
            if labels.put(along(from, to, TextStyle::Body, &words, 1.0)).is_none() {
                let text = Text::new(0.0, 0.0, TextStyle::Body, words);
                labels.put_near(&spots_on(from, to), &text, &DOWN_FIRST);
            }
        }
    }
    let (feedpoint, entrance) = (sight.spot(elevation.feedpoint), sight.spot(elevation.entrance));
    for line in lines {
        let text = Text::new(0.0, 0.0, TextStyle::Body, line);
        labels.put_near(&spots_on(feedpoint, entrance), &text, &AROUND);
    }
}

/// Says where the wire is fed, and how high where no fastening beside it says it.
pub(super) fn feedpoint(elevation: &Elevation, sight: &Sight, units: Units, labels: &mut Labels) {
    let fed = Fastening { at: elevation.feedpoint, foot_m: 0.0 };
    let text = if elevation.fastenings.iter().any(|fastening| is_beside(&fed, fastening)) {
        "feedpoint".to_owned()
    } else {
        format!("feedpoint, {} up", units.tape(elevation.feedpoint.up_m))
    };
    labels.put_near(&[sight.spot(elevation.feedpoint)], &Text::new(0.0, 0.0, TextStyle::Body, text), &AROUND);
}

/// Where the entrance is, from the first fastening.
fn entrance_words(elevation: &Elevation, units: Units) -> String {
    let up_m = elevation.entrance.up_m;
    let mut words =
        format!("entrance, {} {}", units.tape(up_m.abs()), if up_m < 0.0 { "down" } else { "up" });
    let along_m = elevation.entrance.along_m;
    if along_m.abs() > LEAST_SPAN_M {
        let side = if along_m > 0.0 { "along" } else { "before the first support" };
        words = format!("{words}, {} {side}", units.tape(along_m.abs()));
    }
    let behind_m = elevation.entrance_behind_m;
    if behind_m.abs() > LEAST_SPAN_M {
        let side = if behind_m > 0.0 { "behind the wire" } else { "before the wire" };
        words = format!("{words}, {} {side}", units.tape(behind_m.abs()));
    }
    words
}

/// Says where the entrance is: below it, beside the names of the supports, or near it.
pub(super) fn entrance(
    elevation: &Elevation,
    sight: &Sight,
    units: Units,
    (frame, top_mm): (Frame, f64),
    labels: &mut Labels,
) {
    let at = sight.spot(elevation.entrance);
    let text = Text::new(0.0, 0.0, TextStyle::Body, entrance_words(elevation, units));
    if labels.put(below(at.x_mm, &text, (frame, top_mm), name_rows(elevation))).is_none() {
        labels.put_near(&[at], &text, &AROUND);
    }
}

/// A text in one of some rows from `top_mm` down, as near under a place as the frame allows.
fn below(x_mm: f64, text: &Text, (frame, top_mm): (Frame, f64), rows: u32) -> Vec<Text> {
    let half_mm = text.width_mm() / 2.0 + 0.6;
    let least_mm = frame.left_mm + half_mm;
    let middle_mm = x_mm.clamp(least_mm, (frame.right_mm() - half_mm).max(least_mm));
    let shifts = [0.0, 4.0, -4.0, 8.0, -8.0, 14.0, -14.0, 22.0, -22.0];
    (0..rows)
        .flat_map(|row| shifts.map(|shift_mm| (row, shift_mm)))
        .map(|(row, shift_mm)| {
            let y_mm = top_mm + TextStyle::Body.leading_mm() * 0.85 + f64::from(row) * name_pitch_mm();
            Text { at: Spot::new(middle_mm + shift_mm, y_mm), anchor: Anchor::Middle, ..text.clone() }
        })
        .collect()
}

/// Names of the supports, in up to two rows at the foot of the drawing.
pub(super) fn support_names(
    elevation: &Elevation,
    sight: &Sight,
    frame: Frame,
    top_mm: f64,
    labels: &mut Labels,
) {
    let count = elevation.supports.len().max(1) as f64;
    let room_mm = (frame.width_mm / count).max(24.0) - 2.0;
    for support in &elevation.supports {
        let x_mm = sight.spot(support.foot).x_mm;
        let name = fit(TextStyle::Body, &fonts::printable(&support.name), room_mm);
        let text = Text::new(0.0, 0.0, TextStyle::Body, name).ink(Ink::Support);
        if labels.put(below(x_mm, &text, (frame, top_mm), 2)).is_none() {
            labels.put_near(&[Spot::new(x_mm, top_mm)], &text, &AROUND);
        }
    }
}

/// Index of the longest straight part.
fn longest(piece: &Piece) -> usize {
    (0..piece.lengths_m.len()).max_by(|&a, &b| piece.lengths_m[a].total_cmp(&piece.lengths_m[b])).unwrap_or(0)
}

/// A line moved up, at right angles to itself; to the left where it stands upright.
fn lifted(from: Spot, to: Spot, by_mm: f64) -> (Spot, Spot) {
    let length_mm = (to.x_mm - from.x_mm).hypot(to.y_mm - from.y_mm).max(f64::MIN_POSITIVE);
    let (mut nx, mut ny) = ((to.y_mm - from.y_mm) / length_mm, -(to.x_mm - from.x_mm) / length_mm);
    if ny > 1e-9 || (ny.abs() <= 1e-9 && nx > 0.0) {
        (nx, ny) = (-nx, -ny);
    }
    let lift = |spot: Spot| Spot::new(spot.x_mm + nx * by_mm, spot.y_mm + ny * by_mm);
    (lift(from), lift(to))
}
