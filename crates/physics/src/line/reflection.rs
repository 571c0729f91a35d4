//! Reflection coefficient, standing-wave ratio and what a mismatch adds to a line's loss.

use num_complex::Complex64;

/// Γ of an impedance on a real reference, both Ω.
#[must_use]
pub fn gamma_of_impedance(z_ohm: Complex64, reference_ohm: f64) -> Complex64 {
    // Γ = (Z − R)/(Z + R)
    (z_ohm - reference_ohm) / (z_ohm + reference_ohm)
}

/// The impedance, Ω, that has this Γ on a real reference, Ω; not finite for Γ = 1 (an open end).
#[must_use]
pub fn impedance_of_gamma(gamma: Complex64, reference_ohm: f64) -> Complex64 {
    // Z = R·(1 + Γ)/(1 − Γ)
    (1.0 + gamma) / (1.0 - gamma) * reference_ohm
}

/// Standing-wave ratio of |Γ|; infinite where |Γ| is 1 or more.
#[must_use]
pub fn swr_of_gamma(gamma_size: f64) -> f64 {
    // s = (1 + |Γ|)/(1 − |Γ|)
    if gamma_size < 1.0 { (1.0 + gamma_size) / (1.0 - gamma_size) } else { f64::INFINITY }
}

/// |Γ| of a standing-wave ratio of 1 or more; 1 for an infinite ratio.
#[must_use]
pub fn gamma_size_of_swr(swr: f64) -> f64 {
    // |Γ| = (s − 1)/(s + 1), written so that s = ∞ gives 1
    1.0 - 2.0 / (swr + 1.0)
}

/// What a standing-wave ratio at the load adds to the matched loss of a line, dB.
///
/// Units: dB. Assumptions: real Z₀; with a complex Z₀ the exact way is [`super::Piece`] and
/// [`super::loss_db`]. Valid for SWR ≥ 1 and a matched loss of 0 dB or more.
///
/// Reference: `ARRL Antenna Book`, chapter on transmission lines (from memory).
#[must_use]
pub fn additional_loss_db(matched_loss_db: f64, swr_at_load: f64) -> f64 {
    // total = 10·log₁₀[(a² − ρ²)/(a·(1 − ρ²))], a = 10^(ML/10); matched loss = 10·log₁₀ a
    let a = 10_f64.powf(matched_loss_db / 10.0);
    let rho = gamma_size_of_swr(swr_at_load);
    let total_over_a = (a * a - rho * rho) / (a * a * (1.0 - rho * rho));
    10.0 * total_over_a.log10()
}
