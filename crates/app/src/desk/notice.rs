//! The bar that says what went wrong or what is done, until it is dismissed.

use std::path::PathBuf;

use eframe::egui::{self, RichText};
use sheet::tokens::Ink;

use crate::explain::Explain as _;
use crate::theme;

/// A sentence for the user.
#[derive(Clone, Debug, PartialEq)]
pub struct Notice {
    text: String,
    is_problem: bool,
    /// A file that was made and can be shown.
    made: Option<PathBuf>,
}

/// What the hand did with the bar.
#[derive(Clone, Debug, PartialEq)]
pub enum Reaction {
    /// Looked at it.
    Nothing,
    /// Sent it away.
    Dismiss,
    /// Wants to see the file.
    ShowFile(PathBuf),
}

impl Notice {
    /// Something did not work.
    #[must_use]
    pub fn problem(text: impl Into<String>) -> Self {
        Self { text: text.into(), is_problem: true, made: None }
    }

    /// Something is done.
    #[must_use]
    pub fn done(text: impl Into<String>) -> Self {
        Self { text: text.into(), is_problem: false, made: None }
    }

    /// Something is done, and here is the file.
    #[must_use]
    pub fn made(text: impl Into<String>, file: PathBuf) -> Self {
        Self { made: Some(file), ..Self::done(text) }
    }

    /// Its sentence.
    #[must_use]
    pub fn text(&self) -> &str {
        &self.text
    }

    /// Paints it as a bar over the whole width.
    pub fn show(&self, ui: &mut egui::Ui) -> Reaction {
        let ground = theme::ground_of(ui.visuals());
        let ink = if self.is_problem { Ink::OutOfRange } else { Ink::Works };
        let mut reaction = Reaction::Nothing;
        egui::Frame::new().fill(theme::wash(ink, ground)).inner_margin(egui::Margin::symmetric(12, 5)).show(
            ui,
            |ui| {
                ui.with_layout(egui::Layout::right_to_left(egui::Align::Center), |ui| {
                    if ui.button("Dismiss").explain("Sends this line away").clicked() {
                        reaction = Reaction::Dismiss;
                    }
                    if let Some(file) = &self.made
                        && ui
                            .button("Show it")
                            .explain("Opens the file with the desktop's own viewer")
                            .clicked()
                    {
                        reaction = Reaction::ShowFile(file.clone());
                    }
                    ui.with_layout(egui::Layout::left_to_right(egui::Align::Center), |ui| {
                        let text = RichText::new(&self.text).color(theme::color(Ink::Text, ground));
                        ui.add(egui::Label::new(text).wrap());
                    });
                });
            },
        );
        reaction
    }
}
