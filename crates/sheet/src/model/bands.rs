//! What each band does on each feed.

use station::plan::{BandRange, Plan};
use station::report::{BandReport, FeedReport, LinkReport, Report, Sense, VerdictKind};
use station::units;

use super::ratings::rating_peak_v;
use super::{feed_letter, link_mark};
use crate::fonts::printable;

/// One band. Frequencies without a unit are in MHz.
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
    /// SWR at the transmitter with the matching unit; empty where none is used.
    pub swr_after: String,
    /// How the matching unit is set; empty where none is used.
    pub setting: String,
    /// Loss of the whole feed.
    pub loss: String,
    /// Loss of each link from the transmitter to the wire, with the link's mark; empty where there is one link only.
    pub losses: String,
    /// Watts that reach the wire.
    pub watts: String,
    /// The verdict.
    pub kind: VerdictKind,
    /// What decided it at the worst frequency, and which part of the band works where that is not all or none.
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
                at: plain_megahertz(middle.frequency_hz),
                feedpoint: units::impedance(middle.feedpoint_ohm),
                feeds: (0..plan.feeds.len()).map(|feed| entry(plan, reported, feed)).collect(),
                curves: (0..plan.feeds.len()).map(|feed| curve(reported, feed, is_channels)).collect(),
            }
        })
        .collect()
}

fn range(band: &BandReport, is_channels: bool) -> String {
    let range = units::megahertz_range(band.low_hz, band.high_hz);
    match (is_channels, band.points.len()) {
        (true, 1) => format!("channel {range}"),
        (true, count) => format!("{count} ch. {range}"),
        (false, _) => range,
    }
}

fn plain_megahertz(frequency_hz: f64) -> String {
    units::megahertz_range(frequency_hz, frequency_hz)
}

fn entry(plan: &Plan, band: &BandReport, feed: usize) -> FeedEntry {
    let middle = &band.middle_point().feeds[feed];
    let is_set = middle.setting.is_some();
    FeedEntry {
        letter: feed_letter(feed),
        swr_feedpoint: units::swr(middle.at_feedpoint.swr),
        swr_before: units::swr(middle.before_unit.swr),
        swr_after: if is_set { units::swr(middle.at_transmitter.swr) } else { String::new() },
        setting: setting(middle),
        loss: units::decibels(middle.loss_db),
        losses: losses(&middle.links, feed),
        watts: units::watts(middle.watts_to_wire),
        kind: band.feeds[feed].verdict.kind,
        reason: reason(plan, band, feed),
    }
}

/// The window's reason is a sentence; paper has room for the number that decided, and marks say which part it is.
fn reason(plan: &Plan, band: &BandReport, feed: usize) -> String {
    let verdict = &band.feeds[feed].verdict;
    let point = &band.points[verdict.worst.min(band.points.len() - 1)];
    let worst = &point.feeds[feed];
    let decided = match verdict.kind {
        VerdictKind::Direct => format!("SWR {}", units::swr(worst.at_transmitter.swr)),
        VerdictKind::WithMatchingUnit | VerdictKind::TooLossy => {
            format!("{} to the wire", units::watts(worst.watts_to_wire))
        }
        VerdictKind::Overstressed => overstress(plan, &worst.links, feed),
        VerdictKind::OutOfRange => format!("SWR {}", units::swr(worst.at_transmitter.swr)),
    };
    let mut words = decided;
    if band.points.len() > 1 {
        words = format!("worst at {}: {words}", plain_megahertz(point.frequency_hz));
    }
    if !verdict.kind.works() && !verdict.covered_hz.is_empty() {
        let parts =
            verdict.covered_hz.iter().map(|&(low_hz, high_hz)| units::megahertz_range(low_hz, high_hz));
        words = format!("{words}; works {}", parts.collect::<Vec<_>>().join(", "));
    }
    words
}

/// The link that exceeds its rating the most.
fn overstress(plan: &Plan, links: &[LinkReport], feed: usize) -> String {
    let planned = &plan.feeds[feed].links;
    let rated = links.iter().enumerate().filter_map(|(index, link)| {
        rating_peak_v(&planned[index]).map(|rating_v| (index, link.peak_v, rating_v))
    });
    match rated.max_by(|a, b| (a.1 / a.2).total_cmp(&(b.1 / b.2))) {
        Some((index, peak_v, rating_v)) => {
            let mark = link_mark(feed, links.len(), index);
            format!("{mark} {}, rated {}", units::volts(peak_v), units::volts(rating_v))
        }
        None => "a part exceeds its rating".to_owned(),
    }
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

fn losses(links: &[LinkReport], feed: usize) -> String {
    if links.len() < 2 {
        return String::new();
    }
    let part = |(from_wire, link): (usize, &LinkReport)| {
        format!("{}\u{a0}{}", link_mark(feed, links.len(), from_wire), units::fixed(link.loss_db, 2))
    };
    links.iter().enumerate().rev().map(part).collect::<Vec<_>>().join("  ")
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
