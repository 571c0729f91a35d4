//! The feedpoint impedance of a straight wire, fed anywhere.

use num_complex::Complex64;

use super::error::{SketchError, in_range};
use super::image::{Image, ImageDirection, Mirror, WireOverImage};
use super::schelkunoff::{SpaceTerms, input_impedance, mean_characteristic_impedance_ohm, space_terms};
use crate::conductor::RoundWire;
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, wave_number_rad_per_m};

/// A straight wire with one feedpoint.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SketchWire {
    /// From the wire's beginning to the feedpoint, m.
    pub arm_a_m: f64,
    /// From the feedpoint to the wire's end, m.
    pub arm_b_m: f64,
    /// Radius of the metal, m.
    pub radius_m: f64,
    /// Velocity of the current wave relative to light: 1 for bare wire, less for insulated.
    pub velocity_factor: f64,
    /// Conductivity of the metal, S/m; infinity for a wire without loss.
    pub conductivity_s_per_m: f64,
    /// Factor on the resistance of a solid wire, for stranding: 1 for a solid wire.
    pub resistance_factor: f64,
    /// The wire's image in the earth; `None` in free space.
    pub image: Option<Image>,
}

/// Shortest arm in radii: below it K no longer outweighs its own correction.
const FEWEST_RADII: f64 = 50.0;
/// Thickest wire in wavelengths.
const LARGEST_RADIUS_WAVELENGTHS: f64 = 0.005;
/// Shortest arm in wavelengths: shorter ones are all capacitance, and their resistance is lost in rounding.
const SHORTEST_ARM_WAVELENGTHS: f64 = 0.002;

/// A wire that is in the sketch's range, ready to compute.
///
/// The impedance is Schelkunoff's for a cylindrical wire; a wire fed off its centre is the mean of two centre-fed
/// wires whose half lengths are its arms (each arm works against a copy of itself, so the pull of the arms on each
/// other is that of equal arms). Loss and image enter as resistances at the current loop. On an insulated wire the
/// current's phase follows the velocity factor, K falls with it (the cover raises the capacitance), and radiation falls
/// with its square (the moment of a wire of the same phase).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sketch {
    wire: SketchWire,
    /// Characteristic impedances of the arms, Ω.
    characteristic_ohm: [f64; 2],
}

/// Slow terms of the impedance, smooth over a band: interpolate them with [`super::BandTerms`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Terms {
    pub(super) frequency_hz: f64,
    pub(super) arms: [ArmTerms; 2],
}

/// Slow terms of one arm, Ω, image and loss included in `space`.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct ArmTerms {
    pub space: SpaceTerms,
    /// Loss resistance of the metal, at the current loop.
    pub loss_ohm: f64,
}

/// The feedpoint at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FeedpointAnswer {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// Impedance at the feedpoint, Ω; R > 0.
    pub impedance_ohm: Complex64,
    /// Share of the power at the feedpoint that the metal does not turn into heat, 0 to 1. What the earth takes of
    /// the rest is not in it.
    pub wire_efficiency: f64,
    /// Impedances of the centre-fed wires whose half lengths are arm a and arm b; their mean is `impedance_ohm`.
    pub(super) arm_impedance_ohm: [Complex64; 2],
}

impl Sketch {
    /// Checks the wire.
    ///
    /// # Errors
    /// Figures that are not finite, not positive or absurd; arms shorter than 50 radii.
    pub fn new(wire: SketchWire) -> Result<Self, SketchError> {
        check_figures(&wire)?;
        let arm_m = wire.arm_a_m.min(wire.arm_b_m);
        let largest_radius_m = arm_m / FEWEST_RADII;
        if wire.radius_m > largest_radius_m {
            return Err(SketchError::TooThick { radius_m: wire.radius_m, arm_m, largest_radius_m });
        }
        // √(L/C) with C raised by 1/VF².
        let characteristic_ohm = [wire.arm_a_m, wire.arm_b_m]
            .map(|arm_m| wire.velocity_factor * mean_characteristic_impedance_ohm(arm_m, wire.radius_m));
        Ok(Self { wire, characteristic_ohm })
    }

    /// The wire.
    #[must_use]
    pub fn wire(&self) -> &SketchWire {
        &self.wire
    }

    /// Length of the wire, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        self.wire.arm_a_m + self.wire.arm_b_m
    }

    /// The slow terms at a frequency from 0.1 to 100 MHz, exact.
    ///
    /// # Errors
    /// A frequency out of range; an arm shorter than 0.002 λ or a radius over 0.005 λ; a soil so near that its
    /// reflection coefficient would take more power than the wire radiates.
    pub fn terms(&self, frequency_hz: f64) -> Result<Terms, SketchError> {
        self.check_frequency(frequency_hz)?;
        let metal =
            RoundWire { radius_m: self.wire.radius_m, conductivity_s_per_m: self.wire.conductivity_s_per_m };
        let resistance_ohm_per_m = if metal.conductivity_s_per_m.is_finite() {
            self.wire.resistance_factor * metal.internal_impedance_ohm_per_m(frequency_hz).re
        } else {
            0.0
        };
        let a = self.arm_terms(self.wire.arm_a_m, resistance_ohm_per_m, frequency_hz)?;
        let b = if self.is_centre_fed() {
            a
        } else {
            self.arm_terms(self.wire.arm_b_m, resistance_ohm_per_m, frequency_hz)?
        };
        Ok(Terms { frequency_hz, arms: [a, b] })
    }

    /// The feedpoint for terms of this wire.
    #[must_use]
    pub fn answer(&self, terms: &Terms) -> FeedpointAnswer {
        let k = self.wave_number_on_wire(terms.frequency_hz);
        let arm = |index: usize, arm_m: f64| {
            let ArmTerms { space, loss_ohm } = &terms.arms[index];
            let ohm = input_impedance(space, self.characteristic_ohm[index], k * arm_m);
            // Re Z is proportional to the resistance at the loop, so the metal's share is the same there.
            (ohm, ohm.re * loss_ohm / space.space_ohm.re)
        };
        let (a_ohm, a_heat_ohm) = arm(0, self.wire.arm_a_m);
        let (b_ohm, b_heat_ohm) =
            if self.is_centre_fed() { (a_ohm, a_heat_ohm) } else { arm(1, self.wire.arm_b_m) };
        let both_ohm = a_ohm + b_ohm;
        FeedpointAnswer {
            frequency_hz: terms.frequency_hz,
            impedance_ohm: 0.5 * both_ohm,
            wire_efficiency: 1.0 - (a_heat_ohm + b_heat_ohm) / both_ohm.re,
            arm_impedance_ohm: [a_ohm, b_ohm],
        }
    }

    /// Terms and answer in one go, for single frequencies.
    ///
    /// # Errors
    /// As [`Sketch::terms`].
    pub fn at(&self, frequency_hz: f64) -> Result<FeedpointAnswer, SketchError> {
        Ok(self.answer(&self.terms(frequency_hz)?))
    }

    /// Phase of the current wave per metre of this wire, rad/m.
    pub(super) fn wave_number_on_wire(&self, frequency_hz: f64) -> f64 {
        wave_number_rad_per_m(frequency_hz) / self.wire.velocity_factor
    }

    /// Characteristic impedances of arm a and arm b, Ω.
    pub(super) fn characteristic_ohm(&self) -> [f64; 2] {
        self.characteristic_ohm
    }

    pub(super) fn is_centre_fed(&self) -> bool {
        self.wire.arm_a_m.total_cmp(&self.wire.arm_b_m).is_eq()
    }

    fn arm_terms(
        &self,
        arm_m: f64,
        resistance_ohm_per_m: f64,
        frequency_hz: f64,
    ) -> Result<ArmTerms, SketchError> {
        let wire = &self.wire;
        let kl = self.wave_number_on_wire(frequency_hz) * arm_m;
        let moment = wire.velocity_factor * wire.velocity_factor;
        let mut space = space_terms(kl);
        space.space_ohm.re *= moment;
        if let Some(image) = &wire.image {
            let clearance_m = match image.direction {
                ImageDirection::Horizontal => image.height_m,
                ImageDirection::Vertical => image.height_m - 0.5 * self.length_m(),
            };
            space.space_ohm += moment
                * image.impedance(&WireOverImage {
                    electrical_half_length_m: arm_m / wire.velocity_factor,
                    clearance_m,
                    radius_m: wire.radius_m,
                    frequency_hz,
                });
            if space.space_ohm.re <= 0.0 {
                return Err(SketchError::TooNearToEarth { frequency_hz, height_m: image.height_m });
            }
        }
        // ∫R'·sin² k(l − |z|) dz over both arms = R'·l·(1 − sin 2kl/2kl)
        let loss_ohm = resistance_ohm_per_m * arm_m * (1.0 - (2.0 * kl).sin() / (2.0 * kl));
        space.space_ohm.re += loss_ohm;
        Ok(ArmTerms { space, loss_ohm })
    }

    pub(super) fn check_frequency(&self, frequency_hz: f64) -> Result<(), SketchError> {
        in_range("frequency_hz", frequency_hz, 0.1e6..=100e6, "0.1 to 100 MHz")?;
        let wavelength_m = SPEED_OF_LIGHT_M_PER_S / frequency_hz;
        let arm_m = self.wire.arm_a_m.min(self.wire.arm_b_m);
        let shortest_arm_m = SHORTEST_ARM_WAVELENGTHS * wavelength_m;
        if arm_m < shortest_arm_m {
            return Err(SketchError::ArmTooShort { frequency_hz, arm_m, shortest_arm_m });
        }
        let largest_radius_m = LARGEST_RADIUS_WAVELENGTHS * wavelength_m;
        let radius_m = self.wire.radius_m;
        if radius_m > largest_radius_m {
            return Err(SketchError::TooThickForFrequency { frequency_hz, radius_m, largest_radius_m });
        }
        Ok(())
    }
}

fn check_figures(wire: &SketchWire) -> Result<(), SketchError> {
    const ARM: &str = "0.001 to 10 000 m";
    in_range("arm_a_m", wire.arm_a_m, 1e-3..=1e4, ARM)?;
    in_range("arm_b_m", wire.arm_b_m, 1e-3..=1e4, ARM)?;
    in_range("radius_m", wire.radius_m, 1e-6..=1.0, "0.000 001 to 1 m")?;
    in_range("velocity_factor", wire.velocity_factor, 0.5..=1.0, "0.5 to 1")?;
    in_range("conductivity_s_per_m", wire.conductivity_s_per_m, 1e3..=f64::INFINITY, "1000 S/m or more")?;
    in_range("resistance_factor", wire.resistance_factor, 0.1..=100.0, "0.1 to 100")?;
    let Some(image) = &wire.image else { return Ok(()) };
    let lowest_m = match image.direction {
        ImageDirection::Horizontal => image.height_m,
        ImageDirection::Vertical => image.height_m - 0.5 * (wire.arm_a_m + wire.arm_b_m),
    };
    let lowest = "a wire whose lowest point is 10 radii to 1000 km above the earth";
    in_range("height_m of the lowest point", lowest_m, 10.0 * wire.radius_m..=1e6, lowest)?;
    if let Mirror::Soil { relative_permittivity, conductivity_s_per_m } = image.mirror {
        in_range("relative_permittivity", relative_permittivity, 1.0..=1e3, "1 to 1000")?;
        in_range("soil conductivity_s_per_m", conductivity_s_per_m, 0.0..=1e9, "0 to 1e9 S/m")?;
    }
    Ok(())
}
