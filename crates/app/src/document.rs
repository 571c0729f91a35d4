//! The document: the plan, the steps back and forward, the file it came from, and whether it is saved.

use std::path::{Path, PathBuf};

use station::plan::Plan;

use crate::command::Edit;
use crate::edit::{self, Handle, Refusal};

/// Steps that are kept; the oldest is forgotten first.
const STEPS: usize = 500;

/// The open plan.
pub struct Document {
    plan: Plan,
    /// As it stands in the file, or as it was when it came without one.
    saved: Plan,
    path: Option<PathBuf>,
    past: Vec<Plan>,
    future: Vec<Plan>,
    /// What the hand holds: more edits of the same handle belong to the same step.
    held: Option<Handle>,
    revision: u64,
    /// Revision at which this plan was opened.
    first_revision: u64,
}

impl Document {
    /// A plan from a file, or one without a file yet.
    #[must_use]
    pub fn new(plan: Plan, path: Option<PathBuf>) -> Self {
        Self {
            saved: plan.clone(),
            plan,
            path,
            past: Vec::new(),
            future: Vec::new(),
            held: None,
            revision: 1,
            first_revision: 1,
        }
    }

    /// Puts another plan in the place of this one. Revisions go on, so that late answers are known as such.
    pub fn replace(&mut self, plan: Plan, path: Option<PathBuf>) {
        let revision = self.revision + 1;
        *self = Self { revision, first_revision: revision, ..Self::new(plan, path) };
    }

    /// The plan as it is now.
    #[must_use]
    pub fn plan(&self) -> &Plan {
        &self.plan
    }

    /// Grows with every change of the plan.
    #[must_use]
    pub fn revision(&self) -> u64 {
        self.revision
    }

    /// Revision at which this plan was opened: what is older belongs to another plan.
    #[must_use]
    pub fn first_revision(&self) -> u64 {
        self.first_revision
    }

    /// The file, if it has one.
    #[must_use]
    pub fn path(&self) -> Option<&Path> {
        self.path.as_deref()
    }

    /// Whether work would be lost by closing.
    #[must_use]
    pub fn is_unsaved(&self) -> bool {
        self.plan != self.saved
    }

    /// The plan stands in this file now.
    pub fn mark_saved(&mut self, path: PathBuf) {
        self.saved = self.plan.clone();
        self.path = Some(path);
        self.held = None;
    }

    /// Changes the plan. `Ok` carries the sentence of a stop where a dragged value could go no further.
    ///
    /// # Errors
    /// The plan stays as it was; the refusal says why.
    pub fn edit(&mut self, edit: &Edit) -> Result<Option<String>, Refusal> {
        let outcome = edit::apply(&self.plan, edit)?;
        if outcome.plan != self.plan {
            let handle = Handle::of(edit);
            let before = std::mem::replace(&mut self.plan, outcome.plan);
            if handle.is_none() || handle != self.held {
                self.remember(before);
            }
            self.held = handle;
            self.future.clear();
            self.revision += 1;
        }
        Ok(outcome.stop)
    }

    fn remember(&mut self, plan: Plan) {
        if self.past.len() == STEPS {
            self.past.remove(0);
        }
        self.past.push(plan);
    }

    /// The hand let go.
    pub fn end_of_drag(&mut self) {
        self.held = None;
    }

    /// Whether there is a step back.
    #[must_use]
    pub fn can_undo(&self) -> bool {
        !self.past.is_empty()
    }

    /// Whether there is a step forward.
    #[must_use]
    pub fn can_redo(&self) -> bool {
        !self.future.is_empty()
    }

    /// One step back.
    pub fn undo(&mut self) {
        if let Some(before) = self.past.pop() {
            self.future.push(std::mem::replace(&mut self.plan, before));
            self.stepped();
        }
    }

    /// One step forward.
    pub fn redo(&mut self) {
        if let Some(after) = self.future.pop() {
            self.past.push(std::mem::replace(&mut self.plan, after));
            self.stepped();
        }
    }

    fn stepped(&mut self) {
        self.held = None;
        self.revision += 1;
    }
}

#[cfg(test)]
mod tests;
