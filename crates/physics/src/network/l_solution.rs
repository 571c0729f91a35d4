//! The setting of an L-network that brings a complex load to a real target.

use std::f64::consts::{FRAC_1_SQRT_2, TAU};

use num_complex::Complex64;
use thiserror::Error;

use super::{Parts, Sense, Setting, Stress};

/// What an L-network is asked to do.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LProblem {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// The load, Ω; its resistance must be greater than zero.
    pub load_ohm: Complex64,
    /// The resistance that the source wants to see, Ω.
    pub target_ohm: f64,
    /// Its parts.
    pub parts: Parts,
}

/// The setting with the least loss, and what it costs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LMatch {
    /// How to set it.
    pub setting: Setting,
    /// Power that reaches the load over power that goes in.
    pub efficiency: f64,
    /// Loss of both parts, dB.
    pub loss_db: f64,
    /// What the parts stand at 1 W going in.
    pub stress_at_1_w: Stress,
}

impl LMatch {
    /// What the parts stand when `power_w` watts go in.
    #[must_use]
    pub fn stress(&self, power_w: f64) -> Stress {
        let root = power_w.sqrt();
        Stress {
            capacitor_peak_v: self.stress_at_1_w.capacitor_peak_v * root,
            coil_rms_a: self.stress_at_1_w.coil_rms_a * root,
        }
    }
}

/// Why an L-network does not match.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum NetworkError {
    /// The coil is too small for the setting that needs least of it.
    #[error("the coil would need {:.2} µH; it has {:.2} µH at most", .needed_h * 1e6, .largest_h * 1e6)]
    CoilTooSmall {
        /// What would be needed, H.
        needed_h: f64,
        /// What there is, H.
        largest_h: f64,
    },
    /// The capacitor is too small for the setting that needs least of it.
    #[error("the capacitor would need {:.0} pF; it has {:.0} pF at most", .needed_f * 1e12, .largest_f * 1e12)]
    CapacitorTooSmall {
        /// What would be needed, F.
        needed_f: f64,
        /// What there is, F.
        largest_f: f64,
    },
    /// Both parts are too small.
    #[error(
        "coil and capacitor would need {:.2} µH and {:.0} pF; they have {:.2} µH and {:.0} pF at most",
        .needed_h * 1e6, .needed_f * 1e12, .largest_h * 1e6, .largest_f * 1e12
    )]
    BothTooSmall {
        /// Inductance that would be needed, H.
        needed_h: f64,
        /// Capacitance that would be needed, F.
        needed_f: f64,
        /// Inductance there is, H.
        largest_h: f64,
        /// Capacitance there is, F.
        largest_f: f64,
    },
    /// No setting of ideal range would do: the parts' own losses are in the way.
    #[error("no setting of coil and capacitor brings {} {:+}j Ω to {target_ohm} Ω", .load_ohm.re, .load_ohm.im)]
    NoSetting {
        /// The load, Ω.
        load_ohm: Complex64,
        /// The target, Ω.
        target_ohm: f64,
    },
    /// The load takes no power, or a figure makes no network.
    #[error("{quantity} is {value}; it must be {accepted}")]
    Unusable {
        /// The quantity with its unit.
        quantity: &'static str,
        /// Its value.
        value: f64,
        /// What would be accepted.
        accepted: &'static str,
    },
}

/// The setting with the least loss that brings a load exactly to a real target.
///
/// Exact: the losses of coil and capacitor are part of the match, which is a quadratic equation in each
/// sense; of the at most four settings those within the parts' ranges are compared.
///
/// Assumptions: coil with a series resistance X/Q, capacitor with a conductance B/Q across it, both
/// adjustable down to zero, no stray reactance.
///
/// # Errors
///
/// A part that is too small, and what would be needed; figures that make no network.
pub fn l_network(problem: &LProblem) -> Result<LMatch, NetworkError> {
    check(problem)?;
    let mut best: Option<Candidate> = None;
    let mut nearest: Option<(f64, Candidate)> = None;
    for candidate in
        capacitor_across_load(problem).into_iter().chain(capacitor_across_source(problem)).flatten()
    {
        let excess = candidate.excess(problem);
        if excess <= 1.0 {
            if best.is_none_or(|b| candidate.efficiency > b.efficiency) {
                best = Some(candidate);
            }
        } else if nearest.is_none_or(|(least, _)| excess < least) {
            nearest = Some((excess, candidate));
        }
    }
    match (best, nearest) {
        (Some(candidate), _) => Ok(candidate.matched(problem)),
        (None, Some((_, candidate))) => Err(candidate.too_large(problem)),
        (None, None) => {
            Err(NetworkError::NoSetting { load_ohm: problem.load_ohm, target_ohm: problem.target_ohm })
        }
    }
}

fn check(problem: &LProblem) -> Result<(), NetworkError> {
    let LProblem { frequency_hz, load_ohm, target_ohm, parts } = *problem;
    let positive = |value: f64| value > 0.0 && value.is_finite();
    let figures = [
        ("the frequency in hertz", frequency_hz, positive(frequency_hz), "greater than zero"),
        ("the load's resistance in ohms", load_ohm.re, positive(load_ohm.re), "greater than zero"),
        ("the load's reactance in ohms", load_ohm.im, load_ohm.im.is_finite(), "finite"),
        ("the target in ohms", target_ohm, positive(target_ohm), "greater than zero"),
        ("the coil's Q", parts.coil_q, parts.coil_q > 0.0, "greater than zero"),
        ("the capacitor's Q", parts.capacitor_q, parts.capacitor_q > 0.0, "greater than zero"),
    ];
    match figures.into_iter().find(|(_, _, usable, _)| !usable) {
        Some((quantity, value, _, accepted)) => Err(NetworkError::Unusable { quantity, value, accepted }),
        None => Ok(()),
    }
}

/// A setting that matches, perhaps out of range.
#[derive(Clone, Copy)]
struct Candidate {
    sense: Sense,
    /// Reactance of the coil, Ω.
    x_ohm: f64,
    /// Susceptance of the capacitor, S.
    b_s: f64,
    efficiency: f64,
    /// Voltage across the capacitor over the current in the coil, Ω.
    volts_per_ampere: f64,
}

impl Candidate {
    fn inductance_h(&self, problem: &LProblem) -> f64 {
        self.x_ohm / (TAU * problem.frequency_hz)
    }

    fn capacitance_f(&self, problem: &LProblem) -> f64 {
        self.b_s / (TAU * problem.frequency_hz)
    }

    /// How many times the larger of its needs exceeds what there is.
    fn excess(&self, problem: &LProblem) -> f64 {
        // A part of zero size is enough for a need of zero.
        let ratio = |need: f64, largest: f64| if need <= largest { 0.0 } else { need / largest };
        ratio(self.inductance_h(problem), problem.parts.inductance_max_h)
            .max(ratio(self.capacitance_f(problem), problem.parts.capacitance_max_f))
    }

    fn matched(&self, problem: &LProblem) -> LMatch {
        let (volts, amperes) = self.peak_at_1_w(problem);
        LMatch {
            setting: Setting {
                sense: self.sense,
                inductance_h: self.inductance_h(problem),
                capacitance_f: self.capacitance_f(problem),
            },
            efficiency: self.efficiency,
            loss_db: -10.0 * self.efficiency.log10(),
            stress_at_1_w: Stress { capacitor_peak_v: volts, coil_rms_a: amperes * FRAC_1_SQRT_2 },
        }
    }

    /// Peak volts across the capacitor and peak amperes in the coil at 1 W.
    fn peak_at_1_w(&self, problem: &LProblem) -> (f64, f64) {
        match self.sense {
            // the coil carries the source's current √(2P/R)
            Sense::CapacitorAcrossLoad => {
                let amperes = (2.0 / problem.target_ohm).sqrt();
                (amperes * self.volts_per_ampere, amperes)
            }
            // the capacitor stands the source's voltage √(2PR)
            Sense::CapacitorAcrossSource => {
                let volts = (2.0 * problem.target_ohm).sqrt();
                (volts, volts / self.volts_per_ampere)
            }
        }
    }

    fn too_large(&self, problem: &LProblem) -> NetworkError {
        let (needed_h, needed_f) = (self.inductance_h(problem), self.capacitance_f(problem));
        let Parts { inductance_max_h: largest_h, capacitance_max_f: largest_f, .. } = problem.parts;
        match (needed_h > largest_h, needed_f > largest_f) {
            (true, true) => NetworkError::BothTooSmall { needed_h, needed_f, largest_h, largest_f },
            (true, false) => NetworkError::CoilTooSmall { needed_h, largest_h },
            (false, _) => NetworkError::CapacitorTooSmall { needed_f, largest_f },
        }
    }
}

/// Settings with the capacitor across the load, coil toward the source.
fn capacitor_across_load(problem: &LProblem) -> [Option<Candidate>; 2] {
    let r = problem.target_ohm;
    let (q, d) = (problem.parts.coil_q.recip(), problem.parts.capacitor_q.recip());
    let y = problem.load_ohm.inv();
    // Y′ = G′ + jB′ with B′ = B_load + B and G′ = G + d·B = g + d·B′; 1/Y′ + X·(q + j) = R asks for
    // X = B′/|Y′|² and R·|Y′|² = G′ + q·B′, a quadratic in B′:
    let g = y.re - d * y.im;
    let solutions =
        roots(Quadratic { a: r * (1.0 + d * d), b: 2.0 * r * g * d - d - q, c: g * difference(r * g, 1.0) });
    solutions.map(|b_after| {
        let y_after = Complex64::new(g + d * b_after?, b_after?);
        let size2 = y_after.norm_sqr();
        // P_load/P_in = ½|V|²·G/(½|I|²·R) with |V|² = |I|²/|Y′|²
        Some(Candidate {
            sense: Sense::CapacitorAcrossLoad,
            x_ohm: y_after.im / size2,
            b_s: not_negative(y_after.im - y.im, y.im.abs())?,
            efficiency: y.re / (r * size2),
            volts_per_ampere: size2.sqrt().recip(),
        })
    })
}

/// Settings with the coil toward the load, capacitor across the source.
fn capacitor_across_source(problem: &LProblem) -> [Option<Candidate>; 2] {
    let r = problem.target_ohm;
    let (q, d) = (problem.parts.coil_q.recip(), problem.parts.capacitor_q.recip());
    let z = problem.load_ohm;
    // The dual: Z′ = R′ + jX′ with X′ = X_load + X and R′ = R_load + q·X = ρ + q·X′; 1/Z′ + B·(d + j) = 1/R
    // asks for B = X′/|Z′|² and |Z′|² = R·(R′ + d·X′):
    let rho = z.re - q * z.im;
    let solutions =
        roots(Quadratic { a: 1.0 + q * q, b: 2.0 * rho * q - r * (q + d), c: rho * difference(rho, r) });
    solutions.map(|x_after| {
        let z_after = Complex64::new(rho + q * x_after?, x_after?);
        let size2 = z_after.norm_sqr();
        // P_load/P_in = ½|I|²·R_load/(½|V|²/R) with |I|² = |V|²/|Z′|²
        Some(Candidate {
            sense: Sense::CapacitorAcrossSource,
            x_ohm: not_negative(z_after.im - z.im, z.im.abs())?,
            b_s: z_after.im / size2,
            efficiency: z.re * r / size2,
            volts_per_ampere: size2.sqrt(),
        })
    })
}

/// p − m, with a difference of a few roundings taken as zero: a load that matches already has such a root.
fn difference(p: f64, m: f64) -> f64 {
    let difference = p - m;
    if difference.abs() <= 4.0 * f64::EPSILON * m { 0.0 } else { difference }
}

/// a·x² + b·x + c.
struct Quadratic {
    a: f64,
    b: f64,
    c: f64,
}

/// The real roots that are not negative.
fn roots(Quadratic { a, b, c }: Quadratic) -> [Option<f64>; 2] {
    let discriminant = b * b - 4.0 * a * c;
    if discriminant < 0.0 {
        return [None, None];
    }
    // The form without cancellation: w = −(b + sign(b)·√D)/2, x₁ = w/a, x₂ = c/w.
    let w = -0.5 * (b + discriminant.sqrt().copysign(b));
    let scale = b.abs() / a;
    [not_negative(w / a, scale), not_negative(c / w, scale)]
}

/// The value, with a negative rounding residue against `scale` taken as zero; none below that or not finite.
fn not_negative(value: f64, scale: f64) -> Option<f64> {
    /// Some hundred roundings of an f64.
    const RESIDUE: f64 = 1e-13;
    (value.is_finite() && value >= -RESIDUE * scale).then(|| value.max(0.0))
}
