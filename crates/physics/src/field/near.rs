//! E and H at any point.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::run::slopes;
use super::space::{Vec3, add, cross, dot, length, mirrored, sub};
use crate::constants::{VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::wire::{Boundary, EndCurrents, Segment};

/// Field at a point; peak phasors, components along x, y, z.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct NearField {
    /// Electric field, V/m.
    pub e_v_per_m: [Complex64; 3],
    /// Magnetic field, A/m.
    pub h_a_per_m: [Complex64; 3],
}

/// The currents of a structure at one frequency, ready for near fields.
#[derive(Clone, Debug)]
pub struct NearFieldSource {
    k: f64,
    boundary: Boundary,
    /// Of all segments and their images.
    filaments: Vec<Filament>,
}

/// A segment or its image: a sinusoid of current on an axis.
#[derive(Clone, Copy, Debug)]
struct Filament {
    from_m: Vec3,
    direction: Vec3,
    length_m: f64,
    radius_m: f64,
    /// At its beginning and its end.
    current_a: [Complex64; 2],
    slope_a_per_m: [Complex64; 2],
}

impl NearFieldSource {
    /// The source for currents at the ends of segments (A peak); `None` over soil, which
    /// [`super::NearFieldOverSoil`] serves.
    ///
    /// Segments must be shorter than half a wave, as those of a mesh are.
    #[must_use]
    pub fn new(
        segments: &[Segment],
        currents: &[EndCurrents],
        boundary: Boundary,
        frequency_hz: f64,
    ) -> Option<Self> {
        let k = wave_number_rad_per_m(frequency_hz);
        let mut source = Self::in_free_space(segments, currents, k);
        match boundary {
            Boundary::Soil(_) => return None,
            Boundary::FreeSpace => {}
            Boundary::Mirror => {
                let images: Vec<Filament> = source.filaments.iter().map(Filament::image).collect();
                source.filaments.extend(images);
                source.boundary = boundary;
            }
        }
        Some(source)
    }

    /// Of the wires alone.
    pub(super) fn in_free_space(segments: &[Segment], currents: &[EndCurrents], k: f64) -> Self {
        let wires = segments.iter().zip(currents).map(|(segment, ends)| Filament::new(segment, ends, k));
        Self { k, boundary: Boundary::FreeSpace, filaments: wires.collect() }
    }

    /// The field at a point, m; none below a mirror.
    ///
    /// In closed form from the currents on the axes and their charges; where the currents of the segments that meet at
    /// a point do not sum to zero, their difference is taken as a point charge there. Right outside the wires; nearer
    /// than a few radii the true current's crowding toward other conductors matters. A point inside a wire gets the
    /// field at its surface, so that the answer is always finite.
    ///
    /// Closer to a wire than its segments are long, make the source of [`super::smoothed`] currents.
    #[must_use]
    pub fn field(&self, at_m: [f64; 3]) -> NearField {
        let mut field = NearField::default();
        if self.boundary == Boundary::Mirror && at_m[2] < 0.0 {
            return field;
        }
        for filament in &self.filaments {
            filament.add_field(self.k, at_m, &mut field);
        }
        field
    }
}

impl Filament {
    fn new(segment: &Segment, ends: &EndCurrents, k: f64) -> Self {
        let length_m = segment.length_m();
        Self {
            from_m: segment.from_m,
            direction: segment.direction(),
            length_m,
            radius_m: segment.radius_m,
            current_a: [ends.from_a, ends.to_a],
            slope_a_per_m: slopes(ends, k, length_m),
        }
    }

    /// In a mirror the current's level component is turned round, its vertical one is not: the mirrored place with the
    /// current against the mirrored direction.
    fn image(&self) -> Self {
        Self {
            from_m: mirrored(self.from_m),
            direction: mirrored(self.direction),
            current_a: self.current_a.map(|current| -current),
            slope_a_per_m: self.slope_a_per_m.map(|slope| -slope),
            ..*self
        }
    }

    /// The filament is the z axis of cylindrical coordinates; per end, with ζ = z − z', R = √(ρ² + ζ²), beginning
    /// subtracted from end:
    ///
    /// 4π·E_z = η/jk·[I·ζ·(1 + jkR)/R³ − I'/R]·e^(−jkR)
    /// 4πρ·E_ρ = jη/k·[jkI·ζ²/R² − I·ρ²/R³ − I'·ζ/R]·e^(−jkR)
    /// 4πρ·H_φ = −[I·ζ/R + jI'/k]·e^(−jkR)
    ///
    /// From the vector potential of the sinusoid by partial integration, and Maxwell's equations for the rest
    /// (Schelkunoff & Friis, "Antennas", 1952, have the same for a standing wave, from memory).
    fn add_field(&self, k: f64, at_m: Vec3, field: &mut NearField) {
        let from_start = sub(at_m, self.from_m);
        let along_m = dot(from_start, self.direction);
        let across: Vec3 = std::array::from_fn(|axis| from_start[axis] - along_m * self.direction[axis]);
        let off_axis_m = length(across);
        let beside = (-self.radius_m..=self.length_m + self.radius_m).contains(&along_m);
        let rho = if beside { off_axis_m.max(self.radius_m) } else { off_axis_m };
        let (mut axial, mut radial, mut round) = (Complex64::ZERO, Complex64::ZERO, Complex64::ZERO);
        let j = Complex64::i();
        for (end, zeta) in [along_m, along_m - self.length_m].into_iter().enumerate() {
            let (current, slope) = (self.current_a[end], self.slope_a_per_m[end]);
            let r = (rho * rho + zeta * zeta).sqrt();
            let wave = Complex64::cis(-k * r) * if end == 0 { -1.0 } else { 1.0 };
            let (over_r, cosine) = (r.recip(), zeta / r);
            axial += (current * cosine * over_r * Complex64::new(over_r, k) - slope * over_r) * wave;
            let spread = Complex64::new(-rho * rho * over_r.powi(3), k * cosine * cosine);
            radial += (current * spread - slope * cosine) * wave;
            round -= (current * cosine + j * slope / k) * wave;
        }
        let scale = VACUUM_IMPEDANCE_OHM / (4.0 * PI * k);
        add(&mut field.e_v_per_m, -j * scale * axial, self.direction);
        // On the axis itself there is no direction across it, and no field there.
        if off_axis_m > 0.0 {
            let outward = across.map(|component| component / off_axis_m);
            add(&mut field.e_v_per_m, j * scale * radial / rho, outward);
            add(&mut field.h_a_per_m, round / (4.0 * PI * rho), cross(self.direction, outward));
        }
    }
}
