//! The read-out of the standing wave: anywhere on the wire, by pointer or by arrow keys.

use eframe::egui::{EventFilter, Key, Pos2, Rect, Role, Sense, Stroke, Ui, Vec2, WidgetInfo, pos2, vec2};
use sheet::tokens::{Ink, Pen};
use station::units::{amperes, volts};

use crate::explain::say;

use super::YardState;
use super::aim::place_on_wire;
use super::hands::Bench;
use super::layout::Type;
use super::paint::{Look, font, plate};
use super::wave::{Reading, Wave};

/// How close to the wire the pointer reads it, px.
const REACH_PX: f32 = 18.0;
/// One press of an arrow key moves the read-out by this share of the wire.
const STEP: f64 = 0.01;

/// A place of the wire that is being read.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Probe {
    wire: usize,
    arc_m: f64,
}

/// Shows the read-out under the pointer, or where the arrow keys have brought it.
pub fn show(ui: &Ui, bench: &Bench<'_>, look: &Look<'_>, state: &mut YardState) {
    if bench.layout.waves.is_empty() {
        return;
    }
    let pointed = if state.hot.is_none() && state.drag.is_none() { pointed(bench, look) } else { None };
    let kept = by_keys(ui, bench, state);
    if let Some(probe) = pointed.or(kept) {
        paint(ui, bench, look, probe);
        if pointed.is_some() {
            say(
                ui.ctx(),
                "Peak current and voltage here. The voltage is the wire's potential from its charge: indicative, and \
                 dangerous to touch at the ends.",
            );
        }
    }
}

fn pointed(bench: &Bench<'_>, look: &Look<'_>) -> Option<Probe> {
    let pointer = look.pointer?;
    let on = |(wire, _): &(usize, Wave<'_>)| {
        let (arc_m, distance) = place_on_wire(bench.model, &bench.layout.view, *wire, pointer)?;
        (distance < REACH_PX).then_some((Probe { wire: *wire, arc_m }, distance))
    };
    bench.layout.waves.iter().filter_map(on).min_by(|a, b| a.1.total_cmp(&b.1)).map(|(probe, _)| probe)
}

/// A widget of its own carries the read-out to screen readers and takes the arrow keys.
fn by_keys(ui: &Ui, bench: &Bench<'_>, state: &mut YardState) -> Option<Probe> {
    let feedpoint = bench.model.hung.as_ref().ok()?.feedpoint;
    let mut probe = state.probe.unwrap_or(Probe { wire: feedpoint.wire, arc_m: feedpoint.arc_m });
    let length_m = bench.model.hung_wire(probe.wire)?.length_m();
    let at = place(bench, probe)?;
    let rect = Rect::from_center_size(at, Vec2::splat(2.0));
    let response = ui.interact(rect, ui.scope_id().with("read-out"), Sense::focusable_noninteractive());
    if response.has_focus() {
        let filter = EventFilter { horizontal_arrows: true, ..EventFilter::default() };
        ui.memory_mut(|m| m.set_focus_lock_filter(response.id, filter));
        let presses = |key| ui.input(|i| i.num_presses(key)) as f64;
        let steps = presses(Key::ArrowRight) - presses(Key::ArrowLeft);
        probe.arc_m = (probe.arc_m + steps * STEP * length_m).clamp(0.0, length_m);
        state.probe = Some(probe);
    }
    response.widget_info(|| {
        let mut info = WidgetInfo::labeled(Role::Status, ui.is_enabled(), "standing wave read-out");
        info.current_text_value = lines(bench, probe).map(|lines| lines.join(", "));
        info
    });
    response.has_focus().then_some(probe)
}

fn place(bench: &Bench<'_>, probe: Probe) -> Option<Pos2> {
    Some(bench.layout.view.at(bench.model.hung_wire(probe.wire)?.point_at(probe.arc_m)))
}

fn reading(bench: &Bench<'_>, probe: Probe) -> Option<Reading> {
    let (_, wave) = bench.layout.waves.iter().find(|(wire, _)| *wire == probe.wire)?;
    Some(wave.read(probe.arc_m))
}

/// The read-out in words: where, and what stands there.
fn lines(bench: &Bench<'_>, probe: Probe) -> Option<[String; 2]> {
    let reading = reading(bench, probe)?;
    let length = |m| bench.snapshot.units.length(m);
    let feedpoint = bench.model.hung.as_ref().ok()?.feedpoint;
    let from_feed_m = reading.arc_m - feedpoint.arc_m;
    let place = if feedpoint.wire != probe.wire {
        let name = bench.model.plan.wires.get(probe.wire).map_or("wire", |wire| wire.name.as_str());
        format!("{} from the beginning of {name}", length(reading.arc_m))
    } else if from_feed_m.abs() < 0.005 {
        "at the feedpoint".to_owned()
    } else {
        let toward = if from_feed_m > 0.0 { "end" } else { "beginning" };
        format!("{} from the feedpoint toward the {toward}", length(from_feed_m.abs()))
    };
    Some([place, format!("{} and {} peak", amperes(reading.current_a), volts(reading.voltage_v))])
}

fn paint(ui: &Ui, bench: &Bench<'_>, look: &Look<'_>, probe: Probe) {
    let (Some(at), Some(lines)) = (place(bench, probe), lines(bench, probe)) else { return };
    let plot = bench.layout.view.frame;
    let painter = ui.painter().with_clip_rect(plot);
    let stroke = Stroke::new(Pen::Curve.width(), look.ink(Ink::Chosen));
    painter.circle(at, 3.5, look.ink(Ink::Background), stroke);
    let small = font(ui, Type::Small);
    let [place, values] = lines;
    let place = painter.layout_no_wrap(place, small.clone(), look.ink(Ink::Faint));
    let values = painter.layout_no_wrap(values, font(ui, Type::Body), look.ink(Ink::Text));
    let inner = vec2(place.size().x.max(values.size().x), place.size().y + values.size().y);
    let size = inner + vec2(16.0, 10.0);
    let room = plot.shrink(4.0);
    // Beside the pointer and off the wire, so that what is read stays in sight.
    let below = at.y + 30.0 + size.y < room.bottom();
    let top = if below { at.y + 30.0 } else { at.y - 30.0 - size.y };
    let left = (at.x + 14.0).min(room.right() - size.x).max(room.left());
    let rect = Rect::from_min_size(pos2(left, top.max(room.top())), size);
    plate(&painter, rect, look);
    let corner = rect.min + vec2(8.0, 5.0);
    let second = corner + vec2(0.0, place.size().y);
    painter.galley(corner, place, look.ink(Ink::Faint));
    painter.galley(second, values, look.ink(Ink::Text));
}
