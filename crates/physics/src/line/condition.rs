//! Conditions of a line: rain on open line, and the watts that warm it.

use num_complex::Complex64;

use super::LineConstants;
use super::constants::{LineError, not_negative};

/// Water on a line's spacers or web.
///
/// A named condition, not a measurement: rain differs, and dirt and ice do far more. Water adds capacitance and a
/// conductance that grows with the frequency like a loss tangent; it changes nothing in the metal.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wetness {
    /// Capacitance per metre over that of the dry line, 1 or more.
    pub capacitance_factor: f64,
    /// What is added to the loss tangent, zero or more.
    pub added_loss_tangent: f64,
}

impl LineConstants {
    /// The constants of the same line in rain.
    ///
    /// # Errors
    ///
    /// A capacitance that falls, a loss tangent that gives gain.
    pub fn wet(&self, wetness: Wetness) -> Result<Self, LineError> {
        let Wetness { capacitance_factor, added_loss_tangent } = wetness;
        if !(capacitance_factor >= 1.0 && capacitance_factor.is_finite()) {
            return Err(LineError::OutOfRange {
                quantity: "the wet line's capacitance over the dry one's",
                value: capacitance_factor,
                accepted: "1 or more",
            });
        }
        not_negative("the wet line's added loss tangent", added_loss_tangent)?;
        // Z′ = γ·Z₀ stays; Y′ = γ/Z₀ gains: C′ = C·c, G′ = G + ωC·c·tan δ
        let (series, shunt) = (self.gamma_per_m * self.z0_ohm, self.gamma_per_m / self.z0_ohm);
        let susceptance = shunt.im * capacitance_factor;
        let conductance = shunt.re.max(0.0) + susceptance * added_loss_tangent;
        Ok(Self::from_per_metre(series, Complex64::new(conductance, susceptance)))
    }
}

/// The average power that a line takes into a matched load where its loss is known.
///
/// It is heat that limits it, the same in every metre at every frequency: P(f) = P₀·α(f₀)/α(f). With a standing
/// wave the hottest place carries the current of SWR times the power, in the worst case.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AverageRating {
    /// W.
    pub power_w: f64,
    /// Matched loss at the frequency of the rating, dB/m, greater than zero.
    pub loss_db_per_m: f64,
}

impl AverageRating {
    /// What it takes where the matched loss is this, dB/m; W.
    #[must_use]
    pub fn at_loss_w(&self, loss_db_per_m: f64) -> f64 {
        // P·α = P₀·α₀
        self.power_w * self.loss_db_per_m / loss_db_per_m
    }
}

/// Spacers of an open line, evenly spread.
///
/// Quasi-static mean over their pitch, which must be much shorter than the wavelength: they add capacitance, no
/// inductance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spacers {
    /// Distance from one to the next, m.
    pub pitch_m: f64,
    /// Thickness of one along the line, m, at most the pitch.
    pub thickness_m: f64,
    /// Share of the field's energy that runs inside the spacer where there is one, 0 to 1: the whole cross-section near
    /// the wires would be 1, a rod between them a few hundredths to a few tenths.
    pub field_share: f64,
    /// Relative permittivity of its material, 1 or more.
    pub relative_permittivity: f64,
    /// Loss tangent of its material.
    pub loss_tangent: f64,
}

/// What spacers do to a two-wire line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SpacerEffect {
    /// Velocity relative to light.
    pub velocity_factor: f64,
    /// Loss tangent of what fills the field, weighted by its share.
    pub loss_tangent: f64,
}

impl Spacers {
    /// Velocity factor and loss tangent for [`super::TwoWire`].
    ///
    /// # Errors
    ///
    /// Figures outside the ranges of the fields.
    pub fn effect(&self) -> Result<SpacerEffect, LineError> {
        super::constants::positive("the spacers' pitch in metres", self.pitch_m)?;
        let within = |quantity, value: f64, low: f64, high: f64, accepted| {
            if (low..=high).contains(&value) {
                Ok(())
            } else {
                Err(LineError::OutOfRange { quantity, value, accepted })
            }
        };
        let pitch_m = self.pitch_m;
        within("the spacers' thickness in metres", self.thickness_m, 0.0, pitch_m, "from 0 to the pitch")?;
        within("the spacers' share of the field", self.field_share, 0.0, 1.0, "from 0 to 1")?;
        within("the spacers' permittivity", self.relative_permittivity, 1.0, f64::MAX, "1 or more")?;
        not_negative("the spacers' loss tangent", self.loss_tangent)?;
        // C/C₀ = 1 + s·q·(ε − 1), tan δ = s·q·ε·tan δ_m/(C/C₀), VF = 1/√(C/C₀), s = thickness/pitch
        let filled = self.thickness_m / self.pitch_m * self.field_share;
        let capacitance = 1.0 + filled * (self.relative_permittivity - 1.0);
        Ok(SpacerEffect {
            velocity_factor: capacitance.sqrt().recip(),
            loss_tangent: filled * self.relative_permittivity * self.loss_tangent / capacitance,
        })
    }
}
