//! Verdicts: what a feed needs on a band, in one word and one reason.

/// What a band or a frequency needs, from best to worst.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum VerdictKind {
    /// No matching unit needed.
    Direct,
    /// The matching unit brings it in.
    WithMatchingUnit,
    /// Less than the stated share of the watts reaches the wire.
    TooLossy,
    /// A part exceeds its rating at the set power.
    Overstressed,
    /// Neither direct nor within the matching unit's range.
    OutOfRange,
}

impl VerdictKind {
    /// The words that screens and sheets print.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Direct => "direct",
            Self::WithMatchingUnit => "with matching unit",
            Self::TooLossy => "too lossy",
            Self::Overstressed => "overstressed",
            Self::OutOfRange => "out of range",
        }
    }

    /// Whether the band can be worked.
    #[must_use]
    pub fn works(self) -> bool {
        matches!(self, Self::Direct | Self::WithMatchingUnit)
    }
}

/// The verdict on one band for one feed.
#[derive(Clone, Debug, PartialEq)]
pub struct Verdict {
    /// At the worst frequency of the band.
    pub kind: VerdictKind,
    /// Why, in a few words with a number: for instance "SWR 3.4 at 3.800 MHz".
    pub reason: String,
    /// Index of the worst frequency in the band's points.
    pub worst: usize,
    /// The parts of the band that work, as (low, high) in Hz; a channel that works is a range of no width.
    pub covered_hz: Vec<(f64, f64)>,
}
