//! Band view: the chosen band in depth, with one cursor for all plots.

mod curve;
pub mod layout;
pub mod model;
mod plots;
mod read_out;

use eframe::egui::{self, Id, RichText, UiBuilder};
use sheet::tokens::{Ink, Pattern};
use station::report::{BandReport, Report};

use crate::command::{Command, Show};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::theme::color;
use crate::views::lanes::model::Lane;
use crate::views::marks;
use model::{Curves, Key};

/// What the band view remembers: nothing of the plan.
#[derive(Clone, Debug, Default)]
pub struct BandState {
    /// The cursor, Hz; the middle of the band until a plot was touched.
    pub cursor_hz: Option<f64>,
    /// The cursor along the feed lines, m from the wire.
    pub along_m: Option<f64>,
    /// Curves of the newest answer.
    curves: Option<Curves>,
}

/// How much of a stale answer shows.
const DIMMED: f32 = 0.55;
/// Seconds until a stale answer is fully dimmed; while dragging it never gets that far.
const DIM_SECONDS: f32 = 0.6;

/// Draws the band view.
pub fn show(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, state: &mut BandState, out: &mut Vec<Command>) {
    let found = snapshot.report.and_then(|report| Some((report, report.bands.get(snapshot.band)?)));
    let Some((report, band)) = found else {
        let words = if snapshot.plan.bands.is_empty() { "No band is chosen." } else { "Being worked out." };
        ui.label(RichText::new(words).color(color(Ink::Faint, snapshot.ground)));
        return;
    };
    let key =
        Key { revision: report.revision, model: report.model, band: snapshot.band, units: snapshot.units };
    if state.curves.as_ref().is_none_or(|curves| curves.key != key) {
        state.curves = Curves::new(report, snapshot.band, snapshot.units);
    }
    // The curves are lent to the plots while the cursor may move: take them out for the time of drawing.
    let Some(curves) = state.curves.take() else {
        return;
    };
    let fade = ui.ctx().animate_bool_with_time(Id::unique("band view is stale"), snapshot.stale, DIM_SECONDS);
    ui.scope(|ui| {
        ui.multiply_opacity(1.0 - fade * (1.0 - DIMMED));
        head(ui, snapshot, report, band, out);
        let shown = Shown { snapshot, report, band, curves: &curves };
        egui::ScrollArea::vertical().id_salt("band view").auto_shrink(false).show(ui, |ui| {
            let room = ui.available_rect_before_wrap();
            let room = room.with_max_x(room.right() - 8.0);
            let places = layout::places(room, report.feed_names.len());
            ui.allocate_rect(places.whole, egui::Sense::hover());
            for (plot, (title, place)) in layout::Plot::ALL.into_iter().zip(places.plots) {
                plots::show(ui, &shown, plot, (title, place), state);
            }
            let within = UiBuilder::new().id_salt("read-out").max_rect(places.read_out);
            ui.scope_builder(within, |ui| read_out::show(ui, &shown, state));
        });
    });
    state.curves = Some(curves);
}

/// What the parts of the view read.
struct Shown<'a> {
    snapshot: &'a Snapshot<'a>,
    report: &'a Report,
    band: &'a BandReport,
    curves: &'a Curves,
}

/// Name, frequencies, and each feed's line pattern and verdict.
fn head(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    report: &Report,
    band: &BandReport,
    out: &mut Vec<Command>,
) {
    let ground = snapshot.ground;
    let lane = Lane::of(snapshot, snapshot.band, band);
    ui.horizontal(|ui| {
        picker(ui, snapshot, report, band, out);
        ui.label(RichText::new(lane.frequencies()).color(color(Ink::Faint, ground)));
    });
    for (feed, name) in report.feed_names.iter().enumerate() {
        ui.horizontal(|ui| {
            ui.spacing_mut().item_spacing.x = 6.0;
            sample(ui, snapshot, Ink::feed(feed), Pattern::feed(feed));
            let letter = RichText::new(marks::letter(feed).to_string()).color(color(Ink::feed(feed), ground));
            ui.label(letter);
            ui.label(name);
            let Some(found) = band.feeds.get(feed) else {
                return;
            };
            let (_, place) = ui.allocate_space(egui::vec2(16.0, 16.0));
            marks::verdict(ui.painter(), place.center(), 5.0, found.verdict.kind, ground);
            let rest =
                format!("{}, {}. {}", found.verdict.kind.words(), lane.covered(feed), found.verdict.reason);
            ui.add(egui::Label::new(rest).truncate());
        });
    }
    ui.add_space(4.0);
}

/// The band's name; click it for the others, or step through them by up and down.
fn picker(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    report: &Report,
    band: &BandReport,
    out: &mut Vec<Command>,
) {
    let mut wanted = snapshot.band;
    let picker = egui::ComboBox::from_id_salt("band").selected_text(RichText::new(&band.name).heading());
    let picker = picker.show_ui(ui, |ui| {
        for (index, other) in report.bands.iter().enumerate() {
            ui.selectable_value(&mut wanted, index, &other.name);
        }
    });
    let _ = picker
        .response
        .accessible_name("band")
        .explain("The band that this view shows. Up and down step through all.");
    if ui.memory(egui::Memory::focused).is_none() {
        let pressed = |key| ui.input_mut(|input| input.consume_key(egui::Modifiers::NONE, key));
        if pressed(egui::Key::ArrowDown) {
            wanted = (wanted + 1).min(report.bands.len() - 1);
        } else if pressed(egui::Key::ArrowUp) {
            wanted = wanted.saturating_sub(1);
        }
    }
    if wanted != snapshot.band {
        out.push(Command::Show(Show::Band(wanted)));
    }
}

/// A short piece of line in the pattern of a curve.
fn sample(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, ink: Ink, pattern: Pattern) {
    let (_, place) = ui.allocate_space(egui::vec2(26.0, 14.0));
    let mut shapes = Vec::new();
    let ends = vec![place.left_center(), place.right_center()];
    marks::patterned(
        ends,
        pattern,
        marks::stroke(sheet::tokens::Pen::Curve, ink, snapshot.ground),
        &mut shapes,
    );
    ui.painter().extend(shapes);
}
