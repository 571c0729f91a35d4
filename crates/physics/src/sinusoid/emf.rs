//! Induced-EMF impedances of thin parallel wires with sinusoidal currents.
//!
//! The field of a centre-fed filament with I(z') = I_loop·sin k(l − |z'|) is known exactly: three spherical waves,
//! from its ends and its centre. Its work on the current of another wire parallel to it integrates to sine and cosine
//! integrals for any lengths, spacing and offset, so nothing here is numerical quadrature.
//!
//! Source: P. S. Carter, "Circuit relations in radiating systems …", Proc. IRE 20, 1932; Balanis, "Antenna Theory",
//! 3rd ed., ch. 8 (both from memory). The integral in [`wave_integral`] is derived there.

use num_complex::Complex64;

use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::special::exponential_integral_of_wave;

/// Two parallel centre-fed wires.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ParallelWires {
    /// Half the length of the first wire, m, > 0.
    pub half_length_1_m: f64,
    /// Half the length of the second wire, m, > 0.
    pub half_length_2_m: f64,
    /// Distance between the axes, m, > 0. For wires on one axis take the radius: from the axis of the one to the
    /// surface of the other.
    pub spacing_m: f64,
    /// Distance of the centres along the axes, m.
    pub offset_m: f64,
}

/// Mutual impedance of two parallel wires, Ω, referred to their current loops.
///
/// "Loop" is the amplitude of the sinusoid, also for a wire too short to reach it. Assumes sinusoidal currents with
/// the wave number of vacuum and wires thin against length and wavelength; positive half lengths and spacing.
/// Absolute error about 1e-12 Ω, which drowns the resistance of wires so short that (kl)⁴ is as small.
#[must_use]
pub fn mutual_impedance(wires: &ParallelWires, frequency_hz: f64) -> Complex64 {
    let k = wave_number_rad_per_m(frequency_hz);
    let ParallelWires { half_length_1_m: l1, half_length_2_m: l2, spacing_m: spacing, offset_m: offset } =
        *wires;
    // E_z = −j·η0/4π·I_loop·[e^(−jkR₁)/R₁ + e^(−jkR₂)/R₂ − 2 cos kl₁·e^(−jkR₀)/R₀]
    let sources = [(-l1, 1.0), (l1, 1.0), (0.0, -2.0 * (k * l1).cos())];
    let mut work = Complex64::ZERO;
    for (source, weight) in sources {
        // Distances along the axis from the source to the second wire's lower end, centre and upper end.
        let [lower, centre, upper] = [offset - l2 - source, offset - source, offset + l2 - source];
        let along = [lower, centre, upper].map(|t| wave_integral(k, t, spacing, Travel::Up));
        let against = [lower, centre, upper].map(|t| wave_integral(k, t, spacing, Travel::Down));
        // Lower half: sin k(t − lower) = [e^(−jk·lower)·e^(jkt) − e^(jk·lower)·e^(−jkt)]/2j
        let rise = Complex64::cis(-k * lower) * (along[1] - along[0]);
        let rise = rise - Complex64::cis(k * lower) * (against[1] - against[0]);
        // Upper half: sin k(upper − t) = [e^(jk·upper)·e^(−jkt) − e^(−jk·upper)·e^(jkt)]/2j
        let fall = Complex64::cis(k * upper) * (against[2] - against[1]);
        let fall = fall - Complex64::cis(-k * upper) * (along[2] - along[1]);
        work += weight * (rise + fall);
    }
    // Z = −∫E_z·sin k(l₂ − |z|) dz = j·η0/4π·work/2j
    VACUUM_IMPEDANCE_OHM / (8.0 * std::f64::consts::PI) * work
}

/// Sense of the travelling wave that multiplies the spherical one.
#[derive(Clone, Copy)]
enum Travel {
    /// e^(+jkt).
    Up,
    /// e^(−jkt).
    Down,
}

/// Primitive of e^(±jkt)·e^(−jkR)/R with R = √(t² + ρ²).
///
/// With u = R ∓ t, du/u = ∓dt/R, so ∫e^(−jk(R ∓ t))/R dt = ∓∫e^(−jku)/u du = ∓[Ci(ku) − j·Si(ku)].
fn wave_integral(k: f64, t: f64, rho: f64, travel: Travel) -> Complex64 {
    let distance = t.hypot(rho);
    let sign = match travel {
        Travel::Up => 1.0,
        Travel::Down => -1.0,
    };
    let u = if sign * t > 0.0 { rho * (rho / (distance + t.abs())) } else { distance + t.abs() };
    -sign * exponential_integral_of_wave(k * u)
}

/// A centre-fed wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CentreFedWire {
    /// Half the length, m, > 0.
    pub half_length_m: f64,
    /// Radius, m, > 0, well below the half length.
    pub radius_m: f64,
}

/// Self impedance by the induced-EMF method, Ω, referred to the current loop.
///
/// Any length, any (thin) radius. The resistance is the radiation resistance of the assumed current; the reactance is
/// meaningful near odd numbers of half waves only, and depends on the radius except there.
#[must_use]
pub fn self_impedance(wire: &CentreFedWire, frequency_hz: f64) -> Complex64 {
    let CentreFedWire { half_length_m, radius_m } = *wire;
    let with_itself = ParallelWires {
        half_length_1_m: half_length_m,
        half_length_2_m: half_length_m,
        spacing_m: radius_m,
        offset_m: 0.0,
    };
    mutual_impedance(&with_itself, frequency_hz)
}

impl CentreFedWire {
    /// An impedance referred to the current loop, referred to the current at the feedpoint instead, Ω.
    ///
    /// `None` where the sinusoid has a node at the feedpoint (to 1e-6 of its amplitude): the induced-EMF method then
    /// has no finite answer. [`crate::sinusoid::Sketch`] has one.
    #[must_use]
    pub fn referred_to_feedpoint(&self, loop_ohm: Complex64, frequency_hz: f64) -> Option<Complex64> {
        // Z_feed = Z_loop/sin² kl
        let share = (wave_number_rad_per_m(frequency_hz) * self.half_length_m).sin();
        (share.abs() > 1e-6).then(|| loop_ohm / (share * share))
    }
}
