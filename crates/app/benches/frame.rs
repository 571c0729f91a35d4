//! One frame of the window with everything shown: run and tessellate. The bar is 4 ms on one core.
//!
//! No painting: that is the graphics driver's time.

use std::hint::black_box;
use std::time::Duration;

use app::app::{Beginning, Wirewright};
use app::command::{Command, Motion, Show, View};
use app::desk::{DesktopChooser, DesktopWays, SettingsFile};
use app::start;
use criterion::{Criterion, criterion_group, criterion_main};
use eframe::egui::{Context, Pos2, RawInput, Rect, vec2};

/// A window without a screen.
struct Window {
    ctx: Context,
    program: Wirewright,
    size: [f32; 2],
    frames: u32,
}

impl Window {
    fn open(view: View, size: [f32; 2]) -> Self {
        let ctx = Context::default();
        let beginning = Beginning {
            plan: start::demo(),
            path: None,
            notice: None,
            settings: SettingsFile::default(),
            chooser: Box::new(DesktopChooser::default()),
            print_ways: std::sync::Arc::new(DesktopWays),
        };
        let mut program = Wirewright::new(&ctx, beginning);
        program.obey(&ctx, Command::Show(Show::View(view)));
        program.obey(&ctx, Command::Show(Show::Motion(Motion::Run)));
        let mut window = Self { ctx, program, size, frames: 0 };
        while window.program.answers().current(window.program.document()).is_none() {
            window.frame();
            std::thread::sleep(Duration::from_millis(5));
        }
        // Fonts and panels settle within the first frames.
        for _ in 0..10 {
            window.frame();
        }
        window
    }

    /// Runs and tessellates; says how many triangles came of it.
    fn frame(&mut self) -> usize {
        self.frames += 1;
        let input = RawInput {
            screen_rect: Some(Rect::from_min_size(Pos2::ZERO, vec2(self.size[0], self.size[1]))),
            time: Some(f64::from(self.frames) / 60.0),
            focused: true,
            ..RawInput::default()
        };
        self.program.poll(&self.ctx);
        let mut output = self.ctx.run_ui(input, |ui| self.program.frame(ui));
        output.textures_delta.clear();
        let meshes = self.ctx.tessellate(std::mem::take(&mut output.shapes), output.pixels_per_point);
        meshes.len()
    }
}

fn frame(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("frame");
    for (name, view, size) in [
        ("yard, feeds and lanes, 1280 x 800", View::Yard, [1280.0, 800.0]),
        ("yard, feeds and lanes, 1920 x 1080", View::Yard, [1920.0, 1080.0]),
        ("band, 1920 x 1080", View::Band, [1920.0, 1080.0]),
        ("sheet, 1920 x 1080", View::Sheet, [1920.0, 1080.0]),
    ] {
        let mut window = Window::open(view, size);
        group.bench_function(name, |bencher| bencher.iter(|| black_box(window.frame())));
    }
    group.finish();
}

criterion_group!(benches, frame);
criterion_main!(benches);
