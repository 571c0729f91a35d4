//! A figure that makes no part.

use thiserror::Error;

/// Why a figure makes no part of a network.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
#[error("{quantity} is {value}; it must be {accepted}")]
pub struct PartError {
    /// The quantity with its unit.
    pub quantity: &'static str,
    /// Its value.
    pub value: f64,
    /// What would be accepted.
    pub accepted: &'static str,
}

/// Refuses what is not positive and finite.
pub(super) fn positive(quantity: &'static str, value: f64) -> Result<(), PartError> {
    if value > 0.0 && value.is_finite() {
        Ok(())
    } else {
        Err(PartError { quantity, value, accepted: "greater than zero" })
    }
}

/// Refuses what is negative or not finite.
pub(super) fn not_negative(quantity: &'static str, value: f64) -> Result<(), PartError> {
    if value >= 0.0 && value.is_finite() {
        Ok(())
    } else {
        Err(PartError { quantity, value, accepted: "zero or more" })
    }
}
