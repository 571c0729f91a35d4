//! The wire: the path it hangs on, its cut length, its conductor, and where it is fed.

use serde::{Deserialize, Serialize};

use super::site::Point;

/// One wire on a path over supports.
///
/// The path is measured from its first point. The wire begins at `start_m` and is `cut_length_m` long. What of the
/// path it does not cover is rope; what does not fit on the path hangs straight down from the path's end.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Wire {
    /// For instance "main wire".
    pub name: String,
    /// Two or more points that the wire or its ropes are made fast to.
    pub path: Vec<PathPoint>,
    /// Where along the path the wire begins, m; below zero, that much of it hangs down from the first point.
    pub start_m: f64,
    /// Electrical length of wire between its two ends, m (allowances for knots come on top, on the sheet).
    pub cut_length_m: f64,
    /// What it is made of.
    pub conductor: ConductorChoice,
    /// Ends that are connected to the earth, each by a lead of the same wire straight down; at most one for each end.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub earthed: Vec<EarthConnection>,
}

/// An end of a wire that is connected to the earth.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct EarthConnection {
    /// Which end.
    pub end: WireEnd,
    /// What is in the earth.
    pub electrode: Electrode,
}

/// An end of a wire.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[allow(missing_docs)] // The words say it.
pub enum WireEnd {
    Beginning,
    End,
}

/// What connects a wire to the earth. Known approximately only.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum Electrode {
    /// A stake driven straight down.
    Stake {
        /// Length in the earth, m.
        length_m: f64,
        /// Diameter, m.
        diameter_m: f64,
    },
    /// A few bare wires laid on the earth as a star.
    Radials {
        /// How many.
        count: u32,
        /// Length of each, m.
        length_m: f64,
        /// Diameter of the wire, m.
        diameter_m: f64,
    },
    /// A stated impedance, the same on all frequencies.
    Stated {
        /// Ω.
        resistance_ohm: f64,
        /// Ω.
        reactance_ohm: f64,
    },
}

/// A point of the path.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum PathPoint {
    /// On a support, at a height over its foot.
    OnSupport {
        /// The support's name.
        support: String,
        /// Height above the support's foot, m.
        height_m: f64,
    },
    /// A free point, for odd sites and for comparison with calculated cases.
    Free(Point),
}

/// A conductor from the catalogue or the user's own.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum ConductorChoice {
    /// By its id in the catalogue.
    Catalogue(String),
    /// The user's own figures.
    Own(ConductorData),
}

/// A round conductor, perhaps insulated.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ConductorData {
    /// Name for lists and the sheet.
    pub name: String,
    /// Outer diameter of the metal, m.
    pub diameter_m: f64,
    /// Conductivity of the metal that carries the current (the skin), S/m.
    pub conductivity_s_per_m: f64,
    /// Factor on the HF resistance for stranding, 1 for a solid wire.
    #[serde(default = "one")]
    pub stranding_factor: f64,
    /// Permeability of the metal that carries the current, relative to vacuum; 1 for anything but steel.
    #[serde(default = "one")]
    pub relative_permeability: f64,
    /// Another metal inside, for clad wire.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub core: Option<Core>,
    /// Insulation over the metal, if any.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub insulation: Option<Insulation>,
    /// Where the figures come from.
    #[serde(default)]
    pub source: String,
}

fn one() -> f64 {
    1.0
}

/// The core of a clad wire.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Core {
    /// Diameter of the core, m.
    pub diameter_m: f64,
    /// Conductivity, S/m.
    pub conductivity_s_per_m: f64,
    /// Permeability relative to vacuum.
    pub relative_permeability: f64,
}

/// Insulation of a wire.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Insulation {
    /// Diameter over the insulation, m.
    pub outer_diameter_m: f64,
    /// Relative permittivity.
    pub relative_permittivity: f64,
}

/// Where a wire is cut and fed.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Feedpoint {
    /// Index of the wire.
    pub wire: usize,
    /// Share of the cut length between the wire's beginning and the feedpoint: 0.5 is centre-fed.
    pub fraction: f64,
    /// Distance between the two wire ends at the feedpoint insulator, m.
    #[serde(default = "default_gap_m")]
    pub gap_m: f64,
}

/// 20 mm: the gap of the reference cases, about a small centre insulator (common practice).
fn default_gap_m() -> f64 {
    0.02
}
