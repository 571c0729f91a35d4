//! The evaluator: plan → report, in stages that keep what their inputs did not change.
//!
//! | stage | inputs | kept while |
//! | --- | --- | --- |
//! | geometry (`hang`) | supports, wires, feedpoint | cheap, never kept |
//! | earth (`full::Earths`) | soil, frequencies, rough extent of the wires | none of them changes |
//! | wire solution (`full`, `sketch`) | hung wires, places of ports, earth, frequencies | none of them changes |
//! | loads | the wire solution and the loads' circuits | cheap, never kept |
//! | feeds (`chain`) | one feed, frequencies | that feed stays the same |
//! | watts and verdicts (`watts`, `judge`) | all of it, transmitter, limits | cheap, never kept |

mod chain;
mod findings;
mod full;
mod grid;
mod judge;
mod sketch;
mod watts;
mod wire;

pub use physics::field::Direction;

pub use self::full::{Gains, Proof};

use std::sync::Arc;

use physics::earth::EarthError;
use physics::line::LineError;
use physics::sinusoid::SketchError;
use physics::sweep::SweepError;
use physics::wire::WireError;
use thiserror::Error;

use self::chain::Chain;
use self::grid::Grid;
use self::judge::judge;
use self::watts::Passage;
use self::wire::{BandSolution, WireSolution};
use crate::catalogue::CatalogueError;
use crate::hang::{HangError, Hung, hang};
use crate::plan::{Earth, EarthConnection, Feed, Load, Plan};
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
    /// The wires are nothing that the full model can take.
    #[error("wires: {0}")]
    Solver(#[from] WireError),
    /// The soil, or the distances of the wires, are nothing that the earth can be computed for.
    #[error("site.earth: {0}")]
    Soil(#[from] EarthError),
    /// A wire hangs lower than the earth's model holds.
    #[error(
        "wires[{wire}]: it comes down to {height_m:.2} m over the soil; accepted on {megahertz} MHz: at least {least_m:.2} m"
    )]
    TooLow {
        /// Index of the wire.
        wire: usize,
        /// Its lowest height, m.
        height_m: f64,
        /// Least height accepted at the lowest frequency, m.
        least_m: f64,
        /// The lowest frequency, MHz.
        megahertz: f64,
    },
    /// The frequencies cannot be swept.
    #[error("bands: {0}")]
    Sweep(#[from] SweepError),
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
    full: Option<Full>,
    earths: Option<Arc<full::Earths>>,
    sketch: Option<(WireKey, Arc<WireSolution>)>,
    chains: Vec<(Feed, Chain)>,
    /// The frequencies that all of these were made for.
    grids: Vec<Grid>,
}

/// What a wire model answers, and its name.
type Answered = Result<(Model, Arc<WireSolution>), EvaluateError>;

/// The full model's stages: solved wires, and the answer with loads attached.
#[derive(Debug)]
struct Full {
    key: WireKey,
    solved: full::Solved,
    loads: LoadKey,
    solution: Arc<WireSolution>,
}

/// What a wire solution depends on, beside the frequencies.
#[derive(Clone, Debug, PartialEq)]
struct WireKey {
    hung: Hung,
    earth: Earth,
    gap_m: f64,
    /// Wire and fraction of each load.
    load_places: Vec<(usize, f64)>,
}

/// What is attached to the solved wires: loads, and electrodes by wire.
type LoadKey = (Vec<Load>, Vec<Vec<EarthConnection>>);

fn load_key(plan: &Plan) -> LoadKey {
    (plan.loads.clone(), plan.wires.iter().map(|wire| wire.earthed.clone()).collect())
}

impl Full {
    fn model(&self) -> Model {
        Model::Full { unknowns: self.solved.unknowns() }
    }
}

impl WireKey {
    fn new(plan: &Plan, hung: &Hung) -> Self {
        Self {
            hung: hung.clone(),
            earth: plan.site.earth.clone(),
            gap_m: plan.feedpoint.gap_m,
            load_places: plan.loads.iter().map(|load| (load.wire, load.fraction)).collect(),
        }
    }
}

impl Evaluator {
    /// An evaluator that has kept nothing yet.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Evaluates a plan on all its bands with the full model.
    ///
    /// # Errors
    /// [`EvaluateError`], one sentence with the field that is the cause.
    pub fn evaluate(&mut self, plan: &Plan, revision: u64) -> Result<Report, EvaluateError> {
        validate::check(plan)?;
        self.run(plan, revision, plan.bands.iter().map(Grid::of_band).collect(), Self::full)
    }

    /// Evaluates a plan on all its bands with the sketch: for the moment until the full answer is there.
    ///
    /// # Errors
    /// As [`Self::evaluate`].
    pub fn sketch(&mut self, plan: &Plan, revision: u64) -> Result<Report, EvaluateError> {
        validate::check(plan)?;
        self.run(plan, revision, plan.bands.iter().map(Grid::of_band).collect(), Self::sketched)
    }

    /// Evaluates a plan at the given frequencies (Hz), as one list of channels named "asked", with the full model.
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
        self.run(plan, revision, vec![Grid::of_frequencies("asked", frequencies_hz.to_vec())], Self::full)
    }

    /// What stands behind the newest full answer, at one of its frequencies; `None` before the first one.
    ///
    /// # Errors
    /// What the solver refuses on the finer mesh.
    pub fn prove(&self, plan: &Plan, frequency_hz: f64) -> Result<Option<Proof>, EvaluateError> {
        self.full.as_ref().map(|full| full.solved.prove(plan, frequency_hz)).transpose()
    }

    /// Gains of the newest full answer at one of its frequencies; `None` before the first one.
    ///
    /// # Errors
    /// A frequency outside the answer's range.
    pub fn gains(
        &self,
        plan: &Plan,
        frequency_hz: f64,
        directions: &[Direction],
    ) -> Result<Option<Gains>, EvaluateError> {
        let Some(full) = &self.full else { return Ok(None) };
        full.solved.gains(plan, frequency_hz, directions).map(Some)
    }

    fn run(
        &mut self,
        plan: &Plan,
        revision: u64,
        grids: Vec<Grid>,
        solve: fn(&mut Self, &Plan, &Hung) -> Answered,
    ) -> Result<Report, EvaluateError> {
        if self.grids != grids {
            *self = Self { grids, earths: self.earths.take(), ..Self::default() };
        }
        let hung = hang(plan)?;
        let (model, solution) = solve(self, plan, &hung)?;
        self.resolve_chains(&plan.feeds)?;
        let chains: Vec<&Chain> = self.chains.iter().map(|(_, chain)| chain).collect();

        let mut bands = Vec::with_capacity(self.grids.len());
        let mut offset = 0;
        for (grid, solved) in self.grids.iter().zip(&solution.bands) {
            bands.push(band_report(plan, grid, solved, &chains, offset));
            offset += grid.frequencies_hz.len();
        }
        let findings = findings::findings(plan, &hung, &bands, model);
        Ok(Report {
            revision,
            model,
            hung,
            feed_names: plan.feeds.iter().map(|feed| feed.name.clone()).collect(),
            link_names: chains.iter().map(|chain| chain.names.clone()).collect(),
            bands,
            findings,
        })
    }

    /// The full model; solved wires are kept where nothing that they depend on has changed.
    fn full(&mut self, plan: &Plan, hung: &Hung) -> Answered {
        let key = WireKey::new(plan, hung);
        let kept = self.full.take();
        if let Some(full) = kept.as_ref().filter(|full| full.key == key && full.loads == load_key(plan)) {
            let answer = (full.model(), Arc::clone(&full.solution));
            self.full = kept;
            return Ok(answer);
        }
        let solved = match kept {
            Some(full) if full.key == key => full.solved,
            _ => {
                let solved = full::Solved::new(plan, hung, &self.grids, self.earths.as_ref())?;
                self.earths = solved.earths().cloned();
                solved
            }
        };
        let solution = Arc::new(solved.answer(plan, hung, &self.grids)?);
        let full = Full { key, solved, loads: load_key(plan), solution: Arc::clone(&solution) };
        let model = full.model();
        self.full = Some(full);
        Ok((model, solution))
    }

    fn sketched(&mut self, plan: &Plan, hung: &Hung) -> Answered {
        let key = WireKey::new(plan, hung);
        let solution = match self.sketch.take() {
            Some((kept, solution)) if kept == key => solution,
            _ => Arc::new(sketch::solve(hung, &plan.site.earth, &self.grids)?),
        };
        self.sketch = Some((key, Arc::clone(&solution)));
        Ok((Model::Sketch, solution))
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
            shares: solved.points[index].shares,
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
