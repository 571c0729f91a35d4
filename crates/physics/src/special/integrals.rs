//! Sine and cosine integrals.

use num_complex::Complex64;

/// Euler's constant γ.
const EULER: f64 = 0.577_215_664_901_532_9;

/// Si(x) and Ci(x) of the same argument.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SineCosineIntegrals {
    /// Si(x) = ∫₀ˣ sin t/t dt.
    pub si: f64,
    /// Ci(x) = γ + ln x + ∫₀ˣ (cos t − 1)/t dt.
    pub ci: f64,
}

impl SineCosineIntegrals {
    /// Cin(x) = γ + ln x − Ci(x) for the argument `x` these were made of.
    #[must_use]
    pub fn cin(&self, x: f64) -> f64 {
        if x < SERIES_LIMIT { cin_series(x) } else { EULER + x.ln() - self.ci }
    }
}

/// Si and Ci for x > 0.
///
/// Absolute error below 1e-15 (relative where the value exceeds 1), 2e-15 near the seam at x = 4.
/// Source: Moshier's Cephes library, as ported by the crate `spec_math`.
#[must_use]
pub fn sine_cosine_integrals(x: f64) -> SineCosineIntegrals {
    let (si, ci) = spec_math::cephes64::sici(x);
    SineCosineIntegrals { si, ci }
}

/// Cin(x) = ∫₀ˣ (1 − cos t)/t dt, x ≥ 0, to full relative accuracy for small x too.
#[must_use]
pub fn cin(x: f64) -> f64 {
    if x < SERIES_LIMIT { cin_series(x) } else { EULER + x.ln() - sine_cosine_integrals(x).ci }
}

/// E(x) = Ci(x) − j·Si(x), x > 0: the primitive of exp(−jx)/x.
#[must_use]
pub fn exponential_integral_of_wave(x: f64) -> Complex64 {
    let SineCosineIntegrals { si, ci } = sine_cosine_integrals(x);
    Complex64::new(ci, -si)
}

/// Below it γ + ln x and Ci(x) cancel; the series then needs no more than nine terms.
const SERIES_LIMIT: f64 = 1.0;

fn cin_series(x: f64) -> f64 {
    // Cin x = Σ (−1)ⁿ⁺¹ x²ⁿ / (2n·(2n)!), n = 1, 2, …
    let square = x * x;
    let mut power = 1.0; // (−1)ⁿ⁺¹ x²ⁿ/(2n)!
    let mut sum = 0.0;
    for n in 1..=9 {
        let two_n = f64::from(2 * n);
        power *= square / (two_n * (two_n - 1.0));
        sum += power / two_n;
        power = -power;
    }
    sum
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equal_values_of_thirty_digit_arithmetic() {
        // Source: mpmath 1.3, si(x) and ci(x).
        let cases = [
            (1e-4, 9.999_999_994_444_444e-5, -8.633_124_709_574_65),
            (0.5, 0.493_107_418_043_066_7, -0.177_784_078_806_612_9),
            (3.9, 1.776_501_360_447_805_5, -0.123_499_349_207_815_15),
            (4.0, 1.758_203_138_949_053_1, -0.140_981_697_886_930_4),
            (7.9, 1.561_671_070_214_550_2, 0.123_638_007_059_717_85),
            (8.1, 1.586_366_622_463_643, 0.120_016_673_260_596_56),
            (100.0, 1.562_225_466_889_056_3, -0.005_148_825_142_610_492),
            (1e5, 1.570_806_320_399_394, 3.575_879_157_293_513_5e-7),
        ];
        for (x, si, ci) in cases {
            let got = sine_cosine_integrals(x);
            assert!((got.si - si).abs() < 1e-14, "Si({x}) = {} for {si}", got.si);
            assert!((got.ci - ci).abs() < 1e-14, "Ci({x}) = {} for {ci}", got.ci);
        }
    }

    #[test]
    fn cin_joins_smoothly_and_starts_as_a_parabola() {
        let below = cin_series(SERIES_LIMIT);
        let above = EULER + SERIES_LIMIT.ln() - sine_cosine_integrals(SERIES_LIMIT).ci;
        assert!((below - above).abs() < 1e-15);
        assert!((cin(1e-6) / 0.25e-12 - 1.0).abs() < 1e-12);
        // Source: mpmath 1.3, Cin(2π).
        assert!((cin(std::f64::consts::TAU) - 2.437_653_393_057_224_6).abs() < 1e-13);
    }
}
