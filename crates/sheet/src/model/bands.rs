//! What each band does on each feed.

use station::plan::{BandRange, Plan};
use station::report::{BandReport, FeedReport, Report, Sense, VerdictKind};
use station::units;

use super::{feed_letter, link_mark};
use crate::fonts::printable;

/// The top of the small curves: standing-wave ratios above it are of no use to anyone.
pub const SWR_TOP: f64 = 10.0;

/// One band.
#[derive(Clone, Debug, PartialEq)]
pub struct BandEntry {
    /// Its name.
    pub name: String,
    /// What it covers.
    pub range: String,
    /// The frequency that the figures hold for.
    pub at: String,
    /// Impedance at the feedpoint.
    pub feedpoint: String,
    /// One entry per feed.
    pub feeds: Vec<FeedEntry>,
    /// SWR at the transmitter without the matching unit, one per feed.
    pub curves: Vec<Curve>,
}

/// One feed on a band.
#[derive(Clone, Debug, PartialEq)]
pub struct FeedEntry {
    /// The feed's letter.
    pub letter: String,
    /// SWR at the feedpoint.
    pub swr_feedpoint: String,
    /// SWR at the transmitter without the matching unit.
    pub swr_before: String,
    /// SWR at the transmitter with the matching unit.
    pub swr_after: String,
    /// How the matching unit is set; empty without one.
    pub setting: String,
    /// Loss of the whole feed.
    pub loss: String,
    /// Loss of each link from the transmitter to the wire, with the link's mark.
    pub losses: String,
    /// Watts that reach the wire.
    pub watts: String,
    /// The verdict.
    pub kind: VerdictKind,
    /// Its reason, and which part of the band works where that is not all or none.
    pub reason: String,
}

/// SWR over a band.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// Place in the band from 0 to 1, and SWR.
    pub points: Vec<(f64, f64)>,
    /// Single channels: dots, no line between them.
    pub is_channels: bool,
}

/// All bands.
pub(super) fn entries(plan: &Plan, report: &Report) -> Vec<BandEntry> {
    plan.bands
        .iter()
        .zip(&report.bands)
        .map(|(band, reported)| {
            let middle = reported.middle_point();
            let is_channels = matches!(band.range, BandRange::Channels { .. });
            BandEntry {
                name: printable(&reported.name),
                range: range(reported, is_channels),
                at: units::megahertz(middle.frequency_hz),
                feedpoint: units::impedance(middle.feedpoint_ohm),
                feeds: (0..plan.feeds.len()).map(|feed| entry(reported, feed)).collect(),
                curves: (0..plan.feeds.len()).map(|feed| curve(reported, feed, is_channels)).collect(),
            }
        })
        .collect()
}

fn range(band: &BandReport, is_channels: bool) -> String {
    let (low, high) = (units::fixed(band.low_hz / 1e6, 3), units::megahertz(band.high_hz));
    match (is_channels, band.points.len()) {
        (true, 1) => format!("channel {high}"),
        (true, count) => format!("{count} channels {low}–{high}"),
        (false, _) => format!("{low}–{high}"),
    }
}

fn entry(band: &BandReport, feed: usize) -> FeedEntry {
    let middle = &band.middle_point().feeds[feed];
    let verdict = &band.feeds[feed].verdict;
    let mut reason = verdict.reason.clone();
    if !verdict.kind.works() && !verdict.covered_hz.is_empty() {
        let parts: Vec<String> = verdict.covered_hz.iter().map(|&part| covered(part)).collect();
        reason = format!("{reason}; works {}", parts.join(", "));
    }
    FeedEntry {
        letter: feed_letter(feed),
        swr_feedpoint: units::swr(middle.at_feedpoint.swr),
        swr_before: units::swr(middle.before_unit.swr),
        swr_after: units::swr(middle.at_transmitter.swr),
        setting: setting(middle),
        loss: units::decibels(middle.loss_db),
        losses: losses(middle, feed),
        watts: units::watts(middle.watts_to_wire),
        kind: verdict.kind,
        reason: printable(&reason),
    }
}

fn covered((low_hz, high_hz): (f64, f64)) -> String {
    let (low, high) = (units::fixed(low_hz / 1e6, 3), units::megahertz(high_hz));
    if high_hz > low_hz { format!("{low}–{high}") } else { high }
}

fn setting(feed: &FeedReport) -> String {
    feed.setting.map_or_else(String::new, |setting| {
        let side = match setting.sense {
            Sense::CapacitorAtWire => "at wire",
            Sense::CapacitorAtTransmitter => "at transmitter",
        };
        format!("{}, {} {side}", units::henries(setting.inductance_h), units::farads(setting.capacitance_f))
    })
}

fn losses(report: &FeedReport, feed: usize) -> String {
    let links = report.links.len();
    let part = |(from_wire, link): (usize, &station::report::LinkReport)| {
        format!("{}\u{a0}{}", link_mark(feed, links, from_wire), units::fixed(link.loss_db, 2))
    };
    report.links.iter().enumerate().rev().map(part).collect::<Vec<_>>().join("  ")
}

fn curve(band: &BandReport, feed: usize, is_channels: bool) -> Curve {
    let width_hz = band.high_hz - band.low_hz;
    let place = |f: f64| if width_hz > 0.0 { (f - band.low_hz) / width_hz } else { 0.5 };
    let points = band
        .points
        .iter()
        .map(|point| (place(point.frequency_hz), point.feeds[feed].before_unit.swr))
        .collect();
    Curve { points, is_channels }
}
