//! The fast way: an earth made ready for the reach of some wires.

use std::f64::consts::{LN_2, SQRT_2, TAU};

use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::error::{EarthError, within};
use super::exact::exact_kernels;
use super::soil::Soil;
use super::spectrum::{GroundKernels, StaticWeights};
use super::table::{Cell, Table};
use crate::constants::wave_number_rad_per_m;
use crate::wire::lanes::Lanes;

/// What distances some wires have from each other's images.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reach {
    /// Greatest horizontal distance between two points, m.
    pub rho_max_m: f64,
    /// Least sum of the heights of two points (twice the lowest height), m.
    pub zeta_min_m: f64,
    /// Greatest sum of heights, m.
    pub zeta_max_m: f64,
}

/// A soil at one frequency, ready for many pairs of points within a reach.
pub struct HalfSpace {
    epsilon: Complex64,
    k0: f64,
    weights: StaticWeights,
    table: Table,
}

/// Limits of the tables, in 1/k0.
const RHO_MAX: f64 = 200.0;
const ZETA_MIN: f64 = 0.006;
const ZETA_MAX: f64 = 120.0;
/// What sums of heights near nothing count as.
const LOWEST_ZETA: f64 = 1.05 * ZETA_MIN;

impl HalfSpace {
    /// Prepares an earth.
    ///
    /// # Errors
    ///
    /// A soil or frequency outside its range, wires nearer to the earth than 0.0005 wavelengths (ζ below 0.006/k0), or
    /// farther from each other than 31 or higher than 9.5.
    pub fn new(soil: &Soil, frequency_hz: f64, reach: &Reach) -> Result<Self, EarthError> {
        let epsilon = soil.complex_permittivity(frequency_hz)?;
        let k0 = wave_number_rad_per_m(frequency_hz);
        within("rho_max_m in 1/k0", k0 * reach.rho_max_m, 0.0..=RHO_MAX, "0 to 31 wavelengths")?;
        let least = within(
            "zeta_min_m in 1/k0",
            k0 * reach.zeta_min_m,
            ZETA_MIN..=ZETA_MAX,
            "0.001 to 19 wavelengths",
        )?;
        let greatest = k0 * reach.zeta_max_m;
        within("zeta_max_m in 1/k0", greatest, least..=ZETA_MAX, "zeta_min_m to 19 wavelengths")?;
        let table = Table::new(epsilon, k0 * reach.rho_max_m, [least, greatest]);
        Ok(Self { epsilon, k0, weights: StaticWeights::new(epsilon), table })
    }

    /// Prepares an earth for a rough reach of wires whose ends may come down to it: as much of it as there can be.
    ///
    /// # Errors
    /// As [`HalfSpace::new`], but for the least height.
    pub fn for_wires(soil: &Soil, frequency_hz: f64, reach: &Reach) -> Result<Self, EarthError> {
        let lowest_m = LOWEST_ZETA / wave_number_rad_per_m(frequency_hz);
        // The limits themselves shall not fall out by rounding.
        let per_m = (1.0 - 1e-12) / wave_number_rad_per_m(frequency_hz);
        let zeta_min_m = reach.zeta_min_m.clamp(lowest_m, ZETA_MAX * per_m);
        let zeta_max_m = reach.zeta_max_m.clamp(zeta_min_m, ZETA_MAX * per_m);
        let rho_max_m = reach.rho_max_m.min(RHO_MAX * per_m);
        Self::new(soil, frequency_hz, &Reach { rho_max_m, zeta_min_m, zeta_max_m })
    }

    /// Complex relative permittivity.
    #[must_use]
    pub fn permittivity(&self) -> Complex64 {
        self.epsilon
    }

    /// Wave number in air, rad/m.
    #[must_use]
    pub fn wave_number_rad_per_m(&self) -> f64 {
        self.k0
    }

    /// Weights of the images in static fields, which [`Self::remainders`] leaves out.
    #[must_use]
    pub fn static_weights(&self) -> StaticWeights {
        self.weights
    }

    /// S_h, S_f, S_z, S_w, 1/m, for horizontal distances ρ ≥ 0 and sums of heights ζ, m.
    ///
    /// Points outside the reach are integrated one by one, which is right but slow. Sums of heights below 0.001 wavelengths
    /// count as that.
    pub fn kernels(&self, rho_m: &[f64], zeta_m: &[f64], kernels: &mut [GroundKernels]) {
        self.fill(rho_m, zeta_m, self.weights, kernels);
    }

    /// The same without the images in static fields.
    pub fn remainders(&self, rho_m: &[f64], zeta_m: &[f64], kernels: &mut [GroundKernels]) {
        let none =
            StaticWeights { charge: Complex64::ZERO, vertical: Complex64::ZERO, cross: Complex64::ZERO };
        self.fill(rho_m, zeta_m, none, kernels);
    }

    fn fill(&self, rho_m: &[f64], zeta_m: &[f64], weights: StaticWeights, kernels: &mut [GroundKernels]) {
        assert!(rho_m.len() == zeta_m.len() && rho_m.len() == kernels.len(), "slices of one length");
        let chunks = rho_m.chunks(CHUNK).zip(zeta_m.chunks(CHUNK)).zip(kernels.chunks_mut(CHUNK));
        for ((rho_m, zeta_m), kernels) in chunks {
            Arch::new().dispatch(Fill { earth: self, weights, rho_m, zeta_m, kernels });
        }
    }

    /// One point by quadrature, with the static images weighed as asked.
    #[cold]
    fn outside(&self, rho_m: f64, zeta_m: f64, weights: &StaticWeights) -> GroundKernels {
        let (rho, zeta) = (self.k0 * rho_m, (self.k0 * zeta_m).max(ZETA_MIN));
        let images = self.weights.images(rho, zeta) - weights.images(rho, zeta);
        (exact_kernels(self.epsilon, rho, zeta) - images) * self.k0
    }
}

/// Points at a time: what their cells and waves need stays in the nearest cache.
const CHUNK: usize = 64;

struct Fill<'a> {
    earth: &'a HalfSpace,
    weights: StaticWeights,
    rho_m: &'a [f64],
    zeta_m: &'a [f64],
    kernels: &'a mut [GroundKernels],
}

impl WithSimd for Fill<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let count = self.rho_m.len();
        // Beyond the given points there are some that do no harm.
        let mut points = Points::default();
        for ((rho, zeta), (rho_m, zeta_m)) in
            points.rho.iter_mut().zip(&mut points.zeta).zip(self.rho_m.iter().zip(self.zeta_m))
        {
            (*rho, *zeta) = (self.earth.k0 * rho_m, (self.earth.k0 * zeta_m).max(ZETA_MIN));
        }
        points.place(self.earth.table.scales());
        points.waves(simd);
        let weights = &self.weights;
        for at in 0..count {
            let cell = Cell {
                row: points.row[at] as u32,
                column: points.column[at] as u32,
                along: points.along[at],
                across: points.across[at],
            };
            if !(points.column[at] >= 0.0 && self.earth.table.holds(&cell)) {
                self.kernels[at] = self.earth.outside(self.rho_m[at], self.zeta_m[at], weights);
                continue;
            }
            let parted = self.earth.table.read_parted(&cell, points.rho[at], points.zeta[at]);
            let (node, lateral) = match parted {
                Some((node, lateral)) => (node.map(f64::from), lateral),
                None => (self.earth.table.read(&cell).map(f64::from), [0.0; 8]),
            };
            let wave = Complex64::new(points.cos[at], points.minus_sin[at]);
            let value = |index: usize, image: Complex64| {
                let smooth = Complex64::new(node[2 * index], node[2 * index + 1]) + image;
                (smooth * wave + Complex64::new(lateral[2 * index], lateral[2 * index + 1])) * self.earth.k0
            };
            self.kernels[at] = GroundKernels {
                horizontal: value(0, Complex64::ZERO),
                charge: value(1, weights.charge),
                vertical: value(2, weights.vertical),
                cross: value(3, weights.cross * points.ratio[at]),
            };
        }
    }
}

/// Points in 1/k0 and what follows from each alone.
struct Points {
    rho: [f64; CHUNK],
    zeta: [f64; CHUNK],
    row: [f64; CHUNK],
    column: [f64; CHUNK],
    along: [f32; CHUNK],
    across: [f32; CHUNK],
    inverse: [f64; CHUNK],
    turns: [f64; CHUNK],
    cos: [f64; CHUNK],
    minus_sin: [f64; CHUNK],
    ratio: [f64; CHUNK],
}

impl Default for Points {
    fn default() -> Self {
        Self {
            rho: [0.0; CHUNK],
            zeta: [1.0; CHUNK],
            row: [0.0; CHUNK],
            column: [0.0; CHUNK],
            along: [0.0; CHUNK],
            across: [0.0; CHUNK],
            inverse: [0.0; CHUNK],
            turns: [0.0; CHUNK],
            cos: [0.0; CHUNK],
            minus_sin: [0.0; CHUNK],
            ratio: [0.0; CHUNK],
        }
    }
}

impl Points {
    /// Cells, waves cos R/R and −sin R/R, and ρ/(R + ζ).
    #[inline(always)]
    fn place(&mut self, [per_rho0, per_asinh, per_ln, before]: [f64; 4]) {
        for at in 0..CHUNK {
            let (rho, zeta) = (self.rho[at], self.zeta[at]);
            let distance = (rho * rho + zeta * zeta).sqrt();
            let inverse = distance.recip();
            let scaled = rho * per_rho0;
            let row = ln(scaled + (scaled * scaled + 1.0).sqrt()) * per_asinh;
            let column = ln(zeta) * per_ln - before;
            self.row[at] = row.floor();
            self.column[at] = column.floor();
            self.along[at] = (row - row.floor()) as f32;
            self.across[at] = (column - column.floor()) as f32;
            self.ratio[at] = rho / (distance + zeta);
            self.inverse[at] = inverse;
            self.turns[at] = distance * (1.0 / TAU);
        }
    }

    #[inline(always)]
    fn waves<S: Simd>(&mut self, simd: S) {
        let (turns, _) = S::as_simd_f64s(&self.turns);
        let (inverse, _) = S::as_simd_f64s(&self.inverse);
        let (cos, _) = S::as_mut_simd_f64s(&mut self.cos);
        let (minus_sin, _) = S::as_mut_simd_f64s(&mut self.minus_sin);
        for at in 0..turns.len() {
            let inverse = Lanes::new(simd, inverse[at]);
            let [real, imaginary] = Lanes::new(simd, turns[at]).wave();
            cos[at] = (real * inverse).value;
            minus_sin[at] = (imaginary * inverse).value;
        }
    }
}

/// Natural logarithm of a normal positive number, absolute error below 1e-7 of a table's step.
///
/// Integer operations on the exponent, so that loops of it vectorise.
#[inline(always)]
fn ln(x: f64) -> f64 {
    /// 2⁵², with the exponent's own bits below.
    const SHIFT: u64 = 0x4330_0000_0000_0000;
    let bits = x.to_bits();
    let exponent = f64::from_bits((bits >> 52) | SHIFT) - (4_503_599_627_370_496.0 + 1022.0) - 0.5;
    let mantissa = f64::from_bits((bits & 0x000f_ffff_ffff_ffff) | 0x3ff0_0000_0000_0000);
    // ln(m/√2) = 2·artanh s, s = (m − √2)/(m + √2), |s| < 0.172
    let s = (mantissa - SQRT_2) / (mantissa + SQRT_2);
    let square = s * s;
    let series = 1.0 + square * (1.0 / 3.0 + square * (0.2 + square * (1.0 / 7.0 + square * (1.0 / 9.0))));
    exponent * LN_2 + 2.0 * s * series
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quick_logarithm_is_one() {
        for step in -2000..2000 {
            let x = (0.004_9 * f64::from(step)).exp();
            assert!((ln(x) - x.ln()).abs() < 2e-9, "{x}");
        }
    }
}
