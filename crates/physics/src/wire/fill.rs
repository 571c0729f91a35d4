//! The matrix of the moment method at one frequency.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::coupling::{Coupling, GAUSS};
use super::mesh::{Arm, Mesh};
use super::shapes::Shapes;
use super::skeleton::End;
use super::structure::WireShape;
use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};

/// A symmetric complex matrix, lower triangle row by row, real and imaginary parts apart.
#[derive(Clone, Debug, Default)]
pub(super) struct Symmetric {
    pub order: usize,
    pub re: Vec<f64>,
    pub im: Vec<f64>,
}

impl Symmetric {
    pub fn zero(order: usize) -> Self {
        let length = order * (order + 1) / 2;
        Self { order, re: vec![0.0; length], im: vec![0.0; length] }
    }

    pub fn at(&self, row: usize, column: usize) -> Complex64 {
        let index = Self::index(row.max(column), row.min(column));
        Complex64::new(self.re[index], self.im[index])
    }

    fn index(row: usize, column: usize) -> usize {
        row * (row + 1) / 2 + column
    }

    fn add(&mut self, row: usize, column: usize, value: Complex64) {
        let index = Self::index(row, column);
        self.re[index] += value.re;
        self.im[index] += value.im;
    }
}

/// Impedances between the end currents of two segments, Ω: `ohm[a][b]` with 0 for the beginning, 1 for the end.
type Block = [[Complex64; 2]; 2];

/// Which unknowns have a share in the current at an end of a segment.
#[derive(Clone, Debug)]
pub(super) struct Shares {
    /// By segment, then beginning and end: unknown and its sign there.
    at_ends: Vec<[Vec<(usize, f64)>; 2]>,
}

impl Shares {
    pub fn new(mesh: &Mesh) -> Self {
        let mut at_ends = vec![[Vec::new(), Vec::new()]; mesh.segments.len()];
        for (index, unknown) in mesh.unknowns.iter().enumerate() {
            for &Arm { segment, end, sign } in unknown.arms.iter().flatten() {
                at_ends[segment][usize::from(end == End::To)].push((index, sign));
            }
        }
        Self { at_ends }
    }

    /// Adds the block of two segments to the matrix.
    fn scatter(&self, matrix: &mut Symmetric, (p, q): (usize, usize), block: &Block) {
        for (a, a_shares) in self.at_ends[p].iter().enumerate() {
            for (b, b_shares) in self.at_ends[q].iter().enumerate() {
                for &(u, u_sign) in a_shares {
                    for &(v, v_sign) in b_shares {
                        let ohm = u_sign * v_sign * block[a][b];
                        if p == q {
                            if u >= v {
                                matrix.add(u, v, ohm);
                            }
                        } else if u == v {
                            // The transposed block counts as well.
                            matrix.add(u, v, 2.0 * ohm);
                        } else {
                            matrix.add(u.max(v), u.min(v), ohm);
                        }
                    }
                }
            }
        }
    }
}

/// Matrix of all couplings and of the wires' own impedance.
pub(super) fn matrix(
    mesh: &Mesh,
    shares: &Shares,
    couplings: &[Coupling],
    wires: &[WireShape],
    frequency_hz: f64,
) -> Symmetric {
    let k = wave_number_rad_per_m(frequency_hz);
    let shapes: Vec<Shapes> =
        mesh.segments.iter().map(|segment| Shapes::new(k, segment.length_m())).collect();
    let mut matrix = Symmetric::zero(mesh.unknowns.len());
    for coupling in couplings {
        let mut near = coupling.near.iter().peekable();
        let mut pair = 0;
        for p in 0..shapes.len() {
            for q in 0..=p {
                let mut sums = wave_sums(coupling, k, pair);
                while let Some(entry) = near.next_if(|near| near.row == p && near.column == q) {
                    for (sum, correction) in sums.iter_mut().zip(entry.sums) {
                        *sum += correction;
                    }
                }
                if p == q && coupling.sign > 0.0 {
                    let length_m = mesh.segments[p].length_m();
                    // −k²R/2, the kernel's next term, has a kink that two points miss.
                    sums[0] -= 0.5 * k * k * length_m * KINK_EVEN;
                    sums[3] -= 0.5 * k * k * length_m * KINK_ODD;
                }
                let block = block(&shapes[p], &shapes[q], coupling.cosine[pair], &sums);
                let scale = Complex64::new(0.0, coupling.sign * k * VACUUM_IMPEDANCE_OHM / (2.0 * TAU));
                shares.scatter(&mut matrix, (p, q), &block.map(|row| row.map(|sum| scale * sum)));
                pair += 1;
            }
        }
    }
    for (p, segment) in mesh.segments.iter().enumerate() {
        let wire = &wires[mesh.wire_of[p]];
        let length_m = segment.length_m();
        let series = wire.material.series_impedance_ohm_per_m(wire.radius_m, frequency_hz);
        let [same, cross] = Shapes::overlaps(k, length_m).map(|overlap| series * overlap);
        shares.scatter(&mut matrix, (p, p), &[[same, cross], [cross, same]]);
        if let Some(insulation) = &wire.material.insulation {
            // −δ/(jω)·∫I′I′ ds
            let scale =
                Complex64::new(0.0, insulation.elastance_m_per_f(wire.radius_m) / (TAU * frequency_hz));
            let [same, cross] = Shapes::slope_overlaps(k, length_m).map(|overlap| scale * overlap);
            shares.scatter(&mut matrix, (p, p), &[[same, cross], [cross, same]]);
        }
    }
    matrix
}

/// Exact ∫∫R minus the two-point rule's, over L³/4, even and odd: 4/3·(1 − √3/2)/… of the functions 1 and ξ.
const KINK_EVEN: f64 = 4.0 / 3.0 - 2.0 * GAUSS;
const KINK_ODD: f64 = 2.0 * GAUSS - 0.8;

/// Σ e^(−jkR)/R over the pairs of Gauss points: plain, with the row's sign, with the column's, with both.
fn wave_sums(coupling: &Coupling, k: f64, pair: usize) -> [Complex64; 4] {
    let [mm, mp, pm, pp] = std::array::from_fn(|index| {
        let (sin, cos) = (k * coupling.distance_m[index][pair]).sin_cos();
        let inverse = coupling.inverse_per_m[index][pair];
        Complex64::new(cos * inverse, -sin * inverse)
    });
    [mm + mp + pm + pp, pm + pp - mm - mp, mp + pp - mm - pm, mm + pp - mp - pm]
}

/// Impedances over jkη/4π between end currents.
fn block(p: &Shapes, q: &Shapes, cosine: f64, sums: &[Complex64; 4]) -> Block {
    let [ee, oe, eo, oo] = *sums;
    // Of the mean of the end currents (even) and of half their difference (odd): A-part − Φ-part
    let even_even = cosine * p.even * q.even * ee - p.even_slope * q.even_slope * oo;
    let even_odd = cosine * p.even * q.odd * eo - p.even_slope * q.odd_slope * oe;
    let odd_even = cosine * p.odd * q.even * oe - p.odd_slope * q.even_slope * eo;
    let odd_odd = cosine * p.odd * q.odd * oo - p.odd_slope * q.odd_slope * ee;
    [
        [
            0.25 * (even_even - even_odd - odd_even + odd_odd),
            0.25 * (even_even + even_odd - odd_even - odd_odd),
        ],
        [
            0.25 * (even_even - even_odd + odd_even - odd_odd),
            0.25 * (even_even + even_odd + odd_even + odd_odd),
        ],
    ]
}
