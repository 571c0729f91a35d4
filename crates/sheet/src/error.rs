//! Why a sheet cannot be made.

use thiserror::Error;

/// Why a sheet cannot be made.
#[derive(Clone, Debug, PartialEq, Eq, Error)]
pub enum SheetError {
    /// The date is not a calendar date.
    #[error("date: \"{0}\" is not a date; accepted: year-month-day such as 2026-12-01")]
    Date(String),
    /// The report belongs to another plan.
    #[error("the report does not belong to this plan: it has {report} {what}, the plan has {plan}")]
    Mismatch {
        /// What was counted.
        what: &'static str,
        /// How many the plan has.
        plan: usize,
        /// How many the report has.
        report: usize,
    },
    /// The picture could not be drawn.
    #[error("the picture could not be drawn: {0}")]
    Picture(String),
    /// The PDF could not be written.
    #[error("the PDF could not be written: {0}")]
    Pdf(String),
}
