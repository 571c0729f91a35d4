//! Lumped parts in a wire: resistors, coils, capacitors, traps.

use std::f64::consts::TAU;

use num_complex::Complex64;

use crate::earth::{Electrode, Soil};

/// A lumped load, made of ideal parts with a quality factor each.
#[derive(Clone, Debug, PartialEq)]
pub enum Load {
    /// Resistor, Ω, ≥ 0.
    Resistor {
        /// Resistance, Ω.
        ohm: f64,
    },
    /// Coil with series resistance ωL/Q.
    Coil {
        /// Inductance, H, > 0.
        henry: f64,
        /// Quality factor, the same at all frequencies; infinity for none.
        q: f64,
    },
    /// Capacitor with series resistance 1/(ωCQ).
    Capacitor {
        /// Capacitance, F, > 0.
        farad: f64,
        /// Quality factor, the same at all frequencies; infinity for none.
        q: f64,
    },
    /// A connection to the earth, at the end of a wire on its surface; open where the soil is no soil.
    Earth {
        /// What is in the earth.
        electrode: Electrode,
        /// The soil.
        soil: Soil,
    },
    /// Parts one after the other; none at all is a short.
    Series(Vec<Load>),
    /// Parts side by side; none at all is an open gap.
    Parallel(Vec<Load>),
}

impl Load {
    /// A trap: coil and capacitor in parallel.
    #[must_use]
    pub fn trap(henry: f64, farad: f64, coil_q: f64) -> Self {
        Self::Parallel(vec![Self::Coil { henry, q: coil_q }, Self::Capacitor { farad, q: f64::INFINITY }])
    }

    /// A trap as measured: resonance, its capacitor, and the quality factor at resonance.
    #[must_use]
    pub fn measured_trap(resonance_hz: f64, farad: f64, q: f64) -> Self {
        // L = 1/(ω²C) for the lossless pair; the coil's loss moves the resonance by 1/2Q² only.
        let omega = TAU * resonance_hz;
        Self::trap(1.0 / (omega * omega * farad), farad, q)
    }

    /// Termination that the load is for its port.
    #[must_use]
    pub fn termination(&self, frequency_hz: f64) -> Termination {
        let omega = TAU * frequency_hz;
        match self {
            Self::Resistor { ohm } => Termination::Impedance(Complex64::from(*ohm)),
            // Z = jωL + ωL/Q
            Self::Coil { henry, q } => Termination::Impedance(omega * henry * Complex64::new(q.recip(), 1.0)),
            // Z = 1/jωC + 1/(ωCQ)
            Self::Capacitor { farad, q } => {
                Termination::Impedance(Complex64::new(q.recip(), -1.0) / (omega * farad))
            }
            Self::Earth { electrode, soil } => {
                electrode.impedance_ohm(soil, frequency_hz).map_or(Termination::Open, Termination::Impedance)
            }
            Self::Series(parts) => parts
                .iter()
                .fold(Termination::SHORT, |sum, part| sum.in_series(part.termination(frequency_hz))),
            Self::Parallel(parts) => parts
                .iter()
                .fold(Termination::Open, |sum, part| sum.in_parallel(part.termination(frequency_hz))),
        }
    }
}

/// What a port is closed with.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Termination {
    /// An impedance, Ω; zero is a short.
    Impedance(Complex64),
    /// Nothing: no current flows.
    Open,
}

impl Termination {
    /// A wire across the gap.
    pub const SHORT: Self = Self::Impedance(Complex64::ZERO);

    fn in_series(self, other: Self) -> Self {
        match (self, other) {
            (Self::Impedance(a), Self::Impedance(b)) => Self::Impedance(a + b),
            _ => Self::Open,
        }
    }

    fn in_parallel(self, other: Self) -> Self {
        match (self, other) {
            (Self::Open, rest) | (rest, Self::Open) => rest,
            (Self::Impedance(a), Self::Impedance(b)) => {
                // ab/(a + b), open at the pole of a lossless pair
                let sum = a + b;
                let scale = a.norm().max(b.norm());
                if scale <= 0.0 {
                    Self::SHORT
                } else if sum.norm() <= f64::EPSILON * scale {
                    Self::Open
                } else {
                    Self::Impedance(a * b / sum)
                }
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ohm(load: &Load, frequency_hz: f64) -> Complex64 {
        match load.termination(frequency_hz) {
            Termination::Impedance(ohm) => ohm,
            Termination::Open => panic!("open"),
        }
    }

    #[test]
    fn trap_is_a_high_resistance_at_resonance() {
        let (f, farad, q) = (7.1e6, 60e-12, 300.0);
        let z = ohm(&Load::measured_trap(f, farad, q), f);
        // Rp = Q/(ωC)·(1 + 1/Q²), as a resistance to 1/Q
        let rp = q / (TAU * f * farad);
        assert!((z.re / rp - 1.0).abs() < 1e-3 && (z.im / rp).abs() < 2.0 / q, "{z}");
        // Below resonance it is a coil, above a capacitor.
        assert!(ohm(&Load::measured_trap(f, farad, q), 0.5 * f).im > 0.0);
        assert!(ohm(&Load::measured_trap(f, farad, q), 2.0 * f).im < 0.0);
    }

    #[test]
    fn lossless_trap_opens_and_series_circuit_shorts() {
        let (farad, henry) = (1e-10_f64, 1e-6_f64);
        let resonance_hz = 1.0 / (TAU * (farad * henry).sqrt());
        let parts = vec![Load::Coil { henry, q: f64::INFINITY }, Load::Capacitor { farad, q: f64::INFINITY }];
        let scale = TAU * resonance_hz * henry;
        assert!(ohm(&Load::Series(parts.clone()), resonance_hz).norm() < 1e-12 * scale);
        match Load::Parallel(parts).termination(resonance_hz) {
            Termination::Open => {}
            Termination::Impedance(ohm) => assert!(ohm.norm() > 1e12 * scale),
        }
        assert_eq!(Load::Series(vec![]).termination(1e6), Termination::SHORT);
        assert_eq!(Load::Parallel(vec![]).termination(1e6), Termination::Open);
    }
}
