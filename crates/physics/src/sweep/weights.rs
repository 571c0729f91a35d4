//! The weights: what makes the interpolant pass best by the samples that it does not go through.

use nalgebra::{DMatrix, DVector};
use num_complex::Complex64;

use super::bary::Bary;
use super::sample::Components;

/// Samples of a section, ordered by frequency.
pub(super) struct Samples<'a> {
    pub frequencies_hz: &'a [f64],
    pub components: &'a [Components],
}

/// Which of the possible sets of samples an interpolant leaves out.
#[derive(Clone, Copy)]
pub(super) enum Witnesses {
    /// The interpolant that answers.
    First,
    /// Another one, to compare with.
    Second,
}

impl Witnesses {
    /// Indices of `count` of the `samples`, spread evenly.
    fn indices(self, count: usize, samples: usize) -> Vec<usize> {
        let shift = match self {
            Self::First => 0.25,
            Self::Second => 0.75,
        };
        (0..count).map(|index| (((index as f64 + shift) / count as f64) * samples as f64) as usize).collect()
    }
}

/// Equations over unknowns: some more than needed make the weights steady against rounding.
const SURPLUS: f64 = 1.2;

/// Samples to leave out, of `samples` with `components` figures each.
fn witness_count(samples: usize, components: usize) -> usize {
    // r·C ≥ surplus·(M − r)
    let count = SURPLUS * samples as f64 / (components as f64 + SURPLUS);
    (count.ceil() as usize).clamp(2, samples / 2 - 1)
}

/// Interpolant through all samples but the witnesses. Wants six samples or more.
pub(super) fn interpolant(samples: &Samples<'_>, witnesses: Witnesses) -> Bary {
    let count = samples.frequencies_hz.len();
    let components = samples.components[0].scaled().count();
    let witnesses = witnesses.indices(witness_count(count, components), count);
    let support: Vec<usize> = (0..count).filter(|index| !witnesses.contains(index)).collect();
    let loewner = Loewner { samples, witnesses: &witnesses, support: &support };
    let smallest = smallest_direction(loewner.matrix());
    let weights = (0..support.len())
        .map(|node| {
            Complex64::new(smallest[2 * node], smallest[2 * node + 1]) / loewner.node_scale(support[node])
        })
        .collect();
    let nodes_hz = support.iter().map(|&index| samples.frequencies_hz[index]).collect();
    Bary { support, nodes_hz, weights }
}

/// The linear equations of the weights.
struct Loewner<'a> {
    samples: &'a Samples<'a>,
    witnesses: &'a [usize],
    support: &'a [usize],
}

impl Loewner<'_> {
    /// Size of a sample, so that weights are sought among functions of even size: |Y| as mean over the ports.
    fn node_scale(&self, sample: usize) -> f64 {
        let scales = &self.samples.components[sample].admittance_scale_s;
        scales.iter().sum::<f64>() / scales.len() as f64
    }

    /// Real rows (real and imaginary part of each witness's figures) and columns (those of each weight).
    ///
    /// F_i·D(f_i) − N(f_i) = Σ_j [w_j·(F_i − F_j)/(f_i − f_j) + w_j*·(F_i − F_j*)/(f_i + f_j)], divided by the size
    /// of F_i, in units of the highest frequency.
    fn matrix(&self) -> DMatrix<f64> {
        let components = self.samples.components;
        let unit_hz = self.samples.frequencies_hz.last().copied().unwrap_or(1.0);
        let figures = components[0].scaled().count();
        let rows = 2 * figures * self.witnesses.len();
        let flat: Vec<Vec<Complex64>> =
            components.iter().map(|sample| sample.scaled().map(|(figure, _)| figure).collect()).collect();
        let mut matrix = DMatrix::zeros(rows, 2 * self.support.len());
        let mut columns = matrix.as_mut_slice().chunks_exact_mut(rows);
        for &j in self.support {
            let (Some(real), Some(imaginary)) = (columns.next(), columns.next()) else { break };
            let column_scale = unit_hz / self.node_scale(j);
            let pairs = real.chunks_exact_mut(2).zip(imaginary.chunks_exact_mut(2));
            let equations = self.witnesses.iter().flat_map(|&i| {
                let scaled = components[i].scaled();
                scaled.enumerate().map(move |(index, (figure, scale))| (i, index, figure, scale))
            });
            for ((real, imaginary), (i, index, figure, scale)) in pairs.zip(equations) {
                let (fi, fj) = (self.samples.frequencies_hz[i], self.samples.frequencies_hz[j]);
                let other = flat[j][index];
                let scale = column_scale / scale;
                let direct = (figure - other) * (scale / (fi - fj));
                let mirrored = (figure - other.conj()) * (scale / (fi + fj));
                let (sum, difference) = (direct + mirrored, direct - mirrored);
                real.copy_from_slice(&[sum.re, sum.im]);
                // j·(direct − mirrored)
                imaginary.copy_from_slice(&[-difference.im, difference.re]);
            }
        }
        matrix
    }
}

/// Rounds of inverse iteration. Each multiplies what does not belong by the square of the ratio of the two smallest
/// singular values; where that ratio is near one, either direction serves.
const ROUNDS: usize = 4;

/// Right singular vector of the smallest singular value.
fn smallest_direction(matrix: DMatrix<f64>) -> DVector<f64> {
    let columns = matrix.ncols();
    let mut triangle = matrix.qr().unpack_r();
    // Fewer equations than unknowns leave zeros; a touch of the largest entry keeps the solves finite.
    let rows = triangle.nrows();
    if rows < columns {
        triangle = triangle.resize_vertically(columns, 0.0);
    }
    let floor = triangle.amax().max(f64::MIN_POSITIVE) * f64::EPSILON;
    for index in 0..columns {
        let pivot = triangle[(index, index)];
        if pivot.abs() < floor {
            triangle[(index, index)] = if pivot < 0.0 { -floor } else { floor };
        }
    }
    let mut vector = DVector::from_element(columns, 1.0);
    for _ in 0..ROUNDS {
        // (RᵀR)·next = vector
        if !triangle.tr_solve_upper_triangular_mut(&mut vector)
            || !triangle.solve_upper_triangular_mut(&mut vector)
        {
            break;
        }
        let size = vector.norm();
        vector /= size.max(f64::MIN_POSITIVE);
    }
    vector
}
