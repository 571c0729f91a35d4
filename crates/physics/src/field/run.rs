//! Straight runs of wire: their far field is a function of one angle.

use num_complex::Complex64;

use super::space::{Vec3, advance, cross, dot, length, sub};
use crate::wire::{EndCurrents, Segment};

/// A straight run of segments and the integral of its current against the wave toward each angle.
#[derive(Clone, Debug)]
pub(super) struct Run {
    /// Along the current.
    pub direction: Vec3,
    /// Middle of the run, m: the phase refers to it.
    pub middle_m: Vec3,
    pub half_length_m: f64,
    /// J at even steps of the cosine of the angle with the run, from beyond −1 to beyond 1, A·m.
    table: Vec<Complex64>,
    steps_per_unit: f64,
}

/// Points of the interpolation, to each side.
const SIDE: usize = 3;

/// Step of the table in radians of the fastest wave along the run: sixth-order interpolation then errs by
/// 5e-3·0.25⁶, about 1e-6 of the largest value.
const STEP_RAD: f64 = 0.25;

/// Sine of the angle below which neighbours are one run: it bends the phase by less than 1e-6 in a hundred wavelengths.
const STRAIGHT: f64 = 1e-9;

/// Distance below which an end and a beginning are one point, m.
const JOINED_M: f64 = 1e-9;

/// Divides segments into runs, each of neighbours in one straight line.
pub(super) fn runs(segments: &[Segment], currents: &[EndCurrents], k: f64) -> Vec<Run> {
    let count = segments.len().min(currents.len());
    let mut runs = Vec::new();
    let mut first = 0;
    for next in 1..=count {
        if next == count || !continues(&segments[first], &segments[next - 1], &segments[next]) {
            runs.push(Run::new(&segments[first..next], &currents[first..next], k));
            first = next;
        }
    }
    runs
}

/// Whether `next` goes on where `before` ends, in the line of the run that begins with `first`.
fn continues(first: &Segment, before: &Segment, next: &Segment) -> bool {
    let line = sub(before.to_m, first.from_m);
    let onward = sub(next.to_m, next.from_m);
    length(sub(next.from_m, before.to_m)) < JOINED_M
        && dot(line, onward) > 0.0
        && length(cross(line, onward)) < STRAIGHT * length(line) * length(onward)
}

/// A point of a run where the current or its slope jumps.
struct Kink {
    /// From the middle of the run, m.
    along_m: f64,
    /// Jump of the current downward, A.
    current_a: Complex64,
    /// Jump of its slope upward, A/m.
    slope_a_per_m: Complex64,
}

impl Run {
    fn new(segments: &[Segment], currents: &[EndCurrents], k: f64) -> Self {
        let from_m = segments[0].from_m;
        let span = sub(segments[segments.len() - 1].to_m, from_m);
        let whole_m = length(span);
        let direction = span.map(|component| component / whole_m);
        let half_length_m = 0.5 * whole_m;
        let steps_per_unit = (k * half_length_m / STEP_RAD).max(1.0).ceil();
        let kinks = kinks(segments, currents, k, half_length_m);
        let middle_m = advance(from_m, direction, half_length_m);
        let table = table(&kinks, k, steps_per_unit);
        Self { direction, middle_m, half_length_m, table, steps_per_unit }
    }

    /// J(c) = ∫ I(s)·e^(jk·c·s) ds with s from the middle of the run and c the cosine of the angle with it, A·m.
    pub fn moment_a_m(&self, cosine: f64) -> Complex64 {
        let place = (cosine.clamp(-1.0, 1.0) + 1.0) * self.steps_per_unit;
        let cell = (place as usize).min(2 * self.steps_per_unit as usize - 1);
        // The table begins SIDE − ½ steps below −1, so that neither end of the range is a point of it.
        let x = place - cell as f64;
        lagrange(&self.table[cell..cell + 2 * SIDE + 1], x)
    }
}

/// Value at `x` (0 to 1) of the polynomial through seven points at −3 + ½, −2 + ½, … 3 + ½.
fn lagrange(points: &[Complex64], x: f64) -> Complex64 {
    // Barycentric weights of seven even points: (−1)^i·C(6, i).
    const WEIGHTS: [f64; 7] = [1.0, -6.0, 15.0, -20.0, 15.0, -6.0, 1.0];
    let mut numerator = Complex64::ZERO;
    let mut denominator = 0.0;
    for (index, (&point, weight)) in points.iter().zip(WEIGHTS).enumerate() {
        let distance = x - (index as f64 - 2.5);
        if distance.abs() < 1e-12 {
            return point;
        }
        let share = weight / distance;
        numerator += point * share;
        denominator += share;
    }
    numerator / denominator
}

fn kinks(segments: &[Segment], currents: &[EndCurrents], k: f64, half_length_m: f64) -> Vec<Kink> {
    let mut along_m = -half_length_m;
    let mut kinks = Vec::with_capacity(segments.len() + 1);
    let (mut current_a, mut slope_a_per_m) = (Complex64::ZERO, Complex64::ZERO);
    for (segment, ends) in segments.iter().zip(currents) {
        let length_m = segment.length_m();
        let [slope_from, slope_to] = slopes(ends, k, length_m);
        kinks.push(Kink {
            along_m,
            current_a: current_a - ends.from_a,
            slope_a_per_m: slope_from - slope_a_per_m,
        });
        (current_a, slope_a_per_m) = (ends.to_a, slope_to);
        along_m += length_m;
    }
    kinks.push(Kink { along_m, current_a, slope_a_per_m: -slope_a_per_m });
    kinks
}

/// Slopes of the current at both ends, A/m.
pub(super) fn slopes(ends: &EndCurrents, k: f64, length_m: f64) -> [Complex64; 2] {
    // I' = k·[I₂·cos ks − I₁·cos k(L − s)]/sin kL
    let (sine, cosine) = (k * length_m).sin_cos();
    let scale = k / sine;
    [scale * (ends.to_a - ends.from_a * cosine), scale * (ends.to_a * cosine - ends.from_a)]
}

/// J at the points of the table.
///
/// On a sinusoid I'' = −k²I, so that integration by parts leaves the ends of the segments only:
///
/// J = Σ (jkc·ΔI + ΔI')·e^(jkcs)/[k²·(1 − c²)] over the kinks, ΔI downward, ΔI' upward.
fn table(kinks: &[Kink], k: f64, steps_per_unit: f64) -> Vec<Complex64> {
    let step = 1.0 / steps_per_unit;
    let first = -1.0 - (SIDE as f64 - 0.5) * step;
    let count = 2 * steps_per_unit as usize + 2 * SIDE;
    let mut constant = vec![Complex64::ZERO; count];
    let mut rising = vec![Complex64::ZERO; count];
    for kink in kinks {
        // The wave at one point of the table is that at the last one, turned.
        let turn = Complex64::cis(k * step * kink.along_m);
        let mut wave = Complex64::cis(k * first * kink.along_m);
        for (constant, rising) in constant.iter_mut().zip(&mut rising) {
            *constant += kink.slope_a_per_m * wave;
            *rising += kink.current_a * wave;
            wave *= turn;
        }
    }
    constant
        .iter()
        .zip(&rising)
        .enumerate()
        .map(|(index, (constant, rising))| {
            let c = first + index as f64 * step;
            (constant + Complex64::new(0.0, k * c) * rising) / (k * k * (1.0 - c * c))
        })
        .collect()
}
