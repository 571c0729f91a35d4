//! The currents of a structure, ready for far fields.

use num_complex::Complex64;

use super::far::{Direction, FarField};
use super::run::{Run, runs};
use super::space::{Vec3, add, advance, dot, mirrored};
use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::wire::{Boundary, EndCurrents, Segment};

/// The currents of a structure at one frequency, ready for far fields.
///
/// Straight stretches are tabulated over the angle to them, so that a direction costs a few dozen nanoseconds per
/// stretch, however many segments it has. The field is that of the sinusoids to about 1e-6 of its largest value.
#[derive(Clone, Debug)]
pub struct FarFieldSource {
    k: f64,
    boundary: Boundary,
    runs: Vec<Run>,
}

impl FarFieldSource {
    /// The source for currents at the ends of segments (A peak); `None` over soil, whose far field is not offered.
    ///
    /// Segments must be shorter than half a wave, as those of a mesh are. Consecutive segments in one line are taken
    /// together; currents may jump anywhere.
    #[must_use]
    pub fn new(
        segments: &[Segment],
        currents: &[EndCurrents],
        boundary: Boundary,
        frequency_hz: f64,
    ) -> Option<Self> {
        let k = wave_number_rad_per_m(frequency_hz);
        match boundary {
            Boundary::Soil(_) => None,
            Boundary::FreeSpace | Boundary::Mirror => {
                Some(Self { k, boundary, runs: runs(segments, currents, k) })
            }
        }
    }

    /// Far field in a direction; nothing below a mirror.
    #[must_use]
    pub fn field(&self, direction: Direction) -> FarField {
        let (elevation, azimuth) = (direction.elevation_deg.to_radians(), direction.azimuth_deg.to_radians());
        self.field_at(Toward { sine: elevation.sin(), azimuth: azimuth.sin_cos().into() })
    }

    pub(super) fn field_at(&self, toward: Toward) -> FarField {
        let Toward { sine, azimuth: [sin_phi, cos_phi] } = toward;
        let cosine = (1.0 - sine * sine).max(0.0).sqrt();
        let outward = [cosine * cos_phi, cosine * sin_phi, sine];
        let mut sum = self.moment_a_m(outward);
        match self.boundary {
            Boundary::FreeSpace | Boundary::Soil(_) => {}
            Boundary::Mirror if sine < 0.0 => return FarField::default(),
            Boundary::Mirror => {
                // The image of a wire is seen as the wire is from below, and its level current runs the other way.
                let [x, y, z] = self.moment_a_m(mirrored(outward));
                sum = [sum[0] - x, sum[1] - y, sum[2] + z];
            }
        }
        // E = −jkη/4π·N, across the direction; θ runs downward
        let scale = Complex64::new(0.0, -self.k * VACUUM_IMPEDANCE_OHM / (4.0 * std::f64::consts::PI));
        FarField {
            theta_v: scale * (sine * (cos_phi * sum[0] + sin_phi * sum[1]) - cosine * sum[2]),
            phi_v: scale * (cos_phi * sum[1] - sin_phi * sum[0]),
        }
    }

    /// N = Σ û·J(û·r̂)·e^(jk·r̂·r) over the wires, A·m.
    fn moment_a_m(&self, outward: Vec3) -> [Complex64; 3] {
        let mut sum = [Complex64::ZERO; 3];
        for run in &self.runs {
            let phase = Complex64::cis(self.k * dot(outward, run.middle_m));
            add(&mut sum, run.moment_a_m(dot(outward, run.direction)) * phase, run.direction);
        }
        sum
    }

    /// Radius, in wavelengths/2π, of a sphere about the middle of the wires (and images) that holds all of them.
    pub(super) fn electrical_size(&self) -> f64 {
        let (mut low, mut high) = ([f64::INFINITY; 3], [f64::NEG_INFINITY; 3]);
        for run in &self.runs {
            for end in [-run.half_length_m, run.half_length_m] {
                let end_m = advance(run.middle_m, run.direction, end);
                for axis in 0..3 {
                    low[axis] = low[axis].min(end_m[axis]);
                    high[axis] = high[axis].max(end_m[axis]);
                }
            }
        }
        if self.boundary == Boundary::Mirror {
            low[2] = -high[2];
        }
        let diagonal2: f64 = (0..3).map(|axis| (high[axis] - low[axis]).powi(2)).sum();
        0.5 * self.k * diagonal2.sqrt()
    }

    /// What lies below.
    pub(super) fn boundary(&self) -> Boundary {
        self.boundary
    }
}

/// A direction as its sines and cosines.
#[derive(Clone, Copy)]
pub(super) struct Toward {
    /// Of elevation.
    pub sine: f64,
    /// Sine and cosine of azimuth.
    pub azimuth: [f64; 2],
}
