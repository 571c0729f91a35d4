//! Reference cases of an independent method: case → plan → the evaluator's answer.

mod case;

pub use case::{Case, Cases, Gain, Reference};

use std::collections::BTreeMap;

use serde::Serialize;
use station::evaluate::{Direction, EvaluateError, Evaluator};

/// What the program says about one case.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Answer {
    /// Feedpoint resistance, Ω.
    pub r_ohm: f64,
    /// Feedpoint reactance, Ω.
    pub x_ohm: f64,
    /// Highest gain, dBi; absent over soil.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub peak_gain_dbi: Option<f64>,
    /// Watts to the sky over watts at the feedpoint; absent over soil.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub radiation_efficiency: Option<f64>,
    /// Watts accounted for over watts at the feedpoint; absent over soil.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub energy_balance: Option<f64>,
    /// Relative difference from a finer mesh.
    pub mesh_error: f64,
    /// Number of unknown currents.
    pub unknowns: usize,
    /// Gains in the case's directions, in their order.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub gain_samples_dbi: Option<Vec<f64>>,
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
    let gains = evaluator.gains(&plan, case.frequency_hz, &directions).map_err(failed)?;
    Ok(Answer {
        r_ohm: point.feedpoint_ohm.re,
        x_ohm: point.feedpoint_ohm.im,
        peak_gain_dbi: gains.as_ref().map(|gains| gains.peak_dbi),
        radiation_efficiency: proof.sky_w,
        energy_balance: proof.energy_balance(),
        mesh_error: proof.mesh_error,
        unknowns: proof.unknowns,
        gain_samples_dbi: gains.map(|gains| gains.samples_dbi),
    })
}
