//! From plan and report to the PDF: what the window and the headless command share.

use std::path::Path;

use sheet::{Date, SheetRequest};
use station::file::{self, FileError};
use station::plan::Plan;
use station::report::Report;
use station::units::Units;

use crate::command::Paper;

/// Why a sheet was not written.
#[derive(Debug, thiserror::Error)]
pub enum PaperError {
    /// It cannot be made.
    #[error(transparent)]
    Sheet(#[from] sheet::SheetError),
    /// It cannot be written.
    #[error(transparent)]
    Write(#[from] FileError),
}

/// Paper and units, with the date of today.
#[must_use]
pub fn request(paper: Paper, units: Units) -> SheetRequest {
    let paper = match paper {
        Paper::A4 => sheet::Paper::A4,
        Paper::Letter => sheet::Paper::Letter,
    };
    SheetRequest { paper, units, date: today() }
}

/// Writes the PDF; an older file is replaced as a whole.
///
/// # Errors
/// One sentence.
pub fn save(plan: &Plan, report: &Report, request: &SheetRequest, path: &Path) -> Result<(), PaperError> {
    let bytes = sheet::pdf_for(plan, report, request)?;
    file::write_atomically(path, &bytes)?;
    Ok(())
}

/// The day by the system's clock and time zone. Only the program asks it; a sheet takes its date as given.
fn today() -> Date {
    let today = jiff::Zoned::now().date();
    Date {
        year: u16::try_from(today.year()).unwrap_or_default(),
        month: u8::try_from(today.month()).unwrap_or(1),
        day: u8::try_from(today.day()).unwrap_or(1),
    }
}
