//! One solution, as the sweep takes and gives it.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::error::SweepError;

/// Solution at one frequency.
#[derive(Clone, Debug, PartialEq)]
pub struct Sample {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// Admittances between the ports, S.
    pub admittance_s: DMatrix<Complex64>,
    /// Currents (rows) per volt at each port (columns), A/V: those at eight or more places of the wires, the same at all
    /// frequencies, the more the better.
    pub currents_a_per_v: DMatrix<Complex64>,
}

impl From<crate::wire::Solution> for Sample {
    fn from(solution: crate::wire::Solution) -> Self {
        Self {
            frequency_hz: solution.frequency_hz,
            admittance_s: solution.port_admittance_s,
            currents_a_per_v: solution.coefficients_a_per_v,
        }
    }
}

/// Fewest currents per port. The admittances alone would fix the weights too, but two interpolants through the same
/// samples would then be one and the same, and their disagreement no measure of error.
const FEWEST_CURRENTS: usize = 8;

impl Sample {
    /// Refuses what cannot be fitted.
    pub(super) fn check(&self) -> Result<(), SweepError> {
        let frequency_hz = self.frequency_hz;
        let ports = self.admittance_s.nrows();
        let [columns, current_columns] = [self.admittance_s.ncols(), self.currents_a_per_v.ncols()];
        if ports == 0 || columns != ports || current_columns != ports {
            return Err(SweepError::Shape {
                frequency_hz,
                ports: current_columns,
                unknowns: self.currents_a_per_v.nrows(),
                expected_ports: ports.max(1),
                expected_unknowns: self.currents_a_per_v.nrows(),
            });
        }
        let unknowns = self.currents_a_per_v.nrows();
        if unknowns < FEWEST_CURRENTS {
            return Err(SweepError::TooFewCurrents { frequency_hz, unknowns, fewest: FEWEST_CURRENTS });
        }
        let mut figures = self.admittance_s.iter().chain(self.currents_a_per_v.iter());
        let driven = (0..ports).all(|port| self.admittance_s[(port, port)].norm() > 0.0);
        if driven && figures.all(|figure| figure.re.is_finite() && figure.im.is_finite()) {
            Ok(())
        } else {
            Err(SweepError::NotUsable { frequency_hz })
        }
    }
}

/// What the weights are made of: the admittances, and mixtures of the currents.
///
/// A mixture is a sum of all currents of a column with signs that have no pattern, so that no current is overlooked
/// (a random projection; it keeps relative errors to about the root of the number of mixtures).
#[derive(Clone, Debug)]
pub(super) struct Components {
    /// Relative to the geometric mean of the two ports' own admittances.
    pub admittances: Vec<Complex64>,
    /// By column, relative to the root of the summed squares of the column's mixtures.
    pub mixtures: Vec<Vec<Complex64>>,
    /// Sizes that the figures are relative to.
    pub admittance_scale_s: Vec<f64>,
    /// The same for each column of mixtures.
    pub mixture_scale: Vec<f64>,
}

impl Components {
    /// `mixtures_per_port` is the number of mixtures of each column.
    pub fn new(sample: &Sample, mixtures_per_port: usize) -> Self {
        let y = &sample.admittance_s;
        let ports = y.nrows();
        let own: Vec<f64> = (0..ports).map(|port| y[(port, port)].norm().sqrt()).collect();
        let admittance_scale_s: Vec<f64> =
            (0..ports * ports).map(|index| own[index % ports] * own[index / ports]).collect();
        let (mixtures, mixture_scale) = (0..ports)
            .map(|port| {
                let column = sample.currents_a_per_v.column(port);
                let mixed: Vec<Complex64> =
                    (0..mixtures_per_port).map(|mixture| mix(column.as_slice(), mixture)).collect();
                let size = mixed.iter().map(Complex64::norm_sqr).sum::<f64>().sqrt();
                (mixed, size.max(f64::MIN_POSITIVE))
            })
            .unzip();
        Self { admittances: y.as_slice().to_vec(), mixtures, admittance_scale_s, mixture_scale }
    }

    /// All figures with their scales.
    pub fn scaled(&self) -> impl Iterator<Item = (Complex64, f64)> + '_ {
        let admittances = self.admittances.iter().copied().zip(self.admittance_scale_s.iter().copied());
        let mixtures = self
            .mixtures
            .iter()
            .zip(&self.mixture_scale)
            .flat_map(|(column, &scale)| column.iter().map(move |&mixture| (mixture, scale)));
        admittances.chain(mixtures)
    }
}

/// Sum of the currents with signs from a fixed sequence without pattern.
fn mix(currents: &[Complex64], mixture: usize) -> Complex64 {
    let mut sum = Complex64::ZERO;
    for (block, currents) in currents.chunks(64).enumerate() {
        let signs = scramble(((mixture as u64) << 32) + block as u64);
        for (index, current) in currents.iter().enumerate() {
            // The sign bit is flipped rather than a branch taken, which could not be predicted.
            let flip = (signs >> index) << 63;
            sum.re += f64::from_bits(current.re.to_bits() ^ flip);
            sum.im += f64::from_bits(current.im.to_bits() ^ flip);
        }
    }
    sum
}

/// SplitMix64 (Steele, Lea & Flood 2014, from memory): 64 bits without pattern from a counter.
fn scramble(counter: u64) -> u64 {
    let mut z = counter.wrapping_add(1).wrapping_mul(0x9e37_79b9_7f4a_7c15);
    z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    z ^ (z >> 31)
}
