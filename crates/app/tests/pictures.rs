//! What the eye sees, painted by the CPU: each ground is the tokens' ground, the page is white, marks are in their inks.

mod common;

use app::command::{Command, Show, Theme, View};
use app::{start, theme};
use common::Window;
use eframe::egui::Color32;
use image::RgbaImage;
use sheet::tokens::{Ground, Ink};

fn open(look: Theme) -> Window {
    Window::with(start::demo(), None, [1024.0, 700.0], look)
}

fn at(picture: &RgbaImage, x: u32, y: u32) -> Color32 {
    let [r, g, b, a] = picture.get_pixel(x, y).0;
    #[expect(clippy::disallowed_methods)] // What the picture has, whatever that is.
    Color32::from_rgba_unmultiplied(r, g, b, a)
}

/// How many pixels have just this colour.
fn count(picture: &RgbaImage, color: Color32) -> usize {
    picture.pixels().filter(|pixel| pixel.0 == color.to_srgba_unmultiplied()).count()
}

#[test]
fn light_and_dark_are_the_tokens() {
    for (look, ground) in [(Theme::Light, Ground::Light), (Theme::Dark, Ground::Dark)] {
        let mut window = open(look);
        let picture = window.picture();
        assert_eq!(picture.dimensions(), (1024, 700));
        assert!(picture.pixels().all(|pixel| pixel.0[3] == 255), "nothing shines through");
        let last = (picture.width() - 1, picture.height() - 1);
        for (x, y) in [(0, 0), (last.0, 0), (0, last.1), last] {
            assert_eq!(
                at(&picture, x, y),
                theme::color(Ink::Panel, ground),
                "bars end at the edge: {x}, {y}"
            );
        }
        for ink in [Ink::Background, Ink::Panel, Ink::Earth, Ink::Wire] {
            assert!(count(&picture, theme::color(ink, ground)) > 100, "{ink:?} on {ground:?}");
        }
    }
}

#[test]
fn the_page_is_white_by_night_too() {
    let mut window = open(Theme::Dark);
    window.command(Command::Show(Show::View(View::Sheet)));
    window.settle();
    let page = window.node("page 1 of 2").rect();
    let picture = window.picture();
    let (x, y) = (page.left() as u32 + 8, page.top() as u32 + 8);
    assert_eq!(at(&picture, x, y), Color32::WHITE);
    assert!(count(&picture, theme::color(Ink::Text, Ground::Paper)) > 500, "the text is on it");
    assert!(window.value("page 1 of 2").contains("Saltmarsh relief post"));
}
