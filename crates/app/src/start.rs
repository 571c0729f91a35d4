//! Starting: the plans that come with the program, and the window.

use std::path::PathBuf;
use std::sync::Arc;

use eframe::egui;
use station::file;
use station::plan::Plan;

use crate::app::{Beginning, Wirewright};
use crate::desk::{self, DesktopChooser, DesktopWays, Notice, SettingsFile};

/// The station that the program opens with.
const DEMO: &str = include_str!("../../../demo-projects/saltmarsh-relief-post.ron");
/// What "New" begins with.
const NEW_STATION: &str = include_str!("../new-station.ron");

/// The window's icon.
const ICON: &[u8] = include_bytes!("../../../assets/icon.png");

/// Size of the window at first, and the smallest it can have, points.
const WINDOW: ([f32; 2], [f32; 2]) = ([1280.0, 800.0], [1024.0, 700.0]);

/// The invented station that the program opens with.
///
/// # Panics
/// Never: a test reads the same text.
#[must_use]
pub fn demo() -> Plan {
    file::from_text(DEMO).expect("the demo is part of the program and read in its tests")
}

/// A small sound plan to begin with.
///
/// # Panics
/// Never: a test reads the same text.
#[must_use]
pub fn new_station() -> Plan {
    file::from_text(NEW_STATION).expect("the new station is part of the program and read in its tests")
}

/// Why there is no window.
#[derive(Debug, thiserror::Error)]
#[error(
    "no window can be opened here: {reason}. Without a display use \"wirewright report PLAN.ron\" or \
     \"wirewright sheet PLAN.ron --out FILE.pdf\""
)]
pub struct NoWindow {
    reason: String,
}

/// Opens the window, with a plan or with the demo, and returns when it is closed.
///
/// # Errors
/// [`NoWindow`] says what is missing.
pub fn window(path: Option<PathBuf>) -> Result<(), NoWindow> {
    let viewport = egui::ViewportBuilder::default()
        .with_app_id("wirewright")
        .with_title("Wirewright")
        .with_inner_size(WINDOW.0)
        .with_min_inner_size(WINDOW.1);
    let viewport = match eframe::icon_data::from_png_bytes(ICON) {
        Ok(icon) => viewport.with_icon(icon),
        Err(_) => viewport, // A window without an icon is a window.
    };
    let options = eframe::NativeOptions { viewport, ..Default::default() };
    let beginning = beginning(path);
    eframe::run_native(
        "wirewright",
        options,
        Box::new(move |cc| Ok(Box::new(Wirewright::new(&cc.egui_ctx, beginning)))),
    )
    .map_err(|error| NoWindow { reason: reason(&error) })
}

fn beginning(path: Option<PathBuf>) -> Beginning {
    let (plan, path, notice) = match path {
        None => (demo(), None, None),
        Some(path) => match file::load(&path) {
            Ok(plan) => (plan, Some(path), None),
            Err(error) => (demo(), None, Some(Notice::problem(desk::sentence(&path, &error)))),
        },
    };
    Beginning {
        plan,
        path,
        notice,
        settings: SettingsFile::of_user(),
        chooser: Box::new(DesktopChooser::default()),
        print_ways: Arc::new(DesktopWays),
    }
}

/// In the words of someone who wants to know what to do.
fn reason(error: &eframe::Error) -> String {
    let has_display = ["DISPLAY", "WAYLAND_DISPLAY", "WAYLAND_SOCKET"]
        .iter()
        .any(|name| std::env::var_os(name).is_some_and(|value| !value.is_empty()));
    if cfg!(target_os = "linux") && !has_display {
        return "no display is set (neither WAYLAND_DISPLAY nor DISPLAY)".to_owned();
    }
    let display = std::env::var("DISPLAY").unwrap_or_default();
    match error {
        eframe::Error::Winit(_) | eframe::Error::WinitEventLoop(_) if cfg!(target_os = "linux") => {
            format!("the display \"{display}\" does not answer")
        }
        other => other.to_string(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_plans_that_come_with_the_program_are_sound() {
        assert!(!demo().bands.is_empty());
        assert!(new_station().feeds.len() >= 2);
        assert!(eframe::icon_data::from_png_bytes(ICON).is_ok());
    }
}
