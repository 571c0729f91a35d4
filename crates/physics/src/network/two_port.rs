//! A linear two-port at one frequency, as its chain (ABCD) matrix.

use std::f64::consts::FRAC_1_SQRT_2;

use num_complex::Complex64;

use crate::line::{Piece, State, loss_db};

/// The chain matrix of a two-port: V_s = A·V + B·I, I_s = C·V + D·I, both currents toward the load.
///
/// Everything between a wire and a transmitter is one of these at each frequency: pieces of line, stubs,
/// transformers, arresters, set matching units; [`Self::then`] puts them in a row. Open and short ends are
/// exact, because a [`State`] divides nothing.
///
/// Source: the chain matrix of any text on networks (from memory).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoPort {
    /// A, a ratio of voltages.
    pub a: Complex64,
    /// B, Ω.
    pub b_ohm: Complex64,
    /// C, S.
    pub c_s: Complex64,
    /// D, a ratio of currents.
    pub d: Complex64,
}

impl TwoPort {
    /// Two wires and nothing else.
    pub const THROUGH: Self =
        Self { a: Complex64::ONE, b_ohm: Complex64::ZERO, c_s: Complex64::ZERO, d: Complex64::ONE };

    /// An impedance in series, Ω.
    #[must_use]
    pub fn series(z_ohm: Complex64) -> Self {
        Self { b_ohm: z_ohm, ..Self::THROUGH }
    }

    /// An admittance across, S.
    #[must_use]
    pub fn shunt(y_s: Complex64) -> Self {
        Self { c_s: y_s, ..Self::THROUGH }
    }

    /// A transformer without loss: `turns` on the load's side for one on the source's side.
    #[must_use]
    pub fn turns(turns: f64) -> Self {
        // V_s = V/n, I_s = n·I
        Self { a: turns.recip().into(), d: turns.into(), ..Self::THROUGH }
    }

    /// A piece of line.
    #[must_use]
    pub fn line(piece: &Piece) -> Self {
        let open = piece.toward_source(State::open());
        let short = piece.toward_source(State { voltage_v: Complex64::ZERO, current_a: Complex64::ONE });
        Self { a: open.voltage_v, b_ohm: short.voltage_v, c_s: open.current_a, d: short.current_a }
    }

    /// This two-port with another one on its source's side.
    #[must_use]
    pub fn then(&self, toward_source: &Self) -> Self {
        let (near, far) = (toward_source, self);
        Self {
            a: near.a * far.a + near.b_ohm * far.c_s,
            b_ohm: near.a * far.b_ohm + near.b_ohm * far.d,
            c_s: near.c_s * far.a + near.d * far.c_s,
            d: near.c_s * far.b_ohm + near.d * far.d,
        }
    }

    /// A row of two-ports, the one at the load first.
    #[must_use]
    pub fn row(from_load: &[Self]) -> Self {
        from_load.iter().fold(Self::THROUGH, |row, next| row.then(next))
    }

    /// A·D − B·C: 1 for everything that is reciprocal.
    #[must_use]
    pub fn determinant(&self) -> Complex64 {
        self.a * self.d - self.b_ohm * self.c_s
    }

    /// The same box with its two sides exchanged.
    ///
    /// Assumption: reciprocal (determinant 1), as everything of this house is.
    #[must_use]
    pub fn reversed(&self) -> Self {
        Self { a: self.d, d: self.a, ..*self }
    }

    /// The state at the source's side for a state at the load's side.
    #[must_use]
    pub fn toward_source(&self, at_load: State) -> State {
        let State { voltage_v: v, current_a: i } = at_load;
        State { voltage_v: self.a * v + self.b_ohm * i, current_a: self.c_s * v + self.d * i }
    }

    /// The state at the load's side for a state at the source's side.
    ///
    /// Assumption: reciprocal, as for [`Self::reversed`].
    #[must_use]
    pub fn toward_load(&self, at_source: State) -> State {
        let State { voltage_v: v, current_a: i } = at_source;
        State { voltage_v: self.d * v - self.b_ohm * i, current_a: self.a * i - self.c_s * v }
    }

    /// The states at both sides for a state at the load's side.
    #[must_use]
    pub fn carry(&self, at_load: State) -> Carried {
        Carried { at_load, at_source: self.toward_source(at_load) }
    }
}

/// Voltage and current at both sides of a two-port.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Carried {
    /// At the load's side.
    pub at_load: State,
    /// At the source's side.
    pub at_source: State,
}

impl Carried {
    /// Loss between the two sides, dB of power; infinite where the load takes nothing.
    #[must_use]
    pub fn loss_db(&self) -> f64 {
        loss_db(self.at_source, self.at_load)
    }

    /// What stays in the two-port as heat, W.
    #[must_use]
    pub fn heat_w(&self) -> f64 {
        self.at_source.power_w() - self.at_load.power_w()
    }

    /// The same with this power going in at the source's side, W.
    ///
    /// Valid where the source's side takes power, that is for every passive two-port that does not end in a
    /// lossless load.
    #[must_use]
    pub fn at_power(&self, power_w: f64) -> Self {
        let factor = (power_w / self.at_source.power_w()).sqrt();
        Self { at_load: self.at_load.scaled(factor), at_source: self.at_source.scaled(factor) }
    }

    /// The larger of the two peak voltages, V.
    #[must_use]
    pub fn peak_v(&self) -> f64 {
        self.at_load.voltage_v.norm().max(self.at_source.voltage_v.norm())
    }

    /// The larger of the two RMS currents, A.
    #[must_use]
    pub fn rms_a(&self) -> f64 {
        self.at_load.current_a.norm().max(self.at_source.current_a.norm()) * FRAC_1_SQRT_2
    }
}
