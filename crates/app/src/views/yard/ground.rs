//! The soil under the wires, in the Yard's lower corner: what it is, drier, wetter.

use eframe::egui::{Align, Layout, Rect, Ui, UiBuilder, pos2, vec2};

use crate::command::{Command, Edit};

use crate::explain::Explain;
use crate::snapshot::Snapshot;
use crate::views::soil;

/// Room for the pick list and both buttons, px.
const ROOM_PX: [f32; 2] = [330.0, 24.0];
/// Distance from the plot's right and lower edge, px.
const EDGE_PX: f32 = 8.0;
const LOWER_EDGE_PX: f32 = 3.0;

/// Where it stands in the plot.
pub fn place(plot: Rect) -> Rect {
    let size = vec2(ROOM_PX[0].min(plot.width() - 2.0 * EDGE_PX), ROOM_PX[1]);
    let corner = pos2(plot.right() - EDGE_PX - size.x, plot.bottom() - LOWER_EDGE_PX - size.y);
    Rect::from_min_size(corner, size)
}

/// Shows the soil and listens.
pub fn show(ui: &mut Ui, place: Rect, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) {
    let earth = &snapshot.plan.site.earth;
    ui.scope_builder(UiBuilder::new().max_rect(place).layout(Layout::right_to_left(Align::Center)), |ui| {
        for (name, step, sentence) in [
            ("drier", 1, "The next drier soil: how the station fares after weeks without rain."),
            ("wetter", -1, "The next wetter soil: how the station fares after rain."),
        ] {
            let next = soil::neighbour(earth, step);
            let button = ui.add_enabled_ui(next.is_some(), |ui| ui.small_button(name)).inner;
            if button.explain(sentence).clicked()
                && let Some(next) = next
            {
                out.push(Command::Edit(Edit::Earth(next)));
            }
        }
        let picker = soil::picker(ui, "earth in the yard", earth, out);
        let label = ui.label("earth").id;
        picker.labelled_by(label);
    });
}
