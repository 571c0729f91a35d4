//! Loads: coils, capacitors, resistors and traps in a wire.

use serde::{Deserialize, Serialize};

/// Width of the gap in the wire that a load bridges, m: about a small strain insulator (common practice).
pub const LOAD_GAP_M: f64 = 0.02;

/// Something lumped in series with a wire.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Load {
    /// For instance "7 MHz trap".
    pub name: String,
    /// Index of the wire.
    pub wire: usize,
    /// Share of the cut length between the wire's beginning and the load.
    pub fraction: f64,
    /// What it is made of.
    pub circuit: Circuit,
}

/// Lumped parts, each with its quality factor; a part without one is taken as lossless.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum Circuit {
    /// A resistor.
    Resistor {
        /// Ω.
        resistance_ohm: f64,
    },
    /// A coil.
    Coil {
        /// H.
        inductance_h: f64,
        /// Reactance over series resistance.
        #[serde(default, skip_serializing_if = "Option::is_none")]
        q: Option<f64>,
    },
    /// A capacitor.
    Capacitor {
        /// F.
        capacitance_f: f64,
        /// Reactance over series resistance.
        #[serde(default, skip_serializing_if = "Option::is_none")]
        q: Option<f64>,
    },
    /// A trap as it was measured: its resonance, its capacitor and its Q there.
    MeasuredTrap {
        /// Hz.
        resonance_hz: f64,
        /// F.
        capacitance_f: f64,
        /// Q at resonance.
        q: f64,
    },
    /// One after the other.
    Series(Vec<Circuit>),
    /// Side by side: a coil and a capacitor make a trap.
    Parallel(Vec<Circuit>),
}
