//! What the charge makes at a wire's surface.

use std::f64::consts::PI;

use num_complex::Complex64;

use crate::constants::VACUUM_PERMITTIVITY_F_PER_M;

/// Radial electric field at the surface of a wire, V/m peak, from its charge per metre
/// ([`crate::wire::EndCurrents::charge_c_per_m`]): what corona is judged by.
///
/// Even charge round the wire is assumed; at an open end the true field is higher.
#[must_use]
pub fn surface_field_v_per_m(charge_c_per_m: Complex64, radius_m: f64) -> Complex64 {
    // E = q/(2πε₀a)
    charge_c_per_m / (2.0 * PI * VACUUM_PERMITTIVITY_F_PER_M * radius_m)
}
