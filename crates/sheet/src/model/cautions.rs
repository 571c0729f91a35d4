//! What can hurt, and what the evaluator found. The general cautions are common practice; local codes and licensed
//! practice decide.

use station::plan::Plan;
use station::report::{Report, Weight};
use station::units;

use crate::fonts::printable;

/// One caution.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Caution {
    /// What it is about.
    pub head: String,
    /// What to do.
    pub text: String,
}

/// The findings of this plan that matter to the crew, then the general cautions.
#[must_use]
pub fn cautions(plan: &Plan, report: &Report) -> Vec<Caution> {
    let found = report.findings.iter().filter(|finding| finding.weight != Weight::Note).map(|finding| {
        let head = if finding.weight == Weight::Problem { "This plan: problem" } else { "This plan" };
        Caution { head: head.to_owned(), text: printable(&finding.text) }
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
        format!(" Parts of the feed reach {} peak at {power}.", units::volts(highest_v))
    } else {
        String::new()
    };
    let caution = |head: &str, text: String| Caution { head: head.to_owned(), text };
    vec![
        caution(
            "Overhead power lines",
            "Never put up wire, rope or mast where any of it could touch a power line, also when it falls, breaks or \
             is blown aside. Treat every overhead line as live; ask its owner."
                .to_owned(),
        ),
        caution(
            "Falls",
            "Climb only if trained, with fall arrest and a second person. Nobody below. Not in wind, wet or \
             lightning."
                .to_owned(),
        ),
        caution(
            "RF burns",
            format!(
                "Wire ends, open line and the unit's terminals burn. Keep them out of reach of people and animals; \
                 switch off and secure the transmitter before touching.{feed_volts}"
            ),
        ),
        caution(
            "RF exposure",
            "Keep people at the distances that the national limits require; have them assessed for this power and \
             duty before going on air."
                .to_owned(),
        ),
        caution(
            "Lightning and earthing",
            "Disconnect and earth the feed outside when storms are near. Earthing and bonding are work for qualified \
             people."
                .to_owned(),
        ),
        caution(
            "Who decides",
            "Local codes and licensed practice decide. The figures come from a model: measure before full power."
                .to_owned(),
        ),
    ]
}
