//! Drawings and pages of the station plan sheet: a scene in millimetres, its page layout, and what writes it.
//!
//! `plan and report -> model (words and numbers) -> page (layout) -> scene -> pdf, svg, png, or the window's preview`.

pub mod drawing;
mod error;
pub mod fonts;
pub mod model;
mod page;
pub mod pdf;
pub mod png;
mod request;
pub mod scene;
pub mod svg;
pub mod swr_scale;
pub mod text;
pub mod tokens;

pub use error::SheetError;
pub use request::{Date, Paper, SheetRequest};

use model::SheetModel;
use scene::Scene;
use station::plan::Plan;
use station::report::Report;

/// Lays the sheet of a plan out, one scene per page.
///
/// # Errors
/// [`SheetError::Mismatch`] where the report belongs to another plan.
pub fn lay_out(plan: &Plan, report: &Report, request: &SheetRequest) -> Result<Vec<Scene>, SheetError> {
    let model = SheetModel::new(plan, report, request)?;
    Ok(page::lay_out(&model, plan, &report.hung, request))
}

/// The sheet of a plan as a PDF: the same bytes for the same plan, report and request.
///
/// # Errors
/// [`SheetError::Mismatch`] where the report belongs to another plan; [`SheetError::Pdf`] where the writer fails.
pub fn pdf_for(plan: &Plan, report: &Report, request: &SheetRequest) -> Result<Vec<u8>, SheetError> {
    let pages = lay_out(plan, report, request)?;
    let meta = pdf::Meta {
        title: format!("{}: station plan sheet", fonts::printable(&plan.name)),
        subject: fonts::printable(&plan.purpose),
        date: request.date,
    };
    pdf::write(&pages, &meta)
}
