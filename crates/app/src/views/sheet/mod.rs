//! The sheet as it will print.

use eframe::egui::Ui;

use crate::command::{Command, Paper};
use crate::snapshot::Snapshot;

/// What the view remembers.
#[derive(Default)]
pub struct SheetState {}

/// Draws the page.
pub fn show(ui: &mut Ui, _snapshot: &Snapshot<'_>, _paper: Paper, _state: &mut SheetState, _out: &mut Vec<Command>) {
    ui.label("sheet");
}
