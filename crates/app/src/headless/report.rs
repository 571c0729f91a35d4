//! `wirewright report`: the numbers of a plan as a table or as JSON.

mod table;

use std::io::{ErrorKind, Write as _};

use station::evaluate::Evaluator;
use station::report::json;
use station::validate::FREQUENCIES_HZ;

use super::HeadlessError;
use crate::cli::ReportArgs;

/// Prints the report.
///
/// # Errors
/// One sentence.
pub fn run(args: &ReportArgs) -> Result<(), HeadlessError> {
    let plan = super::load(&args.plan)?;
    let mut evaluator = Evaluator::new();
    let report = if args.at.is_empty() {
        evaluator.evaluate(&plan, 1)?
    } else {
        evaluator.evaluate_at(&plan, 1, &frequencies_hz(&args.at)?)?
    };
    let text = if args.json { json(&report) } else { table::text(&plan, &report) };
    match writeln!(std::io::stdout().lock(), "{}", text.trim_end()) {
        // The reader has seen enough: `wirewright report … | head`.
        Err(error) if error.kind() == ErrorKind::BrokenPipe => Ok(()),
        other => Ok(other?),
    }
}

fn frequencies_hz(at_mhz: &[f64]) -> Result<Vec<f64>, HeadlessError> {
    let (low, high) = (FREQUENCIES_HZ.start() / 1e6, FREQUENCIES_HZ.end() / 1e6);
    at_mhz
        .iter()
        .map(|&value| {
            if (low..=high).contains(&value) {
                Ok(value * 1e6)
            } else {
                Err(HeadlessError::Frequency { value, low, high })
            }
        })
        .collect()
}
