//! The worker: evaluates the newest plan on a thread of its own and sends the answer back with the plan's revision.

use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::mpsc::{self, Receiver, Sender};
use std::time::{Duration, Instant};

use station::evaluate::Evaluator;
use station::plan::Plan;
use station::report::Report;

/// A plan to evaluate.
struct Request {
    plan: Plan,
    revision: u64,
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
    answers: Receiver<Answer>,
}

impl Worker {
    /// Starts the thread. `wake` is called on it after each answer.
    ///
    /// # Errors
    /// When the system gives no thread.
    pub fn start(wake: impl Fn() + Send + 'static) -> std::io::Result<Self> {
        let (requests, inbox) = mpsc::channel();
        let (outbox, answers) = mpsc::channel();
        std::thread::Builder::new().name("evaluate".to_owned()).spawn(move || work(&inbox, &outbox, wake))?;
        Ok(Self { requests, answers })
    }

    /// Asks for a plan; older ones that were not begun yet are dropped.
    ///
    /// # Errors
    /// [`Gone`] when the thread has ended.
    pub fn ask(&self, plan: Plan, revision: u64) -> Result<(), Gone> {
        self.requests.send(Request { plan, revision }).map_err(|_| Gone)
    }

    /// The newest answer since the last call.
    #[must_use]
    pub fn newest(&self) -> Option<Answer> {
        self.answers.try_iter().last()
    }
}

/// Takes the newest request, evaluates, answers, until the window is gone.
fn work(inbox: &Receiver<Request>, outbox: &Sender<Answer>, wake: impl Fn()) {
    let mut evaluator = Evaluator::new();
    while let Ok(first) = inbox.recv() {
        let request = inbox.try_iter().last().unwrap_or(first);
        let begun = Instant::now();
        let outcome = guarded(&mut evaluator, |evaluator| {
            evaluator.evaluate(&request.plan, request.revision).map_err(|error| error.to_string())
        });
        let answer = Answer { revision: request.revision, took: begun.elapsed(), outcome };
        if outbox.send(answer).is_err() {
            return;
        }
        wake();
    }
}

/// Runs an evaluation so that a panic in it becomes a sentence; the evaluator starts afresh after one.
fn guarded(
    evaluator: &mut Evaluator,
    job: impl FnOnce(&mut Evaluator) -> Result<Report, String>,
) -> Result<Report, String> {
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
        let broken = guarded(&mut evaluator, |_| panic!("no such segment"));
        assert!(broken.is_err_and(|text| text.contains("no such segment")));
        let plan = crate::start::demo();
        let report = guarded(&mut evaluator, |e| e.evaluate(&plan, 7).map_err(|error| error.to_string()));
        assert_eq!(report.map(|report| report.revision), Ok(7));
    }
}
