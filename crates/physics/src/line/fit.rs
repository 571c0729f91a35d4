//! The loss law k1·√f + k2·f and its fit to published attenuation.

use thiserror::Error;

/// Matched loss in dB per 100 m: k1·√f + k2·f with f in MHz.
///
/// The first term is the conductors' (skin depth falls with √f), the second the dielectric's. Common form
/// in data sheets; valid where the skin is thin against the conductors, for usual lines from about 1 MHz.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LossLaw {
    /// Conductor loss at 1 MHz, dB per 100 m.
    pub k1_db_per_100m: f64,
    /// Dielectric loss at 1 MHz, dB per 100 m.
    pub k2_db_per_100m: f64,
}

impl LossLaw {
    /// Matched loss at a frequency (Hz), dB/m.
    #[must_use]
    pub fn db_per_m(&self, frequency_hz: f64) -> f64 {
        let f_mhz = frequency_hz * 1e-6;
        (self.k1_db_per_100m * f_mhz.sqrt() + self.k2_db_per_100m * f_mhz) * 0.01
    }

    /// The dielectric's part of it, dB/m.
    #[must_use]
    pub fn dielectric_db_per_m(&self, frequency_hz: f64) -> f64 {
        self.k2_db_per_100m * frequency_hz * 1e-8
    }

    /// The law that fits published points best, in the sense of least squares of the **relative** errors:
    /// sheets round to a share of the value, and a plain sum of squares would forget the low frequencies.
    ///
    /// A coefficient that would come out negative is zero and the other is fitted alone.
    ///
    /// # Errors
    ///
    /// Fewer than two points, two points at one frequency only, or a figure that is not positive.
    pub fn fit(points: &[AttenuationPoint]) -> Result<Self, FitError> {
        // minimise Σ(k1·u + k2·v − 1)² with u = √f/a, v = f/a
        let (mut uu, mut uv, mut vv, mut u1, mut v1) = (0.0, 0.0, 0.0, 0.0, 0.0);
        for point in points {
            let f_mhz = point.frequency_hz * 1e-6;
            let a = point.attenuation_db_per_100m;
            if !(f_mhz > 0.0 && a > 0.0 && f_mhz.is_finite() && a.is_finite()) {
                return Err(FitError::NotPositive(*point));
            }
            let (u, v) = (f_mhz.sqrt() / a, f_mhz / a);
            uu += u * u;
            uv += u * v;
            vv += v * v;
            u1 += u;
            v1 += v;
        }
        let determinant = uu * vv - uv * uv;
        // By Cauchy and Schwarz the determinant is zero only where all frequencies are the same; rounding
        // leaves some 1e-16 of the product.
        if points.len() < 2 || determinant <= 1e-12 * uu * vv {
            return Err(FitError::TooFew(points.len()));
        }
        let (k1, k2) = ((u1 * vv - v1 * uv) / determinant, (v1 * uu - u1 * uv) / determinant);
        let (k1, k2) = match (k1 < 0.0, k2 < 0.0) {
            (true, _) => (0.0, v1 / vv),
            (_, true) => (u1 / uu, 0.0),
            _ => (k1, k2),
        };
        Ok(Self { k1_db_per_100m: k1, k2_db_per_100m: k2 })
    }
}

/// One published figure of attenuation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AttenuationPoint {
    /// Hz.
    pub frequency_hz: f64,
    /// Matched loss, dB per 100 m.
    pub attenuation_db_per_100m: f64,
}

/// Why a loss law cannot be fitted.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum FitError {
    /// Two coefficients need two frequencies.
    #[error("{0} point(s) do not fix a loss law; two different frequencies are needed")]
    TooFew(usize),
    /// A frequency or an attenuation that is not positive.
    #[error("{} Hz with {} dB per 100 m is no attenuation; both must be greater than zero",
        .0.frequency_hz, .0.attenuation_db_per_100m)]
    NotPositive(AttenuationPoint),
}
