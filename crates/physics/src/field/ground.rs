//! What lies below the wires, as far fields see it.

use std::f64::consts::TAU;

use num_complex::Complex64;

use crate::constants::VACUUM_PERMITTIVITY_F_PER_M;
use crate::earth::{Fresnel, fresnel};
use crate::wire::Boundary;

/// A boundary at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Ground {
    FreeSpace,
    Mirror,
    /// Complex relative permittivity ε = εr − jσ/(ωε0).
    Soil(Complex64),
}

/// What comes back of a wave.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Reflected {
    /// There is nothing below.
    Nothing,
    /// The share of the image.
    Share(Fresnel),
    /// The direction is below the horizon.
    Dark,
}

impl Ground {
    pub fn new(boundary: Boundary, frequency_hz: f64) -> Self {
        match boundary {
            Boundary::FreeSpace => Self::FreeSpace,
            Boundary::Mirror => Self::Mirror,
            Boundary::Soil { relative_permittivity, conductivity_s_per_m } => {
                let loss = conductivity_s_per_m / (TAU * frequency_hz * VACUUM_PERMITTIVITY_F_PER_M);
                Self::Soil(Complex64::new(relative_permittivity, -loss))
            }
        }
    }

    /// For a wave that leaves at an elevation of this sine.
    pub fn reflected(self, sine: f64) -> Reflected {
        match self {
            Self::FreeSpace => Reflected::Nothing,
            Self::Mirror | Self::Soil(_) if sine < 0.0 => Reflected::Dark,
            Self::Mirror => Reflected::Share(Fresnel { level: -Complex64::ONE, rising: Complex64::ONE }),
            Self::Soil(epsilon) => Reflected::Share(fresnel(epsilon, sine)),
        }
    }

    /// Lowest elevation that gets anything, degrees.
    pub fn lowest_deg(self) -> f64 {
        if self == Self::FreeSpace { -90.0 } else { 0.0 }
    }
}
