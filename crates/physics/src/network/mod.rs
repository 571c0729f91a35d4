//! Networks between the wire and the transmitter: transformers, stubs, arresters and matching units.
//!
//! Like the line, they carry a [`State`] from the load's side to the source's side; phasors are peak. At one
//! frequency each is a [`TwoPort`].

mod arrester;
mod error;
mod l_network;
mod l_solution;
mod stub;
mod transformer;
mod tuner;
mod two_port;
mod unit;

pub use arrester::SurgeArrester;
pub use error::PartError;
pub use l_network::{LNetwork, Parts, Passage, Sense, Setting, Stress};
pub use l_solution::{LMatch, LProblem, NetworkError, l_network};
pub use stub::{Stub, StubEnd};
pub use transformer::{CoreLoss, Transformer, TransformerStress};
pub use tuner::{BuiltInTuner, TunerReach};
pub use two_port::{Carried, TwoPort};
pub use unit::{
    LForm, MatchingUnit, Part, PartRating, PartRole, PartSetting, Power, Range, UnitError, UnitMatch,
    UnitProblem,
};

use crate::line::State;

/// A transformer without loss, leakage or magnetising current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct IdealTransformer {
    /// Impedance on the load's side over impedance on the source's side, greater than zero: 4 for "4:1"
    /// that brings 200 Ω down to 50 Ω.
    pub impedance_ratio: f64,
}

impl IdealTransformer {
    /// The state on the source's side for a state on the load's side.
    #[must_use]
    pub fn toward_source(self, at_load: State) -> State {
        // n = √ratio turns on the load's side for one on the source's: V_s = V/n, I_s = n·I
        let turns = self.impedance_ratio.sqrt();
        State { voltage_v: at_load.voltage_v / turns, current_a: at_load.current_a * turns }
    }

    /// The state on the load's side for a state on the source's side.
    #[must_use]
    pub fn toward_load(self, at_source: State) -> State {
        Self { impedance_ratio: self.impedance_ratio.recip() }.toward_source(at_source)
    }
}
