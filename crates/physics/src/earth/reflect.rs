//! The earth as the solver meets it.

use super::dyad::coupling;
use super::error::EarthError;
use super::half_space::{HalfSpace, Reach};
use super::soil::Soil;
use super::spectrum::GroundKernels;
use crate::constants::wave_number_rad_per_m;
use crate::wire::{Element, Kernel, Reflection};

/// Sums of heights below this count as this, in 1/k0: a thousandth of a wavelength.
const LEAST_ZETA: f64 = 0.0063;

impl HalfSpace {
    /// Prepares an earth for wires whose ends may come down to it: heights below 0.0005 wavelengths count as that.
    ///
    /// # Errors
    /// As [`HalfSpace::new`].
    pub fn for_wires(soil: &Soil, frequency_hz: f64, reach: &Reach) -> Result<Self, EarthError> {
        let lowest_m = LEAST_ZETA / wave_number_rad_per_m(frequency_hz);
        let zeta_min_m = reach.zeta_min_m.max(lowest_m);
        let zeta_max_m = reach.zeta_max_m.max(zeta_min_m);
        Self::new(soil, frequency_hz, &Reach { zeta_min_m, zeta_max_m, ..*reach })
    }
}

impl Reflection for HalfSpace {
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
        let [x, y, z] = test.position_m;
        let apart = sources.iter().map(|source| (source.position_m[0] - x).hypot(source.position_m[1] - y));
        let rho_m: Vec<f64> = apart.collect();
        let lowest_m = LEAST_ZETA / self.wave_number_rad_per_m();
        let zeta_m: Vec<f64> =
            sources.iter().map(|source| (source.position_m[2] + z).max(lowest_m)).collect();
        let mut ground = vec![GroundKernels::default(); sources.len()];
        self.kernels(&rho_m, &zeta_m, &mut ground);
        for ((source, ground), kernel) in sources.iter().zip(&ground).zip(kernels) {
            *kernel = coupling(test, source, ground);
        }
    }
}
