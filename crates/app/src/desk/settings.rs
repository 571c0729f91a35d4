//! What the program remembers between two runs: recent files, units, light or dark, paper, motion.

use std::fs;
use std::path::{Path, PathBuf};

use etcetera::BaseStrategy as _;
use serde::{Deserialize, Serialize};
use station::units::Units;

use crate::command::Theme;
use sheet::Paper;

/// As many as a menu shows without scrolling.
const RECENT: usize = 8;

/// The user's habits. Unknown or broken settings are no reason to stop: then the defaults hold.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Settings {
    /// Newest first.
    pub recent: Vec<PathBuf>,
    /// Metres or feet.
    pub units: Units,
    /// Light, dark, or what the desktop says.
    pub theme: Theme,
    /// For the sheet.
    pub paper: Paper,
    /// Whether the standing wave moves.
    pub moving: bool,
}

impl Default for Settings {
    fn default() -> Self {
        Self {
            recent: Vec::new(),
            units: Units::default(),
            theme: Theme::default(),
            paper: Paper::default(),
            moving: true,
        }
    }
}

impl Settings {
    /// Puts a file at the head of the recent ones.
    pub fn note_recent(&mut self, path: &Path) {
        let path = std::path::absolute(path).unwrap_or_else(|_| path.to_owned());
        self.recent.retain(|other| *other != path);
        self.recent.insert(0, path);
        self.recent.truncate(RECENT);
    }
}

/// The file that holds the settings; without one they last as long as the window.
#[derive(Clone, Debug, Default)]
pub struct SettingsFile(Option<PathBuf>);

impl SettingsFile {
    /// In the user's configuration folder.
    #[must_use]
    pub fn of_user() -> Self {
        Self(
            etcetera::choose_base_strategy()
                .ok()
                .map(|strategy| strategy.config_dir().join("wirewright").join("settings.ron")),
        )
    }

    /// At a place of the caller's.
    #[must_use]
    pub fn at(path: PathBuf) -> Self {
        Self(Some(path))
    }

    /// What the file says, or the defaults.
    #[must_use]
    pub fn load(&self) -> Settings {
        self.0
            .as_ref()
            .and_then(|path| fs::read_to_string(path).ok())
            .and_then(|text| ron::from_str(&text).ok())
            .unwrap_or_default()
    }

    /// Writes the settings. A full disk or a read-only folder costs habits, not work: it is not reported.
    pub fn save(&self, settings: &Settings) {
        let Some(path) = &self.0 else { return };
        let Ok(text) = ron::ser::to_string_pretty(settings, ron::ser::PrettyConfig::default()) else {
            return;
        };
        if let Some(folder) = path.parent() {
            let _ = fs::create_dir_all(folder);
        }
        let _ = station::file::write_atomically(path, text.as_bytes());
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn settings_come_back() {
        let folder = tempfile::tempdir().unwrap();
        let file = SettingsFile::at(folder.path().join("deep").join("settings.ron"));
        assert_eq!(file.load(), Settings::default());
        let mut settings = Settings { units: Units::Feet, moving: false, ..Settings::default() };
        settings.note_recent(Path::new("/a/one.ron"));
        settings.note_recent(Path::new("/a/two.ron"));
        settings.note_recent(Path::new("/a/one.ron"));
        file.save(&settings);
        assert_eq!(file.load(), settings);
        assert_eq!(settings.recent, [PathBuf::from("/a/one.ron"), PathBuf::from("/a/two.ron")]);
    }

    #[test]
    fn broken_settings_are_defaults() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("settings.ron");
        fs::write(&path, "(recent: 7").unwrap();
        assert_eq!(SettingsFile::at(path).load(), Settings::default());
    }
}
