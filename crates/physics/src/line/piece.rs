//! A piece of line at one frequency.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;

use super::constants::positive;
use super::{LineConstants, LineError, State};

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

    /// As [`Self::new`], for a length that somebody typed.
    ///
    /// # Errors
    ///
    /// A length that is not greater than zero.
    pub fn checked(constants: LineConstants, length_m: f64) -> Result<Self, LineError> {
        positive("the line's length in metres", length_m)?;
        Ok(Self::new(constants, length_m))
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
    /// source. So the largest value is at an end or at the interior maximum nearest to the source, and these
    /// three are compared. The maximum stands a little on the source's side of the place in phase, by an
    /// angle whose sine is known to first order in α/β. The figures differ from the exact maximum by less than
    /// (α/β)²/10 of it: 1e-3 for thin coax at 1.8 MHz, 1e-6 for open wire (measured against a fine walk along
    /// the line).
    #[must_use]
    pub fn peaks(&self, at_load: State) -> Peaks {
        self.peaks_between(at_load, self.toward_source(at_load))
    }

    /// As [`Self::peaks`], where the state at the source's end is known already.
    #[must_use]
    pub fn peaks_between(&self, at_load: State, at_source: State) -> Peaks {
        let waves = Waves::at(&self.constants, at_source);
        let v2 = waves.nearest_maximum(waves.phase, self.length_m);
        // where the voltages of the two waves oppose each other their currents add
        let i2 = waves.nearest_maximum(waves.phase + PI, self.length_m) * self.y0_s.norm_sqr();
        let largest = |inside: f64, load: Complex64, source: Complex64| {
            inside.max(load.norm_sqr()).max(source.norm_sqr()).sqrt()
        };
        Peaks {
            voltage_v: largest(v2, at_load.voltage_v, at_source.voltage_v),
            current_a: largest(i2, at_load.current_a, at_source.current_a),
        }
    }
}

/// The two waves on a line at its source's end: A·exp(−γd) + B·exp(γd) at a distance d from there.
struct Waves {
    /// |A|², V².
    a2: f64,
    /// |B|², V².
    b2: f64,
    /// |A·B|, V².
    product: f64,
    /// Phase of A·B*, within −π and π.
    phase: f64,
    /// α, 1/m.
    alpha: f64,
    /// 1/(2β), m.
    metres_per_radian: f64,
    /// α/(2β|AB|), 1/V².
    sine_per_growth: f64,
}

impl Waves {
    fn at(constants: &LineConstants, at_source: State) -> Self {
        // V = A + B, Z₀·I = A − B
        let zi = constants.z0_ohm * at_source.current_a;
        let a = (at_source.voltage_v + zi) * 0.5;
        let b = (at_source.voltage_v - zi) * 0.5;
        let cross = a * b.conj();
        let product = cross.norm_sqr().sqrt();
        let LineConstants { gamma_per_m: Complex64 { re: alpha, im: beta }, .. } = *constants;
        let metres_per_radian = 0.5 / beta;
        Self {
            a2: a.norm_sqr(),
            b2: b.norm_sqr(),
            product,
            phase: cross.im.atan2(cross.re),
            alpha,
            metres_per_radian,
            sine_per_growth: alpha * metres_per_radian / product,
        }
    }

    /// Square of the sum of the waves at its maximum nearest to the source, V², or 0 where there is none on
    /// the piece; `phase` is by how much the waves differ at the source.
    fn nearest_maximum(&self, phase: f64, length_m: f64) -> f64 {
        let phase = if phase < 0.0 { phase + TAU } else { phase };
        let in_phase_m = phase * self.metres_per_radian;
        let decay = (-2.0 * self.alpha * in_phase_m).exp();
        let (out2, back2) = (self.a2 * decay, self.b2 / decay);
        // h = |A|²e^{−2αd} + |B|²e^{2αd} + 2|AB|·cos ϑ with ϑ = 2βd − φ, so dh/dd = 0 where
        // −sin ϑ = α·(|A|²e^{−2αd} − |B|²e^{2αd})/(2β|AB|); the growth is taken where ϑ = 0
        let sine = self.sine_per_growth * (out2 - back2);
        // A ripple smaller than the growth over it has no maximum; nor has a line without a returning wave.
        if sine.is_nan() || sine.abs() >= 1.0 {
            return 0.0;
        }
        // An angle below a hundredth is its sine (to 2e-7), and most lines stay below that.
        let angle = if sine.abs() < 0.01 { sine } else { sine.asin() };
        if !(0.0..=length_m).contains(&(in_phase_m - angle * self.metres_per_radian)) {
            return 0.0;
        }
        // The squares at the maximum: e^{±u} with u = 2α·angle/2β, its series to u³ (α/β < 0.1: the next term is under 3e-5).
        let u = 2.0 * self.alpha * self.metres_per_radian * angle;
        let grown = (out2 + back2) * (1.0 + 0.5 * u * u) + (out2 - back2) * u * (1.0 + u * u / 6.0);
        grown + 2.0 * self.product * (1.0 - sine * sine).sqrt()
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
