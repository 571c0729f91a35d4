//! Reflection of plane waves, for the far field.

use num_complex::Complex64;

/// Reflection coefficients of a plane wave that meets the earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fresnel {
    /// Of the level field (TE, horizontal polarisation): −1 over a perfect ground.
    pub level: Complex64,
    /// Of the rising field (TM, vertical polarisation), as of the magnetic field or of the vertical electric field: +1
    /// over a perfect ground.
    pub rising: Complex64,
}

/// Fresnel's coefficients of a half-space of complex relative permittivity ε = εr − jσ/(ωε0), for a wave that rises from
/// it at an angle with the given sine, 0 to 1.
///
/// Source: any textbook of electromagnetics (from memory); in terms of [`super`], Gh and −Ge at λ = cos(elevation).
#[must_use]
pub fn fresnel(epsilon: Complex64, sine_of_elevation: f64) -> Fresnel {
    let sine = sine_of_elevation;
    // √(ε − cos² ψ), which decays downward: Im ≤ 0
    let below = (epsilon - (1.0 - sine * sine)).sqrt();
    let below = if below.im > 0.0 { -below } else { below };
    if sine <= 0.0 && below.norm_sqr() <= 0.0 {
        // No earth, along it
        return Fresnel { level: Complex64::ZERO, rising: Complex64::ZERO };
    }
    // level = (sin ψ − √(ε − cos² ψ))/(sin ψ + √(ε − cos² ψ)),  rising = (ε·sin ψ − √…)/(ε·sin ψ + √…)
    Fresnel {
        level: (sine - below) / (sine + below),
        rising: (epsilon * sine - below) / (epsilon * sine + below),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn near(a: Complex64, b: impl Into<Complex64>, tolerance: f64) {
        let b = b.into();
        assert!((a - b).norm() < tolerance, "{a} for {b}");
    }

    #[test]
    fn perfect_ground_turns_the_level_field_and_keeps_the_rising_one() {
        for sine in [0.01, 0.3, 0.8, 1.0] {
            let got = fresnel(Complex64::new(1.0, -1e14), sine);
            near(got.level, -1.0, 1e-4);
            near(got.rising, 1.0, 1e-4);
        }
    }

    #[test]
    fn no_earth_gives_nothing_back() {
        for sine in [0.0, 0.01, 0.3, 1.0] {
            // 1 − (1 − sin² ψ) rounds to 1e-16, of which a root and a quotient are taken.
            let got = fresnel(Complex64::ONE, sine);
            near(got.level, 0.0, 1e-12);
            near(got.rising, 0.0, 1e-12);
        }
    }

    #[test]
    fn overhead_both_are_the_mismatch_of_wave_impedances() {
        // (1 − n)/(1 + n): the two differ only in which way the field is counted
        let epsilon = Complex64::new(13.0, -12.0);
        let n = epsilon.sqrt();
        let got = fresnel(epsilon, 1.0);
        near(got.level, (1.0 - n) / (1.0 + n), 1e-15);
        near(got.rising, (n - 1.0) / (1.0 + n), 1e-15);
    }

    #[test]
    fn along_the_earth_both_are_minus_one() {
        let got = fresnel(Complex64::new(13.0, -12.0), 0.0);
        near(got.level, -1.0, 1e-15);
        near(got.rising, -1.0, 1e-15);
    }

    #[test]
    fn brewster_angle_of_a_dielectric() {
        // tan of the angle from the vertical is √ε: no rising field comes back
        for epsilon in [3.0_f64, 10.0, 80.0] {
            let sine = (1.0 + epsilon).sqrt().recip();
            near(fresnel(epsilon.into(), sine).rising, 0.0, 1e-15);
            // Over a lossy earth it only dips there (pseudo-Brewster angle).
            let lossy = |sine| fresnel(Complex64::new(epsilon, -0.3 * epsilon), sine).rising.norm();
            assert!(lossy(sine) > 0.02);
            assert!(lossy(sine) < lossy(0.3 * sine) && lossy(sine) < lossy(3.0 * sine.min(0.33)));
        }
    }
}
