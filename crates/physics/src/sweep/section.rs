//! One part of the range: its samples, its interpolant, and what it still wants.

use super::bary::Bary;
use super::check::compare;
use super::place::next_hz;
use super::range::Span;
use super::sample::{Components, Sample};
use super::weights::{Samples, Witnesses, interpolant};

/// The true error may exceed the largest disagreement found, because the two interpolants share most samples and the
/// comparison is made at a few places. Measured on 600 random bent wires, one or two, with and without mirror, swept
/// to 1e-3: with this factor the estimate is 5.7 times the true error in the middle and below it in one of forty; two
/// sweeps missed the tolerance, the worse by 1.9 times.
const CAUTION: f64 = 10.0;

/// Most samples of a section, as a multiple of the first number, and beyond it.
const MOST_SAMPLES: (usize, usize) = (2, 24);

/// Fewest samples of a section.
const FEWEST_SAMPLES: usize = 6;

/// Sets of samples and mixtures of currents per set of unknown weights: enough equations from two witnesses.
fn mixtures_for(samples: usize, ports: usize, unknowns: usize) -> usize {
    (samples.div_ceil(2 * ports) + 4).min(unknowns)
}

/// A section of the range.
#[derive(Clone, Debug)]
pub(super) struct Section {
    pub span: Span,
    /// Ordered by frequency.
    pub samples: Vec<Sample>,
    /// Still to come, Hz.
    pub wanted_hz: Vec<f64>,
    /// The interpolant, once the first samples are there.
    pub bary: Option<Bary>,
    /// Estimated relative error.
    pub error: f64,
    /// Samples have come since the last fit.
    fresh: bool,
    most_samples: usize,
}

impl Section {
    pub fn new(span: Span, first_count: usize) -> Self {
        let count = first_count.max(FEWEST_SAMPLES);
        Self {
            span,
            samples: Vec::new(),
            wanted_hz: span.chebyshev_hz(count),
            bary: None,
            error: f64::INFINITY,
            fresh: false,
            most_samples: MOST_SAMPLES.0 * count + MOST_SAMPLES.1,
        }
    }

    /// Takes a sample if it is wanted here.
    pub fn take(&mut self, sample: Sample) -> Result<(), Sample> {
        let same = |&wanted_hz: &f64| (wanted_hz / sample.frequency_hz - 1.0).abs() < 1e-12;
        let Some(index) = self.wanted_hz.iter().position(same) else { return Err(sample) };
        self.wanted_hz.swap_remove(index);
        let place = self.samples.partition_point(|other| other.frequency_hz < sample.frequency_hz);
        self.samples.insert(place, sample);
        self.fresh = true;
        Ok(())
    }

    /// Fits what is there once all wanted samples have come; asks for more where that is not good enough.
    pub fn fit(&mut self, tolerance: f64) {
        if !(self.fresh && self.wanted_hz.is_empty()) {
            return;
        }
        self.fresh = false;
        let frequencies_hz: Vec<f64> = self.samples.iter().map(|sample| sample.frequency_hz).collect();
        let currents = &self.samples[0].currents_a_per_v;
        let mixtures = mixtures_for(self.samples.len(), currents.ncols(), currents.nrows());
        let components: Vec<Components> =
            self.samples.iter().map(|sample| Components::new(sample, mixtures)).collect();
        let samples = Samples { frequencies_hz: &frequencies_hz, components: &components };
        let [first, second] = [Witnesses::First, Witnesses::Second].map(|w| interpolant(&samples, w));
        let disagreements = compare(&samples, &self.span, [&first, &second]);
        self.error = CAUTION * disagreements.iter().map(|here| here.size).fold(0.0, f64::max);
        self.bary = Some(first);
        if self.error > tolerance {
            let mut next = next_hz(&frequencies_hz, &self.span, &disagreements, tolerance / CAUTION);
            next.truncate(self.most_samples.saturating_sub(self.samples.len()));
            self.wanted_hz = next;
        }
    }
}
