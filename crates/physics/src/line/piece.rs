//! A piece of line at one frequency.

use std::f64::consts::{FRAC_PI_2, PI, TAU};

use num_complex::Complex64;

use super::{LineConstants, State};

/// A piece of line at one frequency, with everything that does not depend on its load worked out.
///
/// Making one costs an exponential, a sine and a cosine; carrying a state through it a few
/// multiplications. Valid for a total loss up to about 3000 dB, beyond which the voltages overflow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Piece {
    constants: LineConstants,
    y0_s: Complex64,
    length_m: f64,
    cosh: Complex64,
    sinh: Complex64,
}

impl LineConstants {
    /// The state a distance (m) nearer to the source, for a state at the load: one [`Piece`] used once.
    #[must_use]
    pub fn toward_source(&self, at_load: State, distance_m: f64) -> State {
        Piece::new(*self, distance_m).toward_source(at_load)
    }

    /// Impedance at the source's end of `length_m` of line that ends in `load_ohm`, Ω.
    #[must_use]
    pub fn input_impedance_ohm(&self, load_ohm: Complex64, length_m: f64) -> Complex64 {
        self.toward_source(State::of_load(load_ohm), length_m).impedance_ohm()
    }
}

/// Largest peak voltage and current on a piece of line; they stand at different places.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Peaks {
    /// V, peak.
    pub voltage_v: f64,
    /// A, peak.
    pub current_a: f64,
}

impl Piece {
    /// A piece `length_m` long.
    #[must_use]
    pub fn new(constants: LineConstants, length_m: f64) -> Self {
        let (cosh, sinh) = cosh_sinh(constants.gamma_per_m * length_m);
        Self { constants, y0_s: constants.z0_ohm.inv(), length_m, cosh, sinh }
    }

    /// Z₀ and γ.
    #[must_use]
    pub fn constants(&self) -> LineConstants {
        self.constants
    }

    /// Its length, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        self.length_m
    }

    /// The state at the source's end for a state at the load's end.
    #[must_use]
    pub fn toward_source(&self, at_load: State) -> State {
        let Self { cosh, sinh, constants: LineConstants { z0_ohm, .. }, y0_s, .. } = *self;
        let State { voltage_v: v, current_a: i } = at_load;
        // V_s = V·cosh γl + Z₀·I·sinh γl; I_s = I·cosh γl + V/Z₀·sinh γl
        State { voltage_v: v * cosh + z0_ohm * i * sinh, current_a: i * cosh + y0_s * v * sinh }
    }

    /// The state at the load's end for a state at the source's end: the inverse of [`Self::toward_source`].
    #[must_use]
    pub fn toward_load(&self, at_source: State) -> State {
        Self { sinh: -self.sinh, ..*self }.toward_source(at_source)
    }

    /// Largest peak voltage and current between the two ends, both included, for a passive load.
    ///
    /// Not sampled: |V| touches an envelope |A|·exp(αx) + |B|·exp(−αx) wherever the two waves are in phase, and
    /// with a passive load (|B| ≤ |A|, but for a hair where Z₀ is complex) the envelope never falls toward the
    /// source. So the largest value is at an end or at the interior maximum nearest to the source; the three
    /// places are evaluated. The maximum stands a little on the source's side of the place in phase, by an
    /// angle whose sine is known to first order in α/β. The figures are true values of the line, and
    /// short of the exact maximum by less than (α/β)²/20 of it, 5e-4 for thin coax at 1.8 MHz and 1e-6 for
    /// open wire (measured against a fine walk along the line).
    #[must_use]
    pub fn peaks(&self, at_load: State) -> Peaks {
        self.peaks_between(at_load, self.toward_source(at_load))
    }

    /// As [`Self::peaks`], where the state at the source's end is known already.
    #[must_use]
    pub fn peaks_between(&self, at_load: State, at_source: State) -> Peaks {
        let zi = self.constants.z0_ohm * at_load.current_a;
        // V(x) = A·exp(γx) + B·exp(−γx), Z₀·I(x) = A·exp(γx) − B·exp(−γx)
        let a = (at_load.voltage_v + zi) * 0.5;
        let b = (at_load.voltage_v - zi) * 0.5;
        let waves = Waves {
            a2: a.norm_sqr(),
            b2: b.norm_sqr(),
            product: a * b.conj(),
            alpha: self.constants.gamma_per_m.re,
            beta: self.constants.gamma_per_m.im,
        };
        let phase = waves.product.im.atan2(waves.product.re);
        let v2 = waves.last_maximum(1.0, phase, self.length_m);
        let i2 = waves.last_maximum(-1.0, phase + PI, self.length_m) * self.y0_s.norm_sqr();
        let largest = |inside: f64, load: Complex64, source: Complex64| {
            inside.max(load.norm_sqr()).max(source.norm_sqr()).sqrt()
        };
        Peaks {
            voltage_v: largest(v2, at_load.voltage_v, at_source.voltage_v),
            current_a: largest(i2, at_load.current_a, at_source.current_a),
        }
    }
}

/// The two waves on a line, by their squares at the load.
struct Waves {
    a2: f64,
    b2: f64,
    /// A·B*.
    product: Complex64,
    alpha: f64,
    beta: f64,
}

impl Waves {
    /// |A·exp(γx) ± B·exp(−γx)|² at its interior maximum nearest to the source, or 0 without one.
    ///
    /// `phase` is that of ±A·B*, `sign` the sign.
    fn last_maximum(&self, sign: f64, phase: f64, length_m: f64) -> f64 {
        let Self { a2, b2, alpha, beta, .. } = *self;
        let product = (a2 * b2).sqrt();
        if product == 0.0 || beta <= 0.0 {
            return 0.0;
        }
        // In phase where 2βx + φ = 2πn; the last such place, perhaps a little before the load.
        let turns = ((2.0 * beta * length_m + phase) / TAU).floor();
        let in_phase_m = (TAU * turns - phase) / (2.0 * beta);
        if 2.0 * beta * in_phase_m < -FRAC_PI_2 {
            return 0.0;
        }
        // h = |A|²e^{2αx} + |B|²e^{−2αx} + 2|AB|·cos ϑ, so h′ = 0 where
        // sin ϑ = α·(|A|²e^{2αx} − |B|²e^{−2αx})/(2β|AB|)
        let growth = (2.0 * alpha * in_phase_m).exp();
        let sine = alpha * (a2 * growth - b2 / growth) / (2.0 * beta * product);
        let x = (in_phase_m + sine.clamp(-1.0, 1.0).asin() / (2.0 * beta)).clamp(0.0, length_m);
        let growth = (2.0 * alpha * x).exp();
        let (sin, cos) = (2.0 * beta * x).sin_cos();
        // ±Re(A·B*·exp(2jβx))
        let cross = sign * (self.product.re * cos - self.product.im * sin);
        a2 * growth + b2 / growth + 2.0 * cross
    }
}

/// cosh and sinh of a complex number at the cost of one exponential, accurate for small ones too.
pub(super) fn cosh_sinh(z: Complex64) -> (Complex64, Complex64) {
    // with m = eˣ − 1: sinh x = (m + m/(m + 1))/2, cosh x = 1 + m²/(2·(m + 1))
    let m = z.re.exp_m1();
    let sinh_x = 0.5 * (m + m / (m + 1.0));
    let cosh_x = 1.0 + 0.5 * m * m / (m + 1.0);
    let (sin_y, cos_y) = z.im.sin_cos();
    (Complex64::new(cosh_x * cos_y, sinh_x * sin_y), Complex64::new(sinh_x * cos_y, cosh_x * sin_y))
}
