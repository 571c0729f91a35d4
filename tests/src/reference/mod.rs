//! Reference cases of an independent method: case → plan → the evaluator's answer.

mod case;

pub use case::{Case, Cases, Gain, Reference};

use std::collections::BTreeMap;

use num_complex::Complex64;
use serde::Serialize;
use station::evaluate::{Direction, EvaluateError, Evaluator};
use station::plan::{Earth, Plan};

/// What the program says about one case.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Answer {
    /// Feedpoint resistance, Ω.
    pub r_ohm: f64,
    /// Feedpoint reactance, Ω.
    pub x_ohm: f64,
    /// The same without an earth, Ω; of cases over soil.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub free_space_r_ohm: Option<f64>,
    /// Ω.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub free_space_x_ohm: Option<f64>,
    /// Highest gain, dBi.
    pub peak_gain_dbi: f64,
    /// Watts to the sky over watts at the feedpoint.
    pub radiation_efficiency: f64,
    /// Watts into the soil over watts at the feedpoint, computed on its own.
    pub earth_fraction: f64,
    /// Watts accounted for over watts at the feedpoint.
    pub energy_balance: f64,
    /// Relative difference from a finer mesh.
    pub mesh_error: f64,
    /// Number of unknown currents.
    pub unknowns: usize,
    /// Gains in the case's directions, in their order, dBi.
    pub gain_samples_dbi: Vec<f64>,
}

/// Why a case has no answer.
#[derive(Debug, thiserror::Error)]
pub enum CaseError {
    /// The file is no case file.
    #[error("not a case file: {0}")]
    Json(#[from] serde_json::Error),
    /// The evaluator refuses the plan.
    #[error("{id}: {source}")]
    Evaluate {
        /// The case.
        id: String,
        /// What it says.
        source: EvaluateError,
    },
    /// The evaluator has no figures behind its answer.
    #[error("{id}: no full answer")]
    NoAnswer {
        /// The case.
        id: String,
    },
}

/// Answers all cases of a file, as JSON.
///
/// # Errors
/// The first case without an answer.
pub fn answer_all(text: &str) -> Result<String, CaseError> {
    let cases: Cases = serde_json::from_str(text)?;
    let answers = cases
        .cases
        .iter()
        .map(|case| Ok((case.id.clone(), answer(case)?)))
        .collect::<Result<BTreeMap<_, _>, CaseError>>()?;
    Ok(serde_json::to_string_pretty(&answers)?)
}

/// Answers one case by the window's own path.
///
/// # Errors
/// What the evaluator refuses.
pub fn answer(case: &Case) -> Result<Answer, CaseError> {
    let failed = |source| CaseError::Evaluate { id: case.id.clone(), source };
    let missing = || CaseError::NoAnswer { id: case.id.clone() };
    let plan = case.plan();
    let mut evaluator = Evaluator::new();
    let report = evaluator.evaluate_at(&plan, 1, &[case.frequency_hz]).map_err(failed)?;
    let point = report.bands.first().and_then(|band| band.points.first()).ok_or_else(missing)?;
    let proof = evaluator.prove(&plan, case.frequency_hz).map_err(failed)?.ok_or_else(missing)?;
    let samples = case.reference.gain_samples_dbi.iter();
    let directions: Vec<Direction> = samples
        .map(|gain| Direction { elevation_deg: gain.elevation_deg, azimuth_deg: gain.azimuth_deg })
        .collect();
    let gains =
        evaluator.gains(&plan, case.frequency_hz, &directions).map_err(failed)?.ok_or_else(missing)?;
    let earth_fraction = proof.earth_w.ok_or_else(missing)?;
    let free_space = match plan.site.earth {
        Earth::NoEarth | Earth::Mirror => None,
        _ => Some(free_space(&plan, case.frequency_hz).map_err(failed)?.ok_or_else(missing)?),
    };
    Ok(Answer {
        r_ohm: point.feedpoint_ohm.re,
        x_ohm: point.feedpoint_ohm.im,
        free_space_r_ohm: free_space.map(|z| z.re),
        free_space_x_ohm: free_space.map(|z| z.im),
        peak_gain_dbi: gains.peak_dbi,
        radiation_efficiency: proof.sky_w,
        earth_fraction,
        energy_balance: proof.sky_w + earth_fraction + proof.burnt_w,
        mesh_error: proof.mesh_error,
        unknowns: proof.unknowns,
        gain_samples_dbi: gains.samples_dbi,
    })
}

/// Impedance of the same plan without an earth, Ω.
fn free_space(plan: &Plan, frequency_hz: f64) -> Result<Option<Complex64>, EvaluateError> {
    let mut plan = plan.clone();
    plan.site.earth = Earth::NoEarth;
    let report = Evaluator::new().evaluate_at(&plan, 1, &[frequency_hz])?;
    Ok(report.bands.first().and_then(|band| band.points.first()).map(|point| point.feedpoint_ohm))
}
