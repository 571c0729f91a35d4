//! Places labels so that none lies on another one or on a line, and none leaves the drawing.
//!
//! All lines come before any label. The line that ties a label to its place may cross others, but no label.

use crate::scene::{Anchor, Frame, Item, Spot, Text, overlap};
use crate::tokens::{Ink, Stroke, TextStyle};

/// Free space kept around a label, mm.
const CLEAR_MM: f64 = 0.5;
/// Half the width that a line is taken to have, mm.
const LINE_MM: f64 = 0.3;
/// From here on a label is tied to its place by a line, mm.
const LEADER_FROM_MM: f64 = 4.0;
/// What a label may stand farther off so that its line crosses one line less, mm.
const CROSSING_MM: f64 = 6.0;
/// The same so that its line does not run through the earth: farther than any label stands.
const EARTH_CROSSING_MM: f64 = 40.0;
/// How far from its place a label may stand, mm.
const DISTANCES_MM: [f64; 8] = [1.2, 3.0, 5.0, 8.0, 12.0, 17.0, 23.0, 30.0];

/// What is taken already.
pub(super) struct Labels {
    frame: Frame,
    texts: Vec<[Spot; 4]>,
    lines: Vec<[Spot; 4]>,
    earth: Vec<[Spot; 4]>,
    items: Vec<Item>,
    unplaced: Vec<String>,
}

impl Labels {
    /// An empty drawing.
    pub fn new(frame: Frame) -> Self {
        Self {
            frame,
            texts: Vec::new(),
            lines: Vec::new(),
            earth: Vec::new(),
            items: Vec::new(),
            unplaced: Vec::new(),
        }
    }

    /// Keeps labels off a line.
    pub fn avoid(&mut self, points: &[Spot]) {
        self.lines.extend(points.windows(2).map(|pair| ribbon(pair[0], pair[1])));
    }

    /// Keeps labels off the earth's surface, and the lines that tie them out of the earth.
    pub fn avoid_earth(&mut self, surface: &[Spot]) {
        self.avoid(surface);
        self.earth.extend(surface.windows(2).map(|pair| ribbon(pair[0], pair[1])));
    }

    /// Draws a line and keeps labels off it.
    pub fn draw(&mut self, points: [Spot; 2], stroke: Stroke, ink: Ink, items: &mut Vec<Item>) {
        self.avoid(&points);
        items.push(Item::line(points[0], points[1], stroke, ink));
    }

    /// Puts the first of some texts that stands free, if there is one.
    pub fn put(&mut self, candidates: impl IntoIterator<Item = Text>) -> Option<()> {
        let text = candidates.into_iter().find(|text| self.is_free(text))?;
        self.texts.push(grown(&text));
        self.items.push(Item::Text(text));
        Some(())
    }

    /// Puts a text, upright, near one of some spots, tied to it by a line where it has to stand off; says so in words
    /// where there is no room at all.
    pub fn put_near(&mut self, spots: &[Spot], text: &Text, directions: &[(f64, f64)]) {
        let Some(Tied { text: placed, leader }) = self.best_near(spots, text, directions) else {
            self.unplaced.push(text.text.clone());
            return;
        };
        if let Some([from, to]) = leader {
            self.items.push(Item::line(from, to, Stroke::Hair, Ink::Faint));
            self.avoid(&[from, to]);
        }
        self.texts.push(grown(&placed));
        self.items.push(Item::Text(placed));
    }

    /// The nearest free place; a line that its tie crosses counts as some distance more.
    fn best_near(&self, spots: &[Spot], text: &Text, directions: &[(f64, f64)]) -> Option<Tied> {
        let mut best: Option<(f64, Tied)> = None;
        for distance_mm in DISTANCES_MM {
            if best.as_ref().is_some_and(|(cost_mm, _)| *cost_mm <= distance_mm) {
                break;
            }
            for (&spot, &direction) in spots.iter().flat_map(|spot| directions.iter().map(move |d| (spot, d)))
            {
                let tied = Tied::new(spot, direction, distance_mm, text);
                if !self.is_free(&tied.text) || !self.is_clear(&tied) {
                    continue;
                }
                let cost_mm = distance_mm + self.crossings_mm(&tied);
                if best.as_ref().is_none_or(|(least_mm, _)| cost_mm < *least_mm) {
                    best = Some((cost_mm, tied));
                }
            }
        }
        best.map(|(_, tied)| tied)
    }

    /// What was put, and what found no room.
    pub fn finish(self) -> (Vec<Item>, Vec<String>) {
        (self.items, self.unplaced)
    }

    fn is_free(&self, text: &Text) -> bool {
        let corners = grown(text);
        let is_within = corners.iter().all(|corner| {
            corner.x_mm >= self.frame.left_mm
                && corner.x_mm <= self.frame.right_mm()
                && corner.y_mm >= self.frame.top_mm
                && corner.y_mm <= self.frame.bottom_mm()
        });
        is_within && !self.texts.iter().chain(&self.lines).any(|taken| overlap(&corners, taken))
    }

    /// Whether the line that ties a label crosses no other label.
    fn is_clear(&self, tied: &Tied) -> bool {
        let Some([from, to]) = tied.leader else { return true };
        let ribbon = ribbon(from, to);
        !self.texts.iter().any(|taken| overlap(&ribbon, taken))
    }

    /// What the lines cost that the one that ties a label crosses, but for those that it begins at.
    fn crossings_mm(&self, tied: &Tied) -> f64 {
        let Some([from, to]) = tied.leader else { return 0.0 };
        let length_mm = (to.x_mm - from.x_mm).hypot(to.y_mm - from.y_mm);
        let share = (CLEAR_MM + 2.0 * LINE_MM) / length_mm;
        let begun =
            Spot::new(from.x_mm + share * (to.x_mm - from.x_mm), from.y_mm + share * (to.y_mm - from.y_mm));
        let ribbon = ribbon(begun, to);
        let crossed = |lines: &[[Spot; 4]]| lines.iter().filter(|line| overlap(&ribbon, line)).count() as f64;
        CROSSING_MM * crossed(&self.lines) + EARTH_CROSSING_MM * crossed(&self.earth)
    }
}

/// A label near its place, and the line between them.
struct Tied {
    text: Text,
    leader: Option<[Spot; 2]>,
}

impl Tied {
    fn new(spot: Spot, direction: (f64, f64), distance_mm: f64, text: &Text) -> Self {
        let leader = (distance_mm >= LEADER_FROM_MM).then(|| {
            let length_mm = distance_mm - 0.8;
            [spot, Spot::new(spot.x_mm + direction.0 * length_mm, spot.y_mm + direction.1 * length_mm)]
        });
        Self { text: beside(spot, direction, distance_mm, text), leader }
    }
}

/// The eight directions, right first, then those between them.
pub(super) const AROUND: [(f64, f64); 16] = [
    (1.0, 0.0),
    (0.71, -0.71),
    (0.71, 0.71),
    (-1.0, 0.0),
    (-0.71, -0.71),
    (-0.71, 0.71),
    (0.0, -1.0),
    (0.0, 1.0),
    (0.92, 0.38),
    (-0.92, 0.38),
    (0.92, -0.38),
    (-0.92, -0.38),
    (0.38, 0.92),
    (-0.38, 0.92),
    (0.38, -0.92),
    (-0.38, -0.92),
];

/// The same, those first that leave a slanting line most clearly.
pub(super) const DOWN_FIRST: [(f64, f64); 16] = [
    (0.0, 1.0),
    (0.71, 0.71),
    (-0.71, 0.71),
    (0.0, -1.0),
    (0.71, -0.71),
    (-0.71, -0.71),
    (0.38, 0.92),
    (-0.38, 0.92),
    (0.38, -0.92),
    (-0.38, -0.92),
    (0.92, 0.38),
    (-0.92, 0.38),
    (0.92, -0.38),
    (-0.92, -0.38),
    (1.0, 0.0),
    (-1.0, 0.0),
];

/// Spots along a line, its middle first.
pub(super) fn spots_on(from: Spot, to: Spot) -> [Spot; 5] {
    [0.5, 0.35, 0.65, 0.2, 0.8].map(|share| {
        Spot::new(from.x_mm + share * (to.x_mm - from.x_mm), from.y_mm + share * (to.y_mm - from.y_mm))
    })
}

/// A text beside a spot, upright: its middle or its end nearest to the spot lies at the distance.
fn beside(spot: Spot, (x, y): (f64, f64), distance_mm: f64, text: &Text) -> Text {
    let anchor = match x {
        x if x > 0.5 => Anchor::Start,
        x if x < -0.5 => Anchor::End,
        _ => Anchor::Middle,
    };
    let size_mm = text.style.size_mm();
    let half_capital_mm = crate::fonts::CAPITAL_HEIGHT * size_mm / 2.0;
    let away_mm = if anchor == Anchor::Middle { y * size_mm * 0.6 } else { 0.0 };
    let at = Spot::new(spot.x_mm + x * distance_mm, spot.y_mm + y * distance_mm + away_mm + half_capital_mm);
    Text { at, anchor, turn_deg: 0.0, ..text.clone() }
}

/// A label along a line: over its middle, then under it, then nearer to its ends.
pub(super) fn along(from: Spot, to: Spot, style: TextStyle, words: &str, gap_mm: f64) -> Vec<Text> {
    // Text reads from left to right, and upright lines from below.
    let (from, to) =
        if from.x_mm > to.x_mm + 1e-6 || ((from.x_mm - to.x_mm).abs() <= 1e-6 && from.y_mm < to.y_mm) {
            (to, from)
        } else {
            (from, to)
        };
    let (dx, dy) = (to.x_mm - from.x_mm, to.y_mm - from.y_mm);
    let length_mm = dx.hypot(dy);
    let text = Text::new(0.0, 0.0, style, words).anchor(Anchor::Middle);
    if length_mm < text.width_mm() {
        return Vec::new();
    }
    let (ux, uy) = (dx / length_mm, dy / length_mm);
    let turn_deg = uy.atan2(ux).to_degrees();
    let over_mm = gap_mm + crate::fonts::DESCENT * style.size_mm();
    let under_mm = gap_mm + crate::fonts::ASCENT * style.size_mm();
    let mut out = Vec::new();
    for share in [0.5, 0.35, 0.65, 0.2, 0.8] {
        for off_mm in [-over_mm, under_mm] {
            let at = Spot::new(from.x_mm + share * dx - uy * off_mm, from.y_mm + share * dy + ux * off_mm);
            out.push(Text { at, ..text.clone() }.turned(turn_deg));
        }
    }
    out
}

fn grown(text: &Text) -> [Spot; 4] {
    let (sin, cos) = text.turn_deg.to_radians().sin_cos();
    let [a, b, c, d] = text.corners();
    let shift = |p: Spot, x: f64, y: f64| {
        let (x, y) = (x * CLEAR_MM, y * CLEAR_MM);
        Spot::new(p.x_mm + x * cos - y * sin, p.y_mm + x * sin + y * cos)
    };
    [shift(a, -1.0, -1.0), shift(b, 1.0, -1.0), shift(c, 1.0, 1.0), shift(d, -1.0, 1.0)]
}

fn ribbon(from: Spot, to: Spot) -> [Spot; 4] {
    let (dx, dy) = (to.x_mm - from.x_mm, to.y_mm - from.y_mm);
    let length_mm = dx.hypot(dy).max(f64::MIN_POSITIVE);
    let (nx, ny) = (-dy / length_mm * LINE_MM, dx / length_mm * LINE_MM);
    [
        Spot::new(from.x_mm + nx, from.y_mm + ny),
        Spot::new(to.x_mm + nx, to.y_mm + ny),
        Spot::new(to.x_mm - nx, to.y_mm - ny),
        Spot::new(from.x_mm - nx, from.y_mm - ny),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn labels_of_one_line_move_apart_or_are_given_back() {
        let frame = Frame { left_mm: 0.0, top_mm: 0.0, width_mm: 60.0, height_mm: 40.0 };
        let mut labels = Labels::new(frame);
        let spots = spots_on(Spot::new(10.0, 20.0), Spot::new(50.0, 20.0));
        // No label has room between these lines and the spots.
        for y_mm in [17.0, 23.0] {
            labels.avoid(&[Spot::new(0.0, y_mm), Spot::new(60.0, y_mm)]);
        }
        for index in 0..40 {
            labels.put_near(&spots, &Text::new(0.0, 0.0, TextStyle::Body, format!("label {index}")), &AROUND);
        }
        let (items, unplaced) = labels.finish();
        let (mut boxes, mut leaders) = (Vec::new(), Vec::new());
        for item in &items {
            match item {
                Item::Text(text) => boxes.push(text.corners()),
                Item::Line { points, .. } => leaders.push(ribbon(points[0], points[1])),
                Item::Area { .. } => {}
            }
        }
        assert_eq!(boxes.len() + unplaced.len(), 40);
        assert!(boxes.len() >= 8 && !leaders.is_empty(), "only {} found room", boxes.len());
        for (index, a) in boxes.iter().enumerate() {
            assert!(boxes[index + 1..].iter().chain(&leaders).all(|b| !overlap(a, b)));
        }
    }
}
