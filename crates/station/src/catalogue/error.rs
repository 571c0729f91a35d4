//! What the catalogue says when it does not have something.

use std::fmt;

use thiserror::Error;

/// Which of the catalogues.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Kind {
    Line,
    Conductor,
    Insulator,
    Soil,
    Band,
}

impl fmt::Display for Kind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Line => "feed line",
            Self::Conductor => "conductor",
            Self::Insulator => "insulator",
            Self::Soil => "soil",
            Self::Band => "band",
        })
    }
}

/// How many ids an error offers.
const OFFERS: usize = 3;

/// How many characters of an unknown id an error repeats and compares: ids are shorter, and files may be hostile.
const LONGEST_ID: usize = 48;

/// Why something is not found in the catalogue.
#[derive(Clone, Debug, PartialEq, Eq, Error)]
pub enum CatalogueError {
    /// No entry has this id.
    #[error("the catalogue has no {kind} {id:?}; the closest are {}", .closest.join(", "))]
    Unknown {
        /// Where it was looked for.
        kind: Kind,
        /// What was looked for.
        id: String,
        /// The ids that read most like it, closest first.
        closest: Vec<String>,
    },
}

impl CatalogueError {
    /// An unknown id, with the closest of those that there are.
    pub(super) fn unknown<'a>(kind: Kind, id: &str, known: impl Iterator<Item = &'a str>) -> Self {
        let id: String = id.chars().take(LONGEST_ID).collect();
        let asked = id.to_lowercase();
        let mut ranked: Vec<(usize, &str)> =
            known.map(|known| (strsim::damerau_levenshtein(known, &asked), known)).collect();
        ranked.sort_unstable();
        let closest = ranked.into_iter().take(OFFERS).map(|(_, known)| known.to_owned()).collect();
        Self::Unknown { kind, id, closest }
    }
}
