//! Constants of nature and of the reference conductor.
//!
//! Source: CODATA 2018 recommended values (from memory; the 2022 adjustment differs in the tenth digit of µ0 only);
//! copper from IEC 60028.

/// Speed of light in vacuum, m/s (exact).
pub const SPEED_OF_LIGHT_M_PER_S: f64 = 299_792_458.0;

/// Permeability of vacuum µ0, H/m.
pub const VACUUM_PERMEABILITY_H_PER_M: f64 = 1.256_637_062_12e-6;

/// Permittivity of vacuum ε0, F/m.
pub const VACUUM_PERMITTIVITY_F_PER_M: f64 = 8.854_187_812_8e-12;

/// Wave impedance of vacuum η0 = µ0·c, Ω. Books that write 120π for it print impedances larger by 0.07 %.
pub const VACUUM_IMPEDANCE_OHM: f64 = 376.730_313_668;

/// Conductivity of annealed copper at 20 °C, S/m (IEC 60028: 1.7241e-8 Ω·m, 100 % IACS).
pub const COPPER_CONDUCTIVITY_S_PER_M: f64 = 58.0e6;

/// Wave number in vacuum, rad/m.
#[must_use]
pub fn wave_number_rad_per_m(frequency_hz: f64) -> f64 {
    // k = 2πf/c
    std::f64::consts::TAU * frequency_hz / SPEED_OF_LIGHT_M_PER_S
}
