//! The window: it polls the worker and the desk, paints the views, and follows the commands that came back.

mod bars;
mod central;
mod findings;

use std::path::{Path, PathBuf};
use std::sync::Arc;

use eframe::egui;
use station::plan::Plan;

use crate::answers::Answers;
use crate::command::{Command, Desk as DeskCommand, View};
use crate::desk::{Chooser, Desk, Notice, PrintWays, SettingsFile, SheetTo};
use crate::document::Document;
use crate::looks::Looks;
use crate::snapshot::Snapshot;
use crate::views::Views;
use crate::{keys, theme};

/// Longest pause between two steps of the moving standing wave, s: about 30 pictures a second.
const MOTION_STEP_S: f64 = 1.0 / 30.0;
/// After a pause the RF cycle goes on where it was, not where it would be.
const LONGEST_STEP_S: f64 = 0.1;

/// What the program is given at its start.
pub struct Beginning {
    /// The plan to show.
    pub plan: Plan,
    /// The file it came from.
    pub path: Option<PathBuf>,
    /// Something to say at once: for instance, that the file that was asked for cannot be read.
    pub notice: Option<Notice>,
    /// Where settings are kept.
    pub settings: SettingsFile,
    /// How files are chosen.
    pub chooser: Box<dyn Chooser>,
    /// How sheets come to paper.
    pub print_ways: Arc<dyn PrintWays>,
}

/// The program behind the window.
pub struct Wirewright {
    document: Document,
    desk: Desk,
    looks: Looks,
    answers: Answers,
    views: Views,
    /// Why the last dragged number went no further.
    stop: Option<String>,
    /// Commands of keys that were pressed while something was typed: followed once the field has been left.
    later: Vec<Command>,
    /// As the window's title bar shows it now.
    title: String,
}

impl Wirewright {
    /// Sets up fonts, colours, worker and desk.
    #[must_use]
    pub fn new(ctx: &egui::Context, beginning: Beginning) -> Self {
        theme::install(ctx);
        let mut desk = Desk::new(beginning.settings, beginning.chooser, beginning.print_ways);
        if let Some(path) = &beginning.path {
            desk.remember(|settings| settings.note_recent(path));
        }
        if let Some(notice) = beginning.notice {
            desk.say(notice);
        }
        let looks = Looks::new(desk.settings());
        let ctx = ctx.clone();
        Self {
            document: Document::new(beginning.plan, beginning.path),
            desk,
            looks,
            answers: Answers::new(move || ctx.request_repaint()),
            views: Views::default(),
            stop: None,
            later: Vec::new(),
            title: String::new(),
        }
    }

    /// The open plan.
    #[must_use]
    pub fn document(&self) -> &Document {
        &self.document
    }

    /// What the worker has found out so far.
    #[must_use]
    pub fn answers(&self) -> &Answers {
        &self.answers
    }

    /// What is looked at.
    #[must_use]
    pub fn looks(&self) -> &Looks {
        &self.looks
    }

    /// What is remembered, and what is asked.
    #[must_use]
    pub fn desk(&self) -> &Desk {
        &self.desk
    }

    /// Follows a command, whoever gave it.
    pub fn obey(&mut self, ctx: &egui::Context, command: Command) {
        match command {
            Command::Edit(edit) => match self.document.edit(&edit) {
                Ok(stop) => self.stop = stop,
                Err(refusal) => self.desk.say(Notice::problem(refusal.to_string())),
            },
            Command::EndOfDrag => self.document.end_of_drag(),
            Command::Undo => self.step(Document::undo),
            Command::Redo => self.step(Document::redo),
            Command::Show(show) => {
                self.looks.obey(show);
                let looks = &self.looks;
                self.desk.remember(|settings| looks.note(settings));
            }
            Command::Desk(command) => self.desk.obey(ctx, &mut self.document, command),
        }
        self.looks.fit(self.document.plan());
    }

    fn step(&mut self, step: fn(&mut Document)) {
        step(&mut self.document);
        self.stop = None;
    }

    /// What came from outside since the last frame.
    pub fn poll(&mut self, ctx: &egui::Context) {
        self.desk.poll(ctx, &mut self.document);
        let dropped = ctx.input(|input| input.raw.dropped_files.first().map(|file| file.path().to_owned()));
        if let Some(path) = dropped {
            self.obey(ctx, Command::Desk(DeskCommand::OpenPath(path)));
        }
        self.looks.fit(self.document.plan());
        self.answers.poll(ctx, &self.document);
        self.send_waiting_sheet(ctx);
    }

    /// The sheet that was asked for, as soon as the numbers belong to the plan.
    fn send_waiting_sheet(&mut self, ctx: &egui::Context) {
        if !self.desk.wants_sheet() {
            return;
        }
        let Some(report) = self.answers.settled(&self.document) else { return };
        let Some(to) = self.desk.take_sheet() else { return };
        let plan = self.document.plan();
        let request = crate::paper::request(self.looks.paper, self.looks.units);
        match to {
            SheetTo::File(path) => {
                let notice = match crate::paper::save(plan, report, &request, &path) {
                    Ok(files) => saved(files),
                    Err(error) => Notice::problem(error.to_string()),
                };
                self.desk.say(notice);
            }
            SheetTo::Printer(name) => match sheet::pdf_for(plan, report, &request) {
                Ok(pdf) => self.desk.print(ctx, name, pdf),
                Err(error) => self.desk.say(Notice::problem(error.to_string())),
            },
        }
    }

    /// Lets the RF cycle run while it can be seen.
    fn move_on(&mut self, ctx: &egui::Context) {
        if self.looks.moving && matches!(self.looks.view, View::Yard | View::Band) {
            let step = f64::from(ctx.input(|input| input.stable_dt)).min(LONGEST_STEP_S);
            self.looks.advance(step);
            ctx.request_repaint_after_secs(MOTION_STEP_S as f32);
        }
    }

    fn set_title(&mut self, ctx: &egui::Context) {
        let star = if self.document.is_unsaved() { " *" } else { "" };
        let title = format!("{}{star} – Wirewright", self.document.plan().name);
        if title != self.title {
            ctx.send_viewport_cmd(egui::ViewportCommand::Title(title.clone()));
            self.title = title;
        }
    }

    /// What the views read in this frame.
    fn snapshot<'a>(&'a self, visuals: &egui::Visuals) -> Snapshot<'a> {
        Snapshot {
            plan: self.document.plan(),
            report: self.answers.report(&self.document),
            stale: self.answers.is_stale(&self.document),
            band: self.looks.band,
            feed: self.looks.feed,
            units: self.looks.units,
            ground: theme::ground_of(visuals),
            phase_deg: self.looks.phase_deg,
            moving: self.looks.moving,
            period_s: self.looks.period_s,
        }
    }
}

impl Wirewright {
    /// One frame: paints, and follows the commands that came back.
    pub fn frame(&mut self, ui: &mut egui::Ui) {
        let ctx = ui.ctx().clone();
        theme::choose(&ctx, self.looks.theme);
        self.move_on(&ctx);
        if ctx.input(|input| input.pointer.any_pressed()) {
            self.stop = None; // Read; the hand goes on.
        }
        let mut commands = Vec::new();
        self.paint(ui, &mut commands);
        commands.append(&mut self.later);
        if !self.desk.is_asking() {
            let pressed = keys::pressed(&ctx, &self.looks);
            match ctx.memory(egui::Memory::focused).filter(|_| ctx.text_edit_focused()) {
                // What stands in the field belongs to the plan that is saved: the field is left first.
                Some(field) if !pressed.is_empty() => {
                    ctx.memory_mut(|memory| memory.surrender_focus(field));
                    ctx.request_repaint();
                    self.later = pressed;
                }
                _ => commands.extend(pressed),
            }
        }
        drop_hint(&ctx);
        self.desk.show_dialog(&ctx, &mut self.document);
        for command in commands {
            self.obey(&ctx, command);
        }
        // Whatever a hand held, it holds it no longer: so no view can forget to say so.
        if ctx.input(|input| input.pointer.any_released()) {
            self.document.end_of_drag();
        }
        self.answers.ask(&ctx, &self.document);
        self.set_title(&ctx);
    }
}

/// "Sheet saved to /home/x/hut-1.svg and hut-2.svg".
fn saved(files: Vec<PathBuf>) -> Notice {
    let name = |path: &Path| path.file_name().unwrap_or_default().to_string_lossy().into_owned();
    let Some((first, others)) = files.split_first() else { return Notice::done("The sheet has no pages") };
    let mut words = format!("Sheet saved to {}", first.display());
    for (index, other) in others.iter().enumerate() {
        words += if index + 1 == others.len() { " and " } else { ", " };
        words += &name(other);
    }
    Notice::made(words, first.clone())
}

/// While a file is held over the window.
fn drop_hint(ctx: &egui::Context) {
    if ctx.input(|input| input.raw.hovered_files.is_empty()) {
        return;
    }
    let area =
        egui::Area::new(egui::Id::unique("drop hint")).anchor(egui::Align2::CENTER_CENTER, egui::Vec2::ZERO);
    area.order(egui::Order::Foreground).interactable(false).show(ctx, |ui| {
        egui::Frame::popup(ui.style())
            .inner_margin(24.0)
            .show(ui, |ui| ui.heading("Let go to open this plan"));
    });
}

impl eframe::App for Wirewright {
    fn logic(&mut self, ctx: &egui::Context, _frame: &mut eframe::Frame) {
        self.poll(ctx);
    }

    fn ui(&mut self, ui: &mut egui::Ui, _frame: &mut eframe::Frame) {
        self.frame(ui);
    }
}
