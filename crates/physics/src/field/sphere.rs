//! Power through a large sphere.

use std::f64::consts::TAU;

use super::ground::Ground;
use super::quadrature::gauss_legendre;
use super::source::FarFieldSource;

/// Power that leaves toward the sky, W: the intensity integrated over the sphere, over its upper half above a mirror or
/// soil.
///
/// Gauss-Legendre over the sine of elevation, trapezoids over azimuth. A source of electrical radius kR makes an
/// intensity that is a polynomial of about degree 2kR on the sphere; a dozen more make the rest negligible (1e-9). Over
/// soil Fresnel's coefficients turn near the horizon, within 1/√|ε|: there the rings stand closer (1e-6).
#[must_use]
pub fn radiated_power_w(source: &FarFieldSource) -> f64 {
    let degree = 2.0 * source.electrical_size() + 16.0;
    let around = degree.ceil() as usize + 1;
    let azimuths: Vec<[f64; 2]> =
        (0..around).map(|step| (TAU * step as f64 / around as f64).sin_cos().into()).collect();
    rings(source.ground(), degree)
        .into_iter()
        .map(|(sine, weight)| {
            let ring = source.ring_at(sine);
            let sum: f64 =
                azimuths.iter().map(|&azimuth| ring.field_toward(azimuth).intensity_w_per_sr()).sum();
            weight * sum * TAU / around as f64
        })
        .sum()
}

/// Sines of elevation and their weights.
fn rings(ground: Ground, degree: f64) -> Vec<(f64, f64)> {
    // n points are exact to degree 2n − 1. An even number of them has none on the horizon.
    let whole = || gauss_legendre(2 * (0.25 * degree + 1.0).ceil() as usize);
    match ground {
        Ground::FreeSpace => whole(),
        // Wires and images together radiate the same downward as upward, so half the points serve.
        Ground::Mirror => whole().into_iter().filter(|&(sine, _)| sine > 0.0).collect(),
        Ground::Soil(epsilon) => {
            let mut rings = Vec::new();
            let (mut from, mut to) = (0.0, (TURN / epsilon.norm().sqrt()).min(1.0));
            while from < 1.0 {
                let count = (0.25 * degree * (to - from)).ceil() as usize + EXTRA;
                let middle = 0.5 * (from + to);
                let half = 0.5 * (to - from);
                rings.extend(gauss_legendre(count).into_iter().map(|(x, w)| (middle + half * x, half * w)));
                (from, to) = (to, (WIDER * to).min(1.0));
            }
            rings
        }
    }
}

/// End of the lowest panel of rings over soil, in 1/√|ε|: where the phase of the rising coefficient turns.
const TURN: f64 = 1.0;

/// Each further panel ends at this many times the end of the one below.
const WIDER: f64 = 3.0;

/// Rings of a panel beside those that the source's size asks for.
const EXTRA: usize = 5;
