//! Gauss-Legendre points.

/// Points and weights of the three-point rule on 0…1.
pub(super) const THREE: [(f64, f64); 3] =
    [(0.112_701_665_379_258_31, 5.0 / 18.0), (0.5, 8.0 / 18.0), (0.887_298_334_620_741_7, 5.0 / 18.0)];

/// Points and weights of the n-point rule on −1…1, by Newton's method on Legendre's polynomial.
pub(crate) fn gauss_legendre(count: usize) -> Vec<(f64, f64)> {
    let n = count as f64;
    (0..count)
        .map(|index| {
            // Tricomi's guess is within the reach of Newton's method for every root.
            let mut x = (std::f64::consts::PI * (index as f64 + 0.75) / (n + 0.5)).cos();
            let mut slope = 1.0;
            // Quadratic convergence: five steps reach the last bit from any such guess.
            for _ in 0..6 {
                let (mut p, mut before) = (x, 1.0);
                for k in 2..=count {
                    let k = k as f64;
                    // k·P_k = (2k − 1)·x·P_{k−1} − (k − 1)·P_{k−2}
                    (p, before) = (((2.0 * k - 1.0) * x * p - (k - 1.0) * before) / k, p);
                }
                slope = n * (x * p - before) / (x * x - 1.0);
                x -= p / slope;
            }
            (x, 2.0 / ((1.0 - x * x) * slope * slope))
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rules_integrate_polynomials_exactly() {
        for count in [2, 5, 16, 60] {
            let rule = gauss_legendre(count);
            for power in [0, 2, 2 * count as i32 - 2] {
                let sum: f64 = rule.iter().map(|(x, w)| w * x.powi(power)).sum();
                assert!((sum - 2.0 / f64::from(power + 1)).abs() < 1e-13, "{count} {power} {sum}");
            }
        }
        let fifth: f64 = THREE.iter().map(|(x, w)| w * x.powi(5)).sum();
        assert!((fifth - 1.0 / 6.0).abs() < 1e-15);
    }
}
