//! The station: the plan the user draws, its catalogues, validation and file, how it hangs, and the evaluator that
//! turns it into a report.

pub mod catalogue;
pub mod evaluate;
pub mod file;
pub mod hang;
pub mod plan;
pub mod report;
#[cfg(test)]
mod sample;
pub mod touchstone;
pub mod units;
pub mod validate;
