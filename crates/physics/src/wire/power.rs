//! Where the watts stay in the wires.

use num_complex::Complex64;

use super::segment::{EndCurrents, Segment};
use super::shapes::Overlaps;
use crate::constants::wave_number_rad_per_m;

/// Power lost in the metal of a segment, W, for peak currents.
///
/// `resistance_ohm_per_m` is the real part of the wire's series impedance per metre.
#[must_use]
pub fn segment_loss_w(
    segment: &Segment,
    currents: &EndCurrents,
    resistance_ohm_per_m: f64,
    frequency_hz: f64,
) -> f64 {
    // ½·R′·∫|I|² ds with I = I₁·S₁ + I₂·S₂
    let [same, cross] = Overlaps::new(wave_number_rad_per_m(frequency_hz), segment.length_m()).current_m;
    let square = same * (currents.from_a.norm_sqr() + currents.to_a.norm_sqr())
        + 2.0 * cross * (currents.from_a * currents.to_a.conj()).re;
    0.5 * resistance_ohm_per_m * square
}

/// Power into a port, W, for peak voltage and current.
#[must_use]
pub fn port_power_w(voltage_v: Complex64, current_a: Complex64) -> f64 {
    0.5 * (voltage_v * current_a.conj()).re
}
