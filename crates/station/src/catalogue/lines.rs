//! Feed lines of the catalogue, and the physics behind a line's figures.

use std::sync::OnceLock;

use physics::line::{Coaxial, LineConstants, LineError, NominalLine, TwoWire};
use serde::Deserialize;

use super::{CatalogueError, Entry, Kind, find, read};
use crate::plan::{LineConstruction, LineData};

/// A feed line of the catalogue.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LineEntry {
    /// What plans call it.
    pub id: String,
    /// One line: what it is good for.
    pub hint: String,
    /// Its figures; their `source` is put together from `sources`.
    pub data: LineData,
    /// Where each figure comes from.
    pub sources: LineSources,
}

/// Where each figure of a line comes from: a document that was read, from memory, derived from geometry, or common
/// practice with what is assumed.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LineSources {
    /// Characteristic impedance.
    pub impedance: String,
    /// Velocity.
    pub velocity: String,
    /// Loss law or materials.
    pub loss: String,
    /// Peak voltage.
    pub volts: String,
    /// Average power.
    pub watts: String,
    /// What rain does, where it does something.
    #[serde(default)]
    pub wet: Option<String>,
}

impl LineSources {
    /// The sources in one paragraph.
    fn together(&self) -> String {
        let Self { impedance, velocity, loss, volts, watts, wet } = self;
        let mut text = if impedance == velocity {
            format!("Z0 and velocity {impedance}")
        } else {
            format!("Z0 {impedance}; velocity {velocity}")
        };
        text.push_str(&format!("; loss: {loss}; volts: {volts}; watts: {watts}"));
        if let Some(wet) = wet {
            text.push_str(&format!("; wet: {wet}"));
        }
        text
    }
}

impl Entry for LineEntry {
    const KIND: Kind = Kind::Line;

    fn id(&self) -> &str {
        &self.id
    }
}

/// All feed lines, in the order in which lists show them.
#[must_use]
pub fn lines() -> &'static [LineEntry] {
    static LINES: OnceLock<Vec<LineEntry>> = OnceLock::new();
    LINES.get_or_init(|| {
        let mut lines: Vec<LineEntry> = read(include_str!("../../../../assets/lines.ron"));
        for LineEntry { data, sources, .. } in &mut lines {
            data.source = sources.together();
        }
        lines
    })
}

/// The feed line with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn line_entry(id: &str) -> Result<&'static LineEntry, CatalogueError> {
    find(lines(), id)
}

/// Z₀ and γ of a line at a frequency (Hz), dry.
///
/// # Errors
///
/// Figures that make no line.
pub fn line_at(data: &LineData, frequency_hz: f64) -> Result<LineConstants, LineError> {
    match data.construction {
        LineConstruction::Published { z0_ohm, velocity_factor, loss } => {
            let loss = physics::line::LossLaw {
                k1_db_per_100m: loss.k1_db_per_100m,
                k2_db_per_100m: loss.k2_db_per_100m,
            };
            NominalLine { z0_ohm, velocity_factor, loss }.constants(frequency_hz)
        }
        LineConstruction::TwoWire {
            wire_diameter_m,
            spacing_m,
            conductivity_s_per_m,
            velocity_factor,
            loss_tangent,
        } => TwoWire { wire_diameter_m, spacing_m, conductivity_s_per_m, velocity_factor, loss_tangent }
            .constants(frequency_hz),
        LineConstruction::Coaxial {
            inner_diameter_m,
            outer_diameter_m,
            conductivity_s_per_m,
            relative_permittivity,
            loss_tangent,
        } => Coaxial {
            inner_diameter_m,
            outer_diameter_m,
            conductivity_s_per_m,
            relative_permittivity,
            loss_tangent,
        }
        .constants(frequency_hz),
    }
}

/// Z₀ and γ of a line at a frequency (Hz) in rain; as dry where rain does nothing to it.
///
/// # Errors
///
/// Figures that make no line.
pub fn wet_line_at(data: &LineData, frequency_hz: f64) -> Result<LineConstants, LineError> {
    let dry = line_at(data, frequency_hz)?;
    let Some(wet) = data.wet else { return Ok(dry) };
    dry.wet(physics::line::Wetness {
        capacitance_factor: wet.capacitance_factor,
        added_loss_tangent: wet.added_loss_tangent,
    })
}

/// Average power that a line takes at a frequency (Hz) into a matched load, W; none where no figure is known.
///
/// # Errors
///
/// Figures that make no line.
pub fn rated_average_w(data: &LineData, frequency_hz: f64) -> Result<Option<f64>, LineError> {
    let Some(rating) = data.rating_average else { return Ok(None) };
    let rated = physics::line::AverageRating {
        power_w: rating.watts,
        loss_db_per_m: line_at(data, rating.frequency_hz)?.matched_loss_db_per_m(),
    };
    Ok(Some(rated.at_loss_w(line_at(data, frequency_hz)?.matched_loss_db_per_m())))
}
