//! The catalogues compiled into the program: feed lines, conductors, insulators, soils and bands.
//!
//! The files are `assets/*.ron`; every entry says where its figures come from. An entry is found by its id, which
//! plan files refer to and which therefore never changes.

mod error;
mod insulators;
mod lines;
#[cfg(test)]
mod tests;

use std::sync::OnceLock;

use serde::Deserialize;
use serde::de::DeserializeOwned;

pub use error::{CatalogueError, Kind};
pub use insulators::{InsulatorEntry, InsulatorSources, insulator_entry, insulators};
pub use lines::{LineEntry, LineSources, line_at, line_entry, lines, rated_average_w, wet_line_at};

use crate::plan::{Band, ConductorChoice, ConductorData, Earth, LineChoice, LineData, Soil};

/// A conductor of the catalogue.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ConductorEntry {
    /// What plans call it.
    pub id: String,
    /// One line: what it is good for.
    pub hint: String,
    /// Its figures and their source.
    pub data: ConductorData,
}

/// A soil of the catalogue.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct SoilEntry {
    /// What plans call it.
    pub id: String,
    /// What one sees.
    pub name: String,
    /// One line: how to tell it.
    pub hint: String,
    /// Its figures.
    pub soil: Soil,
    /// Where they come from.
    pub source: String,
}

/// A band of the catalogue.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct BandEntry {
    /// What the catalogue calls it; plans hold the band itself.
    pub id: String,
    /// One line: who works there.
    pub hint: String,
    /// The radio service.
    pub service: Service,
    /// The ITU Regions where it holds.
    pub regions: Vec<Region>,
    /// Name and edges.
    pub band: Band,
    /// Where they come from.
    pub source: String,
}

/// A radio service, in the terms of the Radio Regulations.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, Deserialize)]
pub enum Service {
    /// Amateur.
    Amateur,
    /// Maritime mobile.
    Maritime,
    /// Aeronautical mobile (R): along civil air routes.
    AeronauticalRoute,
    /// Aeronautical mobile (OR): off the civil air routes.
    AeronauticalOffRoute,
    /// Broadcasting.
    Broadcasting,
    /// Standard frequency and time signals.
    StandardFrequency,
}

/// An ITU Region.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, Deserialize)]
pub enum Region {
    /// Europe, Africa, the Middle East, northern Asia.
    One,
    /// The Americas.
    Two,
    /// Southern and eastern Asia, Oceania.
    Three,
}

/// All conductors, in the order in which lists show them.
#[must_use]
pub fn conductors() -> &'static [ConductorEntry] {
    static CONDUCTORS: OnceLock<Vec<ConductorEntry>> = OnceLock::new();
    CONDUCTORS.get_or_init(|| read(include_str!("../../../../assets/conductors.ron")))
}

/// All soils, in the order in which lists show them.
#[must_use]
pub fn soils() -> &'static [SoilEntry] {
    static SOILS: OnceLock<Vec<SoilEntry>> = OnceLock::new();
    SOILS.get_or_init(|| read(include_str!("../../../../assets/soils.ron")))
}

/// All bands, by service and rising frequency.
#[must_use]
pub fn bands() -> &'static [BandEntry] {
    static BANDS: OnceLock<Vec<BandEntry>> = OnceLock::new();
    BANDS.get_or_init(|| read(include_str!("../../../../assets/bands.ron")))
}

/// The bands of a service in a Region, by rising frequency.
pub fn bands_of(service: Service, region: Region) -> impl Iterator<Item = &'static BandEntry> {
    bands().iter().filter(move |entry| entry.service == service && entry.regions.contains(&region))
}

/// A file of the catalogue.
fn read<T: DeserializeOwned>(text: &'static str) -> Vec<T> {
    ron::from_str(text).expect("the catalogue is compiled in, and a unit test reads every file of it")
}

/// The figures of a chosen feed line.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn line(choice: &LineChoice) -> Result<&LineData, CatalogueError> {
    match choice {
        LineChoice::Own(data) => Ok(data),
        LineChoice::Catalogue(id) => line_entry(id).map(|entry| &entry.data),
    }
}

/// The figures of a chosen conductor.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn conductor(choice: &ConductorChoice) -> Result<&ConductorData, CatalogueError> {
    match choice {
        ConductorChoice::Own(data) => Ok(data),
        ConductorChoice::Catalogue(id) => conductor_entry(id).map(|entry| &entry.data),
    }
}

/// The conductor with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn conductor_entry(id: &str) -> Result<&'static ConductorEntry, CatalogueError> {
    find(conductors(), id)
}

/// The soil of a chosen earth; none for no earth and for the mirror.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn earth(choice: &Earth) -> Result<Option<Soil>, CatalogueError> {
    match choice {
        Earth::NoEarth | Earth::Mirror => Ok(None),
        Earth::Own(soil) => Ok(Some(*soil)),
        Earth::Catalogue(id) => soil(id).map(Some),
    }
}

/// The figures of the soil with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn soil(id: &str) -> Result<Soil, CatalogueError> {
    soil_entry(id).map(|entry| entry.soil)
}

/// The soil with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn soil_entry(id: &str) -> Result<&'static SoilEntry, CatalogueError> {
    find(soils(), id)
}

/// The band with this id.
///
/// # Errors
///
/// An id that the catalogue does not have.
pub fn band_entry(id: &str) -> Result<&'static BandEntry, CatalogueError> {
    find(bands(), id)
}

/// What all entries have in common.
trait Entry {
    /// What it is an entry of.
    const KIND: Kind;

    fn id(&self) -> &str;
}

impl Entry for ConductorEntry {
    const KIND: Kind = Kind::Conductor;

    fn id(&self) -> &str {
        &self.id
    }
}

impl Entry for SoilEntry {
    const KIND: Kind = Kind::Soil;

    fn id(&self) -> &str {
        &self.id
    }
}

impl Entry for BandEntry {
    const KIND: Kind = Kind::Band;

    fn id(&self) -> &str {
        &self.id
    }
}

/// The entry with this id, or an error that names the closest ones.
fn find<'a, T: Entry>(entries: &'a [T], id: &str) -> Result<&'a T, CatalogueError> {
    entries
        .iter()
        .find(|entry| entry.id() == id)
        .ok_or_else(|| CatalogueError::unknown(T::KIND, id, entries.iter().map(Entry::id)))
}
