//! The site in side view.

use station::hang::Hung;
use station::plan::Plan;
use station::units::Units;

use crate::page::{Block, Section};

/// Least and most height of the drawing on the sheet, mm.
pub(crate) const LEAST_HEIGHT_MM: f64 = 55.0;
/// See [`LEAST_HEIGHT_MM`].
pub(crate) const MOST_HEIGHT_MM: f64 = 90.0;

pub(crate) fn section(_plan: &Plan, _hung: &Hung, _units: Units, _width_mm: f64, height_mm: f64) -> Section {
    Section {
        title: "Site, from the side".to_owned(),
        aside: String::new(),
        columns: None,
        blocks: vec![Block::empty(height_mm - 12.0)],
    }
}
