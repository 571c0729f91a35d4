//! The feed schedule: what is connected to what, from the transmitter to the wire, and what each part must stand.

use station::plan::{LineChoice, Link, Plan};
use station::report::Report;
use station::units::{self, Units};

use super::cut_list::line_name;
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
    plan.feeds
        .iter()
        .enumerate()
        .map(|(index, feed)| FeedSchedule {
            letter: feed_letter(index),
            name: printable(&feed.name),
            steps: (0..feed.links.len())
                .rev()
                .map(|link| step(&feed.links[link], index, link, report, units, feed.links.len()))
                .collect(),
        })
        .collect()
}

fn step(link: &Link, feed: usize, index: usize, report: &Report, units: Units, links: usize) -> Step {
    let (what, detail, rating_v) = match link {
        Link::Transformer(transformer) => {
            let ratio = units::short(transformer.impedance_ratio);
            ("transformer".to_owned(), format!("{ratio} : 1 in impedance, high side to the wire"), None)
        }
        Link::Line(piece) => {
            let rating = match &piece.line {
                LineChoice::Own(data) => data.rating_peak_v,
                LineChoice::Catalogue(_) => None,
            };
            (line_name(&piece.line), units.tape(piece.length_m), rating)
        }
        Link::MatchingUnit(unit) => (
            "matching unit".to_owned(),
            format!(
                "coil to {}, capacitor to {}",
                units::henries(unit.inductance_max_h),
                units::farads(unit.capacitance_max_f)
            ),
            unit.rating_peak_v,
        ),
    };
    let reports = || {
        report
            .bands
            .iter()
            .flat_map(|band| &band.points)
            .map(move |point| (point.frequency_hz, point.feeds[feed].links[index]))
    };
    Step {
        mark: link_mark(feed, links, index),
        what: printable(&what),
        detail,
        volts: Stress::highest(reports().map(|(f, link)| (f, link.peak_v)), rating_v, units::volts),
        amperes: Stress::highest(reports().map(|(f, link)| (f, link.rms_a)), None, units::amperes),
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
        match highest {
            None => {
                Self { value: "–".to_owned(), at: String::new(), rating: rating.map(text), exceeds: false }
            }
            Some((frequency_hz, value)) => Self {
                value: text(value),
                at: units::megahertz(frequency_hz),
                rating: rating.map(&text),
                exceeds: rating.is_some_and(|limit| value > limit),
            },
        }
    }
}
