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
    /// J over each step of the cosine of the angle with the run, from −1 to 1, A·m: powers of the place in the step.
    cells: Vec<[Complex64; POINTS]>,
    steps_per_unit: f64,
    kinks: Vec<Kink>,
}

/// Points of the interpolation.
const POINTS: usize = 7;

/// First of them, in steps from the beginning of a cell. Halves keep all of them off ±1.
const FIRST: f64 = -2.5;

/// Step of the table in radians of the fastest wave along the run: seven points then err by 2.4e-3·0.25⁷, about 1e-7 of
/// the largest value.
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
#[derive(Clone, Debug)]
pub(super) struct Kink {
    /// From the middle of the run, m.
    pub along_m: f64,
    /// Jump of the current downward, A.
    pub current_a: Complex64,
    /// Jump of its slope upward, A/m.
    pub slope_a_per_m: Complex64,
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
        let cells = cells(&table(&kinks, k, steps_per_unit));
        Self { direction, middle_m, half_length_m, cells, steps_per_unit, kinks }
    }

    /// Where the current or its slope jumps, ends included: the whole of the run's sinusoids.
    pub fn kinks(&self) -> &[Kink] {
        &self.kinks
    }

    /// J(c) = ∫ I(s)·e^(jk·c·s) ds with s from the middle of the run and c the cosine of the angle with it, A·m.
    pub fn moment_a_m(&self, cosine: f64) -> Complex64 {
        let place = (cosine.clamp(-1.0, 1.0) + 1.0) * self.steps_per_unit;
        let cell = (place as usize).min(self.cells.len() - 1);
        let x = place - cell as f64;
        self.cells[cell].iter().rev().fold(Complex64::ZERO, |sum, coefficient| sum * x + coefficient)
    }
}

/// The polynomial through each seven consecutive points, for the cell between the third and the fourth.
fn cells(table: &[Complex64]) -> Vec<[Complex64; POINTS]> {
    let basis = basis();
    let cell = |points: &[Complex64]| {
        std::array::from_fn(|power| {
            points.iter().zip(&basis).map(|(point, polynomial)| point * polynomial[power]).sum()
        })
    };
    table.windows(POINTS).map(cell).collect()
}

/// Powers of Lagrange's polynomials: one at their own point, zero at the others.
fn basis() -> [[f64; POINTS]; POINTS] {
    std::array::from_fn(|own| {
        let mut polynomial = [0.0; POINTS];
        polynomial[0] = 1.0;
        for other in (0..POINTS).filter(|&other| other != own) {
            // times (x − x_other)/(x_own − x_other)
            let scale = (own as f64 - other as f64).recip();
            let place = FIRST + other as f64;
            for power in (0..POINTS).rev() {
                let below = if power > 0 { polynomial[power - 1] } else { 0.0 };
                polynomial[power] = scale * (below - place * polynomial[power]);
            }
        }
        polynomial
    })
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
    let first = -1.0 + FIRST * step;
    let count = 2 * steps_per_unit as usize + POINTS - 1;
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
