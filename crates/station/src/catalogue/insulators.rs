//! Insulators of the catalogue.

use std::sync::OnceLock;

use physics::insulator::Insulator;
use serde::Deserialize;

use super::{CatalogueError, Entry, Kind, find, read};

/// An insulator of the catalogue.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct InsulatorEntry {
    /// What plans call it.
    pub id: String,
    /// What one sees.
    pub name: String,
    /// One line: what it is good for.
    pub hint: String,
    /// Peak voltage at which it flashes over, dry, at sea level, V.
    pub dry_flashover_peak_v: f64,
    /// Share of it that is left in rain.
    pub wet_share: f64,
    /// Share of the flashover voltage that one uses at HF.
    pub working_share: f64,
    /// Where each figure comes from.
    pub sources: InsulatorSources,
}

/// Where each figure of an insulator comes from.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct InsulatorSources {
    /// Dry flashover.
    pub dry: String,
    /// Share in rain.
    pub wet: String,
    /// Share that one uses.
    pub working: String,
}

impl InsulatorEntry {
    /// The physics of it.
    #[must_use]
    pub fn insulator(&self) -> Insulator {
        Insulator {
            dry_flashover_peak_v: self.dry_flashover_peak_v,
            wet_share: self.wet_share,
            working_share: self.working_share,
        }
    }
}

impl Entry for InsulatorEntry {
    const KIND: Kind = Kind::Insulator;

    fn id(&self) -> &str {
        &self.id
    }
}

/// All insulators, in the order in which lists show them.
#[must_use]
pub fn insulators() -> &'static [InsulatorEntry] {
    static INSULATORS: OnceLock<Vec<InsulatorEntry>> = OnceLock::new();
    INSULATORS.get_or_init(|| read(include_str!("../../../../assets/insulators.ron")))
}

/// The insulator with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn insulator_entry(id: &str) -> Result<&'static InsulatorEntry, CatalogueError> {
    find(insulators(), id)
}
