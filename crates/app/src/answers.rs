//! The newest report, and whether it is about the plan that is shown.

use std::time::{Duration, Instant};

use eframe::egui;
use station::evaluate::Proof;
use station::report::{Model, Report};

use crate::document::Document;
use crate::worker::{Answer, News, Worker};

/// An answer that takes longer than this is missed by the eye: what is shown meanwhile is marked as old.
const MISSED_AFTER: Duration = Duration::from_millis(150);

/// What the worker has found out so far.
pub struct Answers {
    /// `None` where the system gave no thread.
    worker: Option<Worker>,
    asked: u64,
    report: Option<Report>,
    took: Duration,
    /// Of the report, by band; empty until the hand has rested.
    proofs: Vec<Proof>,
    fault: Option<String>,
    /// When the last question was asked or the last answer came.
    last_sign: Instant,
}

impl Answers {
    /// Starts the worker; `wake` is called after each answer.
    #[must_use]
    pub fn new(wake: impl Fn() + Send + 'static) -> Self {
        let (worker, fault) = match Worker::start(wake) {
            Ok(worker) => (Some(worker), None),
            Err(error) => (None, Some(format!("the system gives no thread to compute on: {error}"))),
        };
        Self {
            worker,
            asked: 0,
            report: None,
            took: Duration::ZERO,
            proofs: Vec::new(),
            fault,
            last_sign: Instant::now(),
        }
    }

    /// Takes what has come.
    pub fn poll(&mut self, ctx: &egui::Context, document: &Document) {
        if self.report.as_ref().is_some_and(|report| report.revision < document.first_revision()) {
            self.report = None;
        }
        let news: Vec<News> = self.worker.iter().flat_map(Worker::news).collect();
        for piece in news {
            match piece {
                News::Answer(answer) => self.take(*answer, document),
                News::Proofs { revision, proofs } => {
                    if self.report.as_ref().is_some_and(|report| report.revision == revision) {
                        self.proofs = proofs;
                    }
                }
            }
            ctx.request_repaint();
        }
    }

    fn take(&mut self, answer: Answer, document: &Document) {
        if answer.revision < document.first_revision() {
            return;
        }
        self.took = answer.took;
        self.last_sign = Instant::now();
        match answer.outcome {
            Ok(report) => {
                if self.report.as_ref().is_none_or(|old| old.revision != report.revision) {
                    self.proofs.clear();
                }
                (self.report, self.fault) = (Some(report), None);
            }
            Err(sentence) => self.fault = Some(sentence),
        }
    }

    /// Asks about the plan unless it was asked about already.
    pub fn ask(&mut self, ctx: &egui::Context, document: &Document) {
        if self.asked == document.revision() {
            return;
        }
        if let Some(worker) = &self.worker {
            if let Err(gone) = worker.ask(document.plan().clone(), document.revision()) {
                self.fault = Some(gone.to_string());
            }
            self.last_sign = Instant::now();
            ctx.request_repaint_after(MISSED_AFTER);
        }
        self.asked = document.revision();
    }

    /// The newest report that fits the plan's lists, though a value may have changed since.
    #[must_use]
    pub fn report(&self, document: &Document) -> Option<&Report> {
        self.report.as_ref().filter(|report| fits(report, document))
    }

    /// The report on the plan as it is now.
    #[must_use]
    pub fn current(&self, document: &Document) -> Option<&Report> {
        self.report.as_ref().filter(|report| report.revision == document.revision())
    }

    /// The full answer on the plan as it is now: what may go on paper.
    #[must_use]
    pub fn settled(&self, document: &Document) -> Option<&Report> {
        self.current(document).filter(|report| report.model != Model::Sketch)
    }

    /// Whether what is shown is old enough to be marked.
    #[must_use]
    pub fn is_stale(&self, document: &Document) -> bool {
        self.current(document).is_none() && self.last_sign.elapsed() >= MISSED_AFTER
    }

    /// How long the last evaluation took.
    #[must_use]
    pub fn took(&self) -> Duration {
        self.took
    }

    /// What stands behind the newest full answer, by band; empty until it has been computed.
    #[must_use]
    pub fn proofs(&self) -> &[Proof] {
        &self.proofs
    }

    /// Why there is no report on the newest plan.
    #[must_use]
    pub fn fault(&self) -> Option<&str> {
        self.fault.as_deref()
    }
}

/// Whether bands, feeds, links and wires of a report are those of the plan, by number: views go through both at once.
fn fits(report: &Report, document: &Document) -> bool {
    let plan = document.plan();
    let links_fit = |band: &station::report::BandReport| {
        band.points.first().is_none_or(|point| {
            point.feeds.len() == plan.feeds.len()
                && point
                    .feeds
                    .iter()
                    .zip(&plan.feeds)
                    .all(|(seen, feed)| seen.links.len() == feed.links.len())
        })
    };
    report.bands.len() == plan.bands.len()
        && report.feed_names.len() == plan.feeds.len()
        && report.hung.wires.len() == plan.wires.len()
        && report.bands.iter().all(links_fit)
}
