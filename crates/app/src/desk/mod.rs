//! Desk manners: opening, saving, recent files, and the question before unsaved work is lost.

mod choose;
mod dialogs;
mod notice;
mod print;
mod settings;
mod typed;

pub use choose::{Ask, Chooser, Chosen, DesktopChooser};
pub use notice::Notice;
pub use print::{DesktopWays, PrintWays, SpoolError};
pub use settings::{Settings, SettingsFile};

use std::path::{Path, PathBuf};
use std::sync::Arc;

use eframe::egui;
use station::file;
use station::plan::Plan;

use crate::command::Desk as DeskCommand;
use crate::document::Document;
use crate::paper::Kind;
use crate::start;
use print::Press;
use typed::Typed;

/// What the hand wanted when the question about unsaved work came up.
#[derive(Clone, Debug)]
enum Next {
    NewPlan,
    /// Already read, so that a broken file costs no question.
    Show(Box<Plan>, PathBuf),
    Quit,
}

/// The one dialog that can lie over the window.
#[derive(Default)]
enum Dialog {
    #[default]
    Closed,
    Unsaved(Next),
    Type(Typed),
    Keys,
}

/// Where a sheet goes.
#[derive(Clone, Debug, PartialEq)]
pub enum SheetTo {
    /// Into a file of the kind that its name says.
    File(PathBuf),
    /// To the printer, under this file name.
    Printer(String),
}

/// Files, settings, dialogs and notices.
pub struct Desk {
    settings: Settings,
    settings_file: SettingsFile,
    chooser: Box<dyn Chooser>,
    /// What the chooser was asked.
    asked: Option<Ask>,
    dialog: Dialog,
    /// What comes after a save that was asked for by the question about unsaved work.
    after_save: Option<Next>,
    /// A sheet that waits for the newest report.
    sheet_to: Option<SheetTo>,
    press: Press,
    notice: Option<Notice>,
    may_close: bool,
}

impl Desk {
    /// A desk with the user's settings.
    #[must_use]
    pub fn new(
        settings_file: SettingsFile,
        chooser: Box<dyn Chooser>,
        print_ways: Arc<dyn PrintWays>,
    ) -> Self {
        Self {
            settings: settings_file.load(),
            settings_file,
            chooser,
            asked: None,
            dialog: Dialog::Closed,
            after_save: None,
            sheet_to: None,
            press: Press::new(print_ways),
            notice: None,
            may_close: false,
        }
    }

    /// What is remembered between two runs.
    #[must_use]
    pub fn settings(&self) -> &Settings {
        &self.settings
    }

    /// Changes what is remembered, and writes it down.
    pub fn remember(&mut self, change: impl FnOnce(&mut Settings)) {
        let before = self.settings.clone();
        change(&mut self.settings);
        if self.settings != before {
            self.settings_file.save(&self.settings);
        }
    }

    /// Says something in the bar under the top bar.
    pub fn say(&mut self, notice: Notice) {
        self.notice = Some(notice);
    }

    /// What stands in that bar.
    #[must_use]
    pub fn notice(&self) -> Option<&Notice> {
        self.notice.as_ref()
    }

    /// Whether a dialog lies over the window: then keys are for the dialog.
    #[must_use]
    pub fn is_asking(&self) -> bool {
        !matches!(self.dialog, Dialog::Closed)
    }

    /// Follows a command.
    pub fn obey(&mut self, ctx: &egui::Context, document: &mut Document, command: DeskCommand) {
        match command {
            DeskCommand::NewPlan => self.leave(ctx, document, Next::NewPlan),
            DeskCommand::Open => self.ask(ctx, Ask::Open),
            DeskCommand::OpenPath(path) => self.open(ctx, document, path),
            DeskCommand::Save => self.save(ctx, document),
            DeskCommand::SaveAs => self.ask(ctx, Ask::SavePlan { suggested: suggested(document, "ron") }),
            DeskCommand::SaveSheet => self.ask(ctx, Ask::SaveSheet { suggested: suggested(document, "pdf") }),
            DeskCommand::PrintSheet if self.press.is_busy() => {
                self.notice = Some(Notice::done("The sheet before is still on its way to the printer"));
            }
            DeskCommand::PrintSheet => {
                let name = suggested(document, "pdf");
                let name = name.file_name().unwrap_or_default().to_string_lossy().into_owned();
                self.sheet_to = Some(SheetTo::Printer(name));
            }
            DeskCommand::Quit => self.leave(ctx, document, Next::Quit),
            DeskCommand::Help => self.dialog = Dialog::Keys,
        }
    }

    /// Once a frame, before anything is drawn: answers of the file dialog, and the window's own close button.
    pub fn poll(&mut self, ctx: &egui::Context, document: &mut Document) {
        if let Some(chosen) = self.chooser.answer()
            && let Some(ask) = self.asked.take()
        {
            match chosen {
                Chosen::Path(path) => self.take_path(ctx, document, &ask, path),
                Chosen::Nothing => self.after_save = None,
                Chosen::NoDialog => self.dialog = Dialog::Type(Typed::new(ask)),
            }
        }
        if let Some(notice) = self.press.arrived() {
            self.notice = Some(notice);
        }
        let wants_to_close = ctx.input(|input| input.viewport().close_requested());
        if wants_to_close && !self.may_close && document.is_unsaved() {
            ctx.send_viewport_cmd(egui::ViewportCommand::CancelClose);
            self.leave(ctx, document, Next::Quit);
        }
    }

    /// Where the sheet that was asked for goes, once.
    pub fn take_sheet(&mut self) -> Option<SheetTo> {
        self.sheet_to.take()
    }

    /// Sends a sheet to paper; a notice says what became of it.
    pub fn print(&mut self, ctx: &egui::Context, name: String, pdf: Vec<u8>) {
        let ctx = ctx.clone();
        self.press.print(name, pdf, move || ctx.request_repaint());
    }

    /// Whether a sheet waits for a report.
    #[must_use]
    pub fn wants_sheet(&self) -> bool {
        self.sheet_to.is_some()
    }

    /// Does what comes next, after the question if work would be lost.
    fn leave(&mut self, ctx: &egui::Context, document: &mut Document, next: Next) {
        if document.is_unsaved() {
            self.dialog = Dialog::Unsaved(next);
        } else {
            self.go_on(ctx, document, next);
        }
    }

    fn go_on(&mut self, ctx: &egui::Context, document: &mut Document, next: Next) {
        match next {
            Next::NewPlan => document.replace(start::new_station(), None),
            Next::Show(plan, path) => {
                self.remember(|settings| settings.note_recent(&path));
                document.replace(*plan, Some(path));
                self.notice = None;
            }
            Next::Quit => {
                self.may_close = true;
                ctx.send_viewport_cmd(egui::ViewportCommand::Close);
            }
        }
    }

    fn ask(&mut self, ctx: &egui::Context, ask: Ask) {
        if self.asked.is_some() {
            return; // The desktop's dialog is still open.
        }
        let ctx = ctx.clone();
        self.chooser.ask(&ask, Box::new(move || ctx.request_repaint()));
        self.asked = Some(ask);
    }

    fn take_path(&mut self, ctx: &egui::Context, document: &mut Document, ask: &Ask, path: PathBuf) {
        match ask {
            Ask::Open => self.open(ctx, document, path),
            Ask::SavePlan { .. } => self.save_to(ctx, document, path),
            Ask::SaveSheet { .. } => {
                // A name without an ending is that of a PDF, as the dialog suggests.
                let path = if path.extension().is_none() { path.with_extension("pdf") } else { path };
                match Kind::of(&path) {
                    Ok(_) => self.sheet_to = Some(SheetTo::File(path)),
                    Err(error) => self.notice = Some(Notice::problem(error.to_string())),
                }
            }
        }
    }

    fn open(&mut self, ctx: &egui::Context, document: &mut Document, path: PathBuf) {
        match file::load(&path) {
            Ok(plan) => self.leave(ctx, document, Next::Show(Box::new(plan), path)),
            Err(error) => self.notice = Some(Notice::problem(sentence(&path, &error))),
        }
    }

    fn save(&mut self, ctx: &egui::Context, document: &mut Document) {
        match document.path() {
            Some(path) => {
                let path = path.to_owned();
                self.save_to(ctx, document, path);
            }
            None => self.ask(ctx, Ask::SavePlan { suggested: suggested(document, "ron") }),
        }
    }

    fn save_to(&mut self, ctx: &egui::Context, document: &mut Document, path: PathBuf) {
        match file::save(document.plan(), &path) {
            Ok(()) => {
                self.remember(|settings| settings.note_recent(&path));
                self.notice = Some(Notice::done(format!("Saved to {}", path.display())));
                document.mark_saved(path);
                if let Some(next) = self.after_save.take() {
                    self.go_on(ctx, document, next);
                }
            }
            Err(error) => {
                self.after_save = None;
                self.notice = Some(Notice::problem(sentence(&path, &error)));
            }
        }
    }
}

/// "broken.ron: line 3 …"; errors of the system name the file themselves.
#[must_use]
pub fn sentence(path: &Path, error: &file::FileError) -> String {
    match error {
        file::FileError::Read { .. } | file::FileError::Write { .. } => error.to_string(),
        _ => format!("{}: {error}", path.file_name().unwrap_or(path.as_os_str()).to_string_lossy()),
    }
}

/// Beside the plan's file, or in the current folder under the plan's name.
fn suggested(document: &Document, extension: &str) -> PathBuf {
    match document.path() {
        Some(path) => path.with_extension(extension),
        None => {
            let words: Vec<String> = document
                .plan()
                .name
                .split(|c: char| !c.is_alphanumeric())
                .filter(|word| !word.is_empty())
                .map(str::to_lowercase)
                .collect();
            let stem = if words.is_empty() { "station".to_owned() } else { words.join("-") };
            std::env::current_dir().unwrap_or_default().join(stem).with_extension(extension)
        }
    }
}
