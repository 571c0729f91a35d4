//! What to sweep, and where to begin.

use super::error::SweepError;

/// What to sweep.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SweepRange {
    /// Lowest frequency, Hz, > 0.
    pub lowest_hz: f64,
    /// Highest frequency, Hz.
    pub highest_hz: f64,
    /// Number of half waves that all wires together are long at the highest frequency: about the number of resonances
    /// in the range. It sets how many solutions are asked for at first, and where a long range is divided; a wrong
    /// number costs solutions, not accuracy.
    pub half_waves: f64,
    /// Largest relative error of any admittance and of the current, 1e-9 to 0.1. An admittance between two ports is
    /// judged against the geometric mean of their own.
    pub tolerance: f64,
}

/// Half waves of wire in one section: beyond about 20 one fit for all becomes dear.
const HALF_WAVES_PER_SECTION: f64 = 16.0;

/// A part of the range with a fit of its own.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Span {
    pub lowest_hz: f64,
    pub highest_hz: f64,
    /// Resonances expected inside.
    pub half_waves: f64,
}

impl SweepRange {
    pub(super) fn check(&self) -> Result<(), SweepError> {
        let refuse = |quantity, value, accepted| Err(SweepError::OutOfRange { quantity, value, accepted });
        if !(self.lowest_hz > 0.0 && self.lowest_hz < self.highest_hz) {
            return refuse("lowest frequency in Hz", self.lowest_hz, "above 0, below the highest frequency");
        }
        if !self.highest_hz.is_finite() {
            return refuse("highest frequency in Hz", self.highest_hz, "a finite frequency");
        }
        if !(0.0..=2000.0).contains(&self.half_waves) {
            return refuse("half waves of wire", self.half_waves, "0 to 2000");
        }
        if !(1e-9..=0.1).contains(&self.tolerance) {
            return refuse("tolerance of the sweep", self.tolerance, "1e-9 to 0.1");
        }
        Ok(())
    }

    /// The sections of the range.
    pub(super) fn spans(&self) -> Vec<Span> {
        let Self { lowest_hz, highest_hz, .. } = *self;
        // Resonances lie evenly in frequency, one per half wave.
        let inside = self.half_waves * (1.0 - lowest_hz / highest_hz);
        let count = (inside / HALF_WAVES_PER_SECTION).ceil().max(1.0);
        let step_hz = (highest_hz - lowest_hz) / count;
        (0..count as u32)
            .map(f64::from)
            .map(|index| Span {
                lowest_hz: lowest_hz + index * step_hz,
                highest_hz: if index + 1.0 < count {
                    lowest_hz + (index + 1.0) * step_hz
                } else {
                    highest_hz
                },
                half_waves: inside / count,
            })
            .collect()
    }
}

impl Span {
    /// Number of samples to begin with, for a relative error of `tolerance`: enough for a wire in free space fed off
    /// its centre. Symmetric wires could do with a third less; low ones over a mirror need more.
    pub fn first_count(&self, tolerance: f64) -> usize {
        let digits = -tolerance.log10();
        (1.5 * self.half_waves + 1.5 * digits + 2.5).ceil() as usize
    }

    /// Chebyshev points of the first kind, Hz.
    pub fn chebyshev_hz(&self, count: usize) -> Vec<f64> {
        let (middle, half) =
            (0.5 * (self.lowest_hz + self.highest_hz), 0.5 * (self.highest_hz - self.lowest_hz));
        (0..count)
            .map(|index| {
                let angle = std::f64::consts::PI * (index as f64 + 0.5) / count as f64;
                middle - half * angle.cos()
            })
            .collect()
    }
}
