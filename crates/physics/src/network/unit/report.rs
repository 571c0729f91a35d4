//! What a setting costs, and what each part stands.

use std::f64::consts::FRAC_1_SQRT_2;

use super::element::{Element, Kind, Place};
use super::search::Found;
use super::{PartRating, UnitProblem};
use crate::line::State;
use crate::network::{Carried, TwoPort};

/// Which part of a matching unit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PartRole {
    /// The coil.
    Coil,
    /// Each of the two coils of a balanced unit.
    EachCoil,
    /// The capacitor of an L.
    Capacitor,
    /// The T's capacitor on the source's side.
    SourceCapacitor,
    /// The T's capacitor on the load's side.
    LoadCapacitor,
}

/// Power that goes into the unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Power {
    /// At the peak of the envelope, W: it decides on arcs.
    pub peak_envelope_w: f64,
    /// Averaged with the duty of the mode, W: it decides on heat.
    pub average_w: f64,
}

/// How a part is set and what it stands.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PartSetting {
    /// Which part.
    pub role: PartRole,
    /// Its setting, H or F.
    pub value: f64,
    /// What it may stand.
    pub rating: PartRating,
    /// Peak voltage across it with 1 W going in, V; grows with the root of the power.
    pub peak_v_at_1_w: f64,
    /// RMS current through it with 1 W going in, A; grows with the root of the power.
    pub rms_a_at_1_w: f64,
    /// Share of the power going in that it burns (both coils of a balanced unit together).
    pub heat_share: f64,
}

impl PartSetting {
    /// Peak voltage across it, V.
    #[must_use]
    pub fn peak_v(&self, power: Power) -> f64 {
        self.peak_v_at_1_w * power.peak_envelope_w.sqrt()
    }

    /// RMS current through it, A.
    #[must_use]
    pub fn rms_a(&self, power: Power) -> f64 {
        self.rms_a_at_1_w * power.average_w.sqrt()
    }

    /// The larger of voltage and current over its rating, where one is known; above 1 it is overstressed.
    #[must_use]
    pub fn share_of_rating(&self, power: Power) -> Option<f64> {
        let volts = self.rating.peak_v.map(|rating| self.peak_v(power) / rating);
        let amperes = self.rating.rms_a.map(|rating| self.rms_a(power) / rating);
        match (volts, amperes) {
            (Some(a), Some(b)) => Some(a.max(b)),
            (one, other) => one.or(other),
        }
    }
}

/// A setting of a matching unit, and what it costs.
#[derive(Clone, Debug, PartialEq)]
pub struct UnitMatch {
    /// The parts, the one nearest to the load first.
    pub parts: Vec<PartSetting>,
    /// Standing-wave ratio at the source on the target.
    pub swr: f64,
    /// Power that reaches the load over power that goes in.
    pub efficiency: f64,
    /// Loss of all parts, dB.
    pub loss_db: f64,
    /// The unit at this setting and frequency.
    pub two_port: TwoPort,
}

impl UnitMatch {
    /// The setting of a part, H or F.
    #[must_use]
    pub fn value(&self, role: PartRole) -> Option<f64> {
        self.parts.iter().find(|part| part.role == role).map(|part| part.value)
    }
}

pub(super) fn report(elements: &[Element], problem: &UnitProblem, found: &Found) -> UnitMatch {
    let ports: Vec<TwoPort> =
        elements.iter().zip(found.sizes).map(|(element, size)| element.two_port(size)).collect();
    let two_port = TwoPort::row(&ports);
    let load = State::of_load(problem.load_ohm);
    // with 1 W going in
    let Carried { at_load, at_source } = two_port.carry(load).at_power(1.0);
    let mut state = at_load;
    let parts = elements
        .iter()
        .zip(&ports)
        .zip(found.sizes)
        .map(|((element, port), size)| {
            let before = state;
            state = port.toward_source(before);
            let (volts, amperes) = match element.place {
                Place::Series => (port.b_ohm.norm() * before.current_a.norm(), before.current_a.norm()),
                Place::Across => (before.voltage_v.norm(), port.c_s.norm() * before.voltage_v.norm()),
            };
            let count = match element.kind {
                Kind::Coil { count } => f64::from(count),
                Kind::Capacitor => 1.0,
            };
            PartSetting {
                role: element.role,
                value: element.value_of(size),
                rating: element.rating,
                peak_v_at_1_w: volts / count,
                rms_a_at_1_w: amperes * FRAC_1_SQRT_2,
                heat_share: state.power_w() - before.power_w(),
            }
        })
        .collect();
    let efficiency = at_load.power_w();
    UnitMatch {
        parts,
        swr: at_source.swr(problem.target_ohm),
        efficiency,
        loss_db: -10.0 * efficiency.log10(),
        two_port,
    }
}
