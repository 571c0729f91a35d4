//! The four functions of one soil at one frequency, tabulated over (ρ, ζ).

use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::lateral::Lateral;
use super::lattice::{Group, Lattice, RHO_STEP, Waves, ZETA_STEP, zeta};
use super::spectrum::{GroundKernels, StaticWeights, of_roots};
use crate::wire::lanes::{Lanes, padded};

/// Where a table is read: four nodes each way.
pub(super) const STENCIL: usize = 4;

/// Real and imaginary parts of S_h, S_f, S_z, S_w, each times R·e^(jR), without the static images' weights.
///
/// Smooth, and of order 1: what a plane wave would find as a reflection coefficient far out, and nothing near.
pub(super) type Node = [f32; 8];

pub(super) struct Table {
    lattice: &'static Lattice,
    first_zeta: i32,
    zetas: usize,
    /// Rows of one ρ, beginning with the mirror of the first beyond 0.
    nodes: Vec<Node>,
    far: Option<Far>,
}

/// Nodes from some row on with the lateral wave parted from the rest.
struct Far {
    lateral: Lateral,
    /// First row of cells, and of nodes (one before).
    first: usize,
    /// The rest, and the wave's amplitude.
    nodes: Vec<[Node; 2]>,
}

/// Of a step.
const EDGE: f64 = 1e-6;

impl Table {
    /// Prepares the range of normalised ρ (from 0) and ζ.
    pub fn new(epsilon: Complex64, rho_max: f64, [zeta_min, zeta_max]: [f64; 2]) -> Self {
        let lattice = Lattice::for_zeta(zeta_min);
        // Ends that are nodes shall not fall out by rounding.
        let last = (lattice.place(rho_max) + EDGE).floor() as usize + STENCIL - 2;
        let place = |zeta: f64| zeta.ln() / ZETA_STEP;
        let first_zeta = (place(zeta_min) - EDGE).floor() as i32 - 1;
        let last_zeta = (place(zeta_max) + EDGE).floor() as i32 + 2;
        let zetas = (last_zeta - first_zeta + 1) as usize;
        let mut table =
            Self { lattice, first_zeta, zetas, nodes: vec![[0.0; 8]; (last + 2) * zetas], far: None };
        let weights = StaticWeights::new(epsilon);
        for group in lattice.groups_to(last) {
            let (count, window) = group.window(epsilon);
            let spectrum = spectrum(epsilon, group, count, window);
            let mut weighed: [Vec<f64>; 8] = std::array::from_fn(|_| vec![0.0; padded(count)]);
            for place in 0..zetas {
                let index = first_zeta + place as i32;
                let decay = group.decay(index);
                let waves = padded(count).min(decay.re.len());
                let nodes = group.bessel.len().min(last + 1 - group.first);
                let mut sums = [[0.0; 8]; 16];
                Arch::new().dispatch(Sum {
                    spectrum: &spectrum,
                    decay,
                    waves,
                    bessel: &group.bessel[..nodes],
                    weighed: &mut weighed,
                    sums: &mut sums[..nodes],
                });
                for (offset, sums) in sums[..nodes].iter().enumerate() {
                    let row = group.first + offset;
                    let node = normalised(sums, lattice.rho(row), zeta(index), &weights);
                    table.nodes[(row + 1) * zetas + place] = node;
                }
            }
        }
        // S_w is odd in ρ, the others are even.
        for place in 0..zetas {
            let [h0, h1, f0, f1, z0, z1, w0, w1] = table.nodes[2 * zetas + place];
            table.nodes[place] = [h0, h1, f0, f1, z0, z1, -w0, -w1];
        }
        let needed = Lateral::if_needed(epsilon, RHO_STEP, rho_max, zeta_min);
        table.far = needed.map(|lateral| table.parted(lateral, last));
        table
    }

    /// Takes the lateral wave from the rows where it is one of its own.
    fn parted(&self, lateral: Lateral, last: usize) -> Far {
        let first = (self.lattice.place(lateral.begins).floor() as usize + 1).min(last - 2);
        let mut nodes = Vec::with_capacity((last + 2 - first) * self.zetas);
        for row in first - 1..=last {
            let rho = self.lattice.rho(row);
            let integrand = lateral.at(rho);
            for place in 0..self.zetas {
                let whole = self.nodes[(row + 1) * self.zetas + place];
                let zeta = zeta(self.first_zeta + place as i32);
                if lateral.fade(rho, zeta) < FADED {
                    nodes.push([whole, [0.0; 8]]);
                    continue;
                }
                let amplitude = integrand.amplitude(zeta);
                let part = parts(amplitude * (lateral.wave(rho, zeta) * Complex64::cis(rho.hypot(zeta))));
                let rest = std::array::from_fn(|index| (f64::from(whole[index]) - part[index]) as f32);
                nodes.push([rest, parts(amplitude).map(|part| part as f32)]);
            }
        }
        Far { lateral, first, nodes }
    }
}

/// Below it the lateral wave is nothing.
const FADED: f64 = 1e-7;

fn parts(kernels: GroundKernels) -> [f64; 8] {
    let values = kernels.values();
    std::array::from_fn(|index| if index % 2 == 0 { values[index / 2].re } else { values[index / 2].im })
}

fn normalised(sums: &[f64; 8], rho: f64, zeta: f64, weights: &StaticWeights) -> Node {
    let distance = rho.hypot(zeta);
    let turn = Complex64::cis(distance) * distance;
    let value = |index: usize| Complex64::new(sums[2 * index], sums[2 * index + 1]) * turn;
    let parts = [
        value(0),
        value(1) - weights.charge,
        value(2) - weights.vertical,
        value(3) - weights.cross * (rho / (distance + zeta)),
    ];
    std::array::from_fn(|index| {
        let part = parts[index / 2];
        (if index % 2 == 0 { part.re } else { part.im }) as f32
    })
}

/// Factors of the waves of a group, padded, in the order of a node.
fn spectrum(epsilon: Complex64, group: &Group, count: usize, window: Option<&[f64]>) -> [Vec<f64>; 8] {
    let mut parts: [Vec<f64>; 8] = std::array::from_fn(|_| vec![0.0; padded(count)]);
    for wave in 0..count {
        let (lambda, u0) = (group.lambda[wave], group.u0[wave]);
        let left = window.map_or(1.0, |window| window[wave]);
        let values = of_roots(epsilon, lambda, u0, (lambda * lambda - epsilon).sqrt()).values();
        for (index, value) in values.into_iter().enumerate() {
            parts[2 * index][wave] = value.re * left;
            parts[2 * index + 1][wave] = value.im * left;
        }
    }
    parts
}

/// Sums over the waves of a group at one ζ, for each of its ρ.
struct Sum<'a> {
    spectrum: &'a [Vec<f64>; 8],
    decay: &'a Waves,
    waves: usize,
    bessel: &'a [[Waves; 2]],
    weighed: &'a mut [Vec<f64>; 8],
    sums: &'a mut [[f64; 8]],
}

impl WithSimd for Sum<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let vectors = self.waves / S::F64_LANES;
        let (decay_re, _) = S::as_simd_f64s(&self.decay.re[..self.waves]);
        let (decay_im, _) = S::as_simd_f64s(&self.decay.im[..self.waves]);
        for index in 0..4 {
            let (re, _) = S::as_simd_f64s(&self.spectrum[2 * index][..self.waves]);
            let (im, _) = S::as_simd_f64s(&self.spectrum[2 * index + 1][..self.waves]);
            let [to_re, to_im] =
                self.weighed.get_disjoint_mut([2 * index, 2 * index + 1]).expect("two of eight");
            let (to_re, _) = S::as_mut_simd_f64s(&mut to_re[..self.waves]);
            let (to_im, _) = S::as_mut_simd_f64s(&mut to_im[..self.waves]);
            for at in 0..vectors {
                let (a, b) = (Lanes::new(simd, re[at]), Lanes::new(simd, im[at]));
                let (c, d) = (Lanes::new(simd, decay_re[at]), Lanes::new(simd, decay_im[at]));
                to_re[at] = b.times_from(d, a * c).value;
                to_im[at] = b.times_plus(c, a * d).value;
            }
        }
        let weighed = self.weighed.each_ref().map(|part| S::as_simd_f64s(&part[..self.waves]).0);
        for (sums, bessel) in self.sums.iter_mut().zip(self.bessel) {
            let bessel = bessel.each_ref().map(|waves| {
                (S::as_simd_f64s(&waves.re[..self.waves]).0, S::as_simd_f64s(&waves.im[..self.waves]).0)
            });
            let mut totals = [Lanes::splat(simd, 0.0); 8];
            for (at, zeroth) in bessel[0].0.iter().enumerate() {
                let zeroth = (Lanes::new(simd, *zeroth), Lanes::new(simd, bessel[0].1[at]));
                let first = (Lanes::new(simd, bessel[1].0[at]), Lanes::new(simd, bessel[1].1[at]));
                for index in 0..4 {
                    let (c, d) = if index == 3 { first } else { zeroth };
                    let (a, b) = (
                        Lanes::new(simd, weighed[2 * index][at]),
                        Lanes::new(simd, weighed[2 * index + 1][at]),
                    );
                    totals[2 * index] = b.times_from(d, a.times_plus(c, totals[2 * index]));
                    totals[2 * index + 1] = b.times_plus(c, a.times_plus(d, totals[2 * index + 1]));
                }
            }
            *sums = totals.map(Lanes::sum);
        }
    }
}

/// A point's cell and its places in it, 0 to 1.
#[derive(Clone, Copy, Default)]
pub(super) struct Cell {
    pub row: u32,
    pub column: u32,
    pub along: f32,
    pub across: f32,
}

impl Table {
    /// Scales for [`Self::read`]: 1/ρ0, steps per unit of asinh and ln, and nodes before the first.
    pub fn scales(&self) -> [f64; 4] {
        [self.lattice.rho0.recip(), RHO_STEP.recip(), ZETA_STEP.recip(), f64::from(self.first_zeta) + 1.0]
    }

    /// Whether a cell's sixteen nodes are there.
    #[inline(always)]
    pub fn holds(&self, cell: &Cell) -> bool {
        (cell.column as usize) + STENCIL <= self.zetas
            && (cell.row as usize + STENCIL) * self.zetas <= self.nodes.len()
    }

    /// Cubic interpolation each way: all, or all but a lateral wave.
    #[inline(always)]
    pub fn read(&self, cell: &Cell) -> Node {
        let (along, across) = (cubic(cell.along), cubic(cell.across));
        let mut sum = [0.0_f32; 8];
        for (row, weight) in along.into_iter().enumerate() {
            let start = (cell.row as usize + row) * self.zetas + cell.column as usize;
            let nodes: &[Node; STENCIL] = self.nodes[start..start + STENCIL].try_into().expect("four nodes");
            for part in 0..8 {
                let line = nodes[0][part] * across[0]
                    + nodes[1][part] * across[1]
                    + nodes[2][part] * across[2]
                    + nodes[3][part] * across[3];
                sum[part] += weight * line;
            }
        }
        sum
    }

    /// Where a lateral wave is parted: the rest as [`read`](Self::read) gives it, and the wave's own S_h, S_f, S_z, S_w.
    #[inline(always)]
    pub fn read_parted(&self, cell: &Cell, rho: f64, zeta: f64) -> Option<(Node, [f64; 8])> {
        let far = self.far.as_ref()?;
        let first = (cell.row as usize).checked_sub(far.first)?;
        let (along, across) = (cubic(cell.along), cubic(cell.across));
        let mut sums = [[0.0_f32; 8]; 2];
        for (row, weight) in along.into_iter().enumerate() {
            let start = (first + row) * self.zetas + cell.column as usize;
            let nodes: &[[Node; 2]; STENCIL] =
                far.nodes[start..start + STENCIL].try_into().expect("four nodes");
            for (which, sum) in sums.iter_mut().enumerate() {
                for part in 0..8 {
                    let line = nodes[0][which][part] * across[0]
                        + nodes[1][which][part] * across[1]
                        + nodes[2][which][part] * across[2]
                        + nodes[3][which][part] * across[3];
                    sum[part] += weight * line;
                }
            }
        }
        let mut lateral = [0.0; 8];
        if far.lateral.fade(rho, zeta) > FADED {
            let wave = far.lateral.wave(rho, zeta) / rho.hypot(zeta);
            for index in 0..4 {
                let value =
                    wave * Complex64::new(f64::from(sums[1][2 * index]), f64::from(sums[1][2 * index + 1]));
                (lateral[2 * index], lateral[2 * index + 1]) = (value.re, value.im);
            }
        }
        Some((sums[0], lateral))
    }
}

/// Lagrange's weights of the nodes −1, 0, 1, 2 at t.
#[inline(always)]
fn cubic(t: f32) -> [f32; STENCIL] {
    let (before, after, beyond) = (t + 1.0, t - 1.0, t - 2.0);
    let (outer, inner) = (t * after / 6.0, before * beyond / 2.0);
    [-outer * beyond, inner * after, -inner * t, outer * before]
}
