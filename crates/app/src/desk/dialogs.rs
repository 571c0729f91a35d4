//! Painting the dialogs.

use eframe::egui::{self, Id, RichText};

use super::typed::Typed;
use super::{Ask, Desk, Dialog, Next};
use crate::command::Desk as DeskCommand;
use crate::document::Document;
use crate::explain::Explain as _;
use crate::keys;

/// What the hand did with a dialog.
enum Reply {
    Wait,
    Close,
    Save,
    GoOn,
    Take,
    Recent(std::path::PathBuf),
}

const WIDTH: f32 = 460.0;
const MARGIN: f32 = 18.0;

impl Desk {
    /// Paints the dialog that is open, and the bar of the notice through [`Desk::show_notice`] elsewhere.
    pub fn show_dialog(&mut self, ctx: &egui::Context, document: &mut Document) {
        let dialog = std::mem::take(&mut self.dialog);
        match dialog {
            Dialog::Closed => {}
            Dialog::Unsaved(next) => self.show_unsaved(ctx, document, next),
            Dialog::Type(typed) => self.show_typed(ctx, document, typed),
            Dialog::Keys => {
                if let Reply::Wait = modal(ctx, show_keys) {
                    self.dialog = Dialog::Keys;
                }
            }
        }
    }

    /// Paints the notice, if there is one.
    pub fn show_notice(&mut self, ui: &mut egui::Ui) {
        use super::notice::Reaction;
        let Some(notice) = &self.notice else { return };
        let reaction =
            egui::Panel::top("notice").frame(egui::Frame::NONE).show(ui, |ui| notice.show(ui)).inner;
        match reaction {
            Reaction::Nothing => {}
            Reaction::Dismiss => self.notice = None,
            Reaction::ShowFile(file) => {
                if let Err(error) = open::that_detached(&file) {
                    let text = format!("no program opens {} here: {error}", file.display());
                    self.notice = Some(super::Notice::problem(text));
                }
            }
        }
    }

    fn show_unsaved(&mut self, ctx: &egui::Context, document: &mut Document, next: Next) {
        let name = document.plan().name.clone();
        let reply = modal(ctx, |ui| {
            ui.heading("Save the changes first?");
            ui.label(format!("The plan “{name}” has changes that are not in a file yet."));
            ui.add_space(8.0);
            buttons(ui, |ui| {
                let save = ui.button("Save").explain("Saves the plan, then goes on");
                if ui.memory(|memory| memory.focused().is_none()) {
                    save.request_focus();
                }
                if save.clicked() {
                    return Reply::Save;
                }
                if ui.button("Go on without saving").explain("The changes are lost").clicked() {
                    return Reply::GoOn;
                }
                if ui.button("Stay here").explain("Nothing is saved, nothing is lost").clicked() {
                    return Reply::Close;
                }
                Reply::Wait
            })
        });
        match reply {
            Reply::Wait => self.dialog = Dialog::Unsaved(next),
            Reply::Save => {
                self.after_save = Some(next);
                self.save(ctx, document);
            }
            Reply::GoOn => self.go_on(ctx, document, next),
            _ => {}
        }
    }

    fn show_typed(&mut self, ctx: &egui::Context, document: &mut Document, mut typed: Typed) {
        let recent = if typed.ask == Ask::Open { self.settings.recent.clone() } else { Vec::new() };
        let reply = modal(ctx, |ui| type_a_path(ui, &mut typed, &recent));
        match reply {
            Reply::Wait => self.dialog = Dialog::Type(typed),
            Reply::Take => match typed.path() {
                Some(path) => self.take_path(ctx, document, &typed.ask, path),
                None => self.dialog = Dialog::Type(typed),
            },
            Reply::Recent(path) => self.obey(ctx, document, DeskCommand::OpenPath(path)),
            _ => self.after_save = None,
        }
    }
}

fn show_keys(ui: &mut egui::Ui) -> Reply {
    keys::show(ui);
    ui.add_space(8.0);
    buttons(ui, |ui| if ui.button("Close").clicked() { Reply::Close } else { Reply::Wait })
}

fn type_a_path(ui: &mut egui::Ui, typed: &mut Typed, recent: &[std::path::PathBuf]) -> Reply {
    ui.heading(typed.ask.title());
    ui.label("This desktop offers no file dialog, so please type the path.");
    ui.add_space(4.0);
    let label = ui.label("Path of the file");
    let field = ui
        .add(egui::TextEdit::singleline(&mut typed.text).desired_width(f32::INFINITY))
        .labelled_by(label.id)
        .explain("A folder and a file name");
    if typed.is_new {
        field.request_focus();
        typed.is_new = false;
    }
    if field.changed() {
        typed.look();
    }
    let entered = field.lost_focus() && ui.input(|input| input.key_pressed(egui::Key::Enter));
    if typed.replaces {
        ui.label(RichText::new("This file exists and will be replaced.").color(ui.visuals().warn_fg_color));
    }
    let mut reply = Reply::Wait;
    if !recent.is_empty() {
        ui.add_space(4.0);
        ui.label("Recent files");
        for path in recent {
            let name = path.file_name().unwrap_or_default().to_string_lossy();
            if ui.button(name).explain(path.display().to_string()).clicked() {
                reply = Reply::Recent(path.clone());
            }
        }
    }
    ui.add_space(8.0);
    let pressed = buttons(ui, |ui| {
        let verb = typed.verb();
        let ready = typed.path().is_some();
        if ui.add_enabled(ready, egui::Button::new(verb)).clicked() || (entered && ready) {
            return Reply::Take;
        }
        if ui.button("Cancel").explain("Nothing happens").clicked() {
            return Reply::Close;
        }
        Reply::Wait
    });
    if let Reply::Wait = pressed { reply } else { pressed }
}

/// A box over the dimmed window. Escape and a click beside it close it.
fn modal(ctx: &egui::Context, content: impl FnOnce(&mut egui::Ui) -> Reply) -> Reply {
    let frame = egui::Frame::popup(&ctx.global_style()).inner_margin(MARGIN);
    let response = egui::Modal::new(Id::unique("dialog")).frame(frame).show(ctx, |ui| {
        ui.set_width(WIDTH.min(ui.ctx().content_rect().width() - 40.0));
        content(ui)
    });
    if response.should_close() && matches!(response.inner, Reply::Wait) {
        Reply::Close
    } else {
        response.inner
    }
}

/// A row of buttons.
fn buttons(ui: &mut egui::Ui, content: impl FnOnce(&mut egui::Ui) -> Reply) -> Reply {
    ui.horizontal(content).inner
}
