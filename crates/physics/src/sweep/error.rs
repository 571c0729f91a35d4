//! What a sweep refuses, and why.

/// A range or a sample that the sweep cannot use.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum SweepError {
    /// A figure that is not finite or outside its range.
    #[error("{quantity} is {value}; accepted is {accepted}")]
    OutOfRange {
        /// Name of the figure, with its unit.
        quantity: &'static str,
        /// The figure given.
        value: f64,
        /// What would be accepted.
        accepted: &'static str,
    },
    /// A frequency outside the swept range.
    #[error("{frequency_hz} Hz is outside the sweep from {lowest_hz} to {highest_hz} Hz")]
    FrequencyOutOfRange {
        /// Frequency, Hz.
        frequency_hz: f64,
        /// Lowest frequency of the sweep, Hz.
        lowest_hz: f64,
        /// Highest frequency of the sweep, Hz.
        highest_hz: f64,
    },
    /// A sample that nobody asked for.
    #[error("the sweep wants no sample at {frequency_hz} Hz")]
    NotWanted {
        /// Frequency of the sample, Hz.
        frequency_hz: f64,
    },
    /// A sample of another shape than the ones before.
    #[error(
        "the sample at {frequency_hz} Hz has {ports} ports and {unknowns} currents, \
         the others {expected_ports} and {expected_unknowns}"
    )]
    Shape {
        /// Frequency of the sample, Hz.
        frequency_hz: f64,
        /// Its ports.
        ports: usize,
        /// Its currents per port.
        unknowns: usize,
        /// Ports of the samples before.
        expected_ports: usize,
        /// Currents per port of the samples before.
        expected_unknowns: usize,
    },
    /// A sample with too few currents.
    #[error(
        "the sample at {frequency_hz} Hz has {unknowns} currents per port; a sweep needs at least {fewest}"
    )]
    TooFewCurrents {
        /// Frequency of the sample, Hz.
        frequency_hz: f64,
        /// Its currents per port.
        unknowns: usize,
        /// Fewest accepted.
        fewest: usize,
    },
    /// A sample with a figure that is not a number, or with a port that takes no current.
    #[error("the sample at {frequency_hz} Hz has a figure that is not finite, or an admittance of zero")]
    NotUsable {
        /// Frequency of the sample, Hz.
        frequency_hz: f64,
    },
}
