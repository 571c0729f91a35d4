//! The pick list of feed lines.

use eframe::egui;
use sheet::tokens::Ground;
use station::plan::LineChoice;

/// The list, by groups; the id of the line that was clicked.
pub(super) fn pick(ui: &mut egui::Ui, _ground: Ground, chosen: &LineChoice) -> Option<String> {
    let mut picked = None;
    for id in ["coax-rg-213", "open-wire-600"] {
        let is_chosen = *chosen == LineChoice::Catalogue(id.to_owned());
        if ui.selectable_label(is_chosen, id).clicked() && !is_chosen {
            picked = Some(id.to_owned());
        }
    }
    picked
}

/// What is known about a line, in one sentence.
pub(super) fn sentence(_line: &LineChoice) -> String {
    "The kind of feed line.".to_owned()
}

/// The line of a new link.
pub(super) fn usual() -> LineChoice {
    LineChoice::Catalogue("coax-rg-213".to_owned())
}
