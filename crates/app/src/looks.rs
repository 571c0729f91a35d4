//! What is looked at: view, band, feed, units, light, motion. Not part of the plan, not undone.

use station::plan::Plan;
use station::units::Units;

use crate::command::{Motion, Show, Theme, View};
use crate::desk::Settings;
use sheet::Paper;

/// Seconds on screen for one RF cycle: slow enough to follow a loop with the eye.
const PERIOD_S: f64 = 4.0;
/// Periods that can be chosen, s.
const PERIODS_S: (f64, f64) = (0.5, 30.0);

/// The state of looking.
#[derive(Clone, Debug, PartialEq)]
pub struct Looks {
    /// The view.
    pub view: View,
    /// Index of the chosen band.
    pub band: usize,
    /// Index of the chosen feed.
    pub feed: usize,
    /// Metres or feet.
    pub units: Units,
    /// Light, dark, or what the desktop says.
    pub theme: Theme,
    /// Paper of the sheet.
    pub paper: Paper,
    /// Whether the standing wave moves.
    pub moving: bool,
    /// Phase of the RF cycle, degrees.
    pub phase_deg: f64,
    /// Seconds on screen for one RF cycle.
    pub period_s: f64,
}

impl Looks {
    /// As the settings say.
    #[must_use]
    pub fn new(settings: &Settings) -> Self {
        Self {
            view: View::default(),
            band: 0,
            feed: 0,
            units: settings.units,
            theme: settings.theme,
            paper: settings.paper,
            moving: settings.moving,
            phase_deg: 0.0,
            period_s: PERIOD_S,
        }
    }

    /// Follows a command.
    pub fn obey(&mut self, show: Show) {
        match show {
            Show::View(view) => self.view = view,
            Show::Band(band) => self.band = band,
            Show::Feed(feed) => self.feed = feed,
            Show::Units(units) => self.units = units,
            Show::Theme(theme) => self.theme = theme,
            Show::Paper(paper) => self.paper = paper,
            Show::Motion(Motion::Run) => self.moving = true,
            Show::Motion(Motion::Stop) => self.moving = false,
            Show::Motion(Motion::Phase(degrees)) => {
                self.moving = false;
                self.phase_deg = degrees.rem_euclid(360.0);
            }
            Show::Motion(Motion::Period(seconds)) => self.period_s = seconds.clamp(PERIODS_S.0, PERIODS_S.1),
        }
    }

    /// Keeps the choices within a plan.
    pub fn fit(&mut self, plan: &Plan) {
        self.band = self.band.min(plan.bands.len().saturating_sub(1));
        self.feed = self.feed.min(plan.feeds.len().saturating_sub(1));
    }

    /// Lets the RF cycle run on.
    pub fn advance(&mut self, seconds: f64) {
        self.phase_deg = (self.phase_deg + 360.0 * seconds / self.period_s).rem_euclid(360.0);
    }

    /// The units that are not shown now.
    #[must_use]
    pub fn other_units(&self) -> Units {
        match self.units {
            Units::Metres => Units::Feet,
            Units::Feet => Units::Metres,
        }
    }

    /// What of this is remembered.
    pub fn note(&self, settings: &mut Settings) {
        settings.units = self.units;
        settings.theme = self.theme;
        settings.paper = self.paper;
        settings.moving = self.moving;
    }
}
