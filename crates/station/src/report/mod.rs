//! The report: everything the evaluator found out about a plan. It never holds a setting of the user's.
//!
//! Voltages and currents are **peak** values unless a name says `rms`; power is average power of a steady carrier.

mod json;
mod verdict;

pub use json::json;
pub use verdict::{Verdict, VerdictKind};

use num_complex::Complex64;
use physics::network::NetworkError;

use crate::hang::Hung;

/// Which model made the numbers.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Model {
    /// Sinusoidal standing waves on one straight wire; earth as a mirror with a reflection coefficient.
    Sketch,
    /// The integral equation of thin wires, solved for every wire of the plan.
    Full {
        /// Number of unknown currents.
        unknowns: usize,
    },
}

impl Model {
    /// Short name for status lines.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Sketch => "sketch (sinusoidal currents)",
            Self::Full { .. } => "full model",
        }
    }
}

/// The evaluation of one plan.
#[derive(Clone, Debug)]
pub struct Report {
    /// Revision of the plan that was evaluated.
    pub revision: u64,
    /// The model that made the numbers.
    pub model: Model,
    /// The wires and ropes as they hang.
    pub hung: Hung,
    /// Names of the feeds, in the plan's order.
    pub feed_names: Vec<String>,
    /// Names of each feed's links, from the feedpoint to the transmitter.
    pub link_names: Vec<Vec<String>>,
    /// One entry per band, in the plan's order.
    pub bands: Vec<BandReport>,
    /// What the user should know, most important first.
    pub findings: Vec<Finding>,
}

/// One band.
#[derive(Clone, Debug)]
pub struct BandReport {
    /// The band's name.
    pub name: String,
    /// Lowest frequency, Hz.
    pub low_hz: f64,
    /// Highest frequency, Hz.
    pub high_hz: f64,
    /// Rising frequencies; for a list of channels, just the channels.
    pub points: Vec<FrequencyReport>,
    /// Index into `points` of the frequency that stands for the band (the one nearest to its middle).
    pub middle: usize,
    /// What each feed does on this band.
    pub feeds: Vec<BandFeed>,
    /// The standing wave at the middle frequency.
    pub wave: StandingWave,
}

impl BandReport {
    /// The point that stands for the band.
    #[must_use]
    pub fn middle_point(&self) -> &FrequencyReport {
        &self.points[self.middle]
    }
}

/// One feed on one band.
#[derive(Clone, Debug)]
pub struct BandFeed {
    /// Judged at the worst frequency of the band at the transmitter's socket.
    pub verdict: Verdict,
    /// Peak voltage and current along the feed's lines at the middle frequency and the set power, from the
    /// feedpoint to the transmitter; empty without a line or where no power gets through.
    pub profile: Vec<ProfilePoint>,
}

/// Voltage and current at a place of the feed line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ProfilePoint {
    /// Distance from the feedpoint along the line, m.
    pub from_wire_m: f64,
    /// Peak voltage between the conductors, V.
    pub peak_v: f64,
    /// Peak current in each conductor, A.
    pub peak_a: f64,
}

/// One frequency.
#[derive(Clone, Debug)]
pub struct FrequencyReport {
    /// Hz.
    pub frequency_hz: f64,
    /// Impedance at the feedpoint, Ω.
    pub feedpoint_ohm: Complex64,
    /// Where the watts at the feedpoint go.
    pub shares: Shares,
    /// One entry per feed.
    pub feeds: Vec<FeedReport>,
}

/// Where the watts at the feedpoint go, as shares of them; they sum to one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Shares {
    /// Leave toward the sky.
    pub sky: f64,
    /// Heat the earth: what is left of all others ([`crate::evaluate::Proof`] has it computed on its own). The sketch
    /// does not know it and counts it as sky.
    pub earth: f64,
    /// Heat metal and loads.
    pub burnt: f64,
}

impl Shares {
    /// Shares without an earth that takes any.
    #[must_use]
    pub fn without_earth(burnt: f64) -> Self {
        Self { sky: 1.0 - burnt, earth: 0.0, burnt }
    }
}

/// An impedance and its standing-wave ratio on a real reference.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Seen {
    /// Ω.
    pub z_ohm: Complex64,
    /// The reference of the ratio, Ω.
    pub reference_ohm: f64,
    /// Standing-wave ratio, 1 or more.
    pub swr: f64,
}

/// One feed at one frequency.
#[derive(Clone, Debug)]
pub struct FeedReport {
    /// The feedpoint, on the nominal impedance of the line that starts there (after a transformer, if any).
    pub at_feedpoint: Seen,
    /// The transmitter's socket with the matching unit left out (its coil and capacitor bypassed).
    pub before_unit: Seen,
    /// The transmitter's socket with the matching unit set; the same as `before_unit` without one.
    pub at_transmitter: Seen,
    /// How the matching unit is set, where it is used.
    pub setting: Option<Setting>,
    /// One entry per link, from the feedpoint to the transmitter.
    pub links: Vec<LinkReport>,
    /// Loss of all links together, dB; mismatch at the transmitter is not a loss.
    pub loss_db: f64,
    /// Watts that reach the wire, W: the set power less the loss of the links. Where the transmitter's limit is
    /// exceeded, it is taken to give what a generator of its resistance would give, (1 − |Γ|²) of the set power.
    pub watts_to_wire: f64,
    /// Why the matching unit cannot bring this frequency in; its text is a sentence.
    pub shortfall: Option<NetworkError>,
    /// What this frequency needs.
    pub kind: VerdictKind,
}

/// What one link does at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LinkReport {
    /// Loss, dB.
    pub loss_db: f64,
    /// Watts turned into heat at the set power, W.
    pub watts_lost: f64,
    /// Highest peak voltage in the link at the set power, V.
    pub peak_v: f64,
    /// Highest RMS current in the link at the set power, A.
    pub rms_a: f64,
    /// What the link shows toward the transmitter. The ratio of a line stands on its own nominal impedance; that of a
    /// transformer or a matching unit on what follows: the next line's nominal impedance or the transmitter's
    /// resistance.
    pub toward_transmitter: Seen,
}

/// Which way round the L-network stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// Coil in series, capacitor across the side of the wire.
    CapacitorAtWire,
    /// Coil in series, capacitor across the side of the transmitter.
    CapacitorAtTransmitter,
}

/// The setting of a matching unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Setting {
    /// Which way round.
    pub sense: Sense,
    /// Series inductance, H.
    pub inductance_h: f64,
    /// Shunt capacitance, F.
    pub capacitance_f: f64,
}

/// The standing wave on the wires at one frequency, for 1 W accepted at the feedpoint: multiply by the square
/// root of the watts.
#[derive(Clone, Debug)]
pub struct StandingWave {
    /// Hz.
    pub frequency_hz: f64,
    /// One entry per wire, in the order of [`Hung::wires`].
    pub wires: Vec<WireWave>,
}

/// Current and voltage on one wire.
#[derive(Clone, Debug)]
pub struct WireWave {
    /// Distance from the wire's beginning, m, rising from 0 to the cut length.
    pub arc_m: Vec<f64>,
    /// Peak phasor of the current toward the wire's end, A for 1 W.
    pub current_a: Vec<Complex64>,
    /// Peak phasor of the potential, V for 1 W; indicative.
    pub potential_v: Vec<Complex64>,
    /// Loops and nodes, by distance from the wire's beginning.
    pub marks: Vec<Mark>,
}

/// A place of note on the standing wave.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mark {
    /// Distance from the wire's beginning, m.
    pub arc_m: f64,
    /// What is there.
    pub kind: MarkKind,
}

/// What stands at a mark.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum MarkKind {
    CurrentLoop,
    CurrentNode,
}

/// How much a finding matters.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Weight {
    /// It does not work, or may hurt someone.
    Problem,
    /// Look at it before you build.
    Caution,
    /// Good to know.
    Note,
}

/// Where a finding belongs, by index in the plan.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Place {
    Plan,
    Support(usize),
    Wire(usize),
    Feed(usize),
    Band(usize),
}

/// Something the user should know.
#[derive(Clone, Debug, PartialEq)]
pub struct Finding {
    /// How much it matters.
    pub weight: Weight,
    /// Where it belongs.
    pub place: Place,
    /// One sentence.
    pub text: String,
}
