//! The slow terms of a band, interpolated.
//!
//! Sine and cosine integrals and Bessel functions at a few frequencies serve a thousand others: between Chebyshev
//! nodes a polynomial follows the terms: the impedance keeps to within 1e-4 of itself, over usual bands 1e-6.

use std::f64::consts::PI;

use super::error::SketchError;
use super::image::ImageDirection;
use super::sketch::{ArmTerms, Sketch, Terms};

/// Terms over a band of frequencies.
#[derive(Clone, Debug, PartialEq)]
pub struct BandTerms {
    nodes: Vec<Node>,
}

#[derive(Clone, Debug, PartialEq)]
struct Node {
    weight: f64,
    terms: Terms,
}

impl BandTerms {
    /// Exact terms at as many frequencies as the band needs.
    ///
    /// # Errors
    /// As [`Sketch::terms`].
    pub fn new(sketch: &Sketch, low_hz: f64, high_hz: f64) -> Result<Self, SketchError> {
        sketch.check_frequency(low_hz)?;
        sketch.check_frequency(high_hz)?;
        if low_hz.total_cmp(&high_hz).is_eq() {
            return Ok(Self { nodes: vec![Node { weight: 1.0, terms: sketch.terms(low_hz)? }] });
        }
        let last = nodes_needed(sketch, low_hz, high_hz) - 1;
        let (middle_hz, half_hz) = (0.5 * (low_hz + high_hz), 0.5 * (high_hz - low_hz));
        let node = |index: usize| {
            // Chebyshev points of the second kind and their barycentric weights (Berrut & Trefethen, "Barycentric
            // Lagrange interpolation", SIAM Review 46, 2004; from memory).
            let frequency_hz = middle_hz - half_hz * (PI * index as f64 / last as f64).cos();
            let sign = if index.is_multiple_of(2) { 1.0 } else { -1.0 };
            let weight = if index == 0 || index == last { 0.5 * sign } else { sign };
            Ok(Node {
                weight,
                terms: sketch.terms(frequency_hz.clamp(low_hz.min(high_hz), low_hz.max(high_hz)))?,
            })
        };
        Ok(Self { nodes: (0..=last).map(node).collect::<Result<_, _>>()? })
    }

    /// Terms at a frequency of the band; outside it they are extrapolated and soon worthless.
    #[must_use]
    pub fn at(&self, frequency_hz: f64) -> Terms {
        let mut total = 0.0;
        let mut arms = [ArmTerms::default(); 2];
        for Node { weight, terms } in &self.nodes {
            let distance = frequency_hz - terms.frequency_hz;
            if distance == 0.0 || self.nodes.len() == 1 {
                return Terms { frequency_hz, ..*terms };
            }
            let share = weight / distance;
            total += share;
            for (sum, arm) in arms.iter_mut().zip(&terms.arms) {
                sum.add_scaled(share, arm);
            }
        }
        let arms = arms.map(|sum| {
            let mut arm = ArmTerms::default();
            arm.add_scaled(total.recip(), &sum);
            arm
        });
        Terms { frequency_hz, arms }
    }
}

impl ArmTerms {
    fn add_scaled(&mut self, factor: f64, other: &Self) {
        self.space.space_ohm += factor * other.space.space_ohm;
        self.space.m_ohm += factor * other.space.m_ohm;
        self.space.n_ohm += factor * other.space.n_ohm;
        self.loss_ohm += factor * other.loss_ohm;
    }
}

/// How many nodes follow the terms over a band.
fn nodes_needed(sketch: &Sketch, low_hz: f64, high_hz: f64) -> usize {
    let wire = sketch.wire();
    // The fastest wave in the terms: the length of a wire of two such arms, and to the image and back.
    let over_image_m = match &wire.image {
        Some(image) if image.direction == ImageDirection::Horizontal => 2.0 * image.height_m,
        Some(image) => 4.0 * image.height_m,
        None => 0.0,
    };
    let path_m = 2.0 * wire.arm_a_m.max(wire.arm_b_m) + over_image_m;
    let half_span = 0.5 * sketch.wave_number_on_wire((high_hz - low_hz).abs()) * path_m;
    // A polynomial of degree n follows e^(jφx), |x| ≤ 1, once n exceeds φ by a few.
    let wave = half_span + 3.0 * half_span.cbrt();
    // Logarithms and roots of f are singular at f = 0, at r = (high + low)/(high − low) half bands from the middle: the
    // error falls as ρ⁻ⁿ with ρ = r + √(r² − 1).
    let ratio = (high_hz + low_hz) / (high_hz - low_hz).abs();
    let smooth = TARGET.recip().ln() / (ratio + (ratio * ratio - 1.0).max(0.0).sqrt()).ln();
    // Far beyond any band; keeps an absurd request finite. Accuracy then falls.
    const MOST: f64 = 512.0;
    (wave + smooth).ceil().clamp(4.0, MOST) as usize
}

/// Factor by which the singular part shrinks; the part is small itself, so that the error stays below this.
const TARGET: f64 = 1e-4;
