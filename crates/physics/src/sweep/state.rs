//! The conversation: frequencies wanted, samples given, until the fit is good.

use super::error::SweepError;
use super::fit::Fit;
use super::range::SweepRange;
use super::sample::Sample;
use super::section::Section;

/// A sweep in the making.
///
/// ```
/// # use physics::sweep::{Sample, Sweep, SweepError, SweepRange};
/// # use nalgebra::{DMatrix, Complex};
/// # fn solve(frequency_hz: f64) -> Sample {
/// #     let y = |row: usize| Complex::new(1.0 + row as f64, 1e-7 * frequency_hz).inv();
/// #     let (admittance_s, currents_a_per_v) =
/// #         (DMatrix::from_element(1, 1, y(0)), DMatrix::from_fn(20, 1, |row, _| y(row)));
/// #     Sample { frequency_hz, admittance_s, currents_a_per_v }
/// # }
/// # fn main() -> Result<(), SweepError> {
/// let range = SweepRange { lowest_hz: 1.8e6, highest_hz: 30e6, half_waves: 8.0, tolerance: 1e-3 };
/// let mut sweep = Sweep::new(&range)?;
/// while !sweep.wanted_hz().is_empty() {
///     let samples: Vec<Sample> = sweep.wanted_hz().into_iter().map(solve).collect();
///     sweep.give(samples)?;
/// }
/// let fit = sweep.into_fit();
/// # assert!(fit.error() < 1e-3);
/// # Ok(())
/// # }
/// ```
#[derive(Clone, Debug)]
pub struct Sweep {
    tolerance: f64,
    sections: Vec<Section>,
}

impl Sweep {
    /// A sweep that begins with as many solutions as the range's half waves suggest.
    ///
    /// # Errors
    /// A figure of the range that is refused.
    pub fn new(range: &SweepRange) -> Result<Self, SweepError> {
        range.check()?;
        let sections = range.spans().into_iter();
        let sections = sections.map(|span| Section::new(span, span.first_count(range.tolerance))).collect();
        Ok(Self { tolerance: range.tolerance, sections })
    }

    /// A sweep that begins with the numbers of solutions that an earlier one over the same range of a similar
    /// structure took ([`Fit::solutions`]), so that one round is likely enough. Where they do not match the sections
    /// of the range they are left aside.
    ///
    /// # Errors
    /// A figure of the range that is refused.
    pub fn like(range: &SweepRange, solutions: &[usize]) -> Result<Self, SweepError> {
        let mut sweep = Self::new(range)?;
        if sweep.sections.len() == solutions.len() {
            let counts = sweep.sections.iter_mut().zip(solutions);
            counts.for_each(|(section, &count)| *section = Section::new(section.span, count));
        }
        Ok(sweep)
    }

    /// Frequencies at which solutions are wanted now, Hz; none once the sweep is done. All of them can be solved at
    /// the same time.
    #[must_use]
    pub fn wanted_hz(&self) -> Vec<f64> {
        self.sections.iter().flat_map(|section| section.wanted_hz.iter().copied()).collect()
    }

    /// Takes samples at wanted frequencies, in any order and in any portions. When a section has got all that it
    /// wanted it is fitted, and wants more or is done.
    ///
    /// # Errors
    /// A sample that is not wanted, has another shape than the ones before, or is not finite. Samples before it in the
    /// list are taken.
    pub fn give(&mut self, samples: impl IntoIterator<Item = Sample>) -> Result<(), SweepError> {
        for sample in samples {
            self.take(sample)?;
        }
        for section in &mut self.sections {
            section.fit(self.tolerance);
        }
        Ok(())
    }

    fn take(&mut self, mut sample: Sample) -> Result<(), SweepError> {
        sample.check()?;
        if let Some(other) = self.sections.iter().find_map(|section| section.samples.first()) {
            let shape = |sample: &Sample| sample.currents_a_per_v.shape();
            let ((unknowns, ports), (expected_unknowns, expected_ports)) = (shape(&sample), shape(other));
            if shape(&sample) != shape(other) {
                let frequency_hz = sample.frequency_hz;
                return Err(SweepError::Shape {
                    frequency_hz,
                    ports,
                    unknowns,
                    expected_ports,
                    expected_unknowns,
                });
            }
        }
        for section in &mut self.sections {
            match section.take(sample) {
                Ok(()) => return Ok(()),
                Err(back) => sample = back,
            }
        }
        Err(SweepError::NotWanted { frequency_hz: sample.frequency_hz })
    }

    /// The fit of a sweep that wants nothing more.
    ///
    /// Its [`Fit::error`] exceeds the tolerance if the samples could not be fitted with a reasonable number of them
    /// (they are then no smooth function of frequency).
    ///
    /// # Panics
    /// If solutions are still wanted.
    #[must_use]
    pub fn into_fit(self) -> Fit {
        assert!(self.wanted_hz().is_empty(), "the sweep still wants solutions");
        Fit::new(self.sections)
    }
}
