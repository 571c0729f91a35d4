//! A file chosen by typing its path: for desktops without a file dialog.

use std::path::{Path, PathBuf};

use super::choose::Ask;

/// The state of the dialog.
pub(super) struct Typed {
    pub(super) ask: Ask,
    /// What stands in the field.
    pub(super) text: String,
    /// The file exists and would be replaced; looked up when the text changes, not in every frame.
    pub(super) replaces: bool,
    /// The field takes the keyboard once.
    pub(super) is_new: bool,
}

impl Typed {
    pub(super) fn new(ask: Ask) -> Self {
        let text = ask.suggested().map(|path| path.display().to_string()).unwrap_or_default();
        let mut typed = Self { ask, text, replaces: false, is_new: true };
        typed.look();
        typed
    }

    /// The path as typed, with the ending added where there is none; `None` while nothing is typed.
    pub(super) fn path(&self) -> Option<PathBuf> {
        let text = self.text.trim().trim_matches('"');
        if text.is_empty() {
            return None;
        }
        let path = Path::new(text);
        Some(if path.extension().is_none() {
            path.with_extension(self.ask.extension())
        } else {
            path.to_owned()
        })
    }

    /// Looks whether the file exists.
    pub(super) fn look(&mut self) {
        self.replaces = self.ask != Ask::Open && self.path().is_some_and(|path| path.exists());
    }

    /// The word on the button.
    pub(super) fn verb(&self) -> &'static str {
        match self.ask {
            Ask::Open => "Open",
            _ if self.replaces => "Replace",
            _ => "Save",
        }
    }
}
