//! The station is set up in words and numbers.

mod common;

use app::command::{Command, Show, View};
use app::start;
use common::Window;
use eframe::egui::{Key, Modifiers};
use station::file;
use station::plan::{BandRange, Earth};

fn open() -> Window {
    let mut window = Window::open();
    window.command(Command::Show(Show::View(View::Station)));
    window
}

#[test]
fn a_new_name_is_in_the_title_once_the_field_is_left() {
    let mut window = open();
    window.type_into("station name", "Dune hut");
    assert_eq!(window.plan().name, start::demo().name, "a half-typed name is no name yet");
    window.key(Default::default(), Key::Tab);
    assert_eq!(window.plan().name, "Dune hut");
    assert!(window.has("Dune hut *"));
    window.click("Undo");
    assert_eq!(window.plan().name, start::demo().name);
}

#[test]
fn what_is_typed_is_saved_even_while_the_field_has_the_keyboard() {
    let mut window = open();
    let path = window.file("typed.ron");
    window.will_choose(app::desk::Chosen::Path(path.clone()));
    window.type_into("call sign", "Q9NEW");
    window.ctrl(Key::S);
    window.watch(3);
    assert_eq!(file::load(&path).unwrap().call_sign, "Q9NEW");
}

#[test]
fn bands_come_from_the_catalogue_and_from_the_hand() {
    let mut window = open();
    let count = start::demo().bands.len();
    window.click("Add channels");
    let BandRange::Channels { .. } = window.plan().bands[count].range else { panic!("channels were added") };
    let field = format!("channels of band {}, kHz", count + 1);
    window.type_into(&field, "4500, 8200.5");
    window.key(Default::default(), Key::Tab);
    assert_eq!(
        window.plan().bands[count].range,
        BandRange::Channels { frequencies_hz: vec![4.5e6, 8.2005e6] }
    );
    window.click("remove 80 m");
    assert!(window.plan().bands.iter().all(|band| band.name != "80 m"));
    window.click("+ 80 m");
    assert!(window.plan().bands.iter().any(|band| band.name == "80 m"));
    window.settle();
    window.command(Command::Show(Show::View(View::Yard)));
    assert!(window.lane("80 m").contains('Ω'));
}

#[test]
fn a_band_out_of_reach_is_refused_with_a_sentence() {
    let mut window = open();
    window.type_into("upper edge of band 1, kHz", "900000");
    window.key(Default::default(), Key::Tab);
    assert!(window.says("bands[0]") && window.says("accepted"));
    assert_eq!(*window.plan(), start::demo());
}

#[test]
fn the_earth_is_picked_by_what_one_sees() {
    let mut window = open();
    let before = {
        window.command(Command::Show(Show::View(View::Yard)));
        window.lane("80 m")
    };
    window.command(Command::Show(Show::View(View::Station)));
    window.click("earth");
    window.click("Sea");
    assert_eq!(window.plan().site.earth, Earth::Catalogue("sea".to_owned()));
    window.settle();
    window.command(Command::Show(Show::View(View::Yard)));
    assert_ne!(window.lane("80 m"), before);
}

#[test]
fn the_user_s_own_soil_is_typed() {
    let mut window = open();
    window.click("earth");
    window.click("own figures");
    let Earth::Own(begun) = window.plan().site.earth else { panic!("{:?}", window.plan().site.earth) };
    assert!(begun.conductivity_s_per_m > 0.0);
    window.type_into("relative permittivity", "22");
    window.key(Modifiers::NONE, Key::Tab);
    window.type_into("conductivity", "31.5");
    window.key(Modifiers::NONE, Key::Tab);
    let Earth::Own(soil) = window.plan().site.earth else { panic!("{:?}", window.plan().site.earth) };
    assert!(
        (soil.relative_permittivity - 22.0).abs() < 1e-9 && (soil.conductivity_s_per_m - 0.0315).abs() < 1e-9
    );
    // Out of the field, which has an undo of its own.
    window.command(Command::Show(Show::View(View::Yard)));
    window.settle();
    window.ctrl(Key::Z);
    assert_eq!(
        window.plan().site.earth,
        Earth::Own(station::plan::Soil { relative_permittivity: 22.0, ..begun })
    );
}

#[test]
fn a_support_that_holds_a_wire_stays() {
    let mut window = open();
    window.node("Add a support").scroll_to_me();
    window.watch(3);
    window.click("Add a support");
    assert_eq!(window.plan().site.supports.len(), 3);
    window.type_into("name of support 1", "lee mast");
    window.key(Default::default(), Key::Tab);
    assert_eq!(window.plan().site.supports[0].name, "lee mast");
    window.click_first("Remove", "lee mast");
    assert!(window.says("hangs on lee mast"));
    assert_eq!(window.plan().site.supports.len(), 3);
}
