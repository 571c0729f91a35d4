//! How the views share the window.

use eframe::egui::{self, Frame, Margin, Ui};
use sheet::tokens::Ink;

use super::Wirewright;
use crate::command::{Command, View};
use crate::theme;

/// Widths of the feed paths' panel.
const FEEDS_WIDTH: (f32, f32, f32) = (220.0, 300.0, 460.0);
/// Least height of the yard and of the lanes.
const LEAST_HEIGHT: f32 = 140.0;
/// Share of the height that the lanes have at first.
const LANES_SHARE: f32 = 0.44;

impl Wirewright {
    /// Everything inside the window, bars first.
    pub(super) fn paint(&mut self, ui: &mut Ui, out: &mut Vec<Command>) {
        self.top_bar(ui, out);
        self.desk.show_notice(ui);
        self.status_bar(ui, out);
        // The views keep state while they read the rest: take it out for the time of painting.
        let mut views = std::mem::take(&mut self.views);
        let snapshot = self.snapshot(ui.visuals());
        let ground = snapshot.ground;
        let body = |ink| Frame::new().fill(theme::color(ink, ground));
        if self.looks.view != View::Sheet {
            let (least, usual, most) = FEEDS_WIDTH;
            egui::Panel::left("feed paths")
                .default_size(usual)
                .size_range(least..=most)
                .frame(body(Ink::Background).inner_margin(Margin::same(10)))
                .show(ui, |ui| views.feed_paths(ui, &snapshot, out));
        }
        match self.looks.view {
            View::Yard => {
                let height = ui.available_height();
                egui::Panel::bottom("lanes")
                    .resizable(true)
                    .default_size(height * LANES_SHARE)
                    .size_range(LEAST_HEIGHT..=(height - LEAST_HEIGHT).max(LEAST_HEIGHT))
                    .frame(body(Ink::Background).inner_margin(Margin::symmetric(10, 6)))
                    .show(ui, |ui| views.lanes(ui, &snapshot, out));
                egui::CentralPanel::default()
                    .frame(body(Ink::Background))
                    .show(ui, |ui| views.yard(ui, &snapshot, out));
            }
            View::Band => {
                egui::CentralPanel::default()
                    .frame(body(Ink::Background).inner_margin(Margin::same(10)))
                    .show(ui, |ui| views.band(ui, &snapshot, out));
            }
            View::Station => {
                egui::CentralPanel::default()
                    .frame(body(Ink::Panel).inner_margin(Margin::same(10)))
                    .show(ui, |ui| views.station(ui, &snapshot, out));
            }
            View::Sheet => {
                let paper = self.looks.paper;
                egui::CentralPanel::default()
                    .frame(body(Ink::Raised))
                    .show(ui, |ui| views.sheet(ui, &snapshot, paper, out));
            }
        }
        self.views = views;
    }
}
