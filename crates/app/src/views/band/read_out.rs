//! The values at the cursor.

use eframe::egui::{self, RichText, Role, Sense, Slider, WidgetInfo, vec2};
use sheet::tokens::Ink;
use station::report::{FrequencyReport, ProfilePoint};
use station::units;

use super::{BandState, Shown, model};
use crate::explain::Explain as _;
use crate::theme::color;
use crate::views::marks;

/// Height of a row of values.
const ROW: f32 = 16.0;

impl Shown<'_> {
    /// The frequency at the cursor: the one nearest to it, or the middle of the band.
    pub(super) fn cursor_point(&self, state: &BandState) -> &FrequencyReport {
        match state.cursor_hz {
            Some(hz) if (self.band.low_hz..=self.band.high_hz).contains(&hz) => {
                &self.band.points[model::nearest(self.band, hz)]
            }
            _ => self.band.middle_point(),
        }
    }

    /// Whether the band is a list of channels.
    pub(super) fn is_list(&self) -> bool {
        let planned = self.snapshot.plan.bands.get(self.snapshot.band);
        planned.is_some_and(|b| matches!(b.range, station::plan::BandRange::Channels { .. }))
    }
}

/// Draws the read-out.
pub(super) fn show(ui: &mut egui::Ui, shown: &Shown<'_>, state: &mut BandState) {
    let ground = shown.snapshot.ground;
    let faint = color(Ink::Faint, ground);
    cursor_slider(ui, shown, state);
    let point = shown.cursor_point(state);
    let names = &shown.report.feed_names;

    let title = ui.heading(units::megahertz(point.frequency_hz));
    let whole = ui.interact(title.rect, ui.scope_id().with("values"), Sense::hover());
    whole.widget_info(|| {
        let mut info = WidgetInfo::labeled(Role::Status, true, "at the cursor");
        info.current_text_value = Some(model::sentence(point, names));
        info
    });
    let _ = whole.explain("The frequency under the cursor; point at a plot or drag the slider to move it.");

    let z = point.feedpoint_ohm;
    let sign = if z.im < 0.0 { '−' } else { '+' };
    ui.label(format!("{} Ω {sign} j{} Ω", units::short(z.re), units::short(z.im.abs())));
    ui.label(RichText::new("at the feedpoint").small().color(faint));
    ui.add_space(6.0);
    ui.spacing_mut().interact_size.y = ROW;
    egui::Grid::new("values at the cursor").num_columns(1 + names.len()).spacing([10.0, 4.0]).show(
        ui,
        |ui| {
            letters(ui, shown, "");
            for row in model::rows(point) {
                let label = ui.label(RichText::new(row.label).small().color(faint));
                let _ = label.explain(row.sentence);
                for value in row.values {
                    ui.label(RichText::new(value).small());
                }
                ui.end_row();
            }
        },
    );
    ui.add_space(10.0);
    along(ui, shown, state);
}

/// A head line with the feeds' letters.
fn letters(ui: &mut egui::Ui, shown: &Shown<'_>, title: &str) {
    ui.label(title);
    for feed in 0..shown.report.feed_names.len() {
        let letter = RichText::new(marks::letter(feed).to_string()).strong();
        ui.label(letter.color(color(Ink::feed(feed), shown.snapshot.ground)));
    }
    ui.end_row();
}

/// The cursor by keyboard: arrow keys step from frequency to frequency.
fn cursor_slider(ui: &mut egui::Ui, shown: &Shown<'_>, state: &mut BandState) {
    let last = shown.band.points.len().saturating_sub(1);
    let mut index = model::nearest(shown.band, shown.cursor_point(state).frequency_hz);
    let label = ui.label(RichText::new("cursor").small().color(color(Ink::Faint, shown.snapshot.ground)));
    ui.spacing_mut().slider_width = ui.available_width() - 4.0;
    let slider = Slider::new(&mut index, 0..=last).show_value(false).trailing_fill(true);
    let response = ui.add_enabled(last > 0, slider).labelled_by(label.id);
    if response.changed() {
        state.cursor_hz = Some(shown.band.points[index].frequency_hz);
        ui.request_repaint();
    }
    let _ = response.explain("Moves the cursor of all plots; arrow keys step from frequency to frequency.");
    ui.add_space(4.0);
}

/// Volts and amperes at the cursor along the lines.
fn along(ui: &mut egui::Ui, shown: &Shown<'_>, state: &BandState) {
    let faint = color(Ink::Faint, shown.snapshot.ground);
    let Some(along_m) = state.along_m else {
        let hint =
            RichText::new("Point at a plot of volts or amperes to read the line.").small().color(faint);
        ui.label(hint);
        return;
    };
    ui.label(shown.snapshot.units.length(along_m));
    ui.label(RichText::new("from the wire along the line, peak").small().color(faint));
    ui.allocate_space(vec2(1.0, 2.0));
    egui::Grid::new("values along the line").spacing([10.0, 4.0]).show(ui, |ui| {
        letters(ui, shown, "");
        let mut row = |name: &str, text: fn(ProfilePoint) -> String| {
            ui.label(RichText::new(name).small().color(faint));
            for feed in &shown.band.feeds {
                let at = model::along(&feed.profile, along_m);
                ui.label(RichText::new(at.map_or_else(|| "—".to_owned(), text)).small());
            }
            ui.end_row();
        };
        row("volts", |p| units::volts(p.peak_v));
        row("amperes", |p| units::amperes(p.peak_a));
    });
}
