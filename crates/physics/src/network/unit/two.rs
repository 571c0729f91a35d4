//! Closed forms: the part nearest to the source for all before it, and where two parts match exactly.

use num_complex::Complex64;

use super::element::Element;
use super::search::{Bar, Found};

/// The last part: the smallest that brings a normalised immittance within the bar, or the one that comes nearest.
pub(super) fn last(w: Complex64, passed: f64, element: &Element, bar: &Bar) -> Found {
    let u = element.direction;
    let at = |size: f64| {
        let after = w + u * size;
        Found { mismatch: mismatch(after), passed: passed * w.re / after.re, sizes: [size, 0.0, 0.0] }
    };
    let square = u.norm_sqr();
    let along = w.re * u.re + w.im * u.im;
    // |w + t·u|² + 1 ≤ 2·m·Re(w + t·u): a·t² + 2b·t + c ≤ 0
    let b = along - bar.mismatch * u.re;
    let c = w.norm_sqr() + 1.0 - 2.0 * bar.mismatch * w.re;
    let discriminant = b * b - square * c;
    if discriminant >= 0.0 {
        let root = discriminant.sqrt();
        // both roots without cancellation
        let far = -b - root.copysign(b);
        let (one, two) = (far / square, if far == 0.0 { 0.0 } else { c / far });
        let (low, high) = (one.min(two), one.max(two));
        if high >= 0.0
            && let Some(size) = element.at_least(low.max(0.0))
            && size <= high * (1.0 + 1e-12)
        {
            return at(size);
        }
    }
    // Nothing will do: least (|w + t·u|² + 1)/Re(w + t·u). Along the ray it falls and then grows.
    let q = u.re;
    let k = (q * (w.norm_sqr() + 1.0) - 2.0 * along * w.re) / square;
    let best = (k / (w.re + (w.re * w.re + q * k).max(0.0).sqrt())).max(0.0);
    let [low, high] = element.limits();
    let below = at(element.at_most(best).unwrap_or(low));
    let above = at(element.at_least(best).unwrap_or(high));
    if above.mismatch < below.mismatch { above } else { below }
}

/// (s + 1/s)/2 of the standing-wave ratio s of a normalised impedance or admittance: it needs no root.
pub(super) fn mismatch(w: Complex64) -> f64 {
    // |Γ| = |w − 1|/|w + 1| gives (s + 1/s)/2 = (|w|² + 1)/(2·Re w)
    0.5 * (w.norm_sqr() + 1.0) / w.re
}

/// Sizes of the first of two parts worth trying: where both match exactly, and where the first does best with the
/// second at either end of its range.
pub(super) fn promising(w: Complex64, first: &Element, second: &Element) -> [f64; 6] {
    let [low, high] = second.limits();
    let [m0, m1] = matches(w, first.direction, second.direction);
    let [l0, l1] = with_second_at(w, first.direction, second.direction * low);
    let [h0, h1] = with_second_at(w, first.direction, second.direction * high);
    [m0, m1, l0, l1, h0, h1]
}

/// Sizes of the first part where some (perhaps negative) size of the second matches exactly.
fn matches(w: Complex64, u1: Complex64, u2: Complex64) -> [f64; 2] {
    // (w + t₁u₁)·(1 − t₂u₂) = 1; over u₁u₂: P + t₁/u₂ − t₂·w/u₁ − t₁t₂ = 0, P = (w − 1)/(u₁u₂).
    // Its imaginary part gives t₁ = (κ·t₂ − Im P)/Im(1/u₂) with κ = Im(w/u₁), its real part a quadratic in t₂.
    let p = (w - 1.0) / (u1 * u2);
    let inverse = u2.inv();
    let turned = w / u1;
    let (alpha, beta, kappa) = (p.im, inverse.im, turned.im);
    let [a, b] = quadratic(
        -kappa / beta,
        (kappa * inverse.re + alpha) / beta - turned.re,
        p.re - alpha * inverse.re / beta,
    );
    [a, b].map(|t2| (kappa * t2 - alpha) / beta)
}

/// Sizes of the first part where the mismatch behind a fixed second part is stationary.
fn with_second_at(w: Complex64, u: Complex64, second: Complex64) -> [f64; 2] {
    // With W = w + t·u and after = 1/W + s: (|after|² + 1)/Re(after) = (|1 + sW|² + |W|²)/(Re W + Re s·|W|²),
    // both quadratic in t: N = a₀ + 2a₁t + a₂t², D likewise; N′D = ND′ has no cubic term.
    let (one, su) = (1.0 + second * w, second * u);
    let dot = |x: Complex64, y: Complex64| x.re * y.re + x.im * y.im;
    let n = [one.norm_sqr() + w.norm_sqr(), dot(one, su) + dot(w, u), su.norm_sqr() + u.norm_sqr()];
    let d = [w.re + second.re * w.norm_sqr(), 0.5 * u.re + second.re * dot(w, u), second.re * u.norm_sqr()];
    quadratic(n[2] * d[1] - n[1] * d[2], n[2] * d[0] - n[0] * d[2], n[1] * d[0] - n[0] * d[1])
}

/// The real roots of a·x² + b·x + c; the place of the extremum twice where there are none. May be not finite.
fn quadratic(a: f64, b: f64, c: f64) -> [f64; 2] {
    let discriminant = b * b - 4.0 * a * c;
    if discriminant < 0.0 {
        return [-0.5 * b / a; 2];
    }
    let w = -0.5 * (b + discriminant.sqrt().copysign(b));
    [w / a, c / w]
}
