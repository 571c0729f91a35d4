//! Barycentric form of a rational function that is real in jω.
//!
//! With samples F_j at f_j, weights w_j, and the same conjugated at −f_j:
//!
//! r(f) = N/D,   N = Σ [w_j·F_j/(f − f_j) + (w_j·F_j)*/(f + f_j)],   D the same with F = 1.
//!
//! The two terms of a pair have one denominator, and everything but w_j·F_j is real:
//!
//! ½N = f·Σ Re(w_j·F_j)·g_j + j·Σ f_j·Im(w_j·F_j)·g_j,   g_j = 1/(f² − f_j²).

use nalgebra::DMatrix;
use num_complex::Complex64;

/// Weights of an interpolant, and the samples it goes through.
#[derive(Clone, Debug)]
pub(super) struct Bary {
    /// Indices of the samples.
    pub support: Vec<usize>,
    /// Their frequencies, Hz.
    pub nodes_hz: Vec<f64>,
    /// Their weights.
    pub weights: Vec<Complex64>,
}

/// What one frequency makes of the samples: a sum over them, or one of them.
pub(super) enum Blend {
    /// The frequency is that of this node (index into the support).
    Node(usize),
    /// w_j·g_j of each node, and D/2.
    Sum { shares: Vec<Complex64>, denominator: Complex64 },
}

impl Bary {
    pub fn blend(&self, frequency_hz: f64) -> Blend {
        let mut shares = Vec::with_capacity(self.weights.len());
        for (index, (&node_hz, &weight)) in self.nodes_hz.iter().zip(&self.weights).enumerate() {
            let difference = (frequency_hz - node_hz) * (frequency_hz + node_hz);
            if difference.abs() < f64::MIN_POSITIVE {
                return Blend::Node(index);
            }
            shares.push(weight / difference);
        }
        let half = shares.iter().zip(&self.nodes_hz).fold(Complex64::ZERO, |sum, (share, node_hz)| {
            sum + Complex64::new(frequency_hz * share.re, node_hz * share.im)
        });
        Blend::Sum { shares, denominator: half }
    }

    /// Matrix of the interpolant; `matrix` gives that of each sample by its index.
    pub fn matrix<'a>(
        &self,
        frequency_hz: f64,
        blend: &Blend,
        matrix: impl Fn(usize) -> &'a DMatrix<Complex64>,
    ) -> DMatrix<Complex64> {
        match blend {
            Blend::Node(index) => matrix(self.support[*index]).clone(),
            Blend::Sum { shares, denominator } => {
                let (rows, columns) = matrix(self.support[0]).shape();
                let mut sum = DMatrix::zeros(rows, columns);
                for ((&sample, share), node_hz) in self.support.iter().zip(shares).zip(&self.nodes_hz) {
                    for (sum, value) in sum.iter_mut().zip(matrix(sample)) {
                        let product: Complex64 = share * value;
                        *sum += Complex64::new(frequency_hz * product.re, node_hz * product.im);
                    }
                }
                sum * denominator.inv()
            }
        }
    }

    /// Values at many frequencies: `samples` holds one list per quantity, with its value at each node.
    pub fn values(&self, frequencies_hz: &[f64], samples: &[Vec<Complex64>]) -> Vec<Vec<Complex64>> {
        let mut out: Vec<Vec<Complex64>> =
            samples.iter().map(|_| Vec::with_capacity(frequencies_hz.len())).collect();
        let parts = |values: &[Complex64]| -> Vec<[f64; 2]> {
            let scaled = values.iter().zip(&self.weights).zip(&self.nodes_hz);
            scaled.map(|((value, weight), node_hz)| (value * weight, node_hz)).map(to_parts).collect()
        };
        let denominator = parts(&vec![Complex64::ONE; self.nodes_hz.len()]);
        let numerators: Vec<_> = samples.iter().map(|values| parts(values)).collect();
        let mut sums = vec![Sums::default(); samples.len() + 1];
        for block_hz in frequencies_hz.chunks(BLOCK) {
            sums.fill(Sums::default());
            for (node, &node_hz) in self.nodes_hz.iter().enumerate() {
                let reciprocal = reciprocals(block_hz, node_hz);
                sums[0].add(&reciprocal, denominator[node]);
                for (sum, parts) in sums[1..].iter_mut().zip(&numerators) {
                    sum.add(&reciprocal, parts[node]);
                }
            }
            for (index, &frequency_hz) in block_hz.iter().enumerate() {
                let inverse = sums[0].at(index, frequency_hz).inv();
                for ((out, sum), values) in out.iter_mut().zip(&sums[1..]).zip(samples) {
                    let ratio = sum.at(index, frequency_hz) * inverse;
                    out.push(if ratio.is_finite() { ratio } else { self.at_node(frequency_hz, values) });
                }
            }
        }
        out
    }

    /// Value at the node of this frequency.
    fn at_node(&self, frequency_hz: f64, values: &[Complex64]) -> Complex64 {
        let distance = |&index: &usize| (self.nodes_hz[index] - frequency_hz).abs();
        let nearest = (0..values.len()).min_by(|a, b| distance(a).total_cmp(&distance(b)));
        nearest.map_or(Complex64::ZERO, |index| values[index])
    }
}

/// Frequencies per block: long enough for vector instructions, short enough for the cache.
const BLOCK: usize = 64;

/// ½N without the factor f of its real part, for a block of frequencies.
#[derive(Clone, Copy)]
struct Sums {
    real: [f64; BLOCK],
    imaginary: [f64; BLOCK],
}

impl Default for Sums {
    fn default() -> Self {
        Self { real: [0.0; BLOCK], imaginary: [0.0; BLOCK] }
    }
}

impl Sums {
    fn add(&mut self, reciprocal: &[f64; BLOCK], [real, imaginary]: [f64; 2]) {
        for (sum, g) in self.real.iter_mut().zip(reciprocal) {
            *sum += real * g;
        }
        for (sum, g) in self.imaginary.iter_mut().zip(reciprocal) {
            *sum += imaginary * g;
        }
    }

    fn at(&self, index: usize, frequency_hz: f64) -> Complex64 {
        Complex64::new(frequency_hz * self.real[index], self.imaginary[index])
    }
}

/// Re(w·F) and f_j·Im(w·F).
fn to_parts((product, node_hz): (Complex64, &f64)) -> [f64; 2] {
    [product.re, node_hz * product.im]
}

/// g = 1/(f² − f_j²); infinite at the node itself.
fn reciprocals(block_hz: &[f64], node_hz: f64) -> [f64; BLOCK] {
    let mut out = [0.0; BLOCK];
    for (out, &frequency_hz) in out.iter_mut().zip(block_hz) {
        *out = ((frequency_hz - node_hz) * (frequency_hz + node_hz)).recip();
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Any weights interpolate, and give a function that is conjugate at negative frequencies.
    #[test]
    fn interpolates_and_is_real_in_jw() {
        let nodes_hz = vec![1.0, 2.0, 3.5];
        let weights = vec![Complex64::new(1.0, 0.2), Complex64::new(-0.7, 0.1), Complex64::new(0.3, -0.4)];
        let bary = Bary { support: vec![0, 1, 2], nodes_hz: nodes_hz.clone(), weights };
        let samples = [Complex64::new(1.0, -2.0), Complex64::new(0.5, 0.1), Complex64::new(0.0, 3.0)];
        let matrices = samples.map(|sample| DMatrix::from_element(1, 1, sample));
        let at = |f: f64| bary.matrix(f, &bary.blend(f), |index| &matrices[index])[(0, 0)];
        let frequencies_hz: Vec<f64> = (0..200).map(|i| 0.51 + 0.025 * f64::from(i)).collect();
        let many = &bary.values(&frequencies_hz, &[samples.to_vec()])[0];
        for (&f, value) in frequencies_hz.iter().zip(many) {
            assert!((at(f) - value).norm() < 1e-12 * value.norm(), "{f}");
            assert!((at(-f) - value.conj()).norm() < 1e-12 * value.norm(), "{f}");
        }
        for (&node_hz, sample) in nodes_hz.iter().zip(&samples) {
            assert!((at(node_hz) - sample).norm() < 1e-14);
            assert!((at(node_hz + 1e-9) - sample).norm() < 1e-6);
        }
    }
}
