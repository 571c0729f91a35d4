//! Z₀ and γ of a line at one frequency.

use std::f64::consts::{LN_10, TAU};

use num_complex::Complex64;
use thiserror::Error;

use super::LossLaw;
use crate::constants::SPEED_OF_LIGHT_M_PER_S;

/// Nepers in one decibel of power loss: ln(10)/20.
pub(super) const NEPER_PER_DB: f64 = LN_10 / 20.0;

/// What a line does at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineConstants {
    /// Characteristic impedance, Ω; complex where there is loss.
    pub z0_ohm: Complex64,
    /// Propagation constant γ = α + jβ, 1/m (nepers and radians).
    pub gamma_per_m: Complex64,
}

impl LineConstants {
    /// Loss of a metre of line that is terminated in its own Z₀, dB/m.
    #[must_use]
    pub fn matched_loss_db_per_m(&self) -> f64 {
        self.gamma_per_m.re / NEPER_PER_DB
    }

    /// From series impedance R + jωL (Ω/m) and shunt admittance G + jωC (S/m) per metre.
    ///
    /// Valid where both take no power from nowhere: R, G ≥ 0 and L, C > 0.
    #[must_use]
    pub fn from_per_metre(series_ohm_per_m: Complex64, shunt_s_per_m: Complex64) -> Self {
        // Z₀ = √(Z′/Y′), γ = √(Z′Y′) = Z₀·Y′. Both Z′ and Y′ lie between j and 1 + j, so Z′/Y′ lies in the
        // right half-plane, where √(x + jy) = p + j·y/2p with p = √((|·| + x)/2) has no cancellation.
        let square = series_ohm_per_m / shunt_s_per_m;
        let re = (0.5 * (square.norm_sqr().sqrt() + square.re)).sqrt();
        let z0_ohm = Complex64::new(re, square.im / (2.0 * re));
        Self { z0_ohm, gamma_per_m: z0_ohm * shunt_s_per_m }
    }
}

/// Why a line has no constants.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum LineError {
    /// A quantity is outside what the model is valid for.
    #[error("{quantity} is {value}; it must be {accepted}")]
    OutOfRange {
        /// The quantity with its unit.
        quantity: &'static str,
        /// Its value.
        value: f64,
        /// What would be accepted.
        accepted: &'static str,
    },
    /// Two wires that touch or overlap.
    #[error(
        "the wires are {spacing_m} m apart between centres but {wire_diameter_m} m thick; they must not touch"
    )]
    WiresTouch {
        /// Distance between centres, m.
        spacing_m: f64,
        /// Diameter of each, m.
        wire_diameter_m: f64,
    },
    /// A coaxial line whose inner conductor does not fit.
    #[error(
        "the inner conductor is {inner_diameter_m} m thick; it must be thinner than the outer one's bore, {outer_diameter_m} m"
    )]
    InnerTooThick {
        /// Diameter of the inner conductor, m.
        inner_diameter_m: f64,
        /// Bore of the outer conductor, m.
        outer_diameter_m: f64,
    },
}

/// Refuses what is not positive and finite.
pub(super) fn positive(quantity: &'static str, value: f64) -> Result<(), LineError> {
    if value > 0.0 && value.is_finite() {
        Ok(())
    } else {
        Err(LineError::OutOfRange { quantity, value, accepted: "greater than zero" })
    }
}

/// Refuses what is negative or not finite.
pub(super) fn not_negative(quantity: &'static str, value: f64) -> Result<(), LineError> {
    if value >= 0.0 && value.is_finite() {
        Ok(())
    } else {
        Err(LineError::OutOfRange { quantity, value, accepted: "zero or more" })
    }
}

/// A line described by the figures of a data sheet.
///
/// The sheet gives Z₀ and the velocity that the line tends to at high frequency, and its matched loss.
/// From them the constants per metre: L and C of the lossless line; a series resistance R with a
/// skin-effect internal reactance equal to it (as for any conductor much thicker than the skin depth), and
/// a shunt conductance G = ωC·tan δ. tan δ is 2·α_d/β₀ from the loss that grows with f, and R is then the
/// one that makes Re γ **equal** to the published loss, not only to first order. So Z₀ is properly
/// complex, and the phase velocity drops a little toward low frequency, as on real lines.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NominalLine {
    /// Nominal impedance at high frequency, Ω.
    pub z0_ohm: f64,
    /// Velocity relative to light at high frequency, over 0, at most 1.
    pub velocity_factor: f64,
    /// Matched loss.
    pub loss: LossLaw,
}

impl NominalLine {
    /// Z₀ and γ at a frequency, Hz.
    ///
    /// # Errors
    ///
    /// A figure that is not finite or not positive (losses: negative), a velocity above light's.
    pub fn constants(&self, frequency_hz: f64) -> Result<LineConstants, LineError> {
        positive("the frequency in hertz", frequency_hz)?;
        positive("the line's impedance in ohms", self.z0_ohm)?;
        not_negative("the line's k1 in dB per 100 m", self.loss.k1_db_per_100m)?;
        not_negative("the line's k2 in dB per 100 m", self.loss.k2_db_per_100m)?;
        velocity_factor(self.velocity_factor)?;

        // β₀ = ω/(VF·c)
        let beta0 = TAU * frequency_hz / (self.velocity_factor * SPEED_OF_LIGHT_M_PER_S);
        let q = self.loss.db_per_m(frequency_hz) * NEPER_PER_DB / beta0;
        let tan_delta = 2.0 * self.loss.dielectric_db_per_m(frequency_hz) * NEPER_PER_DB / beta0;
        let r = resistance_over_reactance(q, tan_delta);

        // Z′ = jωL·(1 + r − jr) and Y′ = jωC·(1 − j·tan δ), with ωL = β₀·Z₀ and ωC = β₀/Z₀
        let j = Complex64::I;
        Ok(LineConstants::from_per_metre(
            j * (1.0 + r - j * r) * (beta0 * self.z0_ohm),
            j * (1.0 - j * tan_delta) * (beta0 / self.z0_ohm),
        ))
    }
}

/// Refuses a velocity factor that is not over 0 and at most 1.
pub(super) fn velocity_factor(value: f64) -> Result<(), LineError> {
    if value > 0.0 && value <= 1.0 {
        Ok(())
    } else {
        Err(LineError::OutOfRange {
            quantity: "the line's velocity factor",
            value,
            accepted: "greater than 0 and at most 1",
        })
    }
}

/// r = R/(ωL) that makes Re γ/β₀ equal to `q`, for a given tan δ = `g`.
fn resistance_over_reactance(q: f64, g: f64) -> f64 {
    // γ/β₀ = j·√(A − jB), A = 1 + r·(1 − g), B = g + r·(1 + g). With √(A − jB) = p − jq: A = p² − q²,
    // B = 2pq, so B² = 4q²·(q² + A), a quadratic in r:
    // (1 + g)²·r² + 2·[g·(1 + g) − 2q²·(1 − g)]·r + g² − 4q²·(1 + q²) = 0.
    // Its constant term is never positive (g ≤ 2q), so it has one root that is not negative.
    let a = (1.0 + g) * (1.0 + g);
    let half_b = g * (1.0 + g) - 2.0 * q * q * (1.0 - g);
    let c = g * g - 4.0 * q * q * (1.0 + q * q);
    let root = (half_b * half_b - a * c).max(0.0).sqrt();
    // The form without cancellation of half_b against the root.
    let r = if half_b > 0.0 { -c / (half_b + root) } else { (root - half_b) / a };
    if r.is_finite() { r.max(0.0) } else { 0.0 }
}
