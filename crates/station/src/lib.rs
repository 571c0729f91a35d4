//! The station: the plan the user draws, its catalogues, validation and file, how it hangs, and the evaluator that
//! turns it into a report.

pub mod hang;
pub mod plan;
pub mod report;
pub mod units;
