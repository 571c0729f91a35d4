//! What the earth is made of.

use num_complex::Complex64;

use super::error::{EarthError, within};
use crate::constants::VACUUM_PERMITTIVITY_F_PER_M;

/// A homogeneous, non-magnetic earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Soil {
    /// Relative permittivity εr: 1 (no earth) to 100.
    pub relative_permittivity: f64,
    /// Conductivity σ, S/m: 0 to 100.
    pub conductivity_s_per_m: f64,
}

impl Soil {
    /// Complex relative permittivity ε = εr − jσ/(ωε0).
    ///
    /// # Errors
    ///
    /// A figure outside its range; the frequency may be 0.1 to 300 MHz.
    pub fn complex_permittivity(&self, frequency_hz: f64) -> Result<Complex64, EarthError> {
        let permittivity =
            within("relative permittivity", self.relative_permittivity, 1.0..=100.0, "1 to 100")?;
        let conductivity =
            within("conductivity_s_per_m", self.conductivity_s_per_m, 0.0..=100.0, "0 to 100 S/m")?;
        let frequency_hz = within("frequency_hz", frequency_hz, 1e5..=3e8, "0.1 MHz to 300 MHz")?;
        // ε = εr − jσ/(ωε0)
        let omega = std::f64::consts::TAU * frequency_hz;
        Ok(Complex64::new(permittivity, -conductivity / (omega * VACUUM_PERMITTIVITY_F_PER_M)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn loss_is_the_ratio_of_conduction_to_displacement() {
        // σ/(ωε0) = 18·σ[mS/m]/f[MHz] within a tenth of a percent (common practice)
        let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
        let epsilon = soil.complex_permittivity(5e6).unwrap();
        assert!((epsilon.re - 13.0).abs() < 1e-12);
        assert!((epsilon.im + 18.0).abs() < 0.03, "{epsilon}");
    }

    #[test]
    fn refuses_what_is_no_soil() {
        let soil = |relative_permittivity, conductivity_s_per_m| Soil {
            relative_permittivity,
            conductivity_s_per_m,
        };
        for (bad, name) in [
            (soil(0.5, 0.0), "relative permittivity is 0.5"),
            (soil(f64::NAN, 0.0), "relative permittivity is NaN"),
            (soil(5.0, -1.0), "conductivity_s_per_m is -1"),
            (soil(5.0, f64::INFINITY), "conductivity_s_per_m is inf"),
        ] {
            let message = bad.complex_permittivity(7e6).unwrap_err().to_string();
            assert!(message.starts_with(name), "{message}");
        }
        assert!(soil(5.0, 0.0).complex_permittivity(0.0).is_err());
    }
}
