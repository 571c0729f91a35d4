//! The report as aligned columns.

use std::fmt::Write as _;

use station::plan::Plan;
use station::report::{BandReport, FrequencyReport, Report, Weight};
use station::units;

/// Column heads: what is printed for each feed at the middle of each band.
const HEADS: [&str; 9] = [
    "band",
    "MHz",
    "R + jX at feedpoint, Ω",
    "feed",
    "SWR at wire",
    "before unit",
    "after",
    "loss",
    "W to wire",
];

/// The whole text.
#[must_use]
pub fn text(plan: &Plan, report: &Report) -> String {
    let mut out = String::new();
    let _ = writeln!(out, "{}", plan.name);
    if !plan.purpose.is_empty() {
        let _ = writeln!(out, "{}", plan.purpose);
    }
    let transmitter = &plan.transmitter;
    let _ = writeln!(
        out,
        "Transmitter {}, {} Ω, SWR up to {}. Model: {}.\n",
        units::watts(transmitter.power_w),
        units::short(transmitter.resistance_ohm),
        units::swr(transmitter.swr_limit),
        report.model.name(),
    );
    let mut rows = vec![HEADS.map(str::to_owned).to_vec()];
    rows[0].push("verdict".to_owned());
    for band in &report.bands {
        rows.extend(rows_of(report, band));
    }
    align(&mut out, &rows);
    out.push_str("\nOne row per feed: impedance, SWR, loss and watts at the frequency shown, the verdict for the band's worst.\n");
    findings(&mut out, report);
    out
}

/// One row per point that stands for something: each channel of a list, else the middle of the band.
fn rows_of(report: &Report, band: &BandReport) -> Vec<Vec<String>> {
    let points: Vec<&FrequencyReport> =
        if is_list(band) { band.points.iter().collect() } else { vec![band.middle_point()] };
    let mut rows = Vec::new();
    for (place, point) in points.iter().enumerate() {
        for (feed, seen) in point.feeds.iter().enumerate() {
            let is_first = feed == 0;
            let lead = |text: String| if is_first { text } else { String::new() };
            let verdict = match band.feeds.get(feed) {
                Some(whole) if place == 0 => {
                    format!("{}: {}", whole.verdict.kind.words(), whole.verdict.reason)
                }
                _ => seen.kind.words().to_owned(),
            };
            rows.push(vec![
                if is_first && place == 0 { band.name.clone() } else { String::new() },
                lead(units::fixed(point.frequency_hz / 1e6, 3)),
                lead(units::impedance(point.feedpoint_ohm).trim_end_matches(" Ω").to_owned()),
                report.feed_names.get(feed).cloned().unwrap_or_default(),
                units::swr(seen.at_feedpoint.swr),
                units::swr(seen.before_unit.swr),
                units::swr(seen.at_transmitter.swr),
                units::decibels(seen.loss_db),
                units::watts(seen.watts_to_wire),
                verdict,
            ]);
        }
    }
    rows
}

/// Channels have no frequencies between them worth a curve: so few points are a list.
fn is_list(band: &BandReport) -> bool {
    band.points.len() <= 16
}

/// Numbers right, words left.
fn align(out: &mut String, rows: &[Vec<String>]) {
    let columns = rows.iter().map(Vec::len).max().unwrap_or(0);
    let width = |column: usize| {
        rows.iter().filter_map(|row| row.get(column)).map(|cell| cell.chars().count()).max().unwrap_or(0)
    };
    let widths: Vec<usize> = (0..columns).map(width).collect();
    for row in rows {
        let mut line = String::new();
        for (column, cell) in row.iter().enumerate() {
            let pad = " ".repeat(widths[column] - cell.chars().count());
            let is_words = matches!(column, 0 | 3 | 9);
            let (before, after) = if is_words { ("", pad.as_str()) } else { (pad.as_str(), "") };
            let _ = write!(line, "{before}{cell}{after}  ");
        }
        out.push_str(line.trim_end());
        out.push('\n');
    }
}

fn findings(out: &mut String, report: &Report) {
    if report.findings.is_empty() {
        return;
    }
    out.push('\n');
    for finding in &report.findings {
        let weight = match finding.weight {
            Weight::Problem => "problem",
            Weight::Caution => "caution",
            Weight::Note => "note",
        };
        let _ = writeln!(out, "{weight}: {}", finding.text);
    }
}
