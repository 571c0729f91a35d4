//! The worker: evaluates the newest plan on a thread of its own and sends the answer back with the plan's revision.

use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::mpsc::{self, Receiver, RecvTimeoutError, Sender, TryRecvError};
use std::time::{Duration, Instant};

use station::evaluate::{Evaluator, Proof};
use station::plan::Plan;
use station::report::Report;

/// A plan to evaluate.
struct Request {
    plan: Plan,
    revision: u64,
}

/// What the worker sends.
pub enum News {
    /// A plan has been evaluated.
    Answer(Box<Answer>),
    /// What stands behind the newest full answer: one entry per band, computed while nothing else was asked.
    Proofs {
        /// The plan's revision.
        revision: u64,
        /// At the bands' middle frequencies.
        proofs: Vec<Proof>,
    },
}

/// What came of a plan.
pub struct Answer {
    /// The plan's revision.
    pub revision: u64,
    /// How long it took.
    pub took: Duration,
    /// The report, or a sentence.
    pub outcome: Result<Report, String>,
}

/// There is no one to ask.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("the thread that computes has ended; please save the plan and start the program again")]
pub struct Gone;

/// The window's end of the two channels. Dropping it ends the thread.
pub struct Worker {
    requests: Sender<Request>,
    news: Receiver<News>,
}

impl Worker {
    /// Starts the thread. `wake` is called on it after each piece of news.
    ///
    /// # Errors
    /// When the system gives no thread.
    pub fn start(wake: impl Fn() + Send + 'static) -> std::io::Result<Self> {
        let (requests, inbox) = mpsc::channel();
        let (outbox, news) = mpsc::channel();
        let mut bench = Bench { inbox, outbox, wake, evaluator: Evaluator::new(), full_took: Duration::ZERO };
        std::thread::Builder::new().name("evaluate".to_owned()).spawn(move || {
            bench.work();
        })?;
        Ok(Self { requests, news })
    }

    /// Asks for a plan; older ones that were not begun yet are dropped.
    ///
    /// # Errors
    /// [`Gone`] when the thread has ended.
    pub fn ask(&self, plan: Plan, revision: u64) -> Result<(), Gone> {
        self.requests.send(Request { plan, revision }).map_err(|_| Gone)
    }

    /// All news since the last call, oldest first.
    pub fn news(&self) -> impl Iterator<Item = News> + '_ {
        self.news.try_iter()
    }
}

/// A full answer that took longer than this misses the frame (30 a second): a sketch goes before the next one.
const FRAME: Duration = Duration::from_millis(33);
/// The hand rests when nothing has been asked for so long; then there is time for proofs.
const REST: Duration = Duration::from_millis(250);

/// The thread's side: takes the newest request, answers, and proves the answer once the hand rests.
struct Bench<W: Fn()> {
    inbox: Receiver<Request>,
    outbox: Sender<News>,
    wake: W,
    evaluator: Evaluator,
    /// How long the last full answer took.
    full_took: Duration,
}

impl<W: Fn()> Bench<W> {
    /// Request after request; ends with `None` once the window is gone.
    fn work(&mut self) -> Option<()> {
        let mut next = None;
        loop {
            let request = match next.take() {
                Some(request) => request,
                None => self.inbox.recv().ok()?,
            };
            let request = self.inbox.try_iter().last().unwrap_or(request);
            let report = self.answer(&request)?;
            next = match (self.inbox.recv_timeout(REST), report) {
                (Ok(request), _) => Some(request),
                (Err(RecvTimeoutError::Disconnected), _) => return None,
                (Err(RecvTimeoutError::Timeout), Some(report)) => self.prove(&request, &report)?,
                (Err(RecvTimeoutError::Timeout), None) => None,
            };
        }
    }

    /// Evaluates and sends the answer: a sketch first where the full one would miss the frame.
    fn answer(&mut self, request: &Request) -> Option<Option<Report>> {
        let Request { plan, revision } = request;
        if self.full_took > FRAME {
            let begun = Instant::now();
            let sketch =
                guarded(&mut self.evaluator, |e| e.sketch(plan, *revision).map_err(|e| e.to_string()));
            // A plan that the sketch refuses may still have a full answer.
            if sketch.is_ok() {
                self.send(News::Answer(Box::new(Answer {
                    revision: *revision,
                    took: begun.elapsed(),
                    outcome: sketch,
                })))?;
            }
        }
        let begun = Instant::now();
        let outcome =
            guarded(&mut self.evaluator, |e| e.evaluate(plan, *revision).map_err(|e| e.to_string()));
        self.full_took = begun.elapsed();
        let report = outcome.as_ref().ok().cloned();
        self.send(News::Answer(Box::new(Answer { revision: *revision, took: self.full_took, outcome })))?;
        Some(report)
    }

    /// Proves the answer band by band; gives up as soon as something new is asked, for the hand comes first.
    fn prove(&mut self, request: &Request, report: &Report) -> Option<Option<Request>> {
        let mut proofs = Vec::with_capacity(report.bands.len());
        for band in &report.bands {
            match self.inbox.try_recv() {
                Ok(next) => return Some(Some(next)),
                Err(TryRecvError::Disconnected) => return None,
                Err(TryRecvError::Empty) => {}
            }
            let frequency_hz = band.middle_point().frequency_hz;
            let proof = guarded(&mut self.evaluator, |evaluator| {
                evaluator.prove(&request.plan, frequency_hz).map_err(|error| error.to_string())
            });
            // An answer without a proof is shown without one.
            let Ok(Some(proof)) = proof else { return Some(None) };
            proofs.push(proof);
        }
        self.send(News::Proofs { revision: request.revision, proofs })?;
        Some(None)
    }

    fn send(&self, news: News) -> Option<()> {
        self.outbox.send(news).ok()?;
        (self.wake)();
        Some(())
    }
}

/// Runs an evaluation so that a panic in it becomes a sentence; the evaluator starts afresh after one.
fn guarded<T>(
    evaluator: &mut Evaluator,
    job: impl FnOnce(&mut Evaluator) -> Result<T, String>,
) -> Result<T, String> {
    catch_unwind(AssertUnwindSafe(|| job(evaluator))).unwrap_or_else(|payload| {
        *evaluator = Evaluator::new();
        let what = payload
            .downcast_ref::<&str>()
            .map(|text| (*text).to_owned())
            .or_else(|| payload.downcast_ref::<String>().cloned())
            .unwrap_or_else(|| "unknown".to_owned());
        Err(format!(
            "the evaluation of this plan broke off (a fault of the program, not of the plan): {what}"
        ))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_panic_becomes_a_sentence_and_the_evaluator_lives_on() {
        let mut evaluator = Evaluator::new();
        let broken: Result<Report, String> = guarded(&mut evaluator, |_| panic!("no such segment"));
        assert!(broken.is_err_and(|text| text.contains("no such segment")));
        let plan = crate::start::demo();
        let report = guarded(&mut evaluator, |e| e.evaluate(&plan, 7).map_err(|error| error.to_string()));
        assert_eq!(report.map(|report| report.revision), Ok(7));
    }
}
