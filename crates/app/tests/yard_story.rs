//! The Yard alone, by its accessible names: what a hand pulls, types or nudges becomes an edit, and the drawing follows.

use app::command::{Command, Edit, Motion, Show};
use app::snapshot::Snapshot;
use app::views::yard::{YardState, show};
use app::{edit, start, theme};
use eframe::egui::{self, Key, Modifiers, PointerButton, Pos2, Role, Vec2, pos2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::{NodeT as _, Queryable as _};
use sheet::tokens::Ground;
use station::evaluate::Evaluator;
use station::plan::{Earth, Feedpoint, PathPoint, Plan, Point, Site, Support, SupportKind, Wire};
use station::report::Report;
use station::units::Units;

/// 30 m of wire in the middle of 40 m between two masts, fed in its centre.
fn flat() -> Plan {
    let mast = |name: &str, x_m: f64| Support {
        name: name.to_owned(),
        kind: SupportKind::Mast,
        foot: Point::new(x_m, 0.0, 0.0),
        height_m: 11.0,
    };
    let on = |support: &str| PathPoint::OnSupport { support: support.to_owned(), height_m: 10.0 };
    let demo = start::demo();
    Plan {
        site: Site {
            supports: vec![mast("west mast", 0.0), mast("east mast", 40.0)],
            earth: Earth::Mirror,
            entrance: Point::new(18.0, -5.0, 1.5),
        },
        wires: vec![Wire {
            path: vec![on("west mast"), on("east mast")],
            start_m: 5.0,
            cut_length_m: 30.0,
            ..demo.wires[0].clone()
        }],
        feedpoint: Feedpoint { wire: 0, fraction: 0.5, gap_m: 0.02 },
        ..demo
    }
}

/// The Yard, the plan it shows, and everything it has asked for.
struct Desk {
    plan: Plan,
    report: Report,
    yard: YardState,
    units: Units,
    moving: bool,
    asked: Vec<Command>,
}

impl Desk {
    fn ui(&mut self, ui: &mut egui::Ui) {
        let mut out = Vec::new();
        let snapshot = Snapshot {
            plan: &self.plan,
            report: Some(&self.report),
            stale: false,
            band: 1,
            feed: 0,
            units: self.units,
            ground: Ground::Light,
            phase_deg: 30.0,
            moving: self.moving,
            period_s: 4.0,
        };
        show(ui, &snapshot, &mut self.yard, &mut out);
        for command in &out {
            if let Command::Edit(edit) = command {
                self.plan = edit::apply(&self.plan, edit).expect("the Yard asks for what can be done").plan;
            }
        }
        self.asked.extend(out);
    }
}

type Yard = Harness<'static, Desk>;

fn yard(plan: Plan) -> Yard {
    let report = Evaluator::new().evaluate(&plan, 1).expect("a sound plan");
    let yard = YardState::default();
    let desk = Desk { plan, report, yard, units: Units::Metres, moving: false, asked: Vec::new() };
    let mut harness = Harness::builder()
        .with_size(vec2(1000.0, 480.0))
        .with_context_setup(theme::install)
        .build_ui_state(|ui, desk: &mut Desk| desk.ui(ui), desk);
    harness.run();
    harness
}

fn middle(yard: &Yard, name: &str) -> Pos2 {
    yard.get_by_role_and_label(Role::Slider, name).rect().center()
}

/// Presses, pulls in a few steps, lets go.
fn pull(yard: &mut Yard, from: Pos2, to: Pos2) {
    yard.hover_at(from);
    yard.run();
    yard.drag_at(from);
    yard.run();
    for share in [0.2, 0.6, 1.0] {
        yard.hover_at(from.lerp(to, share));
        yard.run();
    }
    yard.drop_at(to);
    yard.run();
}

/// Pixels for a metre, from where the masts' feet are.
fn px_per_m(yard: &Yard) -> f32 {
    let (west, east) = (middle(yard, "support west mast"), middle(yard, "support east mast"));
    (east.x - west.x) / 40.0
}

fn edits(yard: &Yard) -> Vec<Edit> {
    let edit = |command: &Command| if let Command::Edit(edit) = command { Some(edit.clone()) } else { None };
    yard.state().asked.iter().filter_map(edit).collect()
}

fn ends_of_drag(yard: &Yard) -> usize {
    yard.state().asked.iter().filter(|c| **c == Command::EndOfDrag).count()
}

#[track_caller]
fn near(a: f64, b: f64) {
    assert!((a - b).abs() < 1e-6, "{a} is not {b}");
}

#[test]
fn pulling_the_wires_end_cuts_the_wire() {
    let mut yard = yard(flat());
    let end = middle(&yard, "wire end");
    let px = px_per_m(&yard);
    pull(&mut yard, end, end - vec2(6.0 * px, -4.0));
    near(yard.state().plan.wires[0].cut_length_m, 24.0);
    near(yard.state().plan.wires[0].start_m, 5.0);
    assert!(edits(&yard).iter().all(|e| matches!(e, Edit::CutLength { wire: 0, .. })));
    assert_eq!(ends_of_drag(&yard), 1);
    // The grip is where the wire ends now.
    let moved = middle(&yard, "wire end");
    assert!((end.x - moved.x - 6.0 * px).abs() < 1.0);
}

#[test]
fn beyond_the_support_the_wire_hangs_down() {
    let mut yard = yard(flat());
    let end = middle(&yard, "wire end");
    let px = px_per_m(&yard);
    pull(&mut yard, end, end + vec2(5.0 * px, 4.0 * px));
    near(yard.state().plan.wires[0].cut_length_m, 39.0);
    let hanging = middle(&yard, "wire end");
    assert!((hanging - end - vec2(5.0 * px, 4.0 * px)).length() < 2.0, "{:?}", hanging - end);
}

#[test]
fn the_beginning_can_be_pulled_too_and_the_end_stays() {
    let mut yard = yard(flat());
    let (beginning, end) = (middle(&yard, "wire beginning"), middle(&yard, "wire end"));
    let px = px_per_m(&yard);
    pull(&mut yard, beginning, beginning + vec2(2.0 * px, 0.0));
    near(yard.state().plan.wires[0].start_m, 7.0);
    near(yard.state().plan.wires[0].cut_length_m, 28.0);
    assert!((middle(&yard, "wire end") - end).length() < 0.5);
}

/// Between two frames the hand presses on the wire's end and is off it already: the end comes along all the same, and
/// the view stays.
#[test]
fn a_quick_hand_takes_what_it_pressed_on() {
    let mut yard = yard(flat());
    let (end, mast) = (middle(&yard, "wire end"), middle(&yard, "support west mast"));
    let px = px_per_m(&yard);
    let to = end - vec2(4.0 * px, 0.0);
    yard.hover_at(end);
    yard.run();
    yard.drag_at(end);
    yard.hover_at(end - vec2(3.0 * px, 0.0));
    yard.step();
    yard.hover_at(to);
    yard.run();
    yard.drop_at(to);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 26.0);
    assert!((middle(&yard, "support west mast") - mast).length() < 0.5, "the view stays");
    assert_eq!(ends_of_drag(&yard), 1);
}

#[test]
fn ctrl_pulls_both_ends() {
    let mut yard = yard(flat());
    let end = middle(&yard, "wire end");
    let px = px_per_m(&yard);
    yard.hover_at(end);
    yard.run();
    let press = |pos, pressed| egui::Event::PointerButton {
        pos,
        button: PointerButton::Primary,
        pressed,
        modifiers: Modifiers::COMMAND,
    };
    yard.event_modifiers(press(end, true), Modifiers::COMMAND);
    yard.step();
    let to = end - vec2(3.0 * px, 0.0);
    for share in [0.4, 1.0] {
        yard.event_modifiers(egui::Event::PointerMoved(end.lerp(to, share)), Modifiers::COMMAND);
        yard.step();
        yard.step();
    }
    yard.event_modifiers(press(to, false), Modifiers::COMMAND);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 24.0);
    near(yard.state().plan.wires[0].start_m, 8.0);
}

#[test]
fn the_feedpoint_snaps_at_the_centre() {
    let mut plan = flat();
    plan.feedpoint.fraction = 0.3;
    let mut yard = yard(plan);
    let feedpoint = middle(&yard, "feedpoint");
    let px = px_per_m(&yard);
    pull(&mut yard, feedpoint, feedpoint + vec2(6.0 * px + 5.0, 10.0));
    assert_eq!(edits(&yard).last(), Some(&Edit::FeedFraction(0.5)));
    yard.get_by_label_contains("centre");
}

#[test]
fn a_number_can_be_typed_beside_its_grip() {
    let mut yard = yard(flat());
    let end = middle(&yard, "wire end");
    yard.hover_at(end);
    yard.get_by_role_and_label(Role::Slider, "wire end").click();
    yard.run();
    yard.key_press(Key::Enter);
    yard.run();
    yard.get_by_role(Role::SpinButton).type_text("27.35");
    yard.run();
    yard.key_press(Key::Enter);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 27.35);
    assert!(
        yard.get_by_role_and_label(Role::Slider, "wire end").is_focused(),
        "the grip has the keyboard again"
    );
}

#[test]
fn arrow_keys_move_what_has_the_focus() {
    let mut yard = yard(flat());
    yard.get_by_role_and_label(Role::Slider, "wire end").focus();
    yard.run();
    yard.key_press(Key::ArrowRight);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 30.1);
    yard.key_press_modifiers(Modifiers::SHIFT, Key::ArrowLeft);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 30.09);
    assert_eq!(ends_of_drag(&yard), 2);

    yard.get_by_role_and_label(Role::Slider, "top of east mast").focus();
    yard.run();
    yard.key_press(Key::ArrowUp);
    yard.run();
    near(yard.state().plan.site.supports[1].height_m, 11.1);
    assert_eq!(edits(&yard).last(), Some(&Edit::SupportHeight { support: 1, height_m: 11.1 }));
}

#[test]
fn tab_walks_over_the_grips() {
    let mut yard = yard(flat());
    yard.get_by_role_and_label(Role::Slider, "wire beginning").focus();
    yard.run();
    yard.key_press(Key::Tab);
    yard.run();
    assert!(yard.get_by_role_and_label(Role::Slider, "feedpoint").is_focused());
    yard.key_press(Key::Tab);
    yard.run();
    assert!(yard.get_by_role_and_label(Role::Slider, "wire end").is_focused());
}

#[test]
fn a_screen_reader_reads_and_sets_numbers() {
    let mut yard = yard(flat());
    let cut = yard.get_by_role_and_label(Role::Slider, "wire end").accesskit_node().numeric_value();
    assert_eq!(cut, Some(30.0));
    yard.get_by_role_and_label(Role::Slider, "wire end").set_value_accesskit(26.5);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 26.5);
    yard.state_mut().units = Units::Feet;
    yard.run();
    yard.get_by_role_and_label(Role::Slider, "wire end").set_value_accesskit(100.0);
    yard.run();
    near(yard.state().plan.wires[0].cut_length_m, 30.48);
}

#[test]
fn supports_move_sideways_and_grow() {
    let mut yard = yard(flat());
    let px = px_per_m(&yard);
    let foot = middle(&yard, "support east mast");
    pull(&mut yard, foot, foot - vec2(3.0 * px, 20.0));
    near(yard.state().plan.site.supports[1].foot.x_m, 37.0);
    let top = middle(&yard, "top of west mast");
    pull(&mut yard, top, top - vec2(10.0, 2.0 * px));
    near(yard.state().plan.site.supports[0].height_m, 13.0);
}

#[test]
fn lowering_one_fixing_makes_a_sloping_wire() {
    let mut yard = yard(flat());
    let px = px_per_m(&yard);
    let fixing = middle(&yard, "wire on east mast");
    pull(&mut yard, fixing, fixing + vec2(0.0, 5.0 * px));
    assert_eq!(
        yard.state().plan.wires[0].path[1],
        PathPoint::OnSupport { support: "east mast".to_owned(), height_m: 5.0 }
    );
}

#[test]
fn pulling_a_span_up_makes_an_inverted_v_and_back_into_line_a_flat_wire() {
    let mut yard = yard(flat());
    let px = px_per_m(&yard);
    // The grip stands a little above the feedpoint, which shares its place.
    let new_point = middle(&yard, "new point in span 1");
    pull(&mut yard, new_point, new_point - vec2(0.0, 3.0 * px));
    assert_eq!(yard.state().plan.wires[0].path.len(), 3);
    assert!(
        matches!(yard.state().plan.wires[0].path[1], PathPoint::Free(at) if (at.z_m - 13.0).abs() < 1e-6)
    );
    assert_eq!(ends_of_drag(&yard), 1);
    let apex = middle(&yard, "apex");
    pull(&mut yard, apex, apex + vec2(0.0, 3.0 * px));
    assert_eq!(yard.state().plan.wires[0].path.len(), 2, "{:?}", edits(&yard).last());
}

#[test]
fn delete_takes_a_point_away() {
    let mut plan = flat();
    plan.wires[0].path.insert(1, PathPoint::Free(Point::new(20.0, 0.0, 13.0)));
    let mut yard = yard(plan);
    yard.get_by_role_and_label(Role::Slider, "apex").focus();
    yard.run();
    yard.key_press(Key::Delete);
    yard.run();
    assert_eq!(yard.state().plan.wires[0].path.len(), 2);
}

#[test]
fn the_entrance_can_be_dragged() {
    let mut yard = yard(flat());
    let px = px_per_m(&yard);
    let entrance = middle(&yard, "entrance");
    pull(&mut yard, entrance, entrance + vec2(-8.0 * px, -1.5 * px));
    let at = yard.state().plan.site.entrance;
    near(at.x_m, 10.0);
    near(at.y_m, -5.0);
    near(at.z_m, 3.0);
}

#[test]
fn the_wave_is_read_in_metres_amperes_and_volts() {
    let mut yard = yard(flat());
    yard.get_by_label("standing wave read-out").focus();
    yard.run();
    let value = |yard: &Yard| yard.get_by_label("standing wave read-out").value().unwrap();
    assert!(value(&yard).starts_with("at the feedpoint"), "{}", value(&yard));
    for _ in 0..10 {
        yard.key_press(Key::ArrowRight);
        yard.run();
    }
    let there = value(&yard);
    assert!(there.starts_with("3.00 m from the feedpoint toward the end, "), "{there}");
    assert!(there.contains("A and") && there.ends_with("V peak"), "{there}");
}

#[test]
fn the_cycle_runs_stops_and_steps() {
    let mut yard = yard(flat());
    for name in ["wave 15° on", "wave 15° back", "slower wave", "run the wave"] {
        yard.get_by_role_and_label(Role::Button, name).click();
        yard.run();
    }
    yard.state_mut().moving = true;
    yard.run();
    yard.get_by_role_and_label(Role::Button, "stop the wave").click();
    yard.run();
    let motion = |m| Command::Show(Show::Motion(m));
    let expected = [
        motion(Motion::Phase(45.0)),
        motion(Motion::Phase(15.0)),
        motion(Motion::Period(6.0)),
        motion(Motion::Run),
        motion(Motion::Stop),
    ];
    assert_eq!(yard.state().asked, expected);
}

#[test]
fn zoom_and_fit() {
    let mut yard = yard(flat());
    let before = px_per_m(&yard);
    let pointer = pos2(500.0, 200.0);
    yard.hover_at(pointer);
    yard.run();
    let wheel = egui::Event::MouseWheel {
        unit: egui::MouseWheelUnit::Line,
        delta: Vec2::new(0.0, -3.0),
        phase: egui::TouchPhase::Move,
        source: egui::MouseWheelSource::Wheel,
        modifiers: Modifiers::COMMAND,
    };
    yard.event_modifiers(wheel, Modifiers::COMMAND);
    yard.run_steps(12);
    let zoomed = px_per_m(&yard);
    assert!(zoomed < 0.9 * before, "{zoomed} against {before}");
    yard.get_by_role_and_label(Role::Button, "fit the yard").click();
    yard.run();
    assert!((px_per_m(&yard) - before).abs() < 0.01);
}

#[test]
fn dragging_the_ground_moves_the_view_and_no_plan() {
    let mut yard = yard(flat());
    let west = middle(&yard, "support west mast");
    pull(&mut yard, pos2(300.0, 330.0), pos2(360.0, 310.0));
    let moved = middle(&yard, "support west mast") - west;
    assert!((moved - vec2(60.0, -20.0)).length() < 1.0, "{moved:?}");
    assert!(yard.state().asked.is_empty());
}

#[test]
fn arrows_bend_the_wire_and_go_on_with_the_new_point() {
    let mut yard = yard(flat());
    yard.get_by_role_and_label(Role::Slider, "new point in span 1").focus();
    yard.run();
    for _ in 0..3 {
        yard.key_press(Key::ArrowUp);
        yard.run();
    }
    let path = &yard.state().plan.wires[0].path;
    assert_eq!(path.len(), 3, "one point, moved three times");
    assert!(matches!(path[1], PathPoint::Free(at) if (at.z_m - 10.3).abs() < 1e-6), "{path:?}");
    assert!(yard.get_by_role_and_label(Role::Slider, "apex").is_focused());
}

#[test]
fn the_view_stands_still_in_a_drag_and_shows_everything_afterwards() {
    let mut yard = yard(flat());
    let (west, east) = (middle(&yard, "support west mast"), middle(&yard, "support east mast"));
    yard.hover_at(east);
    yard.run();
    yard.drag_at(east);
    yard.run();
    yard.hover_at(east + vec2(40.0, 0.0));
    yard.run();
    // Out over the edge of the window.
    yard.hover_at(pos2(1400.0, east.y));
    yard.run();
    assert!((middle(&yard, "support west mast") - west).length() < 0.5);
    yard.drop_at(pos2(1400.0, east.y));
    yard.run();
    assert!(yard.state().plan.site.supports[1].foot.x_m > 50.0);
    let moved = middle(&yard, "support east mast");
    assert!(moved.x < 1000.0 && moved.x > 700.0, "{moved:?}");
}

#[test]
fn a_press_elsewhere_lets_go() {
    let mut yard = yard(flat());
    let end = middle(&yard, "wire end");
    yard.hover_at(end);
    yard.get_by_role_and_label(Role::Slider, "wire end").click();
    yard.run();
    assert!(yard.query_by_role(Role::SpinButton).is_some());
    yard.drag_at(pos2(300.0, 330.0));
    yard.run();
    yard.drop_at(pos2(300.0, 330.0));
    yard.run();
    assert!(yard.query_by_role(Role::SpinButton).is_none());
    assert!(!yard.get_by_role_and_label(Role::Slider, "wire end").is_focused());
}
