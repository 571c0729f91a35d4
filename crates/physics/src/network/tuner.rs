//! The tuner built into a transmitter: known by the standing-wave ratio that it takes.

use super::error::PartError;
use crate::line::State;

/// A tuner inside a transmitter, of which the maker tells the range only.
///
/// What it loses is not known and counts as zero watts; makers do not publish it. Typical ranges are 3:1 for
/// an aligning tuner, 10:1 or more for a wide-range one (common practice).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BuiltInTuner {
    /// The resistance on which the maker states the range, Ω.
    pub reference_ohm: f64,
    /// Largest standing-wave ratio that it brings in.
    pub largest_swr: f64,
}

/// What a built-in tuner makes of a load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum TunerReach {
    /// It brings the load in.
    Within {
        /// The load's standing-wave ratio.
        swr: f64,
    },
    /// It does not.
    Beyond {
        /// The load's standing-wave ratio.
        swr: f64,
        /// The largest that it takes.
        largest_swr: f64,
    },
}

impl BuiltInTuner {
    /// Whether the figures make a tuner.
    ///
    /// # Errors
    ///
    /// A resistance that is not greater than zero, a range below 1.
    pub fn check(&self) -> Result<(), PartError> {
        super::error::positive("the tuner's resistance in ohms", self.reference_ohm)?;
        if self.largest_swr >= 1.0 && self.largest_swr.is_finite() {
            return Ok(());
        }
        Err(PartError { quantity: "the tuner's largest SWR", value: self.largest_swr, accepted: "1 or more" })
    }

    /// What it makes of the state at its output.
    #[must_use]
    pub fn reach(&self, at_output: State) -> TunerReach {
        let swr = at_output.swr(self.reference_ohm);
        if swr <= self.largest_swr {
            TunerReach::Within { swr }
        } else {
            TunerReach::Beyond { swr, largest_swr: self.largest_swr }
        }
    }
}
