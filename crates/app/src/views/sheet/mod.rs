//! The sheet as it will print: the same scenes that the PDF writer takes, painted on screen.

mod paint;

use eframe::egui::{self, Align, Frame, Layout, Margin, RichText, ScrollArea, Sense, Ui, WidgetInfo, vec2};
use sheet::scene::Scene;
use sheet::tokens::Ink;
use sheet::{SheetError, SheetRequest};
use station::plan::Plan;
use station::units::Units;

use crate::command::{Command, Desk, Show};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::{paper, theme};
use sheet::Paper;

/// Between pages, and between a page and the edge, points.
const GAP: f32 = 16.0;
/// A page that fills a wide window is no easier to read than this, points per mm.
const LARGEST_SCALE: f32 = 5.0;

/// What the view remembers.
#[derive(Default)]
pub struct SheetState {
    fit: Fit,
    made: Option<Made>,
}

/// How large a page is shown.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
enum Fit {
    #[default]
    Width,
    Page,
}

/// Pages, and what they were made from: laid out anew only when one of these changes.
struct Made {
    plan: Plan,
    revision: u64,
    request: SheetRequest,
    pages: Result<Vec<Scene>, SheetError>,
}

impl SheetState {
    fn pages(&mut self, snapshot: &Snapshot<'_>, paper: Paper) -> Option<&Result<Vec<Scene>, SheetError>> {
        let report = snapshot.report?;
        let request = paper::request(paper, snapshot.units);
        let is_fresh = self.made.as_ref().is_some_and(|made| {
            made.revision == report.revision && made.request == request && made.plan == *snapshot.plan
        });
        if !is_fresh {
            let pages = sheet::lay_out(snapshot.plan, report, &request);
            self.made = Some(Made { plan: snapshot.plan.clone(), revision: report.revision, request, pages });
        }
        self.made.as_ref().map(|made| &made.pages)
    }
}

/// Draws the pages with what can be chosen about them.
pub fn show(
    ui: &mut Ui,
    snapshot: &Snapshot<'_>,
    paper: Paper,
    state: &mut SheetState,
    out: &mut Vec<Command>,
) {
    let mut fit = state.fit;
    let bar = Frame::new()
        .fill(theme::color(Ink::Background, snapshot.ground))
        .inner_margin(Margin::symmetric(12, 6));
    egui::Panel::top("sheet choices").frame(bar).resizable(false).show(ui, |ui| {
        ui.horizontal(|ui| choices(ui, paper, snapshot.units, &mut fit, out));
    });
    state.fit = fit;
    egui::CentralPanel::default().frame(Frame::NONE).show(ui, |ui| match state.pages(snapshot, paper) {
        None => message(ui, "The pages are made as soon as the first numbers are in."),
        Some(Err(error)) => message(ui, &error.to_string()),
        Some(Ok(pages)) => show_pages(ui, pages, fit),
    });
}

fn choices(ui: &mut Ui, paper: Paper, units: Units, fit: &mut Fit, out: &mut Vec<Command>) {
    ui.label("Paper");
    for (choice, words, sentence) in
        [(Paper::A4, "A4", "210 × 297 mm"), (Paper::Letter, "Letter", "8½ × 11 inches")]
    {
        if ui.selectable_label(paper == choice, words).explain(sentence).clicked() {
            out.push(Command::Show(Show::Paper(choice)));
        }
    }
    ui.separator();
    ui.label("Show");
    for (choice, words, sentence) in [
        (Fit::Width, "page width", "As wide as there is room"),
        (Fit::Page, "whole page", "A whole page at once"),
    ] {
        if ui.selectable_label(*fit == choice, words).explain(sentence).clicked() {
            *fit = choice;
        }
    }
    ui.separator();
    ui.label("Lengths in");
    for (choice, words) in [(Units::Metres, "metres"), (Units::Feet, "feet")] {
        if ui
            .selectable_label(units == choice, words)
            .explain(format!("All lengths in {words} (M)"))
            .clicked()
        {
            out.push(Command::Show(Show::Units(choice)));
        }
    }
    ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
        for (words, sentence, command) in [
            (
                "Print sheet",
                "Sends these pages to the printer, or to the PDF viewer where there is no print command",
                Desk::PrintSheet,
            ),
            (
                "Save sheet…",
                "Writes these pages as PDF, SVG or PNG, as the file's name ends (Ctrl+P)",
                Desk::SaveSheet,
            ),
        ] {
            if ui.button(words).explain(sentence).clicked() {
                out.push(Command::Desk(command));
            }
        }
    });
}

fn message(ui: &mut Ui, words: &str) {
    ui.centered_and_justified(|ui| ui.label(RichText::new(words).weak()));
}

fn show_pages(ui: &mut Ui, pages: &[Scene], fit: Fit) {
    let room = ui.available_size() - vec2(2.0 * GAP + ui.spacing().scroll.bar_width, 2.0 * GAP);
    ScrollArea::vertical().auto_shrink(false).show(ui, |ui| {
        ui.add_space(GAP);
        for (index, page) in pages.iter().enumerate() {
            let (width_mm, height_mm) = (page.width_mm as f32, page.height_mm as f32);
            let scale = match fit {
                Fit::Width => room.x / width_mm,
                Fit::Page => (room.x / width_mm).min(room.y / height_mm),
            };
            let scale = scale.clamp(1.0, LARGEST_SCALE);
            let size = vec2(width_mm, height_mm) * scale;
            let (_, strip) = ui.allocate_space(vec2(ui.available_width(), size.y));
            let place = egui::Rect::from_center_size(strip.center(), size);
            let name = format!("page {} of {}", index + 1, pages.len());
            let response = ui.interact(place, ui.scope_id().with(("page", index)), Sense::hover());
            response.widget_info(|| {
                let mut info = WidgetInfo::labeled(egui::Role::Image, true, &name);
                info.current_text_value = Some(words(page));
                info
            });
            if ui.is_rect_visible(place) {
                paint::page(ui, page, place, scale);
            }
            ui.add_space(GAP);
        }
    });
}

/// What stands on a page, for those who do not see it.
fn words(page: &Scene) -> String {
    page.texts().map(|text| text.text.as_str()).collect::<Vec<_>>().join("\n")
}
