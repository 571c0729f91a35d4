//! What an earth refuses, and why.

/// A soil, a frequency or a reach that the kernels cannot serve.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum EarthError {
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
}

/// The value, if it lies within the range (which infinity and NaN do not).
pub(super) fn within(
    quantity: &'static str,
    value: f64,
    range: std::ops::RangeInclusive<f64>,
    accepted: &'static str,
) -> Result<f64, EarthError> {
    if range.contains(&value) { Ok(value) } else { Err(EarthError::OutOfRange { quantity, value, accepted }) }
}
