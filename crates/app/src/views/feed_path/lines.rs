//! The pick list of feed lines.

use eframe::egui::{self, RichText};
use sheet::tokens::{Ground, Ink};
use station::catalogue::{self, LineEntry};
use station::plan::LineChoice;

use crate::explain::Explain as _;
use crate::theme::color;

/// Headings of the list; a line belongs to the one that its id begins with.
const GROUPS: [(&str, &str); 4] = [
    ("open-wire", "Open wire"),
    ("window-line", "Window line"),
    ("ribbon", "Ribbon"),
    ("coax", "Coaxial cable"),
];

/// The list, by groups; the id of the line that was clicked.
pub(super) fn pick(ui: &mut egui::Ui, ground: Ground, chosen: &LineChoice) -> Option<String> {
    let mut picked = None;
    let mut entry = |ui: &mut egui::Ui, entry: &LineEntry| {
        let is_chosen = matches!(chosen, LineChoice::Catalogue(id) if *id == entry.id);
        let response = ui.selectable_label(is_chosen, &entry.data.name);
        if response.clicked() && !is_chosen {
            picked = Some(entry.id.clone());
        }
        let _ = response.explain(format!("{}: {}.", entry.data.name, entry.hint));
    };
    let lines = catalogue::lines();
    for (start, title) in GROUPS {
        ui.label(RichText::new(title).small().color(color(Ink::Faint, ground)));
        lines.iter().filter(|line| line.id.starts_with(start)).for_each(|line| entry(ui, line));
        ui.add_space(4.0);
    }
    let others = lines.iter().filter(|line| GROUPS.iter().all(|(start, _)| !line.id.starts_with(start)));
    others.for_each(|line| entry(ui, line));
    picked
}

/// What is known about a line, in one or two sentences.
pub(super) fn sentence(line: &LineChoice) -> String {
    match line {
        LineChoice::Own(data) => format!("{}, the station's own figures. {}", data.name, data.source),
        LineChoice::Catalogue(id) => catalogue::line_entry(id).map_or_else(
            |error| format!("{error}."),
            |entry| format!("{}: {}. Figures: {}.", entry.data.name, entry.hint, entry.data.source),
        ),
    }
}

/// The line of a new link.
pub(super) fn usual() -> LineChoice {
    LineChoice::Catalogue("coax-rg-213".to_owned())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_line_of_the_catalogue_has_a_heading() {
        for line in catalogue::lines() {
            let headings = GROUPS.iter().filter(|(start, _)| line.id.starts_with(start)).count();
            assert_eq!(headings, 1, "{}", line.id);
        }
    }

    #[test]
    fn the_line_of_a_new_link_is_in_the_catalogue() {
        assert!(catalogue::line(&usual()).is_ok());
    }
}
