//! Power into the earth.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;

use super::evanescent::Decayed;
use super::ground::Ground;
use super::kronrod::{Panel, refined};
use super::run::Run;
use super::source::FarFieldSource;
use super::space::{Vec3, sub};
use crate::constants::VACUUM_IMPEDANCE_OHM;

/// Power into the soil below the wires, W: found at the surface of the soil from the currents, without asking feedpoint
/// or sky. 0 without soil.
///
/// The field of the currents is a spectrum of plane waves below them; each enters the half-space with Fresnel's
/// coefficients. Those steeper than the horizon carry the wires' radiation downward; the others decay with the height
/// and are what a low wire loses to the soil beside it. Error below 3e-5 (against Sommerfeld's integrals for elements from
/// 1/200 of a wave up, and 1e-6 against the exact kernels for wires).
///
/// `None` for wires nearer to the soil than 1/2000 of a wave or in it: the charge of an end that close to the soil, or
/// the current of an electrode, would decide it. Nor where the quadrature does not settle.
#[must_use]
pub fn earth_power_w(source: &FarFieldSource) -> Option<f64> {
    let Ground::Soil(epsilon) = source.ground() else { return Some(0.0) };
    let ends_m: Vec<Vec3> = source.runs().iter().flat_map(Run::ends_m).collect();
    let k = source.wave_number_rad_per_m();
    let lowest = k * ends_m.iter().map(|end_m| end_m[2]).fold(f64::INFINITY, f64::min);
    if ends_m.is_empty() || lowest.is_nan() || lowest < LOWEST {
        return (ends_m.is_empty()).then_some(0.0);
    }
    let surface = Surface { source, epsilon, k, plan: Plan::new(&ends_m), lowest };
    surface.power_w()
}

/// Least height, in 1/k.
const LOWEST: f64 = TAU / 2000.0;

/// Share of the power by which the two rules of the quadrature may differ; the better one errs far less.
const SHARE: f64 = 3e-5;

/// Panels at most, against going on for ever.
const MOST: usize = 400;

/// Relative amplitude e^(−this) of the power of a wave that is left out: the tail of t²·e^(−2t·h) is 7e-6 of the whole.
const TAIL: f64 = 17.0;

/// The wires from above.
struct Plan {
    /// Largest horizontal distance of two ends, m.
    width_m: f64,
    /// Its azimuth.
    bearing: f64,
    /// Whether all wires are in the vertical plane through it: then both sides of it are alike.
    flat: bool,
}

impl Plan {
    fn new(ends_m: &[Vec3]) -> Self {
        let pairs =
            ends_m.iter().enumerate().flat_map(|(index, a)| ends_m[..index].iter().map(|b| sub(*a, *b)));
        let far = |[x, y, _]: &Vec3| x.hypot(*y);
        let [x, y, _] = pairs.max_by(|a, b| far(a).total_cmp(&far(b))).unwrap_or_default();
        let (width_m, bearing) = (x.hypot(y), y.atan2(x));
        let (sine, cosine) = bearing.sin_cos();
        let beside = |end_m: &Vec3| {
            let [x, y, _] = sub(*end_m, ends_m[0]);
            (cosine * y - sine * x).abs()
        };
        Self { width_m, bearing, flat: ends_m.iter().all(|end_m| beside(end_m) < FLAT * width_m) }
    }
}

/// Part of the width by which a flat structure may leave its plane.
const FLAT: f64 = 1e-9;

/// The plane z = 0, lengths in 1/k.
struct Surface<'a> {
    source: &'a FarFieldSource,
    epsilon: Complex64,
    k: f64,
    plan: Plan,
    /// Height of the lowest end.
    lowest: f64,
}

/// |N_φ|² and |q·N_z − j·u0·N_ρ|², summed over azimuth.
#[derive(Clone, Copy, Default)]
struct Sums {
    level: f64,
    rising: f64,
}

impl Surface<'_> {
    /// With q = λ/k, u0 = √(q² − 1), u1 = √(q² − ε) and N of each wave at z = 0,
    ///
    /// P = η·k²/8π² · ∫∫ [ |N_φ|²·Im u1/|u0 + u1|² + |ε|²·Im(u1/ε)·|q·N_z − j·u0·N_ρ|²/|ε·u0 + u1|² ]·q dq dφ
    ///
    /// A current's spectrum below it is E = −jωμ·N/2u0 level and H = −jk×N/2u0 across the plane of incidence; of them
    /// 2u0/(u0 + u1) and 2ε·u0/(ε·u0 + u1) enter, and ½·Re(E×H*) there is ½|E|²·Im u1/ωμ and ½|H|²·Im(u1/ε)/ωε0.
    fn power_w(&self) -> Option<f64> {
        // One way from −1 to ∞: the sine of the angle below the horizon, negative, and on to the decay. Both are smooth
        // in themselves; at 0 is the grazing wave.
        let integrand = |x: f64| if x < 0.0 { self.steep(-x) } else { self.flat(x) };
        let mut panels = Vec::new();
        let turn = (0.5 / self.epsilon.norm().sqrt()).min(0.5);
        let mut at = -1.0;
        while at < 0.0 {
            let next = if at < -1.5 * turn { 0.3 * at } else { 0.0 };
            panels.push(Panel::new(at, next, &integrand));
            at = next;
        }
        // Beyond √(Re ε − 1) a soil without loss takes nothing.
        let edge = (self.epsilon - 1.0).sqrt().re;
        let longest = 4.0 / self.lowest;
        let end = 0.5 * TAIL / self.lowest;
        while at < end {
            let mut next = (at + (2.0 * at).max(turn).min(longest)).min(end);
            if at < 0.999 * edge && next > edge {
                next = edge;
            }
            panels.push(Panel::new(at, next, &integrand));
            at = next;
        }
        let integral = refined(panels, SHARE, MOST, &integrand)?;
        Some(VACUUM_IMPEDANCE_OHM * self.k * self.k / (8.0 * PI * PI) * integral)
    }

    /// Waves that travel down: per sine of their angle below the horizon.
    fn steep(&self, sine: f64) -> f64 {
        let q = (1.0 - sine * sine).max(0.0).sqrt();
        let u0 = Complex64::new(0.0, sine);
        let sums = self
            .around(q, u0, |[sin_phi, cos_phi]| self.source.moment_a_m([q * cos_phi, q * sin_phi, -sine]));
        // q dq = sine d(sine)
        sine * self.entering(q, u0, sums)
    }

    /// Waves that decay downward: per decay.
    fn flat(&self, decay: f64) -> f64 {
        let decayed = Decayed::new(self.source.runs(), self.k, decay);
        let q = (1.0 + decay * decay).sqrt();
        let u0 = Complex64::new(decay, 0.0);
        let sums = self.around(q, u0, |azimuth| decayed.moment_a_m(azimuth));
        // q dq = u0 du0
        decay * self.entering(q, u0, sums)
    }

    /// Trapezoids over azimuth: harmonics of |N|² end a little above q·k·width.
    fn around(&self, q: f64, u0: Complex64, moment_a_m: impl Fn([f64; 2]) -> [Complex64; 3]) -> Sums {
        let highest = q * self.k * self.plan.width_m;
        let pairs = (0.5 * (highest + 4.0 * highest.cbrt() + 8.0)).ceil() as usize;
        let step = PI / pairs as f64;
        // Of a flat structure one half of the circle serves for both, its ends for themselves.
        let points = if self.plan.flat { pairs + 1 } else { 2 * pairs };
        let mut sums = Sums::default();
        for index in 0..points {
            let twice = self.plan.flat && index % pairs != 0;
            let weight = if twice { 2.0 * step } else { step };
            let (sin_phi, cos_phi) = (self.plan.bearing + step * index as f64).sin_cos();
            let [x, y, z] = moment_a_m([sin_phi, cos_phi]);
            let (across, along) = (cos_phi * y - sin_phi * x, cos_phi * x + sin_phi * y);
            sums.level += weight * across.norm_sqr();
            sums.rising += weight * (q * z - Complex64::i() * u0 * along).norm_sqr();
        }
        sums
    }

    fn entering(&self, q: f64, u0: Complex64, sums: Sums) -> f64 {
        let epsilon = self.epsilon;
        // Decays and travels downward: Re ≥ 0, Im ≥ 0
        let u1 = (q * q - epsilon).sqrt();
        let level = u1.im / (u0 + u1).norm_sqr();
        let rising = epsilon.norm_sqr() * (u1 / epsilon).im / (epsilon * u0 + u1).norm_sqr();
        level * sums.level + rising * sums.rising
    }
}
