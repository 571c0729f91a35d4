//! Where the next samples are worth most.

use super::check::Disagreement;
use super::range::Span;

/// Digits that one more sample gains, at least; measured on wires.
const DIGITS_PER_SAMPLE: f64 = 0.5;

/// Frequencies of the next samples, Hz, at most one in each gap between the samples.
///
/// `worst` is the largest disagreement, `allowed` the largest one that would do.
pub(super) fn next_hz(
    samples_hz: &[f64],
    span: &Span,
    disagreements: &[Disagreement],
    allowed: f64,
) -> Vec<f64> {
    let mut gaps: Vec<Option<Disagreement>> = vec![None; samples_hz.len() + 1];
    for &here in disagreements {
        let there = &mut gaps[here.gap];
        if there.is_none_or(|there| here.size > there.size) {
            *there = Some(here);
        }
    }
    let mut gaps: Vec<Disagreement> = gaps.into_iter().flatten().collect();
    let worst = gaps.iter().map(|gap| gap.size).fold(0.0, f64::max);
    // Where the interpolants have nothing in common, the size of the disagreement says nothing: the width decides.
    let digits = (worst.min(1.0) / allowed).log10();
    let count = ((digits / DIGITS_PER_SAMPLE).ceil().max(2.0) as usize).min(samples_hz.len());
    let width = |gap: &Disagreement| weighted_width(samples_hz, span, gap.gap);
    gaps.sort_by(|a, b| {
        let order = b.size.min(1.0).total_cmp(&a.size.min(1.0));
        order.then_with(|| width(b).total_cmp(&width(a)))
    });
    gaps.truncate(count);
    gaps.iter()
        .map(|gap| {
            let [from_hz, to_hz] = ends_hz(samples_hz, span, gap.gap);
            let at_sample = samples_hz.contains(&gap.frequency_hz);
            if gap.size < 1.0 && !at_sample { gap.frequency_hz } else { 0.5 * (from_hz + to_hz) }
        })
        .collect()
}

fn ends_hz(samples_hz: &[f64], span: &Span, gap: usize) -> [f64; 2] {
    let below = gap.checked_sub(1).map_or(span.lowest_hz, |index| samples_hz[index]);
    let above = samples_hz.get(gap).copied().unwrap_or(span.highest_hz);
    [below, above]
}

/// Width of a gap in the angle of the Chebyshev points, which crowd toward the ends.
fn weighted_width(samples_hz: &[f64], span: &Span, gap: usize) -> f64 {
    let angle = |frequency_hz: f64| {
        let part = (frequency_hz - span.lowest_hz) / (span.highest_hz - span.lowest_hz);
        (1.0 - 2.0 * part).clamp(-1.0, 1.0).acos()
    };
    let [from_hz, to_hz] = ends_hz(samples_hz, span, gap);
    angle(to_hz) - angle(from_hz)
}
