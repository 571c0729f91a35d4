//! The plan: what the user draws and chooses. It never holds a computed number.
//!
//! Everything is SI (metres, hertz, watts, ohms) and three-dimensional: x and y horizontal, z up, earth at z = 0.
//! Editing is a value change; undo is the list of earlier plans.

mod feed;
mod load;
mod site;
mod wire;

pub use feed::{
    AverageRating, Feed, LineChoice, LineConstruction, LineData, LinePiece, Link, LossLaw, MatchingUnit,
    Transformer, Wetness,
};
pub use load::{Circuit, LOAD_GAP_M, Load};
pub use site::{Earth, Point, Site, Soil, Support, SupportKind};
pub use wire::{
    ConductorChoice, ConductorData, Core, EarthConnection, Electrode, Feedpoint, Insulation, PathPoint, Wire,
    WireEnd,
};

use serde::{Deserialize, Serialize};

/// One station: a site, its wire, where it is fed, the feeds to compare, and the bands it must work on.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Plan {
    /// Shown in the window's title and on the sheet.
    pub name: String,
    /// One or two sentences: what the station is for.
    #[serde(default)]
    pub purpose: String,
    /// Call sign or station identifier; may be empty.
    #[serde(default)]
    pub call_sign: String,
    /// Revision of the plan as it stands on paper, counted or lettered by the user: "B"; may be empty.
    #[serde(default, skip_serializing_if = "String::is_empty")]
    pub edition: String,
    /// Supports, earth, entrance of the feed line.
    pub site: Site,
    /// The wires; the first is the one that most views show.
    pub wires: Vec<Wire>,
    /// Where the wire is cut and fed.
    pub feedpoint: Feedpoint,
    /// Coils, traps and resistors in the wires.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub loads: Vec<Load>,
    /// Two or more feeds to compare.
    pub feeds: Vec<Feed>,
    /// The bands or channel lists that must work.
    pub bands: Vec<Band>,
    /// The transmitter at the end of every feed.
    pub transmitter: Transmitter,
    /// Smallest share of the transmitter's watts that must reach the wire; below it a band is *too lossy*.
    #[serde(default = "default_least_share")]
    pub least_share_to_wire: f64,
}

/// Half of the watts: a feed that burns more than it delivers is called too lossy.
fn default_least_share() -> f64 {
    0.5
}

/// A frequency range or a list of channels with the name that the lanes show.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Band {
    /// For instance "40 m" or "Relief net".
    pub name: String,
    /// What it covers.
    pub range: BandRange,
}

/// What a band covers.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum BandRange {
    /// All frequencies between two edges.
    Span {
        /// Lower edge, Hz.
        low_hz: f64,
        /// Upper edge, Hz.
        high_hz: f64,
    },
    /// Only these frequencies.
    Channels {
        /// Carrier frequencies, Hz, in any order.
        frequencies_hz: Vec<f64>,
    },
}

impl BandRange {
    /// Lowest and highest frequency, Hz.
    #[must_use]
    pub fn edges_hz(&self) -> (f64, f64) {
        match self {
            Self::Span { low_hz, high_hz } => (*low_hz, *high_hz),
            Self::Channels { frequencies_hz } => frequencies_hz
                .iter()
                .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), &f| (low.min(f), high.max(f))),
        }
    }
}

/// The transmitter, seen from its antenna socket.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Transmitter {
    /// Power into a matched load, W.
    pub power_w: f64,
    /// Resistance that it wants to see, Ω.
    #[serde(default = "default_resistance_ohm")]
    pub resistance_ohm: f64,
    /// Highest standing-wave ratio at which it gives full power.
    #[serde(default = "default_swr_limit")]
    pub swr_limit: f64,
}

fn default_resistance_ohm() -> f64 {
    50.0
}

/// Common practice: solid-state stages give full power up to about 2:1.
fn default_swr_limit() -> f64 {
    2.0
}
