//! Places for labels: each takes the first free place of its wishes, the shorter text where the longer does not fit,
//! or none. What is placed never overlaps.

use eframe::egui::{Pos2, Rect, Vec2, vec2};

/// Free space kept around each label, px.
const CLEARANCE: f32 = 2.0;
/// How far apart two tries on one side are, px.
const STRIDE: f32 = 7.0;
/// How far a label below and to a side begins from its anchor, px: clear of a mast.
const CORNER: f32 = 8.0;
/// How much farther away a better side may be, px.
const RELUCTANCE: f32 = 28.0;

/// A side of the anchor.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Side {
    Above,
    Below,
    Left,
    Right,
    BelowLeft,
    BelowRight,
}

/// What a label asks for.
#[derive(Clone, Debug)]
pub struct Wanted<'a> {
    /// What it belongs to.
    pub anchor: Pos2,
    /// Sizes of its texts, best first.
    pub sizes: &'a [Vec2],
    /// Sides, best first.
    pub sides: &'a [Side],
    /// Distance from the anchor to the label's near edge, from and to.
    pub reach: std::ops::RangeInclusive<f32>,
}

/// Where a label goes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Placed {
    /// Which of its texts.
    pub text: usize,
    /// Where.
    pub rect: Rect,
}

/// A sheet of free and taken places.
#[derive(Clone, Debug)]
pub struct Board {
    frame: Rect,
    taken: Vec<Rect>,
}

impl Board {
    /// All of the frame is free.
    pub fn new(frame: Rect) -> Self {
        Self { frame, taken: Vec::with_capacity(128) }
    }

    /// Keeps labels out of a place.
    pub fn block(&mut self, rect: Rect) {
        self.taken.push(rect);
    }

    /// Whether nothing stands there.
    fn is_free(&self, rect: Rect) -> bool {
        self.frame.contains_rect(rect) && !self.taken.iter().any(|t| t.intersects(rect))
    }

    /// Takes a certain place if nothing stands there.
    pub fn take(&mut self, rect: Rect) -> bool {
        let free = self.is_free(rect);
        if free {
            self.block(rect);
        }
        free
    }

    /// Finds a place and takes it.
    pub fn place(&mut self, wanted: &Wanted<'_>) -> Option<Placed> {
        let (first, last) = (*wanted.reach.start(), *wanted.reach.end());
        for (text, &size) in wanted.sizes.iter().enumerate() {
            // Near places before far ones, and the better side before the worse one unless it is much farther.
            let mut cost = first;
            while cost <= last + RELUCTANCE * wanted.sides.len() as f32 {
                for (rank, &side) in wanted.sides.iter().enumerate() {
                    let distance = cost - RELUCTANCE * rank as f32;
                    if distance < first || distance > last {
                        continue;
                    }
                    let rect = beside(wanted.anchor, side, distance, size);
                    if self.is_free(rect.expand(CLEARANCE)) {
                        self.block(rect);
                        return Some(Placed { text, rect });
                    }
                }
                cost += STRIDE;
            }
        }
        None
    }
}

/// A box on one side of a place.
pub fn beside(anchor: Pos2, side: Side, distance: f32, size: Vec2) -> Rect {
    let offset = match side {
        Side::Above => vec2(0.0, -distance - 0.5 * size.y),
        Side::Below => vec2(0.0, distance + 0.5 * size.y),
        Side::Left => vec2(-distance - 0.5 * size.x, 0.0),
        Side::Right => vec2(distance + 0.5 * size.x, 0.0),
        Side::BelowLeft => vec2(-CORNER - 0.5 * size.x, distance + 0.5 * size.y),
        Side::BelowRight => vec2(CORNER + 0.5 * size.x, distance + 0.5 * size.y),
    };
    Rect::from_center_size(anchor + offset, size)
}

#[cfg(test)]
mod tests {
    use super::*;
    use eframe::egui::pos2;

    #[test]
    fn many_labels_on_one_wire_do_not_overlap() {
        let frame = Rect::from_min_size(pos2(0.0, 0.0), vec2(640.0, 300.0));
        let mut board = Board::new(frame);
        let wall = Rect::from_min_max(pos2(100.0, 140.0), pos2(540.0, 160.0));
        board.block(wall);
        let sizes = [vec2(110.0, 14.0), vec2(40.0, 14.0)];
        let mut placed: Vec<Placed> = Vec::new();
        for n in 0..30 {
            let wanted = Wanted {
                anchor: pos2(100.0 + 15.0 * n as f32, 150.0),
                sizes: &sizes,
                sides: &[Side::Above, Side::Below],
                reach: 4.0..=60.0,
            };
            placed.extend(board.place(&wanted));
        }
        assert!(placed.len() > 10, "only {} found a place", placed.len());
        assert!(placed.iter().any(|p| p.text == 0) && placed.iter().any(|p| p.text == 1));
        for (n, a) in placed.iter().enumerate() {
            assert!(frame.contains_rect(a.rect) && !a.rect.intersects(wall));
            for b in &placed[n + 1..] {
                assert!(!a.rect.intersects(b.rect), "{a:?} overlaps {b:?}");
            }
        }
    }

    #[test]
    fn a_label_without_room_is_left_out() {
        let frame = Rect::from_min_size(pos2(0.0, 0.0), vec2(100.0, 20.0));
        let mut board = Board::new(frame);
        board.block(frame);
        let wanted = Wanted {
            anchor: frame.center(),
            sizes: &[vec2(10.0, 8.0)],
            sides: &[Side::Above],
            reach: 0.0..=50.0,
        };
        assert_eq!(board.place(&wanted), None);
    }
}
