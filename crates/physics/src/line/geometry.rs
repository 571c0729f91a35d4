//! Constants of two-wire and coaxial lines from geometry and material.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;

use super::constants::{LineConstants, LineError, not_negative, positive, velocity_factor};
use crate::conductor::{RoundWire, skin_depth_m};
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM};

/// Two equal, solid, round wires side by side, far from everything else.
///
/// External inductance and capacitance are the exact ones (acosh); each wire's internal impedance is that
/// of a round wire with the exact skin effect, times the exact proximity factor for a thin skin. Valid where
/// the skin is thin against the wire (2 mm of copper: from about 0.1 MHz) and the spacing small
/// against the wavelength, since radiation of the line is left out.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoWire {
    /// Diameter of each wire, m.
    pub wire_diameter_m: f64,
    /// Distance between the wires' centres, m.
    pub spacing_m: f64,
    /// Conductivity of the wires, S/m.
    pub conductivity_s_per_m: f64,
    /// Velocity relative to light: 1 for bare wires in air, less with spacers or a web, which add
    /// capacitance and no inductance.
    pub velocity_factor: f64,
    /// Loss tangent of what fills the field, weighted by its share.
    pub loss_tangent: f64,
}

impl TwoWire {
    /// Characteristic impedance without loss, Ω.
    ///
    /// # Errors
    ///
    /// Figures that are not positive, wires that touch, a velocity above light's.
    pub fn lossless_z0_ohm(&self) -> Result<f64, LineError> {
        positive("the wires' diameter in metres", self.wire_diameter_m)?;
        positive("the wires' spacing in metres", self.spacing_m)?;
        velocity_factor(self.velocity_factor)?;
        if self.spacing_m <= self.wire_diameter_m {
            return Err(LineError::WiresTouch {
                spacing_m: self.spacing_m,
                wire_diameter_m: self.wire_diameter_m,
            });
        }
        // Z₀ = VF·(η₀/π)·acosh(D/d)
        let ratio = self.spacing_m / self.wire_diameter_m;
        Ok(self.velocity_factor * VACUUM_IMPEDANCE_OHM / PI * ratio.acosh())
    }

    /// Z₀ and γ at a frequency, Hz.
    ///
    /// # Errors
    ///
    /// As [`Self::lossless_z0_ohm`], and a frequency or conductivity that is not positive.
    pub fn constants(&self, frequency_hz: f64) -> Result<LineConstants, LineError> {
        let z0_ohm = self.lossless_z0_ohm()?;
        positive("the frequency in hertz", frequency_hz)?;
        positive("the wires' conductivity in siemens per metre", self.conductivity_s_per_m)?;
        not_negative("the loss tangent", self.loss_tangent)?;
        // Proximity: the fields of two line charges make the thin skin's loss larger by
        // 1/√(1 − (d/D)²), and its inductance with it (∂L/∂a of the acosh law, Wheeler's rule).
        let closeness = self.wire_diameter_m / self.spacing_m;
        let proximity = (1.0 - closeness * closeness).sqrt().recip();
        let wire = RoundWire {
            radius_m: 0.5 * self.wire_diameter_m,
            conductivity_s_per_m: self.conductivity_s_per_m,
        };
        let internal = wire.internal_impedance_ohm_per_m(frequency_hz) * (2.0 * proximity);
        let beta0 = TAU * frequency_hz / (self.velocity_factor * SPEED_OF_LIGHT_M_PER_S);
        Ok(with_internal(Ideal { z0_ohm, beta0_per_m: beta0 }, internal, self.loss_tangent))
    }
}

/// A solid round wire in the bore of an outer conductor of the same metal.
///
/// Both conductors with their exact skin effect; the outer one many skin depths thick. Braid and stranding
/// cost more than the formula says, so published attenuation of flexible cables is higher.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coaxial {
    /// Diameter of the inner conductor, m.
    pub inner_diameter_m: f64,
    /// Inner diameter of the outer conductor, m.
    pub outer_diameter_m: f64,
    /// Conductivity of both conductors, S/m.
    pub conductivity_s_per_m: f64,
    /// Relative permittivity of the filling.
    pub relative_permittivity: f64,
    /// Loss tangent of the filling.
    pub loss_tangent: f64,
}

impl Coaxial {
    /// Characteristic impedance without loss, Ω.
    ///
    /// # Errors
    ///
    /// Figures that are not positive, a permittivity below 1, an inner conductor that does not fit.
    pub fn lossless_z0_ohm(&self) -> Result<f64, LineError> {
        positive("the inner conductor's diameter in metres", self.inner_diameter_m)?;
        positive("the outer conductor's bore in metres", self.outer_diameter_m)?;
        velocity_factor(self.velocity_factor())?;
        if self.inner_diameter_m >= self.outer_diameter_m {
            return Err(LineError::InnerTooThick {
                inner_diameter_m: self.inner_diameter_m,
                outer_diameter_m: self.outer_diameter_m,
            });
        }
        // Z₀ = η₀/(2π√ε)·ln(D/d)
        let ratio = self.outer_diameter_m / self.inner_diameter_m;
        Ok(self.velocity_factor() * VACUUM_IMPEDANCE_OHM / TAU * ratio.ln())
    }

    /// Velocity relative to light without loss: 1/√ε.
    #[must_use]
    pub fn velocity_factor(&self) -> f64 {
        self.relative_permittivity.sqrt().recip()
    }

    /// Z₀ and γ at a frequency, Hz.
    ///
    /// # Errors
    ///
    /// As [`Self::lossless_z0_ohm`], and a frequency or conductivity that is not positive.
    pub fn constants(&self, frequency_hz: f64) -> Result<LineConstants, LineError> {
        let z0_ohm = self.lossless_z0_ohm()?;
        positive("the frequency in hertz", frequency_hz)?;
        positive("the conductors' conductivity in siemens per metre", self.conductivity_s_per_m)?;
        not_negative("the loss tangent", self.loss_tangent)?;
        let inner = RoundWire {
            radius_m: 0.5 * self.inner_diameter_m,
            conductivity_s_per_m: self.conductivity_s_per_m,
        };
        let internal =
            inner.internal_impedance_ohm_per_m(frequency_hz) + self.bore_impedance_ohm_per_m(frequency_hz);
        let beta0 = TAU * frequency_hz / (self.velocity_factor() * SPEED_OF_LIGHT_M_PER_S);
        Ok(with_internal(Ideal { z0_ohm, beta0_per_m: beta0 }, internal, self.loss_tangent))
    }

    /// Internal impedance of the outer conductor, which is many skin depths thick, Ω/m.
    fn bore_impedance_ohm_per_m(&self, frequency_hz: f64) -> Complex64 {
        // ζ = (1 + j)/δ, Z′ = ζ/(2πbσ)·K₀(ζb)/K₁(ζb), and K₀/K₁ = 1 − 1/2z + 3/8z² − 3/8z³ + …: the next term
        // is 1e-5 where the bore is twenty skin depths wide.
        let bore_m = 0.5 * self.outer_diameter_m;
        let zeta = Complex64::new(1.0, 1.0) / skin_depth_m(frequency_hz, self.conductivity_s_per_m);
        let w = (zeta * bore_m).inv();
        let ratio = 1.0 - w * (0.5 - w * (0.375 - w * 0.375));
        zeta * ratio / (TAU * bore_m * self.conductivity_s_per_m)
    }
}

/// The line without loss.
struct Ideal {
    z0_ohm: f64,
    beta0_per_m: f64,
}

/// The line with the conductors' internal impedance (Ω/m) and a loss tangent.
fn with_internal(line: Ideal, internal_ohm_per_m: Complex64, loss_tangent: f64) -> LineConstants {
    // Z′ = Z_int + jωL, Y′ = ωC·(j + tan δ); ωL = β₀Z₀, ωC = β₀/Z₀
    LineConstants::from_per_metre(
        internal_ohm_per_m + Complex64::new(0.0, line.beta0_per_m * line.z0_ohm),
        Complex64::new(loss_tangent, 1.0) * (line.beta0_per_m / line.z0_ohm),
    )
}
