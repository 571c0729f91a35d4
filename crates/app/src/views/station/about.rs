//! What the station is.

use eframe::egui::Ui;

use super::grid;
use super::typed::{TextField, Typed};
use crate::command::{Command, Edit};
use crate::snapshot::Snapshot;
use crate::views::fields::{Quantity, quantity};

/// Rows of the purpose: two sentences.
const PURPOSE_ROWS: usize = 3;

/// Name, purpose, call sign, edition, and when a band counts as too lossy.
pub(super) fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, typed: &mut Typed, out: &mut Vec<Command>) {
    let plan = snapshot.plan;
    type Made = fn(String) -> Edit;
    let texts: [(&str, &str, &str, usize, Made); 4] = [
        ("station name", "Stands in the window's title and on the sheet.", &plan.name, 1, Edit::Name),
        (
            "purpose",
            "One or two sentences: what the station is for.",
            &plan.purpose,
            PURPOSE_ROWS,
            Edit::Purpose,
        ),
        ("call sign", "Call sign or station identifier; may stay empty.", &plan.call_sign, 1, Edit::CallSign),
        (
            "edition",
            "What the sheet calls this state of the plan, such as B or 2; may stay empty.",
            &plan.edition,
            1,
            Edit::Edition,
        ),
    ];
    grid(ui, "about the station", |ui| {
        for (name, sentence, text, rows, edit) in texts {
            let label = Some(ui.label(name).id);
            let (_, new) =
                typed.show(ui, &TextField { name, label, sentence, text, width: f32::INFINITY, rows });
            ui.end_row();
            if let Some(new) = new {
                out.push(Command::Edit(edit(new)));
                out.push(Command::EndOfDrag);
            }
        }
        let least = Quantity {
            label: "least share",
            sentence: "A band on which less than this share of the watts reaches the wire is called too lossy.",
            value: plan.least_share_to_wire,
            unit: 0.01,
            suffix: " %",
            range: 0.0..=99.0,
            speed: 0.5,
            decimals: 0,
        };
        if let Some(share) = quantity(ui, &least, out) {
            out.push(Command::Edit(Edit::LeastShare(share)));
        }
    });
}
