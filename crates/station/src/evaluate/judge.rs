//! Verdicts: one feed on one band, judged at its worst frequency, with the reason and the part that works.

use super::chain::{Chain, ChainLink};
use super::grid::GridKind;
use crate::plan::Transmitter;
use crate::report::{FeedReport, FrequencyReport, LinkReport, Verdict, VerdictKind};
use crate::units;

/// Judges one feed on one band. `points` is not empty.
pub(super) fn judge(
    (points, kind): (&[FrequencyReport], GridKind),
    feed: usize,
    chain: &Chain,
    transmitter: &Transmitter,
) -> Verdict {
    let worst = (0..points.len())
        .max_by(|&a, &b| badness(&points[a].feeds[feed]).total_cmp(&badness(&points[b].feeds[feed])))
        .unwrap_or(0);
    let at = &points[worst].feeds[feed];
    Verdict {
        kind: at.kind,
        reason: reason(at, points[worst].frequency_hz, chain, transmitter),
        worst,
        covered_hz: covered(points, kind, feed),
    }
}

/// Grows with the verdict first, then with how far it is gone within the verdict.
fn badness(feed: &FeedReport) -> f64 {
    let within = match feed.kind {
        VerdictKind::Direct | VerdictKind::OutOfRange => squeeze(feed.at_transmitter.swr),
        VerdictKind::WithMatchingUnit | VerdictKind::TooLossy => squeeze(feed.loss_db),
        VerdictKind::Overstressed => squeeze(feed.links.iter().map(|link| link.peak_v).fold(0.0, f64::max)),
    };
    f64::from(feed.kind as u8) + within
}

/// Maps 0…∞ to 0…1.
fn squeeze(value: f64) -> f64 {
    if value.is_finite() { value / (1.0 + value) } else { 1.0 }
}

fn reason(feed: &FeedReport, frequency_hz: f64, chain: &Chain, transmitter: &Transmitter) -> String {
    let at = units::megahertz(frequency_hz);
    let (to_wire, set) = (units::watts(feed.watts_to_wire), units::watts(transmitter.power_w));
    match feed.kind {
        VerdictKind::Direct => {
            format!(
                "SWR at most {} (at {at}); {to_wire} of {set} reach the wire",
                units::swr(feed.at_transmitter.swr)
            )
        }
        VerdictKind::WithMatchingUnit => format!(
            "SWR {} before the unit; {to_wire} of {set} reach the wire (at {at})",
            units::swr(feed.before_unit.swr)
        ),
        VerdictKind::TooLossy => {
            let (name, loss_db) = lossiest(feed, chain);
            format!("{to_wire} of {set} reach the wire; {name} burns {} (at {at})", units::decibels(loss_db))
        }
        VerdictKind::Overstressed => match overstress(&feed.links, chain) {
            Some((name, peak_v, rating_v)) => format!(
                "{name}: {} peak where {} is rated (at {at})",
                units::volts(peak_v),
                units::volts(rating_v)
            ),
            None => format!("a part exceeds its rating (at {at})"),
        },
        VerdictKind::OutOfRange => {
            let swr = format!(
                "SWR {} over the limit of {} (at {at})",
                units::swr(feed.at_transmitter.swr),
                units::swr(transmitter.swr_limit)
            );
            match (feed.shortfall, chain.unit()) {
                (Some(error), _) => format!("{swr}: {error}"),
                (None, Some(_)) => swr,
                (None, None) => format!("{swr}, no matching unit"),
            }
        }
    }
}

fn lossiest<'a>(feed: &FeedReport, chain: &'a Chain) -> (&'a str, f64) {
    let worst = feed.links.iter().enumerate().max_by(|a, b| a.1.loss_db.total_cmp(&b.1.loss_db));
    worst.map_or(("the feed", 0.0), |(index, link)| (chain.names[index].as_str(), link.loss_db))
}

/// The link that exceeds its rating the most: its name, its peak volts and its rating.
pub(super) fn overstress<'a>(links: &[LinkReport], chain: &'a Chain) -> Option<(&'a str, f64, f64)> {
    let rated = chain.links.iter().zip(links).enumerate();
    let over = rated.filter_map(|(index, (link, report))| match link {
        ChainLink::Line { rating_peak_v, .. } | ChainLink::Unit { rating_peak_v, .. } => {
            rating_peak_v.map(|rating| (index, report.peak_v, rating))
        }
        ChainLink::Transformer { .. } => None,
    });
    over.max_by(|a, b| (a.1 / a.2).total_cmp(&(b.1 / b.2)))
        .filter(|(_, peak_v, rating)| peak_v > rating)
        .map(|(index, peak_v, rating)| (chain.names[index].as_str(), peak_v, rating))
}

/// Runs of neighbouring frequencies that work; channels stand for themselves.
fn covered(points: &[FrequencyReport], kind: GridKind, feed: usize) -> Vec<(f64, f64)> {
    let mut runs: Vec<(f64, f64)> = Vec::new();
    let mut open = false;
    for point in points {
        let works = point.feeds[feed].kind.works();
        match runs.last_mut() {
            Some(run) if works && open && kind == GridKind::Continuous => run.1 = point.frequency_hz,
            _ if works => runs.push((point.frequency_hz, point.frequency_hz)),
            _ => {}
        }
        open = works;
    }
    runs
}
