//! Where everything of the feed paths stands, without a screen.

use eframe::egui::{Pos2, Rangef, Rect, pos2};

use super::model::Column;

/// Space between two columns.
const GAP: f32 = 8.0;
/// A column narrower than this cannot hold its figures; the paths scroll sideways then.
const LEAST_COLUMN: f32 = 82.0;
/// Letter, name and verdict.
const HEAD: f32 = 42.0;
/// The transmitter.
const TRANSMITTER: f32 = 34.0;
/// A link: its name, and figures in pairs or, in a narrow column, one below the other.
const NAME: f32 = 19.0;
const LINE: f32 = 15.0;
const BLOCK_PAD: f32 = 3.0;
const BLOCK_SIDE: f32 = 6.0;
/// A column narrower than this has no room for two figures side by side.
const NARROW: f32 = 104.0;
/// The path between two blocks, at least and at most.
const BETWEEN: f32 = 10.0;
const MOST_BETWEEN: f32 = 30.0;
/// The wire and its watts.
const WIRE: f32 = 76.0;
/// The same where its watts stand one below the other.
const NARROW_WIRE: f32 = WIRE + LINE;
/// The path's own share of a column's width.
const INSET: f32 = 4.0;
/// What is left of a path without watts.
const LEAST_PATH: f32 = 1.5;

/// One feed path.
#[derive(Clone, Debug, PartialEq)]
pub struct Path {
    /// The whole column.
    pub column: Rect,
    /// Letter, name, verdict.
    pub head: Rect,
    /// The transmitter's block.
    pub transmitter: Rect,
    /// The links' blocks, the one at the transmitter first.
    pub blocks: Vec<Rect>,
    /// The wire with its watts.
    pub wire: Rect,
    /// As wide as all the watts of the transmitter, from the transmitter to the wire.
    pub pipe: Rect,
    /// Half width of the path at rising heights: `(y, half width)`; empty without figures.
    pub flow: Vec<(f32, f32)>,
}

/// Height that the tallest of the columns needs, with some air where there is room.
#[must_use]
pub fn height(columns: &[Column<'_>], width: f32, available: f32) -> f32 {
    let links = columns.iter().map(|column| column.blocks.len()).max().unwrap_or(0) as f32;
    let block = block_height(width);
    let with = |between: f32| HEAD + TRANSMITTER + links * (between + block) + between + wire_height(width);
    available.clamp(with(BETWEEN), with(MOST_BETWEEN))
}

/// Whether the figures of a link stand one below the other.
#[must_use]
pub fn is_narrow(width: f32) -> bool {
    width < NARROW
}

fn block_height(width: f32) -> f32 {
    NAME + LINE * if is_narrow(width) { 6.0 } else { 3.0 } + 2.0 * BLOCK_PAD + 2.0
}

fn wire_height(width: f32) -> f32 {
    if is_narrow(width) { NARROW_WIRE } else { WIRE }
}

/// The line of a block's name.
#[must_use]
pub fn name_line(block: Rect) -> Rect {
    let inner = block.shrink2([BLOCK_SIDE, BLOCK_PAD].into());
    inner.with_max_y(inner.top() + NAME - 1.0)
}

/// A line of a block's figures.
#[must_use]
pub fn figure_line(block: Rect, index: usize) -> Rect {
    let inner = block.shrink2([BLOCK_SIDE, BLOCK_PAD].into());
    let top = inner.top() + NAME + index as f32 * LINE;
    Rect::from_x_y_ranges(inner.x_range(), top..=top + LINE)
}

/// Width of each of so many columns in the width at hand.
#[must_use]
pub fn column_width(available: f32, columns: usize) -> f32 {
    let count = columns.max(1) as f32;
    ((available - GAP * (count - 1.0)) / count).clamp(LEAST_COLUMN, 190.0)
}

/// Lays a feed out in its column. All columns end at the same height, so that what arrives can be compared.
#[must_use]
pub fn path(column: &Column<'_>, place: usize, width: f32, area: Rect) -> Path {
    let left = area.left() + place as f32 * (width + GAP);
    let x = Rangef::new(left, left + width);
    let at = |top: f32, height: f32| Rect::from_x_y_ranges(x, top..=top + height);
    let head = at(area.top(), HEAD);
    let transmitter = at(head.bottom(), TRANSMITTER);
    let wire = at(area.bottom() - wire_height(width), wire_height(width));
    let count = column.blocks.len() as f32;
    let height = block_height(width);
    let free = wire.top() - transmitter.bottom() - count * height;
    let between = (free / (count + 1.0)).max(BETWEEN);
    let block = |index: usize| at(transmitter.bottom() + between + index as f32 * (height + between), height);
    let blocks: Vec<Rect> = (0..column.blocks.len()).map(block).collect();
    let pipe = Rect::from_x_y_ranges(x, transmitter.bottom()..=wire.top()).shrink2([INSET, 0.0].into());
    let flow = flow(column, &blocks, pipe);
    Path { column: at(area.top(), area.height()), head, transmitter, blocks, wire, pipe, flow }
}

/// The path keeps its width between blocks and narrows inside them, by the watts that each turns into heat.
fn flow(column: &Column<'_>, blocks: &[Rect], pipe: Rect) -> Vec<(f32, f32)> {
    let Some(wire) = column.wire else {
        return Vec::new();
    };
    let half = |watts: f64| (0.5 * pipe.width() * column.share(watts)).max(0.5 * LEAST_PATH);
    let mut points = vec![(pipe.top(), half(column.given_w))];
    for (rect, block) in blocks.iter().zip(&column.blocks) {
        if let Some(figures) = block.figures {
            points.push((rect.top(), half(figures.watts_in)));
            points.push((rect.bottom(), half(figures.watts_out)));
        }
    }
    points.push((pipe.bottom(), half(wire.watts)));
    points
}

impl Path {
    /// The left and the right edge of the path, top to bottom.
    #[must_use]
    pub fn edges(&self) -> [Vec<Pos2>; 2] {
        let centre = self.pipe.center().x;
        [-1.0, 1.0].map(|side| self.flow.iter().map(|&(y, half)| pos2(centre + side * half, y)).collect())
    }
}
