//! Where everything of a lane stands: columns, strips, gauges and thumbnails as geometry, without a screen.

use eframe::egui::{Pos2, Rangef, Rect, pos2};
use station::report::{BandReport, FeedReport, StandingWave};

use sheet::swr_scale;

/// Space between columns.
const GAP: f32 = 10.0;
/// Space left free at the right edge, for the scroll bar.
const EDGE: f32 = 18.0;
/// Height of one feed's gauge and the space below it.
const GAUGE: f32 = 21.0;
const GAUGE_GAP: f32 = 2.0;
/// Height of the bar below a gauge's words.
const TRACK: f32 = 4.0;
/// Space above and below the content of a lane.
const PAD: f32 = 4.0;
/// A lane with one feed still needs two lines for its name.
const LEAST_HEIGHT: f32 = 44.0;

/// The columns of all lanes, as horizontal ranges.
#[derive(Clone, Debug, PartialEq)]
pub struct Columns {
    /// The pin.
    pub pin: Rangef,
    /// Name and frequencies.
    pub name: Rangef,
    /// Thumbnail of the standing wave.
    pub wave: Rangef,
    /// Resistance and reactance.
    pub impedance: Rangef,
    /// SWR strips, one per feed.
    pub strips: Vec<Rangef>,
    /// Gauges: verdict and watts of each feed, one below the other.
    pub gauge: Rangef,
}

/// Shares the width among the columns; the gauges take what words can use, pictures shrink first.
#[must_use]
pub fn columns(x: Rangef, feeds: usize) -> Columns {
    let width = x.span();
    let count = feeds.max(1) as f32;
    let (pin, name, impedance) = (16.0, if width < 760.0 { 112.0 } else { 124.0 }, 78.0);
    let free = (width - pin - name - impedance - (3.0 + count) * GAP - EDGE).max(120.0);
    // Where room is short, words need it more than pictures.
    let pictures = if free < 500.0 { (0.14, 0.24) } else { (0.19, 0.32) };
    let wave = (pictures.0 * free).clamp(44.0, 190.0);
    let strip = (pictures.1 * free / count).clamp(34.0, 180.0);
    let gauge = free - wave - count * strip;
    let mut left = x.min + 4.0;
    let mut take = |width: f32, gap: f32| {
        let range = Rangef::new(left, left + width.max(0.0));
        left = range.max + gap;
        range
    };
    Columns {
        pin: take(pin, 2.0),
        name: take(name, GAP),
        wave: take(wave, GAP),
        impedance: take(impedance, GAP),
        strips: (0..feeds).map(|_| take(strip, GAP)).collect(),
        gauge: take(gauge, 0.0),
    }
}

/// Height of a lane that compares so many feeds.
#[must_use]
pub fn lane_height(feeds: usize) -> f32 {
    (feeds as f32 * (GAUGE + GAUGE_GAP) - GAUGE_GAP + 2.0 * PAD).max(LEAST_HEIGHT)
}

/// A column's box inside a lane.
#[must_use]
pub fn cell(lane: Rect, column: Rangef) -> Rect {
    Rect::from_x_y_ranges(column, lane.y_range()).shrink2([0.0, PAD].into())
}

/// The gauge of one feed inside a lane; gauges share the height evenly.
#[must_use]
pub fn gauge(lane: Rect, column: Rangef, feed: usize, feeds: usize) -> Rect {
    let whole = cell(lane, column);
    let pitch = GAUGE + GAUGE_GAP;
    let top = whole.center().y - 0.5 * (feeds as f32 * pitch - GAUGE_GAP) + feed as f32 * pitch;
    Rect::from_min_size(pos2(whole.left(), top), [whole.width(), GAUGE].into())
}

/// The words of a gauge.
#[must_use]
pub fn gauge_text(gauge: Rect) -> Rect {
    gauge.with_max_y(gauge.bottom() - TRACK - 1.0)
}

/// The bar below the words of a gauge, as long as all the watts of the transmitter.
#[must_use]
pub fn gauge_track(gauge: Rect) -> Rect {
    gauge.with_min_y(gauge.bottom() - TRACK)
}

/// How far a bar is filled: the share of the transmitter's watts that reaches the wire.
#[must_use]
pub fn filled(track: Rect, watts: f64, of_watts: f64) -> Rect {
    let share = if of_watts > 0.0 { (watts / of_watts).clamp(0.0, 1.0) } else { 0.0 };
    track.with_max_x(track.left() + share as f32 * track.width())
}

/// Where a frequency lies across a strip; the middle for a single frequency.
#[must_use]
pub fn strip_x(strip: Rect, band: &BandReport, frequency_hz: f64) -> f32 {
    let width_hz = band.high_hz - band.low_hz;
    let share = if width_hz > 0.0 { ((frequency_hz - band.low_hz) / width_hz).clamp(0.0, 1.0) } else { 0.5 };
    strip.left() + share as f32 * strip.width()
}

/// Where a standing-wave ratio lies up a strip.
#[must_use]
pub fn strip_y(strip: Rect, swr: f64) -> f32 {
    strip.bottom() - swr_scale::height(swr) as f32 * strip.height()
}

/// One of a feed's ratios over the band as points of a strip.
#[must_use]
pub fn strip_points(
    strip: Rect,
    band: &BandReport,
    feed: usize,
    ratio: impl Fn(&FeedReport) -> f64,
) -> Vec<Pos2> {
    let point = |p: &station::report::FrequencyReport| {
        let found = p.feeds.get(feed)?;
        Some(pos2(strip_x(strip, band, p.frequency_hz), strip_y(strip, ratio(found))))
    };
    band.points.iter().filter_map(point).collect()
}

/// Index of the frequency under the pointer.
#[must_use]
pub fn nearest_point(strip: Rect, band: &BandReport, x: f32) -> Option<usize> {
    let distance = |index: &usize| (strip_x(strip, band, band.points[*index].frequency_hz) - x).abs();
    (0..band.points.len()).min_by(|a, b| distance(a).total_cmp(&distance(b)))
}

/// A standing wave small: the wires as one stretched line, current and voltage at the moments at which they peak.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Thumbnail {
    /// Per wire: points of the current; the wire lies at [`Self::axis_y`].
    pub current: Vec<Vec<Pos2>>,
    /// Per wire: points of the voltage, a quarter of a cycle later.
    pub voltage: Vec<Vec<Pos2>>,
    /// Height of the wire.
    pub axis_y: f32,
    /// The feedpoint.
    pub feedpoint: Pos2,
}

/// Puts a standing wave into a box. `feed` is the feedpoint as wire and distance from its beginning, m.
///
/// The phase is that of the strongest current loop, so the signs along the wire are those of one moment.
#[must_use]
pub fn thumbnail(within: Rect, wave: &StandingWave, feed: (usize, f64)) -> Thumbnail {
    let total_m: f64 = wave.wires.iter().filter_map(|w| w.arc_m.last()).sum();
    let axis_y = within.center().y;
    if total_m <= 0.0 {
        return Thumbnail { axis_y, feedpoint: within.center(), ..Thumbnail::default() };
    }
    let currents = || wave.wires.iter().flat_map(|w| &w.current_a);
    let strongest = currents().max_by(|a, b| a.norm_sqr().total_cmp(&b.norm_sqr()));
    let (largest_a, (sin, cos)) = strongest.map_or((0.0, (0.0, 1.0)), |i| (i.norm(), i.arg().sin_cos()));
    let potentials = wave.wires.iter().flat_map(|w| &w.potential_v);
    let largest_v = potentials.fold(0.0, |largest: f64, v| largest.max(v.norm_sqr())).sqrt();
    let half = 0.5 * f64::from(within.height());
    let scale_to = |largest: f64| if largest > 0.0 { half / largest } else { 0.0 };
    let (amperes, volts) = (scale_to(largest_a), scale_to(largest_v));
    // The gap between two wires that are drawn one after the other.
    let gap = 4.0 * (wave.wires.len().saturating_sub(1)) as f64;
    let scale = (f64::from(within.width()) - gap) / total_m;

    let mut thumbnail = Thumbnail { axis_y, feedpoint: within.center(), ..Thumbnail::default() };
    let mut start = f64::from(within.left());
    for (index, wire) in wave.wires.iter().enumerate() {
        let last = wire.arc_m.len().saturating_sub(1);
        // More points than pixels cannot be seen.
        let step = (wire.arc_m.len() / (within.width().max(1.0) as usize)).max(1);
        let picked = || (0..last).step_by(step).chain([last]).filter(|&at| at < wire.arc_m.len());
        let x = |at: usize| (start + scale * wire.arc_m[at]) as f32;
        // Re(I·exp(−jφ)): the moment at which the strongest loop peaks.
        let current = |at: usize| amperes * (wire.current_a[at].re * cos + wire.current_a[at].im * sin);
        // Re(j·V·exp(−jφ)): a quarter of a cycle later, time going as exp(+jωt).
        let voltage = |at: usize| volts * (wire.potential_v[at].re * sin - wire.potential_v[at].im * cos);
        let point = |at: usize, height: f64| pos2(x(at), axis_y - height as f32);
        thumbnail.current.push(picked().map(|at| point(at, current(at))).collect());
        thumbnail.voltage.push(picked().map(|at| point(at, voltage(at))).collect());
        if index == feed.0 {
            thumbnail.feedpoint = pos2((start + scale * feed.1) as f32, axis_y);
        }
        start += scale * wire.arc_m.last().copied().unwrap_or(0.0) + 4.0;
    }
    thumbnail
}
