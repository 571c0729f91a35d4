//! What to cut: wires, ropes and lines, with what knots, insulators and trimming take.

use station::hang::{Hung, Rope, WireEnd};
use station::plan::{LinePiece, Link, PathPoint, Plan};
use station::units::Units;

use super::pieces::{Arm, arm_mark, arms, place, route};
use super::ratings::line_name;
use super::{feed_letter, link_mark, loads};
use crate::fonts::printable;

/// What is added to the plan's lengths. The defaults are common practice.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Allowances {
    /// Wire put through an insulator and wound back on itself, m per end.
    pub insulator_m: f64,
    /// Wire left over until the first measurement, as a share of the piece: folded back, cut off last.
    pub trim_share: f64,
    /// The least of it, m.
    pub trim_least_m: f64,
    /// A knot that holds and its tail, m per end of a rope.
    pub knot_m: f64,
    /// Line stripped and made fast, m per end.
    pub line_end_m: f64,
}

impl Default for Allowances {
    fn default() -> Self {
        Self { insulator_m: 0.25, trim_share: 0.02, trim_least_m: 0.3, knot_m: 0.5, line_end_m: 0.15 }
    }
}

/// Everything to cut.
#[derive(Clone, Debug, PartialEq)]
pub struct CutList {
    /// What all wires are made of; empty where they differ.
    pub conductor: String,
    /// Pieces of wire first, then loads, ropes and lines.
    pub rows: Vec<CutRow>,
    /// What the columns hold, and where the allowances come from.
    pub note: String,
}

/// One piece.
#[derive(Clone, Debug, PartialEq)]
pub struct CutRow {
    /// Its mark in the drawing.
    pub mark: String,
    /// What it is.
    pub part: String,
    /// Of what material, from where to where.
    pub detail: String,
    /// Its length in the plan; empty for a load.
    pub plan: String,
    /// What its ends take.
    pub ends: String,
    /// What is left for trimming, or a halyard; empty where there is none.
    pub extra: String,
    /// What to cut; empty for a load.
    pub cut: String,
}

/// What all rows are made with.
#[derive(Clone, Copy)]
struct Shared<'a> {
    units: Units,
    allowances: &'a Allowances,
}

/// Lengths of one piece, m.
struct Lengths {
    plan_m: f64,
    ends_m: f64,
    extra_m: f64,
}

impl CutList {
    pub(super) fn new(plan: &Plan, hung: &Hung, units: Units) -> Self {
        let allowances = Allowances::default();
        let shared = Shared { units, allowances: &allowances };
        let conductor = common_conductor(hung).map_or_else(String::new, printable);
        let mut rows = Vec::new();
        let arms = arms(plan);
        for (index, &arm) in arms.iter().enumerate() {
            let own = if conductor.is_empty() { hung.wires[arm.wire].conductor.name.as_str() } else { "" };
            let comma = if own.is_empty() { "" } else { ", " };
            let detail = format!("{own}{comma}{}", route(plan, hung, &arms, arm, units));
            rows.push(arm_row(arm, arm_mark(index), &plan.wires[arm.wire].name, &detail, shared));
        }
        rows.extend(loads::rows(plan, &arms, units));
        for (index, rope) in hung.ropes.iter().enumerate() {
            rows.push(rope_row(plan, rope, index + 1, shared));
        }
        for (feed_index, feed) in plan.feeds.iter().enumerate() {
            for (from_wire, link) in feed.links.iter().enumerate() {
                if let Link::Line(piece) = link {
                    let mark = link_mark(feed_index, feed.links.len(), from_wire);
                    rows.push(line_row(piece, mark, feed_index, shared));
                }
            }
        }
        Self { conductor, rows, note: note(plan, units, &allowances) }
    }
}

/// The row of a piece of wire: where it goes, and what it is made of where the wires differ.
fn arm_row(arm: Arm, mark: String, part: &str, detail: &str, shared: Shared<'_>) -> CutRow {
    let Shared { units, allowances } = shared;
    let lengths = Lengths {
        plan_m: arm.length_m(),
        ends_m: 2.0 * allowances.insulator_m,
        extra_m: (allowances.trim_share * arm.length_m()).max(allowances.trim_least_m),
    };
    lengths.row(mark, printable(part), printable(detail), units)
}

/// What all wires are made of, if it is the same.
fn common_conductor(hung: &Hung) -> Option<&str> {
    let first = hung.wires.first()?.conductor.name.as_str();
    hung.wires.iter().all(|wire| wire.conductor.name == first).then_some(first)
}

fn rope_row(plan: &Plan, rope: &Rope, number: usize, shared: Shared<'_>) -> CutRow {
    let Shared { units, allowances } = shared;
    let held = plan.wires.get(rope.wire).and_then(|wire| match rope.end {
        WireEnd::Beginning => wire.path.first(),
        WireEnd::End => wire.path.last(),
    });
    let halyard_m = match held {
        Some(PathPoint::OnSupport { height_m, .. }) => *height_m,
        _ => 0.0,
    };
    let lengths = Lengths { plan_m: rope.length_m, ends_m: 2.0 * allowances.knot_m, extra_m: halyard_m };
    let detail = held.map_or_else(
        || "holds the wire".to_owned(),
        |point| match point {
            PathPoint::OnSupport { .. } => format!("to {}, then down", place(point, rope.end)),
            PathPoint::Free(_) => format!("to {}", place(point, rope.end)),
        },
    );
    lengths.row(format!("R{number}"), "rope".to_owned(), printable(&detail), units)
}

fn line_row(piece: &LinePiece, mark: String, feed: usize, shared: Shared<'_>) -> CutRow {
    let Shared { units, allowances } = shared;
    let lengths = Lengths { plan_m: piece.length_m, ends_m: 2.0 * allowances.line_end_m, extra_m: 0.0 };
    let detail = format!("for feed {}", feed_letter(feed));
    lengths.row(mark, printable(&line_name(&piece.line)), printable(&detail), units)
}

impl Lengths {
    /// Each length is rounded to what a tape shows before they are added, so that the row adds up on paper.
    fn row(&self, mark: String, part: String, detail: String, units: Units) -> CutRow {
        let [plan_m, ends_m, extra_m] = [self.plan_m, self.ends_m, self.extra_m].map(|m| units.on_tape(m));
        CutRow {
            mark,
            part,
            detail,
            plan: units.tape(plan_m),
            ends: units.tape(ends_m),
            extra: if extra_m > 0.0 { units.tape(extra_m) } else { String::new() },
            cut: units.tape(plan_m + ends_m + extra_m),
        }
    }
}

fn note(plan: &Plan, units: Units, allowances: &Allowances) -> String {
    let allowed = format!(
        "Allowances are common practice. Ends: {} of wire through each insulator and wound back, {} of rope a knot, {} \
         of line an end. Extra: {} % of a wire, {} at least, folded back until measured and cut off last; for a rope, \
         the halyard down its support.",
        units.tape(allowances.insulator_m),
        units.tape(allowances.knot_m),
        units.tape(allowances.line_end_m),
        station::units::fixed(allowances.trim_share * 100.0, 0),
        units.tape(allowances.trim_least_m),
    );
    if plan.loads.is_empty() {
        return allowed;
    }
    format!(
        "{allowed} The place of a load counts from the beginning of its wire, where its first piece begins."
    )
}
