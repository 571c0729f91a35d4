//! The Yard: the site to scale, seen from the side, with the chosen band's standing wave on the wire. Everything in it
//! can be taken hold of.
//!
//! `model` and `grip` read the plan, `aim` and `ask` turn a hand's wish into edits, `layout` and its rooms say where
//! everything stands, `paint` and `things` draw it, `hands`, `tag`, `readout` and `motion` listen.

mod aim;
mod ask;
mod grip;
mod ground;
mod hands;
mod labels;
mod layout;
mod model;
mod motion;
mod paint;
mod readout;
mod rulers;
mod side_view;
mod tag;
#[cfg(test)]
mod tests;
mod texts;
mod things;
mod track;
mod wave;

use eframe::egui::{Key, PointerButton, Pos2, Rect, Response, Role, Sense, Ui, Vec2, WidgetInfo, vec2};

use crate::command::Command;
use crate::explain::say;
use crate::snapshot::Snapshot;

use grip::Grip;
use hands::{Bench, Drag};
use layout::{Asking, Layout, Type};
use model::Model;
use paint::Look;
use readout::Probe;
use side_view::{Bounds, Camera, SideView};
use wave::Phase;

/// What the Yard remembers from frame to frame.
#[derive(Default)]
pub struct YardState {
    camera: Option<Camera>,
    /// The plot that the camera was chosen for.
    plot: Option<Rect>,
    /// The camera was set by hand: it is left alone.
    by_hand: bool,
    hot: Option<Grip>,
    chosen: Option<Grip>,
    drag: Option<Drag>,
    hint: Option<String>,
    tag: Option<Rect>,
    tag_held: bool,
    /// The hand has panned in the last frame.
    panning: bool,
    /// The chosen grip's number is to be typed next.
    type_number: bool,
    probe: Option<Probe>,
}

/// Shows the Yard in all of the room there is.
pub fn show(ui: &mut Ui, snapshot: &Snapshot<'_>, state: &mut YardState, out: &mut Vec<Command>) {
    let frame = ui.available_rect_before_wrap();
    let backdrop = ui.allocate_rect(frame, Sense::click_and_drag());
    backdrop.widget_info(|| WidgetInfo::labeled(Role::Canvas, ui.is_enabled(), "yard from the side"));
    let model = Model::of(snapshot.plan);
    let plot = layout::plot(frame);
    let Some(bounds) = model.bounds().filter(|_| plot.is_positive()) else { return };
    let camera = steer(ui, &backdrop, state, bounds, plot, model.plane);
    let view = SideView { plane: model.plane, camera, frame: plot };

    let band = snapshot.report.and_then(|report| report.bands.get(snapshot.band));
    let feed_name = snapshot.plan.feeds.get(snapshot.feed).map_or("", |feed| feed.name.as_str());
    let asking =
        Asking { band, feed: (snapshot.feed, feed_name), units: snapshot.units, buttons: motion::BUTTONS };
    let painter = ui.painter().clone();
    let fonts = (paint::font(ui, Type::Small), paint::font(ui, Type::Body));
    let measure = |text: &str, size: Type| -> Vec2 {
        let font = if size == Type::Small { &fonts.0 } else { &fonts.1 };
        painter.layout_no_wrap(text.to_owned(), font.clone(), eframe::egui::Color32::PLACEHOLDER).size()
    };
    let layout = Layout::of(&model, view, &asking, &measure);
    let bench = Bench { model: &model, layout: &layout, snapshot };

    hands::take_late(ui, &bench, &backdrop, state);
    hands::work(ui, &bench, state, out);
    let look = Look {
        ground: snapshot.ground,
        stale: snapshot.stale,
        phase: Phase::degrees(snapshot.phase_deg),
        feed: snapshot.feed,
        earth: &snapshot.plan.site.earth,
        unit: snapshot.units.symbol(),
        pointer: ui
            .input(|i| i.pointer.hover_pos())
            .filter(|p| plot.contains(*p) && ui.rect_contains_pointer(plot)),
        hot: state.hot,
        chosen: state.chosen,
    };
    paint::paint(ui, frame, &layout, &look);
    speak(ui, &bench, &look, state, &backdrop);
    readout::show(ui, &bench, &look, state);
    tag::show(ui, &bench, &look, state, out);
    if motion::show(ui, layout.buttons, snapshot, out) {
        state.by_hand = false;
        state.camera = None;
    }
    ground::show(ui, layout.soil, snapshot, out);
    hints(ui, &bench, &look, state);
    let_go(ui, &backdrop, state);
}

/// What the whole is, in one sentence; things that are pointed at say theirs afterwards.
fn speak(ui: &Ui, bench: &Bench<'_>, look: &Look<'_>, state: &YardState, ground: &Response) {
    let on_plot = look.pointer.is_some_and(|p| bench.layout.view.frame.contains(p));
    if ground.hovered() && state.hot.is_none() && on_plot {
        say(ui.ctx(), "The site to scale, seen from the side. Drag what you see; Ctrl and the wheel zoom.");
    }
}

/// Where a thing goes no further, and why a wire cannot hang.
fn hints(ui: &Ui, bench: &Bench<'_>, look: &Look<'_>, state: &YardState) {
    let plot = bench.layout.view.frame;
    if let Err(error) = &bench.model.hung {
        paint::hint(ui, plot.center_top() + vec2(0.0, 50.0), &error.to_string(), plot, look);
    }
    let chosen = bench.layout.handles.iter().find(|h| Some(h.grip) == state.chosen);
    if let (Some(hint), Some(handle)) = (&state.hint, chosen) {
        paint::hint(ui, handle.at, hint, plot, look);
    }
}

/// A press elsewhere or Escape lets go of the chosen grip.
fn let_go(ui: &Ui, ground: &Response, state: &mut YardState) {
    let pressed_at: Option<Pos2> =
        ui.input(|i| if i.pointer.any_pressed() { i.pointer.interact_pos() } else { None });
    let on_tag = |at: Pos2| state.tag.is_some_and(|tag| tag.contains(at));
    let elsewhere = pressed_at.is_some_and(|at| state.hot.is_none() && !on_tag(at));
    let escaped = !state.tag_held && ui.input(|i| i.key_pressed(Key::Escape));
    if elsewhere || escaped || ground.clicked() {
        if let Some(chosen) = state.chosen.take() {
            ui.memory_mut(|m| m.surrender_focus(hands::id(ui, chosen)));
        }
        state.hint = None;
        state.tag = None;
        state.tag_held = false;
    }
}

/// Follows the hand that zooms and pans; otherwise keeps the site in view.
fn steer(
    ui: &Ui,
    ground: &Response,
    state: &mut YardState,
    bounds: Bounds,
    plot: Rect,
    plane: side_view::Plane,
) -> Camera {
    let fitted = || Camera::fit(bounds, layout::stage(plot), plot);
    let resized = state.plot != Some(plot);
    state.plot = Some(plot);
    let mut camera = match state.camera {
        Some(camera) if state.drag.is_some() || state.tag_held => camera,
        // Another plan may lie somewhere else altogether.
        Some(camera) if state.by_hand && shows(camera, bounds, plot, plane) => camera,
        // Small changes of the site do not move the view.
        Some(camera) if !resized && serves(camera, bounds, plot, plane) => camera,
        _ => fitted(),
    };
    let pointer =
        ui.input(|i| i.pointer.hover_pos()).filter(|p| plot.contains(*p) && ui.rect_contains_pointer(plot));
    let zoom = f64::from(ui.input(eframe::egui::InputState::zoom_delta));
    if let (Some(pointer), true) = (pointer, (zoom - 1.0).abs() > 1e-6) {
        camera = camera.zoomed(zoom, pointer, plot);
        state.by_hand = true;
    }
    let middle = ui.input(|i| i.pointer.button_down(PointerButton::Middle));
    // In its first frame a drag may turn out to belong to a grip (`hands::take_late`); the next one makes up for it.
    let panning = ground.dragged() && !ground.drag_started();
    if panning || (middle && pointer.is_some()) {
        let by = ui.input(|i| match (i.pointer.interact_pos(), i.pointer.press_origin()) {
            (Some(now), Some(pressed)) if panning && !state.panning => now - pressed,
            _ => i.pointer.delta(),
        });
        if by != Vec2::ZERO {
            camera = camera.panned(by);
            state.by_hand = true;
        }
    }
    state.panning = panning;
    if ground.has_focus() {
        camera = steer_by_keys(ui, ground, state, camera, plot);
    }
    if ground.double_clicked() {
        state.by_hand = false;
        camera = fitted();
    }
    state.camera = Some(camera);
    camera
}

/// Arrows pan, plus and minus zoom, 0 fits.
fn steer_by_keys(ui: &Ui, ground: &Response, state: &mut YardState, camera: Camera, plot: Rect) -> Camera {
    const PAN_PX: f32 = 40.0;
    const ZOOM: f64 = 1.25;
    let filter =
        eframe::egui::EventFilter { horizontal_arrows: true, vertical_arrows: true, ..Default::default() };
    ui.memory_mut(|m| m.set_focus_lock_filter(ground.id, filter));
    let presses = |key| ui.input(|i| i.num_presses(key)) as f32;
    let by = vec2(
        presses(Key::ArrowLeft) - presses(Key::ArrowRight),
        presses(Key::ArrowUp) - presses(Key::ArrowDown),
    );
    let zoom = presses(Key::Plus) + presses(Key::Equals) - presses(Key::Minus);
    if by == Vec2::ZERO && zoom.abs() < 0.5 {
        return camera;
    }
    state.by_hand = true;
    camera.panned(by * PAN_PX).zoomed(ZOOM.powf(f64::from(zoom)), plot.center(), plot)
}

/// The site on the screen.
fn site_rect(camera: Camera, bounds: Bounds, plot: Rect, plane: side_view::Plane) -> Rect {
    let view = SideView { plane, camera, frame: plot };
    Rect::from_two_pos(view.at_flat(bounds.low), view.at_flat(bounds.high))
}

/// Whether anything of the site is in view.
fn shows(camera: Camera, bounds: Bounds, plot: Rect, plane: side_view::Plane) -> bool {
    site_rect(camera, bounds, plot, plane).intersects(plot)
}

/// Whether the site is still all in view and not lost in it.
fn serves(camera: Camera, bounds: Bounds, plot: Rect, plane: side_view::Plane) -> bool {
    let site = site_rect(camera, bounds, plot, plane);
    let inside = plot.shrink2(vec2(24.0, 30.0)).contains_rect(site);
    let stage = layout::stage(plot);
    inside && (site.width() > 0.55 * stage.width() || site.height() > 0.55 * stage.height())
}
