//! The station in words and numbers: what it is, what stands on the site, the wires and their loads, and the bands that
//! must work.

mod about;
mod bands;
mod earthing;
mod loads;
mod site;
mod typed;
mod wires;

use eframe::egui::{self, CornerRadius, Frame, Margin, RichText, Role, ScrollArea, Ui, UiBuilder};
use sheet::tokens::Ink;

use crate::command::Command;
use crate::snapshot::Snapshot;
use crate::theme;

/// What the view remembers.
#[derive(Default)]
pub struct StationState {
    typed: typed::Typed,
    offer: bands::Offer,
}

/// Below this width the boxes stand in one column, points.
const TWO_COLUMNS: f32 = 900.0;

/// Draws the boxes in one or two columns.
pub fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, state: &mut StationState, out: &mut Vec<Command>) {
    ScrollArea::vertical().auto_shrink(false).show(ui, |ui| {
        if ui.available_width() < TWO_COLUMNS {
            station(ui, snapshot, state, out);
            site(ui, snapshot, state, out);
            frame(ui, snapshot, "Bands that must work", |ui| bands::show(ui, snapshot, state, out));
        } else {
            ui.columns_const(|[left, right]| {
                station(left, snapshot, state, out);
                frame(right, snapshot, "Bands that must work", |ui| bands::show(ui, snapshot, state, out));
                site(right, snapshot, state, out);
            });
        }
    });
}

/// What it is, and what hangs.
fn station(ui: &mut Ui, snapshot: &Snapshot<'_>, state: &mut StationState, out: &mut Vec<Command>) {
    frame(ui, snapshot, "What it is", |ui| about::show(ui, snapshot, &mut state.typed, out));
    frame(ui, snapshot, "Wires", |ui| wires::show(ui, snapshot, &mut state.typed, out));
    frame(ui, snapshot, "Loads in the wires", |ui| loads::show(ui, snapshot, &mut state.typed, out));
}

/// What it hangs on and over.
fn site(ui: &mut Ui, snapshot: &Snapshot<'_>, state: &mut StationState, out: &mut Vec<Command>) {
    frame(ui, snapshot, "Earth and entrance", |ui| site::earth_and_entrance(ui, snapshot, out));
    frame(ui, snapshot, "Supports", |ui| site::supports(ui, snapshot, &mut state.typed, out));
}

/// A box with its title.
fn frame(ui: &mut Ui, snapshot: &Snapshot<'_>, title: &str, content: impl FnOnce(&mut Ui)) {
    Frame::new()
        .fill(theme::color(Ink::Background, snapshot.ground))
        .stroke(theme::hairline(Ink::Rule, snapshot.ground))
        .corner_radius(CornerRadius::same(6))
        .inner_margin(Margin::same(12))
        .show(ui, |ui| {
            ui.set_width(ui.available_width());
            ui.label(RichText::new(title).family(theme::bold()));
            ui.add_space(4.0);
            content(ui);
        });
    ui.add_space(10.0);
}

/// Fields beside each other under one name.
fn group(ui: &mut Ui, name: &str, content: impl FnOnce(&mut Ui)) {
    let group = UiBuilder::new().accessibility_role(Role::Group).accessibility_label(name);
    ui.scope_builder(group, |ui| ui.horizontal(content));
}

/// Fields below each other with their labels.
fn grid(ui: &mut Ui, name: &str, content: impl FnOnce(&mut Ui)) {
    egui::Grid::new(name).num_columns(2).spacing([10.0, 6.0]).show(ui, content);
}
