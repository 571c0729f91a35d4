//! Places at which the four functions are prepared, and everything there that does not depend on the soil.
//!
//! With all lengths in 1/k0 the plane waves of an integral are the same for every soil and frequency: λ, e^(−u0ζ),
//! J0(λρ) and J1(λρ) on a path above all branch points. They are made once, on first use; an earth then is a sum over
//! its own spectrum. Nodes of ρ whose distances differ by less than about two share a path.

use std::sync::OnceLock;

use complex_bessel::besselj;
use num_complex::Complex64;
use spec_math::cephes64::erfc;

use crate::field::quadrature::gauss_legendre;
use crate::wire::lanes::padded;

/// Steps of asinh(ρ/ρ0) and of ln ζ.
pub(super) const RHO_STEP: f64 = 0.125;
pub(super) const ZETA_STEP: f64 = 0.2;
/// Farthest node of ρ and least and greatest of ζ, in 1/k0.
const RHO_END: f64 = 230.0;
const ZETA_BEGIN: f64 = 0.004;
const ZETA_END: f64 = 150.0;
/// Nodes of ρ that share a path.
const SHARING: usize = 5;

/// Nodes for wires from a least ζ on, which sets how closely ρ must be sampled near 0.
pub(super) struct Lattice {
    /// ρ = ρ0·sinh(index·step).
    pub rho0: f64,
    groups: Vec<OnceLock<Group>>,
}

/// Finest ρ0, and how much coarser each next lattice is.
const FINEST: f64 = 0.006;
const COARSER: f64 = 2.0;
const LATTICES: usize = 12;

impl Lattice {
    /// The coarsest that serves wires from this ζ on.
    pub fn for_zeta(k0_zeta_min: f64) -> &'static Self {
        static ALL: [OnceLock<Lattice>; LATTICES] = [const { OnceLock::new() }; LATTICES];
        let fitting = (k0_zeta_min / FINEST).log(COARSER).floor();
        let index = (fitting.max(0.0) as usize).min(LATTICES - 1);
        ALL[index].get_or_init(|| Self::new(FINEST * COARSER.powi(index as i32)))
    }

    fn new(rho0: f64) -> Self {
        let nodes = ((RHO_END / rho0).asinh() / RHO_STEP).ceil() as usize;
        Self { rho0, groups: (0..nodes.div_ceil(SHARING)).map(|_| OnceLock::new()).collect() }
    }

    /// Distance of a node.
    pub fn rho(&self, index: usize) -> f64 {
        self.rho0 * (index as f64 * RHO_STEP).sinh()
    }

    /// Node that lies at or before a distance, with a fraction.
    pub fn place(&self, rho: f64) -> f64 {
        (rho / self.rho0).asinh() / RHO_STEP
    }

    /// Groups that hold the nodes from 0 to `last`.
    pub fn groups_to(&self, last: usize) -> impl Iterator<Item = &Group> {
        let groups = self.groups.iter().take(last / SHARING + 1).enumerate();
        groups.map(|(index, group)| group.get_or_init(|| Group::new(self, index * SHARING)))
    }
}

/// Height of a node of ζ.
pub(super) fn zeta(index: i32) -> f64 {
    (f64::from(index) * ZETA_STEP).exp()
}

/// What the waves of a group share: padded arrays of real and imaginary parts.
pub(super) struct Waves {
    pub re: Vec<f64>,
    pub im: Vec<f64>,
}

impl Waves {
    fn of(values: impl Iterator<Item = Complex64>) -> Self {
        let (mut re, mut im): (Vec<f64>, Vec<f64>) = values.map(|value| (value.re, value.im)).unzip();
        let length = padded(re.len());
        re.resize(length, 0.0);
        im.resize(length, 0.0);
        Self { re, im }
    }
}

/// Nodes of ρ on one path.
pub(super) struct Group {
    /// First node.
    pub first: usize,
    /// Least distance.
    nearest: f64,
    /// λ and u0 of each wave.
    pub lambda: Vec<Complex64>,
    pub u0: Vec<Complex64>,
    /// J0 and J1 for each node.
    pub bessel: Vec<[Waves; 2]>,
    /// e^(−u0ζ) dλ for each node of ζ from [`first_zeta`](Self::first_zeta) on; short where it has died away.
    decay: Vec<Waves>,
    first_zeta: i32,
    /// Ends of the path for soils with their branch point up to [`WINDOWS`].
    windows: Option<[Vec<f64>; WINDOWS.len()]>,
}

/// Real parts of branch points that a window lets pass.
const WINDOWS: [f64; 3] = [2.3, 5.0, 9.6];
/// Where a window's middle and end lie behind them, times the nearest ρ, and its width.
const MIDDLE: f64 = 30.0;
const BEHIND: f64 = 61.0;
const WIDTH: f64 = 8.7;
/// What is left of a wave of relative amplitude e^(−this).
const LAST_DIGIT: f64 = 15.0;

impl Group {
    fn new(lattice: &Lattice, first: usize) -> Self {
        let nodes: Vec<f64> = (first..first + SHARING).map(|index| lattice.rho(index)).collect();
        let (nearest, farthest) = (nodes[0], nodes[SHARING - 1]);
        let least_zeta = (0.8 * lattice.rho0).max(ZETA_BEGIN);
        let first_zeta = (least_zeta.ln() / ZETA_STEP).floor() as i32 - 1;
        let last_zeta = (ZETA_END.ln() / ZETA_STEP).ceil() as i32;
        // Far out the oscillation of J0 lets the path end early, behind a smooth window.
        let end = LAST_DIGIT / zeta(first_zeta);
        let end = if first > 0 { end.min(WINDOWS[2] + BEHIND / nearest) } else { end };
        let path = path(farthest, end);
        let lambda: Vec<Complex64> = path.iter().map(|(lambda, _)| *lambda).collect();
        let u0: Vec<Complex64> = lambda.iter().map(|lambda| (lambda * lambda - 1.0).sqrt()).collect();
        let waves = |rho: f64, order: f64| {
            Waves::of(lambda.iter().map(|lambda| besselj(order, lambda * rho).unwrap_or_default()))
        };
        let decay = |index: i32| {
            let zeta = zeta(index);
            let alive = lambda.partition_point(|lambda| lambda.re < 1.5 + LAST_DIGIT / zeta);
            Waves::of((0..alive).map(|wave| path[wave].1 * (-u0[wave] * zeta).exp()))
        };
        let window = |least: f64| {
            let from = least + MIDDLE / nearest;
            lambda.iter().map(|lambda| 0.5 * erfc((lambda.re - from) * nearest / WIDTH)).collect()
        };
        Self {
            first,
            nearest,
            bessel: nodes.iter().map(|rho| [waves(*rho, 0.0), waves(*rho, 1.0)]).collect(),
            decay: (first_zeta..=last_zeta).map(decay).collect(),
            first_zeta,
            windows: (first > 0).then(|| WINDOWS.map(window)),
            lambda,
            u0,
        }
    }

    /// e^(−u0ζ) dλ of a node of ζ.
    pub fn decay(&self, zeta_index: i32) -> &Waves {
        &self.decay[(zeta_index - self.first_zeta) as usize]
    }

    /// How many waves a soil needs, and what is left of each at the path's end; no window where all are needed.
    pub fn window(&self, epsilon: Complex64) -> (usize, Option<&[f64]>) {
        let Some(windows) = &self.windows else { return (self.lambda.len(), None) };
        let ground = epsilon.sqrt();
        // A branch point deep below the path has died away before it is reached.
        let needed = if -ground.im * self.nearest > 13.0 { 1.0 } else { ground.re };
        let index = WINDOWS.iter().position(|passes| needed < passes - 0.3).unwrap_or(WINDOWS.len() - 1);
        let end = WINDOWS[index] + BEHIND / self.nearest;
        let count = self.lambda.partition_point(|lambda| lambda.re < end);
        (count, Some(&windows[index][..count]))
    }
}

/// λ and dλ: from 0 obliquely up, then level, in panels of sixteen points.
fn path(farthest: f64, end: f64) -> Vec<(Complex64, Complex64)> {
    const POINTS: usize = 16;
    let rule = gauss_legendre(POINTS);
    // J0 grows like e^(height·ρ): six is 400, of fifteen digits.
    let height = (6.0 / farthest).min(1.0);
    let longest = 20.0 / farthest;
    let mut corners =
        vec![Complex64::ZERO, Complex64::new(0.5 * height, 0.5 * height), Complex64::new(height, height)];
    let mut at = height;
    while at < end {
        // Branch points are a height away at least; behind all of those of low loss only the wave's own scale matters.
        let step = if at < 11.0 { 3.0 * height } else { (0.7 * at).max(3.0 * height) };
        at += step.min(longest);
        corners.push(Complex64::new(at, height));
    }
    let mut path: Vec<(Complex64, Complex64)> = corners
        .windows(2)
        .flat_map(|ends| {
            let (middle, half) = (0.5 * (ends[0] + ends[1]), 0.5 * (ends[1] - ends[0]));
            rule.iter().map(move |(x, weight)| (middle + half * *x, half * *weight))
        })
        .collect();
    path.sort_by(|(a, _), (b, _)| a.re.total_cmp(&b.re));
    path
}
