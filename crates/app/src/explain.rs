//! Things explain themselves: one sentence beside the pointer and in the status line.

use eframe::egui::{Context, Id, Response};

/// Gives a widget its sentence.
pub trait Explain {
    /// Shows the sentence beside the pointer after a moment, and at once in the status line.
    fn explain(self, sentence: impl Into<String>) -> Self;
}

impl Explain for Response {
    fn explain(self, sentence: impl Into<String>) -> Self {
        if !self.contains_pointer() && !self.hovered() {
            return self;
        }
        let sentence = sentence.into();
        say(&self.ctx, &sentence);
        if self.enabled() { self.on_hover_text(sentence) } else { self.on_disabled_hover_text(sentence) }
    }
}

/// The sentence of this frame and of the one before.
#[derive(Clone, Default)]
struct Said {
    now: String,
    before: String,
}

fn id() -> Id {
    Id::unique("under the pointer")
}

/// Says a sentence in the status line only: for marks of a canvas that draw their own read-out.
pub fn say(ctx: &Context, sentence: &str) {
    ctx.data_mut(|data| {
        let said: &mut Said = data.get_temp_mut_or_default(id());
        said.now.clear();
        said.now.push_str(sentence);
    });
}

/// Begins a frame and hands out what the frame before said; asks for another one when it has changed.
pub fn take(ctx: &Context) -> String {
    let (sentence, changed) = ctx.data_mut(|data| {
        let said: &mut Said = data.get_temp_mut_or_default(id());
        let sentence = std::mem::take(&mut said.now);
        let changed = sentence != said.before;
        said.before.clone_from(&sentence);
        (sentence, changed)
    });
    if changed {
        ctx.request_repaint();
    }
    sentence
}
