//! Lengths at which a centre-fed wire resonates.

use std::f64::consts::{FRAC_PI_2, PI};

use super::schelkunoff::{input_impedance, mean_characteristic_impedance_ohm, space_terms};
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::special::sine_cosine_integrals;

/// A centre-fed wire in free space, without loss, near one of its resonances.
///
/// Odd harmonics are the resonances with a current loop at the feedpoint and a low resistance, even ones those with a
/// node there and a high resistance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HarmonicWire {
    /// Number of half waves, ≥ 1.
    pub harmonic: u32,
    /// Radius of the metal, m.
    pub radius_m: f64,
    /// Velocity of the current wave relative to light.
    pub velocity_factor: f64,
}

impl HarmonicWire {
    /// Length of the wire at resonance, m, end effect included; `None` if the wire is so thick or the harmonic so high
    /// that its reactance does not pass zero.
    ///
    /// Solves X = 0 of the sketch's impedance. Frequency > 0; meant for lengths of at least 100 radii.
    #[must_use]
    pub fn resonant_length_m(&self, frequency_hz: f64) -> Option<f64> {
        let k = self.wave_number_on_wire(frequency_hz);
        let kl = self.solve(|kl| self.characteristic_ohm(kl / k))?;
        Some(2.0 * kl / k)
    }

    /// Frequency at which a wire of this length resonates, Hz; `None` as for [`Self::resonant_length_m`].
    #[must_use]
    pub fn resonant_frequency_hz(&self, length_m: f64) -> Option<f64> {
        let characteristic_ohm = self.characteristic_ohm(0.5 * length_m);
        let kl = self.solve(|_| characteristic_ohm)?;
        // kl = 2πf/(c·VF)·l
        Some(kl * SPEED_OF_LIGHT_M_PER_S * self.velocity_factor / (PI * length_m))
    }

    /// Closed estimate of [`Self::resonant_length_m`], m: within 1 % of it for wires of 10 000 radii or more.
    ///
    /// First order of the same formula about kl = nπ/2, with K of the unshortened wire:
    /// the wire is short of n half waves by tan δ = (X − N)/(K − M) for odd n, (X + N)/(K + M) for even n.
    #[must_use]
    pub fn resonant_length_estimate_m(&self, frequency_hz: f64) -> f64 {
        let k = self.wave_number_on_wire(frequency_hz);
        let half_waves = f64::from(self.harmonic) * FRAC_PI_2;
        2.0 * (half_waves - self.end_effect_rad(self.characteristic_ohm(half_waves / k))) / k
    }

    /// δ, rad.
    fn end_effect_rad(&self, characteristic_ohm: f64) -> f64 {
        let n_pi = f64::from(self.harmonic) * PI;
        let unit = VACUUM_IMPEDANCE_OHM / (2.0 * PI);
        let one = sine_cosine_integrals(n_pi);
        let two = sine_cosine_integrals(2.0 * n_pi);
        if self.harmonic % 2 == 1 {
            // X − N = 30 Si 2nπ,   M = 60(Cin nπ − 2)
            (0.5 * unit * two.si).atan2(characteristic_ohm - unit * (one.cin(n_pi) - 2.0))
        } else {
            // X + N = 120 Si nπ − 30 Si 2nπ,   M = 60 Cin nπ
            (unit * (2.0 * one.si - 0.5 * two.si)).atan2(characteristic_ohm + unit * one.cin(n_pi))
        }
    }

    /// Electrical half length kl at which X = 0, K being a function of it.
    fn solve(&self, characteristic_ohm: impl Fn(f64) -> f64) -> Option<f64> {
        // The reactance rises through zero at odd harmonics and falls at even ones.
        let sign = if self.harmonic % 2 == 1 { 1.0 } else { -1.0 };
        let rising = |kl: f64| sign * input_impedance(&space_terms(kl), characteristic_ohm(kl), kl).im;
        let half_waves = f64::from(self.harmonic) * FRAC_PI_2;
        let shortening = self.end_effect_rad(characteristic_ohm(half_waves));
        // Damping moves the zero a little beyond the estimate; an eighth of a wave away the next one begins.
        let (mut low, mut high) = (half_waves - (2.0 * shortening + 0.05).min(0.9 * FRAC_PI_2), half_waves);
        if rising(low) >= 0.0 || rising(high) <= 0.0 {
            return None;
        }
        // Halving the bracket 50 times leaves less than rounding.
        for _ in 0..50 {
            let middle = 0.5 * (low + high);
            if rising(middle) < 0.0 {
                low = middle;
            } else {
                high = middle;
            }
        }
        Some(0.5 * (low + high))
    }

    fn wave_number_on_wire(&self, frequency_hz: f64) -> f64 {
        wave_number_rad_per_m(frequency_hz) / self.velocity_factor
    }

    fn characteristic_ohm(&self, half_length_m: f64) -> f64 {
        mean_characteristic_impedance_ohm(half_length_m, self.radius_m) / self.velocity_factor
    }
}
