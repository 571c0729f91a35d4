//! The soil under the wires, chosen in the Yard: one click drier or wetter, and the watts follow.

mod common;

use app::start;
use common::Window;
use eframe::egui::{Key, Modifiers, Role};
use egui_kittest::kittest::{NodeT as _, Queryable as _};
use station::catalogue;
use station::plan::Earth;

/// The soil of a plan, by its id.
fn soil(window: &Window) -> String {
    let Earth::Catalogue(id) = &window.plan().site.earth else { panic!("{:?}", window.plan().site.earth) };
    id.clone()
}

/// Watts into the sky and into the earth of the first feed on a band, as the lane reads them out.
fn watts(window: &Window, band: &str) -> (f64, f64) {
    let lane = window.lane(band);
    let before = |words: &str| {
        let text = lane.split(words).next().unwrap_or_default().trim_end().trim_end_matches(" W");
        text.rsplit(' ').next().unwrap_or_default().parse().unwrap_or_else(|_| panic!("no watts in {lane}"))
    };
    (before("of them to the sky"), before("into the earth"))
}

/// What the first feed path reads out.
fn path(window: &Window) -> String {
    window
        .harness
        .get_by_role_and_label(Role::Button, "feed A open line")
        .value()
        .expect("the feed says its watts")
}

#[test]
fn drier_soil_takes_other_watts_and_undo_brings_the_old_ones_back() {
    let mut window = Window::open();
    assert_eq!(soil(&window), "marsh");
    let (before, lane) = (watts(&window, "80 m"), window.lane("80 m"));
    let foot = path(&window);
    assert!(foot.contains("leave for the sky") && foot.contains("heat the earth"), "{foot}");

    window.click("drier");
    window.settle();
    assert_eq!(soil(&window), "wooded-hills");
    assert!(window.has("earth") && window.says("Wooded hills"));
    assert_ne!(watts(&window, "80 m"), before);
    assert_ne!(path(&window), foot);

    window.ctrl(Key::Z);
    window.settle();
    assert_eq!(*window.plan(), start::demo());
    assert_eq!(window.lane("80 m"), lane);
    assert_eq!(path(&window), foot);
    window.key(Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    assert_eq!(soil(&window), "wooded-hills");

    window.click("wetter");
    window.settle();
    assert_eq!(window.lane("80 m"), lane);
    window.click("wetter");
    assert_eq!(soil(&window), "pasture");
}

/// A low wire loses most to a soil that conducts a little: the sea, a mirror almost, takes far less.
#[test]
fn over_the_sea_the_earth_takes_less() {
    let mut window = Window::open();
    let marsh = watts(&window, "80 m");
    window.click("earth");
    window.click("Sea");
    window.settle();
    assert_eq!(soil(&window), "sea");
    let sea = watts(&window, "80 m");
    assert!(sea.1 < 0.5 * marsh.1 && sea.0 > marsh.0, "{sea:?} over the sea, {marsh:?} over marsh");
    assert!(
        window.harness.get_by_label("wetter").accesskit_node().is_disabled(),
        "nothing is wetter than the sea"
    );
}

#[test]
fn every_soil_fits_its_pick_list() {
    for size in [[1024.0, 700.0], [1920.0, 1080.0]] {
        let mut window = Window::with(start::demo(), None, size, app::command::Theme::Dark);
        for entry in catalogue::soils() {
            let earth = Earth::Catalogue(entry.id.clone());
            window.command(app::command::Command::Edit(app::command::Edit::Earth(earth)));
            let boxes: Vec<_> = ["earth", "wetter", "drier"]
                .map(|name| window.harness.get_by_role_and_label(role(name), name).rect())
                .into();
            for pair in boxes.windows(2) {
                assert!(pair[0].right() <= pair[1].left(), "{}: {boxes:?}", entry.name);
            }
            assert!(boxes[2].right() < size[0] && boxes[0].width() < 220.0, "{}: {boxes:?}", entry.name);
        }
    }
}

fn role(name: &str) -> Role {
    if name == "earth" { Role::ComboBox } else { Role::Button }
}
