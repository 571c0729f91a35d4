//! The feed schedule: what is connected to what, from the transmitter to the wire, and what each part must stand.

use station::plan::{Link, Plan};
use station::report::Report;
use station::units::{self, Units};

use super::ratings::{line_name, rating_peak_v};
use super::{feed_letter, link_mark};
use crate::fonts::printable;

/// One feed.
#[derive(Clone, Debug, PartialEq)]
pub struct FeedSchedule {
    /// Its letter.
    pub letter: String,
    /// Its name.
    pub name: String,
    /// Links from the transmitter to the wire.
    pub steps: Vec<Step>,
}

/// One link.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// Its mark, for instance "A1".
    pub mark: String,
    /// What it is.
    pub what: String,
    /// Its figures.
    pub detail: String,
    /// The highest peak voltage over all bands.
    pub volts: Stress,
    /// The highest RMS current over all bands.
    pub amperes: Stress,
}

/// What a part must stand.
#[derive(Clone, Debug, PartialEq)]
pub struct Stress {
    /// The highest value.
    pub value: String,
    /// Where it occurs.
    pub at: String,
    /// What the part is rated for, where that is known.
    pub rating: Option<String>,
    /// More than the rating.
    pub exceeds: bool,
}

/// The schedules of all feeds.
pub(super) fn schedules(plan: &Plan, report: &Report, units: Units) -> Vec<FeedSchedule> {
    let schedule = |(index, feed): (usize, &station::plan::Feed)| FeedSchedule {
        letter: feed_letter(index),
        name: printable(&feed.name),
        steps: (0..feed.links.len()).rev().map(|link| step(plan, report, (index, link), units)).collect(),
    };
    plan.feeds.iter().enumerate().map(schedule).collect()
}

fn step(plan: &Plan, report: &Report, (feed, index): (usize, usize), units: Units) -> Step {
    let links = &plan.feeds[feed].links;
    let (what, detail) = match &links[index] {
        Link::Transformer(transformer) => (
            "transformer".to_owned(),
            format!("{} : 1, high side to the wire", units::short(transformer.impedance_ratio)),
        ),
        Link::Line(piece) => (format!("{},", line_name(&piece.line)), units.tape(piece.length_m)),
        Link::MatchingUnit(unit) => (
            "matching unit".to_owned(),
            format!(
                "to {} and {}",
                units::henries(unit.inductance_max_h),
                units::farads(unit.capacitance_max_f)
            ),
        ),
    };
    let points = || report.bands.iter().flat_map(|band| &band.points);
    let link = |point: &station::report::FrequencyReport| point.feeds[feed].links[index];
    let volts = points().map(|point| (point.frequency_hz, link(point).peak_v));
    let amperes = points().map(|point| (point.frequency_hz, link(point).rms_a));
    Step {
        mark: link_mark(feed, links.len(), index),
        what: printable(&what),
        detail,
        volts: Stress::highest(volts, rating_peak_v(&links[index]), units::volts),
        amperes: Stress::highest(amperes, None, units::amperes),
    }
}

impl Stress {
    /// The highest of values over frequency.
    fn highest(
        values: impl Iterator<Item = (f64, f64)>,
        rating: Option<f64>,
        text: impl Fn(f64) -> String,
    ) -> Self {
        let highest = values.filter(|(_, value)| value.is_finite()).max_by(|a, b| a.1.total_cmp(&b.1));
        let rated = rating.map(&text);
        match highest {
            None => Self { value: "–".to_owned(), at: String::new(), rating: rated, exceeds: false },
            Some((frequency_hz, value)) => Self {
                value: text(value),
                at: units::megahertz(frequency_hz),
                rating: rated,
                exceeds: rating.is_some_and(|limit| value > limit),
            },
        }
    }
}
