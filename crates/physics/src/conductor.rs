//! What the metal and the insulation of a round wire do: skin effect, and the slower wave on a covered wire.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;

use crate::constants::VACUUM_PERMEABILITY_H_PER_M;
use crate::special::bessel_j0_over_j1;

/// A solid, round, non-magnetic wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RoundWire {
    /// Radius of the metal, m, > 0.
    pub radius_m: f64,
    /// Conductivity, S/m, > 0.
    pub conductivity_s_per_m: f64,
}

impl RoundWire {
    /// Internal impedance per metre, Ω/m: loss resistance and the reactance of the field inside the metal.
    ///
    /// Exact for an isolated straight wire (no proximity effect), good conductor (σ ≫ ωε0), any ratio of radius to
    /// skin depth. Of a stranded wire multiply the resistance by a measured factor.
    ///
    /// Source: the classical solution by Bessel functions, e.g. Ramo, Whinnery & Van Duzer, "Fields and Waves in
    /// Communication Electronics" (from memory).
    #[must_use]
    pub fn internal_impedance_ohm_per_m(&self, frequency_hz: f64) -> Complex64 {
        // κ = √(−jωµσ) = (1 − j)/δ,   Z' = κ/(2πaσ) · J0(κa)/J1(κa)
        let kappa = Complex64::new(1.0, -1.0) / skin_depth_m(frequency_hz, self.conductivity_s_per_m);
        kappa * bessel_j0_over_j1(kappa * self.radius_m) / (TAU * self.radius_m * self.conductivity_s_per_m)
    }

    /// Resistance per metre to direct current, Ω/m.
    #[must_use]
    pub fn dc_resistance_ohm_per_m(&self) -> f64 {
        // R = 1/(σπa²)
        1.0 / (self.conductivity_s_per_m * PI * self.radius_m * self.radius_m)
    }
}

/// Skin depth of a non-magnetic metal, m.
#[must_use]
pub fn skin_depth_m(frequency_hz: f64, conductivity_s_per_m: f64) -> f64 {
    // δ = √(2/(ωµσ))
    (PI * frequency_hz * VACUUM_PERMEABILITY_H_PER_M * conductivity_s_per_m).sqrt().recip()
}

/// Surface resistance of a thick flat non-magnetic conductor, Ω per square.
#[must_use]
pub fn surface_resistance_ohm(frequency_hz: f64, conductivity_s_per_m: f64) -> f64 {
    // Rs = 1/(σδ)
    1.0 / (conductivity_s_per_m * skin_depth_m(frequency_hz, conductivity_s_per_m))
}

/// A round wire under a layer of insulation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct InsulatedWire {
    /// Diameter of the metal, m, > 0.
    pub metal_diameter_m: f64,
    /// Diameter over the insulation, m, at least the metal's.
    pub outer_diameter_m: f64,
    /// Relative permittivity of the insulation, ≥ 1.
    pub relative_permittivity: f64,
}

/// Where the field of the wire ends: it sets the inductance that the insulation's share is compared with.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Surroundings {
    /// A line with the earth as return, this high, m.
    OverEarth {
        /// Height of the wire's axis, m, well above its diameter.
        height_m: f64,
    },
    /// A wire of this length on its own, m.
    Free {
        /// Whole length of the wire, m, well above its diameter.
        length_m: f64,
    },
}

impl InsulatedWire {
    /// Velocity of the current wave relative to light, 0 to 1.
    ///
    /// Quasi-static: thin layer, lossless insulation, wire straight and thin. Agrees with full solutions to about
    /// 0.5 %. Bare wire (equal diameters or permittivity 1) gives 1.
    ///
    /// Source: the layer adds µ0/2π·(1 − 1/ε)·ln(D/d) of inductance per metre (as in Richmond & Newman, Radio
    /// Science 11, 1976; from memory), compared with the inductance µ0/2π·ln(4H/d) of the wire over earth, or with
    /// µ0/2π·(ln(l/a) − 1), its mean value on a free wire.
    #[must_use]
    pub fn velocity_factor(&self, surroundings: Surroundings) -> f64 {
        let diameter_m = self.metal_diameter_m;
        let wire = match surroundings {
            Surroundings::OverEarth { height_m } => (4.0 * height_m / diameter_m).ln(),
            Surroundings::Free { length_m } => (2.0 * length_m / diameter_m).ln() - 1.0,
        };
        // VF = √(1 − (1 − 1/ε)·ln(D/d)/ln(4H/d))
        let layer = (1.0 - self.relative_permittivity.recip()) * (self.outer_diameter_m / diameter_m).ln();
        (1.0 - layer / wire).sqrt()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::constants::COPPER_CONDUCTIVITY_S_PER_M;

    const WIRE: RoundWire = RoundWire { radius_m: 1e-3, conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M };

    #[test]
    fn slow_current_fills_the_wire() {
        let ohm_per_m = WIRE.internal_impedance_ohm_per_m(1.0);
        assert!((ohm_per_m.re / WIRE.dc_resistance_ohm_per_m() - 1.0).abs() < 1e-6);
        // The field inside a wire with even current: µ0/8π of inductance per metre.
        let inductance_h_per_m = ohm_per_m.im / TAU;
        assert!((inductance_h_per_m / (VACUUM_PERMEABILITY_H_PER_M / (8.0 * PI)) - 1.0).abs() < 1e-6);
    }

    #[test]
    fn fast_current_keeps_to_a_skin() {
        // Z' → (1 + j)·Rs/(2πa), from above: 1 + δ/2a to the next order.
        for frequency_hz in [1e9, 1e12, 1e15] {
            let depth_m = skin_depth_m(frequency_hz, WIRE.conductivity_s_per_m);
            let rs_ohm = surface_resistance_ohm(frequency_hz, WIRE.conductivity_s_per_m);
            let flat_ohm_per_m = rs_ohm / (TAU * WIRE.radius_m);
            let ohm_per_m = WIRE.internal_impedance_ohm_per_m(frequency_hz);
            let curved = 1.0 + 0.5 * depth_m / WIRE.radius_m;
            assert!((ohm_per_m.re / flat_ohm_per_m / curved - 1.0).abs() < 1e-5);
            assert!((ohm_per_m.im / flat_ohm_per_m - 1.0).abs() < 1e-5);
        }
    }

    #[test]
    fn bare_wire_is_as_fast_as_light() {
        let over_earth = Surroundings::OverEarth { height_m: 10.0 };
        for (outer_diameter_m, relative_permittivity) in [(2e-3, 3.5), (3e-3, 1.0)] {
            let wire = InsulatedWire { metal_diameter_m: 2e-3, outer_diameter_m, relative_permittivity };
            assert!((wire.velocity_factor(over_earth) - 1.0).abs() < 1e-12);
        }
    }
}
