//! The views. Each reads a [`crate::snapshot::Snapshot`], keeps its own small state, and asks for changes by
//! [`crate::command::Command`]s; none of them computes physics or touches the plan.
//!
//! Colours come from [`crate::theme::color`]; a widget's sentence is given with [`crate::explain::Explain::explain`],
//! a canvas says what is under the pointer with [`crate::explain::say`].

pub mod band;
pub mod feed_path;
mod fields;
pub mod lanes;
mod loads;
pub mod marks;
pub mod sheet;
mod soil;
pub mod station;
mod together;
pub mod yard;

pub use together::Views;
