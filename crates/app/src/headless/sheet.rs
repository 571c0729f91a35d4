//! `wirewright sheet`: the page for the crew as PDF, SVG or PNG.

use station::evaluate::Evaluator;

use super::HeadlessError;
use crate::cli::SheetArgs;
use crate::paper::{self, Kind};

/// Writes the sheet as the file's name says.
///
/// # Errors
/// One sentence.
pub fn run(args: &SheetArgs) -> Result<(), HeadlessError> {
    Kind::of(&args.out)?; // Before anything is computed.
    let plan = super::load(&args.plan)?;
    let report = Evaluator::new().evaluate(&plan, 1)?;
    let mut request = paper::request(args.paper(), args.units());
    if let Some(date) = args.date {
        request.date = date;
    }
    paper::save(&plan, &report, &request, &args.out)?;
    Ok(())
}
