//! Loads and more wires: set up in words and numbers, slid in the Yard, taken back.

mod common;

use app::command::{Command, Show, View};
use app::start;
use common::Window;
use eframe::egui::{Key, Modifiers, vec2};
use station::plan::{Circuit, EarthConnection, Electrode, WireEnd};

fn open() -> Window {
    let mut window = Window::open();
    show(&mut window, View::Station);
    window
}

fn show(window: &mut Window, view: View) {
    window.command(Command::Show(Show::View(view)));
}

fn near(a: f64, b: f64) -> bool {
    (a - b).abs() < 1e-6
}

#[test]
fn a_trap_is_added_measured_and_slid_along_the_wire() {
    let mut window = open();
    window.click("Add a trap");
    window.type_into("name of load 1", "7 MHz trap");
    window.key(Modifiers::NONE, Key::Tab);
    window.type_into("resonance", "7.02");
    window.key(Modifiers::NONE, Key::Tab);
    window.type_into("Q", "120");
    window.key(Modifiers::NONE, Key::Tab);
    let load = window.plan().loads[0].clone();
    assert_eq!(load.name, "7 MHz trap");
    let Circuit::MeasuredTrap { resonance_hz, q, .. } = load.circuit else { panic!("{load:?}") };
    assert!(near(resonance_hz, 7.02e6) && near(q, 120.0));

    show(&mut window, View::Yard);
    window.settle();
    let cut_m = window.plan().wires[0].cut_length_m;
    let place_m = |window: &Window| window.plan().loads[0].fraction * cut_m;
    window.node("load 7 MHz trap").focus();
    window.harness.run_steps(2);
    let before_m = place_m(&window);
    window.key(Modifiers::NONE, Key::ArrowRight);
    let after_m = place_m(&window);
    assert!(
        after_m > before_m && after_m < before_m + 0.151 && near((10.0 * after_m).round(), 10.0 * after_m)
    );

    // The hand slides it toward the wire's beginning; one step of undo brings it back.
    let lane = window.lane("40 m");
    let at = window.node("load 7 MHz trap").rect().center();
    window.drag(at, at - vec2(60.0, 0.0));
    window.settle();
    let slid_m = place_m(&window);
    assert!(slid_m < after_m - 1.0 && near((10.0 * slid_m).round(), 10.0 * slid_m), "{slid_m}");
    assert_ne!(window.lane("40 m"), lane, "the bands follow");
    window.ctrl(Key::Z);
    assert!(near(place_m(&window), after_m));
}

#[test]
fn a_trap_says_its_values_under_the_pointer_and_goes_with_delete() {
    let mut window = open();
    window.click("Add a coil");
    window.type_into("inductance", "12.5");
    window.key(Modifiers::NONE, Key::Tab);
    assert!(
        matches!(window.plan().loads[0].circuit, Circuit::Coil { inductance_h, .. } if near(inductance_h * 1e6, 12.5))
    );
    window.click("kind of load 1");
    window.click("resistor");
    assert_eq!(window.plan().loads[0].circuit, Circuit::Resistor { resistance_ohm: 400.0 });
    show(&mut window, View::Yard);
    window.settle();
    let at = window.node("load coil 1").rect().center();
    window.harness.hover_at(at);
    window.harness.run_steps(3);
    assert!(window.says("Drag along the wire"));
    window.node("load coil 1").focus();
    window.harness.run_steps(2);
    window.key(Modifiers::NONE, Key::Delete);
    assert!(window.plan().loads.is_empty() && !window.has("load coil 1"));
}

#[test]
fn a_load_on_the_feedpoint_is_stopped_with_a_sentence() {
    let mut window = open();
    window.click("Add a trap");
    let middle_m = 0.5 * window.plan().wires[0].cut_length_m;
    window.type_into("from the beginning", &format!("{middle_m}"));
    window.key(Modifiers::NONE, Key::Tab);
    assert!(window.says("from the feedpoint"));
    let away_m = middle_m - window.plan().loads[0].fraction * 2.0 * middle_m;
    assert!((0.015..0.1).contains(&away_m), "{away_m}");
}

#[test]
fn a_second_wire_is_added_named_seen_and_removed() {
    let mut window = open();
    window.click("Add a wire");
    assert_eq!(window.plan().wires.len(), 2);
    window.type_into("name of wire 2", "low wire");
    window.key(Modifiers::NONE, Key::Tab);
    window.settle();
    show(&mut window, View::Yard);
    assert!(window.has("low wire beginning") && window.has("low wire end"));
    assert!(window.lane("80 m").contains('Ω'));
    show(&mut window, View::Station);
    window.click("Remove wire 2");
    assert_eq!(window.plan().wires, start::demo().wires);
    window.ctrl(Key::Z);
    assert_eq!(window.plan().wires[1].name, "low wire");
}

#[test]
fn a_fan_answers_and_undoes_in_one_step() {
    let mut window = open();
    window.settle();
    show(&mut window, View::Yard);
    let before = window.lane("20 m");
    show(&mut window, View::Station);
    window.click("Add two arms at the feedpoint");
    assert_eq!(window.plan().wires.len(), 3);
    window.settle();
    show(&mut window, View::Yard);
    assert!(window.has("arm 1 end") && window.has("arm 2 end"));
    assert!(window.lane("20 m").contains('Ω') && window.lane("20 m") != before);
    window.ctrl(Key::Z);
    assert_eq!(*window.plan(), start::demo());
}

/// The 40 m lane's words; the Station view is left and entered again.
fn lane_in_yard(window: &mut Window) -> String {
    show(window, View::Yard);
    window.settle();
    let lane = window.lane("40 m");
    show(window, View::Station);
    window.settle();
    lane
}

#[test]
fn an_end_is_earthed_changed_and_taken_back() {
    let mut window = open();
    let wire = window.plan().wires[0].name.clone();
    let lane = lane_in_yard(&mut window);
    window.click(&format!("earth at the end of {wire}"));
    window.click("earth stake");
    let earthed = window.plan().wires[0].earthed.clone();
    assert!(
        matches!(earthed[..], [EarthConnection { end: WireEnd::End, electrode: Electrode::Stake { .. } }]),
        "{earthed:?}"
    );
    assert_ne!(lane_in_yard(&mut window), lane, "the bands follow");
    window.click(&format!("earth at the end of {wire}"));
    window.click("stated impedance");
    window.type_into("resistance", "75");
    window.key(Modifiers::NONE, Key::Tab);
    let electrode = window.plan().wires[0].earthed[0].electrode.clone();
    assert!(matches!(electrode, Electrode::Stated { resistance_ohm, .. } if near(resistance_ohm, 75.0)));
    window.click(&format!("earth at the end of {wire}"));
    window.click("nothing");
    assert!(window.plan().wires[0].earthed.is_empty());
    assert_eq!(lane_in_yard(&mut window), lane, "everything is as it was");
}
