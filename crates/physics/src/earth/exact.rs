//! The Sommerfeld integrals as such: slow, and the yardstick of everything faster.

use std::sync::LazyLock;

use complex_bessel::{besselj, hankel1_scaled, hankel2_scaled};
use num_complex::Complex64;

use super::spectrum::{GroundKernels, spectrum};
use crate::field::quadrature::gauss_legendre;

/// S_h, S_f, S_z, S_w in units of k0 at one place; ρ ≥ 0 and ζ > 0 in 1/k0.
///
/// Error below 1e-10/R for ζ from 0.003 and R up to 120, |ε| up to 10⁵ (measured on two paths). Microseconds to tens of
/// milliseconds: long distances over water take longest.
///
/// All branch points and poles are in the fourth quadrant of λ or on its edges, so the path runs above them. Where ρ is
/// large against ζ it ends right of them, and there J0 = (H⁽¹⁾ + H⁽²⁾)/2 goes on straight up and straight down, where
/// each half decays (deformation of contours in the manner of Sommerfeld; any textbook of layered media).
#[must_use]
pub fn exact_kernels(epsilon: Complex64, k0_rho: f64, k0_zeta: f64) -> GroundKernels {
    Integral::new(epsilon, k0_rho, k0_zeta).along(Path::for_place(epsilon, k0_rho, k0_zeta))
}

/// How to go from 0 to ∞.
#[derive(Clone, Copy, Debug)]
struct Path {
    /// Imaginary part of λ on the way.
    height: f64,
    /// Real part of λ where the way turns into Hankel functions, if it does.
    turn: Option<f64>,
}

impl Path {
    fn for_place(epsilon: Complex64, rho: f64, zeta: f64) -> Self {
        // J0 grows like e^(height·ρ), which costs digits.
        let height = (3.0 / rho).min(1.0);
        let ground = epsilon.sqrt();
        // A branch point so deep that e^(−|Im k1|ρ) is below the last digit may stay on the far side.
        let deep = -ground.im * rho > 45.0;
        let turn = if deep { (ground.re + 1.0).min(2.0) } else { ground.re + 1.0 };
        Self { height, turn: (rho > 2.0 * zeta).then_some(turn) }
    }
}

/// What is left of a wave of relative amplitude e^(−this).
const LAST_DIGIT: f64 = 38.0;

struct Integral {
    epsilon: Complex64,
    rho: f64,
    zeta: f64,
    /// Absolute, of one panel.
    tolerance: f64,
}

impl Integral {
    fn new(epsilon: Complex64, rho: f64, zeta: f64) -> Self {
        Self { epsilon, rho, zeta, tolerance: 1e-11 / rho.hypot(zeta) }
    }

    fn along(&self, path: Path) -> GroundKernels {
        let raised = |x: f64| Complex64::new(x, path.height);
        let start = raised(0.5 * path.height);
        let mut sum = self.line(Complex64::ZERO, start, Self::with_j);
        let Some(turn) = path.turn else {
            // Decays like e^(−λζ)
            return sum + self.panels(start, raised(2.0 + LAST_DIGIT / self.zeta));
        };
        let corner = raised(turn);
        sum += self.panels(start, corner);
        let end = Complex64::new(0.0, LAST_DIGIT / self.rho);
        sum += self.line(corner, corner + end, Self::with_h1);
        sum + self.line(corner, corner - end, Self::with_h2)
    }

    /// Along a level line in pieces, each begun afresh: short near the branch points and not above a few periods of J0.
    fn panels(&self, from: Complex64, to: Complex64) -> GroundKernels {
        let longest = 8.0 / self.rho;
        let (mut sum, mut at) = (GroundKernels::default(), from);
        while at.re < to.re {
            let next = Complex64::new((at.re + longest.min(at.re.max(0.5))).min(to.re), at.im);
            sum += self.line(at, next, Self::with_j);
            at = next;
        }
        sum
    }

    fn line(
        &self,
        from: Complex64,
        to: Complex64,
        wave: fn(&Self, Complex64) -> GroundKernels,
    ) -> GroundKernels {
        let whole = self.rule(from, to, wave);
        self.halves(from, to, wave, (whole, 20))
    }

    /// Adaptive bisection; the difference of the halves' sum from the whole bounds the error of the sum.
    fn halves(
        &self,
        from: Complex64,
        to: Complex64,
        wave: fn(&Self, Complex64) -> GroundKernels,
        (whole, depth): (GroundKernels, u32),
    ) -> GroundKernels {
        let middle = 0.5 * (from + to);
        let (first, second) = (self.rule(from, middle, wave), self.rule(middle, to, wave));
        if depth == 0 || (first + second - whole).largest() < self.tolerance {
            return first + second;
        }
        self.halves(from, middle, wave, (first, depth - 1))
            + self.halves(middle, to, wave, (second, depth - 1))
    }

    fn rule(
        &self,
        from: Complex64,
        to: Complex64,
        wave: fn(&Self, Complex64) -> GroundKernels,
    ) -> GroundKernels {
        static RULE: LazyLock<Vec<(f64, f64)>> = LazyLock::new(|| gauss_legendre(14));
        let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
        let mut sum = GroundKernels::default();
        for (x, weight) in RULE.iter() {
            sum += wave(self, middle + half * *x) * *weight;
        }
        sum * half
    }

    fn with_j(&self, lambda: Complex64) -> GroundKernels {
        let z = lambda * self.rho;
        self.weighed(lambda, [0.0, 1.0].map(|order| besselj(order, z).unwrap_or_default()), Complex64::ZERO)
    }

    fn with_h1(&self, lambda: Complex64) -> GroundKernels {
        let z = lambda * self.rho;
        let waves = [0.0, 1.0].map(|order| 0.5 * hankel1_scaled(order, z).unwrap_or_default());
        self.weighed(lambda, waves, Complex64::I * z)
    }

    fn with_h2(&self, lambda: Complex64) -> GroundKernels {
        let z = lambda * self.rho;
        let waves = [0.0, 1.0].map(|order| 0.5 * hankel2_scaled(order, z).unwrap_or_default());
        self.weighed(lambda, waves, -Complex64::I * z)
    }

    /// The integrand; `exponent` is what the scaled functions lack.
    fn weighed(
        &self,
        lambda: Complex64,
        [zeroth, first]: [Complex64; 2],
        exponent: Complex64,
    ) -> GroundKernels {
        let (waves, u0) = spectrum(self.epsilon, lambda);
        let decay = (exponent - u0 * self.zeta).exp();
        let (zeroth, first) = (zeroth * decay, first * decay);
        GroundKernels {
            horizontal: waves.horizontal * zeroth,
            charge: waves.charge * zeroth,
            vertical: waves.vertical * zeroth,
            cross: waves.cross * first,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Another way: lower, with a corner elsewhere, or without one.
    fn other(path: Path, epsilon: Complex64, rho: f64, zeta: f64) -> Path {
        let turn = match path.turn {
            Some(_) if rho < 40.0 * zeta => None,
            Some(turn) => Some(turn + 1.3),
            None => (rho > 0.0).then_some(epsilon.sqrt().re + 3.0),
        };
        Path { height: 0.6 * path.height, turn }
    }

    #[test]
    fn two_paths_agree() {
        let mut worst = (0.0, String::new());
        for epsilon in
            [(3.0, -0.003), (4.0, -0.6), (13.0, -49.0), (80.0, -0.33), (81.0, -1600.0), (81.0, -50_000.0)]
        {
            let epsilon = Complex64::new(epsilon.0, epsilon.1);
            for (rho, zeta) in [
                (0.0, 0.006),
                (0.004, 0.006),
                (0.3, 0.01),
                (1.0, 0.06),
                (1.3, 0.7),
                (6.0, 3.5),
                (9.0, 0.3),
                (30.0, 3.0),
                (90.0, 0.06),
                (94.0, 25.0),
            ] {
                let path = Path::for_place(epsilon, rho, zeta);
                let integral = Integral::new(epsilon, rho, zeta);
                let (a, b) = (integral.along(path), integral.along(other(path, epsilon, rho, zeta)));
                let error = (a - b).largest() * rho.hypot(zeta);
                if error > worst.0 {
                    worst = (error, format!("{epsilon} {rho} {zeta} {a:?} {b:?}"));
                }
            }
        }
        assert!(worst.0 < 1e-10, "{worst:?}");
    }
}
