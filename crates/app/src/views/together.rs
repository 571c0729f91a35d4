//! The views of the window with the state that each keeps.

use eframe::egui::Ui;

use super::{band, feed_path, lanes, sheet, station, yard};
use crate::command::Command;
use crate::snapshot::Snapshot;
use ::sheet::Paper;

/// What the views remember between two frames: nothing of the plan.
#[derive(Default)]
pub struct Views {
    yard: yard::YardState,
    lanes: lanes::LanesState,
    band: band::BandState,
    feed_path: feed_path::FeedPathState,
    sheet: sheet::SheetState,
    station: station::StationState,
}

impl Views {
    /// The site to scale.
    pub fn yard(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
        yard::show(ui, snapshot, &mut self.yard, out);
    }

    /// One row per band.
    pub fn lanes(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
        lanes::show(ui, snapshot, &mut self.lanes, out);
    }

    /// The chosen band in depth.
    pub fn band(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
        band::show(ui, snapshot, &mut self.band, out);
    }

    /// The feeds as chains.
    pub fn feed_paths(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
        feed_path::show(ui, snapshot, &mut self.feed_path, out);
    }

    /// The page for the crew.
    pub fn sheet(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, paper: Paper, out: &mut Vec<Command>) {
        sheet::show(ui, snapshot, paper, &mut self.sheet, out);
    }

    /// The station in words and numbers.
    pub fn station(&mut self, ui: &mut Ui, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
        station::show(ui, snapshot, &mut self.station, out);
    }
}
