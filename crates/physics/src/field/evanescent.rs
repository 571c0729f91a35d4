//! What the wires send down in waves that decay on the way.

use num_complex::Complex64;

use super::run::Run;
use super::space::{Vec3, add};

/// The wires as one decay sees them.
///
/// A wave with the horizontal wave number λ = k·q > k decays downward as e^(−u0·z), u0 = √(λ² − k²). For all azimuths
/// of one q the places along a wire are weighted alike.
pub(super) struct Decayed<'a> {
    k: f64,
    q: f64,
    decay: f64,
    runs: Vec<DecayedRun<'a>>,
}

struct DecayedRun<'a> {
    run: &'a Run,
    kinks: Vec<DecayedKink>,
}

/// A kink times e^(−u0·z).
struct DecayedKink {
    along_m: f64,
    current_a: Complex64,
    slope_a_per_m: Complex64,
}

impl<'a> Decayed<'a> {
    /// Of a decay u0 = k·`decay`.
    pub fn new(runs: &'a [Run], k: f64, decay: f64) -> Self {
        let decayed = |run: &'a Run| {
            let kinks = run.kinks().iter().map(|kink| {
                let height_m = run.middle_m[2] + kink.along_m * run.direction[2];
                let share = (-k * decay * height_m).exp();
                DecayedKink {
                    along_m: kink.along_m,
                    current_a: share * kink.current_a,
                    slope_a_per_m: share * kink.slope_a_per_m,
                }
            });
            DecayedRun { run, kinks: kinks.collect() }
        };
        Self { k, q: (1.0 + decay * decay).sqrt(), decay, runs: runs.iter().map(decayed).collect() }
    }

    /// N = Σ û·∫ I(s)·e^(j(λx·x + λy·y) − u0·z) ds over the wires, A·m, for an azimuth given by its sine and cosine.
    pub fn moment_a_m(&self, [sin_phi, cos_phi]: [f64; 2]) -> [Complex64; 3] {
        let across = |[x, y, _]: Vec3| self.q * (cos_phi * x + sin_phi * y);
        let mut sum = [Complex64::ZERO; 3];
        for DecayedRun { run, kinks } in &self.runs {
            let turned = across(run.direction);
            let moment = self.along(kinks, turned, run.direction[2]);
            add(&mut sum, moment * Complex64::cis(self.k * across(run.middle_m)), run.direction);
        }
        sum
    }

    /// ∫ I(s)·e^(κs) ds, κ = k·(j·turned − decay·rise).
    ///
    /// As in the far field, on a sinusoid I'' = −k²I, so that integration by parts leaves the kinks only:
    ///
    /// Σ (κ·ΔI + ΔI')·e^(κs)/(k² + κ²), ΔI downward, ΔI' upward.
    fn along(&self, kinks: &[DecayedKink], turned: f64, rise: f64) -> Complex64 {
        let (k, down) = (self.k, -self.decay * rise);
        // On a level wire that the wave runs along, the quotient is 0/0: a hair beside, the digits suffice.
        let beside = (1.0 + Complex64::new(down, turned).powu(2)).norm() < HAIR;
        let turned = if beside { turned * (1.0 + HAIR) } else { turned };
        let kappa = Complex64::new(down, turned);
        let (mut constant, mut rising) = (Complex64::ZERO, Complex64::ZERO);
        for kink in kinks {
            let wave = Complex64::cis(k * turned * kink.along_m);
            constant += kink.slope_a_per_m * wave;
            rising += kink.current_a * wave;
        }
        (constant + k * kappa * rising) / (k * k * (1.0 + kappa * kappa))
    }
}

/// Relative distance from 0/0 that is kept: costs 1e-5 of the phase along the wire, leaves eleven digits.
const HAIR: f64 = 1e-5;
