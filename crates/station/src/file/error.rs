//! What can go wrong with a plan file, each as one sentence.

use std::path::PathBuf;

use thiserror::Error;

use super::Version;
use crate::validate::PlanError;

/// Why a plan file cannot be read or written.
#[derive(Debug, Error)]
pub enum FileError {
    /// The system does not give the file.
    #[error("{} cannot be read: {source}", path.display())]
    Read {
        /// The file.
        path: PathBuf,
        /// What the system says.
        source: std::io::Error,
    },
    /// The system does not take the file.
    #[error("{} cannot be written: {source}", path.display())]
    Write {
        /// The file.
        path: PathBuf,
        /// What the system says.
        source: std::io::Error,
    },
    /// Far larger than any plan.
    #[error("the file has {megabytes:.1} MB; accepted: a plan file of up to 2 MB")]
    TooLarge {
        /// Its size, 10⁶ bytes.
        megabytes: f64,
    },
    /// Not UTF-8.
    #[error("line {line}: not text; accepted: a plan file in UTF-8")]
    NotText {
        /// First line that is not text.
        line: usize,
    },
    /// Not RON, or not the fields of a plan.
    #[error("line {line}, column {column}{}: {problem}", at(field))]
    Syntax {
        /// Line, from 1.
        line: usize,
        /// Column, from 1.
        column: usize,
        /// Path of the field, where known.
        field: String,
        /// What is wrong and what was expected.
        problem: String,
    },
    /// Written by a newer program.
    #[error(
        "the file has format {found}, newer than this program; accepted: up to format {known} (update Wirewright to open it)"
    )]
    Newer {
        /// Its version.
        found: Version,
        /// The newest known.
        known: Version,
    },
    /// A version that never was.
    #[error("format: {found} does not exist; accepted: 1.0 to {known}")]
    NoSuchVersion {
        /// Its version.
        found: Version,
        /// The newest known.
        known: Version,
    },
    /// It reads well but says something impossible.
    #[error(transparent)]
    Plan(#[from] PlanError),
    /// It cannot be turned into text.
    #[error("the plan cannot be written as text: {reason}")]
    NotWritable {
        /// Why.
        reason: String,
    },
}

fn at(field: &str) -> String {
    if field.is_empty() || field == "." { String::new() } else { format!(", {field}") }
}

impl FileError {
    pub(super) fn syntax(error: &ron::error::SpannedError, field: &str) -> Self {
        let place = error.span.start;
        Self::Syntax {
            line: place.line,
            column: place.col,
            field: field.to_owned(),
            problem: explain(&error.code),
        }
    }
}

/// The reader's own words, with what is usual here where they say too little.
fn explain(code: &ron::Error) -> String {
    match code {
        ron::Error::Eof => {
            "the file ends in the middle; accepted: a whole plan file, closed by \")\"".to_owned()
        }
        ron::Error::ExpectedStructLikeEnd | ron::Error::ExpectedComma => {
            "something is missing here; accepted: a comma or a closing bracket".to_owned()
        }
        ron::Error::NoSuchStructField { expected, found, .. } => {
            format!("there is no field \"{found}\"; accepted: {}", expected.join(", "))
        }
        ron::Error::NoSuchEnumVariant { expected, found, .. } => {
            format!("there is no kind \"{found}\"; accepted: {}", expected.join(", "))
        }
        ron::Error::MissingStructField { field, .. } => {
            format!("the field \"{field}\" is missing; accepted: {field}: with its value")
        }
        ron::Error::ExpectedFloat => "this is not a number; accepted: a number such as 12.5".to_owned(),
        ron::Error::ExpectedInteger => "this is not a whole number; accepted: a number such as 2".to_owned(),
        ron::Error::ExpectedString => "this is not a text; accepted: a text in quotation marks".to_owned(),
        ron::Error::ExpectedStructLike | ron::Error::ExpectedNamedStructLike(_) => {
            "a group of fields is expected; accepted: \"(\" followed by name: value".to_owned()
        }
        other => format!("{other}; accepted: a plan file as Wirewright writes it"),
    }
}
