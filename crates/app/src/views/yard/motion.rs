//! The small buttons in the Yard's corner: the RF cycle and the fit of the view.

use eframe::egui::{
    Painter, Pos2, Rect, Response, Role, Sense, Shape, Stroke, Ui, Vec2, WidgetInfo, pos2, vec2,
};
use sheet::tokens::Pen;
use station::units::fixed;

use crate::command::{Command, Motion, Show};
use crate::explain::Explain;
use crate::snapshot::Snapshot;

/// Side of a button, px.
const BUTTON_PX: f32 = 24.0;
/// Space between buttons, px.
const GAP_PX: f32 = 4.0;
/// Room for the phase, px.
const PHASE_PX: f32 = 42.0;
/// One step of the RF cycle, degrees.
const STEP_DEG: f64 = 15.0;
/// Slower and faster: one press changes the period by this factor.
const PACE: f64 = 1.5;

/// Size of the box of buttons.
pub const BUTTONS: Vec2 = vec2(6.0 * BUTTON_PX + 6.0 * GAP_PX + PHASE_PX, BUTTON_PX);

/// What a button shows.
#[derive(Clone, Copy)]
enum Icon {
    Run,
    Stop,
    Back,
    On,
    Slower,
    Faster,
    Fit,
}

/// Shows the buttons; true when the view is to be fitted.
pub fn show(ui: &mut Ui, within: Rect, snapshot: &Snapshot<'_>, out: &mut Vec<Command>) -> bool {
    let mut place = Row { left: within.left(), top: within.top() };
    let motion = |motion| Command::Show(Show::Motion(motion));
    let phase_deg = snapshot.phase_deg;
    let (icon, name, run) = if snapshot.moving {
        (Icon::Stop, "stop the wave", Motion::Stop)
    } else {
        (Icon::Run, "run the wave", Motion::Run)
    };
    let presses = [
        (
            Icon::Back,
            "wave 15° back",
            "Steps back by 15° of the RF cycle.",
            Motion::Phase(step(phase_deg, -1.0)),
        ),
        (icon, name, "Lets the standing wave move through the RF cycle, or stops it.", run),
        (Icon::On, "wave 15° on", "Steps on by 15° of the RF cycle.", Motion::Phase(step(phase_deg, 1.0))),
    ];
    for (icon, name, sentence, does) in presses {
        if button(ui, place.next(BUTTON_PX), icon, name, sentence).clicked() {
            out.push(motion(does));
        }
    }
    let font = super::paint::font(ui, super::layout::Type::Small);
    let text = format!("{}°", fixed(phase_deg.rem_euclid(360.0).round() % 360.0, 0));
    let phase = place.next(PHASE_PX);
    ui.painter().text(
        phase.center(),
        eframe::egui::Align2::CENTER_CENTER,
        text,
        font,
        ui.visuals().weak_text_color(),
    );
    let paces = [
        (Icon::Slower, "slower wave", "One RF cycle takes longer on the screen.", snapshot.period_s * PACE),
        (
            Icon::Faster,
            "faster wave",
            "One RF cycle takes less time on the screen.",
            snapshot.period_s / PACE,
        ),
    ];
    for (icon, name, sentence, period_s) in paces {
        if button(ui, place.next(BUTTON_PX), icon, name, sentence).clicked() {
            out.push(motion(Motion::Period(period_s)));
        }
    }
    let sentence =
        "Shows the whole site again. Ctrl and the wheel zoom, dragging empty ground moves the view.";
    button(ui, place.next(BUTTON_PX), Icon::Fit, "fit the yard", sentence).clicked()
}

/// The next multiple of the step on either side.
fn step(phase_deg: f64, sense: f64) -> f64 {
    (((phase_deg / STEP_DEG).round() + sense) * STEP_DEG).rem_euclid(360.0)
}

/// Boxes side by side.
struct Row {
    left: f32,
    top: f32,
}

impl Row {
    fn next(&mut self, width: f32) -> Rect {
        let rect = Rect::from_min_size(pos2(self.left, self.top), vec2(width, BUTTON_PX));
        self.left += width + GAP_PX;
        rect
    }
}

fn button(ui: &Ui, rect: Rect, icon: Icon, name: &str, sentence: &str) -> Response {
    let response = ui.interact(rect, ui.scope_id().with(name), Sense::click());
    response.widget_info(|| WidgetInfo::labeled(Role::Button, ui.is_enabled(), name));
    let visuals = ui.style().interact(&response);
    let stroke_kind = eframe::egui::StrokeKind::Inside;
    ui.painter().rect(rect, visuals.corner_radius, visuals.weak_bg_fill, visuals.bg_stroke, stroke_kind);
    draw(ui.painter(), rect.center(), icon, Stroke::new(Pen::Curve.width(), visuals.fg_stroke.color));
    response.explain(sentence)
}

fn draw(painter: &Painter, at: Pos2, icon: Icon, stroke: Stroke) {
    let triangle = |tip: Vec2, half: f32| {
        let side = tip.normalized().rot90() * half;
        let points = vec![at + tip, at - 0.6 * tip + side, at - 0.6 * tip - side];
        Shape::convex_polygon(points, stroke.color, Stroke::NONE)
    };
    let bar = |x: f32| Shape::line_segment([at + vec2(x, -4.5), at + vec2(x, 4.5)], stroke);
    let chevron = |x: f32, by: f32| {
        Shape::line(vec![at + vec2(x, -4.0), at + vec2(x + by, 0.0), at + vec2(x, 4.0)], stroke)
    };
    match icon {
        Icon::Run => painter.extend([triangle(vec2(6.0, 0.0), 5.0)]),
        Icon::Stop => {
            painter.rect_filled(Rect::from_center_size(at, Vec2::splat(8.0)), 1.0, stroke.color);
        }
        Icon::Back => painter.extend([bar(4.0), triangle(vec2(-5.0, 0.0), 4.0)]),
        Icon::On => painter.extend([bar(-4.0), triangle(vec2(5.0, 0.0), 4.0)]),
        Icon::Slower => painter.extend([chevron(2.0, -4.0)]),
        Icon::Faster => painter.extend([chevron(-5.0, 4.0), chevron(0.0, 4.0)]),
        Icon::Fit => {
            for (x, y) in [(-1.0, -1.0), (1.0, -1.0), (1.0, 1.0), (-1.0, 1.0)] {
                let corner = at + vec2(6.0 * x, 5.0 * y);
                painter.line(vec![corner - vec2(4.0 * x, 0.0), corner, corner - vec2(0.0, 3.5 * y)], stroke);
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::step;

    #[test]
    fn steps_stand_on_multiples_of_fifteen_degrees() {
        assert!((step(7.0, 1.0) - 15.0).abs() < 1e-9);
        assert!((step(8.0, 1.0) - 30.0).abs() < 1e-9);
        assert!((step(345.0, 1.0)).abs() < 1e-9);
        assert!((step(0.0, -1.0) - 345.0).abs() < 1e-9);
    }
}
