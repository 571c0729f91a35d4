//! Matching units: L in four forms, high-pass T, balanced L; the setting with the least loss.

mod element;
mod range;
mod report;
mod search;
mod two;

use num_complex::Complex64;
use thiserror::Error;

pub use range::Range;
pub use report::{PartRole, PartSetting, Power, UnitMatch};

use super::error::{PartError, positive};
use element::{Element, Kind, Place};

/// A coil or a capacitor of a matching unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Part {
    /// What it can be set to, H or F.
    pub range: Range,
    /// Its Q: of a coil reactance over the resistance in series with it, of a capacitor susceptance over the
    /// conductance across it; greater than zero, may be infinite.
    pub q: f64,
    /// What it may stand, where that is known.
    pub rating: PartRating,
}

/// What a part may stand.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct PartRating {
    /// Highest peak voltage across it, V.
    pub peak_v: Option<f64>,
    /// Highest RMS current through it, A.
    pub rms_a: Option<f64>,
}

/// The forms of an L: what is in series, and at which side the other part stands across.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LForm {
    /// Coil in series, capacitor across the load: low-pass, steps a high load down.
    SeriesCoilCapacitorAtLoad,
    /// Coil in series, capacitor across the source: low-pass, steps a low load up.
    SeriesCoilCapacitorAtSource,
    /// Capacitor in series, coil across the load: high-pass, steps a high load down.
    SeriesCapacitorCoilAtLoad,
    /// Capacitor in series, coil across the source: high-pass, steps a low load up.
    SeriesCapacitorCoilAtSource,
}

impl LForm {
    /// All four.
    pub const ALL: [Self; 4] = [
        Self::SeriesCoilCapacitorAtLoad,
        Self::SeriesCoilCapacitorAtSource,
        Self::SeriesCapacitorCoilAtLoad,
        Self::SeriesCapacitorCoilAtSource,
    ];
}

/// A matching unit whose parts are set anew for each frequency.
///
/// Parts have loss (their Q) and no stray reactance; Q does not change over a part's range.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum MatchingUnit {
    /// An L-network.
    L {
        /// Which way it stands.
        form: LForm,
        /// The coil, H.
        coil: Part,
        /// The capacitor, F.
        capacitor: Part,
    },
    /// A low-pass L with a coil in each conductor, for open line.
    BalancedL {
        /// At which side the capacitor stands.
        sense: super::Sense,
        /// Each of the two equal coils, set together, H. They are not coupled.
        each_coil: Part,
        /// The capacitor, F.
        capacitor: Part,
    },
    /// Capacitor, coil across, capacitor: the high-pass T.
    HighPassT {
        /// The capacitor on the source's side, F.
        source_capacitor: Part,
        /// The coil across, H.
        coil: Part,
        /// The capacitor on the load's side, F.
        load_capacitor: Part,
    },
}

/// What a matching unit is asked to do.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct UnitProblem {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// The load, Ω; its resistance must be greater than zero.
    pub load_ohm: Complex64,
    /// The resistance that the source wants to see, Ω.
    pub target_ohm: f64,
    /// The standing-wave ratio on that resistance that the source still takes, greater than 1.
    pub largest_swr: f64,
}

/// Why a matching unit has no setting.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum UnitError {
    /// A figure makes no unit.
    #[error(transparent)]
    Part(#[from] PartError),
    /// No setting within the ranges brings the load in; the nearest is given.
    #[error(
        "the unit brings {:.4} {:+.4}j Ω to an SWR of {:.2} at best; {wanted_swr} is wanted",
        .load_ohm.re, .load_ohm.im, .nearest.swr
    )]
    OutOfReach {
        /// The load, Ω.
        load_ohm: Complex64,
        /// The standing-wave ratio that was asked for.
        wanted_swr: f64,
        /// The setting with the lowest standing-wave ratio.
        nearest: Box<UnitMatch>,
    },
}

impl MatchingUnit {
    /// The setting with the least loss among those that bring the load within the wanted standing-wave ratio.
    ///
    /// The part nearest to the source is always the smallest that will do, which is a closed form; the parts
    /// before it are searched from the exact matches outward, or step by step where they have steps (thinned
    /// above some hundred steps, then refined). Deterministic.
    ///
    /// # Errors
    ///
    /// Figures that make no unit; a load out of reach, with the nearest setting.
    pub fn least_loss(&self, problem: &UnitProblem) -> Result<UnitMatch, UnitError> {
        self.check()?;
        check(problem)?;
        let elements = self.elements(problem);
        let found = search::search(&elements, problem);
        let matched = report::report(&elements, problem, &found);
        if found.fits(&search::Bar::of(problem.largest_swr)) {
            Ok(matched)
        } else {
            Err(UnitError::OutOfReach {
                load_ohm: problem.load_ohm,
                wanted_swr: problem.largest_swr,
                nearest: Box::new(matched),
            })
        }
    }

    /// Whether the figures make a matching unit.
    ///
    /// # Errors
    ///
    /// A Q that is not greater than zero, a range that is empty.
    pub fn check(&self) -> Result<(), PartError> {
        match self {
            Self::L { coil, capacitor, .. } | Self::BalancedL { each_coil: coil, capacitor, .. } => {
                check_coil(coil)?;
                check_capacitor(capacitor)
            }
            Self::HighPassT { source_capacitor, coil, load_capacitor } => {
                check_capacitor(source_capacitor)?;
                check_coil(coil)?;
                check_capacitor(load_capacitor)
            }
        }
    }

    /// The parts in order from the load.
    fn elements(&self, problem: &UnitProblem) -> Vec<Element> {
        let make = |role, kind, place, part: &Part| Element::new(role, kind, place, part, problem);
        let coil = |place, part| make(PartRole::Coil, Kind::Coil { count: 1 }, place, part);
        let capacitor = |role, place, part| make(role, Kind::Capacitor, place, part);
        match self {
            Self::L { form, coil: l, capacitor: c } => match form {
                LForm::SeriesCoilCapacitorAtLoad => {
                    vec![capacitor(PartRole::Capacitor, Place::Across, c), coil(Place::Series, l)]
                }
                LForm::SeriesCoilCapacitorAtSource => {
                    vec![coil(Place::Series, l), capacitor(PartRole::Capacitor, Place::Across, c)]
                }
                LForm::SeriesCapacitorCoilAtLoad => {
                    vec![coil(Place::Across, l), capacitor(PartRole::Capacitor, Place::Series, c)]
                }
                LForm::SeriesCapacitorCoilAtSource => {
                    vec![capacitor(PartRole::Capacitor, Place::Series, c), coil(Place::Across, l)]
                }
            },
            Self::BalancedL { sense, each_coil, capacitor: c } => {
                let coils = make(PartRole::EachCoil, Kind::Coil { count: 2 }, Place::Series, each_coil);
                let across = capacitor(PartRole::Capacitor, Place::Across, c);
                match sense {
                    super::Sense::CapacitorAcrossLoad => vec![across, coils],
                    super::Sense::CapacitorAcrossSource => vec![coils, across],
                }
            }
            Self::HighPassT { source_capacitor, coil: l, load_capacitor } => vec![
                capacitor(PartRole::LoadCapacitor, Place::Series, load_capacitor),
                coil(Place::Across, l),
                capacitor(PartRole::SourceCapacitor, Place::Series, source_capacitor),
            ],
        }
    }
}

fn check_coil(coil: &Part) -> Result<(), PartError> {
    above_zero("the coil's Q", coil.q)?;
    coil.range.check(&range::COIL)
}

fn check_capacitor(capacitor: &Part) -> Result<(), PartError> {
    above_zero("the capacitor's Q", capacitor.q)?;
    capacitor.range.check(&range::CAPACITOR)
}

/// Refuses what is not greater than zero; infinity is a part without loss.
fn above_zero(quantity: &'static str, value: f64) -> Result<(), PartError> {
    if value > 0.0 { Ok(()) } else { Err(PartError { quantity, value, accepted: "greater than zero" }) }
}

fn check(problem: &UnitProblem) -> Result<(), PartError> {
    positive("the frequency in hertz", problem.frequency_hz)?;
    positive("the load's resistance in ohms", problem.load_ohm.re)?;
    positive("the target in ohms", problem.target_ohm)?;
    if !problem.load_ohm.im.is_finite() {
        let value = problem.load_ohm.im;
        return Err(PartError { quantity: "the load's reactance in ohms", value, accepted: "finite" });
    }
    if !(problem.largest_swr > 1.0 && problem.largest_swr.is_finite()) {
        let value = problem.largest_swr;
        return Err(PartError { quantity: "the wanted SWR", value, accepted: "greater than 1" });
    }
    Ok(())
}
