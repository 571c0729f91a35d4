//! An L-network that is set: series coil, shunt capacitor, both with loss.

use std::f64::consts::{FRAC_1_SQRT_2, TAU};

use num_complex::Complex64;

use crate::line::State;

/// The coil and the capacitor of an L-network, both adjustable from zero up.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Parts {
    /// Largest inductance, H.
    pub inductance_max_h: f64,
    /// Largest capacitance, F.
    pub capacitance_max_f: f64,
    /// Q of the coil: reactance over the resistance in series with it; may be infinite.
    pub coil_q: f64,
    /// Q of the capacitor: susceptance over the conductance across it; may be infinite.
    pub capacitor_q: f64,
}

/// Which way round an L-network stands. The coil is in series.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// Capacitor across the load's side: steps a high load down.
    CapacitorAcrossLoad,
    /// Capacitor across the source's side: steps a low load up.
    CapacitorAcrossSource,
}

/// How an L-network is set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Setting {
    /// Which way round.
    pub sense: Sense,
    /// Series inductance, H.
    pub inductance_h: f64,
    /// Shunt capacitance, F.
    pub capacitance_f: f64,
}

/// What the parts of an L-network must stand.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stress {
    /// Peak voltage across the capacitor, V.
    pub capacitor_peak_v: f64,
    /// RMS current in the coil, A.
    pub coil_rms_a: f64,
}

/// A set L-network at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LNetwork {
    sense: Sense,
    coil_ohm: Complex64,
    capacitor_s: Complex64,
}

/// A state carried through an L-network.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passage {
    /// The state at the source's side.
    pub at_source: State,
    /// What the parts stand at this state; grows with the square root of the power.
    pub stress: Stress,
}

impl LNetwork {
    /// The network of these parts at this setting and frequency (Hz).
    ///
    /// The limits of the parts are not looked at, only their Q.
    #[must_use]
    pub fn new(parts: &Parts, setting: Setting, frequency_hz: f64) -> Self {
        let omega = TAU * frequency_hz;
        let x = omega * setting.inductance_h;
        let b = omega * setting.capacitance_f;
        Self {
            sense: setting.sense,
            // Z = X/Q + jX, Y = B/Q + jB
            coil_ohm: Complex64::new(x / parts.coil_q, x),
            capacitor_s: Complex64::new(b / parts.capacitor_q, b),
        }
    }

    /// The state at the source's side, and what the parts stand, for a state at the load's side.
    #[must_use]
    pub fn toward_source(&self, at_load: State) -> Passage {
        let State { voltage_v: v, current_a: i } = at_load;
        let (at_source, across, through) = match self.sense {
            Sense::CapacitorAcrossLoad => {
                let through = i + self.capacitor_s * v;
                (State { voltage_v: v + self.coil_ohm * through, current_a: through }, v, through)
            }
            Sense::CapacitorAcrossSource => {
                let across = v + self.coil_ohm * i;
                (State { voltage_v: across, current_a: i + self.capacitor_s * across }, across, i)
            }
        };
        let stress = Stress { capacitor_peak_v: across.norm(), coil_rms_a: through.norm() * FRAC_1_SQRT_2 };
        Passage { at_source, stress }
    }
}
