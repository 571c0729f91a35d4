//! Plan files: RON with a header that carries the format version and is read first.
//!
//! A file is `(format: (major, minor), plan: (…))`. When a new major version comes, the struct that reads the old
//! one is kept beside this file (`v1.rs`, …) with a function to the next; the current one is [`Plan`] itself.

mod error;

pub use error::FileError;

use std::fs;
use std::io::Write as _;
use std::path::{Path, PathBuf};

use atomic_write_file::AtomicWriteFile;
use ron::ser::PrettyConfig;
use serde::{Deserialize, Serialize};

use crate::plan::Plan;
use crate::validate;

/// The version that this program writes.
pub const FORMAT: Version = Version(1, 1);
/// A plan of 64 bands and 6 feeds has some 40 kB; a file beyond this is not a plan.
const LARGEST_BYTES: u64 = 2_000_000;

/// Major and minor number of the file format: a new minor adds fields, a new major changes their meaning.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
pub struct Version(pub u32, pub u32);

impl std::fmt::Display for Version {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{}.{}", self.0, self.1)
    }
}

/// Read first; everything else in the file is ignored.
#[derive(Deserialize)]
struct Header {
    format: Version,
}

#[derive(Serialize)]
struct Written<'a> {
    format: Version,
    plan: &'a Plan,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Current {
    #[allow(dead_code)] // Read by `Header`; named here because unknown fields are refused.
    format: Version,
    plan: Plan,
}

/// Reads a plan from a file.
///
/// # Errors
/// One sentence: what is wrong, where, and what would be accepted.
pub fn load(path: &Path) -> Result<Plan, FileError> {
    let read = |source| FileError::Read { path: path.to_owned(), source };
    let bytes = fs::metadata(path).map_err(read)?.len();
    if bytes > LARGEST_BYTES {
        return Err(FileError::TooLarge { megabytes: bytes as f64 / 1e6 });
    }
    let raw = fs::read(path).map_err(read)?;
    let text = String::from_utf8(raw).map_err(|error| {
        let valid = error.utf8_error().valid_up_to();
        let line = 1 + error.as_bytes()[..valid].iter().filter(|&&b| b == b'\n').count();
        FileError::NotText { line }
    })?;
    from_text(&text)
}

/// Reads a plan from the text of a file.
///
/// # Errors
/// As [`load`].
pub fn from_text(text: &str) -> Result<Plan, FileError> {
    if text.len() as u64 > LARGEST_BYTES {
        return Err(FileError::TooLarge { megabytes: text.len() as f64 / 1e6 });
    }
    let header: Header = parse(text)?;
    if header.format > FORMAT {
        return Err(FileError::Newer { found: header.format, known: FORMAT });
    }
    if header.format.0 == 0 {
        return Err(FileError::NoSuchVersion { found: header.format, known: FORMAT });
    }
    let current: Current = parse(text)?;
    validate::check(&current.plan)?;
    Ok(current.plan)
}

/// The text of a plan file.
///
/// # Errors
/// [`FileError::Plan`] for a plan that could not be read back.
pub fn to_text(plan: &Plan) -> Result<String, FileError> {
    validate::check(plan)?;
    let pretty = PrettyConfig::new().indentor("    ").struct_names(false);
    let body = ron::ser::to_string_pretty(&Written { format: FORMAT, plan }, pretty)
        .map_err(|error| FileError::NotWritable { reason: error.to_string() })?;
    Ok(format!(
        "// Plan of one wire station for Wirewright. Lengths in metres, frequencies in hertz.\n{body}\n"
    ))
}

/// Writes a plan to a file: afterwards either the old or the new file is there, whole.
///
/// # Errors
/// [`FileError::Write`] with what the system says; [`FileError::Plan`] for a plan that could not be read back.
pub fn save(plan: &Plan, path: &Path) -> Result<(), FileError> {
    write_atomically(path, to_text(plan)?.as_bytes())
}

/// Replaces a file as a whole. Through a symbolic link, the file behind it is replaced.
///
/// # Errors
/// [`FileError::Write`] with what the system says.
pub fn write_atomically(path: &Path, bytes: &[u8]) -> Result<(), FileError> {
    let target: PathBuf = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
    let write = || -> std::io::Result<()> {
        let mut file = AtomicWriteFile::open(&target)?;
        file.write_all(bytes)?;
        file.commit()
    };
    write().map_err(|source| FileError::Write { path: path.to_owned(), source })
}

/// Parses with line, column and field path in the error.
fn parse<'a, T: Deserialize<'a>>(text: &'a str) -> Result<T, FileError> {
    let mut reader = ron::Deserializer::from_str(text).map_err(|e| FileError::syntax(&e, ""))?;
    match serde_path_to_error::deserialize(&mut reader) {
        Ok(value) => {
            reader.end().map_err(|code| FileError::syntax(&reader.span_error(code), ""))?;
            Ok(value)
        }
        Err(error) => {
            let path = error.path().to_string();
            Err(FileError::syntax(&reader.span_error(error.into_inner()), &path))
        }
    }
}

#[cfg(test)]
mod tests;
