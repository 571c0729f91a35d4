//! The station: the plan the user draws, its catalogues, validation and file, how it hangs, and the evaluator that
//! turns it into a report.

/// Stand-in until `catalogue/` lands (a minute or two): delete this block and say `pub mod catalogue;`.
pub mod catalogue {
    use crate::plan::{ConductorChoice, ConductorData, Earth, LineChoice, LineData, Soil};
    /// Stand-in.
    #[derive(Clone, Debug, PartialEq, thiserror::Error)]
    #[error("not in the catalogue")]
    pub struct CatalogueError;
    /// Stand-in.
    pub fn conductor(choice: &ConductorChoice) -> Result<&ConductorData, CatalogueError> {
        match choice {
            ConductorChoice::Own(data) => Ok(data),
            ConductorChoice::Catalogue(_) => Err(CatalogueError),
        }
    }
    /// Stand-in.
    pub fn line(choice: &LineChoice) -> Result<&LineData, CatalogueError> {
        match choice {
            LineChoice::Own(data) => Ok(data),
            LineChoice::Catalogue(_) => Err(CatalogueError),
        }
    }
    /// Stand-in.
    pub fn soil(_id: &str) -> Result<Soil, CatalogueError> {
        Err(CatalogueError)
    }
    /// Stand-in.
    pub fn earth(earth: &Earth) -> Result<Option<Soil>, CatalogueError> {
        match earth {
            Earth::NoEarth | Earth::Mirror => Ok(None),
            Earth::Own(soil) => Ok(Some(*soil)),
            Earth::Catalogue(_) => Err(CatalogueError),
        }
    }
}
pub mod evaluate;
pub mod file;
pub mod hang;
pub mod plan;
pub mod report;
#[cfg(test)]
mod sample;
pub mod units;
pub mod validate;
