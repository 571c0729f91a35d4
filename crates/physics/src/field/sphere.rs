//! Power through a large sphere.

use std::f64::consts::{PI, TAU};

use super::far::FarFieldSource;
use super::quadrature::gauss_legendre;
use crate::wire::Boundary;

/// Power that leaves toward the sky, W: the intensity integrated over the sphere, over its upper half above a mirror.
///
/// Gauss-Legendre over the sine of elevation, trapezoids over azimuth. A source of electrical radius kR makes an
/// intensity that is a polynomial of about degree 2kR on the sphere; a dozen more make the rest negligible (1e-9).
#[must_use]
pub fn radiated_power_w(source: &FarFieldSource) -> f64 {
    let degree = 2.0 * source.electrical_size() + 16.0;
    let rings = (0.5 * degree).ceil() as usize + 2;
    let around = degree.ceil() as usize + 1;
    let half = source.boundary() == Boundary::Mirror;
    let mut power_w = 0.0;
    for (x, weight) in gauss_legendre(if half { 2 * rings } else { rings }) {
        // Above a mirror −1…1 becomes 0…1.
        let (sine, weight) = if half { (0.5 * (x + 1.0), 0.5 * weight) } else { (x, weight) };
        let cosine = (1.0 - sine * sine).sqrt();
        let ring: f64 = (0..around)
            .map(|step| source.field_at(sine, cosine, TAU * step as f64 / around as f64).intensity_w_per_sr())
            .sum();
        power_w += weight * ring * 2.0 * PI / around as f64;
    }
    power_w
}
