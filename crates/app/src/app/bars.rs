//! The bars over and under the views.

use eframe::egui::{self, Align, Layout, RichText, Ui};
use sheet::tokens::{Ground, Ink};
use station::evaluate::Proof;
use station::units::Units;

use super::{Wirewright, findings};
use crate::command::{Command, Desk, Show, Theme, View};
use crate::explain::{self, Explain as _};
use crate::{keys, theme};

const TOP_HEIGHT: f32 = 40.0;
const STATUS_HEIGHT: f32 = 28.0;

impl Wirewright {
    /// File menu, name, tabs, undo and redo.
    pub(super) fn top_bar(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        let panel = egui::Panel::top("top bar").exact_size(TOP_HEIGHT).resizable(false).frame(bar(ui));
        panel.show(ui, |ui| {
            ui.with_layout(Layout::left_to_right(Align::Center), |ui| {
                self.file_menu(ui, out);
                ui.add_space(6.0);
                with_right_end(
                    ui,
                    "top bar's right end",
                    |ui| self.name(ui),
                    |ui| {
                        self.tabs(ui, out);
                        ui.add_space(18.0);
                        self.steps(ui, out);
                    },
                );
            });
        });
    }

    fn file_menu(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        let entry = |ui: &mut Ui, words: &str, sentence: &str, desk: Desk| -> Option<Command> {
            let command = Command::Desk(desk);
            let keys = keys::of(ui.ctx(), &command, &self.looks);
            let clicked = ui.add(egui::Button::new(words).shortcut_text(keys)).explain(sentence).clicked();
            clicked.then_some(command)
        };
        ui.menu_button("File", |ui| {
            ui.set_min_width(220.0);
            out.extend(entry(ui, "New", "A small plan to begin with", Desk::NewPlan));
            out.extend(entry(ui, "Open…", "Another plan from a file", Desk::Open));
            ui.menu_button("Recent files", |ui| {
                let recent = &self.desk.settings().recent;
                if recent.is_empty() {
                    ui.label("none yet");
                }
                for path in recent {
                    let name = path.file_name().unwrap_or_default().to_string_lossy();
                    if ui.button(name).explain(path.display().to_string()).clicked() {
                        out.push(Command::Desk(Desk::OpenPath(path.clone())));
                    }
                }
            });
            ui.separator();
            out.extend(entry(ui, "Save", "Writes the plan to its file", Desk::Save));
            out.extend(entry(ui, "Save as…", "Writes the plan to another file", Desk::SaveAs));
            out.extend(entry(
                ui,
                "Save sheet…",
                "Writes the page for the crew as PDF, SVG or PNG, as the file's name ends",
                Desk::SaveSheet,
            ));
            out.extend(entry(ui, "Print sheet", "Sends the page for the crew to the printer, or to the PDF viewer where there is no print command", Desk::PrintSheet));
            ui.separator();
            out.extend(entry(ui, "Commands by key", "Every command that has a key", Desk::Help));
            out.extend(entry(ui, "Quit", "Closes the window", Desk::Quit));
        });
    }

    fn name(&self, ui: &mut Ui) {
        let unsaved = self.document.is_unsaved();
        let star = if unsaved { " *" } else { "" };
        let name = RichText::new(format!("{}{star}", self.document.plan().name)).heading();
        let file = match self.document.path() {
            Some(path) => format!("{}", path.display()),
            None => "not in a file yet".to_owned(),
        };
        let state = if unsaved { "; with changes that are not saved" } else { "" };
        ui.add(egui::Label::new(name).truncate()).explain(format!("{file}{state}"));
    }

    fn tabs(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        for (view, words, sentence) in [
            (View::Yard, "Yard", "The site to scale, the standing wave, and a lane for each band"),
            (View::Band, "Band", "The chosen band in depth: impedance, SWR, the feed line"),
            (View::Sheet, "Sheet", "The page for the crew, as it will print"),
            (
                View::Station,
                "Station",
                "What the station is: names, supports, wire, earth, and the bands that must work",
            ),
        ] {
            let command = Command::Show(Show::View(view));
            let keys = keys::of(ui.ctx(), &command, &self.looks);
            let tab = ui.selectable_label(self.looks.view == view, RichText::new(words).size(14.5));
            if tab.explain(format!("{sentence} ({keys})")).clicked() {
                out.push(command);
            }
        }
    }

    fn steps(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        for (command, words, possible) in [
            (Command::Undo, "Undo", self.document.can_undo()),
            (Command::Redo, "Redo", self.document.can_redo()),
        ] {
            let keys = keys::of(ui.ctx(), &command, &self.looks);
            let button = ui.add_enabled(possible, egui::Button::new(words));
            if button.explain(format!("{words} one step ({keys})")).clicked() {
                out.push(command);
            }
        }
    }

    /// Model and time, what is under the pointer, units, light or dark.
    pub(super) fn status_bar(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        let under_pointer = explain::take(ui.ctx());
        let panel = egui::Panel::bottom("status").exact_size(STATUS_HEIGHT).resizable(false).frame(bar(ui));
        panel.show(ui, |ui| {
            ui.with_layout(Layout::left_to_right(Align::Center), |ui| {
                let (mut shown, mut asked) = (Vec::new(), Vec::new());
                with_right_end(
                    ui,
                    "status bar's right end",
                    |ui| self.sentences(ui, &under_pointer, &mut shown),
                    |ui| {
                        ui.separator();
                        self.units(ui, &mut asked);
                        self.theme_menu(ui, &mut asked);
                    },
                );
                out.extend(shown.into_iter().chain(asked));
            });
        });
    }

    /// From left to right: where the numbers come from, what to look at, what is under the pointer.
    fn sentences(&self, ui: &mut Ui, under_pointer: &str, out: &mut Vec<Command>) {
        self.model(ui);
        ui.separator();
        let found = self.answers.report(&self.document).map_or(&[][..], |report| &report.findings);
        if !found.is_empty() {
            findings::show(ui, found, out);
            ui.separator();
        }
        let sentence = match &self.stop {
            Some(stop) => RichText::new(format!("no further: {stop}")).color(ui.visuals().warn_fg_color),
            None => RichText::new(under_pointer),
        };
        ui.add(egui::Label::new(sentence.small()).truncate());
    }

    fn model(&self, ui: &mut Ui) {
        let ground = theme::ground_of(ui.visuals());
        let (words, ink, sentence) = match (self.answers.fault(), self.answers.report(&self.document)) {
            (Some(fault), _) => ("no answer".to_owned(), Ink::OutOfRange, fault.to_owned()),
            (None, None) => {
                ("computing…".to_owned(), Ink::Faint, "The first numbers are on their way".to_owned())
            }
            (None, Some(report)) => {
                let milliseconds = self.answers.took().as_secs_f64() * 1e3;
                let time = station::units::short(milliseconds);
                let proof = proof_words(self.answers.proofs());
                let words = format!("{}{proof}, {time} ms", report.model.name());
                let sentence = format!(
                    "{words}: the model that made the numbers, its energy balance (watts accounted for, of those at the \
                     feedpoint), its difference from a finer mesh, and how long all bands took"
                );
                (words, Ink::Faint, sentence)
            }
        };
        ui.label(RichText::new(words).small().color(theme::color(ink, ground))).explain(sentence);
    }

    fn units(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        for (units, sentence) in
            [(Units::Metres, "Lengths in metres (M)"), (Units::Feet, "Lengths in feet (M)")]
        {
            let button =
                ui.selectable_label(self.looks.units == units, RichText::new(units.symbol()).small());
            if button.explain(sentence).clicked() {
                out.push(Command::Show(Show::Units(units)));
            }
        }
    }

    fn theme_menu(&self, ui: &mut Ui, out: &mut Vec<Command>) {
        let choices = [
            (Theme::Desktop, "Light or dark as the desktop"),
            (Theme::Light, "Light"),
            (Theme::Dark, "Dark"),
        ];
        let now = match (self.looks.theme, theme::ground_of(ui.visuals())) {
            (Theme::Dark, _) | (Theme::Desktop, Ground::Dark) => "dark",
            _ => "light",
        };
        let menu = ui.menu_button(RichText::new(now).small(), |ui| {
            for (theme, words) in choices {
                if ui.radio(self.looks.theme == theme, words).clicked() {
                    out.push(Command::Show(Show::Theme(theme)));
                    ui.close();
                }
            }
        });
        menu.response.explain("Light or dark, or as the desktop");
    }
}

/// Two parts of a bar, the second at its right end. Both are made from left to right, so that the Tab key goes that
/// way; the first has the room that the second leaves.
fn with_right_end(ui: &mut Ui, name: &str, left: impl FnOnce(&mut Ui), right: impl FnOnce(&mut Ui)) {
    let id = ui.make_persistent_id(name);
    // Known from the last frame.
    let width = ui.data(|data| data.get_temp::<f32>(id));
    let gap = ui.spacing().item_spacing.x;
    let room = (ui.available_width() - width.unwrap_or_default() - gap).max(0.0);
    let size = egui::vec2(room, ui.available_height());
    ui.allocate_ui_with_layout(size, Layout::left_to_right(Align::Center), |ui| {
        left(ui);
        ui.add_space(ui.available_width());
    });
    let end = ui.scope(right).response.rect.width();
    if width.is_none_or(|width| (width - end).abs() > 0.5) {
        ui.data_mut(|data| data.insert_temp(id, end));
        ui.request_discard("the right end of a bar found its width");
    }
}

/// The frame of a bar.
fn bar(ui: &Ui) -> egui::Frame {
    let ground = theme::ground_of(ui.visuals());
    egui::Frame::new().fill(theme::color(Ink::Panel, ground)).inner_margin(egui::Margin::symmetric(10, 0))
}

/// The worst of all bands, as it stands in the status line; nothing before there is any.
fn proof_words(proofs: &[Proof]) -> String {
    if proofs.is_empty() {
        return String::new();
    }
    let off = |proof: &Proof| proof.energy_balance().map(|balance| (balance - 1.0).abs());
    let balance = proofs.iter().filter_map(off).reduce(f64::max);
    let mesh = proofs.iter().map(|proof| proof.mesh_error).fold(0.0, f64::max);
    let balance = balance.map_or_else(String::new, |off| {
        format!(", energy balance {} %", station::units::fixed(100.0 * (1.0 - off), 1))
    });
    format!("{balance}, mesh ±{} %", station::units::fixed(100.0 * mesh, 2))
}
