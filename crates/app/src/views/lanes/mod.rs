//! Lanes: one row per band, told at a glance.

pub mod layout;
pub mod model;
mod paint;
mod row;

use std::collections::BTreeSet;

use eframe::egui::{self, Id, Key, Modifiers, Sense, UiBuilder};
use sheet::tokens::{Ink, Pen};

use crate::command::{Command, Show};
use crate::snapshot::Snapshot;
use crate::theme::color;
use model::{Lane, Order};

/// What the lanes remember: nothing of the plan.
#[derive(Clone, Debug, Default)]
pub struct LanesState {
    /// How the lanes are ordered.
    pub order: Order,
    /// Bands that stay on top, by name.
    pub pinned: BTreeSet<String>,
    /// The band that was chosen when the lanes were last drawn; the view scrolls to it when it changes.
    shown: Option<usize>,
}

/// How much of a stale answer shows.
const DIMMED: f32 = 0.55;
/// Seconds until a stale answer is fully dimmed; while dragging it never gets that far.
const DIM_SECONDS: f32 = 0.6;

/// Draws the lanes.
pub fn show(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, state: &mut LanesState, out: &mut Vec<Command>) {
    let names = feed_names(snapshot);
    let mut lanes = model::lanes(snapshot);
    model::sort(&mut lanes, state.order, &state.pinned, snapshot.feed);

    let columns = layout::columns(ui.available_rect_before_wrap().x_range(), names.len());
    row::header(ui, snapshot, &columns, &names, state);

    let fade = ui.ctx().animate_bool_with_time(Id::unique("lanes are stale"), snapshot.stale, DIM_SECONDS);
    egui::ScrollArea::vertical().id_salt("lanes").auto_shrink(false).show(ui, |ui| {
        ui.spacing_mut().item_spacing.y = 0.0;
        ui.scope_builder(
            UiBuilder::new().accessibility_role(egui::Role::ListBox).accessibility_label("lanes"),
            |ui| {
                ui.multiply_opacity(1.0 - fade * (1.0 - DIMMED));
                let height = layout::lane_height(names.len());
                let pins = lanes.iter().filter(|lane| state.pinned.contains(lane.name)).count();
                let ids: Vec<Id> =
                    lanes.iter().map(|lane| ui.make_persistent_id(("lane", lane.band))).collect();
                for (place, lane) in lanes.iter().enumerate() {
                    let (_, rect) = ui.allocate_space([ui.available_width(), height].into());
                    let response = ui.interact(rect, ids[place], Sense::click());
                    let drawn = row::Row { snapshot, columns: &columns, names: &names, lane, rect };
                    drawn.show(ui, &response, state);
                    if place + 1 == pins && pins < lanes.len() {
                        let pen = crate::views::marks::stroke(Pen::Fine, Ink::Faint, snapshot.ground);
                        ui.painter().hline(rect.x_range(), rect.bottom(), pen);
                    }
                    let chosen = lane.band == snapshot.band;
                    if response.clicked() {
                        response.request_focus();
                        out.push(Command::Show(Show::Band(lane.band)));
                    }
                    if chosen && state.shown != Some(lane.band) {
                        ui.scroll_to_rect(rect, None);
                    }
                }
                keys(ui, snapshot, &lanes, &ids, out);
            },
        );
        if lanes.is_empty() {
            let words = egui::RichText::new("No bands yet: add the bands or channels that must work.");
            ui.label(words.color(color(Ink::Faint, snapshot.ground)));
        }
    });
    state.shown = Some(snapshot.band);
}

/// Names of the feeds as far as the lanes can show them: the report's, or the plan's before the first answer.
fn feed_names(snapshot: &Snapshot<'_>) -> Vec<String> {
    match snapshot.report {
        Some(report) => report.feed_names.clone(),
        None => snapshot.plan.feeds.iter().map(|feed| feed.name.clone()).collect(),
    }
}

/// Up and down choose the neighbouring lane, Home and End the first and the last: when a lane has the focus, or when
/// nothing has.
fn keys(ui: &egui::Ui, snapshot: &Snapshot<'_>, lanes: &[Lane<'_>], ids: &[Id], out: &mut Vec<Command>) {
    let focused = ui.memory(egui::Memory::focused);
    let place = focused.and_then(|id| ids.iter().position(|&lane| lane == id));
    if let Some(place) = place {
        let arrows = egui::EventFilter { vertical_arrows: true, ..egui::EventFilter::default() };
        ui.memory_mut(|memory| memory.set_focus_lock_filter(ids[place], arrows));
    } else if focused.is_some() || lanes.is_empty() {
        return;
    }
    let chosen = lanes.iter().position(|lane| lane.band == snapshot.band);
    let from = place.or(chosen).unwrap_or(0);
    let last = lanes.len() - 1;
    let pressed = |key| ui.input_mut(|input| input.consume_key(Modifiers::NONE, key));
    let to = if pressed(Key::ArrowDown) {
        (from + 1).min(last)
    } else if pressed(Key::ArrowUp) {
        from.saturating_sub(1)
    } else if place.is_some() && pressed(Key::Home) {
        0
    } else if place.is_some() && pressed(Key::End) {
        last
    } else {
        return;
    };
    if place.is_some() {
        ui.memory_mut(|memory| memory.request_focus(ids[to]));
    }
    out.push(Command::Show(Show::Band(lanes[to].band)));
}
