//! The first story: the wire is cut, the lanes follow, and it is all taken back.

mod common;

use app::command::{Command, Show, View};
use app::start;
use common::Window;
use eframe::egui::{Key, Modifiers, vec2};

#[test]
fn dragging_the_wires_end_changes_every_lane_and_undo_brings_it_back() {
    let mut window = Window::open();
    let before: Vec<String> = start::demo().bands.iter().map(|band| window.lane(&band.name)).collect();
    assert!(before.iter().all(|lane| lane.contains('Ω')), "{before:?}");

    let end = window.node("wire end").rect().center();
    window.drag(end, end - vec2(90.0, 0.0));
    window.settle();
    assert!(window.plan().wires[0].cut_length_m < start::demo().wires[0].cut_length_m - 1.0);
    for (band, before) in start::demo().bands.iter().zip(&before) {
        assert_ne!(&window.lane(&band.name), before, "{}", band.name);
    }

    window.ctrl(Key::Z);
    window.settle();
    let after: Vec<String> = start::demo().bands.iter().map(|band| window.lane(&band.name)).collect();
    assert_eq!(after, before);
    assert_eq!(*window.plan(), start::demo());
}

#[test]
fn a_drag_is_one_step_and_redo_brings_it_again() {
    let mut window = Window::open();
    let end = window.node("wire end").rect().center();
    window.drag(end, end - vec2(60.0, 0.0));
    let cut = window.plan().clone();
    window.click("Undo");
    assert_eq!(*window.plan(), start::demo());
    window.key(Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    assert_eq!(*window.plan(), cut);
}

#[test]
fn arrows_choose_the_band() {
    let mut window = Window::open();
    assert_eq!(window.app().looks().band, 0);
    window.key(Modifiers::NONE, Key::ArrowDown);
    assert_eq!(window.app().looks().band, 1);
    window.command(Command::Show(Show::View(View::Band)));
    window.key(Modifiers::NONE, Key::ArrowDown);
    assert_eq!(window.app().looks().band, 2);
    window.key(Modifiers::NONE, Key::ArrowUp);
    window.key(Modifiers::NONE, Key::ArrowUp);
    window.key(Modifiers::NONE, Key::ArrowUp);
    assert_eq!(window.app().looks().band, 0);
}
