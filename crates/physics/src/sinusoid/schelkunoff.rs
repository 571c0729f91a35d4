//! Input impedance of a cylindrical wire from its mean characteristic impedance.
//!
//! Source: S. A. Schelkunoff, "Theory of antennas of arbitrary size and shape", Proc. IRE 29, 1941 (from memory): the
//! wire is a transmission line that opens into space, its characteristic impedance nearly uniform, and the power
//! radiated stands as an impedance at its end. η0 is written where the paper has 120π.

use std::f64::consts::PI;

use num_complex::Complex64;

use crate::constants::VACUUM_IMPEDANCE_OHM;
use crate::special::sine_cosine_integrals;

/// Euler's constant γ.
const EULER: f64 = 0.577_215_664_901_532_9;

/// Mean characteristic impedance of a centre-fed cylindrical wire, Ω, at least two radii long.
#[must_use]
pub fn mean_characteristic_impedance_ohm(half_length_m: f64, radius_m: f64) -> f64 {
    // K = η0/π·(ln(2l/a) − 1)
    VACUUM_IMPEDANCE_OHM / PI * ((2.0 * half_length_m / radius_m).ln() - 1.0)
}

/// The slow terms of the formula for a centre-fed wire, Ω.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct SpaceTerms {
    /// R + jX: "inverse radiation impedance". R is the induced-EMF resistance at the current loop.
    pub space_ohm: Complex64,
    /// M, first-order change of the characteristic impedance along the wire, in phase.
    pub m_ohm: f64,
    /// N, the same in quadrature.
    pub n_ohm: f64,
}

/// R, X, M and N for the electrical half length kl in radians, kl > 0.
pub(super) fn space_terms(kl: f64) -> SpaceTerms {
    let unit = VACUUM_IMPEDANCE_OHM / (2.0 * PI); // 60 Ω
    let two = sine_cosine_integrals(2.0 * kl);
    let four = sine_cosine_integrals(4.0 * kl);
    let (cin2, cin4) = (two.cin(2.0 * kl), four.cin(4.0 * kl));
    let (sin2, cos2) = (2.0 * kl).sin_cos();
    // R = 60 Cin 2kl + 30(2 Cin 2kl − Cin 4kl) cos 2kl + 30(Si 4kl − 2 Si 2kl) sin 2kl
    let r = unit * (cin2 + 0.5 * (2.0 * cin2 - cin4) * cos2 + 0.5 * (four.si - 2.0 * two.si) * sin2);
    // X = 60 Si 2kl + 30(Ci 4kl − ln kl − γ) sin 2kl − 30 Si 4kl cos 2kl
    let x = unit * (two.si + 0.5 * (four.ci - kl.ln() - EULER) * sin2 - 0.5 * four.si * cos2);
    SpaceTerms {
        space_ohm: Complex64::new(r, x),
        // M = 60(ln 2kl − Ci 2kl + γ − 1 + cos 2kl)
        m_ohm: unit * (cin2 - 1.0 + cos2),
        // N = 60(Si 2kl − sin 2kl)
        n_ohm: unit * (two.si - sin2),
    }
}

/// Input impedance of the centre-fed wire, Ω.
pub(super) fn input_impedance(terms: &SpaceTerms, characteristic_ohm: f64, kl: f64) -> Complex64 {
    let SpaceTerms { space_ohm: Complex64 { re: r, im: x }, m_ohm: m, n_ohm: n } = *terms;
    let (sin, cos) = kl.sin_cos();
    //         R sin kl + j[(X − N) sin kl − (K − M) cos kl]
    // Z = K · ─────────────────────────────────────────────
    //         (K + M) sin kl + (X + N) cos kl − jR cos kl
    let over = Complex64::new(r * sin, (x - n) * sin - (characteristic_ohm - m) * cos);
    let under = Complex64::new((characteristic_ohm + m) * sin + (x + n) * cos, -r * cos);
    characteristic_ohm * over / under
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::constants::SPEED_OF_LIGHT_M_PER_S;
    use crate::sinusoid::{CentreFedWire, self_impedance};

    /// R of the formula is the induced-EMF resistance, which comes here by another road.
    #[test]
    fn resistance_is_that_of_the_induced_emf_method() {
        for step in 1..200 {
            let kl = 0.1 * f64::from(step);
            let wire = CentreFedWire { half_length_m: kl, radius_m: 1e-7 };
            let unit_wave_number_hz = SPEED_OF_LIGHT_M_PER_S / (2.0 * PI);
            let expected_ohm = self_impedance(&wire, unit_wave_number_hz).re;
            let got_ohm = space_terms(kl).space_ohm.re;
            assert!((got_ohm / expected_ohm - 1.0).abs() < 1e-8, "kl = {kl}: {got_ohm} for {expected_ohm}");
        }
    }

    /// Near kl = π/2 the formula must give back R + j(X − N): the thin half wave.
    #[test]
    fn half_wave_of_vanishing_radius_shows_its_loop_impedance() {
        let kl = 0.5 * PI;
        let characteristic_ohm = mean_characteristic_impedance_ohm(1.0, 1e-300);
        let ohm = input_impedance(&space_terms(kl), characteristic_ohm, kl);
        // Source: the closed form with η0/4π; handbooks round it to 73.1 + j42.5 Ω. The rest falls as 1/K.
        assert!((ohm - Complex64::new(73.079, 42.515)).norm() < 0.2, "{ohm}");
    }
}
