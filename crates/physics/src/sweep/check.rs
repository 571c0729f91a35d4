//! Where two interpolants of the same samples disagree.

use num_complex::Complex64;

use super::bary::{Bary, Blend};
use super::range::Span;
use super::weights::Samples;

/// Disagreement at one frequency.
#[derive(Clone, Copy, Debug)]
pub(super) struct Disagreement {
    pub frequency_hz: f64,
    /// Number of samples below; at a sample, that of the wider gap beside it.
    pub gap: usize,
    /// Largest relative difference of any admittance and of the current at any port.
    pub size: f64,
}

/// Tangent of the turn of the denominator's phase from one point to the next above which a pole is taken to be near. A
/// pole at a distance of half the step turns it by π/2.
const TURN: f64 = 1.5;

/// Halvings of a step in search of a pole: down to a few hertz.
const HALVINGS: u32 = 20;

/// Compares two interpolants between the samples, at those that one leaves out, and near to their poles.
pub(super) fn compare(samples: &Samples<'_>, span: &Span, pair: [&Bary; 2]) -> Vec<Disagreement> {
    let places = places(samples.frequencies_hz, span, pair);
    let frequencies_hz: Vec<f64> = places.iter().map(|&(frequency_hz, _)| frequency_hz).collect();
    let [first, second] = pair.map(|bary| figures(samples, bary, &frequencies_hz));
    let one = &samples.components[0];
    let (admittances, mixtures) = (one.admittances.len(), one.mixtures.first().map_or(0, Vec::len));
    let ports = one.mixtures.len();
    let difference = |figure: usize, point: usize| first[figure][point] - second[figure][point];
    places
        .iter()
        .enumerate()
        .map(|(point, &(frequency_hz, gap))| {
            let mut size = 0.0_f64;
            for entry in 0..admittances {
                let own = |port: usize| first[port * (ports + 1)][point].norm();
                let scale = (own(entry % ports) * own(entry / ports)).sqrt();
                size = largest(size, difference(entry, point).norm() / scale);
            }
            for port in 0..ports {
                let column = admittances + port * mixtures..admittances + (port + 1) * mixtures;
                let square = |value: Complex64| value.norm_sqr();
                let whole: f64 = column.clone().map(|figure| square(first[figure][point])).sum();
                let apart: f64 = column.map(|figure| square(difference(figure, point))).sum();
                if whole > 0.0 {
                    size = largest(size, (apart / whole).sqrt());
                }
            }
            Disagreement { frequency_hz, gap, size }
        })
        .collect()
}

/// The larger one; what is no number is infinitely large.
fn largest(so_far: f64, next: f64) -> f64 {
    if next.is_nan() { f64::INFINITY } else { so_far.max(next) }
}

/// All figures of an interpolant at many frequencies, by figure.
fn figures(samples: &Samples<'_>, bary: &Bary, frequencies_hz: &[f64]) -> Vec<Vec<Complex64>> {
    let count = samples.components[0].scaled().count();
    let mut at_nodes = vec![Vec::with_capacity(bary.support.len()); count];
    for &sample in &bary.support {
        for (list, (figure, _)) in at_nodes.iter_mut().zip(samples.components[sample].scaled()) {
            list.push(figure);
        }
    }
    bary.values(frequencies_hz, &at_nodes)
}

/// Frequencies to compare at, Hz, with the number of samples below each.
fn places(samples_hz: &[f64], span: &Span, pair: [&Bary; 2]) -> Vec<(f64, usize)> {
    let ends_hz = std::iter::once(span.lowest_hz).chain(samples_hz.iter().copied());
    let gaps = ends_hz.zip(samples_hz.iter().copied().chain(std::iter::once(span.highest_hz)));
    let mut places = Vec::with_capacity(6 * samples_hz.len());
    // At a sample that one of the two leaves out, the other one is the truth.
    for (index, &sample_hz) in samples_hz.iter().enumerate() {
        if pair.iter().any(|bary| bary.support.binary_search(&index).is_err()) {
            let width_hz = |gap: usize| {
                let below_hz = if gap == 0 { span.lowest_hz } else { samples_hz[gap - 1] };
                samples_hz.get(gap).unwrap_or(&span.highest_hz) - below_hz
            };
            let wider = if width_hz(index) > width_hz(index + 1) { index } else { index + 1 };
            places.push((sample_hz, wider));
        }
    }
    for (gap, (from_hz, to_hz)) in gaps.enumerate() {
        if from_hz >= to_hz {
            continue;
        }
        let between_hz = [0.25, 0.5, 0.75].map(|part| from_hz + part * (to_hz - from_hz));
        let ends_hz =
            [(gap == 0).then_some(span.lowest_hz), (gap == samples_hz.len()).then_some(span.highest_hz)];
        places.extend(between_hz.into_iter().chain(ends_hz.into_iter().flatten()).map(|place| (place, gap)));
        for bary in pair {
            let steps_hz = [from_hz, between_hz[0], between_hz[1], between_hz[2], to_hz];
            for step_hz in steps_hz.windows(2) {
                let ends =
                    [(step_hz[0], bary.limit(step_hz[0], 1.0)), (step_hz[1], bary.limit(step_hz[1], -1.0))];
                near_pole(bary, ends, HALVINGS, &mut |place| places.push((place, gap)));
            }
        }
    }
    places
}

/// Halves a step as long as the denominator turns too far in it.
fn near_pole(bary: &Bary, ends: [(f64, Complex64); 2], halvings: u32, found: &mut impl FnMut(f64)) {
    let [(from_hz, from), (to_hz, to)] = ends;
    let turn = to * from.conj();
    if halvings == 0 || turn.im.abs() < TURN * turn.re {
        return;
    }
    let middle_hz = 0.5 * (from_hz + to_hz);
    found(middle_hz);
    let middle = (middle_hz, bary.limit(middle_hz, 1.0));
    near_pole(bary, [ends[0], middle], halvings - 1, found);
    near_pole(bary, [middle, ends[1]], halvings - 1, found);
}

impl Bary {
    /// Direction of the denominator, at a node the one toward `side` of it.
    fn limit(&self, frequency_hz: f64, side: f64) -> Complex64 {
        match self.blend(frequency_hz) {
            Blend::Node(index) => side * self.weights[index],
            Blend::Sum { denominator, .. } => denominator,
        }
    }
}
