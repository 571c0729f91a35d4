//! What the evaluator wants the user to know, in the status bar: how many, and on a click each sentence.

use eframe::egui::{Align, Color32, Label, Layout, RichText, Ui};
use sheet::tokens::{Ground, Ink};
use station::report::{Finding, Place, Weight};

use crate::command::{Command, Show};
use crate::explain::Explain as _;
use crate::theme;

const LIST_WIDTH: f32 = 420.0;

/// The button with its list; nothing where nothing was found.
pub(super) fn show(ui: &mut Ui, findings: &[Finding], out: &mut Vec<Command>) {
    let Some(worst) = findings.iter().map(|finding| finding.weight).min() else { return };
    let ground = theme::ground_of(ui.visuals());
    let words = RichText::new(counted(findings)).small().color(color(worst, ground));
    let menu = ui.menu_button(words, |ui| {
        ui.set_width(LIST_WIDTH);
        ui.with_layout(Layout::top_down(Align::Min), |ui| {
            for finding in findings {
                entry(ui, finding, ground, out);
            }
        });
    });
    menu.response.explain("What to look at before you build; click for the sentences");
}

fn entry(ui: &mut Ui, finding: &Finding, ground: Ground, out: &mut Vec<Command>) {
    let (word, _) = words(finding.weight);
    ui.label(RichText::new(word).small().family(theme::bold()).color(color(finding.weight, ground)));
    ui.add(Label::new(&finding.text).wrap());
    let (show, button) = match finding.place {
        Place::Band(band) => (Show::Band(band), "Show this band"),
        Place::Feed(feed) => (Show::Feed(feed), "Show this feed"),
        Place::Plan | Place::Support(_) | Place::Wire(_) => {
            ui.add_space(6.0);
            return;
        }
    };
    if ui.small_button(button).clicked() {
        out.push(Command::Show(show));
        ui.close();
    }
    ui.add_space(6.0);
}

/// "1 problem, 2 cautions".
fn counted(findings: &[Finding]) -> String {
    let parts: Vec<String> = [Weight::Problem, Weight::Caution, Weight::Note]
        .into_iter()
        .filter_map(|weight| {
            let (one, many) = words(weight);
            match findings.iter().filter(|finding| finding.weight == weight).count() {
                0 => None,
                1 => Some(format!("1 {one}")),
                count => Some(format!("{count} {many}")),
            }
        })
        .collect();
    parts.join(", ")
}

fn words(weight: Weight) -> (&'static str, &'static str) {
    match weight {
        Weight::Problem => ("problem", "problems"),
        Weight::Caution => ("caution", "cautions"),
        Weight::Note => ("note", "notes"),
    }
}

fn color(weight: Weight, ground: Ground) -> Color32 {
    let ink = match weight {
        Weight::Problem => Ink::OutOfRange,
        Weight::Caution => Ink::Caution,
        Weight::Note => Ink::Text,
    };
    theme::color(ink, ground)
}
