//! What the sheet says, before anyone lays it out: every number as text, from plan and report.

mod bands;
mod cautions;
mod cut_list;
mod feeds;
mod identity;
mod loads;
mod pieces;
mod ratings;

pub use bands::{BandEntry, Curve, FeedEntry};
pub use cautions::{Caution, cautions};
pub use cut_list::{Allowances, CutList, CutRow};
pub use feeds::{FeedSchedule, Step, Stress};
pub use identity::{Identity, checksum};
pub use loads::{LoadKind, load_values};
pub use pieces::{Arm, Cut, arm_mark, arms, load_mark};

use station::plan::Plan;
use station::report::Report;

use crate::error::SheetError;
use crate::request::SheetRequest;

/// The sheet's content.
#[derive(Clone, Debug, PartialEq)]
pub struct SheetModel {
    /// Which plan this is.
    pub identity: Identity,
    /// What to cut.
    pub cut_list: CutList,
    /// What to connect, one schedule per feed.
    pub feeds: Vec<FeedSchedule>,
    /// What each band does.
    pub bands: Vec<BandEntry>,
    /// The transmitter's limit.
    pub swr_limit: f64,
    /// What can hurt, and what the evaluator found.
    pub cautions: Vec<Caution>,
}

impl SheetModel {
    /// Collects the content.
    ///
    /// # Errors
    /// [`SheetError::Mismatch`] where the report belongs to another plan.
    pub fn new(plan: &Plan, report: &Report, request: &SheetRequest) -> Result<Self, SheetError> {
        check_counts(plan, report)?;
        Ok(Self {
            identity: Identity::new(plan, report, request),
            cut_list: CutList::new(plan, &report.hung, request.units),
            feeds: feeds::schedules(plan, report, request.units),
            bands: bands::entries(plan, report),
            swr_limit: plan.transmitter.swr_limit,
            cautions: cautions(plan, report),
        })
    }
}

/// Refuses a report that was made from another plan: nothing below may index past its end.
fn check_counts(plan: &Plan, report: &Report) -> Result<(), SheetError> {
    let equal = |what, plan, report| {
        if plan == report { Ok(()) } else { Err(SheetError::Mismatch { what, plan, report }) }
    };
    equal("wires", plan.wires.len(), report.hung.wires.len())?;
    equal("bands", plan.bands.len(), report.bands.len())?;
    for band in &report.bands {
        equal("verdicts of a band", plan.feeds.len(), band.feeds.len())?;
        if band.middle >= band.points.len() {
            return Err(SheetError::Mismatch { what: "middles of a band", plan: 1, report: 0 });
        }
        for point in &band.points {
            equal("feeds", plan.feeds.len(), point.feeds.len())?;
            for (feed, reported) in plan.feeds.iter().zip(&point.feeds) {
                equal("links of a feed", feed.links.len(), reported.links.len())?;
            }
        }
    }
    Ok(())
}

/// The letter of a feed: A, B, … Z, then AA.
#[must_use]
pub fn feed_letter(index: usize) -> String {
    let letter = char::from(b'A' + (index % 26) as u8);
    if index < 26 { letter.to_string() } else { format!("{}{letter}", feed_letter(index / 26 - 1)) }
}

/// The mark of a link, counted from the transmitter: "A1" is what the transmitter is plugged into.
#[must_use]
pub fn link_mark(feed: usize, links: usize, from_wire: usize) -> String {
    format!("{}{}", feed_letter(feed), links - from_wire)
}
