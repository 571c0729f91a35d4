//! What the sketch refuses, and why.

/// A wire or frequency outside the sketch's range.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum SketchError {
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
    /// The wire is no thin wire.
    #[error(
        "a radius of {radius_m} m is too thick for an arm of {arm_m} m; accepted is up to {largest_radius_m} m"
    )]
    TooThick {
        /// Radius of the wire, m.
        radius_m: f64,
        /// Length of the shorter arm, m.
        arm_m: f64,
        /// Largest radius for this arm, m.
        largest_radius_m: f64,
    },
    /// An arm too short for the frequency.
    #[error(
        "at {frequency_hz} Hz the feedpoint must be at least {shortest_arm_m} m from each end of the wire, not {arm_m} m"
    )]
    ArmTooShort {
        /// Frequency, Hz.
        frequency_hz: f64,
        /// Length of the shorter arm, m.
        arm_m: f64,
        /// Shortest arm at this frequency, m.
        shortest_arm_m: f64,
    },
    /// The wire is too thick for the wavelength.
    #[error("at {frequency_hz} Hz the radius must be at most {largest_radius_m} m, not {radius_m} m")]
    TooThickForFrequency {
        /// Frequency, Hz.
        frequency_hz: f64,
        /// Radius of the wire, m.
        radius_m: f64,
        /// Largest radius at this frequency, m.
        largest_radius_m: f64,
    },
    /// The image takes more power than the wire radiates: the reflection coefficient no longer describes the earth.
    #[error(
        "at {frequency_hz} Hz a wire {height_m} m high is too near to this earth for a reflection coefficient"
    )]
    TooNearToEarth {
        /// Frequency, Hz.
        frequency_hz: f64,
        /// Height, m.
        height_m: f64,
    },
}

/// `value` if it is in `range`, or an error that says what would be accepted.
pub(super) fn in_range(
    quantity: &'static str,
    value: f64,
    range: std::ops::RangeInclusive<f64>,
    accepted: &'static str,
) -> Result<f64, SketchError> {
    // A comparison with NaN is false, so NaN is refused too.
    if range.contains(&value) {
        Ok(value)
    } else {
        Err(SketchError::OutOfRange { quantity, value, accepted })
    }
}
