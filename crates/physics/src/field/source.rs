//! The currents of a structure, ready for far fields.

use num_complex::Complex64;

use super::far::{Direction, FarField};
use super::ground::{Ground, Reflected};
use super::run::{Run, runs};
use super::space::{Vec3, add, advance, dot};
use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::wire::{Boundary, EndCurrents, Segment};

/// The currents of a structure at one frequency, ready for far fields.
///
/// Straight stretches are tabulated over the angle to them, so that a direction costs a few dozen nanoseconds per
/// stretch, however many segments it has. The field is that of the sinusoids to about 1e-6 of its largest value.
///
/// Over soil the image of each stretch is weighted with Fresnel's coefficients of a half-space: the exact far field of
/// the currents above it, whatever their height. What goes along the earth falls faster than 1/r and is no part of it.
#[derive(Clone, Debug)]
pub struct FarFieldSource {
    k: f64,
    ground: Ground,
    runs: Vec<Run>,
}

/// The directions of one elevation, for patterns: what depends on elevation alone is found once.
#[derive(Clone, Debug)]
pub struct Ring<'a> {
    source: &'a FarFieldSource,
    sine: f64,
    cosine: f64,
    reflected: Reflected,
    /// Phase of the height of each stretch's middle.
    lifts: Vec<Complex64>,
}

impl FarFieldSource {
    /// The source for currents at the ends of segments (A peak).
    ///
    /// Segments must be shorter than half a wave, as those of a mesh are, and above a mirror or soil. Consecutive
    /// segments in one line are taken together; currents may jump anywhere. The figures of a soil are taken as they
    /// are ([`crate::earth::Soil::complex_permittivity`] checks them).
    #[must_use]
    pub fn new(
        segments: &[Segment],
        currents: &[EndCurrents],
        boundary: Boundary,
        frequency_hz: f64,
    ) -> Self {
        let k = wave_number_rad_per_m(frequency_hz);
        Self { k, ground: Ground::new(boundary, frequency_hz), runs: runs(segments, currents, k) }
    }

    /// Far field in a direction; nothing below a mirror or soil.
    #[must_use]
    pub fn field(&self, direction: Direction) -> FarField {
        self.ring(direction.elevation_deg).field(direction.azimuth_deg)
    }

    /// The directions of one elevation, degrees.
    #[must_use]
    pub fn ring(&self, elevation_deg: f64) -> Ring<'_> {
        self.ring_at(elevation_deg.to_radians().sin())
    }

    /// The directions of one elevation, by its sine.
    pub(super) fn ring_at(&self, sine: f64) -> Ring<'_> {
        let cosine = (1.0 - sine * sine).max(0.0).sqrt();
        let lifts = self.runs.iter().map(|run| Complex64::cis(self.k * sine * run.middle_m[2])).collect();
        Ring { source: self, sine, cosine, reflected: self.ground.reflected(sine), lifts }
    }

    /// N = Σ û·J(û·r̂)·e^(jk·r̂·r) over the wires, A·m.
    pub(super) fn moment_a_m(&self, outward: Vec3) -> [Complex64; 3] {
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
        for end_m in self.runs.iter().flat_map(Run::ends_m) {
            for axis in 0..3 {
                low[axis] = low[axis].min(end_m[axis]);
                high[axis] = high[axis].max(end_m[axis]);
            }
        }
        if self.ground != Ground::FreeSpace {
            low[2] = -high[2];
        }
        let diagonal2: f64 = (0..3).map(|axis| (high[axis] - low[axis]).powi(2)).sum();
        0.5 * self.k * diagonal2.sqrt()
    }

    /// rad/m.
    pub(super) fn wave_number_rad_per_m(&self) -> f64 {
        self.k
    }

    /// What lies below.
    pub(super) fn ground(&self) -> Ground {
        self.ground
    }

    pub(super) fn runs(&self) -> &[Run] {
        &self.runs
    }
}

impl Run {
    /// Both ends, m.
    pub(super) fn ends_m(&self) -> [Vec3; 2] {
        [-self.half_length_m, self.half_length_m].map(|along| advance(self.middle_m, self.direction, along))
    }
}

impl Ring<'_> {
    /// Far field toward an azimuth, degrees.
    #[must_use]
    pub fn field(&self, azimuth_deg: f64) -> FarField {
        self.field_toward(azimuth_deg.to_radians().sin_cos().into())
    }

    /// Far field toward an azimuth, by its sine and cosine.
    pub(super) fn field_toward(&self, [sin_phi, cos_phi]: [f64; 2]) -> FarField {
        let Self { source, sine, cosine, reflected, .. } = *self;
        let (mut direct, mut image) = ([Complex64::ZERO; 3], [Complex64::ZERO; 3]);
        let share = match reflected {
            Reflected::Dark => return FarField::default(),
            Reflected::Nothing => None,
            Reflected::Share(share) => Some(share),
        };
        let outward = |[x, y, _]: Vec3| cosine * (cos_phi * x + sin_phi * y);
        for (run, lift) in source.runs.iter().zip(&self.lifts) {
            // What the wires send up, and what they send down at the same angle
            let (level, rise) = (outward(run.direction), sine * run.direction[2]);
            let phase = Complex64::cis(source.k * outward(run.middle_m));
            let up = run.moment_a_m(level + rise);
            add(&mut direct, up * (phase * lift), run.direction);
            if share.is_some() {
                let down = if rise == 0.0 { up } else { run.moment_a_m(level - rise) };
                add(&mut image, down * (phase * lift.conj()), run.direction);
            }
        }
        // Components of N along rising polar angle (downward) and along rising azimuth
        let across = |[x, y, z]: [Complex64; 3], sine: f64| {
            [sine * (cos_phi * x + sin_phi * y) - cosine * z, cos_phi * y - sin_phi * x]
        };
        let [mut theta, mut phi] = across(direct, sine);
        if let Some(share) = share {
            // The image's field along rising polar angle, seen from below, is mirrored into the same direction here.
            let [theta_down, phi_down] = across(image, -sine);
            theta += share.rising * theta_down;
            phi += share.level * phi_down;
        }
        // E = −jkη/4π·N, across the direction
        let scale = Complex64::new(0.0, -source.k * VACUUM_IMPEDANCE_OHM / (4.0 * std::f64::consts::PI));
        FarField { theta_v: scale * theta, phi_v: scale * phi }
    }
}
