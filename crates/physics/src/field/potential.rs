//! Scalar potential at the surface of a wire.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::quadrature::{THREE, gauss_legendre};
use super::space::{Vec3, dot, mirrored};
use crate::constants::{VACUUM_PERMEABILITY_H_PER_M, VACUUM_PERMITTIVITY_F_PER_M, wave_number_rad_per_m};
use crate::wire::{Boundary, EndCurrents, Segment};

/// A place on the surface of a wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SurfacePoint {
    /// On the axis, m.
    pub axis_m: [f64; 3],
    /// Radius of the wire there, m.
    pub radius_m: f64,
}

/// The charges of a structure at one frequency, ready for potentials.
#[derive(Clone, Debug)]
pub struct PotentialSource<'a> {
    charged: Vec<Charged<'a>>,
    boundary: Boundary,
    frequency_hz: f64,
    k: f64,
}

/// A segment with its charge.
#[derive(Clone, Debug)]
struct Charged<'a> {
    segment: &'a Segment,
    ends: &'a EndCurrents,
    direction: [f64; 3],
    length_m: f64,
    /// Place and charge at the Gauss points of the whole segment, m and C.
    points: [([f64; 3], Complex64); 3],
    /// Their sum, C.
    whole_c: Complex64,
}

/// A piece of wire that is longer than this many times its distance is divided.
const NEAR: f64 = 1.5;
/// Beyond this many lengths a segment is a point: its neighbours' charges balance what that leaves out, 1/24 of the
/// square.
const FAR: f64 = 12.0;

impl<'a> PotentialSource<'a> {
    /// The source for currents at the ends of segments (A peak). Over soil what the earth gives back is not in it:
    /// [`crate::wire::Returned`] has that.
    #[must_use]
    pub fn new(
        segments: &'a [Segment],
        currents: &'a [EndCurrents],
        boundary: Boundary,
        frequency_hz: f64,
    ) -> Self {
        let charged =
            segments.iter().zip(currents).map(|(segment, ends)| Charged::new(segment, ends, frequency_hz));
        let k = wave_number_rad_per_m(frequency_hz);
        Self { charged: charged.collect(), boundary, frequency_hz, k }
    }

    /// Scalar potential (Lorenz gauge), V peak, against far away.
    ///
    /// Of the charge on all wires, taken on their axes and seen from the surface. Indicative: only its jump across a
    /// gap can be measured; [`PotentialSource::induced_v_per_m`] carries it across.
    #[must_use]
    pub fn potential_v(&self, at: SurfacePoint) -> Complex64 {
        let [x, y, z] = at.axis_m;
        let mirrored = SurfacePoint { axis_m: [x, y, -z], ..at };
        let mut sum = Complex64::ZERO;
        for charged in &self.charged {
            sum += self.of(charged, at);
            if self.boundary == Boundary::Mirror {
                // The image carries the opposite charge.
                sum -= self.of(charged, mirrored);
            }
        }
        sum / (4.0 * PI * VACUUM_PERMITTIVITY_F_PER_M)
    }

    /// Mean of the potential over the surface of a segment, V peak, by a Gauss-Legendre rule of `places`.
    ///
    /// The solver's equations hold such means, so that they follow the wire smoothly where the potential at single
    /// places ripples with the mesh by a few percent. Beside a gap three places are good to a tenth of a percent of the
    /// feedpoint voltage; one place, the middle, to a percent or two.
    #[must_use]
    pub fn mean_potential_v(&self, segment: &Segment, places: usize) -> Complex64 {
        let (direction, length_m) = (segment.direction(), segment.length_m());
        let place = |x: f64| {
            let along_m = 0.5 * (x + 1.0) * length_m;
            std::array::from_fn(|axis| segment.from_m[axis] + along_m * direction[axis])
        };
        gauss_legendre(places)
            .into_iter()
            .map(|(x, weight)| {
                let at = SurfacePoint { axis_m: place(x), radius_m: segment.radius_m };
                self.potential_v(at) * (0.5 * weight)
            })
            .sum()
    }

    /// jωA along a direction at a wire's surface, V/m peak: what the changing currents drive against a current there.
    ///
    /// Along metal E = −∇Φ − jωA vanishes but for the metal's own resistance, so the potential falls by this much per
    /// metre: continued so from both sides to the middle of a gap, it jumps there by exactly the gap's voltage, however
    /// long the gap is.
    #[must_use]
    pub fn induced_v_per_m(&self, at: SurfacePoint, direction: Vec3) -> Complex64 {
        let [x, y, z] = at.axis_m;
        let below = SurfacePoint { axis_m: [x, y, -z], ..at };
        let mut sum = Complex64::ZERO;
        for charged in &self.charged {
            let current = |along_m: f64| charged.ends.current_a(charged.segment, self.frequency_hz, along_m);
            let whole = (0.0, charged.length_m);
            sum += dot(direction, charged.direction) * self.divided(charged, at, whole, &current);
            if self.boundary == Boundary::Mirror {
                let image = dot(direction, mirrored(charged.direction));
                sum -= image * self.divided(charged, below, whole, &current);
            }
        }
        // jωµ₀/4π
        Complex64::new(0.0, 0.5 * self.frequency_hz * VACUUM_PERMEABILITY_H_PER_M) * sum
    }

    /// ∫ q·e^(−jkR)/R over a segment.
    fn of(&self, charged: &Charged, at: SurfacePoint) -> Complex64 {
        let (middle, _) = charged.points[1];
        let r = distance(middle, at);
        if r > FAR * charged.length_m {
            return charged.whole_c * Complex64::cis(-self.k * r) / r;
        }
        if charged.length_m > NEAR * r {
            let charge =
                |along_m: f64| charged.ends.charge_c_per_m(charged.segment, self.frequency_hz, along_m);
            return self.divided(charged, at, (0.0, charged.length_m), &charge);
        }
        charged.points.iter().map(|&(place, charge)| self.seen(charge, distance(place, at))).sum()
    }

    /// ∫ density·e^(−jkR)/R over a part of a segment, divided until it is shorter than its distance.
    fn divided(
        &self,
        charged: &Charged,
        at: SurfacePoint,
        (from_m, to_m): (f64, f64),
        density: &impl Fn(f64) -> Complex64,
    ) -> Complex64 {
        let length_m = to_m - from_m;
        let middle_m = 0.5 * (from_m + to_m);
        if length_m > NEAR * distance(charged.place(middle_m), at) {
            return self.divided(charged, at, (from_m, middle_m), density)
                + self.divided(charged, at, (middle_m, to_m), density);
        }
        THREE
            .iter()
            .map(|&(share, weight)| {
                let along_m = from_m + share * length_m;
                let here = density(along_m) * (weight * length_m);
                self.seen(here, distance(charged.place(along_m), at))
            })
            .sum()
    }

    fn seen(&self, amount: Complex64, r: f64) -> Complex64 {
        amount * Complex64::cis(-self.k * r) / r
    }
}

impl<'a> Charged<'a> {
    fn new(segment: &'a Segment, ends: &'a EndCurrents, frequency_hz: f64) -> Self {
        let (direction, length_m) = (segment.direction(), segment.length_m());
        let points = THREE.map(|(share, weight)| {
            let along_m = share * length_m;
            let charge = ends.charge_c_per_m(segment, frequency_hz, along_m) * (weight * length_m);
            (std::array::from_fn(|axis| segment.from_m[axis] + along_m * direction[axis]), charge)
        });
        let whole_c = points.iter().map(|(_, charge)| charge).sum();
        Self { segment, ends, direction, length_m, points, whole_c }
    }

    fn place(&self, along_m: f64) -> [f64; 3] {
        std::array::from_fn(|axis| self.segment.from_m[axis] + along_m * self.direction[axis])
    }
}

/// From a place on an axis to the surface point, m: √(d² + a²).
fn distance(place_m: [f64; 3], at: SurfacePoint) -> f64 {
    let d2: f64 = (0..3).map(|axis| (place_m[axis] - at.axis_m[axis]).powi(2)).sum();
    (d2 + at.radius_m * at.radius_m).sqrt()
}
