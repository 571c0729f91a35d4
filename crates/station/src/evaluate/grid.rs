//! The frequencies at which a plan is evaluated.

use crate::plan::{Band, BandRange};

/// Steps across a band: 101 frequencies, both edges included.
const STEPS: u32 = 100;

/// The frequencies of one band, rising, Hz.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Grid {
    pub name: String,
    pub frequencies_hz: Vec<f64>,
    /// Index of the frequency nearest to the middle.
    pub middle: usize,
    pub kind: GridKind,
}

/// Whether what works at two neighbouring frequencies works between them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum GridKind {
    Continuous,
    Channels,
}

impl Grid {
    pub fn of_band(band: &Band) -> Self {
        match &band.range {
            BandRange::Span { low_hz, high_hz } => {
                let step = |n: u32| low_hz + (high_hz - low_hz) * f64::from(n) / f64::from(STEPS);
                Self::new(&band.name, (0..=STEPS).map(step).collect(), GridKind::Continuous)
            }
            BandRange::Channels { frequencies_hz } => {
                Self::of_frequencies(&band.name, frequencies_hz.clone())
            }
        }
    }

    pub fn of_frequencies(name: &str, frequencies_hz: Vec<f64>) -> Self {
        Self::new(name, frequencies_hz, GridKind::Channels)
    }

    fn new(name: &str, mut frequencies_hz: Vec<f64>, kind: GridKind) -> Self {
        frequencies_hz.sort_by(f64::total_cmp);
        frequencies_hz.dedup();
        let centre = 0.5 * (frequencies_hz[0] + frequencies_hz[frequencies_hz.len() - 1]);
        let off = |index: &usize| (frequencies_hz[*index] - centre).abs();
        let middle = (0..frequencies_hz.len()).min_by(|a, b| off(a).total_cmp(&off(b))).unwrap_or(0);
        Self { name: name.to_owned(), frequencies_hz, middle, kind }
    }

    pub fn low_hz(&self) -> f64 {
        self.frequencies_hz[0]
    }

    pub fn high_hz(&self) -> f64 {
        self.frequencies_hz[self.frequencies_hz.len() - 1]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn channels_are_sorted_and_the_middle_is_one_of_them() {
        let grid = Grid::of_frequencies("net", vec![7.1e6, 3.6e6, 5.2e6, 5.2e6]);
        assert_eq!(grid.frequencies_hz, vec![3.6e6, 5.2e6, 7.1e6]);
        assert_eq!(grid.middle, 1);
    }

    #[test]
    fn a_span_has_both_edges() {
        let band = Band { name: "40 m".to_owned(), range: BandRange::Span { low_hz: 7.0e6, high_hz: 7.2e6 } };
        let grid = Grid::of_band(&band);
        assert_eq!(grid.frequencies_hz.len(), 101);
        assert!((grid.low_hz() - 7.0e6).abs() < 1e-6 && (grid.high_hz() - 7.2e6).abs() < 1e-6);
        assert_eq!(grid.middle, 50);
    }
}
