//! The standing wave along the wire.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::sketch::{FeedpointAnswer, Sketch};

/// Current and potential at one place of the wire; peak phasors.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WavePoint {
    /// Distance from the wire's beginning, m.
    pub arc_m: f64,
    /// Current toward the wire's end, A.
    pub current_a: Complex64,
    /// Potential against the wire's far surroundings, V; indicative.
    pub potential_v: Complex64,
}

/// One arm as an open-ended line with loss.
#[derive(Clone, Copy, Debug)]
pub(super) struct ArmWave {
    /// Length of the arm, m.
    pub length_m: f64,
    /// γ, 1/m; its real part stands for radiation and loss and is > 0.
    pub propagation_per_m: Complex64,
    /// sinh γl, never 0.
    pub sinh_at_feed: Complex64,
}

impl Sketch {
    /// Arm a and arm b as open-ended lines whose input impedance is exactly that of the answer.
    ///
    /// An arm of characteristic impedance K/2 against the wire's middle plane carries I ∝ sinh γs, V ∝ cosh γs at the
    /// distance s from its open end. γ follows from coth γl = Z/K on the branch next to jkl: its imaginary part is the
    /// wave number with the end effect, its real part the damping by radiation and loss. Where the textbook's sinusoid
    /// would put a node on the feedpoint the damping keeps sinh γl, and so every current, finite.
    pub(super) fn arm_waves(&self, answer: &FeedpointAnswer) -> [ArmWave; 2] {
        let k = self.wave_number_on_wire(answer.frequency_hz);
        let wire = self.wire();
        let arm = |index: usize, length_m: f64| {
            // γl = atanh(K/Z) + jnπ
            let principal = (self.characteristic_ohm()[index] / answer.arm_impedance_ohm[index]).atanh();
            let half_waves = ((k * length_m - principal.im) / PI).round();
            let gamma_l = principal + Complex64::new(0.0, PI * half_waves);
            ArmWave { length_m, propagation_per_m: gamma_l / length_m, sinh_at_feed: gamma_l.sinh() }
        };
        [arm(0, wire.arm_a_m), arm(1, wire.arm_b_m)]
    }

    /// Standing wave for 1 W accepted at the feedpoint, at distances from the wire's beginning (clamped to the wire).
    ///
    /// The current is continuous through the feedpoint, zero at the ends, real and positive at the feedpoint:
    /// I = √(2·1 W/R). Going outwards its phase turns over at every node; a feedpoint on a node turns nothing over.
    ///
    /// The potential jumps at the feedpoint by exactly the feedpoint voltage I·Z (a place exactly at the feedpoint
    /// gets arm a's side). Elsewhere it is indicative: the line has one mean characteristic impedance where the wire's
    /// rises toward its ends.
    #[must_use]
    pub fn standing_wave(&self, answer: &FeedpointAnswer, arcs_m: &[f64]) -> Vec<WavePoint> {
        let [a, b] = self.arm_waves(answer);
        let [k_a_ohm, k_b_ohm] = self.characteristic_ohm();
        let length_m = self.length_m();
        let feed_a = (2.0 / answer.impedance_ohm.re).sqrt();
        let point = |&arc_m: &f64| {
            let arc_m = arc_m.clamp(0.0, length_m);
            // Current that flows outwards on arm b flows inwards on arm a, so arm a's potential is opposite.
            let (arm, from_end_m, half_k_ohm) = if arc_m <= a.length_m {
                (&a, arc_m, -0.5 * k_a_ohm)
            } else {
                (&b, length_m - arc_m, 0.5 * k_b_ohm)
            };
            let gamma_s = arm.propagation_per_m * from_end_m;
            WavePoint {
                arc_m,
                // I(s) = I_feed·sinh γs/sinh γl,   V(s) = ±½K·I_feed·cosh γs/sinh γl
                current_a: feed_a * gamma_s.sinh() / arm.sinh_at_feed,
                potential_v: half_k_ohm * feed_a * gamma_s.cosh() / arm.sinh_at_feed,
            }
        };
        arcs_m.iter().map(point).collect()
    }
}
