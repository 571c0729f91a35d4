//! x
use crate::command::Command;
use crate::snapshot::Snapshot;
use eframe::egui;
/// x
#[derive(Default)]
pub struct BandState;
/// x
pub fn show(_ui: &mut egui::Ui, _s: &Snapshot<'_>, _st: &mut BandState, _out: &mut Vec<Command>) {}
