//! Printing: through the system's print command, or else in the PDF viewer, which prints too. Behind a trait, because
//! tests must waste no paper.

use std::io;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::sync::Arc;
use std::sync::mpsc::{self, Receiver, TryRecvError};

use station::file::{self, FileError};

use super::Notice;

/// The print command of POSIX.
const COMMAND: &str = "lp";

/// Why the print command did not take a file.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum SpoolError {
    /// There is none.
    #[error("this system has no print command {COMMAND}")]
    NoCommand,
    /// It said no, in these words.
    #[error("the print command {COMMAND} did not take the sheet ({0})")]
    Refused(String),
}

/// The two ways to paper.
pub trait PrintWays: Send + Sync {
    /// Hands a PDF to the system's print command; gives back what the command said.
    ///
    /// # Errors
    /// Where there is no such command, or it refuses.
    fn spool(&self, pdf: &Path) -> Result<String, SpoolError>;

    /// Opens a PDF in the desktop's viewer.
    ///
    /// # Errors
    /// Where no program opens it.
    fn view(&self, pdf: &Path) -> io::Result<()>;
}

/// What the desktop offers.
pub struct DesktopWays;

impl PrintWays for DesktopWays {
    fn spool(&self, pdf: &Path) -> Result<String, SpoolError> {
        let output =
            Command::new(COMMAND).arg(pdf).stdin(Stdio::null()).output().map_err(|error| {
                match error.kind() {
                    io::ErrorKind::NotFound => SpoolError::NoCommand,
                    _ => SpoolError::Refused(error.to_string()),
                }
            })?;
        let said =
            |bytes: &[u8]| String::from_utf8_lossy(bytes).split_whitespace().collect::<Vec<_>>().join(" ");
        match (output.status.success(), said(&output.stderr)) {
            (true, _) => Ok(said(&output.stdout)),
            (false, words) if words.is_empty() => Err(SpoolError::Refused(output.status.to_string())),
            (false, words) => Err(SpoolError::Refused(words)),
        }
    }

    fn view(&self, pdf: &Path) -> io::Result<()> {
        // What the launchers report is a list of exit codes.
        open::that_detached(pdf)
            .map_err(|error| io::Error::new(error.kind(), "this desktop has none for PDF files"))
    }
}

/// One sheet at a time on its way to paper, on a thread: print commands may take their time.
pub(super) struct Press {
    ways: Arc<dyn PrintWays>,
    pending: Option<Receiver<Notice>>,
}

impl Press {
    pub(super) fn new(ways: Arc<dyn PrintWays>) -> Self {
        Self { ways, pending: None }
    }

    /// Whether a sheet is on its way.
    pub(super) fn is_busy(&self) -> bool {
        self.pending.is_some()
    }

    /// Sends a PDF on its way; `wake` is called when it has arrived.
    pub(super) fn print(&mut self, name: String, pdf: Vec<u8>, wake: impl Fn() + Send + 'static) {
        let (sender, receiver) = mpsc::channel();
        let ways = Arc::clone(&self.ways);
        let spawned = std::thread::Builder::new().name("print".to_owned()).spawn(move || {
            // The window may have gone meanwhile.
            let _ = sender.send(hand_over(ways.as_ref(), &name, &pdf));
            wake();
        });
        // Without a thread the sender is gone, and `arrived` says so.
        drop(spawned);
        self.pending = Some(receiver);
    }

    /// What became of it, once.
    pub(super) fn arrived(&mut self) -> Option<Notice> {
        let notice = match self.pending.as_ref()?.try_recv() {
            Ok(notice) => notice,
            Err(TryRecvError::Empty) => return None,
            Err(TryRecvError::Disconnected) => {
                Notice::problem("the sheet was not printed: the system gave no thread, or it ended early")
            }
        };
        self.pending = None;
        Some(notice)
    }
}

/// Writes the PDF to a folder of its own and tries the ways to paper in turn.
fn hand_over(ways: &dyn PrintWays, name: &str, pdf: &[u8]) -> Notice {
    let file = match write(name, pdf) {
        Ok(file) => file,
        Err(error) => return Notice::problem(format!("the sheet was not printed: {error}")),
    };
    let why = match ways.spool(&file) {
        Ok(said) => {
            clear_away(&file); // The print system has its own copy.
            let colon = if said.is_empty() { "" } else { ": " };
            return Notice::done(format!("Sheet sent to the printer{colon}{said}"));
        }
        Err(why) => why,
    };
    match ways.view(&file) {
        Ok(()) => Notice::done(format!("The sheet is open in the PDF viewer, please print it there: {why}")),
        Err(error) => {
            let text =
                format!("the sheet was not printed: {why}, and no program opens {}: {error}", file.display());
            Notice::problem(text)
        }
    }
}

/// Puts the PDF into a new folder among the system's temporary files.
fn write(name: &str, pdf: &[u8]) -> Result<PathBuf, FileError> {
    const MOST_FOLDERS: u32 = 1000;
    let place = |index| std::env::temp_dir().join(format!("wirewright-{}-{index}", std::process::id()));
    let mut index = 0;
    // A folder that is there already may be anyone's: the next number is tried.
    while let Err(source) = std::fs::create_dir(place(index)) {
        index += 1;
        if source.kind() != io::ErrorKind::AlreadyExists || index == MOST_FOLDERS {
            return Err(FileError::Write { path: place(index), source });
        }
    }
    let file = place(index).join(name);
    file::write_atomically(&file, pdf)?;
    Ok(file)
}

/// Removes the file and its folder; what cannot be removed, the system clears away some day.
fn clear_away(pdf: &Path) {
    let _ = std::fs::remove_file(pdf);
    if let Some(folder) = pdf.parent() {
        let _ = std::fs::remove_dir(folder); // Only where it is empty.
    }
}
