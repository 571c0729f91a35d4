//! `wirewright report`: the numbers of a plan as a table or as JSON.

mod table;

use std::io::{ErrorKind, Write as _};

use station::evaluate::Evaluator;
use station::report::json;

use super::HeadlessError;
use crate::cli::ReportArgs;

/// Frequencies that `--at` takes, MHz: what the model is for.
const RANGE_MHZ: (f64, f64) = (1.0, 60.0);

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
    let (low, high) = RANGE_MHZ;
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
