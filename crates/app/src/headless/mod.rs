//! The commands that work without a display, on the same path as the window: load, evaluate, print.

pub mod report;
pub mod sheet;

use std::path::{Path, PathBuf};

use station::evaluate::EvaluateError;
use station::file::{self, FileError};
use station::plan::Plan;

use crate::paper::PaperError;

/// Why a headless command did not do its work.
#[derive(Debug, thiserror::Error)]
pub enum HeadlessError {
    /// The plan cannot be read.
    #[error("{}", crate::desk::sentence(path, source))]
    Plan {
        /// The file.
        path: PathBuf,
        /// What is wrong.
        source: FileError,
    },
    /// A frequency of `--at` is no use.
    #[error("--at: {value} MHz is not possible; accepted: {low} to {high} MHz")]
    Frequency {
        /// As given.
        value: f64,
        /// Lowest accepted, MHz.
        low: f64,
        /// Highest accepted, MHz.
        high: f64,
    },
    /// The plan has no numbers.
    #[error(transparent)]
    Evaluate(#[from] EvaluateError),
    /// The sheet cannot be made.
    #[error(transparent)]
    Sheet(#[from] PaperError),
    /// The output goes nowhere.
    #[error("the report cannot be written: {0}")]
    Write(#[from] std::io::Error),
}

/// Reads a plan; the error names the file.
fn load(path: &Path) -> Result<Plan, HeadlessError> {
    file::load(path).map_err(|source| HeadlessError::Plan { path: path.to_owned(), source })
}
