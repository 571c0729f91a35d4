//! A wound transformer: ratio, finite inductance, leakage, capacitance of its windings, loss of core and copper.

use std::f64::consts::{FRAC_1_SQRT_2, TAU};

use num_complex::Complex64;

use super::error::{PartError, not_negative, positive};
use super::two_port::{Carried, TwoPort};
use crate::line::State;

/// What the core burns, as a resistance across the source's winding.
///
/// R(f) = R₀·(f/f₀)^n. A core whose loss tangent does not change has n = 1 (R grows as ωL·Q); ferrite far
/// above its relaxation, where the winding is a resistor, has n ≈ 0. Both figures come from a measurement of
/// the open winding, or from the maker's curves of µ′ and µ″.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CoreLoss {
    /// Parallel resistance at the reference frequency, Ω.
    pub resistance_ohm: f64,
    /// The reference frequency, Hz.
    pub frequency_hz: f64,
    /// Exponent n of its growth.
    pub exponent: f64,
}

impl CoreLoss {
    /// Parallel resistance at a frequency (Hz), Ω.
    #[must_use]
    pub fn resistance_at_ohm(&self, frequency_hz: f64) -> f64 {
        // R = R₀·(f/f₀)^n
        self.resistance_ohm * (frequency_hz / self.frequency_hz).powf(self.exponent)
    }
}

/// A wound transformer or auto-transformer.
///
/// From the source: magnetising inductance and core loss across the source's winding, leakage inductance and
/// copper in series (both referred to the source's side), the ideal ratio, and the winding capacitance across
/// the load's winding. It is the usual equivalent circuit (any text on transformers, from memory); valid while
/// the windings are much shorter than the wavelength. Transformers made of line belong to
/// [`crate::line::Piece`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Transformer {
    /// Impedance on the load's side over impedance on the source's side: 4 for "4:1" toward a higher load.
    pub impedance_ratio: f64,
    /// Inductance of the source's winding with the load's winding open, H; infinite for an ideal core.
    pub magnetising_h: f64,
    /// Leakage inductance seen at the source's winding with the load's winding shorted, H.
    pub leakage_h: f64,
    /// Capacitance across the load's winding, F.
    pub winding_f: f64,
    /// Resistance of both windings at the working frequency, referred to the source's side, Ω.
    pub copper_ohm: f64,
    /// What the core burns; none for an ideal core.
    pub core: Option<CoreLoss>,
}

/// Where the watts of a transformer go, and what its source's winding stands.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TransformerStress {
    /// Heat of the core, W.
    pub core_w: f64,
    /// Heat of the windings, W.
    pub copper_w: f64,
    /// Peak voltage across the source's winding, V.
    pub source_peak_v: f64,
    /// Peak voltage across the load's winding, V.
    pub load_peak_v: f64,
    /// RMS current into the source's winding, A.
    pub source_rms_a: f64,
}

impl Transformer {
    /// One without loss, leakage, capacitance or magnetising current.
    #[must_use]
    pub fn ideal(impedance_ratio: f64) -> Self {
        Self {
            impedance_ratio,
            magnetising_h: f64::INFINITY,
            leakage_h: 0.0,
            winding_f: 0.0,
            copper_ohm: 0.0,
            core: None,
        }
    }

    /// Whether the figures make a transformer.
    ///
    /// # Errors
    ///
    /// A ratio, inductance or core resistance that is not greater than zero; a leakage, capacitance or copper
    /// resistance below zero.
    pub fn check(&self) -> Result<(), PartError> {
        positive("the transformer's impedance ratio", self.impedance_ratio)?;
        if self.magnetising_h.is_nan() || self.magnetising_h <= 0.0 {
            return Err(PartError {
                quantity: "the transformer's magnetising inductance in henrys",
                value: self.magnetising_h,
                accepted: "greater than zero",
            });
        }
        not_negative("the transformer's leakage inductance in henrys", self.leakage_h)?;
        not_negative("the transformer's winding capacitance in farads", self.winding_f)?;
        not_negative("the transformer's winding resistance in ohms", self.copper_ohm)?;
        if let Some(core) = self.core {
            positive("the core's parallel resistance in ohms", core.resistance_ohm)?;
            positive("the frequency of the core's resistance in hertz", core.frequency_hz)?;
            if !core.exponent.is_finite() {
                return Err(PartError {
                    quantity: "the exponent of the core's resistance",
                    value: core.exponent,
                    accepted: "a finite number",
                });
            }
        }
        Ok(())
    }

    /// What lies across the source's winding, S.
    fn magnetising_s(&self, frequency_hz: f64) -> Complex64 {
        // Y = 1/R_core − j/(ωL)
        let core = self.core.map_or(0.0, |core| core.resistance_at_ohm(frequency_hz).recip());
        Complex64::new(core, -(TAU * frequency_hz * self.magnetising_h).recip())
    }

    /// What lies between the magnetising branch and the load: leakage, copper, ratio and capacitance.
    fn toward_load_part(&self, frequency_hz: f64) -> TwoPort {
        let omega = TAU * frequency_hz;
        TwoPort::row(&[
            TwoPort::shunt(Complex64::new(0.0, omega * self.winding_f)),
            TwoPort::turns(self.impedance_ratio.sqrt()),
            TwoPort::series(Complex64::new(self.copper_ohm, omega * self.leakage_h)),
        ])
    }

    /// The transformer at a frequency, Hz.
    ///
    /// # Errors
    ///
    /// As [`Self::check`], and a frequency that is not positive.
    pub fn two_port(&self, frequency_hz: f64) -> Result<TwoPort, PartError> {
        self.check()?;
        positive("the frequency in hertz", frequency_hz)?;
        Ok(self.toward_load_part(frequency_hz).then(&TwoPort::shunt(self.magnetising_s(frequency_hz))))
    }

    /// Where the watts go and what the windings stand for a state at the load's side; powers grow with the
    /// power, volts and amperes with its root.
    ///
    /// # Errors
    ///
    /// As [`Self::two_port`].
    pub fn stress(&self, at_load: State, frequency_hz: f64) -> Result<TransformerStress, PartError> {
        let Carried { at_source, .. } = self.two_port(frequency_hz)?.carry(at_load);
        // The leakage stands between source winding and ratio, so the copper carries what the load's part takes.
        let inside = self.toward_load_part(frequency_hz).toward_source(at_load);
        Ok(TransformerStress {
            core_w: 0.5 * at_source.voltage_v.norm_sqr() * self.magnetising_s(frequency_hz).re,
            copper_w: 0.5 * inside.current_a.norm_sqr() * self.copper_ohm,
            source_peak_v: at_source.voltage_v.norm(),
            load_peak_v: at_load.voltage_v.norm(),
            source_rms_a: at_source.current_a.norm() * FRAC_1_SQRT_2,
        })
    }
}
