//! A feed: the chain from the feedpoint to the transmitter.

use serde::{Deserialize, Serialize};

/// One way to bring the watts to the wire.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Feed {
    /// For instance "open line".
    pub name: String,
    /// The links in order from the feedpoint to the transmitter.
    pub links: Vec<Link>,
}

/// One link of a feed.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum Link {
    /// An ideal transformer.
    Transformer(Transformer),
    /// A piece of feed line.
    Line(LinePiece),
    /// A matching unit, set anew for each frequency.
    MatchingUnit(MatchingUnit),
}

/// An ideal transformer.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Transformer {
    /// Impedance on the wire's side over impedance on the transmitter's side: 4 for "4:1".
    pub impedance_ratio: f64,
}

/// A piece of feed line.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LinePiece {
    /// What it is.
    pub line: LineChoice,
    /// Its length, m.
    pub length_m: f64,
}

/// A line from the catalogue or the user's own.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum LineChoice {
    /// By its id in the catalogue.
    Catalogue(String),
    /// The user's own figures.
    Own(LineData),
}

/// Figures of a feed line.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LineData {
    /// Name for lists and the sheet.
    pub name: String,
    /// How its constants are found.
    pub construction: LineConstruction,
    /// Highest peak voltage between its conductors, V; absent where no figure is known.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub rating_peak_v: Option<f64>,
    /// Highest average power into a matched load; absent where no figure is known.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub rating_average: Option<AverageRating>,
    /// What rain does to it; absent where it does nothing, as to coax.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub wet: Option<Wetness>,
    /// Where the figures come from.
    #[serde(default)]
    pub source: String,
}

/// Average power that a line takes at one frequency, matched. It is heat that limits it: at another frequency it takes
/// what makes the same heat in a metre.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct AverageRating {
    /// W.
    pub watts: f64,
    /// Where it takes them, Hz.
    pub frequency_hz: f64,
}

/// What water does to a line: a named condition, not a measurement.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Wetness {
    /// Capacitance per metre over that of the dry line, 1 or more.
    pub capacitance_factor: f64,
    /// What is added to the loss tangent.
    pub added_loss_tangent: f64,
}

/// How the constants of a line are found.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum LineConstruction {
    /// From published figures.
    Published {
        /// Nominal impedance at high frequency, Ω.
        z0_ohm: f64,
        /// Velocity relative to light.
        velocity_factor: f64,
        /// Matched loss.
        loss: LossLaw,
    },
    /// Two equal round wires side by side, from geometry and material.
    TwoWire {
        /// Diameter of each wire, m.
        wire_diameter_m: f64,
        /// Distance between the wires' centres, m.
        spacing_m: f64,
        /// Conductivity of the wires, S/m.
        conductivity_s_per_m: f64,
        /// Velocity relative to light (spacers, web).
        velocity_factor: f64,
        /// Loss tangent of what fills the field, weighted by its share.
        loss_tangent: f64,
    },
    /// Coaxial, from geometry and materials.
    Coaxial {
        /// Diameter of the inner conductor, m.
        inner_diameter_m: f64,
        /// Inner diameter of the outer conductor, m.
        outer_diameter_m: f64,
        /// Conductivity of both conductors, S/m.
        conductivity_s_per_m: f64,
        /// Relative permittivity of the filling.
        relative_permittivity: f64,
        /// Loss tangent of the filling.
        loss_tangent: f64,
    },
}

/// Matched loss in dB per 100 m: k1·√f + k2·f with f in MHz.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LossLaw {
    /// Conductor loss, dB per 100 m at 1 MHz, growing with √f.
    pub k1_db_per_100m: f64,
    /// Dielectric loss, dB per 100 m at 1 MHz, growing with f.
    pub k2_db_per_100m: f64,
}

/// An L-network whose coil and capacitor are set anew for each frequency.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct MatchingUnit {
    /// Largest inductance, H.
    pub inductance_max_h: f64,
    /// Largest capacitance, F.
    pub capacitance_max_f: f64,
    /// Q of the coil.
    #[serde(default = "default_coil_q")]
    pub coil_q: f64,
    /// Q of the capacitor.
    #[serde(default = "default_capacitor_q")]
    pub capacitor_q: f64,
    /// Highest peak voltage across the capacitor, V; absent where no figure is known.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub rating_peak_v: Option<f64>,
}

/// Common practice for air-wound coils at HF.
fn default_coil_q() -> f64 {
    200.0
}

/// Common practice for air-spaced capacitors at HF.
fn default_capacitor_q() -> f64 {
    1000.0
}
