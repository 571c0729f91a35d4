//! Voltage and current at one place of a feed.

use num_complex::Complex64;

/// Voltage between the conductors and current toward the load at one place.
///
/// An open end is `current_a = 0`, a short `voltage_v = 0`; both are exact, because nothing here divides
/// before it has to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct State {
    /// Peak phasor of the voltage, V.
    pub voltage_v: Complex64,
    /// Peak phasor of the current toward the load, A.
    pub current_a: Complex64,
}

impl State {
    /// A load that carries 1 A peak.
    ///
    /// Units: Ω. For an open end use [`State::open`].
    #[must_use]
    pub fn of_load(z_ohm: Complex64) -> Self {
        Self { voltage_v: z_ohm, current_a: Complex64::ONE }
    }

    /// An open end with 1 V peak across it.
    #[must_use]
    pub fn open() -> Self {
        Self { voltage_v: Complex64::ONE, current_a: Complex64::ZERO }
    }

    /// V/I, Ω; not finite at an open end.
    #[must_use]
    pub fn impedance_ohm(self) -> Complex64 {
        self.voltage_v / self.current_a
    }

    /// Average power toward the load, W.
    #[must_use]
    pub fn power_w(self) -> f64 {
        // P = ½·Re(V·I*)
        0.5 * (self.voltage_v.re * self.current_a.re + self.voltage_v.im * self.current_a.im)
    }

    /// Reflection coefficient on a real reference (Ω); exact for open and short ends.
    #[must_use]
    pub fn gamma(self, reference_ohm: f64) -> Complex64 {
        // Γ = (V − R·I)/(V + R·I)
        let i = self.current_a * reference_ohm;
        (self.voltage_v - i) / (self.voltage_v + i)
    }

    /// Standing-wave ratio on a real reference (Ω); infinite for a load that takes no power.
    #[must_use]
    pub fn swr(self, reference_ohm: f64) -> f64 {
        // |Γ| = |V − R·I|/|V + R·I|, without the division of complex numbers
        let i = self.current_a * reference_ohm;
        super::swr_of_gamma(((self.voltage_v - i).norm_sqr() / (self.voltage_v + i).norm_sqr()).sqrt())
    }

    /// The same state with voltage and current times a real factor.
    #[must_use]
    pub fn scaled(self, factor: f64) -> Self {
        Self { voltage_v: self.voltage_v * factor, current_a: self.current_a * factor }
    }
}

/// Loss of whatever lies between two places, dB: 10·log₁₀(P_source/P_load).
///
/// Infinite where no power reaches the load's side.
#[must_use]
pub fn loss_db(at_source: State, at_load: State) -> f64 {
    let (p_in, p_out) = (at_source.power_w(), at_load.power_w());
    if p_out > 0.0 { 10.0 * (p_in / p_out).log10() } else { f64::INFINITY }
}
