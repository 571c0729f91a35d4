//! The evaluator: plan → report, in stages that keep what their inputs did not change.
//!
//! | stage | inputs | kept while |
//! | --- | --- | --- |
//! | geometry (`hang`) | supports, wires, feedpoint | cheap, never kept |
//! | wire solution (`sketch`) | hung wires, earth, frequencies | none of them changes |
//! | feeds (`chain`) | one feed, frequencies | that feed stays the same |
//! | watts and verdicts (`watts`, `judge`) | all of it, transmitter, limits | cheap, never kept |

mod chain;
mod findings;
mod grid;
mod judge;
mod sketch;
mod watts;
mod wire;

use physics::line::LineError;
use physics::sinusoid::SketchError;
use thiserror::Error;

use self::chain::Chain;
use self::grid::Grid;
use self::judge::judge;
use self::watts::Passage;
use self::wire::{BandSolution, WireSolution};
use crate::catalogue::CatalogueError;
use crate::hang::{HangError, Hung, hang};
use crate::plan::{Feed, Plan};
use crate::report::{BandFeed, BandReport, FrequencyReport, Model, Report};
use crate::validate::{self, PlanError};

/// Why a plan has no report.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum EvaluateError {
    /// A value of the plan is not possible.
    #[error(transparent)]
    Plan(#[from] PlanError),
    /// The wires cannot be hung.
    #[error(transparent)]
    Hang(#[from] HangError),
    /// A line is not in the catalogue.
    #[error("feeds[{feed}].links[{link}].line: {source}")]
    Catalogue {
        /// Index of the feed.
        feed: usize,
        /// Index of the link.
        link: usize,
        /// What the catalogue says.
        source: CatalogueError,
    },
    /// A line's figures make no line.
    #[error("feeds[{feed}].links[{link}].line: {source}")]
    Line {
        /// Index of the feed.
        feed: usize,
        /// Index of the link.
        link: usize,
        /// What the line model says.
        source: LineError,
    },
    /// The earth's soil is not in the catalogue.
    #[error("site.earth: {0}")]
    Earth(CatalogueError),
    /// The wire is outside what the model is valid for.
    #[error("wires[{wire}]: {source}")]
    Wire {
        /// Index of the wire.
        wire: usize,
        /// What the wire model says.
        source: SketchError,
    },
    /// A frequency that was asked for is outside the program's range.
    #[error("{megahertz} MHz is out of range; accepted: 1.8 to 54 MHz")]
    Frequency {
        /// As it was asked for, MHz.
        megahertz: f64,
    },
    /// No frequency was asked for.
    #[error("no frequency is given; accepted: one or more in MHz, such as 7.1,14.15")]
    NoFrequency,
}

/// Turns plans into reports and keeps what it can between them.
#[derive(Debug, Default)]
pub struct Evaluator {
    wire: Option<(WireKey, WireSolution)>,
    chains: Vec<(Feed, Chain)>,
    /// The frequencies that `wire` and `chains` were made for.
    grids: Vec<Grid>,
}

/// What the wire solution depends on, beside the frequencies.
#[derive(Clone, Debug, PartialEq)]
struct WireKey {
    hung: Hung,
    earth: crate::plan::Earth,
}

impl Evaluator {
    /// An evaluator that has kept nothing yet.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Evaluates a plan on all its bands.
    ///
    /// # Errors
    /// [`EvaluateError`], one sentence with the field that is the cause.
    pub fn evaluate(&mut self, plan: &Plan, revision: u64) -> Result<Report, EvaluateError> {
        let grids = plan.bands.iter().map(Grid::of_band).collect();
        validate::check(plan)?;
        self.run(plan, revision, grids)
    }

    /// Evaluates a plan at the given frequencies (Hz), as one list of channels named "asked".
    ///
    /// # Errors
    /// As [`Self::evaluate`], and for frequencies outside the program's range.
    pub fn evaluate_at(
        &mut self,
        plan: &Plan,
        revision: u64,
        frequencies_hz: &[f64],
    ) -> Result<Report, EvaluateError> {
        if frequencies_hz.is_empty() {
            return Err(EvaluateError::NoFrequency);
        }
        if let Some(bad) = frequencies_hz.iter().find(|f| !validate::FREQUENCIES_HZ.contains(f)) {
            return Err(EvaluateError::Frequency { megahertz: bad / 1e6 });
        }
        validate::check(plan)?;
        self.run(plan, revision, vec![Grid::of_frequencies("asked", frequencies_hz.to_vec())])
    }

    fn run(&mut self, plan: &Plan, revision: u64, grids: Vec<Grid>) -> Result<Report, EvaluateError> {
        if self.grids != grids {
            self.wire = None;
            self.chains.clear();
            self.grids = grids;
        }
        let hung = hang(plan)?;
        let (key, solution) = self.solve_wire(plan, &hung)?;
        self.resolve_chains(&plan.feeds)?;
        let chains: Vec<&Chain> = self.chains.iter().map(|(_, chain)| chain).collect();

        let mut bands = Vec::with_capacity(self.grids.len());
        let mut offset = 0;
        for (grid, solved) in self.grids.iter().zip(&solution.bands) {
            bands.push(band_report(plan, grid, solved, &chains, offset));
            offset += grid.frequencies_hz.len();
        }
        self.wire = Some((key, solution));
        let findings = findings::findings(plan, &hung, &bands);
        Ok(Report {
            revision,
            model: Model::Sketch,
            hung,
            feed_names: plan.feeds.iter().map(|feed| feed.name.clone()).collect(),
            link_names: chains.iter().map(|chain| chain.names.clone()).collect(),
            bands,
            findings,
        })
    }

    /// The kept solution where nothing that it depends on has changed, else a new one.
    fn solve_wire(&mut self, plan: &Plan, hung: &Hung) -> Result<(WireKey, WireSolution), EvaluateError> {
        let key = WireKey { hung: hung.clone(), earth: plan.site.earth.clone() };
        match self.wire.take() {
            Some((kept, solution)) if kept == key => Ok((kept, solution)),
            _ => {
                let solution = sketch::solve(hung, &plan.site.earth, &self.grids)?;
                Ok((key, solution))
            }
        }
    }

    /// A feed that is the same as one of the kept ones, at whatever place, is not resolved again.
    fn resolve_chains(&mut self, feeds: &[Feed]) -> Result<(), EvaluateError> {
        let mut kept = std::mem::take(&mut self.chains);
        let frequencies_hz: Vec<f64> =
            self.grids.iter().flat_map(|g| g.frequencies_hz.iter().copied()).collect();
        for (index, feed) in feeds.iter().enumerate() {
            let chain = match kept.iter().position(|(old, _)| old.links == feed.links) {
                Some(at) => kept.swap_remove(at).1,
                None => Chain::new(index, feed, &frequencies_hz)?,
            };
            self.chains.push((feed.clone(), chain));
        }
        Ok(())
    }
}

fn band_report(
    plan: &Plan,
    grid: &Grid,
    solved: &BandSolution,
    chains: &[&Chain],
    offset: usize,
) -> BandReport {
    let passage = |feed: usize, index: usize| Passage {
        chain: chains[feed],
        index: offset + index,
        frequency_hz: grid.frequencies_hz[index],
        feedpoint_ohm: solved.points[index].impedance_ohm,
        transmitter: &plan.transmitter,
        least_share_to_wire: plan.least_share_to_wire,
    };
    let points: Vec<FrequencyReport> = (0..grid.frequencies_hz.len())
        .map(|index| FrequencyReport {
            frequency_hz: grid.frequencies_hz[index],
            feedpoint_ohm: solved.points[index].impedance_ohm,
            wire_efficiency: solved.points[index].wire_efficiency,
            feeds: (0..chains.len()).map(|feed| passage(feed, index).report()).collect(),
        })
        .collect();
    let feeds = chains
        .iter()
        .enumerate()
        .map(|(feed, chain)| BandFeed {
            verdict: judge((&points, grid.kind), feed, chain, &plan.transmitter),
            profile: passage(feed, grid.middle).profile(),
        })
        .collect();
    BandReport {
        name: grid.name.clone(),
        low_hz: grid.low_hz(),
        high_hz: grid.high_hz(),
        points,
        middle: grid.middle,
        feeds,
        wave: solved.wave.clone(),
    }
}

#[cfg(test)]
mod tests;
