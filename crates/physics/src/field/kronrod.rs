//! Adaptive quadrature.

/// Points and weights of Kronrod's fifteen-point rule on −1…1, right half, and Gauss's weights of the seven points among
/// them (QUADPACK's qk15, from memory; held to polynomials by the test below).
const RULE: [(f64, f64, f64); 8] = [
    (0.991_455_371_120_812_6, 0.022_935_322_010_529_224, 0.0),
    (0.949_107_912_342_758_5, 0.063_092_092_629_978_55, 0.129_484_966_168_869_7),
    (0.864_864_423_359_769_1, 0.104_790_010_322_250_18, 0.0),
    (0.741_531_185_599_394_4, 0.140_653_259_715_525_92, 0.279_705_391_489_276_67),
    (0.586_087_235_467_691_1, 0.169_004_726_639_267_9, 0.0),
    (0.405_845_151_377_397_2, 0.190_350_578_064_785_4, 0.381_830_050_505_118_9),
    (0.207_784_955_007_898_47, 0.204_432_940_075_298_9, 0.0),
    (0.0, 0.209_482_141_084_727_83, 0.417_959_183_673_469_4),
];

/// A piece of the way with its integral.
#[derive(Clone, Copy, Debug)]
pub(super) struct Panel {
    from: f64,
    to: f64,
    pub integral: f64,
    /// What Gauss's seven points differ by: far more than the fifteen err.
    error: f64,
}

impl Panel {
    pub fn new(from: f64, to: f64, integrand: &impl Fn(f64) -> f64) -> Self {
        let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
        let (mut kronrod, mut gauss) = (0.0, 0.0);
        for (x, weight, of_gauss) in RULE {
            let both = if x > 0.0 {
                integrand(middle - half * x) + integrand(middle + half * x)
            } else {
                integrand(middle)
            };
            kronrod += weight * both;
            gauss += of_gauss * both;
        }
        Self { from, to, integral: half * kronrod, error: half * (kronrod - gauss).abs() }
    }

    fn halves(&self, integrand: &impl Fn(f64) -> f64) -> [Self; 2] {
        let middle = 0.5 * (self.from + self.to);
        [Self::new(self.from, middle, integrand), Self::new(middle, self.to, integrand)]
    }
}

/// Halves the worst panel until the differences of all sum to less than a share of the integral; of an integrand ≥ 0.
///
/// `None` where that takes more than `most` panels.
pub(super) fn refined(
    mut panels: Vec<Panel>,
    share: f64,
    most: usize,
    integrand: &impl Fn(f64) -> f64,
) -> Option<f64> {
    loop {
        let sum: f64 = panels.iter().map(|panel| panel.integral).sum();
        let error: f64 = panels.iter().map(|panel| panel.error).sum();
        if error <= share * sum {
            return Some(sum);
        }
        if panels.len() >= most || !error.is_finite() {
            return None;
        }
        let worst = (0..panels.len()).max_by(|&a, &b| panels[a].error.total_cmp(&panels[b].error))?;
        let [first, second] = panels[worst].halves(integrand);
        panels[worst] = first;
        panels.push(second);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_rules_are_exact_to_their_degrees() {
        // 15 Kronrod points to degree 22, 7 Gauss points to degree 13
        for degree in (0..=22).step_by(2) {
            let panel = Panel::new(-1.0, 1.0, &|x| x.powi(degree));
            assert!((panel.integral - 2.0 / f64::from(degree + 1)).abs() < 2e-15, "{degree}: {panel:?}");
            assert!(degree > 13 || panel.error < 2e-15, "{degree}: {panel:?}");
            assert!(degree < 14 || panel.error > 1e-8, "{degree}: {panel:?}");
        }
    }

    #[test]
    fn a_root_and_a_peak_are_found() {
        let root = |x: f64| (1.0 - x).max(0.0).sqrt();
        let sum = refined(vec![Panel::new(0.0, 3.0, &root)], 1e-7, 100, &root).unwrap();
        assert!((sum - 2.0 / 3.0).abs() < 1e-7, "{sum}");
        let peak = |x: f64| 1e-3 / (1e-6 + x * x);
        let sum = refined(vec![Panel::new(0.0, 1.0, &peak)], 1e-7, 100, &peak).unwrap();
        assert!((sum - 1000_f64.atan()).abs() < 1e-7, "{sum}");
        assert!(refined(vec![Panel::new(0.0, 1.0, &peak)], 1e-7, 3, &peak).is_none());
    }
}
