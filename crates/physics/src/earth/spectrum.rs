//! The four functions and what they are made of, wave by wave.

use num_complex::Complex64;
use std::ops::{Add, AddAssign, Mul, Sub};

/// S_h, S_f, S_z, S_w, or parts of them.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct GroundKernels {
    /// S_h: vector potential of a horizontal current along itself.
    pub horizontal: Complex64,
    /// S_f: scalar potential of a charge.
    pub charge: Complex64,
    /// S_z: vector potential of a vertical current along itself.
    pub vertical: Complex64,
    /// S_w: between horizontal and vertical.
    pub cross: Complex64,
}

impl GroundKernels {
    /// In the order S_h, S_f, S_z, S_w.
    #[must_use]
    pub fn values(&self) -> [Complex64; 4] {
        [self.horizontal, self.charge, self.vertical, self.cross]
    }

    /// From the order S_h, S_f, S_z, S_w.
    #[must_use]
    pub fn from_values([horizontal, charge, vertical, cross]: [Complex64; 4]) -> Self {
        Self { horizontal, charge, vertical, cross }
    }

    /// Largest absolute value of the four.
    #[must_use]
    pub fn largest(&self) -> f64 {
        self.values().into_iter().map(Complex64::norm).fold(0.0, f64::max)
    }
}

impl Add for GroundKernels {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        let (a, b) = (self.values(), other.values());
        Self::from_values(std::array::from_fn(|index| a[index] + b[index]))
    }
}

impl AddAssign for GroundKernels {
    fn add_assign(&mut self, other: Self) {
        *self = *self + other;
    }
}

impl Sub for GroundKernels {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        let (a, b) = (self.values(), other.values());
        Self::from_values(std::array::from_fn(|index| a[index] - b[index]))
    }
}

impl Mul<f64> for GroundKernels {
    type Output = Self;
    fn mul(self, factor: f64) -> Self {
        Self::from_values(self.values().map(|value| value * factor))
    }
}

impl Mul<Complex64> for GroundKernels {
    type Output = Self;
    fn mul(self, factor: Complex64) -> Self {
        Self::from_values(self.values().map(|value| value * factor))
    }
}

/// Factors of one plane wave, J0 or J1 and dλ left out.
///
/// Horizontal, charge and vertical belong to J0, cross to J1.
#[inline(always)]
pub(super) fn spectrum(epsilon: Complex64, lambda: Complex64) -> (GroundKernels, Complex64) {
    let square = lambda * lambda;
    let (u0, u1) = ((square - 1.0).sqrt(), (square - epsilon).sqrt());
    (of_roots(epsilon, lambda, u0, u1), u0)
}

/// The same with given roots, of which u1 may be the one of the other sheet.
#[inline(always)]
pub(super) fn of_roots(epsilon: Complex64, lambda: Complex64, u0: Complex64, u1: Complex64) -> GroundKernels {
    let contrast = epsilon - 1.0;
    let (sum, weighted) = ((u0 + u1).inv(), (u1 + epsilon * u0).inv());
    // Gh = (ε − 1)/(u0 + u1)²,  Ge = (u1 − ε·u0)/(u1 + ε·u0),  W = 2(ε − 1)/((u0 + u1)(u1 + ε·u0)):
    // no difference of near numbers
    let gh = contrast * sum * sum;
    let ge = (u1 - epsilon * u0) * weighted;
    let w = 2.0 * contrast * sum * weighted;
    let measure = lambda / u0;
    GroundKernels {
        horizontal: gh * measure,
        charge: (ge + w) * measure,
        vertical: (gh - 2.0 * ge - w) * measure,
        cross: -w * lambda * lambda,
    }
}

/// What is left where R is small against the wavelength in the soil: images in static fields.
///
/// S = weight·e^(−jk0R)/R + remainder, for S_w weight·ρ/(R + ζ)·e^(−jk0R)/R + remainder. Each remainder's spectrum falls
/// two powers of λ faster than its image's, so it stays finite where R → 0, with a slope there like ln R.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StaticWeights {
    /// Of S_f: (1 − ε)/(1 + ε).
    pub charge: Complex64,
    /// Of S_z: 2(ε − 1)/(ε + 1).
    pub vertical: Complex64,
    /// Of S_w: (1 − ε)/(1 + ε). S_h has none.
    pub cross: Complex64,
}

impl StaticWeights {
    /// Of a complex permittivity.
    #[must_use]
    pub fn new(epsilon: Complex64) -> Self {
        // λ → ∞: Gh → 0, Ge → (1 − ε)/(1 + ε), λ²W → −Ge;   ∫ J1(λρ)e^(−λζ) dλ = ρ/(R(R + ζ))
        let ge = (1.0 - epsilon) / (1.0 + epsilon);
        Self { charge: ge, vertical: -2.0 * ge, cross: ge }
    }

    /// Images at a place; lengths in 1/k0.
    #[must_use]
    pub fn images(&self, k0_rho: f64, k0_zeta: f64) -> GroundKernels {
        let distance = k0_rho.hypot(k0_zeta);
        let wave = Complex64::cis(-distance) / distance;
        GroundKernels {
            horizontal: Complex64::ZERO,
            charge: self.charge * wave,
            vertical: self.vertical * wave,
            cross: self.cross * wave * (k0_rho / (distance + k0_zeta)),
        }
    }
}
