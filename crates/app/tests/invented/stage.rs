//! A stage for one view: it obeys what the view asks to show, and keeps everything the view asked for.

use app::command::{Command, Edit, Show};
use app::snapshot::Snapshot;
use eframe::egui::{Ui, Vec2};
use egui_kittest::Harness;
use sheet::tokens::Ground;
use station::plan::Plan;
use station::report::Report;
use station::units::Units;

/// Everything a view reads, and its state.
pub struct Stage<S> {
    pub plan: Plan,
    pub report: Option<Report>,
    pub band: usize,
    pub feed: usize,
    pub units: Units,
    pub state: S,
    /// What the view asked for, oldest first.
    pub asked: Vec<Command>,
}

/// How a view is drawn.
type View<S> = fn(&mut Ui, &Snapshot<'_>, &mut S, &mut Vec<Command>);

impl<S: Default + 'static> Stage<S> {
    /// A stage with so many bands and feeds, and their report.
    pub fn new(bands: usize, feeds: usize) -> Self {
        let plan = super::plan(bands, feeds);
        let report = Some(super::report(&plan));
        Self { plan, report, band: 0, feed: 0, units: Units::Metres, state: S::default(), asked: Vec::new() }
    }

    /// Opens the curtain.
    pub fn open(self, size: impl Into<Vec2>, view: View<S>) -> Harness<'static, Self> {
        Harness::builder().with_size(size).with_context_setup(app::theme::install).build_ui_state(
            move |ui, stage: &mut Self| {
                let mut out = Vec::new();
                let snapshot = Snapshot {
                    plan: &stage.plan,
                    report: stage.report.as_ref(),
                    stale: false,
                    band: stage.band,
                    feed: stage.feed,
                    units: stage.units,
                    ground: Ground::Light,
                    phase_deg: 0.0,
                    moving: false,
                    period_s: 4.0,
                };
                view(ui, &snapshot, &mut stage.state, &mut out);
                for command in &out {
                    match command {
                        Command::Show(Show::Band(band)) => stage.band = *band,
                        Command::Show(Show::Feed(feed)) => stage.feed = *feed,
                        _ => {}
                    }
                }
                if !out.is_empty() {
                    // As the window does after a change.
                    ui.request_repaint();
                }
                stage.asked.append(&mut out);
            },
            self,
        )
    }

    /// The edits that were asked for, oldest first.
    pub fn edits(&self) -> Vec<&Edit> {
        let edits = self.asked.iter().filter_map(|command| match command {
            Command::Edit(edit) => Some(edit),
            _ => None,
        });
        edits.collect()
    }
}
