//! The one Bessel ratio that skin effect needs.

use complex_bessel::besselj_scaled;
use num_complex::Complex64;

/// J0(z)/J1(z) for complex z ≠ 0.
///
/// Both functions come scaled by exp(−|Im z|), which cancels in the ratio, so large arguments do not overflow. Where
/// the library gives up (|z| beyond about 1e9, or z = 0) the limit for |Im z| → ∞ is returned: ±j, the sign that of
/// −Im z.
///
/// Source: Amos, ACM TOMS algorithm 644, as ported by the crate `complex-bessel`.
#[must_use]
pub fn bessel_j0_over_j1(z: Complex64) -> Complex64 {
    match (besselj_scaled(0.0, z), besselj_scaled(1.0, z)) {
        (Ok(j0), Ok(j1)) if j1.norm() > 0.0 => j0 / j1,
        _ => Complex64::new(0.0, -z.im.signum()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equals_values_of_thirty_digit_arithmetic() {
        // Source: mpmath 1.3, besselj(0, z)/besselj(1, z) at z = x(1 − j).
        let cases = [
            (1e-3, 999.999_750_000_020_8, 1_000.000_250_000_020_9),
            (1.0, 0.773_050_390_574_119_7, 1.267_934_387_137_125_4),
            (5.0, 0.058_276_562_532_687_225, 1.048_966_477_761_028_8),
            (60.0, 0.004_219_183_887_062_755, 1.004_166_223_009_017_8),
            (1000.0, 0.000_250_187_593_749_894_3, 1.000_249_999_906_126_7),
        ];
        for (x, re, im) in cases {
            let expected = Complex64::new(re, im);
            let got = bessel_j0_over_j1(Complex64::new(x, -x));
            assert!((got - expected).norm() < 1e-12 * expected.norm(), "x = {x}: {got} for {expected}");
        }
    }

    #[test]
    fn is_finite_far_beyond_overflow() {
        for x in [1e3, 1e6, 1e12, 1e100] {
            let got = bessel_j0_over_j1(Complex64::new(x, -x));
            assert!((got - Complex64::i()).norm() < 1e-3, "x = {x}: {got}");
        }
    }
}
