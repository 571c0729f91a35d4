//! Power through a large sphere.

use std::f64::consts::TAU;

use super::quadrature::gauss_legendre;
use super::source::{FarFieldSource, Toward};
use crate::wire::Boundary;

/// Power that leaves toward the sky, W: the intensity integrated over the sphere, over its upper half above a mirror.
///
/// Gauss-Legendre over the sine of elevation, trapezoids over azimuth. A source of electrical radius kR makes an
/// intensity that is a polynomial of about degree 2kR on the sphere; a dozen more make the rest negligible (1e-9).
#[must_use]
pub fn radiated_power_w(source: &FarFieldSource) -> f64 {
    let degree = 2.0 * source.electrical_size() + 16.0;
    // n points are exact to degree 2n − 1. An even number of them has none on the horizon.
    let rings = 2 * (0.25 * degree + 1.0).ceil() as usize;
    let around = degree.ceil() as usize + 1;
    let azimuths: Vec<[f64; 2]> =
        (0..around).map(|step| (TAU * step as f64 / around as f64).sin_cos().into()).collect();
    // Wires and images together radiate the same downward as upward, so half the points serve.
    let skyward = |sine: f64| source.boundary() == Boundary::FreeSpace || sine > 0.0;
    gauss_legendre(rings)
        .into_iter()
        .filter(|&(sine, _)| skyward(sine))
        .map(|(sine, weight)| {
            let toward = azimuths.iter().map(|&azimuth| Toward { sine, azimuth });
            let ring: f64 = toward.map(|toward| source.field_at(toward).intensity_w_per_sr()).sum();
            weight * ring * TAU / around as f64
        })
        .sum()
}
