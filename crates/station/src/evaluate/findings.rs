//! Findings: what the user should know before building, in one sentence each, most important first.

use crate::hang::Hung;
use crate::plan::{Electrode, Link, Plan, WireEnd};
use crate::report::{BandReport, Finding, Model, Place, Weight};
use crate::units;

/// Below this height someone standing can reach the wire (common practice: 2.5 m).
const REACH_M: f64 = 2.5;

pub(super) fn findings(plan: &Plan, hung: &Hung, bands: &[BandReport], model: Model) -> Vec<Finding> {
    let mut found = Vec::new();
    unworkable_bands(plan, bands, &mut found);
    short_lines(plan, hung, &mut found);
    within_reach(hung, &mut found);
    end_voltage(plan, bands, &mut found);
    if model == Model::Sketch {
        limits_of_the_sketch(hung, &mut found);
    }
    earth_connections(plan, hung, &mut found);
    found.sort_by_key(|finding| finding.weight);
    found
}

fn unworkable_bands(plan: &Plan, bands: &[BandReport], found: &mut Vec<Finding>) {
    for (index, band) in bands.iter().enumerate() {
        if band.feeds.iter().all(|feed| feed.verdict.covered_hz.is_empty()) {
            let best = band.feeds.iter().zip(&plan.feeds).min_by_key(|(feed, _)| feed.verdict.kind);
            let why = best.map_or_else(String::new, |(feed, plan)| {
                format!("; nearest is {}: {}, {}", plan.name, feed.verdict.kind.words(), feed.verdict.reason)
            });
            let text = format!("No feed works anywhere on {}{why}.", band.name);
            found.push(Finding { weight: Weight::Problem, place: Place::Band(index), text });
        }
    }
}

/// A line cannot be shorter than the straight way from the feedpoint to the entrance.
fn short_lines(plan: &Plan, hung: &Hung, found: &mut Vec<Finding>) {
    let needed_m = hung.feedpoint.at.distance_m(plan.site.entrance);
    for (index, feed) in plan.feeds.iter().enumerate() {
        let lines = feed.links.iter().filter_map(|link| match link {
            Link::Line(piece) => Some(piece.length_m),
            _ => None,
        });
        let has_m: f64 = lines.sum();
        if has_m > 0.0 && has_m < needed_m {
            let text = format!(
                "The line of {} is {has_m:.1} m long, but feedpoint and entrance are {needed_m:.1} m apart.",
                feed.name
            );
            found.push(Finding { weight: Weight::Problem, place: Place::Feed(index), text });
        }
    }
}

fn within_reach(hung: &Hung, found: &mut Vec<Finding>) {
    for (index, wire) in hung.wires.iter().enumerate() {
        let lowest_m = wire.vertices.iter().map(|v| v.at.z_m).fold(f64::INFINITY, f64::min);
        if lowest_m < REACH_M {
            let text = format!(
                "The wire comes down to {lowest_m:.1} m: people and animals can reach it, and RF burns. Keep it out of reach."
            );
            found.push(Finding { weight: Weight::Caution, place: Place::Wire(index), text });
        }
    }
}

/// The highest voltage on the wire over all bands and feeds, at the set power.
fn end_voltage(plan: &Plan, bands: &[BandReport], found: &mut Vec<Finding>) {
    let highest = bands
        .iter()
        .map(|band| {
            let potentials = band.wave.wires.iter().flat_map(|wire| &wire.potential_v);
            let at_1_w = potentials.map(|v| v.norm()).fold(0.0, f64::max);
            let watts = band.middle_point().feeds.iter().map(|feed| feed.watts_to_wire).fold(0.0, f64::max);
            (at_1_w * watts.sqrt(), band)
        })
        .max_by(|a, b| a.0.total_cmp(&b.0));
    if let Some((peak_v, band)) = highest {
        let text = format!(
            "Up to {} peak stands on the wire at {} ({}): insulators must stand it and nobody may touch it.",
            units::volts(peak_v),
            units::watts(plan.transmitter.power_w),
            band.name
        );
        found.push(Finding { weight: Weight::Caution, place: Place::Wire(plan.feedpoint.wire), text });
    }
}

fn limits_of_the_sketch(hung: &Hung, found: &mut Vec<Finding>) {
    let fed = hung.feedpoint.wire;
    let mut note = |weight, place, text: &str| found.push(Finding { weight, place, text: text.to_owned() });
    if hung.wires[fed].vertices.len() > 2 {
        let text = "The sketch takes the bent wire as a straight one of the same length at its mean height.";
        note(Weight::Note, Place::Wire(fed), text);
    }
    if hung.wires.len() > 1 {
        note(Weight::Caution, Place::Plan, "The sketch sees only the fed wire; the others are left out.");
    }
}

/// A connection to the earth is known approximately only, and needs its lead.
fn earth_connections(plan: &Plan, hung: &Hung, found: &mut Vec<Finding>) {
    for lead in &hung.leads {
        let Some(wire) = plan.wires.get(lead.wire) else { continue };
        let Some(connection) = wire.earthed.iter().find(|connection| connection.end == lead.end) else {
            continue;
        };
        let electrode = match connection.electrode {
            Electrode::Stake { length_m, .. } => format!("a stake of {} m", units::short(length_m)),
            Electrode::Radials { count, length_m, .. } => {
                format!("{count} radials of {} m", units::short(length_m))
            }
            Electrode::Stated { resistance_ohm, .. } => {
                format!("an electrode of {} Ω", units::short(resistance_ohm))
            }
        };
        let end = match lead.end {
            WireEnd::Beginning => "beginning",
            WireEnd::End => "end",
        };
        let text = format!(
            "The {end} of {} goes on {} m straight down, in the same wire, to {electrode}. What the earth opposes there is known \
             approximately only: measure, and follow local rules for earthing.",
            wire.name,
            units::fixed(lead.top.z_m, 2)
        );
        found.push(Finding { weight: Weight::Caution, place: Place::Wire(lead.wire), text });
    }
}
