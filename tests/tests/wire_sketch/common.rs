//! Wires that several checks share.

use num_complex::Complex64;
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, SPEED_OF_LIGHT_M_PER_S};
use physics::sinusoid::{CentreFedWire, SketchWire, self_impedance};

/// λ = 1 m, so that lengths in wavelengths are lengths in metres.
pub const METRE_WAVE_HZ: f64 = SPEED_OF_LIGHT_M_PER_S;

/// Stands for a vanishing radius, in wavelengths.
pub const VANISHING: f64 = 1e-9;

/// Loop-referred impedance of a thin wire, length in wavelengths.
pub fn thin(length: f64) -> Complex64 {
    self_impedance(&CentreFedWire { half_length_m: 0.5 * length, radius_m: VANISHING }, METRE_WAVE_HZ)
}

/// 2 mm of bare copper in free space.
pub fn bare(arm_a_m: f64, arm_b_m: f64) -> SketchWire {
    SketchWire {
        arm_a_m,
        arm_b_m,
        radius_m: 1e-3,
        velocity_factor: 1.0,
        conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
        resistance_factor: 1.0,
        image: None,
    }
}
