//! The scale on which paper and screen draw a standing-wave ratio.
//!
//! A ratio runs from 1 to infinity, and what matters happens below 3. The height is ln s / (ln s + ln 3): a match lies
//! at the bottom, 3 at half height, a total reflection at the top, and 10 can still be told from 100.

/// Ratio at half height.
const HALF: f64 = 3.0;

/// Ratios worth a grid line.
pub const GRID: [f64; 9] = [1.0, 1.5, 2.0, 3.0, 5.0, 10.0, 30.0, 100.0, 1000.0];

/// Height of a ratio, 0 (match) to 1 (total reflection). Ratios below 1 or without a value count as the nearest end.
#[must_use]
pub fn height(swr: f64) -> f64 {
    if !swr.is_finite() {
        return 1.0;
    }
    let log = swr.max(1.0).ln();
    log / (log + HALF.ln())
}

/// The ratio at a height; infinite at 1 and above.
#[must_use]
pub fn ratio(height: f64) -> f64 {
    if height >= 1.0 {
        return f64::INFINITY;
    }
    let height = height.max(0.0);
    (HALF.ln() * height / (1.0 - height)).exp()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_scale_rises_with_the_ratio_and_stays_inside() {
        for pair in [1.0, 1.01, 1.5, 2.0, 3.0, 10.0, 99.0, 1e6, f64::INFINITY].windows(2) {
            assert!(height(pair[0]) < height(pair[1]), "{} against {}", pair[0], pair[1]);
        }
        assert!(height(1.0).abs() < 1e-12 && (height(HALF) - 0.5).abs() < 1e-12);
        assert!((height(f64::NAN) - 1.0).abs() < 1e-12);
    }

    #[test]
    fn a_height_reads_back_as_its_ratio() {
        for swr in [1.0, 1.3, 2.0, 7.5, 40.0, 800.0] {
            assert!((ratio(height(swr)) / swr - 1.0).abs() < 1e-9, "{swr}");
        }
        assert!(ratio(1.0).is_infinite());
    }
}
