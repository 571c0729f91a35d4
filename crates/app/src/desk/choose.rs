//! Choosing files: behind a trait, because a desktop may have no file dialog and tests must not open one.

use std::path::PathBuf;
use std::sync::mpsc::{self, Receiver};
use std::time::{Duration, Instant};

use crate::paper::Kind;

/// Without a dialog the library gives up within about 20 ms, and says the same as for "cancel". No hand cancels
/// within this time.
const QUICKEST_HAND: Duration = Duration::from_millis(120);

/// What a file is wanted for.
#[derive(Clone, Debug, PartialEq)]
pub enum Ask {
    /// A plan to open.
    Open,
    /// Where to save the plan.
    SavePlan {
        /// Folder and name to begin with.
        suggested: PathBuf,
    },
    /// Where to save the sheet.
    SaveSheet {
        /// Folder and name to begin with.
        suggested: PathBuf,
    },
}

impl Ask {
    /// The words over the dialog.
    #[must_use]
    pub fn title(&self) -> &'static str {
        match self {
            Self::Open => "Open a plan",
            Self::SavePlan { .. } => "Save the plan as",
            Self::SaveSheet { .. } => "Save the sheet as PDF, SVG or PNG",
        }
    }

    /// The ending of the file's name where none is given.
    #[must_use]
    pub fn extension(&self) -> &'static str {
        match self {
            Self::Open | Self::SavePlan { .. } => "ron",
            Self::SaveSheet { .. } => "pdf",
        }
    }

    /// What the dialog offers: names and endings, the usual one first.
    fn filters(&self) -> Vec<(String, &'static str)> {
        match self {
            Self::Open | Self::SavePlan { .. } => vec![("Plans".to_owned(), self.extension())],
            Self::SaveSheet { .. } => {
                Kind::ALL.map(|kind| (kind.extension().to_uppercase(), kind.extension())).to_vec()
            }
        }
    }

    /// Folder and name to begin with.
    #[must_use]
    pub fn suggested(&self) -> Option<&PathBuf> {
        match self {
            Self::Open => None,
            Self::SavePlan { suggested } | Self::SaveSheet { suggested } => Some(suggested),
        }
    }
}

/// What came of asking.
#[derive(Clone, Debug, PartialEq)]
pub enum Chosen {
    /// This file.
    Path(PathBuf),
    /// Nothing: the hand cancelled.
    Nothing,
    /// This desktop has no file dialog: ask in the window.
    NoDialog,
}

/// Something that can ask for a file while the window goes on.
pub trait Chooser {
    /// Begins to ask; `wake` is called when there is an answer.
    fn ask(&mut self, ask: &Ask, wake: Box<dyn Fn() + Send>);
    /// The answer, once.
    fn answer(&mut self) -> Option<Chosen>;
}

/// The desktop's own dialog, on a thread because it blocks.
#[derive(Default)]
pub struct DesktopChooser {
    pending: Option<Receiver<Chosen>>,
}

impl Chooser for DesktopChooser {
    fn ask(&mut self, ask: &Ask, wake: Box<dyn Fn() + Send>) {
        let (sender, receiver) = mpsc::channel();
        self.pending = Some(receiver);
        let ask = ask.clone();
        let spawned = std::thread::Builder::new().name("file dialog".to_owned()).spawn({
            let sender = sender.clone();
            move || {
                // The window may have gone meanwhile.
                let _ = sender.send(run_dialog(&ask));
                wake();
            }
        });
        if spawned.is_err() {
            let _ = sender.send(Chosen::NoDialog);
        }
    }

    fn answer(&mut self) -> Option<Chosen> {
        let chosen = match self.pending.as_ref()?.try_recv() {
            Ok(chosen) => chosen,
            Err(mpsc::TryRecvError::Empty) => return None,
            Err(mpsc::TryRecvError::Disconnected) => Chosen::NoDialog,
        };
        self.pending = None;
        Some(chosen)
    }
}

fn run_dialog(ask: &Ask) -> Chosen {
    let mut dialog = rfd::FileDialog::new().set_title(ask.title());
    for (words, extension) in ask.filters() {
        dialog = dialog.add_filter(words, &[extension]);
    }
    if let Some(suggested) = ask.suggested() {
        if let Some(folder) = suggested.parent().filter(|folder| folder.is_dir()) {
            dialog = dialog.set_directory(folder);
        }
        if let Some(name) = suggested.file_name() {
            dialog = dialog.set_file_name(name.to_string_lossy());
        }
    }
    let begun = Instant::now();
    let picked = match ask {
        Ask::Open => dialog.pick_file(),
        Ask::SavePlan { .. } | Ask::SaveSheet { .. } => dialog.save_file(),
    };
    match picked {
        Some(path) => Chosen::Path(path),
        None if begun.elapsed() < QUICKEST_HAND => Chosen::NoDialog,
        None => Chosen::Nothing,
    }
}
