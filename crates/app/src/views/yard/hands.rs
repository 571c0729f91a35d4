//! Hands on the grips: dragging, arrow keys, screen readers.

use eframe::egui::{
    CursorIcon, EventFilter, Id, Key, Modifiers, Pos2, Rect, Response, Role, Sense, Ui, Vec2, WidgetInfo,
};

use crate::command::{Command, Edit};
use crate::explain::say;
use crate::snapshot::Snapshot;

use super::YardState;
use super::aim::Bend;
use super::ask::{Asked, Grid};
use super::grip::{Grip, Numbers};
use super::layout::{GRIP_PX, Handle, Layout};
use super::model::Model;

/// How close the feedpoint comes to a place it likes before it snaps, px.
const CATCH_PX: f32 = 8.0;
const ARROWS: [Key; 4] = [Key::ArrowLeft, Key::ArrowRight, Key::ArrowUp, Key::ArrowDown];

/// A grip in the hand.
#[derive(Clone, Debug)]
pub struct Drag {
    grip: Grip,
    /// From the pointer to the thing, as it was taken.
    hold: Vec2,
    /// A free path point in the hand.
    bend: Option<Bend>,
}

impl Drag {
    /// What the hand holds: pulled out of a span, it is a path point.
    fn shown(&self) -> Grip {
        self.bend.as_ref().map_or(self.grip, |bend| Grip::PathPoint { wire: bend.wire, point: bend.point })
    }
}

/// What the hands work on.
#[derive(Clone, Copy)]
pub struct Bench<'a> {
    pub model: &'a Model<'a>,
    pub layout: &'a Layout<'a>,
    pub snapshot: &'a Snapshot<'a>,
}

/// The id of a grip's widget.
pub fn id(ui: &Ui, grip: Grip) -> Id {
    ui.scope_id().with(("grip", grip))
}

/// A quick hand presses on a grip and is off it before the next frame; the drag then falls to the ground below. What
/// counts is where it pressed.
pub fn take_late(ui: &Ui, bench: &Bench<'_>, ground: &Response, state: &mut YardState) {
    if !ground.drag_started() || !ui.input(|i| i.pointer.primary_down()) {
        return;
    }
    let Some(pressed_at) = ui.input(|i| i.pointer.press_origin()) else { return };
    let under = |handle: &&Handle| {
        !handle.grip.is_new_point()
            && Rect::from_center_size(handle.at, Vec2::splat(2.0 * GRIP_PX)).contains(pressed_at)
    };
    if let Some(handle) = bench.layout.handles.iter().rev().find(under) {
        ui.ctx().set_dragged_id(id(ui, handle.grip));
        take(bench, handle, pressed_at, state);
    }
}

/// The hand closes on a grip.
fn take(bench: &Bench<'_>, handle: &Handle, pressed_at: Pos2, state: &mut YardState) {
    let bend = bench.model.bend(handle.grip);
    state.drag = Some(Drag { grip: handle.grip, hold: handle.anchor - pressed_at, bend });
    state.chosen = Some(handle.grip);
}

/// Lets the hands work on all grips.
pub fn work(ui: &Ui, bench: &Bench<'_>, state: &mut YardState, out: &mut Vec<Command>) {
    state.hot = None;
    for handle in &bench.layout.handles {
        let response = widget(ui, bench, handle, state);
        describe(ui, bench, handle, &response);
        hold(ui, bench, handle, &response, state, out);
        if response.has_focus() {
            keys(ui, bench, handle, &response, state, out);
        }
        readers(ui, bench, handle, &response, out);
        if response.gained_focus() || response.clicked() {
            response.request_focus();
            state.chosen = Some(handle.grip);
        }
        if response.hovered() || response.dragged() {
            let shown = state.drag.as_ref().map_or(handle.grip, Drag::shown);
            state.hot = Some(shown);
            ui.ctx().set_cursor_icon(cursor(bench.model, shown, response.dragged()));
            say(ui.ctx(), bench.model.sentence(shown));
        }
    }
    if let Some(drag) = &state.drag {
        state.chosen = Some(drag.shown());
    }
}

/// A grip's widget. What is out of the pointer's reach can still be found by name and by Tab.
fn widget(ui: &Ui, bench: &Bench<'_>, handle: &Handle, state: &YardState) -> Response {
    let plot = bench.layout.view.frame;
    let rect = Rect::from_center_size(handle.at, Vec2::splat(2.0 * GRIP_PX));
    let held = state.drag.as_ref().is_some_and(|drag| drag.grip == handle.grip);
    let away = handle.grip.is_new_point() && !ui.rect_contains_pointer(plot);
    if held || (plot.intersects(rect) && !away) {
        let visible = if plot.intersects(rect) { rect.intersect(plot) } else { rect };
        ui.interact(visible, id(ui, handle.grip), Sense::click_and_drag())
    } else {
        let at = Rect::from_center_size(plot.clamp(handle.at), Vec2::splat(1.0));
        ui.interact(at, id(ui, handle.grip), Sense::focusable_noninteractive())
    }
}

/// The first of a grip's numbers in the user's unit.
fn value(bench: &Bench<'_>, grip: Grip) -> f64 {
    let Numbers { along_m, up_m } = bench.model.numbers(grip);
    let first_m = if both(along_m, up_m) { up_m } else { along_m.or(up_m) };
    bench.snapshot.units.from_metres(first_m.unwrap_or(0.0))
}

/// Of two numbers, screen readers get the height.
fn both(along_m: Option<f64>, up_m: Option<f64>) -> bool {
    along_m.is_some() && up_m.is_some()
}

fn describe(ui: &Ui, bench: &Bench<'_>, handle: &Handle, response: &Response) {
    response.widget_info(|| {
        let mut info = WidgetInfo::labeled(Role::Slider, ui.is_enabled(), &handle.name);
        info.value = Some(value(bench, handle.grip));
        info
    });
    ui.ctx().accesskit_node_builder(response.id, |node| {
        use eframe::egui::accesskit::Action;
        node.add_action(Action::SetValue);
        node.add_action(Action::Increment);
        node.add_action(Action::Decrement);
    });
}

/// Where the thing itself should go when the pointer is here.
fn target(ui: &Ui, drag: &Drag) -> Option<Pos2> {
    ui.input(|i| i.pointer.interact_pos()).map(|pointer| pointer + drag.hold)
}

fn hold(
    ui: &Ui,
    bench: &Bench<'_>,
    handle: &Handle,
    response: &Response,
    state: &mut YardState,
    out: &mut Vec<Command>,
) {
    if response.drag_started() && ui.input(|i| i.pointer.primary_down()) {
        let taken_at = ui.input(|i| i.pointer.press_origin()).unwrap_or(handle.at);
        take(bench, handle, taken_at, state);
        response.request_focus();
    }
    let Some(drag) = state.drag.clone().filter(|d| d.grip == handle.grip) else { return };
    if let Some(at) = target(ui, &drag).filter(|_| response.dragged()) {
        let asked = drag_to(ui, bench, &drag, at);
        state.hint = asked.hint.clone();
        put(asked, out);
    }
    if response.drag_stopped() {
        if let Some(edit) = drag.bend.as_ref().and_then(|b| bench.model.ask_let_go(&bench.layout.view, b)) {
            out.push(Command::Edit(edit));
        } else {
            // The keys go on with what the hand has made.
            ui.memory_mut(|m| m.request_focus(id(ui, drag.shown())));
        }
        out.push(Command::EndOfDrag);
        state.hint = None;
        state.drag = None;
    }
}

fn drag_to(ui: &Ui, bench: &Bench<'_>, drag: &Drag, at: Pos2) -> Asked {
    let (model, view) = (bench.model, &bench.layout.view);
    let modifiers = ui.input(|i| i.modifiers);
    let grid = (!modifiers.alt).then(|| Grid::coarse(bench.snapshot.units, view.metres(CATCH_PX)));
    if let Some(bend) = &drag.bend {
        return model.ask_bend(view, bend, at, grid);
    }
    let mut wish = model.aimed(view, drag.grip, at);
    match (drag.grip, modifiers.command) {
        (Grip::WireBeginning { wire } | Grip::WireEnd { wire }, true) => {
            // The other end mirrors this one: what this end gains counts twice.
            let now_m = model.numbers(drag.grip).along_m.unwrap_or(0.0);
            wish.along_m = wish.along_m.map(|m| now_m + 2.0 * (m - now_m));
            let wish = grid.map_or(wish, |grid| model.snapped(drag.grip, wish, grid));
            wish.along_m.map_or_else(Asked::default, |m| model.ask_both_ends(wire, m))
        }
        _ => model.ask(drag.grip, grid.map_or(wish, |grid| model.snapped(drag.grip, wish, grid))),
    }
}

/// Hands the edits on.
pub fn put(asked: Asked, out: &mut Vec<Command>) {
    out.extend(asked.edits.into_iter().map(Command::Edit));
}

fn keys(
    ui: &Ui,
    bench: &Bench<'_>,
    handle: &Handle,
    response: &Response,
    state: &mut YardState,
    out: &mut Vec<Command>,
) {
    let filter = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..EventFilter::default() };
    ui.memory_mut(|m| m.set_focus_lock_filter(response.id, filter));
    let presses = |key| ui.input(|i| i.num_presses(key)) as f64;
    let right = presses(Key::ArrowRight) - presses(Key::ArrowLeft);
    let up = presses(Key::ArrowUp) - presses(Key::ArrowDown);
    let modifiers = ui.input(|i| i.modifiers);
    let units = bench.snapshot.units;
    if right.abs() + up.abs() > 0.0 {
        let grid = if modifiers.shift { Grid::fine(units) } else { Grid::coarse(units, 0.0) };
        let wish = bench.model.nudged(handle.grip, right, up, grid);
        let asked = match (handle.grip, modifiers.command, wish.along_m) {
            (Grip::WireBeginning { wire } | Grip::WireEnd { wire }, true, Some(cut_m)) => {
                bench.model.ask_both_ends(wire, cut_m)
            }
            _ => bench.model.ask(handle.grip, wish),
        };
        state.hint = asked.hint.clone();
        if let (Grip::NewPoint { wire, span }, false) = (handle.grip, asked.edits.is_empty()) {
            // The keys go on with the point that has just been made.
            let made = Grip::PathPoint { wire, point: span + 1 };
            ui.memory_mut(|m| m.request_focus(id(ui, made)));
            state.chosen = Some(made);
        }
        put(asked, out);
    }
    if ARROWS.into_iter().any(|key| ui.input(|i| i.key_released(key))) {
        out.push(Command::EndOfDrag);
    }
    // Consumed, or the number's field would take the same press for the end of typing.
    if ui.input_mut(|i| i.consume_key(Modifiers::NONE, Key::Enter)) {
        state.type_number = true;
    }
    if ui.input(|i| i.key_pressed(Key::Delete) || i.key_pressed(Key::Backspace))
        && let Some(edit) = bench.model.ask_removal(handle.grip)
    {
        step(edit, out);
    }
}

/// An edit that is a step of its own.
fn step(edit: Edit, out: &mut Vec<Command>) {
    out.push(Command::Edit(edit));
    out.push(Command::EndOfDrag);
}

/// What a screen reader asks for.
fn readers(ui: &Ui, bench: &Bench<'_>, handle: &Handle, response: &Response, out: &mut Vec<Command>) {
    use eframe::egui::accesskit::{Action, ActionData};
    let units = bench.snapshot.units;
    let (steps, set) = ui.input(|i| {
        let count = |action| i.num_accesskit_action_requests(response.id, action) as f64;
        let set = i.accesskit_action_requests(response.id, Action::SetValue).filter_map(|request| {
            match request.data {
                Some(ActionData::NumericValue(value)) => Some(value),
                _ => None,
            }
        });
        (count(Action::Increment) - count(Action::Decrement), set.last())
    });
    let step_m = Grid::coarse(units, 0.0).step_m;
    let Some(wanted) = set.or((steps.abs() > 0.0).then(|| value(bench, handle.grip))) else { return };
    let wanted_m = units.to_metres(wanted) + steps * step_m;
    let now = bench.model.numbers(handle.grip);
    let wish = if now.up_m.is_some() {
        Numbers { up_m: Some(wanted_m), ..now }
    } else {
        Numbers { along_m: Some(wanted_m), ..now }
    };
    put(bench.model.ask(handle.grip, wish), out);
    out.push(Command::EndOfDrag);
}

fn cursor(model: &Model<'_>, grip: Grip, held: bool) -> CursorIcon {
    let numbers = model.numbers(grip);
    match (numbers.along_m.is_some(), numbers.up_m.is_some()) {
        (true, false) if matches!(grip, Grip::SupportFoot { .. }) => CursorIcon::ResizeHorizontal,
        (false, true) => CursorIcon::ResizeVertical,
        _ if held => CursorIcon::Grabbing,
        _ => CursorIcon::Grab,
    }
}
