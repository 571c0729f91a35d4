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

impl Shapes {
    pub fn new(k: f64, length_m: f64) -> Self {
        let h = 0.5 * length_m;
        let y = k * h;
        let y2 = y * y;
        // (1 − y·cot y)/y² and (tan y/y − 1)/y² by their Taylor series: y stays below π/12, the error below 1e-12.
        let series = |terms: &[f64]| terms.iter().rev().fold(0.0, |sum, term| sum * y2 + term);
        let (falling, rising) = (series(&COTANGENT), series(&TANGENT));
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

    /// ∫I₁-shape² and ∫I₁-shape·I₂-shape over the segment, m.
    pub fn overlaps(k: f64, length_m: f64) -> [f64; 2] {
        let y = k * length_m;
        if y < 0.02 {
            // L/3·(1 + 2y²/15) and L/6·(1 + 7y²/30)
            return [
                length_m / 3.0 * (1.0 + 2.0 * y * y / 15.0),
                length_m / 6.0 * (1.0 + 7.0 * y * y / 30.0),
            ];
        }
        let (sin, cos) = y.sin_cos();
        let scale = length_m / (2.0 * sin * sin);
        [scale * (1.0 - sin * cos / y), scale * (sin / y - cos)]
    }
    /// ∫(dI₁-shape/dx)² and ∫dI₁-shape/dx·dI₂-shape/dx over the segment, 1/m.
    pub fn slope_overlaps(k: f64, length_m: f64) -> [f64; 2] {
        // k²L/2·[1 + sin y·cos y/y]/sin² y and −k²L/2·[cos y + sin y/y]/sin² y
        let y = k * length_m;
        let (sin, cos) = y.sin_cos();
        let scale = 0.5 * y * y / (length_m * sin * sin);
        [scale * (1.0 + sin * cos / y), -scale * (cos + sin / y)]
    }
}
