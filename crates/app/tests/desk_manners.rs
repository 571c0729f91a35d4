//! Opening, saving, dropping, asking before work is lost, and the keys.

mod common;

use std::fs;

use app::command::{Command, Desk, Edit, Show, View};
use app::desk::{Ask, Chosen};
use app::start;
use common::Window;
use eframe::egui::{Key, Modifiers};
use station::file;
use station::units::Units;

/// A plan that is told apart by its name.
fn other() -> station::plan::Plan {
    station::plan::Plan { name: "Dune hut".to_owned(), ..start::demo() }
}

fn cut(window: &mut Window, cut_length_m: f64) {
    window.command(Command::Edit(Edit::CutLength { wire: 0, cut_length_m }));
}

#[test]
fn a_plan_is_saved_and_opened_again() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    assert!(window.has("Saltmarsh relief post *"));
    let path = window.file("post.ron");
    window.will_choose(Chosen::Path(path.clone()));
    window.ctrl(Key::S);
    assert!(matches!(window.asked()[..], [Ask::SavePlan { .. }]));
    assert!(window.has("Saltmarsh relief post") && window.says("Saved to"));
    assert_eq!(file::load(&path).unwrap(), *window.plan());

    // The second time it knows its file.
    cut(&mut window, 36.0);
    window.ctrl(Key::S);
    assert_eq!(window.asked().len(), 1);
    assert_eq!(file::load(&path).unwrap(), *window.plan());

    window.ctrl(Key::N);
    assert!(window.has("New station"));
    window.will_choose(Chosen::Path(path));
    window.ctrl(Key::O);
    window.settle();
    assert!(window.has("Saltmarsh relief post"));
    assert_eq!(window.plan().wires[0].cut_length_m.to_bits(), 36.0_f64.to_bits());
}

#[test]
fn save_as_takes_another_file() {
    let mut window = Window::open();
    let (first, second) = (window.file("first.ron"), window.file("second.ron"));
    for path in [&first, &second] {
        window.will_choose(Chosen::Path(path.clone()));
        window.key(Modifiers::COMMAND | Modifiers::SHIFT, Key::S);
    }
    assert_eq!(window.app().document().path(), Some(second.as_path()));
    assert_eq!(window.app().desk().settings().recent, [second, first]);
}

#[test]
fn a_broken_file_costs_nothing() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    let before = window.plan().clone();
    let good = file::to_text(&other()).unwrap();
    for (name, text, words) in [
        ("broken.ron", "(format: (1, 0), plan: {".to_owned(), "line 1"),
        ("truncated.ron", good[..good.len() / 2].to_owned(), "line"),
        ("newer.ron", good.replace("(1, 1)", "(9, 0)"), "newer"),
        ("absurd.ron", good.replace("cut_length_m: ", "cut_length_m: -"), "wires[0].cut_length_m"),
    ] {
        let path = window.file(name);
        fs::write(&path, text).unwrap();
        window.will_choose(Chosen::Path(path));
        window.command(Command::Desk(Desk::OpenPath(window.file(name))));
        for words in [name, words, "accepted"] {
            assert!(window.says(words), "{name}: {words} in {:?}", window.app().desk().notice());
        }
        assert_eq!(*window.plan(), before, "{name}");
        assert!(window.has("Saltmarsh relief post *"));
        assert!(!window.has("Save the changes first?"), "a file that cannot be opened is no reason to ask");
        window.click("Dismiss");
        assert!(!window.says(name));
    }
    let path = window.file("nowhere.ron");
    window.command(Command::Desk(Desk::OpenPath(path)));
    assert!(window.says("nowhere.ron") && window.says("cannot be read"));
}

#[test]
fn a_file_dropped_on_the_window_opens() {
    let mut window = Window::open();
    let path = window.file("hut.ron");
    file::save(&other(), &path).unwrap();
    window.drop_file(&path);
    window.settle();
    assert!(window.has("Dune hut"));
}

#[test]
fn unsaved_work_is_asked_about() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    let changed = window.plan().clone();

    window.ctrl(Key::N);
    assert!(window.has("Save the changes first?"));
    window.click("Stay here");
    assert_eq!(*window.plan(), changed);

    window.ctrl(Key::N);
    window.key(Modifiers::NONE, Key::Escape);
    assert!(!window.has("Save the changes first?"));
    assert_eq!(*window.plan(), changed);

    window.ctrl(Key::N);
    let path = window.file("kept.ron");
    window.will_choose(Chosen::Path(path.clone()));
    window.click("Save");
    assert_eq!(file::load(&path).unwrap(), changed);
    assert!(window.has("New station"));

    cut(&mut window, 19.0);
    window.ctrl(Key::N);
    window.click("Go on without saving");
    assert_eq!(*window.plan(), start::new_station());
}

#[test]
fn opening_asks_once_and_only_for_a_file_that_can_be_opened() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    let path = window.file("hut.ron");
    file::save(&other(), &path).unwrap();
    window.will_choose(Chosen::Path(path));
    window.ctrl(Key::O);
    assert!(window.has("Save the changes first?"));
    window.click("Go on without saving");
    assert!(!window.has("Save the changes first?"));
    assert_eq!(*window.plan(), other());
}

#[test]
fn a_cancelled_save_loses_nothing() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    let changed = window.plan().clone();
    window.ctrl(Key::N);
    window.will_choose(Chosen::Nothing);
    window.click("Save");
    assert_eq!(*window.plan(), changed);
    assert!(window.has("Saltmarsh relief post *"));
    // A later save does not carry out what was wanted then.
    window.will_choose(Chosen::Path(window.file("later.ron")));
    window.ctrl(Key::S);
    assert_eq!(*window.plan(), changed);
}

#[test]
fn closing_the_window_asks_too() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    window.close();
    assert!(window.has("Save the changes first?"));
    assert!(window.asked_of_system().iter().any(|c| c == "CancelClose"));
    window.click("Go on without saving");
    assert!(window.asked_of_system().iter().any(|c| c == "Close"));
}

#[test]
fn a_desktop_without_a_file_dialog_lets_the_path_be_typed() {
    let mut window = Window::open();
    window.will_choose(Chosen::NoDialog);
    window.key(Modifiers::COMMAND | Modifiers::SHIFT, Key::S);
    assert!(window.has("Save the plan as"));
    let path = window.file("typed");
    window.type_into("Path of the file", &path.display().to_string());
    window.click("Save");
    assert_eq!(file::load(&path.with_extension("ron")).unwrap(), *window.plan());

    window.will_choose(Chosen::NoDialog);
    window.ctrl(Key::O);
    assert!(window.has("Recent files") && window.has("typed.ron"));
    window.click("Cancel");
    assert!(!window.has("Recent files"));
}

#[test]
fn what_is_remembered_comes_back() {
    let mut window = Window::open();
    window.key(Modifiers::NONE, Key::M);
    assert_eq!(window.app().looks().units, Units::Feet);
    let text = fs::read_to_string(window.file("settings.ron")).unwrap();
    assert!(text.contains("Feet"), "{text}");
    window.click("m");
    assert_eq!(window.app().looks().units, Units::Metres);
}

#[test]
fn every_key_is_on_the_list() {
    let mut window = Window::open();
    window.key(Modifiers::NONE, Key::F1);
    for words in ["Commands by key", "Save the plan", "Undo the last step", "Metres or feet", "Ctrl+S"] {
        assert!(window.has(words), "{words}");
    }
    // Keys are for the dialog while it is open.
    window.ctrl(Key::Num3);
    assert_eq!(window.app().looks().view, View::Yard);
    window.key(Modifiers::NONE, Key::Escape);
    assert!(!window.has("Commands by key"));
    for (key, view) in [(Key::Num2, View::Band), (Key::Num3, View::Sheet), (Key::Num1, View::Yard)] {
        window.ctrl(key);
        assert_eq!(window.app().looks().view, view);
    }
}

#[test]
fn the_file_menu_says_its_keys() {
    let mut window = Window::open();
    window.click("File");
    for words in ["New Ctrl+N", "Open… Ctrl+O", "Save Ctrl+S", "Save sheet… Ctrl+P", "Quit Ctrl+Q"] {
        assert!(window.has(words), "{words}");
    }
    window.click("Commands by key F1");
    assert!(window.has("Choose the next band"));
}

#[test]
fn the_sheet_is_saved_from_the_newest_numbers() {
    let mut window = Window::open();
    cut(&mut window, 37.0);
    let path = window.file("sheet.pdf");
    window.will_choose(Chosen::Path(path.clone()));
    window.ctrl(Key::P);
    window.settle();
    let bytes = fs::read(&path).unwrap();
    assert!(bytes.starts_with(b"%PDF-"));
    assert!(window.says("Sheet saved to") && window.has("Show it"));
}

#[test]
fn a_refused_edit_says_why_and_a_stop_stands_in_the_status_line() {
    let mut window = Window::open();
    window.command(Command::Edit(Edit::Bands(Vec::new())));
    assert!(window.says("bands"));
    window.click("Dismiss");
    window.command(Command::Show(Show::View(View::Station)));
    window.type_into("cut length", "5000");
    window.key(Modifiers::NONE, Key::Enter);
    assert!(window.says("no further: wires[0].cut_length_m"), "the stop is explained");
    assert!(window.plan().wires[0].cut_length_m > 39.5, "it went as far as it could");
    window.ctrl(Key::Z);
    assert!(!window.says("no further"));
    assert_eq!(*window.plan(), start::demo());
}
