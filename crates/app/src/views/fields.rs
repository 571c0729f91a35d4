//! Fields of the editor: each with its label, its sentence, and numbers in the units that people use.

use eframe::egui::{self, DragValue, Response};

use crate::command::Command;
use crate::explain::Explain as _;

/// How a value of the plan stands in a field.
pub(in crate::views) struct Quantity<'a> {
    /// The label before it.
    pub label: &'a str,
    /// What it is, in one sentence.
    pub sentence: &'a str,
    /// The value in SI.
    pub value: f64,
    /// What one unit of the field is in SI.
    pub unit: f64,
    /// The unit's symbol, with a leading space.
    pub suffix: &'a str,
    /// Accepted values, in the field's unit.
    pub range: std::ops::RangeInclusive<f64>,
    /// Change for each point dragged, in the field's unit.
    pub speed: f64,
    /// Most decimals shown.
    pub decimals: usize,
}

/// A row with a label and a number; the new value in SI when it changes.
pub(in crate::views) fn quantity(
    ui: &mut egui::Ui,
    quantity: &Quantity<'_>,
    out: &mut Vec<Command>,
) -> Option<f64> {
    let label = ui.label(quantity.label);
    let mut shown = quantity.value / quantity.unit;
    let field = DragValue::new(&mut shown)
        .range(quantity.range.clone())
        .clamp_existing_to_range(false)
        .speed(quantity.speed)
        .max_decimals(quantity.decimals)
        .suffix(quantity.suffix)
        .update_while_editing(false);
    let response = ui.add(field).labelled_by(label.id);
    ui.end_row();
    let changed = response.changed();
    end_of_drag(&response, out);
    let _ = label.explain(quantity.sentence);
    let _ = response.explain(quantity.sentence);
    (changed && shown.is_finite()).then_some(shown * quantity.unit)
}

/// A step of undo ends when the hand lets go or the field is left.
fn end_of_drag(response: &Response, out: &mut Vec<Command>) {
    if response.drag_stopped() || response.lost_focus() {
        out.push(Command::EndOfDrag);
    }
}

/// A button with its sentence; true when pressed.
pub(in crate::views) fn button(ui: &mut egui::Ui, enabled: bool, words: &str, sentence: &str) -> bool {
    let response = ui.add_enabled(enabled, egui::Button::new(words));
    let pressed = response.clicked();
    let _ = response.on_disabled_hover_text(sentence).explain(sentence);
    pressed
}
