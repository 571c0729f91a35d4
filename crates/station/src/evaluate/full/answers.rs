//! Solutions at all frequencies: solved one by one where there are few, else swept.

use nalgebra::DMatrix;
use num_complex::Complex64;
use physics::sweep::{Fit, Sample, Sweep, SweepRange};
use physics::wire::ports::attach;
use physics::wire::{Load, Solution, WireModel};
use rayon::prelude::*;

use super::earths::Earths;
use crate::evaluate::EvaluateError;

/// Largest relative error of the sweep's fit.
const TOLERANCE: f64 = 5e-4;
/// So few frequencies are solved directly: a sweep would need more solutions.
const FEW: usize = 8;

/// The wires' ports and currents at every frequency of the plan.
#[derive(Clone, Debug)]
pub(super) enum Answers {
    /// Direct solutions, by rising frequency.
    Direct(Vec<Sample>),
    Swept(Fit),
}

impl Answers {
    /// Always begins afresh, so that a plan's numbers do not depend on what was evaluated before it: window, terminal and
    /// paper agree to the last digit.
    pub fn new(
        model: &WireModel,
        earths: Option<&Earths>,
        frequencies_hz: &[f64],
    ) -> Result<Self, EvaluateError> {
        if frequencies_hz.len() <= FEW {
            return solve(model, earths, frequencies_hz).map(Self::Direct);
        }
        let mut sweep = Sweep::new(&range(model, frequencies_hz))?;
        loop {
            let wanted_hz = sweep.wanted_hz();
            if wanted_hz.is_empty() {
                return Ok(Self::Swept(sweep.into_fit()));
            }
            sweep.give(solve(model, earths, &wanted_hz)?)?;
        }
    }

    /// All currents and admittances at a frequency of the plan.
    pub fn sample(&self, frequency_hz: f64) -> Result<Sample, EvaluateError> {
        match self {
            Self::Direct(samples) => {
                let off = |sample: &&Sample| (sample.frequency_hz - frequency_hz).abs();
                let nearest = samples.iter().min_by(|a, b| off(a).total_cmp(&off(b)));
                nearest.cloned().ok_or(EvaluateError::NoFrequency)
            }
            Self::Swept(fit) => Ok(fit.sample(frequency_hz)?),
        }
    }

    /// Impedance at the feedpoint (port 0) with loads on the other ports, at rising frequencies of the plan, Ω.
    pub fn feedpoint(&self, frequencies_hz: &[f64], loads: &[Load]) -> Result<Vec<Complex64>, EvaluateError> {
        let loaded = |frequency_hz: f64, admittance_s: &DMatrix<Complex64>| {
            let fed = attach(admittance_s, &super::uses(loads, frequency_hz), frequency_hz)?;
            Ok(fed.admittance_s[(0, 0)].inv())
        };
        match self {
            Self::Direct(_) => frequencies_hz
                .iter()
                .map(|&frequency_hz| loaded(frequency_hz, &self.sample(frequency_hz)?.admittance_s))
                .collect(),
            Self::Swept(fit) => {
                let admittances = fit.admittances(frequencies_hz)?;
                if loads.is_empty() {
                    return Ok(admittances.entry_s(0, 0).iter().map(Complex64::inv).collect());
                }
                let each = frequencies_hz.iter().enumerate();
                each.map(|(index, &frequency_hz)| loaded(frequency_hz, &admittances.matrix_s(index)))
                    .collect()
            }
        }
    }
}

/// Threads live here: the sweep names the frequencies, all of them are solved at once.
fn solve(
    model: &WireModel,
    earths: Option<&Earths>,
    frequencies_hz: &[f64],
) -> Result<Vec<Sample>, EvaluateError> {
    let solve = |&frequency_hz: &f64| solve_at(model, earths, frequency_hz).map(Sample::from);
    frequencies_hz.par_iter().map(solve).collect()
}

/// One solution, over the earth where there is one.
pub(super) fn solve_at(
    model: &WireModel,
    earths: Option<&Earths>,
    frequency_hz: f64,
) -> Result<Solution, EvaluateError> {
    Ok(match earths {
        Some(earths) => model.solve_over(frequency_hz, &*earths.at(frequency_hz)?)?,
        None => model.solve(frequency_hz)?,
    })
}

fn range(model: &WireModel, frequencies_hz: &[f64]) -> SweepRange {
    let (lowest_hz, highest_hz) = (frequencies_hz[0], frequencies_hz[frequencies_hz.len() - 1]);
    let length_m: f64 = model.segments().iter().map(physics::wire::Segment::length_m).sum();
    let half_waves = 2.0 * length_m * highest_hz / physics::constants::SPEED_OF_LIGHT_M_PER_S;
    SweepRange { lowest_hz, highest_hz, half_waves, tolerance: TOLERANCE }
}
