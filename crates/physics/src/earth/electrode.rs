//! What the earth under an electrode opposes to a current that enters it; approximate.

use num_complex::Complex64;

use super::error::EarthError;
use super::soil::Soil;
use crate::constants::{VACUUM_PERMITTIVITY_F_PER_M, wave_number_rad_per_m};

/// A connection of a wire to the earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Electrode {
    /// A stake driven straight down.
    Stake {
        /// Length in the earth, m, > 0.
        length_m: f64,
        /// Radius, m, > 0.
        radius_m: f64,
    },
    /// A few bare wires laid on the earth as a star.
    Radials {
        /// How many, 1 or more.
        count: u32,
        /// Length of each, m, > 0.
        length_m: f64,
        /// Radius of the wire, m, > 0.
        radius_m: f64,
    },
    /// A stated impedance, Ω, the same on all frequencies.
    Stated(Complex64),
}

impl Electrode {
    /// Impedance of the connection, Ω.
    ///
    /// An approximation, to be labelled so: homogeneous soil, an electrode that is thin against its length. A stake is
    /// taken as in a static field with the conductivity σ + jωε₀εr (Dwight 1936, from memory), right while it is short
    /// against the wavelength in the soil. Radials are open lines in the mean of air and soil, with the spreading
    /// resistance of a star as their low-frequency limit (Sunde, from memory). What the current in the electrode radiates,
    /// and how it changes the field of the wire above, is left out.
    ///
    /// # Errors
    /// A soil or frequency outside its range.
    pub fn impedance_ohm(&self, soil: &Soil, frequency_hz: f64) -> Result<Complex64, EarthError> {
        let epsilon = soil.complex_permittivity(frequency_hz)?;
        Ok(match *self {
            Self::Stated(ohm) => ohm,
            Self::Stake { length_m, radius_m } => {
                // Z = [ln(4L/a) − 1]/(2π(σ + jωε₀εr)L)
                let omega = std::f64::consts::TAU * frequency_hz;
                let admittivity = Complex64::new(0.0, omega * VACUUM_PERMITTIVITY_F_PER_M) * epsilon;
                let spread = (4.0 * length_m / radius_m).ln() - 1.0;
                spread / (std::f64::consts::TAU * length_m * admittivity)
            }
            Self::Radials { count, length_m, radius_m } => {
                // Z = 60Λ/√ε̄·coth(jk₀√ε̄·l)/n,  ε̄ = (ε + 1)/2,  Λ = ln(√2·l/a) − 1 + N(n)
                let mean = (0.5 * (epsilon + 1.0)).sqrt();
                let phase = Complex64::new(0.0, wave_number_rad_per_m(frequency_hz) * length_m) * mean;
                let spread = (std::f64::consts::SQRT_2 * length_m / radius_m).ln() - 1.0 + crowding(count);
                60.0 * spread / (mean * phase.tanh() * f64::from(count))
            }
        })
    }
}

/// What the other radials of a star add to the spreading of one: N = Σ ln[(1 + sin πm/n)/sin πm/n].
fn crowding(count: u32) -> f64 {
    (1..count)
        .map(|m| {
            let sine = (std::f64::consts::PI * f64::from(m) / f64::from(count)).sin();
            ((1.0 + sine) / sine).ln()
        })
        .sum()
}

#[cfg(test)]
mod tests {
    use super::*;

    const CLAY: Soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.01 };

    #[test]
    fn a_stake_of_the_trade_has_the_resistance_of_the_trade() {
        // 2.4 m of 16 mm in 100 Ω·m: about 40 Ω (common practice); with L = 2.4 m, a = 8 mm the formula gives
        // 100/(2π·2.4)·(ln 1200 − 1) = 40.4 Ω
        let stake = Electrode::Stake { length_m: 2.4, radius_m: 0.008 };
        let z = stake.impedance_ohm(&CLAY, 1e5).unwrap();
        assert!((z.norm() - 40.4).abs() < 0.3, "{z}");
        // On short waves displacement current helps.
        let z = stake.impedance_ohm(&CLAY, 30e6).unwrap();
        assert!(z.re > 0.0 && z.im < 0.0 && z.norm() < 25.0, "{z}");
    }

    #[test]
    fn short_radials_spread_like_a_star() {
        // n·π·σ·l·R = ln(√2·l/a) − 1 + N(n), which for one wire on the surface is Sunde's with its depth as its radius
        for count in [1, 2, 4, 8] {
            let star = Electrode::Radials { count, length_m: 3.0, radius_m: 1e-3 };
            let z = star.impedance_ohm(&CLAY, 1e5).unwrap();
            let spread = (std::f64::consts::SQRT_2 * 3000.0).ln() - 1.0 + crowding(count);
            let expected = spread / (f64::from(count) * std::f64::consts::PI * 0.01 * 3.0);
            assert!((z.re / expected - 1.0).abs() < 0.03, "{count}: {z} for {expected}");
        }
        // Two radials in line crowd each other least: ln 2.
        assert!((crowding(2) - 2_f64.ln()).abs() < 1e-12);
    }

    #[test]
    fn every_electrode_takes_power() {
        for frequency_hz in [1.8e6, 7e6, 28e6, 54e6] {
            for soil in [CLAY, Soil { relative_permittivity: 81.0, conductivity_s_per_m: 5.0 }] {
                for electrode in [
                    Electrode::Stake { length_m: 1.5, radius_m: 0.008 },
                    Electrode::Radials { count: 4, length_m: 10.0, radius_m: 1e-3 },
                ] {
                    let z = electrode.impedance_ohm(&soil, frequency_hz).unwrap();
                    assert!(z.re > 0.0, "{electrode:?} at {frequency_hz} Hz: {z}");
                }
            }
        }
    }
}
