//! One lane and the head above all of them: what can be clicked, what is said on hover, what is accessible.

use eframe::egui::{self, Rangef, Rect, Response, RichText, Role, Sense, WidgetInfo, pos2, vec2};
use sheet::tokens::{Ink, Pen};
use station::units;

use super::layout::{self, Columns};
use super::model::{Lane, Order};
use super::{LanesState, paint};
use crate::explain::{self, Explain as _};
use crate::snapshot::Snapshot;
use crate::theme::{color, wash};
use crate::views::marks;

/// Height of the head.
const HEAD: f32 = 24.0;

/// Titles of the columns, and how the lanes are ordered.
pub(super) fn header(
    ui: &mut egui::Ui,
    snapshot: &Snapshot<'_>,
    columns: &Columns,
    names: &[String],
    state: &mut LanesState,
) {
    let (_, rect) = ui.allocate_space(vec2(ui.available_width(), HEAD));
    order_picker(
        ui,
        Rect::from_x_y_ranges(Rangef::new(columns.pin.min, columns.name.max), rect.y_range()),
        state,
    );
    let mut title = |column: Rangef, text: String, ink: Ink, sentence: &str| {
        let place = Rect::from_x_y_ranges(column, rect.y_range());
        let text = RichText::new(text).small().color(color(ink, snapshot.ground));
        let within =
            egui::UiBuilder::new().max_rect(place).layout(egui::Layout::left_to_right(egui::Align::Center));
        let label = egui::Label::new(text).truncate().selectable(false).sense(Sense::hover());
        let _ = ui.scope_builder(within, |ui| ui.add(label)).inner.explain(sentence);
    };
    title(
        columns.wave,
        if columns.wave.span() < 84.0 { "wave" } else { "standing wave" }.into(),
        Ink::Faint,
        "The wire stretched out: filled, the current at the moment it peaks; the line, the voltage a quarter of a \
         cycle later; the ring, the feedpoint.",
    );
    title(
        columns.impedance,
        "R ± jX".into(),
        Ink::Faint,
        "Resistance and reactance at the feedpoint, in ohms, in the middle of the band.",
    );
    for (feed, (name, column)) in names.iter().zip(&columns.strips).enumerate() {
        title(
            *column,
            if column.span() < 90.0 {
                format!("SWR {}", marks::letter(feed))
            } else {
                format!("SWR {} {name}", marks::letter(feed))
            },
            Ink::feed(feed),
            "Standing-wave ratio at the transmitter's socket across the band: the line without the matching unit, \
             the filled area with it; the dashed red line is the transmitter's limit. 1 lies at the bottom, 3 at \
             half height, total reflection at the top.",
        );
    }
    title(
        columns.gauge,
        "verdict, and watts to the sky".into(),
        Ink::Faint,
        "The verdict is for the worst frequency of the band. The bar is as long as the share of the watts that \
         reaches the wire in the middle of the band: full for the sky, earth brown for what heats the soil, hollow for the \
         wire's own heat; left of the notch a feed is too lossy.",
    );
    let rule = marks::stroke(Pen::Hairline, Ink::Rule, snapshot.ground);
    ui.painter().hline(rect.x_range(), rect.bottom(), rule);
}

fn order_picker(ui: &mut egui::Ui, place: Rect, state: &mut LanesState) {
    let within =
        egui::UiBuilder::new().max_rect(place).layout(egui::Layout::left_to_right(egui::Align::Center));
    ui.scope_builder(within, |ui| {
        ui.spacing_mut().button_padding = vec2(4.0, 1.0);
        ui.spacing_mut().interact_size.y = 18.0;
        let picker = egui::ComboBox::from_id_salt("order of the lanes")
            .width(place.width() - 8.0)
            .selected_text(RichText::new(state.order.words()).small())
            .show_ui(ui, |ui| {
                for order in Order::ALL {
                    ui.selectable_value(&mut state.order, order, order.words());
                }
            });
        let _ = picker.response.accessible_name("order of the lanes").explain(
            "Order of the lanes: as planned, by frequency, or best first for the chosen feed. Pinned lanes stay on top.",
        );
    });
}

/// One lane in its place.
pub(super) struct Row<'a> {
    pub snapshot: &'a Snapshot<'a>,
    pub columns: &'a Columns,
    pub names: &'a [String],
    pub lane: &'a Lane<'a>,
    pub rect: Rect,
}

impl Row<'_> {
    /// Draws the lane, tells screen readers about it, and takes care of its pin and its hover sentences.
    pub fn show(&self, ui: &mut egui::Ui, response: &Response, state: &mut LanesState) {
        let chosen = self.lane.band == self.snapshot.band;
        let name = format!("lane {}", self.lane.name);
        response.widget_info(|| {
            let mut info = WidgetInfo::selected(Role::ListBoxOption, true, chosen, &name);
            info.current_text_value = Some(self.lane.value(self.names));
            info
        });
        if !ui.is_rect_visible(self.rect) {
            return;
        }
        let ground = self.snapshot.ground;
        let painter = ui.painter();
        if chosen {
            painter.rect_filled(self.rect, 0.0, wash(Ink::Chosen, ground));
            let edge = self.rect.with_max_x(self.rect.left() + 3.0);
            painter.rect_filled(edge, 0.0, color(Ink::Chosen, ground));
        } else if response.hovered() {
            painter.rect_filled(self.rect, 0.0, color(Ink::Panel, ground));
        }
        painter.hline(
            self.rect.x_range(),
            self.rect.bottom(),
            marks::stroke(Pen::Hairline, Ink::Rule, ground),
        );
        if response.has_focus() {
            let pen = marks::stroke(Pen::Bold, Ink::Chosen, ground);
            painter.rect_stroke(self.rect.shrink(1.0), 3.0, pen, egui::StrokeKind::Inside);
        }
        paint::name(ui, self);
        if self.lane.report.is_some() {
            paint::wave(ui, self);
            paint::impedance(ui, self);
            for feed in 0..self.names.len() {
                paint::strip(ui, self, feed);
                paint::gauge(ui, self, feed);
            }
        }
        self.pin(ui, response, state);
        self.sentences(response);
    }

    fn pin(&self, ui: &egui::Ui, row: &Response, state: &mut LanesState) {
        let cell = layout::cell(self.rect, self.columns.pin);
        let place = Rect::from_center_size(pos2(cell.center().x, cell.center().y - 8.0), vec2(16.0, 20.0));
        let response = ui.interact(place, row.id.with("pin"), Sense::click());
        let pinned = state.pinned.contains(self.lane.name);
        let name = format!("pin {}", self.lane.name);
        response.widget_info(|| WidgetInfo::selected(Role::CheckBox, true, pinned, &name));
        if pinned || row.hovered() || response.hovered() || response.has_focus() {
            paint::pin(ui, place, pinned, response.hovered() || response.has_focus(), self.snapshot.ground);
        }
        let toggled = response.clicked();
        let _ = response.explain(if pinned {
            "Pinned: stays on top. Click to let it go."
        } else {
            "Pin this lane on top."
        });
        if toggled && !state.pinned.remove(self.lane.name) {
            state.pinned.insert(self.lane.name.to_owned());
        }
    }

    /// What is under the pointer, in words.
    fn sentences(&self, response: &Response) {
        let Some(at) = response.hover_pos().filter(|_| response.hovered()) else {
            return;
        };
        let text = self.sentence_at(at);
        if text.is_empty() {
            return;
        }
        explain::say(&response.ctx, &text);
        response.clone().on_hover_text_at_pointer(text);
    }

    /// The sentence for a place of the lane; empty where nothing is to be said.
    fn sentence_at(&self, at: egui::Pos2) -> String {
        let Some(report) = self.lane.report else {
            return "Being worked out.".to_owned();
        };
        for (feed, name) in self.names.iter().enumerate() {
            let strip = layout::cell(self.rect, self.columns.strips[feed]);
            if strip.x_range().contains(at.x) {
                let found = layout::nearest_point(strip, report, at.x).map(|index| &report.points[index]);
                let Some((point, seen)) = found.and_then(|p| Some((p, p.feeds.get(feed)?))) else {
                    continue;
                };
                let mut text = format!(
                    "{} at {}: SWR {}",
                    name,
                    units::megahertz(point.frequency_hz),
                    units::swr(seen.before_unit.swr)
                );
                if seen.setting.is_some() {
                    text +=
                        &format!(" before, {} after the matching unit", units::swr(seen.at_transmitter.swr));
                }
                return text;
            }
            if layout::gauge(self.rect, self.columns.gauge, feed, self.names.len()).contains(at) {
                let kind = self.lane.band_feed(feed).map(|f| f.verdict.kind);
                let meaning = kind.map_or("", marks::verdict_sentence);
                return format!("{}. {meaning}", capital(&self.lane.feed_sentence(feed, name)));
            }
        }
        let middle = report.middle_point();
        if self.columns.impedance.contains(at.x) {
            let z = units::impedance(middle.feedpoint_ohm);
            return format!("{z} at the feedpoint at {}", units::megahertz(middle.frequency_hz));
        }
        if self.columns.wave.contains(at.x) {
            return format!(
                "Standing wave at {}: current filled, voltage as a line, feedpoint as a ring.",
                units::megahertz(report.wave.frequency_hz)
            );
        }
        if self.columns.name.contains(at.x) {
            return format!(
                "{}: {}. Click or arrow keys choose a band.",
                self.lane.name,
                self.lane.frequencies()
            );
        }
        String::new()
    }
}

/// The first letter large.
fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect())
}
