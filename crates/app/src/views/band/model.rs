//! What the band view shows: curves ready for the plots, made once per answer, and the values at the cursor.

use egui_plot::PlotPoint;
use station::report::{BandReport, FeedReport, FrequencyReport, Model, ProfilePoint, Report, Sense, Setting};
use station::units::{self, Units};

use crate::views::marks;
use sheet::swr_scale;

/// Free space at both sides of a frequency axis, as a share of the band.
const MARGIN: f64 = 0.04;
/// Half the width of the frequency axis around a single channel, MHz.
const CHANNEL_HALF_MHZ: f64 = 0.01;
/// The axes of ohms, volts and amperes never shrink below this.
const LEAST_SPAN: f64 = 1e-3;

/// Which answer, band and unit the curves were made for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Key {
    /// Revision of the report.
    pub revision: u64,
    /// Its model.
    pub model: Model,
    /// Index of the band.
    pub band: usize,
    /// Unit of the length axes.
    pub units: Units,
}

/// All curves of a band. Frequencies are in MHz, ratios as heights of [`swr_scale`].
#[derive(Clone, Debug)]
pub struct Curves {
    /// What they were made for.
    pub key: Key,
    /// Range of the frequency axis, MHz.
    pub mhz: (f64, f64),
    /// Resistance, Ω.
    pub resistance: Vec<PlotPoint>,
    /// Reactance, Ω.
    pub reactance: Vec<PlotPoint>,
    /// Range of the axis of ohms.
    pub ohms: (f64, f64),
    /// One entry per feed.
    pub feeds: Vec<FeedCurves>,
    /// Longest feed line, in the length unit.
    pub longest: f64,
    /// Top of the axes of volts and of amperes.
    pub tops: (f64, f64),
}

/// The curves of one feed.
#[derive(Clone, Debug, Default)]
pub struct FeedCurves {
    /// SWR at the feedpoint.
    pub at_feedpoint: Vec<PlotPoint>,
    /// SWR at the transmitter's socket without the matching unit.
    pub before: Vec<PlotPoint>,
    /// The same with it.
    pub after: Vec<PlotPoint>,
    /// Peak volts along the line.
    pub volts: Vec<PlotPoint>,
    /// Peak amperes along the line.
    pub amperes: Vec<PlotPoint>,
}

impl Curves {
    /// Makes the curves of a band; `None` if the report has no such band.
    #[must_use]
    pub fn new(report: &Report, band: usize, units: Units) -> Option<Self> {
        let found = report.bands.get(band)?;
        let curve = |value: &dyn Fn(&FrequencyReport) -> Option<f64>| -> Vec<PlotPoint> {
            let point = |p: &FrequencyReport| Some(PlotPoint::new(p.frequency_hz / 1e6, value(p)?));
            found.points.iter().filter_map(point).collect()
        };
        let resistance = curve(&|p| Some(p.feedpoint_ohm.re));
        let reactance = curve(&|p| Some(p.feedpoint_ohm.im));
        let feeds: Vec<FeedCurves> = (0..found.feeds.len())
            .map(|feed| {
                let ratio = |of: fn(&FeedReport) -> f64| {
                    curve(&|p| Some(swr_scale::height(of(p.feeds.get(feed)?))))
                };
                let along = |value: fn(&ProfilePoint) -> f64| -> Vec<PlotPoint> {
                    let point = |p: &ProfilePoint| PlotPoint::new(units.from_metres(p.from_wire_m), value(p));
                    found.feeds[feed].profile.iter().map(point).collect()
                };
                FeedCurves {
                    at_feedpoint: ratio(|f| f.at_feedpoint.swr),
                    before: ratio(|f| f.before_unit.swr),
                    after: ratio(|f| f.at_transmitter.swr),
                    volts: along(|p| p.peak_v),
                    amperes: along(|p| p.peak_a),
                }
            })
            .collect();
        let top = |of: fn(&FeedCurves) -> &Vec<PlotPoint>| {
            feeds.iter().flat_map(of).map(|p| p.y).fold(LEAST_SPAN, f64::max) * 1.08
        };
        let longest = feeds.iter().filter_map(|f| f.volts.last()).map(|p| p.x).fold(0.0, f64::max);
        Some(Self {
            key: Key { revision: report.revision, model: report.model, band, units },
            mhz: frequency_range(found),
            ohms: ohms(&resistance, &reactance),
            longest: if longest > 0.0 { longest } else { 1.0 },
            tops: (top(|f| &f.volts), top(|f| &f.amperes)),
            resistance,
            reactance,
            feeds,
        })
    }
}

/// The frequency axis: the band and a little more, so that its edges show.
fn frequency_range(band: &BandReport) -> (f64, f64) {
    let (low, high) = (band.low_hz / 1e6, band.high_hz / 1e6);
    let margin = (MARGIN * (high - low)).max(if high - low < 1e-6 { CHANNEL_HALF_MHZ } else { 0.0 });
    (low - margin, high + margin)
}

/// The axis of ohms: zero and everything there is, with some air.
fn ohms(resistance: &[PlotPoint], reactance: &[PlotPoint]) -> (f64, f64) {
    let values = || resistance.iter().chain(reactance).map(|p| p.y);
    let (low, high) = (values().fold(0.0, f64::min), values().fold(0.0, f64::max));
    let air = (0.08 * (high - low)).max(LEAST_SPAN);
    (low - air, high + air)
}

/// Index of the frequency nearest to the cursor.
#[must_use]
pub fn nearest(band: &BandReport, frequency_hz: f64) -> usize {
    let distance = |index: &usize| (band.points[*index].frequency_hz - frequency_hz).abs();
    (0..band.points.len()).min_by(|a, b| distance(a).total_cmp(&distance(b))).unwrap_or(band.middle)
}

/// Volts and amperes at a place of a feed line, straight between computed places; `None` beyond its end or without a
/// line.
#[must_use]
pub fn along(profile: &[ProfilePoint], from_wire_m: f64) -> Option<ProfilePoint> {
    let (index, share) = between(profile, |p| p.from_wire_m, from_wire_m)?;
    let (a, b) = (profile[index], profile[index + 1]);
    let mix = |from: f64, to: f64| from + share * (to - from);
    Some(ProfilePoint { from_wire_m, peak_v: mix(a.peak_v, b.peak_v), peak_a: mix(a.peak_a, b.peak_a) })
}

/// Where a curve crosses the cursor; `None` beyond its ends.
#[must_use]
pub fn crossing(curve: &[PlotPoint], x: f64) -> Option<PlotPoint> {
    if let [only] = curve {
        return Some(*only);
    }
    let (index, share) = between(curve, |p| p.x, x)?;
    Some(PlotPoint::new(x, curve[index].y + share * (curve[index + 1].y - curve[index].y)))
}

/// The stretch of a rising list that holds a value: the index of its beginning, and how far along it the value lies.
fn between<T>(list: &[T], of: impl Fn(&T) -> f64, value: f64) -> Option<(usize, f64)> {
    // A cursor that was rounded on its way through the units still finds the ends.
    let rounding = 1e-9 * value.abs().max(1.0);
    let holds = |pair: &[T]| of(&pair[0]) - rounding <= value && value <= of(&pair[1]) + rounding;
    let index = list.windows(2).position(holds)?;
    let (low, high) = (of(&list[index]), of(&list[index + 1]));
    let share = if high > low { (value - low) / (high - low) } else { 0.0 };
    Some((index, share.clamp(0.0, 1.0)))
}

/// A row of the read-out: what it is, what that means, and the value of each feed.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// What it is.
    pub label: &'static str,
    /// What that means, in one sentence.
    pub sentence: &'static str,
    /// One text per feed.
    pub values: Vec<String>,
}

/// The read-out at a frequency.
#[must_use]
pub fn rows(point: &FrequencyReport) -> Vec<Row> {
    let row = |label, sentence, value: &dyn Fn(&FeedReport) -> String| Row {
        label,
        sentence,
        values: point.feeds.iter().map(value).collect(),
    };
    let set = |of: fn(Setting) -> String| move |f: &FeedReport| f.setting.map_or_else(|| "—".to_owned(), of);
    let used = |f: &FeedReport| match (f.setting, f.shortfall) {
        (Some(_), _) => "set".to_owned(),
        (None, Some(_)) => "no setting".to_owned(),
        (None, None) => "not used".to_owned(),
    };
    vec![
        row(
            "SWR at the feedpoint",
            "How the wire terminates the line that starts at it, on that line's nominal impedance.",
            &|f| units::swr(f.at_feedpoint.swr),
        ),
        row("SWR before the unit", "At the transmitter's socket with the matching unit left out.", &|f| {
            units::swr(f.before_unit.swr)
        }),
        row("SWR after the unit", "At the transmitter's socket as the matching unit is set.", &|f| {
            units::swr(f.at_transmitter.swr)
        }),
        row("loss", "Loss of all links together.", &|f| units::decibels(f.loss_db)),
        row("to the wire", "Watts that reach the wire at the set power.", &|f| units::watts(f.watts_to_wire)),
        row(
            "matching unit",
            "Whether the matching unit is needed at this frequency, and can be set for it.",
            &used,
        ),
        row("coil", "The matching unit's coil, in series.", &set(|s| units::henries(s.inductance_h))),
        row(
            "capacitor",
            "The matching unit's capacitor, across the line.",
            &set(|s| units::farads(s.capacitance_f)),
        ),
        row(
            "capacitor's side",
            "Which way round the matching unit stands: its capacitor on the wire's or on the transmitter's side.",
            &set(|s| side(s.sense).to_owned()),
        ),
    ]
}

fn side(sense: Sense) -> &'static str {
    match sense {
        Sense::CapacitorAtWire => "wire",
        Sense::CapacitorAtTransmitter => "transmitter",
    }
}

/// The read-out in words, for screen readers and the status line.
#[must_use]
pub fn sentence(point: &FrequencyReport, names: &[String]) -> String {
    let mut text =
        format!("{}: {}", units::megahertz(point.frequency_hz), units::impedance(point.feedpoint_ohm));
    for (index, (feed, name)) in point.feeds.iter().zip(names).enumerate() {
        text += &format!(
            "; feed {} {name}: SWR {} at the feedpoint, {} before and {} after the unit, {} to the wire",
            marks::letter(index),
            units::swr(feed.at_feedpoint.swr),
            units::swr(feed.before_unit.swr),
            units::swr(feed.at_transmitter.swr),
            units::watts(feed.watts_to_wire)
        );
        if let Some(setting) = feed.setting {
            text += &format!(
                ", coil {} and capacitor {} on the {}",
                units::henries(setting.inductance_h),
                units::farads(setting.capacitance_f),
                if setting.sense == Sense::CapacitorAtWire { "wire's side" } else { "transmitter's side" }
            );
        }
    }
    text
}
