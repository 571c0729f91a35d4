//! From the smallest window to a large one: bars keep their parts apart and inside.

mod common;

use app::command::{Command, Edit, Show, Theme, View};
use app::start;
use common::Window;
use eframe::egui::Rect;

const SIZES: [[f32; 2]; 3] = [[1024.0, 700.0], [1280.0, 800.0], [1920.0, 1080.0]];
const BARS: [&str; 9] = ["File", "Yard", "Band", "Sheet", "Station", "Undo", "Redo", "m", "ft"];

#[test]
fn bars_hold_at_every_size_even_with_the_longest_name() {
    let longest = "Long wire ".repeat(8);
    for size in SIZES {
        let mut window = Window::with(start::demo(), None, size, Theme::Light);
        window.command(Command::Edit(Edit::Name(longest.clone())));
        window.settle();
        for view in [View::Yard, View::Band, View::Station] {
            window.command(Command::Show(Show::View(view)));
            window.harness.run_steps(2);
            let whole = Rect::from_min_size(Default::default(), size.into());
            let mut parts: Vec<(String, Rect)> =
                BARS.iter().map(|name| ((*name).to_owned(), window.node(name).rect())).collect();
            let title = format!("{longest} *");
            parts.push((title.clone(), window.node(&title).rect()));
            for (index, (name, rect)) in parts.iter().enumerate() {
                assert!(whole.contains_rect(*rect), "{name} at {rect:?} in {size:?}, {view:?}");
                for (other, place) in &parts[..index] {
                    assert!(
                        !rect.shrink(0.5).intersects(place.shrink(0.5)),
                        "{name} over {other} in {size:?}, {view:?}"
                    );
                }
            }
        }
    }
}

#[test]
fn the_window_can_be_made_smaller_and_larger() {
    let mut window = Window::open();
    for size in SIZES {
        window.harness.set_size(size.into());
        window.harness.run_steps(3);
        let lane = window.node("lane 80 m").rect();
        let yard = window.node("yard from the side").rect();
        assert!(yard.bottom() <= lane.top() && yard.height() > 100.0, "{size:?}: {yard:?}, {lane:?}");
        assert!(lane.right() <= size[0] && lane.bottom() <= size[1], "{size:?}: {lane:?}");
    }
}
