//! The answer at every frequency.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::bary::Bary;
use super::error::SweepError;
use super::sample::Sample;
use super::section::Section;

/// A finished sweep: admittances and currents at any frequency of its range.
#[derive(Clone, Debug)]
pub struct Fit {
    /// In the order of their frequencies, without gaps.
    pieces: Vec<Piece>,
}

#[derive(Clone, Debug)]
struct Piece {
    lowest_hz: f64,
    highest_hz: f64,
    samples: Vec<Sample>,
    bary: Bary,
    error: f64,
}

impl Fit {
    pub(super) fn new(sections: Vec<Section>) -> Self {
        let piece = |section: Section| {
            let Section { span, samples, bary, error, .. } = section;
            bary.map(|bary| Piece {
                lowest_hz: span.lowest_hz,
                highest_hz: span.highest_hz,
                samples,
                bary,
                error,
            })
        };
        Self { pieces: sections.into_iter().filter_map(piece).collect() }
    }

    /// Estimated largest relative error of any admittance and of the current, anywhere in the range. An admittance
    /// between two ports is judged against the geometric mean of their own, the current against its root mean square.
    ///
    /// An estimate, no bound: usually several times the true error, in one sweep of forty below it.
    #[must_use]
    pub fn error(&self) -> f64 {
        self.pieces.iter().map(|piece| piece.error).fold(0.0, f64::max)
    }

    /// Number of solutions that each section of the range took.
    #[must_use]
    pub fn solutions(&self) -> Vec<usize> {
        self.pieces.iter().map(|piece| piece.samples.len()).collect()
    }

    /// Admittances and currents at one frequency.
    ///
    /// # Errors
    /// A frequency outside the range.
    pub fn sample(&self, frequency_hz: f64) -> Result<Sample, SweepError> {
        let piece = self.piece(frequency_hz)?;
        let blend = piece.bary.blend(frequency_hz);
        let matrix = |of: fn(&Sample) -> &DMatrix<Complex64>| {
            piece.bary.matrix(frequency_hz, &blend, |sample| of(&piece.samples[sample]))
        };
        Ok(Sample {
            frequency_hz,
            admittance_s: matrix(|sample| &sample.admittance_s),
            currents_a_per_v: matrix(|sample| &sample.currents_a_per_v),
        })
    }

    /// Admittances at many frequencies; ascending ones are fastest.
    ///
    /// # Errors
    /// A frequency outside the range.
    pub fn admittances(&self, frequencies_hz: &[f64]) -> Result<Admittances, SweepError> {
        let ports = self.pieces.first().map_or(0, |piece| piece.samples[0].admittance_s.nrows());
        let mut entries = vec![Vec::with_capacity(frequencies_hz.len()); ports * ports];
        let mut rest = frequencies_hz;
        while let Some(&first_hz) = rest.first() {
            let piece = self.piece(first_hz)?;
            let count = rest.iter().take_while(|&&frequency_hz| piece.holds(frequency_hz)).count();
            let (here, after) = rest.split_at(count);
            let at_nodes: Vec<Vec<Complex64>> = (0..ports * ports)
                .map(|entry| {
                    let support = piece.bary.support.iter();
                    support.map(|&sample| piece.samples[sample].admittance_s[entry]).collect()
                })
                .collect();
            for (entry, values) in entries.iter_mut().zip(piece.bary.values(here, &at_nodes)) {
                entry.extend(values);
            }
            rest = after;
        }
        Ok(Admittances { ports, entries })
    }

    fn piece(&self, frequency_hz: f64) -> Result<&Piece, SweepError> {
        self.pieces.iter().find(|piece| piece.holds(frequency_hz)).ok_or_else(|| {
            let lowest_hz = self.pieces.first().map_or(0.0, |piece| piece.lowest_hz);
            let highest_hz = self.pieces.last().map_or(0.0, |piece| piece.highest_hz);
            SweepError::FrequencyOutOfRange { frequency_hz, lowest_hz, highest_hz }
        })
    }
}

impl Piece {
    /// Its ends belong to it, with a little rounding.
    fn holds(&self, frequency_hz: f64) -> bool {
        (self.lowest_hz * (1.0 - 1e-12)..=self.highest_hz * (1.0 + 1e-12)).contains(&frequency_hz)
    }
}

/// Admittances between the ports at many frequencies, S.
#[derive(Clone, Debug, PartialEq)]
pub struct Admittances {
    ports: usize,
    /// Column by column, each over the frequencies.
    entries: Vec<Vec<Complex64>>,
}

impl Admittances {
    /// One admittance over the frequencies, S: current into port `row` per volt at port `column`.
    #[must_use]
    pub fn entry_s(&self, row: usize, column: usize) -> &[Complex64] {
        &self.entries[column * self.ports + row]
    }

    /// All admittances at the frequency of this index, S.
    #[must_use]
    pub fn matrix_s(&self, index: usize) -> DMatrix<Complex64> {
        DMatrix::from_fn(self.ports, self.ports, |row, column| self.entry_s(row, column)[index])
    }
}
