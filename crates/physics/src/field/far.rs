//! Far field and gain.

use num_complex::Complex64;

use super::quadrature::THREE;
use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::wire::{Boundary, EndCurrents, Segment};

/// A direction in space.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Direction {
    /// Above the horizon, degrees, −90 to 90.
    pub elevation_deg: f64,
    /// From +x toward +y, degrees.
    pub azimuth_deg: f64,
}

/// Field at a large distance r, times r and without the phase e^(−jkr): V, peak phasors.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct FarField {
    /// Component along rising polar angle (downward), V.
    pub theta_v: Complex64,
    /// Component along rising azimuth, V.
    pub phi_v: Complex64,
}

impl FarField {
    /// Radiated power per solid angle, W/sr.
    #[must_use]
    pub fn intensity_w_per_sr(&self) -> f64 {
        // U = (|E_θ|² + |E_φ|²)·r²/2η
        (self.theta_v.norm_sqr() + self.phi_v.norm_sqr()) / (2.0 * VACUUM_IMPEDANCE_OHM)
    }

    /// Gain over an isotropic radiator that is given `power_w`, dBi; −∞ in a null.
    #[must_use]
    pub fn gain_dbi(&self, power_w: f64) -> f64 {
        // G = 4πU/P
        10.0 * (4.0 * std::f64::consts::PI * self.intensity_w_per_sr() / power_w).log10()
    }
}

/// The currents of a structure at one frequency, ready for far fields.
///
/// Each segment is three elements at Gauss points: segments are at most a twelfth of a wavelength, so that the rule's
/// error is below 1e-8.
#[derive(Clone, Debug)]
pub struct FarFieldSource {
    k: f64,
    boundary: Boundary,
    elements: Vec<Element>,
}

#[derive(Clone, Copy, Debug)]
struct Element {
    at_m: [f64; 3],
    /// Current times length, A·m.
    moment: [Complex64; 3],
}

impl FarFieldSource {
    /// The source for currents at the ends of segments (A peak); `None` over soil, whose far field is not offered.
    #[must_use]
    pub fn new(
        segments: &[Segment],
        currents: &[EndCurrents],
        boundary: Boundary,
        frequency_hz: f64,
    ) -> Option<Self> {
        if matches!(boundary, Boundary::Soil { .. }) {
            return None;
        }
        let mut elements = Vec::with_capacity(3 * segments.len());
        for (segment, ends) in segments.iter().zip(currents) {
            let (length_m, direction) = (segment.length_m(), segment.direction());
            for (share, weight) in THREE {
                let current = ends.current_a(segment, frequency_hz, share * length_m) * (weight * length_m);
                elements.push(Element {
                    at_m: std::array::from_fn(|axis| {
                        segment.from_m[axis] + share * length_m * direction[axis]
                    }),
                    moment: direction.map(|component| current * component),
                });
            }
        }
        Some(Self { k: wave_number_rad_per_m(frequency_hz), boundary, elements })
    }

    /// Far field in a direction; nothing below a mirror.
    #[must_use]
    pub fn field(&self, direction: Direction) -> FarField {
        let (elevation, azimuth) = (direction.elevation_deg.to_radians(), direction.azimuth_deg.to_radians());
        self.field_at(elevation.sin(), elevation.cos(), azimuth)
    }

    pub(super) fn field_at(&self, sine: f64, cosine: f64, azimuth_rad: f64) -> FarField {
        let (sin_phi, cos_phi) = azimuth_rad.sin_cos();
        let toward = [cosine * cos_phi, cosine * sin_phi, sine];
        let mut sum = [Complex64::ZERO; 3];
        for element in &self.elements {
            // N = Σ I·l·e^(jk·r̂·r)
            let level = toward[0] * element.at_m[0] + toward[1] * element.at_m[1];
            let rise = toward[2] * element.at_m[2];
            let direct = Complex64::cis(self.k * (level + rise));
            for (axis, total) in sum.iter_mut().enumerate() {
                *total += element.moment[axis] * direct;
            }
            if self.boundary == Boundary::Mirror {
                // The image lies as deep as the element is high; its level current runs the other way.
                let image = Complex64::cis(self.k * (level - rise));
                sum[0] -= element.moment[0] * image;
                sum[1] -= element.moment[1] * image;
                sum[2] += element.moment[2] * image;
            }
        }
        if self.boundary == Boundary::Mirror && sine < 0.0 {
            return FarField::default();
        }
        // E = −jkη/4π·N, across the direction; θ runs downward
        let scale = Complex64::new(0.0, -self.k * VACUUM_IMPEDANCE_OHM / (4.0 * std::f64::consts::PI));
        FarField {
            theta_v: scale * (sine * (cos_phi * sum[0] + sin_phi * sum[1]) - cosine * sum[2]),
            phi_v: scale * (cos_phi * sum[1] - sin_phi * sum[0]),
        }
    }

    /// Radius in wavelengths/2π of a sphere about the middle of the elements (and images) that holds all of them.
    pub(super) fn electrical_size(&self) -> f64 {
        let mut low = [f64::INFINITY; 3];
        let mut high = [f64::NEG_INFINITY; 3];
        for element in &self.elements {
            for axis in 0..3 {
                low[axis] = low[axis].min(element.at_m[axis]);
                high[axis] = high[axis].max(element.at_m[axis]);
            }
        }
        if self.boundary == Boundary::Mirror {
            low[2] = -high[2];
        }
        let diagonal2: f64 = (0..3).map(|axis| (high[axis] - low[axis]).powi(2)).sum();
        0.5 * self.k * diagonal2.sqrt()
    }

    pub(super) fn boundary(&self) -> Boundary {
        self.boundary
    }
}
