//! A direction and the far field in it.

use num_complex::Complex64;

use crate::constants::VACUUM_IMPEDANCE_OHM;

/// A direction in space.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Direction {
    /// Above the horizon, degrees, −90 to 90.
    pub elevation_deg: f64,
    /// From +x toward +y, degrees.
    pub azimuth_deg: f64,
}

/// Field at a large distance r, times r and without the phase e^(−jkr): V, peak phasors.
///
/// The phase refers to the origin of the coordinates.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct FarField {
    /// Component along rising polar angle (downward), V.
    pub theta_v: Complex64,
    /// Component along rising azimuth, V.
    pub phi_v: Complex64,
}

impl FarField {
    /// Radiated power per solid angle, W/sr.
    #[must_use]
    pub fn intensity_w_per_sr(&self) -> f64 {
        // U = (|E_θ|² + |E_φ|²)·r²/2η
        (self.theta_v.norm_sqr() + self.phi_v.norm_sqr()) / (2.0 * VACUUM_IMPEDANCE_OHM)
    }

    /// Gain over an isotropic radiator that is given `power_w`, dBi; −∞ in a null.
    ///
    /// With the power accepted at the feedpoint it is the gain, losses included; with the power radiated
    /// ([`super::radiated_power_w`]) it is the directivity.
    #[must_use]
    pub fn gain_dbi(&self, power_w: f64) -> f64 {
        // G = 4πU/P
        10.0 * (4.0 * std::f64::consts::PI * self.intensity_w_per_sr() / power_w).log10()
    }
}
