//! Several f64 at once, with the operators of one.
//!
//! `pulp` picks the widest instructions of the machine at run time (AVX2 with FMA where there are any), so that a
//! portable build is fast and nothing here is unsafe. The compiler must inline everything between the choice and the
//! operators, which it does for functions marked so, not for closures: loops here are plain.

use std::ops::{Add, Div, Mul, Sub};

use pulp::Simd;

/// Tables are padded to this many values: a multiple of the lanes of every instruction set that is compiled in.
pub(crate) const PAD: usize = 8;

/// Length rounded up to whole vectors.
pub(crate) fn padded(length: usize) -> usize {
    length.next_multiple_of(PAD)
}

/// One vector of numbers.
#[derive(Clone, Copy)]
pub(crate) struct Lanes<S: Simd> {
    simd: S,
    pub value: S::f64s,
}

impl<S: Simd> Lanes<S> {
    #[inline(always)]
    pub fn new(simd: S, value: S::f64s) -> Self {
        Self { simd, value }
    }

    /// The same number in every lane.
    #[inline(always)]
    pub fn splat(simd: S, number: f64) -> Self {
        Self { simd, value: simd.splat_f64s(number) }
    }

    /// `self`·`factor` + `term`, rounded once where the machine can.
    #[inline(always)]
    pub fn times_plus(self, factor: Self, term: Self) -> Self {
        Self { simd: self.simd, value: self.simd.mul_add_e_f64s(self.value, factor.value, term.value) }
    }

    /// `term` − `self`·`factor`, rounded once where the machine can.
    #[inline(always)]
    pub fn times_from(self, factor: Self, term: Self) -> Self {
        Self { simd: self.simd, value: self.simd.negate_mul_add_e_f64s(self.value, factor.value, term.value) }
    }

    #[inline(always)]
    pub fn sqrt(self) -> Self {
        Self { simd: self.simd, value: self.simd.sqrt_f64s(self.value) }
    }

    #[inline(always)]
    pub fn max(self, other: Self) -> Self {
        Self { simd: self.simd, value: self.simd.max_f64s(self.value, other.value) }
    }

    /// Sum over the lanes.
    #[inline(always)]
    pub fn sum(self) -> f64 {
        self.simd.reduce_sum_f64s(self.value)
    }

    /// Nearest whole number; |self| < 2⁵¹.
    #[inline(always)]
    fn rounded(self) -> Self {
        // Adding 1.5·2⁵² leaves no bits for a fraction.
        let shift = Self::splat(self.simd, 6_755_399_441_055_744.0);
        self + shift - shift
    }

    /// Σ cₙ·selfⁿ
    #[inline(always)]
    fn polynomial<const N: usize>(self, coefficients: &[f64; N]) -> Self {
        let mut sum = Self::splat(self.simd, coefficients[N - 1]);
        let mut n = N - 1;
        while n > 0 {
            n -= 1;
            sum = sum.times_plus(self, Self::splat(self.simd, coefficients[n]));
        }
        sum
    }

    /// cos and −sin of `self` turns of 2π each, absolute error below 1e-12.
    ///
    /// A quarter of the angle, at most π/4, goes through polynomials (minimax, from a Remez exchange in 40-digit
    /// arithmetic; errors 6e-14 and 7e-15), and is doubled twice.
    #[inline(always)]
    pub fn wave(self) -> [Self; 2] {
        // t = angle/2π − nearest integer; quarter angle φ = πt/2
        let t = self - self.rounded();
        let u = t * t;
        let (sin, cos) = (u.polynomial(&SINE) * t, u.polynomial(&COSINE));
        // sin 2φ = 2·sin φ·cos φ,   cos 2φ = 1 − 2·sin² φ
        let one = Self::splat(self.simd, 1.0);
        let twice_sin = sin + sin;
        let (sin, cos) = (twice_sin * cos, twice_sin.times_from(sin, one));
        let twice_sin = sin + sin;
        let zero = Self::splat(self.simd, 0.0);
        [twice_sin.times_from(sin, one), twice_sin.times_from(cos, zero)]
    }
}

/// sin(πt/2)/t in powers of t², |t| ≤ ½; the first differs from the exchange's in the fifteenth digit.
const SINE: [f64; 6] = [
    std::f64::consts::FRAC_PI_2,
    -0.645_964_097_504_311,
    0.079_692_626_155_809_23,
    -0.004_681_752_592_165_972_5,
    0.000_160_429_269_280_358_04,
    -3.556_391_437_188_949e-06,
];
/// cos(πt/2) in powers of t², |t| ≤ ½.
const COSINE: [f64; 6] = [
    0.999_999_999_999_944_5,
    -1.233_700_550_120_178,
    0.253_669_507_154_307_1,
    -0.020_863_468_008_995_18,
    0.000_919_161_767_812_370_8,
    -2.485_101_272_951_804_5e-05,
];

impl<S: Simd> Add for Lanes<S> {
    type Output = Self;

    #[inline(always)]
    fn add(self, other: Self) -> Self {
        Self { simd: self.simd, value: self.simd.add_f64s(self.value, other.value) }
    }
}

impl<S: Simd> Sub for Lanes<S> {
    type Output = Self;

    #[inline(always)]
    fn sub(self, other: Self) -> Self {
        Self { simd: self.simd, value: self.simd.sub_f64s(self.value, other.value) }
    }
}

impl<S: Simd> Mul for Lanes<S> {
    type Output = Self;

    #[inline(always)]
    fn mul(self, other: Self) -> Self {
        Self { simd: self.simd, value: self.simd.mul_f64s(self.value, other.value) }
    }
}

impl<S: Simd> Div for Lanes<S> {
    type Output = Self;

    #[inline(always)]
    fn div(self, other: Self) -> Self {
        Self { simd: self.simd, value: self.simd.div_f64s(self.value, other.value) }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    struct Waves<'a>(&'a mut [f64], &'a mut [f64]);

    impl pulp::WithSimd for Waves<'_> {
        type Output = ();

        #[inline(always)]
        fn with_simd<S: Simd>(self, simd: S) {
            let (turns, _) = S::as_mut_simd_f64s(self.0);
            let (other, _) = S::as_mut_simd_f64s(self.1);
            for (turns, other) in turns.iter_mut().zip(other) {
                let [cos, minus_sin] = Lanes::new(simd, *turns).wave();
                *turns = cos.value;
                *other = minus_sin.value;
            }
        }
    }

    #[test]
    fn waves_agree_with_the_library() {
        let angles: Vec<f64> = (-4000..4000).map(|index| 0.017 * f64::from(index)).collect();
        let mut cos: Vec<f64> = angles.iter().map(|angle| angle / std::f64::consts::TAU).collect();
        let mut minus_sin = vec![0.0; cos.len()];
        pulp::Arch::new().dispatch(Waves(&mut cos, &mut minus_sin));
        for (index, angle) in angles.iter().enumerate() {
            assert!((cos[index] - angle.cos()).abs() < 1e-12, "cos {angle}: {}", cos[index]);
            assert!((minus_sin[index] + angle.sin()).abs() < 1e-12, "sin {angle}: {}", minus_sin[index]);
        }
    }
}
