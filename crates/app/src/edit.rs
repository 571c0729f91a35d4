//! The one place that changes a plan. An edit that would make an unsound plan is refused with a sentence; a number
//! that is dragged too far stops where the plan is still sound.

mod arms;
mod handle;
mod joined;
mod set;
mod toward;
mod wires;

pub use handle::Handle;

use station::plan::Plan;
use station::validate::{self, PlanError};

use crate::command::Edit;

/// Halvings of the way between the present and the wanted value: the stop is found to a millionth of the way.
const HALVINGS: usize = 20;

/// A plan after an edit.
#[derive(Clone, Debug, PartialEq)]
pub struct Outcome {
    /// The new plan; sound.
    pub plan: Plan,
    /// Why the value stopped before the one that was asked for.
    pub stop: Option<String>,
}

/// Why an edit was not made.
#[derive(Debug, thiserror::Error)]
pub enum Refusal {
    /// It names something that the plan does not have.
    #[error("the plan has no {what} number {number}")]
    Missing {
        /// The kind of thing.
        what: &'static str,
        /// Counted from 1.
        number: usize,
    },
    /// It would take away the last one.
    #[error("a plan needs at least one feed")]
    LastFeed,
    /// It would leave a wire in the air.
    #[error("the wire \"{wire}\" hangs on {support}: make it fast elsewhere first")]
    Carries {
        /// The support's name.
        support: String,
        /// The wire's name.
        wire: String,
    },
    /// It would leave the feeds without a wire.
    #[error("the wire \"{wire}\" is the one that is fed: it stays")]
    Fed {
        /// The wire's name.
        wire: String,
    },
    /// There is no room for two more wires.
    #[error(
        "no room for two more wires at the feedpoint: they need a fed wire of {least_m} m or more on both sides"
    )]
    NoRoomForArms {
        /// Least length of wire on either side of the feedpoint, m.
        least_m: f64,
    },
    /// It has no length to set.
    #[error("link {number} of this feed is not a piece of line")]
    NotALine {
        /// Counted from 1, from the feedpoint.
        number: usize,
    },
    /// The plan would break a rule.
    #[error(transparent)]
    Rule(#[from] PlanError),
}

/// The plan with an edit applied.
///
/// # Errors
/// A [`Refusal`] whose sentence says what is wrong.
pub fn apply(plan: &Plan, edit: &Edit) -> Result<Outcome, Refusal> {
    match whole(plan, edit) {
        Ok(plan) => Ok(Outcome { plan, stop: None }),
        Err(refusal) => match furthest(plan, edit) {
            Some(plan) => Ok(Outcome { plan, stop: Some(refusal.to_string()) }),
            None => Err(refusal),
        },
    }
}

/// The plan with the edit as it stands.
fn whole(plan: &Plan, edit: &Edit) -> Result<Plan, Refusal> {
    let mut changed = plan.clone();
    set::set(&mut changed, edit)?;
    validate::check(&changed)?;
    Ok(changed)
}

/// For a number that can be dragged: the soundest plan on the way to the wanted one. `None` for other edits.
fn furthest(plan: &Plan, edit: &Edit) -> Option<Plan> {
    let at = |share: f64| toward::toward(plan, edit, share);
    // The present value must be sound itself, or there is nothing to stop at.
    let mut best = whole(plan, &at(0.0)?).ok()?;
    let (mut sound, mut unsound) = (0.0_f64, 1.0_f64);
    for _ in 0..HALVINGS {
        let middle = 0.5 * (sound + unsound);
        match whole(plan, &at(middle)?) {
            Ok(changed) => (sound, best) = (middle, changed),
            Err(_) => unsound = middle,
        }
    }
    Some(best)
}

#[cfg(test)]
mod tests;
