//! From plan and report to files on paper: what the window and the headless command share.

use std::ffi::OsString;
use std::path::{Path, PathBuf};

use sheet::{Date, Paper, SheetRequest};
use station::file::{self, FileError};
use station::plan::Plan;
use station::report::Report;
use station::units::Units;

/// Resolution of a picture: small print stays legible, and a page is below a megabyte.
const DOTS_PER_INCH: f64 = 150.0;

/// Why a sheet was not written.
#[derive(Debug, thiserror::Error)]
pub enum PaperError {
    /// The file's name ends in something else.
    #[error(
        "a sheet cannot be saved as \"{}\"; accepted: names that end in .pdf, .svg or .png",
        .0.file_name().unwrap_or(.0.as_os_str()).to_string_lossy()
    )]
    Kind(PathBuf),
    /// It cannot be made.
    #[error(transparent)]
    Sheet(#[from] sheet::SheetError),
    /// It cannot be written.
    #[error(transparent)]
    Write(#[from] FileError),
}

/// What a sheet is saved as.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Kind {
    Pdf,
    Svg,
    Png,
}

impl Kind {
    /// All, the usual one first.
    pub const ALL: [Self; 3] = [Self::Pdf, Self::Svg, Self::Png];

    /// The ending of the file's name.
    #[must_use]
    pub fn extension(self) -> &'static str {
        match self {
            Self::Pdf => "pdf",
            Self::Svg => "svg",
            Self::Png => "png",
        }
    }

    /// By the ending of a file's name.
    ///
    /// # Errors
    /// [`PaperError::Kind`] for any other ending, and for none.
    pub fn of(path: &Path) -> Result<Self, PaperError> {
        let is_of = |kind: &Self| {
            path.extension().is_some_and(|ending| ending.eq_ignore_ascii_case(kind.extension()))
        };
        Self::ALL.into_iter().find(is_of).ok_or_else(|| PaperError::Kind(path.to_owned()))
    }
}

/// Paper and units, with the date of today.
#[must_use]
pub fn request(paper: Paper, units: Units) -> SheetRequest {
    SheetRequest { paper, units, date: today() }
}

/// Writes the sheet as the file's name says; older files are replaced as a whole. Pictures have one page each: the
/// files that were written are given back.
///
/// # Errors
/// One sentence.
pub fn save(
    plan: &Plan,
    report: &Report,
    request: &SheetRequest,
    path: &Path,
) -> Result<Vec<PathBuf>, PaperError> {
    let kind = Kind::of(path)?;
    if kind == Kind::Pdf {
        file::write_atomically(path, &sheet::pdf_for(plan, report, request)?)?;
        return Ok(vec![path.to_owned()]);
    }
    let pages = sheet::lay_out(plan, report, request)?;
    let mut written = Vec::new();
    for (index, page) in pages.iter().enumerate() {
        let path = if pages.len() == 1 { path.to_owned() } else { numbered(path, index + 1) };
        let bytes = match kind {
            Kind::Png => sheet::png::write(page, DOTS_PER_INCH)?,
            Kind::Pdf | Kind::Svg => sheet::svg::write(page).into_bytes(),
        };
        file::write_atomically(&path, &bytes)?;
        written.push(path);
    }
    Ok(written)
}

/// "sheet-2.svg" for the second page of "sheet.svg".
fn numbered(path: &Path, page: usize) -> PathBuf {
    let mut name = path.file_stem().unwrap_or_default().to_owned();
    name.push(format!("-{page}."));
    name.push(path.extension().map_or_else(OsString::new, ToOwned::to_owned));
    path.with_file_name(name)
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

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_kind_is_in_the_name() {
        for (name, kind) in [("a.pdf", Kind::Pdf), ("a.b.SVG", Kind::Svg), ("/x.y/a.Png", Kind::Png)] {
            assert_eq!(Kind::of(Path::new(name)).ok(), Some(kind), "{name}");
        }
        for name in ["a", "a.docx", ".pdf", "pdf", "a.pdf.", "/x.pdf/a"] {
            let said = Kind::of(Path::new(name)).map_err(|error| error.to_string());
            assert!(said.as_ref().is_err_and(|said| said.contains("accepted")), "{name}: {said:?}");
        }
    }

    #[test]
    fn pages_are_numbered_before_the_ending() {
        assert_eq!(numbered(Path::new("/x/hut.v2.svg"), 3), Path::new("/x/hut.v2-3.svg"));
    }
}
