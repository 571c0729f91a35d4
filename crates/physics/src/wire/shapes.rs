//! The sinusoids of current on a segment, and their charges, as seen by its two Gauss points.
//!
//! With I₁ at a segment's beginning and I₂ at its end,
//! I(x) = ½(I₁ + I₂)·cos kx/cos kh + ½(I₂ − I₁)·sin kx/sin kh, x from the middle, h = L/2.
//! Each of the two parts and its derivative is even or odd in x. At the Gauss points they are replaced by the linear
//! functions of the same integral and first moment, times the points' weight h.

/// (1 − y·cot y)/y² in powers of y².
const COTANGENT: [f64; 7] = [
    1.0 / 3.0,
    1.0 / 45.0,
    2.0 / 945.0,
    1.0 / 4725.0,
    2.0 / 93_555.0,
    1382.0 / 638_512_875.0,
    4.0 / 18_243_225.0,
];
/// (tan y/y − 1)/y² in powers of y².
const TANGENT: [f64; 9] = [
    1.0 / 3.0,
    2.0 / 15.0,
    17.0 / 315.0,
    62.0 / 2835.0,
    1382.0 / 155_925.0,
    21_844.0 / 6_081_075.0,
    929_569.0 / 638_512_875.0,
    6_404_582.0 / 10_854_718_875.0,
    443_861_162.0 / 1_856_156_927_625.0,
];

/// Even and odd part of the current and of k⁻¹·dI/dx, times the weight of a Gauss point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Shapes {
    /// h·E: of the even current, m.
    pub even: f64,
    /// h·O at the upper point: of the odd current, m.
    pub odd: f64,
    /// h·E′/k at the upper point: slope of the even current (odd), m.
    pub even_slope: f64,
    /// h·O′/k: slope of the odd current (even), m.
    pub odd_slope: f64,
}

/// Σ cₙ·y²ⁿ; with y ≤ π/12 the tables leave less than 1e-12.
fn series(coefficients: &[f64], y2: f64) -> f64 {
    coefficients.iter().rev().fold(0.0, |sum, c| sum * y2 + c)
}

impl Shapes {
    pub fn new(k: f64, length_m: f64) -> Self {
        let h = 0.5 * length_m;
        let y = k * h;
        // (1 − y·cot y)/y² and (tan y/y − 1)/y²
        let (falling, rising) = (series(&COTANGENT, y * y), series(&TANGENT, y * y));
        let root3 = 3_f64.sqrt();
        Self {
            // ½∫E dx = tan y/k
            even: h * (1.0 + rising * y * y),
            // ∫xO dx = 2h²·(1 − y·cot y)/y² = 2h/√3·(h·O)
            odd: root3 * h * falling,
            // ∫xE′ dx = 2h·(1 − tan y/y) = 2h/√3·(h·E′)
            even_slope: -root3 * rising * y * h,
            // ½∫O′ dx = 1
            odd_slope: k.recip(),
        }
    }
}

/// Integrals over a segment of the products of the two shapes, of I₁ = 1 and of I₂ = 1, and of their slopes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Overlaps {
    /// ∫S₁² dx and ∫S₁S₂ dx, m.
    pub current_m: [f64; 2],
    /// ∫S₁′² dx and ∫S₁′S₂′ dx, 1/m.
    pub slope_per_m: [f64; 2],
}

impl Overlaps {
    pub fn new(k: f64, length_m: f64) -> Self {
        let h = 0.5 * length_m;
        let y2 = k * h * k * h;
        // q = tan y/y = 1 + r·y²
        let r = series(&TANGENT, y2);
        let q = 1.0 + r * y2;
        // ∫E² = h·(1 + tan²y + q),   ∫O² = h·(1 − r/q²),   ∫E′² = k²·h·y²·(q² − r),   ∫O′² = (1 + tan²y + q)/(h·q²)
        let sum = 1.0 + q * q * y2 + q;
        let (even, odd) = (h * sum, h * (1.0 - r / (q * q)));
        let (even_slope, odd_slope) = (k * k * h * y2 * (q * q - r), sum / (h * q * q));
        // S₁ = (E − O)/2,   S₂ = (E + O)/2
        Self {
            current_m: [0.25 * (even + odd), 0.25 * (even - odd)],
            slope_per_m: [0.25 * (even_slope + odd_slope), 0.25 * (even_slope - odd_slope)],
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// ∫ f dx over 0 to the length, by Simpson's rule.
    fn integral(length_m: f64, f: impl Fn(f64) -> f64) -> f64 {
        let steps = 400_u32;
        let h = length_m / f64::from(steps);
        let weight =
            |index: u32| if index.is_multiple_of(steps) { 1.0 } else { f64::from(2 + 2 * (index % 2)) };
        (0..=steps).map(|index| weight(index) * f(h * f64::from(index))).sum::<f64>() * h / 3.0
    }

    #[test]
    fn integrals_are_those_of_the_sinusoids() {
        for (k, length_m) in [(0.3_f64, 1.6_f64), (0.3, 0.1), (0.05, 1e-3)] {
            let [first, second] =
                [|y: f64, x: f64| (y - x).sin() / y.sin(), |y: f64, x: f64| x.sin() / y.sin()];
            let [first_slope, second_slope] =
                [|y: f64, x: f64| -(y - x).cos() / y.sin(), |y: f64, x: f64| x.cos() / y.sin()];
            let y = k * length_m;
            let near = |got: f64, expected: f64| {
                assert!((got - expected).abs() < 1e-9 * expected.abs(), "{y}: {got} for {expected}");
            };
            let overlaps = Overlaps::new(k, length_m);
            near(overlaps.current_m[0], integral(length_m, |x| first(y, k * x).powi(2)));
            near(overlaps.current_m[1], integral(length_m, |x| first(y, k * x) * second(y, k * x)));
            near(overlaps.slope_per_m[0], k * k * integral(length_m, |x| first_slope(y, k * x).powi(2)));
            let cross = integral(length_m, |x| first_slope(y, k * x) * second_slope(y, k * x));
            near(overlaps.slope_per_m[1], k * k * cross);
            let shapes = Shapes::new(k, length_m);
            let (even, odd) = (|x: f64| first(y, x) + second(y, x), |x: f64| second(y, x) - first(y, x));
            // The points' linear functions have the sinusoids' integrals and first moments.
            let h = 0.5 * length_m;
            let moment = h / 3_f64.sqrt();
            near(2.0 * shapes.even, integral(length_m, |x| even(k * x)));
            near(2.0 * moment * shapes.odd, integral(length_m, |x| (x - h) * odd(k * x)));
            near(2.0 * shapes.odd_slope * k, 2.0);
            // ∫(x − h)·E′ dx = h·(E(0) + E(L)) − ∫E dx; its digits go where kh is small.
            let expected = 2.0 * h - integral(length_m, |x| even(k * x));
            let got = 2.0 * moment * shapes.even_slope * k;
            assert!((got - expected).abs() < 1e-9 * h, "{y}: {got} for {expected}");
        }
    }
}
