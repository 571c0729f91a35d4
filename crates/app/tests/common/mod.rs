//! A hand at the window, without display or GPU: finds things by their accessible names, waits for the real worker.
#![allow(dead_code)] // Each file of stories uses a part.
#![allow(clippy::unwrap_used)] // A failed step of a story is a failed story.

use std::cell::RefCell;
use std::collections::VecDeque;
use std::path::{Path, PathBuf};
use std::rc::Rc;
use std::sync::{Arc, Mutex};
use std::time::{Duration, Instant};

use app::app::{Beginning, Wirewright};
use app::command::{Command, Theme};
use app::desk::{Ask, Chooser, Chosen, PrintWays, SettingsFile, SpoolError};
use app::start;
use eframe::egui::{self, FullOutput, Key, Modifiers, Pos2, TexturesDelta, vec2};
use egui_kittest::kittest::{By, Queryable as _};
use egui_kittest::{Harness, Node, TestRenderer};
use station::plan::Plan;
use tempfile::TempDir;

/// No evaluation of a test plan takes this long, not even on a busy machine in a debug build.
const PATIENCE: Duration = Duration::from_secs(60);

/// Answers in order; without one there is no dialog.
#[derive(Clone, Default)]
pub struct FakeChooser {
    answers: Rc<RefCell<VecDeque<Chosen>>>,
    asked: Rc<RefCell<Vec<Ask>>>,
    pending: bool,
}

impl Chooser for FakeChooser {
    fn ask(&mut self, ask: &Ask, _wake: Box<dyn Fn() + Send>) {
        self.asked.borrow_mut().push(ask.clone());
        self.pending = true;
    }

    fn answer(&mut self) -> Option<Chosen> {
        std::mem::take(&mut self.pending)
            .then(|| self.answers.borrow_mut().pop_front().unwrap_or(Chosen::NoDialog))
    }
}

/// Notes what comes to it in place of paper.
pub struct FakeWays {
    /// What the print command says.
    pub spool: Result<String, SpoolError>,
    pub has_viewer: bool,
    /// What was printed or shown: the file's name and its bytes.
    pub seen: Mutex<Vec<(&'static str, String, Vec<u8>)>>,
}

impl FakeWays {
    pub fn new(spool: Result<&str, SpoolError>) -> Arc<Self> {
        let spool = spool.map(ToOwned::to_owned);
        Arc::new(Self { spool, has_viewer: true, seen: Mutex::default() })
    }

    fn note(&self, way: &'static str, pdf: &Path) {
        let name = pdf.file_name().unwrap().to_string_lossy().into_owned();
        self.seen.lock().unwrap().push((way, name, std::fs::read(pdf).unwrap()));
    }
}

impl PrintWays for FakeWays {
    fn spool(&self, pdf: &Path) -> Result<String, SpoolError> {
        self.note("spool", pdf);
        self.spool.clone()
    }

    fn view(&self, pdf: &Path) -> std::io::Result<()> {
        self.note("view", pdf);
        // Nothing reads it any more.
        std::fs::remove_file(pdf)?;
        std::fs::remove_dir(pdf.parent().unwrap())?;
        if self.has_viewer { Ok(()) } else { Err(std::io::Error::other("no viewer")) }
    }
}

/// The window under test.
pub struct Window {
    pub harness: Harness<'static, Wirewright>,
    folder: TempDir,
    chooser: FakeChooser,
    system: Vec<String>,
}

impl Window {
    /// With the demo, 1280 × 800.
    pub fn open() -> Self {
        Self::with(start::demo(), None, [1280.0, 800.0], Theme::Light)
    }

    /// With any plan, size and look.
    pub fn with(plan: Plan, path: Option<PathBuf>, size: [f32; 2], theme: Theme) -> Self {
        Self::printing(plan, path, size, theme, FakeWays::new(Err(SpoolError::NoCommand)))
    }

    /// With the demo, and a printer.
    pub fn with_printer(ways: Arc<FakeWays>) -> Self {
        Self::printing(start::demo(), None, [1280.0, 800.0], Theme::Light, ways)
    }

    fn printing(
        plan: Plan,
        path: Option<PathBuf>,
        size: [f32; 2],
        theme: Theme,
        print_ways: Arc<FakeWays>,
    ) -> Self {
        let folder = tempfile::tempdir().unwrap();
        let settings = folder.path().join("settings.ron");
        // The standing wave stands still, so that the window comes to rest.
        std::fs::write(&settings, format!("(moving: false, theme: {theme:?})")).unwrap();
        let chooser = FakeChooser::default();
        let beginning = Beginning {
            plan,
            path,
            notice: None,
            settings: SettingsFile::at(settings),
            chooser: Box::new(chooser.clone()),
            print_ways,
        };
        let harness = Harness::builder()
            .with_size(vec2(size[0], size[1]))
            .renderer(Pictures::default())
            .build_eframe(|cc| Wirewright::new(&cc.egui_ctx, beginning));
        let mut window = Self { harness, folder, chooser, system: Vec::new() };
        window.settle();
        window
    }

    /// Steps until the worker has answered and nothing moves.
    pub fn settle(&mut self) {
        let begun = Instant::now();
        loop {
            self.harness.run_steps(3);
            let app = self.harness.state();
            if app.answers().current(app.document()).is_some() {
                break;
            }
            assert!(begun.elapsed() < PATIENCE, "no answer: {:?}", app.answers().fault());
            std::thread::sleep(Duration::from_millis(2));
        }
        self.harness.run_steps(3);
    }

    /// Steps until something is said in the notice bar.
    pub fn wait_for_notice(&mut self) -> String {
        let begun = Instant::now();
        loop {
            self.harness.run_steps(2);
            if let Some(notice) = self.app().desk().notice() {
                return notice.text().to_owned();
            }
            assert!(begun.elapsed() < PATIENCE, "nothing is said");
            std::thread::sleep(Duration::from_millis(2));
        }
    }

    pub fn app(&self) -> &Wirewright {
        self.harness.state()
    }

    pub fn plan(&self) -> &Plan {
        self.app().document().plan()
    }

    /// Follows a command as if a view had given it.
    pub fn command(&mut self, command: Command) {
        let ctx = self.harness.ctx.clone();
        self.harness.state_mut().obey(&ctx, command);
        self.harness.run_steps(2);
    }

    /// Clicks the thing with this name.
    pub fn click(&mut self, name: &str) {
        self.harness.get_by_label(name).click();
        self.watch(3);
    }

    /// Clicks the first of several things with this name that stand at the same height as another thing or below it.
    pub fn click_first(&mut self, name: &str, beside: &str) {
        let top = self
            .harness
            .query_all_by_value(beside)
            .next()
            .unwrap_or_else(|| panic!("nothing says {beside}"))
            .rect()
            .top();
        let found = self.harness.query_all_by_label(name).filter(|node| node.rect().bottom() > top);
        found.min_by(|a, b| a.rect().top().total_cmp(&b.rect().top())).unwrap().click();
        self.watch(3);
    }

    pub fn has(&self, name: &str) -> bool {
        self.harness.query_all_by_label(name).next().is_some()
    }

    /// Whether a sentence with these words stands anywhere.
    pub fn says(&self, words: &str) -> bool {
        let find = By::new().predicate(|node| {
            let holds = |text: Option<String>| text.is_some_and(|text| text.contains(words));
            holds(node.label()) || holds(node.value())
        });
        self.harness.query_all(find).next().is_some()
    }

    /// What a lane says.
    pub fn lane(&self, band: &str) -> String {
        self.value(&format!("lane {band}"))
    }

    /// The value of the thing with this name.
    pub fn value(&self, name: &str) -> String {
        self.node(name).value().unwrap_or_default()
    }

    pub fn node<'a>(&'a self, name: &'a str) -> Node<'a> {
        self.harness.get_by_label(name)
    }

    pub fn key(&mut self, modifiers: Modifiers, key: Key) {
        self.harness.key_press_modifiers(modifiers, key);
        self.harness.run_steps(3);
    }

    pub fn ctrl(&mut self, key: Key) {
        self.key(Modifiers::COMMAND, key);
    }

    /// Drags from one place to another in a few steps; the hand lets go at the end.
    pub fn drag(&mut self, from: Pos2, to: Pos2) {
        self.harness.hover_at(from);
        self.harness.run_steps(2);
        self.harness.drag_at(from);
        self.harness.run_steps(1);
        for step in 1..=4_u8 {
            self.harness.hover_at(from + (to - from) * (f32::from(step) / 4.0));
            self.harness.run_steps(1);
        }
        self.harness.drop_at(to);
        self.harness.run_steps(2);
    }

    /// Presses the window's own close button.
    pub fn close(&mut self) {
        let viewport = self.harness.input_mut().viewports.entry(egui::ViewportId::ROOT).or_default();
        viewport.events.push(egui::ViewportEvent::Close);
        self.watch(1);
        let viewport = self.harness.input_mut().viewports.entry(egui::ViewportId::ROOT).or_default();
        viewport.events.clear();
        self.watch(2);
    }

    /// Steps, and notes what is asked of the window system.
    pub fn watch(&mut self, steps: usize) {
        for _ in 0..steps {
            self.harness.run_steps(1);
            if let Some(output) = self.harness.output().viewport_output.get(&egui::ViewportId::ROOT) {
                self.system.extend(output.commands.iter().map(|command| format!("{command:?}")));
            }
        }
    }

    /// What was asked of the window system while it was watched.
    pub fn asked_of_system(&self) -> &[String] {
        &self.system
    }

    /// Types a text into the field with this name, in place of what stands there.
    pub fn type_into(&mut self, name: &str, text: &str) {
        self.node(name).focus();
        self.harness.run_steps(2);
        self.ctrl(Key::A);
        self.node(name).type_text(text);
        self.harness.run_steps(2);
    }

    /// What the next file dialog will answer.
    pub fn will_choose(&mut self, chosen: Chosen) {
        self.chooser.answers.borrow_mut().push_back(chosen);
    }

    /// What was asked so far.
    pub fn asked(&self) -> Vec<Ask> {
        self.chooser.asked.borrow().clone()
    }

    /// A file in the window's own folder.
    pub fn file(&self, name: &str) -> PathBuf {
        self.folder.path().join(name)
    }

    /// Lets a file fall on the window.
    pub fn drop_file(&mut self, path: &Path) {
        #[derive(Debug)]
        struct Dropped(PathBuf);
        impl egui::DroppedFile for Dropped {
            fn path(&self) -> &Path {
                &self.0
            }
            fn bytes(&self) -> Result<Vec<u8>, String> {
                std::fs::read(&self.0).map_err(|error| error.to_string())
            }
        }
        self.harness.input_mut().dropped_files.push(Arc::new(Dropped(path.to_owned())));
        self.harness.run_steps(3);
    }

    /// The picture that the CPU paints.
    pub fn picture(&mut self) -> image::RgbaImage {
        self.harness.render().unwrap()
    }
}

/// Renders with our own rasteriser.
#[derive(Default)]
struct Pictures(raster::Raster);

impl TestRenderer for Pictures {
    fn handle_delta(&mut self, delta: &mut TexturesDelta) {
        self.0.take(delta);
    }

    fn render(&mut self, ctx: &egui::Context, output: &FullOutput) -> Result<image::RgbaImage, String> {
        let pixels_per_point = ctx.pixels_per_point();
        let primitives = ctx.tessellate(output.shapes.clone(), pixels_per_point);
        Ok(self.0.paint(&primitives, ctx.content_rect().size(), pixels_per_point))
    }
}
