//! What a part can be set to.

use super::PartError;

/// What a coil (H) or a capacitor (F) can be set to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Range {
    /// Anything between two values.
    Variable {
        /// Smallest value.
        low: f64,
        /// Largest value.
        high: f64,
    },
    /// A bank of relays or even taps: `first`, `first + step`, …, `count` values in all.
    Steps {
        /// The value with everything switched out.
        first: f64,
        /// What one step adds.
        step: f64,
        /// How many values there are: 256 for eight relays.
        count: u32,
    },
}

/// Most values of a bank.
pub(super) const MOST_STEPS: u32 = 4096;

/// What errors call the figures of a range.
pub(super) struct Words {
    low: &'static str,
    high: &'static str,
    step: &'static str,
    count: &'static str,
}

pub(super) const COIL: Words = Words {
    low: "the coil's smallest inductance in henrys",
    high: "the coil's largest inductance in henrys",
    step: "the coil's step in henrys",
    count: "the number of the coil's steps",
};

pub(super) const CAPACITOR: Words = Words {
    low: "the capacitor's smallest capacitance in farads",
    high: "the capacitor's largest capacitance in farads",
    step: "the capacitor's step in farads",
    count: "the number of the capacitor's steps",
};

impl Range {
    /// Smallest value.
    #[must_use]
    pub fn lowest(&self) -> f64 {
        match *self {
            Self::Variable { low, .. } => low,
            Self::Steps { first, .. } => first,
        }
    }

    /// Largest value.
    #[must_use]
    pub fn highest(&self) -> f64 {
        match *self {
            Self::Variable { high, .. } => high,
            Self::Steps { first, step, count } => first + step * f64::from(count.saturating_sub(1)),
        }
    }

    /// The largest value that is not above this one; none where all are.
    pub(super) fn at_most(&self, value: f64) -> Option<f64> {
        match *self {
            Self::Variable { low, high } => (value >= low).then(|| value.min(high)),
            Self::Steps { first, step, count } => {
                let steps = ((value - first) / step + ROUNDING).floor();
                (steps >= 0.0).then(|| first + step * steps.min(f64::from(count - 1)))
            }
        }
    }

    /// The smallest value that is not below this one; none where all are.
    pub(super) fn at_least(&self, value: f64) -> Option<f64> {
        match *self {
            Self::Variable { low, high } => (value <= high).then(|| value.max(low)),
            Self::Steps { first, step, count } => {
                let steps = ((value - first) / step - ROUNDING).ceil();
                (steps <= f64::from(count - 1)).then(|| first + step * steps.max(0.0))
            }
        }
    }

    pub(super) fn check(&self, words: &Words) -> Result<(), PartError> {
        let refuse = |quantity, value, accepted| Err(PartError { quantity, value, accepted });
        let low = self.lowest();
        if !(low >= 0.0 && low.is_finite()) {
            return refuse(words.low, low, "zero or more");
        }
        match *self {
            Self::Variable { high, .. } => {
                if !(high >= low && high > 0.0 && high.is_finite()) {
                    return refuse(words.high, high, "greater than zero and at least the smallest");
                }
            }
            Self::Steps { step, count, .. } => {
                if !(step > 0.0 && step.is_finite()) {
                    return refuse(words.step, step, "greater than zero");
                }
                if !(1..=MOST_STEPS).contains(&count) || self.highest() <= 0.0 {
                    return refuse(
                        words.count,
                        count.into(),
                        "from 1 to 4096, and more than 1 where the first is zero",
                    );
                }
            }
        }
        Ok(())
    }
}

/// Share of a step by which a value may miss it: rounding only.
const ROUNDING: f64 = 1e-9;
