//! A piece of line with an open or a shorted end, used as a reactance.

use num_complex::Complex64;

use super::two_port::TwoPort;
use crate::line::{Piece, State};

/// How a stub ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum StubEnd {
    /// Nothing at its end.
    Open,
    /// Both conductors joined.
    Shorted,
}

/// A stub at one frequency.
///
/// The end is ideal: an open end adds no capacitance and radiates nothing, a short has no inductance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stub {
    /// The line it is made of.
    pub piece: Piece,
    /// How it ends.
    pub end: StubEnd,
}

impl Stub {
    /// The state at its input, carrying 1 V or 1 A at its end.
    #[must_use]
    pub fn input(&self) -> State {
        self.piece.toward_source(match self.end {
            StubEnd::Open => State::open(),
            StubEnd::Shorted => State { voltage_v: Complex64::ZERO, current_a: Complex64::ONE },
        })
    }

    /// Across the line; not finite where a lossless stub shorts it.
    #[must_use]
    pub fn shunt(&self) -> TwoPort {
        let State { voltage_v, current_a } = self.input();
        TwoPort::shunt(current_a / voltage_v)
    }

    /// In series with one conductor; not finite where a lossless stub opens it.
    ///
    /// Assumption: the stub's outside couples to nothing, which in practice asks for a choke or a ferrite on it.
    #[must_use]
    pub fn series(&self) -> TwoPort {
        TwoPort::series(self.input().impedance_ohm())
    }

    /// Largest peak voltage and current along the stub when this peak voltage stands at its input, V and A.
    ///
    /// An open quarter wave steps the volts up: its far end may stand far more than the line it hangs on.
    #[must_use]
    pub fn peaks_at(&self, input_peak_v: f64) -> crate::line::Peaks {
        let end = match self.end {
            StubEnd::Open => State::open(),
            StubEnd::Shorted => State { voltage_v: Complex64::ZERO, current_a: Complex64::ONE },
        };
        let factor = input_peak_v / self.input().voltage_v.norm();
        self.piece.peaks(end.scaled(factor))
    }
}
