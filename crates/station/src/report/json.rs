//! The report as one JSON object: keys with units, a format version, no `null`, no NaN; what has no value is absent.

use num_complex::Complex64;
use serde::Serialize;

use super::{
    BandReport, FeedReport, FrequencyReport, LinkReport, Place, Report, Seen, Sense, Setting, Weight,
};

/// Grows when a key changes its meaning.
const FORMAT: u32 = 1;

/// The report as one JSON object with indentation.
#[must_use]
pub fn json(report: &Report) -> String {
    let root = Root {
        format: FORMAT,
        model: report.model.name(),
        bands: report.bands.iter().map(|band| Band::new(report, band)).collect(),
        findings: report
            .findings
            .iter()
            .map(|f| Finding { weight: weight(f.weight), place: place(f.place), text: &f.text })
            .collect(),
    };
    serde_json::to_string_pretty(&root).expect("only strings and finite numbers are in it")
}

#[derive(Serialize)]
struct Root<'a> {
    format: u32,
    model: &'static str,
    bands: Vec<Band<'a>>,
    findings: Vec<Finding<'a>>,
}

#[derive(Serialize)]
struct Band<'a> {
    name: &'a str,
    low_hz: f64,
    high_hz: f64,
    feeds: Vec<Verdict<'a>>,
    frequencies: Vec<Frequency<'a>>,
}

#[derive(Serialize)]
struct Verdict<'a> {
    name: &'a str,
    verdict: &'static str,
    reason: &'a str,
    worst_frequency_hz: f64,
    covered_hz: &'a [(f64, f64)],
}

#[derive(Serialize)]
struct Frequency<'a> {
    frequency_hz: f64,
    r_ohm: f64,
    x_ohm: f64,
    sky_share: f64,
    earth_share: f64,
    burnt_share: f64,
    feeds: Vec<Feed<'a>>,
}

#[derive(Serialize)]
struct Feed<'a> {
    name: &'a str,
    at_feedpoint: SeenJson,
    before_matching_unit: SeenJson,
    after_matching_unit: SeenJson,
    #[serde(skip_serializing_if = "Option::is_none")]
    setting: Option<SettingJson>,
    links: Vec<Link<'a>>,
    loss_db: f64,
    watts_to_wire_w: f64,
    verdict: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    out_of_range_because: Option<String>,
}

#[derive(Serialize)]
struct SeenJson {
    r_ohm: f64,
    x_ohm: f64,
    reference_ohm: f64,
    /// Absent where it is infinite.
    #[serde(skip_serializing_if = "Option::is_none")]
    swr: Option<f64>,
}

#[derive(Serialize)]
struct SettingJson {
    capacitor: &'static str,
    inductance_h: f64,
    capacitance_f: f64,
}

#[derive(Serialize)]
struct Link<'a> {
    name: &'a str,
    loss_db: f64,
    watts_lost_w: f64,
    peak_v: f64,
    rms_a: f64,
    toward_transmitter: SeenJson,
}

#[derive(Serialize)]
struct Finding<'a> {
    weight: &'static str,
    place: String,
    text: &'a str,
}

impl<'a> Band<'a> {
    fn new(report: &'a Report, band: &'a BandReport) -> Self {
        let feeds = band.feeds.iter().zip(&report.feed_names).map(|(feed, name)| Verdict {
            name,
            verdict: feed.verdict.kind.words(),
            reason: &feed.verdict.reason,
            worst_frequency_hz: band.points[feed.verdict.worst].frequency_hz,
            covered_hz: &feed.verdict.covered_hz,
        });
        Self {
            name: &band.name,
            low_hz: band.low_hz,
            high_hz: band.high_hz,
            feeds: feeds.collect(),
            frequencies: band.points.iter().map(|point| Frequency::new(report, point)).collect(),
        }
    }
}

impl<'a> Frequency<'a> {
    fn new(report: &'a Report, point: &'a FrequencyReport) -> Self {
        let Complex64 { re, im } = point.feedpoint_ohm;
        let names = report.feed_names.iter().zip(&report.link_names);
        Self {
            frequency_hz: point.frequency_hz,
            r_ohm: re,
            x_ohm: im,
            sky_share: point.shares.sky,
            earth_share: point.shares.earth,
            burnt_share: point.shares.burnt,
            feeds: point
                .feeds
                .iter()
                .zip(names)
                .map(|(feed, (name, links))| Feed::new(feed, name, links))
                .collect(),
        }
    }
}

impl<'a> Feed<'a> {
    fn new(feed: &'a FeedReport, name: &'a str, links: &'a [String]) -> Self {
        Self {
            name,
            at_feedpoint: feed.at_feedpoint.into(),
            before_matching_unit: feed.before_unit.into(),
            after_matching_unit: feed.at_transmitter.into(),
            setting: feed.setting.map(SettingJson::from),
            links: feed.links.iter().zip(links).map(|(link, name)| Link::new(link, name)).collect(),
            loss_db: feed.loss_db,
            watts_to_wire_w: feed.watts_to_wire,
            verdict: feed.kind.words(),
            out_of_range_because: feed.shortfall.map(|error| error.to_string()),
        }
    }
}

impl<'a> Link<'a> {
    fn new(link: &LinkReport, name: &'a str) -> Self {
        let LinkReport { loss_db, watts_lost, peak_v, rms_a, toward_transmitter } = *link;
        let toward_transmitter = toward_transmitter.into();
        Self { name, loss_db, watts_lost_w: watts_lost, peak_v, rms_a, toward_transmitter }
    }
}

impl From<Seen> for SeenJson {
    fn from(seen: Seen) -> Self {
        Self {
            r_ohm: seen.z_ohm.re,
            x_ohm: seen.z_ohm.im,
            reference_ohm: seen.reference_ohm,
            swr: seen.swr.is_finite().then_some(seen.swr),
        }
    }
}

impl From<Setting> for SettingJson {
    fn from(setting: Setting) -> Self {
        let capacitor = match setting.sense {
            Sense::CapacitorAtWire => "at the wire's side",
            Sense::CapacitorAtTransmitter => "at the transmitter's side",
        };
        Self { capacitor, inductance_h: setting.inductance_h, capacitance_f: setting.capacitance_f }
    }
}

fn weight(weight: Weight) -> &'static str {
    match weight {
        Weight::Problem => "problem",
        Weight::Caution => "caution",
        Weight::Note => "note",
    }
}

fn place(place: Place) -> String {
    match place {
        Place::Plan => "plan".to_owned(),
        Place::Support(index) => format!("site.supports[{index}]"),
        Place::Wire(index) => format!("wires[{index}]"),
        Place::Feed(index) => format!("feeds[{index}]"),
        Place::Band(index) => format!("bands[{index}]"),
    }
}
