//! Insulators: at which voltage they flash over, in rain and at height.

use thiserror::Error;

/// An insulator between a wire and its rope.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Insulator {
    /// Peak voltage at which it flashes over, dry and clean, at sea level, V.
    pub dry_flashover_peak_v: f64,
    /// Share of it that is left in rain, over 0, at most 1.
    pub wet_share: f64,
    /// Share of the flashover voltage that one uses at HF, over 0, at most 1: heating and corona come first.
    pub working_share: f64,
}

/// What lies on an insulator.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Surface {
    /// Dry and clean.
    Dry,
    /// In rain.
    Wet,
}

/// Why an insulator has no figure.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
#[error("{quantity} is {value}; it must be {accepted}")]
pub struct InsulatorError {
    /// The quantity with its unit.
    pub quantity: &'static str,
    /// Its value.
    pub value: f64,
    /// What would be accepted.
    pub accepted: &'static str,
}

/// Scale height of the air's density in the standards of insulation, m.
const SCALE_HEIGHT_M: f64 = 8150.0;

/// Highest site for which the derating is stated, m.
pub const HIGHEST_SITE_M: f64 = 4000.0;

/// Share of the sea-level flashover voltage that is left at a height above the sea, m.
///
/// Flashover follows the density of the air: exp(−H/8150 m), the altitude factor of IEC 60071-2 with its exponent
/// 1 (from memory). Valid from 400 m below the sea to 4000 m above it.
///
/// # Errors
///
/// A height outside that range.
pub fn altitude_share(altitude_m: f64) -> Result<f64, InsulatorError> {
    if !(-400.0..=HIGHEST_SITE_M).contains(&altitude_m) {
        return Err(InsulatorError {
            quantity: "the site's height above the sea in metres",
            value: altitude_m,
            accepted: "from -400 to 4000",
        });
    }
    // k = exp(−H/8150 m)
    Ok((-altitude_m / SCALE_HEIGHT_M).exp())
}

impl Insulator {
    /// Whether the figures make an insulator.
    ///
    /// # Errors
    ///
    /// A voltage that is not greater than zero, a share outside 0 to 1.
    pub fn check(&self) -> Result<(), InsulatorError> {
        let refuse = |quantity, value, accepted| Err(InsulatorError { quantity, value, accepted });
        if !(self.dry_flashover_peak_v > 0.0 && self.dry_flashover_peak_v.is_finite()) {
            return refuse(
                "the dry flashover voltage in volts",
                self.dry_flashover_peak_v,
                "greater than zero",
            );
        }
        let shares =
            [("the share left in rain", self.wet_share), ("the share used at HF", self.working_share)];
        match shares.into_iter().find(|&(_, share)| !(share > 0.0 && share <= 1.0)) {
            Some((quantity, value)) => refuse(quantity, value, "greater than 0 and at most 1"),
            None => Ok(()),
        }
    }

    /// Peak voltage at which it flashes over, V.
    ///
    /// # Errors
    ///
    /// As [`Self::check`] and [`altitude_share`].
    pub fn flashover_peak_v(&self, surface: Surface, altitude_m: f64) -> Result<f64, InsulatorError> {
        self.check()?;
        let share = match surface {
            Surface::Dry => 1.0,
            Surface::Wet => self.wet_share,
        };
        Ok(self.dry_flashover_peak_v * share * altitude_share(altitude_m)?)
    }

    /// Peak voltage that one puts on it, V.
    ///
    /// # Errors
    ///
    /// As [`Self::flashover_peak_v`].
    pub fn working_peak_v(&self, surface: Surface, altitude_m: f64) -> Result<f64, InsulatorError> {
        Ok(self.working_share * self.flashover_peak_v(surface, altitude_m)?)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const EGG: Insulator = Insulator { dry_flashover_peak_v: 35e3, wet_share: 0.5, working_share: 0.3 };

    #[test]
    fn thin_air_and_rain_take_their_share() {
        assert!((altitude_share(0.0).unwrap() - 1.0).abs() < 1e-12);
        // IEC 60071-2 from memory: 1.13 at 1000 m, 1.28 at 2000 m
        assert!((altitude_share(1000.0).unwrap().recip() - 1.13).abs() < 5e-3);
        assert!((altitude_share(2000.0).unwrap().recip() - 1.28).abs() < 5e-3);
        let volts = |surface, altitude_m| EGG.flashover_peak_v(surface, altitude_m).unwrap();
        assert!((volts(Surface::Wet, 1500.0) / volts(Surface::Dry, 1500.0) - 0.5).abs() < 1e-12);
        assert!(volts(Surface::Dry, 1500.0) < volts(Surface::Dry, 0.0));
        let working = EGG.working_peak_v(Surface::Dry, 0.0).unwrap();
        assert!((working - 10.5e3).abs() < 1e-9);
    }

    #[test]
    fn what_makes_no_insulator_is_refused_in_words() {
        let text = EGG.flashover_peak_v(Surface::Dry, 9000.0).unwrap_err().to_string();
        assert_eq!(text, "the site's height above the sea in metres is 9000; it must be from -400 to 4000");
        let text = Insulator { wet_share: 1.5, ..EGG }.check().unwrap_err().to_string();
        assert_eq!(text, "the share left in rain is 1.5; it must be greater than 0 and at most 1");
        assert!(Insulator { dry_flashover_peak_v: 0.0, ..EGG }.check().is_err());
        assert!(altitude_share(f64::NAN).is_err());
    }
}
