//! What stands behind an answer of the full model: where the watts go, how far a finer mesh would move it, and the gain.

use physics::field::{Direction, earth_power_w, radiated_power_w, strongest_direction};
use physics::wire::mesh_error;

use super::Solved;
use super::answers::solve_at;
use crate::evaluate::EvaluateError;
use crate::plan::Plan;

/// Figures that go with the full answer at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Proof {
    /// Hz.
    pub frequency_hz: f64,
    /// Watts of one at the feedpoint that reach the sky, by integration over the sphere.
    pub sky_w: f64,
    /// Watts of one that heat the earth, by integration over its surface: 0 where there is no soil, `None` where a wire
    /// goes down to it.
    pub earth_w: Option<f64>,
    /// Watts of one that metal and loads burn.
    pub burnt_w: f64,
    /// Largest relative difference of the admittances from those of a finer mesh.
    pub mesh_error: f64,
    /// Number of unknown currents.
    pub unknowns: usize,
}

impl Proof {
    /// Watts accounted for, of one at the feedpoint: 1 for a perfect balance.
    #[must_use]
    pub fn energy_balance(&self) -> Option<f64> {
        self.earth_w.map(|earth_w| self.sky_w + earth_w + self.burnt_w)
    }
}

/// Gain in directions that were asked for, and the highest of all.
#[derive(Clone, Debug, PartialEq)]
pub struct Gains {
    /// dBi, over the power at the feedpoint, losses included; in the order of the directions.
    pub samples_dbi: Vec<f64>,
    /// Highest gain of any direction, dBi.
    pub peak_dbi: f64,
    /// Where it is.
    pub peak: Direction,
}

impl Solved {
    pub fn prove(&self, plan: &Plan, frequency_hz: f64) -> Result<Proof, EvaluateError> {
        let loads = self.loads(plan);
        let fed = self.fed(&self.answers.sample(frequency_hz)?, &loads)?;
        let earths = self.earths.as_deref();
        let working = solve_at(&self.model, earths, frequency_hz)?;
        let refined = solve_at(&self.model.refined()?, earths, frequency_hz)?;
        let source = self.far_field(&fed);
        Ok(Proof {
            frequency_hz,
            sky_w: radiated_power_w(&source),
            earth_w: earth_power_w(&source),
            burnt_w: fed.burnt_w,
            mesh_error: mesh_error(&working, &refined),
            unknowns: self.unknowns(),
        })
    }

    /// Gains in directions, and the strongest direction.
    pub fn gains(
        &self,
        plan: &Plan,
        frequency_hz: f64,
        directions: &[Direction],
    ) -> Result<Gains, EvaluateError> {
        let fed = self.fed(&self.answers.sample(frequency_hz)?, &self.loads(plan))?;
        let source = self.far_field(&fed);
        let gain = |direction: Direction| source.field(direction).gain_dbi(1.0);
        let (peak, _) = strongest_direction(&source);
        Ok(Gains {
            samples_dbi: directions.iter().map(|&direction| gain(direction)).collect(),
            peak_dbi: gain(peak),
            peak,
        })
    }
}
