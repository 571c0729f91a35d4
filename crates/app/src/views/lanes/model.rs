//! What the lanes say: which bands in which order, and every word and number of a lane.

use std::collections::BTreeSet;

use station::plan::BandRange;
use station::report::{BandFeed, BandReport, FeedReport};
use station::units;

use crate::snapshot::Snapshot;
use crate::views::marks;

/// The order of the lanes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Order {
    /// As the plan lists them.
    #[default]
    Planned,
    /// Lowest frequency first.
    Frequency,
    /// Best verdict of the chosen feed first, then most watts to the sky.
    BestFirst,
}

impl Order {
    /// All of them, in the order in which they are offered.
    pub const ALL: [Self; 3] = [Self::Planned, Self::Frequency, Self::BestFirst];

    /// The words on screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Planned => "as planned",
            Self::Frequency => "by frequency",
            Self::BestFirst => "best first",
        }
    }
}

/// One band as the lanes see it.
#[derive(Clone, Copy, Debug)]
pub struct Lane<'a> {
    /// Index of the band.
    pub band: usize,
    /// The band's name.
    pub name: &'a str,
    /// Lowest and highest frequency, Hz.
    pub edges_hz: (f64, f64),
    /// A list of channels, not a span.
    pub channels: bool,
    /// What was found out; `None` until the first answer.
    pub report: Option<&'a BandReport>,
}

/// The lanes in the plan's order.
#[must_use]
pub fn lanes<'a>(snapshot: &Snapshot<'a>) -> Vec<Lane<'a>> {
    if let Some(report) = snapshot.report {
        return report
            .bands
            .iter()
            .enumerate()
            .map(|(band, found)| Lane::of(snapshot, band, found))
            .collect();
    }
    let lane = |(band, planned): (usize, &'a station::plan::Band)| Lane {
        band,
        name: &planned.name,
        edges_hz: planned.range.edges_hz(),
        channels: is_list(snapshot, band),
        report: None,
    };
    snapshot.plan.bands.iter().enumerate().map(lane).collect()
}

/// Whether the plan lists channels there.
fn is_list(snapshot: &Snapshot<'_>, band: usize) -> bool {
    let planned = snapshot.plan.bands.get(band);
    planned.is_some_and(|b| matches!(b.range, BandRange::Channels { .. }))
}

/// Puts the lanes in order, pinned ones (by name) first. Equal ones keep the plan's order.
pub fn sort(lanes: &mut [Lane<'_>], order: Order, pinned: &BTreeSet<String>, feed: usize) {
    match order {
        Order::Planned => lanes.sort_by_key(|lane| lane.band),
        Order::Frequency => lanes.sort_by(|a, b| a.edges_hz.0.total_cmp(&b.edges_hz.0)),
        Order::BestFirst => lanes.sort_by(|a, b| {
            let key = |lane: &Lane<'_>| lane.report.and_then(|r| r.feeds.get(feed)).map(|f| f.verdict.kind);
            let watts = |lane: &Lane<'_>| lane.ends(feed).map_or(0.0, |ends| ends.sky_w);
            key(a)
                .is_none()
                .cmp(&key(b).is_none())
                .then(key(a).cmp(&key(b)))
                .then(watts(b).total_cmp(&watts(a)))
        }),
    }
    lanes.sort_by_key(|lane| !pinned.contains(lane.name));
}

/// Where the watts of a feed end in the middle of a band.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ends {
    /// Leave toward the sky, W.
    pub sky_w: f64,
    /// Heat the soil, W.
    pub earth_w: f64,
}

impl<'a> Lane<'a> {
    /// Where a feed's watts end, once there is a report.
    #[must_use]
    pub fn ends(&self, feed: usize) -> Option<Ends> {
        let watts = self.middle_feed(feed)?.watts_to_wire;
        let shares = self.report?.middle_point().shares;
        Some(Ends { sky_w: watts * shares.sky, earth_w: watts * shares.earth })
    }

    /// A band of a report.
    #[must_use]
    pub fn of(snapshot: &Snapshot<'_>, band: usize, report: &'a BandReport) -> Self {
        let edges_hz = (report.low_hz, report.high_hz);
        Self { band, name: &report.name, edges_hz, channels: is_list(snapshot, band), report: Some(report) }
    }

    /// A feed at the frequency that stands for the band.
    #[must_use]
    pub fn middle_feed(&self, feed: usize) -> Option<&'a FeedReport> {
        self.report?.middle_point().feeds.get(feed)
    }

    /// A feed over the whole band.
    #[must_use]
    pub fn band_feed(&self, feed: usize) -> Option<&'a BandFeed> {
        self.report?.feeds.get(feed)
    }

    /// "7.000–7.200 MHz", "5 channels, 4.125–12.350 MHz".
    #[must_use]
    pub fn frequencies(&self) -> String {
        let range = units::megahertz_range(self.edges_hz.0, self.edges_hz.1);
        match (self.channels, self.report.map(|r| r.points.len())) {
            (true, Some(count)) if count > 1 => format!("{count} ch, {range}"),
            _ => format!("{range} MHz"),
        }
    }

    /// Whether any frequency of the band sets a matching unit of this feed.
    #[must_use]
    pub fn uses_unit(&self, feed: usize) -> bool {
        let set = |f: &FeedReport| f.setting.is_some();
        self.report.is_some_and(|r| r.points.iter().any(|p| p.feeds.get(feed).is_some_and(set)))
    }

    /// How much of the band a feed covers: "all 200 kHz", "120 of 200 kHz", "3 of 5 channels", "none of 200 kHz".
    #[must_use]
    pub fn covered(&self, feed: usize) -> String {
        let Some((report, found)) = self.report.zip(self.band_feed(feed)) else {
            return String::new();
        };
        let ranges = &found.verdict.covered_hz;
        let width_hz = self.edges_hz.1 - self.edges_hz.0;
        if self.channels || width_hz < 1.0 {
            let inside = |f: f64| ranges.iter().any(|&(low, high)| f > low - 1.0 && f < high + 1.0);
            let working = report.points.iter().filter(|p| inside(p.frequency_hz)).count();
            return share(working == report.points.len(), working == 0, &working.to_string(), &{
                let count = report.points.len();
                if count == 1 { "1 channel".to_owned() } else { format!("{count} channels") }
            });
        }
        let covered_hz: f64 = ranges.iter().map(|(low, high)| high - low).sum();
        let number = units::kilohertz(covered_hz);
        let number = number.trim_end_matches(" kHz");
        // Less than half a kilohertz cannot be read off the lane.
        share(covered_hz > width_hz - 500.0, covered_hz < 500.0, number, &units::kilohertz(width_hz))
    }

    /// The covered parts of a band that is covered in part: "7.000–7.120 MHz"; empty otherwise.
    #[must_use]
    pub fn covered_parts(&self, feed: usize) -> String {
        let Some(found) = self.band_feed(feed) else {
            return String::new();
        };
        let parts: Vec<String> =
            found.verdict.covered_hz.iter().map(|&(low, high)| units::megahertz_range(low, high)).collect();
        if parts.is_empty() || self.covered(feed).starts_with("all") {
            return String::new();
        }
        format!("{} MHz", parts.join(", "))
    }

    /// Everything about one feed on this band, in one line.
    #[must_use]
    pub fn feed_sentence(&self, feed: usize, feed_name: &str) -> String {
        let Some((at, found)) = self.middle_feed(feed).zip(self.band_feed(feed)) else {
            return String::new();
        };
        let mut text =
            format!("feed {} {feed_name}: {}, {}", marks::letter(feed), found.verdict.kind.words(), {
                let parts = self.covered_parts(feed);
                if parts.is_empty() {
                    self.covered(feed)
                } else {
                    format!("{} ({parts})", self.covered(feed))
                }
            });
        if !found.verdict.reason.is_empty() {
            text += &format!(", {}", found.verdict.reason);
        }
        let middle = self.report.map_or(0.0, |r| r.middle_point().frequency_hz);
        text += &format!("; at {} SWR {}", units::megahertz(middle), units::swr(at.before_unit.swr));
        if at.setting.is_some() {
            text += &format!(" before and {} after the matching unit", units::swr(at.at_transmitter.swr));
        }
        text += &format!(" and {} to the wire", units::watts(at.watts_to_wire));
        match self.ends(feed) {
            Some(ends) if ends.earth_w >= 0.5 => {
                text + &format!(
                    ", {} of them to the sky and {} into the earth",
                    units::watts(ends.sky_w),
                    units::watts(ends.earth_w)
                )
            }
            _ => text,
        }
    }

    /// The whole lane in words, for screen readers.
    #[must_use]
    pub fn value(&self, feed_names: &[String]) -> String {
        let Some(report) = self.report else {
            return "being worked out".to_owned();
        };
        let middle = report.middle_point();
        let mut text = format!(
            "{}; {} at {}",
            self.frequencies(),
            units::impedance(middle.feedpoint_ohm),
            units::megahertz(middle.frequency_hz)
        );
        for (feed, name) in feed_names.iter().enumerate() {
            text += "; ";
            text += &self.feed_sentence(feed, name);
        }
        text
    }
}

fn share(all: bool, none: bool, part: &str, whole: &str) -> String {
    if all {
        format!("all {whole}")
    } else if none {
        format!("none of {whole}")
    } else {
        format!("{part} of {whole}")
    }
}
