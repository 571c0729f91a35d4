//! A surge arrester across the line.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::error::{PartError, not_negative, positive};
use super::two_port::TwoPort;
use crate::line::State;

/// A gas tube or spark gap across the line: to the transmission a small capacitance, until it fires.
///
/// It must not fire at the peak of the transmitted envelope: keep a margin, since tubes scatter by about 20 %
/// (common practice) and fire lower when they have fired often. An arrester protects nothing without a short,
/// straight path to earth; local codes and a licensed electrician decide on that.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SurgeArrester {
    /// Capacitance across the line, F.
    pub capacitance_f: f64,
    /// Voltage at which it fires when the voltage rises slowly, V (a peak value).
    pub firing_v: f64,
}

impl SurgeArrester {
    /// Whether the figures make an arrester.
    ///
    /// # Errors
    ///
    /// A negative capacitance, a firing voltage that is not greater than zero.
    pub fn check(&self) -> Result<(), PartError> {
        not_negative("the arrester's capacitance in farads", self.capacitance_f)?;
        positive("the arrester's firing voltage in volts", self.firing_v)
    }

    /// The arrester that does not fire, at a frequency, Hz.
    ///
    /// # Errors
    ///
    /// As [`Self::check`], and a frequency that is not positive.
    pub fn two_port(&self, frequency_hz: f64) -> Result<TwoPort, PartError> {
        self.check()?;
        positive("the frequency in hertz", frequency_hz)?;
        Ok(TwoPort::shunt(Complex64::new(0.0, TAU * frequency_hz * self.capacitance_f)))
    }

    /// The peak voltage of a state over the firing voltage: from 1 on it fires.
    #[must_use]
    pub fn share_of_firing(&self, state: State) -> f64 {
        state.voltage_v.norm() / self.firing_v
    }
}
