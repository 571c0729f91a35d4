//! Where plots and read-out stand, without a screen.

use eframe::egui::{Rect, pos2, vec2};

/// Space between plots.
const GAP: f32 = 10.0;
/// Height of a plot's title.
const TITLE: f32 = 20.0;
/// A plot lower than this says nothing; the view scrolls then.
const LEAST_PLOT: f32 = 130.0;
/// Width of the read-out's labels, and of each feed's values.
const READ_OUT: f32 = 122.0;
const READ_OUT_FEED: f32 = 66.0;

/// The plots, in reading order.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Plot {
    Impedance,
    AtFeedpoint,
    Before,
    After,
    Volts,
    Amperes,
}

impl Plot {
    /// All of them, row by row.
    pub const ALL: [Self; 6] =
        [Self::Impedance, Self::AtFeedpoint, Self::Before, Self::After, Self::Volts, Self::Amperes];
}

/// Places of the view.
#[derive(Clone, Debug, PartialEq)]
pub struct Places {
    /// Title and plot for each of [`Plot::ALL`].
    pub plots: [(Rect, Rect); 6],
    /// The read-out at the right.
    pub read_out: Rect,
    /// Everything.
    pub whole: Rect,
}

/// Two columns of plots and the read-out, in the room at hand; higher than it where it is too low.
#[must_use]
pub fn places(room: Rect, feeds: usize) -> Places {
    let read_out_width = (READ_OUT + READ_OUT_FEED * feeds.max(1) as f32).min(0.46 * room.width());
    let plots_width = room.width() - read_out_width - 1.5 * GAP;
    let width = 0.5 * (plots_width - GAP);
    let row_height = ((room.height() - 2.0 * GAP) / 3.0).max(TITLE + LEAST_PLOT);
    let plot = |index: usize| {
        let (column, row) = ((index % 2) as f32, (index / 2) as f32);
        let corner = pos2(room.left() + column * (width + GAP), room.top() + row * (row_height + GAP));
        let cell = Rect::from_min_size(corner, vec2(width, row_height));
        (cell.with_max_y(cell.top() + TITLE), cell.with_min_y(cell.top() + TITLE))
    };
    let plots = std::array::from_fn(plot);
    let bottom = plots[5].1.bottom();
    let read_out =
        Rect::from_min_max(pos2(room.right() - read_out_width, room.top()), pos2(room.right(), bottom));
    Places { plots, read_out, whole: Rect::from_min_max(room.min, pos2(room.right(), bottom)) }
}
