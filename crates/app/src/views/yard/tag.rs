//! The small tag beside a grip with its numbers, to read while it is under the pointer, to type or drag once it is
//! chosen.

use eframe::egui::{
    Align, DragValue, Frame, Key, Layout as Flow, Margin, Rect, Response, Stroke, Ui, UiBuilder, Vec2, pos2,
    vec2,
};
use sheet::tokens::{Ink, Pen};

use crate::command::Command;
use sheet::model::load_values;

use super::YardState;
use super::ask::{Grid, feed_place};
use super::grip::{Grip, Numbers};
use super::hands::{Bench, id, put};
use super::layout::{Handle, Type};
use super::paint::{Look, font, plate};

/// Distance between a grip and its tag, px.
const AWAY_PX: f32 = 16.0;
const MARGIN: Vec2 = vec2(8.0, 5.0);

/// A tag on the chosen grip, words only on the one under the pointer.
pub fn show(ui: &mut Ui, bench: &Bench<'_>, look: &Look<'_>, state: &mut YardState, out: &mut Vec<Command>) {
    let handles = &bench.layout.handles;
    let find = |grip: Option<Grip>| handles.iter().find(|h| Some(h.grip) == grip);
    if let Some(hot) = find(state.hot).filter(|h| state.chosen != Some(h.grip)) {
        words(ui, bench, look, hot);
    }
    match find(state.chosen) {
        Some(chosen) if chosen.grip.is_new_point() => {}
        Some(chosen) => numbers(ui, bench, look, chosen, state, out),
        // What has just been pulled out of a span comes with the next frame.
        None if state.drag.is_some() => state.tag = None,
        None => {
            state.tag = None;
            state.chosen = None;
        }
    }
}

/// A box beside a grip, above it if there is room, inside the plot.
fn beside(handle: &Handle, size: Vec2, within: Rect) -> Rect {
    let room = within.shrink(4.0);
    let above = handle.at.y - AWAY_PX - size.y;
    let top = if above >= room.top() { above } else { handle.at.y + AWAY_PX };
    let left = (handle.at.x + 8.0).min(room.right() - size.x).max(room.left());
    Rect::from_min_size(pos2(left, top.min(room.bottom() - size.y)), size)
}

/// The numbers of a grip in words: "cut length 20.35 m", "height 9.50 m".
pub fn in_words(bench: &Bench<'_>, grip: Grip) -> String {
    let (along, up) = bench.model.number_words(grip);
    let Numbers { along_m, up_m } = bench.model.numbers(grip);
    let length = |m| bench.snapshot.units.length(m);
    let mut parts = Vec::with_capacity(3);
    if let Some(m) = along_m {
        parts.push(if matches!(grip, Grip::Feedpoint | Grip::Load { .. }) {
            format!("{} {along}", length(m))
        } else {
            format!("{along} {}", length(m))
        });
    }
    if let Some(m) = up_m {
        parts.push(format!("{up} {}", length(m)));
    }
    parts.extend(note(bench, grip));
    parts.join(", ")
}

/// What else is worth saying about a grip.
fn note(bench: &Bench<'_>, grip: Grip) -> Option<String> {
    let units = bench.snapshot.units;
    let ends = |wire: usize, at_end: bool| {
        let on = bench.model.on_path(wire)?;
        let over_m = if at_end { on.end_m() - on.path_m() } else { -on.wire.start_m };
        match over_m {
            m if m > 0.005 => Some(format!("{} hangs down", units.length(m))),
            m if m < -0.005 => Some(format!("rope {}", units.length(-m))),
            _ => None,
        }
    };
    match grip {
        Grip::WireBeginning { wire } => ends(wire, false),
        Grip::WireEnd { wire } => ends(wire, true),
        Grip::Feedpoint => {
            let fraction = bench.model.plan.feedpoint.fraction;
            let percent = || format!("{} % of the wire", station::units::fixed(100.0 * fraction, 1));
            Some(feed_place(fraction).map_or_else(percent, str::to_owned))
        }
        Grip::Load { load } => bench.model.load(load).map(|load| load_values(&load.circuit)),
        _ => None,
    }
}

fn words(ui: &Ui, bench: &Bench<'_>, look: &Look<'_>, handle: &Handle) {
    let plot = bench.layout.view.frame;
    let painter = ui.painter().with_clip_rect(plot);
    let text = if handle.grip.is_new_point() {
        "pull here to bend the wire".to_owned()
    } else {
        format!("{}: {}", handle.name, in_words(bench, handle.grip))
    };
    let galley = painter.layout_no_wrap(text, font(ui, Type::Small), look.ink(Ink::Text));
    let rect = beside(handle, galley.size() + 2.0 * MARGIN, plot);
    plate(&painter, rect, look);
    painter.galley(rect.min + MARGIN, galley, look.ink(Ink::Text));
}

fn numbers(
    ui: &mut Ui,
    bench: &Bench<'_>,
    look: &Look<'_>,
    handle: &Handle,
    state: &mut YardState,
    out: &mut Vec<Command>,
) {
    let size = state.tag.map_or(vec2(150.0, 32.0), |rect| rect.size());
    // While a number is dragged in it, the tag stays where it is.
    let rect =
        state.tag.filter(|_| state.tag_held).unwrap_or_else(|| beside(handle, size, bench.layout.view.frame));
    let now = bench.model.numbers(handle.grip);
    let (along, up) = bench.model.number_words(handle.grip);
    let home = id(ui, handle.grip);
    let mut wish = now;
    let mut ended = false;
    let mut held = false;
    let builder = UiBuilder::new().max_rect(rect).layout(Flow::left_to_right(Align::Center)).id_salt("tag");
    let inner = ui.scope_builder(builder, |ui| {
        let frame = Frame::new()
            .fill(look.ink(Ink::Panel))
            .stroke(Stroke::new(Pen::Hairline.width(), look.ink(Ink::Chosen)))
            .corner_radius(4)
            .inner_margin(Margin::symmetric(8, 4));
        frame.show(ui, |ui| {
            ui.spacing_mut().item_spacing.x = 6.0;
            for (word, value_m) in [(along.as_str(), &mut wish.along_m), (up, &mut wish.up_m)] {
                let Some(value_m) = value_m else { continue };
                let field = number(ui, bench, word, value_m, state.type_number);
                state.type_number = false;
                ended |= field.drag_stopped() || field.lost_focus();
                held |= field.dragged() || field.has_focus();
                if field.lost_focus() && ui.input(|i| i.key_pressed(Key::Enter) || i.key_pressed(Key::Escape))
                {
                    ui.memory_mut(|m| m.request_focus(home));
                }
            }
            if let Some(note) = note(bench, handle.grip) {
                ui.weak(note);
            }
        });
    });
    state.tag = Some(inner.response.rect);
    state.tag_held = held;
    if wish != now {
        let asked = bench.model.ask(handle.grip, wish);
        state.hint = asked.hint.clone();
        put(asked, out);
    }
    if ended {
        state.hint = None;
        out.push(Command::EndOfDrag);
    }
}

/// A number that can be typed or dragged, with its word.
fn number(ui: &mut Ui, bench: &Bench<'_>, word: &str, value_m: &mut f64, take_focus: bool) -> Response {
    let units = bench.snapshot.units;
    let label = ui.weak(word);
    let mut value = units.from_metres(*value_m);
    let speed = 0.25 * units.from_metres(Grid::coarse(units, 0.0).step_m);
    let field = DragValue::new(&mut value)
        .speed(speed)
        .max_decimals(2)
        .suffix(format!(" {}", units.symbol()))
        .update_while_editing(false);
    if take_focus {
        // Before it is shown: only a field that gains the focus while it is shown selects its text.
        let field = ui.next_auto_id();
        ui.memory_mut(|m| m.request_focus(field));
    }
    let field = ui.add(field).labelled_by(label.id);
    if field.changed() {
        *value_m = units.to_metres(value);
    }
    field
}
