//! The wave that runs along the earth's surface with the soil's own wave number.
//!
//! Over a soil of low loss it beats with the wave in air every λ/|√ε − 1|, too fast for a table that follows distance
//! in even ratios. It is the contribution of the branch cut that hangs from k1 = √ε, here straight down; all lengths
//! in 1/k0.

use complex_bessel::hankel2_scaled;
use num_complex::Complex64;

use super::spectrum::{GroundKernels, of_roots};

/// The wave of one soil: amplitude(ρ, ζ)·e^(−jk1ρ − u0ζ)/R, with a smooth amplitude.
#[derive(Clone, Copy)]
pub(super) struct Lateral {
    epsilon: Complex64,
    k1: Complex64,
    /// √(k1² − 1): how it fades with height.
    u0: Complex64,
    /// Where it parts from the whole, ρ.
    pub begins: f64,
}

/// Beats between the two waves, rad, where they are parted.
const PARTING: f64 = 2.0;
/// Largest error times R of a table that holds both in one.
const NEGLIGIBLE: f64 = 2e-5;
/// Points of the trapezoidal rule and their distance: the integrand is even, falls like e^(−x²), and its nearest
/// singularity (the wave in air) is √[`PARTING`] away at 45°.
const POINTS: usize = 15;
const STEP: f64 = 0.36;

impl Lateral {
    /// The wave, if a table with steps of that ratio needs it parted within the range.
    pub fn if_needed(epsilon: Complex64, step: f64, rho_max: f64, zeta_min: f64) -> Option<Self> {
        let k1 = epsilon.sqrt();
        let u0 = (epsilon - 1.0).sqrt();
        let beat = (k1 - 1.0).norm();
        let lateral = Self { epsilon, k1, u0, begins: PARTING / beat };
        if !lateral.begins.is_finite() || lateral.begins > rho_max {
            return None;
        }
        // Cubic interpolation misses 9/384·phase⁴ of an oscillation of amplitude 2e^(−|Im k1|ρ)/(|k1|ρ), most at
        // |Im k1|ρ = 3
        let worst = (3.0 / -k1.im).min(rho_max).max(lateral.begins);
        let missed = (9.0 / 384.0 * (step * beat * worst).powi(4)).min(1.0);
        let amplitude = 2.0 / (k1.norm() * worst) * lateral.fade(worst, zeta_min);
        (missed * amplitude > NEGLIGIBLE).then_some(lateral)
    }

    /// Absolute value of the exponential.
    #[inline(always)]
    pub fn fade(&self, rho: f64, zeta: f64) -> f64 {
        (self.k1.im * rho - self.u0.re * zeta).exp()
    }

    /// e^(−jk1ρ − u0ζ).
    #[inline(always)]
    pub fn wave(&self, rho: f64, zeta: f64) -> Complex64 {
        (-Complex64::I * self.k1 * rho - self.u0 * zeta).exp()
    }

    /// Everything that does not depend on ζ.
    pub fn at(&self, rho: f64) -> Row {
        // λ = k1 − jt, t = x²/ρ:  j/2·∫ (f(−u1) − f(u1))·H⁽²⁾(λρ)·e^(−u0ζ) dt, H⁽²⁾(λρ) = h·e^(−jk1ρ)·e^(−x²)
        let term = |index: usize| {
            let x = (index as f64 + 0.5) * STEP;
            let lambda = self.k1 - Complex64::I * (x * x / rho);
            let (u0, u1) = ((lambda * lambda - 1.0).sqrt(), (lambda * lambda - self.epsilon).sqrt());
            let jump = of_roots(self.epsilon, lambda, u0, -u1) - of_roots(self.epsilon, lambda, u0, u1);
            let [zeroth, first] = hankel(lambda * rho);
            let weight = 0.5 * Complex64::I * (2.0 * x / rho * STEP * (-x * x).exp());
            let term = GroundKernels {
                horizontal: jump.horizontal * zeroth,
                charge: jump.charge * zeroth,
                vertical: jump.vertical * zeroth,
                cross: jump.cross * first,
            };
            (u0 - self.u0, term * weight)
        };
        Row { rho, terms: std::array::from_fn(term) }
    }
}

/// The integrand at one ρ.
pub(super) struct Row {
    rho: f64,
    terms: [(Complex64, GroundKernels); POINTS],
}

impl Row {
    /// Amplitude of S_h, S_f, S_z, S_w times R.
    pub fn amplitude(&self, zeta: f64) -> GroundKernels {
        let mut sum = GroundKernels::default();
        for (rate, term) in &self.terms {
            sum += *term * (-rate * zeta).exp();
        }
        sum * self.rho.hypot(zeta)
    }
}

/// H0⁽²⁾ and H1⁽²⁾ without e^(−jz).
fn hankel(z: Complex64) -> [Complex64; 2] {
    /// From this |z| on twelve terms of Hankel's series miss 2e-7.
    const LARGE: f64 = 10.0;
    const TERMS: u32 = 12;
    if z.norm_sqr() < LARGE * LARGE {
        return [0.0, 1.0].map(|order| hankel2_scaled(order, z).unwrap_or_default());
    }
    // Hν⁽²⁾(z) = √(2/πz)·e^(−j(z − νπ/2 − π/4))·Σ aₖ(ν)·(−j/z)ᵏ·(−1)ᵏ…, aₖ = Π (4ν² − (2m − 1)²)/8m
    let x = -Complex64::I / z;
    let (mut term0, mut term1) = (Complex64::ONE, Complex64::ONE);
    let (mut sum0, mut sum1) = (term0, term1);
    for m in 1..=TERMS {
        let odd = f64::from(2 * m - 1);
        let step = x * f64::from(8 * m).recip();
        term0 *= step * -(odd * odd);
        term1 *= step * (4.0 - odd * odd);
        sum0 += term0;
        sum1 += term1;
    }
    let scale = (Complex64::I * std::f64::consts::FRAC_2_PI / z).sqrt();
    [scale * sum0, Complex64::I * scale * sum1]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn series_meets_the_library() {
        for z in [Complex64::new(10.0, 0.0), Complex64::new(9.0, -5.0), Complex64::new(60.0, -1.0)] {
            for (order, got) in [0.0, 1.0].into_iter().zip(hankel(z)) {
                let expected = hankel2_scaled(order, z).unwrap();
                assert!((got - expected).norm() < 1e-6 * expected.norm(), "{z}: {got} for {expected}");
            }
        }
    }
}
