//! The earth as a mirror: an image of the wire, with a reflection coefficient where the earth is soil.

use num_complex::Complex64;

use super::emf::{ParallelWires, mutual_impedance};
use crate::constants::VACUUM_PERMITTIVITY_F_PER_M;

/// The image of a wire in the earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Image {
    /// Height of the wire's middle over the earth, m (of a sagging or sloping wire, its mean height).
    pub height_m: f64,
    /// How the wire runs.
    pub direction: ImageDirection,
    /// What reflects.
    pub mirror: Mirror,
}

/// How a wire runs over its image.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ImageDirection {
    /// Parallel to the earth: over a perfect mirror the image's current runs the other way.
    Horizontal,
    /// Upright: over a perfect mirror the image's current runs the same way.
    Vertical,
}

/// What the earth is made of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Mirror {
    /// A perfect conductor.
    Perfect,
    /// Soil or water.
    Soil {
        /// Relative permittivity, ≥ 1.
        relative_permittivity: f64,
        /// Conductivity, S/m, ≥ 0.
        conductivity_s_per_m: f64,
    },
}

impl Mirror {
    /// Reflection coefficient of a plane wave from straight above, horizontal electric field: −1 for a perfect mirror.
    ///
    /// Fresnel at normal incidence. Used for the whole image it is the usual reflection-coefficient approximation:
    /// against exact solutions of a horizontal half wave over average soil it is off by 1 % of Z at 0.3 λ height, by a
    /// tenth at 0.1 λ, and by a third at 0.05 λ; for upright wires, which send their power along the earth, it is
    /// rougher.
    #[must_use]
    pub fn reflection(&self, frequency_hz: f64) -> Complex64 {
        match *self {
            Self::Perfect => Complex64::new(-1.0, 0.0),
            Self::Soil { relative_permittivity, conductivity_s_per_m } => {
                // ε = ε_r − jσ/(ωε0),   Γ = (1 − √ε)/(1 + √ε)
                let angular = std::f64::consts::TAU * frequency_hz;
                let loss = conductivity_s_per_m / (angular * VACUUM_PERMITTIVITY_F_PER_M);
                let index = Complex64::new(relative_permittivity, -loss).sqrt();
                (1.0 - index) / (1.0 + index)
            }
        }
    }
}

/// A centre-fed wire over its image.
pub(super) struct WireOverImage {
    /// Half length in metres of a bare wire with the same phase.
    pub electrical_half_length_m: f64,
    /// Height of the lowest point of an upright wire, m; of a horizontal wire its height.
    pub clearance_m: f64,
    pub radius_m: f64,
    pub frequency_hz: f64,
}

impl Image {
    /// What the image adds to the wire's loop-referred impedance, Ω.
    pub(super) fn impedance(&self, wire: &WireOverImage) -> Complex64 {
        let half_length_m = wire.electrical_half_length_m;
        let reflection = self.mirror.reflection(wire.frequency_hz);
        let (coefficient, spacing_m, offset_m) = match self.direction {
            ImageDirection::Horizontal => (reflection, 2.0 * wire.clearance_m, 0.0),
            // Upright currents mirror with the opposite sign.
            ImageDirection::Vertical => {
                (-reflection, wire.radius_m, 2.0 * (wire.clearance_m + half_length_m))
            }
        };
        let pair = ParallelWires {
            half_length_1_m: half_length_m,
            half_length_2_m: half_length_m,
            spacing_m,
            offset_m,
        };
        coefficient * mutual_impedance(&pair, wire.frequency_hz)
    }
}
