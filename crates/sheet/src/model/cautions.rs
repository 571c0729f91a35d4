//! What can hurt, and what the evaluator found. The general cautions are common practice; local codes and licensed
//! practice decide.

use station::plan::Plan;
use station::report::{Finding, Place, Report, Weight};
use station::units;

use crate::fonts::printable;

/// One caution.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Caution {
    /// What it is about.
    pub head: String,
    /// What to do.
    pub text: String,
    /// It holds for every station.
    pub is_general: bool,
}

/// The findings of this plan that matter to the crew, then the general cautions.
#[must_use]
pub fn cautions(plan: &Plan, report: &Report) -> Vec<Caution> {
    // What holds for one band stands in the table of bands.
    let matters =
        |finding: &&Finding| finding.weight != Weight::Note && !matches!(finding.place, Place::Band(_));
    let found = report.findings.iter().filter(matters).map(|finding| {
        let head = if finding.weight == Weight::Problem { "This plan: problem" } else { "This plan" };
        Caution { head: head.to_owned(), text: printable(&finding.text), is_general: false }
    });
    found.chain(general(plan, report)).collect()
}

fn general(plan: &Plan, report: &Report) -> Vec<Caution> {
    let highest_v = report
        .bands
        .iter()
        .flat_map(|band| &band.points)
        .flat_map(|point| &point.feeds)
        .flat_map(|feed| &feed.links)
        .map(|link| link.peak_v)
        .filter(|v| v.is_finite())
        .fold(0.0, f64::max);
    let power = units::watts(plan.transmitter.power_w);
    let feed_volts = if highest_v > 0.0 {
        format!(" At {power} the feed reaches {} peak.", units::volts(highest_v))
    } else {
        String::new()
    };
    let caution = |head: &str, text: String| Caution { head: head.to_owned(), text, is_general: true };
    vec![
        caution(
            "Overhead power lines",
            "Nothing may be able to touch one, even falling, broken or blown aside. Every line is live until its \
             owner says otherwise."
                .to_owned(),
        ),
        caution("Falls", "Only trained, secured people climb, never alone; nobody stands below.".to_owned()),
        caution(
            "RF burns",
            format!(
                "Wire ends, open line and terminals burn: out of everyone's reach; transmitter off and secured before \
                 touching.{feed_volts}"
            ),
        ),
        caution(
            "RF exposure",
            "Have the distances of the national limits assessed for this power; keep people beyond them.".to_owned(),
        ),
        caution(
            "Lightning and earthing",
            "Before a storm disconnect the feed and earth it outside. Earthing and bonding: qualified people only."
                .to_owned(),
        ),
        caution(
            "Who decides",
            "Local codes and licensed practice. The figures are a model's: measure before full power.".to_owned(),
        ),
    ]
}
