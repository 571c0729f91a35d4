//! How the far field swings.

use super::far::FarField;

/// The ellipse that the tip of the electric field draws, seen by someone toward whom the wave comes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Polarisation {
    /// Smaller over larger semi-axis: 0 for linear, 1 for circular.
    pub axial_ratio: f64,
    /// Angle of the larger axis over the horizontal, degrees, −90 to 90: 0 for horizontal, ±90 for vertical, positive
    /// where it rises toward growing azimuth. Without meaning for circular polarisation.
    pub tilt_deg: f64,
    /// Sense of rotation.
    pub sense: Sense,
}

/// Sense of rotation, by the IEEE definition (from memory): seen along the direction of travel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// Clockwise.
    RightHand,
    /// Counter-clockwise.
    LeftHand,
}

impl FarField {
    /// Polarisation of the wave; `None` in a null.
    #[must_use]
    pub fn polarisation(&self) -> Option<Polarisation> {
        // Stokes parameters of level (h = E_φ) and rising (v = −E_θ) components:
        // s₀ = |h|² + |v|²,  s₁ = |h|² − |v|²,  s₂ = 2·Re h·v*,  s₃ = 2·Im h·v*
        let (h, v) = (self.phi_v, -self.theta_v);
        let s0 = h.norm_sqr() + v.norm_sqr();
        if s0 <= 0.0 {
            return None;
        }
        let s1 = h.norm_sqr() - v.norm_sqr();
        let cross = h * v.conj();
        // sin 2χ = s₃/s₀,  tan 2τ = s₂/s₁
        let ellipticity = 0.5 * (2.0 * cross.im / s0).clamp(-1.0, 1.0).asin();
        let tilt_deg = 0.5 * (2.0 * cross.re).atan2(s1).to_degrees();
        // E_φ ahead of E_θ by a quarter turns from φ to θ, against the right hand whose thumb points along r̂ = θ̂ × φ̂;
        // Im h·v* is then negative.
        let sense = if ellipticity < 0.0 { Sense::LeftHand } else { Sense::RightHand };
        Some(Polarisation { axial_ratio: ellipticity.abs().tan(), tilt_deg, sense })
    }
}

#[cfg(test)]
mod tests {
    use num_complex::Complex64;

    use super::*;

    fn of(theta_v: Complex64, phi_v: Complex64) -> Polarisation {
        FarField { theta_v, phi_v }.polarisation().unwrap()
    }

    #[test]
    fn known_ellipses() {
        let (one, j) = (Complex64::ONE, Complex64::i());
        let level = of(Complex64::ZERO, one);
        assert!(level.axial_ratio < 1e-12 && level.tilt_deg.abs() < 1e-12);
        assert!((of(one, Complex64::ZERO).tilt_deg.abs() - 90.0).abs() < 1e-12);
        // Rising toward growing azimuth: up is −θ.
        assert!((of(-one, one).tilt_deg - 45.0).abs() < 1e-12);
        // E_φ = −j·E_θ lags: the field turns from θ to φ, which is right-handed about r.
        let right = of(one, -j);
        assert!((right.axial_ratio - 1.0).abs() < 1e-7 && right.sense == Sense::RightHand);
        assert_eq!(of(one, j).sense, Sense::LeftHand);
        let flat = of(0.5 * one, -j);
        assert!((flat.axial_ratio - 0.5).abs() < 1e-12 && flat.tilt_deg.abs() < 1e-12);
        assert!(FarField::default().polarisation().is_none());
    }
}
