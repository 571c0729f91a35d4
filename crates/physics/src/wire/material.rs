//! Metal and insulation of a wire: series impedance per metre, and what a dielectric cover does to the charge.

use std::f64::consts::{PI, TAU};

use complex_bessel::{besseli_scaled, besselk_scaled};
use num_complex::Complex64;

use crate::constants::{VACUUM_PERMEABILITY_H_PER_M, VACUUM_PERMITTIVITY_F_PER_M};

/// Metal and cover of a round wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Material {
    /// The metal.
    pub metal: Metal,
    /// Factor on the resistance of the solid wire of this radius, for stranding; 1 for a solid wire.
    pub resistance_factor: f64,
    /// The cover; `None` for bare wire.
    pub insulation: Option<Insulation>,
}

impl Material {
    /// Bare wire without loss.
    pub const PERFECT: Self = Self { metal: Metal::Perfect, resistance_factor: 1.0, insulation: None };

    /// Series impedance per metre of wire, Ω/m, with the stranding factor on its resistance.
    #[must_use]
    pub fn series_impedance_ohm_per_m(&self, radius_m: f64, frequency_hz: f64) -> Complex64 {
        let solid = self.metal.internal_impedance_ohm_per_m(radius_m, frequency_hz);
        Complex64::new(self.resistance_factor * solid.re, solid.im)
    }
}

/// What a round wire is made of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Metal {
    /// No resistance, no field inside.
    Perfect,
    /// One metal throughout.
    Solid(Conductor),
    /// A round core in a cladding.
    Clad {
        /// Metal of the core.
        core: Conductor,
        /// Metal of the cladding.
        cladding: Conductor,
        /// Thickness of the cladding, m, > 0, less than the wire's radius.
        thickness_m: f64,
    },
}

/// A metal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conductor {
    /// Conductivity, S/m, > 0.
    pub conductivity_s_per_m: f64,
    /// Relative permeability, ≥ 1 for anything but oddities.
    pub relative_permeability: f64,
}

impl Conductor {
    /// γ = √(jωµσ), 1/m.
    fn propagation_per_m(&self, frequency_hz: f64) -> Complex64 {
        let depth_m =
            (PI * frequency_hz * self.permeability_h_per_m() * self.conductivity_s_per_m).sqrt().recip();
        Complex64::new(1.0, 1.0) / depth_m
    }

    fn permeability_h_per_m(&self) -> f64 {
        self.relative_permeability * VACUUM_PERMEABILITY_H_PER_M
    }
}

impl Metal {
    /// Internal impedance of a straight wire per metre, Ω/m: loss resistance and the reactance of the field inside.
    ///
    /// Exact for a field that is even round the wire (no proximity effect) in good conductors (σ ≫ ωε0), any ratio of
    /// radius or cladding to skin depth.
    ///
    /// Source: the classical solution by Bessel functions, layer by layer, e.g. Schelkunoff, Bell System Technical
    /// Journal 13, 1934 (from memory).
    #[must_use]
    pub fn internal_impedance_ohm_per_m(&self, radius_m: f64, frequency_hz: f64) -> Complex64 {
        match *self {
            Self::Perfect => Complex64::ZERO,
            Self::Solid(metal) => surface_impedance_ohm(metal, radius_m, frequency_hz) / (TAU * radius_m),
            Self::Clad { core, cladding, thickness_m } => {
                let core_ohm = surface_impedance_ohm(core, radius_m - thickness_m, frequency_hz);
                let layer = Layer { metal: cladding, inner_m: radius_m - thickness_m, outer_m: radius_m };
                layer.surface_impedance_ohm(core_ohm, frequency_hz) / (TAU * radius_m)
            }
        }
    }
}

/// E/H at the surface of a solid round wire, Ω.
fn surface_impedance_ohm(metal: Conductor, radius_m: f64, frequency_hz: f64) -> Complex64 {
    // Z = γ/σ · I0(γa)/I1(γa)
    let gamma = metal.propagation_per_m(frequency_hz);
    let [i0, i1, ..] = bessel_scaled(gamma * radius_m);
    gamma / metal.conductivity_s_per_m * i0 / i1
}

/// A tube of metal round something else.
struct Layer {
    metal: Conductor,
    inner_m: f64,
    outer_m: f64,
}

impl Layer {
    /// E/H at the outer surface, given E/H at the inner one, Ω.
    fn surface_impedance_ohm(&self, inner_ohm: Complex64, frequency_hz: f64) -> Complex64 {
        // E = I0(γr) + ρ·K0(γr),   H = [I1(γr) − ρ·K1(γr)]·σ/γ
        let gamma = self.metal.propagation_per_m(frequency_hz);
        let eta_ohm = gamma / self.metal.conductivity_s_per_m;
        let [inner, outer] = [gamma * self.inner_m, gamma * self.outer_m];
        let [i0, i1, k0, k1] = bessel_scaled(inner);
        let ratio = inner_ohm / eta_ohm;
        // The scale factors exp(Re γr) of I and exp(−γr) of K leave the way through the layer and back.
        let scale = (Complex64::from(inner.re - outer.re) + inner - outer).exp();
        let rho = -(i0 - ratio * i1) / (k0 + ratio * k1) * scale;
        let [i0, i1, k0, k1] = bessel_scaled(outer);
        eta_ohm * (i0 + rho * k0) / (i1 - rho * k1)
    }
}

/// I0(z)·e^(−Re z), I1(z)·e^(−Re z), K0(z)·e^z, K1(z)·e^z for Re z > 0.
///
/// Where the library gives up (|z| beyond about 1e9: a skin a billionth of the wire) the leading terms stand in.
fn bessel_scaled(z: Complex64) -> [Complex64; 4] {
    let grown = || Complex64::cis(z.im) / (TAU * z).sqrt();
    let decayed = || (PI / (2.0 * z)).sqrt();
    [
        besseli_scaled(0.0, z).unwrap_or_else(|_| grown()),
        besseli_scaled(1.0, z).unwrap_or_else(|_| grown()),
        besselk_scaled(0.0, z).unwrap_or_else(|_| decayed()),
        besselk_scaled(1.0, z).unwrap_or_else(|_| decayed()),
    ]
}

/// A dielectric cover.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Insulation {
    /// Radius over the cover, m, at least the metal's.
    pub outer_radius_m: f64,
    /// Relative permittivity, ≥ 1.
    pub relative_permittivity: f64,
}

impl Insulation {
    /// By how much the cover lowers the potential of the metal, per charge per metre: m/F.
    ///
    /// Quasi-static: cover thin against the wavelength and against the length over which the charge changes, no loss.
    ///
    /// Source: J. H. Richmond and E. H. Newman, "Dielectric coated wire antennas", Radio Science 11, 1976 (from
    /// memory): the radial field of the charge in the cover is 1/ε of the field in air. On a current with I″ = −k²I it
    /// equals an inductance of µ0/2π·(1 − 1/ε)·ln(b/a) per metre.
    #[must_use]
    pub fn elastance_m_per_f(&self, radius_m: f64) -> f64 {
        // (1 − 1/ε)·ln(b/a)/(2πε0)
        let share = 1.0 - self.relative_permittivity.recip();
        share * (self.outer_radius_m / radius_m).ln() / (TAU * VACUUM_PERMITTIVITY_F_PER_M)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::conductor::RoundWire;

    const COPPER: Conductor = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    const STEEL: Conductor = Conductor { conductivity_s_per_m: 6e6, relative_permeability: 200.0 };
    const RADIUS_M: f64 = 1e-3;

    fn near(got: Complex64, expected: Complex64, tolerance: f64) {
        assert!((got - expected).norm() < tolerance * expected.norm(), "{got} for {expected}");
    }

    #[test]
    fn solid_wire_is_the_round_wire() {
        let wire = RoundWire { radius_m: RADIUS_M, conductivity_s_per_m: 58e6 };
        for frequency_hz in [10.0, 1e4, 1e6, 30e6, 1e12] {
            let got = Metal::Solid(COPPER).internal_impedance_ohm_per_m(RADIUS_M, frequency_hz);
            near(got, wire.internal_impedance_ohm_per_m(frequency_hz), 1e-9);
        }
    }

    #[test]
    fn two_layers_of_one_metal_are_solid() {
        for frequency_hz in [10.0, 1e4, 1e6, 30e6, 1e12] {
            for thickness_m in [1e-6, 1e-4, 0.9e-3] {
                let clad = Metal::Clad { core: STEEL, cladding: STEEL, thickness_m };
                let solid = Metal::Solid(STEEL).internal_impedance_ohm_per_m(RADIUS_M, frequency_hz);
                near(clad.internal_impedance_ohm_per_m(RADIUS_M, frequency_hz), solid, 1e-9);
            }
        }
    }

    #[test]
    fn cladding_hides_the_core_when_thick_and_shares_the_current_when_slow() {
        let clad = Metal::Clad { core: STEEL, cladding: COPPER, thickness_m: 0.2e-3 };
        // Skin depth of copper at 30 MHz: 12 µm.
        let solid = Metal::Solid(COPPER).internal_impedance_ohm_per_m(RADIUS_M, 30e6);
        near(clad.internal_impedance_ohm_per_m(RADIUS_M, 30e6), solid, 1e-6);
        // Direct current: both conduct in parallel.
        let core_s_m = 6e6 * PI * 0.8e-3 * 0.8e-3;
        let cladding_s_m = 58e6 * PI * (1e-6 - 0.8e-3 * 0.8e-3);
        let slow = clad.internal_impedance_ohm_per_m(RADIUS_M, 1e-3);
        assert!((slow.re * (core_s_m + cladding_s_m) - 1.0).abs() < 1e-6, "{slow}");
    }

    #[test]
    fn thin_copper_on_steel_loses_more_than_copper_and_less_than_steel() {
        let loss = |metal: Metal| metal.internal_impedance_ohm_per_m(RADIUS_M, 1.8e6).re;
        let clad = loss(Metal::Clad { core: STEEL, cladding: COPPER, thickness_m: 20e-6 });
        assert!(clad > 1.2 * loss(Metal::Solid(COPPER)) && clad < 0.5 * loss(Metal::Solid(STEEL)));
    }

    #[test]
    fn cover_counts_as_the_inductance_of_its_formula() {
        // L = δ/c² = µ0/2π·(1 − 1/ε)·ln(b/a)
        let cover = Insulation { outer_radius_m: 2e-3, relative_permittivity: 2.3 };
        let inductance_h_per_m =
            cover.elastance_m_per_f(RADIUS_M) * VACUUM_PERMEABILITY_H_PER_M * VACUUM_PERMITTIVITY_F_PER_M;
        let expected = VACUUM_PERMEABILITY_H_PER_M / TAU * (1.0 - 1.0 / 2.3) * 2.0_f64.ln();
        assert!((inductance_h_per_m / expected - 1.0).abs() < 1e-12);
    }
}
