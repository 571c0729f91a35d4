//! Feed path: the feeds side by side, each as wide as the watts that are left, and the editor of the picked link.

mod editor;
pub mod layout;
mod lines;
pub mod model;
mod paint;

use eframe::egui::{self, Id, Rect, Response, Role, Sense, UiBuilder, WidgetInfo, vec2};
use sheet::tokens::Ink;
use station::plan::Link;

use crate::command::{Command, Edit, Show};
use crate::explain::Explain as _;
use crate::snapshot::Snapshot;
use crate::theme::color;
use layout::Path;
use model::Column;

/// What the editor shows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Picked {
    /// The transmitter, the same for all feeds.
    Transmitter,
    /// A feed as a whole.
    Feed(usize),
    /// A link of a feed, by its index in the plan (0 is at the wire).
    Link {
        /// Index of the feed.
        feed: usize,
        /// Index of the link.
        link: usize,
    },
}

/// What the feed paths remember: nothing of the plan.
#[derive(Clone, Debug, Default)]
pub struct FeedPathState {
    /// What was clicked last; `None` means the chosen feed as a whole.
    pub picked: Option<Picked>,
    /// The name that is being typed.
    name: Option<(usize, String)>,
}

/// How much of a stale answer shows.
const DIMMED: f32 = 0.55;
/// Seconds until a stale answer is fully dimmed; while dragging it never gets that far.
const DIM_SECONDS: f32 = 0.6;
/// Metres of line for each point that a block is dragged.
const METRES_PER_POINT: f64 = 0.05;

/// A line cannot be dragged shorter, m.
const LEAST_LINE_M: f64 = 0.05;

/// Draws the feed paths and the editor below them.
pub fn show(ui: &mut egui::Ui, snapshot: &Snapshot<'_>, state: &mut FeedPathState, out: &mut Vec<Command>) {
    let picked = still_there(snapshot, state.picked);
    state.picked = picked;
    egui::Panel::bottom("feed editor").resizable(false).show(ui, |ui| {
        ui.add_space(4.0);
        editor::show(ui, snapshot, state, out);
        ui.add_space(4.0);
    });
    let columns = model::columns(snapshot);
    let fade =
        ui.ctx().animate_bool_with_time(Id::unique("feed paths are stale"), snapshot.stale, DIM_SECONDS);
    egui::ScrollArea::both().id_salt("feed paths").auto_shrink(false).show(ui, |ui| {
        let width = layout::column_width(ui.available_width() - 4.0, columns.len());
        let height = layout::height(&columns, width, ui.available_height() - 6.0);
        let total = columns.len() as f32 * (width + 8.0);
        let (_, area) = ui.allocate_space(vec2(total, height));
        for (place, column) in columns.iter().enumerate() {
            let path = layout::path(column, place, width, area);
            let view = View { snapshot, column, path: &path, picked, dim: 1.0 - fade * (1.0 - DIMMED) };
            let label = column.title();
            ui.scope_builder(
                UiBuilder::new()
                    .id_salt(("feed path", column.feed))
                    .max_rect(path.column)
                    .accessibility_role(Role::Group)
                    .accessibility_label(label),
                |ui| view.show(ui, state, out),
            );
        }
    });
}

/// A pick that the plan no longer has falls back to nothing.
fn still_there(snapshot: &Snapshot<'_>, picked: Option<Picked>) -> Option<Picked> {
    picked.filter(|&picked| match picked {
        Picked::Transmitter => true,
        Picked::Feed(feed) => feed < snapshot.plan.feeds.len(),
        Picked::Link { feed, link } => snapshot.plan.feeds.get(feed).is_some_and(|f| link < f.links.len()),
    })
}

/// One column while it is drawn.
struct View<'a> {
    snapshot: &'a Snapshot<'a>,
    column: &'a Column<'a>,
    path: &'a Path,
    picked: Option<Picked>,
    dim: f32,
}

impl View<'_> {
    fn show(&self, ui: &mut egui::Ui, state: &mut FeedPathState, out: &mut Vec<Command>) {
        let feed = self.column.feed;
        ui.scope(|ui| {
            ui.multiply_opacity(self.dim);
            paint::flow(ui, self);
        });

        let title = self.column.title();
        let head = part(ui, self.path.head, "head", &title, &self.column.sentence(), Sense::click());
        paint::head(ui, self, &head);
        if head.clicked() {
            state.picked = Some(Picked::Feed(feed));
            out.push(Command::Show(Show::Feed(feed)));
        }
        let _ = head.explain(format!("{title}: {}. Click to choose this feed.", self.column.sentence()));

        let power = self.column.given();
        let name = format!("transmitter of {title}");
        let transmitter = part(ui, self.path.transmitter, "transmitter", &name, &power, Sense::click());
        paint::transmitter(ui, self, &transmitter);
        if transmitter.clicked() {
            state.picked = Some(Picked::Transmitter);
        }
        let _ = transmitter.explain(format!(
            "The transmitter gives {power} (less than its set power where its SWR limit is exceeded). Click to change its \
             power, resistance and SWR limit."
        ));
        for place in 0..self.column.blocks.len() {
            self.block(ui, place, state, out);
        }
        paint::wire(ui, self);
        let wire = ui.interact(self.path.wire, ui.scope_id().with("wire"), Sense::hover());
        let sentence = self.column.sentence();
        wire.widget_info(|| {
            let mut info = WidgetInfo::labeled(Role::Label, true, format!("wire: {sentence}"));
            info.current_text_value = Some(format!("wire: {sentence}"));
            info
        });
        let _ = wire.explain(format!("What arrives at the wire: {sentence}."));
    }

    fn block(&self, ui: &mut egui::Ui, place: usize, state: &mut FeedPathState, out: &mut Vec<Command>) {
        let (feed, block) = (self.column.feed, &self.column.blocks[place]);
        let link = &self.snapshot.plan.feeds[feed].links[block.link];
        let line = if let Link::Line(piece) = link { Some(piece) } else { None };
        let sense = if line.is_some() { Sense::click_and_drag() } else { Sense::click() };
        let name = format!("feed {} link {}: {}", crate::views::marks::letter(feed), place + 1, block.name);
        let sentence = block.sentence();
        let response = part(ui, self.path.blocks[place], ("link", block.link), &name, &sentence, sense);
        paint::block(ui, self, place, &response);
        if response.clicked() || response.drag_started() {
            state.picked = Some(Picked::Link { feed, link: block.link });
        }
        if let Some(piece) = line {
            let points = f64::from(response.drag_delta().y);
            if response.dragged() && points != 0.0 {
                let length_m = (piece.length_m + METRES_PER_POINT * points).max(LEAST_LINE_M);
                out.push(Command::Edit(Edit::LinkLength { feed, link: block.link, length_m }));
            }
            if response.drag_stopped() {
                out.push(Command::EndOfDrag);
            }
            let _ = response
                .on_hover_cursor(egui::CursorIcon::ResizeVertical)
                .explain(format!("{sentence}. Click to change it, drag up or down for its length."));
        } else {
            let _ = response.explain(format!("{sentence}. Click to change it."));
        }
    }
}

/// A part of a path that can be picked: it has a name, a value, and shows the focus.
fn part(
    ui: &egui::Ui,
    rect: Rect,
    salt: impl std::hash::Hash + std::fmt::Debug,
    name: &str,
    value: &str,
    sense: Sense,
) -> Response {
    let response = ui.interact(rect, ui.scope_id().with(salt), sense);
    response.widget_info(|| {
        let mut info = WidgetInfo::labeled(Role::Button, true, name);
        info.current_text_value = Some(value.to_owned());
        info
    });
    if response.has_focus() {
        let pen = egui::Stroke::new(
            sheet::tokens::Pen::Bold.width(),
            color(Ink::Chosen, crate::theme::ground_of(ui.visuals())),
        );
        ui.painter().rect_stroke(rect.expand(1.0), 4.0, pen, egui::StrokeKind::Inside);
    }
    response
}
