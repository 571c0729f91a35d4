//! What the views read: the plan, the newest report, and what is chosen. Nothing here can be changed by drawing.

use sheet::tokens::Ground;
use station::plan::Plan;
use station::report::Report;
use station::units::Units;

/// Everything a view may look at during one frame.
#[derive(Clone, Copy)]
pub struct Snapshot<'a> {
    /// The plan as it is now.
    pub plan: &'a Plan,
    /// The newest report; `None` until the first answer of the worker.
    pub report: Option<&'a Report>,
    /// The report answers an older plan: draw it dimmed.
    pub stale: bool,
    /// Index of the chosen band.
    pub band: usize,
    /// Index of the chosen feed.
    pub feed: usize,
    /// Metres or feet.
    pub units: Units,
    /// Light or dark, for the tokens.
    pub ground: Ground,
    /// Phase of the RF cycle for the moving standing wave, degrees.
    pub phase_deg: f64,
    /// Whether it moves.
    pub moving: bool,
    /// Seconds on screen for one RF cycle.
    pub period_s: f64,
}
